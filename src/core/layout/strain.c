#include "core/layout/strain.h"

#include <math.h>
#include <stdlib.h>

#include "core/layout/geometry.h"
#include "core/layout/grid.h"

/* Distances in bond lengths below which two atoms, or an atom and a bond, crowd each other, and
 * below which one hides the other. Two groups side by side on neighbouring ring atoms stand a whole
 * bond length apart, so that 0.8 leaves every usual picture free. */
static const double atoms_crowd = 0.8, atoms_hide = 0.35;
static const double bond_crowds = 0.4, bond_hides = 0.27;

/* What bonds to crowded metals may be longer than 1 for nothing. */
static const double long_bond_play = 1.1;

static const double crowd_cost = 8, hide_cost = 10, cross_cost = 5, stretch_cost = 6;

static double
atom_pair_cost (const EnlSketch *sketch, uint32_t i, uint32_t j)
{
  EnlSpot out = enl_spot_minus (sketch->spot[i], sketch->spot[j]);

  if (fabs (out.x) >= atoms_crowd || fabs (out.y) >= atoms_crowd)
    return 0;
  double distance = enl_spot_length (out);
  if (distance >= atoms_crowd || enl_sketch_bonded (sketch, i, j))
    return 0;
  double depth = 1 - distance / atoms_crowd;
  return crowd_cost * depth * depth + (distance < atoms_hide ? hide_cost : 0);
}

static double
atom_bond_cost (const EnlSketch *sketch, uint32_t i, uint32_t bond)
{
  const EnlSketchBond *b = &sketch->bond[bond];
  EnlSpot p = sketch->spot[i], from = sketch->spot[b->from], to = sketch->spot[b->to];

  if (b->from == i || b->to == i)
    return 0;
  if (p.x < fmin (from.x, to.x) - bond_crowds || p.x > fmax (from.x, to.x) + bond_crowds ||
      p.y < fmin (from.y, to.y) - bond_crowds || p.y > fmax (from.y, to.y) + bond_crowds)
    return 0;
  double distance = enl_spot_to_segment (p, from, to);
  if (distance >= bond_crowds)
    return 0;
  double depth = 1 - distance / bond_crowds;
  return crowd_cost * depth * depth + (distance < bond_hides ? hide_cost : 0);
}

static double
bond_pair_cost (const EnlSketch *sketch, uint32_t b, uint32_t c)
{
  const EnlSketchBond *p = &sketch->bond[b], *q = &sketch->bond[c];

  if (p->from == q->from || p->from == q->to || p->to == q->from || p->to == q->to)
    return 0;
  return enl_segments_cross (sketch->spot[p->from], sketch->spot[p->to], sketch->spot[q->from],
                             sketch->spot[q->to])
             ? cross_cost
             : 0;
}

/* Adds up what atoms and bonds have against those in a grid; every clash is shown to `note` where
 * that is given. */
typedef void (*NoteClash) (uint32_t a, uint32_t b, double cost, void *data);

typedef struct {
  const EnlSketch *sketch;
  const EnlGrid *grid;
  uint32_t *found;
  bool each_once; /* mine and the grid are the same set */
  NoteClash note;
  void *data;
  double cost;
} Tally;

static void
tally_add (Tally *tally, uint32_t a, uint32_t b, double cost)
{
  tally->cost += cost;
  if (tally->note && cost > 0)
    tally->note (a, b, cost, tally->data);
}

static void
tally_atom (Tally *tally, uint32_t i)
{
  const EnlSketch *s = tally->sketch;
  uint32_t n = enl_grid_atoms_near (tally->grid, s->spot[i], tally->found);

  for (uint32_t k = 0; k < n; k++)
    if (tally->found[k] != i && (!tally->each_once || tally->found[k] < i))
      tally_add (tally, MIN (i, tally->found[k]), MAX (i, tally->found[k]),
                 atom_pair_cost (s, i, tally->found[k]));
  n = enl_grid_bonds_near (tally->grid, s->spot[i], tally->found);
  for (uint32_t k = 0; k < n; k++)
    tally_add (tally, i, s->bond[tally->found[k]].from, atom_bond_cost (s, i, tally->found[k]));
}

static void
tally_bond (Tally *tally, uint32_t b)
{
  const EnlSketch *s = tally->sketch;
  uint32_t n = enl_grid_bonds_near (tally->grid, enl_bond_middle (s, b), tally->found);

  for (uint32_t k = 0; k < n; k++) {
    uint32_t c = tally->found[k];
    if (c != b && (!tally->each_once || c < b))
      tally_add (tally, s->bond[b].from, s->bond[c].from, bond_pair_cost (s, b, c));
  }
}

static double
tally_all (const EnlSketch *sketch, NoteClash note, void *data)
{
  g_autoptr (EnlGrid) grid = enl_grid_new (sketch, NULL);
  g_autofree uint32_t *found = g_new (uint32_t, MAX (sketch->n_atoms, sketch->n_bonds) + 1);
  Tally tally = {.sketch = sketch,
                 .grid = grid,
                 .found = found,
                 .each_once = true,
                 .note = note,
                 .data = data};

  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    tally_atom (&tally, i);
  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    tally_bond (&tally, b);
  return tally.cost;
}

double
enl_strain_crowding (const EnlSketch *sketch)
{
  return tally_all (sketch, NULL, NULL);
}

/* Atoms of the grid's side against bonds of the inner side, which are not in the grid. */
static double
outer_atoms_against_inner_bonds (const EnlSketch *sketch, const bool *inside, const EnlGrid *outer,
                                 uint32_t *found)
{
  double cost = 0;

  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    if (!inside[sketch->bond[b].from] && !inside[sketch->bond[b].to])
      continue;
    uint32_t n = enl_grid_atoms_near (outer, enl_bond_middle (sketch, b), found);
    for (uint32_t k = 0; k < n; k++)
      cost += atom_bond_cost (sketch, found[k], b);
  }
  return cost;
}

double
enl_strain_between (const EnlSketch *sketch, const bool *inside)
{
  g_autofree bool *outside = g_new (bool, sketch->n_atoms + 1);
  g_autofree uint32_t *found = g_new (uint32_t, MAX (sketch->n_atoms, sketch->n_bonds) + 1);

  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    outside[i] = !inside[i];
  g_autoptr (EnlGrid) grid = enl_grid_new (sketch, outside);
  Tally tally = {.sketch = sketch, .grid = grid, .found = found};
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    if (inside[i])
      tally_atom (&tally, i);
  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    if (inside[sketch->bond[b].from] || inside[sketch->bond[b].to])
      tally_bond (&tally, b);
  return tally.cost + outer_atoms_against_inner_bonds (sketch, inside, grid, found);
}

double
enl_strain_stretch (const EnlSketch *sketch)
{
  double cost = 0;

  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    const EnlSketchBond *bond = &sketch->bond[b];
    double off = enl_spot_distance (sketch->spot[bond->from], sketch->spot[bond->to]) - 1;
    if (off > 0 && off < long_bond_play && enl_sketch_bond_may_be_long (sketch, b))
      continue;
    cost += stretch_cost * off * off;
  }
  return cost;
}

static void
add_clash (uint32_t a, uint32_t b, double cost, void *data)
{
  EnlClash clash = {a, b, cost};
  g_array_append_val ((GArray *)data, clash);
}

/* Worst first; equal ones by their atoms, so that the order is the same everywhere. */
static int
compare_clashes (const void *a, const void *b)
{
  const EnlClash *p = a, *q = b;

  if (fabs (p->cost - q->cost) > 1e-6)
    return p->cost > q->cost ? -1 : 1;
  if (p->a != q->a)
    return p->a < q->a ? -1 : 1;
  return (p->b > q->b) - (p->b < q->b);
}

EnlClash *
enl_strain_clashes (const EnlSketch *sketch, uint32_t *n)
{
  GArray *list = g_array_new (FALSE, FALSE, sizeof (EnlClash));

  tally_all (sketch, add_clash, list);
  *n = list->len;
  if (list->len) /* an empty array has no data to sort */
    qsort (list->data, list->len, sizeof (EnlClash), compare_clashes);
  return (EnlClash *)(void *)g_array_free (list, FALSE);
}
