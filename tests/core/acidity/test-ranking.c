/* Families and the order of acids. */
#include "core/acidity/ranking.h"

#include <math.h>
#include <stdio.h>

#include "core/acidity/family.h"
#include "core/acidity/model.h"
#include "core/acidity/predict.h"
#include "resources/model.h"
#include "tests/core/acidity/acidity-help.h"
#include "tests/runner.h"

/* ---- families ---- */

static const struct {
  const char *label, *smiles, *family;
} family_case[] = {
    {"parent", "[CH3:1]C(=O)c1ccccc1", "CC(=O)c1ccccc1"},
    {"on the ring", "[CH3:1]C(=O)c1ccc(C#N)c(Cl)c1", "CC(=O)c1ccccc1"},
    {"alpha substituents", "FC([CH2:1]C(=O)c1ccccc1)OC", "CC(=O)c1ccccc1"},
    {"alpha heteroatom", "c1ccccc1C(=O)[CH2:1]OC", "CC(=O)c1ccccc1"},
    {"a second acceptor is another family", "N#C[CH2:1]C(=O)c1ccccc1", "N#CCC(=O)c1ccccc1"},
    {"a second aryl too", "c1ccccc1[CH2:1]C(=O)c1ccc(C)cc1", "O=C(c1ccccc1)Cc1ccccc1"},
    {"open chain", "CC[CH2:1]C(=O)CCC", "CC(C)=O"},
    {"four ring", "O=C1[CH2:1]CC1", "CC(C)=O in a ring"},
    {"seven ring, substituted", "O=C1[CH2:1]CC(C)CCC1", "CC(C)=O in a ring"},
    {"ester", "CC[CH2:1]C(=O)OC(C)(C)C", "CC(=O)OC"},
    {"aryl ester", "[CH3:1]C(=O)Oc1ccccc1", "CC(=O)OC"},
    {"amide", "CC[CH2:1]C(=O)N(CC)CC", "CC(=O)N(C)C"},
    {"amide with N-H", "CC[CH2:1]C(=O)NCC", "CC(=O)NC"},
    {"beta-keto ester", "CC(=O)[CH2:1]C(=O)OCC", "CC(=O)CC(=O)OC"},
    {"fluorene", "c1ccc2c(c1)[CH:1](OC)c1cc(Br)ccc1-2", "c1cccc2-c3ccccc3Cc12"},
    {"triflone", "CC[CH2:1]S(=O)(=O)C(F)(F)F", "CS(=O)(=O)C(F)(F)F"},
    {"sulfone", "CC[CH2:1]S(=O)(=O)CC", "CS(C)(=O)=O"},
    {"phenol", "[OH:1]c1cc(Cl)ccc1C=O", "Oc1ccccc1"},
    {"naphthol", "[OH:1]c1cccc2ccccc12", "Oc1cccc2ccccc12"},
    {"benzoic acid", "[OH:1]C(=O)c1ccc(OC)cc1", "O=C(O)c1ccccc1"},
    {"alkanoic acid", "[OH:1]C(=O)CC(Cl)C", "CC(=O)O"},
    {"trihaloacetic acid", "[OH:1]C(=O)C(F)(F)F", "CC(=O)O"},
    {"alcohol", "[OH:1]CC(F)(F)F", "CO"},
    {"ammonium", "[NH3+:1]CC(=O)OCC", "C[NH3+]"},
    {"pyridinium", "[nH+:1]1ccc(C)cc1", "c1cccc[nH+]1"},
};

START_TEST (cores)
{
  g_autoptr (EnlMolecule) mol = read_smiles (family_case[_i].smiles);
  g_autofree char *family = enl_family_of (mol, mapped_atom (mol));
  const char *expected = family_case[_i].family, *end = strchr (expected, ' ');
  g_autofree char *bare = g_strndup (expected, end ? (gsize)(end - expected) : strlen (expected));
  g_autoptr (EnlMolecule) core = read_smiles (bare); /* the table may spell it as it likes */
  g_autofree char *spelt = enl_smiles_write (core, ENL_SMILES_NO_STEREO, NULL);
  g_autofree char *wanted = g_strconcat (spelt, end, NULL);

  ck_assert_msg (strcmp (family, wanted) == 0, "%s: %s, not %s", family_case[_i].label, family,
                 wanted);
}
END_TEST

START_TEST (families_do_not_follow_the_spelling)
{
  g_autoptr (EnlMolecule) a = read_smiles ("O=C(Nc1ccccc1)[CH2:1]C(=O)c1ccc2ccccc2c1");
  g_autoptr (EnlMolecule) b = read_smiles ("c1cc2ccccc2cc1C([CH2:1]C(Nc1ccccc1)=O)=O");
  g_autofree char *x = enl_family_of (a, mapped_atom (a));
  g_autofree char *y = enl_family_of (b, mapped_atom (b));

  ck_assert_str_eq (x, y);
}
END_TEST

/* ---- pairs ---- */

static EnlReference *acids;
static const char *bytes;
static size_t size;
static EnlPair *pair;
static uint32_t n_pairs;

static void
setup (void)
{
  EnlError err;

  acids = open_acids ();
  bytes = enl_model ("model.bin", &size);
  ck_assert_int_eq (enl_rank_pairs (acids, bytes, size, ENL_FOLD_COMPOUND, &pair, &n_pairs, &err),
                    ENL_OK);
}

static void
teardown (void)
{
  g_free (pair);
  enl_reference_free (acids);
}

START_TEST (equal_estimates_are_wrong)
{
  ck_assert (enl_pair_is_right (1.5, 0.1));
  ck_assert (enl_pair_is_right (-1.5, -0.1));
  ck_assert (!enl_pair_is_right (-1.5, 0.1));
  ck_assert (!enl_pair_is_right (1.5, 0));
}
END_TEST

/* Counts the pairs anew from their definition. */
START_TEST (pairs_are_all_and_only_those_defined)
{
  uint32_t n = enl_reference_rows (acids), expected = 0;
  g_autofree uint32_t *compound = g_new (uint32_t, n);

  enl_model_compound_folds (acids, compound);
  for (uint32_t i = 0; i < n; i++) {
    const EnlReferenceRow *a = enl_reference_row (acids, i);
    g_autofree char *family = enl_family_of (a->mol, a->site);
    for (uint32_t j = i + 1; j < n; j++) {
      const EnlReferenceRow *b = enl_reference_row (acids, j);
      if (a->solvent != b->solvent || fabs (a->pka - b->pka) <= 1 + 1e-9)
        continue;
      g_autofree char *other = enl_family_of (b->mol, b->site);
      expected += compound[i] == compound[j] ||
                  (strcmp (family, other) == 0 && enl_molecule_atom (a->mol, a->site)->element ==
                                                      enl_molecule_atom (b->mol, b->site)->element);
    }
  }
  ck_assert_uint_eq (n_pairs, expected);
  for (uint32_t k = 0; k < n_pairs; k++) {
    ck_assert_uint_lt (pair[k].first, pair[k].second);
    ck_assert_double_gt (fabs (pair[k].published), ENL_PAIR_GAP);
    ck_assert_int_eq (pair[k].kind, compound[pair[k].first] == compound[pair[k].second]
                                        ? ENL_PAIR_SITES
                                        : ENL_PAIR_FAMILY);
  }
}
END_TEST

/* The smoothed values of a closed form against those of the predictor that the program uses. */
START_TEST (fitted_values_are_those_of_the_predictor)
{
  EnlPredictor *predictor = NULL;
  EnlError err;

  ck_assert_int_eq (enl_predictor_open (acids, bytes, size, &predictor, &err), ENL_OK);
  for (uint32_t k = 0; k < n_pairs; k += n_pairs / 40) {
    const EnlReferenceRow *a = enl_reference_row (acids, pair[k].first);
    const EnlReferenceRow *b = enl_reference_row (acids, pair[k].second);
    EnlPrediction x, y;
    enl_predictor_run (predictor, a->mol, &a->site, 1, a->solvent, &x);
    enl_predictor_run (predictor, b->mol, &b->site, 1, b->solvent, &y);
    ck_assert_double_eq_tol (pair[k].fitted, x.value - y.value, 1e-8);
    ck_assert_double_ne (pair[k].fitted, pair[k].published);
  }
  enl_predictor_free (predictor);
}
END_TEST

/* What is asked: 97 in a hundred pairs in the right order, 95 when both compounds are left out.
 * Those are goals of the project; `bound` is the least that the model may fall back to. */
static const struct {
  const char *label;
  bool left_out;
  int solvent; /* -1: both */
  double asked, bound;
} order_case[] = {
    {"fitted", false, -1, 0.97, 0.97},
    {"fitted, DMSO", false, ENL_SOLVENT_DMSO, 0.97, 0.97},
    {"fitted, water", false, ENL_SOLVENT_WATER, 0.97, 0.97},
    {"left out", true, -1, 0.95, 0.95},
    {"left out, DMSO", true, ENL_SOLVENT_DMSO, 0.95, 0.95},
    {"left out, water", true, ENL_SOLVENT_WATER, 0.95, 0.95},
};

START_TEST (order_is_right)
{
  uint32_t n = 0, right = 0;

  for (uint32_t k = 0; k < n_pairs; k++) {
    if (order_case[_i].solvent >= 0 &&
        (int)enl_reference_row (acids, pair[k].first)->solvent != order_case[_i].solvent)
      continue;
    n++;
    right += enl_pair_is_right (pair[k].published,
                                order_case[_i].left_out ? pair[k].left_out : pair[k].fitted);
  }
  double share = (double)right / n;
  fprintf (stderr, "%s: %u pairs, %.4f in right order, asked %.2f\n", order_case[_i].label, n,
           share, order_case[_i].asked);
  ck_assert_uint_gt (n, 500);
  ck_assert_msg (share >= order_case[_i].bound, "%s: %.4f of %u pairs, bound %.2f, asked %.2f",
                 order_case[_i].label, share, n, order_case[_i].bound, order_case[_i].asked);
}
END_TEST

/* ---- both left out ---- */

/* The whole table with `shift` added to both rows of a pair. */
static EnlReference *
shifted (uint32_t first, uint32_t second, double shift)
{
  GString *text = g_string_new ("name\tsmiles\tpka\tsolvent\tsigma\tsource\n");
  EnlReference *ref = NULL;
  EnlError err;

  for (uint32_t i = 0; i < enl_reference_rows (acids); i++) {
    const EnlReferenceRow *row = enl_reference_row (acids, i);
    char number[2][G_ASCII_DTOSTR_BUF_SIZE];
    bool moved = i == first || i == second;
    g_ascii_dtostr (number[0], sizeof number[0], row->pka + (moved ? shift : 0));
    g_ascii_dtostr (number[1], sizeof number[1], row->sigma);
    g_string_append_printf (text, "%s\t%s\t%s\t%s\t%s\tacids.tsv\n", row->name, row->smiles,
                            number[0], enl_solvent_id (row->solvent), number[1]);
  }
  ck_assert_int_eq (enl_reference_new (text->str, text->len, &ref, &err), ENL_OK);
  g_string_free (text, TRUE);
  return ref;
}

/* The same pair with the published values. */
static const EnlPair *
pair_of (const EnlPair *other)
{
  const EnlPair *last = pair;

  while (last < pair + n_pairs && (last->first < other->first ||
                                   (last->first == other->first && last->second < other->second)))
    last++;
  bool same = last < pair + n_pairs && last->first == other->first && last->second == other->second;
  return same ? last : other; /* the shift makes and unmakes a few pairs */
}

/* Both rows of a pair five units higher: their left-out difference must not notice. */
START_TEST (a_pair_does_not_see_its_own_values)
{
  const EnlPair *chosen = &pair[n_pairs * (2 * _i + 1) / 6];
  g_autoptr (EnlReference) ref = shifted (chosen->first, chosen->second, 5);
  g_autoptr (EnlModel) old = NULL;
  g_autoptr (EnlModel) model = NULL;
  g_autofree EnlPair *again = NULL;
  uint32_t n = 0, at = 0;
  double most = 0;
  EnlError err;

  ck_assert_int_eq (enl_model_open (acids, bytes, size, &old, &err), ENL_OK);
  ck_assert_int_eq (enl_model_build (ref, &old->hyper, &model, &err), ENL_OK);
  g_autoptr (GByteArray) file = enl_model_write (model, ref);
  ck_assert_int_eq (enl_rank_pairs (ref, (const char *)file->data, file->len, ENL_FOLD_COMPOUND,
                                    &again, &n, &err),
                    ENL_OK);
  while (at < n && (again[at].first != chosen->first || again[at].second != chosen->second))
    at++;
  ck_assert_uint_lt (at, n);
  ck_assert_double_eq_tol (again[at].left_out, chosen->left_out, 1e-9);
  for (uint32_t k = 0; k < n; k++)
    if (again[k].first != chosen->first && again[k].second != chosen->second)
      most = fmax (most, fabs (again[k].left_out - pair_of (&again[k])->left_out));
  ck_assert_double_gt (most, 0.01); /* others do see it */
}
END_TEST

static Suite *
ranking_suite (void)
{
  Suite *suite = suite_create ("acidity ranking");
  TCase *tc = tcase_create ("families");

  tcase_add_loop_test (tc, cores, 0, (int)ENL_COUNT (family_case));
  tcase_add_test (tc, families_do_not_follow_the_spelling);
  suite_add_tcase (suite, tc);
  tc = tcase_create ("pairs");
  tcase_set_timeout (tc, 120);
  tcase_add_unchecked_fixture (tc, setup, teardown);
  tcase_add_test (tc, equal_estimates_are_wrong);
  tcase_add_test (tc, pairs_are_all_and_only_those_defined);
  tcase_add_test (tc, fitted_values_are_those_of_the_predictor);
  tcase_add_loop_test (tc, order_is_right, 0, (int)ENL_COUNT (order_case));
  tcase_add_loop_test (tc, a_pair_does_not_see_its_own_values, 0, 3);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (ranking_suite)
