#include "core/molecule/graph.h"

#include <string.h>

#define MIN_TRANS_RING 8 /* smallest ring that holds a trans double bond at room temperature */

void
enl_graph_free (EnlGraph *graph)
{
  if (!graph)
    return;
  g_free (graph->first);
  g_free (graph->target);
  g_free (graph->weight);
  g_free (graph->colour);
  g_free (graph->unit_at);
  g_free (graph->bond_at);
  g_free (graph->unit);
  g_free (graph);
}

/* What can be seen at the atom itself. Few neighbours come first, so that canonical writing starts
 * at the end of a chain; hydrogen atoms come last. */
static uint64_t
vertex_colour (const EnlMolecule *mol, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (mol, atom);
  uint64_t element = a->element == 1 ? 127 : a->element;
  uint64_t colour = MIN (enl_molecule_degree (mol, atom), 15);

  colour = colour << 7 | element;
  colour = colour << 8 | a->hydrogens;
  colour = colour << 8 | (uint64_t)(a->charge + 128);
  colour = colour << 10 | MIN (a->isotope, 1023);
  colour = colour << 4 | MIN (a->unpaired, 15);
  colour = colour << 1 | a->aromatic;
  return colour << 1 | enl_molecule_in_ring (mol, atom);
}

static uint64_t
arc_weight (const EnlBond *bond)
{
  uint32_t kind = bond->aromatic ? 5 : MIN (bond->order, 4);
  return (uint64_t)1 << 8 * kind;
}

static void
fill_arcs (EnlGraph *graph, const EnlMolecule *mol)
{
  uint32_t arc = 0;

  for (uint32_t v = 0; v < graph->n; v++) {
    graph->first[v] = arc;
    graph->colour[v] = vertex_colour (mol, v);
    for (uint32_t k = 0; k < enl_molecule_degree (mol, v); k++, arc++) {
      graph->target[arc] = enl_molecule_neighbour (mol, v, k);
      graph->weight[arc] = arc_weight (enl_molecule_bond (mol, enl_molecule_bond_at (mol, v, k)));
    }
  }
  graph->first[graph->n] = arc;
}

static void
add_unit (EnlGraph *graph, const EnlUnit *unit, uint32_t *capacity)
{
  if (graph->units == *capacity) {
    *capacity = *capacity ? 2 * *capacity : 16;
    graph->unit = g_renew (EnlUnit, graph->unit, *capacity);
  }
  if (unit->bond == ENL_NONE) {
    graph->unit_at[unit->end[0]] = graph->units;
  } else {
    graph->bond_at[unit->end[0]] = graph->units;
    graph->bond_at[unit->end[1]] = graph->units;
  }
  graph->unit[graph->units++] = *unit;
}

static void
fill_units (EnlGraph *graph, const EnlMolecule *mol)
{
  uint32_t capacity = 0;
  EnlUnit unit;

  for (uint32_t v = 0; v < graph->n; v++)
    if (enl_molecule_atom (mol, v)->winding && enl_unit_of_atom (mol, v, &unit))
      add_unit (graph, &unit, &capacity);
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++)
    if (enl_molecule_bond (mol, b)->side && enl_unit_of_bond (mol, b, &unit))
      add_unit (graph, &unit, &capacity);
}

EnlGraph *
enl_graph_new (const EnlMolecule *mol, bool stereo)
{
  EnlGraph *graph = g_new0 (EnlGraph, 1);
  uint32_t arcs = 2 * enl_molecule_bonds (mol);

  graph->n = enl_molecule_atoms (mol);
  graph->first = g_new (uint32_t, graph->n + 1);
  graph->target = g_new (uint32_t, arcs + 1);
  graph->weight = g_new (uint64_t, arcs + 1);
  graph->colour = g_new (uint64_t, graph->n + 1);
  graph->unit_at = g_new (uint32_t, graph->n + 1);
  graph->bond_at = g_new (uint32_t, graph->n + 1);
  memset (graph->unit_at, 0xff, sizeof (uint32_t) * graph->n);
  memset (graph->bond_at, 0xff, sizeof (uint32_t) * graph->n);
  fill_arcs (graph, mol);
  if (stereo)
    fill_units (graph, mol);
  return graph;
}

/* ---- units ---- */

static void
insert_ascending (uint32_t *list, uint32_t *count, uint32_t value)
{
  uint32_t i = (*count)++;

  for (; i > 0 && list[i - 1] > value; i--)
    list[i] = list[i - 1];
  list[i] = value;
}

/* An atom that lies in two rings which share more than one bond with it: all its bonds are ring
 * bonds and no inversion is possible. */
static bool
is_bridgehead (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (!enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k))->ring)
      return false;
  return enl_molecule_degree (mol, atom) >= 3;
}

/* Three ligands and a lone pair: which elements keep their shape. Amines invert, except where a
 * three-membered ring or a bridgehead holds them; sulfoxides, sulfonium salts, phosphines and their
 * heavier relatives do not (IUPAC 2013 recommendations, P-91.2.2.1, P-93.2). */
static bool
lone_pair_holds (const EnlMolecule *mol, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (mol, atom);
  uint32_t orders = enl_molecule_order_sum (mol, atom);

  switch (a->element) {
  case 7:
    return a->charge == 0 && orders == 3 &&
           (enl_molecule_in_ring_of (mol, atom, 3) || is_bridgehead (mol, atom));
  case 15:
  case 33:
  case 51:
    return orders == 3;
  case 16:
  case 34:
  case 52:
    return (a->charge == 1 && orders == 3) || (a->charge == 0 && orders == 4);
  default:
    return false;
  }
}

static bool
centre_shape (const EnlMolecule *mol, uint32_t atom, uint32_t ligands)
{
  const EnlAtom *a = enl_molecule_atom (mol, atom);

  if (a->aromatic || a->hydrogens > 1)
    return false;
  if (ligands + a->hydrogens == 4)
    return true;
  return ligands == 3 && a->hydrogens == 0 && lone_pair_holds (mol, atom);
}

bool
enl_unit_of_atom (const EnlMolecule *mol, uint32_t atom, EnlUnit *unit)
{
  uint32_t degree = enl_molecule_degree (mol, atom);
  EnlWinding winding = enl_molecule_atom (mol, atom)->winding;

  if (degree > 4 || !centre_shape (mol, atom, degree))
    return false;
  *unit = (EnlUnit){.end = {atom, ENL_NONE}, .bond = ENL_NONE};
  for (uint32_t k = 0; k < degree; k++)
    insert_ascending (unit->ligand[0], &unit->ligands[0], enl_molecule_neighbour (mol, atom, k));
  if (winding)
    unit->value = winding == ENL_WINDING_ANTICLOCKWISE ? 1 : -1;
  return true;
}

static bool
fill_end (const EnlMolecule *mol, uint32_t bond, uint32_t row, EnlUnit *unit)
{
  uint32_t atom = unit->end[row];
  const EnlAtom *a = enl_molecule_atom (mol, atom);
  uint32_t degree = enl_molecule_degree (mol, atom);

  if (degree < 2 || degree > 3 || degree + a->hydrogens > 3)
    return false;
  if (a->element != 6 && a->element != 7 && a->element != 14 && a->element != 32)
    return false;
  for (uint32_t k = 0; k < degree; k++) {
    uint32_t other = enl_molecule_bond_at (mol, atom, k);
    if (other == bond)
      continue;
    if (enl_molecule_bond (mol, other)->order != 1)
      return false;
    insert_ascending (unit->ligand[row], &unit->ligands[row],
                      enl_molecule_neighbour (mol, atom, k));
  }
  return true;
}

static bool
in_small_ring (const EnlMolecule *mol, const EnlBond *bond)
{
  for (uint32_t r = 0; bond->ring && r < enl_molecule_rings (mol); r++) {
    uint32_t size = 0, hits = 0;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    for (uint32_t i = 0; i < size && size < MIN_TRANS_RING; i++)
      hits += ring[i] == bond->from || ring[i] == bond->to;
    if (hits == 2)
      return true;
  }
  return false;
}

bool
enl_unit_of_bond (const EnlMolecule *mol, uint32_t bond, EnlUnit *unit)
{
  const EnlBond *b = enl_molecule_bond (mol, bond);

  if (b->order != 2 || b->aromatic)
    return false;
  *unit = (EnlUnit){.end = {b->from, b->to}, .bond = bond};
  if (!fill_end (mol, bond, 0, unit) || !fill_end (mol, bond, 1, unit) || in_small_ring (mol, b))
    return false;
  if (b->side) {
    unit->value = b->side == ENL_SIDE_SAME ? 1 : -1;
    if (b->side_from != unit->ligand[0][unit->ligands[0] - 1])
      unit->value = -unit->value;
    if (b->side_to != unit->ligand[1][unit->ligands[1] - 1])
      unit->value = -unit->value;
  }
  return true;
}

int
enl_unit_sign (const EnlUnit *unit, const uint32_t *key)
{
  int sign = unit->value;

  /* For a double bond one inversion at an end means that the other ligand is now the reference. */
  for (uint32_t row = 0; row < 2; row++)
    for (uint32_t i = 1; i < unit->ligands[row]; i++)
      for (uint32_t j = 0; j < i; j++) {
        uint32_t low = key[unit->ligand[row][j]], high = key[unit->ligand[row][i]];
        if (low == high)
          return 0;
        if (low > high)
          sign = -sign;
      }
  return sign;
}

/* ---- automorphisms ---- */

static bool
keeps_arcs (const EnlGraph *graph, const uint32_t *image, uint32_t v)
{
  uint32_t w = image[v];

  if (graph->first[v + 1] - graph->first[v] != graph->first[w + 1] - graph->first[w])
    return false;
  for (uint32_t a = graph->first[v]; a < graph->first[v + 1]; a++) {
    uint32_t target = image[graph->target[a]], b = graph->first[w];
    while (b < graph->first[w + 1] && graph->target[b] != target)
      b++;
    if (b == graph->first[w + 1] || graph->weight[b] != graph->weight[a])
      return false;
  }
  return true;
}

static bool
keeps_unit (const EnlGraph *graph, const uint32_t *image, const EnlUnit *unit, int centre_sign)
{
  const uint32_t *at = unit->bond == ENL_NONE ? graph->unit_at : graph->bond_at;
  uint32_t found = at[image[unit->end[0]]];

  if (found == ENL_NONE)
    return false;
  if (unit->bond != ENL_NONE && at[image[unit->end[1]]] != found)
    return false;
  int sign = unit->bond == ENL_NONE ? centre_sign : 1;
  return graph->unit[found].value == sign * enl_unit_sign (unit, image);
}

static bool
keeps_graph (const EnlGraph *graph, const uint32_t *image, int centre_sign)
{
  for (uint32_t v = 0; v < graph->n; v++)
    if (image[v] != v && !keeps_arcs (graph, image, v))
      return false;
  for (uint32_t u = 0; u < graph->units; u++)
    if (graph->unit[u].value && !keeps_unit (graph, image, &graph->unit[u], centre_sign))
      return false;
  return true;
}

bool
enl_graph_is_automorphism (const EnlGraph *graph, const uint32_t *image)
{
  return keeps_graph (graph, image, 1);
}

bool
enl_graph_is_reflection (const EnlGraph *graph, const uint32_t *image)
{
  for (uint32_t v = 0; v < graph->n; v++)
    if (graph->colour[v] != graph->colour[image[v]])
      return false;
  return keeps_graph (graph, image, -1);
}
