/* Numbers of bench practice that the verdicts need (resources/practice.tsv, one source a row). */
#pragma once

#include <stddef.h>

#include "core/acidity/estimate.h"
#include "core/base/error.h"

typedef struct {
  double alcohol_doubt; /* standard deviation, pK units, of a number of the water scale in an
                           alcohol */
  double second_charge[ENL_N_SOLVENTS]; /* how much weaker an acid is for each negative charge that
                                           the molecule carries elsewhere, pK units */
  double second_charge_shared; /* the same where both charges would share their room, as on the two
                                  sides of one C=O */
  double competing_within; /* an O-H, N-H ... this many pK units weaker than the site still counts
                              as an equivalent */
  double enough_gap;       /* pK units from which on deprotonation keeps clear of condensation */
  double excess;           /* equivalents per hydrogen for a complete deprotonation ... */
  double excess_most;      /* ... and the most that is usual */
  double deficit;          /* equivalents per hydrogen that let the anions equilibrate */
} EnlPractice;

EnlStatus enl_practice_parse (const char *text, size_t size, EnlPractice *out,
                              EnlError *err) ENL_MUST_USE;
