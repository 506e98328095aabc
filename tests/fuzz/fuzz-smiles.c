/* SMILES in, SMILES out. Law: what was written is read again and written the same. */
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "core/notation/smiles.h"
#include "tests/fuzz/fuzz.h"

#define LARGEST 60 /* atoms; the law is tried on smaller structures only, for speed */

/* Around '*' neither valence nor aromaticity is settled by the notation. */
static bool
has_wildcard (const EnlMolecule *mol)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    if (enl_molecule_atom (mol, i)->element == 0)
      return true;
  return false;
}

static void
check_law (const EnlMolecule *mol, EnlSmilesFlags flags)
{
  g_autofree char *first = enl_smiles_write (mol, flags, NULL);
  g_autoptr (EnlMolecule) back = NULL;
  EnlError err;

  if (enl_smiles_parse (first, strlen (first), &back, &err) != ENL_OK) {
    fprintf (stderr, "written but not read: %s: %s\n", first, err.text);
    abort ();
  }
  g_autofree char *second = enl_smiles_write (back, flags, NULL);
  if (strcmp (first, second) != 0) {
    fprintf (stderr, "written differently: %s\n%s\n", first, second);
    abort ();
  }
}

int
LLVMFuzzerTestOneInput (const uint8_t *data, size_t size)
{
  g_autoptr (EnlMolecule) mol = NULL;
  EnlError err;

  if (enl_smiles_parse ((const char *)data, size, &mol, &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    return 0;
  }
  if (enl_molecule_atoms (mol) > LARGEST || has_wildcard (mol))
    return 0;
  check_law (mol, ENL_SMILES_DEFAULT);
  check_law (mol, ENL_SMILES_KEKULE);
  return 0;
}
