#include "core/layout/repair.h"

#include <math.h>
#include <string.h>

#include "core/layout/blocks.h"
#include "core/layout/geometry.h"
#include "core/layout/relax.h"
#include "core/layout/strain.h"

/* A picture with less crowding than this is left alone. */
static const double clear_enough = 0.02;

/* A picture whose bonds are this even is not evened out further. */
static const double even_enough = 0.1;

/* What counts as a gain; turning a branch out of its ideal angle costs this per 30 degrees. */
static const double worth_it = 0.02, bend_cost = 0.25;

/* Clashes looked at per round, bonds tried per clash, rounds, and atoms weighed in all trials
 * together (about two seconds). */
static const uint32_t max_clashes = 4, max_bonds = 14, max_rounds = 200;

/* Rounds without gain before giving up, and rounds in which a moved bond rests. */
static const uint32_t max_vain = 12, barred_rounds = 6;

static const double max_work = 1e7;

static const double turns[] = {20, -20, 40, -40, 60, -60, 90, -90};

typedef struct {
  EnlSketch *sketch;
  double work;
  EnlSpot *saved; /* spots before a trial */
  EnlSpot *best;  /* spots after the best trial of the round */
  double gain;
  bool *inside;
  uint32_t bond;   /* under trial */
  uint32_t chosen; /* bond of the best trial */
  uint32_t round;
  uint32_t *barred; /* round until which a bond is not tried again */
} Repair;

/* ---- sides ---- */

void
enl_repair_sides (EnlSketch *sketch)
{
  g_autofree bool *inside = g_new0 (bool, sketch->n_atoms + 1);

  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    const EnlSketchBond *bond = &sketch->bond[b];
    if (bond->block != ENL_NONE || enl_sketch_side_right (sketch, b))
      continue;
    EnlSpot from = sketch->spot[bond->from], to = sketch->spot[bond->to];
    enl_branch_atoms (sketch, bond->to, bond->from, inside);
    for (uint32_t i = 0; i < sketch->n_atoms; i++)
      if (inside[i])
        sketch->spot[i] = enl_spot_mirrored (sketch->spot[i], from, to);
  }
}

/* ---- trials ---- */

static void
restore (Repair *r)
{
  memcpy (r->sketch->spot, r->saved, r->sketch->n_atoms * sizeof (EnlSpot));
}

/* Compares the moved picture with the saved one; `before` is the strain between the moved part and
 * the rest then. Puts the saved one back. */
static void
judge (Repair *r, double before, double malus)
{
  double after = enl_strain_between (r->sketch, r->inside);
  r->work += r->sketch->n_atoms;
  double gain = before - after - malus;

  if (gain > r->gain + 1e-9 && enl_sketch_sides_right (r->sketch)) {
    r->gain = gain;
    r->chosen = r->bond;
    memcpy (r->best, r->sketch->spot, r->sketch->n_atoms * sizeof (EnlSpot));
  }
  restore (r);
}

static void
mark_branch (Repair *r, uint32_t start, uint32_t barrier)
{
  enl_branch_atoms (r->sketch, start, barrier, r->inside);
}

static void
turn_inside (Repair *r, EnlSpot centre, double angle)
{
  for (uint32_t i = 0; i < r->sketch->n_atoms; i++)
    if (r->inside[i])
      r->sketch->spot[i] = enl_spot_turned (r->sketch->spot[i], centre, angle);
}

/* An atom with a straight line through it: bending there would be wrong chemistry. */
static bool
is_straight (const EnlSketch *sketch, uint32_t atom)
{
  uint32_t doubles = 0;

  for (uint32_t k = sketch->first[atom]; k < sketch->first[atom + 1]; k++) {
    uint8_t order = sketch->bond[sketch->via[k]].order;
    doubles += order == 2;
    if (order == 3)
      return true;
  }
  return doubles > 1 && enl_sketch_degree (sketch, atom) == 2;
}

static void
try_mirror (Repair *r, uint32_t near, uint32_t far)
{
  EnlSpot a = r->sketch->spot[near], b = r->sketch->spot[far];

  if (enl_spot_distance (a, b) < 1e-6)
    return;
  mark_branch (r, far, near);
  double before = enl_strain_between (r->sketch, r->inside);
  for (uint32_t i = 0; i < r->sketch->n_atoms; i++)
    if (r->inside[i])
      r->sketch->spot[i] = enl_spot_mirrored (r->sketch->spot[i], a, b);
  judge (r, before, 0);
}

/* Turns what hangs behind `far` about `near`. */
static void
try_turns (Repair *r, uint32_t near, uint32_t far)
{
  if (is_straight (r->sketch, near))
    return;
  mark_branch (r, far, near);
  double before = enl_strain_between (r->sketch, r->inside);
  for (size_t k = 0; k < G_N_ELEMENTS (turns); k++) {
    turn_inside (r, r->sketch->spot[near], turns[k] * G_PI / 180);
    judge (r, before, bend_cost * fabs (turns[k]) / 30);
  }
}

/* Exchanges the directions of two branches of an atom. */
static void
try_exchange (Repair *r, uint32_t centre, uint32_t a, uint32_t b)
{
  EnlSpot middle = r->sketch->spot[centre];
  EnlSpot to_a = enl_spot_minus (r->sketch->spot[a], middle);
  EnlSpot to_b = enl_spot_minus (r->sketch->spot[b], middle);
  double angle = atan2 (enl_spot_cross (to_a, to_b), enl_spot_dot (to_a, to_b));
  g_autofree bool *both = g_new (bool, r->sketch->n_atoms + 1);

  mark_branch (r, a, centre);
  memcpy (both, r->inside, r->sketch->n_atoms);
  mark_branch (r, b, centre);
  for (uint32_t i = 0; i < r->sketch->n_atoms; i++)
    both[i] |= r->inside[i];
  double before = enl_strain_crowding (r->sketch);
  turn_inside (r, middle, -angle);
  mark_branch (r, a, centre);
  turn_inside (r, middle, angle);
  double gain = before - enl_strain_crowding (r->sketch);
  r->work += 2.0 * r->sketch->n_atoms;
  if (gain > r->gain + 1e-9 && enl_sketch_sides_right (r->sketch)) {
    r->gain = gain;
    r->chosen = r->bond;
    memcpy (r->best, r->sketch->spot, r->sketch->n_atoms * sizeof (EnlSpot));
  }
  restore (r);
}

static void
try_exchanges (Repair *r, uint32_t centre)
{
  const EnlSketch *s = r->sketch;

  for (uint32_t k = s->first[centre]; k < s->first[centre + 1]; k++)
    for (uint32_t l = s->first[centre]; l < k; l++)
      if (s->bond[s->via[k]].block == ENL_NONE && s->bond[s->via[l]].block == ENL_NONE)
        try_exchange (r, centre, s->neighbour[k], s->neighbour[l]);
}

/* ---- search ---- */

/* Shortest way from a to b: fills `path` from b back to a; returns its atoms. */
static uint32_t
find_path (const EnlSketch *s, uint32_t a, uint32_t b, uint32_t *path)
{
  g_autofree uint32_t *from = g_new (uint32_t, s->n_atoms + 1);
  g_autofree uint32_t *queue = g_new (uint32_t, s->n_atoms + 1);
  uint32_t n = 0, length = 0;

  for (uint32_t i = 0; i < s->n_atoms; i++)
    from[i] = ENL_NONE;
  from[a] = a;
  queue[n++] = a;
  for (uint32_t done = 0; done < n && from[b] == ENL_NONE; done++)
    for (uint32_t k = s->first[queue[done]]; k < s->first[queue[done] + 1]; k++) {
      uint32_t other = s->neighbour[k];
      if (from[other] != ENL_NONE)
        continue;
      from[other] = queue[done];
      queue[n++] = other;
    }
  for (uint32_t at = b; from[b] != ENL_NONE; at = from[at]) {
    path[length++] = at;
    if (at == a)
      break;
  }
  return length;
}

static void
try_bond (Repair *r, uint32_t a, uint32_t b)
{
  try_mirror (r, a, b);
  try_turns (r, a, b);
  try_turns (r, b, a);
}

/* Tries the bonds at one atom of the path between two clashing atoms: that along the path (`next`
 * is the following atom) and all bonds at its ends, or with `aside` the other ones, which make
 * room.
 */
static void
try_bonds_at (Repair *r, uint32_t atom, uint32_t next, bool at_end, bool aside, uint32_t *tried)
{
  const EnlSketch *s = r->sketch;

  for (uint32_t l = s->first[atom]; l < s->first[atom + 1]; l++) {
    bool main_bond = at_end || s->neighbour[l] == next;
    if (s->bond[s->via[l]].block != ENL_NONE || main_bond == aside || *tried >= max_bonds)
      continue;
    (*tried)++;
    r->bond = s->via[l];
    if (r->barred[r->bond] <= r->round)
      try_bond (r, atom, s->neighbour[l]);
  }
}

static void
try_path (Repair *r, const EnlClash *clash)
{
  EnlSketch *s = r->sketch;
  g_autofree uint32_t *path = g_new (uint32_t, s->n_atoms + 1);
  uint32_t length = find_path (s, clash->a, clash->b, path);

  for (int aside = 0; aside < 2; aside++) {
    uint32_t tried = 0;
    for (uint32_t k = 0; k < length && r->work < max_work; k++) {
      uint32_t next = k + 1 < length ? path[k + 1] : ENL_NONE;
      try_bonds_at (r, path[k], next, k == 0 || k + 1 == length, aside, &tried);
      r->bond = s->via[s->first[path[k]]];
      if (!aside && r->barred[r->bond] <= r->round)
        try_exchanges (r, path[k]);
    }
  }
}

/* One round: the best move for the worst clashes, even when it is a step back, without the bonds
 * moved lately (tabu search: Glover, ORSA J. Comput. 1989, 1, 190). */
static bool
move_once (Repair *r)
{
  uint32_t n_clashes;
  g_autofree EnlClash *clash = enl_strain_clashes (r->sketch, &n_clashes);

  r->gain = -INFINITY;
  memcpy (r->saved, r->sketch->spot, r->sketch->n_atoms * sizeof (EnlSpot));
  for (uint32_t k = 0; k < n_clashes && k < max_clashes; k++)
    try_path (r, &clash[k]);
  if (!isfinite (r->gain))
    return false;
  memcpy (r->sketch->spot, r->best, r->sketch->n_atoms * sizeof (EnlSpot));
  r->barred[r->chosen] = r->round + barred_rounds;
  return true;
}

/* Moves until nothing crowds or nothing has helped for a while; ends with the best picture seen. */
static void
move_branches (Repair *r)
{
  size_t size = r->sketch->n_atoms * sizeof (EnlSpot);
  g_autofree EnlSpot *finest = g_memdup2 (r->sketch->spot, size);
  double least = enl_strain_crowding (r->sketch), bent = 0;
  uint32_t vain = 0;

  for (r->round = 1; r->round < max_rounds && vain < max_vain && r->work < max_work; r->round++) {
    double before = enl_strain_crowding (r->sketch);
    if (least < clear_enough || !move_once (r))
      break;
    double after = enl_strain_crowding (r->sketch);
    bent += fmax (0, before - after - r->gain); /* what turning out of shape has cost */
    vain++;
    if (after + bent >= least - worth_it)
      continue;
    least = after + bent;
    vain = 0;
    memcpy (finest, r->sketch->spot, size);
  }
  memcpy (r->sketch->spot, finest, size);
}

static double
longest_bond (const EnlSketch *s, double *shortest)
{
  double longest = 0;

  *shortest = INFINITY;
  for (uint32_t b = 0; b < s->n_bonds; b++) {
    double length = enl_spot_distance (s->spot[s->bond[b].from], s->spot[s->bond[b].to]);
    longest = fmax (longest, length);
    *shortest = fmin (*shortest, length);
  }
  return longest;
}

/* Small shifts towards bonds between `low` and `high`, kept when they help and keep to that. */
static void
nudge (EnlSketch *sketch, double low, double high)
{
  const double slack = 0.02;
  double before = enl_strain_crowding (sketch) + enl_strain_stretch (sketch);
  g_autofree EnlSpot *saved = g_memdup2 (sketch->spot, sketch->n_atoms * sizeof (EnlSpot));

  enl_relax (sketch, low, high, true);
  double shortest, longest = longest_bond (sketch, &shortest);
  double after = enl_strain_crowding (sketch) + enl_strain_stretch (sketch);
  if (after < before - worth_it && shortest > low - slack && longest < high + slack &&
      enl_sketch_sides_right (sketch))
    return;
  memcpy (sketch->spot, saved, sketch->n_atoms * sizeof (EnlSpot));
}

/* Bonds that were foreshortened or stretched may stay so. */
static void
nudge_apart (EnlSketch *sketch, double play)
{
  double shortest, longest = longest_bond (sketch, &shortest);

  nudge (sketch, fmin (shortest, 1 - play), fmax (longest, 1 + play));
}

void
enl_repair_crowding (EnlSketch *sketch, bool even)
{
  const double plays[] = {0.08, 0.12};
  g_autofree EnlSpot *room = g_new0 (EnlSpot, 2 * sketch->n_atoms + 1);
  g_autofree bool *inside = g_new0 (bool, sketch->n_atoms + 1);
  g_autofree uint32_t *barred = g_new0 (uint32_t, sketch->n_bonds + 1);
  Repair r = {.sketch = sketch,
              .saved = room,
              .best = room + sketch->n_atoms,
              .inside = inside,
              .barred = barred};

  if (enl_strain_crowding (sketch) >= clear_enough)
    move_branches (&r);
  for (size_t k = 0; k < G_N_ELEMENTS (plays); k++)
    if (enl_strain_crowding (sketch) >= clear_enough)
      nudge_apart (sketch, plays[k]);
  if (even && enl_strain_stretch (sketch) > even_enough)
    nudge (sketch, 1 - plays[0], 1 + plays[0]);
}
