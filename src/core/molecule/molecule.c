#include "core/molecule/molecule.h"

#include <string.h>

#include "core/molecule/molecule-private.h"

enum { FIRST_ROOM = 32 }; /* atoms or bonds of a usual substrate, so that few grow */

EnlMolecule *
enl_molecule_new (void)
{
  return g_new0 (EnlMolecule, 1);
}

void
enl_molecule_forget_derived (EnlMolecule *mol)
{
  g_clear_pointer (&mol->first, g_free);
  g_clear_pointer (&mol->ring_first, g_free);
  mol->n_rings = mol->n_spare = mol->n_ring_atoms = 0;
  mol->linked = mol->finished = false;
}

void
enl_molecule_free (EnlMolecule *mol)
{
  if (!mol)
    return;
  enl_molecule_forget_derived (mol);
  g_free (mol->atom);
  g_free (mol->bond);
  g_free (mol->name);
  g_free (mol);
}

static size_t
link_block_size (const EnlMolecule *mol)
{
  return (size_t)mol->n_atoms + 1 + 4 * (size_t)mol->n_bonds;
}

static void
place_links (EnlMolecule *mol, uint32_t *block)
{
  mol->first = block;
  mol->neighbour = block + mol->n_atoms + 1;
  mol->via = mol->neighbour + 2 * (size_t)mol->n_bonds;
}

static void
place_rings (EnlMolecule *mol, uint32_t *block)
{
  mol->ring_first = block;
  mol->ring_count = block + mol->n_rings + mol->n_spare + 1;
  mol->smallest = mol->ring_count + mol->n_atoms;
  mol->ring_atom = mol->smallest + mol->n_atoms;
}

static size_t
ring_block_size (const EnlMolecule *mol)
{
  return (size_t)mol->n_rings + mol->n_spare + 1 + 2 * (size_t)mol->n_atoms + mol->n_ring_atoms;
}

void
enl_molecule_make_ring_block (EnlMolecule *mol, uint32_t n_rings, uint32_t n_spare,
                              uint32_t n_ring_atoms)
{
  g_free (mol->ring_first);
  mol->n_rings = n_rings;
  mol->n_spare = n_spare;
  mol->n_ring_atoms = n_ring_atoms;
  place_rings (mol, g_new (uint32_t, ring_block_size (mol)));
}

EnlMolecule *
enl_molecule_copy (const EnlMolecule *mol)
{
  EnlMolecule *copy = g_memdup2 (mol, sizeof *mol);

  copy->atom = g_memdup2 (mol->atom, mol->n_atoms * sizeof *mol->atom);
  copy->bond = g_memdup2 (mol->bond, mol->n_bonds * sizeof *mol->bond);
  copy->atom_room = mol->n_atoms;
  copy->bond_room = mol->n_bonds;
  copy->name = g_strdup (mol->name);
  if (mol->first)
    place_links (copy, g_memdup2 (mol->first, link_block_size (mol) * sizeof *mol->first));
  if (mol->ring_first)
    place_rings (copy, g_memdup2 (mol->ring_first, ring_block_size (mol) * sizeof (uint32_t)));
  return copy;
}

const char *
enl_molecule_name (const EnlMolecule *mol)
{
  return mol->name ? mol->name : "";
}

void
enl_molecule_set_name (EnlMolecule *mol, const char *name)
{
  char *copy = g_strdup (name); /* before the free: name may be our own */

  g_free (mol->name);
  mol->name = copy;
}

uint32_t
enl_molecule_add_atom (EnlMolecule *mol, const EnlAtom *atom)
{
  if (mol->n_atoms == mol->atom_room) {
    mol->atom_room = MAX (FIRST_ROOM, 2 * mol->atom_room);
    mol->atom = g_renew (EnlAtom, mol->atom, mol->atom_room);
  }
  /* The block sizes depend on the counts, so derived facts go before the counts change. */
  if (mol->first || mol->ring_first)
    enl_molecule_forget_derived (mol);
  mol->atom[mol->n_atoms] = *atom;
  return mol->n_atoms++;
}

static bool
has_bond (const EnlMolecule *mol, uint32_t a, uint32_t b)
{
  for (uint32_t i = mol->n_bonds; i-- > 0;)
    if ((mol->bond[i].from == a && mol->bond[i].to == b) ||
        (mol->bond[i].from == b && mol->bond[i].to == a))
      return true;
  return false;
}

uint32_t
enl_molecule_add_bond (EnlMolecule *mol, uint32_t from, uint32_t to, uint8_t order)
{
  g_assert (from < mol->n_atoms && to < mol->n_atoms);
  if (from == to || has_bond (mol, from, to))
    return ENL_NONE;
  if (mol->n_bonds == mol->bond_room) {
    mol->bond_room = MAX (FIRST_ROOM, 2 * mol->bond_room);
    mol->bond = g_renew (EnlBond, mol->bond, mol->bond_room);
  }
  if (mol->first || mol->ring_first)
    enl_molecule_forget_derived (mol);
  mol->bond[mol->n_bonds] =
      (EnlBond){.from = from, .to = to, .order = order, .side_from = ENL_NONE, .side_to = ENL_NONE};
  return mol->n_bonds++;
}

EnlAtom *
enl_molecule_edit_atom (EnlMolecule *mol, uint32_t atom)
{
  g_assert (atom < mol->n_atoms);
  return &mol->atom[atom];
}

EnlBond *
enl_molecule_edit_bond (EnlMolecule *mol, uint32_t bond)
{
  g_assert (bond < mol->n_bonds);
  return &mol->bond[bond];
}

void
enl_molecule_link (EnlMolecule *mol)
{
  enl_molecule_forget_derived (mol);
  place_links (mol, g_new0 (uint32_t, link_block_size (mol)));
  /* Counting sort: first[a + 1] counts, then becomes a start, then moves on as links are put. */
  for (uint32_t i = 0; i < mol->n_bonds; i++) {
    mol->first[mol->bond[i].from]++;
    mol->first[mol->bond[i].to]++;
  }
  for (uint32_t a = 0, sum = 0; a <= mol->n_atoms; a++) {
    uint32_t count = a < mol->n_atoms ? mol->first[a] : 0;
    mol->first[a] = sum += count; /* the end; links are filled from the back */
  }
  for (uint32_t i = mol->n_bonds; i-- > 0;) {
    const EnlBond *bond = &mol->bond[i];
    uint32_t slot = --mol->first[bond->from];
    mol->neighbour[slot] = bond->to;
    mol->via[slot] = i;
    slot = --mol->first[bond->to];
    mol->neighbour[slot] = bond->from;
    mol->via[slot] = i;
  }
  mol->linked = true;
}

void
enl_molecule_finish (EnlMolecule *mol)
{
  enl_molecule_link (mol);
  enl_molecule_find_rings (mol);
  enl_molecule_find_aromatic (mol);
}

uint32_t
enl_molecule_atoms (const EnlMolecule *mol)
{
  return mol->n_atoms;
}

uint32_t
enl_molecule_bonds (const EnlMolecule *mol)
{
  return mol->n_bonds;
}

const EnlAtom *
enl_molecule_atom (const EnlMolecule *mol, uint32_t atom)
{
  g_assert (atom < mol->n_atoms);
  return &mol->atom[atom];
}

const EnlBond *
enl_molecule_bond (const EnlMolecule *mol, uint32_t bond)
{
  g_assert (bond < mol->n_bonds);
  return &mol->bond[bond];
}

uint32_t
enl_molecule_degree (const EnlMolecule *mol, uint32_t atom)
{
  g_assert (mol->linked && atom < mol->n_atoms);
  return mol->first[atom + 1] - mol->first[atom];
}

uint32_t
enl_molecule_neighbour (const EnlMolecule *mol, uint32_t atom, uint32_t k)
{
  g_assert (k < enl_molecule_degree (mol, atom));
  return mol->neighbour[mol->first[atom] + k];
}

uint32_t
enl_molecule_bond_at (const EnlMolecule *mol, uint32_t atom, uint32_t k)
{
  g_assert (k < enl_molecule_degree (mol, atom));
  return mol->via[mol->first[atom] + k];
}

uint32_t
enl_molecule_bond_between (const EnlMolecule *mol, uint32_t a, uint32_t b)
{
  g_assert (mol->linked && a < mol->n_atoms && b < mol->n_atoms);
  for (uint32_t i = mol->first[a]; i < mol->first[a + 1]; i++)
    if (mol->neighbour[i] == b)
      return mol->via[i];
  return ENL_NONE;
}

uint32_t
enl_molecule_other_end (const EnlMolecule *mol, uint32_t bond, uint32_t atom)
{
  const EnlBond *b = enl_molecule_bond (mol, bond);

  g_assert (b->from == atom || b->to == atom);
  return b->from == atom ? b->to : b->from;
}

uint32_t
enl_molecule_total_hydrogens (const EnlMolecule *mol, uint32_t atom)
{
  g_assert (mol->linked && atom < mol->n_atoms);
  uint32_t count = mol->atom[atom].hydrogens;
  for (uint32_t i = mol->first[atom]; i < mol->first[atom + 1]; i++)
    count += mol->atom[mol->neighbour[i]].element == 1;
  return count;
}

uint32_t
enl_molecule_order_sum (const EnlMolecule *mol, uint32_t atom)
{
  g_assert (mol->linked && atom < mol->n_atoms);
  uint32_t sum = 0;
  for (uint32_t i = mol->first[atom]; i < mol->first[atom + 1]; i++)
    sum += mol->bond[mol->via[i]].order;
  return sum;
}

uint32_t
enl_molecule_rings (const EnlMolecule *mol)
{
  g_assert (mol->finished);
  return mol->n_rings;
}

const uint32_t *
enl_molecule_ring (const EnlMolecule *mol, uint32_t ring, uint32_t *size)
{
  g_assert (mol->finished && ring < mol->n_rings);
  *size = mol->ring_first[ring + 1] - mol->ring_first[ring];
  return mol->ring_atom + mol->ring_first[ring];
}

bool
enl_molecule_in_ring (const EnlMolecule *mol, uint32_t atom)
{
  return enl_molecule_smallest_ring (mol, atom) != 0;
}

bool
enl_molecule_in_ring_of (const EnlMolecule *mol, uint32_t atom, uint32_t size)
{
  g_assert (mol->finished);
  for (uint32_t r = 0; r < mol->n_rings + mol->n_spare; r++) {
    uint32_t start = mol->ring_first[r], stop = mol->ring_first[r + 1];
    for (uint32_t i = start; stop - start == size && i < stop; i++)
      if (mol->ring_atom[i] == atom)
        return true;
  }
  return false;
}

uint32_t
enl_molecule_smallest_ring (const EnlMolecule *mol, uint32_t atom)
{
  g_assert (mol->finished && atom < mol->n_atoms);
  return mol->smallest[atom];
}

uint32_t
enl_molecule_ring_count_of_atom (const EnlMolecule *mol, uint32_t atom)
{
  g_assert (mol->finished && atom < mol->n_atoms);
  return mol->ring_count[atom];
}

bool
enl_molecule_has_layout (const EnlMolecule *mol)
{
  return mol->has_layout;
}

void
enl_molecule_set_has_layout (EnlMolecule *mol, bool has_layout)
{
  mol->has_layout = has_layout;
}
