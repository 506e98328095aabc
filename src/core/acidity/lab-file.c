/* The file form of lab values: what is wrong, in which line and column. */
#include <math.h>
#include <string.h>

#include "core/acidity/lab.h"
#include "core/base/table.h"

#define MAX_FILE_BYTES  (4u << 20)
#define BYTE_ORDER_MARK "\xEF\xBB\xBF"

typedef struct {
  const char *text;
  size_t size;
  EnlTable *table;
  int column[ENL_N_LAB_FIELDS]; /* -1: not in the file */
  EnlError *err;
} File;

static size_t
line_start (const File *file, size_t line)
{
  size_t at = 0;

  for (size_t number = 1; number < line && at < file->size; at++)
    number += file->text[at] == '\n';
  return at;
}

/* Where cell `column` of a line begins, and how long it is. */
static size_t
cell_start (const File *file, size_t line, int column, size_t *length)
{
  size_t at = line_start (file, line);

  for (; column > 0 && at < file->size && file->text[at] != '\n'; at++)
    column -= file->text[at] == '\t';
  while (at < file->size && file->text[at] == ' ')
    at++;
  *length = 0;
  while (at + *length < file->size && !strchr ("\t\r\n", file->text[at + *length]))
    ++*length;
  return at;
}

/* Moves the position of the error, if any within the cell, to that in the file. */
static void
place (const File *file, size_t line, int column)
{
  size_t length, start = cell_start (file, line, MAX (column, 0), &length);

  if (!file->err)
    return;
  if (file->err->line == 1 && column >= 0)
    enl_error_locate (file->err, file->text, file->size, start + file->err->offset,
                      file->err->length);
  else
    enl_error_locate (file->err, file->text, file->size, start, length);
}

static size_t
header_line (const File *file)
{
  size_t line = 1;

  for (size_t at = 0; at < file->size; line++) {
    if (!strchr ("#\r\n", file->text[at]))
      break;
    const char *end = memchr (file->text + at, '\n', file->size - at);
    at = end ? (size_t)(end - file->text) + 1 : file->size;
  }
  return line;
}

/* ---- header ---- */

static EnlStatus
bad_header (const File *file, size_t column, const char *what)
{
  EnlStatus status =
      enl_error_set (file->err, ENL_ERROR_FORMAT,
                     "the columns are structure, atom, solvent, pka, sigma, name, note and source",
                     "column '%.60s' %s", enl_table_header (file->table, column), what);

  place (file, header_line (file), (int)column);
  return status;
}

static EnlStatus
read_header (File *file)
{
  static const EnlLabField required[] = {ENL_LAB_STRUCTURE, ENL_LAB_SOLVENT, ENL_LAB_PKA};

  for (int f = 0; f < ENL_N_LAB_FIELDS; f++)
    file->column[f] = -1;
  for (size_t c = 0; c < enl_table_columns (file->table); c++) {
    int field = 0;
    while (field < ENL_N_LAB_FIELDS &&
           g_ascii_strcasecmp (enl_table_header (file->table, c),
                               enl_lab_field_name ((EnlLabField)field)) != 0)
      field++;
    if (field == ENL_N_LAB_FIELDS)
      return bad_header (file, c, "is not known here");
    if (file->column[field] >= 0)
      return bad_header (file, c, "stands twice");
    file->column[field] = (int)c;
  }
  for (size_t i = 0; i < ENL_COUNT (required); i++)
    if (file->column[required[i]] < 0) {
      enl_error_set (file->err, ENL_ERROR_FORMAT, "begin with a header line, tabs between columns",
                     "column '%s' is missing", enl_lab_field_name (required[i]));
      place (file, header_line (file), -1);
      return ENL_ERROR_FORMAT;
    }
  return ENL_OK;
}

/* ---- rows ---- */

static const char *
cell (const File *file, size_t row, EnlLabField field)
{
  return enl_table_cell (file->table, row, file->column[field]);
}

static void
take_text (const File *file, size_t row, EnlLabField field, char **text)
{
  g_free (*text);
  *text = g_strstrip (g_strdup (cell (file, row, field)));
}

/* A number, or NAN; a cell of blanks leaves `value` as it is. */
static void
take_number (const File *file, size_t row, EnlLabField field, double *value)
{
  const char *text = cell (file, row, field);

  if (text[strspn (text, " ")])
    *value = enl_table_number (file->table, row, file->column[field]);
}

static EnlStatus
take_atom (const File *file, size_t row, EnlLabEntry *entry)
{
  g_autofree char *text = g_strstrip (g_strdup (cell (file, row, ENL_LAB_ATOM)));
  guint64 value = 0;

  if (text[0] && !g_ascii_string_to_unsigned (text, 10, 1, ENL_MAX_ATOMS, &value, NULL))
    return enl_error_set (file->err, ENL_ERROR_FORMAT,
                          "write the position of the acidic atom in the structure, from 1",
                          "'%.40s' is no position of an atom", text);
  entry->atom = (uint32_t)value;
  return ENL_OK;
}

static EnlStatus
take_solvent (const File *file, size_t row, EnlLabEntry *entry)
{
  g_autofree char *text = g_strstrip (g_strdup (cell (file, row, ENL_LAB_SOLVENT)));

  if (enl_solvent_parse (text, &entry->solvent))
    return ENL_OK;
  return enl_error_set (file->err, ENL_ERROR_FORMAT, "write dmso or water",
                        text[0] ? "'%.40s' is no known solvent" : "the solvent is missing%.40s",
                        text);
}

static EnlStatus
read_row (const File *file, size_t row, EnlLabEntry *entry, EnlLabField *field)
{
  take_text (file, row, ENL_LAB_STRUCTURE, &entry->structure);
  take_text (file, row, ENL_LAB_NAME, &entry->name);
  take_text (file, row, ENL_LAB_NOTE, &entry->note);
  take_text (file, row, ENL_LAB_SOURCE, &entry->source);
  take_number (file, row, ENL_LAB_PKA, &entry->pka);
  take_number (file, row, ENL_LAB_SIGMA, &entry->sigma);
  entry->line = enl_table_line (file->table, row);
  *field = ENL_LAB_ATOM;
  EnlStatus status = take_atom (file, row, entry);
  if (status != ENL_OK)
    return status;
  *field = ENL_LAB_SOLVENT;
  return take_solvent (file, row, entry);
}

static EnlStatus
add_row (const File *file, const EnlNames *names, size_t row, EnlLab *lab)
{
  g_autoptr (EnlLabEntry) entry = enl_lab_entry_new ();
  EnlLabField field;
  EnlStatus status = read_row (file, row, entry, &field);

  if (status == ENL_OK)
    status = enl_lab_add (lab, names, entry, (uint32_t)row, &field, file->err);
  /* which atom it is may stand in either column; what was typed there is at fault */
  if (status != ENL_OK && field == ENL_LAB_ATOM && !entry->atom && !cell (file, row, field)[0])
    field = ENL_LAB_STRUCTURE;
  if (status != ENL_OK)
    place (file, entry->line, file->column[field]);
  return status;
}

/* ---- the file ---- */

static EnlStatus
check_text (const File *file)
{
  const char *end;

  if (file->size > MAX_FILE_BYTES)
    return enl_error_set (file->err, ENL_ERROR_LIMIT, "give a table with one value a line",
                          "larger than 4 MB");
  if (memchr (file->text, '\0', file->size))
    return enl_error_set (file->err, ENL_ERROR_FORMAT, "save the table as tab-separated text",
                          "this is not a text file");
  if (g_utf8_validate (file->text, (gssize)file->size, &end))
    return ENL_OK;
  enl_error_set (file->err, ENL_ERROR_FORMAT, "save the table as UTF-8 text",
                 "a character that is not UTF-8");
  enl_error_locate (file->err, file->text, file->size, (size_t)(end - file->text), 1);
  return ENL_ERROR_FORMAT;
}

static EnlStatus
read_rows (File *file, const EnlNames *names, EnlLab *lab)
{
  EnlStatus status = read_header (file);

  if (status == ENL_OK && enl_table_rows (file->table) == 0)
    return enl_error_set (file->err, ENL_ERROR_EMPTY, "write one value a line below the header",
                          "there is no value below the header");
  for (size_t row = 0; status == ENL_OK && row < enl_table_rows (file->table); row++)
    status = add_row (file, names, row, lab);
  return status;
}

EnlStatus
enl_lab_parse (const EnlNames *names, const char *text, size_t size, EnlLab **out, EnlError *err)
{
  size_t skip = size >= 3 && memcmp (text, BYTE_ORDER_MARK, 3) == 0 ? 3 : 0;
  File file = {.text = text + skip, .size = size - skip, .err = err};
  g_autoptr (EnlLab) lab = enl_lab_new ();
  EnlStatus status = check_text (&file);

  *out = NULL;
  if (status == ENL_OK)
    status = enl_table_parse (file.text, file.size, &file.table, err);
  if (status == ENL_OK)
    status = read_rows (&file, names, lab);
  enl_table_free (file.table);
  if (status == ENL_OK)
    *out = g_steal_pointer (&lab);
  return status;
}
