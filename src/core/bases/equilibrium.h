/* Acid-base equilibrium of one substrate with one base, all in one solvent and on one scale.
 *
 * The proton activity is the single unknown; the charge balance is monotonic in it, so a bracketed
 * root always exists (Brent). Mass balances close to 1e-9 of the total.
 */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include "core/base/error.h"

/* A substrate acid HnA: `n` sites that ionise independently of each other. */
typedef struct {
  const double *pka; /* of each site */
  uint32_t n_sites;
  double substrate;  /* total substrate, mol/L, > 0 */
  double base;       /* total base, mol/L, >= 0 */
  double pkah;       /* conjugate acid of the base, same scale */
  bool irreversible; /* stoichiometric: the base is used up, most acidic site first */
} EnlEquilibrium;

typedef struct {
  double proton;      /* -log10 of the proton activity; NAN when irreversible */
  double ionised[64]; /* fraction 0..1 of each site that is ionised */
  double base_used;   /* fraction 0..1 of the base that is protonated */
  double residual;    /* largest mass or charge error, relative to the total */
} EnlComposition;

/* ENL_ERROR_RANGE for impossible amounts, ENL_ERROR_LIMIT for more than 64 sites. */
EnlStatus enl_equilibrium_solve (const EnlEquilibrium *problem, EnlComposition *out,
                                 EnlError *err) ENL_MUST_USE;

/* Degree of deprotonation of HA by one equivalent of B: K = 10^gap = x^2 / (1 - x)^2. */
double enl_equal_mixture (double gap);
