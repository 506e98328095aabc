#include "core/bases/curve.h"

#include <math.h>
#include <string.h>

#include "core/bases/base-steps.h"
#include "core/bases/equilibrium.h"
#include "core/bases/own-base.h"
#include "tests/core/bases/ask.h"
#include "tests/runner.h"

static EnlCurve *
curve_of (const Ask *a, const char *base)
{
  EnlCurve *curve;

  ck_assert_int_eq (
      enl_curve_new (&a->question, candidate_of (a, base), ENL_SWEEP_POINTS, &curve, NULL), ENL_OK);
  return curve;
}

static const EnlCurveLine *
line_of (const EnlCurve *curve, EnlCurveKind kind)
{
  for (uint32_t i = 0; i < curve->n_lines; i++)
    if (curve->line[i].kind == kind)
      return &curve->line[i];
  return NULL;
}

static double
at (const EnlCurve *curve, const EnlCurveLine *line, double equivalents)
{
  double step = curve->equivalents[1] - curve->equivalents[0];

  return line->fraction[(uint32_t)lround (equivalents / step)];
}

/* All lines of the substrate add up, and what stands at the chosen equivalents is what the
 * comparison says. */
static const struct {
  const char *smiles;
  uint32_t atom;
  EnlSolvent solvent;
  double equivalents;
} curve_case[] = {
    {"CC(=O)c1ccccc1", 1, ENL_SOLVENT_DMSO, 1.05},
    {"CC(=O)CC(=O)OCC", 4, ENL_SOLVENT_DMSO, 0.7},
    {"CC(=O)CC(=O)OCC", 4, ENL_SOLVENT_WATER, 2.4},
    {"Oc1ccc(cc1)C(C)=O", 9, ENL_SOLVENT_DMSO, 2.1},
    {"CC1CCCCC1=O", 6, ENL_SOLVENT_THF, 1.0},
    {"CC(=O)CCC(=O)CCC(=O)OCC(=O)CC(=O)C", 1, ENL_SOLVENT_DMSO, 5.5},
};

START_TEST (lines_add_up_and_agree_with_the_comparison)
{
  Ask a;
  uint32_t curves = 0;

  ask (&a, curve_case[_i].smiles, curve_case[_i].atom,
       conditions_in (curve_case[_i].solvent, 25.0, curve_case[_i].equivalents));
  for (uint32_t b = 0; b < a.comparison->n_candidates; b++) {
    const EnlCandidate *c = &a.comparison->candidate[b];
    EnlCurve *curve;
    ck_assert_int_eq (enl_curve_new (&a.question, c, 50, &curve, NULL), ENL_OK);
    ck_assert ((curve->missing != NULL) == isnan (c->conversion));
    double target = 0.0, all = 0.0;
    for (uint32_t i = 0; i < curve->n_lines; i++) {
      const EnlCurveLine *line = &curve->line[i];
      all += line->kind == ENL_CURVE_BASE ? 0.0 : line->chosen;
      target += line->holds_target ? line->chosen : 0.0;
      ck_assert_double_ge (line->chosen, 0.0);
      ck_assert_double_le (line->peak, 1.0 + 1e-12);
    }
    if (curve->n_lines) {
      ck_assert_double_eq_tol (all, 1.0, 0.02); /* forms below half a per cent have no line */
      ck_assert_double_eq_tol (target, c->conversion, 0.02);
      ck_assert_double_lt (curve->worst, 1e-9);
      ck_assert_double_ge (curve->equivalents[49], a.conditions.equivalents);
      curves++;
    }
    enl_curve_free (curve);
  }
  ck_assert_uint_gt (curves, 5);
  ask_clear (&a);
}
END_TEST

/* Hydride: the phenol takes the first equivalent, the ketone the second, both in straight lines. */
START_TEST (irreversible_base_takes_the_most_acidic_first)
{
  Ask a;

  ask (&a, "Oc1ccc(cc1)C(C)=O", 9, conditions_in (ENL_SOLVENT_THF, 25.0, 1.5));
  EnlCurve *curve = curve_of (&a, "nah");
  const EnlCurveLine *neutral = line_of (curve, ENL_CURVE_SUBSTRATE);
  const EnlCurveLine *first = NULL, *second = NULL;
  for (uint32_t i = 0; i < curve->n_lines; i++) {
    if (strcmp (curve->line[i].label, "anion, site 1") == 0)
      first = &curve->line[i];
    if (strcmp (curve->line[i].label, "dianion, site 1 + 2") == 0)
      second = &curve->line[i];
  }
  ck_assert (curve->stoichiometric && first && second && !first->holds_target &&
             second->holds_target);
  for (double e = 0.0; e < 2.95; e += 0.15) {
    double point = round (e / 3.0 * 399) * 3.0 / 399;
    ck_assert_double_eq_tol (at (curve, neutral, point), fmax (0.0, 1.0 - point), 2e-3);
    ck_assert_double_eq_tol (at (curve, first, point), fmax (0.0, 1.0 - fabs (point - 1.0)), 2e-3);
    ck_assert_double_eq_tol (at (curve, second, point), fmin (1.0, fmax (0.0, point - 1.0)), 2e-3);
  }
  enl_curve_free (curve);
  ask_clear (&a);
}
END_TEST

/* ---- dianions ---- */

/* Dianion at 2.2 equivalents. Two acetyl groups on one ring are two enolates for a lithium amide;
 * the two sides of one ketone are not (Hubbard & Harris, J. Am. Chem. Soc. 1980, 102, 2110, from
 * memory: that needs butyllithium). */
static const struct {
  const char *smiles, *base;
  bool both;
} dianion_case[] = {
    {"CC(=O)c1ccc(cc1)C(C)=O", "lda", true},
    {"CC(=O)CCCCCC(=O)c1ccccc1", "lda", true},
    {"CCC(=O)C", "lda", false},
    {"c1ccccc1CC(=O)C", "lda", false},
    {"CC1CCCCC1=O", "nah", false},
    {"CC(=O)C", "lda", false},
};

START_TEST (two_enolates_need_room_of_their_own)
{
  Ask a;
  double dianion = 0.0;

  ask (&a, dianion_case[_i].smiles, 0, conditions_in (ENL_SOLVENT_THF, 25.0, 2.2));
  EnlCurve *curve = curve_of (&a, dianion_case[_i].base);
  for (uint32_t i = 0; i < curve->n_lines; i++)
    if (g_str_has_prefix (curve->line[i].label, "dianion"))
      dianion += curve->line[i].chosen;
  if (dianion_case[_i].both)
    ck_assert_msg (dianion > 0.9, "%s: %g", dianion_case[_i].smiles, dianion);
  else
    ck_assert_msg (dianion < 0.01, "%s: %g", dianion_case[_i].smiles, dianion);
  enl_curve_free (curve);
  ask_clear (&a);
}
END_TEST

/* ---- water ---- */

START_TEST (water_shifts_the_curve_of_a_weak_acid)
{
  Ask dry, wet;
  EnlConditions c = conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.0);

  ask (&dry, "CCN(CC)C(C)=O", 0, c);
  c.water = 0.3;
  ask (&wet, "CCN(CC)C(C)=O", 0, c);
  const EnlCandidate *dry_base = candidate_of (&dry, "dimsyl_na");
  const EnlCandidate *wet_base = candidate_of (&wet, "dimsyl_na");
  ck_assert_double_lt (wet_base->conversion, dry_base->conversion - 0.05);
  ck_assert_double_eq_tol (wet_base->equivalents_needed, dry_base->equivalents_needed + 0.3, 1e-9);
  EnlCurve *without = curve_of (&dry, "dimsyl_na"), *with = curve_of (&wet, "dimsyl_na");
  const EnlCurveLine *one = line_of (without, ENL_CURVE_SUBSTRATE);
  const EnlCurveLine *two = line_of (with, ENL_CURVE_SUBSTRATE);
  for (uint32_t i = 1; i < ENL_SWEEP_POINTS; i++)
    ck_assert_double_gt (two->fraction[i], one->fraction[i]);
  enl_curve_free (without);
  enl_curve_free (with);
  ask_clear (&dry);
  ask_clear (&wet);
}
END_TEST

/* ---- intervals ---- */

/* The error of the base moves it against all sites at once: it changes how much is deprotonated,
 * not which site is. */
START_TEST (the_doubt_of_a_base_is_no_doubt_about_the_site)
{
  Ask a;

  ask (&a, "CC(=O)CC(=O)OCC", 0, conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.0));
  for (uint32_t i = 0; i < a.comparison->n_candidates; i++) {
    const EnlCandidate *c = &a.comparison->candidate[i];
    if (isnan (c->conversion))
      continue;
    ck_assert (c->low <= c->conversion + 1e-12 && c->conversion <= c->high + 1e-12);
    if (isnan (c->gap))
      continue;
    double half = c->gap_high - c->gap;
    ck_assert_double_eq_tol (c->gap - c->gap_low, half, 1e-9);
    /* one site by far: the ends are those of the equal mixture at the ends of the gap */
    ck_assert_double_eq_tol (c->conversion, c->stoichiometric ? 1.0 : enl_equal_mixture (c->gap),
                             2e-3);
    if (!c->stoichiometric) {
      ck_assert_double_eq_tol (c->low, enl_equal_mixture (c->gap_low), 2e-3);
      ck_assert_double_eq_tol (c->high, enl_equal_mixture (c->gap_high), 2e-3);
    }
  }
  ask_clear (&a);
}
END_TEST

/* ---- steps of bases ---- */

START_TEST (table_of_steps_is_read_and_checked)
{
  static const struct {
    const char *row;
    bool good;
  } row_case[] = {
      {"dabco\tdmso\t2\t2.0\tinvented", true},   {"dabco\tdmso\t3\t2.0\tinvented", false},
      {"dabco\tdmso\t2\t20\tinvented", false},   {"no-base\tdmso\t2\t2.0\tinvented", false},
      {"dabco\tether\t2\t2.0\tinvented", false}, {"dabco\tdmso\t2\t\tinvented", false},
  };
  int dabco = enl_base_table_find (knowledge->bases, "dabco");
  int k3po4 = enl_base_table_find (knowledge->bases, "k3po4");

  ck_assert_uint_eq (enl_base_table_get (knowledge->bases, dabco)->n_further[ENL_SOLVENT_WATER], 1);
  ck_assert_uint_eq (enl_base_table_get (knowledge->bases, k3po4)->n_further[ENL_SOLVENT_WATER], 2);
  for (size_t i = 0; i < ENL_COUNT (row_case); i++) {
    g_autoptr (EnlBaseTable) copy = enl_base_table_extend (knowledge->bases, NULL, 0);
    g_autofree char *text =
        g_strconcat ("base\tsolvent\tstep\tpKaH\tsource\n", row_case[i].row, "\n", NULL);
    EnlError err = {0};
    EnlStatus status = enl_base_table_read_steps (copy, text, strlen (text), &err);
    ck_assert_msg ((status == ENL_OK) == row_case[i].good, "%s", row_case[i].row);
    ck_assert (status == ENL_OK || err.line == 2);
  }
}
END_TEST

/* In water a strong acid goes on to the second nitrogen: below pH 3 DABCO takes two protons. */
START_TEST (second_step_of_a_base_counts)
{
  Ask a;

  ask (&a, "OC(=O)C(F)(F)F", 1, conditions_in (ENL_SOLVENT_WATER, 25.0, 0.5));
  double half = candidate_of (&a, "dabco")->conversion;
  double one = candidate_of (&a, "et3n")->conversion;
  /* The acid alone gives most of its protons to water (pKa 0.5 at 0.1 mol/L). */
  ck_assert_double_gt (one, 0.8);
  ck_assert_double_gt (half, one + 0.01);
  ask_clear (&a);
}
END_TEST

static Suite *
curve_suite (void)
{
  Suite *suite = suite_create ("composition curve");
  TCase *tc = tcase_create ("all");

  tcase_add_checked_fixture (tc, open_knowledge, close_knowledge);
  tcase_add_loop_test (tc, lines_add_up_and_agree_with_the_comparison, 0,
                       (int)ENL_COUNT (curve_case));
  tcase_add_test (tc, irreversible_base_takes_the_most_acidic_first);
  tcase_add_loop_test (tc, two_enolates_need_room_of_their_own, 0, (int)ENL_COUNT (dianion_case));
  tcase_add_test (tc, water_shifts_the_curve_of_a_weak_acid);
  tcase_add_test (tc, the_doubt_of_a_base_is_no_doubt_about_the_site);
  tcase_add_test (tc, table_of_steps_is_read_and_checked);
  tcase_add_test (tc, second_step_of_a_base_counts);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (curve_suite)
