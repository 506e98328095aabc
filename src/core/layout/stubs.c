#include "core/layout/stubs.h"

#include <math.h>

#include "core/layout/geometry.h"

/* Directions are tried in steps of 10 degrees, after the even spread over the widest gap. */
#define STEPS 36

/* Neighbouring bonds nearer than this (radians) start to cost; 100 degrees leaves the outer angles
 * of fused rings free. */
static const double wide_enough = 100 * G_PI / 180;

/* Room the end and the bond should have; the first is more than the radius of a six-ring, so that
 * nothing points into one. */
static const double end_apart = 1.15, bond_apart = 0.45, end_off_bond = 0.5;

typedef struct {
  EnlSketch *part;
  const bool *core;
  uint32_t centre;
  double taken[16];
  uint32_t n_taken;
} Seat;

static double
angle_cost (double a, double b)
{
  double off = fabs (remainder (a - b, 2 * G_PI));
  double lack = off < wide_enough ? 1 - off / wide_enough : 0;

  return 4 * lack * lack;
}

static EnlSpot
end_of (const Seat *seat, double angle)
{
  EnlSpot centre = seat->part->spot[seat->centre];
  return (EnlSpot){centre.x + cos (angle), centre.y + sin (angle)};
}

/* Cost of a new bond in this direction against what is placed. */
static double
direction_cost (const Seat *seat, double angle)
{
  const EnlSketch *s = seat->part;
  EnlSpot centre = s->spot[seat->centre], end = end_of (seat, angle);
  double cost = 0;

  for (uint32_t k = 0; k < seat->n_taken; k++)
    cost += angle_cost (angle, seat->taken[k]);
  for (uint32_t i = 0; i < s->n_atoms; i++) {
    if (!seat->core[i] || i == seat->centre)
      continue;
    double lack = 1 - enl_spot_distance (end, s->spot[i]) / end_apart;
    double hidden = 1 - enl_spot_to_segment (s->spot[i], centre, end) / bond_apart;
    cost += (lack > 0 ? 8 * lack * lack : 0) + (hidden > 0 ? 8 * hidden * hidden : 0);
  }
  for (uint32_t b = 0; b < s->n_bonds; b++) {
    const EnlSketchBond *bond = &s->bond[b];
    if (!seat->core[bond->from] || !seat->core[bond->to] || bond->from == seat->centre ||
        bond->to == seat->centre)
      continue;
    double lack =
        1 - enl_spot_to_segment (end, s->spot[bond->from], s->spot[bond->to]) / end_off_bond;
    cost += lack > 0 ? 6 * lack * lack : 0;
    cost += enl_segments_cross (centre, end, s->spot[bond->from], s->spot[bond->to]) ? 5 : 0;
  }
  return cost;
}

static void
choose_one (const Seat *seat, double *made)
{
  const double better = 1e-3;
  double best = direction_cost (seat, made[0]);

  for (uint32_t k = 0; k < STEPS; k++) {
    double angle = made[0] + 2 * G_PI * k / STEPS, cost = direction_cost (seat, angle);
    if (cost < best - better)
      best = cost, made[0] = angle;
  }
}

static void
choose_two (const Seat *seat, double *made)
{
  const double better = 1e-3;
  double single[STEPS], start = made[0];
  double best = direction_cost (seat, made[0]) + direction_cost (seat, made[1]) +
                angle_cost (made[0], made[1]);

  for (uint32_t k = 0; k < STEPS; k++)
    single[k] = direction_cost (seat, start + 2 * G_PI * k / STEPS);
  for (uint32_t k = 0; k < STEPS; k++)
    for (uint32_t l = k + 1; l < STEPS; l++) {
      double a = start + 2 * G_PI * k / STEPS, b = start + 2 * G_PI * l / STEPS;
      double cost = single[k] + single[l] + angle_cost (a, b);
      if (cost < best - better)
        best = cost, made[0] = a, made[1] = b;
    }
}

static void
seat_neighbours (EnlSketch *part, const bool *core, uint32_t centre)
{
  Seat seat = {.part = part, .core = core, .centre = centre};
  uint32_t hung[16], n = 0;
  double sorted[16], made[16];

  for (uint32_t k = part->first[centre]; k < part->first[centre + 1]; k++) {
    uint32_t other = part->neighbour[k];
    EnlSpot out = enl_spot_minus (part->spot[other], part->spot[centre]);
    if (!core[other] && n < G_N_ELEMENTS (hung))
      hung[n++] = other;
    else if (core[other] && seat.n_taken < G_N_ELEMENTS (seat.taken))
      seat.taken[seat.n_taken++] = atan2 (out.y, out.x);
  }
  if (n == 0)
    return;
  for (uint32_t k = 0; k < seat.n_taken; k++)
    sorted[k] = seat.taken[k];
  enl_spread_directions (sorted, seat.n_taken, made, n);
  if (n == 1)
    choose_one (&seat, made);
  else if (n == 2)
    choose_two (&seat, made);
  for (uint32_t k = 0; k < n; k++)
    part->spot[hung[k]] = end_of (&seat, made[k]);
}

void
enl_stubs_place (EnlSketch *part, const bool *core)
{
  for (uint32_t i = 0; i < part->n_atoms; i++)
    if (core[i])
      seat_neighbours (part, core, i);
}
