/* What a report of a set says, as plain data: structures with ranks, the base of each substrate,
 * what becomes of it, cautions and sources. The pages and the HTML (draw/report-...) print what
 * stands here.
 *
 * Every pKa has its solvent, its 90 % interval where there is one, its basis and the numbers of its
 * sources beside it. */
#pragma once

#include "core/bases/curve.h"
#include "core/workset/analysis.h"
#include "core/workset/workset.h"

/* Sites told for a substrate; how many there are stands behind them. */
#define ENL_REPORT_SITES 5

typedef struct {
  uint32_t rank;
  EnlBasis basis;
  char *position; /* "alpha to both C=O, 2 H" */
  char *value;    /* "pKa 14.2 in DMSO, measured [1]" */
} EnlReportSite;

typedef struct {
  char *name, *note;
  char *identity;        /* formula, molar mass, a known name; "" when it cannot be read */
  char *fault;           /* why there is nothing more; else NULL */
  char *no_enol;         /* why no enolate forms; else NULL */
  EnlAnalysis *analysis; /* with layout; NULL when it cannot be read */
  EnlReportSite *site;   /* most acidic first */
  uint32_t n_sites, more_sites;
  uint32_t selected; /* index of the site in the analysis, ENL_NONE: no acidic hydrogen */
  /* Its base; base NULL where there is no acidic hydrogen. */
  const EnlBase *base;
  bool chosen;       /* by the person; else it stands first in the ranking */
  char *base_title;  /* "sodium ethoxide, first in the ranking" */
  char *outcome;     /* verdict, reason */
  char *equivalents; /* recommended number and why */
  char *anion;       /* conversion with interval, conditions, footing */
  char *composition; /* every species at the chosen equivalents, or why that is not known */
  EnlCurve *curve;   /* composition curve, n_lines 0 where there is none */
} EnlReportSubstrate;

typedef struct {
  char *where; /* "1, 3": numbers of the substrates it holds for */
  const char *id;
  EnlEffect effect;
  int severity;
  char *text;
} EnlReportCaution;

typedef struct {
  char *title;
  char *conditions; /* one line */
  const char *footing;
  EnlConditions at;
  EnlReportSubstrate *substrate;
  uint32_t n_substrates;
  GArray *caution;   /* of EnlReportCaution: reactions, warnings, hazards; each once */
  GPtrArray *source; /* of char *: "1" is the first */
  const char *deferral;
  EnlBaseTable *bases; /* those of the set included; owned */
} EnlReport;

/* One substrate as it stands in the set: what was read, or why not. */
typedef struct {
  const char *name, *note;
  const EnlMolecule *mol; /* NULL: see `fault` */
  const char *fault;
} EnlReportInput;

/* `set` (NULL allowed) tells the chosen site and base and brings its own bases; its substrates are
 * those of `input`. A substrate that cannot be analysed has its fault and is no error. Caller:
 * enl_report_free. */
EnlStatus enl_report_new (const EnlKnowledge *knowledge, const EnlReportInput *input, uint32_t n,
                          const EnlWorkset *set, const EnlConditions *conditions, const char *title,
                          EnlReport **out, EnlError *err) ENL_MUST_USE;
/* Reads the structures of a set and reports on it in its own conditions, with its own bases.
 * Its lab values count when `knowledge` holds them. */
EnlStatus enl_report_of_set (const EnlKnowledge *knowledge, const EnlWorkset *set,
                             const char *title, EnlReport **out, EnlError *err) ENL_MUST_USE;
void enl_report_free (EnlReport *report);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlReport, enl_report_free)
