/* The published acids (resources/acids.tsv), parsed and indexed by structure and site. */
#pragma once

#include "core/acidity/estimate.h"
#include "core/molecule/molecule.h"

typedef struct {
  const char *name, *smiles, *source, *note;
  double pka, sigma;
  EnlSolvent solvent;
  const EnlMolecule *mol; /* owned by the reference; atom map 1 marks the site */
  uint32_t site;          /* index of the acidic atom in mol */
  const char *key;        /* canonical SMILES without maps: one per compound */
  bool lab;               /* a user's own value, not a published one */
} EnlReferenceRow;

typedef struct EnlReference EnlReference;

/* Reads the table text. Any row that cannot be read is an ENL_ERROR_FORMAT with its line. */
EnlStatus enl_reference_new (const char *text, size_t size, EnlReference **out,
                             EnlError *err) ENL_MUST_USE;
/* The table of `base`, which is borrowed and must outlive the result, with `n` rows of a user
 * behind its own: the numbers of published rows stay. Texts, molecule and site of `extra` are
 * copied; `smiles` (with the site marked), `key` and `lab` are filled in here. Wherever a row of
 * the user fits, the find functions below prefer it to a published one. */
EnlReference *enl_reference_extend (const EnlReference *base, const EnlReferenceRow *extra,
                                    uint32_t n) ENL_MUST_USE;
void enl_reference_free (EnlReference *ref);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlReference, enl_reference_free)

uint32_t enl_reference_rows (const EnlReference *ref);
const EnlReferenceRow *enl_reference_row (const EnlReference *ref, uint32_t row);

/* Row of this compound with `atom` (or one symmetry-equivalent to it) as the site, in this solvent
 * (ENL_SOLVENT_THF matches nothing); -1 when it was not measured. Stereo: a row without stereo
 * serves every isomer; a molecule without stereo gets a row with stereo only when no other isomer
 * of it stands in the table. */
int enl_reference_find (const EnlReference *ref, const EnlMolecule *mol, uint32_t atom,
                        EnlSolvent solvent);
/* The same for all atoms at once: fills row[atom] with the row or -1. */
void enl_reference_find_all (const EnlReference *ref, const EnlMolecule *mol, EnlSolvent solvent,
                             int *row);

/* First row of the user that is of the same isomer as `row` (of the user, too), at an equivalent
 * atom and in the same solvent; `row` itself when there is none before it. */
uint32_t enl_reference_first_alike (const EnlReference *ref, uint32_t row);

/* Fingerprint of the text with the published rows: a fitted model names the table it was made
 * from. */
uint64_t enl_reference_checksum (const EnlReference *ref);
