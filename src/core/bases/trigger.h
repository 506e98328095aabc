/* The trigger language of the rule table: conditions over named facts (fact.h).
 *
 *   trigger = clause { "or" clause }
 *   clause  = term { "and" term }
 *   term    = "not" term | "(" trigger ")" | test
 *   test    = FACT                                a flag; a phrase that is not empty
 *           | FACT "is" WORD { "," WORD }         the word is one of these
 *           | FACT ("<" | "<=" | ">" | ">=") NUMBER
 *           | FACT "in" NUMBER ".." NUMBER        ends included
 *
 * "molecule.ester and base.family is alkoxide, hydroxide and not gap > 4". A comparison with an
 * unknown number is false, so `not gap > 4` also holds where there is no gap.
 */
#pragma once

#include "core/base/error.h"
#include "core/bases/fact.h"

typedef struct EnlTrigger EnlTrigger;

/* Parses `size` bytes at `text`; an error has line, column and byte offset in that text. */
EnlStatus enl_trigger_parse (const char *text, size_t size, EnlTrigger **out,
                             EnlError *err) ENL_MUST_USE;
void enl_trigger_free (EnlTrigger *trigger); /* NULL allowed */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlTrigger, enl_trigger_free)

/* `value` has one entry for every fact. */
bool enl_trigger_holds (const EnlTrigger *trigger, const EnlFactValue *value);
