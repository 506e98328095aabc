/* Why a value is what it is: the model's own predictions for a chain of ever simpler acids.
 *
 * Each line is the difference between two neighbours of the chain, so that the lines add up to the
 * value whatever the model is made of. The first line is the simplest acid, the parent; the last
 * ones say what published values and footings add to the model.
 */
#pragma once

#include "core/acidity/estimator.h"

#define ENL_WHY_LINES 6

typedef struct {
  char *words;  /* "second acyl group (acetyl)" */
  double value; /* pK units: of the parent itself, then differences with their sign */
} EnlWhyLine;

typedef struct {
  EnlWhyLine line[ENL_WHY_LINES];
  uint32_t n_lines; /* at least 1 */
  double value;     /* of the estimate: the sum of all lines */
  char *width;      /* one sentence on why the interval is as wide as it is */
} EnlWhy;

/* Explains the estimate of `site`; all belong together as in enl_estimator_run. Up to
 * ENL_WHY_MAX_LINKS predictions (why-chain.h). Thread-safe. Caller: enl_why_free. */
EnlWhy *enl_why_new (const EnlEstimator *estimator, const EnlMolecule *mol, const EnlSites *sites,
                     const EnlEstimate *estimate, uint32_t site) ENL_MUST_USE;
void enl_why_free (EnlWhy *why);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlWhy, enl_why_free)

/* The lines rounded to `decimals` places so that they add up to the value as it is printed with as
 * many places (largest remainder method); fills out[n_lines]. */
void enl_why_round (const EnlWhy *why, int decimals, double *out);
