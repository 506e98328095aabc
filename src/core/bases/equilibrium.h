/* Acid-base equilibrium of one substrate with bases and other acids, all in one solvent and on one
 * scale.
 *
 * The proton activity is the single unknown: protons that left the substrate and what was added in
 * protonated form must equal protons that are bound now, and that balance (the charge balance with
 * its spectators taken out) is monotonic in -log10 of the activity, so a bracketed root always
 * exists (Brent's method, GSL). Where the balance never reaches zero, because more protons are
 * taken than there are or none at all, the answer is the limit. Activity coefficients are 1.
 */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include "core/base/error.h"

#define ENL_MAX_SPECIES   256
#define ENL_MAX_ACCEPTORS 4
#define ENL_MAX_STEPS     4

/* One ionised form of the substrate. */
typedef struct {
  double pk_sum; /* sum of the pKa of the protons lost, most acidic first; INFINITY: the form cannot
                    be made here and stays empty */
  uint32_t lost; /* protons lost, at least 1 */
} EnlSpecies;

/* A base in all its forms: LDA (one step), carbonate (two), water and hydroxide (one, brought 1).
 */
typedef struct {
  double amount;  /* mol/L of all forms together, >= 0 */
  double brought; /* protons that a mole brings along: 0 for the bare base, 1 for its conjugate
                     acid, between for a mixture of both; 0..steps */
  uint32_t steps; /* protons that the bare base can take, 1..ENL_MAX_STEPS */
  double pka[ENL_MAX_STEPS]; /* of the acid that each proton makes, the first proton first */
} EnlAcceptor;

typedef struct {
  const EnlSpecies *species; /* the neutral substrate is understood and not listed */
  uint32_t n_species;
  double substrate;            /* total substrate, mol/L, > 0 */
  const EnlAcceptor *acceptor; /* bases and impurities */
  uint32_t n_acceptors;        /* at most ENL_MAX_ACCEPTORS */
  double removed;        /* protons taken for good (hydride, alkyllithium), mol/L, >= 0; they come
                            from the most acidic that is left */
  double autoprotolysis; /* pK of the solvent's own ions, e.g. 14.0 for water; NAN: they are not
                            counted, which holds where all else is far more concentrated */
} EnlEquilibrium;

typedef struct {
  double proton;  /* -log10 of the proton activity on the scale of the pKa; at a limit (see above) a
                     number far beyond the outermost pKa */
  double neutral; /* fraction 0..1 of the substrate that has lost nothing */
  double fraction[ENL_MAX_SPECIES]; /* fraction 0..1 of the substrate in each listed form */
  /* fraction 0..1 of each acceptor that has bound so many protons */
  double form[ENL_MAX_ACCEPTORS][ENL_MAX_STEPS + 1];
  double unused;   /* of `removed`: mol/L that found no proton */
  double residual; /* proton balance error, relative to all protons that could move */
} EnlComposition;

/* A base without acid of its own. */
EnlAcceptor enl_acceptor_bare (double amount, double pkah);

/* ENL_ERROR_RANGE for impossible amounts or numbers, ENL_ERROR_LIMIT for more than
 * ENL_MAX_SPECIES forms or ENL_MAX_ACCEPTORS acceptors. */
EnlStatus enl_equilibrium_solve (const EnlEquilibrium *problem, EnlComposition *out,
                                 EnlError *err) ENL_MUST_USE;

/* Degree of deprotonation of HA by one equivalent of B: K = 10^gap = x^2 / (1 - x)^2, so
 * x / (1 - x) = 10^(gap / 2). */
double enl_equal_mixture (double gap);

/* ---- sweeping the equivalents ---- */

#define ENL_SWEEP_POINTS 400
#define ENL_SWEEP_MOST   3.0 /* equivalents */

/* Compositions from 0 to `most` equivalents of base per substrate, evenly spaced. One block of
 * memory. */
typedef struct {
  uint32_t n_points, n_species;
  double *equivalents; /* n_points */
  double *neutral;     /* n_points */
  double *fraction;    /* n_species rows of n_points each */
  double *unused;      /* n_points: of the base added, fraction 0..1 that has taken no proton */
  double *bound;       /* n_acceptors rows of n_points each: protons bound by a mole, 0..steps */
  double worst;        /* largest residual of all points */
} EnlSweep;

/* `problem` with its base varied: `removed` when `stoichiometric`, else the amount of the first
 * acceptor. All else stays as it is. Errors as enl_equilibrium_solve; ENL_ERROR_RANGE for fewer
 * than 2 points or no equivalents. Caller: enl_sweep_free. */
EnlStatus enl_sweep_new (const EnlEquilibrium *problem, bool stoichiometric, double most,
                         uint32_t n_points, EnlSweep **out, EnlError *err) ENL_MUST_USE;
void enl_sweep_free (EnlSweep *sweep);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlSweep, enl_sweep_free)
