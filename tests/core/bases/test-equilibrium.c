#include "core/bases/equilibrium.h"

#include <math.h>
#include <string.h>

#include "tests/runner.h"

static EnlComposition at;

static EnlStatus
solve (const EnlSpecies *species, uint32_t n, double substrate, double base, double pkah)
{
  const EnlAcceptor acceptor = enl_acceptor_bare (base, pkah);
  const EnlEquilibrium problem = {.species = species,
                                  .n_species = n,
                                  .substrate = substrate,
                                  .acceptor = &acceptor,
                                  .n_acceptors = 1,
                                  .autoprotolysis = NAN};
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
  ck_assert_double_eq_tol (at.form[0][1], 1.0, 1e-3);
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

/* ---- in water, with its own ions ---- */

/* pKa: CRC Handbook of Chemistry and Physics, dissociation constants of acids at 25 °C and zero
 * ionic strength, from memory; pKw 14.0. Concentrations stand for activities. */
#define ACETIC  4.756
#define AMMONIA 9.25
static const EnlSpecies acetate[] = {{ACETIC, 1}};
static const EnlSpecies carbonic[] = {{6.35, 1}, {6.35 + 10.33, 2}};
static const EnlSpecies phosphoric[] = {{2.16, 1}, {2.16 + 7.21, 2}, {2.16 + 7.21 + 12.32, 3}};

/* Each worked by hand from the formula that the label names. */
static const struct {
  const char *label;
  const EnlSpecies *species;
  uint32_t n;
  double acid, hydroxide; /* mol/L */
  double ph, within;
} water_case[] = {
    /* x^2 / (0.1 - x) = 10^-4.756, x = 1.3156e-3 */
    {"acetic acid 0.1 M: Ostwald's dilution law", acetate, 1, 0.1, 0.0, 2.8809, 1e-4},
    {"half-neutralised: Henderson-Hasselbalch", acetate, 1, 0.2, 0.1, ACETIC, 3e-4},
    {"91 % neutralised: pKa + 1, Henderson-Hasselbalch", acetate, 1, 0.11, 0.1, 5.756, 1e-4},
    {"sodium acetate 0.1 M: 7 + (pKa + log c) / 2", acetate, 1, 0.1, 0.1, 8.878, 1e-3},
    {"twice the hydroxide: that of the excess, 14 + log 0.1", acetate, 1, 0.1, 0.2, 13.0, 1e-4},
    {"hydrogencarbonate 0.1 M: (pK1 + pK2) / 2", carbonic, 2, 0.1, 0.1, 8.34, 2e-3},
    {"hydrogencarbonate and carbonate alike: pK2", carbonic, 2, 0.1, 0.15, 10.33, 4e-3},
    /* x^2 / (0.1 - x) = 10^-(14 - 10.33), x = 4.518e-3 mol/L of hydroxide */
    {"carbonate 0.1 M: hydrolysis", carbonic, 2, 0.1, 0.2, 11.655, 1e-3},
    {"equal parts H2PO4- and HPO4(2-): pK2", phosphoric, 3, 0.1, 0.15, 7.21, 1e-3},
    {"hydrogenphosphate 0.1 M: (pK2 + pK3) / 2, with water", phosphoric, 3, 0.1, 0.2, 9.685, 0.07},
};

START_TEST (textbook_solutions_in_water)
{
  const EnlEquilibrium problem = {.species = water_case[_i].species,
                                  .n_species = water_case[_i].n,
                                  .substrate = water_case[_i].acid,
                                  .removed = water_case[_i].hydroxide,
                                  .autoprotolysis = 14.0};

  ck_assert_int_eq (enl_equilibrium_solve (&problem, &at, NULL), ENL_OK);
  ck_assert_msg (fabs (at.proton - water_case[_i].ph) < water_case[_i].within, "%s: pH %.5f",
                 water_case[_i].label, at.proton);
  /* charges: Na+ and H+ against hydroxide and the anions */
  double minus = pow (10.0, at.proton - 14.0);
  for (uint32_t i = 0; i < problem.n_species; i++)
    minus += problem.substrate * at.fraction[i] * problem.species[i].lost;
  ck_assert_double_eq_tol (minus, problem.removed + pow (10.0, -at.proton), 1e-9);
}
END_TEST

/* Speciation at pH = (pK1 + pK2) / 2: 1 / (1 + 2 * 10^-((pK2 - pK1) / 2)) is hydrogencarbonate. */
START_TEST (ampholyte_has_its_textbook_share)
{
  const EnlEquilibrium problem = {
      .species = carbonic, .n_species = 2, .substrate = 5.0, .removed = 5.0, .autoprotolysis = NAN};

  ck_assert_int_eq (enl_equilibrium_solve (&problem, &at, NULL), ENL_OK);
  ck_assert_double_eq_tol (at.proton, 8.34, 1e-9);
  ck_assert_double_eq_tol (at.fraction[0], 1.0 / (1.0 + 2.0 * pow (10.0, -1.99)), 1e-9);
}
END_TEST

/* ---- bases with forms of their own ---- */

/* Half of the ammonia brought as ammonium: Henderson-Hasselbalch, beside an acid too weak to act.
 */
START_TEST (base_with_its_conjugate_acid_is_a_buffer)
{
  const EnlSpecies inert = {40.0, 1};
  EnlAcceptor ammonia = enl_acceptor_bare (0.2, AMMONIA);
  const EnlEquilibrium problem = {.species = &inert,
                                  .n_species = 1,
                                  .substrate = 0.1,
                                  .acceptor = &ammonia,
                                  .n_acceptors = 1,
                                  .autoprotolysis = 14.0};

  ammonia.brought = 0.5;
  ck_assert_int_eq (enl_equilibrium_solve (&problem, &at, NULL), ENL_OK);
  ck_assert_double_eq_tol (at.proton, AMMONIA, 1e-3);
  ammonia.brought = 1.0 / 11.0;
  ck_assert_int_eq (enl_equilibrium_solve (&problem, &at, NULL), ENL_OK);
  ck_assert_double_eq_tol (at.proton, AMMONIA + 1.0, 1e-2);
}
END_TEST

/* Carbonate as a base is carbonic acid as a substrate, seen from the other side. */
START_TEST (a_base_with_two_steps_is_a_diprotic_acid)
{
  for (double acid = 0.01; acid < 0.25; acid += 0.013) {
    const EnlAcceptor carbonate = {.amount = 0.1, .steps = 2, .pka = {10.33, 6.35}};
    const EnlAcceptor base = enl_acceptor_bare (acid, ACETIC);
    EnlAcceptor brought = base;
    brought.brought = 1.0;
    const EnlEquilibrium one = {.species = acetate,
                                .n_species = 1,
                                .substrate = acid,
                                .acceptor = &carbonate,
                                .n_acceptors = 1,
                                .autoprotolysis = 14.0};
    const EnlEquilibrium two = {.species = carbonic,
                                .n_species = 2,
                                .substrate = 0.1,
                                .acceptor = &brought,
                                .n_acceptors = 1,
                                .removed = 0.2,
                                .autoprotolysis = 14.0};
    ck_assert_int_eq (enl_equilibrium_solve (&one, &at, NULL), ENL_OK);
    double ph = at.proton, acetic = at.neutral, half = at.form[0][1];
    ck_assert_double_eq_tol (at.form[0][0] + at.form[0][1] + at.form[0][2], 1.0, 1e-12);
    ck_assert_int_eq (enl_equilibrium_solve (&two, &at, NULL), ENL_OK);
    ck_assert_double_eq_tol (at.proton, ph, 1e-9);
    ck_assert_double_eq_tol (at.form[0][1], acetic, 1e-9);
    ck_assert_double_eq_tol (at.fraction[0], half, 1e-9);
  }
}
END_TEST

/* Weaker acid than water: the water goes first; stronger: it does no harm. */
START_TEST (water_eats_base_before_a_weaker_acid)
{
  const EnlSpecies amide = {35.0, 1}, ketone = {24.7, 1};
  EnlAcceptor part[] = {enl_acceptor_bare (0.1, 60.0), enl_acceptor_bare (0.05, 31.4)};
  EnlEquilibrium problem = {.species = &amide,
                            .n_species = 1,
                            .substrate = 0.1,
                            .acceptor = part,
                            .n_acceptors = 2,
                            .autoprotolysis = NAN};

  part[1].brought = 1.0;
  ck_assert_int_eq (enl_equilibrium_solve (&problem, &at, NULL), ENL_OK);
  /* 0.1 mol/L of base take the water (0.05) and half of the amide (0.05). Of the water stays d:
   * d * 0.05 / (0.05 * 0.05) = 10^(31.4 - 35), d = 1.256e-5 mol/L, as the amide loses more. */
  ck_assert_double_eq_tol (at.fraction[0], 0.5 + 1.256e-4, 1e-6);
  problem.species = &ketone;
  ck_assert_int_eq (enl_equilibrium_solve (&problem, &at, NULL), ENL_OK);
  ck_assert_double_gt (at.fraction[0], 0.999);
  problem.species = &amide;
  part[0].amount = 0.15;
  ck_assert_int_eq (enl_equilibrium_solve (&problem, &at, NULL), ENL_OK);
  ck_assert_double_gt (at.fraction[0], 0.999);
}
END_TEST

/* ---- sweeps ---- */

START_TEST (sweep_agrees_with_single_solutions)
{
  const EnlSpecies form[] = {{18.1, 1}, {26.3, 1}, {18.1 + 29.3, 2}};
  EnlAcceptor part[] = {enl_acceptor_bare (0.0, 28.2), enl_acceptor_bare (0.03, 31.4)};
  EnlEquilibrium problem = {.species = form,
                            .n_species = 3,
                            .substrate = 0.1,
                            .acceptor = part,
                            .n_acceptors = 2,
                            .autoprotolysis = NAN};
  EnlSweep *sweep;

  part[1].brought = 1.0;
  ck_assert_int_eq (enl_sweep_new (&problem, false, ENL_SWEEP_MOST, ENL_SWEEP_POINTS, &sweep, NULL),
                    ENL_OK);
  ck_assert_uint_eq (sweep->n_points, 400);
  ck_assert_double_lt (sweep->worst, 1e-9);
  for (uint32_t i = 0; i < sweep->n_points; i++) {
    double sum = sweep->neutral[i];
    part[0].amount = 0.1 * sweep->equivalents[i];
    ck_assert_double_eq_tol (sweep->equivalents[i], 3.0 * i / 399.0, 1e-12);
    ck_assert_int_eq (enl_equilibrium_solve (&problem, &at, NULL), ENL_OK);
    for (uint32_t k = 0; k < 3; k++) {
      ck_assert_double_eq_tol (sweep->fraction[k * 400 + i], at.fraction[k], 1e-9);
      sum += sweep->fraction[k * 400 + i];
    }
    ck_assert_double_eq_tol (sum, 1.0, 1e-9);
    ck_assert (i == 0 || sweep->neutral[i] < sweep->neutral[i - 1]);
    ck_assert (i == 0 || sweep->unused[i] > sweep->unused[i - 1]);
    ck_assert_double_eq_tol (sweep->bound[i], at.form[0][1], 1e-9);
    ck_assert_double_eq_tol (sweep->bound[400 + i], at.form[1][1], 1e-9);
  }
  enl_sweep_free (sweep);
}
END_TEST

/* Taken for good: straight lines to the first, then to the second anion, then unused base. */
START_TEST (stoichiometric_sweep_is_straight)
{
  const EnlSpecies form[] = {{18.0, 1}, {18.0 + 42.0, 2}};
  const EnlEquilibrium problem = {
      .species = form, .n_species = 2, .substrate = 0.1, .autoprotolysis = NAN};
  EnlSweep *sweep;

  ck_assert_int_eq (enl_sweep_new (&problem, true, 3.0, 301, &sweep, NULL), ENL_OK);
  ck_assert_double_lt (sweep->worst, 1e-9);
  for (uint32_t i = 0; i < 301; i++) {
    double e = i / 100.0;
    ck_assert_double_eq_tol (sweep->neutral[i], fmax (0.0, 1.0 - e), 1e-9);
    ck_assert_double_eq_tol (sweep->fraction[i], fmax (0.0, 1.0 - fabs (e - 1.0)), 1e-9);
    ck_assert_double_eq_tol (sweep->fraction[301 + i], fmin (1.0, fmax (0.0, e - 1.0)), 1e-9);
    ck_assert_double_eq_tol (sweep->unused[i], e > 2.0 ? 1.0 - 2.0 / e : 0.0, 1e-9);
  }
  enl_sweep_free (sweep);
}
END_TEST

/* Any number of forms, bases, impurities: the masses add up and the balance closes. */
START_TEST (sweeps_of_many_sites_close)
{
  EnlSpecies form[40];
  EnlAcceptor part[3];

  for (unsigned seed = 1; seed < 40; seed++) {
    uint32_t n = 1 + seed % 40;
    for (uint32_t i = 0; i < n; i++) {
      form[i].lost = 1 + (seed * 7 + i) % 3;
      form[i].pk_sum = form[i].lost * (1.3 + ((seed * 131 + i * 977) % 4001) / 90.7);
    }
    for (uint32_t k = 0; k < 3; k++)
      part[k] = (EnlAcceptor){.amount = 0.05 * k,
                              .brought = 0.25 * k,
                              .steps = 1 + k,
                              .pka = {40.0 - seed, 20.0 - seed / 2.0, 3.0}};
    EnlEquilibrium problem = {.species = form,
                              .n_species = n,
                              .substrate = 0.0731,
                              .acceptor = part,
                              .n_acceptors = 3,
                              .removed = seed % 4 == 0 ? 0.04 : 0.0,
                              .autoprotolysis = seed % 5 == 0 ? 14.0 : NAN};
    EnlSweep *sweep;
    ck_assert_int_eq (enl_sweep_new (&problem, false, 3.0, 400, &sweep, NULL), ENL_OK);
    ck_assert_msg (sweep->worst < 1e-9, "seed %u: residual %g", seed, sweep->worst);
    for (uint32_t i = 0; i < 400; i++) {
      double sum = sweep->neutral[i];
      for (uint32_t k = 0; k < n; k++)
        sum += sweep->fraction[k * 400 + i];
      ck_assert_double_eq_tol (sum, 1.0, 1e-9);
    }
    enl_sweep_free (sweep);
  }
}
END_TEST

START_TEST (impossible_sweeps_are_refused)
{
  const EnlSpecies anion = {20.0, 1};
  EnlAcceptor base = enl_acceptor_bare (0.1, 20.0);
  EnlEquilibrium problem = {.species = &anion,
                            .n_species = 1,
                            .substrate = 0.1,
                            .acceptor = &base,
                            .n_acceptors = 1,
                            .autoprotolysis = NAN};
  EnlSweep *sweep;

  ck_assert_int_eq (enl_sweep_new (&problem, false, 3.0, 1, &sweep, NULL), ENL_ERROR_RANGE);
  ck_assert_int_eq (enl_sweep_new (&problem, false, 0.0, 9, &sweep, NULL), ENL_ERROR_RANGE);
  base.brought = 1.5;
  ck_assert_int_eq (enl_sweep_new (&problem, false, 3.0, 9, &sweep, NULL), ENL_ERROR_RANGE);
  base.brought = 0.0;
  base.steps = ENL_MAX_STEPS + 1;
  ck_assert_int_eq (enl_sweep_new (&problem, false, 3.0, 9, &sweep, NULL), ENL_ERROR_LIMIT);
  problem.n_acceptors = 0;
  ck_assert_int_eq (enl_sweep_new (&problem, false, 3.0, 9, &sweep, NULL), ENL_ERROR_RANGE);
  problem.removed = -1.0;
  ck_assert_int_eq (enl_sweep_new (&problem, true, 3.0, 9, &sweep, NULL), ENL_ERROR_RANGE);
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
  tcase_add_loop_test (tc, textbook_solutions_in_water, 0, (int)ENL_COUNT (water_case));
  tcase_add_test (tc, ampholyte_has_its_textbook_share);
  tcase_add_test (tc, base_with_its_conjugate_acid_is_a_buffer);
  tcase_add_test (tc, a_base_with_two_steps_is_a_diprotic_acid);
  tcase_add_test (tc, water_eats_base_before_a_weaker_acid);
  tcase_add_test (tc, sweep_agrees_with_single_solutions);
  tcase_add_test (tc, stoichiometric_sweep_is_straight);
  tcase_add_test (tc, sweeps_of_many_sites_close);
  tcase_add_test (tc, impossible_sweeps_are_refused);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (equilibrium_suite)
