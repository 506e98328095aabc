/* Cautions that depend on base, solvent and kind of site alone (resources/cautions.tsv). */
#pragma once

#include <stdbool.h>

#include "core/bases/base.h"

typedef struct {
  const char *id;        /* "H05", of the practice rules */
  const char *text;      /* one sentence */
  const char *source;    /* "common practice" where there is no single one */
  int severity;          /* 1 care, 2 serious, 3 extreme */
  double prevents_above; /* happens instead of deprotonation where the site's pKa is larger; NAN:
                            never */
} EnlCaution;

typedef struct EnlCautionTable EnlCautionTable;

EnlStatus enl_caution_table_new (const char *text, size_t size, EnlCautionTable **out,
                                 EnlError *err) ENL_MUST_USE;
void enl_caution_table_free (EnlCautionTable *table);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlCautionTable, enl_caution_table_free)

/* The sentence that defers to local rules and a qualified person; shown with every suggestion. */
const char *enl_caution_deferral (const EnlCautionTable *table);

/* Every caution for `base` in `solvent` on a site next to C=O or not, in table order. Returns an
 * array of *n borrowed pointers (g_free the array), NULL when *n is 0. */
const EnlCaution **enl_caution_collect (const EnlCautionTable *table, const EnlBase *base,
                                        EnlSolvent solvent, bool carbonyl, uint32_t *n);
