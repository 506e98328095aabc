#include "core/acidity/kinship.h"

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
  EnlKin kin;
  GArray *store;
  EnlShells shells;
} Seen;

static Seen
look (const char *smiles)
{
  g_autoptr (EnlMolecule) mol = read_smiles (smiles);
  g_autoptr (EnlSurvey) survey = enl_survey_new (mol, constants);
  Seen seen = {.store = g_array_new (FALSE, FALSE, sizeof (EnlMark))};

  enl_kin_describe (mol, mapped_atom (mol), &seen.kin);
  enl_shells_collect (survey, mapped_atom (mol), seen.store, &seen.shells);
  seen.shells.mark = (const EnlMark *)(void *)seen.store->data;
  return seen;
}

static double
likeness (const char *a, const char *b)
{
  Seen x = look (a), y = look (b);
  double value = enl_kin_likeness (&x.kin, &x.shells, &y.kin, &y.shells);

  ck_assert_double_eq_tol (value, enl_kin_likeness (&y.kin, &y.shells, &x.kin, &x.shells), 1e-12);
  g_array_unref (x.store);
  g_array_unref (y.store);
  return value;
}

#define ACETONE "[CH3:1]C(C)=O"

START_TEST (same_site_is_fully_alike)
{
  static const char *const site[] = {ACETONE, "c1ccccc1[OH:1]", "[NH4+:1]", "[CH:1]#Cc1ccccc1",
                                     "C1C=C[CH2:1]C=C1"};

  for (size_t i = 0; i < ENL_COUNT (site); i++)
    ck_assert_double_eq_tol (likeness (site[i], site[i]), 1, 1e-12);
}
END_TEST

/* What an organic chemist would never call a precedent. */
START_TEST (strangers_have_nothing_in_common)
{
  static const struct {
    const char *label, *a, *b;
  } stranger[] = {
      {"element", ACETONE, "CC(=O)[OH:1]"},
      {"bonding", "CC[CH2:1]C", "[CH:1]#CC"},
      {"charge", "c1ccccc1[NH2:1]", "c1ccccc1[NH3+:1]"},
      {"groups", ACETONE, "[CH3:1][N+](=O)[O-]"},
      {"aromatic N-H and amide", "c1cc[nH:1]c1", "CC(=O)[NH2:1]"},
      {"phenol and alcohol", "c1ccccc1[OH:1]", "C[OH:1]"},
  };

  for (size_t i = 0; i < ENL_COUNT (stranger); i++)
    ck_assert_msg (likeness (stranger[i].a, stranger[i].b) == 0, "%s", stranger[i].label);
}
END_TEST

START_TEST (nearer_is_more_alike)
{
  static const struct {
    const char *label, *of, *near, *far;
  } pair[] = {
      {"ketone before ester", ACETONE, "[CH3:1]C(=O)CC", "[CH3:1]C(=O)OC"},
      {"one group before two", ACETONE, "C[CH2:1]C(=O)C", "CC(=O)[CH2:1]C(C)=O"},
      {"aryl ketone before alkyl ketone", "[CH3:1]C(=O)c1ccccc1", "[CH3:1]C(=O)c1ccc(F)cc1",
       ACETONE},
      {"relatives before strangers", "[CH3:1]S(C)=O", "[CH3:1]S(C)(=O)=O", "[CH3:1]C#N"},
  };

  for (size_t i = 0; i < ENL_COUNT (pair); i++) {
    double near = likeness (pair[i].of, pair[i].near), far = likeness (pair[i].of, pair[i].far);
    ck_assert_msg (near > far && near < 1 + 1e-12, "%s: %g, %g", pair[i].label, near, far);
  }
}
END_TEST

static Suite *
kinship_suite (void)
{
  Suite *suite = suite_create ("acidity kinship");
  TCase *tc = tcase_create ("kinship");

  tcase_add_checked_fixture (tc, setup, teardown);
  tcase_add_test (tc, same_site_is_fully_alike);
  tcase_add_test (tc, strangers_have_nothing_in_common);
  tcase_add_test (tc, nearer_is_more_alike);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (kinship_suite)
