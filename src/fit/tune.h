/* Hyperparameters by left-out prediction.
 *
 * The loss of one row is the negative logarithm of a Student density (4 degrees of freedom) of its
 * error when its whole compound is left out: what is one of a kind costs little more than what is
 * merely far off, so such rows do not steer the rest. A weak pull towards the starting values
 * (ridge on the logarithms) keeps the many relevances from chasing noise.
 */
#pragma once

#include "core/acidity/model.h"

typedef struct EnlTuner EnlTuner;

EnlStatus enl_tuner_new (const EnlReference *ref, EnlTuner **out, EnlError *err) ENL_MUST_USE;
void enl_tuner_free (EnlTuner *tuner);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlTuner, enl_tuner_free)

/* Mean loss at `theta` (logarithms of all hyperparameters) and, unless NULL, its gradient. A point
 * where the covariance cannot be factored has a very large loss. */
double enl_tuner_loss (EnlTuner *tuner, const double *theta, double *gradient);

/* Runs at most `steps` steps from `hyper` on and leaves the best point found there. Prints one line
 * per step on standard error when `verbose`. */
void enl_tuner_run (EnlTuner *tuner, EnlHyper *hyper, uint32_t steps, bool verbose);
