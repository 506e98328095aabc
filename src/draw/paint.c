#include "draw/paint.h"

#include <pango/pangocairo.h>

#include "draw/text.h"

/* Dash lengths in line widths; a dash near 0 is a round dot. */
typedef struct {
  double length[4];
  int n;
} Pattern;

static const Pattern pattern_of[ENL_N_DASHES] = {
    [ENL_DASH_SOLID] = {{0}, 0},
    [ENL_DASH_DASHED] = {{3.0, 2.2}, 2},
    [ENL_DASH_DOTTED] = {{0.01, 2.2}, 2},
    [ENL_DASH_LONG] = {{7.0, 2.6}, 2},
    [ENL_DASH_DASH_DOT] = {{5.0, 2.2, 1.0, 2.2}, 4},
};

static void
set_colour (cairo_t *cr, const EnlTheme *theme, const EnlShape *shape)
{
  EnlColour c = theme->tone[shape->tone];

  cairo_set_source_rgba (cr, c.red, c.green, c.blue, c.alpha * shape->opacity);
}

static void
set_dash (cairo_t *cr, const EnlShape *shape)
{
  const Pattern *pattern = &pattern_of[shape->dash];
  bool round = shape->dash == ENL_DASH_SOLID || shape->dash == ENL_DASH_DOTTED;
  double length[4];

  for (int i = 0; i < pattern->n; i++)
    length[i] = pattern->length[i] * shape->width;
  cairo_set_line_width (cr, shape->width);
  cairo_set_line_cap (cr, round ? CAIRO_LINE_CAP_ROUND : CAIRO_LINE_CAP_BUTT);
  cairo_set_line_join (cr, CAIRO_LINE_JOIN_ROUND);
  cairo_set_dash (cr, length, pattern->n, 0);
}

static void
rounded_rect (cairo_t *cr, EnlPoint a, EnlPoint b, double radius)
{
  double r = MIN (radius, MIN (b.x - a.x, b.y - a.y) / 2);

  if (r <= 0) {
    cairo_rectangle (cr, a.x, a.y, b.x - a.x, b.y - a.y);
    return;
  }
  cairo_new_sub_path (cr);
  cairo_arc (cr, b.x - r, a.y + r, r, -G_PI / 2, 0);
  cairo_arc (cr, b.x - r, b.y - r, r, 0, G_PI / 2);
  cairo_arc (cr, a.x + r, b.y - r, r, G_PI / 2, G_PI);
  cairo_arc (cr, a.x + r, a.y + r, r, G_PI, 3 * G_PI / 2);
  cairo_close_path (cr);
}

static void
trace (cairo_t *cr, const EnlShape *shape)
{
  const EnlPoint *p = shape->point;

  cairo_new_path (cr);
  switch (shape->kind) {
  case ENL_SHAPE_LINE:
  case ENL_SHAPE_PATH:
  case ENL_SHAPE_POLYGON:
    for (uint32_t i = 0; i < shape->n_points; i++)
      cairo_line_to (cr, p[i].x, p[i].y);
    if (shape->kind == ENL_SHAPE_POLYGON)
      cairo_close_path (cr);
    break;
  case ENL_SHAPE_CURVE:
    cairo_move_to (cr, p[0].x, p[0].y);
    cairo_curve_to (cr, p[1].x, p[1].y, p[2].x, p[2].y, p[3].x, p[3].y);
    break;
  case ENL_SHAPE_DISC:
    cairo_arc (cr, p[0].x, p[0].y, shape->radius, 0, 2 * G_PI);
    cairo_close_path (cr);
    break;
  case ENL_SHAPE_RECT:
    rounded_rect (cr, p[0], p[1], shape->radius);
    break;
  case ENL_SHAPE_TEXT:
    g_assert_not_reached ();
  }
}

static void
paint_text (const EnlTheme *theme, const EnlShape *shape, cairo_t *cr)
{
  PangoLayout *layout = enl_text_layout (theme->family, shape->text, shape->size, shape->bold);
  double width, height;

  enl_text_extents (layout, &width, &height);
  pango_layout_set_alignment (layout, shape->align_x < 0.25   ? PANGO_ALIGN_LEFT
                                      : shape->align_x > 0.75 ? PANGO_ALIGN_RIGHT
                                                              : PANGO_ALIGN_CENTER);
  cairo_move_to (cr, shape->point[0].x - shape->align_x * width,
                 shape->point[0].y - shape->align_y * height - enl_text_lift (layout));
  pango_cairo_show_layout (cr, layout);
  g_object_unref (layout);
}

void
enl_scene_paint (const EnlScene *scene, cairo_t *cr)
{
  const EnlTheme *theme = enl_scene_theme (scene);

  cairo_save (cr);
  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (shape->opacity <= 0)
      continue;
    set_colour (cr, theme, shape);
    if (shape->kind == ENL_SHAPE_TEXT) {
      paint_text (theme, shape, cr);
      continue;
    }
    trace (cr, shape);
    if (shape->width > 0) {
      set_dash (cr, shape);
      cairo_stroke (cr);
    } else {
      cairo_fill (cr);
    }
  }
  cairo_restore (cr);
}
