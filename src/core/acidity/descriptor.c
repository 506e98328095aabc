#include "core/acidity/descriptor.h"

#include <math.h>
#include <string.h>

#include "core/acidity/descriptor-view.h"

static const char *const plain_name[] = {
#define X(name) #name,
    ENL_DESCRIPTOR_LIST (X)
#undef X
};

static const char *const kind_name[] = {
#define X(name) #name,
    ENL_KIND_LIST (X)
#undef X
};

static const char *const sum_name[ENL_RING_SUMS] = {"meta", "para", "extra", "ortho"};

char *
enl_descriptor_name (uint32_t index)
{
  g_assert (index < ENL_N_DESCRIPTORS);
  if (index < ENL_D_next)
    return g_strdup (plain_name[index]);
  if (index < ENL_D_beta)
    return g_strdup_printf ("next_to_%s", kind_name[index - ENL_D_next]);
  if (index < ENL_D_ring_sums)
    return g_strdup_printf ("beta_%s", kind_name[index - ENL_D_beta]);
  if (index < ENL_D_ring_sums_hetero) {
    uint32_t k = index - ENL_D_ring_sums;
    return g_strdup_printf ("ring%u_%s", k / ENL_RING_SUMS, sum_name[k % ENL_RING_SUMS]);
  }
  if (index < ENL_D_ring_count) {
    uint32_t k = index - ENL_D_ring_sums_hetero;
    return g_strdup_printf ("ring%u_%s_hetero", k / ENL_RING_SUMS + 1, sum_name[k % ENL_RING_SUMS]);
  }
  return g_strdup_printf ("ring%u_count", index - ENL_D_ring_count);
}

static void
look_around (EnlSiteView *view)
{
  for (uint32_t k = 0; k < enl_molecule_degree (view->mol, view->site); k++) {
    uint32_t atom = enl_molecule_neighbour (view->mol, view->site, k);
    if (enl_atom_is_hydrogen (view->mol, atom) || view->n_next == ENL_VIEW_MAX)
      continue;
    view->next[view->n_next++] = atom;
    if (enl_group_conjugates (enl_survey_group (view->survey, atom)))
      view->acceptor[view->n_acceptors++] = atom;
  }
}

void
enl_descriptors_fill (EnlSurvey *survey, const EnlPi *pi, uint32_t atom, double *value)
{
  const EnlMolecule *mol = enl_survey_molecule (survey);
  g_auto (EnlPiChange) change = {0};
  EnlSiteView view = {
      .survey = survey,
      .mol = mol,
      .change = &change,
      .distance = enl_survey_distances (survey, atom),
      .site = atom,
      .element = enl_molecule_atom (mol, atom)->element,
      .carbon = enl_molecule_atom (mol, atom)->element == 6,
      .value = value,
  };

  memset (value, 0, ENL_N_DESCRIPTORS * sizeof *value);
  enl_pi_deprotonate (pi, atom, &change);
  look_around (&view);
  enl_view_fill_groups (&view);
  enl_view_fill_atom (&view);
  enl_view_fill_pi (&view);
  enl_view_fill_rings (&view);
  enl_view_fill_shape (&view);
  enl_view_fill_polar (&view);
  enl_view_fill_ring_sums (&view);
  for (int i = 0; i < ENL_N_DESCRIPTORS; i++)
    if (!isfinite (value[i]))
      value[i] = 0;
}
