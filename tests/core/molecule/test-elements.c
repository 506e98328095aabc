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
 * the whole list of the 84 elements that have one; entered here apart from the table, from memory.
 * tests/reference/check-elements.py holds the table against RDKit's. */
static const struct {
  const char *symbol;
  double weight;
} weight_case[] = {
    {"H", 1.0080},  {"He", 4.0026}, {"Li", 6.94},   {"Be", 9.0122}, {"B", 10.81},   {"C", 12.011},
    {"N", 14.007},  {"O", 15.999},  {"F", 18.998},  {"Ne", 20.180}, {"Na", 22.990}, {"Mg", 24.305},
    {"Al", 26.982}, {"Si", 28.085}, {"P", 30.974},  {"S", 32.06},   {"Cl", 35.45},  {"Ar", 39.95},
    {"K", 39.098},  {"Ca", 40.078}, {"Sc", 44.956}, {"Ti", 47.867}, {"V", 50.942},  {"Cr", 51.996},
    {"Mn", 54.938}, {"Fe", 55.845}, {"Co", 58.933}, {"Ni", 58.693}, {"Cu", 63.546}, {"Zn", 65.38},
    {"Ga", 69.723}, {"Ge", 72.630}, {"As", 74.922}, {"Se", 78.971}, {"Br", 79.904}, {"Kr", 83.798},
    {"Rb", 85.468}, {"Sr", 87.62},  {"Y", 88.906},  {"Zr", 91.224}, {"Nb", 92.906}, {"Mo", 95.95},
    {"Ru", 101.07}, {"Rh", 102.91}, {"Pd", 106.42}, {"Ag", 107.87}, {"Cd", 112.41}, {"In", 114.82},
    {"Sn", 118.71}, {"Sb", 121.76}, {"Te", 127.60}, {"I", 126.90},  {"Xe", 131.29}, {"Cs", 132.91},
    {"Ba", 137.33}, {"La", 138.91}, {"Ce", 140.12}, {"Pr", 140.91}, {"Nd", 144.24}, {"Sm", 150.36},
    {"Eu", 151.96}, {"Gd", 157.25}, {"Tb", 158.93}, {"Dy", 162.50}, {"Ho", 164.93}, {"Er", 167.26},
    {"Tm", 168.93}, {"Yb", 173.05}, {"Lu", 174.97}, {"Hf", 178.49}, {"Ta", 180.95}, {"W", 183.84},
    {"Re", 186.21}, {"Os", 190.23}, {"Ir", 192.22}, {"Pt", 195.08}, {"Au", 196.97}, {"Hg", 200.59},
    {"Tl", 204.38}, {"Pb", 207.2},  {"Bi", 208.98}, {"Th", 232.04}, {"Pa", 231.04}, {"U", 238.03},
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
