#include "core/layout/relax.h"

#include <math.h>

#include "core/layout/geometry.h"

/* Each wish shifts its atoms a part of the way; 300 rounds settle every picture tried. */
static const uint32_t rounds = 300;
static const double share = 0.25;

/* What is wished for: atoms apart by this, atoms off bonds by that (bond lengths). */
static const double atoms_apart = 0.8, bond_apart = 0.42;

/* Bond angles may open or close so that the distance of the outer atoms changes by this part. */
static const double angle_play = 0.12;

typedef struct {
  EnlSketch *sketch;
  GArray *angle; /* Angle */
} Relaxation;

typedef struct {
  uint32_t a, b;
  double low, high;
} Angle;

static void
shift (Relaxation *r, uint32_t atom, EnlSpot by, double factor)
{
  r->sketch->spot[atom].x += by.x * factor;
  r->sketch->spot[atom].y += by.y * factor;
}

/* Brings the distance of two atoms into [low, high]. */
static void
wish_distance (Relaxation *r, uint32_t a, uint32_t b, double low, double high)
{
  EnlSpot out = enl_spot_minus (r->sketch->spot[b], r->sketch->spot[a]);
  double distance = enl_spot_length (out);

  if (distance >= low && distance <= high)
    return;
  if (distance < 1e-6) { /* no direction: part them along a fixed slant */
    out = (EnlSpot){0.8, 0.6};
    distance = 1;
    low += 1;
  }
  double off = (distance < low ? low - distance : high - distance) / distance;
  shift (r, a, out, -share * off);
  shift (r, b, out, share * off);
}

/* Pushes an atom and a bond apart. */
static void
wish_off_bond (Relaxation *r, uint32_t atom, uint32_t bond)
{
  const EnlSketchBond *b = &r->sketch->bond[bond];
  if (b->from == atom || b->to == atom)
    return;
  EnlSpot p = r->sketch->spot[atom], from = r->sketch->spot[b->from], to = r->sketch->spot[b->to];
  EnlSpot along = enl_spot_minus (to, from), out = enl_spot_minus (p, from);
  double square = enl_spot_dot (along, along);
  double t = square > 1e-9 ? enl_spot_dot (out, along) / square : 0;

  if (t <= 0 || t >= 1)
    return;
  EnlSpot off = {out.x - t * along.x, out.y - t * along.y};
  double distance = enl_spot_length (off);
  if (distance >= bond_apart || distance < 1e-6)
    return;
  double factor = share * (bond_apart - distance) / distance;
  shift (r, atom, off, factor);
  shift (r, b->from, off, -factor * (1 - t));
  shift (r, b->to, off, -factor * t);
}

static void
collect_angles (Relaxation *r)
{
  const EnlSketch *s = r->sketch;

  for (uint32_t i = 0; i < s->n_atoms; i++)
    for (uint32_t k = s->first[i]; k < s->first[i + 1]; k++)
      for (uint32_t l = s->first[i]; l < k; l++) {
        uint32_t a = s->neighbour[k], b = s->neighbour[l];
        double distance = enl_spot_distance (s->spot[a], s->spot[b]);
        Angle angle = {a, b, distance * (1 - angle_play), distance * (1 + angle_play)};
        g_array_append_val (r->angle, angle);
      }
}

static void
relax_once (Relaxation *r, double shortest, double longest)
{
  EnlSketch *s = r->sketch;

  for (uint32_t i = 0; i < s->n_atoms; i++) {
    for (uint32_t j = 0; j < i; j++)
      if (fabs (s->spot[i].x - s->spot[j].x) < atoms_apart &&
          fabs (s->spot[i].y - s->spot[j].y) < atoms_apart && !enl_sketch_bonded (s, i, j))
        wish_distance (r, i, j, atoms_apart, INFINITY);
    for (uint32_t b = 0; b < s->n_bonds; b++)
      wish_off_bond (r, i, b);
  }
  for (guint k = 0; k < r->angle->len; k++) {
    const Angle *angle = &g_array_index (r->angle, Angle, k);
    wish_distance (r, angle->a, angle->b, angle->low, angle->high);
  }
  for (uint32_t b = 0; b < s->n_bonds; b++)
    wish_distance (r, s->bond[b].from, s->bond[b].to, shortest, longest);
}

void
enl_relax (EnlSketch *sketch, double shortest, double longest, bool stiff)
{
  Relaxation r = {sketch, g_array_new (FALSE, FALSE, sizeof (Angle))};

  if (stiff)
    collect_angles (&r);
  for (uint32_t k = 0; k < rounds; k++)
    relax_once (&r, shortest, longest);
  g_array_unref (r.angle);
}
