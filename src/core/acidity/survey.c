#include "core/acidity/survey.h"

#include <math.h>

#include "core/molecule/elements.h"
#include "core/molecule/symmetry.h"
#include "resources/embedded.h"

#define CARBON 6

struct EnlSurvey {
  const EnlMolecule *mol;
  const EnlConstants *constants;
  uint32_t n;
  EnlGroup *group;
  uint8_t *hybrid; /* EnlHybrid */
  int8_t *free_charge;
  double *charge, *hydrogen; /* sigma charges */
  uint32_t *class_of, *class_size;
  uint32_t **distance; /* rows made so far */
  EnlSigma *sigma;     /* two for every bond: seen from `from` and from `to` */
  bool *sigma_known;
};

EnlStatus
enl_constants_new (EnlConstants **out, EnlError *err)
{
  g_autoptr (EnlConstants) constants = g_new0 (EnlConstants, 1);
  size_t n_groups = 0, n_rings = 0, n_polarity = 0;
  const char *groups = enl_resource ("substituents.tsv", &n_groups);
  const char *rings = enl_resource ("ring-effects.tsv", &n_rings);
  const char *polarity = enl_resource ("electronegativity.tsv", &n_polarity);
  EnlStatus status;

  *out = NULL;
  g_assert (groups && rings && polarity);
  status = enl_substituents_new (groups, n_groups, rings, n_rings, &constants->substituents, err);
  if (status == ENL_OK)
    status = enl_polarity_table_new (polarity, n_polarity, &constants->polarity, err);
  if (status == ENL_OK)
    *out = g_steal_pointer (&constants);
  return status;
}

void
enl_constants_free (EnlConstants *constants)
{
  if (!constants)
    return;
  enl_substituents_free (constants->substituents);
  enl_polarity_table_free (constants->polarity);
  g_free (constants);
}

/* Lone pair on N, O, S next to a multiple bond: it takes part, so its atom is flat. */
static bool
is_flattened (const EnlMolecule *mol, uint32_t atom)
{
  uint8_t element = enl_molecule_atom (mol, atom)->element;

  if (element != 7 && element != 8 && element != 16)
    return false;
  if (enl_molecule_degree (mol, atom) + enl_molecule_atom (mol, atom)->hydrogens > 3)
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t x = enl_molecule_neighbour (mol, atom, k);
    if (!enl_atom_is_saturated (mol, x) && enl_molecule_atom (mol, x)->element <= 8)
      return true;
  }
  return false;
}

static EnlHybrid
hybrid_of (const EnlMolecule *mol, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (mol, atom);
  int doubles = 0, triples = 0;

  if (a->element <= 1)
    return ENL_HYBRID_OTHER;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint8_t order = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k))->order;
    doubles += order == 2;
    triples += order == 3;
  }
  if (a->element > 10 && enl_molecule_degree (mol, atom) + a->hydrogens >= 3)
    return ENL_HYBRID_SP3; /* S=O, P=O: polar single bonds in effect */
  if (triples || doubles >= 2)
    return ENL_HYBRID_SP;
  if (doubles || a->aromatic || is_flattened (mol, atom))
    return ENL_HYBRID_SP2;
  return ENL_HYBRID_SP3;
}

static int8_t
free_charge_of (const EnlMolecule *mol, uint32_t atom)
{
  int charge = enl_molecule_atom (mol, atom)->charge;

  for (uint32_t k = 0; charge && k < enl_molecule_degree (mol, atom); k++)
    if (enl_molecule_atom (mol, enl_molecule_neighbour (mol, atom, k))->charge * charge < 0)
      return 0;
  return (int8_t)charge;
}

static void
count_classes (EnlSurvey *survey)
{
  enl_symmetry_classes (survey->mol, false, survey->class_of);
  for (uint32_t i = 0; i < survey->n; i++)
    survey->class_size[survey->class_of[i]]++;
}

EnlSurvey *
enl_survey_new (const EnlMolecule *mol, const EnlConstants *constants)
{
  EnlSurvey *survey = g_new0 (EnlSurvey, 1);
  uint32_t n = enl_molecule_atoms (mol);

  survey->mol = mol;
  survey->constants = constants;
  survey->n = n;
  survey->group = g_new0 (EnlGroup, n + 1);
  survey->hybrid = g_new0 (uint8_t, n + 1);
  survey->free_charge = g_new0 (int8_t, n + 1);
  survey->charge = g_new0 (double, n + 1);
  survey->hydrogen = g_new0 (double, n + 1);
  survey->class_of = g_new0 (uint32_t, n + 1);
  survey->class_size = g_new0 (uint32_t, n + 1);
  survey->distance = g_new0 (uint32_t *, n + 1);
  survey->sigma = g_new0 (EnlSigma, 2 * (enl_molecule_bonds (mol) + 1));
  survey->sigma_known = g_new0 (bool, 2 * (enl_molecule_bonds (mol) + 1));
  for (uint32_t i = 0; i < n; i++) {
    survey->group[i] = enl_group_of (mol, i);
    survey->hybrid[i] = (uint8_t)hybrid_of (mol, i);
    survey->free_charge[i] = free_charge_of (mol, i);
  }
  enl_polarity_charges (constants->polarity, mol, survey->hybrid, survey->charge, survey->hydrogen);
  count_classes (survey);
  return survey;
}

void
enl_survey_free (EnlSurvey *survey)
{
  if (!survey)
    return;
  for (uint32_t i = 0; i < survey->n; i++)
    g_free (survey->distance[i]);
  g_free (survey->distance);
  g_free (survey->group);
  g_free (survey->hybrid);
  g_free (survey->free_charge);
  g_free (survey->charge);
  g_free (survey->hydrogen);
  g_free (survey->class_of);
  g_free (survey->class_size);
  g_free (survey->sigma);
  g_free (survey->sigma_known);
  g_free (survey);
}

const EnlMolecule *
enl_survey_molecule (const EnlSurvey *survey)
{
  return survey->mol;
}

EnlGroup
enl_survey_group (const EnlSurvey *survey, uint32_t atom)
{
  return survey->group[atom];
}

EnlHybrid
enl_survey_hybrid (const EnlSurvey *survey, uint32_t atom)
{
  return (EnlHybrid)survey->hybrid[atom];
}

double
enl_survey_pull (const EnlSurvey *survey, uint32_t atom)
{
  uint8_t element = enl_molecule_atom (survey->mol, atom)->element;
  double value = enl_element_electronegativity (element);

  if (element <= 1 || isnan (value))
    return 0;
  return value - enl_element_electronegativity (CARBON);
}

int
enl_survey_free_charge (const EnlSurvey *survey, uint32_t atom)
{
  return survey->free_charge[atom];
}

double
enl_survey_charge (const EnlSurvey *survey, uint32_t atom)
{
  return survey->charge[atom];
}

double
enl_survey_hydrogen_charge (const EnlSurvey *survey, uint32_t atom)
{
  return survey->hydrogen[atom];
}

uint32_t
enl_survey_equivalents (const EnlSurvey *survey, uint32_t atom)
{
  return survey->class_size[survey->class_of[atom]];
}

const uint32_t *
enl_survey_distances (EnlSurvey *survey, uint32_t atom)
{
  g_assert (atom < survey->n);
  if (!survey->distance[atom]) {
    survey->distance[atom] = g_new (uint32_t, survey->n);
    enl_molecule_distances (survey->mol, atom, survey->distance[atom]);
  }
  return survey->distance[atom];
}

EnlSigma
enl_survey_sigma (EnlSurvey *survey, uint32_t from, uint32_t root)
{
  uint32_t bond = enl_molecule_bond_between (survey->mol, from, root);

  g_assert (bond != ENL_NONE);
  uint32_t slot = 2 * bond + (enl_molecule_bond (survey->mol, bond)->from == from);
  if (!survey->sigma_known[slot]) {
    enl_substituents_find (survey->constants->substituents, survey->mol, root, from,
                           &survey->sigma[slot], NULL);
    survey->sigma_known[slot] = true;
  }
  return survey->sigma[slot];
}

const EnlConstants *
enl_survey_constants (const EnlSurvey *survey)
{
  return survey->constants;
}
