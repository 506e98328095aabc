/* V2000: fixed columns. */
#include "core/notation/ctab.h"

#include <math.h>
#include <string.h>

#include "core/molecule/elements.h"

#define LONGEST_FIELD 24

typedef struct {
  EnlCtab *ctab;
  EnlLines *lines;
  long n_atoms, n_bonds;
  bool has_version;
  bool charges_cleared, isotopes_cleared; /* a property line replaces all of the atom block */
} V2000;

/* ---- fields ---- */

/* Start and length of what stands in the columns, without blanks around it. */
static size_t
field_span (const V2000 *in, size_t column, size_t width, size_t *length)
{
  const EnlLines *lines = in->lines;
  size_t from = MIN (column, lines->length), to = MIN (column + width, lines->length);

  while (from < to && lines->line[from] == ' ')
    from++;
  while (to > from && lines->line[to - 1] == ' ')
    to--;
  *length = to - from;
  if (from == to) /* blank: point at its first column */
    from = MIN (column, lines->length);
  return lines->start + from;
}

static EnlStatus
bad_field (const V2000 *in, size_t offset, size_t length, const char *what)
{
  static const char advice[] =
      "check that the columns of this line are where the format wants them";

  if (length == 0)
    return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, offset, 1, advice, "no %s here", what);
  return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, offset, length, advice, "'%.*s' is no %s",
                         (int)MIN (length, LONGEST_FIELD), in->ctab->text + offset, what);
}

/* The same for a number that was read but is out of range. */
static EnlStatus
bad_number (const V2000 *in, size_t column, size_t width, const char *what)
{
  size_t length, offset = field_span (in, column, width, &length);

  return bad_field (in, offset, length, what);
}

/* Whole number in the columns; blank is 0. */
static EnlStatus
read_number (const V2000 *in, size_t column, size_t width, const char *what, long *value)
{
  size_t length, offset = field_span (in, column, width, &length), i = 0;
  const char *p = in->ctab->text + offset;
  bool negative = length && *p == '-';
  long sum = 0;

  i += length && (*p == '-' || *p == '+');
  if (length && i == length)
    return bad_field (in, offset, length, what);
  for (; i < length; i++) {
    if (!g_ascii_isdigit (p[i]))
      return bad_field (in, offset, length, what);
    sum = sum * 10 + (p[i] - '0');
  }
  *value = negative ? -sum : sum;
  return ENL_OK;
}

static EnlStatus
read_coordinate (const V2000 *in, size_t column, double *value)
{
  char copy[LONGEST_FIELD + 1];
  size_t length, offset = field_span (in, column, 10, &length);
  char *end = NULL;

  memcpy (copy, in->ctab->text + offset, length);
  copy[length] = '\0';
  *value = g_ascii_strtod (copy, &end);
  if (length == 0 || *end || !isfinite (*value) || fabs (*value) > 1e6)
    return bad_field (in, offset, length, "coordinate");
  return ENL_OK;
}

/* Atom number of a bond or property line, from 1 in the file and from 0 here. */
static EnlStatus
read_atom_number (const V2000 *in, size_t column, size_t width, uint32_t *index)
{
  long number = 0;
  size_t length, offset = field_span (in, column, width, &length);
  EnlStatus status = read_number (in, column, width, "atom number", &number);

  if (status != ENL_OK)
    return status;
  if (number < 1 || number > in->n_atoms)
    return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, offset, MAX (length, 1),
                           "correct the number or the counts line",
                           "there is no atom %ld among %ld", number, in->n_atoms);
  *index = (uint32_t)(number - 1);
  return ENL_OK;
}

/* ---- counts ---- */

static EnlStatus
read_counts (V2000 *in)
{
  long lists = 0;
  EnlStatus status = read_number (in, 0, 3, "number of atoms", &in->n_atoms);

  if (status == ENL_OK)
    status = read_number (in, 3, 3, "number of bonds", &in->n_bonds);
  if (status == ENL_OK)
    status = read_number (in, 6, 3, "number of atom lists", &lists);
  if (status != ENL_OK)
    return status;
  size_t start = in->lines->start;
  if (in->n_atoms < 0 || in->n_bonds < 0)
    return bad_number (in, 0, 6, "pair of counts");
  if (in->n_atoms == 0)
    return enl_ctab_fault (in->ctab, ENL_ERROR_EMPTY, start, 3, "draw something first",
                           "the molfile holds no atoms");
  if (lists != 0)
    return enl_ctab_fault (in->ctab, ENL_ERROR_UNSUPPORTED, start + 6, 3,
                           "replace each list by a certain element",
                           "atom lists stand for several structures");
  in->has_version = in->lines->length >= 39;
  return ENL_OK;
}

static bool
is_property (const V2000 *in, const char *word)
{
  return in->lines->length >= 6 && strncmp (in->lines->line, word, 6) == 0;
}

static EnlStatus
next_line (V2000 *in, const char *block, long number, long count)
{
  if (enl_lines_step (in->lines) && !is_property (in, "M  END"))
    return ENL_OK;
  return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, in->lines->start, 1,
                         "paste the whole block, or correct the counts line",
                         "the %s block ends after %ld of %ld lines", block, number, count);
}

/* ---- atoms ---- */

static const int charge_of_code[8] = {0, 3, 2, 1, 0, -1, -2, -3}; /* 4 is a doublet radical */

static EnlStatus
read_symbol (V2000 *in, EnlCtabAtom *atom)
{
  size_t length, offset = field_span (in, 31, 3, &length);

  atom->offset = offset;
  atom->length = length;
  if (length == 0)
    return bad_field (in, offset, 0, "element symbol");
  return enl_ctab_element (in->ctab, offset, length, &atom->element, &atom->isotope);
}

static EnlStatus
read_atom_codes (V2000 *in, EnlCtabAtom *atom)
{
  long difference = 0, charge = 0, parity = 0, query = 0, valence = 0, map = 0;
  EnlStatus status = read_number (in, 34, 2, "mass difference", &difference);

  if (status == ENL_OK)
    status = read_number (in, 36, 3, "charge code", &charge);
  if (status == ENL_OK)
    status = read_number (in, 39, 3, "stereo parity", &parity);
  if (status == ENL_OK)
    status = read_number (in, 42, 3, "hydrogen count", &query);
  if (status == ENL_OK)
    status = read_number (in, 48, 3, "valence", &valence);
  if (status == ENL_OK)
    status = read_number (in, 60, 3, "atom map number", &map);
  if (status != ENL_OK)
    return status;
  size_t start = in->lines->start;
  if (charge < 0 || charge > 7)
    return bad_number (in, 36, 3, "charge code (0 to 7)");
  if (valence < 0 || valence > 15)
    return bad_number (in, 48, 3, "valence (0 to 15)");
  if (query > 0)
    return enl_ctab_fault (in->ctab, ENL_ERROR_UNSUPPORTED, start + 42, 3,
                           "remove the hydrogen count; use the valence field instead",
                           "a hydrogen count in the atom line is a query");
  if (difference)
    atom->isotope = (int)(lround (enl_element_weight (atom->element)) + difference);
  atom->charge = charge_of_code[charge];
  atom->radical = charge == 4 ? ENL_RADICAL_DOUBLET : ENL_RADICAL_NONE;
  atom->parity = (int)parity;
  atom->valence = valence == 0 ? ENL_VALENCE_DEFAULT : valence == 15 ? 0 : (int)valence;
  atom->map = (uint32_t)MAX (map, 0);
  return ENL_OK;
}

static EnlStatus
read_atom (V2000 *in)
{
  EnlCtabAtom atom = {.valence = ENL_VALENCE_DEFAULT};
  EnlStatus status = read_coordinate (in, 0, &atom.x);

  if (status == ENL_OK)
    status = read_coordinate (in, 10, &atom.y);
  if (status == ENL_OK)
    status = read_coordinate (in, 20, &atom.z);
  if (status == ENL_OK)
    status = read_symbol (in, &atom);
  if (status == ENL_OK)
    status = read_atom_codes (in, &atom);
  if (status == ENL_OK)
    g_array_append_val (in->ctab->atom, atom);
  return status;
}

/* ---- bonds ---- */

static EnlStatus
read_wedge (V2000 *in, EnlCtabBond *bond)
{
  long stereo = 0;
  EnlStatus status = read_number (in, 9, 3, "bond stereo code", &stereo);

  if (status != ENL_OK)
    return status;
  if (stereo == 1)
    bond->wedge = ENL_WEDGE_UP;
  else if (stereo == 6)
    bond->wedge = ENL_WEDGE_DOWN;
  else if (stereo == 4 || stereo == 3)
    bond->wedge = ENL_WEDGE_EITHER;
  else if (stereo != 0)
    return bad_number (in, 9, 3, "bond stereo code (0, 1, 3, 4, 6)");
  if (bond->type != 1 && bond->type != 2)
    bond->wedge = ENL_WEDGE_NONE;
  return ENL_OK;
}

static EnlStatus
read_bond (V2000 *in)
{
  EnlCtabBond bond = {.offset = in->lines->start, .length = MIN (in->lines->length, 9)};
  long type = 0;
  EnlStatus status = read_atom_number (in, 0, 3, &bond.from);

  if (status == ENL_OK)
    status = read_atom_number (in, 3, 3, &bond.to);
  if (status == ENL_OK)
    status = read_number (in, 6, 3, "bond type", &type);
  if (status == ENL_OK)
    status = enl_ctab_bond_type (in->ctab, type, in->lines->start + 6, 3);
  bond.type = (int)type;
  if (status == ENL_OK)
    status = read_wedge (in, &bond);
  if (status == ENL_OK)
    g_array_append_val (in->ctab->bond, bond);
  return status;
}

/* ---- properties ---- */

static EnlCtabAtom *
atom_at (V2000 *in, uint32_t index)
{
  return &g_array_index (in->ctab->atom, EnlCtabAtom, index);
}

static void
clear_charges (V2000 *in)
{
  if (in->charges_cleared)
    return;
  in->charges_cleared = true;
  for (uint32_t i = 0; i < in->ctab->atom->len; i++) {
    atom_at (in, i)->charge = 0;
    atom_at (in, i)->radical = ENL_RADICAL_NONE;
  }
}

static void
clear_isotopes (V2000 *in)
{
  if (in->isotopes_cleared)
    return;
  in->isotopes_cleared = true;
  for (uint32_t i = 0; i < in->ctab->atom->len; i++)
    if (atom_at (in, i)->element != 1) /* the symbols D and T keep their meaning */
      atom_at (in, i)->isotope = 0;
}

static EnlStatus
apply_charge (V2000 *in, uint32_t atom, long value, size_t column)
{
  if (value < -15 || value > 15)
    return bad_number (in, column, 4, "charge (-15 to 15)");
  atom_at (in, atom)->charge = (int)value;
  return ENL_OK;
}

static EnlStatus
apply_radical (V2000 *in, uint32_t atom, long value, size_t column)
{
  if (value < 0 || value > 3)
    return bad_number (in, column, 4, "radical code (0 to 3)");
  atom_at (in, atom)->radical = (EnlRadical)value;
  return ENL_OK;
}

static EnlStatus
apply_isotope (V2000 *in, uint32_t atom, long value, size_t column)
{
  if (value < 0 || value > 400)
    return bad_number (in, column, 4, "mass number");
  atom_at (in, atom)->isotope = (int)value;
  return ENL_OK;
}

static const struct {
  const char *word;
  void (*clear) (V2000 *in);
  EnlStatus (*apply) (V2000 *in, uint32_t atom, long value, size_t column);
} property[] = {
    {"M  CHG", clear_charges, apply_charge},
    {"M  RAD", clear_charges, apply_radical},
    {"M  ISO", clear_isotopes, apply_isotope},
};

/* "M  CHGnn8 aaa vvv ..." */
static EnlStatus
read_pairs (V2000 *in, size_t which)
{
  long count = 0;
  EnlStatus status = read_number (in, 6, 3, "number of entries", &count);

  if (status == ENL_OK && (count < 0 || count > 8))
    status = bad_number (in, 6, 3, "number of entries (1 to 8)");
  property[which].clear (in);
  for (long i = 0; status == ENL_OK && i < count; i++) {
    size_t column = 9 + 8 * (size_t)i, length;
    uint32_t atom = 0;
    long value = 0;
    field_span (in, column + 4, 4, &length);
    status = read_atom_number (in, column, 4, &atom);
    if (status == ENL_OK && length == 0)
      status = bad_number (in, column + 4, 4, "value");
    if (status == ENL_OK)
      status = read_number (in, column + 4, 4, "value", &value);
    if (status == ENL_OK)
      status = property[which].apply (in, atom, value, column + 4);
  }
  return status;
}

/* Property lines that turn the structure into a question or a family. */
static const struct {
  const char *word, *what;
} query_line[] = {
    {"M  ALS", "an atom list"},           {"M  RGP", "an R group"},
    {"M  LOG", "an R group's condition"}, {"M  SUB", "a substitution count"},
    {"M  UNS", "an unsaturation query"},  {"M  RBC", "a ring bond count"},
    {"M  LIN", "a repeated link"},        {"M  APO", "an attachment point"},
    {"M  $3D", "a spatial query"},
};

static EnlStatus
read_property (V2000 *in)
{
  for (size_t i = 0; i < ENL_COUNT (property); i++)
    if (is_property (in, property[i].word))
      return read_pairs (in, i);
  for (size_t i = 0; i < ENL_COUNT (query_line); i++)
    if (is_property (in, query_line[i].word))
      return enl_ctab_fault (in->ctab, ENL_ERROR_UNSUPPORTED, in->lines->start, in->lines->length,
                             "draw one certain structure", "'%s' is %s, not one structure",
                             query_line[i].word, query_line[i].what);
  /* An alias or group label has its text on the line below it. */
  if (in->lines->length >= 3 &&
      (strncmp (in->lines->line, "A  ", 3) == 0 || strncmp (in->lines->line, "G  ", 3) == 0))
    enl_lines_step (in->lines);
  return ENL_OK; /* Sgroups, values and data do not change the structure */
}

static EnlStatus
read_properties (V2000 *in)
{
  while (enl_lines_step (in->lines)) {
    if (is_property (in, "M  END"))
      return ENL_OK;
    if (!in->has_version && in->lines->length >= 4 && strncmp (in->lines->line, "$$$$", 4) == 0)
      return ENL_OK;
    EnlStatus status = read_property (in);
    if (status != ENL_OK)
      return status;
  }
  if (!in->has_version) /* the oldest files end with their bonds */
    return ENL_OK;
  return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, in->lines->start, 1,
                         "paste the whole block, with its last line",
                         "the molfile has no line 'M  END'");
}

EnlStatus
enl_ctab_read_v2000 (EnlCtab *ctab, EnlLines *lines)
{
  V2000 in = {.ctab = ctab, .lines = lines};
  EnlStatus status = read_counts (&in);

  for (long i = 0; status == ENL_OK && i < in.n_atoms; i++) {
    status = next_line (&in, "atom", i, in.n_atoms);
    if (status == ENL_OK)
      status = read_atom (&in);
  }
  for (long i = 0; status == ENL_OK && i < in.n_bonds; i++) {
    status = next_line (&in, "bond", i, in.n_bonds);
    if (status == ENL_OK)
      status = read_bond (&in);
  }
  return status == ENL_OK ? read_properties (&in) : status;
}
