#include "core/workset/workset.h"

#include <glib/gstdio.h>
#include <string.h>

#include "tests/runner.h"

static void
add_lab (EnlWorkset *set, const char *structure, double pka, const char *note)
{
  g_autoptr (EnlLabEntry) entry = enl_lab_entry_new ();

  g_free (entry->structure);
  entry->structure = g_strdup (structure);
  g_free (entry->note);
  entry->note = g_strdup (note);
  entry->pka = pka;
  ck_assert_int_eq (enl_workset_add_lab (set, entry, NULL), ENL_OK);
}

static EnlWorkset *
sample (void)
{
  EnlWorkset *set = enl_workset_new ();
  EnlConditions c = {ENL_SOLVENT_THF, 2.1, 0.25, -78.0, 0.05};

  ck_assert_int_eq (enl_workset_insert (set, 0, "block A", "CC(=O)CC(=O)OCC", NULL), ENL_OK);
  ck_assert_int_eq (enl_workset_insert (set, 1, "", "acetophenone", NULL), ENL_OK);
  ck_assert_int_eq (enl_workset_insert (set, 1, "β-keto \"ester\"\n", "O=C1CCCC1C(=O)OC", NULL),
                    ENL_OK);
  enl_workset_set_note (set, 2, "from the shelf");
  enl_workset_set_conditions (set, &c);
  enl_workset_select (set, 2, 3, "lda");
  add_lab (set, "CC(=O)[CH2:1]C(=O)OCC", 14.25, "second \"run\"");
  add_lab (set, "acetophenone", 24.4, "");
  return set;
}

START_TEST (written_set_reads_back_the_same)
{
  g_autoptr (EnlWorkset) set = sample ();
  g_autoptr (EnlWorkset) again = NULL;
  EnlError err = {0};
  g_autofree char *text = enl_workset_write (set);

  ck_assert_msg (enl_workset_parse (text, strlen (text), &again, &err) == ENL_OK, "%s", err.text);
  g_autofree char *second = enl_workset_write (again);
  ck_assert_str_eq (text, second);
  ck_assert_uint_eq (enl_workset_size (again), 3);
  ck_assert_str_eq (enl_workset_get (again, 1)->name, "β-keto \"ester\"\n");
  ck_assert_str_eq (enl_workset_get (again, 2)->note, "from the shelf");
  ck_assert_int_eq (enl_workset_conditions (again)->solvent, ENL_SOLVENT_THF);
  ck_assert_double_eq_tol (enl_workset_conditions (again)->temperature, -78.0, 1e-12);
  ck_assert_uint_eq (enl_workset_selection (again)->atom, 3);
  ck_assert_str_eq (enl_workset_selection (again)->base, "lda");
  ck_assert (enl_workset_same_lab (set, again));
  ck_assert_uint_eq (enl_workset_lab_size (again), 2);
  ck_assert_str_eq (enl_workset_lab (again, 0)->note, "second \"run\"");
  ck_assert_double_eq (enl_workset_lab (again, 0)->pka, 14.25);
  ck_assert_double_eq (enl_workset_lab (again, 1)->sigma, ENL_LAB_USUAL_SIGMA);
}
END_TEST

START_TEST (own_values_can_be_changed)
{
  g_autoptr (EnlWorkset) set = sample ();
  g_autoptr (EnlWorkset) copy = enl_workset_copy (set);
  g_autoptr (EnlLabEntry) entry = enl_lab_entry_copy (enl_workset_lab (set, 1));

  ck_assert (enl_workset_same_lab (set, copy));
  entry->pka = 24.6;
  enl_workset_set_lab (set, 1, entry);
  ck_assert (!enl_workset_same_lab (set, copy));
  ck_assert_double_eq (enl_workset_lab (set, 1)->pka, 24.6);
  ck_assert_double_eq (enl_workset_lab (copy, 1)->pka, 24.4);
  enl_workset_remove_lab (set, 0);
  ck_assert_uint_eq (enl_workset_lab_size (set), 1);
  ck_assert_str_eq (enl_workset_lab (set, 0)->structure, "acetophenone");
  enl_workset_remove_lab (set, 0);
  g_autofree char *text = enl_workset_write (set);
  ck_assert_ptr_null (strstr (text, "\"lab\""));
  for (int i = 0; i < ENL_MAX_LAB; i++)
    ck_assert_int_eq (enl_workset_add_lab (set, entry, NULL), ENL_OK);
  ck_assert_int_eq (enl_workset_add_lab (set, entry, NULL), ENL_ERROR_LIMIT);
}
END_TEST

/* A value that cannot be used stays in the set, says why, and does not take the others with it. */
START_TEST (own_values_are_checked_one_by_one)
{
  g_autoptr (EnlWorkset) set = enl_workset_new ();
  EnlError fault[4];

  add_lab (set, "CC#N", 31.2, "");
  add_lab (set, "C1CC", 31.2, "");
  add_lab (set, "CC#N", 99, "");
  add_lab (set, "CC(=O)[CH2:1]C(C)=O", 13.2, "");
  g_autoptr (EnlLab) lab = enl_workset_lab_check (set, NULL, fault);
  ck_assert_uint_eq (enl_lab_size (lab), 2);
  ck_assert_uint_eq (enl_lab_row (lab, 1)->tag, 3);
  ck_assert (fault[0].code == ENL_OK && fault[3].code == ENL_OK);
  ck_assert (fault[1].code != ENL_OK && fault[1].column == 2 && fault[1].advice[0]);
  ck_assert_int_eq (fault[2].code, ENL_ERROR_RANGE);
  g_autofree char *text = enl_workset_write (set);
  ck_assert_ptr_nonnull (strstr (text, "C1CC"));
}
END_TEST

START_TEST (unknown_members_are_kept)
{
  const char text[] = "{\"format\":\"enolith-set\",\"version\":1,\"colour of the flask\":[1,2],"
                      "\"substrates\":[{\"structure\":\"CC=O\",\"batch\":\"K-17\"}],"
                      "\"lab\":[{\"structure\":\"CC#N\",\"pka\":31,\"cell\":\"quartz\"}]}";
  g_autoptr (EnlWorkset) set = NULL;

  ck_assert_int_eq (enl_workset_parse (text, strlen (text), &set, NULL), ENL_OK);
  ck_assert_int_eq (enl_workset_insert (set, 0, "", "CC#N", NULL), ENL_OK);
  enl_workset_move (set, 1, 0);
  g_autoptr (EnlWorkset) copy = enl_workset_copy (set);
  g_autofree char *out = enl_workset_write (copy);
  const char *batch = strstr (out, "K-17"), *other = strstr (out, "CC#N");
  ck_assert_ptr_nonnull (strstr (out, "colour of the flask"));
  ck_assert_ptr_nonnull (strstr (out, "\"cell\": \"quartz\""));
  ck_assert (batch && other && batch < other);
}
END_TEST

START_TEST (selection_follows_its_substrate)
{
  g_autoptr (EnlWorkset) set = sample ();

  enl_workset_move (set, 2, 0);
  ck_assert_uint_eq (enl_workset_selection (set)->substrate, 0);
  ck_assert_str_eq (enl_workset_get (set, 0)->text, "acetophenone");
  enl_workset_move (set, 2, 0);
  ck_assert_uint_eq (enl_workset_selection (set)->substrate, 1);
  enl_workset_remove (set, 0);
  ck_assert_uint_eq (enl_workset_selection (set)->substrate, 0);
  ck_assert_uint_eq (enl_workset_selection (set)->atom, 3);
  enl_workset_remove (set, 0);
  ck_assert_uint_eq (enl_workset_selection (set)->substrate, 0);
  ck_assert_uint_eq (enl_workset_selection (set)->atom, ENL_NONE);
  enl_workset_remove (set, 0);
  ck_assert_uint_eq (enl_workset_selection (set)->substrate, ENL_NONE);
}
END_TEST

static const struct {
  const char *label, *text, *message;
} bad_case[] = {
    {"nothing", "", "the file is empty; open a file that Enolith has saved"},
    {"a list", "[]",
     "line 1, column 1: 'format' does not say enolith-set; "
     "open a file that Enolith has saved"},
    {"another format", "{\n \"format\": \"recipe\"}",
     "line 2, column 2: 'format' does not say enolith-set; open a file that Enolith has saved"},
    {"from the future", "{\"format\":\"enolith-set\",\"version\":9,\"substrates\":[]}",
     "line 1, column 25: 'version' is newer than this program; open it with a newer Enolith"},
    {"no substrates", "{\"format\":\"enolith-set\",\"version\":1}",
     "line 1, column 1: 'substrates' is not a list; write a list in square brackets"},
    {"a number among substrates", "{\"format\":\"enolith-set\",\"substrates\":[7]}",
     "line 1, column 25: 'substrates' holds something else; write every substrate in braces"},
    {"solvent",
     "{\"format\":\"enolith-set\",\"substrates\":[],\"conditions\":{\"solvent\":\"tar\"}}",
     "line 1, column 55: 'solvent' names an unknown solvent; write dmso, water or thf"},
    {"words for a number",
     "{\"format\":\"enolith-set\",\"substrates\":[],\"conditions\":{\"equivalents\":\"one\"}}",
     "line 1, column 55: 'equivalents' is not a number; write a number without quotes"},
    {"lab values in a row", "{\"format\":\"enolith-set\",\"substrates\":[],\"lab\":\"31\"}",
     "line 1, column 41: 'lab' is not a list; write a list in square brackets"},
    {"a bare lab value", "{\"format\":\"enolith-set\",\"substrates\":[],\"lab\":[31]}",
     "line 1, column 41: 'lab' holds something else; write every value in braces"},
    {"a quoted pKa", "{\"format\":\"enolith-set\",\"substrates\":[],\"lab\":[{\"pka\":\"31\"}]}",
     "line 1, column 49: 'pka' is not a number; write a number without quotes"},
    {"an atom before the first",
     "{\"format\":\"enolith-set\",\"substrates\":[],\"lab\":[{\"pka\":3,\"atom\":0}]}",
     "line 1, column 41: 'lab' holds an atom that is no position; write the position of the acidic "
     "atom, from 1"},
};

START_TEST (bad_sets_are_explained)
{
  g_autoptr (EnlWorkset) set = NULL;
  EnlError err = {0};
  const char *text = bad_case[_i].text;

  ck_assert_int_ne (enl_workset_parse (text, strlen (text), &set, &err), ENL_OK);
  g_autofree char *message = enl_error_message (&err);
  ck_assert_msg (strcmp (message, bad_case[_i].message) == 0, "%s: %s", bad_case[_i].label,
                 message);
  ck_assert_ptr_null (set);
}
END_TEST

/* Every beginning of a good file, and deep nesting: an error each, no crash. */
START_TEST (cut_and_nested_files_are_refused)
{
  g_autoptr (EnlWorkset) set = sample ();
  g_autofree char *text = enl_workset_write (set);
  g_autofree char *deep = g_strnfill (200000, '[');

  for (size_t size = 1; size + 2 < strlen (text); size++) {
    EnlWorkset *out = NULL;
    EnlError err = {0};
    ck_assert_int_eq (enl_workset_parse (text, size, &out, &err), ENL_ERROR_FORMAT);
    ck_assert_uint_gt (err.line, 0);
  }
  EnlWorkset *out = NULL;
  ck_assert_int_eq (enl_workset_parse (deep, 200000, &out, NULL), ENL_ERROR_FORMAT);
}
END_TEST

START_TEST (saving_is_whole_or_not_at_all)
{
  g_autoptr (EnlWorkset) set = sample ();
  g_autoptr (EnlWorkset) again = NULL;
  g_autofree char *folder = g_dir_make_tmp ("enolith-XXXXXX", NULL);
  g_autofree char *path = g_build_filename (folder, "a.enolith", NULL);
  EnlError err;

  ck_assert_int_eq (enl_workset_save (set, path, &err), ENL_OK);
  ck_assert_int_eq (enl_workset_load (path, &again, &err), ENL_OK);
  g_clear_pointer (&again, enl_workset_free);
  ck_assert_int_eq (enl_workset_save (set, "/no/such/folder/a.enolith", &err), ENL_ERROR_IO);
  ck_assert (err.text[0] && err.advice[0]);
  ck_assert_int_eq (enl_workset_load ("/no/such/folder/a.enolith", &again, &err), ENL_ERROR_IO);
  g_unlink (path);
  g_rmdir (folder);
}
END_TEST

START_TEST (a_set_has_a_limit)
{
  g_autoptr (EnlWorkset) set = enl_workset_new ();
  EnlError err;

  for (uint32_t i = 0; i < ENL_MAX_SUBSTRATES; i++)
    ck_assert_int_eq (enl_workset_insert (set, i, "", "CC=O", NULL), ENL_OK);
  ck_assert_int_eq (enl_workset_insert (set, 0, "", "CC=O", &err), ENL_ERROR_LIMIT);
  ck_assert_uint_eq (enl_workset_size (set), ENL_MAX_SUBSTRATES);
}
END_TEST

static Suite *
workset_suite (void)
{
  Suite *suite = suite_create ("workset");
  TCase *tc = tcase_create ("all");

  tcase_add_test (tc, written_set_reads_back_the_same);
  tcase_add_test (tc, unknown_members_are_kept);
  tcase_add_test (tc, own_values_can_be_changed);
  tcase_add_test (tc, own_values_are_checked_one_by_one);
  tcase_add_test (tc, selection_follows_its_substrate);
  tcase_add_loop_test (tc, bad_sets_are_explained, 0, (int)ENL_COUNT (bad_case));
  tcase_add_test (tc, cut_and_nested_files_are_refused);
  tcase_add_test (tc, saving_is_whole_or_not_at_all);
  tcase_add_test (tc, a_set_has_a_limit);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (workset_suite)
