#include "core/layout/assemble.h"

#include <math.h>

#include "core/layout/block.h"
#include "core/layout/blocks.h"
#include "core/layout/geometry.h"

typedef struct {
  EnlSketch *sketch;
  const EnlTemplates *templates;
  bool *placed, *block_placed;
  bool *hinted;   /* spot is where a ring block would like this outer neighbour */
  uint32_t *from; /* the atom it was reached from */
  uint32_t *queue, n_queue;
} Assembly;

static void
put (Assembly *a, uint32_t atom, EnlSpot spot, uint32_t from)
{
  a->sketch->spot[atom] = spot;
  a->placed[atom] = true;
  a->from[atom] = from;
  a->queue[a->n_queue++] = atom;
}

/* ---- blocks ---- */

/* Mean direction from core atom `centre` to its outer neighbours in `part` that are placed in the
 * whole. */
static EnlSpot
mean_way (const Assembly *a, const EnlSketch *part, const bool *core, uint32_t centre, bool in_part)
{
  EnlSpot sum = {0, 0};
  const EnlSketch *s = in_part ? part : a->sketch;
  uint32_t self = in_part ? centre : part->atom[centre].source;

  for (uint32_t k = part->first[centre]; k < part->first[centre + 1]; k++) {
    uint32_t other = part->neighbour[k], whole = part->atom[other].source;
    if (core[other] || !a->placed[whole])
      continue;
    sum = enl_spot_plus (sum, enl_spot_minus (s->spot[in_part ? other : whole], s->spot[self]));
  }
  return sum;
}

/* Nearness to what is placed around, for choosing between two places. */
static double
crowd_of (const Assembly *a, EnlSpot spot)
{
  const double sight = 2.5;
  double sum = 0;

  for (uint32_t i = 0; i < a->sketch->n_atoms; i++)
    if (a->placed[i]) {
      EnlSpot out = enl_spot_minus (spot, a->sketch->spot[i]);
      double square = enl_spot_dot (out, out);
      if (square < sight * sight)
        sum += 1 / (0.1 + square);
    }
  return sum;
}

/* Where an atom of the part comes to stand: turned by `angle` about the entry atom, mirrored in the
 * x axis before when `mirror`. */
static EnlSpot
carried (const EnlSketch *part, uint32_t atom, uint32_t entry, EnlSpot target, double angle,
         bool mirror)
{
  EnlSpot out = enl_spot_minus (part->spot[atom], part->spot[entry]);

  out.y = mirror ? -out.y : out.y;
  return enl_spot_plus (target, enl_spot_turned (out, (EnlSpot){0, 0}, angle));
}

static void
carry_block (Assembly *a, const EnlSketch *part, const bool *core, uint32_t entry)
{
  EnlSpot target = a->sketch->spot[part->atom[entry].source];
  EnlSpot have = mean_way (a, part, core, entry, true);
  EnlSpot want = mean_way (a, part, core, entry, false);
  double angle[2], crowd[2] = {0, 0};

  angle[0] = atan2 (want.y, want.x) - atan2 (have.y, have.x);
  angle[1] = atan2 (want.y, want.x) - atan2 (-have.y, have.x);
  for (int m = 0; m < 2; m++)
    for (uint32_t i = 0; i < part->n_atoms; i++)
      if (core[i] && i != entry)
        crowd[m] += crowd_of (a, carried (part, i, entry, target, angle[m], m == 1));
  int mirror = crowd[1] < crowd[0] - 1e-6;
  for (uint32_t i = 0; i < part->n_atoms; i++) {
    uint32_t whole = part->atom[i].source;
    EnlSpot spot = carried (part, i, entry, target, angle[mirror], mirror);
    if (a->placed[whole])
      continue;
    if (core[i]) {
      put (a, whole, spot, part->atom[entry].source);
    } else {
      a->sketch->spot[whole] = spot;
      a->hinted[whole] = true;
    }
  }
}

/* Draws a block that has one placed atom `entry` (of the whole), or none. */
static void
place_block (Assembly *a, uint32_t block, uint32_t entry)
{
  uint32_t n = a->sketch->n_atoms, at_entry = 0;
  g_autofree bool *in = g_new (bool, n + 1);
  g_autofree bool *keep = g_new (bool, n + 1);
  g_autofree bool *core = g_new0 (bool, n + 1);

  enl_block_atoms (a->sketch, block, in);
  for (uint32_t i = 0; i < n; i++)
    keep[i] = in[i];
  for (uint32_t b = 0; b < a->sketch->n_bonds; b++) {
    uint32_t from = a->sketch->bond[b].from, to = a->sketch->bond[b].to;
    keep[from] |= in[to];
    keep[to] |= in[from];
  }
  g_autoptr (EnlSketch) part = enl_sketch_part (a->sketch, keep);
  for (uint32_t i = 0; i < part->n_atoms; i++) {
    core[i] = in[part->atom[i].source];
    at_entry = part->atom[i].source == entry ? i : at_entry;
  }
  enl_block_draw (part, core, false, a->templates);
  a->block_placed[block] = true;
  if (entry == ENL_NONE) {
    for (uint32_t i = 0; i < part->n_atoms; i++)
      if (core[i]) {
        entry = part->atom[i].source, at_entry = i;
        break;
      }
    put (a, entry, (EnlSpot){0, 0}, ENL_NONE);
  }
  carry_block (a, part, core, at_entry);
}

/* ---- chains ---- */

/* The middle of a three-atom straight piece. */
static bool
is_straight (const EnlSketch *s, uint32_t atom)
{
  uint32_t doubles = 0;

  for (uint32_t k = s->first[atom]; k < s->first[atom + 1]; k++) {
    if (s->bond[s->via[k]].order == 3)
      return true;
    doubles += s->bond[s->via[k]].order == 2;
  }
  return doubles > 1 && enl_sketch_degree (s, atom) == 2;
}

/* True when a bond from `atom` along `way` goes on in a zigzag from the two bonds before. */
static bool
goes_on_in_zigzag (const Assembly *a, uint32_t atom, EnlSpot way)
{
  const EnlSketch *s = a->sketch;
  uint32_t back = a->from[atom], more = back == ENL_NONE ? ENL_NONE : a->from[back];

  if (more == ENL_NONE)
    return false;
  EnlSpot first = enl_spot_minus (s->spot[back], s->spot[more]);
  EnlSpot second = enl_spot_minus (s->spot[atom], s->spot[back]);
  return enl_spot_cross (first, second) * enl_spot_cross (second, way) < 0;
}

/* How bad it is to go on from `atom` at this angle. */
static double
bend_cost (const Assembly *a, uint32_t atom, double angle)
{
  const double zigzag_bonus = 1.5;
  EnlSpot way = {cos (angle), sin (angle)};

  return crowd_of (a, enl_spot_plus (a->sketch->spot[atom], way)) -
         (goes_on_in_zigzag (a, atom, way) ? zigzag_bonus : 0);
}

/* One new neighbour beside one taken: straight on at sp atoms, else the side with more room, and
 * a zigzag where there is room on both. */
static double
choose_bend (const Assembly *a, uint32_t atom, double taken)
{
  double left = taken + 2 * G_PI / 3, right = taken - 2 * G_PI / 3;

  if (is_straight (a->sketch, atom))
    return taken + G_PI;
  return bend_cost (a, atom, right) < bend_cost (a, atom, left) - 1e-6 ? right : left;
}

/* Two or more new neighbours: the largest branch gets the direction that continues the chain best.
 */
static void
order_branches (const Assembly *a, uint32_t atom, uint32_t *list, const double *made, uint32_t n)
{
  g_autofree bool *in = g_new (bool, a->sketch->n_atoms + 1);
  uint32_t largest = 0, best = 0, size = 0;

  for (uint32_t k = 0; k < n; k++) {
    uint32_t branch = enl_branch_atoms (a->sketch, list[k], atom, in);
    if (branch > size)
      size = branch, largest = k;
    if (bend_cost (a, atom, made[k]) < bend_cost (a, atom, made[best]) - 1e-6)
      best = k;
  }
  uint32_t swap = list[best];
  list[best] = list[largest];
  list[largest] = swap;
}

/* The neighbours of `atom` that a chain bond leads to and that are not placed. */
static uint32_t
list_new (const Assembly *a, uint32_t atom, uint32_t *list, double *taken, uint32_t *n_taken)
{
  const EnlSketch *s = a->sketch;
  uint32_t n = 0;

  *n_taken = 0;
  for (uint32_t k = s->first[atom]; k < s->first[atom + 1]; k++) {
    uint32_t other = s->neighbour[k];
    EnlSpot out = enl_spot_minus (s->spot[other], s->spot[atom]);
    if (a->placed[other])
      taken[(*n_taken)++] = atan2 (out.y, out.x);
    else if (s->bond[s->via[k]].block == ENL_NONE)
      list[n++] = other;
  }
  return n;
}

static void
place_chain_neighbours (Assembly *a, uint32_t atom)
{
  EnlSketch *s = a->sketch;
  uint32_t degree = enl_sketch_degree (s, atom), n_taken;
  g_autofree uint32_t *list = g_new (uint32_t, degree + 1);
  g_autofree double *taken = g_new (double, 2 * degree + 2);
  double *made = taken + degree + 1;
  uint32_t n = list_new (a, atom, list, taken, &n_taken);

  if (n == 0)
    return;
  double only = n_taken ? taken[0] : 0;
  enl_spread_directions (taken, n_taken, made, n);
  if (n == 1 && n_taken == 1)
    made[0] = choose_bend (a, atom, only);
  else if (n > 1 && n_taken == 1)
    order_branches (a, atom, list, made, n);
  for (uint32_t k = 0; k < n; k++) {
    EnlSpot spot = {s->spot[atom].x + cos (made[k]), s->spot[atom].y + sin (made[k])};
    put (a, list[k], a->hinted[list[k]] ? s->spot[list[k]] : spot, atom);
  }
}

static void
place_blocks_at (Assembly *a, uint32_t atom)
{
  const EnlSketch *s = a->sketch;

  for (uint32_t k = s->first[atom]; k < s->first[atom + 1]; k++) {
    uint32_t block = s->bond[s->via[k]].block;
    if (block != ENL_NONE && !a->block_placed[block])
      place_block (a, block, atom);
  }
}

/* The atom from which the farthest other is nearest. */
static uint32_t
middle_atom (const EnlSketch *s)
{
  g_autofree uint32_t *depth = g_new (uint32_t, s->n_atoms + 1);
  g_autofree uint32_t *queue = g_new (uint32_t, s->n_atoms + 1);
  uint32_t best = 0, best_depth = ENL_NONE;

  for (uint32_t start = 0; start < s->n_atoms; start++) {
    uint32_t n = 0;
    for (uint32_t i = 0; i < s->n_atoms; i++)
      depth[i] = ENL_NONE;
    depth[start] = 0;
    queue[n++] = start;
    for (uint32_t done = 0; done < n; done++)
      for (uint32_t k = s->first[queue[done]]; k < s->first[queue[done] + 1]; k++)
        if (depth[s->neighbour[k]] == ENL_NONE) {
          depth[s->neighbour[k]] = depth[queue[done]] + 1;
          queue[n++] = s->neighbour[k];
        }
    uint32_t far = depth[queue[n - 1]];
    if (far < best_depth)
      best = start, best_depth = far;
  }
  return best;
}

/* A block that holds the middle, or the one that is met first from there. */
static void
start_somewhere (Assembly *a)
{
  uint32_t middle = middle_atom (a->sketch);

  for (uint32_t k = a->sketch->first[middle]; k < a->sketch->first[middle + 1]; k++) {
    uint32_t block = a->sketch->bond[a->sketch->via[k]].block;
    if (block != ENL_NONE) {
      place_block (a, block, ENL_NONE);
      return;
    }
  }
  put (a, middle, (EnlSpot){0, 0}, ENL_NONE);
}

void
enl_assemble (EnlSketch *sketch, const EnlTemplates *templates)
{
  uint32_t n = sketch->n_atoms + 1;
  g_autofree bool *flag = g_new0 (bool, 2 * n + sketch->n_blocks);
  g_autofree uint32_t *number = g_new0 (uint32_t, 2 * n);
  Assembly a = {.sketch = sketch,
                .templates = templates,
                .placed = flag,
                .hinted = flag + n,
                .block_placed = flag + 2 * n,
                .from = number,
                .queue = number + n};

  start_somewhere (&a);
  for (uint32_t done = 0; done < a.n_queue; done++) {
    place_chain_neighbours (&a, a.queue[done]);
    place_blocks_at (&a, a.queue[done]);
  }
  g_assert (a.n_queue == sketch->n_atoms);
}
