#include "core/notation/groups.h"

#include <string.h>

#include "core/base/table.h"
#include "core/notation/smiles.h"
#include "resources/embedded.h"
#include "tests/runner.h"

static char *
canonical (const char *smiles)
{
  g_autoptr (EnlMolecule) mol = NULL;
  EnlError err;

  ck_assert_msg (enl_smiles_parse (smiles, strlen (smiles), &mol, &err) == ENL_OK, "%s: %s", smiles,
                 err.text);
  return enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
}

static const char *const line_case[][2] = {
    {"CH4", "C"},
    {"H2O", "O"},
    {"HCl", "Cl"},
    {"CH3CH3", "CC"},
    {"H3CCH3", "CC"},
    {"CH3COCH3", "CC(C)=O"},
    {"CH3-CO-CH3", "CC(C)=O"},
    {"CH3C(O)CH3", "CC(C)=O"},
    {"CH3C(=O)CH3", "CC(C)=O"},
    {"Me2CO", "CC(C)=O"},
    {"(CH3)2CO", "CC(C)=O"},
    {"(CH3)2C=O", "CC(C)=O"},
    {"CH\xE2\x82\x83"
     "COCH\xE2\x82\x83",
     "CC(C)=O"}, /* subscript digits */
    {"PhCH2CO2Et", "CCOC(=O)Cc1ccccc1"},
    {"C6H5CH2COOC2H5", "CCOC(=O)Cc1ccccc1"},
    {"MeCOCH2CO2Me", "CC(=O)CC(=O)OC"},
    {"CH3COCH2COOCH2CH3", "CC(=O)CC(=O)OCC"},
    {"(CH3)2CHCHO", "CC(C)C=O"},
    {"CHMe2CHO", "CC(C)C=O"},
    {"CH3CH(CH3)CHO", "CC(C)C=O"},
    {"OHCCH(CH3)2", "CC(C)C=O"},
    {"OHCCH2CHO", "O=CCC=O"},
    {"OHCCHO", "O=CC=O"},
    {"HCHO", "C=O"},
    {"HCO2Et", "CCOC=O"},
    {"HCOOH", "OC=O"},
    {"HCONMe2", "CN(C)C=O"},
    {"PhCOMe", "CC(=O)c1ccccc1"},
    {"PhC(O)CH3", "CC(=O)c1ccccc1"},
    {"(PhCO)2CH2", "O=C(CC(=O)c1ccccc1)c1ccccc1"},
    {"CH2(CO2Et)2", "CCOC(=O)CC(=O)OCC"},
    {"EtO2CCH2CO2Et", "CCOC(=O)CC(=O)OCC"},
    {"EtOOCCH2COOEt", "CCOC(=O)CC(=O)OCC"},
    {"(EtO2C)2CH2", "CCOC(=O)CC(=O)OCC"},
    {"HO2CCH2CO2H", "OC(=O)CC(=O)O"},
    {"HOOCCH2COOH", "OC(=O)CC(=O)O"},
    {"NCCH2CO2Et", "CCOC(=O)CC#N"},
    {"CH2(CN)2", "N#CCC#N"},
    {"(NC)2CH2", "N#CCC#N"},
    {"CH3CN", "CC#N"},
    {"PhCN", "N#Cc1ccccc1"},
    {"HCN", "C#N"},
    {"CH3C#N", "CC#N"},
    {"CH3(CH2)4CHO", "CCCCCC=O"},
    {"NC(CH2)4CN", "N#CCCCCC#N"},
    {"CH3CH(OH)CH3", "CC(O)C"},
    {"CH3CHOHCH3", "CC(O)C"},
    {"(CH3)3COH", "CC(C)(C)O"},
    {"(CH3)3COCH3", "CC(C)(C)OC"},
    {"CH3OCH3", "COC"},
    {"Et2O", "CCOCC"},
    {"t-BuOH", "CC(C)(C)O"},
    {"i-Pr2NEt", "CCN(C(C)C)C(C)C"},
    {"iPr2NH", "CC(C)NC(C)C"},
    {"CH3COCl", "CC(=O)Cl"},
    {"AcCl", "CC(=O)Cl"},
    {"Ac2O", "CC(=O)OC(C)=O"},
    {"(CH3CO)2O", "CC(=O)OC(C)=O"},
    {"CH3COOCOCH3", "CC(=O)OC(C)=O"},
    {"AcOEt", "CCOC(C)=O"},
    {"CF3COCH2COCF3", "FC(F)(F)C(=O)CC(=O)C(F)(F)F"},
    {"F3CCO2Et", "CCOC(=O)C(F)(F)F"},
    {"CCl3CHO", "O=CC(Cl)(Cl)Cl"},
    {"Cl2CHCOCl", "ClC(Cl)C(=O)Cl"},
    {"BrCH2COPh", "O=C(CBr)c1ccccc1"},
    {"CH3NO2", "C[N+](=O)[O-]"},
    {"O2NCH2CO2Et", "CCOC(=O)C[N+](=O)[O-]"},
    {"PhNO2", "O=[N+]([O-])c1ccccc1"},
    {"N3CH2CO2Et", "CCOC(=O)CN=[N+]=[N-]"},
    {"CH3CONH2", "CC(N)=O"},
    {"CH3CON(CH3)2", "CC(=O)N(C)C"},
    {"PhNHCOCH3", "CC(=O)Nc1ccccc1"},
    {"MeCON(OMe)Me", "CC(=O)N(C)OC"},
    {"H2NCH2CO2H", "NCC(=O)O"},
    {"BocNHCH2CO2Me", "COC(=O)CNC(=O)OC(C)(C)C"},
    {"Ph2C=NCH2CO2Et", "CCOC(=O)CN=C(c1ccccc1)c1ccccc1"},
    {"CO(NH2)2", "NC(N)=O"},
    {"CH3CSNH2", "CC(N)=S"},
    {"CH3COSEt", "CCSC(C)=O"},
    {"CH3SOCH3", "CS(C)=O"},
    {"Me2SO", "CS(C)=O"},
    {"CH3S(O)CH3", "CS(C)=O"},
    {"CH3SO2CH3", "CS(C)(=O)=O"},
    {"CH3S(O)2CH3", "CS(C)(=O)=O"},
    {"PhSO2CH2CO2Me", "COC(=O)CS(=O)(=O)c1ccccc1"},
    {"CH3SO3H", "CS(=O)(=O)O"},
    {"TsOH", "Cc1ccc(cc1)S(=O)(=O)O"},
    {"TMSCl", "C[Si](C)(C)Cl"},
    {"Me3SiCl", "C[Si](C)(C)Cl"},
    {"CH2=C(OTMS)Ph", "C=C(O[Si](C)(C)C)c1ccccc1"},
    {"CH2=CHCHO", "C=CC=O"},
    {"CH3CH=CHCOCH3", "CC=CC(C)=O"},
    {"(CH3)2C=CHCOCH3", "CC(C)=CC(C)=O"},
    {"HC\xE2\x89\xA1"
     "CCO2Et",
     "CCOC(=O)C#C"},
    {"CH2=C=O", "C=C=O"},
    {"(EtO)2P(O)CH2CO2Et", "CCOC(=O)CP(=O)(OCC)OCC"},
    {"Ph3P", "c1ccc(cc1)P(c1ccccc1)c1ccccc1"},
    {"Ph3PO", "O=P(c1ccccc1)(c1ccccc1)c1ccccc1"},
    {"Ph3P=CHCO2Et", "CCOC(=O)C=P(c1ccccc1)(c1ccccc1)c1ccccc1"},
    {"HOCH2CH2OH", "OCCO"},
    {"CH2(CH2OH)2", "OCCCO"},
    {"C(CH3)4", "CC(C)(C)C"},
    {"HC(OEt)3", "CCOC(OCC)OCC"},
    {"(HOCH2)3CNH2", "NC(CO)(CO)CO"},
    {"((CH3)2CH)2NH", "CC(C)NC(C)C"},
    {"CyCOMe", "CC(=O)C1CCCCC1"},
    {"PhMe", "Cc1ccccc1"},
    {"MeI", "CI"},
    {"Br2", "BrBr"},
    {"(CH3)2C=NOH", "CC(C)=NO"},
    {"CH3(OCH2CH2)3OH", "COCCOCCOCCO"},
};

START_TEST (lines_of_groups_are_read)
{
  const char *text = line_case[_i][0];
  EnlMolecule *mol = NULL;
  EnlError err;

  ck_assert_msg (enl_groups_parse (text, strlen (text), &mol, &err) == ENL_OK,
                 "'%s' column %zu: %s", text, err.column, err.text);
  g_autofree char *have = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
  g_autofree char *want = canonical (line_case[_i][1]);
  ck_assert_msg (strcmp (have, want) == 0, "'%s': %s, not %s", text, have, want);
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    const EnlAtom *atom = enl_molecule_atom (mol, i);
    ck_assert_uint_eq (atom->input, i + 1);
    ck_assert_uint_ge (atom->length, 1);
    ck_assert_uint_le (atom->offset + atom->length, strlen (text));
  }
  enl_molecule_free (mol);
}
END_TEST

static const struct {
  const char *text;
  size_t column;
  const char *message; /* its start */
} bad_case[] = {
    {"CH3CHCHO", 4, "'CH' has 1 free bond"},
    {"CH3CHCHCH3", 4, "'CH' has 1 free bond"},
    {"CH2", 1, "'CH2' has 2 free bonds"},
    {"CH3CH3CH3", 7, "'CH3' has no free bond for what follows"},
    {"CH5", 1, "'CH5' has more hydrogens than bonds"},
    {"CH3COCH3CH3", 9, "'CO' has no free bond for what follows"},
    {"CNCH2CO2Et", 1, "'CN' can mean two things here"},
    {"CH3CNO", 4, "'CN' can mean two things here"},
    {"C3H7COCH3", 1, "'C3' does not say how its atoms are joined"},
    {"PhCCPh", 3, "'C' has 2 free bonds"},
    {"Ph", 1, "'Ph' is not a whole molecule"},
    {"Ph2", 1, "'Ph2' is not a whole molecule"},
    {"PhQ", 3, "no group or atom starts with 'Q'"},
    {"NaOEt", 1, "no group or atom starts with 'Na'"},
    {"CH3COCH2(CO2Et", 9, "the bracket '(' is never closed"},
    {"CH3()CH3", 4, "empty brackets"},
    {"CH3)CH3", 4, "no group or atom starts with ')'"},
    {"CH3CH2=", 7, "a bond sign leads nowhere"},
    {"=CH2", 1, "no group or atom starts with '='"},
    {"CH3=CH3", 5, "'CH3' has no free bond for what follows"},
    {"CH2=Ph", 5, "'Ph' has one free bond only"},
    {"CF9CHO", 2, "'C' has no free bond for what follows"},
    {"CH3(CH2)99CH3", 9, "the count '99' is out of range"},
    {"(CH2)3CO", 1, "'(CH2)' is no group"},
    {"C(CH3CH3)4", 6, "the branch is complete before this"},
    {"CH3HCH3", 4, "a hydrogen stands without an atom"},
    {"CO2", 1, "'CO2' has 1 free bond"},
    {"CH3 COCH3", 4, "no group or atom starts with ' '"},
    {"CH3CO\xCE\xB1", 6, "no group or atom starts with '\xCE\xB1'"},
    {"CH3CO\xFF", 6, NULL},
};

START_TEST (what_is_no_line_of_groups_is_told)
{
  const char *text = bad_case[_i].text;
  EnlMolecule *mol = NULL;
  EnlError err = {0};

  ck_assert_msg (enl_groups_parse (text, strlen (text), &mol, &err) != ENL_OK, "'%s' was read",
                 text);
  ck_assert_ptr_null (mol);
  if (bad_case[_i].message)
    ck_assert_str_eq (err.text, bad_case[_i].message);
  ck_assert_msg (err.column == bad_case[_i].column, "'%s': column %zu, not %zu (%s)", text,
                 err.column, bad_case[_i].column, err.text);
  ck_assert_str_ne (err.advice, "");
}
END_TEST

START_TEST (nesting_and_size_are_limited)
{
  g_autofree char *deep = g_strnfill (200, '(');
  g_autofree char *long_line = g_strnfill (600, 'C');
  EnlMolecule *mol = NULL;
  EnlError err;

  ck_assert_int_eq (enl_groups_parse (deep, 200, &mol, &err), ENL_ERROR_LIMIT);
  ck_assert_int_eq (enl_groups_parse (long_line, 600, &mol, &err), ENL_ERROR_LIMIT);
  const char *many = "CH3((((CH2)40CH2)40CH2)40CH2)40CH3";
  ck_assert_int_eq (enl_groups_parse (many, strlen (many), &mol, &err), ENL_ERROR_LIMIT);
  ck_assert_int_eq (enl_groups_parse ("", 0, &mol, &err), ENL_ERROR_EMPTY);
}
END_TEST

/* On a phenyl group, so that every abbreviation closes to a molecule. */
static char *
attached_to_phenyl (const char *group)
{
  g_autofree char *text = g_strconcat ("c1ccccc1", group, NULL);
  return canonical (text);
}

START_TEST (abbreviations_and_lines_agree)
{
  size_t size = 0, compared = 0;
  const char *text = enl_resource ("groups.tsv", &size);
  EnlTable *table = NULL;

  ck_assert_int_eq (enl_table_parse (text, size, &table, NULL), ENL_OK);
  for (size_t row = 0; row < enl_table_rows (table); row++) {
    const char *group = enl_table_cell (table, row, 0), *smiles = enl_table_cell (table, row, 1);
    g_autofree char *want = attached_to_phenyl (smiles);
    ck_assert_str_eq (enl_group_find (group, strlen (group)), smiles);
    g_autofree char *line = g_strconcat ("Ph", group, NULL);
    g_autoptr (EnlMolecule) mol = NULL;
    if (enl_groups_parse (line, strlen (line), &mol, NULL) != ENL_OK)
      continue; /* written backwards (EtO), or charged */
    g_autofree char *have = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
    ck_assert_msg (strcmp (have, want) == 0, "'%s': %s, not %s", line, have, want);
    compared++;
  }
  enl_table_free (table);
  ck_assert_uint_gt (compared, 130);
  ck_assert_ptr_null (enl_group_find ("Xx", 2));
  ck_assert_ptr_null (enl_group_find ("", 0));
  ck_assert_ptr_null (enl_group_find ("a very long word indeed", 23));
}
END_TEST

static Suite *
groups_suite (void)
{
  Suite *suite = suite_create ("notation groups");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, lines_of_groups_are_read, 0, (int)ENL_COUNT (line_case));
  tcase_add_loop_test (tc, what_is_no_line_of_groups_is_told, 0, (int)ENL_COUNT (bad_case));
  tcase_add_test (tc, nesting_and_size_are_limited);
  tcase_add_test (tc, abbreviations_and_lines_agree);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (groups_suite)
