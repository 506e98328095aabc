/* Groups written together: CO, CO2, CN, NO2 and their kind. */
#include "core/notation/group-line.h"

#include <string.h>

/* CO, CS and, with `ester`, CO2: carbon with a double-bonded `element`. */
static EnlStatus
read_carbonyl (EnlGroupLine *line, size_t at, uint8_t element, bool ester)
{
  uint32_t carbon = enl_group_add_atom (line, 6, 0, 4, at);

  enl_group_add_partner (line, carbon, element, 2, 0, at);
  EnlStatus status = enl_group_attach (line, carbon, at);
  if (status != ENL_OK || !ester)
    return status;
  uint32_t oxygen = enl_group_add_atom (line, 8, 0, 2, at);
  line->current = carbon;
  if (enl_group_peek (line, 0) == 'H' && !g_ascii_islower (enl_group_peek (line, 1))) {
    line->at++;
    enl_molecule_edit_atom (line->mol, oxygen)->hydrogens = 1;
    *enl_group_open (line, oxygen) -= 1;
  }
  status = enl_group_attach (line, oxygen, at);
  line->current = oxygen;
  return status;
}

static EnlStatus
read_nitrile (EnlGroupLine *line, size_t at)
{
  uint32_t carbon = enl_group_add_atom (line, 6, 0, 4, at);

  enl_group_add_partner (line, carbon, 7, 3, 0, at);
  return enl_group_attach (line, carbon, at);
}

static EnlStatus
read_nitro (EnlGroupLine *line, size_t at)
{
  uint32_t nitrogen = enl_group_add_atom (line, 7, 0, 4, at);
  uint32_t oxygen;

  enl_molecule_edit_atom (line->mol, nitrogen)->charge = 1;
  enl_group_add_partner (line, nitrogen, 8, 2, 0, at);
  oxygen = enl_group_add_partner (line, nitrogen, 8, 1, 0, at);
  enl_molecule_edit_atom (line->mol, oxygen)->charge = -1;
  return enl_group_attach (line, nitrogen, at);
}

static EnlStatus
read_azide (EnlGroupLine *line, size_t at)
{
  uint32_t first = enl_group_add_atom (line, 7, 0, 3, at);
  uint32_t middle = enl_group_add_partner (line, first, 7, 2, 2, at);
  uint32_t last = enl_group_add_partner (line, middle, 7, 2, 0, at);

  enl_molecule_edit_atom (line->mol, middle)->charge = 1;
  enl_molecule_edit_atom (line->mol, last)->charge = -1;
  return enl_group_attach (line, first, at);
}

/* O2C, OOC: an ester group met from its oxygen side. */
static EnlStatus
read_reversed_ester (EnlGroupLine *line, size_t at)
{
  line->at += 3;
  uint32_t oxygen = enl_group_add_atom (line, 8, 0, 2, at);
  EnlStatus status = enl_group_attach (line, oxygen, at);
  if (status != ENL_OK)
    return status;
  uint32_t carbon = enl_group_add_atom (line, 6, 0, 4, at);
  enl_group_add_partner (line, carbon, 8, 2, 0, at);
  line->current = oxygen;
  status = enl_group_attach (line, carbon, at);
  line->current = carbon;
  return status;
}

/* SO, SO2, SO3 and PO: `oxygens` double bonds raise the valence. */
static EnlStatus
read_oxo (EnlGroupLine *line, size_t at, uint8_t element, int valence, int oxygens)
{
  uint32_t atom = enl_group_add_atom (line, element, 0, valence, at);

  for (int i = 0; i < oxygens; i++)
    enl_group_add_partner (line, atom, 8, 2, 0, at);
  return enl_group_attach (line, atom, at);
}

static EnlStatus
ambiguous (EnlGroupLine *line, size_t at, size_t length, const char *advice)
{
  return enl_group_fault (line, ENL_ERROR_SYNTAX, at, length, advice,
                          "'%.*s' can mean two things here", (int)length, line->text + at);
}

/* The groups that begin with a carbon without hydrogens. Sets *taken when it was one. */
static EnlStatus
read_carbon_group (EnlGroupLine *line, bool *taken)
{
  size_t at = line->at;
  int bonds = enl_group_bonds (line);
  char next = enl_group_peek (line, 1), third = enl_group_peek (line, 2);

  *taken = true;
  if (bonds <= 2 && next == 'O') {
    bool ester = (third == '2' || (third == 'O' && enl_group_peek (line, 3) != 'O')) ||
                 (line->size - at >= 5 && memcmp (line->text + at + 2, "\xE2\x82\x82", 3) == 0);
    line->at += ester ? (third == '2' || third == 'O' ? 3 : 5) : 2;
    return read_carbonyl (line, at, 8, ester);
  }
  if (bonds <= 1 && next == 'N' && third != '(') {
    if (bonds == 1 && enl_group_ends_after (line, 2)) {
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
read_nitrogen_group (EnlGroupLine *line, bool *taken)
{
  size_t at = line->at;
  int bonds = enl_group_bonds (line);

  *taken = true;
  if (enl_group_looks_at (line, "NO2") && bonds <= 1 && line->waiting_hydrogens == 0) {
    line->at += 3;
    return read_nitro (line, at);
  }
  if (enl_group_looks_at (line, "N3") && bonds <= 1) {
    line->at += 2;
    return read_azide (line, at);
  }
  if (enl_group_looks_at (line, "NC") && line->current == ENL_NONE && bonds == line->lead &&
      enl_group_peek (line, 2) != 'H') {
    line->at += 2;
    return read_nitrile (line, at);
  }
  *taken = false;
  return ENL_OK;
}

static EnlStatus
read_oxygen_group (EnlGroupLine *line, bool *taken)
{
  size_t at = line->at;
  bool at_start = line->current == ENL_NONE && enl_group_bonds (line) == line->lead;

  *taken = true;
  if (at_start && enl_group_looks_at (line, "OHC") && enl_group_peek (line, 3) != 'H' &&
      !enl_group_ends_after (line, 3)) {
    line->at += 3;
    uint32_t carbon = enl_group_add_atom (line, 6, 1, 3, at);
    enl_group_add_partner (line, carbon, 8, 2, 0, at);
    return enl_group_attach (line, carbon, at);
  }
  if (at_start && enl_group_looks_at (line, "O2N") && enl_group_peek (line, 3) != 'H') {
    line->at += 3;
    return read_nitro (line, at);
  }
  if (!at_start && (enl_group_looks_at (line, "O2C") || enl_group_looks_at (line, "OOC")) &&
      enl_group_peek (line, 3) != 'H' && !g_ascii_islower (enl_group_peek (line, 3)))
    return read_reversed_ester (line, at);
  *taken = false;
  return ENL_OK;
}

static EnlStatus
read_sulfur_group (EnlGroupLine *line, bool *taken)
{
  size_t at = line->at;
  char third = enl_group_peek (line, 2);

  *taken = true;
  if (enl_group_looks_at (line, "SO2")) {
    line->at += 3;
    return read_oxo (line, at, 16, 6, 2);
  }
  if (enl_group_looks_at (line, "SO3")) {
    line->at += 3;
    EnlStatus status = read_oxo (line, at, 16, 6, 2);
    if (status != ENL_OK)
      return status;
    int hydrogen = enl_group_peek (line, 0) == 'H';
    line->at += hydrogen;
    return enl_group_attach (line, enl_group_add_atom (line, 8, hydrogen, 2 - hydrogen, at), at);
  }
  if (enl_group_looks_at (line, "SO") && third != 'H') {
    line->at += 2;
    return read_oxo (line, at, 16, 4, 1);
  }
  *taken = false;
  return ENL_OK;
}

static EnlStatus
read_phosphorus_group (EnlGroupLine *line, bool *taken)
{
  size_t at = line->at;

  int bonds = enl_group_bonds (line);
  *taken = (enl_group_looks_at (line, "PO(") && bonds <= 1) ||
           (enl_group_looks_at (line, "POCl3") && bonds == 0) ||
           (enl_group_looks_at (line, "PO") && bonds == 3 && enl_group_ends_after (line, 2));
  if (!*taken)
    return ENL_OK;
  line->at += 2;
  return read_oxo (line, at, 15, 5, 1);
}

EnlStatus
enl_group_read_written (EnlGroupLine *line, bool *taken)
{
  *taken = false;
  if (line->order != 1) /* behind = or #, a group is read letter by letter */
    return ENL_OK;
  switch (enl_group_peek (line, 0)) {
  case 'C':
    return enl_group_peek (line, 1) == 'l' ? ENL_OK : read_carbon_group (line, taken);
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
