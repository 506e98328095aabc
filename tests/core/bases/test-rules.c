/* The rule table: its language, its errors, and a case for and against every row. */
#include "core/bases/rule.h"

#include <math.h>

#include "core/base/table.h"
#include "core/bases/trigger.h"
#include "tests/core/bases/ask.h"

/* ---- cases ---- */

typedef struct {
  EnlTable *table;
  size_t row;
} Case;

static const char *
cell (const Case *c, const char *column)
{
  return enl_table_cell (c->table, c->row, enl_table_column (c->table, column));
}

static double
number_or (const Case *c, const char *column, double otherwise)
{
  double x = enl_table_number (c->table, c->row, enl_table_column (c->table, column));

  return isnan (x) ? otherwise : x;
}

static EnlTable *
open_cases (void)
{
  g_autofree char *path =
      g_build_filename (g_getenv ("ENL_SOURCE_DIR"), "tests/core/bases/rule-cases.tsv", NULL);
  g_autofree char *text = NULL;
  EnlTable *table = NULL;
  size_t size;

  ck_assert (g_file_get_contents (path, &text, &size, NULL));
  ck_assert_int_eq (enl_table_parse (text, size, &table, NULL), ENL_OK);
  return table;
}

static const EnlRule *
rule_named (const char *id)
{
  for (uint32_t i = 0; i < enl_rule_table_size (knowledge->rules); i++)
    if (strcmp (enl_rule_table_get (knowledge->rules, i)->id, id) == 0)
      return enl_rule_table_get (knowledge->rules, i);
  ck_abort_msg ("case for an unknown rule %s", id);
  return NULL;
}

static void
check_case (const Case *c)
{
  bool wanted = strcmp (cell (c, "applies"), "yes") == 0;
  EnlSolvent solvent;
  Ask a;

  ck_assert (enl_solvent_parse (cell (c, "solvent"), &solvent));
  ask (&a, cell (c, "structure"), (uint32_t)number_or (c, "atom", 0.0),
       conditions_in (solvent, number_or (c, "temperature", 25.0),
                      number_or (c, "equivalents", 1.05)));
  const EnlCandidate *candidate = candidate_of (&a, cell (c, "base"));
  const EnlCaution *found = caution_of (candidate, cell (c, "rule"));
  ck_assert_msg ((found != NULL) == wanted, "%s: %s with %s in %s: expected %s; %s, gap %g",
                 cell (c, "rule"), cell (c, "structure"), cell (c, "base"), cell (c, "solvent"),
                 cell (c, "applies"), candidate->reason, candidate->gap);
  if (found && rule_named (cell (c, "rule"))->effect == ENL_EFFECT_REACTS &&
      candidate->verdict != ENL_VERDICT_SOLVENT)
    ck_assert_int_eq (candidate->verdict, ENL_VERDICT_REACTS);
  if (found)
    ck_assert_ptr_null (strchr (found->text, '{'));
  ask_clear (&a);
}

START_TEST (every_rule_applies_where_it_should_and_not_elsewhere)
{
  Case c = {open_cases (), 0};
  g_autoptr (GHashTable) seen = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, NULL);

  for (; c.row < enl_table_rows (c.table); c.row++) {
    check_case (&c);
    g_hash_table_add (seen, g_strconcat (cell (&c, "rule"), " ", cell (&c, "applies"), NULL));
  }
  for (uint32_t i = 0; i < enl_rule_table_size (knowledge->rules); i++) {
    const char *id = enl_rule_table_get (knowledge->rules, i)->id;
    g_autofree char *yes = g_strconcat (id, " yes", NULL), *no = g_strconcat (id, " no", NULL);
    ck_assert_msg (g_hash_table_contains (seen, yes), "no case where %s applies", id);
    ck_assert_msg (g_hash_table_contains (seen, no), "no case where %s does not apply", id);
  }
  enl_table_free (c.table);
}
END_TEST

/* Every row of the practice rules has a rule here, or no situation in which it could be shown:
 * H20 (perchlorates) and H22 (diazomethane). */
START_TEST (the_practice_rules_are_covered)
{
  static const char *const id[] = {"R01", "R02", "R03", "R04", "R05", "R06", "R07", "R08", "R10",
                                   "R11", "R12", "R13", "R14", "R15", "R16", "R17", "R18", "R19",
                                   "R20", "R30", "R31", "R32", "R33", "R40", "R41", "R42", "R43",
                                   "R50", "R51", "R52", "H01", "H02", "H03", "H04", "H05", "H06",
                                   "H07", "H08", "H09", "H10", "H11", "H12", "H13", "H14", "H15",
                                   "H16", "H17", "H18", "H19", "H21", "H23", "H24", "H25", "H26"};

  for (size_t k = 0; k < ENL_COUNT (id); k++) {
    bool found = false;
    for (uint32_t i = 0; i < enl_rule_table_size (knowledge->rules); i++)
      found |= g_str_has_prefix (enl_rule_table_get (knowledge->rules, i)->id, id[k]);
    ck_assert_msg (found, "%s has no row", id[k]);
  }
}
END_TEST

START_TEST (every_base_carries_a_hazard)
{
  Ask a;

  ask (&a, "CC(=O)C", 0, conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.05));
  for (uint32_t i = 0; i < a.comparison->n_candidates; i++) {
    const EnlCandidate *c = &a.comparison->candidate[i];
    bool warned = false, mild = false;
    static const char *const harmless[] = {"naoac", "dmap", "dabco", "proton_sponge"};
    const char *id = enl_base_table_get (a.question.bases, c->base)->id;
    for (uint32_t k = 0; k < c->n_cautions; k++)
      warned |= c->caution[k].rule->effect == ENL_EFFECT_HAZARD;
    for (size_t k = 0; k < ENL_COUNT (harmless); k++)
      mild |= strcmp (harmless[k], id) == 0;
    ck_assert_msg (warned || mild || g_str_has_prefix (id, "soft_"), "%s has no hazard", id);
  }
  ck_assert_ptr_nonnull (strstr (enl_rule_table_deferral (knowledge->rules), "qualified person"));
  ask_clear (&a);
}
END_TEST

/* ---- the language ---- */

/* Values of made-up facts are set by name in a copy of an empty set. */
static EnlFactValue *
values_with (double gap, const char *family, bool ester)
{
  EnlFactValue *value = g_new0 (EnlFactValue, enl_fact_count ());

  for (size_t i = 0; i < enl_fact_count (); i++) {
    value[i].word = "";
    value[i].number = NAN;
  }
  value[enl_fact_find ("gap", 3)].number = gap;
  value[enl_fact_find ("base.family", 11)].word = family;
  value[enl_fact_find ("molecule.ester", 14)].flag = ester;
  return value;
}

static const struct {
  const char *trigger;
  double gap;
  const char *family;
  bool ester, holds;
} language_case[] = {
    {"molecule.ester", 1.0, "amide", true, true},
    {"molecule.ester", 1.0, "amide", false, false},
    {"not molecule.ester", 1.0, "amide", false, true},
    {"base.family is alkoxide, amide", 1.0, "amide", false, true},
    {"base.family is alkoxide, hydride", 1.0, "amide", false, false},
    {"base.family is Grignard/Hauser", 1.0, "Grignard/Hauser", false, true},
    {"gap < 4", 3.99, "", false, true},
    {"gap < 4", 4.0, "", false, false},
    {"gap <= 4", 4.0, "", false, true},
    {"gap > -8.5", -8.5, "", false, false},
    {"gap >= -8.5", -8.5, "", false, true},
    {"gap in -2.6 .. 2.6", 2.6, "", false, true},
    {"gap in -2.6..2.6", -2.7, "", false, false},
    {"gap < 4", NAN, "", false, false},
    {"not gap < 4", NAN, "", false, true},
    {"molecule.ester or gap > 0 and base.family is amide", -1.0, "", true, true},
    {"(molecule.ester or gap > 0) and base.family is amide", -1.0, "", true, false},
    {"not (molecule.ester and gap > 0)", 1.0, "", true, false},
    {"not not molecule.ester", 0.0, "", true, true},
};

START_TEST (triggers_mean_what_they_say)
{
  g_autoptr (EnlTrigger) trigger = NULL;
  const char *text = language_case[_i].trigger;
  g_autofree EnlFactValue *value =
      values_with (language_case[_i].gap, language_case[_i].family, language_case[_i].ester);

  ck_assert_int_eq (enl_trigger_parse (text, strlen (text), &trigger, NULL), ENL_OK);
  ck_assert_msg (enl_trigger_holds (trigger, value) == language_case[_i].holds, "%s", text);
}
END_TEST

static const struct {
  const char *trigger;
  size_t column;
} fault_case[] = {
    {"", 1},
    {"molecule.ester and", 19},
    {"molecule.esther", 1},
    {"molecule.ester molecule.lactone", 16},
    {"(molecule.ester", 16},
    {"gap", 4},
    {"gap < fast", 7},
    {"gap in 1 2", 10},
    {"base.family alkoxide", 13},
    {"base.family is alkoxide,", 25},
    {"not", 4},
    {"molecule.ester)", 15},
};

START_TEST (a_wrong_trigger_is_pointed_at)
{
  EnlTrigger *trigger = NULL;
  EnlError err = {0};
  const char *text = fault_case[_i].trigger;

  ck_assert_int_eq (enl_trigger_parse (text, strlen (text), &trigger, &err), ENL_ERROR_SYNTAX);
  ck_assert_ptr_null (trigger);
  ck_assert_msg (err.line == 1 && err.column == fault_case[_i].column, "%s: column %zu (%s)", text,
                 err.column, err.text);
  ck_assert (err.text[0] && err.advice[0]);
}
END_TEST

START_TEST (deep_nesting_is_refused)
{
  GString *text = g_string_new (NULL);
  EnlTrigger *trigger = NULL;

  for (int i = 0; i < 100000; i++)
    g_string_append (text, "not ");
  g_string_append (text, "molecule.ester");
  ck_assert_int_eq (enl_trigger_parse (text->str, text->len, &trigger, NULL), ENL_ERROR_SYNTAX);
  g_string_free (text, TRUE);
}
END_TEST

/* ---- the table ---- */

#define HEAD  "id\teffect\tseverity\twhen\tsentence\tsource\n"
#define DEFER "DEFER\t\t\t\task a qualified person\tcommon practice\n"

static const struct {
  const char *label, *text;
  size_t line, column;
} table_case[] = {
    {"unknown effect", HEAD DEFER "X1\tforbid\t1\tgap > 1\ttext\tsource\n", 3, 4},
    {"severity out of range", HEAD DEFER "X1\twarn\t7\tgap > 1\ttext\tsource\n", 3, 9},
    {"id used twice", HEAD DEFER "X1\twarn\t1\tgap > 1\ta\tb\nX1\twarn\t1\tgap > 1\ta\tb\n", 4, 1},
    {"fault inside the trigger", HEAD "# remark\n" DEFER "X1\twarn\t1\tgap > 1 and x\ta\tb\n", 4,
     23},
    {"unknown fact in the sentence", HEAD DEFER "X1\twarn\t1\tgap > 1\tthe {site.colour}\tb\n", 3,
     19},
    {"source missing", HEAD DEFER "X1\twarn\t1\tgap > 1\ttext\t\n", 3, 24},
    {"deferral missing", HEAD "X1\twarn\t1\tgap > 1\ttext\tsource\n", 0, 0},
};

START_TEST (a_wrong_row_is_pointed_at)
{
  EnlRuleTable *table = NULL;
  EnlError err = {0};
  const char *text = table_case[_i].text;

  ck_assert_int_eq (enl_rule_table_new (text, strlen (text), &table, &err), ENL_ERROR_FORMAT);
  ck_assert_ptr_null (table);
  ck_assert_msg (err.line == table_case[_i].line && err.column == table_case[_i].column,
                 "%s: line %zu, column %zu: %s", table_case[_i].label, err.line, err.column,
                 err.text);
}
END_TEST

START_TEST (facts_have_names_and_meanings_of_their_own)
{
  for (size_t i = 0; i < enl_fact_count (); i++) {
    ck_assert_int_eq (enl_fact_find (enl_fact_name (i), strlen (enl_fact_name (i))), (int)i);
    ck_assert (enl_fact_meaning (i)[0]);
  }
  for (int i = 0; i < ENL_N_EFFECTS; i++)
    for (int j = 0; j < i; j++)
      ck_assert_str_ne (enl_effect_text ((EnlEffect)i), enl_effect_text ((EnlEffect)j));
}
END_TEST

static Suite *
rules_suite (void)
{
  Suite *suite = suite_create ("rules of practice");
  TCase *tc = tcase_create ("cases"), *language = tcase_create ("language");

  tcase_add_checked_fixture (tc, open_knowledge, close_knowledge);
  tcase_add_test (tc, every_rule_applies_where_it_should_and_not_elsewhere);
  tcase_add_test (tc, the_practice_rules_are_covered);
  tcase_add_test (tc, every_base_carries_a_hazard);
  suite_add_tcase (suite, tc);
  tcase_add_loop_test (language, triggers_mean_what_they_say, 0, (int)ENL_COUNT (language_case));
  tcase_add_loop_test (language, a_wrong_trigger_is_pointed_at, 0, (int)ENL_COUNT (fault_case));
  tcase_add_test (language, deep_nesting_is_refused);
  tcase_add_loop_test (language, a_wrong_row_is_pointed_at, 0, (int)ENL_COUNT (table_case));
  tcase_add_test (language, facts_have_names_and_meanings_of_their_own);
  suite_add_tcase (suite, language);
  return suite;
}

ENL_TEST_MAIN (rules_suite)
