#include "core/acidity/gaussian.h"

#include <math.h>

#include <gsl/gsl_linalg.h>

#include "tests/runner.h"

#define N 7

/* A positive definite matrix with nothing regular about it. */
static double
element (int i, int j)
{
  return exp (-0.3 * fabs (i * 1.37 - j * 1.37)) * (1 + 0.1 * i + 0.1 * j) + (i == j ? 0.4 : 0);
}

static void
fill (double *packed)
{
  for (int i = 0; i < N; i++)
    for (int j = 0; j <= i; j++)
      packed[ENL_PACKED (i, j)] = element (i, j);
}

/* Outside check: GSL's Cholesky decomposition and inverse of the same matrix. */
START_TEST (factor_and_inverse_agree_with_gsl)
{
  double packed[ENL_PACKED (N, 0)];
  gsl_matrix *a = gsl_matrix_alloc (N, N);

  fill (packed);
  for (int i = 0; i < N; i++)
    for (int j = 0; j < N; j++)
      gsl_matrix_set (a, i, j, element (i, j));
  gsl_linalg_cholesky_decomp1 (a);
  ck_assert_int_eq (enl_gaussian_factor (packed, N, NULL), ENL_OK);
  for (int i = 0; i < N; i++)
    for (int j = 0; j <= i; j++)
      ck_assert_double_eq_tol (packed[ENL_PACKED (i, j)], gsl_matrix_get (a, i, j), 1e-12);
  gsl_linalg_cholesky_invert (a);
  g_autofree double *inverse = enl_gaussian_inverse (packed, N);
  for (int i = 0; i < N; i++)
    for (int j = 0; j <= i; j++)
      ck_assert_double_eq_tol (inverse[ENL_PACKED (i, j)], gsl_matrix_get (a, i, j), 1e-11);
  gsl_matrix_free (a);
}
END_TEST

START_TEST (not_positive_definite_is_told)
{
  double packed[3] = {1, 2, 1};
  EnlError err;

  ck_assert_int_eq (enl_gaussian_factor (packed, 2, &err), ENL_ERROR_NUMERIC);
}
END_TEST

START_TEST (substitution_undoes_the_product)
{
  double packed[ENL_PACKED (N, 0)], x[2 * N], y[2 * N], column[N], product[N];

  for (int k = 0; k < 2; k++) {
    fill (packed);
    for (int i = 0; i < N; i++)
      column[i] = x[N * k + i] = sin (3.1 * i + k);
    enl_gaussian_multiply (packed, N, column, product);
    for (int i = 0; i < N; i++)
      y[N * k + i] = product[i];
  }
  ck_assert_int_eq (enl_gaussian_factor (packed, N, NULL), ENL_OK);
  enl_gaussian_forward (packed, N, y, 2);
  enl_gaussian_backward (packed, N, y, 2);
  for (int i = 0; i < 2 * N; i++)
    ck_assert_double_eq_tol (y[i], x[i], 1e-11);
}
END_TEST

/* Error and variance of `left` when the rows with its fold are really taken out. */
static void
refit (const double *y, const uint32_t *fold, uint32_t left, double *error, double *variance)
{
  double packed[ENL_PACKED (N, 0)], k[N], kept[N];
  uint32_t index[N], m = 0;

  for (uint32_t i = 0; i < N; i++)
    if (fold[i] != fold[left])
      index[m++] = i;
  for (uint32_t i = 0; i < m; i++) {
    kept[i] = y[index[i]];
    k[i] = element ((int)index[i], (int)left);
    for (uint32_t j = 0; j <= i; j++)
      packed[ENL_PACKED (i, j)] = element ((int)index[i], (int)index[j]);
  }
  ck_assert_int_eq (enl_gaussian_factor (packed, m, NULL), ENL_OK);
  enl_gaussian_forward (packed, m, kept, 1);
  enl_gaussian_forward (packed, m, k, 1);
  *error = enl_gaussian_dot (k, kept, m) - y[left];
  *variance = element ((int)left, (int)left) - enl_gaussian_dot (k, k, m);
}

START_TEST (closed_form_equals_leaving_out)
{
  const uint32_t fold[N] = {5, 2, 5, 9, 2, 7, 5};
  double packed[ENL_PACKED (N, 0)], y[N], alpha[N], error[N], variance[N];

  fill (packed);
  for (int i = 0; i < N; i++)
    alpha[i] = y[i] = cos (2.3 * i) * 4;
  ck_assert_int_eq (enl_gaussian_factor (packed, N, NULL), ENL_OK);
  enl_gaussian_forward (packed, N, alpha, 1);
  enl_gaussian_backward (packed, N, alpha, 1);
  g_autofree double *inverse = enl_gaussian_inverse (packed, N);
  enl_gaussian_left_out (inverse, alpha, N, fold, error, variance);
  for (uint32_t i = 0; i < N; i++) {
    double true_error, true_variance;
    refit (y, fold, i, &true_error, &true_variance);
    ck_assert_double_eq_tol (error[i], true_error, 1e-10);
    ck_assert_double_eq_tol (variance[i], true_variance, 1e-10);
  }
}
END_TEST

static Suite *
gaussian_suite (void)
{
  Suite *suite = suite_create ("acidity gaussian");
  TCase *tc = tcase_create ("all");

  tcase_add_test (tc, factor_and_inverse_agree_with_gsl);
  tcase_add_test (tc, not_positive_definite_is_told);
  tcase_add_test (tc, substitution_undoes_the_product);
  tcase_add_test (tc, closed_form_equals_leaving_out);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (gaussian_suite)
