#include "core/bases/equilibrium.h"

#include <math.h>
#include <string.h>

#include "tests/runner.h"

static EnlComposition at;

static EnlStatus
solve (const EnlSpecies *species, uint32_t n, double substrate, double base, double pkah)
{
  EnlEquilibrium problem = {species, n, substrate, base, pkah};
  return enl_equilibrium_solve (&problem, &at, NULL);
}

/* x / (1 - x) = 10^(gap / 2): arithmetic of the law of mass action; the rounded figures 50, 91,
 * 99 and 9 % are common practice. */
static const struct {
  const char *label;
  double gap, percent;
} mixture_case[] = {
    {"no gap", 0.0, 50.0},    {"gap 2", 2.0, 90.909},     {"gap 4", 4.0, 99.0099},
    {"gap -2", -2.0, 9.0909}, {"gap 13", 13.0, 99.99997}, {"gap -7", -7.0, 0.031613},
};

START_TEST (equal_amounts_follow_the_square_root_law)
{
  double gap = mixture_case[_i].gap, expected = mixture_case[_i].percent / 100.0;
  EnlSpecies anion = {17.37, 1};

  ck_assert_double_eq_tol (enl_equal_mixture (gap), expected, 1e-6);
  ck_assert_int_eq (solve (&anion, 1, 0.137, 0.137, 17.37 + gap), ENL_OK);
  ck_assert_msg (fabs (at.fraction[0] - expected) < 1e-6, "%s: %.9f", mixture_case[_i].label,
                 at.fraction[0]);
  ck_assert_double_eq_tol (enl_equal_mixture (gap) + enl_equal_mixture (-gap), 1.0, 1e-12);
}
END_TEST

/* Henderson-Hasselbalch: a weak acid half consumed by a far stronger base sits at its own pKa. */
START_TEST (half_neutralised_acid_sits_at_its_pka)
{
  EnlSpecies anion = {4.756, 1};

  ck_assert_int_eq (solve (&anion, 1, 0.2, 0.1, 25.0), ENL_OK);
  ck_assert_double_eq_tol (at.fraction[0], 0.5, 1e-9);
  ck_assert_double_eq_tol (at.proton, 4.756, 1e-8);
}
END_TEST

START_TEST (strong_base_is_used_up_in_order)
{
  /* A phenol-like hydrogen, a ketone-like one, and both gone. */
  EnlSpecies form[] = {{18.1, 1}, {26.3, 1}, {18.1 + 27.9, 2}};

  ck_assert_int_eq (solve (form, 3, 0.1, 0.1, 36.0), ENL_OK);
  ck_assert_double_eq_tol (at.fraction[0], 1.0, 1e-4);
  ck_assert_int_eq (solve (form, 3, 0.1, 0.2, 36.0), ENL_OK);
  ck_assert_double_eq_tol (at.fraction[2], 1.0, 1e-3);
  ck_assert_double_eq_tol (at.base_used, 1.0, 1e-3);
}
END_TEST

START_TEST (fractions_add_up_and_the_balance_closes)
{
  EnlSpecies form[6];

  for (int seed = 1; seed < 400; seed++) {
    for (int i = 0; i < 6; i++) {
      form[i].lost = (uint32_t)(1 + (seed * 7 + i) % 3);
      form[i].pk_sum = form[i].lost * (3.1 + ((seed * 131 + i * 977) % 4001) / 110.7);
    }
    double pkah = ((seed * 577) % 5003) / 101.3, base = 0.01 + ((seed * 19) % 211) / 97.1;
    ck_assert_int_eq (solve (form, 6, 0.0731, base, pkah), ENL_OK);
    double sum = at.neutral;
    for (int i = 0; i < 6; i++)
      sum += at.fraction[i];
    ck_assert_double_eq_tol (sum, 1.0, 1e-12);
    ck_assert_msg (at.residual < 1e-9, "seed %d: residual %g", seed, at.residual);
  }
}
END_TEST

START_TEST (conversion_rises_with_gap_and_amount)
{
  EnlSpecies anion = {20.3, 1};
  double last = -1.0;

  for (double pkah = 12.0; pkah < 30.0; pkah += 0.37) {
    ck_assert_int_eq (solve (&anion, 1, 0.1, 0.103, pkah), ENL_OK);
    ck_assert_double_gt (at.fraction[0], last);
    last = at.fraction[0];
  }
  last = -1.0;
  for (double base = 0.0; base < 0.3; base += 0.011) {
    ck_assert_int_eq (solve (&anion, 1, 0.1, base, 21.1), ENL_OK);
    ck_assert_double_gt (at.fraction[0], last);
    last = at.fraction[0];
  }
}
END_TEST

START_TEST (order_of_the_forms_does_not_matter)
{
  EnlSpecies one[] = {{13.3, 1}, {19.9, 1}, {24.1, 1}};
  EnlSpecies two[] = {{24.1, 1}, {13.3, 1}, {19.9, 1}};

  ck_assert_int_eq (solve (one, 3, 0.1, 0.13, 17.7), ENL_OK);
  double first = at.fraction[0], second = at.fraction[1];
  ck_assert_int_eq (solve (two, 3, 0.1, 0.13, 17.7), ENL_OK);
  ck_assert_double_eq_tol (at.fraction[1], first, 1e-12);
  ck_assert_double_eq_tol (at.fraction[2], second, 1e-12);
}
END_TEST

START_TEST (impossible_amounts_are_refused)
{
  EnlSpecies anion = {20.0, 1}, bad = {NAN, 1};

  ck_assert_int_eq (solve (&anion, 1, 0.0, 0.1, 20.0), ENL_ERROR_RANGE);
  ck_assert_int_eq (solve (&anion, 1, 0.1, -0.1, 20.0), ENL_ERROR_RANGE);
  ck_assert_int_eq (solve (&anion, 1, 0.1, 0.1, NAN), ENL_ERROR_RANGE);
  ck_assert_int_eq (solve (&bad, 1, 0.1, 0.1, 20.0), ENL_ERROR_RANGE);
  ck_assert_int_eq (solve (&anion, ENL_MAX_SPECIES + 1, 0.1, 0.1, 20.0), ENL_ERROR_LIMIT);
}
END_TEST

static Suite *
equilibrium_suite (void)
{
  Suite *suite = suite_create ("equilibrium");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, equal_amounts_follow_the_square_root_law, 0,
                       (int)ENL_COUNT (mixture_case));
  tcase_add_test (tc, half_neutralised_acid_sits_at_its_pka);
  tcase_add_test (tc, strong_base_is_used_up_in_order);
  tcase_add_test (tc, fractions_add_up_and_the_balance_closes);
  tcase_add_test (tc, conversion_rises_with_gap_and_amount);
  tcase_add_test (tc, order_of_the_forms_does_not_matter);
  tcase_add_test (tc, impossible_amounts_are_refused);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (equilibrium_suite)
