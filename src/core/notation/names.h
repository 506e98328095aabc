/* Compound names and group abbreviations. */
#pragma once

#include "core/molecule/molecule.h"

typedef struct EnlNames EnlNames;

/* `table` is the text of names.tsv (columns name, smiles, source; one synonym a row). */
EnlStatus enl_names_new (const char *table, size_t size, EnlNames **out,
                         EnlError *err) ENL_MUST_USE;
void enl_names_free (EnlNames *names);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlNames, enl_names_free)

/* SMILES of a name, owned by names; NULL when unknown. Case, spaces and hyphens do not matter. */
const char *enl_names_find (const EnlNames *names, const char *text, size_t size);
/* The known name most like `text` (for "did you mean"), or NULL when nothing is near. */
const char *enl_names_nearest (const EnlNames *names, const char *text, size_t size);
/* A preferred name of a compound by its canonical SMILES, or NULL. */
const char *enl_names_of (const EnlNames *names, const char *canonical_smiles);

/* SMILES of a group abbreviation ("OMe", "CO2Et", "Boc", "Ph"), its first atom being the one that
 * is attached; static, NULL when unknown. */
const char *enl_group_find (const char *text, size_t size);
