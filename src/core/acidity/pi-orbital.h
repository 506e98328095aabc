/* The p orbitals of a molecule and their overlaps: input of the Hückel model. */
#pragma once

#include "core/acidity/conjugation.h"
#include "core/acidity/pi-parameters.h"

typedef struct {
  uint32_t atom;
  uint8_t plane;     /* 0, or 1 for the second orbital of a linear atom */
  uint8_t electrons; /* it brings */
  uint8_t core;      /* positive charge it leaves behind when all its electrons are gone */
  int type;          /* in the parameters */
} EnlPiOrbital;

typedef struct {
  uint32_t a, b; /* orbitals */
  uint32_t bond;
  double k;
} EnlPiOverlap;

typedef struct {
  EnlPiOrbital *orbital;
  uint32_t n_orbitals;
  uint32_t *of_atom; /* first orbital of every atom, or ENL_NONE; a second one follows it */
  EnlPiOverlap *overlap;
  uint32_t n_overlaps;
  uint32_t *system; /* of every orbital, numbered from 0 */
  uint32_t n_systems;
} EnlPiBasis;

/* `fact` belongs to `mol`, or to `mol` less a proton. Release with enl_pi_basis_clear. */
void enl_pi_basis_init (EnlPiBasis *basis, const EnlMolecule *mol, const EnlConjugationAtom *fact);
void enl_pi_basis_clear (EnlPiBasis *basis);
