#include "core/molecule/elements.h"

#include <math.h>
#include <string.h>

#include "tests/runner.h"

START_TEST (every_symbol_is_found_again)
{
  for (int e = 0; e < ENL_N_ELEMENTS; e++) {
    const char *symbol = enl_element_symbol ((uint8_t)e);
    ck_assert_int_eq (enl_element_find (symbol, strlen (symbol)), e);
    ck_assert_uint_gt (strlen (enl_element_name ((uint8_t)e)), 2);
  }
}
END_TEST

START_TEST (case_and_length_count)
{
  ck_assert_int_eq (enl_element_find ("Co", 2), 27);
  ck_assert_int_eq (enl_element_find ("CO", 2), -1);
  ck_assert_int_eq (enl_element_find ("co", 2), -1);
  ck_assert_int_eq (enl_element_find ("Co", 1), 6);
  ck_assert_int_eq (enl_element_find ("", 0), -1);
  ck_assert_int_eq (enl_element_find ("Coo", 3), -1);
}
END_TEST

/* IUPAC abridged standard atomic weights 2021 (Prohaska et al., Pure Appl. Chem. 2022, 94, 573),
 * entered here apart from the table, from memory. */
static const struct {
  const char *symbol;
  double weight;
} weight_case[] = {
    {"H", 1.0080},  {"Li", 6.94},   {"B", 10.81},   {"C", 12.011},  {"N", 14.007},  {"O", 15.999},
    {"F", 18.998},  {"Na", 22.990}, {"Mg", 24.305}, {"P", 30.974},  {"S", 32.06},   {"Cl", 35.45},
    {"K", 39.098},  {"Zn", 65.38},  {"Se", 78.971}, {"Br", 79.904}, {"Sn", 118.71}, {"I", 126.90},
    {"Cs", 132.91}, {"Pb", 207.2},  {"U", 238.03},
};

START_TEST (weights)
{
  const char *symbol = weight_case[_i].symbol;
  int element = enl_element_find (symbol, strlen (symbol));

  ck_assert_double_eq_tol (enl_element_weight ((uint8_t)element), weight_case[_i].weight, 1e-12);
}
END_TEST

START_TEST (electronegativities_follow_the_trend)
{
  ck_assert_double_eq_tol (enl_element_electronegativity (9), 3.98, 1e-12);
  ck_assert (isnan (enl_element_electronegativity (2)));
  for (uint8_t e = 4; e <= 9; e++)
    ck_assert_double_gt (enl_element_electronegativity (e), enl_element_electronegativity (e - 1));
}
END_TEST

START_TEST (outer_electrons_count_along_the_rows)
{
  static const struct {
    uint8_t element, outer;
  } known[] = {{1, 1},  {2, 2},  {6, 4},  {10, 8}, {13, 3}, {17, 7}, {20, 2},
               {26, 0}, {30, 0}, {31, 3}, {36, 8}, {53, 7}, {58, 0}, {82, 4}};

  for (size_t i = 0; i < ENL_COUNT (known); i++)
    ck_assert_uint_eq (enl_element_outer_electrons (known[i].element), known[i].outer);
}
END_TEST

static Suite *
elements_suite (void)
{
  Suite *suite = suite_create ("molecule elements");
  TCase *tc = tcase_create ("all");

  tcase_add_test (tc, every_symbol_is_found_again);
  tcase_add_test (tc, case_and_length_count);
  tcase_add_loop_test (tc, weights, 0, (int)ENL_COUNT (weight_case));
  tcase_add_test (tc, electronegativities_follow_the_trend);
  tcase_add_test (tc, outer_electrons_count_along_the_rows);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (elements_suite)
