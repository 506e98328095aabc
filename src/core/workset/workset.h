/* The set: substrates in order, conditions, notes, own values and the selection; its file form.
 *
 * File: JSON, "format": "enolith-set", "version": 1. Members this version does not know are kept
 * when a set is read and written again.
 */
#pragma once

#include "core/acidity/lab.h"
#include "core/bases/compare.h"
#include "core/bases/own-base.h"

#define ENL_MAX_SUBSTRATES 2000
#define ENL_WORKSET_SUFFIX ".enolith"

typedef struct {
  char *name; /* shown and editable; "" lets the structure speak */
  char *text; /* the structure line as typed: SMILES, InChI, name, groups or a molfile block */
  char *note;
} EnlSubstrate;

typedef struct {
  uint32_t substrate; /* ENL_NONE: nothing selected */
  uint32_t atom;      /* 0-based atom of the selected site, ENL_NONE: the most acidic one */
  char *base;         /* id of the selected base, "" for none */
} EnlSelection;

typedef struct EnlWorkset EnlWorkset;

EnlWorkset *enl_workset_new (void) ENL_MUST_USE;
EnlWorkset *enl_workset_copy (const EnlWorkset *set) ENL_MUST_USE;
void enl_workset_free (EnlWorkset *set);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlWorkset, enl_workset_free)

uint32_t enl_workset_size (const EnlWorkset *set);
const EnlSubstrate *enl_workset_get (const EnlWorkset *set, uint32_t index);

/* Insert before `index` (size: append). ENL_ERROR_LIMIT beyond ENL_MAX_SUBSTRATES. */
EnlStatus enl_workset_insert (EnlWorkset *set, uint32_t index, const char *name, const char *text,
                              EnlError *err);
void enl_workset_remove (EnlWorkset *set, uint32_t index);
/* Moves one substrate so that it stands at `to`; the selection goes with its substrate. */
void enl_workset_move (EnlWorkset *set, uint32_t from, uint32_t to);
void enl_workset_set_name (EnlWorkset *set, uint32_t index, const char *name);
void enl_workset_set_text (EnlWorkset *set, uint32_t index, const char *text);
void enl_workset_set_note (EnlWorkset *set, uint32_t index, const char *note);

/* Own values in order. They are kept as typed, right or wrong (enl_workset_lab_check); one index
 * stands for the same value until one before it is removed. */
uint32_t enl_workset_lab_size (const EnlWorkset *set);
const EnlLabEntry *enl_workset_lab (const EnlWorkset *set, uint32_t index);
/* Appends a copy. ENL_ERROR_LIMIT beyond ENL_MAX_LAB. */
EnlStatus enl_workset_add_lab (EnlWorkset *set, const EnlLabEntry *entry, EnlError *err);
void enl_workset_set_lab (EnlWorkset *set, uint32_t index, const EnlLabEntry *entry);
void enl_workset_remove_lab (EnlWorkset *set, uint32_t index);
bool enl_workset_same_lab (const EnlWorkset *a, const EnlWorkset *b);
/* The values that can be used, their tags being their indices here. `fault` (NULL allowed) has a
 * place for each value: code ENL_OK or why it is left out, with the position in its structure. */
EnlLab *enl_workset_lab_check (const EnlWorkset *set, const EnlNames *names,
                               EnlError *fault) ENL_MUST_USE;

const EnlConditions *enl_workset_conditions (const EnlWorkset *set);
void enl_workset_set_conditions (EnlWorkset *set, const EnlConditions *conditions);
const EnlSelection *enl_workset_selection (const EnlWorkset *set);
/* `base` NULL leaves the selected base as it is. */
void enl_workset_select (EnlWorkset *set, uint32_t substrate, uint32_t atom, const char *base);

/* ---- bases that the set brings along ---- */

uint32_t enl_workset_bases (const EnlWorkset *set);
const EnlOwnBase *enl_workset_base (const EnlWorkset *set, uint32_t index);
/* Copies `base`. Errors of enl_own_base_check without a table; ENL_ERROR_UNKNOWN for a name that
 * the set has already, ENL_ERROR_LIMIT beyond ENL_MAX_OWN_BASES. */
EnlStatus enl_workset_add_base (EnlWorkset *set, const EnlOwnBase *base, EnlError *err);
void enl_workset_remove_base (EnlWorkset *set, uint32_t index);
/* `table` with the bases of the set behind its own rows (enl_base_table_extend); an error of
 * enl_own_base_check when one of them does not fit. Caller: enl_base_table_free. */
EnlStatus enl_workset_base_table (const EnlWorkset *set, const EnlBaseTable *table,
                                  EnlBaseTable **out, EnlError *err) ENL_MUST_USE;

/* ---- file ---- */

/* Reads the text of a set file; errors have line and column. */
EnlStatus enl_workset_parse (const char *text, size_t size, EnlWorkset **out,
                             EnlError *err) ENL_MUST_USE;
/* New string (g_free), ends with a line feed; the same set gives the same text. */
char *enl_workset_write (const EnlWorkset *set) ENL_MUST_USE;

/* Load and save by path. Saving is atomic: a temporary file is synchronised and renamed. */
EnlStatus enl_workset_load (const char *path, EnlWorkset **out, EnlError *err) ENL_MUST_USE;
EnlStatus enl_workset_save (const EnlWorkset *set, const char *path, EnlError *err) ENL_MUST_USE;
