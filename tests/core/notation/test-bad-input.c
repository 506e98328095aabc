/* Malformed input for every reader, with the exact message and position (tests/data/bad-input.tsv).
 * In the table the input is escaped as in C; with ENL_SHOW_MESSAGES set the rows are printed as the
 * readers answer today, for a look at what a change did. */
#include <string.h>

#include "core/base/table.h"
#include "core/notation/groups.h"
#include "core/notation/inchi.h"
#include "core/notation/molfile.h"
#include "core/notation/read.h"
#include "core/notation/smiles.h"
#include "resources/embedded.h"
#include "tests/runner.h"

static EnlNames *names;
static EnlTable *table;

static EnlStatus
read_any (const char *text, size_t size, EnlMolecule **out, EnlError *err)
{
  return enl_read_structure (names, text, size, out, NULL, err);
}

static const struct {
  const char *name;
  EnlStatus (*read) (const char *text, size_t size, EnlMolecule **out, EnlError *err);
} reader[] = {
    {"read", read_any},           {"smiles", enl_smiles_parse},   {"inchi", enl_inchi_parse},
    {"groups", enl_groups_parse}, {"molfile", enl_molfile_parse},
};

static void
open_tables (void)
{
  g_autofree char *path =
      g_build_filename (g_getenv ("ENL_SOURCE_DIR"), "tests", "data", "bad-input.tsv", NULL);
  g_autofree char *text = NULL;
  size_t size = 0;
  const char *name_rows = enl_resource ("names.tsv", &size);

  ck_assert_int_eq (enl_names_new (name_rows, size, &names, NULL), ENL_OK);
  ck_assert (g_file_get_contents (path, &text, &size, NULL));
  ck_assert_int_eq (enl_table_parse (text, size, &table, NULL), ENL_OK);
}

static void
close_tables (void)
{
  enl_names_free (names);
  enl_table_free (table);
}

/* Bytes of an escaped text; a zero byte is written \000. */
static char *
unescape (const char *text, size_t *size)
{
  GString *out = g_string_new (NULL);

  for (const char *p = text; *p;) {
    const char *zero = strstr (p, "\\000");
    g_autofree char *part = zero ? g_strndup (p, (gsize)(zero - p)) : g_strdup (p);
    g_autofree char *bytes = g_strcompress (part);
    g_string_append (out, bytes);
    if (!zero)
      break;
    g_string_append_c (out, '\0');
    p = zero + 4;
  }
  *size = out->len;
  return g_string_free (out, FALSE);
}

static char *
message_of (size_t row)
{
  const char *name = enl_table_cell (table, row, 0);
  size_t size = 0, k = 0;
  g_autofree char *text = unescape (enl_table_cell (table, row, 2), &size);
  EnlMolecule *mol = NULL;
  EnlError err = {0};

  while (k < ENL_COUNT (reader) && strcmp (reader[k].name, name) != 0)
    k++;
  ck_assert_msg (k < ENL_COUNT (reader), "no reader '%s'", name);
  if (reader[k].read (text, size, &mol, &err) == ENL_OK) {
    enl_molecule_free (mol);
    return g_strdup ("was read");
  }
  ck_assert_ptr_null (mol);
  return enl_error_message (&err);
}

START_TEST (messages_are_exact)
{
  bool show = g_getenv ("ENL_SHOW_MESSAGES") != NULL;

  ck_assert_uint_gt (enl_table_rows (table), 100);
  for (size_t row = 0; row < enl_table_rows (table); row++) {
    g_autofree char *message = message_of (row);
    if (show)
      g_print ("%s\t%s\t%s\t%s\n", enl_table_cell (table, row, 0), enl_table_cell (table, row, 1),
               enl_table_cell (table, row, 2), message);
    else
      ck_assert_msg (strcmp (message, enl_table_cell (table, row, 3)) == 0,
                     "%s, %s:\n  %s\n  not\n  %s", enl_table_cell (table, row, 0),
                     enl_table_cell (table, row, 1), message, enl_table_cell (table, row, 3));
  }
}
END_TEST

/* Every message says what is wrong and what to do, and where wherever there is a text. */
START_TEST (messages_have_all_parts)
{
  for (size_t row = 0; row < enl_table_rows (table); row++) {
    const char *message = enl_table_cell (table, row, 3), *input = enl_table_cell (table, row, 2);
    ck_assert_msg (strstr (message, "; "), "no advice: %s", message);
    if (strspn (input, " \\nt") < strlen (input))
      ck_assert_msg (g_str_has_prefix (message, "line "), "no position: %s", message);
  }
}
END_TEST

static Suite *
bad_input_suite (void)
{
  Suite *suite = suite_create ("notation bad-input");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 60);
  tcase_add_checked_fixture (tc, open_tables, close_tables);
  tcase_add_test (tc, messages_are_exact);
  tcase_add_test (tc, messages_have_all_parts);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (bad_input_suite)
