/* The descent: GSL's BFGS on the loss. */
#include "fit/tune.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include <gsl/gsl_errno.h>
#include <gsl/gsl_multimin.h>

#define FIRST_STEP     0.3
#define LINE_TOLERANCE 0.1
#define FLAT           1e-4
#define LEAST_GAIN     1e-4 /* of the loss, between two restarts */

static double
loss_only (const gsl_vector *x, void *data)
{
  return enl_tuner_loss (data, x->data, NULL);
}

static void
slope_only (const gsl_vector *x, void *data, gsl_vector *g)
{
  enl_tuner_loss (data, x->data, g->data);
}

static void
loss_and_slope (const gsl_vector *x, void *data, double *loss, gsl_vector *g)
{
  *loss = enl_tuner_loss (data, x->data, g->data);
}

void
enl_tuner_run (EnlTuner *tuner, EnlHyper *hyper, uint32_t steps, bool verbose)
{
  gsl_multimin_function_fdf function = {loss_only, slope_only, loss_and_slope, ENL_N_HYPER, tuner};
  gsl_multimin_fdfminimizer *minimizer =
      gsl_multimin_fdfminimizer_alloc (gsl_multimin_fdfminimizer_vector_bfgs2, ENL_N_HYPER);
  gsl_vector *start = gsl_vector_alloc (ENL_N_HYPER);
  gsl_error_handler_t *handler = gsl_set_error_handler_off ();
  double restarted = HUGE_VAL;

  g_assert (minimizer && start && start->stride == 1);
  for (int k = 0; k < ENL_N_HYPER; k++)
    gsl_vector_set (start, k, log (hyper->value[k]));
  gsl_multimin_fdfminimizer_set (minimizer, &function, start, FIRST_STEP, LINE_TOLERANCE);
  for (uint32_t step = 0; step < steps; step++) {
    if (gsl_multimin_fdfminimizer_iterate (minimizer) != GSL_SUCCESS) {
      /* The line search has lost its way: once more down the slope from the best place so far. */
      if (!(minimizer->f < restarted - LEAST_GAIN))
        break;
      restarted = minimizer->f;
      gsl_vector_memcpy (start, minimizer->x);
      gsl_multimin_fdfminimizer_set (minimizer, &function, start, FIRST_STEP, LINE_TOLERANCE);
    }
    if (verbose)
      fprintf (stderr, "step %u: loss %.5f\n", step + 1, minimizer->f);
    if (gsl_multimin_test_gradient (minimizer->gradient, FLAT) == GSL_SUCCESS)
      break;
  }
  for (int k = 0; k < ENL_N_HYPER; k++)
    hyper->value[k] = exp (gsl_vector_get (minimizer->x, k));
  gsl_set_error_handler (handler);
  gsl_vector_free (start);
  gsl_multimin_fdfminimizer_free (minimizer);
}
