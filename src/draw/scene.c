#include "draw/scene.h"

#include <math.h>
#include <string.h>

#include "draw/plane.h"
#include "draw/text.h"

struct EnlScene {
  const EnlTheme *theme; /* borrowed, static */
  GPtrArray *shape;      /* of EnlShape, owned */
  double width, height;  /* 0: not set */
};

static void
shape_free (gpointer data)
{
  EnlShape *shape = data;

  g_free (shape->point);
  g_free (shape->text);
  g_free (shape);
}

EnlScene *
enl_scene_new (const EnlTheme *theme)
{
  EnlScene *scene = g_new0 (EnlScene, 1);

  scene->theme = theme;
  scene->shape = g_ptr_array_new_with_free_func (shape_free);
  return scene;
}

void
enl_scene_free (EnlScene *scene)
{
  if (scene) {
    g_ptr_array_unref (scene->shape);
    g_free (scene);
  }
}

const EnlTheme *
enl_scene_theme (const EnlScene *scene)
{
  return scene->theme;
}

uint32_t
enl_scene_shapes (const EnlScene *scene)
{
  return scene->shape->len;
}

const EnlShape *
enl_scene_shape (const EnlScene *scene, uint32_t index)
{
  g_assert (index < scene->shape->len);
  return g_ptr_array_index (scene->shape, index);
}

static EnlShape *
add_shape (EnlScene *scene, EnlShapeKind kind, const EnlPoint *point, uint32_t n, EnlTone tone)
{
  EnlShape *shape = g_new0 (EnlShape, 1);

  shape->kind = kind;
  shape->point = g_memdup2 (point, n * sizeof *point);
  shape->n_points = n;
  shape->tone = tone;
  shape->opacity = 1;
  shape->atom = shape->bond = shape->site = shape->substrate = ENL_NONE;
  g_ptr_array_add (scene->shape, shape);
  return shape;
}

/* Bounds of the points, grown by `grow` on every side. */
static EnlRect
points_box (const EnlPoint *point, uint32_t n, double grow)
{
  double x0 = INFINITY, y0 = INFINITY, x1 = -INFINITY, y1 = -INFINITY;

  for (uint32_t i = 0; i < n; i++) {
    x0 = fmin (x0, point[i].x);
    y0 = fmin (y0, point[i].y);
    x1 = fmax (x1, point[i].x);
    y1 = fmax (y1, point[i].y);
  }
  return (EnlRect){x0 - grow, y0 - grow, x1 - x0 + 2 * grow, y1 - y0 + 2 * grow};
}

EnlShape *
enl_scene_line (EnlScene *scene, EnlPoint from, EnlPoint to, double width, EnlTone tone)
{
  const EnlPoint point[2] = {from, to};
  EnlShape *shape = add_shape (scene, ENL_SHAPE_LINE, point, 2, tone);

  shape->width = width;
  shape->box = points_box (point, 2, width / 2);
  return shape;
}

EnlShape *
enl_scene_polygon (EnlScene *scene, const EnlPoint *point, uint32_t n, EnlTone tone)
{
  g_assert (n >= 3);
  EnlShape *shape = add_shape (scene, ENL_SHAPE_POLYGON, point, n, tone);
  shape->box = points_box (point, n, 0);
  return shape;
}

EnlShape *
enl_scene_path (EnlScene *scene, const EnlPoint *point, uint32_t n, double width, EnlTone tone)
{
  g_assert (n >= 2 && width > 0);
  EnlShape *shape = add_shape (scene, ENL_SHAPE_PATH, point, n, tone);
  shape->width = width;
  shape->box = points_box (point, n, width / 2);
  return shape;
}

EnlShape *
enl_scene_curve (EnlScene *scene, const EnlPoint point[4], double width, EnlTone tone)
{
  EnlShape *shape = add_shape (scene, ENL_SHAPE_CURVE, point, 4, tone);
  EnlPoint sample[ENL_CURVE_SAMPLES + 1];

  for (uint32_t i = 0; i <= ENL_CURVE_SAMPLES; i++)
    sample[i] = enl_curve_at (point, (double)i / ENL_CURVE_SAMPLES);
  shape->width = width;
  shape->box = points_box (sample, ENL_CURVE_SAMPLES + 1, width / 2);
  return shape;
}

EnlShape *
enl_scene_disc (EnlScene *scene, EnlPoint centre, double radius, EnlTone tone)
{
  EnlShape *shape = add_shape (scene, ENL_SHAPE_DISC, &centre, 1, tone);

  shape->radius = radius;
  shape->box = points_box (&centre, 1, radius);
  return shape;
}

EnlShape *
enl_scene_rect (EnlScene *scene, EnlRect rect, double radius, EnlTone tone)
{
  const EnlPoint point[2] = {{rect.x, rect.y}, {rect.x + rect.width, rect.y + rect.height}};
  EnlShape *shape = add_shape (scene, ENL_SHAPE_RECT, point, 2, tone);

  shape->radius = radius;
  shape->box = points_box (point, 2, 0);
  return shape;
}

EnlShape *
enl_scene_text (EnlScene *scene, EnlPoint anchor, const char *markup, double size, bool bold,
                double align_x, double align_y, EnlTone tone)
{
  EnlShape *shape = add_shape (scene, ENL_SHAPE_TEXT, &anchor, 1, tone);

  shape->text = g_strdup (markup);
  shape->size = size;
  shape->bold = bold;
  shape->align_x = align_x;
  shape->align_y = align_y;
  shape->box = enl_text_box (scene->theme->family, anchor, markup, size, bold, align_x, align_y);
  return shape;
}

EnlRect
enl_text_box (const char *family, EnlPoint anchor, const char *markup, double size, bool bold,
              double align_x, double align_y)
{
  g_autoptr (GObject) object = G_OBJECT (enl_text_layout (family, markup, size, bold));
  double width, height;

  enl_text_extents (PANGO_LAYOUT (object), &width, &height);
  EnlRect box = enl_text_ink (PANGO_LAYOUT (object));
  box.x += anchor.x - align_x * width;
  box.y += anchor.y - align_y * height;
  return box;
}

/* Shapes that are not seen (hit areas) do not count; outlines reach half their width out. */
EnlRect
enl_scene_bounds (const EnlScene *scene)
{
  EnlRect all = {0};
  bool any = false;

  for (uint32_t i = 0; i < scene->shape->len; i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (shape->opacity <= 0)
      continue;
    bool outline = shape->width > 0 && shape->kind != ENL_SHAPE_LINE &&
                   shape->kind != ENL_SHAPE_PATH && shape->kind != ENL_SHAPE_CURVE &&
                   shape->kind != ENL_SHAPE_TEXT;
    EnlRect box = enl_rect_grow (shape->box, outline ? shape->width / 2 : 0);
    all = any ? enl_rect_union (all, box) : box;
    any = true;
  }
  return all;
}

void
enl_scene_set_size (EnlScene *scene, double width, double height)
{
  scene->width = width;
  scene->height = height;
}

EnlRect
enl_scene_frame (const EnlScene *scene)
{
  if (scene->width > 0 && scene->height > 0)
    return (EnlRect){0, 0, scene->width, scene->height};
  return enl_rect_grow (enl_scene_bounds (scene), scene->theme->margin);
}

static EnlRect
moved_box (EnlRect box, double scale, double dx, double dy)
{
  return (EnlRect){box.x * scale + dx, box.y * scale + dy, box.width * scale, box.height * scale};
}

void
enl_scene_append (EnlScene *scene, const EnlScene *part, double scale, double dx, double dy)
{
  g_assert (scene != part && scale > 0);
  for (uint32_t i = 0; i < part->shape->len; i++) {
    const EnlShape *old = enl_scene_shape (part, i);
    EnlShape *copy = add_shape (scene, old->kind, old->point, old->n_points, old->tone);
    EnlPoint *point = copy->point;

    *copy = *old;
    copy->point = point;
    copy->text = g_strdup (old->text);
    for (uint32_t k = 0; k < old->n_points; k++)
      point[k] = (EnlPoint){old->point[k].x * scale + dx, old->point[k].y * scale + dy};
    copy->radius *= scale;
    copy->width *= scale;
    copy->size *= scale;
    copy->box = moved_box (old->box, scale, dx, dy);
  }
}

void
enl_scene_set_substrate (EnlScene *scene, uint32_t substrate)
{
  for (uint32_t i = 0; i < scene->shape->len; i++)
    ((EnlShape *)g_ptr_array_index (scene->shape, i))->substrate = substrate;
}
