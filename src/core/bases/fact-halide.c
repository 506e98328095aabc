/* Facts about halides in the molecule. Only the fragment of the site counts. */
#include "core/bases/fact-view.h"

enum { C = 6, F = 9, BR = 35, I = 53 };

/* sp3 carbon with Cl, Br or I. */
static bool
is_halo_carbon (const EnlFactView *v, uint32_t atom)
{
  const EnlMolecule *mol = v->question->mol;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (v->group[atom] == ENL_GROUP_ALKYL &&
        enl_fact_is_heavy_halogen (mol, enl_molecule_neighbour (mol, atom, k)))
      return true;
  return false;
}

/* Beside C=O of this group there is a halo carbon; `*opposite` tells of an enolisable carbon on
 * the other side. */
static bool
has_halo_alpha (const EnlFactView *v, EnlGroup group, bool *opposite)
{
  const EnlMolecule *mol = v->question->mol;
  bool found = false;

  *opposite = false;
  for (uint32_t i = 0; i < v->n_atoms; i++) {
    if (!v->inside[i] || v->group[i] != group)
      continue;
    for (uint32_t k = 0; k < enl_molecule_degree (mol, i); k++) {
      uint32_t halo = enl_molecule_neighbour (mol, i, k);
      if (!is_halo_carbon (v, halo))
        continue;
      found = true;
      for (uint32_t j = 0; j < enl_molecule_degree (mol, i); j++) {
        uint32_t other = enl_molecule_neighbour (mol, i, j);
        *opposite |= other != halo && enl_fact_is_acidic_carbon (v, other);
      }
    }
  }
  return found;
}

static void
find_favorskii (const EnlFactView *v, EnlFactValue *out)
{
  bool opposite;

  out->flag = has_halo_alpha (v, ENL_GROUP_KETONE, &opposite) && opposite;
}

static void
find_quasi_favorskii (const EnlFactView *v, EnlFactValue *out)
{
  bool opposite;

  out->flag = has_halo_alpha (v, ENL_GROUP_KETONE, &opposite) && !opposite;
}

static void
find_halo_ketone (const EnlFactView *v, EnlFactValue *out)
{
  bool opposite;

  out->flag = has_halo_alpha (v, ENL_GROUP_KETONE, &opposite);
}

static void
find_halo_ester (const EnlFactView *v, EnlFactValue *out)
{
  bool opposite;

  out->flag = has_halo_alpha (v, ENL_GROUP_ESTER, &opposite);
}

static bool
has_halide_on (const EnlFactView *v, EnlGroup carbon, bool exchangeable)
{
  const EnlMolecule *mol = v->question->mol;

  for (uint32_t i = 0; i < v->n_atoms; i++)
    for (uint32_t k = 0; v->inside[i] && v->group[i] == carbon && k < enl_molecule_degree (mol, i);
         k++) {
      uint8_t e = enl_fact_element (v, enl_molecule_neighbour (mol, i, k));
      if (exchangeable ? e == BR || e == I
                       : enl_atom_is_halogen (mol, enl_molecule_neighbour (mol, i, k)))
        return true;
    }
  return false;
}

static void
find_aryl_halide (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_halide_on (v, ENL_GROUP_ARYL, false);
}

static void
find_aryl_exchangeable (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_halide_on (v, ENL_GROUP_ARYL, true);
}

/* Halo carbon away from C=O: an ordinary alkylating agent. */
static void
find_alkyl_halide (const EnlFactView *v, EnlFactValue *out)
{
  const EnlMolecule *mol = v->question->mol;

  for (uint32_t i = 0; i < v->n_atoms; i++) {
    bool activated = false;
    if (!v->inside[i] || !is_halo_carbon (v, i))
      continue;
    for (uint32_t k = 0; k < enl_molecule_degree (mol, i); k++)
      activated |= enl_group_is_carbonyl (v->group[enl_molecule_neighbour (mol, i, k)]);
    out->flag |= !activated && enl_molecule_total_hydrogens (mol, i) > 0;
  }
}

static void
find_polyhalomethane (const EnlFactView *v, EnlFactValue *out)
{
  const EnlMolecule *mol = v->question->mol;
  uint32_t halogens = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, v->atom); k++)
    halogens += enl_fact_is_heavy_halogen (mol, enl_molecule_neighbour (mol, v->atom, k));
  out->flag = enl_fact_element (v, v->atom) == C && halogens >= 2;
}

#define FLAG(name, find, meaning)                                                                  \
  {                                                                                                \
    name, ENL_FACT_FLAG, ENL_FACT_OF_QUESTION, find, meaning                                       \
  }

const EnlFact enl_fact_of_halide[] = {
    FLAG ("molecule.favorskii", find_favorskii, "alpha-halo ketone with H on the other side"),
    FLAG ("molecule.quasi_favorskii", find_quasi_favorskii, "alpha-halo ketone without it"),
    FLAG ("molecule.alpha_halo_ketone", find_halo_ketone, "alpha-halo ketone"),
    FLAG ("molecule.alpha_halo_ester", find_halo_ester, "alpha-halo ester"),
    FLAG ("molecule.aryl_halide", find_aryl_halide, "halogen on an aromatic ring"),
    FLAG ("molecule.aryl_bromide_or_iodide", find_aryl_exchangeable, "Br or I on an aromatic ring"),
    FLAG ("molecule.alkyl_halide", find_alkyl_halide, "sp3 C-Cl, C-Br, C-I with H, not beside C=O"),
    FLAG ("molecule.polyhalomethane", find_polyhalomethane, "the acidic carbon has two halogens"),
    {NULL, ENL_FACT_FLAG, ENL_FACT_OF_QUESTION, NULL, NULL},
};
