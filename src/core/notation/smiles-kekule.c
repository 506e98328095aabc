/* Double bonds of aromatic rings for writing: placed anew in canonical order, so that the text does
 * not tell which of the equivalent forms was drawn. */
#include "core/molecule/kekule.h"
#include "core/notation/smiles-writer.h"

static void
add_bonds_of (const EnlSmilesWalk *walk, const uint32_t *at, uint32_t rank, EnlMolecule *copy)
{
  uint32_t atom = at[rank];

  for (uint32_t next = rank + 1; next < walk->atoms; next++) {
    uint32_t bond = enl_molecule_bond_between (walk->mol, atom, at[next]);
    if (bond != ENL_NONE)
      enl_molecule_add_bond (copy, rank, next, walk->order[bond]);
  }
}

/* The molecule with its atoms and bonds in order of rank. */
static EnlMolecule *
ranked_copy (const EnlSmilesWalk *walk, const uint32_t *at)
{
  EnlMolecule *copy = enl_molecule_new ();

  for (uint32_t i = 0; i < walk->atoms; i++)
    enl_molecule_add_atom (copy, enl_molecule_atom (walk->mol, at[i]));
  for (uint32_t i = 0; i < walk->atoms; i++)
    add_bonds_of (walk, at, i, copy);
  enl_molecule_finish (copy);
  return copy;
}

void
enl_smiles_place_double_bonds (EnlSmilesWalk *walk)
{
  uint32_t bonds = enl_molecule_bonds (walk->mol);
  g_autofree uint32_t *at = g_new (uint32_t, walk->atoms + 1);
  g_autofree bool *delocalised = g_new0 (bool, bonds + 1);

  for (uint32_t v = 0; v < walk->atoms; v++)
    at[walk->rank[v]] = v;
  g_autoptr (EnlMolecule) copy = ranked_copy (walk, at);
  for (uint32_t b = 0; b < bonds; b++) {
    const EnlBond *bond = enl_molecule_bond (copy, b);
    uint32_t own = enl_molecule_bond_between (walk->mol, at[bond->from], at[bond->to]);
    delocalised[b] = enl_molecule_bond (walk->mol, own)->aromatic;
  }
  /* The molecule has one such form at least; where its valences are too odd for the search to see
   * it, the form it came with stays. */
  if (!enl_kekule_place (copy, delocalised, ENL_KEKULE_DEFAULT, NULL))
    return;
  for (uint32_t b = 0; b < bonds; b++) {
    const EnlBond *bond = enl_molecule_bond (copy, b);
    walk->order[enl_molecule_bond_between (walk->mol, at[bond->from], at[bond->to])] = bond->order;
  }
}
