#include <string.h>

#include "tests/read-structure.h"

/* Textbook cases (Hückel's 4n + 2; common practice of cheminformatics for the borderline ones).
 * `flags`: one letter for each atom in the order of the text, A aromatic, - not. */
static const struct {
  const char *label, *smiles, *flags;
} aromatic_case[] = {
    {"benzene", "C1=CC=CC=C1", "AAAAAA"},
    {"cyclohexadiene", "C1=CC=CCC1", "------"},
    {"cyclobutadiene", "C1=CC=C1", "----"},
    {"cyclooctatetraene", "C1=CC=CC=CC=C1", "--------"},
    {"pyrrole", "C1=CNC=C1", "AAAAA"},
    {"furan", "C1=COC=C1", "AAAAA"},
    {"thiophene", "C1=CSC=C1", "AAAAA"},
    {"selenophene", "C1=C[Se]C=C1", "AAAAA"},
    {"imidazole", "C1=CN=CN1", "AAAAA"},
    {"pyridine", "C1=CC=NC=C1", "AAAAAA"},
    {"pyridinium", "C1=CC=[NH+]C=C1", "AAAAAA"},
    {"pyridine N-oxide", "C1=CC=[N+]([O-])C=C1", "AAAA-AA"},
    {"2-pyridone", "O=C1C=CC=CN1", "-AAAAAA"},
    {"4-pyrone", "O=C1C=COC=C1", "-AAAAAA"},
    {"tropone", "O=C1C=CC=CC=C1", "-AAAAAAA"},
    {"benzoquinone", "O=C1C=CC(=O)C=C1", "--------"},
    {"cyclopentadiene", "C1C=CC=C1", "-----"},
    {"cyclopentadienide", "[CH-]1C=CC=C1", "AAAAA"},
    {"cyclopentadienyl cation", "[CH+]1C=CC=C1", "-----"},
    {"tropylium", "[CH+]1C=CC=CC=C1", "AAAAAAA"},
    {"cyclopropenylium", "[CH+]1C=C1", "AAA"},
    {"fulvene", "C=C1C=CC=C1", "------"},
    {"naphthalene", "C1=CC=C2C=CC=CC2=C1", "AAAAAAAAAA"},
    {"azulene", "C1=CC=C2C=CC=C2C=C1", "AAAAAAAAAA"},
    {"indole", "C1=CC=C2C(=C1)C=CN2", "AAAAAAAAA"},
    {"indene", "C1C=CC2=CC=CC=C21", "---AAAAAA"},
    {"indenide", "[CH-]1C=CC2=CC=CC=C21", "AAAAAAAAA"},
    {"fluorene", "C1C2=CC=CC=C2C2=CC=CC=C21", "-AAAAAAAAAAAA"},
    {"pyrylium", "C1=CC=[O+]C=C1", "AAAAAA"},
    {"borabenzene anion", "[BH-]1=CC=CC=C1", "AAAAAA"},
    {"phosphinine", "C1=CC=PC=C1", "AAAAAA"},
    {"thiophene oxide", "O=S1C=CC=C1", "------"},
    {"thiophene dioxide", "O=S1(=O)C=CC=C1", "-------"},
    {"caffeine", "CN1C=NC2=C1C(=O)N(C)C(=O)N2C", "-AAAAAA-A-A-A-"},
    {"1,3-diketone in a ring", "O=C1CCCC(=O)C1", "--------"},
    {"maleimide", "O=C1C=CC(=O)N1", "-------"},
    {"phenyl radical", "[C]1=CC=CC=C1", "AAAAAA"},
    {"benzyne", "C1#CC=CC=C1", "AAAAAA"},
    {"cyclic allene", "C1=C=NC=N1", "-----"},
    {"anthrone", "O=C1C2=CC=CC=C2CC2=CC=CC=C21", "--AAAAAA-AAAAAA"},
    {"pyracylene", "C1=CC2=CC=C3C=CC4=CC=C1C2=C34", "--AAAA--AAAAAA"},
    {"phthalimide", "O=C1NC(=O)C2=CC=CC=C12", "-----AAAAAA"},
    {"coumarin", "O=C1C=CC2=CC=CC=C2O1", "-AAAAAAAAAA"},
    {"dihydropyridone", "O=C1C=CNCC1", "-------"},
    {"methylene pyran", "C=C1C=COC=C1", "-------"},
};

START_TEST (flags)
{
  g_autoptr (EnlMolecule) mol = read_structure (aromatic_case[_i].smiles);
  uint32_t n = enl_molecule_atoms (mol);
  char found[64] = "";

  ck_assert_uint_lt (n, sizeof found);
  for (uint32_t a = 0; a < n; a++)
    found[a] = enl_molecule_atom (mol, a)->aromatic ? 'A' : '-';
  ck_assert_msg (strcmp (found, aromatic_case[_i].flags) == 0, "%s: %s", aromatic_case[_i].label,
                 found);
}
END_TEST

START_TEST (the_bond_inside_azulene_is_single)
{
  g_autoptr (EnlMolecule) mol = read_structure ("C1=CC=C2C=CC=C2C=C1");
  uint32_t n = 0, inside = enl_molecule_bond_between (mol, 3, 7);

  for (uint32_t i = 0; i < enl_molecule_bonds (mol); i++)
    n += enl_molecule_bond (mol, i)->aromatic;
  ck_assert_uint_eq (n, 10);
  ck_assert (!enl_molecule_bond (mol, inside)->aromatic);
}
END_TEST

START_TEST (a_new_finish_forgets_old_flags)
{
  g_autoptr (EnlMolecule) mol = read_structure ("c1ccccc1");

  enl_molecule_edit_bond (mol, 0)->order = 1;
  enl_molecule_edit_bond (mol, 1)->order = 1;
  enl_molecule_edit_bond (mol, 5)->order = 1;
  enl_molecule_finish (mol);
  for (uint32_t a = 0; a < 6; a++)
    ck_assert (!enl_molecule_atom (mol, a)->aromatic && !enl_molecule_bond (mol, a)->aromatic);
}
END_TEST

/* Bridged rings with more than one smallest set of rings: flags must not follow the set that the
 * order of atoms happens to select. */
START_TEST (flags_do_not_depend_on_the_order_of_atoms)
{
  static const char *const pair[][2] = {
      {"ClC1=CC2=C=CC=C(NC=N2)C=C1", "ClC1=CC2=C=CC=C(C=C1)NC=N2"},
      {"N2C1=CC2=C(NNC2=C=CC=C2)C=C1", "C=1=CC=CC1NNc1ccc2cc1N2"},
  };

  for (size_t i = 0; i < ENL_COUNT (pair); i++) {
    uint32_t count[2] = {0};
    for (int k = 0; k < 2; k++) {
      g_autoptr (EnlMolecule) mol = read_structure (pair[i][k]);
      for (uint32_t a = 0; a < enl_molecule_atoms (mol); a++)
        count[k] += enl_molecule_atom (mol, a)->aromatic;
    }
    ck_assert_uint_eq (count[0], count[1]);
  }
}
END_TEST

static Suite *
aromaticity_suite (void)
{
  Suite *suite = suite_create ("molecule aromaticity");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, flags, 0, (int)ENL_COUNT (aromatic_case));
  tcase_add_test (tc, the_bond_inside_azulene_is_single);
  tcase_add_test (tc, a_new_finish_forgets_old_flags);
  tcase_add_test (tc, flags_do_not_depend_on_the_order_of_atoms);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (aromaticity_suite)
