/* The line of groups: units, branches and the chain (grammar in group-line.h). */
#include "core/notation/group-line.h"

#include <string.h>

#include "core/molecule/valence.h"
#include "core/notation/groups.h"
#include "core/notation/smiles.h"

#define LONGEST_LINE   500 /* bytes */
#define DEEPEST_BRANCH 12

static EnlStatus read_chain (EnlGroupLine *line, bool in_branch);

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
find_unit_atom (const EnlGroupLine *line)
{
  for (size_t i = 0; i < ENL_COUNT (unit_atom); i++)
    if (enl_group_looks_at (line, unit_atom[i].symbol)) {
      char next = enl_group_peek (line, strlen (unit_atom[i].symbol));
      return g_ascii_islower (next) && next != 'n' && next != 'i' && next != 't' && next != 's' &&
                     next != 'c'
                 ? -1
                 : (int)i;
    }
  return -1;
}

/* An atom and its hydrogens; aldehydes by the way. */
static EnlStatus
read_atom (EnlGroupLine *line, int which)
{
  size_t at = line->at;
  int hydrogens = 0;

  line->at += strlen (unit_atom[which].symbol);
  if (enl_group_peek (line, 0) == 'H' && !g_ascii_islower (enl_group_peek (line, 1))) {
    size_t count_at = ++line->at;
    hydrogens = enl_group_read_count (line);
    if (hydrogens < 1 || hydrogens > unit_atom[which].valence)
      return enl_group_fault (line, ENL_ERROR_SYNTAX, at, line->at - at,
                              "check the count of hydrogens",
                              "'%.*s' has more hydrogens than bonds",
                              (int)(MAX (line->at, count_at) - at), line->text + at);
  } else if (g_ascii_isdigit (enl_group_peek (line, 0)))
    return enl_group_fault (line, ENL_ERROR_SYNTAX, at, 2,
                            "write each atom with its hydrogens, or a group like Et, iPr, Ph",
                            "'%.2s' does not say how its atoms are joined", line->text + at);
  bool aldehyde = unit_atom[which].element == 6 && hydrogens == 1 &&
                  enl_group_peek (line, 0) == 'O' && enl_group_ends_after (line, 1) &&
                  line->order == 1 && enl_group_bonds (line) <= 1;
  line->at += aldehyde;
  uint32_t atom = enl_group_add_atom (line, unit_atom[which].element, hydrogens,
                                      unit_atom[which].valence - hydrogens, at);
  if (aldehyde)
    enl_group_add_partner (line, atom, 8, 2, 0, at);
  return enl_group_attach (line, atom, at);
}

/* Hangs a terminal atom on the current one, or keeps it for the next chain atom. */
static EnlStatus
place_terminal (EnlGroupLine *line, uint32_t atom, size_t at)
{
  if (line->current == ENL_NONE) {
    line->waiting_at = line->waiting->len ? line->waiting_at : at;
    g_array_append_val (line->waiting, atom);
    return ENL_OK;
  }
  return enl_group_attach (line, atom, at);
}

static EnlStatus
read_halogen (EnlGroupLine *line, int which)
{
  size_t at = line->at;

  line->at += strlen (unit_atom[which].symbol);
  size_t count_at = line->at;
  int count = enl_group_read_count (line);
  if (count == 0)
    return enl_group_bad_count (line, count_at);
  for (int i = 0; i < count; i++) {
    uint32_t atom = enl_group_add_atom (line, unit_atom[which].element, 0, 1, at);
    EnlStatus status = place_terminal (line, atom, at);
    if (status != ENL_OK)
      return status;
  }
  return ENL_OK;
}

/* Copies the fragment into the molecule; returns its first atom, with one free bond. */
static uint32_t
graft (EnlGroupLine *line, const EnlMolecule *fragment, size_t at)
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
read_group (EnlGroupLine *line, size_t length, const char *smiles)
{
  g_autoptr (EnlMolecule) fragment = NULL;
  size_t at = line->at;
  EnlStatus status = enl_smiles_parse (smiles, strlen (smiles), &fragment, NULL);

  g_assert (status == ENL_OK); /* the table is ours; a test reads every row */
  line->at += length;
  size_t count_at = line->at;
  int count = enl_group_read_count (line);
  if (count == 0)
    return enl_group_bad_count (line, count_at);
  for (int i = 0; i < count; i++)
    if ((status = place_terminal (line, graft (line, fragment, at), at)) != ENL_OK)
      return status;
  return ENL_OK;
}

static EnlStatus
read_hydrogens (EnlGroupLine *line)
{
  size_t at = line->at++;
  int count = enl_group_read_count (line);

  if (line->current != ENL_NONE)
    return enl_group_fault (line, ENL_ERROR_SYNTAX, at, 1, "write hydrogens behind their atom",
                            "a hydrogen stands without an atom");
  if (count < 1 || count > 4)
    return enl_group_bad_count (line, at);
  line->waiting_at = at;
  line->waiting_hydrogens += count;
  return ENL_OK;
}

/* ---- branches ---- */

static EnlStatus
read_inside (EnlGroupLine *line, size_t at)
{
  if (++line->depth > DEEPEST_BRANCH)
    return enl_group_fault (line, ENL_ERROR_LIMIT, at, 1, "write the structure as SMILES",
                            "more than %d brackets inside one another", DEEPEST_BRANCH);
  line->at = at + 1;
  if (enl_group_peek (line, 0) == ')')
    return enl_group_fault (line, ENL_ERROR_SYNTAX, at, 2, "remove it", "empty brackets");
  EnlStatus status = read_chain (line, true);
  if (status != ENL_OK)
    return status;
  if (enl_group_peek (line, 0) != ')')
    return enl_group_fault (line, ENL_ERROR_SYNTAX, at, 1, "add ')'",
                            "the bracket '(' is never closed");
  line->at++;
  line->depth--;
  return ENL_OK;
}

/* "(O)" and "(S)" are double-bonded. */
static bool
is_oxo_branch (const EnlGroupLine *line)
{
  return enl_group_looks_at (line, "(O)") || enl_group_looks_at (line, "(S)");
}

static EnlStatus
read_oxo_branch (EnlGroupLine *line)
{
  size_t at = line->at;
  uint8_t element = enl_group_peek (line, 1) == 'O' ? 8 : 16;
  uint32_t atom = line->current;
  uint8_t host = enl_molecule_edit_atom (line->mol, atom)->element;

  line->at += 3;
  size_t count_at = line->at;
  int count = enl_group_read_count (line);
  if (count == 0)
    return enl_group_bad_count (line, count_at);
  for (int i = 0; i < count; i++) {
    if ((host == 15 && i == 0) || (host == 16 && i < 2))
      *enl_group_open (line, atom) += 2; /* phosphorus(V), sulfur(IV) and (VI) */
    if ((host != 6 && host != 15 && host != 16) || *enl_group_open (line, atom) < 2)
      return enl_group_too_many_bonds (line, atom, at);
    enl_group_add_partner (line, atom, element, 2, 0, at);
  }
  return ENL_OK;
}

/* A branch behind an atom: substituents, or a repeated piece of the chain. */
static EnlStatus
read_branch (EnlGroupLine *line)
{
  size_t at = line->at;
  uint32_t host = line->current;
  EnlStatus status = read_inside (line, at);
  if (status != ENL_OK)
    return status;
  bool chain = *enl_group_open (line, line->current) > 0 && line->current != host;
  size_t count_at = line->at;
  int count = enl_group_read_count (line);
  size_t behind = line->at;
  if (count == 0)
    return enl_group_bad_count (line, count_at);
  for (int i = 1; i < count; i++) {
    if (!chain)
      line->current = host;
    if ((status = read_inside (line, at)) != ENL_OK)
      return status;
  }
  line->at = behind;
  if (!chain && *enl_group_open (line, host) >= 0)
    line->current = host;
  return ENL_OK;
}

/* The one atom from `first` on that has exactly one free bond; ENL_NONE when there is not one. */
static uint32_t
free_end (EnlGroupLine *line, uint32_t first)
{
  uint32_t found = ENL_NONE;

  for (uint32_t i = first; i < line->open->len; i++) {
    int open = *enl_group_open (line, i);
    if (open == 0)
      continue;
    if (open != 1 || found != ENL_NONE)
      return ENL_NONE;
    found = i;
  }
  return found;
}

static EnlStatus
read_leading_copy (EnlGroupLine *line, size_t at, GArray *outer)
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
    return enl_group_fault (line, ENL_ERROR_SYNTAX, at, line->at - at,
                            "let exactly one bond of it be free", "'%.*s' is no group",
                            (int)MIN (line->at - at, 60), line->text + at);
  g_array_append_val (outer, end);
  return ENL_OK;
}

/* A branch at the start: "(CH3)2CH", "(EtO)2P(O)". */
static EnlStatus
read_leading_branch (EnlGroupLine *line)
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
  int count = enl_group_read_count (line);
  size_t behind = line->at;
  if (count == 0)
    return enl_group_bad_count (line, count_at);
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
read_bond (EnlGroupLine *line)
{
  static const struct {
    const char *sign;
    int order;
  } sign[] = {
      {"=", 2}, {"#", 3}, {"\xE2\x89\xA1", 3}, {"-", 1}, {"\xE2\x80\x93", 1},
  };

  for (size_t i = 0; i < ENL_COUNT (sign); i++)
    if (enl_group_looks_at (line, sign[i].sign)) {
      line->at += strlen (sign[i].sign);
      line->order = sign[i].order;
      if (line->order == 2 && *enl_group_open (line, line->current) == 0 &&
          enl_molecule_edit_atom (line->mol, line->current)->element == 15)
        *enl_group_open (line, line->current) += 2; /* an ylide: Ph3P=CH2 */
      return true;
    }
  return false;
}

static EnlStatus
unknown_unit (EnlGroupLine *line)
{
  const char *at = line->text + line->at;
  gunichar c = g_utf8_get_char_validated (at, (gssize)(line->size - line->at));
  bool valid = c != (gunichar)-1 && c != (gunichar)-2;
  size_t length = valid ? (size_t)(g_utf8_next_char (at) - at) : 1;

  if (g_ascii_isupper (*at)) /* show "Na", not "N" */
    while (g_ascii_islower (enl_group_peek (line, length)))
      length++;

  return enl_group_fault (line, ENL_ERROR_SYNTAX, line->at, length,
                          "use atoms with their hydrogens (CH2) and groups like Me, Et, Ph, Boc",
                          "no group or atom starts with '%.*s'", (int)length, at);
}

static EnlStatus
read_unit (EnlGroupLine *line)
{
  const char *smiles = NULL;
  size_t length = enl_group_match (line->text + line->at, line->size - line->at, &smiles);
  bool taken = false;

  if (length) {
    if (line->order != 1)
      return enl_group_fault (line, ENL_ERROR_SYNTAX, line->at, length,
                              "write it with a single bond", "'%.*s' has one free bond only",
                              (int)length, line->text + line->at);
    return read_group (line, length, smiles);
  }
  EnlStatus status = enl_group_read_written (line, &taken);
  if (status != ENL_OK || taken)
    return status;
  int which = find_unit_atom (line);
  if (which >= 0)
    return unit_atom[which].halogen ? read_halogen (line, which) : read_atom (line, which);
  if (enl_group_peek (line, 0) == 'H')
    return read_hydrogens (line);
  return unknown_unit (line);
}

static EnlStatus
read_step (EnlGroupLine *line)
{
  if (enl_group_peek (line, 0) == '(') {
    if (line->current == ENL_NONE)
      return read_leading_branch (line);
    return is_oxo_branch (line) ? read_oxo_branch (line) : read_branch (line);
  }
  size_t at = line->at;
  if (line->current != ENL_NONE && read_bond (line) && enl_group_ends_after (line, 0))
    return enl_group_fault (line, ENL_ERROR_SYNTAX, at, 1, "write what it leads to, or remove it",
                            "a bond sign leads nowhere");
  return read_unit (line);
}

static EnlStatus
read_chain (EnlGroupLine *line, bool in_branch)
{
  uint32_t host = line->current;

  for (size_t start = line->at;
       line->at < line->size && !(in_branch && enl_group_peek (line, 0) == ')');) {
    if (in_branch && host != ENL_NONE && line->current == host && line->at > start)
      return enl_group_fault (line, ENL_ERROR_SYNTAX, line->at, 1,
                              "give each branch its own brackets",
                              "the branch is complete before this");
    if (line->open->len > ENL_MAX_HEAVY)
      return enl_group_fault (line, ENL_ERROR_LIMIT, line->at, 1, "write the structure as SMILES",
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
may_meet (EnlGroupLine *line, const uint32_t *waiting)
{
  const EnlAtom *a = enl_molecule_edit_atom (line->mol, waiting[0]);
  const EnlAtom *b = enl_molecule_edit_atom (line->mol, waiting[1]);

  return a->offset != b->offset || a->element != 6;
}

/* What is still waiting at the end: two groups that meet (PhMe, AcCl), or an acid (HCl). */
static EnlStatus
close_line (EnlGroupLine *line)
{
  uint32_t *waiting = (uint32_t *)(void *)line->waiting->data;

  if (line->waiting->len == 2 && line->waiting_hydrogens == 0 && may_meet (line, waiting)) {
    enl_group_join (line, waiting[0], waiting[1], 1);
  } else if (line->waiting->len == 1 && line->waiting_hydrogens == 1) {
    enl_molecule_edit_atom (line->mol, waiting[0])->hydrogens++;
    *enl_group_open (line, waiting[0]) -= 1;
  } else if (line->waiting->len || line->waiting_hydrogens) {
    return enl_group_fault (line, ENL_ERROR_SYNTAX, line->waiting_at, line->size - line->waiting_at,
                            "write what it is attached to", "'%.*s' is not a whole molecule",
                            (int)MIN (line->size - line->waiting_at, 60),
                            line->text + line->waiting_at);
  }
  return ENL_OK;
}

static EnlStatus
check_open_bonds (EnlGroupLine *line)
{
  for (uint32_t i = 0; i < line->open->len; i++) {
    int open = *enl_group_open (line, i);
    const EnlAtom *atom = enl_molecule_edit_atom (line->mol, i);
    if (open == 0)
      continue;
    return enl_group_fault (
        line, ENL_ERROR_SYNTAX, atom->offset, atom->length,
        "add the missing hydrogens, or write double and triple bonds with = and #",
        "'%.*s' has %d free bond%s", (int)atom->length, line->text + atom->offset, open,
        open == 1 ? "" : "s");
  }
  return ENL_OK;
}

static EnlStatus
read_line (EnlGroupLine *line)
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
  EnlGroupLine line = {.text = text, .size = size, .mol = mol, .open = open, .waiting = waiting};

  *out = NULL;
  line.current = ENL_NONE;
  line.order = 1;
  line.err = err;
  if (size == 0)
    return enl_error_set (err, ENL_ERROR_EMPTY, "write a structure", "nothing to read");
  if (size > LONGEST_LINE)
    return enl_group_fault (&line, ENL_ERROR_LIMIT, LONGEST_LINE, 1,
                            "write the structure as SMILES",
                            "a line of groups has at most %d characters", LONGEST_LINE);
  EnlStatus status = read_line (&line);
  if (status == ENL_OK)
    *out = g_steal_pointer (&mol);
  return status;
}
