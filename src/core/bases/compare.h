/* Candidate bases for one site of one substrate, ranked.
 *
 * Every base of the table is judged under the present conditions. What counts as ionised: each
 * site once (mono-anions exclude each other), and for a site that another, certain one precedes
 * (EnlSite.second) the ions that have lost the preceding hydrogens too.
 */
#pragma once

#include "core/acidity/estimate.h"
#include "core/acidity/site.h"
#include "core/bases/base.h"
#include "core/bases/caution.h"

typedef struct {
  EnlSolvent solvent;
  double equivalents;   /* of base per substrate */
  double concentration; /* substrate, mol/L */
  double temperature;   /* °C; the pK values hold at 25 and are not carried over */
} EnlConditions;

/* 1.05 equivalents, 0.1 mol/L, 25 °C, DMSO. */
EnlConditions enl_conditions_default (void);
/* ENL_ERROR_RANGE with advice when an amount is impossible. */
EnlStatus enl_conditions_check (const EnlConditions *conditions, EnlError *err);

typedef enum {
  ENL_VERDICT_COMPLETE,  /* takes the site off completely (99 % or more) */
  ENL_VERDICT_SHARED,    /* nothing stays neutral, but other sites have a share of the anion */
  ENL_VERDICT_LARGELY,   /* 90 % or more */
  ENL_VERDICT_PARTIAL,   /* 10 % or more: both species side by side */
  ENL_VERDICT_TRACE,     /* 0.1 % or more */
  ENL_VERDICT_NO,        /* less, or another site takes the base */
  ENL_VERDICT_REACTS,    /* does something else first (adds to C=O ...), see the reason */
  ENL_VERDICT_NO_NUMBER, /* its number does not describe what happens (carbonate ...) */
  ENL_VERDICT_OFF_SCALE, /* no value on the footing in use: never a borrowed number */
  ENL_VERDICT_SOLVENT,   /* base and solvent destroy each other */
  ENL_N_VERDICTS
} EnlVerdict;

/* A few words ("complete", "not on this scale"), distinct. */
const char *enl_verdict_text (EnlVerdict verdict);

typedef struct {
  uint32_t base;      /* index in the base table */
  double pkah;        /* on the footing in use; NAN off the scale */
  double gap;         /* pkah - pKa(site); NAN where there is none */
  double conversion;  /* fraction 0..1 of the substrate present as this anion; NAN likewise */
  double low, high;   /* its 90 % interval, from that of the gap */
  double selectivity; /* share of this site among all ionised forms, 0..1; NAN likewise */
  double equivalents_needed; /* one for the site, one for each hydrogen that goes before it */
  EnlVerdict verdict;
  bool levelled;              /* the solvent's own anion is the base that acts */
  char *reason;               /* one sentence, no full stop */
  const EnlCaution **caution; /* n_cautions borrowed from the caution table */
  uint32_t n_cautions;
} EnlCandidate;

typedef struct {
  EnlCandidate *candidate; /* best first: complete, largely, partial ...; among equals the least
                              hazardous, then the usual ones, then the mildest */
  uint32_t n_candidates;   /* every base of the table */
} EnlComparison;

/* Compares every base for site `target` (index in sites). `estimate` has one entry a site, all in
 * conditions->solvent. Caller: enl_comparison_free. */
EnlStatus enl_bases_compare (const EnlBaseTable *bases, const EnlCautionTable *cautions,
                             const EnlSites *sites, const EnlEstimate *estimate, uint32_t target,
                             const EnlConditions *conditions, EnlComparison **out,
                             EnlError *err) ENL_MUST_USE;
void enl_comparison_free (EnlComparison *comparison);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlComparison, enl_comparison_free)
