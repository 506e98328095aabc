/* Symmetry classes and the canonical order. */
#pragma once

#include "core/molecule/molecule.h"

/* Fills class[atom]: atoms that an automorphism of the graph exchanges share a number, 0..n-1.
 * With `stereo`, tetrahedral and double-bond descriptors must be kept. Returns n. */
uint32_t enl_symmetry_classes (const EnlMolecule *mol, bool stereo, uint32_t *class_of);

/* The same with stereo, but atoms that a reflection of the whole molecule exchanges share a number,
 * too: the two halves of a meso compound, the enantiotopic arms of cis-4-methylcyclohexanol. Such
 * atoms behave alike towards everything achiral. Returns n. */
uint32_t enl_symmetry_reflected_classes (const EnlMolecule *mol, uint32_t *class_of);

/* Fills rank[atom] with a permutation 0..n-1 that does not depend on the input order (maps and
 * coordinates are ignored, stereo breaks ties). */
void enl_canonical_ranks (const EnlMolecule *mol, uint32_t *rank);
