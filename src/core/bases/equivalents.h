/* How many equivalents of a base, and why: what competing acids take, a recommended number, and
 * what happens around it. */
#pragma once

#include <stdbool.h>

#include "core/bases/compare.h"

#define ENL_N_EQUIVALENT_STEPS 4

typedef struct {
  double equivalents;
  double conversion; /* fraction of the substrate that is the anion; NAN without a number */
  bool shared;       /* no substrate is left, and several sites share the anion */
  char *text;        /* what happens there, one clause */
} EnlEquivalentStep;

typedef struct {
  double needed;   /* one for the site, one for every hydrogen that takes base before or beside */
  char *competing; /* "phenol O-H takes the first equivalent"; "" when nothing does */
  double recommended; /* NAN: no number of equivalents makes a clean anion */
  char *reason;       /* one sentence for it, no full stop */
  EnlEquivalentStep step[ENL_N_EQUIVALENT_STEPS]; /* 0.95, 1.0, 1.05 and 2.1 equivalents */
} EnlEquivalents;

/* `candidate` is one of the comparison that answered `question`. Caller: enl_equivalents_free. */
EnlStatus enl_equivalents_new (const EnlQuestion *question, const EnlCandidate *candidate,
                               EnlEquivalents **out, EnlError *err) ENL_MUST_USE;
void enl_equivalents_free (EnlEquivalents *equivalents);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlEquivalents, enl_equivalents_free)

/* "LDA: 1.05 equivalents, ..." and a line a step, each ended by a line feed. New string (g_free).
 */
char *enl_equivalents_text (const EnlEquivalents *equivalents, const char *base) ENL_MUST_USE;
