#include "core/acidity/kinship.h"

#include <math.h>

enum { SATURATED, DOUBLE, TRIPLE, AROMATIC };

/* How much a group counts, and how much of it relatives have in common. */
#define ACCEPTOR_COUNTS 1.0
#define PI_COUNTS       0.7 /* aryl, C=C, C≡C */
#define OTHER_COUNTS    0.3
#define RELATIVES       0.5
/* Weights of the shells that are compared: from the neighbours out to the substituent on the far
 * side of a benzene ring; the site itself is in the groups. */
static const double shell_counts[ENL_N_SHELLS] = {0, 1, 1, 1, 0.5, 0.5, 0};
/* Equal groups in surroundings that have nothing in common keep this share. */
#define GROUPS_ALONE 0.4

static uint8_t
bonding_of (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t extra = 0;

  if (enl_molecule_atom (mol, atom)->aromatic)
    return AROMATIC;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint8_t order = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k))->order;
    extra += order > 1 ? order - 1u : 0;
  }
  return extra == 0 ? SATURATED : extra == 1 ? DOUBLE : TRIPLE;
}

void
enl_kin_describe (const EnlMolecule *mol, uint32_t atom, EnlKin *out)
{
  *out = (EnlKin){
      .element = enl_molecule_atom (mol, atom)->element,
      .bonding = bonding_of (mol, atom),
      .cation = enl_atom_is_cation (mol, atom),
  };
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom) && out->n < ENL_KIN_NEIGHBOURS; k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (!enl_atom_is_hydrogen (mol, other))
      out->group[out->n++] = (uint8_t)enl_group_of (mol, other);
  }
}

static double
count_of (EnlGroup group)
{
  if (enl_group_is_acceptor (group))
    return ACCEPTOR_COUNTS;
  if (group == ENL_GROUP_ARYL || group == ENL_GROUP_VINYL || group == ENL_GROUP_ALKYNYL)
    return PI_COUNTS;
  return OTHER_COUNTS;
}

/* Family of related groups: a common number, or one of its own. */
static int
family_of (EnlGroup group)
{
  switch (group) {
  case ENL_GROUP_SULFONE:
  case ENL_GROUP_SULFOXIDE:
  case ENL_GROUP_SULFOXIMINE:
  case ENL_GROUP_SULFILIMINE:
    return ENL_GROUP_SULFONE;
  case ENL_GROUP_SULFONIUM:
  case ENL_GROUP_SULFOXONIUM:
  case ENL_GROUP_PHOSPHONIUM:
  case ENL_GROUP_AMMONIUM:
    return ENL_GROUP_PHOSPHONIUM;
  case ENL_GROUP_IMINE:
  case ENL_GROUP_IMINIUM:
    return ENL_GROUP_IMINE;
  case ENL_GROUP_THIOCARBONYL:
  case ENL_GROUP_THIOAMIDE:
    return ENL_GROUP_KETONE;
  case ENL_GROUP_SULFIDE:
  case ENL_GROUP_SELENIDE:
    return ENL_GROUP_SULFIDE;
  case ENL_GROUP_CARBOXYLATE: /* the charge makes it another matter */
  case ENL_GROUP_KETENE:
    return (int)group;
  default:
    return enl_group_is_carbonyl (group) ? ENL_GROUP_KETONE : (int)group;
  }
}

/* Pairs off groups that are equal (round 0) or relatives (round 1); paired ones are marked. */
static double
pair_off (const EnlKin *a, const EnlKin *b, bool *used_a, bool *used_b, bool relatives)
{
  double sum = 0;

  for (int i = 0; i < a->n; i++)
    for (int j = 0; j < b->n && !used_a[i]; j++) {
      EnlGroup g = a->group[i], h = b->group[j];
      if (used_b[j] || (relatives ? family_of (g) != family_of (h) : g != h))
        continue;
      used_a[i] = used_b[j] = true;
      sum += (relatives ? RELATIVES : 1) * MIN (count_of (g), count_of (h));
    }
  return sum;
}

static double
total_of (const EnlKin *kin)
{
  double sum = 0;

  for (int i = 0; i < kin->n; i++)
    sum += count_of (kin->group[i]);
  return sum;
}

double
enl_kin_overlap (const EnlKin *a, const EnlKin *b)
{
  bool used_a[ENL_KIN_NEIGHBOURS] = {false}, used_b[ENL_KIN_NEIGHBOURS] = {false};
  double whole = MAX (total_of (a), total_of (b));

  if (a->element != b->element || a->bonding != b->bonding || a->cation != b->cation)
    return 0;
  if (whole == 0)
    return 1;
  double common = pair_off (a, b, used_a, used_b, false);
  return (common + pair_off (a, b, used_a, used_b, true)) / whole;
}

double
enl_kin_likeness (const EnlKin *a, const EnlShells *a_shells, const EnlKin *b,
                  const EnlShells *b_shells)
{
  double likeness[ENL_N_SHELLS], sum = 0, whole = 0, overlap = enl_kin_overlap (a, b);

  if (overlap == 0)
    return 0;
  enl_shells_compare (a_shells, b_shells, likeness);
  for (int d = 0; d < ENL_N_SHELLS; d++) {
    sum += shell_counts[d] * likeness[d];
    whole += shell_counts[d];
  }
  return sqrt (overlap * (GROUPS_ALONE + (1 - GROUPS_ALONE) * sum / whole));
}
