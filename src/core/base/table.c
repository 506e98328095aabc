#include "core/base/table.h"

#include <math.h>
#include <string.h>

struct EnlTable {
  GPtrArray *line; /* char **, the cells of the header and of each row, padded */
  GArray *number;  /* size_t, line of each entry of `line` */
  size_t n_columns;
};

static size_t
count_cells (char **cell)
{
  return g_strv_length (cell);
}

static char **
pad_cells (char **cell, size_t have, size_t want)
{
  cell = g_renew (char *, cell, want + 1);
  for (size_t i = have; i < want; i++)
    cell[i] = g_strdup ("");
  cell[want] = NULL;
  return cell;
}

static EnlStatus
add_line (EnlTable *table, const char *text, size_t size, size_t number, EnlError *err)
{
  if (size && text[size - 1] == '\r')
    size--;
  if (size == 0 || text[0] == '#')
    return ENL_OK;
  g_autofree char *copy = g_strndup (text, size);
  char **cell = g_strsplit (copy, "\t", -1);
  size_t have = count_cells (cell);
  if (table->line->len == 0) {
    table->n_columns = have;
  } else if (have > table->n_columns) {
    g_strfreev (cell);
    enl_error_set (err, ENL_ERROR_FORMAT, "remove the extra tab characters",
                   "row has %zu cells, the header has %zu", have, table->n_columns);
    if (err)
      err->line = number, err->column = 1;
    return ENL_ERROR_FORMAT;
  }
  g_ptr_array_add (table->line, pad_cells (cell, have, table->n_columns));
  g_array_append_val (table->number, number);
  return ENL_OK;
}

EnlStatus
enl_table_parse (const char *text, size_t size, EnlTable **out, EnlError *err)
{
  g_autoptr (EnlTable) table = g_new0 (EnlTable, 1);
  size_t number = 1;

  *out = NULL;
  table->line = g_ptr_array_new_with_free_func ((GDestroyNotify)g_strfreev);
  table->number = g_array_new (FALSE, FALSE, sizeof (size_t));
  for (size_t start = 0; start < size; number++) {
    const char *end = memchr (text + start, '\n', size - start);
    size_t stop = end ? (size_t)(end - text) : size;
    EnlStatus status = add_line (table, text + start, stop - start, number, err);
    if (status != ENL_OK)
      return status;
    start = stop + 1;
  }
  if (table->line->len == 0)
    return enl_error_set (err, ENL_ERROR_EMPTY, "give a header line with column names",
                          "the table is empty");
  *out = g_steal_pointer (&table);
  return ENL_OK;
}

void
enl_table_free (EnlTable *table)
{
  if (!table)
    return;
  g_ptr_array_unref (table->line);
  g_array_unref (table->number);
  g_free (table);
}

size_t
enl_table_rows (const EnlTable *table)
{
  return table->line->len - 1;
}

size_t
enl_table_columns (const EnlTable *table)
{
  return table->n_columns;
}

const char *
enl_table_header (const EnlTable *table, size_t column)
{
  g_assert (column < table->n_columns);
  return ((char **)g_ptr_array_index (table->line, 0))[column];
}

int
enl_table_column (const EnlTable *table, const char *name)
{
  for (size_t i = 0; i < table->n_columns; i++)
    if (strcmp (enl_table_header (table, i), name) == 0)
      return (int)i;
  return -1;
}

EnlStatus
enl_table_require (const EnlTable *table, const char *const *column, size_t n, const char *what,
                   EnlError *err)
{
  for (size_t i = 0; i < n; i++)
    if (enl_table_column (table, column[i]) < 0)
      return enl_error_set (err, ENL_ERROR_FORMAT, "restore the header line",
                            "column '%s' of the %s is missing", column[i], what);
  return ENL_OK;
}

const char *
enl_table_cell (const EnlTable *table, size_t row, int column)
{
  g_assert (row < enl_table_rows (table));
  if (column < 0)
    return "";
  g_assert ((size_t)column < table->n_columns);
  return ((char **)g_ptr_array_index (table->line, row + 1))[column];
}

double
enl_table_number (const EnlTable *table, size_t row, int column)
{
  const char *text = enl_table_cell (table, row, column);
  char *end = NULL;
  double value = g_ascii_strtod (text, &end);

  while (end && g_ascii_isspace (*end))
    end++;
  return (end == text || *end) ? NAN : value;
}

size_t
enl_table_line (const EnlTable *table, size_t row)
{
  g_assert (row < enl_table_rows (table));
  return g_array_index (table->number, size_t, row + 1);
}
