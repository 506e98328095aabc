/* Molfile in, molfile out. Law: what was written is read again with the same atoms, and the same
 * hydrogens on them. */
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "core/notation/molfile.h"
#include "tests/fuzz/fuzz.h"

static void
check_law (const EnlMolecule *mol)
{
  g_autofree char *block = NULL;
  g_autoptr (EnlMolecule) back = NULL;
  EnlError err;

  if (enl_molfile_write (mol, &block, &err) != ENL_OK)
    return;
  if (enl_molfile_parse (block, strlen (block), &back, &err) != ENL_OK) {
    fprintf (stderr, "written but not read: %s\n%s\n", err.text, block);
    abort ();
  }
  g_autofree char *have = enl_molecule_formula (back), *want = enl_molecule_formula (mol);
  if (strcmp (have, want) != 0) {
    fprintf (stderr, "%s became %s\n%s\n", want, have, block);
    abort ();
  }
}

int
LLVMFuzzerTestOneInput (const uint8_t *data, size_t size)
{
  g_autoptr (EnlMolecule) mol = NULL;
  EnlError err;

  if (enl_molfile_parse ((const char *)data, size, &mol, &err) == ENL_OK) {
    check_law (mol);
  } else {
    g_autofree char *message = enl_error_message (&err);
  }
  return 0;
}
