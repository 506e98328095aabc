#include "core/acidity/validate.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "core/acidity/model.h"

/* Rows of a class below which its interval is calibrated with all rows of the solvent. */
#define OWN_WIDTH_FROM 20
/* Two rows belong to one family when their surroundings are at least this alike. */
#define FAMILY_LIKENESS 0.55

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

/* Families: a row joins the first earlier row that leads a family and is alike enough, or leads
 * one of its own. Compounds stay together by joining the family of their first row. */
static void
cluster_folds (const EnlModel *model, const uint32_t *compound, uint32_t *fold)
{
  g_autoptr (GArray) leader = g_array_new (FALSE, FALSE, sizeof (uint32_t));
  EnlKernelParts parts;

  for (uint32_t i = 0; i < model->rows->n; i++) {
    fold[i] = ENL_NONE;
    if (compound[i] != i) {
      fold[i] = fold[compound[i]];
      continue;
    }
    for (guint k = 0; k < leader->len && fold[i] == ENL_NONE; k++) {
      uint32_t lead = g_array_index (leader, uint32_t, k);
      enl_kernel_parts (&model->hyper, &model->relevance, model->rows, i, model->rows, lead,
                        &parts);
      if (parts.likeness >= FAMILY_LIKENESS)
        fold[i] = lead;
    }
    if (fold[i] == ENL_NONE) {
      fold[i] = i;
      g_array_append_val (leader, i);
    }
  }
}

typedef struct {
  const EnlReference *ref;
  EnlModel *model;
  uint32_t n;
  uint32_t *fold;
  EnlAcidClass *class_of;
  double *error, *sd, *half;
} Trial;

static void
trial_clear (Trial *trial)
{
  enl_model_free (trial->model);
  g_free (trial->fold);
  g_free (trial->class_of);
  g_free (trial->error);
  g_free (trial->sd);
  g_free (trial->half);
}

/* Width for one row: from the other folds of its class, else from those of its solvent. */
static double
width_for (const Trial *trial, uint32_t row, bool *use)
{
  const uint8_t *solvent = trial->model->rows->solvent;

  for (uint32_t i = 0; i < trial->n; i++)
    use[i] = solvent[i] == solvent[row] && trial->class_of[i] == trial->class_of[row];
  double width = enl_model_width_of (trial->error, trial->sd, use, trial->fold, trial->fold[row],
                                     trial->n, OWN_WIDTH_FROM - 1);
  if (!isnan (width))
    return width;
  for (uint32_t i = 0; i < trial->n; i++)
    use[i] = solvent[i] == solvent[row];
  return enl_model_width_of (trial->error, trial->sd, use, trial->fold, trial->fold[row], trial->n,
                             1);
}

static EnlStatus
trial_run (const EnlReference *ref, const char *bytes, size_t size, EnlFold fold, Trial *trial,
           EnlError *err)
{
  EnlStatus status = enl_model_open (ref, bytes, size, &trial->model, err);

  if (status != ENL_OK)
    return status;
  uint32_t n = trial->n = trial->model->rows->n;
  g_autofree uint32_t *compound = g_new (uint32_t, n + 1);
  g_autofree bool *use = g_new (bool, n + 1);
  trial->ref = ref;
  trial->fold = g_new (uint32_t, n + 1);
  trial->class_of = g_new (EnlAcidClass, n + 1);
  trial->error = g_new (double, n + 1);
  trial->sd = g_new (double, n + 1);
  trial->half = g_new (double, n + 1);
  enl_model_compound_folds (ref, compound);
  if (fold == ENL_FOLD_CLUSTER)
    cluster_folds (trial->model, compound, trial->fold);
  else
    memcpy (trial->fold, compound, n * sizeof *compound);
  enl_model_left_out (trial->model, trial->fold, trial->error, trial->sd);
  for (uint32_t i = 0; i < n; i++) {
    const EnlReferenceRow *row = enl_reference_row (ref, i);
    trial->class_of[i] = enl_acid_class (row->mol, row->site);
  }
  for (uint32_t i = 0; i < n; i++)
    trial->half[i] = trial->sd[i] * width_for (trial, i, use);
  return ENL_OK;
}

/* ---- scores ---- */

static const struct {
  const char *name;
  unsigned classes; /* bits of EnlAcidClass */
} group[] = {
    {"alpha C-H of carbonyls", 1u << ENL_CLASS_ALPHA},
    {"all C-H", 1u << ENL_CLASS_ALPHA | 1u << ENL_CLASS_CARBON},
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
score_group (const Trial *trial, size_t which, EnlSolvent solvent, EnlScore *score)
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
  Trial trial = {0};
  EnlStatus status = trial_run (ref, model_bytes, size, fold, &trial, err);

  *out = NULL;
  *n = 0;
  if (status == ENL_OK) {
    *out = g_new0 (EnlScore, ENL_COUNT (group) * ENL_MODEL_SOLVENTS);
    for (int solvent = 0; solvent < ENL_MODEL_SOLVENTS; solvent++)
      for (size_t k = 0; k < ENL_COUNT (group); k++)
        *n += score_group (&trial, k, (EnlSolvent)solvent, &(*out)[*n]);
  }
  trial_clear (&trial);
  return status;
}

EnlStatus
enl_validate_rows (const EnlReference *ref, const char *model_bytes, size_t size, EnlFold fold,
                   EnlLeftOut **out, EnlError *err)
{
  Trial trial = {0};
  EnlStatus status = trial_run (ref, model_bytes, size, fold, &trial, err);

  *out = NULL;
  if (status == ENL_OK) {
    *out = g_new0 (EnlLeftOut, trial.n + 1);
    for (uint32_t i = 0; i < trial.n; i++)
      (*out)[i] = (EnlLeftOut){
          .predicted = enl_reference_row (ref, i)->pka + trial.error[i],
          .sd = trial.sd[i],
          .half = trial.half[i],
      };
  }
  trial_clear (&trial);
  return status;
}
