/* SMILES after the OpenSMILES specification (opensmiles.org, version 1.0): read and write. */
#pragma once

#include "core/molecule/molecule.h"

/* Reads one SMILES of `size` bytes (no name behind it). The molecule is finished, Kekulé,
 * hydrogens counted, stereo set, valence checked. On failure `*out` is NULL and `err` has the
 * position. Caller: enl_molecule_free. */
EnlStatus enl_smiles_parse (const char *text, size_t size, EnlMolecule **out,
                            EnlError *err) ENL_MUST_USE;

typedef enum {
  ENL_SMILES_DEFAULT = 0, /* canonical, aromatic lower case, stereo, no maps */
  ENL_SMILES_KEKULE = 1,  /* upper case with alternating bonds */
  ENL_SMILES_NO_STEREO = 2,
  ENL_SMILES_MAPS = 4,       /* keep atom map numbers (they do not steer the order) */
  ENL_SMILES_INPUT_ORDER = 8 /* start and branch by atom index instead of canonical rank */
} EnlSmilesFlags;

/* New string (g_free). `order`, when not NULL, receives for every written position the atom index
 * (enl_molecule_atoms places). */
char *enl_smiles_write (const EnlMolecule *mol, EnlSmilesFlags flags, uint32_t *order) ENL_MUST_USE;
