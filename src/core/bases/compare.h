/* Candidate bases for one site of one substrate, ranked. */
#pragma once

#include "core/acidity/estimate.h"
#include "core/acidity/site.h"
#include "core/bases/base.h"

typedef struct {
  EnlSolvent solvent;
  double equivalents;   /* of base per substrate */
  double concentration; /* substrate, mol/L */
  double temperature;   /* °C */
} EnlConditions;

/* 1 equivalent (1.05), 0.1 mol/L, 25 °C, DMSO. */
EnlConditions enl_conditions_default (void);

typedef enum {
  ENL_VERDICT_COMPLETE,  /* takes the site off completely */
  ENL_VERDICT_LARGELY,   /* more than 90 % */
  ENL_VERDICT_PARTIAL,   /* 10 to 90 %: both species side by side */
  ENL_VERDICT_TRACE,     /* 0.1 to 10 % */
  ENL_VERDICT_NO,        /* less */
  ENL_VERDICT_NO_NUMBER, /* its number does not describe what happens (carbonate ...) */
  ENL_VERDICT_OFF_SCALE, /* no value on the footing in use: never a borrowed number */
  ENL_N_VERDICTS
} EnlVerdict;

/* One or two words ("complete", "not on this scale"), distinct. */
const char *enl_verdict_text (EnlVerdict verdict);

typedef struct {
  const char *id;   /* "H05" of the practice rules, owned by the caution table */
  const char *text; /* one sentence */
  const char *source;
} EnlCaution;

typedef struct {
  uint32_t base;      /* index in the base table */
  double pkah;        /* NAN off the scale */
  double gap;         /* pkah - pKa(site); NAN where there is none */
  double conversion;  /* fraction of the substrate present as this anion; NAN likewise */
  double low, high;   /* its 90 % interval */
  double selectivity; /* share of this site among all ionised sites, 0..1; NAN likewise */
  EnlVerdict verdict;
  char *reason;               /* one sentence */
  const EnlCaution **caution; /* n_cautions pointers into the caution table */
  uint32_t n_cautions;
} EnlCandidate;

typedef struct EnlCautionTable EnlCautionTable;
EnlStatus enl_caution_table_new (const char *text, size_t size, EnlCautionTable **out,
                                 EnlError *err) ENL_MUST_USE;
void enl_caution_table_free (EnlCautionTable *table);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlCautionTable, enl_caution_table_free)
/* The sentence that defers to local rules and a qualified person; shown with every suggestion. */
const char *enl_caution_deferral (const EnlCautionTable *table);

typedef struct {
  EnlCandidate *candidate; /* best first */
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
