#include "core/notation/smiles.h"

#include <string.h>

#include "tests/read-structure.h"

/* Formulas by hand. Texts are those of the OpenSMILES 1.0 specification or of its kind. */
static const struct {
  const char *smiles, *formula;
} formula_case[] = {
    {"C", "CH4"},
    {"N", "H3N"},
    {"Cl", "ClH"},
    {"B", "BH3"},
    {"[S]", "S"},
    {"[Au]", "Au"},
    {"[OH3+]", "H3O+"},
    {"[Fe++]", "Fe+2"},
    {"[Fe+++]", "Fe+3"},
    {"[O--]", "O-2"},
    {"[NH4+].[OH-]", "H5NO"},
    {"CC(=O)C", "C3H6O"},
    {"CC(C)(C)C(=O)O", "C5H10O2"},
    {"C#N", "CHN"},
    {"C-C=C-C", "C4H8"},
    {"[Rh-](Cl)(Cl)(Cl)(Cl)$[Rh-](Cl)(Cl)(Cl)Cl", "Cl8Rh2-2"},
    {"C1CCCCC1C1CCCCC1", "C12H22"},
    {"C12(CCCCC1)CCCCC2", "C11H20"},
    {"C0CCCC0", "C5H10"},
    {"C%12CCCCC%12", "C6H12"},
    {"C%(123)CCCCC%(123)", "C6H12"},
    {"C%01CCCCC1", "C6H12"},
    {"C1CCCCC%01", "C6H12"},
    {"C=1CCCCC=1", "C6H10"},
    {"C=1CCCCC1", "C6H10"},
    {"C1CCCCC=1", "C6H10"},
    {"C1.C1", "C2H6"},
    {"C(C.O)C", "C3H10O"},
    {"OS(=O)(=S)O", "H2O3S2"},
    {"c1ccccc1-c1ccccc1", "C12H10"},
    {"c1ccccc1c1ccccc1", "C12H10"},
    {"c1cnc[nH]1", "C3H4N2"},
    {"O=c1[nH]cccc1", "C5H5NO"},
    {"[H]C([2H])([H])[3H]", "CH4"},
    {"[13CH4]", "CH4"},
    {"[CH3:7]O", "CH4O"},
    {"[C@TH1H](F)(Cl)Br", "CHBrClF"},
    {"[Pt@SP3](F)(Cl)(Br)I", "BrClFIPt"},
    {"S[As@TB15](F)(Cl)(Br)N", "AsBrClFH3NS"},
    {"C[Co@OH30](F)(Cl)(Br)(I)S", "CH4BrClCoFIS"},
    {"OC(Cl)=[C@AL2]=C(C)F", "C4H4ClFO"},
    {"[te]1cccc1", "C4H4Te"},
    {"[se]1cccc1", "C4H4Se"},
    {"[as]1ccccc1", "C5H5As"},
    {"p1ccccc1", "C5H5P"},
    {"b1ccccc1", "C5H5B"},
    {"[HH]", "H2"},
    {"*CO", "CH3*O"},
    {"[*H2]", "*H2"},
    {"[Og]", "Og"},
    {" CCO\n", "C2H6O"},
};

START_TEST (formulas)
{
  g_autoptr (EnlMolecule) mol = read_structure (formula_case[_i].smiles);
  g_autofree char *formula = enl_molecule_formula (mol);

  ck_assert_msg (strcmp (formula, formula_case[_i].formula) == 0, "%s: %s", formula_case[_i].smiles,
                 formula);
}
END_TEST

START_TEST (bracket_parts_are_kept)
{
  g_autoptr (EnlMolecule) mol = read_structure ("[13CH3:12][18O-].[Na+2]");
  const EnlAtom *carbon = enl_molecule_atom (mol, 0), *oxygen = enl_molecule_atom (mol, 1);

  ck_assert_uint_eq (carbon->isotope, 13);
  ck_assert_uint_eq (carbon->hydrogens, 3);
  ck_assert_uint_eq (carbon->map, 12);
  ck_assert (carbon->exact);
  ck_assert_uint_eq (carbon->offset, 0);
  ck_assert_uint_eq (carbon->length, 10);
  ck_assert_int_eq (oxygen->charge, -1);
  ck_assert_uint_eq (oxygen->isotope, 18);
  ck_assert_uint_eq (enl_molecule_atom (mol, 2)->offset, 17);
  ck_assert_uint_eq (enl_molecule_atom (mol, 2)->input, 3);
}
END_TEST

/* Pairs that write one centre in two ways; the winding is that of atom `centre` of each. */
static const struct {
  const char *smiles;
  uint32_t centre;
  EnlWinding winding;
} winding_case[] = {
    {"N[C@](F)(Cl)Br", 1, ENL_WINDING_ANTICLOCKWISE}, /* the example of molecule.h */
    {"N[C@@](F)(Cl)Br", 1, ENL_WINDING_CLOCKWISE},
    {"[C@](N)(F)(Cl)Br", 0, ENL_WINDING_ANTICLOCKWISE},
    {"N[C@](F)(Br)Cl", 1, ENL_WINDING_ANTICLOCKWISE},
    /* the hydrogen comes first in the rule; in the text it follows the atom before */
    {"N[C@H](F)Cl", 1, ENL_WINDING_CLOCKWISE},
    {"[C@H](N)(F)Cl", 0, ENL_WINDING_ANTICLOCKWISE},
    {"N[C@@H](F)Cl", 1, ENL_WINDING_ANTICLOCKWISE},
    {"N[C@]([H])(F)Cl", 1, ENL_WINDING_CLOCKWISE},
    {"N[C@](F)([H])Cl", 1, ENL_WINDING_ANTICLOCKWISE},
    {"N[C@](F)(Cl)[H]", 1, ENL_WINDING_CLOCKWISE},
    {"[H][C@](N)(F)Cl", 0, ENL_WINDING_ANTICLOCKWISE},
    /* ring numbers stand where the digit stands, whatever the order of atoms */
    {"N[C@]1(F)CO1", 1, ENL_WINDING_ANTICLOCKWISE}, /* text N O F C, atoms N F C O */
    {"N[C@@]1(F)CO1", 1, ENL_WINDING_CLOCKWISE},
    {"N1C[C@]1(F)O", 2, ENL_WINDING_CLOCKWISE}, /* text C N F O, atoms N C F O */
    {"F[C@TH1](N)(Cl)Br", 1, ENL_WINDING_ANTICLOCKWISE},
    {"F[C@TH2](N)(Cl)Br", 1, ENL_WINDING_CLOCKWISE},
    /* a lone pair stands where a hydrogen would */
    {"C[S@](=O)N", 1, ENL_WINDING_CLOCKWISE},
    /* no centres: equal neighbours, two hydrogens, classes other than tetrahedral */
    {"C[C@](C)(F)Cl", 1, ENL_WINDING_NONE},
    {"C[C@H2]F", 1, ENL_WINDING_NONE},
    {"C[C@]([H])([H])F", 1, ENL_WINDING_NONE},
    {"[Pt@SP1](F)(Cl)(Br)I", 0, ENL_WINDING_NONE},
    {"NC(Br)=[C@]=C(O)C", 3, ENL_WINDING_NONE},
};

START_TEST (windings)
{
  g_autoptr (EnlMolecule) mol = read_structure (winding_case[_i].smiles);

  ck_assert_msg (
      enl_molecule_atom (mol, winding_case[_i].centre)->winding == winding_case[_i].winding,
      "%s: %d", winding_case[_i].smiles, enl_molecule_atom (mol, winding_case[_i].centre)->winding);
}
END_TEST

/* Side of F (or of the only heavy neighbour) and Cl; the bond is the only double bond. */
static const struct {
  const char *smiles;
  EnlSide side;
  const char *ends; /* elements of side_from and side_to */
} side_case[] = {
    {"F/C=C/Cl", ENL_SIDE_OPPOSITE, "F Cl"},
    {"F/C=C\\Cl", ENL_SIDE_SAME, "F Cl"},
    {"F\\C=C\\Cl", ENL_SIDE_OPPOSITE, "F Cl"},
    {"C(\\F)=C/Cl", ENL_SIDE_OPPOSITE, "F Cl"},
    {"C(/F)=C/Cl", ENL_SIDE_SAME, "F Cl"},
    {"F/C(/C)=C/Cl", ENL_SIDE_OPPOSITE, "F Cl"},
    {"FC(/C)=C/Cl", ENL_SIDE_SAME, "C Cl"},
    {"[H]/C(F)=C/Cl", ENL_SIDE_SAME, "F Cl"},
    {"[H]/C(F)=C(/[H])Cl", ENL_SIDE_OPPOSITE, "F Cl"},
    {"F/C=C1/CCCCO1", ENL_SIDE_OPPOSITE, "F C"},
    {"F/C=C\\1CCCCO1", ENL_SIDE_SAME, "F O"},
    {"F/C=C1CCCCO/1", ENL_SIDE_SAME, "F O"},
    {"F/C=C\\1CCCCO/1", ENL_SIDE_SAME, "F O"},
    {"F/C=C-1CCCCO/1", ENL_SIDE_SAME, "F O"},
    {"F/C=C\\1.O1", ENL_SIDE_SAME, "F O"},
    /* no information, or none that counts */
    {"F/C=CCl", ENL_SIDE_NONE, ""},
    {"FC=CCl", ENL_SIDE_NONE, ""},
    {"F/C=C(/C)C", ENL_SIDE_NONE, ""},
    {"C/1=C/CCCC1", ENL_SIDE_NONE, ""},
    {"C/C=O", ENL_SIDE_NONE, ""},
    {"C\\1NC/C1=C", ENL_SIDE_NONE, ""},
};

static const EnlBond *
find_side_bond (const EnlMolecule *mol)
{
  for (uint32_t i = 0; i < enl_molecule_bonds (mol); i++)
    if (enl_molecule_bond (mol, i)->order == 2)
      return enl_molecule_bond (mol, i);
  return NULL;
}

START_TEST (sides)
{
  g_autoptr (EnlMolecule) mol = read_structure (side_case[_i].smiles);
  const EnlBond *bond = find_side_bond (mol);
  char ends[16] = "";

  ck_assert_msg (bond->side == side_case[_i].side, "%s: %d", side_case[_i].smiles, bond->side);
  if (bond->side == ENL_SIDE_NONE)
    return;
  static const char *const name[] = {[6] = "C", [8] = "O", [9] = "F", [17] = "Cl"};
  g_snprintf (ends, sizeof ends, "%s %s", name[enl_molecule_atom (mol, bond->side_from)->element],
              name[enl_molecule_atom (mol, bond->side_to)->element]);
  ck_assert_str_eq (ends, side_case[_i].ends);
  ck_assert_uint_ne (enl_molecule_bond_between (mol, bond->from, bond->side_from), ENL_NONE);
  ck_assert_uint_ne (enl_molecule_bond_between (mol, bond->to, bond->side_to), ENL_NONE);
}
END_TEST

START_TEST (a_mark_serves_both_double_bonds)
{
  g_autoptr (EnlMolecule) mol = read_structure ("F/C=C/C=C\\Cl");

  ck_assert_int_eq (enl_molecule_bond (mol, 1)->side, ENL_SIDE_OPPOSITE);
  ck_assert_int_eq (enl_molecule_bond (mol, 3)->side, ENL_SIDE_SAME);
}
END_TEST

START_TEST (aromatic_text_and_kekule_text_agree)
{
  static const char *const pair[][2] = {
      {"c1ccccc1O", "C1=CC=CC=C1O"},
      {"c1ccc2[nH]ccc2c1", "C1=CC=C2NC=CC2=C1"},
      {"O=c1cc[nH]cc1", "O=C1C=CNC=C1"},
      {"c1ccc2cccc2cc1", "C1=CC=C2C=CC=C2C=C1"},
  };

  for (size_t i = 0; i < ENL_COUNT (pair); i++) {
    g_autoptr (EnlMolecule) left = read_structure (pair[i][0]);
    g_autoptr (EnlMolecule) right = read_structure (pair[i][1]);
    for (uint32_t a = 0; a < enl_molecule_atoms (left); a++) {
      ck_assert_int_eq (enl_molecule_atom (left, a)->aromatic,
                        enl_molecule_atom (right, a)->aromatic);
      ck_assert_uint_eq (enl_molecule_total_hydrogens (left, a),
                         enl_molecule_total_hydrogens (right, a));
    }
  }
}
END_TEST

/* Nesting is not limited by a call stack, and long text is refused quickly. */
START_TEST (depth_and_size)
{
  g_autoptr (GString) text = g_string_new ("C");
  EnlMolecule *mol = NULL;
  EnlError err;

  for (int i = 1; i < ENL_MAX_ATOMS; i++)
    g_string_append (text, "(C");
  for (int i = 1; i < ENL_MAX_ATOMS; i++)
    g_string_append_c (text, ')');
  ck_assert_int_eq (enl_smiles_parse (text->str, text->len, &mol, &err), ENL_OK);
  ck_assert_uint_eq (enl_molecule_atoms (mol), ENL_MAX_ATOMS);
  enl_molecule_free (mol);
  g_string_append_c (text, 'C');
  ck_assert_int_eq (enl_smiles_parse (text->str, text->len, &mol, &err), ENL_ERROR_LIMIT);
  ck_assert_uint_eq (err.offset, text->len - 1);
  g_string_set_size (text, 0);
  for (int i = 0; i < 2000000; i++)
    g_string_append_c (text, '(');
  ck_assert_int_eq (enl_smiles_parse (text->str, text->len, &mol, &err), ENL_ERROR_LIMIT);
  ck_assert_int_eq (enl_smiles_parse (text->str, 100000, &mol, &err), ENL_ERROR_SYNTAX);
  ck_assert_ptr_null (mol);
}
END_TEST

START_TEST (no_error_place_is_needed)
{
  EnlMolecule *mol = NULL;

  ck_assert_int_eq (enl_smiles_parse ("C(", 2, &mol, NULL), ENL_ERROR_SYNTAX);
  ck_assert_int_eq (enl_smiles_parse ("CC(C)(C)(C)C", 12, &mol, NULL), ENL_ERROR_CHEMISTRY);
  ck_assert_int_eq (enl_smiles_parse ("", 0, &mol, NULL), ENL_ERROR_EMPTY);
}
END_TEST

/* Every prefix and every single-byte change of real text ends in a molecule or a located fault. */
START_TEST (damaged_text_is_survived)
{
  const char text[] = "O=C([C@H](/C=C/c1cc[nH]c1)[13CH2:3]%12)N2CC[N+](C)(CC2)C%12.[Cl-]";
  static const char byte[] = "()[]=#$:/\\.@+-%0129HCNaclr*{\x01\xCE\xFF";
  char copy[sizeof text];
  EnlError err;

  for (size_t i = 0; i < sizeof text - 1; i++)
    for (size_t k = 0; k < sizeof byte; k++) {
      EnlMolecule *mol = NULL;
      memcpy (copy, text, sizeof text);
      copy[i] = byte[k];
      size_t size = k ? sizeof text - 1 : i + 1;
      memset (&err, 0, sizeof err);
      if (enl_smiles_parse (copy, size, &mol, &err) == ENL_OK) {
        enl_molecule_free (mol);
        continue;
      }
      ck_assert_ptr_null (mol);
      ck_assert (err.text[0] && err.advice[0]);
      ck_assert_uint_eq (err.line, 1);
      ck_assert_uint_le (err.offset, size);
    }
}
END_TEST

static Suite *
smiles_suite (void)
{
  Suite *suite = suite_create ("notation smiles-parse");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, formulas, 0, (int)ENL_COUNT (formula_case));
  tcase_add_test (tc, bracket_parts_are_kept);
  tcase_add_loop_test (tc, windings, 0, (int)ENL_COUNT (winding_case));
  tcase_add_loop_test (tc, sides, 0, (int)ENL_COUNT (side_case));
  tcase_add_test (tc, a_mark_serves_both_double_bonds);
  tcase_add_test (tc, aromatic_text_and_kekule_text_agree);
  tcase_add_test (tc, depth_and_size);
  tcase_add_test (tc, no_error_place_is_needed);
  tcase_add_test (tc, damaged_text_is_survived);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (smiles_suite)
