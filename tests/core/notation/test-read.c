#include "core/notation/read.h"

#include <string.h>

#include "core/notation/smiles.h"
#include "resources/embedded.h"
#include "tests/runner.h"

static EnlNames *names;

static void
open_names (void)
{
  size_t size = 0;
  const char *text = enl_resource ("names.tsv", &size);

  ck_assert_int_eq (enl_names_new (text, size, &names, NULL), ENL_OK);
}

static void
close_names (void)
{
  enl_names_free (names);
  names = NULL;
}

#define ETHANOL_ROWS                                                                               \
  "  3  2  0  0  0  0  0  0  0  0999 V2000\n"                                                      \
  "    0.0000    0.0000    0.0000 C   0  0\n"                                                      \
  "    0.8660    0.5000    0.0000 C   0  0\n"                                                      \
  "    1.7320    0.0000    0.0000 O   0  0\n"                                                      \
  "  1  2  1  0\n"                                                                                 \
  "  2  3  1  0\n"                                                                                 \
  "M  END\n"

static const struct {
  const char *label, *text;
  EnlNotation notation;
  const char *smiles; /* canonical */
} read_case[] = {
    {"SMILES", "CCO", ENL_NOTATION_SMILES, "CCO"},
    {"SMILES in white space", "  \n CC(C)=O \r\n", ENL_NOTATION_SMILES, "CC(C)=O"},
    {"SMILES behind a byte order mark",
     "\xEF\xBB\xBF"
     "CCO",
     ENL_NOTATION_SMILES, "CCO"},
    {"CN is methylamine, not a group", "CN", ENL_NOTATION_SMILES, "CN"},
    {"NO is hydroxylamine", "NO", ENL_NOTATION_SMILES, "NO"},
    {"name", "acetone", ENL_NOTATION_NAME, "CC(C)=O"},
    {"name in capitals", "ACETONE", ENL_NOTATION_NAME, "CC(C)=O"},
    {"name of two words", "ethyl acetoacetate", ENL_NOTATION_NAME, "CCOC(=O)CC(C)=O"},
    {"InChI", "InChI=1S/C3H6O/c1-3(2)4/h1-2H3", ENL_NOTATION_INCHI, "CC(C)=O"},
    {"line of groups", "PhCH2CO2Et", ENL_NOTATION_GROUPS, "CCOC(=O)Cc1ccccc1"},
    {"line of groups that begins like a SMILES", "CF3COCH3", ENL_NOTATION_GROUPS, "CC(=O)C(F)(F)F"},
    {"molfile", "ethanol\n\n\n" ETHANOL_ROWS, ENL_NOTATION_MOLFILE, "CCO"},
    {"molfile without name", "\n\n\n" ETHANOL_ROWS, ENL_NOTATION_MOLFILE, "CCO"},
    {"molfile whose header was trimmed", ETHANOL_ROWS, ENL_NOTATION_MOLFILE, "CCO"},
    {"molfile behind more blank lines", "\n\n\n\n\n\n" ETHANOL_ROWS, ENL_NOTATION_MOLFILE, "CCO"},
};

START_TEST (notations_are_recognised)
{
  const char *text = read_case[_i].text;
  g_autoptr (EnlMolecule) mol = NULL, want = NULL;
  EnlNotation notation;
  EnlError err;
  EnlStatus status = enl_read_structure (names, text, strlen (text), &mol, &notation, &err);

  ck_assert_msg (status == ENL_OK, "%s: %s", read_case[_i].label, err.text);
  ck_assert_msg (notation == read_case[_i].notation, "%s: %d", read_case[_i].label, notation);
  ck_assert_int_eq (
      enl_smiles_parse (read_case[_i].smiles, strlen (read_case[_i].smiles), &want, NULL), ENL_OK);
  g_autofree char *have_text = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
  g_autofree char *want_text = enl_smiles_write (want, ENL_SMILES_DEFAULT, NULL);
  ck_assert_str_eq (have_text, want_text);
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    const EnlAtom *atom = enl_molecule_atom (mol, i);
    if (notation != ENL_NOTATION_INCHI)
      ck_assert_uint_le (atom->offset + atom->length, strlen (text));
  }
}
END_TEST

START_TEST (positions_of_atoms_are_those_of_the_text)
{
  g_autoptr (EnlMolecule) smiles = NULL, name = NULL;

  ck_assert_int_eq (enl_read_structure (names, "  CCO", 5, &smiles, NULL, NULL), ENL_OK);
  ck_assert_uint_eq (enl_molecule_atom (smiles, 2)->offset, 4);
  ck_assert_int_eq (enl_read_structure (names, " acetone ", 9, &name, NULL, NULL), ENL_OK);
  ck_assert_uint_eq (enl_molecule_atom (name, 1)->offset, 1);
  ck_assert_uint_eq (enl_molecule_atom (name, 1)->length, 7);
}
END_TEST

START_TEST (names_are_optional)
{
  EnlMolecule *mol = NULL;
  EnlError err;

  ck_assert_int_eq (enl_read_structure (NULL, "acetone", 7, &mol, NULL, &err), ENL_ERROR_UNKNOWN);
  ck_assert_int_eq (enl_read_structure (NULL, "CCO", 3, &mol, NULL, &err), ENL_OK);
  enl_molecule_free (mol);
}
END_TEST

START_TEST (noise_is_refused_quickly)
{
  size_t size = 10 * 1024 * 1024;
  g_autofree char *noise = g_malloc (size);
  EnlMolecule *mol = NULL;
  EnlError err;
  guint32 state = 12345;

  for (size_t i = 0; i < size; i++)
    noise[i] = (char)((state = state * 1664525u + 1013904223u) >> 24);
  ck_assert_int_eq (enl_read_structure (names, noise, size, &mol, NULL, &err), ENL_ERROR_LIMIT);
  ck_assert_int_eq (enl_read_structure (names, noise, 3 * 1024 * 1024, &mol, NULL, &err),
                    ENL_ERROR_SYNTAX);
  memset (noise, 'C', size);
  ck_assert_int_eq (enl_read_structure (names, noise, 3 * 1024 * 1024, &mol, NULL, &err),
                    ENL_ERROR_LIMIT);
  memset (noise, '(', size);
  ck_assert_int_ne (enl_read_structure (names, noise, 3 * 1024 * 1024, &mol, NULL, &err), ENL_OK);
  memset (noise, 'a', size);
  ck_assert_int_ne (enl_read_structure (names, noise, 3 * 1024 * 1024, &mol, NULL, &err), ENL_OK);
}
END_TEST

static const struct {
  const char *line, *structure, *name; /* NULL: blank */
} line_case[] = {
    {"CC=O ethanal", "CC=O", "ethanal"},
    {"  CC=O \t two words \r", "CC=O", "two words"},
    {"CC#N", "CC#N", "CC#N"},
    {"ethyl acetoacetate", "ethyl acetoacetate", "ethyl acetoacetate"},
    {" \t\r", NULL, NULL},
};

START_TEST (list_lines_are_split)
{
  const char *line = line_case[_i].line;
  EnlListLine part;

  ck_assert_int_eq (enl_read_list_line (names, line, strlen (line), &part),
                    line_case[_i].structure != NULL);
  if (!line_case[_i].structure)
    return;
  g_autofree char *structure = g_strndup (line + part.start, part.end - part.start);
  g_autofree char *name = g_strndup (line + part.name, part.name_end - part.name);
  ck_assert_str_eq (structure, line_case[_i].structure);
  ck_assert_str_eq (name, line_case[_i].name);
}
END_TEST

static Suite *
read_suite (void)
{
  Suite *suite = suite_create ("notation read");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 30);
  tcase_add_checked_fixture (tc, open_names, close_names);
  tcase_add_loop_test (tc, notations_are_recognised, 0, (int)ENL_COUNT (read_case));
  tcase_add_test (tc, positions_of_atoms_are_those_of_the_text);
  tcase_add_test (tc, names_are_optional);
  tcase_add_test (tc, noise_is_refused_quickly);
  tcase_add_loop_test (tc, list_lines_are_split, 0, (int)ENL_COUNT (line_case));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (read_suite)
