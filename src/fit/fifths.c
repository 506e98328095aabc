#include "fit/fifths.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "core/acidity/gaussian.h"
#include "core/acidity/model.h"
#include "core/base/table.h"
#include "fit/tune.h"

#define FOLDS 5

typedef struct {
  double error, half;
  EnlAcidClass class_of;
  EnlSolvent solvent;
} Result;

/* Table text with the rows for which `keep` is true; the line structure is that of the source. */
static char *
part_of (const char *text, size_t size, const EnlTable *table, const bool *keep)
{
  GString *part = g_string_new (NULL);
  g_autofree char *copy = g_strndup (text, size);
  g_auto (GStrv) line = g_strsplit (copy, "\n", -1);

  for (size_t i = 0, row = 0; line[i]; i++) {
    bool data = row < enl_table_rows (table) && enl_table_line (table, row) == i + 1;
    if (!data || keep[row])
      g_string_append_printf (part, "%s\n", line[i]);
    row += data;
  }
  return g_string_free (part, FALSE);
}

/* What a model says about one row of another table. */
static Result
judge (const EnlModel *model, const EnlSiteSet *raw, uint32_t which, const EnlReferenceRow *row)
{
  uint32_t n = model->rows->n;
  g_autoptr (EnlSiteSet) set = enl_site_set_new (1);
  g_autofree double *k = g_new (double, n + 1);
  EnlKernelParts parts;
  double mean = ENL_PRIOR_PKA, variance;

  memcpy (set->owned_z, raw->z + (size_t)which * ENL_N_DESCRIPTORS,
          ENL_N_DESCRIPTORS * sizeof (float));
  set->shells[0] = raw->shells[which];
  set->element[0] = raw->element[which];
  set->solvent[0] = raw->solvent[which];
  enl_site_set_standardise (set, model->centre, model->scale);
  for (uint32_t i = 0; i < n; i++) {
    enl_kernel_pair (&model->relevance, set, 0, model->rows, i, &parts);
    k[i] = enl_kernel_value (&model->hyper, &parts);
    mean += k[i] * model->alpha[i];
  }
  enl_kernel_pair (&model->relevance, set, 0, set, 0, &parts);
  enl_gaussian_forward (model->factor, n, k, 1);
  variance = enl_kernel_value (&model->hyper, &parts) - enl_gaussian_dot (k, k, n) +
             model->hyper.value[ENL_H_noise] + row->sigma * row->sigma;
  EnlAcidClass class_of = enl_acid_class (row->mol, row->site);
  return (Result){mean - row->pka, sqrt (variance) * model->width[class_of][row->solvent], class_of,
                  row->solvent};
}

static int
compare_doubles (const void *a, const void *b)
{
  double x = *(const double *)a, y = *(const double *)b;

  return (x > y) - (x < y);
}

static void
print_class (const char *name, unsigned classes, EnlSolvent solvent, const Result *result,
             uint32_t n)
{
  g_autofree double *size = g_new (double, n + 1);
  double sum = 0, square = 0;
  uint32_t m = 0, inside = 0;

  for (uint32_t i = 0; i < n; i++) {
    if (result[i].solvent != solvent || !(classes >> result[i].class_of & 1))
      continue;
    size[m] = fabs (result[i].error);
    sum += size[m];
    square += size[m] * size[m];
    inside += size[m] <= result[i].half;
    m++;
  }
  if (m == 0)
    return;
  qsort (size, m, sizeof *size, compare_doubles);
  printf ("%-6s %-24s n %3u  MAE %.2f  median %.2f  rmse %.2f  cover %.2f\n",
          enl_solvent_id (solvent), name, m, sum / m, size[m / 2], sqrt (square / m),
          (double)inside / m);
}

static EnlStatus
run_fold (const char *text, size_t size, const EnlReference *all, const EnlTable *table,
          const EnlSiteSet *raw, const bool *keep, uint32_t steps, Result *result, EnlError *err)
{
  g_autofree char *part = part_of (text, size, table, keep);
  g_autoptr (EnlReference) ref = NULL;
  g_autoptr (EnlTuner) tuner = NULL;
  g_autoptr (EnlModel) model = NULL;
  EnlHyper hyper;
  EnlStatus status;

  enl_hyper_init (&hyper);
  if ((status = enl_reference_new (part, strlen (part), &ref, err)) != ENL_OK ||
      (status = enl_tuner_new (ref, &tuner, err)) != ENL_OK)
    return status;
  enl_tuner_run (tuner, &hyper, steps, false);
  if ((status = enl_model_build (ref, &hyper, &model, err)) != ENL_OK)
    return status;
  for (uint32_t i = 0; i < enl_reference_rows (all); i++)
    if (!keep[i])
      result[i] = judge (model, raw, i, enl_reference_row (all, i));
  return ENL_OK;
}

EnlStatus
enl_fifths_print (const char *text, size_t size, uint32_t steps, EnlError *err)
{
  g_autoptr (EnlReference) all = NULL;
  g_autoptr (EnlTable) table = NULL;
  g_autoptr (EnlSiteSet) raw = NULL;
  EnlStatus status;

  if ((status = enl_reference_new (text, size, &all, err)) != ENL_OK ||
      (status = enl_table_parse (text, size, &table, err)) != ENL_OK ||
      (status = enl_model_describe (all, &raw, err)) != ENL_OK)
    return status;
  uint32_t n = enl_reference_rows (all);
  g_autofree bool *keep = g_new (bool, n + 1);
  g_autofree Result *result = g_new0 (Result, n + 1);
  for (uint32_t fold = 0; fold < FOLDS; fold++) {
    for (uint32_t i = 0; i < n; i++)
      keep[i] = g_str_hash (enl_reference_row (all, i)->key) % FOLDS != fold;
    if ((status = run_fold (text, size, all, table, raw, keep, steps, result, err)) != ENL_OK)
      return status;
    fprintf (stderr, "fold %u done\n", fold + 1);
  }
  for (int solvent = 0; solvent < ENL_MODEL_SOLVENTS; solvent++) {
    print_class ("alpha C-H of carbonyls", 1u << ENL_CLASS_ALPHA, (EnlSolvent)solvent, result, n);
    print_class ("all C-H", 1u << ENL_CLASS_ALPHA | 1u << ENL_CLASS_CARBON, (EnlSolvent)solvent,
                 result, n);
    print_class ("N-H", 1u << ENL_CLASS_NITROGEN, (EnlSolvent)solvent, result, n);
    print_class ("O-H", 1u << ENL_CLASS_OXYGEN, (EnlSolvent)solvent, result, n);
    print_class ("all", ~0u, (EnlSolvent)solvent, result, n);
  }
  return ENL_OK;
}
