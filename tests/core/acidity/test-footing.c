#include "core/acidity/footing.h"

#include "core/acidity/estimator.h"
#include "resources/model.h"
#include "tests/core/acidity/acidity-help.h"
#include "tests/runner.h"

static const struct {
  const char *smiles;
  EnlFootingKind kind;
} kind_case[] = {
    {"[CH3:1]C(=O)C", ENL_FOOTING_DELOCALISED_CARBON},
    {"[CH3:1]C#N", ENL_FOOTING_DELOCALISED_CARBON},
    {"[CH3:1][N+](=O)[O-]", ENL_FOOTING_DELOCALISED_CARBON},
    {"[CH3:1]c1ccccc1", ENL_FOOTING_DELOCALISED_CARBON},
    {"[CH3:1]C=C", ENL_FOOTING_DELOCALISED_CARBON},
    {"CC(=O)[CH2:1]C(=O)[O-].[Na+]", ENL_FOOTING_DELOCALISED_CARBON},
    {"[CH3:1]S(=O)(=O)C", ENL_FOOTING_LOCALISED_CARBON},
    {"[CH:1]#Cc1ccccc1", ENL_FOOTING_LOCALISED_CARBON},
    {"[CH2:1]1SCCCS1", ENL_FOOTING_LOCALISED_CARBON},
    {"[CH:1](Cl)(Cl)Cl", ENL_FOOTING_LOCALISED_CARBON},
    {"c1ccccc1[OH:1]", ENL_FOOTING_HETEROATOM},
    {"CC(=O)[NH2:1]", ENL_FOOTING_HETEROATOM},
    {"CC[SH:1]", ENL_FOOTING_HETEROATOM},
    {"CC[NH3+:1]", ENL_FOOTING_CATION},
    {"CC[NH3+:1].[Cl-]", ENL_FOOTING_CATION},
    {"[CH3:1][P+](C)(C)C", ENL_FOOTING_CATION},
};

static EnlFootingKind
kind_of (const EnlMolecule *mol)
{
  g_autoptr (EnlSites) sites = NULL;
  g_autoptr (EnlPi) pi = enl_pi_new (mol);

  ck_assert_int_eq (enl_sites_find (mol, &sites, NULL), ENL_OK);
  const EnlSite *site = enl_sites_of_atom (sites, mapped_atom (mol));
  ck_assert_ptr_nonnull (site);
  return enl_footing_kind (mol, pi, site);
}

START_TEST (kinds)
{
  g_autoptr (EnlMolecule) mol = read_smiles (kind_case[_i].smiles);

  ck_assert_msg (kind_of (mol) == kind_case[_i].kind, "%s: %d", kind_case[_i].smiles,
                 kind_of (mol));
}
END_TEST

/* Localised and heteroatom anions are less certain in THF; every footing is named. */
START_TEST (thf_names_its_footing)
{
  g_autoptr (EnlReference) acids = open_acids ();
  g_autoptr (EnlMolecule) mol = read_smiles (kind_case[_i].smiles);
  g_autoptr (EnlEstimator) estimator = NULL;
  g_autoptr (EnlSites) sites = NULL;
  size_t size = 0;
  const char *bytes = enl_model ("model.bin", &size);

  ck_assert_int_eq (enl_estimator_open (acids, bytes, size, &estimator, NULL), ENL_OK);
  ck_assert_int_eq (enl_sites_find (mol, &sites, NULL), ENL_OK);
  g_autofree EnlEstimate *dmso = g_new0 (EnlEstimate, sites->n_sites);
  g_autofree EnlEstimate *thf = g_new0 (EnlEstimate, sites->n_sites);
  ck_assert_int_eq (enl_estimator_run (estimator, mol, sites, ENL_SOLVENT_DMSO, dmso, NULL),
                    ENL_OK);
  ck_assert_int_eq (enl_estimator_run (estimator, mol, sites, ENL_SOLVENT_THF, thf, NULL), ENL_OK);
  long at = enl_sites_of_atom (sites, mapped_atom (mol)) - sites->site;
  double more = thf[at].sigma * thf[at].sigma - dmso[at].sigma * dmso[at].sigma;
  double least = kind_case[_i].kind == ENL_FOOTING_DELOCALISED_CARBON ? 1.0 : 2.0;
  double most = kind_case[_i].kind == ENL_FOOTING_DELOCALISED_CARBON ? 2.0 : 4.0;
  ck_assert_double_eq (thf[at].value, dmso[at].value);
  ck_assert (more >= least * least && more <= most * most);
  ck_assert_ptr_null (dmso[at].footing);
  ck_assert (thf[at].footing && g_str_has_prefix (thf[at].footing, "DMSO-based footing"));
  /* what was to be said in DMSO is still said */
  ck_assert_ptr_eq (thf[at].remark, dmso[at].remark);
}
END_TEST

static const struct {
  const char *label, *text;
} bad_case[] = {
    {"a kind is missing", "acid\tsigma\tsentence\tsource\ncation\t3\ta\tb\n"},
    {"no width", "acid\tsigma\tsentence\tsource\ndelocalised carbon\t0\ta\tb\n"
                 "localised carbon\t1\ta\tb\nheteroatom\t1\ta\tb\ncation\t1\ta\tb\n"},
};

START_TEST (damaged_tables_are_refused)
{
  g_autoptr (EnlTable) table = NULL;
  EnlFooting out[ENL_N_FOOTINGS];
  EnlError err = {0};

  ck_assert_int_eq (enl_table_parse (bad_case[_i].text, strlen (bad_case[_i].text), &table, NULL),
                    ENL_OK);
  ck_assert_msg (enl_footings_read (table, out, &err) == ENL_ERROR_FORMAT, "%s",
                 bad_case[_i].label);
  ck_assert (strstr (err.text, "delocalised carbon") && err.advice[0]);
}
END_TEST

static Suite *
footing_suite (void)
{
  Suite *suite = suite_create ("acidity footing");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, kinds, 0, (int)ENL_COUNT (kind_case));
  tcase_add_loop_test (tc, thf_names_its_footing, 0, (int)ENL_COUNT (kind_case));
  tcase_add_loop_test (tc, damaged_tables_are_refused, 0, (int)ENL_COUNT (bad_case));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (footing_suite)
