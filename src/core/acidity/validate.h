/* How good the estimates are: scores on compounds that the model has not seen.
 *
 * The closed form of leaving out (gaussian.h) gives, for every row, exactly what a model without
 * the rows of its fold would say: no left-out row takes part in its own prediction, nor in the
 * calibration of its own interval. That uses the errors of the other compounds, each left out
 * together with the fold, as a model without the fold would do it. Only the hyperparameters have
 * seen all rows.
 */
#pragma once

#include "core/acidity/reference.h"

typedef enum {
  ENL_FOLD_COMPOUND, /* all rows of one compound leave together, whatever site and solvent */
  ENL_FOLD_CLUSTER   /* all compounds of a family leave together: a harder question */
} EnlFold;

/* Errors are predicted minus published, in pK units. */
typedef struct {
  const char *
      class_name; /* "alpha C-H of carbonyls", "all C-H", "C-H other", "N-H", "O-H", "S-H", "all" */
  EnlSolvent solvent;
  uint32_t n;
  double mae, median, rmse, max; /* of the size of the error */
  double cover90;                /* fraction of rows inside their 90 % interval, 0..1 */
} EnlScore;

/* One left-out row. */
typedef struct {
  double predicted;
  double sd;   /* standard deviation that the model states, before calibration */
  double half; /* half width of the 90 % interval; NAN when its class cannot be calibrated */
} EnlLeftOut;

/* Scores by class and solvent; classes without a row are left out. `*out` is a new array (g_free).
 * The model is that of enl_estimator_open. */
EnlStatus enl_validate (const EnlReference *ref, const char *model_bytes, size_t size, EnlFold fold,
                        EnlScore **out, uint32_t *n, EnlError *err) ENL_MUST_USE;

/* The left-out rows themselves: new array (g_free), one for each row of the table. */
EnlStatus enl_validate_rows (const EnlReference *ref, const char *model_bytes, size_t size,
                             EnlFold fold, EnlLeftOut **out, EnlError *err) ENL_MUST_USE;

/* Half width of the interval that shall hold the share `nominal` (0..1) of all cases, relative to
 * that of the 90 % interval: the estimate states a normal distribution. */
double enl_interval_scale (double nominal);

/* "compound", "cluster"; false for another word. */
bool enl_fold_parse (const char *text, EnlFold *out);
