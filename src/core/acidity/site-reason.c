/* Why a compound cannot give an enolate, or no carbanion at all. */
#include <string.h>

#include "core/acidity/site-private.h"

enum { C = 6 };

/* What stands beside the C=O groups of a molecule that has no enolate. */
typedef struct {
  uint32_t carbonyls, carbons; /* C=O groups, and carbons next to them */
  bool bredt, strain, vinylic, formyl, other_sp2;
} EnlCarbonylSides;

static bool
gives_enolate (const EnlMolecule *mol, const EnlSite *site, const EnlSiteFacts *facts)
{
  if (site->kind != ENL_SITE_CARBON)
    return false;
  return site->alpha_carbonyl || facts->carbon.across != ENL_NONE ||
         (facts->carbon.depth > 0 && enl_group_is_carbonyl (enl_group_of (mol, facts->carbon.far)));
}

static void
look_beside (const EnlMolecule *mol, uint32_t carbon, EnlCarbonylSides *sides)
{
  EnlCarbonFacts facts;

  sides->carbons++;
  if (enl_molecule_total_hydrogens (mol, carbon) == 0)
    return;
  enl_site_carbon_facts (mol, carbon, &facts);
  sides->bredt |= facts.bredt;
  sides->strain |= facts.strain;
  switch (enl_group_of (mol, carbon)) {
  case ENL_GROUP_VINYL:
    sides->vinylic = true;
    break;
  case ENL_GROUP_ALDEHYDE:
    sides->formyl = true;
    break;
  default:
    sides->other_sp2 |= !enl_atom_is_saturated (mol, carbon);
  }
}

static void
look_at_carbonyls (const EnlMolecule *mol, EnlCarbonylSides *sides)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    if (!enl_group_is_carbonyl (enl_group_of (mol, i)))
      continue;
    sides->carbonyls++;
    for (uint32_t k = 0; k < enl_molecule_degree (mol, i); k++) {
      uint32_t other = enl_molecule_neighbour (mol, i, k);
      if (enl_molecule_atom (mol, other)->element == C)
        look_beside (mol, other, sides);
    }
  }
}

static const char *
carbonyl_reason (const EnlCarbonylSides *sides)
{
  if (sides->bredt)
    return "hydrogens next to C=O only on bridgeheads (Bredt's rule)";
  if (sides->strain)
    return "the enolate would need C=C inside a three-membered ring";
  if (sides->vinylic)
    return "the hydrogens next to C=O are on C=C";
  if (sides->formyl)
    return "the hydrogens next to C=O are formyl hydrogens";
  if (sides->other_sp2)
    return "the hydrogens next to C=O are on unsaturated carbon";
  if (sides->carbons == 0)
    return "no carbon is attached to C=O";
  return sides->carbons == 1 ? "the carbon next to C=O carries no hydrogen"
                             : "the carbons next to C=O carry no hydrogen";
}

/* C=C-OH or C=C-O-: the compound is written as its enol or enolate. */
static const char *
enol_reason (const EnlMolecule *mol)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    uint32_t oxygen;

    if (enl_molecule_atom (mol, i)->element != C || enl_group_of (mol, i) != ENL_GROUP_VINYL)
      continue;
    oxygen = enl_atom_partner (mol, i, 1, 8);
    if (oxygen == ENL_NONE)
      continue;
    if (enl_molecule_atom (mol, oxygen)->charge < 0)
      return "written as the enolate: its proton is gone already";
    if (enl_molecule_total_hydrogens (mol, oxygen) > 0)
      return "written as the enol: its O-H is the site";
  }
  return NULL;
}

/* Acceptors other than C=O that a carbon carries. */
static bool
is_carbon_acceptor (const EnlMolecule *mol, uint32_t atom, EnlGroup group)
{
  if (!enl_group_is_acceptor (group) || group == ENL_GROUP_AMMONIUM || group == ENL_GROUP_IMINE_N)
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (enl_molecule_atom (mol, enl_molecule_neighbour (mol, atom, k))->element == C)
      return true;
  return false;
}

static char *
carbanion_reason (const EnlMolecule *mol)
{
  bool carbon_hydrogen = false, bredt = false, strain = false, carbon = false;
  EnlGroup acceptor = ENL_GROUP_OTHER;

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    EnlGroup group = enl_group_of (mol, i);
    EnlCarbonFacts facts;

    if (acceptor == ENL_GROUP_OTHER && is_carbon_acceptor (mol, i, group))
      acceptor = group;
    if (enl_molecule_atom (mol, i)->element != C)
      continue;
    carbon = true;
    carbon_hydrogen |= enl_molecule_total_hydrogens (mol, i) > 0;
    enl_site_carbon_facts (mol, i, &facts);
    bredt |= facts.bredt;
    strain |= facts.strain;
  }
  if (!carbon || !carbon_hydrogen)
    return g_strdup (carbon ? "no carbon here carries hydrogen" : "there is no carbon here");
  if (bredt)
    return g_strdup ("the only activated C-H sits on a bridgehead (Bredt's rule)");
  if (strain)
    return g_strdup ("the anion would need C=C inside a three-membered ring");
  if (acceptor != ENL_GROUP_OTHER)
    return g_strdup_printf ("no carbon next to %s%s carries an acidic hydrogen",
                            strchr (enl_group_label (acceptor), '=') != NULL ? "" : "the ",
                            enl_group_label (acceptor));
  return g_strdup ("no group here stabilises a carbanion");
}

char *
enl_site_no_enol (const EnlMolecule *mol, const EnlSites *sites, const EnlSiteFacts *facts)
{
  EnlCarbonylSides sides = {0};
  const char *enol;

  for (uint32_t i = 0; i < sites->n_sites; i++)
    if (gives_enolate (mol, &sites->site[i], &facts[i]))
      return NULL;
  look_at_carbonyls (mol, &sides);
  if (sides.carbonyls > 0)
    return g_strdup (carbonyl_reason (&sides));
  if (sites->has_carbon_acid)
    return NULL;
  enol = enol_reason (mol);
  return enol != NULL ? g_strdup (enol) : carbanion_reason (mol);
}
