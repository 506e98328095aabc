/* A C face over the C++ library CoordGen (BSD licence), which places atoms in the plane. */
#pragma once

#include "core/molecule/molecule.h"

G_BEGIN_DECLS

typedef struct {
  uint8_t element;
  int8_t charge;
  uint8_t hydrogens;
  bool held;   /* keep x and y as given, up to a common shift or turn */
  double x, y; /* in bond lengths, y up; read when held, always written */
} EnlCoordgenAtom;

typedef struct {
  uint32_t from, to;
  uint8_t order;
  EnlSide side;
  uint32_t side_from, side_to;
} EnlCoordgenBond;

/* Places the atoms of one connected graph (no duplicate bonds). The result depends on the order of
 * atoms and bonds, so give them in a canonical one. `effort` (1 standard, 0.2 quick) is how long
 * the library may look for a clash-free picture. False, with atoms unchanged, when the library
 * gave up or a coordinate is not finite. Safe to call from several threads. */
bool enl_coordgen_place (EnlCoordgenAtom *atom, uint32_t n_atoms, const EnlCoordgenBond *bond,
                         uint32_t n_bonds, double effort) ENL_MUST_USE;

G_END_DECLS
