#include "core/bases/compare.h"

#include <math.h>
#include <string.h>

#include "resources/embedded.h"
#include "tests/runner.h"

static EnlBaseTable *bases;
static EnlCautionTable *cautions;

static void
open_tables (void)
{
  size_t size;
  const char *text = enl_resource ("bases.tsv", &size);
  ck_assert_int_eq (enl_base_table_new (text, size, &bases, NULL), ENL_OK);
  text = enl_resource ("cautions.tsv", &size);
  ck_assert_int_eq (enl_caution_table_new (text, size, &cautions, NULL), ENL_OK);
}

static void
close_tables (void)
{
  enl_base_table_free (bases);
  enl_caution_table_free (cautions);
}

static EnlEstimate
published (double pka, double sigma, EnlSolvent solvent)
{
  EnlEstimate e = {.value = pka, .sigma = sigma, .solvent = solvent};
  return e;
}

static EnlComparison *
compare (const EnlSite *site, const EnlEstimate *estimate, uint32_t n, uint32_t target,
         EnlSolvent solvent, double equivalents)
{
  EnlSites sites = {(EnlSite *)site, n, true, NULL};
  EnlConditions conditions = enl_conditions_default ();
  EnlComparison *out = NULL;

  conditions.solvent = solvent;
  conditions.equivalents = equivalents;
  ck_assert_int_eq (
      enl_bases_compare (bases, cautions, &sites, estimate, target, &conditions, &out, NULL),
      ENL_OK);
  return out;
}

static const EnlCandidate *
candidate_of (const EnlComparison *comparison, const char *id)
{
  int base = enl_base_table_find (bases, id);

  for (uint32_t i = 0; i < comparison->n_candidates; i++)
    if ((int)comparison->candidate[i].base == base)
      return &comparison->candidate[i];
  ck_abort_msg ("no candidate %s", id);
  return NULL;
}

static const EnlSite inner_ch2 = {
    .n_atoms = 1, .hydrogens = 2, .element = 6, .alpha_carbonyl = true};
static const EnlSite outer_ch3 = {
    .n_atoms = 1, .hydrogens = 3, .element = 6, .alpha_carbonyl = true};

/* Published pKa (DMSO): ethyl acetoacetate 14.2, acetophenone 24.7 (resources/acids.tsv);
 * verdicts follow from pKaH of the bases: NaOEt 29.8, DBU 13.9, Et3N 9.0 (resources/bases.tsv). */
static const struct {
  const char *label, *base;
  double pka;
  EnlSolvent solvent;
  EnlVerdict verdict;
} verdict_case[] = {
    {"acetoacetate, ethoxide", "naoet", 14.2, ENL_SOLVENT_DMSO, ENL_VERDICT_COMPLETE},
    {"acetoacetate, DBU", "dbu", 14.2, ENL_SOLVENT_DMSO, ENL_VERDICT_PARTIAL},
    {"acetoacetate, triethylamine", "et3n", 14.2, ENL_SOLVENT_DMSO, ENL_VERDICT_TRACE},
    {"acetophenone, triethylamine", "et3n", 24.7, ENL_SOLVENT_DMSO, ENL_VERDICT_NO},
    {"acetophenone, carbonate", "k2co3", 24.7, ENL_SOLVENT_DMSO, ENL_VERDICT_NO_NUMBER},
    {"acetophenone, LDA in THF", "lda", 24.7, ENL_SOLVENT_THF, ENL_VERDICT_COMPLETE},
    {"acetophenone, LDA in DMSO", "lda", 24.7, ENL_SOLVENT_DMSO, ENL_VERDICT_SOLVENT},
    {"acetophenone, KHMDS without a value", "khmds", 24.7, ENL_SOLVENT_THF, ENL_VERDICT_OFF_SCALE},
    {"DBU's THF number is of another scale", "dbu", 14.2, ENL_SOLVENT_THF, ENL_VERDICT_OFF_SCALE},
    {"butyllithium adds to a ketone", "nbuli", 24.7, ENL_SOLVENT_THF, ENL_VERDICT_REACTS},
    {"butyllithium and a 1,3-dicarbonyl", "nbuli", 14.2, ENL_SOLVENT_THF, ENL_VERDICT_COMPLETE},
    {"butyllithium in water", "nbuli", 18.3, ENL_SOLVENT_WATER, ENL_VERDICT_SOLVENT},
    {"hydroxide in water, acetoacetate 10.68", "naoh", 10.68, ENL_SOLVENT_WATER,
     ENL_VERDICT_COMPLETE},
    {"soft enolisation set", "soft_ticl4_amine", 24.7, ENL_SOLVENT_DMSO, ENL_VERDICT_NO_NUMBER},
};

START_TEST (verdicts)
{
  EnlEstimate e = published (verdict_case[_i].pka, 0.1, verdict_case[_i].solvent);
  EnlComparison *c = compare (&inner_ch2, &e, 1, 0, verdict_case[_i].solvent, 1.05);
  const EnlCandidate *found = candidate_of (c, verdict_case[_i].base);

  ck_assert_uint_eq (c->n_candidates, enl_base_table_size (bases));
  ck_assert_msg (found->verdict == verdict_case[_i].verdict, "%s: %s", verdict_case[_i].label,
                 enl_verdict_text (found->verdict));
  ck_assert (found->reason && found->reason[0]);
  enl_comparison_free (c);
}
END_TEST

START_TEST (borrowed_numbers_are_never_used)
{
  EnlEstimate e = published (24.7, 0.1, ENL_SOLVENT_DMSO);
  EnlComparison *c = compare (&inner_ch2, &e, 1, 0, ENL_SOLVENT_DMSO, 1.05);

  for (uint32_t i = 0; i < c->n_candidates; i++) {
    const EnlCandidate *candidate = &c->candidate[i];
    const EnlBase *base = enl_base_table_get (bases, candidate->base);
    if (isnan (base->pkah[ENL_SOLVENT_DMSO]))
      ck_assert_msg (isnan (candidate->gap), "%s has a gap without a value", base->id);
  }
  enl_comparison_free (c);
}
END_TEST

START_TEST (alkoxide_is_levelled_by_water)
{
  EnlEstimate e = published (13.0, 0.2, ENL_SOLVENT_WATER);
  EnlComparison *c = compare (&inner_ch2, &e, 1, 0, ENL_SOLVENT_WATER, 1.05);
  const EnlCandidate *tbutoxide = candidate_of (c, "kotbu"), *hydroxide = candidate_of (c, "koh");

  ck_assert (tbutoxide->levelled && !hydroxide->levelled);
  ck_assert_double_eq_tol (tbutoxide->conversion, hydroxide->conversion, 1e-12);
  enl_comparison_free (c);
}
END_TEST

START_TEST (interval_holds_the_value_and_shrinks_with_certainty)
{
  EnlEstimate sure = published (14.2, 0.1, ENL_SOLVENT_DMSO);
  EnlEstimate unsure = published (14.2, 2.0, ENL_SOLVENT_DMSO);
  EnlComparison *a = compare (&inner_ch2, &sure, 1, 0, ENL_SOLVENT_DMSO, 1.05);
  EnlComparison *b = compare (&inner_ch2, &unsure, 1, 0, ENL_SOLVENT_DMSO, 1.05);
  const EnlCandidate *narrow = candidate_of (a, "dbu"), *wide = candidate_of (b, "dbu");

  ck_assert_double_lt (narrow->low, narrow->conversion);
  ck_assert_double_gt (narrow->high, narrow->conversion);
  ck_assert_double_lt (wide->low, narrow->low);
  ck_assert_double_gt (wide->high, narrow->high);
  enl_comparison_free (a);
  enl_comparison_free (b);
}
END_TEST

START_TEST (a_weaker_site_of_the_molecule_gets_nothing)
{
  EnlSite site[] = {inner_ch2, outer_ch3};
  EnlEstimate e[] = {published (14.2, 0.1, ENL_SOLVENT_DMSO),
                     published (20.5, 1.0, ENL_SOLVENT_DMSO)};
  EnlComparison *c = compare (site, e, 2, 1, ENL_SOLVENT_DMSO, 1.05);
  const EnlCandidate *found = candidate_of (c, "naoet");

  ck_assert_double_lt (found->conversion, 1e-5);
  ck_assert_ptr_nonnull (strstr (found->reason, "another hydrogen"));
  enl_comparison_free (c);
}
END_TEST

START_TEST (a_phenol_eats_the_first_equivalent)
{
  EnlSite site[] = {
      {.n_atoms = 1,
       .hydrogens = 1,
       .element = 8,
       .kind = ENL_SITE_OXYGEN,
       .acidic_heteroatom = true},
      {.n_atoms = 1, .hydrogens = 3, .element = 6, .alpha_carbonyl = true, .second = true},
  };
  EnlEstimate e[] = {published (18.0, 0.2, ENL_SOLVENT_DMSO),
                     published (27.0, 1.0, ENL_SOLVENT_DMSO)};
  EnlComparison *one = compare (site, e, 2, 1, ENL_SOLVENT_DMSO, 1.05);
  EnlComparison *two = compare (site, e, 2, 1, ENL_SOLVENT_DMSO, 2.1);
  const EnlCandidate *short_of = candidate_of (one, "dimsyl_na"),
                     *enough = candidate_of (two, "dimsyl_na");

  ck_assert_double_eq_tol (short_of->equivalents_needed, 2.0, 1e-12);
  ck_assert_double_lt (short_of->conversion, 0.1);
  ck_assert_double_gt (enough->conversion, 0.98);
  enl_comparison_free (one);
  enl_comparison_free (two);
}
END_TEST

START_TEST (two_sites_share_what_a_strong_base_takes)
{
  EnlSite site[] = {inner_ch2, outer_ch3};
  EnlEstimate e[] = {published (26.0, 1.0, ENL_SOLVENT_THF),
                     published (26.5, 1.0, ENL_SOLVENT_THF)};
  EnlComparison *c = compare (site, e, 2, 0, ENL_SOLVENT_THF, 1.05);
  const char *const strong[] = {"lda", "nah", "kh"};
  double share = 1.0 / (1.0 + pow (10.0, -0.5)); /* K = 10^(26.5 - 26.0) between the anions */

  for (size_t i = 0; i < ENL_COUNT (strong); i++) {
    const EnlCandidate *found = candidate_of (c, strong[i]);
    ck_assert_int_eq (found->verdict, ENL_VERDICT_SHARED);
    ck_assert_double_eq_tol (found->conversion, share, 1e-3);
    ck_assert_double_eq_tol (found->selectivity, share, 1e-3);
    ck_assert (found->low < 0.4 && found->high > 0.95);
    ck_assert_ptr_null (strstr (found->reason, "condense"));
  }
  enl_comparison_free (c);
}
END_TEST

START_TEST (order_is_best_first_mildest_among_equals)
{
  EnlEstimate e = published (14.2, 0.1, ENL_SOLVENT_DMSO);
  EnlComparison *c = compare (&inner_ch2, &e, 1, 0, ENL_SOLVENT_DMSO, 1.05);

  for (uint32_t i = 1; i < c->n_candidates; i++)
    ck_assert_int_le (c->candidate[i - 1].verdict, c->candidate[i].verdict);
  ck_assert_int_eq (c->candidate[0].verdict, ENL_VERDICT_COMPLETE);
  enl_comparison_free (c);
}
END_TEST

START_TEST (hydride_in_dmso_carries_its_warning)
{
  EnlEstimate e = published (24.7, 0.1, ENL_SOLVENT_DMSO);
  EnlComparison *c = compare (&inner_ch2, &e, 1, 0, ENL_SOLVENT_DMSO, 1.05);
  const EnlCandidate *found = candidate_of (c, "nah");
  bool warned = false;

  for (uint32_t i = 0; i < found->n_cautions; i++)
    warned |= strcmp (found->caution[i]->id, "H06") == 0;
  ck_assert (warned);
  ck_assert_ptr_nonnull (strstr (enl_caution_deferral (cautions), "qualified person"));
  enl_comparison_free (c);
}
END_TEST

START_TEST (every_verdict_has_words_and_every_caution_a_base)
{
  for (int i = 0; i < ENL_N_VERDICTS; i++)
    for (int j = 0; j < i; j++)
      ck_assert_str_ne (enl_verdict_text ((EnlVerdict)i), enl_verdict_text ((EnlVerdict)j));
  for (uint32_t i = 0; i < enl_base_table_size (bases); i++) {
    uint32_t n = 0;
    g_free (
        enl_caution_collect (cautions, enl_base_table_get (bases, i), ENL_SOLVENT_THF, true, &n));
    ck_assert_msg (n > 0, "%s has no caution", enl_base_table_get (bases, i)->id);
  }
}
END_TEST

START_TEST (impossible_conditions_are_refused)
{
  EnlConditions c = enl_conditions_default ();
  EnlError err;

  c.equivalents = 0.0;
  ck_assert_int_eq (enl_conditions_check (&c, &err), ENL_ERROR_RANGE);
  c = enl_conditions_default ();
  c.concentration = -1.0;
  ck_assert_int_eq (enl_conditions_check (&c, &err), ENL_ERROR_RANGE);
  c = enl_conditions_default ();
  c.temperature = NAN;
  ck_assert_int_eq (enl_conditions_check (&c, &err), ENL_ERROR_RANGE);
  ck_assert (err.advice[0]);
}
END_TEST

static Suite *
compare_suite (void)
{
  Suite *suite = suite_create ("base comparison");
  TCase *tc = tcase_create ("all");

  tcase_add_checked_fixture (tc, open_tables, close_tables);
  tcase_add_loop_test (tc, verdicts, 0, (int)ENL_COUNT (verdict_case));
  tcase_add_test (tc, borrowed_numbers_are_never_used);
  tcase_add_test (tc, alkoxide_is_levelled_by_water);
  tcase_add_test (tc, interval_holds_the_value_and_shrinks_with_certainty);
  tcase_add_test (tc, a_weaker_site_of_the_molecule_gets_nothing);
  tcase_add_test (tc, a_phenol_eats_the_first_equivalent);
  tcase_add_test (tc, two_sites_share_what_a_strong_base_takes);
  tcase_add_test (tc, order_is_best_first_mildest_among_equals);
  tcase_add_test (tc, hydride_in_dmso_carries_its_warning);
  tcase_add_test (tc, every_verdict_has_words_and_every_caution_a_base);
  tcase_add_test (tc, impossible_conditions_are_refused);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (compare_suite)
