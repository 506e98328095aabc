#include "core/acidity/group.h"

/* Atomic numbers that the rules name. */
enum { H = 1, B = 5, C = 6, N = 7, O = 8, F = 9, SI = 14, P = 15, S = 16, CL = 17, GE = 32 };
enum { AS = 33, SE = 34, BR = 35, SN = 50, TE = 52, I = 53, AT = 85 };

static uint8_t
element_of (const EnlMolecule *mol, uint32_t atom)
{
  return enl_molecule_atom (mol, atom)->element;
}

static bool
is_chalcogen (uint8_t element)
{
  return element == S || element == SE || element == TE;
}

bool
enl_atom_is_hydrogen (const EnlMolecule *mol, uint32_t atom)
{
  return element_of (mol, atom) == H;
}

bool
enl_atom_is_halogen (const EnlMolecule *mol, uint32_t atom)
{
  uint8_t e = element_of (mol, atom);
  return e == F || e == CL || e == BR || e == I || e == AT;
}

bool
enl_atom_is_metal (const EnlMolecule *mol, uint32_t atom)
{
  /* first and last atomic number of every run of metals in the periodic table */
  static const uint8_t run[][2] = {{3, 4}, {11, 13}, {19, 31}, {37, 49}, {55, 81}, {87, 118}};
  const uint8_t e = element_of (mol, atom);

  for (size_t i = 0; i < ENL_COUNT (run); i++)
    if (e >= run[i][0] && e <= run[i][1])
      return true;
  return false;
}

uint32_t
enl_atom_heavy_degree (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t n = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    n += !enl_atom_is_hydrogen (mol, enl_molecule_neighbour (mol, atom, k));
  return n;
}

uint32_t
enl_atom_partner (const EnlMolecule *mol, uint32_t atom, uint8_t order, uint8_t element)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    const EnlBond *bond = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k));
    uint32_t other = enl_molecule_neighbour (mol, atom, k);

    if (bond->order == order && !bond->aromatic &&
        (element == 0 || element_of (mol, other) == element))
      return other;
  }
  return ENL_NONE;
}

bool
enl_atom_is_saturated (const EnlMolecule *mol, uint32_t atom)
{
  if (enl_molecule_atom (mol, atom)->aromatic)
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k))->order > 1)
      return false;
  return true;
}

bool
enl_atom_is_cation (const EnlMolecule *mol, uint32_t atom)
{
  int charge = enl_molecule_atom (mol, atom)->charge;

  for (uint32_t k = 0; charge > 0 && k < enl_molecule_degree (mol, atom); k++) {
    int other = enl_molecule_atom (mol, enl_molecule_neighbour (mol, atom, k))->charge;
    if (other < 0)
      charge += other;
  }
  return charge > 0;
}

/* Neighbours of `element` that are doubly bonded, or singly bonded with a negative charge that
 * neutralises a positive `atom`: S=O and S+(O-) count alike. */
static uint32_t
count_oxo (const EnlMolecule *mol, uint32_t atom, uint8_t element)
{
  const bool positive = enl_molecule_atom (mol, atom)->charge > 0;
  uint32_t n = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    const EnlBond *bond = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k));
    const EnlAtom *other = enl_molecule_atom (mol, enl_molecule_neighbour (mol, atom, k));

    if (other->element == element && !bond->aromatic &&
        (bond->order == 2 || (positive && other->charge < 0)))
      n++;
  }
  return n;
}

static uint32_t
other_neighbour (const EnlMolecule *mol, uint32_t atom, uint32_t than)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (other != than && !enl_atom_is_hydrogen (mol, other))
      return other;
  }
  return ENL_NONE;
}

/* C=O, C=S, S=O or P=O at `atom`. */
static bool
is_acyl (const EnlMolecule *mol, uint32_t atom)
{
  uint8_t e = element_of (mol, atom);

  if (e == C)
    return count_oxo (mol, atom, O) + count_oxo (mol, atom, S) > 0;
  return (e == S || e == P) && count_oxo (mol, atom, O) > 0;
}

/* C(=O) on an oxygen or sulfur atom `x`. */
static EnlGroup
acyl_chalcogen_group (const EnlMolecule *mol, uint32_t carbonyl, uint32_t x)
{
  uint32_t next = other_neighbour (mol, x, carbonyl);

  if (enl_molecule_atom (mol, x)->charge < 0)
    return ENL_GROUP_CARBOXYLATE;
  if (next == ENL_NONE)
    return enl_molecule_total_hydrogens (mol, x) > 0 ? ENL_GROUP_ACID : ENL_GROUP_ESTER;
  if (is_acyl (mol, next))
    return ENL_GROUP_ANHYDRIDE;
  if (element_of (mol, next) == O && enl_molecule_total_hydrogens (mol, next) > 0)
    return ENL_GROUP_ACID; /* peracid */
  return element_of (mol, x) == O ? ENL_GROUP_ESTER : ENL_GROUP_THIOESTER;
}

static EnlGroup
acyl_nitrogen_group (const EnlMolecule *mol, uint32_t carbonyl, uint32_t n)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, n); k++) {
    uint32_t other = enl_molecule_neighbour (mol, n, k);
    if (other != carbonyl && element_of (mol, other) == C && is_acyl (mol, other))
      return ENL_GROUP_IMIDE;
  }
  return ENL_GROUP_AMIDE;
}

static EnlGroup
carbonyl_group_on (const EnlMolecule *mol, uint32_t carbonyl, uint32_t hetero)
{
  uint8_t e = element_of (mol, hetero);

  if (enl_atom_is_halogen (mol, hetero))
    return ENL_GROUP_ACYL_HALIDE;
  if (e == N)
    return acyl_nitrogen_group (mol, carbonyl, hetero);
  return acyl_chalcogen_group (mol, carbonyl, hetero);
}

static bool
is_acyl_hetero (const EnlMolecule *mol, uint32_t atom)
{
  uint8_t e = element_of (mol, atom);
  return e == N || e == O || is_chalcogen (e) || enl_atom_is_halogen (mol, atom);
}

static EnlGroup
carbonyl_group (const EnlMolecule *mol, uint32_t carbonyl, uint32_t oxygen)
{
  uint32_t n_hetero = 0, hetero = ENL_NONE;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, carbonyl); k++) {
    uint32_t other = enl_molecule_neighbour (mol, carbonyl, k);
    uint8_t e = element_of (mol, other);
    const EnlBond *bond = enl_molecule_bond (mol, enl_molecule_bond_at (mol, carbonyl, k));

    if (other == oxygen)
      continue;
    if (bond->order == 2 && !bond->aromatic)
      return e == C ? ENL_GROUP_KETENE : ENL_GROUP_CARBONIC;
    if (e == SI || e == GE || e == SN || e == B)
      return ENL_GROUP_ACYL_SILANE;
    if (is_acyl_hetero (mol, other)) {
      n_hetero++;
      hetero = other;
    }
  }
  if (n_hetero > 1)
    return ENL_GROUP_CARBONIC;
  if (n_hetero == 1)
    return carbonyl_group_on (mol, carbonyl, hetero);
  return enl_molecule_total_hydrogens (mol, carbonyl) > 0 ? ENL_GROUP_ALDEHYDE : ENL_GROUP_KETONE;
}

static EnlGroup
thiocarbonyl_group (const EnlMolecule *mol, uint32_t carbon)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, carbon); k++)
    if (element_of (mol, enl_molecule_neighbour (mol, carbon, k)) == N)
      return ENL_GROUP_THIOAMIDE;
  return ENL_GROUP_THIOCARBONYL;
}

static EnlGroup
imine_group (const EnlMolecule *mol, uint32_t nitrogen)
{
  if (enl_molecule_atom (mol, nitrogen)->charge <= 0)
    return ENL_GROUP_IMINE;
  if (enl_atom_partner (mol, nitrogen, 2, N) != ENL_NONE)
    return ENL_GROUP_DIAZO;
  return enl_atom_is_cation (mol, nitrogen) ? ENL_GROUP_IMINIUM : ENL_GROUP_IMINE;
}

static EnlGroup
double_bond_group (const EnlMolecule *mol, uint32_t atom, uint32_t partner)
{
  const uint8_t e = element_of (mol, partner);

  if (e == O)
    return carbonyl_group (mol, atom, partner);
  if (is_chalcogen (e))
    return thiocarbonyl_group (mol, atom);
  if (e == N)
    return imine_group (mol, partner);
  return e == C ? ENL_GROUP_VINYL : ENL_GROUP_OTHER;
}

/* Of two double bonds (ketene, isocyanate) the one to the heteroatom counts. An aromatic carbon is
 * something else than aryl only through C=O, C=S and their like outside the ring. */
static EnlGroup
carbon_group (const EnlMolecule *mol, uint32_t atom)
{
  EnlGroup group = enl_molecule_atom (mol, atom)->aromatic ? ENL_GROUP_ARYL : ENL_GROUP_ALKYL;
  const uint32_t degree = enl_molecule_degree (mol, atom);

  for (uint32_t k = 0; k < degree; k++) {
    const EnlBond *bond = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k));
    const uint32_t other = enl_molecule_neighbour (mol, atom, k);

    if (bond->aromatic || bond->order < 2)
      continue;
    if (element_of (mol, other) == O && bond->order == 2)
      return carbonyl_group (mol, atom, other);
    if (group == ENL_GROUP_ARYL && !is_chalcogen (element_of (mol, other)))
      continue;
    if (bond->order == 2)
      group = group == ENL_GROUP_ALKYL || group == ENL_GROUP_ARYL || group == ENL_GROUP_VINYL
                  ? double_bond_group (mol, atom, other)
                  : group;
    else
      group = element_of (mol, other) == N   ? ENL_GROUP_NITRILE
              : element_of (mol, other) == C ? ENL_GROUP_ALKYNYL
                                             : ENL_GROUP_OTHER;
  }
  return group;
}

/* C-N=N=N has its charges on the two outer nitrogens. */
static bool
is_azide (const EnlMolecule *mol, uint32_t next)
{
  return enl_molecule_atom (mol, next)->charge > 0 &&
         (enl_atom_partner (mol, next, 2, N) != ENL_NONE ||
          enl_atom_partner (mol, next, 3, N) != ENL_NONE);
}

static EnlGroup
cationic_nitrogen_group (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t carbon = enl_atom_partner (mol, atom, 3, C);

  if (carbon != ENL_NONE && enl_molecule_atom (mol, carbon)->charge < 0)
    return ENL_GROUP_ISOCYANIDE;
  if (enl_atom_is_cation (mol, atom))
    return ENL_GROUP_AMMONIUM;
  return count_oxo (mol, atom, O) > 0 ? ENL_GROUP_N_OXIDE : ENL_GROUP_OTHER;
}

static EnlGroup
nitrogen_group (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t oxo = count_oxo (mol, atom, O), other;

  if (oxo >= 2 && enl_atom_partner (mol, atom, 2, O) != ENL_NONE)
    return ENL_GROUP_NITRO;
  if (enl_molecule_atom (mol, atom)->charge > 0)
    return cationic_nitrogen_group (mol, atom);
  if (oxo == 1)
    return ENL_GROUP_NITROSO;
  other = enl_atom_partner (mol, atom, 2, N);
  if (other != ENL_NONE)
    return is_azide (mol, other) ? ENL_GROUP_AZIDE : ENL_GROUP_AZO;
  if (enl_atom_partner (mol, atom, 2, C) != ENL_NONE)
    return ENL_GROUP_IMINE_N;
  return ENL_GROUP_AMINE;
}

static EnlGroup
chalcogen_group (const EnlMolecule *mol, uint32_t atom)
{
  const uint32_t oxo = count_oxo (mol, atom, O);
  const bool imide = count_oxo (mol, atom, N) > 0;

  if (oxo >= 2)
    return ENL_GROUP_SULFONE;
  if (oxo == 1 && enl_atom_is_cation (mol, atom))
    return ENL_GROUP_SULFOXONIUM;
  if (oxo == 1)
    return imide ? ENL_GROUP_SULFOXIMINE : ENL_GROUP_SULFOXIDE;
  if (imide)
    return ENL_GROUP_SULFILIMINE;
  if (enl_atom_is_cation (mol, atom))
    return ENL_GROUP_SULFONIUM;
  if (enl_molecule_degree (mol, atom) + enl_molecule_atom (mol, atom)->hydrogens > 2)
    return ENL_GROUP_OTHER;
  return element_of (mol, atom) == S ? ENL_GROUP_SULFIDE : ENL_GROUP_SELENIDE;
}

static EnlGroup
phosphorus_group (const EnlMolecule *mol, uint32_t atom)
{
  if (count_oxo (mol, atom, O) + count_oxo (mol, atom, S) + count_oxo (mol, atom, N) +
          count_oxo (mol, atom, SE) >
      0)
    return ENL_GROUP_PHOSPHORYL;
  if (enl_atom_is_cation (mol, atom))
    return ENL_GROUP_PHOSPHONIUM;
  return enl_atom_is_saturated (mol, atom) ? ENL_GROUP_PHOSPHINE : ENL_GROUP_OTHER;
}

EnlGroup
enl_group_of (const EnlMolecule *mol, uint32_t atom)
{
  switch (element_of (mol, atom)) {
  case C:
    return carbon_group (mol, atom);
  case N:
    return nitrogen_group (mol, atom);
  case O:
    return ENL_GROUP_OXYGEN;
  case F:
    return ENL_GROUP_FLUORINE;
  case CL:
  case BR:
  case I:
  case AT:
    return ENL_GROUP_HALOGEN;
  case S:
  case SE:
  case TE:
    return chalcogen_group (mol, atom);
  case P:
  case AS:
    return phosphorus_group (mol, atom);
  case SI:
  case GE:
  case SN:
    return ENL_GROUP_SILYL;
  case B:
    return ENL_GROUP_BORYL;
  default:
    return ENL_GROUP_OTHER;
  }
}

bool
enl_group_is_cf3 (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t fluorines = 0;

  if (element_of (mol, atom) != C || !enl_atom_is_saturated (mol, atom))
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    fluorines += element_of (mol, enl_molecule_neighbour (mol, atom, k)) == F;
  return fluorines >= 2 && enl_molecule_total_hydrogens (mol, atom) == 0;
}

/* Traits that come from what sits on a heteroatom `x` of the group (ester O, amide N). */
static unsigned
traits_behind (const EnlMolecule *mol, uint32_t group_atom, uint32_t x)
{
  unsigned traits = 0;

  if (enl_molecule_total_hydrogens (mol, x) > 0)
    traits |= ENL_TRAIT_HYDROGEN;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, x); k++) {
    uint32_t other = enl_molecule_neighbour (mol, x, k);
    if (other != group_atom && enl_group_of (mol, other) == ENL_GROUP_ARYL)
      traits |= ENL_TRAIT_ARYL;
  }
  return traits;
}

/* The bond that decides whether the group itself is cyclic: C-O of an ester, C-N of an amide. */
static bool
closes_ring (const EnlMolecule *mol, uint32_t bond, uint32_t other)
{
  return enl_molecule_bond (mol, bond)->ring && element_of (mol, other) != C;
}

static unsigned
carbon_traits (const EnlMolecule *mol, uint32_t atom)
{
  const EnlGroup group = enl_group_of (mol, atom);
  const bool plain = group == ENL_GROUP_KETONE || group == ENL_GROUP_ALDEHYDE;
  unsigned traits = plain && enl_molecule_in_ring (mol, atom) ? ENL_TRAIT_RING : 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t bond = enl_molecule_bond_at (mol, atom, k);
    uint32_t other = enl_molecule_neighbour (mol, atom, k);

    if (enl_molecule_bond (mol, bond)->order > 1 && !enl_molecule_bond (mol, bond)->aromatic)
      continue;
    if (closes_ring (mol, bond, other))
      traits |= ENL_TRAIT_RING;
    if (element_of (mol, other) == C) {
      EnlGroup next = enl_group_of (mol, other);
      traits |= plain && next == ENL_GROUP_ARYL ? ENL_TRAIT_ARYL : 0;
      traits |= next == ENL_GROUP_VINYL ? ENL_TRAIT_VINYL : 0;
      traits |= enl_group_is_cf3 (mol, other) ? ENL_TRAIT_CF3 : 0;
    } else if (!enl_atom_is_hydrogen (mol, other)) {
      traits |= traits_behind (mol, atom, other);
    }
  }
  return traits;
}

static unsigned
hetero_traits (const EnlMolecule *mol, uint32_t atom)
{
  unsigned traits = enl_molecule_in_ring (mol, atom) ? ENL_TRAIT_RING : 0;

  if (enl_molecule_total_hydrogens (mol, atom) > 0)
    traits |= ENL_TRAIT_HYDROGEN;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);

    if (element_of (mol, other) == C) {
      traits |= enl_group_of (mol, other) == ENL_GROUP_ARYL ? ENL_TRAIT_ARYL : 0;
      traits |= enl_group_is_cf3 (mol, other) ? ENL_TRAIT_CF3 : 0;
    } else if (enl_molecule_total_hydrogens (mol, other) > 0) {
      traits |= ENL_TRAIT_HYDROGEN;
    }
  }
  return traits;
}

unsigned
enl_group_traits (const EnlMolecule *mol, uint32_t atom)
{
  return element_of (mol, atom) == C ? carbon_traits (mol, atom) : hetero_traits (mol, atom);
}

const char *
enl_group_label (EnlGroup group)
{
  static const char *const label[ENL_N_GROUPS] = {
      [ENL_GROUP_OTHER] = "other group",
      [ENL_GROUP_ALKYL] = "alkyl group",
      [ENL_GROUP_VINYL] = "C=C",
      [ENL_GROUP_ALKYNYL] = "C≡C",
      [ENL_GROUP_ARYL] = "aryl group",
      [ENL_GROUP_ALDEHYDE] = "aldehyde C=O",
      [ENL_GROUP_KETONE] = "ketone C=O",
      [ENL_GROUP_ESTER] = "ester C=O",
      [ENL_GROUP_THIOESTER] = "thioester C=O",
      [ENL_GROUP_AMIDE] = "amide C=O",
      [ENL_GROUP_IMIDE] = "imide C=O",
      [ENL_GROUP_ACID] = "acid C=O",
      [ENL_GROUP_CARBOXYLATE] = "carboxylate",
      [ENL_GROUP_ANHYDRIDE] = "anhydride C=O",
      [ENL_GROUP_ACYL_HALIDE] = "acyl halide C=O",
      [ENL_GROUP_ACYL_SILANE] = "acylsilane C=O",
      [ENL_GROUP_KETENE] = "ketene C=O",
      [ENL_GROUP_CARBONIC] = "carbonic C=O",
      [ENL_GROUP_THIOCARBONYL] = "C=S",
      [ENL_GROUP_THIOAMIDE] = "thioamide C=S",
      [ENL_GROUP_IMINE] = "C=N",
      [ENL_GROUP_IMINIUM] = "iminium C=N",
      [ENL_GROUP_NITRILE] = "nitrile",
      [ENL_GROUP_DIAZO] = "diazo group",
      [ENL_GROUP_AMINE] = "nitrogen",
      [ENL_GROUP_AMMONIUM] = "N+",
      [ENL_GROUP_N_OXIDE] = "N-oxide",
      [ENL_GROUP_ISOCYANIDE] = "isocyanide",
      [ENL_GROUP_NITRO] = "nitro group",
      [ENL_GROUP_NITROSO] = "nitroso group",
      [ENL_GROUP_AZO] = "azo group",
      [ENL_GROUP_AZIDE] = "azide",
      [ENL_GROUP_IMINE_N] = "imine N",
      [ENL_GROUP_OXYGEN] = "oxygen",
      [ENL_GROUP_FLUORINE] = "fluorine",
      [ENL_GROUP_HALOGEN] = "halogen",
      [ENL_GROUP_SULFIDE] = "sulfide",
      [ENL_GROUP_SELENIDE] = "selenide",
      [ENL_GROUP_SULFOXIDE] = "sulfoxide",
      [ENL_GROUP_SULFONE] = "sulfonyl group",
      [ENL_GROUP_SULFOXIMINE] = "sulfoximine",
      [ENL_GROUP_SULFILIMINE] = "sulfilimine",
      [ENL_GROUP_SULFONIUM] = "sulfonium S+",
      [ENL_GROUP_SULFOXONIUM] = "sulfoxonium S+",
      [ENL_GROUP_PHOSPHINE] = "phosphine",
      [ENL_GROUP_PHOSPHORYL] = "P=O",
      [ENL_GROUP_PHOSPHONIUM] = "phosphonium P+",
      [ENL_GROUP_SILYL] = "silyl group",
      [ENL_GROUP_BORYL] = "boryl group",
  };
  return label[group];
}

bool
enl_group_is_carbonyl (EnlGroup group)
{
  return group >= ENL_GROUP_ALDEHYDE && group <= ENL_GROUP_CARBONIC;
}

bool
enl_group_conjugates (EnlGroup group)
{
  return (group >= ENL_GROUP_ALDEHYDE && group <= ENL_GROUP_DIAZO) || group == ENL_GROUP_NITRO ||
         group == ENL_GROUP_NITROSO || group == ENL_GROUP_AZO || group == ENL_GROUP_IMINE_N;
}

bool
enl_group_is_acceptor (EnlGroup group)
{
  switch (group) {
  case ENL_GROUP_AMMONIUM:
  case ENL_GROUP_N_OXIDE:
  case ENL_GROUP_ISOCYANIDE:
  case ENL_GROUP_SULFOXIDE:
  case ENL_GROUP_SULFONE:
  case ENL_GROUP_SULFOXIMINE:
  case ENL_GROUP_SULFILIMINE:
  case ENL_GROUP_SULFONIUM:
  case ENL_GROUP_SULFOXONIUM:
  case ENL_GROUP_PHOSPHORYL:
  case ENL_GROUP_PHOSPHONIUM:
    return true;
  default:
    return enl_group_conjugates (group);
  }
}
