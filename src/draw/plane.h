/* Small plane geometry shared by the scenes. Lengths in px, y down. */
#pragma once

#include "draw/scene.h"

#define ENL_CURVE_SAMPLES 24

static inline EnlPoint
enl_point_add (EnlPoint a, EnlPoint b, double times)
{
  return (EnlPoint){a.x + times * b.x, a.y + times * b.y};
}

double enl_point_distance (EnlPoint a, EnlPoint b);
/* Unit vector from a to b; (1, 0) when the points coincide. */
EnlPoint enl_point_direction (EnlPoint a, EnlPoint b);
/* Unit vector at `angle` (radians, counted against the screen's y axis: 90 degrees is up). */
EnlPoint enl_point_polar (double angle);
/* Angle of the way from a to b in the same sense, -pi..pi. */
double enl_point_angle (EnlPoint a, EnlPoint b);
/* Turned by 90 degrees to the left as seen on the picture. */
EnlPoint enl_point_left (EnlPoint direction);

/* Smallest angle between two directions, 0..pi. */
double enl_angle_between (double a, double b);

double enl_segment_distance (EnlPoint a, EnlPoint b, EnlPoint p);
bool enl_lines_cross (EnlPoint a, EnlPoint b, EnlPoint c, EnlPoint d);
/* Length of the part of a-b inside the rectangle. */
double enl_segment_inside (EnlPoint a, EnlPoint b, EnlRect rect);

EnlPoint enl_curve_at (const EnlPoint point[4], double t);

EnlRect enl_rect_grow (EnlRect rect, double by);
EnlRect enl_rect_union (EnlRect a, EnlRect b);
EnlPoint enl_rect_centre (EnlRect rect);
/* Area common to both, 0 when apart. */
double enl_rect_overlap (EnlRect a, EnlRect b);
/* Distance from a point to the rectangle, 0 inside. */
double enl_rect_distance (EnlRect rect, EnlPoint p);

/* Ink box of a text that would be added to a scene. */
EnlRect enl_text_box (const char *family, EnlPoint anchor, const char *markup, double size,
                      bool bold, double align_x, double align_y);
