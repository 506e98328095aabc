/* Descriptors of the acidic atom itself, and the counts of what stands next to it. */
#include "core/acidity/descriptor-view.h"

#include <math.h>

enum { HYDROGEN = 1, NITROGEN = 7, OXYGEN = 8, PHOSPHORUS = 15, SULFUR = 16, SELENIUM = 34 };

#define SET(name, expression) (view->value[ENL_D_##name] = (double)(expression))

/* N or O that can share a positive charge across the double bond of an iminium ion. */
static int
donors_behind (const EnlSiteView *view)
{
  int n = 0;

  for (uint32_t i = 0; i < view->n_next; i++) {
    uint32_t x = view->next[i];
    uint32_t bond = enl_molecule_bond_between (view->mol, view->site, x);
    if (enl_molecule_bond (view->mol, bond)->order != 2)
      continue;
    for (uint32_t k = 0; k < enl_molecule_degree (view->mol, x); k++) {
      uint32_t y = enl_molecule_neighbour (view->mol, x, k);
      uint8_t element = enl_molecule_atom (view->mol, y)->element;
      n += y != view->site && (element == NITROGEN || element == OXYGEN);
    }
  }
  return n;
}

static void
fill_cation (EnlSiteView *view, uint32_t hydrogens)
{
  int saturated = 0, aryl = 0;

  if (enl_molecule_atom (view->mol, view->site)->charge <= 0)
    return;
  for (uint32_t i = 0; i < view->n_next; i++) {
    saturated += enl_survey_hybrid (view->survey, view->next[i]) == ENL_HYBRID_SP3;
    aryl += enl_molecule_atom (view->mol, view->next[i])->aromatic;
  }
  SET (cation, 1);
  SET (cation_hydrogens, hydrogens);
  SET (cation_saturated, saturated);
  SET (cation_aryl, aryl);
  SET (cation_donors, donors_behind (view));
}

/* Nitrogen atoms in an aromatic ring that holds the site, and those next to it. */
static void
fill_azole (EnlSiteView *view)
{
  int best = 0, beside = 0;

  if (!enl_molecule_atom (view->mol, view->site)->aromatic)
    return;
  for (uint32_t i = 0; i < view->n_next; i++) {
    const EnlAtom *atom = enl_molecule_atom (view->mol, view->next[i]);
    beside += atom->element == NITROGEN && atom->aromatic;
  }
  for (uint32_t r = 0; r < enl_molecule_rings (view->mol) && !view->carbon; r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (view->mol, r, &size);
    int nitrogen = 0;
    if (!enl_ring_holds (ring, size, view->site))
      continue;
    for (uint32_t k = 0; k < size; k++) {
      const EnlAtom *atom = enl_molecule_atom (view->mol, ring[k]);
      nitrogen += atom->element == NITROGEN && atom->aromatic;
    }
    best = MAX (best, nitrogen);
  }
  SET (aza_ring, best);
  SET (aza_next, beside);
}

void
enl_view_fill_atom (EnlSiteView *view)
{
  const EnlAtom *atom = enl_molecule_atom (view->mol, view->site);
  EnlHybrid hybrid = enl_survey_hybrid (view->survey, view->site);
  uint32_t hydrogens = enl_molecule_total_hydrogens (view->mol, view->site);

  SET (is_carbon, view->carbon);
  SET (is_nitrogen, atom->element == NITROGEN);
  SET (is_oxygen, atom->element == OXYGEN);
  SET (is_chalcogen, atom->element == SULFUR || atom->element == SELENIUM);
  SET (sp2_carbon, view->carbon && hybrid == ENL_HYBRID_SP2);
  SET (sp_carbon, view->carbon && hybrid == ENL_HYBRID_SP);
  SET (sp2_hetero, !view->carbon && hybrid == ENL_HYBRID_SP2);
  SET (aromatic, atom->aromatic);
  SET (aromatic_neutral, atom->aromatic && atom->charge == 0);
  SET (hydrogens, hydrogens);
  SET (tertiary, view->carbon && hydrogens == 1);
  SET (log_equivalents,
       log10 ((double)enl_survey_equivalents (view->survey, view->site) * MAX (hydrogens, 1)));
  SET (sp_next_to_n, view->carbon && hybrid == ENL_HYBRID_SP ? view->value[ENL_D_next_n] : 0);
  fill_cation (view, hydrogens);
  fill_azole (view);
}
