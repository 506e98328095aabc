#include "draw/reliability-sheet.h"

#include <math.h>
#include <stdlib.h>

#include "core/acidity/validate.h"
#include "draw/plot.h"
#include "draw/text.h"

#define PANEL 380.0 /* side of a panel's axes, px */
#define GAP   64.0  /* between panels: room for numbers */
/* Classes with fewer rows have no curve of their own. */
#define OWN_CURVE_FROM 20

#define MARK_OPACITY 0.8

static const double level[] = {0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 0.99};

/* Order of drawing: what the program is for comes last and lies on top. */
static const EnlAcidClass layer[] = {ENL_CLASS_CHALCOGEN, ENL_CLASS_OXYGEN, ENL_CLASS_NITROGEN,
                                     ENL_CLASS_CARBON, ENL_CLASS_ALPHA};

static const EnlPlotMark mark_of[ENL_N_CLASSES] = {
    [ENL_CLASS_ALPHA] = {ENL_MARK_DISC, ENL_TONE_SITE},
    [ENL_CLASS_CARBON] = {ENL_MARK_RING, ENL_TONE_ACTIVE},
    [ENL_CLASS_NITROGEN] = {ENL_MARK_SQUARE, ENL_TONE_NITROGEN},
    [ENL_CLASS_OXYGEN] = {ENL_MARK_TRIANGLE, ENL_TONE_OXYGEN},
    [ENL_CLASS_CHALCOGEN] = {ENL_MARK_DIAMOND, ENL_TONE_SULFUR},
};

typedef struct {
  const EnlReliabilitySheet *sheet;
  EnlScene *scene;
  const EnlTheme *theme;
} Sheet;

static double
error_of (const EnlReliabilityPoint *p)
{
  return fabs (p->left_out - p->published);
}

/* ---- published against left out ---- */

static void
pka_range (const Sheet *s, EnlSolvent solvent, double *low, double *high)
{
  *low = INFINITY, *high = -INFINITY;
  for (uint32_t i = 0; i < s->sheet->n_points; i++) {
    const EnlReliabilityPoint *p = &s->sheet->point[i];
    if (p->solvent != solvent)
      continue;
    *low = fmin (*low, fmin (p->published, p->left_out));
    *high = fmax (*high, fmax (p->published, p->left_out));
  }
  if (*low > *high)
    *low = 0, *high = 1;
  *low = 5 * floor (*low / 5);
  *high = 5 * ceil (*high / 5);
}

static void
draw_guides (const Sheet *s, const EnlPlot *plot)
{
  for (int k = -2; k <= 2; k++) {
    EnlShape *line = enl_plot_diagonal (s->scene, plot, k);
    if (!line)
      continue;
    line->tone = k == 0 ? ENL_TONE_INK : ENL_TONE_MUTED;
    line->dash = k == 0 ? ENL_DASH_SOLID : abs (k) == 1 ? ENL_DASH_DASHED : ENL_DASH_DOTTED;
  }
}

/* Rows of one solvent and one class. */
typedef struct {
  uint32_t n, inside;
  double sum;
} Tally;

static Tally
tally (const Sheet *s, EnlSolvent solvent, int class_of)
{
  Tally t = {0};

  for (uint32_t i = 0; i < s->sheet->n_points; i++) {
    const EnlReliabilityPoint *p = &s->sheet->point[i];
    if (p->solvent != solvent || (class_of < ENL_N_CLASSES && (int)p->class_of != class_of))
      continue;
    t.n++;
    t.sum += error_of (p);
    t.inside += error_of (p) <= p->half;
  }
  return t;
}

/* A number with `decimals` places and a point in every locale, flush right at `at`. */
static void
draw_cell (const Sheet *s, EnlPoint at, double value, const char *format)
{
  char text[G_ASCII_DTOSTR_BUF_SIZE];

  g_ascii_formatd (text, sizeof text, format, value);
  enl_scene_text (s->scene, at, text, s->theme->small_size, false, 1, 0, ENL_TONE_INK);
}

/* Mark, class, number of rows, mean error and share inside, a line for each class; returns the y
 * below. */
static double
draw_legend (const Sheet *s, EnlSolvent solvent, double x, double y)
{
  static const char *const head[] = {"rows", "MAE", "in 90 %"};
  static const double column[] = {180, 260, 350};
  double size = s->theme->small_size, line = enl_text_line_height (s->theme->family, size) + 3;

  for (int k = 0; k < 3; k++)
    enl_scene_text (s->scene, (EnlPoint){x + column[k], y}, head[k], size, false, 1, 0,
                    ENL_TONE_MUTED);
  for (int class_of = 0; class_of <= ENL_N_CLASSES; class_of++) {
    Tally t = tally (s, solvent, class_of);
    bool all = class_of == ENL_N_CLASSES;
    if (t.n == 0)
      continue;
    y += line;
    if (!all)
      enl_plot_mark (s->scene, (EnlPoint){x + 8, y + line / 2 - 1}, &mark_of[class_of]);
    enl_scene_text (s->scene, (EnlPoint){x + 22, y},
                    all ? "all" : enl_acid_class_text ((EnlAcidClass)class_of), size, false, 0, 0,
                    ENL_TONE_INK);
    draw_cell (s, (EnlPoint){x + column[0], y}, t.n, "%.0f");
    draw_cell (s, (EnlPoint){x + column[1], y}, t.sum / t.n, "%.2f");
    draw_cell (s, (EnlPoint){x + column[2], y}, 100.0 * t.inside / t.n, "%.0f");
  }
  return y + line;
}

static double
draw_pka_panel (const Sheet *s, EnlSolvent solvent, double x, double y)
{
  EnlPlot plot = {.area = {x, y, PANEL, PANEL}};
  g_autofree char *title =
      g_strconcat ("Published and left out, ", enl_solvent_label (solvent), NULL);
  const EnlPlotWords words = {title, "published pKa", "left-out estimate", 5, 5, 1, 0};

  pka_range (s, solvent, &plot.x_low, &plot.x_high);
  plot.y_low = plot.x_low, plot.y_high = plot.x_high;
  enl_plot_axes (s->scene, &plot, &words);
  draw_guides (s, &plot);
  for (size_t k = 0; k < ENL_COUNT (layer); k++)
    for (uint32_t i = 0; i < s->sheet->n_points; i++) {
      const EnlReliabilityPoint *p = &s->sheet->point[i];
      if (p->solvent != solvent || p->class_of != layer[k])
        continue;
      EnlShape *mark = enl_plot_mark (s->scene, enl_plot_place (&plot, p->published, p->left_out),
                                      &mark_of[p->class_of]);
      mark->opacity = MARK_OPACITY;
      mark->site = i;
    }
  return draw_legend (s, solvent, x, y + PANEL + enl_plot_foot (s->theme));
}

/* ---- coverage ---- */

/* Share of the rows of a class (ENL_N_CLASSES: all) inside intervals of this nominal level. */
static double
coverage (const Sheet *s, int class_of, double nominal, uint32_t *n)
{
  double scale = enl_interval_scale (nominal);
  uint32_t inside = 0;

  *n = 0;
  for (uint32_t i = 0; i < s->sheet->n_points; i++) {
    const EnlReliabilityPoint *p = &s->sheet->point[i];
    if (class_of < ENL_N_CLASSES && (int)p->class_of != class_of)
      continue;
    ++*n;
    inside += error_of (p) <= scale * p->half;
  }
  return *n ? (double)inside / *n : NAN;
}

static void
draw_curve (const Sheet *s, const EnlPlot *plot, int class_of)
{
  EnlTone tone = class_of == ENL_N_CLASSES ? ENL_TONE_INK : mark_of[class_of].tone;
  EnlPoint last = {0};
  uint32_t n;

  for (size_t k = 0; k < ENL_COUNT (level); k++) {
    EnlPoint at = enl_plot_place (plot, level[k], coverage (s, class_of, level[k], &n));
    if (n < OWN_CURVE_FROM)
      return;
    if (k > 0)
      enl_scene_line (s->scene, last, at, class_of == ENL_N_CLASSES ? 2.2 : 1, tone);
    if (class_of < ENL_N_CLASSES)
      enl_plot_mark (s->scene, at, &mark_of[class_of]);
    last = at;
  }
}

/* What the program promises: 85 to 95 in a hundred of the 90 % intervals hold. */
static void
draw_promise (const Sheet *s, const EnlPlot *plot)
{
  EnlPoint from = enl_plot_place (plot, 0.9, 0.85), to = enl_plot_place (plot, 0.9, 0.95);

  enl_scene_rect (s->scene, (EnlRect){from.x - 6, to.y, 12, from.y - to.y}, 3,
                  ENL_TONE_ACTIVE_SOFT);
}

static void
draw_coverage_panel (const Sheet *s, double x, double y)
{
  const EnlPlot plot = {{x, y, PANEL, PANEL}, 0.45, 1, 0.45, 1, false};
  const EnlPlotWords words = {
      "Intervals that hold", "nominal, %", "published value inside, %", 0.1, 0.1, 100, 0};

  enl_plot_axes (s->scene, &plot, &words);
  draw_promise (s, &plot);
  enl_plot_diagonal (s->scene, &plot, 0)->tone = ENL_TONE_INK;
  for (int class_of = 0; class_of <= ENL_N_CLASSES; class_of++)
    draw_curve (s, &plot, class_of);
}

/* ---- size of the error ---- */

static void
draw_size_panel (const Sheet *s, double x, double y)
{
  double top = 0;
  EnlPlot plot = {.area = {x, y, PANEL, PANEL}, .root = true};
  const EnlPlotWords words = {"Error and stated width",
                              "half width of the 90 % interval",
                              "size of the error; below the line: inside",
                              1,
                              1,
                              1,
                              0};

  for (uint32_t i = 0; i < s->sheet->n_points; i++)
    top = fmax (top, fmax (error_of (&s->sheet->point[i]), s->sheet->point[i].half));
  plot.x_high = plot.y_high = fmax (ceil (top), 1);
  enl_plot_axes (s->scene, &plot, &words);
  enl_plot_diagonal (s->scene, &plot, 0)->tone = ENL_TONE_INK;
  for (size_t k = 0; k < ENL_COUNT (layer); k++)
    for (uint32_t i = 0; i < s->sheet->n_points; i++) {
      const EnlReliabilityPoint *p = &s->sheet->point[i];
      if (p->class_of != layer[k])
        continue;
      EnlShape *mark = enl_plot_mark (s->scene, enl_plot_place (&plot, p->half, error_of (p)),
                                      &mark_of[p->class_of]);
      mark->opacity = MARK_OPACITY;
      mark->atom = i;
    }
}

static void
draw_caption (const Sheet *s, double x, double y)
{
  g_autofree char *text = g_strdup_printf (
      "%u published values, %s: the estimate of a row comes from a model that has not seen it. "
      "Broken and dotted lines: 1 and 2 pK units off. Bold curve: all rows; a class with fewer "
      "than %d rows has none. Intervals of other levels than 90\u00A0%% by the normal law.",
      s->sheet->n_points, s->sheet->left_out, OWN_CURVE_FROM);

  enl_scene_paragraph (s->scene, (EnlPoint){x, y}, 2 * PANEL + GAP, text, s->theme->small_size,
                       false, ENL_TONE_MUTED);
}

EnlScene *
enl_reliability_sheet (const EnlReliabilitySheet *sheet, const EnlTheme *theme)
{
  EnlScene *scene = enl_scene_new (theme);
  const Sheet s = {sheet, scene, theme};
  double left = 0, right = PANEL + GAP, y = enl_plot_head (theme);

  double below = draw_pka_panel (&s, ENL_SOLVENT_DMSO, left, y);
  below = fmax (below, draw_pka_panel (&s, ENL_SOLVENT_WATER, right, y));
  y = below + enl_plot_head (theme) + theme->margin;
  draw_coverage_panel (&s, left, y);
  draw_size_panel (&s, right, y);
  draw_caption (&s, left, y + PANEL + enl_plot_foot (theme) + theme->small_size);
  return scene;
}
