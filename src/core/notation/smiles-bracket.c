/* Bracket atoms: [isotope symbol chirality hydrogens charge :class], OpenSMILES 1.0 section 3.1. */
#include "core/notation/smiles-reader.h"

#include <string.h>

#include "core/molecule/elements.h"

enum { MAX_ISOTOPE = 999, MAX_CHARGE = 15, MAX_MAP = 99999999 };

static int
peek (const EnlSmilesReader *r)
{
  return r->at < r->size ? (unsigned char)r->text[r->at] : -1;
}

static bool
take (EnlSmilesReader *r, char c)
{
  if (peek (r) != c)
    return false;
  r->at++;
  return true;
}

/* Digits as a number; -1 when there are none, limit + 1 when it is larger. */
static int64_t
take_number (EnlSmilesReader *r, int64_t limit)
{
  int64_t value = 0;
  size_t start = r->at;

  for (; r->at < r->size && g_ascii_isdigit (r->text[r->at]); r->at++)
    value = MIN (value * 10 + (r->text[r->at] - '0'), limit + 1);
  return r->at == start ? -1 : value;
}

static EnlStatus
read_isotope (EnlSmilesReader *r, EnlAtom *atom)
{
  size_t start = r->at;
  int64_t isotope = take_number (r, MAX_ISOTOPE);

  if (isotope > MAX_ISOTOPE)
    return enl_smiles_locate (r, start, r->at - start,
                              enl_error_set (r->err, ENL_ERROR_RANGE,
                                             "give the mass number with up to three digits",
                                             "no such isotope"));
  atom->isotope = (uint16_t)MAX (isotope, 0);
  return ENL_OK;
}

/* Element numbers of the symbols that may stand in lower case. */
static int
find_aromatic (const char *text, size_t size, size_t *length)
{
  static const struct {
    char symbol[3];
    uint8_t element;
  } known[] = {{"se", 34}, {"as", 33}, {"te", 52}, {"b", 5}, {"c", 6},
               {"n", 7},   {"o", 8},   {"p", 15},  {"s", 16}};

  for (size_t i = 0; i < ENL_COUNT (known); i++) {
    *length = strlen (known[i].symbol);
    if (*length <= size && memcmp (text, known[i].symbol, *length) == 0)
      return known[i].element;
  }
  return -1;
}

static EnlStatus
read_symbol (EnlSmilesReader *r, EnlAtom *atom, EnlSmilesAtom *more)
{
  const char *text = r->text + r->at;
  size_t left = r->size - r->at, length = 1;
  int element = -1;

  if (left && *text == '*') {
    element = 0;
  } else if (left && g_ascii_isupper (*text)) {
    length = left > 1 && g_ascii_islower (text[1]) ? 2 : 1;
    element = enl_element_find (text, length);
  } else if (left && g_ascii_islower (*text)) {
    element = find_aromatic (text, left, &length);
    more->aromatic = element >= 0;
  }
  if (element < 0)
    return enl_smiles_report_element (r, r->at);
  atom->element = (uint8_t)element;
  r->at += length;
  return ENL_OK;
}

/* Permutation numbers of the named chirality classes. */
static EnlStatus
read_chirality_class (EnlSmilesReader *r, EnlSmilesAtom *more)
{
  static const struct {
    char name[3];
    uint8_t largest;
  } known[] = {{"TH", 2}, {"AL", 2}, {"SP", 3}, {"TB", 20}, {"OH", 30}};
  size_t start = r->at;

  for (size_t i = 0; i < ENL_COUNT (known); i++) {
    if (r->size - r->at < 2 || memcmp (r->text + r->at, known[i].name, 2) != 0)
      continue;
    r->at += 2;
    int64_t number = take_number (r, known[i].largest);
    if (number < 1 || number > known[i].largest)
      return enl_smiles_locate (
          r, start, r->at - start,
          enl_error_set (r->err, ENL_ERROR_SYNTAX, "use a number of the class",
                         "'@%s' takes a number from 1 to %u", known[i].name, known[i].largest));
    if (i == 0)
      more->turn = number == 1 ? TURN_ANTICLOCKWISE : TURN_CLOCKWISE;
    return ENL_OK;
  }
  more->turn = TURN_ANTICLOCKWISE;
  return ENL_OK;
}

static EnlStatus
read_chirality (EnlSmilesReader *r, EnlSmilesAtom *more)
{
  if (!take (r, '@'))
    return ENL_OK;
  if (take (r, '@')) {
    more->turn = TURN_CLOCKWISE;
    return ENL_OK;
  }
  return read_chirality_class (r, more);
}

static EnlStatus
read_hydrogens (EnlSmilesReader *r, EnlAtom *atom)
{
  size_t start = r->at;

  if (!take (r, 'H'))
    return ENL_OK;
  int64_t count = take_number (r, 9);
  if (count > 9)
    return enl_smiles_locate (r, start, r->at - start,
                              enl_error_set (r->err, ENL_ERROR_RANGE,
                                             "give at most 9 hydrogens with one digit",
                                             "too many hydrogens on one atom"));
  atom->hydrogens = (uint8_t)(count < 0 ? 1 : count);
  /* OpenSMILES has no hydrogen count on hydrogen, but [HH] for H2 is common in public files. */
  if (atom->element == 1 && atom->hydrogens > 1)
    return enl_smiles_locate (r, start, r->at - start,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX, "write H2 as [H][H]",
                                             "a hydrogen atom cannot carry hydrogens"));
  return ENL_OK;
}

static EnlStatus
read_charge (EnlSmilesReader *r, EnlAtom *atom)
{
  size_t start = r->at;
  int sign = peek (r);
  int64_t charge = 0;

  if (sign != '+' && sign != '-')
    return ENL_OK;
  while (take (r, (char)sign) && charge <= MAX_CHARGE)
    charge++;
  if (charge == 1) {
    int64_t number = take_number (r, MAX_CHARGE);
    charge = number < 0 ? 1 : number;
  }
  if (charge > MAX_CHARGE)
    return enl_smiles_locate (r, start, r->at - start,
                              enl_error_set (r->err, ENL_ERROR_RANGE,
                                             "use a charge between -15 and +15",
                                             "charge is too large"));
  atom->charge = (int8_t)(sign == '+' ? charge : -charge);
  return ENL_OK;
}

static EnlStatus
read_map (EnlSmilesReader *r, EnlAtom *atom)
{
  size_t start = r->at;

  if (!take (r, ':'))
    return ENL_OK;
  int64_t map = take_number (r, MAX_MAP);
  if (map < 0)
    return enl_smiles_locate (r, start, 1,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "write a number behind ':' or remove it",
                                             "':' in brackets without an atom map number"));
  if (map > MAX_MAP)
    return enl_smiles_locate (r, start, r->at - start,
                              enl_error_set (r->err, ENL_ERROR_RANGE, "use at most 8 digits",
                                             "atom map number is too large"));
  atom->map = (uint32_t)map;
  return ENL_OK;
}

static EnlStatus
report_unclosed (EnlSmilesReader *r, size_t start)
{
  return enl_smiles_locate (r, start, r->size - start,
                            enl_error_set (r->err, ENL_ERROR_SYNTAX, "add ']' behind the atom",
                                           "bracket '[' is never closed"));
}

/* The bracket has something behind its last part: a part out of order, or a stray character. */
static EnlStatus
report_order (EnlSmilesReader *r, size_t symbol)
{
  static const struct {
    char start;
    const char *what;
  } part[] = {{'@', "chirality '@' stands too late"},
              {'H', "hydrogen count stands too late"},
              {'+', "charge stands too late"},
              {'-', "charge stands too late"}};

  for (size_t i = 0; i < ENL_COUNT (part); i++)
    if (peek (r) == part[i].start)
      return enl_smiles_locate (
          r, r->at, 1,
          enl_error_set (r->err, ENL_ERROR_SYNTAX,
                         "use the order isotope, element, chirality, hydrogens, charge, :map",
                         "%s in the brackets", part[i].what));
  if (g_ascii_isalpha (peek (r)) && g_ascii_isalpha (r->text[r->at - 1]))
    return enl_smiles_report_element (r, symbol);
  if ((unsigned char)peek (r) >= 0x80)
    return enl_smiles_report_character (r);
  return enl_smiles_locate (r, r->at, 1,
                            enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                           "close the brackets before it, or remove it",
                                           "'%c' has no meaning in the brackets", peek (r)));
}

EnlStatus
enl_smiles_read_bracket (EnlSmilesReader *r, EnlAtom *atom, EnlSmilesAtom *more)
{
  size_t start = r->at++, symbol;
  EnlStatus status = ENL_OK;

  if (peek (r) == ']')
    return enl_smiles_locate (r, start, 2,
                              enl_error_set (r->err, ENL_ERROR_SYNTAX,
                                             "write an element symbol inside, such as [Na+]",
                                             "empty brackets"));
  atom->exact = true;
  if ((status = read_isotope (r, atom)) != ENL_OK)
    return status;
  if (peek (r) < 0)
    return report_unclosed (r, start);
  symbol = r->at;
  if ((status = read_symbol (r, atom, more)) != ENL_OK ||
      (status = read_chirality (r, more)) != ENL_OK ||
      (status = read_hydrogens (r, atom)) != ENL_OK || (status = read_charge (r, atom)) != ENL_OK ||
      (status = read_map (r, atom)) != ENL_OK)
    return status;
  if (peek (r) < 0 || peek (r) == '[' || peek (r) == '(' || peek (r) == ')')
    return report_unclosed (r, start);
  if (!take (r, ']'))
    return report_order (r, symbol);
  return ENL_OK;
}
