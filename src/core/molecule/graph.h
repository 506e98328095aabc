/* The molecule as the symmetry search sees it: coloured vertices, coloured arcs, stereo units.
 *
 * A stereo unit is a tetrahedral centre or a double bond whose ligands can stand in two ways. Its
 * `value` is the sign of that arrangement for the ligands in ascending index order; any other order
 * of the ligands (ranks, cells, images under a permutation) multiplies it by the parity of the
 * change, so that "same arrangement" is one comparison of signs.
 */
#pragma once

#include "core/molecule/molecule.h"

typedef struct {
  uint32_t end[2];       /* the centre and ENL_NONE, or the two ends of the double bond */
  uint32_t ligand[2][4]; /* ascending index; a centre has its 3 or 4 in row 0 */
  uint32_t ligands[2];   /* how many of them */
  uint32_t bond;         /* index of the double bond, ENL_NONE for a centre */
  int value;             /* +1 or -1; 0 while the unit shall be ignored */
} EnlUnit;

typedef struct {
  uint32_t n;
  uint32_t *first;   /* n + 1 entries: arcs of v are first[v] .. first[v + 1] - 1 */
  uint32_t *target;  /* other end of the arc */
  uint64_t *weight;  /* colour of the arc: one byte-wide digit per kind of bond */
  uint64_t *colour;  /* of the vertex, in the low ENL_GRAPH_COLOUR_BITS */
  uint32_t *unit_at; /* n entries: unit with this centre or ENL_NONE */
  uint32_t *bond_at; /* n entries: unit of a double bond that ends here or ENL_NONE */
  EnlUnit *unit;
  uint32_t units;
} EnlGraph;

#define ENL_GRAPH_COLOUR_BITS 48 /* the bits above are free to set vertices apart */

/* Graph of a finished molecule; with `stereo`, a unit for every winding and side that is set and
 * has a shape that can carry it (enl_unit_of_atom, enl_unit_of_bond). Symmetry is not judged. */
EnlGraph *enl_graph_new (const EnlMolecule *mol, bool stereo) ENL_MUST_USE;
void enl_graph_free (EnlGraph *graph);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlGraph, enl_graph_free)

/* Fill the unit of an atom or bond, value 0 when nothing is set there. False when its shape cannot
 * carry stereochemistry whatever the symmetry: too few ligands, an inverting nitrogen, a small
 * ring. */
bool enl_unit_of_atom (const EnlMolecule *mol, uint32_t atom, EnlUnit *unit);
bool enl_unit_of_bond (const EnlMolecule *mol, uint32_t bond, EnlUnit *unit);

/* Sign of the unit with its ligands ordered by key[ligand]; 0 when two keys at one end tie. */
int enl_unit_sign (const EnlUnit *unit, const uint32_t *key);

/* True when the permutation keeps arcs and all units with a value (colours are the caller's). */
bool enl_graph_is_automorphism (const EnlGraph *graph, const uint32_t *image);

/* The same for a permutation that turns every centre over and keeps the double bonds. */
bool enl_graph_is_reflection (const EnlGraph *graph, const uint32_t *image);

/* Takes the value of every unit whose two arrangements are the same molecule, so that only true
 * stereo units keep one. */
void enl_graph_settle_units (EnlGraph *graph);
