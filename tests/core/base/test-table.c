#include "core/base/table.h"

#include <math.h>
#include <string.h>

#include "resources/embedded.h"
#include "tests/runner.h"

START_TEST (cells_and_numbers)
{
  const char text[] = "# remark\nname\tpka\tnote\nacetone\t26.5\tfirst\n# more\r\nwater\t\n";
  EnlTable *table = NULL;
  EnlError err;

  ck_assert_int_eq (enl_table_parse (text, strlen (text), &table, &err), ENL_OK);
  ck_assert_uint_eq (enl_table_rows (table), 2);
  ck_assert_int_eq (enl_table_column (table, "pka"), 1);
  ck_assert_int_eq (enl_table_column (table, "none"), -1);
  ck_assert_double_eq_tol (enl_table_number (table, 0, 1), 26.5, 1e-12);
  ck_assert (isnan (enl_table_number (table, 1, 1)));
  ck_assert_str_eq (enl_table_cell (table, 1, 2), "");
  ck_assert_str_eq (enl_table_cell (table, 1, -1), "");
  ck_assert_uint_eq (enl_table_line (table, 1), 5);
  enl_table_free (table);
}
END_TEST

START_TEST (faults_are_told_with_their_line)
{
  const char wide[] = "a\tb\n1\t2\n1\t2\t3\n";
  EnlTable *table = NULL;
  EnlError err;

  ck_assert_int_eq (enl_table_parse (wide, strlen (wide), &table, &err), ENL_ERROR_FORMAT);
  ck_assert_uint_eq (err.line, 3);
  ck_assert_ptr_null (table);
  ck_assert_int_eq (enl_table_parse ("# only\n", 7, &table, &err), ENL_ERROR_EMPTY);
}
END_TEST

START_TEST (resources_are_inside)
{
  size_t size = 0;
  const char *text = enl_resource ("acids.tsv", &size);

  ck_assert_ptr_nonnull (text);
  ck_assert_uint_gt (size, 100000);
  ck_assert (strncmp (text, "name\tsmiles\t", 12) == 0);
  ck_assert_ptr_null (enl_resource ("nothing.tsv", &size));
}
END_TEST

static Suite *
table_suite (void)
{
  Suite *suite = suite_create ("base table");
  TCase *tc = tcase_create ("all");

  tcase_add_test (tc, cells_and_numbers);
  tcase_add_test (tc, faults_are_told_with_their_line);
  tcase_add_test (tc, resources_are_inside);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (table_suite)
