/* Descriptors from the pi model, and of the field that charge and electronegative atoms make. */
#include "core/acidity/descriptor-view.h"

#include <math.h>

enum { CARBON = 6, NITROGEN = 7, OXYGEN = 8, SULFUR = 16 };

/* Model constants: how much of an inductive effect or of the effect of a charge is left after each
 * further bond (the usual fall-off is 1/2 to 1/2.8 a bond: Taft 1956). */
#define FIELD_FALL  0.45
#define FAR_FALL    0.5
#define CHARGE_FALL 0.5
#define FAR_FROM    3     /* bonds from which an atom counts as far */
#define LEAST_SHIFT 0.005 /* electrons; less charge than this is not followed */

#define SET(name, expression) (view->value[ENL_D_##name] = (double)(expression))
#define ADD(name, expression) (view->value[ENL_D_##name] += (double)(expression))

static void
fill_gain (EnlSiteView *view)
{
  double gain = view->change->energy_gain, onium = 0;

  for (uint32_t i = 0; i < view->n_next; i++)
    onium += enl_survey_free_charge (view->survey, view->next[i]) > 0;
  SET (pi_size, view->change->n_orbitals);
  if (!view->carbon) {
    SET (gain_hetero, gain);
    return;
  }
  SET (gain, gain);
  SET (gain_squared, gain * gain);
  SET (gain_alkyl, gain * enl_view_next (view, ENL_KIND_alkyl));
  SET (gain_fluorine, gain * enl_view_next (view, ENL_KIND_fluorine));
  SET (gain_ring5, gain * enl_molecule_in_ring_of (view->mol, view->site, 5));
  SET (gain_five_ring, gain * view->change->five_ring);
  SET (gain_onium, gain * onium);
}

/* Where the electrons of the broken bond end up: sums and squares by element. */
static void
fill_charges (EnlSiteView *view)
{
  SET (excess_site, view->change->shift[view->site]);
  for (uint32_t i = 0; i < view->change->n_atoms; i++) {
    double shift = view->change->shift[i], square = shift * shift;
    switch (enl_molecule_atom (view->mol, i)->element) {
    case CARBON:
      ADD (square_carbon, square);
      break;
    case NITROGEN:
      ADD (square_nitrogen, square);
      if (i != view->site)
        ADD (excess_nitrogen, shift);
      break;
    case OXYGEN:
      ADD (square_oxygen, square);
      if (i != view->site)
        ADD (excess_oxygen, shift);
      break;
    case SULFUR:
      ADD (square_sulfur, square);
      if (i != view->site)
        ADD (excess_sulfur, shift);
      break;
    default:
      break;
    }
    if (i != view->site)
      ADD (square_all, square);
  }
}

/* Field at the acidic atom itself. */
static void
fill_field (EnlSiteView *view)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (view->mol); i++) {
    uint32_t d = view->distance[i];
    if (i == view->site || d == ENL_NONE)
      continue;
    double pull = enl_survey_pull (view->survey, i);
    int charge = enl_survey_free_charge (view->survey, i);
    ADD (field, pull * pow (FIELD_FALL, d - 1));
    if (d >= FAR_FROM)
      ADD (field_far, pull * pow (FAR_FALL, d));
    ADD (cation_field, MAX (charge, 0) * pow (CHARGE_FALL, d - 1));
    ADD (anion_field, MIN (charge, 0) * pow (CHARGE_FALL, d - 1));
  }
}

/* Field at one atom of the anion, weighted by the electrons it gained. */
static void
add_shared_field (EnlSiteView *view, uint32_t atom, double share)
{
  const uint32_t *distance = enl_survey_distances (view->survey, atom);

  for (uint32_t i = 0; i < enl_molecule_atoms (view->mol); i++) {
    uint32_t d = distance[i];
    if (i == atom || d == ENL_NONE)
      continue;
    double pull = enl_survey_pull (view->survey, i);
    int charge = enl_survey_free_charge (view->survey, i);
    ADD (field_shared, share * pull * pow (FIELD_FALL, d - 1));
    if (d >= 2)
      ADD (field_shared_far, share * pull * pow (FAR_FALL, d - 1));
    /* Coulomb: with the inverse of the distance, counted in bonds. */
    ADD (cation_shared, share * MAX (charge, 0) / d);
    ADD (anion_shared, share * MIN (charge, 0) / d);
  }
}

static void
fill_shared_field (EnlSiteView *view)
{
  for (uint32_t i = 0; i < view->change->n_atoms; i++) {
    double share = MAX (view->change->shift[i], 0);
    if (share < LEAST_SHIFT)
      continue;
    add_shared_field (view, i, share);
    ADD (sigma_shared, share * enl_survey_charge (view->survey, i));
  }
}

static void
fill_sigma (EnlSiteView *view)
{
  SET (sigma_site, enl_survey_charge (view->survey, view->site));
  SET (sigma_hydrogen, enl_survey_hydrogen_charge (view->survey, view->site));
  for (uint32_t i = 0; i < view->n_next; i++)
    ADD (sigma_next, enl_survey_charge (view->survey, view->next[i]));
  for (uint32_t i = 0; i < enl_molecule_atoms (view->mol); i++)
    if (view->distance[i] == 2)
      ADD (sigma_beta, enl_survey_charge (view->survey, i));
}

void
enl_view_fill_pi (EnlSiteView *view)
{
  int charge = enl_molecule_charge (view->mol);

  fill_gain (view);
  fill_charges (view);
  fill_field (view);
  fill_shared_field (view);
  fill_sigma (view);
  SET (total_charge, charge);
  SET (total_charge_hetero, view->carbon ? 0 : charge);
}
