/* The answer of the child that reads InChI. */
#include "core/notation/inchi-answer.h"
#include "core/notation/smiles.h"
#include "tests/fuzz/fuzz.h"

int
LLVMFuzzerTestOneInput (const uint8_t *data, size_t size)
{
  g_autoptr (EnlMolecule) mol = NULL;
  EnlError err;

  if (enl_inchi_answer_parse ((const char *)data, size, &mol, &err) == ENL_OK &&
      enl_molecule_atoms (mol) <= 60) {
    g_autofree char *smiles = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
  }
  return 0;
}
