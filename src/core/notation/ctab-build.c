/* From a connection table to the finished molecule. */
#include "core/notation/ctab.h"

#include <math.h>
#include <string.h>

#include "core/molecule/elements.h"
#include "core/molecule/graph.h"
#include "core/molecule/kekule.h"
#include "core/molecule/stereo.h"
#include "core/molecule/valence.h"

#define SAME_PLACE 1e-3 /* coordinates below this are zero, in the units of the file */

enum { HYDROGEN = 1 };

static const EnlCtabAtom *
atom_at (const EnlCtab *ctab, uint32_t i)
{
  return &g_array_index (ctab->atom, EnlCtabAtom, i);
}

static const EnlCtabBond *
bond_at (const EnlCtab *ctab, uint32_t i)
{
  return &g_array_index (ctab->bond, EnlCtabBond, i);
}

/* ---- atoms and bonds ---- */

static void
add_atoms (const EnlCtab *ctab, EnlMolecule *mol)
{
  for (uint32_t i = 0; i < ctab->atom->len; i++) {
    const EnlCtabAtom *from = atom_at (ctab, i);
    EnlAtom to = {.element = from->element, .charge = (int8_t)from->charge};
    to.isotope = (uint16_t)CLAMP (from->isotope, 0, 400);
    to.unpaired = from->radical == ENL_RADICAL_DOUBLET   ? 1
                  : from->radical == ENL_RADICAL_TRIPLET ? 2
                                                         : 0;
    to.map = from->map;
    to.input = i + 1;
    to.offset = (uint32_t)from->offset;
    to.length = (uint32_t)from->length;
    enl_molecule_add_atom (mol, &to);
  }
}

static EnlStatus
add_bonds (const EnlCtab *ctab, EnlMolecule *mol, bool *delocalised)
{
  for (uint32_t i = 0; i < ctab->bond->len; i++) {
    const EnlCtabBond *from = bond_at (ctab, i);
    uint8_t order = from->type == ENL_BOND_AROMATIC ? 1 : from->type > 4 ? 0 : (uint8_t)from->type;
    uint32_t b = enl_molecule_add_bond (mol, from->from, from->to, order);
    if (b == ENL_NONE)
      return enl_ctab_fault (ctab, ENL_ERROR_FORMAT, from->offset, from->length, "remove the line",
                             from->from == from->to ? "a bond from atom %u to itself"
                                                    : "atom %u has this bond twice",
                             from->from + 1);
    enl_molecule_edit_bond (mol, b)->wedge = from->wedge;
    delocalised[b] = from->type == ENL_BOND_AROMATIC;
  }
  return ENL_OK;
}

static EnlStatus
place_double_bonds (const EnlCtab *ctab, EnlMolecule *mol, const bool *delocalised)
{
  uint32_t culprit = ENL_NONE;
  bool any = false;

  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    any = any || delocalised[b];
    if (delocalised[b] && !enl_molecule_bond (mol, b)->ring)
      return enl_ctab_fault (ctab, ENL_ERROR_CHEMISTRY, bond_at (ctab, b)->offset,
                             bond_at (ctab, b)->length, "make it single or double",
                             "an aromatic bond outside of a ring");
  }
  if (!any)
    return ENL_OK;
  if (!enl_kekule_place (mol, delocalised, ENL_KEKULE_INFER_NH, &culprit)) {
    const EnlCtabAtom *atom = atom_at (ctab, MIN (culprit, ctab->atom->len - 1));
    return enl_ctab_fault (ctab, ENL_ERROR_CHEMISTRY, atom->offset, atom->length,
                           "write the ring with single and double bonds",
                           "no alternating double bonds fit the aromatic bonds at atom %u",
                           culprit + 1);
  }
  enl_molecule_finish (mol);
  return ENL_OK;
}

/* ---- hydrogens ---- */

/* Elements that are completed with hydrogens by themselves: those of the organic subset of SMILES
 * and their heavier relatives; metals, noble gases and hydrogen are not. */
static bool
takes_hydrogens (uint8_t element)
{
  static const char *const relative[] = {"Si", "Ge", "As", "Se", "Te"};

  if (enl_valence_implicit_hydrogens (element, 0) > 0)
    return true;
  for (size_t i = 0; i < ENL_COUNT (relative); i++)
    if (strcmp (enl_element_symbol (element), relative[i]) == 0)
      return true;
  return false;
}

uint32_t
enl_ctab_usual_hydrogens (uint8_t element, int charge, EnlRadical radical, uint32_t order_sum)
{
  size_t count = 0;
  const uint8_t *valence = enl_valence_usual (element, charge, &count);
  uint32_t taken = order_sum + (radical == ENL_RADICAL_DOUBLET ? 1
                                : radical == ENL_RADICAL_NONE  ? 0
                                                               : 2);

  if (!takes_hydrogens (element))
    return 0;
  for (size_t i = 0; i < count; i++)
    if (valence[i] >= taken)
      return valence[i] - taken;
  return 0;
}

/* A count that was written, or that a radical leaves, is exact: no usual valence is expected. */
static void
set_hydrogens (const EnlCtabAtom *from, uint32_t order_sum, EnlAtom *to)
{
  bool written = from->valence != ENL_VALENCE_DEFAULT;
  uint32_t count =
      written ? (uint32_t)from->valence - order_sum
              : enl_ctab_usual_hydrogens (from->element, from->charge, from->radical, order_sum);

  to->hydrogens = (uint8_t)count;
  to->exact = written || from->radical != ENL_RADICAL_NONE;
  if (written && from->radical == ENL_RADICAL_NONE)
    to->unpaired = enl_valence_unpaired (to->element, to->charge, order_sum + count);
}

static EnlStatus
fill_hydrogens (const EnlCtab *ctab, EnlMolecule *mol)
{
  for (uint32_t i = 0; i < ctab->atom->len; i++) {
    const EnlCtabAtom *from = atom_at (ctab, i);
    uint32_t sum = enl_molecule_order_sum (mol, i);
    if (from->valence != ENL_VALENCE_DEFAULT && (uint32_t)from->valence < sum)
      return enl_ctab_fault (
          ctab, ENL_ERROR_CHEMISTRY, from->offset, from->length, "correct the valence or the bonds",
          "atom %u has the valence %d, but bonds for %u", i + 1, from->valence, sum);
    set_hydrogens (from, sum, enl_molecule_edit_atom (mol, i));
  }
  return ENL_OK;
}

/* ---- stereo ---- */

typedef enum { PLACES_NONE, PLACES_PLANE, PLACES_SPACE } Places;

static Places
kind_of_places (const EnlCtab *ctab)
{
  Places kind = PLACES_NONE;

  for (uint32_t i = 0; i < ctab->atom->len; i++) {
    const EnlCtabAtom *atom = atom_at (ctab, i);
    if (fabs (atom->z) > SAME_PLACE)
      return PLACES_SPACE;
    if (fabs (atom->x) > SAME_PLACE || fabs (atom->y) > SAME_PLACE)
      kind = PLACES_PLANE;
  }
  return kind;
}

static int
compare_doubles (const void *a, const void *b)
{
  double x = *(const double *)a, y = *(const double *)b;
  return x < y ? -1 : x > y;
}

/* Median bond length of the drawing, 1 when there is none. */
static double
usual_length (const EnlCtab *ctab)
{
  uint32_t n = ctab->bond->len, used = 0;
  g_autofree double *length = g_new (double, n + 1);

  for (uint32_t i = 0; i < n; i++) {
    const EnlCtabAtom *a = atom_at (ctab, bond_at (ctab, i)->from);
    const EnlCtabAtom *b = atom_at (ctab, bond_at (ctab, i)->to);
    double distance = hypot (a->x - b->x, a->y - b->y);
    if (distance > SAME_PLACE)
      length[used++] = distance;
  }
  if (used == 0)
    return 1.0;
  qsort (length, used, sizeof *length, compare_doubles);
  return length[used / 2];
}

static void
place_in_plane (const EnlCtab *ctab, EnlMolecule *mol)
{
  double unit = usual_length (ctab);

  for (uint32_t i = 0; i < ctab->atom->len; i++) {
    enl_molecule_edit_atom (mol, i)->x = atom_at (ctab, i)->x / unit;
    enl_molecule_edit_atom (mol, i)->y = atom_at (ctab, i)->y / unit;
  }
  enl_molecule_set_has_layout (mol, true);
  enl_stereo_from_drawing (mol);
}

typedef struct {
  double x, y, z;
} Vector;

static Vector
vector_between (const EnlCtab *ctab, uint32_t from, uint32_t to)
{
  const EnlCtabAtom *a = atom_at (ctab, from), *b = atom_at (ctab, to);
  return (Vector){b->x - a->x, b->y - a->y, b->z - a->z};
}

static double
dot (Vector a, Vector b)
{
  return a.x * b.x + a.y * b.y + a.z * b.z;
}

static Vector
cross (Vector a, Vector b)
{
  return (Vector){a.y * b.z - a.z * b.y, a.z * b.x - a.x * b.z, a.x * b.y - a.y * b.x};
}

/* Seen from the first neighbour the other three turn anticlockwise when the volume that they span
 * is negative. */
static void
wind_in_space (const EnlCtab *ctab, EnlMolecule *mol, uint32_t i)
{
  EnlUnit unit;

  if (!enl_unit_of_atom (mol, i, &unit))
    return;
  const uint32_t *ligand = unit.ligand[0] + (unit.ligands[0] - 3);
  Vector v[3];
  double size = 1;
  for (int k = 0; k < 3; k++) {
    v[k] = vector_between (ctab, i, ligand[k]);
    size *= sqrt (dot (v[k], v[k]));
  }
  double volume = dot (v[0], cross (v[1], v[2]));
  if (!(fabs (volume) > 0.05 * size)) /* flat */
    return;
  enl_molecule_edit_atom (mol, i)->winding =
      volume < 0 ? ENL_WINDING_ANTICLOCKWISE : ENL_WINDING_CLOCKWISE;
}

static void
side_in_space (const EnlCtab *ctab, EnlMolecule *mol, uint32_t b)
{
  EnlUnit unit;

  if (!enl_unit_of_bond (mol, b, &unit) || enl_molecule_bond (mol, b)->wedge == ENL_WEDGE_EITHER)
    return;
  Vector axis = vector_between (ctab, unit.end[0], unit.end[1]);
  Vector from = cross (axis, vector_between (ctab, unit.end[0], unit.ligand[0][0]));
  Vector to = cross (axis, vector_between (ctab, unit.end[1], unit.ligand[1][0]));
  double same = dot (from, to), size = sqrt (dot (from, from) * dot (to, to));
  if (!(fabs (same) > 0.2 * size)) /* twisted by more than 78 degrees from both */
    return;
  EnlBond *bond = enl_molecule_edit_bond (mol, b);
  bool turned = bond->from != unit.end[0];
  bond->side = same > 0 ? ENL_SIDE_SAME : ENL_SIDE_OPPOSITE;
  bond->side_from = unit.ligand[turned ? 1 : 0][0];
  bond->side_to = unit.ligand[turned ? 0 : 1][0];
}

static void
place_in_space (const EnlCtab *ctab, EnlMolecule *mol)
{
  for (uint32_t i = 0; i < ctab->atom->len; i++)
    wind_in_space (ctab, mol, i);
  for (uint32_t b = 0; b < ctab->bond->len; b++)
    side_in_space (ctab, mol, b);
  enl_stereo_clean (mol);
}

/* Parity of the format: neighbours numbered by index, a hydrogen last; seen with the last one
 * behind, the first three turn clockwise for 1 (odd). Moving an unwritten last one to the front, as
 * EnlWinding has it, and looking from there gives anticlockwise; a written last one at its place
 * needs three exchanges more, which turns the sense. */
static void
wind_by_parity (const EnlCtab *ctab, EnlMolecule *mol, uint32_t i)
{
  EnlUnit unit;
  int parity = atom_at (ctab, i)->parity;

  if ((parity != 1 && parity != 2) || !enl_unit_of_atom (mol, i, &unit))
    return;
  bool anticlockwise = parity == 1;
  for (uint32_t k = 0; unit.ligands[0] == 4 && k < 4; k++) {
    uint32_t after = 3 - k; /* ligands behind this one in index order */
    if (enl_molecule_atom (mol, unit.ligand[0][k])->element == HYDROGEN)
      anticlockwise ^= after % 2;
    if (k == 3)
      anticlockwise = !anticlockwise;
  }
  enl_molecule_edit_atom (mol, i)->winding =
      anticlockwise ? ENL_WINDING_ANTICLOCKWISE : ENL_WINDING_CLOCKWISE;
}

static void
read_stereo (const EnlCtab *ctab, EnlMolecule *mol)
{
  switch (kind_of_places (ctab)) {
  case PLACES_PLANE:
    place_in_plane (ctab, mol);
    break;
  case PLACES_SPACE:
    place_in_space (ctab, mol);
    break;
  case PLACES_NONE:
    for (uint32_t i = 0; i < ctab->atom->len; i++)
      wind_by_parity (ctab, mol, i);
    enl_stereo_clean (mol);
    break;
  }
}

/* ---- the whole ---- */

static EnlStatus
check_valence (const EnlCtab *ctab, EnlMolecule *mol)
{
  EnlStatus status = enl_valence_check (mol, NULL, ctab->err);

  if (status != ENL_OK && ctab->err)
    enl_error_locate (ctab->err, ctab->text, ctab->size, ctab->err->offset, ctab->err->length);
  return status;
}

EnlStatus
enl_ctab_build (const EnlCtab *ctab, EnlMolecule **out)
{
  g_autoptr (EnlMolecule) mol = enl_molecule_new ();
  g_autofree bool *delocalised = g_new0 (bool, (size_t)ctab->bond->len + 1);

  *out = NULL;
  add_atoms (ctab, mol);
  EnlStatus status = add_bonds (ctab, mol, delocalised);
  if (status != ENL_OK)
    return status;
  enl_molecule_finish (mol);
  if ((status = place_double_bonds (ctab, mol, delocalised)) != ENL_OK ||
      (status = fill_hydrogens (ctab, mol)) != ENL_OK)
    return status;
  enl_valence_separate_charges (mol);
  enl_molecule_finish (mol); /* aromatic flags need the hydrogens and charges */
  if ((status = check_valence (ctab, mol)) != ENL_OK)
    return status;
  read_stereo (ctab, mol);
  enl_molecule_fold_hydrogens (mol);
  *out = g_steal_pointer (&mol);
  return ENL_OK;
}
