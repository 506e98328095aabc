#include "draw/curve-scene.h"

#include <math.h>

#include "draw/paint.h"
#include "draw/plot.h"
#include "draw/text.h"

/* Natural size of the area inside the axes, text sizes. */
#define AREA_WIDTH  28.0
#define AREA_HEIGHT 17.0
/* Narrowest area, text sizes. */
#define LEAST_WIDTH  13.0
#define LEAST_HEIGHT 4.5
/* Of the width of the picture, for the labels at most. */
#define LABEL_SHARE 0.45
/* Line widths in bond widths. */
#define LINE_WIDTH   1.1
#define TARGET_WIDTH 1.9
/* From the end of a line to its label, text sizes; half of it is level. */
#define LEADER       2.2
#define BAND_OPACITY 0.35

typedef struct {
  EnlTone tone;
  EnlDash dash;
  EnlMarkShape mark;
} Style;

/* By number among the forms; the first one is the site asked about. */
static const Style form_style[] = {
    {ENL_TONE_ACTIVE, ENL_DASH_SOLID, ENL_MARK_DISC},
    {ENL_TONE_SITE, ENL_DASH_DASHED, ENL_MARK_SQUARE},
    {ENL_TONE_CHARGE, ENL_DASH_DASH_DOT, ENL_MARK_TRIANGLE},
    {ENL_TONE_ARROW, ENL_DASH_LONG, ENL_MARK_DIAMOND},
    {ENL_TONE_OXYGEN, ENL_DASH_DOTTED, ENL_MARK_SQUARE},
    {ENL_TONE_NITROGEN, ENL_DASH_SOLID, ENL_MARK_TRIANGLE},
};
static const Style kind_style[] = {
    [ENL_CURVE_SUBSTRATE] = {ENL_TONE_INK, ENL_DASH_LONG, ENL_MARK_RING},
    [ENL_CURVE_OTHERS] = {ENL_TONE_HETERO, ENL_DASH_DASH_DOT, ENL_MARK_DIAMOND},
    [ENL_CURVE_BASE] = {ENL_TONE_MUTED, ENL_DASH_DOTTED, ENL_MARK_RING},
};

typedef struct {
  const EnlCurveSheet *sheet;
  const EnlCurve *curve;
  const EnlTheme *theme;
  EnlScene *scene;
  EnlPlot plot;
  double small;  /* height of a line */
  double margin; /* around everything */
  bool bare;     /* there is no room for a head */
  double label_width;
  char **label; /* markup, one a line of the curve */
} Sheet;

static Style
style_of (const Sheet *s, uint32_t line)
{
  const EnlCurveLine *l = &s->curve->line[line];

  return l->kind == ENL_CURVE_FORM ? form_style[line % ENL_COUNT (form_style)]
                                   : kind_style[l->kind];
}

static double
label_height (const Sheet *s, uint32_t line)
{
  double width, height;

  enl_text_measure (s->theme->family, s->label[line], s->theme->small_size, false, &width, &height);
  return height;
}

/* ---- labels ---- */

static char *
label_heading (const Sheet *s)
{
  return g_strdup_printf ("at %.4g equiv.:", s->curve->chosen);
}

static void
make_labels (Sheet *s, double most)
{
  g_autofree char *heading = label_heading (s);
  double high;

  enl_text_measure (s->theme->family, heading, s->theme->small_size, true, &s->label_width, &high);
  s->label = g_new0 (char *, s->curve->n_lines + 1);
  for (uint32_t i = 0; i < s->curve->n_lines; i++) {
    const EnlCurveLine *line = &s->curve->line[i];
    double width, height;
    g_autofree char *share = enl_share_text (line->chosen);
    g_autofree char *plain = g_strdup_printf ("%s: %s", line->label, share);
    s->label[i] =
        enl_text_wrap_short (s->theme->family, plain, s->theme->small_size, false, most, 2);
    enl_text_measure (s->theme->family, s->label[i], s->theme->small_size, false, &width, &height);
    s->label_width = fmax (s->label_width, width);
  }
}

typedef struct {
  uint32_t line;
  double wanted, at, height; /* middle */
} Slot;

static int
by_place (const void *a, const void *b)
{
  const Slot *left = a, *right = b;

  if (left->wanted != right->wanted)
    return left->wanted < right->wanted ? -1 : 1;
  return left->line < right->line ? -1 : 1;
}

/* Spreads the labels so that none meets another and all stay beside the area. */
static void
spread (Slot *slot, uint32_t n, double top, double bottom)
{
  double edge = top;

  qsort (slot, n, sizeof *slot, by_place);
  for (uint32_t i = 0; i < n; i++) {
    slot[i].at = fmax (slot[i].wanted, edge + slot[i].height / 2);
    edge = slot[i].at + slot[i].height / 2;
  }
  edge = bottom;
  for (uint32_t i = n; i-- > 0;) {
    slot[i].at = fmin (slot[i].at, edge - slot[i].height / 2);
    edge = slot[i].at - slot[i].height / 2;
  }
}

static void
draw_labels (const Sheet *s)
{
  const EnlRect *a = &s->plot.area;
  uint32_t n = s->curve->n_lines;
  g_autofree Slot *slot = g_new0 (Slot, n);
  double x = a->x + a->width, leader = LEADER * s->theme->text_size;

  for (uint32_t i = 0; i < n; i++) {
    const EnlCurveLine *line = &s->curve->line[i];
    double end = line->fraction[s->curve->n_points - 1];
    slot[i] = (Slot){i, enl_plot_place (&s->plot, s->plot.x_high, end).y, 0, label_height (s, i)};
  }
  spread (slot, n, a->y, a->y + a->height);
  for (uint32_t i = 0; i < n; i++) {
    Style style = style_of (s, slot[i].line);
    const EnlPoint way[] = {
        {x, slot[i].wanted}, {x + 0.4 * leader, slot[i].at}, {x + leader - 4, slot[i].at}};
    EnlShape *shape = enl_scene_path (s->scene, way, ENL_COUNT (way),
                                      LINE_WIDTH * s->theme->bond_width, style.tone);
    shape->dash = style.dash;
    shape->atom = slot[i].line;
    shape = enl_scene_text (s->scene, (EnlPoint){x + leader, slot[i].at}, s->label[slot[i].line],
                            s->theme->small_size, false, 0, 0.5, style.tone);
    shape->atom = slot[i].line;
  }
}

/* ---- lines ---- */

static bool
is_target (const EnlCurveLine *line)
{
  return line->kind == ENL_CURVE_FORM && line->holds_target;
}

static void
draw_line (const Sheet *s, uint32_t index)
{
  const EnlCurveLine *line = &s->curve->line[index];
  Style style = style_of (s, index);
  double width = is_target (line) ? TARGET_WIDTH : LINE_WIDTH;
  EnlShape *shape = enl_plot_path (s->scene, &s->plot, s->curve->equivalents, line->fraction,
                                   s->curve->n_points, width * s->theme->bond_width, style.tone);

  shape->dash = style.dash;
  shape->atom = index;
}

static void
draw_mark (const Sheet *s, uint32_t index)
{
  const EnlCurveLine *line = &s->curve->line[index];
  Style style = style_of (s, index);
  EnlPlotMark mark = {style.mark, style.tone};

  enl_plot_mark (s->scene, enl_plot_place (&s->plot, s->curve->chosen, line->chosen), &mark)->atom =
      index;
}

/* The interval belongs to all forms without the site's hydrogen together: a bar is drawn where
 * these are one line. */
static void
draw_interval (const Sheet *s)
{
  uint32_t n = 0;

  for (uint32_t i = 0; i < s->curve->n_lines; i++)
    n += is_target (&s->curve->line[i]);
  if (n != 1 || s->curve->high - s->curve->low < 0.01)
    return;
  EnlShape *bar =
      enl_scene_line (s->scene, enl_plot_place (&s->plot, s->curve->chosen, s->curve->low),
                      enl_plot_place (&s->plot, s->curve->chosen, s->curve->high),
                      4 * s->theme->bond_width, ENL_TONE_ACTIVE);
  bar->opacity = BAND_OPACITY;
}

static void
draw_chosen (const Sheet *s)
{
  EnlPoint top = enl_plot_place (&s->plot, s->curve->chosen, 1);
  EnlPoint foot = enl_plot_place (&s->plot, s->curve->chosen, 0);
  double head = 0.35 * s->theme->small_size;
  const EnlPoint pointer[] = {
      top, {top.x - head, top.y - 1.6 * head}, {top.x + head, top.y - 1.6 * head}};

  enl_scene_line (s->scene, top, foot, 1, ENL_TONE_INK)->dash = ENL_DASH_DASHED;
  enl_scene_polygon (s->scene, pointer, ENL_COUNT (pointer), ENL_TONE_INK);
}

/* ---- the sheet ---- */

static char *
title_of (const EnlCurveSheet *sheet)
{
  return g_strdup_printf ("%s with %s in %s", sheet->substrate, sheet->base,
                          enl_solvent_label (sheet->conditions->solvent));
}

static char *
conditions_of (const Sheet *s)
{
  const EnlConditions *c = s->sheet->conditions;
  g_autofree char *low = enl_share_text (s->curve->low), *high = enl_share_text (s->curve->high);
  GString *out = g_string_new (NULL);

  g_string_printf (out, "substrate %.3g\u00A0mol/L", c->concentration);
  if (c->water > 0)
    g_string_append_printf (out, ", water %.3g\u00A0equiv.", c->water);
  if (s->curve->high - s->curve->low >= 0.01)
    g_string_append_printf (out, "; 90\u00A0%% interval of the conversion %s to %s", low, high);
  if (s->curve->stoichiometric)
    g_string_append (out, "; the protons do not come back");
  return g_string_free (out, FALSE);
}

static double
draw_head (const Sheet *s, double width)
{
  double m = s->margin, y = m;
  g_autofree char *title = title_of (s->sheet), *conditions = conditions_of (s);

  if (s->bare)
    return y;
  y = enl_scene_paragraph (s->scene, (EnlPoint){m, y}, width - 2 * m, title, s->theme->text_size,
                           true, ENL_TONE_INK);
  if (!s->curve->missing)
    y = enl_scene_paragraph (s->scene, (EnlPoint){m, y + 2}, width - 2 * m, conditions,
                             s->theme->small_size, false, ENL_TONE_MUTED);
  return y;
}

static double
draw_foot (const Sheet *s, double y, double width)
{
  double m = s->margin;

  if (!s->sheet->footing)
    return y;
  return enl_scene_paragraph (s->scene, (EnlPoint){m, y + 0.5 * s->small}, width - 2 * m,
                              s->sheet->footing, s->theme->small_size, false, ENL_TONE_MUTED);
}

static void
draw_plot (const Sheet *s)
{
  const EnlRect *a = &s->plot.area;
  const EnlPlotWords words = {.title = "",
                              .y_title = "",
                              .x_title = "equivalents of base",
                              .x_step = s->plot.x_high > 6 ? ceil (s->plot.x_high / 8) : 0.5,
                              .y_step = 0.25,
                              .factor = 100,
                              .x_decimals = 1};
  g_autofree char *at = label_heading (s);

  enl_plot_axes (s->scene, &s->plot, &words);
  enl_scene_text (s->scene, (EnlPoint){a->x, a->y - 0.9 * s->small}, "% of substrate or base",
                  s->theme->small_size, false, 0, 1, ENL_TONE_MUTED);
  enl_scene_text (s->scene, (EnlPoint){a->x + a->width + LEADER * s->theme->text_size, a->y - 4},
                  at, s->theme->small_size, true, 0, 1, ENL_TONE_INK);
  draw_interval (s);
  draw_chosen (s);
  for (uint32_t i = s->curve->n_lines; i-- > 0;)
    draw_line (s, i);
  for (uint32_t i = s->curve->n_lines; i-- > 0;)
    draw_mark (s, i);
  draw_labels (s);
}

static double
foot_height (const Sheet *s, double width)
{
  g_autoptr (EnlScene) trial = enl_scene_new (s->theme);
  Sheet copy = *s;

  copy.scene = trial;
  return draw_foot (&copy, 0, width);
}

static double
numbers_width (const Sheet *s)
{
  double width, height;

  enl_text_measure (s->theme->family, "100", s->theme->small_size, false, &width, &height);
  return width + 10;
}

/* Places head, plot and foot; returns the height of the picture. */
static double
lay_out (Sheet *s, double width)
{
  double m = s->margin, size = s->theme->text_size, labels = 0;
  double right = LEADER * size + s->label_width + m, left = m + numbers_width (s);
  double top = draw_head (s, width) + 2.2 * s->small;
  double below = enl_plot_foot (s->theme) + foot_height (s, width) + m;
  double height = s->sheet->height > 0 ? s->sheet->height - top - below : AREA_HEIGHT * size;

  for (uint32_t i = 0; i < s->curve->n_lines; i++)
    labels += label_height (s, i);
  height = fmax (height, fmax (LEAST_HEIGHT * size, labels));
  s->plot = (EnlPlot){.area = {left, top, width - left - right, height},
                      .x_high = s->curve->equivalents[s->curve->n_points - 1],
                      .y_high = 1};
  draw_plot (s);
  return draw_foot (s, top + height + enl_plot_foot (s->theme), width) + m;
}

static double
natural_width (const Sheet *s)
{
  double fixed = 2 * s->margin + numbers_width (s) + LEADER * s->theme->text_size;
  double wanted = s->sheet->width > 0 ? s->sheet->width
                                      : fixed + AREA_WIDTH * s->theme->text_size + s->label_width;

  return fmax (wanted, fixed + LEAST_WIDTH * s->theme->text_size + s->label_width);
}

static double
draw_missing (Sheet *s, double width)
{
  double m = s->margin;
  g_autofree char *words = g_strdup_printf ("No composition curve: %s.", s->curve->missing);
  double y = draw_head (s, width) + 0.5 * s->small;

  y = enl_scene_paragraph (s->scene, (EnlPoint){m, y}, width - 2 * m, words, s->theme->small_size,
                           false, ENL_TONE_WARNING);
  return draw_foot (s, y, width) + m;
}

static EnlScene *
make_scene (const EnlCurveSheet *sheet, bool bare, const EnlTheme *theme)
{
  Sheet s = {.sheet = sheet, .curve = sheet->curve, .theme = theme, .bare = bare};
  double most = sheet->width > 0 ? LABEL_SHARE * sheet->width : AREA_WIDTH * theme->text_size;

  s.scene = enl_scene_new (theme);
  s.margin = bare ? theme->margin / 3 : theme->margin;
  s.small = enl_text_line_height (theme->family, theme->small_size);
  make_labels (&s, fmax (most - LEADER * theme->text_size - s.margin, 8 * theme->small_size));
  double width = natural_width (&s);
  double height = sheet->curve->missing ? draw_missing (&s, width) : lay_out (&s, width);
  enl_scene_set_size (s.scene, width, fmax (height, sheet->height));
  g_strfreev (s.label);
  return s.scene;
}

EnlScene *
enl_curve_scene (const EnlCurveSheet *sheet, const EnlTheme *theme)
{
  EnlScene *scene = make_scene (sheet, false, theme);

  if (sheet->height <= 0 || sheet->curve->missing ||
      enl_scene_frame (scene).height <= sheet->height + 1)
    return scene;
  enl_scene_free (scene);
  return make_scene (sheet, true, theme);
}
