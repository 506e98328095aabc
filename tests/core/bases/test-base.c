/* What a person calls a base: ids, names, abbreviations, spellings, and what comes near. */
#include "core/bases/base.h"

#include <string.h>

#include "tests/core/bases/ask.h"

/* Abbreviations as common practice writes them. */
static const struct {
  const char *text, *id;
} name_case[] = {
    {"nbuli", "nbuli"},
    {"n-BuLi", "nbuli"},
    {"nBuLi", "nbuli"},
    {"N-Butyllithium", "nbuli"},
    {"s-BuLi", "sbuli"},
    {"sec-BuLi", "sbuli"},
    {"t-BuLi", "tbuli"},
    {"tert-BuLi", "tbuli"},
    {"LDA", "lda"},
    {"lithium diisopropylamide", "lda"},
    {"LiHMDS", "lihmds"},
    {"LHMDS", "lihmds"},
    {"LiN(SiMe3)2", "lihmds"},
    {"KOtBu", "kotbu"},
    {"KO-t-Bu", "kotbu"},
    {"tBuOK", "kotbu"},
    {"t-BuOK", "kotbu"},
    {"potassium t-butoxide", "kotbu"},
    {"NaH", "nah"},
    {"DBU", "dbu"},
    {"Et3N", "et3n"},
    {"NEt3", "et3n"},
    {"Hünig's base", "dipea"},
    {"HÜNIG BASE", "dipea"},
    {"Huenig base", "dipea"},
    {"i-Pr2NEt", "dipea"},
    {"TMG", "tmg"},
    {"NaOMe", "naome"},
    {"Ba(OH)2", "baoh2"},
    {"P4-t-Bu", "p4_tbu"},
    {"n-BuLi/TMEDA", "nbuli_tmeda"},
};

START_TEST (a_base_goes_by_its_usual_names)
{
  const EnlBaseTable *bases = knowledge->bases;
  uint32_t found = 0;
  EnlError err;

  ck_assert_msg (enl_base_table_look_up (bases, name_case[_i].text, &found, &err) == ENL_OK,
                 "%s: %s", name_case[_i].text, err.text);
  ck_assert_str_eq (enl_base_table_get (bases, found)->id, name_case[_i].id);
}
END_TEST

START_TEST (ids_and_names_of_all_bases_are_their_own)
{
  const EnlBaseTable *bases = knowledge->bases;

  for (uint32_t i = 0; i < enl_base_table_size (bases); i++) {
    const EnlBase *base = enl_base_table_get (bases, i);
    g_auto (GStrv) other = g_strsplit (base->spellings, ";", -1);
    uint32_t found = G_MAXUINT;
    EnlError err;

    ck_assert (enl_base_table_look_up (bases, base->id, &found, &err) == ENL_OK && found == i);
    ck_assert (enl_base_table_look_up (bases, base->name, &found, &err) == ENL_OK && found == i);
    for (char **p = other; *p && **p; p++)
      ck_assert_msg (enl_base_table_look_up (bases, *p, &found, &err) == ENL_OK && found == i,
                     "%s of %s", *p, base->id);
  }
}
END_TEST

static const struct {
  const char *text, *near;
} unknown_case[] = {
    {"BuLi", "nbuli, sbuli, tbuli"},
    {"LDAA", "lda"},
    {"nahh", "nah"},
    {"DBUU", "dbu"},
    {"", ""},
    {"---", ""},
    {"\xff\xfe", ""},
};

START_TEST (an_unknown_name_lists_the_nearest)
{
  uint32_t found;
  EnlError err;

  ck_assert_int_eq (enl_base_table_look_up (knowledge->bases, unknown_case[_i].text, &found, &err),
                    ENL_ERROR_UNKNOWN);
  ck_assert_msg (strstr (err.advice, "nearest: ") && strstr (err.advice, unknown_case[_i].near),
                 "%s: %s", unknown_case[_i].text, err.advice);
}
END_TEST

START_TEST (a_name_of_two_bases_is_not_guessed)
{
  static const char text[] =
      "id\tname\tclass\tpKaH_DMSO\tpKaH_water\tpKaH_THF\tattacks\tirreversible\tsource\t"
      "thf_footing\tnumber_holds\tsoft\tadds_to_carbonyl\tbeta_hydride\tmolar_mass\tform\n"
      "oak\tfirst (XYZ)\tamine\noak_two\tsecond (X-YZ)\tamine\n";
  g_autoptr (EnlBaseTable) table = NULL;
  uint32_t found;
  EnlError err;

  ck_assert_int_eq (enl_base_table_new (text, strlen (text), &table, &err), ENL_OK);
  ck_assert_int_eq (enl_base_table_look_up (table, "xyz", &found, &err), ENL_ERROR_UNKNOWN);
  ck_assert_ptr_nonnull (strstr (err.text, "more than one"));
  ck_assert_ptr_nonnull (strstr (err.advice, "oak, oak_two"));
  ck_assert_int_eq (enl_base_table_look_up (table, "Second", &found, &err), ENL_OK);
  ck_assert_uint_eq (found, 1);
}
END_TEST

static Suite *
base_suite (void)
{
  Suite *suite = suite_create ("bases base");
  TCase *tc = tcase_create ("all");

  tcase_add_unchecked_fixture (tc, open_knowledge, close_knowledge);
  tcase_add_loop_test (tc, a_base_goes_by_its_usual_names, 0, (int)ENL_COUNT (name_case));
  tcase_add_test (tc, ids_and_names_of_all_bases_are_their_own);
  tcase_add_loop_test (tc, an_unknown_name_lists_the_nearest, 0, (int)ENL_COUNT (unknown_case));
  tcase_add_test (tc, a_name_of_two_bases_is_not_guessed);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (base_suite)
