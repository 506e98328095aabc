#include "draw/report-pages.h"

#include <math.h>

#include "draw/curve-scene.h"
#include "draw/flow.h"
#include "draw/structure-scene.h"
#include "draw/text.h"

#define SHORT_REPORT 4
#define SHORT_PAGES  2

#define CARD_GAP         12.0
#define CARD_PAD         9.0
#define STRUCTURE_HEIGHT 150.0
#define BARS_SHARE       0.36 /* of the width, beside the words on a base */
#define CURVE_SHARE      0.54
#define CURVE_WIDTH      430.0 /* as drawn, before it is made smaller */
#define CURVE_HEIGHT     200.0
#define HEADING          1.25 /* of the type size */
#define SOURCE           0.88

typedef struct {
  const EnlReport *report;
  const EnlTheme *theme;
  EnlFlow *flow;
  double size;
  bool curves; /* composition as curves; else as bars, which are smaller */
} Pages;

/* ---- pictures ---- */

EnlScene *
enl_report_structure (const EnlReportSubstrate *s, const EnlTheme *theme, double width,
                      double height)
{
  const EnlAnalysis *a = s->analysis;

  if (!a)
    return NULL;
  const EnlStructureLook look = {
      .sites = a->sites, .estimate = a->estimate, .rank = a->rank, .selected = s->selected};
  g_autoptr (EnlScene) drawn = enl_structure_scene (a->mol, &look, theme);
  EnlRect b = enl_scene_bounds (drawn);
  double scale = fmin (1.0, fmin (width / b.width, height / b.height));
  EnlScene *out = enl_scene_new (theme);

  enl_scene_append (out, drawn, scale, -b.x * scale, -b.y * scale);
  return out;
}

/* One species: words above, then the bar with its share behind. */
static double
draw_species (EnlScene *scene, const EnlCurveLine *line, double y, double width, double size)
{
  const EnlTheme *theme = enl_scene_theme (scene);
  double bar = 0.72 * width, high = 0.62 * size;
  double filled = fmax (0.6, bar * CLAMP (line->chosen, 0.0, 1.0));
  g_autofree char *share = enl_share_text (line->chosen);
  g_autofree char *markup = g_markup_escape_text (share, -1);
  EnlTone tone =
      line->kind == ENL_CURVE_FORM && line->holds_target ? ENL_TONE_ACTIVE : ENL_TONE_MUTED;

  y = enl_scene_paragraph (scene, (EnlPoint){0, y}, width, line->label, size, false, ENL_TONE_INK);
  double line_height = enl_text_line_height (theme->family, size);
  double top = y + (line_height - high) / 2;
  EnlShape *frame = enl_scene_rect (scene, (EnlRect){0, top, bar, high}, 0, ENL_TONE_PANEL);
  frame->opacity = 1;
  enl_scene_rect (scene, (EnlRect){0, top, filled, high}, 0, tone);
  enl_scene_text (scene, (EnlPoint){width, y}, markup, size, true, 1, 0, ENL_TONE_INK);
  return y + line_height;
}

EnlScene *
enl_report_composition (const EnlReportSubstrate *s, const EnlTheme *theme, double width,
                        double size)
{
  if (!s->curve || s->curve->n_lines == 0)
    return NULL;
  EnlScene *scene = enl_scene_new (theme);
  char equivalents[G_ASCII_DTOSTR_BUF_SIZE];
  g_ascii_formatd (equivalents, sizeof equivalents, "%.4g", s->curve->chosen);
  g_autofree char *head =
      g_strdup_printf ("In the flask at %s equivalents, shares of the substrate", equivalents);
  double y = enl_scene_paragraph (scene, (EnlPoint){0, 0}, width, head, size, true, ENL_TONE_INK);
  for (uint32_t i = 0; i < s->curve->n_lines; i++)
    y = draw_species (scene, &s->curve->line[i], y + 0.15 * size, width, size);
  return scene;
}

EnlScene *
enl_report_curve (const EnlReport *report, uint32_t substrate, const EnlTheme *theme, double width)
{
  const EnlReportSubstrate *s = &report->substrate[substrate];
  g_autofree char *name = g_strdup_printf ("Substrate %u", substrate + 1);
  const EnlCurveSheet sheet = {.curve = s->curve,
                               .substrate = name,
                               .base = s->base ? s->base->name : "",
                               .conditions = &report->at,
                               .width = CURVE_WIDTH,
                               .height = CURVE_HEIGHT};

  if (!s->curve || s->curve->n_lines == 0)
    return NULL;
  g_autoptr (EnlScene) drawn = enl_curve_scene (&sheet, theme);
  EnlRect b = enl_scene_bounds (drawn);
  EnlScene *out = enl_scene_new (theme);
  enl_scene_append (out, drawn, width / b.width, -b.x * width / b.width, -b.y * width / b.width);
  return out;
}

/* ---- cards ---- */

static double
draw_sites (const Pages *p, EnlScene *scene, const EnlReportSubstrate *s, double y, double width)
{
  double indent = 1.6 * p->size;

  for (uint32_t i = 0; i < s->n_sites; i++) {
    g_autofree char *rank = g_strdup_printf ("%u", s->site[i].rank);
    enl_scene_text (scene, (EnlPoint){0, y}, rank, p->size, true, 0, 0, ENL_TONE_SITE);
    y = enl_scene_paragraph (scene, (EnlPoint){indent, y}, width - indent, s->site[i].position,
                             p->size, false, ENL_TONE_INK);
    y = enl_scene_paragraph (scene, (EnlPoint){indent, y}, width - indent, s->site[i].value,
                             p->size, s->site[i].rank == 1, ENL_TONE_INK) +
        0.25 * p->size;
  }
  if (s->more_sites > 0) {
    g_autofree char *more =
        g_strdup_printf ("and %u weaker site%s", s->more_sites, s->more_sites > 1 ? "s" : "");
    y = enl_scene_paragraph (scene, (EnlPoint){indent, y}, width - indent, more, p->size, false,
                             ENL_TONE_MUTED);
  }
  return y;
}

/* Without its ground; left top corner at the origin. */
static EnlScene *
make_card (const Pages *p, uint32_t index, double width)
{
  const EnlReportSubstrate *s = &p->report->substrate[index];
  EnlScene *scene = enl_scene_new (p->theme);
  g_autofree char *title = g_strdup_printf ("%u  %s", index + 1, s->name);
  double y = enl_scene_paragraph (scene, (EnlPoint){0, 0}, width, title, HEADING * p->size, true,
                                  ENL_TONE_INK);

  if (s->identity[0])
    y = enl_scene_paragraph (scene, (EnlPoint){0, y}, width, s->identity, p->size, false,
                             ENL_TONE_MUTED);
  if (s->note[0])
    y = enl_scene_paragraph (scene, (EnlPoint){0, y}, width, s->note, p->size, false,
                             ENL_TONE_MUTED);
  g_autoptr (EnlScene) structure = enl_report_structure (s, p->theme, width, STRUCTURE_HEIGHT);
  if (structure) {
    EnlRect b = enl_scene_bounds (structure);
    y += 0.8 * p->size;
    enl_scene_append (scene, structure, 1, (width - b.width) / 2, y);
    y += b.height + 0.8 * p->size;
  }
  if (s->fault) {
    g_autofree char *text = g_strconcat ("Cannot be read: ", s->fault, NULL);
    y = enl_scene_paragraph (scene, (EnlPoint){0, y}, width, text, p->size, false,
                             ENL_TONE_WARNING);
  }
  if (s->no_enol) {
    g_autofree char *text = g_strconcat ("No enolate: ", s->no_enol, NULL);
    y = enl_scene_paragraph (scene, (EnlPoint){0, y}, width, text, p->size, false,
                             ENL_TONE_WARNING);
  }
  draw_sites (p, scene, s, y, width);
  return scene;
}

static double
height_of (const EnlScene *scene)
{
  EnlRect b = enl_scene_bounds (scene);

  return b.y + b.height;
}

/* Two cards side by side are one block. */
static void
add_cards (const Pages *p)
{
  double width = (enl_flow_width () - CARD_GAP) / 2, inner = width - 2 * CARD_PAD;

  for (uint32_t i = 0; i < p->report->n_substrates; i += 2) {
    uint32_t n = MIN (2, p->report->n_substrates - i);
    g_autoptr (EnlScene) row = enl_scene_new (p->theme);
    EnlScene *card[2] = {make_card (p, i, inner), n > 1 ? make_card (p, i + 1, inner) : NULL};
    double height = fmax (height_of (card[0]), card[1] ? height_of (card[1]) : 0) + 2 * CARD_PAD;
    for (uint32_t k = 0; k < n; k++) {
      double x = k * (width + CARD_GAP);
      enl_scene_rect (row, (EnlRect){x, 0, width, height}, 5, ENL_TONE_PANEL);
      enl_scene_append (row, card[k], 1, x + CARD_PAD, CARD_PAD);
      enl_scene_free (card[k]);
    }
    enl_flow_block (p->flow, row);
    enl_flow_gap (p->flow, CARD_GAP);
  }
}

/* ---- bases ---- */

static EnlScene *
make_base (const Pages *p, uint32_t index)
{
  const EnlReportSubstrate *s = &p->report->substrate[index];
  EnlScene *scene = enl_scene_new (p->theme);
  double figure = (p->curves ? CURVE_SHARE : BARS_SHARE) * enl_flow_width ();
  double width = enl_flow_width () - figure - 2 * CARD_GAP, y;
  const char *text[] = {s->outcome, s->anion, s->equivalents};
  g_autofree char *title =
      g_strdup_printf ("%u  %s, site %u: %s", index + 1, s->name,
                       enl_analysis_rank (s->analysis, s->selected), s->base_title);
  g_autoptr (EnlScene) bars = p->curves ? enl_report_curve (p->report, index, p->theme, figure)
                                        : enl_report_composition (s, p->theme, figure, p->size);

  y = enl_scene_paragraph (scene, (EnlPoint){0, 0}, bars ? width : enl_flow_width (), title,
                           1.05 * p->size, true, ENL_TONE_INK);
  for (size_t i = 0; i < ENL_COUNT (text); i++)
    y = enl_scene_paragraph (scene, (EnlPoint){0, y + 0.15 * p->size},
                             bars ? width : enl_flow_width (), text[i], p->size, false,
                             ENL_TONE_INK);
  if (bars)
    enl_scene_append (scene, bars, 1, enl_flow_width () - figure, 0);
  return scene;
}

static void
add_bases (const Pages *p)
{
  bool any = false;

  for (uint32_t i = 0; i < p->report->n_substrates; i++) {
    if (!p->report->substrate[i].base)
      continue;
    g_autoptr (EnlScene) block = make_base (p, i);
    if (!any) {
      enl_flow_heading (p->flow, "Base and composition", HEADING * p->size, height_of (block));
      enl_flow_paragraph (p->flow, p->report->footing, p->size, false, ENL_TONE_MUTED, 0);
    }
    any = true;
    enl_flow_gap (p->flow, 0.6 * p->size);
    enl_flow_block (p->flow, block);
  }
  if (any)
    enl_flow_gap (p->flow, 0.9 * p->size);
}

/* ---- cautions and sources ---- */

static void
add_cautions (const Pages *p)
{
  enl_flow_heading (p->flow, "Cautions", HEADING * p->size, 3 * p->size);
  for (guint i = 0; i < p->report->caution->len; i++) {
    const EnlReportCaution *c = &g_array_index (p->report->caution, EnlReportCaution, i);
    g_autofree char *text =
        g_strdup_printf ("[%s] %s%s (substrate %s)", c->id,
                         c->effect == ENL_EFFECT_HAZARD ? "Hazard: " : "", c->text, c->where);
    enl_flow_item (p->flow, "\u2022", text, p->size,
                   c->severity >= 3 ? ENL_TONE_WARNING : ENL_TONE_INK, 1.2 * p->size);
  }
  enl_flow_gap (p->flow, 0.4 * p->size);
  enl_flow_paragraph (p->flow, p->report->deferral, p->size, true, ENL_TONE_INK, 0);
  enl_flow_gap (p->flow, 0.9 * p->size);
}

static void
add_sources (const Pages *p)
{
  double size = SOURCE * p->size;

  if (p->report->source->len == 0)
    return;
  enl_flow_heading (p->flow, "Sources", HEADING * p->size, 3 * size);
  for (guint i = 0; i < p->report->source->len; i++) {
    g_autofree char *label = g_strdup_printf ("[%u]", i + 1);
    enl_flow_item (p->flow, label, g_ptr_array_index (p->report->source, i), size, ENL_TONE_INK,
                   2.6 * p->size);
  }
  enl_flow_paragraph (p->flow, "Cautions without a source here are common practice.", size, false,
                      ENL_TONE_MUTED, 0);
}

static void
add_head (const Pages *p)
{
  enl_flow_paragraph (p->flow, p->report->title, 1.7 * p->size, true, ENL_TONE_INK, 0);
  enl_flow_paragraph (p->flow, p->report->conditions, p->size, false, ENL_TONE_MUTED, 0);
  enl_flow_paragraph (p->flow,
                      "Solid badge measured, open badge estimated, square lab value; numbers in "
                      "brackets are sources. pKa as published, not corrected for the number of "
                      "equivalent hydrogens.",
                      p->size, false, ENL_TONE_MUTED, 0);
  enl_flow_gap (p->flow, 0.8 * p->size);
}

static GPtrArray *
compose (const EnlReport *report, const EnlTheme *theme, double size, bool curves)
{
  g_autofree char *running = g_strdup_printf (
      "Enolith: %s. Estimates of acidity only; decide under local rules.", report->title);
  g_autoptr (EnlFlow) flow = enl_flow_new (theme, running);
  Pages p = {report, theme, flow, size, curves};

  add_head (&p);
  add_cards (&p);
  enl_flow_gap (flow, 0.4 * size);
  add_bases (&p);
  add_cautions (&p);
  add_sources (&p);
  return enl_flow_finish (flow);
}

/* Sizes in px: 11.5 px are 8.6 pt. Curves in readable type where they fit, else bars, at last in
 * small type. */
GPtrArray *
enl_report_pages (const EnlReport *report, const EnlTheme *theme)
{
  static const struct {
    double size;
    bool curves;
  } trial[] = {{11.5, true},  {10.8, true},  {10.2, true}, {11.5, false},
               {10.8, false}, {10.2, false}, {9.6, false}, {9.2, false}};
  GPtrArray *pages = compose (report, theme, trial[0].size, trial[0].curves);

  for (size_t i = 1;
       report->n_substrates <= SHORT_REPORT && pages->len > SHORT_PAGES && i < ENL_COUNT (trial);
       i++) {
    g_ptr_array_unref (pages);
    pages = compose (report, theme, trial[i].size, trial[i].curves);
  }
  return pages;
}
