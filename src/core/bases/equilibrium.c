#include "core/bases/equilibrium.h"

#include <math.h>

#include <gsl/gsl_errno.h>
#include <gsl/gsl_roots.h>

/* The bracket reaches this far beyond the outermost pK: there every form is pure to 1e-30. */
#define BRACKET_MARGIN 30.0
/* Stop when the proton activity is known to this many pK units ... */
#define ROOT_PRECISION 1e-13
/* ... which Brent's method reaches in far fewer steps than this. */
#define MAX_STEPS 300

double
enl_equal_mixture (double gap)
{
  return 1.0 / (1.0 + pow (10.0, -0.5 * gap));
}

/* Fractions of the neutral substrate and of each form at one acidity, overflow-free. */
static void
substrate_fractions (const EnlEquilibrium *p, double proton, EnlComposition *out)
{
  double largest = 0.0, sum = 0.0;

  for (uint32_t i = 0; i < p->n_species; i++)
    largest = fmax (largest, p->species[i].lost * proton - p->species[i].pk_sum);
  out->neutral = pow (10.0, -largest);
  sum = out->neutral;
  for (uint32_t i = 0; i < p->n_species; i++) {
    out->fraction[i] = pow (10.0, p->species[i].lost * proton - p->species[i].pk_sum - largest);
    sum += out->fraction[i];
  }
  out->neutral /= sum;
  for (uint32_t i = 0; i < p->n_species; i++)
    out->fraction[i] /= sum;
}

static double
base_protonated (const EnlEquilibrium *p, double proton)
{
  return 1.0 / (1.0 + pow (10.0, proton - p->pkah));
}

/* Protons lost by the substrate minus protons taken by the base, mol/L: rises with `proton`. */
static double
proton_balance (double proton, void *data)
{
  const EnlEquilibrium *p = data;
  EnlComposition at;
  double lost = 0.0;

  substrate_fractions (p, proton, &at);
  for (uint32_t i = 0; i < p->n_species; i++)
    lost += at.fraction[i] * p->species[i].lost;
  return lost * p->substrate - base_protonated (p, proton) * p->base;
}

static EnlStatus
check_problem (const EnlEquilibrium *p, EnlError *err)
{
  if (p->n_species > ENL_MAX_SPECIES)
    return enl_error_set (err, ENL_ERROR_LIMIT, "compare fewer sites at once",
                          "more than %d ionised forms", ENL_MAX_SPECIES);
  if (!(p->substrate > 0.0) || !isfinite (p->substrate))
    return enl_error_set (err, ENL_ERROR_RANGE, "give a concentration above 0 mol/L",
                          "substrate concentration %g mol/L", p->substrate);
  if (!(p->base >= 0.0) || !isfinite (p->base))
    return enl_error_set (err, ENL_ERROR_RANGE, "give 0 or more equivalents",
                          "base concentration %g mol/L", p->base);
  if (!isfinite (p->pkah))
    return enl_error_set (err, ENL_ERROR_RANGE, "choose a base with a value on this scale",
                          "the base has no pKaH here");
  for (uint32_t i = 0; i < p->n_species; i++)
    if (!isfinite (p->species[i].pk_sum) || p->species[i].lost == 0)
      return enl_error_set (err, ENL_ERROR_RANGE, "give every ionised form a finite pK",
                            "form %u has no usable pK", i + 1);
  return ENL_OK;
}

static double
solve_bracketed (const EnlEquilibrium *problem, double low, double high)
{
  gsl_function f = {proton_balance, (void *)problem};
  gsl_root_fsolver *solver = gsl_root_fsolver_alloc (gsl_root_fsolver_brent);
  double root = low;

  gsl_root_fsolver_set (solver, &f, low, high);
  for (int step = 0; step < MAX_STEPS; step++) {
    if (gsl_root_fsolver_iterate (solver) != GSL_SUCCESS)
      break;
    root = gsl_root_fsolver_root (solver);
    if (gsl_root_test_interval (gsl_root_fsolver_x_lower (solver),
                                gsl_root_fsolver_x_upper (solver), ROOT_PRECISION,
                                0.0) == GSL_SUCCESS)
      break;
  }
  gsl_root_fsolver_free (solver);
  return root;
}

EnlStatus
enl_equilibrium_solve (const EnlEquilibrium *problem, EnlComposition *out, EnlError *err)
{
  EnlStatus status = check_problem (problem, err);
  if (status != ENL_OK)
    return status;
  double low = problem->pkah, high = problem->pkah;
  for (uint32_t i = 0; i < problem->n_species; i++) {
    double mean = problem->species[i].pk_sum / problem->species[i].lost;
    low = fmin (low, mean);
    high = fmax (high, problem->species[i].pk_sum);
    high = fmax (high, mean);
  }
  low -= BRACKET_MARGIN;
  high += BRACKET_MARGIN;
  if (problem->base == 0.0 || problem->n_species == 0)
    out->proton = problem->base == 0.0 ? low : high;
  else if (proton_balance (low, (void *)problem) >= 0.0)
    out->proton = low;
  else if (proton_balance (high, (void *)problem) <= 0.0)
    out->proton = high;
  else
    out->proton = solve_bracketed (problem, low, high);
  substrate_fractions (problem, out->proton, out);
  out->base_used = problem->base > 0.0 ? base_protonated (problem, out->proton) : 0.0;
  out->residual =
      fabs (proton_balance (out->proton, (void *)problem)) / (problem->substrate + problem->base);
  return ENL_OK;
}
