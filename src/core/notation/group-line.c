/* The line of groups: a chain is read from left to right, every unit is joined to the last atom
 * that still has a free bond.
 *
 *   line   = { prefix } unit { [bond] unit | branch }
 *   prefix = terminal with a count, or a branch with a count: "Ph2", "(CH3)2", "H2"
 *   unit   = atom with its hydrogens ("CH2"), or one of the written-together groups
 *            CO CO2 COO CHO CN CS NO2 N3 SO SO2 SO3 and, from the left, O2C OOC OHC NC O2N
 *   branch = "(" line ")" [count]: hangs on the last atom; when it has two free ends, like
 *            (CH2)4, its copies form a chain
 *
 * What a written-together group means depends on how many bonds its first atom already has: CO is
 * a carbonyl group in CH3COCH3, and an ether in (CH3)3COCH3. */
#include "core/notation/groups.h"

#include <stdarg.h>
#include <string.h>

#include "core/molecule/valence.h"
#include "core/notation/smiles.h"

#define LONGEST_LINE   500 /* bytes */
#define MOST_COPIES    40  /* of one group or branch */
#define DEEPEST_BRANCH 12

typedef struct {
  const char *text;
  size_t size, at;
  EnlMolecule *mol;
  GArray *open;     /* int, free bonds of every atom */
  uint32_t current; /* the atom that the next unit hangs on; ENL_NONE at a start */
  GArray *waiting;  /* uint32_t, atoms that the next chain atom takes ("Ph2" before "CO") */
  int waiting_hydrogens;
  size_t waiting_at; /* where they were written */
  int order;         /* of the next bond: 1, or what "=" or "#" said */
  int lead;          /* 1 where the first atom will get one more bond later: in a leading branch */
  int depth;
  EnlError *err;
} Line;

static EnlStatus read_chain (Line *line, bool in_branch);

/* ---- errors ---- */

static EnlStatus line_fault (Line *line, EnlStatus code, size_t at, size_t length,
                             const char *advice, const char *format, ...) G_GNUC_PRINTF (6, 7);

static EnlStatus
line_fault (Line *line, EnlStatus code, size_t at, size_t length, const char *advice,
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

static char
peek (const Line *line, size_t ahead)
{
  return line->at + ahead < line->size ? line->text[line->at + ahead] : '\0';
}

static bool
looks_at (const Line *line, const char *word)
{
  size_t n = strlen (word);
  return line->size - line->at >= n && memcmp (line->text + line->at, word, n) == 0;
}

static bool
ends_after (const Line *line, size_t ahead)
{
  return line->at + ahead >= line->size || line->text[line->at + ahead] == ')';
}

/* Reads a count behind a unit; 1 when there is none, 0 when it is out of range. Subscript digits of
 * Unicode count as digits. */
static int
read_count (Line *line)
{
  int count = 0;
  bool any = false;

  while (line->at < line->size) {
    int digit = -1;
    if (g_ascii_isdigit (peek (line, 0)))
      digit = peek (line, 0) - '0', line->at++;
    else if (looks_at (line, "\xE2\x82") && (unsigned char)peek (line, 2) >= 0x80 &&
             (unsigned char)peek (line, 2) <= 0x89)
      digit = (unsigned char)peek (line, 2) - 0x80, line->at += 3;
    if (digit < 0)
      break;
    any = true;
    count = MIN (count * 10 + digit, MOST_COPIES + 1);
  }
  return !any ? 1 : count > MOST_COPIES ? 0 : count;
}

static EnlStatus
bad_count (Line *line, size_t at)
{
  return line_fault (line, ENL_ERROR_LIMIT, at, line->at - at, "write a count from 1 to 40",
                     "the count '%.*s' is out of range", (int)(line->at - at), line->text + at);
}

/* ---- atoms and bonds ---- */

static int *
open_of (Line *line, uint32_t atom)
{
  return &g_array_index (line->open, int, atom);
}

static uint32_t
add_atom (Line *line, uint8_t element, int hydrogens, int open, size_t at)
{
  EnlAtom atom = {.element = element, .hydrogens = (uint8_t)hydrogens};

  atom.offset = (uint32_t)at;
  atom.length = (uint32_t)MAX (line->at - at, 1);
  uint32_t index = enl_molecule_add_atom (line->mol, &atom);
  enl_molecule_edit_atom (line->mol, index)->input = index + 1;
  g_array_append_val (line->open, open);
  return index;
}

static void
join (Line *line, uint32_t a, uint32_t b, int order)
{
  enl_molecule_add_bond (line->mol, a, b, (uint8_t)order);
  *open_of (line, a) -= order;
  *open_of (line, b) -= order;
}

static EnlStatus
too_many_bonds (Line *line, uint32_t atom, size_t at)
{
  const EnlAtom *holder = enl_molecule_edit_atom (line->mol, atom);

  return line_fault (line, ENL_ERROR_SYNTAX, at, MAX (line->at - at, 1),
                     "check the hydrogens before it, or write the structure as SMILES",
                     "'%.*s' has no free bond for what follows", (int)holder->length,
                     line->text + holder->offset);
}

/* Bonds the written unit's first atom has to its left (and to hydrogens). */
static int
bonds_so_far (const Line *line, int hydrogens)
{
  int left = line->current != ENL_NONE ? line->order : line->lead;

  return left + (int)line->waiting->len + line->waiting_hydrogens + hydrogens;
}

/* Joins chain atom `atom` to what stands left of it. */
static EnlStatus
attach (Line *line, uint32_t atom, size_t at)
{
  enl_molecule_edit_atom (line->mol, atom)->hydrogens += (uint8_t)line->waiting_hydrogens;
  *open_of (line, atom) -= line->waiting_hydrogens;
  for (uint32_t i = 0; i < line->waiting->len; i++)
    join (line, g_array_index (line->waiting, uint32_t, i), atom, 1);
  g_array_set_size (line->waiting, 0);
  line->waiting_hydrogens = 0;
  if (line->current != ENL_NONE) {
    if (*open_of (line, line->current) < line->order)
      return too_many_bonds (line, line->current, at);
    join (line, line->current, atom, line->order);
  }
  if (*open_of (line, atom) < 0)
    return too_many_bonds (line, atom, at);
  line->order = 1;
  /* A closed unit (OH, NH2) is a substituent: the chain goes on at the atom before it. */
  if (line->current == ENL_NONE || *open_of (line, atom) > 0)
    line->current = atom;
  return ENL_OK;
}

/* Double-bonded (or other) partner that the unit itself brings. */
static uint32_t
add_partner (Line *line, uint32_t atom, uint8_t element, int order, int left_open, size_t at)
{
  uint32_t partner = add_atom (line, element, 0, order + left_open, at);

  join (line, atom, partner, order);
  return partner;
}

/* ---- groups written together ---- */

/* CO, CS and, with `ester`, CO2: carbon with a double-bonded `element`. */
static EnlStatus
read_carbonyl (Line *line, size_t at, uint8_t element, bool ester)
{
  uint32_t carbon = add_atom (line, 6, 0, 4, at);

  add_partner (line, carbon, element, 2, 0, at);
  EnlStatus status = attach (line, carbon, at);
  if (status != ENL_OK || !ester)
    return status;
  uint32_t oxygen = add_atom (line, 8, 0, 2, at);
  line->current = carbon;
  if (peek (line, 0) == 'H' && !g_ascii_islower (peek (line, 1))) {
    line->at++;
    enl_molecule_edit_atom (line->mol, oxygen)->hydrogens = 1;
    *open_of (line, oxygen) -= 1;
  }
  status = attach (line, oxygen, at);
  line->current = oxygen;
  return status;
}

static EnlStatus
read_nitrile (Line *line, size_t at)
{
  uint32_t carbon = add_atom (line, 6, 0, 4, at);

  add_partner (line, carbon, 7, 3, 0, at);
  return attach (line, carbon, at);
}

static EnlStatus
read_nitro (Line *line, size_t at)
{
  uint32_t nitrogen = add_atom (line, 7, 0, 4, at);
  uint32_t oxygen;

  enl_molecule_edit_atom (line->mol, nitrogen)->charge = 1;
  add_partner (line, nitrogen, 8, 2, 0, at);
  oxygen = add_partner (line, nitrogen, 8, 1, 0, at);
  enl_molecule_edit_atom (line->mol, oxygen)->charge = -1;
  return attach (line, nitrogen, at);
}

static EnlStatus
read_azide (Line *line, size_t at)
{
  uint32_t first = add_atom (line, 7, 0, 3, at);
  uint32_t middle = add_partner (line, first, 7, 2, 2, at);
  uint32_t last = add_partner (line, middle, 7, 2, 0, at);

  enl_molecule_edit_atom (line->mol, middle)->charge = 1;
  enl_molecule_edit_atom (line->mol, last)->charge = -1;
  return attach (line, first, at);
}

/* O2C, OOC: an ester group met from its oxygen side. */
static EnlStatus
read_reversed_ester (Line *line, size_t at)
{
  line->at += 3;
  uint32_t oxygen = add_atom (line, 8, 0, 2, at);
  EnlStatus status = attach (line, oxygen, at);
  if (status != ENL_OK)
    return status;
  uint32_t carbon = add_atom (line, 6, 0, 4, at);
  add_partner (line, carbon, 8, 2, 0, at);
  line->current = oxygen;
  status = attach (line, carbon, at);
  line->current = carbon;
  return status;
}

/* SO, SO2, SO3 and PO: `oxygens` double bonds raise the valence. */
static EnlStatus
read_oxo (Line *line, size_t at, uint8_t element, int valence, int oxygens)
{
  uint32_t atom = add_atom (line, element, 0, valence, at);

  for (int i = 0; i < oxygens; i++)
    add_partner (line, atom, 8, 2, 0, at);
  return attach (line, atom, at);
}

static EnlStatus
ambiguous (Line *line, size_t at, size_t length, const char *advice)
{
  return line_fault (line, ENL_ERROR_SYNTAX, at, length, advice, "'%.*s' can mean two things here",
                     (int)length, line->text + at);
}

/* The groups that begin with a carbon without hydrogens. Sets *taken when it was one. */
static EnlStatus
read_carbon_group (Line *line, bool *taken)
{
  size_t at = line->at;
  int bonds = bonds_so_far (line, 0);
  char next = peek (line, 1), third = peek (line, 2);

  *taken = true;
  if (bonds <= 2 && next == 'O') {
    bool ester = (third == '2' || (third == 'O' && peek (line, 3) != 'O')) ||
                 (line->size - at >= 5 && memcmp (line->text + at + 2, "\xE2\x82\x82", 3) == 0);
    line->at += ester ? (third == '2' || third == 'O' ? 3 : 5) : 2;
    return read_carbonyl (line, at, 8, ester);
  }
  if (bonds <= 1 && next == 'N' && third != '(') {
    if (bonds == 1 && ends_after (line, 2)) {
      line->at += 2;
      return read_nitrile (line, at);
    }
    return ambiguous (line, at, 2,
                      "write a nitrile at the end (CH2CN) or start (NCCH2), other CN bonds as C=N");
  }
  if (bonds <= 2 && next == 'S' && third != 'O' && third != 'i' && third != 'e') {
    line->at += 2;
    return read_carbonyl (line, at, 16, false);
  }
  *taken = false;
  return ENL_OK;
}

/* The groups that begin with a nitrogen without hydrogens. */
static EnlStatus
read_nitrogen_group (Line *line, bool *taken)
{
  size_t at = line->at;
  int bonds = bonds_so_far (line, 0);

  *taken = true;
  if (looks_at (line, "NO2") && bonds <= 1 && line->waiting_hydrogens == 0) {
    line->at += 3;
    return read_nitro (line, at);
  }
  if (looks_at (line, "N3") && bonds <= 1) {
    line->at += 2;
    return read_azide (line, at);
  }
  if (looks_at (line, "NC") && line->current == ENL_NONE && bonds == line->lead &&
      peek (line, 2) != 'H') {
    line->at += 2;
    return read_nitrile (line, at);
  }
  *taken = false;
  return ENL_OK;
}

static EnlStatus
read_oxygen_group (Line *line, bool *taken)
{
  size_t at = line->at;
  bool at_start = line->current == ENL_NONE && bonds_so_far (line, 0) == line->lead;

  *taken = true;
  if (at_start && looks_at (line, "OHC") && peek (line, 3) != 'H' && !ends_after (line, 3)) {
    line->at += 3;
    uint32_t carbon = add_atom (line, 6, 1, 3, at);
    add_partner (line, carbon, 8, 2, 0, at);
    return attach (line, carbon, at);
  }
  if (at_start && looks_at (line, "O2N") && peek (line, 3) != 'H') {
    line->at += 3;
    return read_nitro (line, at);
  }
  if (!at_start && (looks_at (line, "O2C") || looks_at (line, "OOC")) && peek (line, 3) != 'H' &&
      !g_ascii_islower (peek (line, 3)))
    return read_reversed_ester (line, at);
  *taken = false;
  return ENL_OK;
}

static EnlStatus
read_sulfur_group (Line *line, bool *taken)
{
  size_t at = line->at;
  char third = peek (line, 2);

  *taken = true;
  if (looks_at (line, "SO2")) {
    line->at += 3;
    return read_oxo (line, at, 16, 6, 2);
  }
  if (looks_at (line, "SO3")) {
    line->at += 3;
    EnlStatus status = read_oxo (line, at, 16, 6, 2);
    if (status != ENL_OK)
      return status;
    int hydrogen = peek (line, 0) == 'H';
    line->at += hydrogen;
    return attach (line, add_atom (line, 8, hydrogen, 2 - hydrogen, at), at);
  }
  if (looks_at (line, "SO") && third != 'H') {
    line->at += 2;
    return read_oxo (line, at, 16, 4, 1);
  }
  *taken = false;
  return ENL_OK;
}

static EnlStatus
read_phosphorus_group (Line *line, bool *taken)
{
  size_t at = line->at;

  int bonds = bonds_so_far (line, 0);
  *taken = (looks_at (line, "PO(") && bonds <= 1) || (looks_at (line, "POCl3") && bonds == 0) ||
           (looks_at (line, "PO") && bonds == 3 && ends_after (line, 2));
  if (!*taken)
    return ENL_OK;
  line->at += 2;
  return read_oxo (line, at, 15, 5, 1);
}

/* ---- units ---- */

static const struct {
  const char *symbol;
  uint8_t element;
  int valence;
  bool halogen;
} unit_atom[] = {
    {"Cl", 17, 1, true}, {"Br", 35, 1, true}, {"Si", 14, 4, false}, {"Se", 34, 2, false},
    {"F", 9, 1, true},   {"I", 53, 1, true},  {"C", 6, 4, false},   {"N", 7, 3, false},
    {"O", 8, 2, false},  {"S", 16, 2, false}, {"P", 15, 3, false},  {"B", 5, 3, false},
};

/* Index of the element symbol at the reading point, or -1. */
static int
find_unit_atom (const Line *line)
{
  for (size_t i = 0; i < ENL_COUNT (unit_atom); i++)
    if (looks_at (line, unit_atom[i].symbol)) {
      char next = peek (line, strlen (unit_atom[i].symbol));
      return g_ascii_islower (next) && next != 'n' && next != 'i' && next != 't' && next != 's' &&
                     next != 'c'
                 ? -1
                 : (int)i;
    }
  return -1;
}

/* An atom and its hydrogens; aldehydes by the way. */
static EnlStatus
read_atom (Line *line, int which)
{
  size_t at = line->at;
  int hydrogens = 0;

  line->at += strlen (unit_atom[which].symbol);
  if (peek (line, 0) == 'H' && !g_ascii_islower (peek (line, 1))) {
    size_t count_at = ++line->at;
    hydrogens = read_count (line);
    if (hydrogens < 1 || hydrogens > unit_atom[which].valence)
      return line_fault (line, ENL_ERROR_SYNTAX, at, line->at - at, "check the count of hydrogens",
                         "'%.*s' has more hydrogens than bonds",
                         (int)(MAX (line->at, count_at) - at), line->text + at);
  } else if (g_ascii_isdigit (peek (line, 0)))
    return line_fault (line, ENL_ERROR_SYNTAX, at, 2,
                       "write each atom with its hydrogens, or a group like Et, iPr, Ph",
                       "'%.2s' does not say how its atoms are joined", line->text + at);
  bool aldehyde = unit_atom[which].element == 6 && hydrogens == 1 && peek (line, 0) == 'O' &&
                  ends_after (line, 1) && line->order == 1 && bonds_so_far (line, 0) <= 1;
  line->at += aldehyde;
  uint32_t atom = add_atom (line, unit_atom[which].element, hydrogens,
                            unit_atom[which].valence - hydrogens, at);
  if (aldehyde)
    add_partner (line, atom, 8, 2, 0, at);
  return attach (line, atom, at);
}

/* Hangs a terminal atom on the current one, or keeps it for the next chain atom. */
static EnlStatus
place_terminal (Line *line, uint32_t atom, size_t at)
{
  if (line->current == ENL_NONE) {
    line->waiting_at = line->waiting->len ? line->waiting_at : at;
    g_array_append_val (line->waiting, atom);
    return ENL_OK;
  }
  return attach (line, atom, at);
}

static EnlStatus
read_halogen (Line *line, int which)
{
  size_t at = line->at;

  line->at += strlen (unit_atom[which].symbol);
  size_t count_at = line->at;
  int count = read_count (line);
  if (count == 0)
    return bad_count (line, count_at);
  for (int i = 0; i < count; i++) {
    uint32_t atom = add_atom (line, unit_atom[which].element, 0, 1, at);
    EnlStatus status = place_terminal (line, atom, at);
    if (status != ENL_OK)
      return status;
  }
  return ENL_OK;
}

/* Copies the fragment into the molecule; returns its first atom, with one free bond. */
static uint32_t
graft (Line *line, const EnlMolecule *fragment, size_t at)
{
  uint32_t first = line->open->len;

  for (uint32_t i = 0; i < enl_molecule_atoms (fragment); i++) {
    EnlAtom atom = *enl_molecule_atom (fragment, i);
    int open = i == 0 ? 1 : 0;
    if (i == 0 && atom.hydrogens > 0)
      atom.hydrogens--;
    atom.offset = (uint32_t)at;
    atom.length = (uint32_t)(line->at - at);
    atom.input = first + i + 1;
    enl_molecule_add_atom (line->mol, &atom);
    g_array_append_val (line->open, open);
  }
  for (uint32_t i = 0; i < enl_molecule_bonds (fragment); i++) {
    const EnlBond *bond = enl_molecule_bond (fragment, i);
    enl_molecule_add_bond (line->mol, first + bond->from, first + bond->to, bond->order);
  }
  return first;
}

static EnlStatus
read_group (Line *line, size_t length, const char *smiles)
{
  g_autoptr (EnlMolecule) fragment = NULL;
  size_t at = line->at;
  EnlStatus status = enl_smiles_parse (smiles, strlen (smiles), &fragment, NULL);

  g_assert (status == ENL_OK); /* the table is ours; a test reads every row */
  line->at += length;
  size_t count_at = line->at;
  int count = read_count (line);
  if (count == 0)
    return bad_count (line, count_at);
  for (int i = 0; i < count; i++)
    if ((status = place_terminal (line, graft (line, fragment, at), at)) != ENL_OK)
      return status;
  return ENL_OK;
}

static EnlStatus
read_hydrogens (Line *line)
{
  size_t at = line->at++;
  int count = read_count (line);

  if (line->current != ENL_NONE)
    return line_fault (line, ENL_ERROR_SYNTAX, at, 1, "write hydrogens behind their atom",
                       "a hydrogen stands without an atom");
  if (count < 1 || count > 4)
    return bad_count (line, at);
  line->waiting_at = at;
  line->waiting_hydrogens += count;
  return ENL_OK;
}

/* ---- branches ---- */

static EnlStatus
read_inside (Line *line, size_t at)
{
  if (++line->depth > DEEPEST_BRANCH)
    return line_fault (line, ENL_ERROR_LIMIT, at, 1, "write the structure as SMILES",
                       "more than %d brackets inside one another", DEEPEST_BRANCH);
  line->at = at + 1;
  if (peek (line, 0) == ')')
    return line_fault (line, ENL_ERROR_SYNTAX, at, 2, "remove it", "empty brackets");
  EnlStatus status = read_chain (line, true);
  if (status != ENL_OK)
    return status;
  if (peek (line, 0) != ')')
    return line_fault (line, ENL_ERROR_SYNTAX, at, 1, "add ')'", "the bracket '(' is never closed");
  line->at++;
  line->depth--;
  return ENL_OK;
}

/* "(O)" and "(S)" are double-bonded. */
static bool
is_oxo_branch (const Line *line)
{
  return looks_at (line, "(O)") || looks_at (line, "(S)");
}

static EnlStatus
read_oxo_branch (Line *line)
{
  size_t at = line->at;
  uint8_t element = peek (line, 1) == 'O' ? 8 : 16;
  uint32_t atom = line->current;
  uint8_t host = enl_molecule_edit_atom (line->mol, atom)->element;

  line->at += 3;
  size_t count_at = line->at;
  int count = read_count (line);
  if (count == 0)
    return bad_count (line, count_at);
  for (int i = 0; i < count; i++) {
    if ((host == 15 && i == 0) || (host == 16 && i < 2))
      *open_of (line, atom) += 2; /* phosphorus(V), sulfur(IV) and (VI) */
    if ((host != 6 && host != 15 && host != 16) || *open_of (line, atom) < 2)
      return too_many_bonds (line, atom, at);
    add_partner (line, atom, element, 2, 0, at);
  }
  return ENL_OK;
}

/* A branch behind an atom: substituents, or a repeated piece of the chain. */
static EnlStatus
read_branch (Line *line)
{
  size_t at = line->at;
  uint32_t host = line->current;
  EnlStatus status = read_inside (line, at);
  if (status != ENL_OK)
    return status;
  bool chain = *open_of (line, line->current) > 0 && line->current != host;
  size_t count_at = line->at;
  int count = read_count (line);
  size_t behind = line->at;
  if (count == 0)
    return bad_count (line, count_at);
  for (int i = 1; i < count; i++) {
    if (!chain)
      line->current = host;
    if ((status = read_inside (line, at)) != ENL_OK)
      return status;
  }
  line->at = behind;
  if (!chain && *open_of (line, host) >= 0)
    line->current = host;
  return ENL_OK;
}

/* The one atom from `first` on that has exactly one free bond; ENL_NONE when there is not one. */
static uint32_t
free_end (Line *line, uint32_t first)
{
  uint32_t found = ENL_NONE;

  for (uint32_t i = first; i < line->open->len; i++) {
    int open = *open_of (line, i);
    if (open == 0)
      continue;
    if (open != 1 || found != ENL_NONE)
      return ENL_NONE;
    found = i;
  }
  return found;
}

static EnlStatus
read_leading_copy (Line *line, size_t at, GArray *outer)
{
  uint32_t first = line->open->len;

  line->current = ENL_NONE;
  line->lead = 1;
  EnlStatus status = read_inside (line, at);
  line->lead = 0;
  line->current = ENL_NONE;
  if (status != ENL_OK)
    return status;
  g_array_set_size (line->waiting, 0); /* "(Ph)2": its atom is the free end */
  uint32_t end = line->waiting_hydrogens ? ENL_NONE : free_end (line, first);
  if (end == ENL_NONE)
    return line_fault (line, ENL_ERROR_SYNTAX, at, line->at - at,
                       "let exactly one bond of it be free", "'%.*s' is no group",
                       (int)MIN (line->at - at, 60), line->text + at);
  g_array_append_val (outer, end);
  return ENL_OK;
}

/* A branch at the start: "(CH3)2CH", "(EtO)2P(O)". */
static EnlStatus
read_leading_branch (Line *line)
{
  g_autoptr (GArray) outer = g_array_copy (line->waiting);
  int hydrogens = line->waiting_hydrogens, lead = line->lead;
  size_t at = line->at, waiting_at = line->waiting->len ? line->waiting_at : at;

  g_array_set_size (line->waiting, 0);
  line->waiting_hydrogens = 0;
  EnlStatus status = read_leading_copy (line, at, outer);
  if (status != ENL_OK)
    return status;
  size_t count_at = line->at;
  int count = read_count (line);
  size_t behind = line->at;
  if (count == 0)
    return bad_count (line, count_at);
  for (int i = 1; i < count; i++)
    if ((status = read_leading_copy (line, at, outer)) != ENL_OK)
      return status;
  line->at = behind;
  line->lead = lead;
  line->waiting_hydrogens = hydrogens;
  line->waiting_at = waiting_at;
  g_array_append_vals (line->waiting, outer->data, outer->len);
  return ENL_OK;
}

/* ---- the chain ---- */

static bool
read_bond (Line *line)
{
  static const struct {
    const char *sign;
    int order;
  } sign[] = {
      {"=", 2}, {"#", 3}, {"\xE2\x89\xA1", 3}, {"-", 1}, {"\xE2\x80\x93", 1},
  };

  for (size_t i = 0; i < ENL_COUNT (sign); i++)
    if (looks_at (line, sign[i].sign)) {
      line->at += strlen (sign[i].sign);
      line->order = sign[i].order;
      if (line->order == 2 && *open_of (line, line->current) == 0 &&
          enl_molecule_edit_atom (line->mol, line->current)->element == 15)
        *open_of (line, line->current) += 2; /* an ylide: Ph3P=CH2 */
      return true;
    }
  return false;
}

static EnlStatus
unknown_unit (Line *line)
{
  const char *at = line->text + line->at;
  gunichar c = g_utf8_get_char_validated (at, (gssize)(line->size - line->at));
  bool valid = c != (gunichar)-1 && c != (gunichar)-2;
  size_t length = valid ? (size_t)(g_utf8_next_char (at) - at) : 1;

  if (g_ascii_isupper (*at)) /* show "Na", not "N" */
    while (g_ascii_islower (peek (line, length)))
      length++;

  return line_fault (line, ENL_ERROR_SYNTAX, line->at, length,
                     "use atoms with their hydrogens (CH2) and groups like Me, Et, Ph, Boc",
                     "no group or atom starts with '%.*s'", (int)length, at);
}

static EnlStatus
read_written_group (Line *line, bool *taken)
{
  *taken = false;
  if (line->order != 1) /* behind = or #, a group is read letter by letter */
    return ENL_OK;
  switch (peek (line, 0)) {
  case 'C':
    return peek (line, 1) == 'l' ? ENL_OK : read_carbon_group (line, taken);
  case 'N':
    return read_nitrogen_group (line, taken);
  case 'O':
    return read_oxygen_group (line, taken);
  case 'S':
    return read_sulfur_group (line, taken);
  case 'P':
    return read_phosphorus_group (line, taken);
  default:
    return ENL_OK;
  }
}

static EnlStatus
read_unit (Line *line)
{
  const char *smiles = NULL;
  size_t length = enl_group_match (line->text + line->at, line->size - line->at, &smiles);
  bool taken = false;

  if (length) {
    if (line->order != 1)
      return line_fault (line, ENL_ERROR_SYNTAX, line->at, length, "write it with a single bond",
                         "'%.*s' has one free bond only", (int)length, line->text + line->at);
    return read_group (line, length, smiles);
  }
  EnlStatus status = read_written_group (line, &taken);
  if (status != ENL_OK || taken)
    return status;
  int which = find_unit_atom (line);
  if (which >= 0)
    return unit_atom[which].halogen ? read_halogen (line, which) : read_atom (line, which);
  if (peek (line, 0) == 'H')
    return read_hydrogens (line);
  return unknown_unit (line);
}

static EnlStatus
read_step (Line *line)
{
  if (peek (line, 0) == '(') {
    if (line->current == ENL_NONE)
      return read_leading_branch (line);
    return is_oxo_branch (line) ? read_oxo_branch (line) : read_branch (line);
  }
  size_t at = line->at;
  if (line->current != ENL_NONE && read_bond (line) && ends_after (line, 0))
    return line_fault (line, ENL_ERROR_SYNTAX, at, 1, "write what it leads to, or remove it",
                       "a bond sign leads nowhere");
  return read_unit (line);
}

static EnlStatus
read_chain (Line *line, bool in_branch)
{
  uint32_t host = line->current;

  for (size_t start = line->at; line->at < line->size && !(in_branch && peek (line, 0) == ')');) {
    if (in_branch && host != ENL_NONE && line->current == host && line->at > start)
      return line_fault (line, ENL_ERROR_SYNTAX, line->at, 1, "give each branch its own brackets",
                         "the branch is complete before this");
    if (line->open->len > ENL_MAX_HEAVY)
      return line_fault (line, ENL_ERROR_LIMIT, line->at, 1, "write the structure as SMILES",
                         "more than %d atoms in a line of groups", ENL_MAX_HEAVY);
    EnlStatus status = read_step (line);
    if (status != ENL_OK)
      return status;
  }
  return ENL_OK;
}

/* Two written groups may meet, or two halogen atoms (Br2); "Ph2" is two groups of something else.
 */
static bool
may_meet (Line *line, const uint32_t *waiting)
{
  const EnlAtom *a = enl_molecule_edit_atom (line->mol, waiting[0]);
  const EnlAtom *b = enl_molecule_edit_atom (line->mol, waiting[1]);

  return a->offset != b->offset || a->element != 6;
}

/* What is still waiting at the end: two groups that meet (PhMe, AcCl), or an acid (HCl). */
static EnlStatus
close_line (Line *line)
{
  uint32_t *waiting = (uint32_t *)(void *)line->waiting->data;

  if (line->waiting->len == 2 && line->waiting_hydrogens == 0 && may_meet (line, waiting)) {
    join (line, waiting[0], waiting[1], 1);
  } else if (line->waiting->len == 1 && line->waiting_hydrogens == 1) {
    enl_molecule_edit_atom (line->mol, waiting[0])->hydrogens++;
    *open_of (line, waiting[0]) -= 1;
  } else if (line->waiting->len || line->waiting_hydrogens) {
    return line_fault (line, ENL_ERROR_SYNTAX, line->waiting_at, line->size - line->waiting_at,
                       "write what it is attached to", "'%.*s' is not a whole molecule",
                       (int)MIN (line->size - line->waiting_at, 60), line->text + line->waiting_at);
  }
  return ENL_OK;
}

static EnlStatus
check_open_bonds (Line *line)
{
  for (uint32_t i = 0; i < line->open->len; i++) {
    int open = *open_of (line, i);
    const EnlAtom *atom = enl_molecule_edit_atom (line->mol, i);
    if (open == 0)
      continue;
    return line_fault (line, ENL_ERROR_SYNTAX, atom->offset, atom->length,
                       "add the missing hydrogens, or write double and triple bonds with = and #",
                       "'%.*s' has %d free bond%s", (int)atom->length, line->text + atom->offset,
                       open, open == 1 ? "" : "s");
  }
  return ENL_OK;
}

static EnlStatus
read_line (Line *line)
{
  EnlStatus status = read_chain (line, false);

  if (status == ENL_OK)
    status = close_line (line);
  if (status == ENL_OK)
    status = check_open_bonds (line);
  if (status != ENL_OK)
    return status;
  enl_molecule_finish (line->mol);
  return enl_valence_check (line->mol, NULL, line->err);
}

EnlStatus
enl_groups_parse (const char *text, size_t size, EnlMolecule **out, EnlError *err)
{
  g_autoptr (EnlMolecule) mol = enl_molecule_new ();
  g_autoptr (GArray) open = g_array_new (FALSE, FALSE, sizeof (int));
  g_autoptr (GArray) waiting = g_array_new (FALSE, FALSE, sizeof (uint32_t));
  Line line = {.text = text, .size = size, .mol = mol, .open = open, .waiting = waiting};

  *out = NULL;
  line.current = ENL_NONE;
  line.order = 1;
  line.err = err;
  if (size == 0)
    return enl_error_set (err, ENL_ERROR_EMPTY, "write a structure", "nothing to read");
  if (size > LONGEST_LINE)
    return line_fault (&line, ENL_ERROR_LIMIT, LONGEST_LINE, 1, "write the structure as SMILES",
                       "a line of groups has at most %d characters", LONGEST_LINE);
  EnlStatus status = read_line (&line);
  if (status == ENL_OK)
    *out = g_steal_pointer (&mol);
  return status;
}
