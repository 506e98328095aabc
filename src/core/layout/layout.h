/* Two-dimensional coordinates. */
#pragma once

#include "core/molecule/molecule.h"

/* Lays the molecule out: bond length 1, y up, oriented after IUPAC 2008 recommendations, wedges
 * chosen, no atom on another. The same structure gives the same picture whatever its atom order.
 * Slow (tenths of a second and more) for large bushy structures: keep off the main thread. */
EnlStatus enl_layout (EnlMolecule *mol, EnlError *err) ENL_MUST_USE;

typedef struct {
  double closest; /* smallest distance between two atoms, in bond lengths */
  double shortest_bond, longest_bond;
  uint32_t crossings; /* pairs of bonds that cross */
  uint32_t overlaps;  /* atoms within 0.25 of another atom or of a bond that is not theirs */
} EnlLayoutQuality;

EnlLayoutQuality enl_layout_quality (const EnlMolecule *mol);
