#include "core/acidity/ranking.h"

#include <math.h>
#include <string.h>

#include "core/acidity/family.h"
#include "core/acidity/gaussian.h"
#include "core/acidity/trial.h"

const char *
enl_pair_kind_text (EnlPairKind kind)
{
  static const char *const text[] = {"sites of one molecule", "compounds of one family"};

  g_assert (kind < ENL_N_PAIR_KINDS);
  return text[kind];
}

bool
enl_pair_is_right (double published, double estimated)
{
  return (published > 0 && estimated > 0) || (published < 0 && estimated < 0);
}

typedef struct {
  const EnlTrial *trial;
  uint32_t *family, *compound; /* of every row */
  double *inverse, *fitted;
  /* Work space for two folds. */
  uint32_t *row;
  double *error, *variance;
} Ranking;

static void
number_families (const EnlReference *ref, uint32_t *family)
{
  g_autoptr (GHashTable) seen = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, NULL);

  for (uint32_t i = 0; i < enl_reference_rows (ref); i++) {
    const EnlReferenceRow *row = enl_reference_row (ref, i);
    g_autofree char *core = enl_family_of (row->mol, row->site);
    /* one core can hold two kinds of acid: hydroxamic acids lose N-H or O-H */
    char *key = g_strdup_printf ("%u %s", enl_molecule_atom (row->mol, row->site)->element, core);
    gpointer number = g_hash_table_lookup (seen, key);
    if (!number) {
      number = GUINT_TO_POINTER (g_hash_table_size (seen) + 1);
      g_hash_table_insert (seen, g_steal_pointer (&key), number);
    }
    g_free (key);
    family[i] = GPOINTER_TO_UINT (number) - 1;
  }
}

/* Difference of two left-out predictions when the folds of both rows leave together. */
static double
left_out_difference (const Ranking *r, uint32_t a, uint32_t b)
{
  const EnlTrial *t = r->trial;
  uint32_t m = 0, at_a = 0, at_b = 0;

  if (t->fold[a] == t->fold[b])
    return t->error[a] - t->error[b];
  for (uint32_t i = 0; i < t->n; i++) {
    if (t->fold[i] != t->fold[a] && t->fold[i] != t->fold[b])
      continue;
    if (i == a)
      at_a = m;
    if (i == b)
      at_b = m;
    r->row[m++] = i;
  }
  enl_gaussian_leave_out (r->inverse, t->model->alpha, r->row, m, r->error, r->variance);
  return r->error[at_a] - r->error[at_b];
}

/* True when the two rows make a pair. */
static bool
pair_kind (const Ranking *r, uint32_t a, uint32_t b, EnlPairKind *kind)
{
  const EnlReferenceRow *x = enl_reference_row (r->trial->ref, a);
  const EnlReferenceRow *y = enl_reference_row (r->trial->ref, b);

  /* a hair above the gap, so that 24.7 - 23.7 is not a pair by the way doubles round */
  if (x->solvent != y->solvent || !(fabs (x->pka - y->pka) > ENL_PAIR_GAP + 1e-9))
    return false;
  *kind = r->compound[a] == r->compound[b] ? ENL_PAIR_SITES : ENL_PAIR_FAMILY;
  return *kind == ENL_PAIR_SITES || r->family[a] == r->family[b];
}

static GArray *
collect (const Ranking *r)
{
  GArray *list = g_array_new (FALSE, FALSE, sizeof (EnlPair));
  const EnlReference *ref = r->trial->ref;
  EnlPairKind kind;

  for (uint32_t i = 0; i < r->trial->n; i++)
    for (uint32_t j = i + 1; j < r->trial->n; j++) {
      if (!pair_kind (r, i, j, &kind))
        continue;
      double published = enl_reference_row (ref, i)->pka - enl_reference_row (ref, j)->pka;
      EnlPair pair = {.kind = kind,
                      .first = i,
                      .second = j,
                      .family = r->family[i],
                      .published = published,
                      .fitted = r->fitted[i] - r->fitted[j],
                      .left_out = published + left_out_difference (r, i, j)};
      g_array_append_val (list, pair);
    }
  return list;
}

EnlStatus
enl_rank_pairs (const EnlReference *ref, const char *model_bytes, size_t size, EnlFold fold,
                EnlPair **out, uint32_t *n, EnlError *err)
{
  g_autoptr (EnlTrial) trial = NULL;
  EnlStatus status = enl_trial_new (ref, model_bytes, size, fold, &trial, err);

  *out = NULL;
  *n = 0;
  if (status != ENL_OK)
    return status;
  uint32_t rows = trial->n;
  g_autofree uint32_t *family = g_new (uint32_t, rows + 1);
  g_autofree uint32_t *compound = g_new (uint32_t, rows + 1);
  g_autofree double *fitted = g_new (double, rows + 1);
  g_autofree double *inverse = enl_gaussian_inverse (trial->model->factor, rows);
  g_autofree uint32_t *row = g_new (uint32_t, rows + 1);
  g_autofree double *error = g_new (double, rows + 1);
  g_autofree double *variance = g_new (double, rows + 1);
  number_families (ref, family);
  enl_model_compound_folds (ref, compound);
  enl_model_fitted (trial->model, ref, fitted);
  const Ranking ranking = {trial, family, compound, inverse, fitted, row, error, variance};
  GArray *list = collect (&ranking);
  *n = list->len;
  *out = (EnlPair *)(void *)g_array_free (list, FALSE);
  return ENL_OK;
}
