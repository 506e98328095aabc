/* Prints what the core makes of SMILES, one a line on standard input, as tab-separated columns for
 * check-molecules.py:
 * input positions of the atoms, formula, heavy atoms, hydrogens per atom, rings, aromatic atoms,
 * isotopes, unpaired electrons, aromatic bonds as pairs of input positions,
 * symmetry classes without and with stereo, stereocentres, stereo double bonds, canonical SMILES,
 * the same without stereo, Kekulé, in input order, and CIP labels. An unreadable line gives "error"
 * and the message.
 */
#include <stdio.h>
#include <string.h>

#include "core/molecule/cip.h"
#include "core/molecule/molecule.h"
#include "core/molecule/symmetry.h"
#include "core/notation/smiles.h"

static void
print_numbers (const uint32_t *number, uint32_t n)
{
  for (uint32_t v = 0; v < n; v++)
    printf (v ? ",%u" : "%u", number[v]);
  putchar ('\t');
}

static void
print_aromatic_bonds (const EnlMolecule *mol)
{
  const char *comma = "";

  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    const EnlBond *bond = enl_molecule_bond (mol, b);
    uint32_t from = enl_molecule_atom (mol, bond->from)->input;
    uint32_t to = enl_molecule_atom (mol, bond->to)->input;
    if (!bond->aromatic)
      continue;
    printf ("%s%u-%u", comma, MIN (from, to), MAX (from, to));
    comma = ",";
  }
  putchar ('\t');
}

static void
print_atoms (const EnlMolecule *mol)
{
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree char *formula = enl_molecule_formula (mol);
  g_autofree uint32_t *number = g_new (uint32_t, n + 1);

  for (uint32_t v = 0; v < n; v++)
    number[v] = enl_molecule_atom (mol, v)->input;
  print_numbers (number, n);
  printf ("%s\t%u\t", formula, enl_molecule_heavy_atoms (mol));
  for (uint32_t v = 0; v < n; v++)
    number[v] = enl_molecule_total_hydrogens (mol, v);
  print_numbers (number, n);
  printf ("%u\t", enl_molecule_rings (mol));
  for (uint32_t v = 0; v < n; v++)
    number[v] = enl_molecule_atom (mol, v)->aromatic;
  print_numbers (number, n);
  for (uint32_t v = 0; v < n; v++)
    number[v] = enl_molecule_atom (mol, v)->isotope;
  print_numbers (number, n);
  for (uint32_t v = 0; v < n; v++)
    number[v] = enl_molecule_atom (mol, v)->unpaired;
  print_numbers (number, n);
  print_aromatic_bonds (mol);
  for (int stereo = 0; stereo < 2; stereo++) {
    enl_symmetry_classes (mol, stereo, number);
    print_numbers (number, n);
  }
}

static void
print_stereo (const EnlMolecule *mol)
{
  uint32_t centres = 0, double_bonds = 0;

  for (uint32_t v = 0; v < enl_molecule_atoms (mol); v++)
    centres += enl_molecule_atom (mol, v)->winding != ENL_WINDING_NONE;
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++)
    double_bonds += enl_molecule_bond (mol, b)->side != ENL_SIDE_NONE;
  printf ("%u\t%u\t", centres, double_bonds);
}

static void
print_smiles (const EnlMolecule *mol)
{
  static const EnlSmilesFlags kind[] = {ENL_SMILES_DEFAULT, ENL_SMILES_NO_STEREO, ENL_SMILES_KEKULE,
                                        ENL_SMILES_INPUT_ORDER};

  for (size_t k = 0; k < ENL_COUNT (kind); k++) {
    g_autofree char *text = enl_smiles_write (mol, kind[k], NULL);
    printf (k ? "\t%s" : "%s", text);
  }
}

/* "3R,5S,2=3E": labels with the input positions of their atoms. */
static void
print_labels (const EnlMolecule *mol)
{
  uint32_t n = enl_molecule_atoms (mol), bonds = enl_molecule_bonds (mol);
  g_autofree EnlCip *atom_label = g_new (EnlCip, n + 1);
  g_autofree EnlCip *bond_label = g_new (EnlCip, bonds + 1);
  const char *comma = "";

  enl_cip_label (mol, atom_label, bond_label);
  putchar ('\t');
  for (uint32_t v = 0; v < n; v++)
    if (atom_label[v] != ENL_CIP_NONE) {
      printf ("%s%u%s", comma, enl_molecule_atom (mol, v)->input, enl_cip_text (atom_label[v]));
      comma = ",";
    }
  for (uint32_t b = 0; b < bonds; b++)
    if (bond_label[b] != ENL_CIP_NONE) {
      const EnlBond *bond = enl_molecule_bond (mol, b);
      uint32_t from = enl_molecule_atom (mol, bond->from)->input;
      uint32_t to = enl_molecule_atom (mol, bond->to)->input;
      printf ("%s%u=%u%s", comma, MIN (from, to), MAX (from, to), enl_cip_text (bond_label[b]));
      comma = ",";
    }
}

static void
dump_line (const char *line, size_t size)
{
  EnlError err;
  EnlMolecule *mol = NULL;

  if (enl_smiles_parse (line, size, &mol, &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    printf ("error\t%s\n", message);
    return;
  }
  print_atoms (mol);
  print_stereo (mol);
  print_smiles (mol);
  print_labels (mol);
  putchar ('\n');
  enl_molecule_free (mol);
}

int
main (void)
{
  char *line = NULL;
  size_t room = 0;
  ssize_t size;

  while ((size = getline (&line, &room, stdin)) >= 0) {
    if (size > 0 && line[size - 1] == '\n')
      size--;
    dump_line (line, (size_t)size);
  }
  free (line);
  return 0;
}
