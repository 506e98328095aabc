/* Hammett sums: what the substituents of aromatic rings near the site do to it. */
#include "core/acidity/descriptor-view.h"

/* Model constant: share of the extra of sigma-minus that an ortho substituent shows. */
#define ORTHO_EXTRA 0.6
/* Empirical ortho constants are taken as the para ones: both pass resonance and field on. */

static void
add_effect (EnlRingSigma *sum, EnlRingSigma more)
{
  sum->meta += more.meta;
  sum->para += more.para;
  sum->extra += more.extra;
  sum->ortho += more.ortho;
}

static void
add_group (EnlRingSigma *sum, EnlSigma sigma, uint32_t position)
{
  double extra = sigma.para_minus - sigma.para;

  if (position == 2) {
    sum->meta += sigma.meta;
  } else if (position == 3) {
    sum->para += sigma.para;
    sum->extra += extra;
  } else {
    sum->ortho += sigma.para;
    sum->extra += ORTHO_EXTRA * extra;
  }
}

/* What one ring member, `position` bonds round the ring from the ipso atom, adds. */
static void
add_member (EnlSiteView *view, EnlRingSigma *sum, uint32_t atom, uint32_t position,
            const uint32_t *ring, uint32_t size)
{
  const EnlSubstituents *table = enl_survey_constants (view->survey)->substituents;
  const EnlAtom *a = enl_molecule_atom (view->mol, atom);

  if (a->element == 7)
    add_effect (sum, enl_substituents_ring_effect (table, ENL_RING_AZA, position));
  if (a->charge > 0)
    add_effect (sum, enl_substituents_ring_effect (table, ENL_RING_CATION, position));
  for (uint32_t k = 0; k < enl_molecule_degree (view->mol, atom); k++) {
    uint32_t x = enl_molecule_neighbour (view->mol, atom, k);
    bool inside =
        x == view->site || enl_atom_is_hydrogen (view->mol, x) || enl_ring_holds (ring, size, x);
    if (inside)
      continue;
    if (enl_molecule_bond (view->mol, enl_molecule_bond_at (view->mol, atom, k))->aromatic)
      add_effect (sum, enl_substituents_ring_effect (table, ENL_RING_FUSED, position));
    else
      add_group (sum, enl_survey_sigma (view->survey, atom, x), position);
  }
}

static EnlRingSigma
ring_sum (EnlSiteView *view, const uint32_t *ring, uint32_t size, uint32_t ipso)
{
  EnlRingSigma sum = {0, 0, 0, 0};

  for (uint32_t k = 0; k < size; k++) {
    uint32_t round = (k + size - ipso) % size;
    uint32_t position = MIN (round, size - round);
    if (position >= 1 && position <= 3)
      add_member (view, &sum, ring[k], position, ring, size);
  }
  return sum;
}

static void
store (EnlSiteView *view, uint32_t distance, EnlRingSigma sum)
{
  const double part[ENL_RING_SUMS] = {sum.meta, sum.para, sum.extra, sum.ortho};

  for (uint32_t k = 0; k < ENL_RING_SUMS; k++) {
    view->value[ENL_D_ring_sums + distance * ENL_RING_SUMS + k] += part[k];
    if (!view->carbon && distance >= 1 && distance <= ENL_RING_HETERO)
      view->value[ENL_D_ring_sums_hetero + (distance - 1) * ENL_RING_SUMS + k] += part[k];
  }
  view->value[ENL_D_ring_count + distance]++;
}

void
enl_view_fill_ring_sums (EnlSiteView *view)
{
  for (uint32_t r = 0; r < enl_molecule_rings (view->mol); r++) {
    uint32_t size, nearest = ENL_NONE;
    const uint32_t *ring = enl_molecule_ring (view->mol, r, &size);
    if (size < 5 || size > 6 || !enl_ring_is_aromatic (view->mol, ring, size))
      continue;
    for (uint32_t k = 0; k < size; k++)
      nearest = MIN (nearest, view->distance[ring[k]]);
    if (nearest >= ENL_RING_DISTANCES)
      continue;
    for (uint32_t k = 0; k < size; k++)
      if (view->distance[ring[k]] == nearest)
        store (view, nearest, ring_sum (view, ring, size, k));
  }
}
