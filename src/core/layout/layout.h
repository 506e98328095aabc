/* Two-dimensional coordinates. */
#pragma once

#include "core/molecule/molecule.h"

/* More atoms than this are refused: the time grows faster than the size (1000 atoms of a peptide
 * take about five seconds). */
#define ENL_LAYOUT_MAX_ATOMS 1000

/* Lays the molecule out: bond length 1, y up, oriented after IUPAC 2008 recommendations, wedges
 * chosen, no atom on another. The same structure gives the same picture whatever its atom order.
 * Slow (tenths of a second and more) for large bushy structures: keep off the main thread.
 * ENL_ERROR_LIMIT above ENL_LAYOUT_MAX_ATOMS, ENL_ERROR_NUMERIC when a coordinate is not finite. */
EnlStatus enl_layout (EnlMolecule *mol, EnlError *err) ENL_MUST_USE;

typedef struct {
  double closest; /* smallest distance between two atoms, in bond lengths */
  double shortest_bond, longest_bond;
  uint32_t crossings; /* pairs of bonds that cross */
  uint32_t overlaps;  /* atoms within 0.25 of another atom or of a bond that is not theirs */
} EnlLayoutQuality;

EnlLayoutQuality enl_layout_quality (const EnlMolecule *mol);
