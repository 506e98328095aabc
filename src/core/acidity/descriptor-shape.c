/* Descriptors of what the anion's flat geometry costs and gains: aromatic rings, strain. */
#include "core/acidity/descriptor-view.h"

enum { CARBON = 6, NITROGEN = 7, OXYGEN = 8, SULFUR = 16 };

#define SET(name, expression) (view->value[ENL_D_##name] = (double)(expression))
#define ADD(name, expression) (view->value[ENL_D_##name] += (double)(expression))

/* Model constants: how much a neighbour crowds the group that lies on its side of the double bond
 * (1,3-allylic strain: F. Johnson, Chem. Rev. 1968, 68, 375; R. W. Hoffmann, Chem. Rev. 1989, 89,
 * 1841). Hydrogen does not, oxygen little. */
#define CROWDS_OXYGEN 0.3
#define CROWDS_OTHER  1.0

/* Both atoms in one ring of up to eight members. */
static bool
share_ring (const EnlMolecule *mol, uint32_t a, uint32_t b)
{
  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    if (enl_ring_holds (ring, size, a) && enl_ring_holds (ring, size, b))
      return true;
  }
  return false;
}

/* The far side of acceptor `x`: what stands next to the double bond besides its heteroatom. */
static double
far_side (const EnlSiteView *view, uint32_t x)
{
  double most = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (view->mol, x); k++) {
    uint32_t y = enl_molecule_neighbour (view->mol, x, k);
    const EnlBond *bond = enl_molecule_bond (view->mol, enl_molecule_bond_at (view->mol, x, k));
    if (y == view->site || enl_atom_is_hydrogen (view->mol, y) || bond->order > 1)
      continue;
    uint8_t element = enl_molecule_atom (view->mol, y)->element;
    most = MAX (most, element == OXYGEN ? CROWDS_OXYGEN : CROWDS_OTHER);
  }
  return most;
}

/* N=C through N: the groups on its carbon take the place of the far side. */
static double
far_side_of_imine (const EnlSiteView *view, uint32_t x)
{
  uint32_t carbon = enl_atom_partner (view->mol, x, 2, CARBON);

  return carbon != ENL_NONE && enl_atom_heavy_degree (view->mol, carbon) == 3 ? CROWDS_OTHER : 0;
}

/* A carbon without a second hydrogen has a group on either side of each new double bond; one of
 * them meets the far side of the acceptor, unless a ring holds it away. */
static void
fill_strain13 (EnlSiteView *view)
{
  if (!view->carbon || enl_molecule_total_hydrogens (view->mol, view->site) != 1)
    return;
  for (uint32_t i = 0; i < view->n_next; i++) {
    uint32_t x = view->next[i];
    EnlGroup group = enl_survey_group (view->survey, x);
    if (share_ring (view->mol, view->site, x))
      continue;
    if (group == ENL_GROUP_IMINE_N)
      ADD (strain13, far_side_of_imine (view, x));
    else if (enl_group_conjugates (group) && enl_molecule_atom (view->mol, x)->element == CARBON &&
             enl_survey_hybrid (view->survey, x) == ENL_HYBRID_SP2)
      ADD (strain13, far_side (view, x));
    if (enl_molecule_atom (view->mol, x)->aromatic)
      ADD (strain_ortho, 1);
  }
}

/* Lone pairs of the acceptors that another unsaturated group draws away: aryl esters, imides. */
static void
fill_drained (EnlSiteView *view)
{
  for (uint32_t i = 0; i < view->n_acceptors; i++) {
    uint32_t x = view->acceptor[i];
    for (uint32_t k = 0; k < enl_molecule_degree (view->mol, x); k++) {
      uint32_t y = enl_molecule_neighbour (view->mol, x, k);
      uint8_t element = enl_molecule_atom (view->mol, y)->element;
      if (y == view->site || !enl_atom_is_saturated (view->mol, y) ||
          (element != NITROGEN && element != OXYGEN && element != SULFUR))
        continue;
      for (uint32_t j = 0; j < enl_molecule_degree (view->mol, y); j++) {
        uint32_t z = enl_molecule_neighbour (view->mol, y, j);
        if (z == x || enl_survey_hybrid (view->survey, z) != ENL_HYBRID_SP2)
          continue;
        ADD (drained, 1);
        ADD (imide_side, enl_group_conjugates (enl_survey_group (view->survey, z)));
      }
    }
  }
}

void
enl_view_fill_shape (EnlSiteView *view)
{
  double left = view->change->shift[view->site], flat = CLAMP (1 - left, 0, 1);

  SET (ring_gain_even, view->change->even_ring_gain);
  SET (ring_gain_odd, view->change->odd_ring_gain);
  fill_strain13 (view);
  fill_drained (view);
  if (!view->carbon || enl_survey_hybrid (view->survey, view->site) != ENL_HYBRID_SP3)
    return;
  SET (strain_ring3, flat * view->value[ENL_D_ring3]);
  SET (strain_ring4, flat * view->value[ENL_D_ring4]);
}
