#include "core/base/error.h"

#include <stdarg.h>
#include <string.h>

static const char *const status_text[ENL_N_STATUS] = {
    [ENL_OK] = "no error",
    [ENL_ERROR_EMPTY] = "nothing to read",
    [ENL_ERROR_SYNTAX] = "the notation is not followed",
    [ENL_ERROR_CHEMISTRY] = "no such molecule",
    [ENL_ERROR_UNKNOWN] = "not known",
    [ENL_ERROR_LIMIT] = "larger than the limits",
    [ENL_ERROR_UNSUPPORTED] = "not supported",
    [ENL_ERROR_FORMAT] = "damaged or incomplete",
    [ENL_ERROR_RANGE] = "out of range",
    [ENL_ERROR_NUMERIC] = "calculation without result",
    [ENL_ERROR_IO] = "reading or writing failed",
    [ENL_ERROR_CANCELLED] = "cancelled",
};

const char *
enl_status_text (EnlStatus status)
{
  g_assert (status < ENL_N_STATUS);
  return status_text[status];
}

EnlStatus
enl_error_set (EnlError *err, EnlStatus code, const char *advice, const char *format, ...)
{
  if (err) {
    va_list args;

    memset (err, 0, sizeof *err);
    err->code = code;
    va_start (args, format);
    g_vsnprintf (err->text, sizeof err->text, format, args);
    va_end (args);
    g_strlcpy (err->advice, advice ? advice : "", sizeof err->advice);
  }
  return code;
}

void
enl_error_locate (EnlError *err, const char *text, size_t size, size_t offset, size_t length)
{
  if (!err)
    return;
  offset = MIN (offset, size);
  err->line = 1;
  err->column = 1;
  for (size_t i = 0; i < offset; i++) {
    unsigned char byte = (unsigned char)text[i];
    if (byte == '\n') {
      err->line++;
      err->column = 1;
    } else if ((byte & 0xC0) != 0x80) {
      err->column++;
    }
  }
  err->offset = offset;
  err->length = MAX (length, 1);
}

char *
enl_error_message (const EnlError *err)
{
  GString *out = g_string_new (NULL);

  if (err->line)
    g_string_append_printf (out, "line %zu, column %zu: ", err->line, err->column);
  g_string_append (out, err->text[0] ? err->text : enl_status_text (err->code));
  if (err->advice[0])
    g_string_append_printf (out, "; %s", err->advice);
  g_autofree char *valid = g_utf8_make_valid (out->str, (gssize)out->len);
  g_string_free (out, TRUE);
  return g_steal_pointer (&valid);
}
