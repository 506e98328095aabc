#include "core/molecule/stereo.h"

#include <math.h>
#include <string.h>

#include "core/layout/layout.h"
#include "core/molecule/cip.h"
#include "core/notation/smiles.h"
#include "tests/read-structure.h"

/* The reader cleans what it reads: how many centres and double bonds stay. */
static const struct {
  const char *label, *smiles;
  uint32_t centres, double_bonds;
} clean_case[] = {
    {"four different ligands", "C[C@H](F)Cl", 1, 0},
    {"two methyl groups", "C[C@](C)(F)Cl", 0, 0},
    {"two hydrogens", "C[C@H2]F", 0, 0},
    {"two equal arms", "CC[C@H](F)CC", 0, 0},
    {"deuterium makes a centre", "C[C@H]([2H])O", 1, 0},
    {"amine inverts", "CC[N@](C)CCC", 0, 0},
    {"ammonium does not", "CC[N@+](C)(CCC)CCCC", 1, 0},
    {"bridgehead amine does not", "C1C[N@@]2C[C@H]1CC(=O)C2", 2, 0},
    {"aziridine does not", "C[N@]1C[C@H]1C", 2, 0},
    {"sulfoxide", "C[S@](=O)CC", 1, 0},
    {"sulfone", "C[S@](=O)(=O)CC", 0, 0},
    {"phosphine", "C[P@](CC)c1ccccc1", 1, 0},
    {"2-butene", "C/C=C/C", 0, 1},
    {"2-methyl-2-butene", "C/C=C(/C)C", 0, 0},
    {"cyclohexene", "C1CCC/C=C/1", 0, 0},
    {"cyclooctene", "C1CCC/C=C/CC1", 0, 1},
    {"oxime", "C/C(CC)=N/O", 0, 1},
    {"one mark alone", "C/C=CC", 0, 0},
    {"cis-4-methylcyclohexanol: the centres need each other", "O[C@H]1CC[C@@H](C)CC1", 2, 0},
    {"one of the two unknown", "O[C@H]1CCC(C)CC1", 0, 0},
    {"1,3,5-trimethylcyclohexane, all cis", "C[C@H]1C[C@@H](C)C[C@@H](C)C1", 3, 0},
    {"1,3,5-trimethylcyclohexane, one trans", "C[C@H]1C[C@@H](C)C[C@H](C)C1", 3, 0},
    {"middle of R and S", "C[C@H](O)[C@H](O)[C@@H](C)O", 3, 0},
    {"middle of S and S", "C[C@H](O)[C@H](O)[C@H](C)O", 2, 0},
    {"double bond between E and Z arms", "C/C=C/C(/C=C\\C)=C(/F)Cl", 0, 3},
    {"double bond between two E arms", "C/C=C/C(/C=C/C)=C(/F)Cl", 0, 2},
    {"inositol", "O[C@H]1[C@H](O)[C@@H](O)[C@H](O)[C@H](O)[C@@H]1O", 6, 0},
    {"spiro centre with equal rings", "C1CC[C@]2(C1)CCCC2", 0, 0},
};

START_TEST (cleaning_keeps_true_units)
{
  g_autoptr (EnlMolecule) mol = read_structure (clean_case[_i].smiles);
  uint32_t centres = 0, double_bonds = 0;

  for (uint32_t v = 0; v < enl_molecule_atoms (mol); v++)
    centres += enl_molecule_atom (mol, v)->winding != ENL_WINDING_NONE;
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++)
    double_bonds += enl_molecule_bond (mol, b)->side != ENL_SIDE_NONE;
  ck_assert_msg (centres == clean_case[_i].centres, "%s: %u centres", clean_case[_i].label,
                 centres);
  ck_assert_msg (double_bonds == clean_case[_i].double_bonds, "%s: %u double bonds",
                 clean_case[_i].label, double_bonds);
}
END_TEST

/* ---- drawings ---- */

/* A carbon with ligands at given angles; descriptors by looking at the drawing: with H behind
 * (wedge up), Br > Cl > F clockwise is R. */
static const struct {
  const char *label;
  uint8_t element[4];
  double angle[4]; /* degrees */
  EnlWedge wedge[4];
  EnlCip cip;
} drawing_case[] = {
    {"F up, others clockwise Br, Cl, F", {9, 17, 35}, {90, 210, 330}, {ENL_WEDGE_UP}, ENL_CIP_R},
    {"F down", {9, 17, 35}, {90, 210, 330}, {ENL_WEDGE_DOWN}, ENL_CIP_S},
    {"Br up instead", {9, 17, 35}, {90, 210, 330}, {0, 0, ENL_WEDGE_UP}, ENL_CIP_R},
    {"mirrored", {9, 35, 17}, {90, 210, 330}, {ENL_WEDGE_UP}, ENL_CIP_S},
    {"two wedges up", {9, 17, 35}, {90, 210, 330}, {ENL_WEDGE_UP, ENL_WEDGE_UP}, ENL_CIP_R},
    {"contradiction", {9, 17, 35}, {90, 210, 330}, {ENL_WEDGE_UP, ENL_WEDGE_DOWN}, ENL_CIP_NONE},
    {"wavy", {9, 17, 35}, {90, 210, 330}, {ENL_WEDGE_EITHER}, ENL_CIP_NONE},
    {"no wedge", {9, 17, 35}, {90, 210, 330}, {0}, ENL_CIP_NONE},
    {"fan, outer bond up", {9, 17, 35}, {30, 90, 150}, {ENL_WEDGE_UP}, ENL_CIP_R},
    {"fan, middle bond up: says nothing", {9, 17, 35}, {30, 90, 150}, {0, ENL_WEDGE_UP}, 0},
    /* Four bonds, I F Cl Br anticlockwise. F up: from the side opposite to F (behind the plane)
     * I, Br, Cl turn as they stand, mirrored: the viewer sees Cl, Br, I anticlockwise, so I, Br, Cl
     * clockwise; F, the lowest, is towards the viewer, which turns it round: S. */
    {"four bonds, F up", {53, 9, 17, 35}, {0, 90, 180, 270}, {0, ENL_WEDGE_UP}, ENL_CIP_S},
    {"four bonds, F down", {53, 9, 17, 35}, {0, 90, 180, 270}, {0, ENL_WEDGE_DOWN}, ENL_CIP_R},
    {"four bonds, F up and Cl down",
     {53, 9, 17, 35},
     {0, 90, 180, 270},
     {0, ENL_WEDGE_UP, ENL_WEDGE_DOWN},
     ENL_CIP_S},
    {"four bonds, F and the opposite Br up",
     {9, 53, 35, 17},
     {0, 90, 180, 270},
     {ENL_WEDGE_UP, 0, ENL_WEDGE_UP},
     ENL_CIP_R},
};

static EnlMolecule *
draw_centre (size_t row)
{
  EnlMolecule *mol = enl_molecule_new ();
  uint32_t ligands = drawing_case[row].element[3] ? 4 : 3;
  EnlAtom centre = {.element = 6, .hydrogens = (uint8_t)(4 - ligands)};

  enl_molecule_add_atom (mol, &centre);
  for (uint32_t i = 0; i < ligands; i++) {
    double angle = drawing_case[row].angle[i] * G_PI / 180;
    EnlAtom ligand = {.element = drawing_case[row].element[i], .x = cos (angle), .y = sin (angle)};
    uint32_t v = enl_molecule_add_atom (mol, &ligand);
    uint32_t b = enl_molecule_add_bond (mol, 0, v, 1);
    enl_molecule_edit_bond (mol, b)->wedge = drawing_case[row].wedge[i];
  }
  enl_molecule_finish (mol);
  enl_molecule_set_has_layout (mol, true);
  return mol;
}

START_TEST (wedges_are_read)
{
  g_autoptr (EnlMolecule) mol = draw_centre ((size_t)_i);
  EnlCip label[5];

  enl_stereo_from_drawing (mol);
  enl_cip_label (mol, label, NULL);
  ck_assert_msg (label[0] == drawing_case[_i].cip, "%s: '%s'", drawing_case[_i].label,
                 enl_cip_text (label[0]));
}
END_TEST

START_TEST (wide_end_says_nothing)
{
  g_autoptr (EnlMolecule) mol = draw_centre (0);
  EnlBond *bond = enl_molecule_edit_bond (mol, 0);

  bond->to = 0;
  bond->from = 1;
  enl_molecule_finish (mol);
  enl_stereo_from_drawing (mol);
  ck_assert_int_eq (enl_molecule_atom (mol, 0)->winding, ENL_WINDING_NONE);
}
END_TEST

static EnlMolecule *
draw_butene (double y_last)
{
  const double x[] = {-0.5, 0, 1, 1.5}, y[] = {0.87, 0, 0, y_last};
  EnlMolecule *mol = enl_molecule_new ();

  for (uint32_t v = 0; v < 4; v++) {
    EnlAtom atom = {.element = 6, .hydrogens = v == 0 || v == 3 ? 3 : 1, .x = x[v], .y = y[v]};
    enl_molecule_add_atom (mol, &atom);
    if (v > 0)
      enl_molecule_add_bond (mol, v - 1, v, v == 2 ? 2 : 1);
  }
  enl_molecule_finish (mol);
  enl_molecule_set_has_layout (mol, true);
  return mol;
}

START_TEST (double_bonds_are_read_from_positions)
{
  static const double last[] = {0.87, -0.87, 0};
  static const EnlSide side[] = {ENL_SIDE_SAME, ENL_SIDE_OPPOSITE, ENL_SIDE_NONE};

  for (size_t i = 0; i < ENL_COUNT (last); i++) {
    g_autoptr (EnlMolecule) mol = draw_butene (last[i]);
    enl_stereo_from_drawing (mol);
    ck_assert_int_eq (enl_molecule_bond (mol, 1)->side, side[i]);
    enl_molecule_edit_bond (mol, 1)->wedge = ENL_WEDGE_EITHER;
    enl_stereo_from_drawing (mol);
    ck_assert_int_eq (enl_molecule_bond (mol, 1)->side, ENL_SIDE_NONE);
  }
}
END_TEST

/* ---- there and back: windings to wedges to windings ---- */

static const char *const wedge_case[] = {
    "C[C@H](N)C(=O)O",
    "CC1(C)[C@H]2CC[C@]1(C)C(=O)C2",
    "C[C@]12CC[C@H]3[C@@H](CCC4=CC(=O)CC[C@]34C)[C@@H]1CC[C@@H]2O",
    "O[C@H]1[C@H](O)[C@@H](O)[C@H](O)[C@H](O)[C@@H]1O",
    "OC[C@H]1O[C@@H](O)[C@H](O)[C@@H](O)[C@@H]1O",
    "F[C@](Cl)(Br)I",
    "C[C@](N)(O)CC",
    "C[S@](=O)CC",
    "CC[N@+](C)(CCC)CCCC",
    "CN1[C@H]2CC[C@@H]1[C@H]([C@H](C2)OC(=O)c1ccccc1)C(=O)OC",
    "COc1ccc2nccc(c2c1)[C@@H](O)[C@@H]1C[C@@H]2CCN1C[C@@H]2C=C",
    "C[C@H](O)[C@@H](O)[C@H](O)[C@@H](O)[C@H](O)C",
    "C[C@@H]1C[C@H]1[C@H]1C[C@@H]1C",
    "C/C=C/C=C\\[C@H](C)/C=C\\C",
    "O=C1[C@@H]2[C@H]3C=C[C@H](C3)[C@@H]2C(=O)O1",
    "C[C@H]1CC[C@@H](C)CC1",
};

static char *
smiles_of (const EnlMolecule *mol)
{
  return enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
}

START_TEST (drawn_wedges_mean_the_windings)
{
  g_autoptr (EnlMolecule) mol = read_structure (wedge_case[_i]);
  g_autofree char *before = smiles_of (mol);
  EnlError err;

  ck_assert_int_eq (enl_layout (mol, &err), ENL_OK);
  enl_stereo_draw_wedges (mol);
  for (uint32_t v = 0; v < enl_molecule_atoms (mol); v++)
    enl_molecule_edit_atom (mol, v)->winding = ENL_WINDING_NONE;
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++)
    enl_molecule_edit_bond (mol, b)->side = ENL_SIDE_NONE;
  enl_stereo_from_drawing (mol);
  g_autofree char *after = smiles_of (mol);
  ck_assert_str_eq (after, before);
}
END_TEST

/* ---- descriptors ---- */

/* Labels in the order of the text. Those of the amino acids, glyceraldehyde, limonene and camphor
 * are textbook facts; all were compared with RDKit 2022.09 (rdCIPLabeler). */
static const struct {
  const char *label, *smiles, *cip;
} cip_case[] = {
    {"L-alanine", "N[C@@H](C)C(=O)O", "S"},
    {"L-cysteine", "N[C@@H](CS)C(=O)O", "R"},
    {"D-glyceraldehyde", "OC[C@@H](O)C=O", "R"},
    {"(R)-limonene", "CC1=CC[C@@H](CC1)C(C)=C", "R"},
    {"(1R,4R)-camphor", "O=C1C[C@H]2CC[C@]1(C)C2(C)C", "RR"},
    {"sulfoxide, lone pair lowest", "C[S@](=O)c1ccccc1", "S"},
    {"phosphine", "C[P@](c1ccccc1)C1CC1", "S"},
    {"isotope: rule 2", "[13CH3][C@H](C)O", "S"},
    {"deuterium above hydrogen", "[2H][C@H](C)O", "R"},
    {"triple above double bond", "CC[C@H](C=C)C#C", "R"},
    {"mean duplicate in pyridine", "C[C@@](F)(c1ccccc1)c1ccncc1", "R"},
    {"rule 3: Z arm above E arm", "C/C=C/[C@H](O)/C=C\\C", "SEZ"},
    {"rule 5: r between S and R", "C[C@H](O)[C@@H](O)[C@@H](C)O", "SrR"},
    {"rule 5: s", "C[C@H](O)[C@H](O)[C@@H](C)O", "SsR"},
    {"2-butene", "C/C=C/C", "E"},
    {"maleic acid", "OC(=O)/C=C\\C(=O)O", "Z"},
    {"2-chloro-2-butene", "C/C=C(/Cl)C", "E"},
    {"acetophenone oxime", "C/C(=N/O)c1ccccc1", "Z"},
    {"no unit", "CC(C)=O", ""},
};

START_TEST (descriptors_follow_the_sequence_rules)
{
  g_autoptr (EnlMolecule) mol = read_structure (cip_case[_i].smiles);
  EnlCip atom_label[40], bond_label[40];
  GString *text = g_string_new (NULL);

  enl_cip_label (mol, atom_label, bond_label);
  for (uint32_t v = 0; v < enl_molecule_atoms (mol); v++)
    g_string_append (text, enl_cip_text (atom_label[v]));
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++)
    g_string_append (text, enl_cip_text (bond_label[b]));
  ck_assert_msg (strcmp (text->str, cip_case[_i].cip) == 0, "%s: %s", cip_case[_i].label,
                 text->str);
  g_string_free (text, TRUE);
}
END_TEST

static Suite *
stereo_suite (void)
{
  Suite *suite = suite_create ("molecule stereo");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 60);
  tcase_add_loop_test (tc, cleaning_keeps_true_units, 0, (int)ENL_COUNT (clean_case));
  tcase_add_loop_test (tc, wedges_are_read, 0, (int)ENL_COUNT (drawing_case));
  tcase_add_test (tc, wide_end_says_nothing);
  tcase_add_test (tc, double_bonds_are_read_from_positions);
  tcase_add_loop_test (tc, drawn_wedges_mean_the_windings, 0, (int)ENL_COUNT (wedge_case));
  tcase_add_loop_test (tc, descriptors_follow_the_sequence_rules, 0, (int)ENL_COUNT (cip_case));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (stereo_suite)
