/* The scores that the estimator must reach on compounds it has not seen. `mae` and `median` are
 * those of the first estimator of the project, a sketch over the same table with fewer descriptors:
 * no later one may be worse in any class. */
#include "core/acidity/validate.h"

#include "resources/model.h"
#include "tests/core/acidity/acidity-help.h"
#include "tests/runner.h"

static EnlScore *score;
static uint32_t n_scores;

static void
setup (void)
{
  EnlReference *acids = open_acids ();
  size_t size = 0;
  const char *bytes = enl_model ("model.bin", &size);
  EnlError err;

  ck_assert_int_eq (enl_validate (acids, bytes, size, ENL_FOLD_COMPOUND, &score, &n_scores, &err),
                    ENL_OK);
  enl_reference_free (acids);
}

static void
teardown (void)
{
  g_free (score);
}

static const struct {
  const char *class_name;
  EnlSolvent solvent;
  uint32_t n;
  double mae, median;
} first_estimator[] = {
    {"alpha C-H of carbonyls", ENL_SOLVENT_DMSO, 75, 1.26, 1.02},
    {"all C-H", ENL_SOLVENT_DMSO, 214, 1.61, 1.05},
    {"N-H", ENL_SOLVENT_DMSO, 83, 1.77, 1.01},
    {"O-H", ENL_SOLVENT_DMSO, 35, 1.65, 0.95},
    {"alpha C-H of carbonyls", ENL_SOLVENT_WATER, 103, 1.50, 0.95},
    {"all C-H", ENL_SOLVENT_WATER, 176, 1.73, 0.87},
    {"N-H", ENL_SOLVENT_WATER, 84, 1.09, 0.64},
    {"O-H", ENL_SOLVENT_WATER, 167, 0.67, 0.38},
};

static const EnlScore *
score_of (const char *class_name, EnlSolvent solvent)
{
  for (uint32_t i = 0; i < n_scores; i++)
    if (strcmp (score[i].class_name, class_name) == 0 && score[i].solvent == solvent)
      return &score[i];
  ck_abort_msg ("no score for %s", class_name);
  return NULL;
}

START_TEST (no_class_is_worse_than_with_the_first_estimator)
{
  const EnlScore *s = score_of (first_estimator[_i].class_name, first_estimator[_i].solvent);

  ck_assert_uint_ge (s->n, first_estimator[_i].n);
  ck_assert_msg (s->mae <= first_estimator[_i].mae, "%s: MAE %.3f", s->class_name, s->mae);
  ck_assert_msg (s->median <= first_estimator[_i].median, "%s: median %.3f", s->class_name,
                 s->median);
  ck_assert_double_ge (s->rmse, s->mae);
  ck_assert_double_ge (s->max, s->rmse);
}
END_TEST

START_TEST (intervals_hold)
{
  for (uint32_t i = 0; i < n_scores; i++)
    if (score[i].n >= 20)
      ck_assert_msg (score[i].cover90 >= 0.85 && score[i].cover90 <= 0.95, "%s: %.3f",
                     score[i].class_name, score[i].cover90);
}
END_TEST

START_TEST (words_of_the_folds)
{
  EnlFold fold;

  ck_assert (enl_fold_parse ("Cluster", &fold) && fold == ENL_FOLD_CLUSTER);
  ck_assert (enl_fold_parse ("compound", &fold) && fold == ENL_FOLD_COMPOUND);
  ck_assert (!enl_fold_parse ("", &fold));
}
END_TEST

static Suite *
validate_suite (void)
{
  Suite *suite = suite_create ("acidity validate");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 120);
  tcase_add_unchecked_fixture (tc, setup, teardown);
  tcase_add_loop_test (tc, no_class_is_worse_than_with_the_first_estimator, 0,
                       (int)ENL_COUNT (first_estimator));
  tcase_add_test (tc, intervals_hold);
  tcase_add_test (tc, words_of_the_folds);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (validate_suite)
