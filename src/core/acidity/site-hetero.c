/* Hydrogens on oxygen, sulfur, phosphorus and halogens: what they are called and how early they
 * leave. Nitrogen has its own file. */
#include "core/acidity/site-private.h"

enum { B = 5, C = 6, N = 7, O = 8, SI = 14, P = 15, S = 16, AS = 33, SE = 34, TE = 52 };

static uint8_t
element_of (const EnlMolecule *mol, uint32_t atom)
{
  return enl_molecule_atom (mol, atom)->element;
}

static uint32_t
heavy_neighbour (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (!enl_atom_is_hydrogen (mol, enl_molecule_neighbour (mol, atom, k)))
      return enl_molecule_neighbour (mol, atom, k);
  return ENL_NONE;
}

static bool
competing (EnlHeteroFacts *facts, EnlSiteKind kind, const char *words, EnlTier tier)
{
  *facts = (EnlHeteroFacts){kind, words, tier, true};
  return true;
}

/* ---- O-H on carbon ---- */

static bool
in_heteroaromatic_ring (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    bool inside = false, hetero = false, aromatic = true;

    for (uint32_t i = 0; i < size; i++) {
      inside |= ring[i] == atom;
      hetero |= element_of (mol, ring[i]) != C;
      aromatic &= enl_molecule_atom (mol, ring[i])->aromatic;
    }
    if (inside && hetero && aromatic)
      return true;
  }
  return false;
}

static bool
carries_carbonyl (const EnlMolecule *mol, uint32_t atom, uint32_t except, bool ring_only)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    const EnlBond *bond = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k));

    if (other != except && (bond->aromatic || !ring_only) &&
        enl_group_is_carbonyl (enl_group_of (mol, other)))
      return true;
  }
  return false;
}

/* C=O on the far end of the C=C that carries the enol O-H: a vinylogous acid. */
static bool
is_vinylogous_acid (const EnlMolecule *mol, uint32_t carbon)
{
  uint32_t end = enl_atom_partner (mol, carbon, 2, C);
  return end != ENL_NONE && carries_carbonyl (mol, end, carbon, false);
}

/* The same in a ring that counts as aromatic with its C=O in it (4-hydroxycoumarin, tropolone). */
static bool
is_ring_enol (const EnlMolecule *mol, uint32_t carbon)
{
  if (carries_carbonyl (mol, carbon, ENL_NONE, true))
    return true;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, carbon); k++)
    if (enl_molecule_bond (mol, enl_molecule_bond_at (mol, carbon, k))->aromatic &&
        carries_carbonyl (mol, enl_molecule_neighbour (mol, carbon, k), carbon, true))
      return true;
  return false;
}

/* No polar atom within two bonds of the carbinol carbon and no C≡C beside it. */
static bool
is_plain_carbinol (const EnlMolecule *mol, uint32_t carbon, uint32_t oxygen)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, carbon); k++) {
    uint32_t other = enl_molecule_neighbour (mol, carbon, k);

    if (other == oxygen || enl_atom_is_hydrogen (mol, other))
      continue;
    if (element_of (mol, other) != C || enl_group_of (mol, other) == ENL_GROUP_ALKYNYL)
      return false;
    for (uint32_t j = 0; j < enl_molecule_degree (mol, other); j++) {
      uint8_t e = element_of (mol, enl_molecule_neighbour (mol, other, j));
      if (e != C && e != 1)
        return false;
    }
  }
  return true;
}

static bool
carbinol_facts (const EnlMolecule *mol, uint32_t carbon, uint32_t oxygen, EnlHeteroFacts *facts)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, carbon); k++) {
    uint32_t other = enl_molecule_neighbour (mol, carbon, k);

    if (other == oxygen)
      continue;
    if (element_of (mol, other) == O)
      return competing (facts, ENL_SITE_OXYGEN,
                        enl_molecule_total_hydrogens (mol, other) > 0 ? "O-H of the hydrate"
                                                                      : "O-H of the hemiacetal",
                        ENL_TIER_ALCOHOL);
    if (element_of (mol, other) == N)
      return competing (facts, ENL_SITE_OXYGEN, "O-H of the hemiaminal", ENL_TIER_ALCOHOL);
  }
  return competing (facts, ENL_SITE_OXYGEN, "alcohol O-H",
                    is_plain_carbinol (mol, carbon, oxygen) ? ENL_TIER_PLAIN_ALCOHOL
                                                            : ENL_TIER_ALCOHOL);
}

static bool
carbon_oxygen_facts (const EnlMolecule *mol, uint32_t oxygen, uint32_t carbon,
                     EnlHeteroFacts *facts)
{
  switch (enl_group_of (mol, carbon)) {
  case ENL_GROUP_ACID:
    return competing (facts, ENL_SITE_OXYGEN, "O-H of the carboxylic acid", ENL_TIER_ACID);
  case ENL_GROUP_CARBONIC:
    return competing (facts, ENL_SITE_OXYGEN,
                      enl_atom_partner (mol, carbon, 1, N) != ENL_NONE ? "O-H of the carbamic acid"
                                                                       : "O-H of the carbonic acid",
                      ENL_TIER_OTHER);
  case ENL_GROUP_THIOCARBONYL:
  case ENL_GROUP_THIOAMIDE:
    return competing (facts, ENL_SITE_OXYGEN, "O-H of the thioacid", ENL_TIER_ACID);
  case ENL_GROUP_IMINE:
  case ENL_GROUP_IMINIUM:
    return competing (facts, ENL_SITE_OXYGEN, "O-H of the imidic acid", ENL_TIER_OTHER);
  case ENL_GROUP_ARYL:
    if (is_ring_enol (mol, carbon))
      return competing (facts, ENL_SITE_OXYGEN, "enol O-H, conjugated with C=O", ENL_TIER_MILD);
    return competing (facts, ENL_SITE_OXYGEN,
                      in_heteroaromatic_ring (mol, carbon) ? "O-H on the heteroaromatic ring"
                                                           : "phenol O-H",
                      ENL_TIER_MILD);
  case ENL_GROUP_VINYL:
    if (is_vinylogous_acid (mol, carbon))
      return competing (facts, ENL_SITE_OXYGEN, "enol O-H, conjugated with C=O", ENL_TIER_MILD);
    return competing (facts, ENL_SITE_OXYGEN, "enol O-H", ENL_TIER_OTHER);
  case ENL_GROUP_ALKYNYL:
    return competing (facts, ENL_SITE_OXYGEN, "ynol O-H", ENL_TIER_OTHER);
  default:
    return carbinol_facts (mol, carbon, oxygen, facts);
  }
}

/* ---- O-H on a heteroatom ---- */

static const char *
hydroxyamine_words (const EnlMolecule *mol, uint32_t nitrogen, EnlTier *tier)
{
  uint32_t acyls = 0;

  *tier = ENL_TIER_MILD;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, nitrogen); k++) {
    EnlGroup group = enl_group_of (mol, enl_molecule_neighbour (mol, nitrogen, k));
    acyls += enl_group_is_carbonyl (group) || group == ENL_GROUP_THIOAMIDE;
  }
  if (acyls > 0)
    return acyls == 1 ? "O-H of the hydroxamic acid" : "O-H of the N-hydroxyimide";
  if (enl_molecule_atom (mol, nitrogen)->aromatic)
    return "N-hydroxy O-H";
  *tier = ENL_TIER_ALCOHOL;
  return "hydroxylamine O-H";
}

static bool
nitrogen_oxygen_facts (const EnlMolecule *mol, uint32_t nitrogen, EnlHeteroFacts *facts)
{
  const EnlGroup group = enl_group_of (mol, nitrogen);
  const char *words;
  EnlTier tier;

  if (group == ENL_GROUP_IMINE_N)
    return competing (facts, ENL_SITE_OXYGEN, "oxime O-H", ENL_TIER_AMIDE);
  if (group == ENL_GROUP_NITRO || group == ENL_GROUP_NITROSO)
    return competing (facts, ENL_SITE_OXYGEN, "O-H of the nitrogen oxoacid", ENL_TIER_ACID);
  if (group == ENL_GROUP_N_OXIDE && enl_atom_partner (mol, nitrogen, 2, C) != ENL_NONE)
    return competing (facts, ENL_SITE_OXYGEN, "aci-nitro O-H", ENL_TIER_ACID);
  if (enl_atom_is_cation (mol, nitrogen))
    return competing (facts, ENL_SITE_OXYGEN, "O-H on N+", ENL_TIER_OTHER);
  words = hydroxyamine_words (mol, nitrogen, &tier);
  return competing (facts, ENL_SITE_OXYGEN, words, tier);
}

static bool
phosphorus_oxygen_facts (const EnlMolecule *mol, uint32_t phosphorus, EnlHeteroFacts *facts)
{
  uint32_t carbons = 0;

  if (element_of (mol, phosphorus) == AS)
    return competing (facts, ENL_SITE_OXYGEN, "O-H of the arsenic acid", ENL_TIER_OTHER);
  if (enl_group_of (mol, phosphorus) != ENL_GROUP_PHOSPHORYL)
    return competing (facts, ENL_SITE_OXYGEN, "O-H on phosphorus", ENL_TIER_OTHER);
  for (uint32_t k = 0; k < enl_molecule_degree (mol, phosphorus); k++)
    carbons += element_of (mol, enl_molecule_neighbour (mol, phosphorus, k)) == C;
  carbons += enl_molecule_total_hydrogens (mol, phosphorus);
  return competing (facts, ENL_SITE_OXYGEN,
                    carbons == 0   ? "O-H of the phosphoric acid"
                    : carbons == 1 ? "O-H of the phosphonic acid"
                                   : "O-H of the phosphinic acid",
                    enl_molecule_charge (mol) < 0 ? ENL_TIER_OTHER : ENL_TIER_ACID);
}

static bool
sulfur_oxygen_facts (const EnlMolecule *mol, uint32_t sulfur, EnlHeteroFacts *facts)
{
  switch (enl_group_of (mol, sulfur)) {
  case ENL_GROUP_SULFONE:
    return competing (facts, ENL_SITE_OXYGEN,
                      enl_atom_partner (mol, sulfur, 1, C) != ENL_NONE ? "O-H of the sulfonic acid"
                                                                       : "O-H of the sulfuric acid",
                      ENL_TIER_ACID);
  case ENL_GROUP_SULFOXIDE:
  case ENL_GROUP_SULFOXIMINE:
    return competing (facts, ENL_SITE_OXYGEN, "O-H of the sulfinic acid", ENL_TIER_ACID);
  default:
    return competing (facts, ENL_SITE_OXYGEN, "O-H on sulfur", ENL_TIER_OTHER);
  }
}

static bool
peroxide_facts (const EnlMolecule *mol, uint32_t oxygen, uint32_t next, EnlHeteroFacts *facts)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, next); k++) {
    uint32_t other = enl_molecule_neighbour (mol, next, k);
    if (other != oxygen && enl_group_is_carbonyl (enl_group_of (mol, other)))
      return competing (facts, ENL_SITE_OXYGEN, "O-H of the peracid", ENL_TIER_OTHER);
  }
  return competing (facts, ENL_SITE_OXYGEN, "hydroperoxide O-H", ENL_TIER_OTHER);
}

static bool
cation_oxygen_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts)
{
  if (enl_atom_heavy_degree (mol, atom) == 0)
    return competing (facts, ENL_SITE_CATION, "O-H of the hydronium ion", ENL_TIER_ACID);
  if (enl_atom_partner (mol, atom, 2, C) != ENL_NONE)
    return competing (facts, ENL_SITE_CATION, "O-H of the protonated C=O", ENL_TIER_ACID);
  return competing (facts, ENL_SITE_CATION, "O-H of the oxonium ion", ENL_TIER_ACID);
}

static bool
oxygen_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts)
{
  const uint32_t next = heavy_neighbour (mol, atom);
  const int charge = enl_molecule_atom (mol, atom)->charge;

  if (charge < 0)
    return false;
  if (charge > 0)
    return cation_oxygen_facts (mol, atom, facts);
  if (next == ENL_NONE)
    return competing (facts, ENL_SITE_OXYGEN, "O-H of water", ENL_TIER_OTHER);
  switch (element_of (mol, next)) {
  case C:
    return carbon_oxygen_facts (mol, atom, next, facts);
  case N:
    return nitrogen_oxygen_facts (mol, next, facts);
  case O:
    return peroxide_facts (mol, atom, next, facts);
  case P:
  case AS:
    return phosphorus_oxygen_facts (mol, next, facts);
  case S:
  case SE:
    return sulfur_oxygen_facts (mol, next, facts);
  case B:
    return competing (facts, ENL_SITE_OXYGEN, "boronic acid O-H", ENL_TIER_OTHER);
  case SI:
    return competing (facts, ENL_SITE_OXYGEN, "silanol O-H", ENL_TIER_OTHER);
  default:
    return competing (facts, ENL_SITE_OXYGEN,
                      enl_atom_is_halogen (mol, next) ? "O-H of the halogen oxoacid" : "O-H",
                      ENL_TIER_OTHER);
  }
}

/* ---- S-H, Se-H, Te-H ---- */

static const char *
thiol_words (const EnlMolecule *mol, uint32_t next, EnlTier *tier)
{
  *tier = ENL_TIER_MILD;
  if (next == ENL_NONE)
    return "S-H of hydrogen sulfide";
  switch (enl_group_of (mol, next)) {
  case ENL_GROUP_ARYL:
    return "thiophenol S-H";
  case ENL_GROUP_ALKYL:
    return "thiol S-H";
  case ENL_GROUP_VINYL:
    return "enethiol S-H";
  case ENL_GROUP_ACID:
  case ENL_GROUP_CARBONIC:
    *tier = ENL_TIER_ACID;
    return "S-H of the thioacid";
  case ENL_GROUP_THIOCARBONYL:
  case ENL_GROUP_THIOAMIDE:
    *tier = ENL_TIER_ACID;
    return "S-H of the dithioacid";
  case ENL_GROUP_IMINE:
    return "S-H of the thioimidic acid";
  case ENL_GROUP_SULFIDE:
    return "S-H of the hydrodisulfide";
  case ENL_GROUP_PHOSPHORYL:
    return "S-H of the thiophosphoric acid";
  default:
    *tier = ENL_TIER_OTHER;
    return "S-H";
  }
}

static bool
chalcogen_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts)
{
  const uint8_t element = element_of (mol, atom);
  const int charge = enl_molecule_atom (mol, atom)->charge;
  const uint32_t next = heavy_neighbour (mol, atom);
  EnlTier tier = ENL_TIER_MILD;
  const char *words;

  if (charge > 0)
    return competing (facts, ENL_SITE_CATION,
                      element == S ? "S-H of the sulfonium ion" : "H of the onium ion",
                      ENL_TIER_ACID);
  if (charge < 0) /* unlike O-H- and NH2-, a hydrosulfide still has an acidic hydrogen */
    return competing (facts, ENL_SITE_CHALCOGEN, "S-H of the hydrosulfide ion", ENL_TIER_OTHER);
  if (element == S)
    words = thiol_words (mol, next, &tier);
  else if (element == SE)
    words = next != ENL_NONE && enl_group_of (mol, next) == ENL_GROUP_ARYL ? "selenophenol Se-H"
                                                                           : "selenol Se-H";
  else
    words = "tellurol Te-H";
  return competing (facts, ENL_SITE_CHALCOGEN, words, tier);
}

/* ---- P-H and hydrogen halides ---- */

static bool
phosphorus_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts)
{
  if (enl_molecule_atom (mol, atom)->charge < 0)
    return false;
  if (enl_atom_is_cation (mol, atom))
    return competing (facts, ENL_SITE_CATION, "P-H of the phosphonium ion", ENL_TIER_OTHER);
  if (enl_group_of (mol, atom) == ENL_GROUP_PHOSPHORYL)
    return competing (facts, ENL_SITE_PHOSPHORUS, "P-H beside P=O", ENL_TIER_OTHER);
  return competing (facts, ENL_SITE_PHOSPHORUS,
                    element_of (mol, atom) == P ? "P-H of the phosphine" : "As-H of the arsine",
                    ENL_TIER_OTHER);
}

bool
enl_site_hetero_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts)
{
  if (enl_molecule_total_hydrogens (mol, atom) == 0)
    return false;
  switch (element_of (mol, atom)) {
  case N:
    return enl_site_nitrogen_facts (mol, atom, facts);
  case O:
    return oxygen_facts (mol, atom, facts);
  case S:
  case SE:
  case TE:
    return chalcogen_facts (mol, atom, facts);
  case P:
  case AS:
    return phosphorus_facts (mol, atom, facts);
  default:
    if (!enl_atom_is_halogen (mol, atom) || enl_molecule_atom (mol, atom)->charge < 0)
      return false;
    return competing (facts, ENL_SITE_HALOGEN, "H of the hydrogen halide", ENL_TIER_OTHER);
  }
}
