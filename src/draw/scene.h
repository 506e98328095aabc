/* A picture as plain data, before it is painted.
 *
 * The same scene serves screen, PNG, SVG, PDF, hit testing and text-diff tests. Lengths are px at
 * 96 dpi, y down.
 */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include "core/base/macros.h"
#include "core/molecule/molecule.h"
#include "draw/theme.h"

typedef struct {
  double x, y;
} EnlPoint;
typedef struct {
  double x, y, width, height;
} EnlRect;

typedef enum {
  ENL_SHAPE_LINE,    /* point[0]..point[1] */
  ENL_SHAPE_POLYGON, /* filled, n points (wedges, arrow heads) */
  ENL_SHAPE_PATH,    /* open line through n points */
  ENL_SHAPE_CURVE,   /* cubic: point[0..3] */
  ENL_SHAPE_DISC,    /* centre point[0], radius */
  ENL_SHAPE_RECT,    /* rounded by radius: point[0] corner, point[1] opposite corner */
  ENL_SHAPE_TEXT     /* markup; point[0] is the anchor, see align */
} EnlShapeKind;

typedef enum {
  ENL_DASH_SOLID,
  ENL_DASH_DASHED,
  ENL_DASH_DOTTED,
  ENL_DASH_LONG,
  ENL_DASH_DASH_DOT,
  ENL_N_DASHES
} EnlDash;

typedef struct {
  EnlShapeKind kind;
  EnlPoint *point;
  uint32_t n_points;
  double radius, width; /* width 0: filled, else stroked */
  EnlTone tone;
  double opacity; /* 0..1 on top of the tone's alpha */
  EnlDash dash;
  char *text;  /* Pango markup, TEXT only */
  double size; /* font size, px */
  bool bold;
  double align_x, align_y; /* 0 anchor at left/top of the text box, 0.5 centre, 1 right/bottom */
  EnlRect box;             /* bounds on the picture, filled when the shape is added */
  uint32_t atom, bond, site, substrate; /* what it belongs to, ENL_NONE for nothing */
} EnlShape;

typedef struct EnlScene EnlScene;

EnlScene *enl_scene_new (const EnlTheme *theme) ENL_MUST_USE;
void enl_scene_free (EnlScene *scene);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlScene, enl_scene_free)

const EnlTheme *enl_scene_theme (const EnlScene *scene);
uint32_t enl_scene_shapes (const EnlScene *scene);
const EnlShape *enl_scene_shape (const EnlScene *scene, uint32_t index);
EnlRect enl_scene_bounds (const EnlScene *scene); /* of all shapes */
void enl_scene_set_size (EnlScene *scene, double width, double height);
EnlRect enl_scene_frame (const EnlScene *scene); /* set size, else bounds plus margin */

/* Adding: each copies what it is given and returns the shape for further settings of tone, dash,
 * opacity and ownership (not of geometry). */
EnlShape *enl_scene_line (EnlScene *scene, EnlPoint from, EnlPoint to, double width, EnlTone tone);
EnlShape *enl_scene_polygon (EnlScene *scene, const EnlPoint *point, uint32_t n, EnlTone tone);
EnlShape *enl_scene_path (EnlScene *scene, const EnlPoint *point, uint32_t n, double width,
                          EnlTone tone);
EnlShape *enl_scene_curve (EnlScene *scene, const EnlPoint point[4], double width, EnlTone tone);
EnlShape *enl_scene_disc (EnlScene *scene, EnlPoint centre, double radius, EnlTone tone);
EnlShape *enl_scene_rect (EnlScene *scene, EnlRect rect, double radius, EnlTone tone);
EnlShape *enl_scene_text (EnlScene *scene, EnlPoint anchor, const char *markup, double size,
                          bool bold, double align_x, double align_y, EnlTone tone);
/* Copies all shapes of `part`, scaled then moved. */
void enl_scene_append (EnlScene *scene, const EnlScene *part, double scale, double dx, double dy);

/* Makes every shape belong to one substrate. */
void enl_scene_set_substrate (EnlScene *scene, uint32_t substrate);

/* Topmost shape with an owner within `reach` px of the point, or NULL. */
const EnlShape *enl_scene_hit (const EnlScene *scene, double x, double y, double reach);

/* One line a shape, numbers to 2 decimals, for tests. New string (g_free). */
char *enl_scene_dump (const EnlScene *scene) ENL_MUST_USE;
/* Checks that no two text boxes overlap and none leaves the frame; NULL when fine, else a sentence
 * per fault (g_free). */
char *enl_scene_faults (const EnlScene *scene) ENL_MUST_USE;
