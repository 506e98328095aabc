/* Descriptors of rings, crowding and hydrogen bonds. */
#include "core/acidity/descriptor-view.h"

enum { NITROGEN = 7, OXYGEN = 8, SULFUR = 16 };

#define SET(name, expression) (view->value[ENL_D_##name] = (double)(expression))
#define ADD(name, expression) (view->value[ENL_D_##name] += (double)(expression))

/* Aromatic rings that share one bond with this ring. */
static int
fused_aromatics (const EnlMolecule *mol, uint32_t which)
{
  uint32_t size, other_size;
  const uint32_t *ring = enl_molecule_ring (mol, which, &size);
  int n = 0;

  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    const uint32_t *other = enl_molecule_ring (mol, r, &other_size);
    int common = 0;
    if (r == which || !enl_ring_is_aromatic (mol, other, other_size))
      continue;
    for (uint32_t k = 0; k < other_size; k++)
      common += enl_ring_holds (ring, size, other[k]);
    n += common == 2;
  }
  return n;
}

/* One acceptor in one ring with the site: lactones and lactams are fixed there as s-E. */
static void
add_ring_acceptor (EnlSiteView *view, const uint32_t *ring, uint32_t size, uint32_t acceptor)
{
  if (size == 4)
    SET (ring_acceptor4, 1);
  if (size == 5)
    SET (ring_acceptor5, 1);
  if (size == 6)
    SET (ring_acceptor6, 1);
  for (uint32_t k = 0; k < enl_molecule_degree (view->mol, acceptor); k++) {
    uint32_t x = enl_molecule_neighbour (view->mol, acceptor, k);
    uint8_t element = enl_molecule_atom (view->mol, x)->element;
    if (!enl_ring_holds (ring, size, x))
      continue;
    ADD (ring_ester, element == OXYGEN);
    ADD (ring_amide, element == NITROGEN || element == SULFUR);
  }
}

static void
fill_ring_acceptors (EnlSiteView *view)
{
  bool inside[ENL_VIEW_MAX] = {false};
  int most = 0;

  for (uint32_t r = 0; r < enl_molecule_rings (view->mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (view->mol, r, &size);
    int here = 0;
    if (!enl_ring_holds (ring, size, view->site))
      continue;
    ADD (rings_shared, 1);
    if (!enl_molecule_atom (view->mol, view->site)->aromatic)
      ADD (benzo, fused_aromatics (view->mol, r));
    for (uint32_t i = 0; i < view->n_acceptors; i++) {
      if (!enl_ring_holds (ring, size, view->acceptor[i]))
        continue;
      inside[i] = true;
      here++;
      add_ring_acceptor (view, ring, size, view->acceptor[i]);
    }
    most = MAX (most, here);
  }
  for (uint32_t i = 0; i < view->n_acceptors; i++) {
    bool ring = enl_molecule_in_ring (view->mol, view->acceptor[i]);
    ADD (ring_acceptors, inside[i]);
    ADD (outer_ring_acceptor, ring && !inside[i]);
    ADD (acceptor_ring5, enl_molecule_in_ring_of (view->mol, view->acceptor[i], 5));
  }
  SET (ring_acceptors_two, most >= 2);
  SET (rings_shared, view->value[ENL_D_rings_shared] > 1);
  SET (benzo_acceptor, view->value[ENL_D_benzo] * view->value[ENL_D_ring_acceptors]);
}

static void
fill_ring_sizes (EnlSiteView *view)
{
  const EnlMolecule *mol = view->mol;

  SET (ring3, enl_molecule_in_ring_of (mol, view->site, 3));
  SET (ring4, enl_molecule_in_ring_of (mol, view->site, 4));
  SET (ring5, enl_molecule_in_ring_of (mol, view->site, 5));
  SET (ring6, enl_molecule_in_ring_of (mol, view->site, 6));
  SET (ring7, enl_molecule_in_ring_of (mol, view->site, 7));
  for (uint32_t i = 0; i < view->n_next; i++)
    ADD (next_ring3, enl_molecule_in_ring_of (mol, view->next[i], 3));
}

/* Substituents ortho to the site on aryl neighbours: they turn the ring out of the plane. Atoms
 * that close a ring through the site itself do not. */
static void
fill_ortho (EnlSiteView *view)
{
  for (uint32_t i = 0; i < view->n_next; i++) {
    uint32_t x = view->next[i];
    if (!enl_molecule_atom (view->mol, x)->aromatic)
      continue;
    for (uint32_t k = 0; k < enl_molecule_degree (view->mol, x); k++) {
      uint32_t y = enl_molecule_neighbour (view->mol, x, k);
      bool closes = false;
      for (uint32_t r = 0; r < enl_molecule_rings (view->mol); r++) {
        uint32_t size;
        const uint32_t *ring = enl_molecule_ring (view->mol, r, &size);
        closes |= enl_ring_holds (ring, size, view->site) && enl_ring_holds (ring, size, y);
      }
      ADD (ortho, enl_molecule_atom (view->mol, y)->aromatic && !closes &&
                      enl_atom_heavy_degree (view->mol, y) == 3);
    }
  }
}

static void
fill_crowding (EnlSiteView *view)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (view->mol); i++) {
    if (enl_atom_is_hydrogen (view->mol, i))
      continue;
    ADD (heavy_beta, view->distance[i] == 2);
    ADD (heavy_gamma, view->distance[i] == 3);
  }
  if (view->carbon && enl_molecule_total_hydrogens (view->mol, view->site) == 1)
    SET (crowding, view->value[ENL_D_heavy_beta]);
  SET (heavy_atoms, enl_molecule_heavy_atoms (view->mol));
}

/* O-H and N-H that can hold the anion, and lone pairs that can hold the acid's hydrogen, where the
 * hydrogen bond closes a ring of 5 or 6. */
static void
fill_hydrogen_bonds (EnlSiteView *view)
{
  if (view->carbon)
    return;
  for (uint32_t i = 0; i < enl_molecule_atoms (view->mol); i++) {
    uint8_t element = enl_molecule_atom (view->mol, i)->element;
    uint32_t d = view->distance[i];
    if ((element != NITROGEN && element != OXYGEN) || (d != 3 && d != 4))
      continue;
    uint32_t hydrogens = enl_molecule_total_hydrogens (view->mol, i);
    bool donor = hydrogens > 0;
    bool acceptor = !donor && enl_molecule_degree (view->mol, i) < 3;
    ADD (donor5, donor && d == 3);
    ADD (donor6, donor && d == 4);
    ADD (acceptor5, acceptor && d == 3);
    ADD (acceptor6, acceptor && d == 4);
  }
}

void
enl_view_fill_rings (EnlSiteView *view)
{
  fill_ring_sizes (view);
  fill_ring_acceptors (view);
  fill_ortho (view);
  fill_crowding (view);
  fill_hydrogen_bonds (view);
}
