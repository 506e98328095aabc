/* Outside check: charges of methane, ethane and fluoromethanes as printed by Gasteiger and
 * Marsili, Tetrahedron 1980, 36, 3219, table 2 (from memory): carbon of CH4 -0.078, of C2H6
 * -0.068, of CH3F +0.079, of CF4 +0.561; fluorine of CH3F -0.253. The method damps after a few
 * rounds, so the last digits depend on when one stops. */
#include "core/acidity/polarity.h"

#include <math.h>

#include "core/acidity/survey.h"
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

static const struct {
  const char *label, *smiles; /* atom with map 1 */
  double charge;
} published[] = {
    {"methane", "[CH4:1]", -0.078},
    {"ethane", "[CH3:1]C", -0.068},
    {"fluoromethane, C", "[CH3:1]F", 0.079},
    {"fluoromethane, F", "C[F:1]", -0.253},
    {"tetrafluoromethane", "F[C:1](F)(F)F", 0.561},
};

START_TEST (charges_are_the_published_ones)
{
  g_autoptr (EnlMolecule) mol = read_smiles (published[_i].smiles);
  g_autoptr (EnlSurvey) survey = enl_survey_new (mol, constants);

  ck_assert_double_eq_tol (enl_survey_charge (survey, mapped_atom (mol)), published[_i].charge,
                           0.005);
}
END_TEST

static const char *const whole[] = {
    "CC(=O)c1ccc([N+](=O)[O-])cc1", "CC(=O)[O-]",      "C[N+](C)(C)CC(=O)OC",
    "OS(=O)(=O)C(F)(F)F",           "C[Si](C)(C)CC#N",
};

START_TEST (charges_add_up_to_the_charge)
{
  g_autoptr (EnlMolecule) mol = read_smiles (whole[_i]);
  g_autoptr (EnlSurvey) survey = enl_survey_new (mol, constants);
  double sum = 0;

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    sum += enl_survey_charge (survey, i) +
           enl_survey_hydrogen_charge (survey, i) * enl_molecule_atom (mol, i)->hydrogens;
  ck_assert_double_eq_tol (sum, enl_molecule_charge (mol), 1e-12);
}
END_TEST

START_TEST (carboxylate_oxygens_are_alike)
{
  g_autoptr (EnlMolecule) mol = read_smiles ("CC(=O)[O-]");
  g_autoptr (EnlSurvey) survey = enl_survey_new (mol, constants);

  ck_assert_double_lt (fabs (enl_survey_charge (survey, 2) - enl_survey_charge (survey, 3)), 0.06);
}
END_TEST

START_TEST (metals_keep_their_charge)
{
  g_autoptr (EnlMolecule) mol = read_smiles ("[Na+].CC(=O)[O-]");
  g_autoptr (EnlSurvey) survey = enl_survey_new (mol, constants);

  ck_assert_double_eq (enl_survey_charge (survey, 0), 1);
}
END_TEST

static Suite *
polarity_suite (void)
{
  Suite *suite = suite_create ("acidity polarity");
  TCase *tc = tcase_create ("all");

  tcase_add_unchecked_fixture (tc, setup, teardown);
  tcase_add_loop_test (tc, charges_are_the_published_ones, 0, (int)ENL_COUNT (published));
  tcase_add_loop_test (tc, charges_add_up_to_the_charge, 0, (int)ENL_COUNT (whole));
  tcase_add_test (tc, carboxylate_oxygens_are_alike);
  tcase_add_test (tc, metals_keep_their_charge);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (polarity_suite)
