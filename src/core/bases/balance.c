#include "core/bases/balance.h"

#include <math.h>
#include <string.h>

#include <gsl/gsl_errno.h>
#include <gsl/gsl_roots.h>

/* The bracket reaches this far beyond the outermost pK: there every form is pure to 1e-30. */
#define BRACKET_MARGIN 30.0
/* Stop when the proton activity is known to this many pK units ... */
#define ROOT_PRECISION 1e-13
/* ... which Brent's method reaches in far fewer steps than this. */
#define MAX_STEPS 300
/* A form rarer than the commonest by more powers of ten does not reach the last digit of a sum. */
#define NEGLIGIBLE (-20.0)

/* ---- checks ---- */

static EnlStatus
check_acceptor (const EnlAcceptor *a, EnlError *err)
{
  if (!(a->amount >= 0.0) || !isfinite (a->amount))
    return enl_error_set (err, ENL_ERROR_RANGE, "give 0 or more equivalents",
                          "base concentration %g mol/L", a->amount);
  if (a->steps < 1 || a->steps > ENL_MAX_STEPS)
    return enl_error_set (err, ENL_ERROR_LIMIT, "describe the base by its strongest forms",
                          "a base with %u protonations; 1 to %d are possible", a->steps,
                          ENL_MAX_STEPS);
  if (!(a->brought >= 0.0 && a->brought <= a->steps))
    return enl_error_set (err, ENL_ERROR_RANGE, "give between none and all of its protons",
                          "a base that brings %g of %u protons", a->brought, a->steps);
  for (uint32_t i = 0; i < a->steps; i++)
    if (!isfinite (a->pka[i]))
      return enl_error_set (err, ENL_ERROR_RANGE, "choose a base with a value on this scale",
                            "the base has no pKaH here");
  return ENL_OK;
}

static EnlStatus
check_species (const EnlEquilibrium *p, EnlError *err)
{
  if (p->n_species > ENL_MAX_SPECIES)
    return enl_error_set (err, ENL_ERROR_LIMIT, "compare fewer sites at once",
                          "more than %d ionised forms", ENL_MAX_SPECIES);
  for (uint32_t i = 0; i < p->n_species; i++)
    if (isnan (p->species[i].pk_sum) || p->species[i].pk_sum == -INFINITY ||
        p->species[i].lost == 0)
      return enl_error_set (err, ENL_ERROR_RANGE, "give every ionised form a finite pK",
                            "form %u has no usable pK", i + 1);
  return ENL_OK;
}

EnlStatus
enl_balance_check (const EnlEquilibrium *p, EnlError *err)
{
  if (p->n_acceptors > ENL_MAX_ACCEPTORS)
    return enl_error_set (err, ENL_ERROR_LIMIT, "mix fewer bases at once", "more than %d bases",
                          ENL_MAX_ACCEPTORS);
  if (!(p->substrate > 0.0) || !isfinite (p->substrate))
    return enl_error_set (err, ENL_ERROR_RANGE, "give a concentration above 0 mol/L",
                          "substrate concentration %g mol/L", p->substrate);
  if (!(p->removed >= 0.0) || !isfinite (p->removed))
    return enl_error_set (err, ENL_ERROR_RANGE, "give 0 or more equivalents",
                          "base concentration %g mol/L", p->removed);
  EnlStatus status = check_species (p, err);
  for (uint32_t i = 0; status == ENL_OK && i < p->n_acceptors; i++)
    status = check_acceptor (&p->acceptor[i], err);
  return status;
}

/* ---- forms at one activity ---- */

static double
power (double decades)
{
  return exp (M_LN10 * decades);
}

/* Fractions of the neutral substrate and of each form, overflow-free. NULL: not wanted. Returns the
 * mean number of protons lost. */
static double
substrate_at (const EnlEquilibrium *p, double proton, double *neutral, double *fraction)
{
  double largest = 0.0, sum, lost = 0.0;

  for (uint32_t i = 0; i < p->n_species; i++)
    largest = fmax (largest, p->species[i].lost * proton - p->species[i].pk_sum);
  double bare = power (-largest);
  sum = bare;
  for (uint32_t i = 0; i < p->n_species; i++) {
    double decades = p->species[i].lost * proton - p->species[i].pk_sum - largest;
    double share = decades < NEGLIGIBLE && !fraction ? 0.0 : power (decades);
    if (fraction)
      fraction[i] = share;
    sum += share;
    lost += share * p->species[i].lost;
  }
  for (uint32_t i = 0; fraction && i < p->n_species; i++)
    fraction[i] /= sum;
  if (neutral)
    *neutral = bare / sum;
  return lost / sum;
}

/* The same for an acceptor; returns the mean number of protons bound. */
static double
acceptor_at (const EnlAcceptor *a, double proton, double *form)
{
  double decades[ENL_MAX_STEPS + 1] = {0.0}, largest = 0.0, sum = 0.0, bound = 0.0;

  for (uint32_t i = 0; i < a->steps; i++) {
    decades[i + 1] = decades[i] + a->pka[i] - proton;
    largest = fmax (largest, decades[i + 1]);
  }
  for (uint32_t i = 0; i <= a->steps; i++) {
    double share = power (decades[i] - largest);
    if (form)
      form[i] = share;
    sum += share;
    bound += i * share;
  }
  for (uint32_t i = 0; form && i <= a->steps; i++)
    form[i] /= sum;
  return bound / sum;
}

double
enl_balance_capacity (const EnlEquilibrium *p)
{
  uint32_t most = 0;
  double all = 0.0;

  for (uint32_t i = 0; i < p->n_species; i++)
    if (isfinite (p->species[i].pk_sum))
      most = MAX (most, p->species[i].lost);
  for (uint32_t i = 0; i < p->n_acceptors; i++)
    all += p->acceptor[i].amount * p->acceptor[i].brought;
  return all + most * p->substrate;
}

/* What finds no proton counts for nothing, unless the solvent gives one. */
static double
taken_for_good (const EnlEquilibrium *p)
{
  return isnan (p->autoprotolysis) ? fmin (p->removed, enl_balance_capacity (p)) : p->removed;
}

static double
balance_with (const EnlEquilibrium *p, double proton, double taken)
{
  double balance = p->substrate * substrate_at (p, proton, NULL, NULL) - taken;

  for (uint32_t i = 0; i < p->n_acceptors; i++)
    balance -= p->acceptor[i].amount *
               (acceptor_at (&p->acceptor[i], proton, NULL) - p->acceptor[i].brought);
  if (!isnan (p->autoprotolysis))
    balance += power (proton - p->autoprotolysis) - power (-proton);
  return balance;
}

double
enl_balance_at (const EnlEquilibrium *p, double proton)
{
  return balance_with (p, proton, taken_for_good (p));
}

void
enl_balance_compose (const EnlEquilibrium *p, double proton, EnlComposition *out)
{
  double scale = p->substrate + p->removed;

  out->proton = proton;
  substrate_at (p, proton, &out->neutral, out->fraction);
  for (uint32_t i = 0; i < p->n_acceptors; i++) {
    acceptor_at (&p->acceptor[i], proton, out->form[i]);
    scale += p->acceptor[i].amount * p->acceptor[i].steps;
  }
  out->unused = p->removed - taken_for_good (p);
  out->residual = fabs (enl_balance_at (p, proton)) / scale;
}

/* ---- the root ---- */

static void
widen (double pk, double *low, double *high)
{
  *low = fmin (*low, pk);
  *high = fmax (*high, pk);
}

void
enl_balance_bracket (const EnlEquilibrium *p, double *low, double *high)
{
  *low = INFINITY, *high = -INFINITY;
  for (uint32_t i = 0; i < p->n_species; i++)
    if (isfinite (p->species[i].pk_sum)) {
      widen (p->species[i].pk_sum / p->species[i].lost, low, high);
      widen (p->species[i].pk_sum, low, high);
    }
  for (uint32_t i = 0; i < p->n_acceptors; i++)
    for (uint32_t k = 0; k < p->acceptor[i].steps; k++)
      widen (p->acceptor[i].pka[k], low, high);
  if (!isnan (p->autoprotolysis))
    widen (0.0, low, high), widen (p->autoprotolysis, low, high);
  if (*low > *high)
    *low = *high = 0.0;
  *low -= BRACKET_MARGIN;
  *high += BRACKET_MARGIN;
}

typedef struct {
  const EnlEquilibrium *problem;
  double taken;
} Balance;

static double
balance_function (double proton, void *data)
{
  const Balance *b = data;

  return balance_with (b->problem, proton, b->taken);
}

static double
root_by_brent (gsl_function *f, double low, double high)
{
  gsl_root_fsolver *solver = gsl_root_fsolver_alloc (gsl_root_fsolver_brent);
  double root = low;

  gsl_root_fsolver_set (solver, f, low, high);
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

double
enl_balance_root (const EnlEquilibrium *problem, double low, double high)
{
  Balance balance = {problem, taken_for_good (problem)};
  gsl_function f = {balance_function, &balance};

  if (balance_function (low, &balance) >= 0.0)
    return low;
  if (balance_function (high, &balance) <= 0.0)
    return high;
  return root_by_brent (&f, low, high);
}
