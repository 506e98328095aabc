/* Which C-H are sites: the neighbours that an anion at this carbon can use. */
#include <string.h>

#include "core/acidity/site-private.h"

enum { C = 6, N = 7, O = 8, S = 16, SE = 34 };

/* A trans double bond needs a ring of this size at least: the bridgehead of a bicycle may become
 * sp2 only when the larger ring through the new double bond reaches it (Fawcett, Chem. Rev. 1950,
 * 47, 219, stated as S >= 9; Wiseman, JACS 1967, 89, 5966, as the trans-cycloalkene ring; nine as
 * the limit of ready enolisation is common practice). */
enum { MIN_TRANS_RING = 9, MAX_PATH = MIN_TRANS_RING - 3 };

/* Depth-limited search in the graph without `wall`: atoms on the shortest path from `at` to `goal`,
 * both counted; MAX_PATH + 1 when it is longer than `left`. */
static uint32_t
path_atoms (const EnlMolecule *mol, uint32_t at, uint32_t goal, const uint32_t wall[3],
            uint32_t left)
{
  uint32_t best = MAX_PATH + 1;

  if (at == goal)
    return 1;
  for (uint32_t k = 0; left > 1 && k < enl_molecule_degree (mol, at); k++) {
    uint32_t next = enl_molecule_neighbour (mol, at, k), found;

    if (next == wall[0] || next == wall[1] || next == wall[2] ||
        !enl_molecule_bond (mol, enl_molecule_bond_at (mol, at, k))->ring)
      continue;
    found = path_atoms (mol, next, goal, wall, MIN (left - 1, best)) + 1;
    best = MIN (best, found);
  }
  return best;
}

static bool
both_rings_small (const EnlMolecule *mol, uint32_t atom, uint32_t sp2, uint32_t y,
                  const uint32_t branch[2])
{
  const uint32_t wall_a[] = {atom, sp2, branch[1]}, wall_b[] = {atom, sp2, branch[0]};

  return path_atoms (mol, branch[0], y, wall_a, MAX_PATH) <= MAX_PATH &&
         path_atoms (mol, branch[1], y, wall_b, MAX_PATH) <= MAX_PATH;
}

/* True when a double bond between `atom` and `sp2` would be trans in a small ring: the two other
 * neighbours of `atom` both lead back to one neighbour of `sp2` on ways that avoid each other's
 * start (a fused ring leads back through the other start and is no bridge). */
static bool
is_bridgehead_bond (const EnlMolecule *mol, uint32_t atom, uint32_t sp2)
{
  uint32_t branch[2], n = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);

    if (enl_atom_is_hydrogen (mol, other))
      continue;
    if (!enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k))->ring)
      return false;
    if (other == sp2)
      continue;
    if (n == 2)
      return false;
    branch[n++] = other;
  }
  if (n < 2)
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, sp2); k++) {
    uint32_t y = enl_molecule_neighbour (mol, sp2, k);

    if (y != atom && enl_molecule_bond (mol, enl_molecule_bond_at (mol, sp2, k))->ring &&
        both_rings_small (mol, atom, sp2, y, branch))
      return true;
  }
  return false;
}

static bool
in_common_three_ring (const EnlMolecule *mol, uint32_t a, uint32_t b)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, a); k++) {
    uint32_t other = enl_molecule_neighbour (mol, a, k);
    if (other != b && enl_molecule_bond_between (mol, other, b) != ENL_NONE)
      return true;
  }
  return false;
}

/* Can an electron pair on `atom` overlap with the pi system at its neighbour `sp2`? Cyclopropanone,
 * cyclopropene and alkylidenecyclopropane would need a cyclopropene (strain, and four pi electrons
 * in the ring: common practice); the carbon outside such a ring is free. */
static bool
can_conjugate (const EnlMolecule *mol, uint32_t atom, uint32_t sp2, EnlCarbonFacts *facts)
{
  if (in_common_three_ring (mol, atom, sp2)) {
    facts->strain = true;
    return false;
  }
  if (is_bridgehead_bond (mol, atom, sp2)) {
    facts->bredt = true;
    return false;
  }
  return true;
}

/* The N of a true imine: 2-azaallyl anions. Amidines, imidates, isocyanates and carbodiimides hold
 * no such charge at their N-alkyl group. */
static bool
is_true_imine (const EnlMolecule *mol, uint32_t nitrogen)
{
  uint32_t carbon = enl_atom_partner (mol, nitrogen, 2, C);

  for (uint32_t k = 0; carbon != ENL_NONE && k < enl_molecule_degree (mol, carbon); k++) {
    uint32_t other = enl_molecule_neighbour (mol, carbon, k);
    uint8_t e = enl_molecule_atom (mol, other)->element;

    if (other != nitrogen && e != C && e != 1)
      return false;
  }
  return carbon != ENL_NONE;
}

/* S, O or N with a lone pair in the pi system: what makes the carbon between two of them a
 * carbene's carbon. A pyridine-like N (two bonds) does not. */
static bool
is_carbene_neighbour (const EnlMolecule *mol, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (mol, atom);

  if (a->element == N)
    return enl_atom_heavy_degree (mol, atom) + enl_molecule_total_hydrogens (mol, atom) == 3;
  return a->element == O || a->element == S || a->element == SE;
}

/* N+ of an amidinium or azolium: it shares its charge with N, O or S and makes no ylide. */
static bool
shares_charge (const EnlMolecule *mol, uint32_t nitrogen)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, nitrogen); k++) {
    uint32_t carbon = enl_molecule_neighbour (mol, nitrogen, k);

    if (enl_molecule_atom (mol, carbon)->element != C || enl_atom_is_saturated (mol, carbon))
      continue;
    for (uint32_t j = 0; j < enl_molecule_degree (mol, carbon); j++) {
      uint32_t other = enl_molecule_neighbour (mol, carbon, j);
      if (other != nitrogen && is_carbene_neighbour (mol, other))
        return true;
    }
  }
  return false;
}

static bool
is_usable_acceptor (const EnlMolecule *mol, uint32_t atom, uint32_t other, EnlGroup group,
                    EnlCarbonFacts *facts)
{
  if (!enl_group_is_acceptor (group))
    return false;
  if (group == ENL_GROUP_AMMONIUM &&
      (enl_molecule_total_hydrogens (mol, other) > 0 || shares_charge (mol, other)))
    return false; /* the former loses its N-H instead */
  if (group == ENL_GROUP_IMINE_N && !is_true_imine (mol, other))
    return false;
  if (enl_group_conjugates (group))
    return can_conjugate (mol, atom, other, facts);
  return true; /* S, P and onium neighbours need no planar carbon */
}

/* Keeps the acceptors in the order of their kinds, so that words do not depend on numbering. */
static void
add_acceptor (EnlCarbonFacts *facts, uint32_t atom, EnlGroup group)
{
  uint32_t i = facts->n_acceptors++;

  for (; i > 0 && facts->group[i - 1] > group; i--) {
    facts->group[i] = facts->group[i - 1];
    facts->acceptor[i] = facts->acceptor[i - 1];
  }
  facts->group[i] = group;
  facts->acceptor[i] = atom;
  facts->n_carbonyls += enl_group_is_carbonyl (group);
}

static void
add_neighbour (const EnlMolecule *mol, uint32_t atom, uint32_t other, EnlCarbonFacts *facts)
{
  const EnlGroup group = enl_group_of (mol, other);

  if (is_usable_acceptor (mol, atom, other, group, facts)) {
    add_acceptor (facts, other, group);
  } else if (group == ENL_GROUP_ARYL && can_conjugate (mol, atom, other, facts)) {
    facts->aryl[facts->n_aryls++] = other;
  } else if (group == ENL_GROUP_VINYL && can_conjugate (mol, atom, other, facts)) {
    facts->n_vinyls++;
  } else if (group == ENL_GROUP_ALKYNYL) {
    facts->n_alkynyls++;
  }
  facts->n_sulfides += group == ENL_GROUP_SULFIDE;
  facts->n_selenides += group == ENL_GROUP_SELENIDE;
  facts->n_phosphines += group == ENL_GROUP_PHOSPHINE;
}

/* ---- vinylogous acceptors ---- */

static uint32_t
multiple_partner (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t other = enl_atom_partner (mol, atom, 2, C);
  return other != ENL_NONE ? other : enl_atom_partner (mol, atom, 3, C);
}

/* Follows C=C and C≡C from `start` (the atom beside the acidic carbon) to an acceptor. */
static void
follow_vinylogy (const EnlMolecule *mol, uint32_t start, uint32_t depth, EnlCarbonFacts *facts)
{
  enum { MAX_DEPTH = 4 };
  const uint32_t end = multiple_partner (mol, start);

  if (end == ENL_NONE || depth > MAX_DEPTH)
    return;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, end); k++) {
    uint32_t other = enl_molecule_neighbour (mol, end, k);
    EnlGroup group = enl_group_of (mol, other);

    if (enl_molecule_bond (mol, enl_molecule_bond_at (mol, end, k))->order != 1)
      continue;
    if (enl_group_is_acceptor (group) && group != ENL_GROUP_AMMONIUM &&
        group != ENL_GROUP_IMINE_N && (facts->depth == 0 || depth < facts->depth)) {
      facts->depth = depth;
      facts->far = other;
    } else if (group == ENL_GROUP_VINYL || group == ENL_GROUP_ALKYNYL) {
      follow_vinylogy (mol, other, depth + 1, facts);
    }
  }
}

static void
look_for_vinylogy (const EnlMolecule *mol, uint32_t atom, EnlCarbonFacts *facts)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    const uint32_t other = enl_molecule_neighbour (mol, atom, k), before = facts->depth;
    const EnlGroup group = enl_group_of (mol, other);
    EnlCarbonFacts unused = {0};

    if (group == ENL_GROUP_ALKYNYL ||
        (group == ENL_GROUP_VINYL && can_conjugate (mol, atom, other, &unused)))
      follow_vinylogy (mol, other, 1, facts);
    if (facts->depth != before)
      facts->far_alkyne = group == ENL_GROUP_ALKYNYL;
  }
}

/* ---- five-membered rings whose anion is aromatic ---- */

static uint32_t
ring5_kind (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size, aromatic = 0, sp2 = 0;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    bool inside = false;

    for (uint32_t i = 0; size == 5 && i < size; i++) {
      EnlGroup group = enl_group_of (mol, ring[i]);
      uint32_t bond = enl_molecule_bond_between (mol, ring[i], ring[(i + 1) % size]);

      inside |= ring[i] == atom;
      sp2 += group == ENL_GROUP_ARYL || group == ENL_GROUP_VINYL;
      aromatic += enl_molecule_bond (mol, bond)->aromatic;
    }
    if (inside && sp2 == 4)
      return 1 + MIN (aromatic, 2);
  }
  return 0;
}

/* C=O opposite the carbon in a six-membered ring whose four other atoms are sp2: anthrone and its
 * like, whose enol is a phenol. */
static uint32_t
carbonyl_across (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size, at = 0, sp2 = 0;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);

    while (at < size && ring[at] != atom)
      at++;
    if (size != 6 || at == size)
      continue;
    for (uint32_t i = 0; i < size; i++) {
      EnlGroup group = enl_group_of (mol, ring[i]);
      sp2 += group == ENL_GROUP_ARYL || group == ENL_GROUP_VINYL;
    }
    if (sp2 == 4 && enl_group_is_carbonyl (enl_group_of (mol, ring[(at + 3) % 6])))
      return ring[(at + 3) % 6];
  }
  return ENL_NONE;
}

/* ---- single carbons ---- */

static uint32_t
perfluoroalkyls (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t n = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    n += enl_group_is_cf3 (mol, enl_molecule_neighbour (mol, atom, k));
  return n;
}

/* Haloforms, CHF(CF3)2 and their like: three halogens or perfluoroalkyl groups; or two of Cl, Br, I
 * (dichloromethane and dichloromethyl groups, which lithium amides take: common practice). */
static bool
is_polyhalo (const EnlMolecule *mol, uint32_t atom, EnlCarbonFacts *facts)
{
  uint32_t heavy = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    facts->n_halogens += enl_atom_is_halogen (mol, other);
    heavy += enl_group_of (mol, other) == ENL_GROUP_HALOGEN;
  }
  return heavy >= 2 || facts->n_halogens + perfluoroalkyls (mol, atom) >= 3;
}

static EnlCarbonReason
saturated_reason (const EnlMolecule *mol, uint32_t atom, EnlCarbonFacts *facts)
{
  const bool polyhalo = is_polyhalo (mol, atom, facts);

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (!enl_atom_is_hydrogen (mol, enl_molecule_neighbour (mol, atom, k)))
      add_neighbour (mol, atom, enl_molecule_neighbour (mol, atom, k), facts);
  if (facts->n_vinyls + facts->n_alkynyls > 0)
    look_for_vinylogy (mol, atom, facts);
  if (facts->n_vinyls + facts->n_aryls >= 2) {
    facts->ring5 = ring5_kind (mol, atom);
    facts->across = carbonyl_across (mol, atom);
  }
  if (facts->n_acceptors > 0)
    return ENL_CARBON_ACCEPTOR;
  if (facts->n_aryls + facts->n_vinyls + facts->n_alkynyls > 0)
    return ENL_CARBON_PI;
  if (polyhalo)
    return ENL_CARBON_POLYHALO;
  if (facts->n_sulfides + facts->n_selenides + facts->n_phosphines >= 2)
    return ENL_CARBON_BETWEEN;
  return ENL_CARBON_NONE;
}

static bool
is_azolium_carbon (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t n = 0;
  bool cation = false;

  if (enl_atom_is_saturated (mol, atom))
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);

    if (enl_atom_is_hydrogen (mol, other))
      continue;
    if (!is_carbene_neighbour (mol, other))
      return false;
    cation |= enl_molecule_atom (mol, other)->element == N && enl_atom_is_cation (mol, other);
    n++;
  }
  return n == 2 && cation;
}

/* H-C=X=Y: diazo compounds, ketenes, allenes, ketenimines. */
static EnlCarbonReason
cumulated_reason (const EnlMolecule *mol, uint32_t atom)
{
  const uint32_t other = enl_atom_partner (mol, atom, 2, 0);
  uint32_t doubles = 0;

  for (uint32_t k = 0; other != ENL_NONE && k < enl_molecule_degree (mol, other); k++)
    doubles += enl_molecule_bond (mol, enl_molecule_bond_at (mol, other, k))->order == 2;
  if (doubles < 2)
    return ENL_CARBON_NONE;
  if (enl_molecule_atom (mol, other)->element == C)
    return ENL_CARBON_CUMULENE;
  return enl_group_of (mol, atom) == ENL_GROUP_DIAZO ? ENL_CARBON_DIAZO : ENL_CARBON_NONE;
}

static EnlCarbonReason
unsaturated_reason (const EnlMolecule *mol, uint32_t atom)
{
  switch (enl_group_of (mol, atom)) {
  case ENL_GROUP_NITRILE:
    return ENL_CARBON_CYANIDE;
  case ENL_GROUP_ALKYNYL:
    return ENL_CARBON_ACETYLENE;
  default:
    return is_azolium_carbon (mol, atom) ? ENL_CARBON_AZOLIUM : cumulated_reason (mol, atom);
  }
}

/* Bound sideways to a metal, as in ferrocene: the metal holds a neighbour of the carbon too. */
static bool
is_in_pi_complex (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (enl_atom_is_metal (mol, other) && in_common_three_ring (mol, atom, other))
      return true;
  }
  return false;
}

bool
enl_site_carbon_facts (const EnlMolecule *mol, uint32_t atom, EnlCarbonFacts *facts)
{
  const EnlAtom *a = enl_molecule_atom (mol, atom);

  memset (facts, 0, sizeof *facts);
  facts->across = ENL_NONE;
  if (a->element != C || a->charge != 0 || a->unpaired != 0 ||
      enl_molecule_total_hydrogens (mol, atom) == 0 || enl_atom_heavy_degree (mol, atom) > 3 ||
      is_in_pi_complex (mol, atom))
    return false;
  facts->reason = enl_atom_is_saturated (mol, atom) ? saturated_reason (mol, atom, facts)
                                                    : unsaturated_reason (mol, atom);
  return facts->reason != ENL_CARBON_NONE;
}

/* Saturated CH that loses its hydrogen between two carbonyls. */
static bool
is_dicarbonyl_middle (const EnlMolecule *mol, uint32_t atom)
{
  EnlCarbonFacts facts;
  uint32_t carbonyls = 0;

  if (enl_molecule_atom (mol, atom)->element != C || !enl_site_carbon_facts (mol, atom, &facts))
    return false;
  for (uint32_t i = 0; i < facts.n_acceptors; i++)
    carbonyls += enl_group_is_carbonyl (facts.group[i]) && facts.group[i] != ENL_GROUP_CARBOXYLATE;
  return carbonyls >= 2;
}

bool
enl_site_is_dicarbonyl_gamma (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  if (facts->reason != ENL_CARBON_ACCEPTOR || facts->n_acceptors != 1 ||
      facts->group[0] != ENL_GROUP_KETONE)
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, facts->acceptor[0]); k++) {
    uint32_t other = enl_molecule_neighbour (mol, facts->acceptor[0], k);
    if (other != atom && is_dicarbonyl_middle (mol, other))
      return true;
  }
  return false;
}
