#include "core/notation/ctab.h"

#include <stdarg.h>
#include <string.h>

#include "core/molecule/elements.h"

bool
enl_lines_step (EnlLines *lines)
{
  lines->start = MIN (lines->next, lines->size);
  lines->line = lines->text + lines->start;
  lines->length = 0;
  if (lines->start == lines->size)
    return false;
  size_t left = lines->size - lines->start;
  const char *end = memchr (lines->line, '\n', left);
  lines->length = end ? (size_t)(end - lines->line) : left;
  lines->next = lines->start + lines->length + (end ? 1 : 0);
  if (lines->length && lines->line[lines->length - 1] == '\r')
    lines->length--;
  return true;
}

EnlStatus
enl_ctab_fault (const EnlCtab *ctab, EnlStatus code, size_t offset, size_t length,
                const char *advice, const char *format, ...)
{
  char text[sizeof ctab->err->text];
  va_list args;

  va_start (args, format);
  g_vsnprintf (text, sizeof text, format, args);
  va_end (args);
  enl_error_set (ctab->err, code, advice, "%s", text);
  enl_error_locate (ctab->err, ctab->text, ctab->size, offset, length);
  return code;
}

/* ---- symbols ---- */

static const struct {
  const char *symbol, *what;
} query_symbol[] = {
    {"A", "any atom but hydrogen"},
    {"Q", "any atom but carbon and hydrogen"},
    {"*", "any atom"},
    {"L", "a list of atoms"},
    {"LP", "a lone pair as an atom"},
    {"X", "any halogen"},
    {"M", "any metal"},
    {"AH", "any atom"},
    {"QH", "any atom but carbon"},
    {"XH", "any halogen or hydrogen"},
    {"MH", "any metal or hydrogen"},
    {"R", "an R group"},
    {"R#", "an R group"},
    {"Pol", "a polymer bead"},
    {"Mod", "a modification"},
    {"Du", "a dummy atom"},
};

static const char *
query_meaning (const char *symbol, size_t length)
{
  for (size_t i = 0; i < ENL_COUNT (query_symbol); i++)
    if (strlen (query_symbol[i].symbol) == length &&
        memcmp (query_symbol[i].symbol, symbol, length) == 0)
      return query_symbol[i].what;
  return length >= 2 && symbol[0] == 'R' && g_ascii_isdigit (symbol[1]) ? "an R group" : NULL;
}

/* "CL" for "Cl": the advice names it. */
static EnlStatus
unknown_symbol (const EnlCtab *ctab, size_t offset, size_t length)
{
  char spelled[4] = "";
  g_autofree char *advice = NULL;

  if (length == 2) {
    spelled[0] = g_ascii_toupper (ctab->text[offset]);
    spelled[1] = g_ascii_tolower (ctab->text[offset + 1]);
    if (enl_element_find (spelled, 2) > 0)
      advice = g_strdup_printf ("write '%s'", spelled);
  }
  return enl_ctab_fault (ctab, ENL_ERROR_UNKNOWN, offset, length,
                         advice ? advice : "write an element symbol", "unknown element '%.*s'",
                         (int)MIN (length, 20), ctab->text + offset);
}

EnlStatus
enl_ctab_element (const EnlCtab *ctab, size_t offset, size_t length, uint8_t *element, int *isotope)
{
  const char *symbol = ctab->text + offset;
  const char *query = query_meaning (symbol, length);

  if (query)
    return enl_ctab_fault (
        ctab, ENL_ERROR_UNSUPPORTED, offset, length, "replace it by a certain element or group",
        "'%.*s' stands for %s, not for one structure", (int)length, symbol, query);
  if (length == 1 && (*symbol == 'D' || *symbol == 'T')) {
    *element = 1;
    *isotope = *symbol == 'D' ? 2 : 3;
    return ENL_OK;
  }
  int found = length ? enl_element_find (symbol, length) : -1;
  if (found <= 0)
    return unknown_symbol (ctab, offset, MAX (length, 1));
  *element = (uint8_t)found;
  return ENL_OK;
}

EnlStatus
enl_ctab_bond_type (const EnlCtab *ctab, long type, size_t offset, size_t length)
{
  if ((type >= 1 && type <= ENL_BOND_AROMATIC) || type == ENL_BOND_CONTACT || type == 10)
    return ENL_OK;
  if (type >= 5 && type <= 8)
    return enl_ctab_fault (ctab, ENL_ERROR_UNSUPPORTED, offset, length,
                           "give the bond a certain order",
                           "bond type %ld stands for several orders (a query)", type);
  return enl_ctab_fault (ctab, ENL_ERROR_FORMAT, offset, length,
                         "use 1, 2, 3, or 4 for aromatic bonds", "there is no bond type %ld", type);
}
