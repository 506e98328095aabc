/* Algebra of a Gaussian process with a given covariance matrix.
 *
 * Rasmussen and Williams, Gaussian Processes for Machine Learning, 2006: prediction and variance
 * by eq. 2.25 and 2.26 (algorithm 2.1), leaving out by the block form of eq. 5.12.
 */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include "core/base/error.h"

/* Lower triangles are packed by rows: element (i, j), j <= i, at i (i + 1) / 2 + j. */
#define ENL_PACKED(i, j) ((size_t)(i) * ((size_t)(i) + 1) / 2 + (j))

/* Cholesky factor of the symmetric positive definite packed matrix, in place; ENL_ERROR_NUMERIC
 * when it is not positive definite. */
EnlStatus enl_gaussian_factor (double *matrix, uint32_t n, EnlError *err) ENL_MUST_USE;
/* The same when the first `done` rows hold a factor already and only the rows behind them are new
 * (bordering): the result is that of factoring the whole, bit by bit. */
EnlStatus enl_gaussian_factor_on (double *matrix, uint32_t done, uint32_t n,
                                  EnlError *err) ENL_MUST_USE;

/* Solves L x = b in place for `m` right-hand sides of n numbers each, one after the other. */
void enl_gaussian_forward (const double *factor, uint32_t n, double *b, uint32_t m);
/* Solves L' x = b likewise. */
void enl_gaussian_backward (const double *factor, uint32_t n, double *b, uint32_t m);

/* Inverse of the matrix whose factor this is, packed; new array of n (n + 1) / 2 (g_free). */
double *enl_gaussian_inverse (const double *factor, uint32_t n) ENL_MUST_USE;

/* Left-out predictions in closed form. Members of one fold leave together: fold[i] names the fold
 * of row i (any numbers). For every row, given that its whole fold is unknown: error[i] =
 * predicted - y[i], variance[i] of a new observation there, noise included. `alpha` is the inverse
 * times y - mean. */
void enl_gaussian_left_out (const double *inverse, const double *alpha, uint32_t n,
                            const uint32_t *fold, double *error, double *variance);

/* One fold alone: the `m` rows in `row` leave together; error[k] and variance[k] are those of
 * row[k]. */
void enl_gaussian_leave_out (const double *inverse, const double *alpha, const uint32_t *row,
                             uint32_t m, double *error, double *variance);

/* y = A x for a packed symmetric matrix. */
void enl_gaussian_multiply (const double *matrix, uint32_t n, const double *x, double *y);

/* Sum of the products of two rows. */
double enl_gaussian_dot (const double *a, const double *b, size_t n);
