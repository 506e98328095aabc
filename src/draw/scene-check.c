/* What a scene says about itself: hit tests, the text dump and the faults. */
#include "draw/scene.h"

#include <math.h>
#include <string.h>

#include "draw/plane.h"

/* Less than this is rounding, not a collision. */
#define FAULT_TOLERANCE 0.5 /* px */

static bool
inside_polygon (const EnlShape *shape, EnlPoint p)
{
  bool inside = false;

  for (uint32_t i = 0, j = shape->n_points - 1; i < shape->n_points; j = i++) {
    EnlPoint a = shape->point[i], b = shape->point[j];
    if ((a.y > p.y) != (b.y > p.y) && p.x < (b.x - a.x) * (p.y - a.y) / (b.y - a.y) + a.x)
      inside = !inside;
  }
  return inside;
}

static double
path_distance (const EnlShape *shape, EnlPoint p)
{
  double best = INFINITY;

  for (uint32_t i = shape->kind == ENL_SHAPE_PATH ? 1 : 0; i < shape->n_points; i++)
    best = fmin (best, enl_segment_distance (shape->point[i ? i - 1 : shape->n_points - 1],
                                             shape->point[i], p));
  return best;
}

static double
curve_distance (const EnlShape *shape, EnlPoint p)
{
  double best = INFINITY;

  for (int i = 0; i < ENL_CURVE_SAMPLES; i++)
    best = fmin (best, enl_segment_distance (
                           enl_curve_at (shape->point, (double)i / ENL_CURVE_SAMPLES),
                           enl_curve_at (shape->point, (double)(i + 1) / ENL_CURVE_SAMPLES), p));
  return best;
}

static double
shape_distance (const EnlShape *shape, EnlPoint p)
{
  switch (shape->kind) {
  case ENL_SHAPE_LINE:
    return enl_segment_distance (shape->point[0], shape->point[1], p) - shape->width / 2;
  case ENL_SHAPE_POLYGON:
    return inside_polygon (shape, p) ? 0 : path_distance (shape, p);
  case ENL_SHAPE_PATH:
    return path_distance (shape, p) - shape->width / 2;
  case ENL_SHAPE_CURVE:
    return curve_distance (shape, p) - shape->width / 2;
  case ENL_SHAPE_DISC:
    return enl_point_distance (shape->point[0], p) - shape->radius;
  case ENL_SHAPE_RECT:
  case ENL_SHAPE_TEXT:
    return enl_rect_distance (shape->box, p);
  }
  return INFINITY;
}

static bool
has_owner (const EnlShape *shape)
{
  return shape->atom != ENL_NONE || shape->bond != ENL_NONE || shape->site != ENL_NONE ||
         shape->substrate != ENL_NONE;
}

const EnlShape *
enl_scene_hit (const EnlScene *scene, double x, double y, double reach)
{
  for (uint32_t i = enl_scene_shapes (scene); i-- > 0;) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (has_owner (shape) && shape_distance (shape, (EnlPoint){x, y}) <= reach)
      return shape;
  }
  return NULL;
}

static const char *const kind_word[] = {
    [ENL_SHAPE_LINE] = "line",   [ENL_SHAPE_PATH] = "path", [ENL_SHAPE_POLYGON] = "polygon",
    [ENL_SHAPE_CURVE] = "curve", [ENL_SHAPE_DISC] = "disc", [ENL_SHAPE_RECT] = "rect",
    [ENL_SHAPE_TEXT] = "text",
};

static const char *const tone_word[ENL_N_TONES] = {
    [ENL_TONE_GROUND] = "ground",
    [ENL_TONE_PANEL] = "panel",
    [ENL_TONE_INK] = "ink",
    [ENL_TONE_MUTED] = "muted",
    [ENL_TONE_OXYGEN] = "oxygen",
    [ENL_TONE_NITROGEN] = "nitrogen",
    [ENL_TONE_SULFUR] = "sulfur",
    [ENL_TONE_HALOGEN] = "halogen",
    [ENL_TONE_HETERO] = "hetero",
    [ENL_TONE_SITE] = "site",
    [ENL_TONE_SITE_TEXT] = "site-text",
    [ENL_TONE_ACTIVE] = "active",
    [ENL_TONE_ACTIVE_SOFT] = "active-soft",
    [ENL_TONE_ACTIVE_TEXT] = "active-text",
    [ENL_TONE_CHARGE] = "charge",
    [ENL_TONE_CHARGE_PLUS] = "charge-plus",
    [ENL_TONE_ARROW] = "arrow",
    [ENL_TONE_WARNING] = "warning",
};

/* Without "-0.00". */
static void
append_number (GString *out, double value)
{
  double rounded = round (value * 100) / 100;
  char text[G_ASCII_DTOSTR_BUF_SIZE];

  g_ascii_formatd (text, sizeof text, "%.2f", rounded == 0 ? 0 : rounded);
  g_string_append_printf (out, " %s", text);
}

static void
append_owner (GString *out, const char *word, uint32_t owner)
{
  if (owner != ENL_NONE)
    g_string_append_printf (out, " %s=%u", word, owner);
}

static void
dump_shape (GString *out, const EnlShape *shape)
{
  static const char *const dash[] = {"", " dashed", " dotted", " long", " dash-dot"};

  g_string_append_printf (out, "%s %s", kind_word[shape->kind], tone_word[shape->tone]);
  for (uint32_t i = 0; i < shape->n_points; i++) {
    append_number (out, shape->point[i].x);
    append_number (out, shape->point[i].y);
  }
  if (shape->radius > 0) {
    g_string_append (out, " radius");
    append_number (out, shape->radius);
  }
  if (shape->width > 0) {
    g_string_append (out, " width");
    append_number (out, shape->width);
  }
  if (shape->opacity != 1) {
    g_string_append (out, " opacity");
    append_number (out, shape->opacity);
  }
  g_string_append (out, dash[shape->dash]);
  if (shape->text) {
    g_string_append (out, " size");
    append_number (out, shape->size);
    g_string_append (out, shape->bold ? " bold align" : " align");
    append_number (out, shape->align_x);
    append_number (out, shape->align_y);
  }
  append_owner (out, "atom", shape->atom);
  append_owner (out, "bond", shape->bond);
  append_owner (out, "site", shape->site);
  append_owner (out, "substrate", shape->substrate);
  if (shape->text) {
    g_autofree char *line = g_strdelimit (g_strdup (shape->text), "\n", '|');
    g_string_append_printf (out, " \"%s\"", line);
  }
  g_string_append_c (out, '\n');
}

char *
enl_scene_dump (const EnlScene *scene)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++)
    dump_shape (out, enl_scene_shape (scene, i));
  return g_string_free (out, FALSE);
}

static bool
seen_text (const EnlShape *shape)
{
  return shape->kind == ENL_SHAPE_TEXT && shape->opacity > 0 && shape->box.width > 0;
}

static void
check_frame (GString *out, const EnlShape *shape, EnlRect frame)
{
  EnlRect both = enl_rect_union (shape->box, frame);

  if (both.width > frame.width + FAULT_TOLERANCE || both.height > frame.height + FAULT_TOLERANCE)
    g_string_append_printf (out, "%s \"%s\" at %.1f, %.1f leaves the frame\n",
                            kind_word[shape->kind], shape->text ? shape->text : "", shape->box.x,
                            shape->box.y);
}

char *
enl_scene_faults (const EnlScene *scene)
{
  EnlRect frame = enl_scene_frame (scene);
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *a = enl_scene_shape (scene, i);
    if (a->opacity > 0)
      check_frame (out, a, frame);
    for (uint32_t j = 0; j < i && seen_text (a); j++) {
      const EnlShape *b = enl_scene_shape (scene, j);
      if (seen_text (b) && enl_rect_overlap (enl_rect_grow (a->box, -FAULT_TOLERANCE / 2),
                                             enl_rect_grow (b->box, -FAULT_TOLERANCE / 2)) > 0)
        g_string_append_printf (out, "text \"%s\" and \"%s\" overlap at %.1f, %.1f\n", b->text,
                                a->text, a->box.x, a->box.y);
    }
  }
  return g_string_free (out, out->len == 0);
}
