#include "core/acidity/trial.h"

#include <math.h>
#include <string.h>

/* Rows of a class below which its interval is calibrated with all rows of the solvent. */
#define OWN_WIDTH_FROM 20
/* Two rows belong to one family when their surroundings are at least this alike. */
#define FAMILY_LIKENESS 0.55

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

void
enl_trial_free (EnlTrial *trial)
{
  if (!trial)
    return;
  enl_model_free (trial->model);
  g_free (trial->fold);
  g_free (trial->class_of);
  g_free (trial->error);
  g_free (trial->sd);
  g_free (trial->half);
  g_free (trial);
}

/* Width for one row: from the other folds of its class, else from those of its solvent. */
static double
width_for (const EnlTrial *trial, uint32_t row, bool *use)
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

static void
fill_folds (EnlTrial *trial, EnlFold fold)
{
  g_autofree uint32_t *compound = g_new (uint32_t, trial->n + 1);

  enl_model_compound_folds (trial->ref, compound);
  if (fold == ENL_FOLD_CLUSTER)
    cluster_folds (trial->model, compound, trial->fold);
  else
    memcpy (trial->fold, compound, trial->n * sizeof *compound);
}

EnlStatus
enl_trial_new (const EnlReference *ref, const char *bytes, size_t size, EnlFold fold,
               EnlTrial **out, EnlError *err)
{
  g_autoptr (EnlTrial) trial = g_new0 (EnlTrial, 1);
  EnlStatus status = enl_model_open (ref, bytes, size, &trial->model, err);

  *out = NULL;
  if (status != ENL_OK)
    return status;
  uint32_t n = trial->n = trial->model->rows->n;
  g_autofree bool *use = g_new (bool, n + 1);
  trial->ref = ref;
  trial->fold = g_new (uint32_t, n + 1);
  trial->class_of = g_new (EnlAcidClass, n + 1);
  trial->error = g_new (double, n + 1);
  trial->sd = g_new (double, n + 1);
  trial->half = g_new (double, n + 1);
  fill_folds (trial, fold);
  enl_model_left_out (trial->model, trial->fold, trial->error, trial->sd);
  for (uint32_t i = 0; i < n; i++) {
    const EnlReferenceRow *row = enl_reference_row (ref, i);
    trial->class_of[i] = enl_acid_class (row->mol, row->site);
  }
  for (uint32_t i = 0; i < n; i++)
    trial->half[i] = trial->sd[i] * width_for (trial, i, use);
  *out = g_steal_pointer (&trial);
  return ENL_OK;
}
