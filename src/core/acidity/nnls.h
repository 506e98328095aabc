/* Non-negative least squares with fixed sum. */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include "core/base/macros.h"

/* Minimises x'Gx/2 - g'x over x >= 0 with sum(x) = `sum`, where G is the symmetric positive
 * definite `n` x `n` matrix `gram` (row by row): the active-set method of C. L. Lawson and
 * R. J. Hanson, Solving Least Squares Problems (1974), chapter 23, with the sum kept by a Lagrange
 * multiplier. Fills `x`. False when the matrix is not positive definite. */
bool enl_nnls_solve (const double *gram, const double *linear, uint32_t n, double sum,
                     double *x) ENL_MUST_USE;
