/* What the line reader's parts share: looking ahead, counts, atoms and their free bonds. */
#include "core/notation/group-line.h"

#include <stdarg.h>
#include <string.h>

#define MOST_COPIES 40 /* of one group or branch */

/* ---- errors ---- */

EnlStatus
enl_group_fault (EnlGroupLine *line, EnlStatus code, size_t at, size_t length, const char *advice,
                 const char *format, ...)
{
  char text[sizeof line->err->text];
  va_list args;

  va_start (args, format);
  g_vsnprintf (text, sizeof text, format, args);
  va_end (args);
  enl_error_set (line->err, code, advice, "%s", text);
  enl_error_locate (line->err, line->text, line->size, at, length);
  return code;
}

/* ---- looking at the text ---- */

char
enl_group_peek (const EnlGroupLine *line, size_t ahead)
{
  return line->at + ahead < line->size ? line->text[line->at + ahead] : '\0';
}

bool
enl_group_looks_at (const EnlGroupLine *line, const char *word)
{
  size_t n = strlen (word);
  return line->size - line->at >= n && memcmp (line->text + line->at, word, n) == 0;
}

bool
enl_group_ends_after (const EnlGroupLine *line, size_t ahead)
{
  return line->at + ahead >= line->size || line->text[line->at + ahead] == ')';
}

/* Reads a count behind a unit; 1 when there is none, 0 when it is out of range. Subscript digits of
 * Unicode count as digits. */
int
enl_group_read_count (EnlGroupLine *line)
{
  int count = 0;
  bool any = false;

  while (line->at < line->size) {
    int digit = -1;
    if (g_ascii_isdigit (enl_group_peek (line, 0)))
      digit = enl_group_peek (line, 0) - '0', line->at++;
    else if (enl_group_looks_at (line, "\xE2\x82") &&
             (unsigned char)enl_group_peek (line, 2) >= 0x80 &&
             (unsigned char)enl_group_peek (line, 2) <= 0x89)
      digit = (unsigned char)enl_group_peek (line, 2) - 0x80, line->at += 3;
    if (digit < 0)
      break;
    any = true;
    count = MIN (count * 10 + digit, MOST_COPIES + 1);
  }
  return !any ? 1 : count > MOST_COPIES ? 0 : count;
}

EnlStatus
enl_group_bad_count (EnlGroupLine *line, size_t at)
{
  return enl_group_fault (line, ENL_ERROR_LIMIT, at, line->at - at, "write a count from 1 to 40",
                          "the count '%.*s' is out of range", (int)(line->at - at),
                          line->text + at);
}

/* ---- atoms and bonds ---- */

int *
enl_group_open (EnlGroupLine *line, uint32_t atom)
{
  return &g_array_index (line->open, int, atom);
}

uint32_t
enl_group_add_atom (EnlGroupLine *line, uint8_t element, int hydrogens, int open, size_t at)
{
  EnlAtom atom = {.element = element, .hydrogens = (uint8_t)hydrogens};

  atom.offset = (uint32_t)at;
  atom.length = (uint32_t)MAX (line->at - at, 1);
  uint32_t index = enl_molecule_add_atom (line->mol, &atom);
  enl_molecule_edit_atom (line->mol, index)->input = index + 1;
  g_array_append_val (line->open, open);
  return index;
}

void
enl_group_join (EnlGroupLine *line, uint32_t a, uint32_t b, int order)
{
  enl_molecule_add_bond (line->mol, a, b, (uint8_t)order);
  *enl_group_open (line, a) -= order;
  *enl_group_open (line, b) -= order;
}

EnlStatus
enl_group_too_many_bonds (EnlGroupLine *line, uint32_t atom, size_t at)
{
  const EnlAtom *holder = enl_molecule_edit_atom (line->mol, atom);

  return enl_group_fault (line, ENL_ERROR_SYNTAX, at, MAX (line->at - at, 1),
                          "check the hydrogens before it, or write the structure as SMILES",
                          "'%.*s' has no free bond for what follows", (int)holder->length,
                          line->text + holder->offset);
}

/* Bonds the written unit's first atom has to its left (and to hydrogens). */
int
enl_group_bonds (const EnlGroupLine *line)
{
  int left = line->current != ENL_NONE ? line->order : line->lead;

  return left + (int)line->waiting->len + line->waiting_hydrogens;
}

/* Joins chain atom `atom` to what stands left of it. */
EnlStatus
enl_group_attach (EnlGroupLine *line, uint32_t atom, size_t at)
{
  enl_molecule_edit_atom (line->mol, atom)->hydrogens += (uint8_t)line->waiting_hydrogens;
  *enl_group_open (line, atom) -= line->waiting_hydrogens;
  for (uint32_t i = 0; i < line->waiting->len; i++)
    enl_group_join (line, g_array_index (line->waiting, uint32_t, i), atom, 1);
  g_array_set_size (line->waiting, 0);
  line->waiting_hydrogens = 0;
  if (line->current != ENL_NONE) {
    if (*enl_group_open (line, line->current) < line->order)
      return enl_group_too_many_bonds (line, line->current, at);
    enl_group_join (line, line->current, atom, line->order);
  }
  if (*enl_group_open (line, atom) < 0)
    return enl_group_too_many_bonds (line, atom, at);
  line->order = 1;
  /* A closed unit (OH, NH2) is a substituent: the chain goes on at the atom before it. */
  if (line->current == ENL_NONE || *enl_group_open (line, atom) > 0)
    line->current = atom;
  return ENL_OK;
}

uint32_t
enl_group_add_partner (EnlGroupLine *line, uint32_t atom, uint8_t element, int order, int left_open,
                       size_t at)
{
  uint32_t partner = enl_group_add_atom (line, element, 0, order + left_open, at);

  enl_group_join (line, atom, partner, order);
  return partner;
}
