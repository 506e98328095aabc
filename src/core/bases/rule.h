/* The rules of practice (resources/rules.tsv): what else a base does, and what to beware of.
 *
 * A row has a trigger over named facts (trigger.h, fact.h), a sentence, and what it means for the
 * verdict. In the sentence {fact} stands for the phrase or number of a fact.
 */
#pragma once

#include "core/base/error.h"
#include "core/bases/fact.h"

typedef enum {
  ENL_EFFECT_REACTS, /* happens instead of the clean deprotonation: no such anion */
  ENL_EFFECT_WARN,   /* happens beside it: "works, with a caution" at best */
  ENL_EFFECT_HAZARD, /* can hurt someone; the verdict stays */
  ENL_EFFECT_NOTE,   /* worth knowing; the verdict stays */
  ENL_N_EFFECTS
} EnlEffect;

/* "reacts", "warn", "hazard", "note": the words of the table. */
const char *enl_effect_text (EnlEffect effect);

typedef struct {
  const char *id;       /* "H05", of the practice rules */
  const char *sentence; /* one clause with {fact} in it, small letter at its start unless a name */
  const char *source;   /* "common practice" where there is no single one */
  EnlEffect effect;
  int severity; /* 0 remark, 1 care, 2 serious, 3 extreme */
} EnlRule;

/* A rule that applies, its sentence filled in. */
typedef struct {
  const EnlRule *rule; /* owned by the table */
  char *clause;        /* for use inside a sentence: "self-aldol: ..." */
  char *text;          /* the same as a sentence of its own, no full stop: "Self-aldol: ..." */
} EnlCaution;

typedef struct EnlRuleTable EnlRuleTable;

/* Errors have the line and the column of the table. */
EnlStatus enl_rule_table_new (const char *text, size_t size, EnlRuleTable **out,
                              EnlError *err) ENL_MUST_USE;
void enl_rule_table_free (EnlRuleTable *table);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlRuleTable, enl_rule_table_free)

uint32_t enl_rule_table_size (const EnlRuleTable *table);
const EnlRule *enl_rule_table_get (const EnlRuleTable *table, uint32_t index);

/* The sentence that defers to local rules and a qualified person; shown with every suggestion. */
const char *enl_rule_table_deferral (const EnlRuleTable *table);

/* Every rule whose trigger holds: reactions first, then warnings, hazards and remarks, each by
 * severity. `value` has one entry a fact. Array of *n, NULL when none: enl_cautions_free. */
EnlCaution *enl_rule_table_apply (const EnlRuleTable *table, const EnlFactValue *value,
                                  uint32_t *n);
void enl_cautions_free (EnlCaution *caution, uint32_t n);
