#include "core/layout/strain.h"

#include <math.h>
#include <stdlib.h>

#include "core/layout/geometry.h"

/* Distances in bond lengths below which two atoms, or an atom and a bond, crowd each other, and
 * below which one hides the other. Two groups side by side on neighbouring ring atoms stand a whole
 * bond length apart, so that 0.8 leaves every usual picture free. */
static const double atoms_crowd = 0.8, atoms_hide = 0.35;
static const double bond_crowds = 0.4, bond_hides = 0.27;

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

double
enl_strain_crowding (const EnlSketch *sketch)
{
  double cost = 0;

  for (uint32_t i = 0; i < sketch->n_atoms; i++) {
    for (uint32_t j = 0; j < i; j++)
      cost += atom_pair_cost (sketch, i, j);
    for (uint32_t b = 0; b < sketch->n_bonds; b++)
      cost += atom_bond_cost (sketch, i, b);
  }
  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    for (uint32_t c = 0; c < b; c++)
      cost += bond_pair_cost (sketch, b, c);
  return cost;
}

/* Atoms and bonds on one side of a division; a bond across it belongs to both. */
typedef struct {
  uint32_t n_atoms, n_bonds;
  uint32_t *atom, *bond;
} Part;

static void
part_collect (Part *part, const EnlSketch *sketch, const bool *inside, bool which)
{
  *part = (Part){.atom = g_new (uint32_t, sketch->n_atoms + 1),
                 .bond = g_new (uint32_t, sketch->n_bonds + 1)};
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    if (inside[i] == which)
      part->atom[part->n_atoms++] = i;
  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    if (inside[sketch->bond[b].from] == which || inside[sketch->bond[b].to] == which)
      part->bond[part->n_bonds++] = b;
}

static void
part_clear (Part *part)
{
  g_free (part->atom);
  g_free (part->bond);
}

static double
atoms_against_bonds (const EnlSketch *sketch, const Part *atoms, const Part *bonds)
{
  double cost = 0;

  for (uint32_t i = 0; i < atoms->n_atoms; i++)
    for (uint32_t b = 0; b < bonds->n_bonds; b++)
      cost += atom_bond_cost (sketch, atoms->atom[i], bonds->bond[b]);
  return cost;
}

double
enl_strain_between (const EnlSketch *sketch, const bool *inside)
{
  Part in, out;
  double cost;

  part_collect (&in, sketch, inside, true);
  part_collect (&out, sketch, inside, false);
  cost = atoms_against_bonds (sketch, &in, &out) + atoms_against_bonds (sketch, &out, &in);
  for (uint32_t i = 0; i < in.n_atoms; i++)
    for (uint32_t j = 0; j < out.n_atoms; j++)
      cost += atom_pair_cost (sketch, in.atom[i], out.atom[j]);
  for (uint32_t b = 0; b < in.n_bonds; b++)
    for (uint32_t c = 0; c < out.n_bonds; c++)
      cost += bond_pair_cost (sketch, in.bond[b], out.bond[c]);
  part_clear (&in);
  part_clear (&out);
  return cost;
}

double
enl_strain_stretch (const EnlSketch *sketch)
{
  double cost = 0;

  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    double off =
        enl_spot_distance (sketch->spot[sketch->bond[b].from], sketch->spot[sketch->bond[b].to]) -
        1;
    cost += stretch_cost * off * off;
  }
  return cost;
}

static void
add_clash (GArray *list, uint32_t a, uint32_t b, double cost)
{
  EnlClash clash = {a, b, cost};

  if (cost > 0)
    g_array_append_val (list, clash);
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

  for (uint32_t i = 0; i < sketch->n_atoms; i++) {
    for (uint32_t j = 0; j < i; j++)
      add_clash (list, j, i, atom_pair_cost (sketch, i, j));
    for (uint32_t b = 0; b < sketch->n_bonds; b++)
      add_clash (list, i, sketch->bond[b].from, atom_bond_cost (sketch, i, b));
  }
  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    for (uint32_t c = 0; c < b; c++)
      add_clash (list, sketch->bond[b].from, sketch->bond[c].from, bond_pair_cost (sketch, b, c));
  *n = list->len;
  qsort (list->data, list->len, sizeof (EnlClash), compare_clashes);
  return (EnlClash *)(void *)g_array_free (list, FALSE);
}
