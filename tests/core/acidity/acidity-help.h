/* What several tests of this folder need. */
#pragma once

#include <string.h>

#include <check.h>

#include "core/acidity/reference.h"
#include "core/notation/smiles.h"
#include "resources/embedded.h"

static inline EnlMolecule *
read_smiles (const char *smiles)
{
  EnlMolecule *mol = NULL;
  EnlError err;

  if (enl_smiles_parse (smiles, strlen (smiles), &mol, &err) != ENL_OK)
    ck_abort_msg ("%s: %s", smiles, err.text);
  return mol;
}

/* Atom with map number 1. */
static inline uint32_t
mapped_atom (const EnlMolecule *mol)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    if (enl_molecule_atom (mol, i)->map == 1)
      return i;
  ck_abort_msg ("no atom carries the map number 1");
  return 0;
}

static inline EnlReference *
open_acids (void)
{
  size_t size = 0;
  const char *text = enl_resource ("acids.tsv", &size);
  EnlReference *ref = NULL;
  EnlError err;

  if (enl_reference_new (text, size, &ref, &err) != ENL_OK)
    ck_abort_msg ("acids.tsv line %zu: %s", err.line, err.text);
  return ref;
}
