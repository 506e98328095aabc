/* A user's own measured pKa values, as typed and as checked.
 *
 * File form: tab-separated text with a header line (table.h) and the columns of EnlLabField;
 * structure, solvent and pka are required, a column of another name is an error. Values in THF are
 * refused, because no single scale exists there.
 */
#pragma once

#include "core/acidity/estimate.h"
#include "core/notation/names.h"

/* One standard deviation of a value for which none was given, pK units: a cautious default of the
 * program, not a published number. */
#define ENL_LAB_USUAL_SIGMA 0.3
#define ENL_MAX_LAB         500

typedef enum {
  ENL_LAB_STRUCTURE,
  ENL_LAB_ATOM,
  ENL_LAB_SOLVENT,
  ENL_LAB_PKA,
  ENL_LAB_SIGMA,
  ENL_LAB_NAME,
  ENL_LAB_NOTE,
  ENL_LAB_SOURCE,
  ENL_N_LAB_FIELDS
} EnlLabField;

/* "structure", "atom" ...: the words of files. */
const char *enl_lab_field_name (EnlLabField field);

/* One value as it was typed. Owned texts, never NULL. */
typedef struct {
  char *structure; /* any notation; map number 1 may mark the acidic atom */
  uint32_t atom;   /* 1-based position in the structure, 0: the mark, or the only acidic site */
  EnlSolvent solvent;
  double pka, sigma; /* sigma: one standard deviation */
  char *name, *note, *source;
  size_t line; /* of the file it came from, 0: none */
} EnlLabEntry;

/* An entry with empty texts, solvent DMSO, pKa NAN and the usual sigma. */
EnlLabEntry *enl_lab_entry_new (void) ENL_MUST_USE;
EnlLabEntry *enl_lab_entry_copy (const EnlLabEntry *entry) ENL_MUST_USE;
void enl_lab_entry_free (EnlLabEntry *entry);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlLabEntry, enl_lab_entry_free)
/* All fields but the line of the file. */
bool enl_lab_entry_equal (const EnlLabEntry *a, const EnlLabEntry *b);
/* ENL_ERROR_UNSUPPORTED for THF, ENL_ERROR_RANGE for an impossible pKa or sigma; `field` (NULL
 * allowed) tells which. The structure is not looked at. */
EnlStatus enl_lab_entry_check (const EnlLabEntry *entry, EnlLabField *field, EnlError *err);

/* ---- checked values ---- */

/* A value whose site is known. */
typedef struct {
  EnlLabEntry *entry;
  EnlMolecule *mol; /* the fragment that holds the site */
  uint32_t site;    /* its acidic atom */
  uint32_t tag;     /* number that the caller gave it */
} EnlLabRow;

typedef struct EnlLab EnlLab;

EnlLab *enl_lab_new (void) ENL_MUST_USE;
void enl_lab_free (EnlLab *lab);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlLab, enl_lab_free)

uint32_t enl_lab_size (const EnlLab *lab);
const EnlLabRow *enl_lab_row (const EnlLab *lab, uint32_t row);

/* Checks a copy of `entry` and appends it. `names` may be NULL. On failure nothing is added and
 * `field` (NULL allowed) tells what is at fault; the position of a fault in the structure is that
 * in its text. ENL_ERROR_LIMIT beyond ENL_MAX_LAB. */
EnlStatus enl_lab_add (EnlLab *lab, const EnlNames *names, const EnlLabEntry *entry, uint32_t tag,
                       EnlLabField *field, EnlError *err);
/* Appends the rows of `other` that are not in `lab` already, word by word, tags included. */
EnlStatus enl_lab_append (EnlLab *lab, const EnlLab *other, EnlError *err) ENL_MUST_USE;

/* Reads a file's text; tags are row numbers from 0. The first fault ends it: line, column, what is
 * wrong and what to do. */
EnlStatus enl_lab_parse (const EnlNames *names, const char *text, size_t size, EnlLab **out,
                         EnlError *err) ENL_MUST_USE;
