#include "cli/output.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include <jansson.h>

typedef struct {
  char *text;
  bool number; /* aligned to the right, unquoted in json */
  bool missing;
} Cell;

struct EnlOutput {
  EnlFormat format;
  const char *const *column;
  uint32_t n_columns;
  GArray *cell;      /* of the rows held back (text) or of the present row */
  GArray *note;      /* to rows held back (text) */
  GPtrArray *member; /* json: names and texts (NULL: null) behind the present row's cells */
};

/* Text below a row. */
typedef struct {
  uint32_t row;
  char *text;
} Note;

static void
clear_note (gpointer data)
{
  g_free (((Note *)data)->text);
}

static void
clear_cell (gpointer data)
{
  g_free (((Cell *)data)->text);
}

EnlOutput *
enl_output_new (EnlFormat format, const char *const *column)
{
  EnlOutput *out = g_new0 (EnlOutput, 1);

  out->format = format;
  out->column = column;
  out->n_columns = g_strv_length ((char **)column);
  out->cell = g_array_new (FALSE, FALSE, sizeof (Cell));
  g_array_set_clear_func (out->cell, clear_cell);
  out->note = g_array_new (FALSE, FALSE, sizeof (Note));
  g_array_set_clear_func (out->note, clear_note);
  out->member = g_ptr_array_new_with_free_func (g_free);
  if (format == ENL_FORMAT_TSV)
    for (uint32_t i = 0; i < out->n_columns; i++)
      printf ("%s%c", column[i], i + 1 < out->n_columns ? '\t' : '\n');
  return out;
}

static const Cell *
cell_at (const EnlOutput *out, uint32_t row, uint32_t column)
{
  return &g_array_index (out->cell, Cell, row * out->n_columns + column);
}

/* A cell must stay one cell whatever a person typed into a name. */
static void
print_tsv_cell (const char *text)
{
  for (; *text; text++)
    putchar ((unsigned char)*text < ' ' ? ' ' : *text);
}

static void
print_tsv_row (const EnlOutput *out)
{
  for (uint32_t i = 0; i < out->n_columns; i++) {
    print_tsv_cell (cell_at (out, 0, i)->text);
    putchar (i + 1 < out->n_columns ? '\t' : '\n');
  }
}

static void
print_json_string (const char *text)
{
  g_autofree char *valid = g_utf8_make_valid (text, -1);
  json_t *string = json_string (valid);
  char *quoted = json_dumps (string, JSON_ENCODE_ANY);

  fputs (quoted, stdout);
  free (quoted);
  json_decref (string);
}

static void
print_json_row (const EnlOutput *out)
{
  for (uint32_t i = 0; i < out->n_columns; i++) {
    const Cell *cell = cell_at (out, 0, i);
    fputs (i ? ", " : "{", stdout);
    print_json_string (out->column[i]);
    fputs (": ", stdout);
    if (cell->missing)
      fputs ("null", stdout);
    else if (cell->number)
      fputs (cell->text, stdout);
    else
      print_json_string (cell->text);
  }
  for (guint i = 0; i < out->member->len; i += 2) {
    const char *text = out->member->pdata[i + 1];
    fputs (", ", stdout);
    print_json_string (out->member->pdata[i]);
    fputs (": ", stdout);
    if (text)
      print_json_string (text);
    else
      fputs ("null", stdout);
  }
  fputs ("}\n", stdout);
}

static void
add_cell (EnlOutput *out, char *text, bool number, bool missing)
{
  Cell cell = {text, number, missing};

  g_array_append_val (out->cell, cell);
  if (out->format == ENL_FORMAT_TEXT || out->cell->len < out->n_columns)
    return;
  if (out->format == ENL_FORMAT_TSV)
    print_tsv_row (out);
  else
    print_json_row (out);
  g_array_set_size (out->cell, 0);
  g_ptr_array_set_size (out->member, 0);
}

void
enl_output_member (EnlOutput *out, const char *name, const char *text)
{
  if (out->format != ENL_FORMAT_JSON)
    return;
  g_ptr_array_add (out->member, g_strdup (name));
  g_ptr_array_add (out->member, g_strdup (text));
}

void
enl_output_text (EnlOutput *out, const char *text)
{
  add_cell (out, g_strdup (text ? text : ""), false, !text);
}

void
enl_output_number (EnlOutput *out, double value, int decimals)
{
  char format[16], buffer[64];

  if (!isfinite (value)) {
    add_cell (out, g_strdup (""), true, true);
    return;
  }
  g_snprintf (format, sizeof format, "%%.%df", decimals);
  g_ascii_formatd (buffer, sizeof buffer, format, value);
  /* "-0.0" is no number that a reader expects */
  if (buffer[0] == '-' && strspn (buffer + 1, "0.") == strlen (buffer + 1))
    memmove (buffer, buffer + 1, strlen (buffer));
  add_cell (out, g_strdup (buffer), true, false);
}

void
enl_output_json (EnlOutput *out, const char *json)
{
  add_cell (out, g_strdup (json ? json : ""), true, !json);
}

void
enl_output_note (EnlOutput *out, const char *text)
{
  Note note = {out->cell->len / out->n_columns, g_strdup (text)};

  if (out->format == ENL_FORMAT_TEXT && note.row > 0)
    g_array_append_val (out->note, note);
  else
    g_free (note.text);
}

void
enl_output_integer (EnlOutput *out, int64_t value)
{
  add_cell (out, g_strdup_printf ("%" G_GINT64_FORMAT, value), true, false);
}

static size_t
width_of (const char *text)
{
  return g_utf8_validate (text, -1, NULL) ? (size_t)g_utf8_strlen (text, -1) : strlen (text);
}

static void
print_padded (const char *text, size_t width, bool right, bool last)
{
  size_t pad = width - MIN (width, width_of (text));

  for (size_t i = 0; right && i < pad; i++)
    putchar (' ');
  print_tsv_cell (text);
  for (size_t i = 0; !right && !last && i < pad; i++)
    putchar (' ');
  fputs (last ? "\n" : "  ", stdout);
}

static void
print_notes (const EnlOutput *out, uint32_t row)
{
  for (uint32_t i = 0; i < out->note->len; i++)
    if (g_array_index (out->note, Note, i).row == row)
      fputs (g_array_index (out->note, Note, i).text, stdout);
}

static void
print_block (const EnlOutput *out)
{
  uint32_t rows = out->cell->len / out->n_columns;
  g_autofree size_t *width = g_new0 (size_t, out->n_columns);

  for (uint32_t c = 0; c < out->n_columns; c++) {
    width[c] = width_of (out->column[c]);
    for (uint32_t r = 0; r < rows; r++)
      width[c] = MAX (width[c], width_of (cell_at (out, r, c)->text));
  }
  for (uint32_t c = 0; c < out->n_columns; c++)
    print_padded (out->column[c], width[c], cell_at (out, 0, c)->number, c + 1 == out->n_columns);
  for (uint32_t r = 0; r < rows; r++) {
    for (uint32_t c = 0; c < out->n_columns; c++)
      print_padded (cell_at (out, r, c)->text, width[c], cell_at (out, r, c)->number,
                    c + 1 == out->n_columns);
    print_notes (out, r + 1);
  }
}

void
enl_output_block (EnlOutput *out, const char *line)
{
  if (out->format != ENL_FORMAT_TEXT)
    return;
  if (out->cell->len >= out->n_columns)
    print_block (out);
  if (line)
    printf ("%s\n", line);
  g_array_set_size (out->cell, 0);
  g_array_set_size (out->note, 0);
}

void
enl_output_finish (EnlOutput *out)
{
  enl_output_block (out, NULL);
  g_array_unref (out->cell);
  g_array_unref (out->note);
  g_ptr_array_unref (out->member);
  g_free (out);
}
