/* Result tables in the three formats of the terminal: text, tsv, json (one object a line). */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include <glib.h>

typedef enum { ENL_FORMAT_TEXT, ENL_FORMAT_TSV, ENL_FORMAT_JSON } EnlFormat;

typedef struct EnlOutput EnlOutput;

/* `column` is a NULL-terminated list of names that outlives the output. */
EnlOutput *enl_output_new (EnlFormat format, const char *const *column);
/* Prints what is still held back and frees. */
void enl_output_finish (EnlOutput *out);

/* Cells are added left to right; a row is complete when every column has one. Numbers are written
 * with `decimals` places and a point in every locale; NAN is an empty cell (null in json). */
void enl_output_text (EnlOutput *out, const char *text);
void enl_output_number (EnlOutput *out, double value, int decimals);
void enl_output_integer (EnlOutput *out, int64_t value);
/* json only: a further member of the row that is being filled, null for NULL. Comes before the last
 * cell of its row, and behind it in the object. */
void enl_output_member (EnlOutput *out, const char *name, const char *text);

/* A cell that is JSON itself (not quoted again); NULL is an empty cell (null in json). For the json
 * format. */
void enl_output_json (EnlOutput *out, const char *json);
/* text only: lines to stand below the row that is complete now. */
void enl_output_note (EnlOutput *out, const char *text);

/* text only: prints the rows so far as one aligned block, then `line` (NULL for none). */
void enl_output_block (EnlOutput *out, const char *line);
