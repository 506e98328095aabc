#include "core/base/error.h"

#include <string.h>

#include "tests/runner.h"

START_TEST (every_status_has_its_own_words)
{
  for (int i = 0; i < ENL_N_STATUS; i++) {
    const char *text = enl_status_text ((EnlStatus)i);
    ck_assert_ptr_nonnull (text);
    ck_assert_uint_gt (strlen (text), 0);
    for (int j = 0; j < i; j++)
      ck_assert_str_ne (text, enl_status_text ((EnlStatus)j));
  }
}
END_TEST

static const struct {
  const char *label, *text;
  size_t offset, line, column;
} place_case[] = {
    {"first byte", "CC(=O)C", 0, 1, 1},
    {"third line", "ab\ncd\nefg", 7, 3, 2},
    {"behind two-byte letters", "\xCE\xB1\xCE\xB2x", 4, 1, 3},
    {"past the end", "CC", 9, 1, 3},
};

START_TEST (position_counts_characters)
{
  EnlError err = {0};

  enl_error_locate (&err, place_case[_i].text, strlen (place_case[_i].text), place_case[_i].offset,
                    0);
  ck_assert_msg (err.line == place_case[_i].line && err.column == place_case[_i].column,
                 "%s: line %zu column %zu", place_case[_i].label, err.line, err.column);
  ck_assert_uint_eq (err.length, 1);
}
END_TEST

START_TEST (message_has_place_fault_and_advice)
{
  EnlError err;
  const char text[] = "C1CC";

  ck_assert_int_eq (enl_error_set (&err, ENL_ERROR_SYNTAX, "write '1' once more behind an atom",
                                   "ring closure '%d' is never closed", 1),
                    ENL_ERROR_SYNTAX);
  enl_error_locate (&err, text, strlen (text), 1, 1);
  g_autofree char *message = enl_error_message (&err);
  ck_assert_str_eq (message, "line 1, column 2: ring closure '1' is never closed; "
                             "write '1' once more behind an atom");
}
END_TEST

static Suite *
error_suite (void)
{
  Suite *suite = suite_create ("base error");
  TCase *tc = tcase_create ("all");

  tcase_add_test (tc, every_status_has_its_own_words);
  tcase_add_loop_test (tc, position_counts_characters, 0, (int)ENL_COUNT (place_case));
  tcase_add_test (tc, message_has_place_fault_and_advice);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (error_suite)
