/* The verbs of the terminal; each has a file of its own. */
#pragma once

#include "cli/input.h"
#include "core/workset/analysis.h"

int enl_verb_molecule (const EnlOptions *options);
int enl_verb_sites (const EnlOptions *options);
int enl_verb_forms (const EnlOptions *options);
int enl_verb_bases (const EnlOptions *options);
int enl_verb_figure (const EnlOptions *options);
int enl_verb_report (const EnlOptions *options);
int enl_verb_weigh (const EnlOptions *options);
int enl_verb_validate (const EnlOptions *options);

/* What several verbs need. */

/* A verb at work: given to its visit function as data. A verb that needs more puts it behind. */
typedef struct {
  const EnlKnowledge *knowledge; /* with the own values that hold for the present input */
  const EnlOptions *options;
  EnlOutput *out;
  /* the inside */
  EnlKnowledge *base;         /* without own values */
  EnlKnowledge *own, *of_set; /* with those of --lab; with those of the set being read as well */
  EnlLab *lab;                /* of --lab */
  GHashTable *told;           /* warnings that were printed */
  EnlBaseTable *bases;        /* with those of the set being read; NULL outside a set */
} EnlRun;

/* Opens the knowledge and the files of --lab; false when one is at fault, which has been explained
 * on standard error. Contradictory values are told there, too. */
bool enl_cli_begin (EnlRun *run, const EnlOptions *options);
/* Visits every input with `run` as data; own values of a set hold for its substrates. Returns how
 * many inputs failed. */
uint32_t enl_cli_visit (EnlRun *run, bool caret, EnlVisit visit);
void enl_cli_end (EnlRun *run);

/* Opens the knowledge, visits every input with an EnlRun whose output has these columns, and
 * returns the exit code. */
int enl_cli_run (const EnlOptions *options, const char *const *column, EnlVisit visit);

/* text: a line for every sentence among remarks and footings, with the sites it holds for; "" when
 * there is none. New string (g_free). */
char *enl_cli_remarks (const EnlAnalysis *analysis) ENL_MUST_USE;

/* The knowledge inside the program; explains itself on standard error and returns NULL when a
 * table is damaged (a broken build). Caller: enl_knowledge_free. */
EnlKnowledge *enl_cli_knowledge (void);

/* Site that --atom names (1-based position in the input), or the default one. ENL_ERROR_UNKNOWN
 * with advice when it is no acidic atom. */
EnlStatus enl_cli_site (const EnlAnalysis *analysis, uint32_t position, uint32_t *site,
                        EnlError *err);

/* "2,4" : 1-based input positions of the atoms of a site. New string (g_free). */
char *enl_cli_atoms (const EnlMolecule *mol, const EnlSite *site) ENL_MUST_USE;
