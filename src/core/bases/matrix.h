/* All substrates against all bases: verdicts side by side. */
#pragma once

#include "core/bases/compare.h"

typedef struct {
  bool asked; /* the substrate has a site; else nothing below holds */
  EnlVerdict verdict;
  EnlGrade grade;
  double conversion;
  char *reason; /* one sentence, no full stop */
} EnlMatrixCell;

typedef struct {
  uint32_t n_substrates, n_bases;
  EnlMatrixCell *cell; /* n_bases rows of n_substrates, by index in the base table */
  uint32_t *row;       /* bases that have a verdict for any substrate, a class together: the class
                          that works best first, and so within a class */
  uint32_t n_rows;
  uint32_t *unjudged; /* the others, in the order of the table */
  uint32_t n_unjudged;
} EnlMatrix;

/* `comparison` has one entry a substrate, each of every base of `bases`, NULL for a substrate
 * without a site. Copies what it needs. Caller: enl_matrix_free. */
EnlMatrix *enl_matrix_new (const EnlBaseTable *bases, const EnlComparison *const *comparison,
                           uint32_t n_substrates) ENL_MUST_USE;
void enl_matrix_free (EnlMatrix *matrix);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlMatrix, enl_matrix_free)

const EnlMatrixCell *enl_matrix_cell (const EnlMatrix *matrix, uint32_t base, uint32_t substrate);
/* "complete", "partial", "reacts" ...: one or two short words for a cell, distinct. */
const char *enl_verdict_word (EnlVerdict verdict);
