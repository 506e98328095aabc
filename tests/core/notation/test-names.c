#include "core/notation/names.h"

#include <string.h>

#include "core/base/table.h"
#include "core/notation/groups.h"
#include "core/notation/smiles.h"
#include "resources/embedded.h"
#include "tests/runner.h"

static EnlNames *
open_names (void)
{
  size_t size = 0;
  const char *text = enl_resource ("names.tsv", &size);
  EnlNames *names = NULL;
  EnlError err;

  ck_assert_ptr_nonnull (text);
  ck_assert_msg (enl_names_new (text, size, &names, &err) == ENL_OK, "line %zu: %s", err.line,
                 err.text);
  return names;
}

static EnlTable *
open_table (const char *text, size_t size)
{
  EnlTable *table = NULL;

  ck_assert_int_eq (enl_table_parse (text, size, &table, NULL), ENL_OK);
  return table;
}

static char *
canonical (const char *smiles)
{
  g_autoptr (EnlMolecule) mol = NULL;
  EnlError err;

  ck_assert_msg (enl_smiles_parse (smiles, strlen (smiles), &mol, &err) == ENL_OK, "%s: %s", smiles,
                 err.text);
  return enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
}

static const struct {
  const char *typed, *smiles; /* NULL: not known */
} find_case[] = {
    {"acetone", "CC(C)=O"},
    {"Acetone", "CC(C)=O"},
    {"propan-2-one", "CC(C)=O"},
    {"propan 2 one", "CC(C)=O"},
    {"PROPAN\xE2\x80\x91"
     "2\xE2\x80\x93ONE",
     "CC(C)=O"}, /* typographic hyphens */
    {"MEK", "CCC(C)=O"},
    {"ethyl aceto acetate", "CCOC(=O)CC(C)=O"},
    {"EtOAc", "CCOC(C)=O"},
    {"Meldrum\xE2\x80\x99s acid", "CC1(C)OC(=O)CC(=O)O1"}, /* typographic apostrophe */
    {"dimedone", "CC1(C)CC(=O)CC(=O)C1"},
    {"\xCE\xB1-tetralone", "O=C1CCCc2ccccc12"},
    {"\xCE\x91-Tetralone", "O=C1CCCc2ccccc12"},
    {"\xCE\xB2-tetralone", "O=C1CCc2ccccc2C1"},
    {"gamma butyrolactone", "O=C1CCCO1"},
    {"(R)-carvone", "CC(=C)[C@@H]1CC=C(C)C(=O)C1"},
    {"(-)-carvone", "CC(=C)[C@@H]1CC=C(C)C(=O)C1"},
    {"(\xE2\x88\x92)-carvone", "CC(=C)[C@@H]1CC=C(C)C(=O)C1"}, /* minus sign */
    {"(+)-carvone", "CC(=C)[C@H]1CC=C(C)C(=O)C1"},
    {"3,3-dimethyl-2-butanone", "CC(=O)C(C)(C)C"},
    {"pinacolone", "CC(=O)C(C)(C)C"},
    {"phenindione", "O=C1c2ccccc2C(=O)C1c1ccccc1"}, /* a synonym in parentheses in acids.tsv */
    {"malonic acid", "OC(=O)CC(O)=O"},              /* "(first)" is no part of the name */
    {"acetne", NULL},
    {"", NULL},
    {"---", NULL},
    {"\xFF\xFE", NULL},
};

START_TEST (names_are_found_as_people_type_them)
{
  g_autoptr (EnlNames) names = open_names ();
  const char *typed = find_case[_i].typed;
  const char *found = enl_names_find (names, typed, strlen (typed));

  if (!find_case[_i].smiles) {
    ck_assert_ptr_null (found);
    return;
  }
  ck_assert_msg (found, "'%s' is not known", typed);
  g_autofree char *have = canonical (found), *want = canonical (find_case[_i].smiles);
  ck_assert_str_eq (have, want);
}
END_TEST

static const struct {
  const char *typed, *near;
} near_case[] = {
    {"acetne", "acetone"},
    {"aceton", "acetone"},
    {"acteone", "acetone"},
    {"cyclohexanon", "cyclohexanone"},
    {"ethyl acetoacetat", "ethyl acetoacetate"},
    {"dimethyl malonat", "dimethyl malonate"},
    {"testosteron", "testosterone"},
    {"acetophenon", "acetophenone"},
    {"xyzzy", NULL},
    {"CC(=O)C", NULL},
    {"zz", NULL},
};

START_TEST (near_names_are_suggested)
{
  g_autoptr (EnlNames) names = open_names ();
  const char *typed = near_case[_i].typed, *want = near_case[_i].near;
  const char *near = enl_names_nearest (names, typed, strlen (typed));

  ck_assert_msg (g_strcmp0 (near, want) == 0, "'%s': got '%s', wanted '%s'", typed, near, want);
}
END_TEST

START_TEST (a_structure_gets_its_name)
{
  static const char *const pair[][2] = {
      {"O=C(C)C", "acetone"},
      {"C1CCCCC1=O", "cyclohexanone"},
      {"O=C(CC(=O)OCC)C", "ethyl acetoacetate"},
      {"C1=CC=CC=C1C(C)=O", "acetophenone"},
      {"CC(=C)[C@H]1CC=C(C)C(=O)C1", "(S)-carvone"},
      {"CC(=C)C1CC=C(C)C(=O)C1", "carvone"},
      {"CCCCCCCCCCCCCCCC=O", NULL},
  };
  g_autoptr (EnlNames) names = open_names ();

  for (size_t i = 0; i < ENL_COUNT (pair); i++) {
    g_autofree char *smiles = canonical (pair[i][0]);
    const char *name = enl_names_of (names, smiles);
    ck_assert_msg (g_strcmp0 (name, pair[i][1]) == 0, "%s: '%s'", smiles, name);
  }
}
END_TEST

START_TEST (every_row_of_the_table_is_a_structure)
{
  size_t size = 0;
  const char *text = enl_resource ("names.tsv", &size);
  g_autoptr (EnlTable) table = open_table (text, size);

  ck_assert_uint_gt (enl_table_rows (table), 1500);
  for (size_t row = 0; row < enl_table_rows (table); row++) {
    g_autoptr (EnlMolecule) mol = NULL, other = NULL;
    const char *name = enl_table_cell (table, row, 0), *smiles = enl_table_cell (table, row, 1);
    EnlError err;
    ck_assert_msg (enl_smiles_parse (smiles, strlen (smiles), &mol, &err) == ENL_OK, "%s: %s: %s",
                   name, smiles, err.text);
    ck_assert_msg (!strchr (smiles, ':'), "%s: map number in %s", name, smiles);
    ck_assert_msg (enl_smiles_parse (name, strlen (name), &other, NULL) != ENL_OK,
                   "'%s' is also a SMILES", name);
  }
}
END_TEST

/* Formulas written by hand beside the names (tests/data/name-formulas.tsv): a slip in a structure
 * that changes the count of atoms shows. */
START_TEST (formulas_agree)
{
  g_autofree char *path =
      g_build_filename (g_getenv ("ENL_SOURCE_DIR"), "tests", "data", "name-formulas.tsv", NULL);
  g_autofree char *text = NULL;
  size_t size = 0, checked = 0;
  g_autoptr (EnlNames) names = open_names ();

  ck_assert (g_file_get_contents (path, &text, &size, NULL));
  g_autoptr (EnlTable) table = open_table (text, size);
  for (size_t row = 0; row < enl_table_rows (table); row++, checked++) {
    g_autoptr (EnlMolecule) mol = NULL;
    const char *name = enl_table_cell (table, row, 0);
    const char *smiles = enl_names_find (names, name, strlen (name));
    ck_assert_msg (smiles, "'%s' is not known", name);
    ck_assert_int_eq (enl_smiles_parse (smiles, strlen (smiles), &mol, NULL), ENL_OK);
    g_autofree char *formula = enl_molecule_formula (mol);
    ck_assert_msg (strcmp (formula, enl_table_cell (table, row, 1)) == 0, "%s: %s, not %s", name,
                   formula, enl_table_cell (table, row, 1));
  }
  ck_assert_uint_gt (checked, 500);
}
END_TEST

static const struct {
  const char *label, *table;
  EnlStatus status;
  size_t line;
} fault_case[] = {
    {"empty", "", ENL_ERROR_EMPTY, 0},
    {"no column of structures", "name\tformula\na\tb\n", ENL_ERROR_FORMAT, 0},
    {"row without structure", "name\tsmiles\nacetone\tCC(C)=O\nnothing\n", ENL_ERROR_FORMAT, 3},
    {"one name, two structures", "name\tsmiles\na b\tC\nA-B\tCC\n", ENL_ERROR_FORMAT, 3},
};

START_TEST (faulty_tables_are_refused)
{
  EnlNames *names = NULL;
  EnlError err = {0};
  EnlStatus status =
      enl_names_new (fault_case[_i].table, strlen (fault_case[_i].table), &names, &err);

  ck_assert_msg (status == fault_case[_i].status, "%s", fault_case[_i].label);
  ck_assert_uint_eq (err.line, fault_case[_i].line);
  ck_assert_ptr_null (names);
}
END_TEST

static Suite *
names_suite (void)
{
  Suite *suite = suite_create ("notation names");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, names_are_found_as_people_type_them, 0, (int)ENL_COUNT (find_case));
  tcase_add_loop_test (tc, near_names_are_suggested, 0, (int)ENL_COUNT (near_case));
  tcase_add_test (tc, a_structure_gets_its_name);
  tcase_add_test (tc, every_row_of_the_table_is_a_structure);
  tcase_add_test (tc, formulas_agree);
  tcase_add_loop_test (tc, faulty_tables_are_refused, 0, (int)ENL_COUNT (fault_case));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (names_suite)
