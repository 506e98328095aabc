/* Candidate bases for one site of one substrate, judged and ranked.
 *
 * Every base of the table is judged under the present conditions: the equilibrium (ions.h,
 * equilibrium.h), then the rules of practice (rule.h). The terminal and the window both print what
 * stands here and add no words of their own.
 */
#pragma once

#include "core/bases/question.h"

typedef enum {
  ENL_VERDICT_COMPLETE,  /* takes the site off completely (99 % or more) */
  ENL_VERDICT_SHARED,    /* nothing stays neutral, but other sites have a share of the anion */
  ENL_VERDICT_LARGELY,   /* 90 % or more */
  ENL_VERDICT_PARTIAL,   /* 1 % or more: both species side by side */
  ENL_VERDICT_TRACE,     /* 0.1 % or more */
  ENL_VERDICT_NO,        /* less, or another site takes the base */
  ENL_VERDICT_REACTS,    /* does something else first (adds to C=O ...), see the reason */
  ENL_VERDICT_SOLVENT,   /* base and solvent destroy each other */
  ENL_VERDICT_NO_NUMBER, /* its number does not describe what happens (carbonate ...) */
  ENL_VERDICT_OFF_SCALE, /* no value on the footing in use: never a borrowed number */
  ENL_N_VERDICTS
} EnlVerdict;

/* A few words ("complete", "not on this scale"), distinct. */
const char *enl_verdict_text (EnlVerdict verdict);

/* What the verdict and the rules together come to; the first key of the ranking. */
typedef enum {
  ENL_GRADE_CLEAN,    /* complete, and nothing speaks against it */
  ENL_GRADE_CAUTION,  /* works, with a caution */
  ENL_GRADE_PARTIAL,  /* partial or trace */
  ENL_GRADE_FAILS,    /* does not work */
  ENL_GRADE_UNJUDGED, /* no number to judge by */
  ENL_N_GRADES
} EnlGrade;

/* "works cleanly", "works, with a caution" ..., distinct. */
const char *enl_grade_text (EnlGrade grade);

typedef struct {
  uint32_t base;            /* index in the base table */
  double pkah;              /* on the footing in use; NAN off the scale */
  double gap;               /* pkah - pKa(site); NAN where there is none */
  double gap_low, gap_high; /* its 90 % interval, of site and base together; NAN likewise */
  double conversion;        /* fraction 0..1 of the substrate present as this anion; NAN likewise */
  double low, high;         /* its 90 % interval, from that of the gap */
  double selectivity;       /* share of this site among all ionised forms, 0..1; NAN likewise */
  double equivalents_needed; /* one for the site, one for each hydrogen that takes base before it or
                                beside it */
  EnlVerdict verdict;
  EnlGrade grade;
  bool stoichiometric; /* takes its protons for good, the most acidic first; no equilibrium with it
                        */
  bool levelled;       /* the solvent's own anion is the base that acts */
  bool own_alcohol;    /* an alkoxide on the water footing: judged in its own alcohol */
  char *words;         /* verdict as printed: "complete, with a caution" */
  char *reason;        /* one sentence, no full stop */
  EnlCaution *caution; /* n_cautions, see enl_rule_table_apply */
  uint32_t n_cautions;
} EnlCandidate;

typedef struct {
  EnlCandidate *candidate; /* best first: by grade; partial ones by conversion; among equals the
                              usual ones (extreme hazards after), then the mildest */
  uint32_t n_candidates;   /* every base of the table */
} EnlComparison;

/* Compares every base. Caller: enl_comparison_free. */
EnlStatus enl_bases_compare (const EnlQuestion *question, EnlComparison **out,
                             EnlError *err) ENL_MUST_USE;
/* One base alone: one candidate, the same as among all. */
EnlStatus enl_bases_compare_one (const EnlQuestion *question, uint32_t base, EnlComparison **out,
                                 EnlError *err) ENL_MUST_USE;
void enl_comparison_free (EnlComparison *comparison);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlComparison, enl_comparison_free)

/* What the numbers of this solvent stand for, one sentence to show above a comparison. */
const char *enl_footing_text (EnlSolvent solvent);
