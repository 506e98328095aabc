/* The working copy of one connected fragment: a small graph in canonical order with plane
 * coordinates. Everything in this folder works on it, so no picture depends on the input order.
 *
 * Hydrogen atoms that hang on another atom are left out and placed last (hydrogens.h).
 */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include "core/molecule/molecule.h"

typedef struct {
  double x, y;
} EnlSpot;

typedef struct {
  uint32_t source; /* atom of the molecule */
  uint8_t element, hydrogens;
  int8_t charge;
} EnlSketchAtom;

typedef struct {
  uint32_t from, to;
  uint8_t order;
  uint32_t block; /* ring block (blocks.h) or ENL_NONE for a bond outside rings */
  EnlSide side;
  uint32_t side_from, side_to;
} EnlSketchBond;

typedef struct {
  uint32_t n_atoms, n_bonds, n_blocks;
  EnlSketchAtom *atom;
  EnlSketchBond *bond;
  EnlSpot *spot;   /* where each atom stands */
  uint32_t *first; /* n_atoms + 1 entries into the two below */
  uint32_t *neighbour;
  uint32_t *via; /* the bond to that neighbour */
} EnlSketch;

/* The atoms of `mol` with keep[atom] true, in the order of `rank`; they must be connected. */
EnlSketch *enl_sketch_new (const EnlMolecule *mol, const uint32_t *rank,
                           const bool *keep) ENL_MUST_USE;
/* The atoms of another sketch with keep[atom] true, as a sketch of its own with the same spots;
 * `source` is then the atom in `whole`. Sides whose references are left out are dropped. */
EnlSketch *enl_sketch_part (const EnlSketch *whole, const bool *keep) ENL_MUST_USE;
void enl_sketch_free (EnlSketch *sketch);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlSketch, enl_sketch_free)

uint32_t enl_sketch_degree (const EnlSketch *sketch, uint32_t atom);
uint32_t enl_sketch_other_end (const EnlSketch *sketch, uint32_t bond, uint32_t atom);
bool enl_sketch_bonded (const EnlSketch *sketch, uint32_t a, uint32_t b);

/* True for a bond to a metal with five and more ligands: those need longer bonds for room. */
bool enl_sketch_bond_may_be_long (const EnlSketch *sketch, uint32_t bond);

/* The largest over all ring bonds of the smallest ring through the bond; 0 without rings. */
uint32_t enl_sketch_widest_ring (const EnlSketch *sketch);

/* True when every double bond with a side is drawn on that side. */
bool enl_sketch_sides_right (const EnlSketch *sketch);
bool enl_sketch_side_right (const EnlSketch *sketch, uint32_t bond);
