/* Words for characters that do not belong into a SMILES. */
#include "core/notation/smiles-reader.h"

#include <string.h>

#include "core/molecule/elements.h"

EnlStatus
enl_smiles_locate (EnlSmilesReader *r, size_t offset, size_t length, EnlStatus status)
{
  enl_error_locate (r->err, r->text, r->size, offset, length);
  return status;
}

/* Characters that look like one of the notation, as word processors and other alphabets give them.
 */
static const struct {
  gunichar character;
  const char *meant;
} lookalike[] = {
    {0x00AD, "-"}, {0x2010, "-"}, {0x2011, "-"}, {0x2012, "-"},  {0x2013, "-"},  {0x2014, "-"},
    {0x2212, "-"}, {0xFF0D, "-"}, {0xFF1D, "="}, {0x2261, "#"},  {0xFF03, "#"},  {0xFF0B, "+"},
    {0x207A, "+"}, {0x207B, "-"}, {0xFF08, "("}, {0xFF09, ")"},  {0xFF3B, "["},  {0xFF3D, "]"},
    {0x2044, "/"}, {0x2215, "/"}, {0xFF0F, "/"}, {0x2216, "\\"}, {0xFF3C, "\\"}, {0xFF20, "@"},
    {0x0421, "C"}, {0x0441, "c"}, {0x041E, "O"}, {0x043E, "o"},  {0x041D, "H"},  {0x0412, "B"},
    {0x0420, "P"}, {0x0440, "p"}, {0x0405, "S"}, {0x0455, "s"},  {0x0406, "I"},  {0x039D, "N"},
    {0x039F, "O"}, {0x03BF, "o"}, {0x0397, "H"}, {0x0392, "B"},  {0x03A1, "P"},  {0x0399, "I"},
    {0x2080, "0"}, {0x2081, "1"}, {0x2082, "2"}, {0x2083, "3"},  {0x2084, "4"},  {0x2085, "5"},
    {0x2086, "6"}, {0x2217, "*"}, {0x00B7, "."}, {0x22C5, "."},  {0x2022, "."},  {0x2024, "."},
    {0xFF0E, "."}, {0x3002, "."}, {0xFF1A, ":"}, {0x2236, ":"},
};

static EnlStatus
report_wide_character (EnlSmilesReader *r)
{
  const char *start = r->text + r->at;
  gunichar c = g_utf8_get_char_validated (start, (gssize)(r->size - r->at));
  char copy[8] = "", advice[80];

  if (c == (gunichar)-1 || c == (gunichar)-2)
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX, "save the text as UTF-8",
                                             "byte 0x%02X is no text", (unsigned char)*start));
  size_t length = (size_t)g_unichar_to_utf8 (c, copy);
  for (size_t i = 0; i < ENL_COUNT (lookalike); i++)
    if (lookalike[i].character == c) {
      g_snprintf (advice, sizeof advice, "type '%s' on the keyboard", lookalike[i].meant);
      return enl_smiles_locate (r, r->at, length,
                                enl_error_set (r->err, ENL_ERROR_SYNTAX, advice,
                                               "'%s' (U+%04X) only looks like '%s'", copy, c,
                                               lookalike[i].meant));
    }
  if (!g_unichar_isprint (c) || g_unichar_isspace (c) || g_unichar_iszerowidth (c))
    return enl_smiles_locate (r, r->at, length,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX, "delete it",
                                             "invisible character U+%04X in the SMILES", c));
  return enl_smiles_locate (r, r->at, length,
                            enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                           "delete it or replace it by a letter of A to Z",
                                           "'%s' (U+%04X) has no meaning in a SMILES", copy, c));
}

/* Letters that chemists write and the notation does not know. */
static const struct {
  const char *written, *what, *advice;
} habit[] = {
    {"H", "hydrogen needs brackets", "write [H], or leave hydrogens out: they are filled in"},
    {"D", "'D' is no element symbol", "write deuterium as [2H]"},
    {"T", "'T' is no element symbol", "write tritium as [3H]"},
    {"R", "'R' is no element symbol", "write an unknown group as *"},
    {"X", "'X' is no element symbol", "write the halogen itself, such as Cl"},
    {"A", "'A' is no element symbol", "write an unknown atom as *"},
    {"M", "'M' is no element symbol", "write the metal in brackets, such as [Na+]"},
    {"L", "'L' is no element symbol", "chlorine is written Cl with a small l"},
    {"l", "'l' without the C of chlorine", "chlorine is written Cl"},
    {"r", "'r' without the B of bromine", "bromine is written Br"},
    {"i", "'i' is no atom", "iodine is written I, silicon [Si]"},
};

/* Bytes of an element symbol at `start` that stands without its brackets, 0 when there is none. */
static size_t
measure_bare_element (const char *start, size_t left)
{
  if (!g_ascii_isupper (*start) || *start == 'H')
    return 0;
  for (size_t length = 2; length; length--)
    if (length <= left && (length == 1 || g_ascii_islower (start[1])) &&
        enl_element_find (start, length) >= 0)
      return length;
  return 0;
}

static EnlStatus
report_bare_element (EnlSmilesReader *r, size_t offset, size_t length)
{
  const char *start = r->text + offset;
  char advice[80];

  g_snprintf (advice, sizeof advice, "write [%.*s], with charge and hydrogens inside", (int)length,
              start);
  return enl_smiles_locate (r, offset, length,
                            enl_error_set (r->err, ENL_ERROR_SYNTAX, advice,
                                           "element '%.*s' needs brackets", (int)length, start));
}

static EnlStatus
report_letter (EnlSmilesReader *r)
{
  const char *start = r->text + r->at;
  size_t length = measure_bare_element (start, r->size - r->at);

  if (length)
    return report_bare_element (r, r->at, length);
  /* "Na": N was read as nitrogen, and now there is an 'a'. */
  if (g_ascii_islower (*start) && r->at > 0 && g_ascii_isupper (start[-1]) &&
      enl_element_find (start - 1, 2) >= 0)
    return report_bare_element (r, r->at - 1, 2);
  for (size_t i = 0; i < ENL_COUNT (habit); i++)
    if (habit[i].written[0] == *start)
      return enl_smiles_locate (
          r, r->at, 1,
          enl_error_set (r->err, ENL_ERROR_SYNTAX, habit[i].advice, "%s", habit[i].what));
  return enl_smiles_locate (
      r, r->at, 1,
      enl_error_set (r->err, ENL_ERROR_SYNTAX,
                     "without brackets only B C N O P S F Cl Br I and b c n o p s are read",
                     "'%c' is no atom", *start));
}

EnlStatus
enl_smiles_report_character (EnlSmilesReader *r)
{
  unsigned char c = (unsigned char)r->text[r->at];

  if (c >= 0x80)
    return report_wide_character (r);
  if (g_ascii_isspace (c))
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "delete it, or put one structure on a line",
                                             "white space inside the SMILES"));
  if (!g_ascii_isprint (c))
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX, "delete it",
                                             "control character 0x%02X in the SMILES", c));
  if (g_ascii_isalpha (c))
    return report_letter (r);
  if (c == ']')
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "add '[' before the atom or remove ']'",
                                             "']' without '['"));
  if (c == '+' || c == '-' || c == '@')
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "put the atom in brackets, such as [O-] or [C@H]",
                                             "'%c' outside of brackets", c));
  if (c == '>')
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_UNSUPPORTED,
                                             "enter each structure by itself",
                                             "'>' writes a reaction, not a structure"));
  return enl_smiles_locate (r, r->at, 1,
                            enl_error_set (r->err, ENL_ERROR_SYNTAX, "delete or replace it",
                                           "'%c' has no meaning here", c));
}

/* The right spelling of two letters in wrong case, for the advice. */
static void
advise_on_element (const char *start, size_t length, char *advice, size_t size)
{
  char fixed[3] = "";

  for (size_t i = 0; i < length && i < 2; i++)
    fixed[i] = (char)(i ? g_ascii_tolower (start[i]) : g_ascii_toupper (start[i]));
  if (length <= 2 && enl_element_find (fixed, strlen (fixed)) >= 0)
    g_snprintf (advice, size, "write %s, with capital and small letter", fixed);
  else
    g_snprintf (advice, size, "use the symbol of an element, or * for any atom");
}

EnlStatus
enl_smiles_report_element (EnlSmilesReader *r, size_t offset)
{
  const char *start = r->text + offset;
  size_t length = 0, left = r->size - offset;
  char advice[80];

  if (left && (unsigned char)*start >= 0x80)
    return report_wide_character (r);
  while (length < left && length < 3 && g_ascii_isalpha (start[length]))
    length++;
  if (!length)
    return enl_smiles_locate (r, offset, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "write an element symbol first, such as [NH4+]",
                                             "no element symbol in the brackets"));
  if (length == 3 && start[2] == 'H')
    length--;
  advise_on_element (start, length, advice, sizeof advice);
  return enl_smiles_locate (r, offset, length,
                            enl_error_set (r->err, ENL_ERROR_UNKNOWN, advice,
                                           "unknown element '%.*s'", (int)length, start));
}
