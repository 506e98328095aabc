#include "core/molecule/valence.h"

#include <string.h>

#include "tests/read-structure.h"

/* OpenSMILES 1.0, section on the organic subset. */
static const struct {
  uint8_t element;
  uint32_t bonds, hydrogens;
} implicit_case[] = {
    {5, 0, 3},  {5, 3, 0},  {6, 0, 4},  {6, 3, 1},  {6, 4, 0},  {6, 5, 0},  {7, 0, 3},
    {7, 3, 0},  {7, 4, 1},  {7, 5, 0},  {8, 1, 1},  {8, 3, 0},  {15, 3, 0}, {15, 4, 1},
    {15, 6, 0}, {16, 0, 2}, {16, 3, 1}, {16, 5, 1}, {16, 6, 0}, {9, 0, 1},  {17, 1, 0},
    {53, 2, 0}, {14, 0, 0}, {1, 0, 0},  {0, 0, 0},  {34, 1, 0}, {26, 2, 0},
};

START_TEST (implicit_hydrogens)
{
  ck_assert_uint_eq (
      enl_valence_implicit_hydrogens (implicit_case[_i].element, implicit_case[_i].bonds),
      implicit_case[_i].hydrogens);
}
END_TEST

static const struct {
  const char *label;
  uint8_t element;
  int charge;
  uint8_t largest;
} usual_case[] = {
    {"ammonium", 7, 1, 4},     {"amide ion", 7, -1, 2},       {"oxonium", 8, 1, 3},
    {"alkoxide", 8, -1, 1},    {"oxide ion", 8, -2, 0},       {"carbocation", 6, 1, 3},
    {"carbanion", 6, -1, 3},   {"borate", 5, -1, 4},          {"phosphonium", 15, 1, 4},
    {"PF6-", 15, -1, 6},       {"sulfonium", 16, 1, 5},       {"SiF6 2-", 14, -2, 6},
    {"proton", 1, 1, 0},       {"hydride", 1, -1, 0},         {"iodonium", 53, 1, 6},
    {"triiodide", 53, -1, 8},  {"fluoride", 9, -1, 0},        {"arsonium", 33, 1, 4},
    {"gallium + 1", 31, 1, 2}, {"more than it has", 6, 6, 0},
};

START_TEST (charged_atoms_bond_like_their_neighbours_in_the_row)
{
  size_t count;
  const uint8_t *valence =
      enl_valence_usual (usual_case[_i].element, usual_case[_i].charge, &count);

  ck_assert_uint_gt (count, 0);
  ck_assert_msg (valence[count - 1] == usual_case[_i].largest, "%s", usual_case[_i].label);
}
END_TEST

START_TEST (d_elements_have_no_rule)
{
  size_t count = 7;

  ck_assert_ptr_null (enl_valence_usual (26, 2, &count));
  ck_assert_uint_eq (count, 0);
}
END_TEST

static const struct {
  const char *smiles;
  uint8_t unpaired; /* of the first atom */
} unpaired_case[] = {
    {"[CH3]", 1}, {"[CH2]", 2}, {"[CH4]", 0},  {"[O]", 2},    {"[OH]", 1},   {"[OH-]", 0},
    {"[N]=O", 1}, {"[Na]", 1},  {"[Na+]", 0},  {"[BH3]", 0},  {"[Cl]", 1},   {"[C-]#[O+]", 0},
    {"C", 0},     {"[Fe]", 0},  {"[SH3]C", 0}, {"[SH2]C", 1}, {"[H]", 1},    {"[H+]", 0},
    {"[He]", 0},  {"[Ne]", 0},  {"[P]", 3},    {"[NH4+]", 0}, {"[CH3+]", 0}, {"[CH3-]", 0},
};

START_TEST (unpaired_electrons)
{
  g_autoptr (EnlMolecule) mol = read_structure (unpaired_case[_i].smiles);

  ck_assert_msg (enl_molecule_atom (mol, 0)->unpaired == unpaired_case[_i].unpaired, "%s: %u",
                 unpaired_case[_i].smiles, enl_molecule_atom (mol, 0)->unpaired);
}
END_TEST

static const struct {
  const char *label, *smiles, *charges; /* charges of all atoms */
} separated_case[] = {
    {"nitro", "CN(=O)=O", "0+-0"},
    {"nitro, other order", "O=N(C)=O", "-+00"},
    {"amine oxide", "CN(C)(C)=O", "0+00-"},
    {"pyridine oxide", "O=n1ccccc1", "-+00000"},
    {"pyridine oxide, Kekule", "O=N1=CC=CC=C1", "-+00000"},
    {"azide", "CN=N#N", "00+-"},
    {"diazo", "C=N#N", "0+-"},
    {"already separated", "C[N+](=O)[O-]", "0+0-"},
    {"nitroso stays", "CN=O", "000"},
    {"nitrite ester stays", "CON=O", "0000"},
    {"nitrogen stays", "N#N", "00"},
    {"nitrate", "CON(=O)=O", "00+-0"},
};

START_TEST (five_bonds_of_nitrogen_become_charges)
{
  g_autoptr (EnlMolecule) mol = read_structure (separated_case[_i].smiles);

  ck_assert_uint_eq (enl_molecule_atoms (mol), strlen (separated_case[_i].charges));
  for (uint32_t a = 0; a < enl_molecule_atoms (mol); a++) {
    int charge = enl_molecule_atom (mol, a)->charge;
    char sign = charge > 0 ? '+' : charge < 0 ? '-' : '0';
    ck_assert_msg (sign == separated_case[_i].charges[a], "%s: atom %u", separated_case[_i].label,
                   a);
  }
}
END_TEST

/* Structures that exist and must pass. */
static const char *const good[] = {
    "CS(C)=O",
    "CS(C)(=O)=O",
    "FS(F)(F)(F)(F)F",
    "C[S+](C)C",
    "CP(C)(C)=C",
    "C[P+](C)(C)C",
    "F[P-](F)(F)(F)(F)F",
    "OP(O)(O)=O",
    "OCl(=O)(=O)=O",
    "FBr(F)F",
    "CI(Cl)Cl",
    "c1ccccc1[I+]c1ccccc1",
    "I[I-]I",
    "F[Xe]F",
    "F[B-](F)(F)F",
    "[BH4-]",
    "CB(C)C",
    "[AlH4-]",
    "C[Mg]Br",
    "[Li]CCCC",
    "C[Si](C)(C)C",
    "F[Si-2](F)(F)(F)(F)F",
    "O=[Mn](=O)(=O)[O-]",
    "C[N+]#[C-]",
    "[C-]#[O+]",
    "[CH3-]",
    "[CH3+]",
    "C[O+](C)C",
    "[nH+]1ccccc1",
    "[o+]1ccccc1",
    "C[As](C)(C)(C)C",
    "O=[Se](O)O",
    "N#[N+][O-]",
    "[O-][n+]1ccccc1",
    "CC1=[O+][Mg]O1",
    "[Fe](Cl)(Cl)Cl",
    "[U]",
    "[Og]",
    "*(C)(C)(C)(C)C",
    "[OH3+]",
};

START_TEST (possible_atoms_pass)
{
  g_autoptr (EnlMolecule) mol = read_structure (good[_i]);
  uint32_t atom = 77;

  ck_assert_int_eq (enl_valence_check (mol, &atom, NULL), ENL_OK);
  ck_assert_uint_eq (atom, 77);
}
END_TEST

static const struct {
  const char *smiles;
  size_t offset, length;
  const char *text;
} bad_case[] = {
    {"CC(C)(C)(C)C", 1, 1, "carbon with 5 bonds"},
    {"C=C=C=C(C)C=C=C(C)(C)C", 14, 1, "carbon with 5 bonds"},
    {"CN(C)(C)C", 1, 1, "nitrogen with 4 bonds"},
    {"C[NH](C)(C)C", 1, 4, "nitrogen with 5 bonds"},
    {"CO(C)C", 1, 1, "oxygen with 3 bonds"},
    {"OC(=O=C)C", 4, 1, "oxygen with 4 bonds"},
    {"CF=C", 1, 1, "fluorine with 3 bonds"},
    {"CClC", 1, 2, "chlorine between carbon atoms"},
    {"CBr(C)C", 1, 2, "bromine between carbon atoms"},
    {"CIC", 1, 1, "iodine with 2 bonds"},
    {"[CH5]", 0, 5, "carbon with 5 bonds"},
    {"C[O-]C", 1, 4, "oxygen with 2 bonds and charge -1"},
    {"C[N+](C)(C)(C)C", 1, 4, "nitrogen with 5 bonds and charge +1"},
    {"[CH4+]", 0, 6, "carbon with 4 bonds and charge +1"},
    {"[CH4-]", 0, 6, "carbon with 4 bonds and charge -1"},
    {"CB(C)(C)C", 1, 1, "boron with 4 bonds"},
    {"FS(F)(F)(F)(F)(F)F", 1, 1, "sulfur with 7 bonds"},
    {"CP(C)(C)(C)(C)C", 1, 1, "phosphorus with 6 bonds"},
    {"[H]C([H])([H])([H])[H]", 3, 1, "carbon with 5 bonds"},
    {"[H+]C", 0, 4, "hydrogen with 1 bond and charge +1"},
    {"C[He]", 1, 4, "helium with 1 bond"},
    {"[H][H][H]", 3, 3, "hydrogen with 2 bonds"},
    {"C[NH2]=C", 1, 5, "nitrogen with 5 bonds"},
    {"[Fe](C)(C)(C)(C)(C)(C)(C)(C)(C)(C)(C)(C)(C)(C)(C)(C)C", 0, 4, "iron with 17 neighbours"},
};

START_TEST (impossible_atoms_are_named)
{
  EnlMolecule *mol = NULL;
  EnlError err;
  const char *text = bad_case[_i].smiles;

  ck_assert_int_eq (enl_smiles_parse (text, strlen (text), &mol, &err), ENL_ERROR_CHEMISTRY);
  ck_assert_ptr_null (mol);
  ck_assert_str_eq (err.text, bad_case[_i].text);
  ck_assert_uint_eq (err.offset, bad_case[_i].offset);
  ck_assert_uint_eq (err.length, bad_case[_i].length);
  ck_assert_uint_gt (strlen (err.advice), 10);
}
END_TEST

static Suite *
valence_suite (void)
{
  Suite *suite = suite_create ("molecule valence");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, implicit_hydrogens, 0, (int)ENL_COUNT (implicit_case));
  tcase_add_loop_test (tc, charged_atoms_bond_like_their_neighbours_in_the_row, 0,
                       (int)ENL_COUNT (usual_case));
  tcase_add_test (tc, d_elements_have_no_rule);
  tcase_add_loop_test (tc, unpaired_electrons, 0, (int)ENL_COUNT (unpaired_case));
  tcase_add_loop_test (tc, five_bonds_of_nitrogen_become_charges, 0,
                       (int)ENL_COUNT (separated_case));
  tcase_add_loop_test (tc, possible_atoms_pass, 0, (int)ENL_COUNT (good));
  tcase_add_loop_test (tc, impossible_atoms_are_named, 0, (int)ENL_COUNT (bad_case));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (valence_suite)
