/* Named facts: what a rule can ask about a molecule, its site, a base, the conditions and the
 * equilibrium between them.
 *
 * A fact is one small function with a name ("molecule.ester", "base.family", "gap"). Facts of the
 * molecule, the site and the conditions are found once for a question; those of a base for every
 * base anew. The names and meanings are listed in fact.c, and `enl_fact_meaning` tells them.
 */
#pragma once

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

typedef enum {
  ENL_FACT_FLAG,   /* yes or no */
  ENL_FACT_NUMBER, /* NAN: unknown; every comparison with it is false */
  ENL_FACT_WORD,   /* one of a few words */
  ENL_FACT_PHRASE  /* text for sentences; as a flag: not empty */
} EnlFactKind;

#define ENL_FACT_PHRASE_BYTES 200

typedef struct {
  bool flag;
  double number;
  const char *word; /* borrowed from the base table or static; never NULL after a fact was found */
  char phrase[ENL_FACT_PHRASE_BYTES];
} EnlFactValue;

typedef enum {
  ENL_FACT_OF_QUESTION, /* the same for every base */
  ENL_FACT_OF_BASE
} EnlFactScope;

size_t enl_fact_count (void);
/* Index of the fact with this name (`size` bytes of it), or -1. */
int enl_fact_find (const char *name, size_t size);
const char *enl_fact_name (size_t fact);
EnlFactKind enl_fact_kind (size_t fact);
EnlFactScope enl_fact_scope (size_t fact);
const char *enl_fact_meaning (size_t fact);
