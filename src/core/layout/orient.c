#include "core/layout/orient.h"

#include <math.h>

#include "core/layout/geometry.h"

/* Weights of the wishes; lying flat counts most when a picture is much longer than high. */
static const double flat_weight = 2, raster_weight = 1.5, upright_weight = 0.1;

/* A bond this near to the 30 degree raster (radians) counts as on it. */
static const double on_raster = 3 * G_PI / 180;

static double
bond_angle (const EnlSketch *sketch, uint32_t bond)
{
  const EnlSketchBond *b = &sketch->bond[bond];
  EnlSpot way = enl_spot_minus (sketch->spot[b->to], sketch->spot[b->from]);
  return atan2 (way.y, way.x);
}

/* How well the bonds stand on the raster after a turn; vertical and 30 degrees from it are alike,
 * so that six-rings come out with a vertical pair of bonds or a horizontal one. */
static double
raster_share (const EnlSketch *sketch, double turn)
{
  double hits = 0;

  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    hits += fabs (remainder (bond_angle (sketch, b) + turn, G_PI / 6)) < on_raster;
  return sketch->n_bonds ? hits / sketch->n_bonds : 0;
}

/* (width - height) / (width + height) after a turn. */
static double
flatness (const EnlSketch *sketch, double turn)
{
  double low_x = INFINITY, high_x = -INFINITY, low_y = INFINITY, high_y = -INFINITY;

  for (uint32_t i = 0; i < sketch->n_atoms; i++) {
    EnlSpot p = enl_spot_turned (sketch->spot[i], (EnlSpot){0, 0}, turn);
    low_x = fmin (low_x, p.x), high_x = fmax (high_x, p.x);
    low_y = fmin (low_y, p.y), high_y = fmax (high_y, p.y);
  }
  double width = high_x - low_x, height = high_y - low_y;
  return width + height > 0 ? (width - height) / (width + height) : 0;
}

/* Terminal double bonds upwards, triple bonds and long bonds do not matter. */
static double
uprightness (const EnlSketch *sketch, double turn)
{
  double sum = 0;

  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    const EnlSketchBond *bond = &sketch->bond[b];
    bool from_end = enl_sketch_degree (sketch, bond->from) == 1;
    bool to_end = enl_sketch_degree (sketch, bond->to) == 1;
    if (bond->order == 2 && from_end != to_end)
      sum += sin (bond_angle (sketch, b) + turn) * (to_end ? 1 : -1);
  }
  return sum;
}

void
enl_orient (EnlSketch *sketch)
{
  const double better = 1e-6;
  double best = -INFINITY, best_turn = 0;

  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    for (int k = 0; k < 12; k++) {
      double turn = k * G_PI / 6 - bond_angle (sketch, b);
      double score = flat_weight * flatness (sketch, turn) +
                     raster_weight * raster_share (sketch, turn) +
                     upright_weight * uprightness (sketch, turn);
      if (score > best + better)
        best = score, best_turn = turn;
    }
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    sketch->spot[i] = enl_spot_turned (sketch->spot[i], (EnlSpot){0, 0}, best_turn);
}
