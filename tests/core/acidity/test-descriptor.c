#include "core/acidity/descriptor.h"

#include <math.h>

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

static void
describe (const char *smiles, double *value)
{
  g_autoptr (EnlMolecule) mol = read_smiles (smiles);
  g_autoptr (EnlSurvey) survey = enl_survey_new (mol, constants);
  g_autoptr (EnlPi) pi = enl_pi_new (mol);

  enl_descriptors_fill (survey, pi, mapped_atom (mol), value);
}

static int
find (const char *name)
{
  for (uint32_t i = 0; i < ENL_N_DESCRIPTORS; i++) {
    g_autofree char *own = enl_descriptor_name (i);
    if (strcmp (own, name) == 0)
      return (int)i;
  }
  ck_abort_msg ("no descriptor is called %s", name);
  return -1;
}

START_TEST (names_are_distinct)
{
  g_autoptr (GHashTable) seen = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, NULL);

  for (uint32_t i = 0; i < ENL_N_DESCRIPTORS; i++) {
    char *name = enl_descriptor_name (i);
    ck_assert_msg (g_hash_table_add (seen, name), "%s", name);
  }
}
END_TEST

static const struct {
  const char *label, *smiles, *name;
  double value;
} fact[] = {
    {"acetone", "[CH3:1]C(C)=O", "hydrogens", 3},
    {"acetone, six equivalent hydrogens", "[CH3:1]C(C)=O", "log_equivalents", 0.778151},
    {"acetone", "[CH3:1]C(C)=O", "next_to_ketone", 1},
    {"acetylacetone", "CC(=O)[CH2:1]C(C)=O", "next_to_ketone", 2},
    {"acetylacetone", "CC(=O)[CH2:1]C(C)=O", "acceptors_squared", 4},
    {"ethyl acetate", "[CH3:1]C(=O)OCC", "next_to_ester", 1},
    {"ethyl acetate", "[CH3:1]C(=O)OCC", "lactone", 0},
    {"butyrolactone", "O=C1OCC[CH2:1]1", "lactone", 1},
    {"butyrolactone", "O=C1OCC[CH2:1]1", "ring_ester", 1},
    {"Meldrum's acid", "CC1(C)OC(=O)[CH2:1]C(=O)O1", "ring_ester", 2},
    {"Meldrum's acid", "CC1(C)OC(=O)[CH2:1]C(=O)O1", "ring_acceptors_two", 1},
    {"indan-2-one", "O=C1Cc2ccccc2[CH2:1]1", "benzo", 1},
    {"4-nitroacetophenone", "[CH3:1]C(=O)c1ccc([N+](=O)[O-])cc1", "ring2_para", 0.78},
    {"3-nitroacetophenone", "[CH3:1]C(=O)c1cccc([N+](=O)[O-])c1", "ring2_meta", 0.71},
    {"4-nitrophenol counts for heteroatoms", "[OH:1]c1ccc([N+](=O)[O-])cc1", "ring1_para_hetero",
     0.78},
    {"phenol", "[OH:1]c1ccccc1", "ring1_count", 1},
    {"pyridinium", "[nH+:1]1ccccc1", "cation", 1},
    {"1,2,4-triazole", "[nH:1]1cncn1", "aza_ring", 3},
    {"salicylic acid can hold its anion", "[OH:1]C(=O)c1ccccc1O", "donor6", 1},
    {"catechol", "[OH:1]c1ccccc1O", "donor5", 1},
    {"cyclopropane", "O=C(c1ccccc1)[CH:1]1CC1", "ring3", 1},
    {"nitromethane", "[CH3:1][N+](=O)[O-]", "next_to_nitro", 1},
    {"hydrogen cyanide", "[CH:1]#N", "sp_next_to_n", 1},
    {"2,6-dimethylphenylacetone", "CC(=O)[CH2:1]c1c(C)cccc1C", "ortho", 2},
};

START_TEST (facts_come_out)
{
  double value[ENL_N_DESCRIPTORS];

  describe (fact[_i].smiles, value);
  double got = value[find (fact[_i].name)];
  ck_assert_msg (fabs (got - fact[_i].value) < 1e-5, "%s, %s: %g", fact[_i].label, fact[_i].name,
                 got);
}
END_TEST

START_TEST (atom_order_does_not_matter)
{
  double a[ENL_N_DESCRIPTORS], b[ENL_N_DESCRIPTORS];

  describe ("[CH2:1](C(=O)OCC)c1ccc([N+](=O)[O-])c(C)c1", a);
  describe ("C1=C([N+]([O-])=O)C(C)=CC([CH2:1]C(OCC)=O)=C1", b);
  for (uint32_t i = 0; i < ENL_N_DESCRIPTORS; i++) {
    g_autofree char *name = enl_descriptor_name (i);
    ck_assert_msg (fabs (a[i] - b[i]) < 1e-9, "%s: %g, %g", name, a[i], b[i]);
  }
}
END_TEST

/* Nothing a person can draw gives infinities. */
START_TEST (odd_structures_stay_finite)
{
  static const char *const odd[] = {
      "[CH4:1]",
      "[H][H].[OH2:1]",
      "[NH4+:1]",
      "[CH3:1][Li]",
      "[SiH4:1]",
      "[CH3:1].[Na+].[Cl-]",
      "[CH3:1][S+](C)(C)=O",
      "[CH:1]#[C-]",
      "[OH:1]Cl(=O)(=O)=O",
      "[PH3:1]",
  };

  for (size_t k = 0; k < ENL_COUNT (odd); k++) {
    double value[ENL_N_DESCRIPTORS];
    describe (odd[k], value);
    for (uint32_t i = 0; i < ENL_N_DESCRIPTORS; i++)
      ck_assert_msg (isfinite (value[i]) && fabs (value[i]) < 1e4, "%s", odd[k]);
  }
}
END_TEST

static Suite *
descriptor_suite (void)
{
  Suite *suite = suite_create ("acidity descriptor");
  TCase *tc = tcase_create ("all");

  tcase_add_unchecked_fixture (tc, setup, teardown);
  tcase_add_test (tc, names_are_distinct);
  tcase_add_loop_test (tc, facts_come_out, 0, (int)ENL_COUNT (fact));
  tcase_add_test (tc, atom_order_does_not_matter);
  tcase_add_test (tc, odd_structures_stay_finite);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (descriptor_suite)
