/* Which hydrogens are certain to leave first.
 *
 * A site belongs to a tier when its surroundings are plain enough; where anything could shift its
 * pKa by much it gets ENL_TIER_OTHER and nothing is claimed. One tier precedes another only if the
 * published ranges of the two do not overlap, in DMSO and in water; test-site.c checks that against
 * every row of resources/acids.tsv. So an amide N-H (DMSO 18 to 27) is not certain to leave before
 * a ketone's alpha C-H (24 to 28), but before that of an ester (29.5 and more). */
#include "core/acidity/site-private.h"

enum { C = 6, N = 7 };

bool
enl_tier_precedes (EnlTier a, EnlTier b)
{
#define TIER(name) (1u << ENL_TIER_##name)
  static const unsigned after[ENL_N_TIERS] = {
      [ENL_TIER_ACID] = TIER (MIDDLE_CH) | TIER (KETONE_CH) | TIER (ESTER_CH) | TIER (FEEBLE_CH) |
                        TIER (PLAIN_ALCOHOL),
      [ENL_TIER_MILD] =
          TIER (KETONE_CH) | TIER (ESTER_CH) | TIER (FEEBLE_CH) | TIER (PLAIN_ALCOHOL),
      [ENL_TIER_AMIDE] = TIER (ESTER_CH) | TIER (FEEBLE_CH),
      [ENL_TIER_ALCOHOL] = TIER (FEEBLE_CH),
      [ENL_TIER_PLAIN_ALCOHOL] = TIER (FEEBLE_CH),
      [ENL_TIER_STRONG_CH] =
          TIER (KETONE_CH) | TIER (ESTER_CH) | TIER (FEEBLE_CH) | TIER (PLAIN_ALCOHOL),
      [ENL_TIER_KETONE_CH] = TIER (FEEBLE_CH),
  };
#undef TIER
  return (after[a] & (1u << b)) != 0;
}

/* ---- tiers of C-H ---- */

/* Groups that reach a carbanion from afar: nitro, and cations that keep their charge. */
static bool
has_far_reaching_group (const EnlMolecule *mol)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    if (enl_molecule_atom (mol, i)->charge <= 0)
      continue;
    if (enl_group_of (mol, i) == ENL_GROUP_NITRO)
      return true;
    if (enl_atom_is_cation (mol, i) && enl_molecule_total_hydrogens (mol, i) == 0)
      return true;
  }
  return false;
}

/* Acceptors of which two on one carbon make a strong acid, whichever they are. */
static bool
is_strong_pair_group (EnlGroup group)
{
  return (enl_group_is_carbonyl (group) && group != ENL_GROUP_CARBOXYLATE) ||
         group == ENL_GROUP_NITRILE || group == ENL_GROUP_NITRO || group == ENL_GROUP_SULFONE ||
         group == ENL_GROUP_PHOSPHONIUM;
}

static bool
is_strong (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  uint32_t strong = 0;
  bool nitro = false;

  for (uint32_t i = 0; i < facts->n_acceptors; i++) {
    strong += is_strong_pair_group (facts->group[i]);
    nitro |= facts->group[i] == ENL_GROUP_NITRO;
  }
  /* nitrocyclopropane: its anion would have to be planar in the small ring */
  return strong >= 2 || (nitro && !enl_molecule_in_ring_of (mol, atom, 3));
}

/* Beside its acceptors and pi neighbours the carbon holds alkyl groups and hydrogen only. */
static bool
has_plain_rest (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t others = 0, alkyls = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (enl_atom_is_hydrogen (mol, other))
      continue;
    others++;
    alkyls += enl_group_of (mol, other) == ENL_GROUP_ALKYL && !enl_group_is_cf3 (mol, other);
  }
  return others - alkyls <= 1 && !enl_molecule_in_ring_of (mol, atom, 3);
}

/* The other side of a ketone is a carbon that brings no polar group near. */
static bool
is_plain_ketone (const EnlMolecule *mol, uint32_t ketone, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, ketone); k++) {
    uint32_t other = enl_molecule_neighbour (mol, ketone, k);
    EnlGroup group = enl_group_of (mol, other);

    if (other == atom || group == ENL_GROUP_OXYGEN || enl_atom_is_hydrogen (mol, other))
      continue;
    if (group != ENL_GROUP_ALKYL && group != ENL_GROUP_ARYL && group != ENL_GROUP_VINYL)
      return false;
    if (group == ENL_GROUP_ALKYL && !has_plain_rest (mol, other))
      return false;
  }
  return true;
}

static EnlTier
single_acceptor_tier (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  const uint32_t acceptor = facts->acceptor[0];
  const unsigned traits = enl_group_traits (mol, acceptor);

  switch (facts->group[0]) {
  case ENL_GROUP_THIOAMIDE:
    return ENL_TIER_KETONE_CH;
  case ENL_GROUP_KETONE:
  case ENL_GROUP_ALDEHYDE:
    return (traits & ENL_TRAIT_CF3) == 0 && is_plain_ketone (mol, acceptor, atom)
               ? ENL_TIER_KETONE_CH
               : ENL_TIER_OTHER;
  case ENL_GROUP_ESTER:
  case ENL_GROUP_SULFONE:
    return (traits & ENL_TRAIT_CF3) != 0 || (facts->group[0] == ENL_GROUP_ESTER &&
                                             (traits & (ENL_TRAIT_RING | ENL_TRAIT_ARYL)) != 0)
               ? ENL_TIER_OTHER
               : ENL_TIER_ESTER_CH;
  case ENL_GROUP_NITRILE:
    return ENL_TIER_ESTER_CH;
  case ENL_GROUP_AMIDE:
    if (traits & ENL_TRAIT_CF3)
      return ENL_TIER_OTHER;
    return traits & ENL_TRAIT_ARYL ? ENL_TIER_ESTER_CH : ENL_TIER_FEEBLE_CH;
  case ENL_GROUP_SULFOXIDE:
    return (traits & (ENL_TRAIT_CF3 | ENL_TRAIT_ARYL)) == 0 ? ENL_TIER_FEEBLE_CH : ENL_TIER_OTHER;
  case ENL_GROUP_CARBOXYLATE:
    return ENL_TIER_FEEBLE_CH;
  default:
    return ENL_TIER_OTHER;
  }
}

/* One acceptor, at most one aryl, no nitro or onium anywhere, and no ring whose anion might be
 * aromatic or flat (anthrone, pyrazolinones, coumaranone). */
static bool
is_middle (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  if (facts->n_aryls > 1 || facts->n_halogens > 1 || facts->depth > 0 ||
      enl_molecule_in_ring (mol, atom) || has_far_reaching_group (mol))
    return false;
  switch (facts->group[0]) {
  case ENL_GROUP_SULFONE:
    return (enl_group_traits (mol, facts->acceptor[0]) & ENL_TRAIT_CF3) == 0;
  case ENL_GROUP_KETONE:
  case ENL_GROUP_ALDEHYDE:
  case ENL_GROUP_ESTER:
  case ENL_GROUP_AMIDE:
  case ENL_GROUP_CARBOXYLATE:
  case ENL_GROUP_NITRILE:
    return facts->n_vinyls == 0;
  default:
    return false;
  }
}

/* Ring of the benzylic carbon: one benzene ring with nothing but alkyl, O and N on it. */
static bool
is_plain_benzene (const EnlMolecule *mol, uint32_t aryl)
{
  if (enl_molecule_ring_count_of_atom (mol, aryl) != 1)
    return false;
  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    bool inside = false, plain = size == 6;

    for (uint32_t i = 0; i < size; i++) {
      inside |= ring[i] == aryl;
      plain &= enl_molecule_atom (mol, ring[i])->element == C &&
               enl_molecule_ring_count_of_atom (mol, ring[i]) == 1;
      for (uint32_t k = 0; k < enl_molecule_degree (mol, ring[i]); k++) {
        uint32_t other = enl_molecule_neighbour (mol, ring[i], k);
        EnlGroup group = enl_group_of (mol, other);
        if (!enl_molecule_in_ring (mol, other) && !enl_atom_is_hydrogen (mol, other))
          plain &= (group == ENL_GROUP_ALKYL && !enl_group_is_cf3 (mol, other)) ||
                   group == ENL_GROUP_AMINE || group == ENL_GROUP_OXYGEN;
        else if (other != ring[i] && !enl_molecule_atom (mol, other)->aromatic)
          plain &= enl_atom_is_hydrogen (mol, other);
      }
    }
    if (inside)
      return plain;
  }
  return false;
}

static EnlTier
hydrocarbon_tier (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  const uint32_t unsaturated = facts->n_aryls + facts->n_vinyls + facts->n_alkynyls;

  if (facts->depth > 0 || facts->ring5 > 0 || has_far_reaching_group (mol))
    return ENL_TIER_OTHER;
  if (unsaturated == 1 && has_plain_rest (mol, atom) &&
      (facts->n_vinyls == 1 || (facts->n_aryls == 1 && is_plain_benzene (mol, facts->aryl[0]))))
    return ENL_TIER_FEEBLE_CH;
  return enl_molecule_in_ring (mol, atom) ? ENL_TIER_OTHER : ENL_TIER_MIDDLE_CH;
}

EnlTier
enl_site_carbon_tier (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  EnlTier tier = ENL_TIER_OTHER;

  if (facts->reason == ENL_CARBON_PI)
    return hydrocarbon_tier (mol, atom, facts);
  if (facts->reason != ENL_CARBON_ACCEPTOR)
    return ENL_TIER_OTHER;
  if (is_strong (mol, atom, facts))
    return ENL_TIER_STRONG_CH;
  if (facts->n_acceptors != 1)
    return ENL_TIER_OTHER;
  if (has_plain_rest (mol, atom))
    tier = single_acceptor_tier (mol, atom, facts);
  if (tier == ENL_TIER_OTHER && is_middle (mol, atom, facts))
    tier = ENL_TIER_MIDDLE_CH;
  return tier;
}

/* ---- the flag ---- */

/* S(=O)2OH or P(=O)OH. */
static bool
is_oxoacid (const EnlMolecule *mol, uint32_t atom, EnlGroup group)
{
  return (group == ENL_GROUP_SULFONE || group == ENL_GROUP_PHOSPHORYL) &&
         (enl_group_traits (mol, atom) & ENL_TRAIT_HYDROGEN) != 0 &&
         enl_atom_partner (mol, atom, 1, N) == ENL_NONE;
}

/* C-H beside its own COOH, SO2OH or P(=O)OH: that O-H goes first unless a nitro group or two more
 * acceptors rival it. */
static bool
is_beside_own_acid (const EnlMolecule *mol, const EnlCarbonFacts *facts)
{
  uint32_t acids = 0, rivals = 0;

  for (uint32_t i = 0; i < facts->n_acceptors; i++) {
    EnlGroup group = facts->group[i];
    bool acid = group == ENL_GROUP_ACID || is_oxoacid (mol, facts->acceptor[i], group);

    acids += acid;
    rivals += acid ? 0 : group == ENL_GROUP_NITRO ? 2 : is_strong_pair_group (group);
  }
  return acids > 0 && rivals < 2;
}

/* C2-H of an azolium ion that still has an N-H beside it. */
static bool
is_beside_own_cation (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  for (uint32_t k = 0; facts->reason == ENL_CARBON_AZOLIUM && k < enl_molecule_degree (mol, atom);
       k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (!enl_atom_is_hydrogen (mol, other) && enl_molecule_total_hydrogens (mol, other) > 0)
      return true;
  }
  return false;
}

static bool
follows_own_acceptor (const EnlMolecule *mol, const EnlSite *site, const EnlCarbonFacts *facts)
{
  return site->kind == ENL_SITE_CARBON &&
         (is_beside_own_acid (mol, facts) || is_beside_own_cation (mol, site->atom[0], facts) ||
          enl_site_is_dicarbonyl_gamma (mol, site->atom[0], facts));
}

void
enl_site_order_flags (const EnlMolecule *mol, EnlSites *sites, const EnlSiteFacts *facts,
                      const uint32_t *fragment)
{
  for (uint32_t i = 0; i < sites->n_sites; i++) {
    EnlSite *site = &sites->site[i];

    site->second = follows_own_acceptor (mol, site, &facts[i].carbon);
    for (uint32_t j = 0; !site->second && j < sites->n_sites; j++)
      site->second = fragment[sites->site[j].atom[0]] == fragment[site->atom[0]] &&
                     enl_tier_precedes (facts[j].tier, facts[i].tier);
  }
}
