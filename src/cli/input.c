#include "cli/input.h"

#include <stdio.h>
#include <string.h>

#include "core/notation/molfile.h"
#include "core/notation/read.h"

/* Files of any size are legal lists; a single structure is limited by its reader. */
#define MAX_FILE_BYTES (1u << 30)
/* A line at fault is quoted up to this many bytes on both sides of the caret. */
#define QUOTE_BYTES     60
#define NAME_CHARACTERS 60

typedef struct {
  const EnlNames *names;
  bool caret;
  EnlVisit visit;
  EnlVisitSet visit_set; /* NULL: nobody asks */
  void *data;
  uint32_t failed;
} Walk;

/* ---- explaining ---- */

static size_t
line_start (const char *text, size_t offset)
{
  while (offset > 0 && text[offset - 1] != '\n')
    offset--;
  return offset;
}

static void
print_caret (const char *text, size_t size, const EnlError *err)
{
  size_t at = MIN (err->offset, size), start = line_start (text, at), stop = at;

  if (at - start > QUOTE_BYTES)
    start = at - QUOTE_BYTES;
  while (start < at && ((unsigned char)text[start] & 0xC0) == 0x80)
    start++;
  while (stop < size && text[stop] != '\n' && stop - at < QUOTE_BYTES)
    stop++;
  g_autofree char *quote = g_utf8_make_valid (text + start, (gssize)(stop - start));
  for (char *p = quote; *p; p++)
    if ((unsigned char)*p < ' ')
      *p = ' ';
  g_autofree char *before = g_utf8_make_valid (text + start, (gssize)(at - start));
  fprintf (stderr, "    %s\n    %*s^\n", quote, (int)g_utf8_strlen (before, -1), "");
}

/* A name of one line that fits a terminal, whatever was typed. */
static char *
short_name (const char *name)
{
  g_autofree char *valid = g_utf8_make_valid (name, (gssize)strnlen (name, 4 * NAME_CHARACTERS));
  bool cut = g_utf8_strlen (valid, -1) > NAME_CHARACTERS;
  g_autofree char *start =
      g_utf8_substring (valid, 0, MIN (g_utf8_strlen (valid, -1), NAME_CHARACTERS));

  g_strdelimit (start, "\r\n\t", ' ');
  return g_strconcat (start, cut ? "..." : "", NULL);
}

void
enl_input_explain (const char *name, const EnlError *err)
{
  g_autofree char *message = enl_error_message (err);
  g_autofree char *shown_name = short_name (name);

  fprintf (stderr, "%s: %s\n", shown_name, message);
}

/* `first_line` is that of `text` in its file, 1 for a text of its own. */
static void
explain (Walk *walk, const char *name, const char *text, size_t size, size_t first_line,
         const EnlError *err)
{
  EnlError shown = *err;

  if (shown.line)
    shown.line += first_line - 1;
  enl_input_explain (name, &shown);
  if (walk->caret && err->line && text)
    print_caret (text, size, err);
  walk->failed++;
}

/* `own_name` prefers the name that the structure carries itself (molfile header). */
static void
read_one (Walk *walk, const char *name, bool own_name, const char *text, size_t size,
          size_t first_line)
{
  g_autoptr (EnlMolecule) mol = NULL;
  EnlError err = {0};
  EnlStatus status = enl_read_structure (walk->names, text, size, &mol, NULL, &err);

  if (status == ENL_OK) {
    const char *own = enl_molecule_name (mol);
    status = walk->visit (own_name && own[0] ? own : name, mol, walk->data, &err);
  }
  if (status != ENL_OK)
    explain (walk, name, text, size, first_line, &err);
}

/* ---- lists ---- */

static bool
read_line (Walk *walk, const char *line, size_t size, size_t number)
{
  EnlListLine part;

  if (!enl_read_list_line (walk->names, line, size, &part))
    return false;
  g_autofree char *name = g_strndup (line + part.name, part.name_end - part.name);
  read_one (walk, name, false, line, part.end, number);
  return true;
}

static void
read_lines (Walk *walk, const char *name, const char *text, size_t size)
{
  size_t number = 1, read = 0;

  for (size_t start = 0; start < size; number++) {
    const char *stop = memchr (text + start, '\n', size - start);
    size_t length = stop ? (size_t)(stop - text) - start : size - start;
    if (length && text[start] != '#')
      read += read_line (walk, text + start, length, number);
    start += length + 1;
  }
  if (read == 0) {
    EnlError err;
    enl_error_set (&err, ENL_ERROR_EMPTY, "write one structure a line", "nothing to read");
    explain (walk, name, NULL, 0, 1, &err);
  }
}

static size_t
lines_before (const char *text, size_t offset)
{
  size_t n = 1;

  for (size_t i = 0; i < offset; i++)
    n += text[i] == '\n';
  return n;
}

static void
read_records (Walk *walk, const char *text, size_t size)
{
  size_t offset = 0, start, length, counted = 0, line = 1;

  for (uint32_t number = 1; enl_sdf_next (text, size, &offset, &start, &length); number++) {
    g_autofree char *name = g_strdup_printf ("record %u", number);
    line += lines_before (text + counted, start - counted) - 1;
    counted = start;
    read_one (walk, name, true, text + start, length, line);
  }
}

static void
read_set (Walk *walk, const char *name, const char *text, size_t size)
{
  g_autoptr (EnlWorkset) set = NULL;
  EnlError err = {0};

  if (enl_workset_parse (text, size, &set, &err) != ENL_OK) {
    explain (walk, name, text, size, 1, &err);
    return;
  }
  if (walk->visit_set)
    walk->failed += walk->visit_set (name, set, walk->data);
  for (uint32_t i = 0; i < enl_workset_size (set); i++) {
    const EnlSubstrate *s = enl_workset_get (set, i);
    read_one (walk, s->name[0] ? s->name : s->text, false, s->text, strlen (s->text), 1);
  }
  if (walk->visit_set)
    walk->failed += walk->visit_set (name, NULL, walk->data);
}

/* ---- files ---- */

static bool
is_binary (const char *text, size_t size)
{
  return memchr (text, '\0', MIN (size, 4096)) != NULL;
}

static void
read_content (Walk *walk, const char *name, const char *text, size_t size)
{
  EnlError err;

  if (size > MAX_FILE_BYTES) {
    enl_error_set (&err, ENL_ERROR_LIMIT, "split the file", "larger than 1 GB");
    explain (walk, name, NULL, 0, 1, &err);
  } else if (is_binary (text, size)) {
    enl_error_set (&err, ENL_ERROR_FORMAT, "give SMILES, molfile, SDF, InChI or an Enolith set",
                   "this is not a text file");
    explain (walk, name, NULL, 0, 1, &err);
  } else if (g_str_has_suffix (name, ENL_WORKSET_SUFFIX)) {
    read_set (walk, name, text, size);
  } else if (g_str_has_suffix (name, ".mol")) {
    read_one (walk, name, true, text, size, 1);
  } else if (g_str_has_suffix (name, ".sdf") || g_strstr_len (text, (gssize)size, "\n$$$$")) {
    read_records (walk, text, size);
  } else if (g_strstr_len (text, (gssize)size, "M  END")) {
    read_one (walk, name, true, text, size, 1);
  } else {
    read_lines (walk, name, text, size);
  }
}

static char *
read_standard_input (size_t *size)
{
  GString *text = g_string_new (NULL);
  char buffer[65536];
  size_t n;

  while ((n = fread (buffer, 1, sizeof buffer, stdin)) > 0 && text->len <= MAX_FILE_BYTES)
    g_string_append_len (text, buffer, (gssize)n);
  *size = text->len;
  return g_string_free (text, FALSE);
}

static bool
looks_like_a_file (const char *input)
{
  static const char *const suffix[] = {".smi",   ".smiles",         ".mol", ".sdf", ".txt",
                                       ".inchi", ENL_WORKSET_SUFFIX};

  for (size_t i = 0; i < ENL_COUNT (suffix); i++)
    if (g_str_has_suffix (input, suffix[i]))
      return true;
  return g_file_test (input, G_FILE_TEST_EXISTS) && strchr (input, '/');
}

static void
read_input (Walk *walk, const char *input)
{
  g_autofree char *text = NULL;
  g_autoptr (GError) error = NULL;
  size_t size = 0;

  if (strcmp (input, "-") == 0) {
    text = read_standard_input (&size);
    read_content (walk, "standard input", text, size);
  } else if (looks_like_a_file (input)) {
    if (g_file_get_contents (input, &text, &size, &error)) {
      read_content (walk, input, text, size);
    } else {
      EnlError err;
      enl_error_set (&err, ENL_ERROR_IO, "check the path", "%.190s", error->message);
      explain (walk, input, NULL, 0, 1, &err);
    }
  } else {
    read_one (walk, input, false, input, strlen (input), 1);
  }
}

uint32_t
enl_input_each (const EnlNames *names, char *const *input, bool caret, EnlVisit visit, void *data)
{
  return enl_input_each_in_sets (names, input, caret, visit, NULL, data);
}

uint32_t
enl_input_each_in_sets (const EnlNames *names, char *const *input, bool caret, EnlVisit visit,
                        EnlVisitSet visit_set, void *data)
{
  Walk walk = {names, caret, visit, visit_set, data, 0};

  for (; *input; input++)
    read_input (&walk, *input);
  return walk.failed;
}
