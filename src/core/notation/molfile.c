/* Reading molfiles: header lines, counts line, then the version's own reader. */
#include "core/notation/molfile.h"

#include <string.h>

#include "core/notation/ctab.h"

#define HEADER_LINES  3
#define LATEST_COUNTS 12 /* pasted text may start with a few more lines */
#define VERSION_AT    34
#define LARGEST       (4 * 1024 * 1024)

typedef enum { VERSION_NONE, VERSION_2000, VERSION_3000, VERSION_OTHER } Version;

/* ---- finding the counts line ---- */

static bool
is_count_field (const EnlLines *lines, size_t column)
{
  bool digit = false;

  if (lines->length < column + 3)
    return false;
  for (size_t i = column; i < column + 3; i++) {
    char c = lines->line[i];
    if (c != ' ' && !g_ascii_isdigit (c))
      return false;
    if (c == ' ' && digit)
      return false;
    digit = digit || g_ascii_isdigit (c);
  }
  return digit;
}

static Version
version_of (const EnlLines *lines)
{
  const char *at = lines->line + VERSION_AT - 1;

  if (lines->length < VERSION_AT + 4)
    return VERSION_NONE;
  for (size_t i = 0; i < 2; i++, at++) { /* columns 34 to 39, right-adjusted */
    if (lines->length < (size_t)(at - lines->line) + 5 || at[0] != 'V')
      continue;
    return strncmp (at, "V2000", 5) == 0   ? VERSION_2000
           : strncmp (at, "V3000", 5) == 0 ? VERSION_3000
                                           : VERSION_OTHER;
  }
  return VERSION_NONE;
}

static bool
is_counts_line (const EnlLines *lines)
{
  return is_count_field (lines, 0) && is_count_field (lines, 3) &&
         version_of (lines) != VERSION_NONE;
}

/* A counts line of the time before version numbers: counts, and numbers or blanks behind. */
static bool
is_old_counts_line (const EnlLines *lines)
{
  if (!is_count_field (lines, 0) || !is_count_field (lines, 3) || lines->length < 9)
    return false;
  for (size_t i = 6; i < lines->length; i++)
    if (lines->line[i] != ' ' && !g_ascii_isdigit (lines->line[i]))
      return false;
  return true;
}

/* Steps to the counts line; *number is its line, from 0. */
static bool
find_counts (EnlLines *lines, int *number)
{
  for (*number = 0; *number <= LATEST_COUNTS && enl_lines_step (lines); ++*number)
    if (is_counts_line (lines) || (*number == HEADER_LINES && is_old_counts_line (lines)))
      return true;
  return false;
}

bool
enl_molfile_recognise (const char *text, size_t size)
{
  EnlLines lines = {.text = text, .size = size};
  int number = 0;

  return find_counts (&lines, &number);
}

/* ---- reading ---- */

/* The first header line is the name. */
static void
set_name (EnlMolecule *mol, const char *text, size_t size, int counts_number)
{
  EnlLines lines = {.text = text, .size = size};

  if (counts_number < HEADER_LINES)
    return;
  for (int i = 0; i <= counts_number - HEADER_LINES; i++)
    enl_lines_step (&lines);
  g_autofree char *valid = g_utf8_make_valid (lines.line, (gssize)lines.length);
  enl_molecule_set_name (mol, g_strstrip (valid));
}

static EnlStatus
no_counts (const char *text, size_t size, EnlError *err)
{
  EnlLines lines = {.text = text, .size = size};

  for (int i = 0; i <= HEADER_LINES; i++)
    enl_lines_step (&lines);
  enl_error_set (err, ENL_ERROR_FORMAT,
                 "after three header lines a line with both counts and V2000 or V3000 must come",
                 "no counts line");
  enl_error_locate (err, text, size, lines.start, lines.length);
  return ENL_ERROR_FORMAT;
}

static EnlStatus
read_version (EnlCtab *ctab, EnlLines *lines)
{
  switch (version_of (lines)) {
  case VERSION_3000:
    return enl_ctab_read_v3000 (ctab, lines);
  case VERSION_NONE:
  case VERSION_2000:
    return enl_ctab_read_v2000 (ctab, lines);
  case VERSION_OTHER:
    break;
  }
  return enl_ctab_fault (ctab, ENL_ERROR_UNSUPPORTED, lines->start + VERSION_AT - 1, 6,
                         "save the structure as V2000 or V3000",
                         "this version of the format is not read");
}

EnlStatus
enl_molfile_parse (const char *text, size_t size, EnlMolecule **out, EnlError *err)
{
  EnlLines lines = {.text = text, .size = size};
  EnlCtab ctab = {.text = text, .size = size, .err = err};
  int number = 0;

  *out = NULL;
  if (size == 0)
    return enl_error_set (err, ENL_ERROR_EMPTY, "give a molfile", "nothing to read");
  if (size > LARGEST)
    return enl_error_set (err, ENL_ERROR_LIMIT, "give one structure at a time",
                          "a molfile of %zu bytes is more than is read", size);
  if (!find_counts (&lines, &number))
    return no_counts (text, size, err);
  ctab.atom = g_array_new (FALSE, FALSE, sizeof (EnlCtabAtom));
  ctab.bond = g_array_new (FALSE, FALSE, sizeof (EnlCtabBond));
  EnlStatus status = read_version (&ctab, &lines);
  if (status == ENL_OK)
    status = enl_ctab_build (&ctab, out);
  if (status == ENL_OK)
    set_name (*out, text, size, number);
  g_array_unref (ctab.atom);
  g_array_unref (ctab.bond);
  return status;
}
