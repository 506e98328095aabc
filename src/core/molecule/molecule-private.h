/* Inside of EnlMolecule, for the files of this folder and for readers that run finish in stages. */
#pragma once

#include "core/molecule/molecule.h"

struct EnlMolecule {
  EnlAtom *atom;
  EnlBond *bond;
  uint32_t n_atoms, n_bonds;
  uint32_t atom_room, bond_room;
  char *name; /* NULL when unnamed */
  bool has_layout;
  bool linked;   /* adjacency is valid */
  bool finished; /* rings and aromatic flags are valid, too */

  /* Adjacency, one block: first[n_atoms + 1], neighbour[2 n_bonds], via[2 n_bonds]. The links of
   * atom a are first[a] .. first[a + 1] - 1. */
  uint32_t *first, *neighbour, *via;
  /* Rings, one block: ring_first[n_rings + n_spare + 1], ring_count[n_atoms], smallest[n_atoms],
   * ring_atom[n_ring_atoms]. The smallest set comes first, then the spare rings: as small, but sums
   * of others; with them the list does not depend on the order of atoms. */
  uint32_t *ring_first, *ring_count, *smallest, *ring_atom;
  uint32_t n_rings, n_spare, n_ring_atoms;
};

/* The three stages of enl_molecule_finish, in this order. */
void enl_molecule_link (EnlMolecule *mol);
void enl_molecule_find_rings (EnlMolecule *mol);
void enl_molecule_find_aromatic (EnlMolecule *mol);

/* Frees derived facts. Their block sizes follow from the counts of atoms and bonds, so this comes
 * before any change of the counts. */
void enl_molecule_forget_derived (EnlMolecule *mol);

/* Allocates the block of rings (contents undefined) and sets its pointers and sizes. */
void enl_molecule_make_ring_block (EnlMolecule *mol, uint32_t n_rings, uint32_t n_spare,
                                   uint32_t n_ring_atoms);
