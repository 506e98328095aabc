/* The composition over a range of equivalents. */
#include <math.h>
#include <string.h>

#include "core/bases/balance.h"
#include "core/bases/equilibrium.h"

/* More base never lowers -log10 of the proton activity: each root is sought from the last one
 * upwards, first this near (pK units), then in growing steps. */
#define FIRST_STEP 0.05
#define GROWTH     4.0
/* The last root is known to less than this. */
#define BELOW_LAST 1e-9

static EnlSweep *
sweep_alloc (uint32_t n_points, uint32_t n_species, uint32_t n_acceptors)
{
  size_t rows = 3 + n_species + n_acceptors;
  EnlSweep *sweep = g_malloc0 (sizeof *sweep + rows * n_points * sizeof (double));
  double *row = (double *)(sweep + 1);

  sweep->n_points = n_points;
  sweep->n_species = n_species;
  sweep->equivalents = row;
  sweep->neutral = row + n_points;
  sweep->unused = row + 2 * n_points;
  sweep->fraction = row + 3 * n_points;
  sweep->bound = sweep->fraction + n_species * n_points;
  return sweep;
}

void
enl_sweep_free (EnlSweep *sweep)
{
  g_free (sweep);
}

static double
next_root (const EnlEquilibrium *p, double last, double high)
{
  double from = last - BELOW_LAST, step = FIRST_STEP;

  while (from + step < high && enl_balance_at (p, from + step) < 0.0) {
    from += step;
    step *= GROWTH;
  }
  return enl_balance_root (p, from, fmin (from + step, high));
}

/* Of the base that was added. Without any, what the first drop would find. */
static double
unused_share (const EnlEquilibrium *p, bool stoichiometric, const EnlComposition *at)
{
  if (!stoichiometric)
    return at->form[0][0];
  return p->removed > 0.0 ? at->unused / p->removed : 0.0;
}

static void
keep (EnlSweep *sweep, uint32_t point, const EnlEquilibrium *p, bool stoichiometric,
      const EnlComposition *at)
{
  sweep->neutral[point] = at->neutral;
  sweep->unused[point] = unused_share (p, stoichiometric, at);
  sweep->worst = fmax (sweep->worst, at->residual);
  for (uint32_t i = 0; i < p->n_species; i++)
    sweep->fraction[(size_t)i * sweep->n_points + point] = at->fraction[i];
  for (uint32_t i = 0; i < p->n_acceptors; i++)
    for (uint32_t k = 1; k <= p->acceptor[i].steps; k++)
      sweep->bound[(size_t)i * sweep->n_points + point] += k * at->form[i][k];
}

static EnlStatus
check_sweep (const EnlEquilibrium *p, bool stoichiometric, double most, uint32_t n_points,
             EnlError *err)
{
  EnlStatus status = enl_balance_check (p, err);

  if (status == ENL_OK && (n_points < 2 || !(most > 0.0) || !isfinite (most)))
    status = enl_error_set (err, ENL_ERROR_RANGE, "ask for 2 points or more over some equivalents",
                            "a sweep of %u points over %g equivalents", n_points, most);
  if (status == ENL_OK && !stoichiometric && p->n_acceptors == 0)
    status = enl_error_set (err, ENL_ERROR_RANGE, "add a base", "a sweep without a base");
  return status;
}

EnlStatus
enl_sweep_new (const EnlEquilibrium *problem, bool stoichiometric, double most, uint32_t n_points,
               EnlSweep **out, EnlError *err)
{
  EnlEquilibrium p = *problem;
  EnlAcceptor acceptor[ENL_MAX_ACCEPTORS];
  EnlStatus status = check_sweep (problem, stoichiometric, most, n_points, err);
  double low, high;

  *out = NULL;
  if (status != ENL_OK)
    return status;
  memcpy (acceptor, problem->acceptor, problem->n_acceptors * sizeof *acceptor);
  p.acceptor = acceptor;
  EnlSweep *sweep = sweep_alloc (n_points, p.n_species, p.n_acceptors);
  g_autofree EnlComposition *at = g_new (EnlComposition, 1);
  enl_balance_bracket (&p, &low, &high);
  for (uint32_t i = 0; i < n_points; i++) {
    sweep->equivalents[i] = most * i / (n_points - 1);
    *(stoichiometric ? &p.removed : &acceptor[0].amount) = sweep->equivalents[i] * p.substrate;
    low = i == 0 ? enl_balance_root (&p, low, high) : next_root (&p, low, high);
    enl_balance_compose (&p, low, at);
    keep (sweep, i, &p, stoichiometric, at);
  }
  *out = sweep;
  return ENL_OK;
}
