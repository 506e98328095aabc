#include "core/notation/smiles.h"

#include <string.h>

#include "tests/read-structure.h"
#include "tests/renumber.h"

/* Texts that one structure is written in, whatever it was read from. */
static const struct {
  const char *label, *smiles, *written;
  EnlSmilesFlags flags;
} write_case[] = {
    {"branch", "C(C)(=O)C", "CC(C)=O", 0},
    {"Kekulé ring becomes lower case", "C1=CC=CC=C1", "c1ccccc1", 0},
    {"upper case on request", "c1ccccc1", "C1=CC=CC=C1", ENL_SMILES_KEKULE},
    {"pyrrole keeps its hydrogen", "C1=CNC=C1", "c1ccc[nH]1", 0},
    {"bond between rings", "c1ccccc1c1ccccc1", "c1ccccc1-c1ccccc1", 0},
    {"charges and isotopes", "[13CH3]C(=O)[O-].[Na+]", "[13CH3]C([O-])=O.[Na+]", 0},
    {"higher charge", "[Fe+++]", "[Fe+3]", 0},
    {"radical", "[CH3]", "[CH3]", 0},
    {"no needless brackets", "[CH3][OH]", "CO", 0},
    {"maps are left out", "[CH3:1][OH:2]", "CO", 0},
    {"maps are kept on request", "[CH3:1][OH:2]", "[CH3:1][OH:2]", ENL_SMILES_MAPS},
    {"unusual hydrogen count", "[SH4]", "[SH4]", 0},
    {"any atom", "*C", "*C", 0},
    {"quadruple bond", "C$C", "C$C", 0},
    {"isotopic hydrogen stays an atom", "C[2H]", "C[2H]", 0},
    {"chirality", "C(O)(=O)[C@H](N)C", "C[C@@H](N)C(=O)O", 0},
    {"chirality left out", "C(O)(=O)[C@H](N)C", "CC(N)C(=O)O", ENL_SMILES_NO_STEREO},
    {"idle mark left out", "C[C@H](C)O", "CC(C)O", 0},
    {"trans", "C\\C=C\\C", "C/C=C/C", 0},
    {"cis", "C\\C=C/C", "C/C=C\\C", 0},
    {"a diene shares its middle mark", "C\\C=C\\C=C\\C", "C/C=C/C=C/C", 0},
    {"only the marked bond of a diene", "CC=C/C=C/C", "CC=C/C=C/C", 0},
    {"input order", "C(C)(=O)C", "C(C)(=O)C", ENL_SMILES_INPUT_ORDER},
    {"largest fragment first", "O.CCO.[Na+]", "CCO.O.[Na+]", 0},
    {"spiro", "C1CCC11CCC1", "C1CCC12CCC2", 0},
};

START_TEST (text_is_as_expected)
{
  g_autoptr (EnlMolecule) mol = read_structure (write_case[_i].smiles);
  g_autofree char *text = enl_smiles_write (mol, write_case[_i].flags, NULL);

  ck_assert_msg (strcmp (text, write_case[_i].written) == 0, "%s: %s", write_case[_i].label, text);
}
END_TEST

/* Structures for the laws below: cages, polyenes with marks that meet, rings of every kind. */
static const char *const law_case[] = {
    "C[C@]12CC[C@H]3[C@@H](CCC4=CC(=O)CC[C@]34C)[C@@H]1CC[C@@H]2O",
    "CN1[C@H]2CC[C@@H]1[C@H]([C@H](C2)OC(=O)c1ccccc1)C(=O)OC",
    "C/C=C/C=C\\C=C/C(/C=C/C)=C(/F)Cl",
    "C/C=C/C(/C=C/C)=C(/C=C\\C)\\C=C/C",
    "F/C=C/C=C/C=C/C=C/F",
    "CC=CC(/C=C/C)=C/C=CC",
    "C1=C\\C=C/C=C\\C=C/C=C\\1",
    "C1CC/C=C\\CCCC/C=C/C1",
    "C1C/C=C/C=C\\C=C\\CC/C=C/1",
    "N1C=CC2=C1C=CC1=C2C=CC=C1",
    "O=c1[nH]c(=O)c2[nH]cnc2[nH]1",
    "c1cc2ccc3cccc4ccc(c1)c2c34",
    "C12C3C4C1C5C2C3C45",
    "C1C2CC3CC1CC(C2)C3",
    "C[S@](=O)CC[P@](C)c1ccccc1",
    "[2H]C([2H])([2H])[C@H](O)C",
    "[O-][N+](=O)c1ccc(cc1)[N+](=O)[O-]",
    "CC(=O)[O-].[NH4+].O.O",
    "C[C@H]1CC[C@@H](C)CC1.C[C@H]1CC[C@H](C)CC1",
    "[C@H]1(F)[C@@H](Cl)[C@H](F)[C@@H]1Cl",
    "C/C=N/N=C/C",
    "c1ccc2c(c1)c1ccccc1c1ccccc21",
    "C=1=C=C=C=C=C=C=1",
    "[CH2]C=C",
    "CC[N@+](C)(CCC)CCCC.[Br-]",
};

static const EnlSmilesFlags law_flags[] = {ENL_SMILES_DEFAULT, ENL_SMILES_KEKULE,
                                           ENL_SMILES_NO_STEREO};

START_TEST (renumbering_changes_nothing)
{
  g_autoptr (EnlMolecule) mol = read_structure (law_case[_i]);
  uint32_t n = enl_molecule_atoms (mol), place[64];
  GRand *rand = g_rand_new_with_seed (11);

  for (int round = 0; round < 20; round++) {
    shuffle (place, n, rand);
    g_autoptr (EnlMolecule) other = renumber (mol, place);
    for (size_t k = 0; k < ENL_COUNT (law_flags); k++) {
      g_autofree char *text = enl_smiles_write (mol, law_flags[k], NULL);
      g_autofree char *again = enl_smiles_write (other, law_flags[k], NULL);
      ck_assert_str_eq (again, text);
    }
  }
  g_rand_free (rand);
}
END_TEST

START_TEST (reading_back_gives_the_same_text)
{
  g_autoptr (EnlMolecule) mol = read_structure (law_case[_i]);
  g_autofree char *text = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
  static const EnlSmilesFlags flags[] = {ENL_SMILES_DEFAULT, ENL_SMILES_KEKULE,
                                         ENL_SMILES_INPUT_ORDER,
                                         ENL_SMILES_INPUT_ORDER | ENL_SMILES_KEKULE};

  for (size_t k = 0; k < ENL_COUNT (flags); k++) {
    g_autofree char *written = enl_smiles_write (mol, flags[k], NULL);
    g_autoptr (EnlMolecule) back = read_structure (written);
    g_autofree char *again = enl_smiles_write (back, ENL_SMILES_DEFAULT, NULL);
    ck_assert_msg (strcmp (again, text) == 0, "%s by %s: %s", text, written, again);
  }
}
END_TEST

START_TEST (order_tells_the_atom_at_every_place)
{
  g_autoptr (EnlMolecule) mol = read_structure ("OC(=O)c1ccncc1.[Na+]");
  uint32_t order[16];
  g_autofree char *text = enl_smiles_write (mol, ENL_SMILES_DEFAULT, order);
  g_autoptr (EnlMolecule) back = read_structure (text);

  ck_assert_uint_eq (enl_molecule_atoms (back), enl_molecule_atoms (mol));
  for (uint32_t v = 0; v < enl_molecule_atoms (back); v++) {
    const EnlAtom *a = enl_molecule_atom (back, v), *b = enl_molecule_atom (mol, order[v]);
    ck_assert_uint_eq (a->element, b->element);
    ck_assert_uint_eq (a->hydrogens, b->hydrogens);
    ck_assert_uint_eq (enl_molecule_degree (back, v), enl_molecule_degree (mol, order[v]));
  }
}
END_TEST

/* Isomers must not be written alike. */
static const char *const apart_case[][2] = {
    {"C[C@H](N)C(=O)O", "C[C@@H](N)C(=O)O"},
    {"C/C=C/C", "C/C=C\\C"},
    {"C/C=C/C=C/C", "C/C=C/C=C\\C"},
    {"C[C@H]1CC[C@@H](C)CC1", "C[C@H]1CC[C@H](C)CC1"},
    {"C[C@H](O)[C@H](O)[C@@H](C)O", "C[C@H](O)[C@@H](O)[C@@H](C)O"},
    {"O[C@@H]([C@@H](O)C(=O)O)C(=O)O", "O[C@H]([C@@H](O)C(=O)O)C(=O)O"},
    {"C[C@H]1C[C@@H](C)C[C@@H](C)C1", "C[C@H]1C[C@@H](C)C[C@H](C)C1"},
    {"C1CC1.C1CCCCC1", "C1CCC1.C1CCCC1"},
    {"C[S@](=O)CC", "C[S@@](=O)CC"},
    {"[CH3]", "C"},
    {"N1C=CC(=O)C=C1", "n1ccc(O)cc1"},
};

START_TEST (isomers_are_written_apart)
{
  g_autoptr (EnlMolecule) a = read_structure (apart_case[_i][0]);
  g_autoptr (EnlMolecule) b = read_structure (apart_case[_i][1]);
  g_autofree char *text_a = enl_smiles_write (a, ENL_SMILES_DEFAULT, NULL);
  g_autofree char *text_b = enl_smiles_write (b, ENL_SMILES_DEFAULT, NULL);

  ck_assert_str_ne (text_a, text_b);
}
END_TEST

static Suite *
smiles_write_suite (void)
{
  Suite *suite = suite_create ("notation SMILES writing");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 60);
  tcase_add_loop_test (tc, text_is_as_expected, 0, (int)ENL_COUNT (write_case));
  tcase_add_loop_test (tc, renumbering_changes_nothing, 0, (int)ENL_COUNT (law_case));
  tcase_add_loop_test (tc, reading_back_gives_the_same_text, 0, (int)ENL_COUNT (law_case));
  tcase_add_test (tc, order_tells_the_atom_at_every_place);
  tcase_add_loop_test (tc, isomers_are_written_apart, 0, (int)ENL_COUNT (apart_case));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (smiles_write_suite)
