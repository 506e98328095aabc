/* Weigh-out: hand-worked amounts, the list with its reasons, bad orders. */
#include "core/bases/weigh-list.h"

#include <math.h>

#include "core/workset/workset.h"
#include "resources/embedded.h"
#include "tests/core/bases/ask.h"

/* Worked by hand from the molar masses (IUPAC abridged atomic weights), with the commercial forms
 * of resources/bases.tsv where the order says nothing: n-BuLi 2.5 mol/L, LDA 2.0 mol/L, NaH 60 %,
 * Et3N 101.19 g/mol and 0.726 g/mL, NaOMe 54.02 g/mol as 25 % of 0.945 g/mL, KOH 85 %. Amount of
 * the first part; NAN: not told. */
static const struct {
  const char *label, *base;
  double mmol, equivalents, water, titre, mass_percent;
  double base_mmol, mg, ml;
} amount_case[] = {
    {"n-BuLi 2.5 mol/L: 5.25 mmol", "nbuli", 5.0, 1.05, 0, 2.5, NAN, 5.25, NAN, 2.10},
    {"n-BuLi as usually sold, 0.69 g/mL", "nbuli", 5.0, 1.05, 0, NAN, NAN, 5.25, 1449.0, 2.10},
    {"n-BuLi by its titre, 2.31 mol/L", "nbuli", 5.0, 1.05, 0, 2.31, NAN, 5.25, NAN, 2.27273},
    {"NaH, dispersion of 60 %", "nah", 10.0, 1.0, 0, NAN, NAN, 10.0, 399.97, NAN},
    {"NaH, dispersion of 57 %", "nah", 10.0, 1.1, 0, NAN, 57.0, 11.0, 463.12, NAN},
    {"LDA 2.0 mol/L", "lda", 3.0, 1.05, 0, NAN, NAN, 3.15, 1275.75, 1.575},
    {"solid KOtBu", "kotbu", 7.5, 1.05, 0, NAN, NAN, 7.875, 883.65, NAN},
    {"KOtBu as a solution of 1.0 mol/L", "kotbu", 7.5, 1.05, 0, 1.0, NAN, 7.875, NAN, 7.875},
    {"triethylamine, a liquid", "et3n", 12.0, 1.5, 0, NAN, NAN, 18.0, 1821.4, 2.50885},
    {"NaOMe, 25 % in methanol", "naome", 6.0, 1.05, 0, NAN, NAN, 6.3, 1361.3, 1.44053},
    {"KOH pellets, 85 %", "koh", 20.0, 1.2, 0, NAN, NAN, 24.0, 1584.0, NAN},
    {"Ba(OH)2: two equivalents a mole", "baoh2", 8.0, 1.5, 0, NAN, NAN, 6.0, 1028.04, NAN},
    {"Mg(OEt)2: two equivalents a mole", "mgoet2", 4.0, 1.0, 0, NAN, NAN, 2.0, 228.86, NAN},
    {"Mg(HMDS)2: two equivalents a mole", "mg_hmds2", 4.0, 1.0, 0, NAN, NAN, 2.0, 690.16, NAN},
    {"water eats n-BuLi", "nbuli", 5.0, 1.05, 0.15, NAN, NAN, 6.0, 1656.0, 2.40},
    {"water eats no triethylamine", "et3n", 12.0, 1.5, 0.3, NAN, NAN, 18.0, 1821.4, 2.50885},
    {"water eats no hydroxide", "koh", 20.0, 1.2, 0.5, NAN, NAN, 24.0, 1584.0, NAN},
    {"LiTMP: its amine first", "litmp", 4.0, 1.25, 0, NAN, NAN, 5.0, 706.3, 0.843847},
    {"LiTMP by the titre of a solution of it", "litmp", 4.0, 1.25, 0, 0.8, NAN, 5.0, NAN, 6.25},
    {"LiCKOR: the titre is that of n-BuLi", "lickor", 4.0, 1.25, 0, 1.6, NAN, 5.0, NAN, 3.125},
    {"NaDA: nothing is sold", "nada", 4.0, 1.25, 0, NAN, NAN, 5.0, NAN, NAN},
};

static const EnlBase *
base_of (const char *id)
{
  int found = enl_base_table_find (knowledge->bases, id);

  ck_assert_msg (found >= 0, "no base %s", id);
  return enl_base_table_get (knowledge->bases, (uint32_t)found);
}

static void
check_amount (const char *label, const char *what, double value, double expected)
{
  if (isnan (expected))
    ck_assert_msg (isnan (value), "%s: %s is %g, not unknown", label, what, value);
  else
    ck_assert_msg (fabs (value - expected) < 5e-4 * expected, "%s: %s is %g, not %g", label, what,
                   value, expected);
}

START_TEST (amounts)
{
  g_autoptr (EnlWeighing) w = NULL;
  EnlError err = {0};
  EnlWeighOrder order = {amount_case[_i].mmol, amount_case[_i].equivalents, amount_case[_i].water,
                         amount_case[_i].titre, amount_case[_i].mass_percent};

  if (enl_weigh (knowledge->weigh, base_of (amount_case[_i].base), &order, &w, &err) != ENL_OK)
    ck_abort_msg ("%s: %s; %s", amount_case[_i].label, err.text, err.advice);
  check_amount (amount_case[_i].label, "mmol of base", w->mmol, amount_case[_i].base_mmol);
  check_amount (amount_case[_i].label, "mg", w->part[0].mg, amount_case[_i].mg);
  check_amount (amount_case[_i].label, "mL", w->part[0].ml, amount_case[_i].ml);
}
END_TEST

START_TEST (sets_name_every_part)
{
  static const struct {
    const char *base, *first, *second;
    double second_mmol; /* NAN: not known */
  } set[] = {
      {"soft_mgcl2_et3n", "triethylamine", "magnesium chloride", NAN},
      {"soft_tmsotf_et3n", "triethylamine", "trimethylsilyl triflate", NAN},
      {"nbuli_tmeda", "n-butyllithium", "TMEDA", 5.25},
      {"lickor", "n-butyllithium", "potassium tert-butoxide", 5.25},
      {"lica", "N-isopropylcyclohexylamine", "n-butyllithium", 5.25},
  };
  EnlWeighOrder order = {5.0, 1.05, 0.0, NAN, NAN};

  for (size_t i = 0; i < ENL_COUNT (set); i++) {
    g_autoptr (EnlWeighing) w = NULL;
    ck_assert_int_eq (enl_weigh (knowledge->weigh, base_of (set[i].base), &order, &w, NULL),
                      ENL_OK);
    ck_assert_uint_eq (w->n_parts, 2);
    ck_assert_str_eq (w->part[0].name, set[i].first);
    ck_assert_str_eq (w->part[1].name, set[i].second);
    check_amount (set[i].base, "mmol of the second part", w->part[1].mmol, set[i].second_mmol);
    if (isnan (set[i].second_mmol)) {
      g_autofree char *text = enl_weigh_amount_text (&w->part[1]);
      ck_assert_str_eq (text, "amount not known here");
      ck_assert_ptr_nonnull (strstr (w->part[0].note, "not known"));
    }
  }
}
END_TEST

/* Whatever has a molar mass can be weighed, and says how it is sold. */
START_TEST (every_base_of_the_table_is_told)
{
  EnlWeighOrder order = {2.5, 1.05, 0.05, NAN, NAN};

  for (uint32_t i = 0; i < enl_base_table_size (knowledge->bases); i++) {
    const EnlBase *base = enl_base_table_get (knowledge->bases, i);
    g_autoptr (EnlWeighing) w = NULL;
    EnlError err = {0};
    if (enl_weigh (knowledge->weigh, base, &order, &w, &err) != ENL_OK)
      ck_abort_msg ("%s: %s", base->id, err.text);
    const EnlWeighPart *part = &w->part[0];
    bool amount = part->mg > 0.0 || part->ml > 0.0;
    ck_assert_msg (amount || part->note[0], "%s: neither an amount nor a reason", base->id);
    ck_assert_msg (part->form[0], "%s: no form", base->id);
  }
}
END_TEST

static const struct {
  const char *label;
  EnlWeighOrder order;
} bad_case[] = {
    {"no substrate", {0.0, 1.05, 0.0, NAN, NAN}},
    {"less than none", {-5.0, 1.05, 0.0, NAN, NAN}},
    {"not a number", {NAN, 1.05, 0.0, NAN, NAN}},
    {"a tanker", {1e9, 1.05, 0.0, NAN, NAN}},
    {"no base", {5.0, 0.0, 0.0, NAN, NAN}},
    {"equivalents beyond reason", {5.0, 1e4, 0.0, NAN, NAN}},
    {"equivalents not a number", {5.0, NAN, 0.0, NAN, NAN}},
    {"negative water", {5.0, 1.05, -0.1, NAN, NAN}},
    {"titre of nothing", {5.0, 1.05, 0.0, 0.0, NAN}},
    {"titre beyond a pure liquid", {5.0, 1.05, 0.0, 400.0, NAN}},
    {"more than all of it", {5.0, 1.05, 0.0, NAN, 101.0}},
    {"none of it", {5.0, 1.05, 0.0, NAN, 0.0}},
};

START_TEST (bad_orders_are_refused_with_advice)
{
  EnlWeighing *w = NULL;
  EnlError err = {0};

  ck_assert_int_eq (enl_weigh (knowledge->weigh, base_of ("nbuli"), &bad_case[_i].order, &w, &err),
                    ENL_ERROR_RANGE);
  ck_assert_ptr_null (w);
  ck_assert_msg (strstr (err.advice, "give") != NULL, "%s: no advice", bad_case[_i].label);
}
END_TEST

/* How each is sold: resources/bases.tsv. NaH and KH are dispersions, LDA and n-BuLi solutions. */
static const struct {
  const char *base;
  double titre, mass_percent;
  EnlStatus status;
  const char *word;
} label_case[] = {
    {"nah", 2.0, NAN, ENL_ERROR_UNKNOWN, "titre of 2 mol/L"},
    {"kh", 2.0, NAN, ENL_ERROR_UNKNOWN, "dispersion in mineral oil"},
    {"k2co3", 2.0, NAN, ENL_ERROR_UNKNOWN, "solid"},
    {"et3n", 2.0, NAN, ENL_ERROR_UNKNOWN, "liquid"},
    {"dimsyl_na", 2.0, NAN, ENL_OK, ""},
    {"soft_mgcl2_et3n", 2.0, NAN, ENL_ERROR_UNKNOWN, "triethylamine"},
    {"lda", NAN, 60.0, ENL_ERROR_UNKNOWN, "lithium diisopropylamide"},
    {"nbuli", NAN, 60.0, ENL_ERROR_UNKNOWN, "hexanes"},
    {"nah", NAN, 57.0, ENL_OK, ""},
    {"naome", NAN, 30.0, ENL_OK, ""},
    {"naoh", 2.0, NAN, ENL_OK, ""},
    {"lda", 1.8, NAN, ENL_OK, ""},
};

START_TEST (a_label_fits_what_is_sold)
{
  const EnlWeighOrder order = {5.0, 1.05, 0.0, label_case[_i].titre, label_case[_i].mass_percent};
  g_autoptr (EnlWeighing) w = NULL;
  EnlError err = {0};

  ck_assert_msg (enl_weigh (knowledge->weigh, base_of (label_case[_i].base), &order, &w, &err) ==
                     label_case[_i].status,
                 "%s: %s", label_case[_i].base, err.text);
  ck_assert_msg (strstr (err.text, label_case[_i].word) != NULL, "%s", err.text);
  ck_assert (label_case[_i].status == ENL_OK || err.advice[0]);
}
END_TEST

static const struct {
  double value;
  const char *digits, *mass, *volume;
} digits_case[] = {
    {2.1, "2.10", "2.10 mg", "2.10 mL"},       {0.020996, "0.0210", "0.0210 mg", "21.0 µL"},
    {399.97, "400", "400 mg", "400 mL"},       {999.6, "1000", "1.00 g", "1.00 L"},
    {999.4, "999", "999 mg", "999 mL"},        {1178.2, "1180", "1.18 g", "1.18 L"},
    {0.99961, "1.00", "1.00 mg", "1.00 mL"},   {45.674, "45.7", "45.7 mg", "45.7 mL"},
    {9345.0, "9340", "9.34 g", "9.34 L"},      {9355.0, "9360", "9.36 g", "9.36 L"},
    {1234567, "1230000", "1.23 kg", "1230 L"},
};

START_TEST (three_digits)
{
  g_autofree char *digits = enl_weigh_digits (digits_case[_i].value);
  g_autofree char *mass = enl_weigh_mass_text (digits_case[_i].value);
  g_autofree char *volume = enl_weigh_volume_text (digits_case[_i].value);
  g_auto (GStrv) m = g_strsplit (mass, "\u00A0", 2);
  g_auto (GStrv) v = g_strsplit (volume, "\u00A0", 2);
  g_autofree char *mass_plain = g_strjoinv (" ", m);
  g_autofree char *volume_plain = g_strjoinv (" ", v);

  ck_assert_str_eq (digits, digits_case[_i].digits);
  ck_assert_str_eq (mass_plain, digits_case[_i].mass);
  ck_assert_str_eq (volume_plain, digits_case[_i].volume);
}
END_TEST

/* ---- lists ---- */

static EnlStatus
make_list (const char *smiles, EnlSolvent solvent, const EnlWeighScale *scale,
           const char *const *id, uint32_t n, EnlWeighList **out, EnlError *err)
{
  uint32_t base[4];
  Ask a;

  ask (&a, smiles, 0, conditions_in (solvent, 25.0, 1.05));
  for (uint32_t i = 0; i < n; i++)
    base[i] = (uint32_t)enl_base_table_find (knowledge->bases, id[i]);
  EnlStatus status =
      enl_weigh_list_new (&a.question, knowledge->weigh, "sample", scale, base, n, out, err);
  ask_clear (&a);
  return status;
}

/* Acetophenone C8H8O is 120.15 g/mol (by hand): 0.6008 g are 5.00 mmol. */
START_TEST (grams_of_substrate)
{
  const char *const id[] = {"lda"};
  EnlWeighScale scale = enl_weigh_scale_none ();
  g_autoptr (EnlWeighList) list = NULL;

  scale.grams = 0.60075;
  ck_assert_int_eq (make_list ("CC(=O)c1ccccc1", ENL_SOLVENT_THF, &scale, id, 1, &list, NULL),
                    ENL_OK);
  ck_assert_double_eq_tol (list->mmol, 5.0, 0.001);
  ck_assert_double_eq_tol (list->line[0].weighing->equivalents, 1.05, 1e-9);
  ck_assert_double_eq_tol (list->line[0].weighing->part[0].ml, 2.625, 0.001);
  ck_assert (list->line[0].works);
  g_autofree char *text = enl_weigh_list_text (list);
  ck_assert_ptr_nonnull (strstr (text, "H13"));              /* amides: corrosive ... */
  ck_assert_ptr_nonnull (strstr (text, "qualified person")); /* the deferral */
  ck_assert_ptr_nonnull (strstr (text, "more, so that no free substrate"));
}
END_TEST

/* The phenol takes the first equivalent: two counted and 5 % more. */
START_TEST (recommended_equivalents_count_competing_acids)
{
  const char *const id[] = {"lda"};
  EnlWeighScale scale = enl_weigh_scale_none ();
  g_autoptr (EnlWeighList) list = NULL;

  scale.mmol = 2.0;
  ck_assert_int_eq (make_list ("CC(=O)Cc1ccc(O)cc1", ENL_SOLVENT_THF, &scale, id, 1, &list, NULL),
                    ENL_OK);
  ck_assert_double_eq_tol (list->line[0].weighing->equivalents, 2.1, 1e-9);
  ck_assert_ptr_nonnull (strstr (list->line[0].reason, "phenol"));
  ck_assert_msg (list->line[0].works, "%s", list->line[0].verdict);
}
END_TEST

START_TEST (a_base_that_fails_says_so)
{
  const char *const id[] = {"et3n", "nbuli"};
  EnlWeighScale scale = enl_weigh_scale_none ();
  g_autoptr (EnlWeighList) list = NULL;

  scale.mmol = 2.0;
  ck_assert_int_eq (make_list ("CC(=O)c1ccccc1", ENL_SOLVENT_DMSO, &scale, id, 2, &list, NULL),
                    ENL_OK);
  ck_assert (!list->line[0].works && !list->line[1].works);
  ck_assert_ptr_nonnull (strstr (list->line[0].verdict, "does not work"));
  ck_assert_ptr_nonnull (strstr (list->line[0].reason, "by count alone"));
}
END_TEST

/* Hazards of the parts stand there, too: LiTMP is made with butyllithium (H02). */
START_TEST (hazards_of_parts_are_listed_once)
{
  const char *const id[] = {"litmp", "nbuli"};
  EnlWeighScale scale = enl_weigh_scale_none ();
  g_autoptr (EnlWeighList) list = NULL;
  uint32_t butyl = 0;

  scale.mmol = 2.0;
  ck_assert_int_eq (make_list ("CC(=O)c1ccccc1", ENL_SOLVENT_THF, &scale, id, 1, &list, NULL),
                    ENL_OK);
  for (uint32_t i = 0; i < list->hazard->len; i++)
    butyl += g_str_has_prefix (g_ptr_array_index (list->hazard, i), "[H02]");
  ck_assert_uint_eq (butyl, 1);
}
END_TEST

START_TEST (labels_need_their_bottle)
{
  const char *const solids[] = {"kotbu", "nah"}, *const mixed[] = {"kotbu", "nbuli"};
  EnlWeighScale scale = enl_weigh_scale_none ();
  g_autoptr (EnlWeighList) list = NULL;
  EnlError err = {0};

  scale.mmol = 2.0;
  scale.titre = 1.6;
  scale.equivalents = 1.0;
  ck_assert_int_eq (make_list ("CC(=O)C", ENL_SOLVENT_THF, &scale, solids, 2, &list, &err),
                    ENL_ERROR_UNKNOWN);
  ck_assert_int_eq (make_list ("CC(=O)C", ENL_SOLVENT_THF, &scale, mixed, 2, &list, &err), ENL_OK);
  ck_assert (isnan (list->line[0].weighing->part[0].ml)); /* the solid keeps its mass */
  ck_assert_double_eq_tol (list->line[1].weighing->part[0].ml, 1.25, 1e-9);
  scale.mass_percent = 60.0;
  g_autoptr (EnlWeighList) none = NULL;
  ck_assert_int_eq (make_list ("CC(=O)C", ENL_SOLVENT_THF, &scale, solids, 1, &none, &err),
                    ENL_ERROR_RANGE);
}
END_TEST

START_TEST (an_own_base_needs_a_molar_mass_or_a_titre)
{
  g_autoptr (EnlOwnBase) own = enl_own_base_new ("ours");
  EnlWeighOrder order = {4.0, 1.25, 0.0, NAN, NAN};
  EnlWeighing *w = NULL;
  EnlError err = {0};

  own->pkah[ENL_SOLVENT_DMSO] = 24.25;
  own->sigma[ENL_SOLVENT_DMSO] = 0.5;
  g_autoptr (EnlBaseTable) table = enl_base_table_extend (knowledge->bases, &own, 1);
  const EnlBase *base = enl_base_table_get (table, enl_base_table_size (table) - 1);
  ck_assert_int_eq (enl_weigh (knowledge->weigh, base, &order, &w, &err), ENL_ERROR_UNKNOWN);
  ck_assert_ptr_nonnull (strstr (err.advice, "titre"));
  order.titre = 0.5;
  ck_assert_int_eq (enl_weigh (knowledge->weigh, base, &order, &w, &err), ENL_OK);
  ck_assert_double_eq_tol (w->part[0].ml, 10.0, 1e-9);
  enl_weighing_free (w);
  own->molar_mass = 312.0;
  order.titre = NAN;
  g_autoptr (EnlBaseTable) heavier = enl_base_table_extend (knowledge->bases, &own, 1);
  base = enl_base_table_get (heavier, enl_base_table_size (heavier) - 1);
  ck_assert_int_eq (enl_weigh (knowledge->weigh, base, &order, &w, &err), ENL_OK);
  ck_assert_double_eq_tol (w->part[0].mg, 1560.0, 1e-9);
  enl_weighing_free (w);
}
END_TEST

START_TEST (a_damaged_table_is_refused)
{
  static const char head[] = "base\tpart\tlike\tmolar_mass\tform\tmolarity\tmass_percent\tdensity\t"
                             "moles\tequivalents\twater\tnote\tsource\n";
  g_autofree char *text = g_strconcat (head, "lda\t\tno_such_base\n", NULL);
  EnlWeighTable *table = NULL;
  EnlError err = {0};

  ck_assert_int_eq (enl_weigh_table_new (text, strlen (text), knowledge->bases, &table, &err),
                    ENL_ERROR_FORMAT);
  ck_assert_uint_eq (err.line, 2);
  ck_assert_ptr_nonnull (strstr (err.text, "no_such_base"));
}
END_TEST

static Suite *
weigh_suite (void)
{
  Suite *suite = suite_create ("bases weigh");
  TCase *tc = tcase_create ("all");

  tcase_add_unchecked_fixture (tc, open_knowledge, close_knowledge);
  tcase_add_loop_test (tc, amounts, 0, (int)ENL_COUNT (amount_case));
  tcase_add_test (tc, sets_name_every_part);
  tcase_add_test (tc, every_base_of_the_table_is_told);
  tcase_add_loop_test (tc, bad_orders_are_refused_with_advice, 0, (int)ENL_COUNT (bad_case));
  tcase_add_loop_test (tc, a_label_fits_what_is_sold, 0, (int)ENL_COUNT (label_case));
  tcase_add_loop_test (tc, three_digits, 0, (int)ENL_COUNT (digits_case));
  tcase_add_test (tc, grams_of_substrate);
  tcase_add_test (tc, recommended_equivalents_count_competing_acids);
  tcase_add_test (tc, a_base_that_fails_says_so);
  tcase_add_test (tc, hazards_of_parts_are_listed_once);
  tcase_add_test (tc, labels_need_their_bottle);
  tcase_add_test (tc, an_own_base_needs_a_molar_mass_or_a_titre);
  tcase_add_test (tc, a_damaged_table_is_refused);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (weigh_suite)
