/* A molecule from SMILES, for tests that need one. */
#pragma once

#include <string.h>

#include "core/notation/smiles.h"
#include "tests/runner.h"

static inline EnlMolecule *
read_structure (const char *smiles)
{
  EnlMolecule *mol = NULL;
  EnlError err = {0};

  if (enl_smiles_parse (smiles, strlen (smiles), &mol, &err) != ENL_OK)
    ck_abort_msg ("%s: %s; %s", smiles, err.text, err.advice);
  return mol;
}
