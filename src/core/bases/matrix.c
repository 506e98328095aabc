#include "core/bases/matrix.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

const char *
enl_verdict_word (EnlVerdict verdict)
{
  static const char *const word[ENL_N_VERDICTS] = {
      [ENL_VERDICT_COMPLETE] = "complete",   [ENL_VERDICT_SHARED] = "shared",
      [ENL_VERDICT_LARGELY] = "largely",     [ENL_VERDICT_PARTIAL] = "partial",
      [ENL_VERDICT_TRACE] = "trace",         [ENL_VERDICT_NO] = "no",
      [ENL_VERDICT_REACTS] = "reacts",       [ENL_VERDICT_SOLVENT] = "not here",
      [ENL_VERDICT_NO_NUMBER] = "no number", [ENL_VERDICT_OFF_SCALE] = "off scale",
  };

  g_assert (verdict < ENL_N_VERDICTS);
  return word[verdict];
}

const EnlMatrixCell *
enl_matrix_cell (const EnlMatrix *m, uint32_t base, uint32_t substrate)
{
  g_assert (base < m->n_bases && substrate < m->n_substrates);
  return &m->cell[(size_t)base * m->n_substrates + substrate];
}

static void
fill_column (EnlMatrix *m, const EnlComparison *comparison, uint32_t substrate)
{
  for (uint32_t i = 0; i < comparison->n_candidates; i++) {
    const EnlCandidate *c = &comparison->candidate[i];
    EnlMatrixCell *cell = &m->cell[(size_t)c->base * m->n_substrates + substrate];
    *cell = (EnlMatrixCell){true, c->verdict, c->grade, c->conversion, g_strdup (c->reason)};
  }
}

/* ---- order ---- */

typedef struct {
  uint32_t base;
  double score; /* smaller is better */
} Rated;

typedef struct {
  const EnlBaseTable *bases;
  GHashTable *best; /* class -> best score in it, Rated */
} Order;

static bool
has_verdict (const EnlMatrix *m, uint32_t base)
{
  for (uint32_t k = 0; k < m->n_substrates; k++) {
    const EnlMatrixCell *cell = enl_matrix_cell (m, base, k);
    if (cell->asked && cell->grade != ENL_GRADE_UNJUDGED)
      return true;
  }
  return false;
}

/* The sum of the grades; within a grade the larger conversion is better. */
static double
score_of (const EnlMatrix *m, uint32_t base)
{
  double score = 0.0;

  for (uint32_t k = 0; k < m->n_substrates; k++) {
    const EnlMatrixCell *cell = enl_matrix_cell (m, base, k);
    if (cell->asked)
      score += cell->grade + (isnan (cell->conversion) ? 0.5 : 0.5 * (1.0 - cell->conversion));
  }
  return score;
}

static int
by_class (const void *a, const void *b, void *data)
{
  const Rated *left = a, *right = b;
  const Order *order = data;
  const char *one = enl_base_table_get (order->bases, left->base)->family;
  const char *other = enl_base_table_get (order->bases, right->base)->family;

  if (strcmp (one, other) != 0) {
    const Rated *first = g_hash_table_lookup (order->best, one);
    const Rated *second = g_hash_table_lookup (order->best, other);
    if (first->score != second->score)
      return first->score < second->score ? -1 : 1;
    return strcmp (one, other);
  }
  if (left->score != right->score)
    return left->score < right->score ? -1 : 1;
  return left->base < right->base ? -1 : left->base > right->base;
}

static void
sort_rows (EnlMatrix *m, const EnlBaseTable *bases)
{
  g_autofree Rated *rated = g_new0 (Rated, m->n_rows);
  g_autoptr (GHashTable) best = g_hash_table_new (g_str_hash, g_str_equal);
  Order order = {bases, best};

  for (uint32_t i = 0; i < m->n_rows; i++) {
    const char *family = enl_base_table_get (bases, m->row[i])->family;
    rated[i] = (Rated){m->row[i], score_of (m, m->row[i])};
    const Rated *before = g_hash_table_lookup (best, family);
    if (!before || rated[i].score < before->score)
      g_hash_table_insert (best, (void *)family, &rated[i]);
  }
  /* The scores are looked up while the rows move: they stay where they are. */
  g_autofree Rated *sorted = g_memdup2 (rated, m->n_rows * sizeof *rated);
  g_qsort_with_data (sorted, (int)m->n_rows, sizeof *sorted, by_class, &order);
  for (uint32_t i = 0; i < m->n_rows; i++)
    m->row[i] = sorted[i].base;
}

EnlMatrix *
enl_matrix_new (const EnlBaseTable *bases, const EnlComparison *const *comparison, uint32_t n)
{
  EnlMatrix *m = g_new0 (EnlMatrix, 1);

  m->n_substrates = n;
  m->n_bases = enl_base_table_size (bases);
  m->cell = g_new0 (EnlMatrixCell, (size_t)m->n_bases * n);
  m->row = g_new0 (uint32_t, m->n_bases);
  m->unjudged = g_new0 (uint32_t, m->n_bases);
  for (uint32_t k = 0; k < n; k++)
    if (comparison[k])
      fill_column (m, comparison[k], k);
  for (uint32_t i = 0; i < m->n_bases; i++) {
    if (has_verdict (m, i))
      m->row[m->n_rows++] = i;
    else
      m->unjudged[m->n_unjudged++] = i;
  }
  sort_rows (m, bases);
  return m;
}

void
enl_matrix_free (EnlMatrix *m)
{
  if (!m)
    return;
  for (size_t i = 0; i < (size_t)m->n_bases * m->n_substrates; i++)
    g_free (m->cell[i].reason);
  g_free (m->cell);
  g_free (m->row);
  g_free (m->unjudged);
  g_free (m);
}
