/* Writing V2000. */
#include "core/notation/molfile.h"

#include <math.h>

#include "core/molecule/elements.h"
#include "core/molecule/graph.h"
#include "core/molecule/stereo.h"
#include "core/molecule/symmetry.h"
#include "core/notation/ctab.h"

#define MOST_PER_BLOCK 999
#define PAIRS_A_LINE   8

/* ---- atoms ---- */

static int
charge_code (const EnlAtom *atom)
{
  return atom->charge && atom->charge >= -3 && atom->charge <= 3 ? 4 - atom->charge : 0;
}

/* The valence must be written where a reader would add other hydrogens by itself. */
static uint32_t
valence_code (const EnlMolecule *mol, uint32_t i)
{
  const EnlAtom *atom = enl_molecule_atom (mol, i);
  uint32_t sum = enl_molecule_order_sum (mol, i);
  EnlRadical radical = atom->unpaired == 1   ? ENL_RADICAL_DOUBLET
                       : atom->unpaired == 2 ? ENL_RADICAL_TRIPLET
                                             : ENL_RADICAL_NONE;

  if (enl_ctab_usual_hydrogens (atom->element, atom->charge, radical, sum) == atom->hydrogens)
    return 0;
  return sum + atom->hydrogens == 0 ? 15 : MIN (sum + atom->hydrogens, 14);
}

/* See wind_by_parity in ctab-build.c, which this reverses. */
static int
parity_code (const EnlMolecule *mol, uint32_t i)
{
  const EnlAtom *atom = enl_molecule_atom (mol, i);
  uint32_t degree = enl_molecule_degree (mol, i);
  bool odd = atom->winding == ENL_WINDING_ANTICLOCKWISE;

  if (!atom->winding || degree < 3)
    return 0;
  if (degree == 4)
    odd = !odd;
  for (uint32_t k = 0; degree == 4 && k < 4; k++) {
    uint32_t other = enl_molecule_neighbour (mol, i, k), after = 0;
    for (uint32_t j = 0; j < 4; j++)
      after += enl_molecule_neighbour (mol, i, j) > other;
    if (enl_molecule_atom (mol, other)->element == 1)
      odd ^= after % 2;
  }
  return odd ? 1 : 2;
}

static void
append_coordinate (GString *out, double value)
{
  char number[32];

  g_ascii_formatd (number, sizeof number, "%.4f", fabs (value) < 5e-5 ? 0.0 : value);
  g_string_append_printf (out, "%10s", number);
}

static void
write_atom (GString *out, const EnlMolecule *mol, uint32_t i)
{
  const EnlAtom *atom = enl_molecule_atom (mol, i);
  bool placed = enl_molecule_has_layout (mol);

  append_coordinate (out, placed ? atom->x : 0);
  append_coordinate (out, placed ? atom->y : 0);
  append_coordinate (out, 0);
  g_string_append_printf (out, " %-3s 0%3d%3d  0  0%3u  0  0  0%3u  0  0\n",
                          enl_element_symbol (atom->element), charge_code (atom),
                          parity_code (mol, i), valence_code (mol, i), MIN (atom->map, 999));
}

/* ---- bonds ---- */

/* A double bond of unknown side that has two different neighbours at both ends. */
static bool
is_either (const EnlMolecule *mol, uint32_t b, const uint32_t *class_of)
{
  EnlUnit unit;

  if (enl_molecule_bond (mol, b)->side != ENL_SIDE_NONE || !enl_unit_of_bond (mol, b, &unit))
    return false;
  for (int row = 0; row < 2; row++)
    if (unit.ligands[row] == 2 && class_of[unit.ligand[row][0]] == class_of[unit.ligand[row][1]])
      return false;
  return true;
}

static int
stereo_code (const EnlMolecule *mol, uint32_t b, const uint32_t *class_of)
{
  const EnlBond *bond = enl_molecule_bond (mol, b);

  if (!enl_molecule_has_layout (mol))
    return 0;
  if (bond->order == 2)
    return is_either (mol, b, class_of) ? 3 : 0;
  return bond->wedge == ENL_WEDGE_UP       ? 1
         : bond->wedge == ENL_WEDGE_DOWN   ? 6
         : bond->wedge == ENL_WEDGE_EITHER ? 4
                                           : 0;
}

static void
write_bonds (GString *out, const EnlMolecule *mol)
{
  g_autofree uint32_t *class_of = g_new0 (uint32_t, (size_t)enl_molecule_atoms (mol) + 1);

  enl_symmetry_classes (mol, false, class_of);
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    const EnlBond *bond = enl_molecule_bond (mol, b);
    g_string_append_printf (out, "%3u%3u%3u%3d\n", bond->from + 1, bond->to + 1,
                            bond->order == 0 ? ENL_BOND_CONTACT : bond->order,
                            stereo_code (mol, b, class_of));
  }
}

/* ---- properties ---- */

static int
charge_of (const EnlAtom *atom)
{
  return atom->charge;
}

static int
isotope_of (const EnlAtom *atom)
{
  return atom->isotope;
}

static int
radical_of (const EnlAtom *atom)
{
  /* Doublet 2, triplet 3; for more the format has no code, and the written valence must do. */
  return atom->unpaired == 1 || atom->unpaired == 2 ? (int)atom->unpaired + 1 : 0;
}

/* "M  CHG" and its kind: up to eight pairs of atom and value a line. */
static void
write_property (GString *out, const EnlMolecule *mol, const char *word,
                int (*value_of) (const EnlAtom *atom))
{
  g_autoptr (GString) pairs = g_string_new (NULL);
  int count = 0;

  for (uint32_t i = 0; i <= enl_molecule_atoms (mol); i++) {
    bool at_end = i == enl_molecule_atoms (mol);
    if (count == PAIRS_A_LINE || (at_end && count)) {
      g_string_append_printf (out, "M  %s%3d%s\n", word, count, pairs->str);
      g_string_set_size (pairs, 0);
      count = 0;
    }
    int value = at_end ? 0 : value_of (enl_molecule_atom (mol, i));
    if (value) {
      g_string_append_printf (pairs, "%4u%4d", i + 1, value);
      count++;
    }
  }
}

/* ---- the whole ---- */

static bool
has_wedge (const EnlMolecule *mol)
{
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    EnlWedge wedge = enl_molecule_bond (mol, b)->wedge;
    if (wedge == ENL_WEDGE_UP || wedge == ENL_WEDGE_DOWN)
      return true;
  }
  return false;
}

static EnlStatus
check_writable (const EnlMolecule *mol, EnlError *err)
{
  uint32_t n = MAX (enl_molecule_atoms (mol), enl_molecule_bonds (mol));

  if (n > MOST_PER_BLOCK)
    return enl_error_set (err, ENL_ERROR_LIMIT, "save the structure as SMILES",
                          "%u atoms or bonds; a V2000 molfile holds %d", n, MOST_PER_BLOCK);
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++)
    if (enl_molecule_bond (mol, b)->order > 3)
      return enl_error_set (err, ENL_ERROR_UNSUPPORTED, "save the structure as SMILES",
                            "a molfile has no quadruple bond");
  return ENL_OK;
}

/* The name on one line of at most 80 characters. */
static void
write_header (GString *out, const EnlMolecule *mol)
{
  g_autofree char *name = g_utf8_substring (enl_molecule_name (mol), 0,
                                            MIN (80, g_utf8_strlen (enl_molecule_name (mol), -1)));

  for (char *p = name; *p; p++)
    if (*p == '\n' || *p == '\r')
      *p = ' ';
  g_string_append_printf (out, "%s\n  Enolith           %s\n\n", name,
                          enl_molecule_has_layout (mol) ? "2D" : "");
}

EnlStatus
enl_molfile_write (const EnlMolecule *mol, char **out, EnlError *err)
{
  EnlStatus status = check_writable (mol, err);

  *out = NULL;
  if (status != ENL_OK)
    return status;
  g_autoptr (EnlMolecule) shown = enl_molecule_copy (mol);
  if (!has_wedge (shown))
    enl_stereo_draw_wedges (shown);
  GString *text = g_string_new (NULL);
  write_header (text, shown);
  g_string_append_printf (text, "%3u%3u  0  0  0  0  0  0  0  0999 V2000\n",
                          enl_molecule_atoms (shown), enl_molecule_bonds (shown));
  for (uint32_t i = 0; i < enl_molecule_atoms (shown); i++)
    write_atom (text, shown, i);
  write_bonds (text, shown);
  write_property (text, shown, "CHG", charge_of);
  write_property (text, shown, "ISO", isotope_of);
  write_property (text, shown, "RAD", radical_of);
  g_string_append (text, "M  END\n");
  *out = g_string_free (text, FALSE);
  return ENL_OK;
}
