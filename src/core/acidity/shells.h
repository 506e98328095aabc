/* The surroundings of an acidic atom, shell by shell.
 *
 * Shell d holds everything d bonds away: for every atom there a coarse mark (its element), a finer
 * one (hybridisation, aromaticity, sign of charge) and the finest (with its own neighbours), each
 * with a count. Two surroundings are as alike as their counts overlap: sum of minima over sum of
 * maxima, shell by shell, 1 for equal and 0 for nothing in common.
 */
#pragma once

#include "core/acidity/survey.h"

#define ENL_N_SHELLS 7

typedef struct {
  uint32_t token; /* hash of the mark */
  float count;
} EnlMark;

/* Marks of all shells in one array, ascending token within a shell; shell d is
 * mark[start[d]] .. mark[start[d + 1] - 1]. */
typedef struct {
  const EnlMark *mark;
  uint32_t start[ENL_N_SHELLS + 1];
  float total[ENL_N_SHELLS]; /* sum of the counts of each shell */
} EnlShells;

/* Collects the marks around `atom` and appends them to `store` (EnlMark). `mark` of the result
 * stays NULL: set it once `store` has stopped growing; `start` counts from its first new mark. */
void enl_shells_collect (EnlSurvey *survey, uint32_t atom, GArray *store, EnlShells *out);

/* Likeness of two surroundings, 0 to 1: the mean over the shells, each weighing half of the one
 * before. */
double enl_shells_likeness (const EnlShells *a, const EnlShells *b);
/* Likeness of shell d for every d; empty against empty is 1. */
void enl_shells_compare (const EnlShells *a, const EnlShells *b, double likeness[ENL_N_SHELLS]);
