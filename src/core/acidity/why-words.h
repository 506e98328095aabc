/* The words of "why this value": names of simple acids and of substituents (resources/parents.tsv).
 */
#pragma once

#include "core/acidity/group.h"

typedef struct EnlWhyWords EnlWhyWords;

/* Reads a table of that form; ENL_ERROR_FORMAT with the line of a row that cannot be used. */
EnlStatus enl_why_words_parse (const char *text, size_t size, EnlWhyWords **out,
                               EnlError *err) ENL_MUST_USE;
void enl_why_words_free (EnlWhyWords *words);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlWhyWords, enl_why_words_free)

/* The table inside the program, read once, never freed. */
const EnlWhyWords *enl_why_words (void);

/* Name of the simple acid that `mol` with this acidic atom is, or NULL. */
const char *enl_why_words_parent (const EnlWhyWords *words, const EnlMolecule *mol, uint32_t site);

typedef struct {
  const char *noun;   /* "fluorine": what stands on an atom */
  const char *prefix; /* "fluoro": what stands in front of a ring */
} EnlWhyGroup;

/* Words of a substituent drawn as a molecule whose '*' (element 0) is the point of attachment;
 * NULL when the table does not know it. */
const EnlWhyGroup *enl_why_words_group (const EnlWhyWords *words, const EnlMolecule *fragment);

/* Place of a kind of group in the order of parents: the smaller stays longer. ENL_NONE for a kind
 * that no parent carries. */
uint32_t enl_why_words_strength (const EnlWhyWords *words, EnlGroup group);
