#include "core/acidity/gaussian.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

double
enl_gaussian_dot (const double *a, const double *b, size_t n)
{
  /* Four strands: the compiler may not reorder a floating sum by itself. */
  double s[4] = {0};
  size_t k = 0;

  for (; k + 4 <= n; k += 4)
    for (int j = 0; j < 4; j++)
      s[j] += a[k + j] * b[k + j];
  for (; k < n; k++)
    s[0] += a[k] * b[k];
  return s[0] + s[1] + s[2] + s[3];
}

EnlStatus
enl_gaussian_factor (double *matrix, uint32_t n, EnlError *err)
{
  return enl_gaussian_factor_on (matrix, 0, n, err);
}

EnlStatus
enl_gaussian_factor_on (double *matrix, uint32_t done, uint32_t n, EnlError *err)
{
  for (uint32_t i = done; i < n; i++) {
    double *row = matrix + ENL_PACKED (i, 0);
    for (uint32_t j = 0; j < i; j++) {
      const double *other = matrix + ENL_PACKED (j, 0);
      row[j] = (row[j] - enl_gaussian_dot (row, other, j)) / other[j];
    }
    double left = row[i] - enl_gaussian_dot (row, row, i);
    if (!(left > 0) || !isfinite (left))
      return enl_error_set (err, ENL_ERROR_NUMERIC, "look for contradictory or damaged rows",
                            "the covariance matrix is not positive definite (row %u)", i + 1);
    row[i] = sqrt (left);
  }
  return ENL_OK;
}

void
enl_gaussian_forward (const double *factor, uint32_t n, double *b, uint32_t m)
{
  for (uint32_t i = 0; i < n; i++) {
    const double *row = factor + ENL_PACKED (i, 0);
    for (uint32_t k = 0; k < m; k++) {
      double *x = b + (size_t)k * n;
      x[i] = (x[i] - enl_gaussian_dot (row, x, i)) / row[i];
    }
  }
}

/* to -= factor * from, four at a time so that the compiler uses its vectors. */
static void
subtract_multiple (double *to, const double *from, double factor, size_t n)
{
  size_t k = 0;

  for (; k + 4 <= n; k += 4)
    for (int j = 0; j < 4; j++)
      to[k + j] -= factor * from[k + j];
  for (; k < n; k++)
    to[k] -= factor * from[k];
}

void
enl_gaussian_backward (const double *factor, uint32_t n, double *b, uint32_t m)
{
  for (uint32_t i = n; i-- > 0;) {
    const double *row = factor + ENL_PACKED (i, 0);
    for (uint32_t k = 0; k < m; k++) {
      double *x = b + (size_t)k * n;
      x[i] /= row[i];
      subtract_multiple (x, row, x[i], i);
    }
  }
}

/* Inverse of the factor, transposed: row j holds column j of L^-1 from its diagonal on, so that
 * both the recurrence and the product below run along memory. */
static double *
invert_factor (const double *factor, uint32_t n)
{
  double *column = g_new0 (double, (size_t)n *n + 1);

  for (uint32_t j = 0; j < n; j++) {
    double *c = column + (size_t)j * n;
    c[j] = 1 / factor[ENL_PACKED (j, j)];
    for (uint32_t i = j + 1; i < n; i++) {
      const double *row = factor + ENL_PACKED (i, 0);
      c[i] = -enl_gaussian_dot (row + j, c + j, i - j) / row[i];
    }
  }
  return column;
}

double *
enl_gaussian_inverse (const double *factor, uint32_t n)
{
  g_autofree double *column = invert_factor (factor, n);
  double *inverse = g_new (double, ENL_PACKED (n, 0) + 1);

  for (uint32_t i = 0; i < n; i++)
    for (uint32_t j = 0; j <= i; j++)
      inverse[ENL_PACKED (i, j)] =
          enl_gaussian_dot (column + (size_t)i * n + i, column + (size_t)j * n + i, n - i);
  return inverse;
}

void
enl_gaussian_multiply (const double *matrix, uint32_t n, const double *x, double *y)
{
  memset (y, 0, n * sizeof *y);
  for (uint32_t i = 0; i < n; i++) {
    const double *row = matrix + ENL_PACKED (i, 0);
    y[i] += enl_gaussian_dot (row, x, i + 1);
    for (uint32_t j = 0; j < i; j++)
      y[j] += row[j] * x[i];
  }
}

typedef struct {
  uint32_t fold, row;
} Member;

static int
compare_members (const void *a, const void *b)
{
  const Member *x = a, *y = b;

  if (x->fold != y->fold)
    return x->fold < y->fold ? -1 : 1;
  return (x->row > y->row) - (x->row < y->row);
}

/* The block of the inverse, inverted, is the covariance of these observations given all the others;
 * times alpha it is their error. */
void
enl_gaussian_leave_out (const double *inverse, const double *alpha, const uint32_t *row, uint32_t m,
                        double *error, double *variance)
{
  g_autofree double *block = g_new (double, ENL_PACKED (m, 0) + 1);
  g_autofree double *part = g_new (double, m + 1);

  for (uint32_t i = 0; i < m; i++) {
    part[i] = alpha[row[i]];
    for (uint32_t j = 0; j <= i; j++)
      block[ENL_PACKED (i, j)] = inverse[ENL_PACKED (MAX (row[i], row[j]), MIN (row[i], row[j]))];
  }
  EnlStatus status = enl_gaussian_factor (block, m, NULL);
  g_assert (status == ENL_OK); /* a principal block of a positive definite matrix */
  g_autofree double *covariance = enl_gaussian_inverse (block, m);
  enl_gaussian_multiply (covariance, m, part, error);
  for (uint32_t i = 0; i < m; i++) {
    error[i] = -error[i];
    variance[i] = covariance[ENL_PACKED (i, i)];
  }
}

void
enl_gaussian_left_out (const double *inverse, const double *alpha, uint32_t n, const uint32_t *fold,
                       double *error, double *variance)
{
  g_autofree Member *member = g_new (Member, n + 1);
  g_autofree uint32_t *row = g_new (uint32_t, n + 1);
  g_autofree double *e = g_new (double, n + 1);
  g_autofree double *v = g_new (double, n + 1);

  for (uint32_t i = 0; i < n; i++)
    member[i] = (Member){fold[i], i};
  qsort (member, n, sizeof *member, compare_members);
  for (uint32_t i = 0; i < n; i++)
    row[i] = member[i].row;
  for (uint32_t i = 0, end; i < n; i = end) {
    for (end = i + 1; end < n && member[end].fold == member[i].fold;)
      end++;
    enl_gaussian_leave_out (inverse, alpha, row + i, end - i, e, v);
    for (uint32_t k = i; k < end; k++) {
      error[row[k]] = e[k - i];
      variance[row[k]] = v[k - i];
    }
  }
}
