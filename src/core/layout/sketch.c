#include "core/layout/sketch.h"

#include <stdlib.h>

static int
compare_bonds (const void *a, const void *b)
{
  const EnlSketchBond *p = a, *q = b;

  if (p->from != q->from)
    return p->from < q->from ? -1 : 1;
  return (p->to > q->to) - (p->to < q->to);
}

/* Fills the atoms in rank order and place[source] = index in the sketch. */
static void
take_atoms (EnlSketch *sketch, const EnlMolecule *mol, const uint32_t *rank, const bool *keep,
            uint32_t *place)
{
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree uint32_t *at_rank = g_new (uint32_t, n + 1);

  for (uint32_t i = 0; i < n; i++)
    at_rank[rank[i]] = i;
  for (uint32_t r = 0; r < n; r++) {
    uint32_t source = at_rank[r];
    const EnlAtom *atom = enl_molecule_atom (mol, source);

    place[source] = ENL_NONE;
    if (!keep[source])
      continue;
    place[source] = sketch->n_atoms;
    sketch->atom[sketch->n_atoms++] = (EnlSketchAtom){
        .source = source,
        .element = atom->element,
        .charge = atom->charge,
        .hydrogens = atom->hydrogens,
    };
  }
}

/* The sides are told for the kept neighbours; a side given by a left-out hydrogen is turned over
 * to the other neighbour, or dropped where there is none. */
static void
take_side_reference (const EnlMolecule *mol, uint32_t atom, uint32_t bond, const uint32_t *place,
                     uint32_t *reference, EnlSide *side)
{
  if (*side == ENL_SIDE_NONE || *reference == ENL_NONE)
    return;
  if (place[*reference] != ENL_NONE) {
    *reference = place[*reference];
    return;
  }
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (enl_molecule_bond_at (mol, atom, k) == bond || place[other] == ENL_NONE)
      continue;
    *reference = place[other];
    *side = *side == ENL_SIDE_SAME ? ENL_SIDE_OPPOSITE : ENL_SIDE_SAME;
    return;
  }
  *side = ENL_SIDE_NONE;
}

static void
take_bonds (EnlSketch *sketch, const EnlMolecule *mol, const uint32_t *place)
{
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    const EnlBond *bond = enl_molecule_bond (mol, b);
    uint32_t from = place[bond->from], to = place[bond->to];
    EnlSketchBond made = {.from = from,
                          .to = to,
                          .order = bond->order,
                          .block = ENL_NONE,
                          .side = bond->side,
                          .side_from = bond->side_from,
                          .side_to = bond->side_to};

    if (from == ENL_NONE || to == ENL_NONE)
      continue;
    take_side_reference (mol, bond->from, b, place, &made.side_from, &made.side);
    take_side_reference (mol, bond->to, b, place, &made.side_to, &made.side);
    if (from > to) {
      made.from = to, made.to = from;
      uint32_t swap = made.side_from;
      made.side_from = made.side_to, made.side_to = swap;
    }
    sketch->bond[sketch->n_bonds++] = made;
  }
  qsort (sketch->bond, sketch->n_bonds, sizeof *sketch->bond, compare_bonds);
}

static void
build_adjacency (EnlSketch *sketch)
{
  g_autofree uint32_t *fill = g_new0 (uint32_t, sketch->n_atoms + 1);

  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    sketch->first[sketch->bond[b].from + 1]++;
    sketch->first[sketch->bond[b].to + 1]++;
  }
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    sketch->first[i + 1] += sketch->first[i];
  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    uint32_t end[2] = {sketch->bond[b].from, sketch->bond[b].to};
    for (int k = 0; k < 2; k++) {
      uint32_t at = sketch->first[end[k]] + fill[end[k]]++;
      sketch->neighbour[at] = end[1 - k];
      sketch->via[at] = b;
    }
  }
}

static EnlSketch *
sketch_allocate (uint32_t n, uint32_t m)
{
  EnlSketch *sketch = g_new0 (EnlSketch, 1);

  sketch->atom = g_new0 (EnlSketchAtom, n + 1);
  sketch->bond = g_new0 (EnlSketchBond, m + 1);
  sketch->spot = g_new0 (EnlSpot, n + 1);
  sketch->first = g_new0 (uint32_t, n + 2);
  sketch->neighbour = g_new0 (uint32_t, 2 * m + 1);
  sketch->via = g_new0 (uint32_t, 2 * m + 1);
  return sketch;
}

EnlSketch *
enl_sketch_new (const EnlMolecule *mol, const uint32_t *rank, const bool *keep)
{
  uint32_t n = enl_molecule_atoms (mol), m = enl_molecule_bonds (mol);
  EnlSketch *sketch = sketch_allocate (n, m);
  g_autofree uint32_t *place = g_new (uint32_t, n + 1);

  take_atoms (sketch, mol, rank, keep, place);
  take_bonds (sketch, mol, place);
  build_adjacency (sketch);
  return sketch;
}

EnlSketch *
enl_sketch_part (const EnlSketch *whole, const bool *keep)
{
  EnlSketch *part = sketch_allocate (whole->n_atoms, whole->n_bonds);
  g_autofree uint32_t *place = g_new (uint32_t, whole->n_atoms + 1);

  for (uint32_t i = 0; i < whole->n_atoms; i++) {
    place[i] = ENL_NONE;
    if (!keep[i])
      continue;
    place[i] = part->n_atoms;
    part->spot[part->n_atoms] = whole->spot[i];
    part->atom[part->n_atoms] = whole->atom[i];
    part->atom[part->n_atoms++].source = i;
  }
  for (uint32_t b = 0; b < whole->n_bonds; b++) {
    EnlSketchBond bond = whole->bond[b];
    if (!keep[bond.from] || !keep[bond.to])
      continue;
    bond.from = place[bond.from], bond.to = place[bond.to];
    if (bond.side != ENL_SIDE_NONE) {
      bond.side_from = place[bond.side_from], bond.side_to = place[bond.side_to];
      if (bond.side_from == ENL_NONE || bond.side_to == ENL_NONE)
        bond.side = ENL_SIDE_NONE;
    }
    part->bond[part->n_bonds++] = bond;
  }
  build_adjacency (part);
  return part;
}

void
enl_sketch_free (EnlSketch *sketch)
{
  if (!sketch)
    return;
  g_free (sketch->atom);
  g_free (sketch->bond);
  g_free (sketch->spot);
  g_free (sketch->first);
  g_free (sketch->neighbour);
  g_free (sketch->via);
  g_free (sketch);
}

uint32_t
enl_sketch_degree (const EnlSketch *sketch, uint32_t atom)
{
  return sketch->first[atom + 1] - sketch->first[atom];
}

uint32_t
enl_sketch_other_end (const EnlSketch *sketch, uint32_t bond, uint32_t atom)
{
  const EnlSketchBond *b = &sketch->bond[bond];
  return b->from == atom ? b->to : b->from;
}

bool
enl_sketch_bonded (const EnlSketch *sketch, uint32_t a, uint32_t b)
{
  for (uint32_t k = sketch->first[a]; k < sketch->first[a + 1]; k++)
    if (sketch->neighbour[k] == b)
      return true;
  return false;
}

/* Metals are what is no noble gas, no non-metal and no metalloid (common practice). */
static bool
is_metal (uint8_t element)
{
  static const uint8_t other[] = {0,  1,  2,  5,  6,  7,  8,  9,  10, 14, 15, 16, 17,
                                  18, 32, 33, 34, 35, 36, 51, 52, 53, 54, 85, 86};

  for (size_t k = 0; k < G_N_ELEMENTS (other); k++)
    if (other[k] == element)
      return false;
  return true;
}

bool
enl_sketch_bond_may_be_long (const EnlSketch *sketch, uint32_t bond)
{
  const EnlSketchBond *b = &sketch->bond[bond];

  return (is_metal (sketch->atom[b->from].element) && enl_sketch_degree (sketch, b->from) > 4) ||
         (is_metal (sketch->atom[b->to].element) && enl_sketch_degree (sketch, b->to) > 4);
}

/* Atoms of the smallest ring through a bond, 0 when there is none; `depth` and `queue` are room for
 * all atoms. */
static uint32_t
smallest_ring_through (const EnlSketch *s, uint32_t bond, uint32_t *depth, uint32_t *queue)
{
  uint32_t n = 0;

  for (uint32_t i = 0; i < s->n_atoms; i++)
    depth[i] = 0;
  depth[s->bond[bond].from] = 1;
  queue[n++] = s->bond[bond].from;
  for (uint32_t done = 0; done < n; done++)
    for (uint32_t k = s->first[queue[done]]; k < s->first[queue[done] + 1]; k++) {
      uint32_t other = s->neighbour[k];
      if (s->via[k] == bond || depth[other])
        continue;
      depth[other] = depth[queue[done]] + 1;
      if (other == s->bond[bond].to)
        return depth[other];
      queue[n++] = other;
    }
  return 0;
}

uint32_t
enl_sketch_widest_ring (const EnlSketch *sketch)
{
  g_autofree uint32_t *depth = g_new (uint32_t, sketch->n_atoms + 1);
  g_autofree uint32_t *queue = g_new (uint32_t, sketch->n_atoms + 1);
  uint32_t widest = 0;

  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    widest = MAX (widest, smallest_ring_through (sketch, b, depth, queue));
  return widest;
}

/* Twice the signed area of the triangle a, b, c: its sign tells on which side of ab c lies. */
static double
turn (EnlSpot a, EnlSpot b, EnlSpot c)
{
  return (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);
}

bool
enl_sketch_side_right (const EnlSketch *sketch, uint32_t bond)
{
  const EnlSketchBond *b = &sketch->bond[bond];

  if (b->side == ENL_SIDE_NONE)
    return true;
  EnlSpot from = sketch->spot[b->from], to = sketch->spot[b->to];
  double product =
      turn (from, to, sketch->spot[b->side_from]) * turn (from, to, sketch->spot[b->side_to]);
  return b->side == ENL_SIDE_SAME ? product > 0 : product < 0;
}

bool
enl_sketch_sides_right (const EnlSketch *sketch)
{
  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    if (!enl_sketch_side_right (sketch, b))
      return false;
  return true;
}
