/* A tab-separated table with a header line; lines that start with '#' are remarks.
 *
 * All reference numbers of the program come in such tables (resources/), one source a row.
 */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include "core/base/error.h"

typedef struct EnlTable EnlTable;

/* Copies `text`. Rows shorter than the header are padded with empty cells; a longer row is an
 * ENL_ERROR_FORMAT with its line. */
EnlStatus enl_table_parse (const char *text, size_t size, EnlTable **out,
                           EnlError *err) ENL_MUST_USE;
void enl_table_free (EnlTable *table);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlTable, enl_table_free)

size_t enl_table_rows (const EnlTable *table);
size_t enl_table_columns (const EnlTable *table);

/* Index of the column with this header, or -1. */
int enl_table_column (const EnlTable *table, const char *name);
const char *enl_table_header (const EnlTable *table, size_t column);

/* ENL_OK when every named column is there; else ENL_ERROR_FORMAT that names the missing one. `what`
 * is the table in words ("base table"). */
EnlStatus enl_table_require (const EnlTable *table, const char *const *column, size_t n,
                             const char *what, EnlError *err);

/* Text of a cell, owned by the table, never NULL; column -1 gives "". */
const char *enl_table_cell (const EnlTable *table, size_t row, int column);

/* Number of a cell, read independently of the locale; NAN when empty or not a number. */
double enl_table_number (const EnlTable *table, size_t row, int column);

/* 1-based line of the row in the text. */
size_t enl_table_line (const EnlTable *table, size_t row);
