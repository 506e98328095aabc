#include "core/acidity/trial.h"

#include <math.h>
#include <string.h>

#include "core/acidity/gaussian.h"

/* Rows of a class below which its interval is calibrated with all rows of the solvent. */
#define OWN_WIDTH_FROM 20
/* Two rows belong to one family when their surroundings are at least this alike. */
#define FAMILY_LIKENESS 0.70

static bool
alike (const EnlSiteSet *rows, uint32_t i, uint32_t j)
{
  return rows->element[i] == rows->element[j] &&
         enl_shells_likeness (&rows->shells[i], &rows->shells[j]) >= FAMILY_LIKENESS;
}

/* Families: a row joins the first earlier row that leads a family and is alike enough, or leads
 * one of its own. Compounds stay together by joining the family of their first row. */
static void
cluster_folds (const EnlModel *model, const uint32_t *compound, uint32_t *fold)
{
  g_autoptr (GArray) leader = g_array_new (FALSE, FALSE, sizeof (uint32_t));

  for (uint32_t i = 0; i < model->rows->n; i++) {
    fold[i] = ENL_NONE;
    if (compound[i] != i) {
      fold[i] = fold[compound[i]];
      continue;
    }
    for (guint k = 0; k < leader->len && fold[i] == ENL_NONE; k++) {
      uint32_t lead = g_array_index (leader, uint32_t, k);
      if (alike (model->rows, i, lead))
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

/* ---- intervals ---- */

/* Left-out errors of all compounds when the fold on trial is out as well: what the interval of a
 * row is calibrated on may not have seen the row either. */
typedef struct {
  const EnlTrial *trial;
  const double *inverse;
  const uint32_t *compound; /* of every row: its first row */
  uint32_t *out, m;         /* rows of the fold on trial */
  double *across;           /* for every row its elements of the inverse with `out`, n x m */
  double *solved;           /* the same times the inverse of their own block */
  double *error, *sd;       /* of the rows that are in */
  bool *use;
} Second;

static double
element (const Second *s, uint32_t i, uint32_t j)
{
  return s->inverse[ENL_PACKED (MAX (i, j), MIN (i, j))];
}

/* Prepares for the fold that `out` lists: the block form of taking rows out of an inverse. */
static void
second_start (Second *s)
{
  uint32_t m = s->m;
  g_autofree double *block = g_new (double, ENL_PACKED (m, 0) + 1);

  for (uint32_t i = 0; i < m; i++)
    for (uint32_t j = 0; j <= i; j++)
      block[ENL_PACKED (i, j)] = element (s, s->out[i], s->out[j]);
  EnlStatus status = enl_gaussian_factor (block, m, NULL);
  g_assert (status == ENL_OK); /* a principal block of a positive definite matrix */
  for (uint32_t i = 0; i < s->trial->n; i++)
    for (uint32_t k = 0; k < m; k++)
      s->across[(size_t)i * m + k] = s->solved[(size_t)i * m + k] = element (s, i, s->out[k]);
  enl_gaussian_forward (block, m, s->solved, s->trial->n);
  enl_gaussian_backward (block, m, s->solved, s->trial->n);
}

/* Leaves one more compound out: the `n` rows in `row`. */
static void
second_leave_out (Second *s, const uint32_t *row, uint32_t n)
{
  const double *alpha = s->trial->model->alpha;
  g_autofree double *block = g_new (double, ENL_PACKED (n, 0) + 1);
  g_autofree double *part = g_new (double, n + 1);
  g_autofree double *error = g_new (double, n + 1);

  for (uint32_t i = 0; i < n; i++) {
    const double *u = s->solved + (size_t)row[i] * s->m;
    part[i] = alpha[row[i]];
    for (uint32_t k = 0; k < s->m; k++)
      part[i] -= u[k] * alpha[s->out[k]];
    for (uint32_t j = 0; j <= i; j++)
      block[ENL_PACKED (i, j)] = element (s, row[i], row[j]) -
                                 enl_gaussian_dot (u, s->across + (size_t)row[j] * s->m, s->m);
  }
  EnlStatus status = enl_gaussian_factor (block, n, NULL);
  g_assert (status == ENL_OK);
  g_autofree double *covariance = enl_gaussian_inverse (block, n);
  enl_gaussian_multiply (covariance, n, part, error);
  for (uint32_t i = 0; i < n; i++) {
    s->error[row[i]] = -error[i];
    s->sd[row[i]] = sqrt (covariance[ENL_PACKED (i, i)]);
  }
}

static void
second_all_compounds (Second *s, uint32_t fold)
{
  const EnlTrial *t = s->trial;
  g_autofree uint32_t *row = g_new (uint32_t, t->n + 1);

  for (uint32_t i = 0; i < t->n; i++) {
    uint32_t n = 0;
    if (s->compound[i] != i || t->fold[i] == fold)
      continue;
    for (uint32_t k = i; k < t->n; k++)
      if (s->compound[k] == i)
        row[n++] = k;
    second_leave_out (s, row, n);
  }
}

/* Width for one row: from the other folds of its class, else from those of its solvent. */
static double
width_for (const Second *s, uint32_t row)
{
  const EnlTrial *t = s->trial;
  const uint8_t *solvent = t->model->rows->solvent;

  for (uint32_t i = 0; i < t->n; i++)
    s->use[i] = solvent[i] == solvent[row] && t->class_of[i] == t->class_of[row];
  double width =
      enl_model_width_of (s->error, s->sd, s->use, t->fold, t->fold[row], t->n, OWN_WIDTH_FROM - 1);
  if (!isnan (width))
    return width;
  for (uint32_t i = 0; i < t->n; i++)
    s->use[i] = solvent[i] == solvent[row];
  return enl_model_width_of (s->error, s->sd, s->use, t->fold, t->fold[row], t->n, 1);
}

static void
fill_intervals (EnlTrial *trial, const uint32_t *compound)
{
  uint32_t n = trial->n;
  g_autofree double *inverse = enl_gaussian_inverse (trial->model->factor, n);
  g_autofree uint32_t *out = g_new (uint32_t, n + 1);
  g_autofree double *across = g_new (double, (size_t)n *n + 1);
  g_autofree double *solved = g_new (double, (size_t)n *n + 1);
  g_autofree double *error = g_new0 (double, n + 1);
  g_autofree double *sd = g_new0 (double, n + 1);
  g_autofree bool *use = g_new (bool, n + 1);
  Second s = {trial, inverse, compound, out, 0, across, solved, error, sd, use};

  for (uint32_t i = 0; i < n; i++) {
    if (trial->fold[i] != i) /* a fold is named by its first row */
      continue;
    s.m = 0;
    for (uint32_t k = i; k < n; k++)
      if (trial->fold[k] == i)
        out[s.m++] = k;
    second_start (&s);
    second_all_compounds (&s, i);
    for (uint32_t k = 0; k < s.m; k++)
      trial->half[out[k]] = trial->sd[out[k]] * width_for (&s, out[k]);
  }
}

static void
fill_folds (EnlTrial *trial, EnlFold fold, uint32_t *compound)
{
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
  g_autofree uint32_t *compound = g_new (uint32_t, n + 1);
  trial->ref = ref;
  trial->fold = g_new (uint32_t, n + 1);
  trial->class_of = g_new (EnlAcidClass, n + 1);
  trial->error = g_new (double, n + 1);
  trial->sd = g_new (double, n + 1);
  trial->half = g_new (double, n + 1);
  fill_folds (trial, fold, compound);
  enl_model_left_out (trial->model, trial->fold, trial->error, trial->sd);
  for (uint32_t i = 0; i < n; i++) {
    const EnlReferenceRow *row = enl_reference_row (ref, i);
    trial->class_of[i] = enl_acid_class (row->mol, row->site);
  }
  fill_intervals (trial, compound);
  *out = g_steal_pointer (&trial);
  return ENL_OK;
}
