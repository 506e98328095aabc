#include "core/bases/overlap.h"

#include "core/acidity/group.h"

struct EnlChargeRoom {
  GHashTable *reach; /* atom -> bool per atom: charge or stabilising acceptor there */
  uint32_t n_atoms;
};

static bool
may_be_double (const EnlMolecule *mol, uint32_t bond)
{
  const EnlBond *b = enl_molecule_bond (mol, bond);

  return b->order >= 2 || b->aromatic;
}

/* A lone pair passes through C, N and the like; S and P hold it by induction and polarisation. */
static bool
passes (const EnlMolecule *mol, uint32_t atom)
{
  uint8_t element = enl_molecule_atom (mol, atom)->element;

  return element == 6 || element == 7 || element == 5;
}

/* X-Y=Z gives X=Y and the pair on Z; again from every Z. Which double bonds have moved before is
 * left aside: it changes hardly what can be reached. */
static void
spread (const EnlMolecule *mol, uint32_t from, bool *reach)
{
  g_autoptr (GArray) open = g_array_new (FALSE, FALSE, sizeof (uint32_t));

  reach[from] = true;
  g_array_append_val (open, from);
  while (open->len) {
    uint32_t x = g_array_index (open, uint32_t, open->len - 1);
    g_array_set_size (open, open->len - 1);
    for (uint32_t i = 0; i < enl_molecule_degree (mol, x); i++) {
      uint32_t y = enl_molecule_neighbour (mol, x, i);
      for (uint32_t k = 0; passes (mol, y) && k < enl_molecule_degree (mol, y); k++) {
        uint32_t z = enl_molecule_neighbour (mol, y, k);
        if (reach[z] || !may_be_double (mol, enl_molecule_bond_between (mol, y, z)))
          continue;
        reach[z] = true;
        g_array_append_val (open, z);
      }
    }
  }
}

static bool *
reach_of (const EnlMolecule *mol, uint32_t atom)
{
  bool *reach = g_new0 (bool, enl_molecule_atoms (mol));

  spread (mol, atom, reach);
  for (uint32_t i = 0; i < enl_molecule_degree (mol, atom); i++) {
    uint32_t next = enl_molecule_neighbour (mol, atom, i);
    reach[next] |= enl_group_is_acceptor (enl_group_of (mol, next));
  }
  return reach;
}

EnlChargeRoom *
enl_charge_room_new (const EnlMolecule *mol, const EnlSites *sites)
{
  EnlChargeRoom *room = g_new0 (EnlChargeRoom, 1);

  room->n_atoms = enl_molecule_atoms (mol);
  room->reach = g_hash_table_new_full (NULL, NULL, NULL, g_free);
  for (uint32_t i = 0; i < sites->n_sites; i++)
    for (uint32_t k = 0; k < sites->site[i].n_atoms; k++) {
      uint32_t atom = sites->site[i].atom[k];
      g_hash_table_insert (room->reach, GUINT_TO_POINTER (atom), reach_of (mol, atom));
    }
  return room;
}

void
enl_charge_room_free (EnlChargeRoom *room)
{
  if (!room)
    return;
  g_hash_table_unref (room->reach);
  g_free (room);
}

bool
enl_charge_room_shared (const EnlChargeRoom *room, const EnlSites *sites, uint32_t a, uint32_t one,
                        uint32_t b, uint32_t other)
{
  const bool *left = g_hash_table_lookup (room->reach, GUINT_TO_POINTER (sites->site[a].atom[one]));
  const bool *right =
      g_hash_table_lookup (room->reach, GUINT_TO_POINTER (sites->site[b].atom[other]));

  for (uint32_t i = 0; i < room->n_atoms; i++)
    if (left[i] && right[i])
      return true;
  return false;
}
