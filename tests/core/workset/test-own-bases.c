/* Bases that a set brings along. */
#include "core/workset/workset.h"

#include <math.h>

#include "tests/core/bases/ask.h"

static const char own_file[] =
    "{\"format\":\"enolith-set\",\"version\":1,\"substrates\":[],\n"
    " \"bases\":[{\"name\":\"our phosphazene\",\"class\":\"phosphazene\",\"cation\":\"none\",\n"
    "  \"pKaH\":{\"dmso\":24.25},\"sigma\":{\"dmso\":0.35},\"note\":\"batch 7\"}]}";

static EnlWorkset *
own_set (void)
{
  EnlWorkset *set = NULL;
  EnlError err = {0};

  if (enl_workset_parse (own_file, strlen (own_file), &set, &err) != ENL_OK)
    ck_abort_msg ("%s; %s", err.text, err.advice);
  return set;
}

START_TEST (own_bases_are_kept_in_the_file)
{
  g_autoptr (EnlWorkset) set = own_set ();
  g_autoptr (EnlWorkset) copy = enl_workset_copy (set);
  g_autofree char *text = enl_workset_write (copy);
  g_autoptr (EnlWorkset) again = NULL;

  ck_assert_int_eq (enl_workset_parse (text, strlen (text), &again, NULL), ENL_OK);
  ck_assert_uint_eq (enl_workset_bases (again), 1);
  const EnlOwnBase *base = enl_workset_base (again, 0);
  ck_assert_str_eq (base->name, "our phosphazene");
  ck_assert_str_eq (base->family, "phosphazene");
  ck_assert_str_eq (base->note, "batch 7");
  ck_assert_double_eq_tol (base->pkah[ENL_SOLVENT_DMSO], 24.25, 1e-12);
  ck_assert_double_eq_tol (base->sigma[ENL_SOLVENT_DMSO], 0.35, 1e-12);
  ck_assert (isnan (base->pkah[ENL_SOLVENT_WATER]));
  enl_workset_remove_base (again, 0);
  g_autofree char *without = enl_workset_write (again);
  ck_assert_ptr_null (strstr (without, "\"bases\""));
}
END_TEST

/* 24.25 against acetophenone's published 24.7 in DMSO: x / (1 - x) = 10^(-0.45 / 2) at equal
 * amounts (K = 10^gap). */
START_TEST (an_own_base_is_compared_like_any_other)
{
  g_autoptr (EnlWorkset) set = own_set ();
  g_autoptr (EnlBaseTable) table = NULL;
  Ask a;

  ask (&a, "CC(=O)c1ccccc1", 0, conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.0));
  ck_assert_int_eq (enl_workset_base_table (set, knowledge->bases, &table, NULL), ENL_OK);
  ck_assert_uint_eq (enl_base_table_size (table), enl_base_table_size (knowledge->bases) + 1);
  enl_comparison_free (a.comparison);
  a.question.bases = table;
  ck_assert_int_eq (enl_bases_compare (&a.question, &a.comparison, NULL), ENL_OK);
  const EnlCandidate *own = candidate_of (&a, "our phosphazene");
  ck_assert_double_eq_tol (own->conversion, 1.0 / (1.0 + pow (10.0, 0.45 / 2)), 1e-6);
  ck_assert_ptr_nonnull (caution_of (own, "H16")); /* the class brings its cautions */
  ck_assert (enl_base_table_get (table, own->base)->own);
  ask_clear (&a);
  ask (&a, "CC(=O)c1ccccc1", 0, conditions_in (ENL_SOLVENT_WATER, 25.0, 1.0));
  enl_comparison_free (a.comparison);
  a.question.bases = table;
  ck_assert_int_eq (enl_bases_compare (&a.question, &a.comparison, NULL), ENL_OK);
  ck_assert_int_eq (candidate_of (&a, "our phosphazene")->verdict, ENL_VERDICT_OFF_SCALE);
  ask_clear (&a);
}
END_TEST

#define FILE_WITH(base) "{\"format\":\"enolith-set\",\"substrates\":[],\"bases\":" base "}"

static const struct {
  const char *label, *text, *message;
} bad_case[] = {
    {"no list", FILE_WITH ("7"),
     "line 1, column 41: 'bases' is not a list; write a list in square brackets"},
    {"no name", FILE_WITH ("[{\"pKaH\":{\"dmso\":20}}]"),
     "line 1, column 41: a base has no usable name; give a name of 1 to 80 characters"},
    {"no strength", FILE_WITH ("[{\"name\":\"x\"}]"),
     "line 1, column 58: 'x' has no strength; give its pKaH in dmso, water or thf"},
    {"no sigma", FILE_WITH ("[{\"name\":\"x\",\"pKaH\":{\"thf\":20}}]"),
     "line 1, column 58: 'x' has no usable sigma in THF; say how sure the number is: a standard "
     "deviation above 0, at most 20"},
    {"unknown solvent", FILE_WITH ("[{\"name\":\"x\",\"pKaH\":{\"tar\":20}}]"),
     "line 1, column 70: 'tar' of a base is no solvent with a number; write dmso, water or thf and "
     "a number without quotes"},
    {"twice",
     FILE_WITH ("[{\"name\":\"x\",\"pKaH\":{\"thf\":20},\"sigma\":{\"thf\":1}},"
                "{\"name\":\"X\",\"pKaH\":{\"thf\":20},\"sigma\":{\"thf\":1}}]"),
     "line 1, column 107: there is a base 'X' already; choose another name"},
};

START_TEST (bad_bases_are_explained)
{
  g_autoptr (EnlWorkset) set = NULL;
  EnlError err = {0};

  ck_assert_int_ne (enl_workset_parse (bad_case[_i].text, strlen (bad_case[_i].text), &set, &err),
                    ENL_OK);
  g_autofree char *message = enl_error_message (&err);
  ck_assert_msg (strcmp (message, bad_case[_i].message) == 0, "%s: %s", bad_case[_i].label,
                 message);
}
END_TEST

START_TEST (what_does_not_fit_the_table_is_refused)
{
  static const struct {
    const char *name, *family, *cation;
    EnlStatus status;
  } unfit[] = {
      {"LDA", "amide", "Li", ENL_ERROR_UNKNOWN},
      {"mine", "cement", "Li", ENL_ERROR_RANGE},
      {"mine", "amide", "Unobtainium", ENL_ERROR_RANGE},
      {"mine", "amide", "Li", ENL_OK},
  };

  for (size_t i = 0; i < ENL_COUNT (unfit); i++) {
    g_autoptr (EnlOwnBase) base = enl_own_base_new (unfit[i].name);
    EnlError err = {0};
    g_free (base->family);
    g_free (base->cation);
    base->family = g_strdup (unfit[i].family);
    base->cation = g_strdup (unfit[i].cation);
    base->pkah[ENL_SOLVENT_THF] = 33.3;
    base->sigma[ENL_SOLVENT_THF] = 0.8;
    ck_assert_int_eq (enl_own_base_check (base, knowledge->bases, &err), unfit[i].status);
    ck_assert (unfit[i].status == ENL_OK || err.advice[0]);
  }
}
END_TEST

static Suite *
own_bases_suite (void)
{
  Suite *suite = suite_create ("own bases");
  TCase *tc = tcase_create ("all");

  tcase_add_checked_fixture (tc, open_knowledge, close_knowledge);
  tcase_add_test (tc, own_bases_are_kept_in_the_file);
  tcase_add_test (tc, an_own_base_is_compared_like_any_other);
  tcase_add_loop_test (tc, bad_bases_are_explained, 0, (int)ENL_COUNT (bad_case));
  tcase_add_test (tc, what_does_not_fit_the_table_is_refused);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (own_bases_suite)
