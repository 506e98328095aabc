#include "core/acidity/family.h"

#include "core/acidity/group.h"
#include "core/notation/smiles.h"

typedef struct {
  const EnlMolecule *mol;
  uint32_t acid;
  bool *keep;
  bool *whole; /* aromatic atoms whose ring system was kept */
} Core;

static bool
is_multiple (const EnlMolecule *mol, uint32_t a, uint32_t b)
{
  const EnlBond *bond = enl_molecule_bond (mol, enl_molecule_bond_between (mol, a, b));

  return bond->order > 1 && !bond->aromatic;
}

/* The aromatic ring system of an atom: all aromatic atoms that are reached by ring bonds, and what
 * they hold by a double bond. */
static void
keep_rings (Core *core, uint32_t atom)
{
  core->keep[atom] = core->whole[atom] = true;
  for (uint32_t k = 0; k < enl_molecule_degree (core->mol, atom); k++) {
    uint32_t x = enl_molecule_neighbour (core->mol, atom, k);
    const EnlBond *bond = enl_molecule_bond (core->mol, enl_molecule_bond_at (core->mol, atom, k));
    if (enl_molecule_atom (core->mol, x)->aromatic && bond->ring && !core->whole[x])
      keep_rings (core, x);
    else if (bond->order > 1)
      core->keep[x] = true;
  }
}

/* A group with its first atoms, aromatic ring systems whole; plain atoms alone. */
static void
keep_atom (Core *core, uint32_t atom)
{
  if (enl_molecule_atom (core->mol, atom)->aromatic && !core->whole[atom])
    keep_rings (core, atom);
  core->keep[atom] = true;
}

static void
keep_neighbours (Core *core, uint32_t atom, uint32_t from)
{
  for (uint32_t k = 0; k < enl_molecule_degree (core->mol, atom); k++) {
    uint32_t x = enl_molecule_neighbour (core->mol, atom, k);
    if (x != from)
      core->keep[x] = true;
  }
}

/* What a kept group carries besides the acidic atom. */
static void
keep_far_side (Core *core, uint32_t group)
{
  const EnlMolecule *mol = core->mol;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, group); k++) {
    uint32_t x = enl_molecule_neighbour (mol, group, k);
    uint8_t element = enl_molecule_atom (mol, x)->element;
    if (x == core->acid)
      continue;
    keep_atom (core, x);
    if (element != 6 && !enl_molecule_atom (mol, x)->aromatic && !is_multiple (mol, group, x))
      keep_neighbours (core, x, group);
    if (element == 6 && enl_molecule_atom (mol, core->acid)->element == 6 &&
        enl_group_is_cf3 (mol, x))
      for (uint32_t i = 0; i < enl_molecule_degree (mol, x); i++)
        if (enl_molecule_atom (mol, enl_molecule_neighbour (mol, x, i))->element == 9)
          core->keep[enl_molecule_neighbour (mol, x, i)] = true;
  }
}

/* Multiple bonds of a group, and those of what hangs on a heteroatom in between (hydroxamic acids,
 * oximes, sulfonamides). */
static void
keep_partners (Core *core, uint32_t group)
{
  const EnlMolecule *mol = core->mol;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, group); k++) {
    uint32_t x = enl_molecule_neighbour (mol, group, k);
    if (x != core->acid && is_multiple (mol, group, x))
      core->keep[x] = true;
  }
}

static void
keep_group (Core *core, uint32_t group)
{
  const EnlMolecule *mol = core->mol;
  uint8_t element = enl_molecule_atom (mol, group)->element;

  keep_atom (core, group);
  keep_partners (core, group);
  if (enl_molecule_atom (mol, group)->aromatic)
    return;
  if (enl_group_is_acceptor (enl_group_of (mol, group)))
    keep_far_side (core, group);
  else if (element != 6)
    for (uint32_t k = 0; k < enl_molecule_degree (mol, group); k++) {
      uint32_t x = enl_molecule_neighbour (mol, group, k);
      if (x == core->acid)
        continue;
      keep_atom (core, x);
      keep_partners (core, x);
    }
}

/* Whether a neighbour of an acidic carbon makes it acidic. */
static bool
belongs (const EnlMolecule *mol, uint32_t x)
{
  return !enl_atom_is_saturated (mol, x) || enl_group_is_acceptor (enl_group_of (mol, x));
}

static bool
ring_closes_outside (const Core *core)
{
  for (uint32_t r = 0; r < enl_molecule_rings (core->mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (core->mol, r, &size);
    uint32_t kept = 0;
    bool has_acid = false;
    for (uint32_t i = 0; i < size; i++) {
      kept += core->keep[ring[i]];
      has_acid |= ring[i] == core->acid;
    }
    if (has_acid && kept < size)
      return true;
  }
  return false;
}

/* The kept atoms as a molecule; hydrogens take the place of what was cut off. */
static EnlMolecule *
cut_out (const Core *core)
{
  uint32_t n = enl_molecule_atoms (core->mol);
  EnlMolecule *part = enl_molecule_copy (core->mol);
  g_autofree bool *remove = g_new (bool, n);

  for (uint32_t a = 0; a < n; a++)
    remove[a] = !core->keep[a];
  for (uint32_t b = 0; b < enl_molecule_bonds (core->mol); b++) {
    const EnlBond *bond = enl_molecule_bond (core->mol, b);
    if (remove[bond->from] != remove[bond->to])
      enl_molecule_edit_atom (part, remove[bond->from] ? bond->to : bond->from)->hydrogens +=
          bond->order;
  }
  enl_molecule_remove_atoms (part, remove, NULL);
  enl_molecule_finish (part);
  return part;
}

char *
enl_family_of (const EnlMolecule *mol, uint32_t atom)
{
  g_autofree bool *keep = g_new0 (bool, enl_molecule_atoms (mol));
  g_autofree bool *whole = g_new0 (bool, enl_molecule_atoms (mol));
  Core core = {mol, atom, keep, whole};
  bool carbon = enl_molecule_atom (mol, atom)->element == 6;

  keep_atom (&core, atom);
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t x = enl_molecule_neighbour (mol, atom, k);
    if (!enl_atom_is_hydrogen (mol, x) && (!carbon || belongs (mol, x)))
      keep_group (&core, x);
  }
  g_autoptr (EnlMolecule) part = cut_out (&core);
  g_autofree char *text = enl_smiles_write (part, ENL_SMILES_NO_STEREO, NULL);
  return g_strconcat (text, ring_closes_outside (&core) ? " in a ring" : NULL, NULL);
}
