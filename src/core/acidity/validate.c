#include "core/acidity/validate.h"

#include <math.h>
#include <stdlib.h>

#include <gsl/gsl_cdf.h>

#include "core/acidity/trial.h"

bool
enl_fold_parse (const char *text, EnlFold *out)
{
  if (g_ascii_strcasecmp (text, "compound") == 0)
    *out = ENL_FOLD_COMPOUND;
  else if (g_ascii_strcasecmp (text, "cluster") == 0)
    *out = ENL_FOLD_CLUSTER;
  else
    return false;
  return true;
}

double
enl_interval_scale (double nominal)
{
  g_assert (nominal > 0 && nominal < 1);
  return gsl_cdf_ugaussian_Pinv ((1 + nominal) / 2) / gsl_cdf_ugaussian_Pinv (0.95);
}

/* ---- scores ---- */

static const struct {
  const char *name;
  unsigned classes; /* bits of EnlAcidClass */
} group[] = {
    {"alpha C-H of carbonyls", 1u << ENL_CLASS_ALPHA},
    {"all C-H", 1u << ENL_CLASS_ALPHA | 1u << ENL_CLASS_CARBON},
    {"C-H other", 1u << ENL_CLASS_CARBON},
    {"N-H", 1u << ENL_CLASS_NITROGEN},
    {"O-H", 1u << ENL_CLASS_OXYGEN},
    {"S-H", 1u << ENL_CLASS_CHALCOGEN},
    {"all", (1u << ENL_N_CLASSES) - 1},
};

static int
compare_doubles (const void *a, const void *b)
{
  double x = *(const double *)a, y = *(const double *)b;

  return (x > y) - (x < y);
}

static bool
score_group (const EnlTrial *trial, size_t which, EnlSolvent solvent, EnlScore *score)
{
  g_autofree double *size = g_new (double, trial->n + 1);
  uint32_t n = 0, inside = 0;
  double sum = 0, square = 0;

  for (uint32_t i = 0; i < trial->n; i++) {
    if (trial->model->rows->solvent[i] != solvent ||
        !(group[which].classes >> trial->class_of[i] & 1))
      continue;
    size[n] = fabs (trial->error[i]);
    sum += size[n];
    square += size[n] * size[n];
    inside += size[n] <= trial->half[i];
    n++;
  }
  if (n == 0)
    return false;
  qsort (size, n, sizeof *size, compare_doubles);
  *score = (EnlScore){
      .class_name = group[which].name,
      .solvent = solvent,
      .n = n,
      .mae = sum / n,
      .median = n % 2 ? size[n / 2] : (size[n / 2 - 1] + size[n / 2]) / 2,
      .rmse = sqrt (square / n),
      .max = size[n - 1],
      .cover90 = (double)inside / n,
  };
  return true;
}

EnlStatus
enl_validate (const EnlReference *ref, const char *model_bytes, size_t size, EnlFold fold,
              EnlScore **out, uint32_t *n, EnlError *err)
{
  g_autoptr (EnlTrial) trial = NULL;
  EnlStatus status = enl_trial_new (ref, model_bytes, size, fold, &trial, err);

  *out = NULL;
  *n = 0;
  if (status != ENL_OK)
    return status;
  *out = g_new0 (EnlScore, ENL_COUNT (group) * ENL_MODEL_SOLVENTS);
  for (int solvent = 0; solvent < ENL_MODEL_SOLVENTS; solvent++)
    for (size_t k = 0; k < ENL_COUNT (group); k++)
      *n += score_group (trial, k, (EnlSolvent)solvent, &(*out)[*n]);
  return ENL_OK;
}

EnlStatus
enl_validate_rows (const EnlReference *ref, const char *model_bytes, size_t size, EnlFold fold,
                   EnlLeftOut **out, EnlError *err)
{
  g_autoptr (EnlTrial) trial = NULL;
  EnlStatus status = enl_trial_new (ref, model_bytes, size, fold, &trial, err);

  *out = NULL;
  if (status != ENL_OK)
    return status;
  *out = g_new0 (EnlLeftOut, trial->n + 1);
  for (uint32_t i = 0; i < trial->n; i++)
    (*out)[i] = (EnlLeftOut){
        .predicted = enl_reference_row (ref, i)->pka + trial->error[i],
        .sd = trial->sd[i],
        .half = trial->half[i],
    };
  return ENL_OK;
}
