/* The list for the balance: one substrate, one site, the chosen bases, with why so many equivalents
 * and what to beware of. Terminal, window and printed list all show what stands here. */
#pragma once

#include "core/bases/question.h"
#include "core/bases/weigh.h"

/* What is asked for; NAN where nothing was said. */
typedef struct {
  double mmol, grams; /* of substrate: exactly one of them */
  double equivalents; /* NAN: the recommended number (equivalents.h) */
  double water;       /* equivalents of water; 0 for none */
  double titre;       /* see EnlWeighOrder; in a list of several bases of those sold as solutions */
  double mass_percent; /* likewise of those sold as dispersion or solid */
} EnlWeighScale;

/* Nothing said, no water. */
EnlWeighScale enl_weigh_scale_none (void);

typedef struct {
  EnlWeighing *weighing;
  char *reason;  /* why this number of equivalents, one sentence, no full stop */
  char *verdict; /* what comes of it: "complete, with a caution"; with the reason if it fails */
  bool works;    /* false: this base does not make the anion here, see verdict */
} EnlWeighLine;

typedef struct {
  char *substrate, *position; /* name; site in words */
  double molar_mass, mmol;    /* of substrate, g/mol and mmol */
  EnlSolvent solvent;
  EnlWeighLine *line; /* one a base */
  uint32_t n_lines;
  GPtrArray *hazard;    /* of char *: "[H02] Flammable ..." for all bases and parts, each once */
  const char *deferral; /* owned by the rule table */
} EnlWeighList;

/* `base` has `n` indices in question->bases, whose rows the list borrows; the water is that of the
 * scale, not of the question. ENL_ERROR_RANGE for impossible amounts, ENL_ERROR_UNKNOWN for a base
 * that cannot be weighed or a titre that fits none, and errors of the comparison. Caller:
 * enl_weigh_list_free. */
EnlStatus enl_weigh_list_new (const EnlQuestion *question, const EnlWeighTable *table,
                              const char *name, const EnlWeighScale *scale, const uint32_t *base,
                              uint32_t n, EnlWeighList **out, EnlError *err) ENL_MUST_USE;
void enl_weigh_list_free (EnlWeighList *list);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlWeighList, enl_weigh_list_free)

/* The whole list as plain text, ended by a line feed. New string (g_free). */
char *enl_weigh_list_text (const EnlWeighList *list) ENL_MUST_USE;
/* "1.05 equivalents, 5.25 mmol; water takes ..." of one line. New string (g_free). */
char *enl_weigh_line_text (const EnlWeighLine *line) ENL_MUST_USE;
