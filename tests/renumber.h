/* The same molecule with its atoms in another order. */
#pragma once

#include "core/molecule/molecule.h"

/* Neighbours of `atom` sorted by key[neighbour] are an odd permutation of those sorted by index. */
static inline bool
is_odd_order (const EnlMolecule *mol, uint32_t atom, const uint32_t *key)
{
  uint32_t n = enl_molecule_degree (mol, atom);
  bool odd = false;

  for (uint32_t i = 0; i < n; i++)
    for (uint32_t j = 0; j < i; j++) {
      uint32_t a = enl_molecule_neighbour (mol, atom, i), b = enl_molecule_neighbour (mol, atom, j);
      odd ^= (a < b) != (key[a] < key[b]);
    }
  return odd;
}

/* Atom v becomes atom place[v]. Unwritten neighbours stand first before and after. */
static inline EnlMolecule *
renumber (const EnlMolecule *mol, const uint32_t *place)
{
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree uint32_t *at = g_new (uint32_t, n + 1);
  EnlMolecule *copy = enl_molecule_new ();

  for (uint32_t v = 0; v < n; v++)
    at[place[v]] = v;
  for (uint32_t i = 0; i < n; i++) {
    EnlAtom atom = *enl_molecule_atom (mol, at[i]);
    if (atom.winding && is_odd_order (mol, at[i], place))
      atom.winding =
          atom.winding == ENL_WINDING_CLOCKWISE ? ENL_WINDING_ANTICLOCKWISE : ENL_WINDING_CLOCKWISE;
    enl_molecule_add_atom (copy, &atom);
  }
  for (uint32_t b = enl_molecule_bonds (mol); b-- > 0;) {
    const EnlBond *bond = enl_molecule_bond (mol, b);
    uint32_t c = enl_molecule_add_bond (copy, place[bond->to], place[bond->from], bond->order);
    EnlBond *turned = enl_molecule_edit_bond (copy, c);
    turned->side = bond->side;
    if (bond->side) {
      turned->side_from = place[bond->side_to];
      turned->side_to = place[bond->side_from];
    }
  }
  enl_molecule_finish (copy);
  return copy;
}

/* A permutation of 0 .. n - 1. */
static inline void
shuffle (uint32_t *list, uint32_t n, GRand *rand)
{
  for (uint32_t i = 0; i < n; i++)
    list[i] = i;
  for (uint32_t i = n; i > 1; i--) {
    uint32_t j = (uint32_t)g_rand_int_range (rand, 0, (gint32)i), swap = list[i - 1];
    list[i - 1] = list[j];
    list[j] = swap;
  }
}
