#include "core/acidity/reference.h"

#include "tests/core/acidity/acidity-help.h"
#include "tests/runner.h"

static EnlReference *acids;

static void
setup (void)
{
  acids = open_acids ();
}

static void
teardown (void)
{
  enl_reference_free (acids);
}

START_TEST (every_row_finds_itself)
{
  uint32_t n = enl_reference_rows (acids);

  ck_assert_uint_gt (n, 700);
  for (uint32_t i = 0; i < n; i++) {
    const EnlReferenceRow *row = enl_reference_row (acids, i);
    int found = enl_reference_find (acids, row->mol, row->site, row->solvent);
    ck_assert_msg (found >= 0, "%s (%s) is not found", row->name, enl_solvent_id (row->solvent));
    const EnlReferenceRow *same = enl_reference_row (acids, (uint32_t)found);
    ck_assert_str_eq (same->key, row->key);
    ck_assert_int_eq (same->solvent, row->solvent);
  }
}
END_TEST

/* The value is that of the published table, whatever spelling the structure comes in. Sources: the
 * rows of acids.tsv (Bordwell, Acc. Chem. Res. 1988, 21, 456 for DMSO). */
static const struct {
  const char *label, *smiles;
  EnlSolvent solvent;
  double pka; /* 0: not in the table */
} spelling[] = {
    {"acetone", "CC([CH3:1])=O", ENL_SOLVENT_DMSO, 26.5},
    {"acetone, the other methyl", "[CH3:1]C(C)=O", ENL_SOLVENT_DMSO, 26.5},
    {"acetophenone, Kekulé", "C1=CC=CC=C1C(=O)[CH3:1]", ENL_SOLVENT_DMSO, 24.7},
    {"acetophenone, its aryl C-H", "CC(=O)C1=C[CH:1]=CC=C1", ENL_SOLVENT_DMSO, 0},
    {"cyclohexanone from the far side", "[CH2:1]1CCCCC1=O", ENL_SOLVENT_DMSO, 26.4},
    {"cyclohexanone, beta", "C1[CH2:1]CCCC1=O", ENL_SOLVENT_DMSO, 0},
    {"acetone in THF", "C[C:2](=O)[CH3:1]", ENL_SOLVENT_THF, 0},
    {"an invented ketone", "CCCCCC(=O)[CH2:1]CCCCCCCC(C)C", ENL_SOLVENT_DMSO, 0},
};

START_TEST (lookup_is_by_structure)
{
  g_autoptr (EnlMolecule) mol = read_smiles (spelling[_i].smiles);
  int row = enl_reference_find (acids, mol, mapped_atom (mol), spelling[_i].solvent);

  if (spelling[_i].pka == 0) {
    ck_assert_msg (row < 0, "%s", spelling[_i].label);
    return;
  }
  ck_assert_msg (row >= 0, "%s", spelling[_i].label);
  ck_assert_double_eq_tol (enl_reference_row (acids, (uint32_t)row)->pka, spelling[_i].pka, 1e-9);
}
END_TEST

static const char header[] = "name\tsmiles\tpka\tsolvent\tsigma\tsource\n";

/* Stereo: an invented table with both isomers of one acid, one of another, none of a third. */
START_TEST (stereo_is_told_apart_where_the_table_does)
{
  g_autofree char *text = g_strconcat (header,
                                       "Z\t[OH:1]C(=O)/C=C\\Cl\t1\twater\t0.1\tinvented\n"
                                       "E\t[OH:1]C(=O)/C=C/Cl\t2\twater\t0.1\tinvented\n"
                                       "R\t[OH:1]C(=O)[C@H](F)Cl\t3\twater\t0.1\tinvented\n"
                                       "flat\t[OH:1]C(=O)C(F)Br\t4\twater\t0.1\tinvented\n",
                                       NULL);
  static const struct {
    const char *smiles;
    double pka;
  } query[] = {
      {"Cl\\C=C/C(=O)[OH:1]", 1}, {"Cl/C=C/C(=O)[OH:1]", 2},     {"ClC=CC(=O)[OH:1]", 0},
      {"[OH:1]C(=O)C(F)Cl", 3},   {"[OH:1]C(=O)[C@@H](F)Br", 4}, {"[OH:1]C(=O)C(F)Br", 4},
  };
  EnlReference *ref = NULL;

  ck_assert_int_eq (enl_reference_new (text, strlen (text), &ref, NULL), ENL_OK);
  for (size_t i = 0; i < ENL_COUNT (query); i++) {
    g_autoptr (EnlMolecule) mol = read_smiles (query[i].smiles);
    int row = enl_reference_find (ref, mol, mapped_atom (mol), ENL_SOLVENT_WATER);
    double pka = row < 0 ? 0 : enl_reference_row (ref, (uint32_t)row)->pka;
    ck_assert_msg (pka == query[i].pka, "%s: %g", query[i].smiles, pka);
  }
  enl_reference_free (ref);
}
END_TEST

static const struct {
  const char *label, *row;
} fault[] = {
    {"structure", "x\t[CH3:1]C(=O\t26\tdmso\t0.1\ts\n"},
    {"no number", "x\t[CH3:1]C(=O)C\tabc\tdmso\t0.1\ts\n"},
    {"solvent", "x\t[CH3:1]C(=O)C\t26\tthf\t0.1\ts\n"},
    {"no site", "x\tCC(=O)C\t26\tdmso\t0.1\ts\n"},
    {"two sites", "x\t[CH3:1]C(=O)[CH3:1]\t26\tdmso\t0.1\ts\n"},
    {"no hydrogen", "x\tC[C:1](=O)C\t26\tdmso\t0.1\ts\n"},
};

START_TEST (faults_name_their_line)
{
  g_autofree char *text =
      g_strconcat (header, "a\t[CH3:1]C(=O)C\t26.5\tdmso\t0.1\tinvented\n", fault[_i].row, NULL);
  EnlReference *ref = NULL;
  EnlError err;

  ck_assert_msg (enl_reference_new (text, strlen (text), &ref, &err) == ENL_ERROR_FORMAT, "%s",
                 fault[_i].label);
  ck_assert_ptr_null (ref);
  ck_assert_uint_eq (err.line, 3);
}
END_TEST

static Suite *
reference_suite (void)
{
  Suite *suite = suite_create ("acidity reference");
  TCase *tc = tcase_create ("all");

  tcase_add_unchecked_fixture (tc, setup, teardown);
  tcase_add_test (tc, every_row_finds_itself);
  tcase_add_loop_test (tc, lookup_is_by_structure, 0, (int)ENL_COUNT (spelling));
  tcase_add_test (tc, stereo_is_told_apart_where_the_table_does);
  tcase_add_loop_test (tc, faults_name_their_line, 0, (int)ENL_COUNT (fault));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (reference_suite)
