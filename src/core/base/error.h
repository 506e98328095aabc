/* What went wrong in something a file, a drawing or a person gave us, and where.
 *
 * Broken promises inside the program are asserted instead; they never arrive here.
 */
#pragma once

#include <stddef.h>

#include "core/base/macros.h"

typedef enum {
  ENL_OK = 0,
  ENL_ERROR_EMPTY,       /* nothing to read */
  ENL_ERROR_SYNTAX,      /* the text does not follow its notation */
  ENL_ERROR_CHEMISTRY,   /* well written, but no such molecule: valence, aromaticity */
  ENL_ERROR_UNKNOWN,     /* a name, element, atom or base that is not known here */
  ENL_ERROR_LIMIT,       /* larger than the program's stated limits */
  ENL_ERROR_UNSUPPORTED, /* legal, but not handled; the text says what to do instead */
  ENL_ERROR_FORMAT,      /* a file or table with a damaged or missing part */
  ENL_ERROR_RANGE,       /* a number outside its allowed range */
  ENL_ERROR_NUMERIC,     /* a calculation that did not converge */
  ENL_ERROR_IO,          /* reading, writing or a helper process failed */
  ENL_ERROR_CANCELLED,   /* the caller asked to stop */
  ENL_N_STATUS
} EnlStatus;

/* Position is that of the fault in the text that was read. */
typedef struct {
  EnlStatus code;
  size_t line;      /* from 1; 0 when there is no position */
  size_t column;    /* from 1, counted in characters (not bytes); 0 when there is none */
  size_t offset;    /* byte offset of the fault in the whole text */
  size_t length;    /* bytes the fault covers, at least 1 where there is a position */
  char text[200];   /* what is wrong: lower case, no full stop, subject in quotes */
  char advice[200]; /* what to do: same style */
} EnlError;

/* Words for a status, distinct and never empty. */
const char *enl_status_text (EnlStatus status);

/* Fill `err` (NULL allowed) and return `code`, so that a reader can `return enl_error_set (...)`.
 * The position is cleared. `advice` is plain text, `format` is printf style. */
EnlStatus enl_error_set (EnlError *err, EnlStatus code, const char *advice, const char *format, ...)
    G_GNUC_PRINTF (4, 5);

/* Work out line and column of byte `offset` in the UTF-8 `text` of `size` bytes and store them
 * with the offset and `length`. NULL `err` allowed. */
void enl_error_locate (EnlError *err, const char *text, size_t size, size_t offset, size_t length);

/* "line 3, column 7: what is wrong; what to do" in a new string (caller: g_free). The position is
 * left out where there is none. */
char *enl_error_message (const EnlError *err) ENL_MUST_USE;
