/* Taking atoms away: removal in general, and folding of written hydrogens. */
#include "core/molecule/molecule-private.h"

enum { HYDROGEN = 1 };

static uint32_t
map_atom (const uint32_t *renumber, uint32_t atom)
{
  return atom == ENL_NONE ? ENL_NONE : renumber[atom];
}

/* Forgets the side of a bond when a reference neighbour is gone. */
static void
map_side (EnlBond *bond, const uint32_t *renumber)
{
  bond->side_from = map_atom (renumber, bond->side_from);
  bond->side_to = map_atom (renumber, bond->side_to);
  if (bond->side_from != ENL_NONE && bond->side_to != ENL_NONE)
    return;
  bond->side = ENL_SIDE_NONE;
  bond->side_from = bond->side_to = ENL_NONE;
}

/* Closes the gaps; the order of what stays is kept, and with it the sense of windings. */
static void
compact (EnlMolecule *mol, const bool *remove, uint32_t *renumber)
{
  uint32_t n_atoms = 0, n_bonds = 0;

  for (uint32_t a = 0; a < mol->n_atoms; a++) {
    renumber[a] = remove[a] ? ENL_NONE : n_atoms;
    if (!remove[a])
      mol->atom[n_atoms++] = mol->atom[a];
  }
  for (uint32_t i = 0; i < mol->n_bonds; i++) {
    EnlBond bond = mol->bond[i];
    bond.from = renumber[bond.from];
    bond.to = renumber[bond.to];
    if (bond.from == ENL_NONE || bond.to == ENL_NONE)
      continue;
    map_side (&bond, renumber);
    mol->bond[n_bonds++] = bond;
  }
  enl_molecule_forget_derived (mol);
  mol->n_atoms = n_atoms;
  mol->n_bonds = n_bonds;
}

void
enl_molecule_remove_atoms (EnlMolecule *mol, const bool *remove, uint32_t *renumber)
{
  g_autofree uint32_t *own = renumber ? NULL : g_new (uint32_t, (size_t)mol->n_atoms + 1);

  for (uint32_t i = 0; i < mol->n_bonds; i++) {
    const EnlBond *bond = &mol->bond[i];
    if (remove[bond->from])
      mol->atom[bond->to].winding = ENL_WINDING_NONE;
    if (remove[bond->to])
      mol->atom[bond->from].winding = ENL_WINDING_NONE;
  }
  compact (mol, remove, renumber ? renumber : own);
}

/* ---- hydrogens ---- */

static bool
is_plain_hydrogen (const EnlMolecule *mol, uint32_t a)
{
  const EnlAtom *atom = &mol->atom[a];

  if (atom->element != HYDROGEN || atom->isotope || atom->charge || atom->map || atom->hydrogens ||
      mol->first[a + 1] - mol->first[a] != 1 || mol->bond[mol->via[mol->first[a]]].order != 1)
    return false;
  const EnlAtom *other = &mol->atom[mol->neighbour[mol->first[a]]];
  return other->element > HYDROGEN && other->hydrogens < UINT8_MAX;
}

/* Another neighbour of `end` than the partner of the double bond and the hydrogen, or ENL_NONE. */
static uint32_t
find_substitute (const EnlMolecule *mol, uint32_t end, uint32_t partner, uint32_t hydrogen)
{
  for (uint32_t i = mol->first[end]; i < mol->first[end + 1]; i++)
    if (mol->neighbour[i] != partner && mol->neighbour[i] != hydrogen)
      return mol->neighbour[i];
  return ENL_NONE;
}

/* Moves the reference of a double bond from a hydrogen to the neighbour across from it. */
static void
move_reference (EnlMolecule *mol, EnlBond *bond, uint32_t end, uint32_t partner,
                uint32_t *reference)
{
  if (bond->side == ENL_SIDE_NONE || mol->atom[*reference].element != HYDROGEN)
    return;
  uint32_t other = find_substitute (mol, end, partner, *reference);
  if (other == ENL_NONE) {
    if (mol->atom[end].hydrogens) { /* =CH2: two equal neighbours */
      bond->side = ENL_SIDE_NONE;
      bond->side_from = bond->side_to = ENL_NONE;
    }
    return;
  }
  *reference = other;
  bond->side = bond->side == ENL_SIDE_SAME ? ENL_SIDE_OPPOSITE : ENL_SIDE_SAME;
}

static void
move_references (EnlMolecule *mol)
{
  for (uint32_t i = 0; i < mol->n_bonds; i++) {
    EnlBond *bond = &mol->bond[i];
    move_reference (mol, bond, bond->from, bond->to, &bond->side_from);
    move_reference (mol, bond, bond->to, bond->from, &bond->side_to);
  }
}

/* The hydrogen becomes the unwritten neighbour, which comes first: every neighbour before it in the
 * order changes places with it. */
static void
turn_winding (EnlMolecule *mol, uint32_t centre, uint32_t hydrogen)
{
  EnlAtom *atom = &mol->atom[centre];
  bool odd = false;

  if (atom->winding == ENL_WINDING_NONE)
    return;
  if (atom->hydrogens || mol->first[centre + 1] - mol->first[centre] != 4) {
    atom->winding = ENL_WINDING_NONE; /* two hydrogens, or a lone pair that would be mistaken */
    return;
  }
  for (uint32_t i = mol->first[centre]; i < mol->first[centre + 1]; i++)
    odd ^= mol->neighbour[i] < hydrogen;
  if (odd)
    atom->winding =
        atom->winding == ENL_WINDING_CLOCKWISE ? ENL_WINDING_ANTICLOCKWISE : ENL_WINDING_CLOCKWISE;
}

static bool
is_reference (const EnlMolecule *mol, uint32_t hydrogen)
{
  uint32_t centre = mol->neighbour[mol->first[hydrogen]];

  for (uint32_t i = mol->first[centre]; i < mol->first[centre + 1]; i++) {
    const EnlBond *bond = &mol->bond[mol->via[i]];
    if (bond->side_from == hydrogen || bond->side_to == hydrogen)
      return true;
  }
  return false;
}

bool
enl_molecule_fold_hydrogens (EnlMolecule *mol)
{
  bool any = false;

  g_assert (mol->linked);
  for (uint32_t a = 0; !any && a < mol->n_atoms; a++)
    any = is_plain_hydrogen (mol, a);
  if (!any)
    return false;
  move_references (mol);
  g_autofree bool *remove = g_new0 (bool, mol->n_atoms);
  g_autofree uint32_t *renumber = g_new (uint32_t, mol->n_atoms);
  any = false;
  for (uint32_t a = 0; a < mol->n_atoms; a++) {
    if (!is_plain_hydrogen (mol, a) || is_reference (mol, a))
      continue;
    uint32_t centre = mol->neighbour[mol->first[a]];
    turn_winding (mol, centre, a);
    mol->atom[centre].hydrogens++;
    any = remove[a] = true;
  }
  if (!any)
    return false;
  compact (mol, remove, renumber);
  enl_molecule_finish (mol);
  return true;
}
