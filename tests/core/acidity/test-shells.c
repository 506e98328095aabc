#include "core/acidity/shells.h"

#include "tests/core/acidity/acidity-help.h"
#include "tests/runner.h"

static EnlConstants *constants;

static void
setup (void)
{
  ck_assert_int_eq (enl_constants_new (&constants, NULL), ENL_OK);
}

static void
teardown (void)
{
  enl_constants_free (constants);
}

typedef struct {
  GArray *store;
  EnlShells shells;
} Around;

static Around
look (const char *smiles)
{
  g_autoptr (EnlMolecule) mol = read_smiles (smiles);
  g_autoptr (EnlSurvey) survey = enl_survey_new (mol, constants);
  Around around = {g_array_new (FALSE, FALSE, sizeof (EnlMark)), {0}};

  enl_shells_collect (survey, mapped_atom (mol), around.store, &around.shells);
  around.shells.mark = (const EnlMark *)(void *)around.store->data;
  return around;
}

static void
compare (const char *a, const char *b, double *likeness)
{
  Around x = look (a), y = look (b);

  enl_shells_compare (&x.shells, &y.shells, likeness);
  g_array_unref (x.store);
  g_array_unref (y.store);
}

START_TEST (spelling_does_not_matter)
{
  double likeness[ENL_N_SHELLS];

  compare ("[CH3:1]C(=O)c1ccc(Cl)cc1", "C1=CC(Cl)=CC=C1C(=O)[CH3:1]", likeness);
  for (int d = 0; d < ENL_N_SHELLS; d++)
    ck_assert_double_eq (likeness[d], 1);
}
END_TEST

START_TEST (difference_shows_in_its_shell)
{
  double likeness[ENL_N_SHELLS];

  /* para chlorine is six bonds from the acidic carbon; its carbon, five bonds away, sees it. */
  compare ("[CH3:1]C(=O)c1ccc(Cl)cc1", "[CH3:1]C(=O)c1ccccc1", likeness);
  for (int d = 0; d < 5; d++)
    ck_assert_msg (likeness[d] == 1, "shell %d: %g", d, likeness[d]);
  ck_assert_double_lt (likeness[5], 1);
  ck_assert_double_gt (likeness[5], 0);
  ck_assert_double_eq (likeness[6], 0);
}
END_TEST

START_TEST (counts_overlap)
{
  double likeness[ENL_N_SHELLS];

  /* Shell 0: both have the element mark of carbon; the hydrogen marks differ: 1 of 3. */
  compare ("[CH3:1]C(=O)C", "[CH2:1](C)C(=O)C", likeness);
  ck_assert_double_eq_tol (likeness[0], 1.0 / 3, 1e-9);
  compare ("[OH:1]C", "[CH3:1]C", likeness);
  ck_assert_double_eq (likeness[0], 0);
}
END_TEST

static Suite *
shells_suite (void)
{
  Suite *suite = suite_create ("acidity shells");
  TCase *tc = tcase_create ("all");

  tcase_add_unchecked_fixture (tc, setup, teardown);
  tcase_add_test (tc, spelling_does_not_matter);
  tcase_add_test (tc, difference_shows_in_its_shell);
  tcase_add_test (tc, counts_overlap);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (shells_suite)
