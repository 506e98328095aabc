/* Plane geometry of pictures. */
#pragma once

#include "core/layout/sketch.h"

static inline EnlSpot
enl_spot_minus (EnlSpot a, EnlSpot b)
{
  return (EnlSpot){a.x - b.x, a.y - b.y};
}

static inline EnlSpot
enl_spot_plus (EnlSpot a, EnlSpot b)
{
  return (EnlSpot){a.x + b.x, a.y + b.y};
}

static inline double
enl_spot_dot (EnlSpot a, EnlSpot b)
{
  return a.x * b.x + a.y * b.y;
}

/* Sign of the turn from a to b: positive anticlockwise. */
static inline double
enl_spot_cross (EnlSpot a, EnlSpot b)
{
  return a.x * b.y - a.y * b.x;
}

double enl_spot_length (EnlSpot a);
double enl_spot_distance (EnlSpot a, EnlSpot b);
double enl_spot_to_segment (EnlSpot p, EnlSpot a, EnlSpot b);

/* True when the open segments ab and cd cross in one point. */
bool enl_segments_cross (EnlSpot a, EnlSpot b, EnlSpot c, EnlSpot d);

EnlSpot enl_spot_turned (EnlSpot p, EnlSpot centre, double angle);
/* Mirror image of p in the line through a and b (a and b differ). */
EnlSpot enl_spot_mirrored (EnlSpot p, EnlSpot a, EnlSpot b);

/* The widest gap between `n` directions (radians, any order, overwritten by sorting): its first
 * edge, going anticlockwise, and width. With no direction the gap is the full turn from 0. */
void enl_widest_gap (double *angle, uint32_t n, double *start, double *width);

/* Writes `n` directions for new neighbours of an atom that has neighbours in `taken` directions,
 * spread over the widest gap; one new beside one taken makes the usual 120 degrees. */
void enl_spread_directions (double *taken, uint32_t n_taken, double *made, uint32_t n);
