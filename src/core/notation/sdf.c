/* SDF: records of a molfile and data fields, each closed by a line "$$$$". */
#include "core/notation/molfile.h"

#include <string.h>

#include "core/notation/ctab.h"

static bool
is_blank (const char *text, size_t size)
{
  for (size_t i = 0; i < size; i++)
    if (!g_ascii_isspace (text[i]))
      return false;
  return true;
}

bool
enl_sdf_next (const char *text, size_t size, size_t *offset, size_t *start, size_t *length)
{
  EnlLines lines = {.text = text, .size = size, .next = *offset};
  size_t first = *offset;

  while (enl_lines_step (&lines))
    if (lines.length >= 4 && strncmp (lines.line, "$$$$", 4) == 0) {
      *start = first;
      *length = lines.start - first;
      *offset = lines.next;
      return true;
    }
  *offset = size;
  *start = MIN (first, size);
  *length = size - *start;
  return !is_blank (text + *start, *length);
}

/* True for a header "> <name>"; the name may be preceded and followed by other remarks. */
static bool
is_field_header (const EnlLines *lines, const char *name)
{
  size_t n = strlen (name);

  if (lines->length == 0 || lines->line[0] != '>')
    return false;
  for (size_t i = 1; i + n + 2 <= lines->length; i++)
    if (lines->line[i] == '<' && lines->line[i + n + 1] == '>' &&
        memcmp (lines->line + i + 1, name, n) == 0)
      return true;
  return false;
}

char *
enl_sdf_field (const char *record, size_t size, const char *name)
{
  EnlLines lines = {.text = record, .size = size};

  while (enl_lines_step (&lines)) {
    if (!is_field_header (&lines, name))
      continue;
    GString *value = g_string_new (NULL);
    while (enl_lines_step (&lines) && lines.length > 0) {
      if (value->len)
        g_string_append_c (value, '\n');
      g_string_append_len (value, lines.line, (gssize)lines.length);
    }
    return g_string_free (value, FALSE);
  }
  return NULL;
}
