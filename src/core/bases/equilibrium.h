/* Acid-base equilibrium of one substrate with one base, all in one solvent and on one scale.
 *
 * The proton activity is the single unknown: protons the substrate has lost must equal protons the
 * base has gained, and that balance is monotonic in -log10 of the activity, so a bracketed root
 * always exists (Brent's method, GSL). Ions of the solvent itself are not counted: the numbers
 * hold where substrate and base are far more concentrated than the solvent's own ions.
 */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include "core/base/error.h"

#define ENL_MAX_SPECIES 256

/* One ionised form of the substrate. */
typedef struct {
  double pk_sum; /* sum of the pKa of the protons lost, most acidic first */
  uint32_t lost; /* protons lost, at least 1 */
} EnlSpecies;

typedef struct {
  const EnlSpecies *species; /* the neutral substrate is understood and not listed */
  uint32_t n_species;
  double substrate; /* total substrate, mol/L, > 0 */
  double base;      /* total base, mol/L, >= 0 */
  double pkah;      /* conjugate acid of the base, same scale */
} EnlEquilibrium;

typedef struct {
  double proton;                    /* -log10 of the proton activity on the scale of the pKa */
  double neutral;                   /* fraction 0..1 of the substrate that has lost nothing */
  double fraction[ENL_MAX_SPECIES]; /* fraction 0..1 of the substrate in each listed form */
  double base_used;                 /* fraction 0..1 of the base that is protonated */
  double residual;                  /* proton balance error, relative to substrate + base */
} EnlComposition;

/* ENL_ERROR_RANGE for impossible amounts or numbers, ENL_ERROR_LIMIT for more than
 * ENL_MAX_SPECIES forms. */
EnlStatus enl_equilibrium_solve (const EnlEquilibrium *problem, EnlComposition *out,
                                 EnlError *err) ENL_MUST_USE;

/* Degree of deprotonation of HA by one equivalent of B: K = 10^gap = x^2 / (1 - x)^2, so
 * x / (1 - x) = 10^(gap / 2). */
double enl_equal_mixture (double gap);
