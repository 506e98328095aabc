/* SMILES reader, first half: text to written graph. Follows the grammar of OpenSMILES 1.0, without
 * recursion, so that nesting has no limit but that of the atoms. */
#include "core/notation/smiles.h"

#include <string.h>

#include "core/notation/smiles-reader.h"

static EnlStatus
report_dangling_bond (EnlSmilesReader *r)
{
  return enl_smiles_locate (r, r->symbol_at, 1,
                            enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                           "write the second atom behind it or remove the bond",
                                           "bond '%c' leads to no atom", r->symbol));
}

/* `fluid`: both ends are aromatic, so that an unwritten bond is, too. */
static void
set_bond (char symbol, bool fluid, EnlBond *bond, EnlSmilesBond *more)
{
  static const char orders[] = "-=#$"; /* 1 to 4 */
  const char *place = symbol ? strchr (orders, symbol) : NULL;

  bond->order = (uint8_t)(place ? place - orders + 1 : 1);
  more->soft = symbol == ':' || (!symbol && fluid);
  more->direction = (int8_t)(symbol == '/' ? 1 : symbol == '\\' ? -1 : 0);
}

static EnlStatus
report_bond_limit (EnlSmilesReader *r)
{
  return enl_smiles_locate (r, r->at, 1,
                            enl_error_set (r->err, ENL_ERROR_LIMIT, "enter a smaller structure",
                                           "more than %d bonds", ENL_SMILES_MAX_BONDS));
}

/* '*' goes with the atoms beside it. */
static bool
are_aromatic (const EnlSmilesReader *r, uint32_t a, uint32_t b)
{
  const EnlSmilesAtom *atom = (const EnlSmilesAtom *)(const void *)r->atom->data;

  return (atom[a].aromatic || enl_molecule_atom (r->mol, a)->element == 0) &&
         (atom[b].aromatic || enl_molecule_atom (r->mol, b)->element == 0);
}

/* Adds the pending bond from the previous atom to the new one. */
static void
add_chain_bond (EnlSmilesReader *r, uint32_t atom, size_t offset)
{
  EnlSmilesBond more = {.key_from = (uint32_t)offset + 2, .offset = (uint32_t)r->symbol_at};
  uint32_t index = enl_molecule_add_bond (r->mol, r->previous, atom, 1);

  set_bond (r->symbol, are_aromatic (r, r->previous, atom), enl_molecule_edit_bond (r->mol, index),
            &more);
  g_array_append_val (r->bond, more);
}

static EnlStatus
add_atom (EnlSmilesReader *r, EnlAtom *atom, const EnlSmilesAtom *more, size_t offset)
{
  uint32_t index = enl_molecule_atoms (r->mol);

  if (index >= ENL_MAX_ATOMS)
    return enl_smiles_locate (r, offset, r->at - offset,
                              enl_error_set (r->err, ENL_ERROR_LIMIT, "enter a smaller structure",
                                             "more than %d atoms", ENL_MAX_ATOMS));
  if (enl_molecule_bonds (r->mol) >= ENL_SMILES_MAX_BONDS)
    return report_bond_limit (r);
  atom->input = index + 1;
  atom->offset = (uint32_t)offset;
  atom->length = (uint32_t)(r->at - offset);
  enl_molecule_add_atom (r->mol, atom);
  g_array_append_vals (r->atom, more, 1);
  if (r->previous != ENL_NONE)
    add_chain_bond (r, index, offset);
  r->previous = index;
  r->symbol = 0;
  r->fresh = r->dotted = false;
  return ENL_OK;
}

static EnlStatus
read_bracket_atom (EnlSmilesReader *r)
{
  EnlAtom atom = {0};
  EnlSmilesAtom more = {0};
  size_t start = r->at;
  EnlStatus status = enl_smiles_read_bracket (r, &atom, &more);

  return status == ENL_OK ? add_atom (r, &atom, &more, start) : status;
}

/* Element of an atom that needs no brackets, 0 for '*', -1 for anything else. */
static int
find_organic (const EnlSmilesReader *r, size_t *length, bool *aromatic)
{
  char next = '\0';

  if (r->at + 1 < r->size)
    next = r->text[r->at + 1];
  *length = 1;
  *aromatic = false;
  switch (r->text[r->at]) {
  case '*':
    return 0;
  case 'B':
    return next == 'r' ? (*length = 2, 35) : 5;
  case 'C':
    return next == 'l' ? (*length = 2, 17) : 6;
  case 'N':
    return 7;
  case 'O':
    return 8;
  case 'P':
    return 15;
  case 'S':
    return next == 'i' ? -1 : 16;
  case 'F':
    return 9;
  case 'I':
    return 53;
  default:
    break;
  }
  static const char small[] = "bcnops";
  static const uint8_t element[] = {5, 6, 7, 8, 15, 16};
  const char *place = strchr (small, r->text[r->at]);
  *aromatic = true;
  return place && *place ? element[place - small] : -1;
}

static EnlStatus
read_organic_atom (EnlSmilesReader *r)
{
  EnlSmilesAtom more = {0};
  size_t start = r->at, length;
  int element = find_organic (r, &length, &more.aromatic);

  if (element < 0)
    return enl_smiles_report_character (r);
  EnlAtom atom = {.element = (uint8_t)element};
  r->at += length;
  return add_atom (r, &atom, &more, start);
}

static EnlSmilesBranch
last_branch (const EnlSmilesReader *r)
{
  return g_array_index (r->branch, EnlSmilesBranch, r->branch->len - 1);
}

static EnlStatus
open_branch (EnlSmilesReader *r)
{
  EnlSmilesBranch branch = {r->previous, (uint32_t)r->at};

  if (r->fresh)
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "start the branch with an atom or a bond",
                                             "'(' directly behind '('"));
  if (r->symbol)
    return enl_smiles_locate (r, r->symbol_at, 2,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "write the bond inside the parentheses, as in C(=O)",
                                             "bond '%c' stands before '('", r->symbol));
  if (r->previous == ENL_NONE)
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "write the atom that carries the branch before it",
                                             "branch '(' without an atom before it"));
  g_array_append_val (r->branch, branch);
  r->fresh = true;
  r->at++;
  return ENL_OK;
}

static EnlStatus
report_empty_dot (EnlSmilesReader *r)
{
  return enl_smiles_locate (r, r->dot_at, 1,
                            enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                           "write another part behind it or remove it",
                                           "'.' with nothing behind it"));
}

static EnlStatus
close_branch (EnlSmilesReader *r)
{
  if (r->branch->len == 0)
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "remove it or open the branch with '('",
                                             "')' without '('"));
  if (r->symbol)
    return report_dangling_bond (r);
  if (r->dotted)
    return report_empty_dot (r);
  EnlSmilesBranch branch = last_branch (r);
  if (r->fresh)
    return enl_smiles_locate (r, branch.offset, r->at + 1 - branch.offset,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "write a branch inside or remove them",
                                             "empty parentheses"));
  r->previous = branch.atom;
  g_array_set_size (r->branch, r->branch->len - 1);
  r->at++;
  return ENL_OK;
}

static EnlStatus
read_dot (EnlSmilesReader *r)
{
  if (r->symbol)
    return report_dangling_bond (r);
  if (r->dotted)
    return report_empty_dot (r);
  if (r->previous == ENL_NONE)
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "write a part before it or remove it",
                                             "'.' with nothing before it"));
  r->previous = ENL_NONE;
  r->fresh = false;
  r->dotted = true;
  r->dot_at = r->at++;
  return ENL_OK;
}

static EnlStatus
read_bond (EnlSmilesReader *r)
{
  char symbol = r->text[r->at];

  if (r->symbol)
    return enl_smiles_locate (r, r->symbol_at, r->at + 1 - r->symbol_at,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX, "keep one of them",
                                             "two bond symbols '%c%c' in a row", r->symbol,
                                             symbol));
  if (r->previous == ENL_NONE)
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "write the first atom before it or remove the bond",
                                             "bond '%c' without an atom before it", symbol));
  r->symbol = symbol;
  r->symbol_at = r->at++;
  return ENL_OK;
}

/* ---- ring closures ---- */

/* "123)" behind "%(". */
static int
read_long_ring_number (const char *digits, size_t left, size_t *length)
{
  int number = 0;
  size_t n = 0;

  while (n < left && n < 3 && g_ascii_isdigit (digits[n]))
    number = number * 10 + (digits[n++] - '0');
  if (n == left || digits[n] != ')')
    return -1;
  *length = n + 3;
  return number;
}

static int
read_ring_number (EnlSmilesReader *r, size_t *length)
{
  const char *start = r->text + r->at;
  size_t left = r->size - r->at;

  *length = 1;
  if (*start != '%')
    return *start - '0';
  if (left > 4 && start[1] == '(' && g_ascii_isdigit (start[2]))
    return read_long_ring_number (start + 2, left - 2, length);
  if (left < 3 || !g_ascii_isdigit (start[1]) || !g_ascii_isdigit (start[2]))
    return -1;
  *length = 3;
  return (start[1] - '0') * 10 + (start[2] - '0');
}

static EnlStatus
report_ring (EnlSmilesReader *r, size_t length, const char *advice, int number, const char *what)
{
  return enl_smiles_locate (
      r, r->at, length,
      enl_error_set (r->err, ENL_ERROR_SYNTAX, advice, "ring number %d %s", number, what));
}

static void
open_ring (EnlSmilesReader *r, EnlSmilesRing *ring, size_t length)
{
  *ring = (EnlSmilesRing){.atom = r->previous,
                          .offset = (uint32_t)r->at,
                          .length = (uint32_t)length,
                          .bond_offset = (uint32_t)r->symbol_at,
                          .bond = r->symbol,
                          .open = true};
}

static bool
is_direction (char symbol)
{
  return symbol == '/' || symbol == '\\';
}

/* Two symbols of one ring bond agree when they are the same order; '/' at one end is '\' at the
 * other, and either is a single bond. */
static bool
do_agree (char opening, char closing)
{
  if (!opening || !closing)
    return true;
  if (is_direction (opening) && is_direction (closing))
    return opening != closing;
  if (is_direction (opening) || is_direction (closing))
    return opening == '-' || closing == '-';
  return opening == closing;
}

static EnlStatus
close_ring (EnlSmilesReader *r, EnlSmilesRing *ring, int number, size_t length)
{
  char symbol = r->symbol;
  size_t symbol_at = r->symbol_at;

  if (ring->atom == r->previous)
    return report_ring (r, length, "close it at another atom", number, "bonds an atom to itself");
  if (!do_agree (ring->bond, r->symbol))
    return enl_smiles_locate (
        r, r->symbol_at, r->at + length - r->symbol_at,
        enl_error_set (r->err, ENL_ERROR_SYNTAX, "write the bond at one end, or the same at both",
                       "ring number %d is opened with '%c' and closed with '%c'", number,
                       ring->bond, r->symbol));
  if (enl_molecule_bonds (r->mol) >= ENL_SMILES_MAX_BONDS)
    return report_bond_limit (r);
  /* A direction outranks '-', for it is one and tells more; it is turned to the opening end. */
  if (ring->bond && !is_direction (symbol)) {
    symbol = ring->bond;
    symbol_at = ring->bond_offset;
  } else if (is_direction (symbol)) {
    symbol = symbol == '/' ? '\\' : '/';
  }
  uint32_t index = enl_molecule_add_bond (r->mol, ring->atom, r->previous, 1);
  if (index == ENL_NONE)
    return report_ring (r, length, "close it at another atom or remove the number", number,
                        "bonds two atoms that are bonded already");
  EnlSmilesBond more = {
      .key_from = ring->offset + 2, .key_to = (uint32_t)r->at + 2, .offset = (uint32_t)symbol_at};
  set_bond (symbol, are_aromatic (r, ring->atom, r->previous),
            enl_molecule_edit_bond (r->mol, index), &more);
  g_array_append_val (r->bond, more);
  ring->open = false;
  return ENL_OK;
}

static EnlStatus
read_ring (EnlSmilesReader *r)
{
  size_t length;
  int number = read_ring_number (r, &length);
  EnlStatus status = ENL_OK;

  if (number < 0)
    return enl_smiles_locate (r, r->at, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "write two digits behind '%', as in %12",
                                             "'%%' without two digits"));
  if (r->previous == ENL_NONE || r->fresh)
    return report_ring (r, length, "write it directly behind an atom", number,
                        "without an atom before it");
  if (r->ring[number].open)
    status = close_ring (r, &r->ring[number], number, length);
  else
    open_ring (r, &r->ring[number], length);
  r->symbol = 0;
  r->at += length;
  return status;
}

/* ---- the whole text ---- */

static EnlStatus
read_token (EnlSmilesReader *r)
{
  switch (r->text[r->at]) {
  case '[':
    return read_bracket_atom (r);
  case '(':
    return open_branch (r);
  case ')':
    return close_branch (r);
  case '.':
    return read_dot (r);
  case '-':
  case '=':
  case '#':
  case '$':
  case ':':
  case '/':
  case '\\':
    return read_bond (r);
  case '%':
    return read_ring (r);
  default:
    return g_ascii_isdigit (r->text[r->at]) ? read_ring (r) : read_organic_atom (r);
  }
}

static EnlStatus
check_open_ends (EnlSmilesReader *r)
{
  const EnlSmilesRing *first = NULL;

  if (r->symbol)
    return report_dangling_bond (r);
  if (r->branch->len) {
    return enl_smiles_locate (r, last_branch (r).offset, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX, "add ')' behind the branch",
                                             "branch '(' is never closed"));
  }
  if (r->dotted)
    return report_empty_dot (r);
  for (size_t i = 0; i < ENL_COUNT (r->ring); i++)
    if (r->ring[i].open && (!first || r->ring[i].offset < first->offset))
      first = &r->ring[i];
  if (!first)
    return ENL_OK;
  return enl_smiles_locate (
      r, first->offset, first->length,
      enl_error_set (r->err, ENL_ERROR_SYNTAX, "write the number at the other end of the ring, too",
                     "ring number %d is never closed", (int)(first - r->ring)));
}

static EnlStatus
read_all (EnlSmilesReader *r)
{
  EnlStatus status = ENL_OK;

  while (status == ENL_OK && r->at < r->size)
    status = read_token (r);
  if (status == ENL_OK)
    status = check_open_ends (r);
  return status == ENL_OK ? enl_smiles_build (r) : status;
}

static bool
is_space (char c)
{
  return g_ascii_isspace (c);
}

EnlStatus
enl_smiles_parse (const char *text, size_t size, EnlMolecule **out, EnlError *err)
{
  EnlSmilesReader r = {.text = text, .size = size, .err = err, .previous = ENL_NONE};

  *out = NULL;
  while (r.size && is_space (text[r.size - 1]))
    r.size--;
  while (r.at < r.size && is_space (text[r.at]))
    r.at++;
  if (r.at == r.size)
    return enl_smiles_locate (
        &r, r.at, 1,
        enl_error_set (err, ENL_ERROR_EMPTY, "enter a SMILES, such as CC(=O)C", "no structure"));
  if (r.size > ENL_SMILES_MAX_SIZE)
    return enl_error_set (err, ENL_ERROR_LIMIT, "enter one structure at a time",
                          "%zu bytes are too much for one structure", r.size);
  g_autoptr (EnlMolecule) mol = enl_molecule_new ();
  r.mol = mol;
  r.atom = g_array_sized_new (FALSE, FALSE, sizeof (EnlSmilesAtom), 64);
  r.bond = g_array_sized_new (FALSE, FALSE, sizeof (EnlSmilesBond), 64);
  r.branch = g_array_sized_new (FALSE, FALSE, sizeof (EnlSmilesBranch), 16);
  EnlStatus status = read_all (&r);
  g_array_unref (r.atom);
  g_array_unref (r.bond);
  g_array_unref (r.branch);
  if (status == ENL_OK)
    *out = g_steal_pointer (&mol);
  return status;
}
