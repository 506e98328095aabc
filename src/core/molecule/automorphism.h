/* Canonical labelling and automorphisms of a coloured graph by individualisation and refinement.
 *
 * The search walks down to discrete partitions ("leaves"). Two leaves with the same picture give an
 * automorphism, automorphisms prune branches, and the least leaf is the canonical one. Method:
 * McKay, "Practical graph isomorphism", Congr. Numer. 1981, 30, 45; guessing an automorphism before
 * the leaf after Darga, Sakallah and Markov, Proc. DAC 2008, 149.
 */
#pragma once

#include "core/molecule/graph.h"

typedef struct {
  uint32_t *position; /* canonical position of every vertex; a permutation */
  uint32_t *orbit;    /* smallest vertex that an automorphism maps on this one */
  bool complete;      /* false when the step limit stopped the search: then the order may depend on
                       * the input and orbits may be too small */
  bool turns;         /* some automorphism fixes the watched unit and reverses its arrangement */
} EnlSymmetry;

/* `watch` (NULL allowed) is a unit whose ends are set apart by colour and that has no value in the
 * graph; its own value must be +1. Clear the result with enl_symmetry_clear. */
void enl_symmetry_search (const EnlGraph *graph, const EnlUnit *watch, EnlSymmetry *out);
void enl_symmetry_clear (EnlSymmetry *symmetry);
