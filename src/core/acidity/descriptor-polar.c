/* Substituent constants of the groups around the site, taken along the sigma skeleton. */
#include "core/acidity/descriptor-view.h"

#define ADD(name, expression) (view->value[ENL_D_##name] += (double)(expression))

/* Field constant from the meta and para ones (Hansch, Leo and Taft, Chem. Rev. 1991, 91, 165). */
static double
field_of (EnlSigma sigma)
{
  return 1.297 * sigma.meta - 0.385 * sigma.para + 0.033;
}

/* Sums over the groups attached to `atom`, those towards `back` left out. The members of an
 * aromatic ring are no groups on each other: what they pass on is in the Hammett sums. */
static double
field_around (EnlSiteView *view, uint32_t atom, uint32_t back)
{
  double sum = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (view->mol, atom); k++) {
    uint32_t x = enl_molecule_neighbour (view->mol, atom, k);
    const EnlBond *bond = enl_molecule_bond (view->mol, enl_molecule_bond_at (view->mol, atom, k));
    if (x != back && !bond->aromatic && !enl_atom_is_hydrogen (view->mol, x))
      sum += field_of (enl_survey_sigma (view->survey, atom, x));
  }
  return sum;
}

void
enl_view_fill_polar (EnlSiteView *view)
{
  double acceptor = 0;

  for (uint32_t i = 0; i < view->n_next; i++) {
    uint32_t x = view->next[i];
    EnlSigma sigma = enl_survey_sigma (view->survey, view->site, x);
    double field = field_of (sigma), resonance = sigma.para_minus - field;
    ADD (polar_next, field);
    acceptor += MAX (resonance, 0);
    ADD (donor_next, MIN (sigma.para - field, 0));
    ADD (polar_beta, field_around (view, x, view->site));
    for (uint32_t k = 0; k < enl_molecule_degree (view->mol, x); k++) {
      uint32_t y = enl_molecule_neighbour (view->mol, x, k);
      if (y != view->site && !enl_atom_is_hydrogen (view->mol, y))
        ADD (polar_gamma, field_around (view, y, x));
    }
  }
  ADD (mesomeric, acceptor);
  ADD (mesomeric_squared, acceptor * acceptor);
  ADD (donor_acceptors, acceptor * view->value[ENL_D_donor_next]);
}
