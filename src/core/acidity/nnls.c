#include "core/acidity/nnls.h"

#include <math.h>
#include <stdlib.h>

/* Gradients smaller than this, relative to the largest number of the problem, count as zero. */
#define TOLERANCE 1e-12

typedef struct {
  const double *gram, *linear;
  uint32_t n, n_passive;
  double sum, scale;
  double *x, *trial;
  double multiplier;
  bool *passive;
  uint32_t *index; /* passive variables */
} Nnls;

static void
list_passive (Nnls *p)
{
  p->n_passive = 0;
  for (uint32_t i = 0; i < p->n; i++)
    if (p->passive[i])
      p->index[p->n_passive++] = i;
}

/* Cholesky factor of the passive part of the matrix, in its lower half. Not GSL's, whose answer to
 * a matrix that is not positive definite is a handler shared by the whole program. */
static bool
factorise (const Nnls *p, double *l)
{
  uint32_t m = p->n_passive;

  for (uint32_t i = 0; i < m; i++)
    for (uint32_t j = 0; j <= i; j++) {
      double rest = p->gram[(size_t)p->index[i] * p->n + p->index[j]];
      for (uint32_t k = 0; k < j; k++)
        rest -= l[(size_t)i * m + k] * l[(size_t)j * m + k];
      if (i == j && !(rest > 0.0))
        return false;
      l[(size_t)i * m + j] = i == j ? sqrt (rest) : rest / l[(size_t)j * m + j];
    }
  return true;
}

static void
solve_factored (const double *l, uint32_t m, double *x)
{
  for (uint32_t i = 0; i < m; i++) {
    for (uint32_t k = 0; k < i; k++)
      x[i] -= l[(size_t)i * m + k] * x[k];
    x[i] /= l[(size_t)i * m + i];
  }
  for (uint32_t i = m; i-- > 0;) {
    for (uint32_t k = i + 1; k < m; k++)
      x[i] -= l[(size_t)k * m + i] * x[k];
    x[i] /= l[(size_t)i * m + i];
  }
}

/* Unconstrained minimum over the passive variables with the given sum: with G a = g and G b = 1,
 * x = a + m b, where m makes the sum right. */
static bool
solve_passive (Nnls *p)
{
  uint32_t m = p->n_passive;
  g_autofree double *l = g_new (double, (size_t)m *m);
  g_autofree double *a = g_new (double, m);
  g_autofree double *b = g_new (double, m);
  double sum_a = 0.0, sum_b = 0.0;

  if (!factorise (p, l))
    return false;
  for (uint32_t i = 0; i < m; i++) {
    a[i] = p->linear[p->index[i]];
    b[i] = 1.0;
  }
  solve_factored (l, m, a);
  solve_factored (l, m, b);
  for (uint32_t i = 0; i < m; i++) {
    sum_a += a[i];
    sum_b += b[i];
  }
  p->multiplier = (p->sum - sum_a) / sum_b;
  for (uint32_t i = 0; i < m; i++)
    p->trial[p->index[i]] = a[i] + p->multiplier * b[i];
  return true;
}

/* Moves x towards the trial point until the first variable reaches zero, and frees that one.
 * True when the trial point itself was allowed. */
static bool
step_back (Nnls *p)
{
  double alpha = 1.0;

  for (uint32_t k = 0; k < p->n_passive; k++) {
    uint32_t i = p->index[k];
    if (p->trial[i] <= 0.0)
      alpha = MIN (alpha, p->x[i] / (p->x[i] - p->trial[i]));
  }
  bool whole = true;
  for (uint32_t k = 0; k < p->n_passive; k++) {
    uint32_t i = p->index[k];
    p->x[i] += alpha * (p->trial[i] - p->x[i]);
    if (p->trial[i] <= 0.0 && p->x[i] <= TOLERANCE * p->sum) {
      p->x[i] = 0.0;
      p->passive[i] = false;
      whole = false;
    }
  }
  list_passive (p);
  return whole;
}

/* The variable at zero whose growth would lower the sum of squares most, or n. */
static uint32_t
best_entry (const Nnls *p)
{
  uint32_t best = p->n;
  double most = TOLERANCE * p->scale;

  for (uint32_t i = 0; i < p->n; i++) {
    if (p->passive[i])
      continue;
    double gain = p->linear[i] + p->multiplier;
    for (uint32_t k = 0; k < p->n_passive; k++)
      gain -= p->gram[(size_t)i * p->n + p->index[k]] * p->x[p->index[k]];
    if (gain > most) {
      most = gain;
      best = i;
    }
  }
  return best;
}

/* Start: all of the sum on the variable that alone does best. */
static void
start (Nnls *p)
{
  uint32_t best = 0;
  double lowest = INFINITY;

  for (uint32_t i = 0; i < p->n; i++) {
    double diagonal = p->gram[(size_t)i * p->n + i];
    double value = 0.5 * diagonal * p->sum * p->sum - p->linear[i] * p->sum;
    p->scale = MAX (p->scale, MAX (fabs (diagonal) * p->sum, fabs (p->linear[i])));
    p->x[i] = 0.0;
    if (value < lowest) {
      lowest = value;
      best = i;
    }
  }
  p->x[best] = p->sum;
  p->passive[best] = true;
  list_passive (p);
}

bool
enl_nnls_solve (const double *gram, const double *linear, uint32_t n, double sum, double *x)
{
  g_autofree double *trial = g_new0 (double, n + 1);
  g_autofree bool *passive = g_new0 (bool, n + 1);
  g_autofree uint32_t *index = g_new0 (uint32_t, n + 1);
  Nnls p = {.gram = gram, .linear = linear, .n = n, .sum = sum};

  p.x = x;
  p.trial = trial;
  p.passive = passive;
  p.index = index;
  g_assert (n > 0 && sum > 0.0);
  start (&p);
  /* Every round ends at a lower value than the one before, so that no set of passive variables
   * comes twice; rounding could make it hang at the last digit, hence the bound. */
  for (uint32_t round = 0; round <= 3 * n; round++) {
    do {
      if (!solve_passive (&p))
        return false;
    } while (!step_back (&p));
    uint32_t entry = best_entry (&p);
    if (entry == n)
      break;
    passive[entry] = true;
    list_passive (&p);
  }
  return true;
}
