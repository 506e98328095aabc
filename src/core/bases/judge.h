/* One base against one site: the equilibrium, its verdict and the words for it. The rules of
 * practice come on top (compare.h). */
#pragma once

#include "core/bases/compare.h"
#include "core/bases/ions.h"
#include "core/bases/mixture.h"

typedef struct {
  const EnlQuestion *question;
  const EnlIons *ions;
  double ceiling; /* pKaH of the solvent's own anion; NAN when it has no row */
} EnlJudge;

/* Borrows both. */
EnlJudge enl_judge_begin (const EnlQuestion *question, const EnlIons *ions);

/* Fills all numbers, marks and the verdict; no grade, words, reason or cautions. */
EnlStatus enl_judge_base (const EnlJudge *judge, uint32_t base, EnlCandidate *out,
                          EnlError *err) ENL_MUST_USE;

/* The equilibrium behind the numbers of a candidate that has a conversion. */
void enl_judge_mixture (const EnlJudge *judge, const EnlCandidate *candidate, EnlMixture *out);

/* One sentence about the equilibrium, no full stop. New string (g_free). */
char *enl_judge_reason (const EnlJudge *judge, const EnlCandidate *candidate) ENL_MUST_USE;
