#include "cli/verbs.h"
#include "core/notation/inchi.h"
#include "core/notation/smiles.h"

static const char *const column[] = {"substrate",   "formula",   "molar_mass",
                                     "heavy_atoms", "hydrogens", "rings",
                                     "smiles",      "inchikey",  NULL};

static char *
hydrogens_per_atom (const EnlMolecule *mol)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    g_string_append_printf (out, i ? ",%u" : "%u", enl_molecule_total_hydrogens (mol, i));
  return g_string_free (out, FALSE);
}

static EnlStatus
visit (const char *name, const EnlMolecule *mol, void *data, EnlError *err)
{
  const EnlRun *run = data;
  EnlOutput *out = run->out;
  g_autofree char *key = NULL;
  g_autofree char *formula = enl_molecule_formula (mol);
  g_autofree char *hydrogens = hydrogens_per_atom (mol);
  g_autofree char *smiles = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
  /* A structure beyond the identifier (a wildcard, over 1,023 atoms) has no key, yet was read. */
  if (enl_inchi_write (mol, NULL, &key, err) != ENL_OK)
    key = NULL;

  enl_output_text (out, name);
  enl_output_text (out, formula);
  enl_output_number (out, enl_molecule_mass (mol), 3);
  enl_output_integer (out, enl_molecule_heavy_atoms (mol));
  enl_output_text (out, hydrogens);
  enl_output_integer (out, enl_molecule_rings (mol));
  enl_output_text (out, smiles);
  enl_output_text (out, key);
  return ENL_OK;
}

int
enl_verb_molecule (const EnlOptions *options)
{
  return enl_cli_run (options, column, visit);
}
