/* Hydrogens on nitrogen: what they are called and how early they leave. */
#include "core/acidity/site-private.h"

enum { C = 6, N = 7, O = 8, SI = 14, P = 15, S = 16 };

static uint8_t
element_of (const EnlMolecule *mol, uint32_t atom)
{
  return enl_molecule_atom (mol, atom)->element;
}

static bool
tell (EnlHeteroFacts *facts, const char *words, EnlTier tier)
{
  *facts = (EnlHeteroFacts){ENL_SITE_NITROGEN, words, tier, true};
  return true;
}

static bool
tell_cation (EnlHeteroFacts *facts, const char *words, EnlTier tier)
{
  *facts = (EnlHeteroFacts){ENL_SITE_CATION, words, tier, true};
  return true;
}

/* Amines are weaker than what an enolate chemist pays for with base. */
static bool
tell_amine (EnlHeteroFacts *facts, const char *words)
{
  *facts = (EnlHeteroFacts){ENL_SITE_NITROGEN, words, ENL_TIER_OTHER, false};
  return true;
}

/* ---- rings ---- */

typedef struct {
  uint32_t size, nitrogens, hetero; /* hetero: other than N */
  uint32_t benzo;                   /* all-carbon aromatic rings fused to it */
  bool adjacent_n;                  /* N-N bond in the ring */
  bool oxo;                         /* carries C=O */
  bool cation;                      /* holds N+ */
} EnlRingFacts;

static bool
is_fused_carbocycle (const EnlMolecule *mol, const uint32_t *ring, uint32_t size,
                     const uint32_t *other, uint32_t other_size)
{
  uint32_t shared = 0;

  for (uint32_t j = 0; j < other_size; j++) {
    if (element_of (mol, other[j]) != C || !enl_molecule_atom (mol, other[j])->aromatic)
      return false;
    for (uint32_t i = 0; i < size; i++)
      shared += ring[i] == other[j];
  }
  return shared == 2;
}

static void
describe_ring (const EnlMolecule *mol, uint32_t r, EnlRingFacts *facts)
{
  const uint32_t *ring = enl_molecule_ring (mol, r, &facts->size);

  for (uint32_t i = 0; i < facts->size; i++) {
    const uint8_t e = element_of (mol, ring[i]);
    const uint8_t next = element_of (mol, ring[(i + 1) % facts->size]);

    facts->nitrogens += e == N;
    facts->hetero += e != N && e != C;
    facts->adjacent_n |= e == N && next == N;
    facts->cation |= e == N && enl_atom_is_cation (mol, ring[i]);
    facts->oxo |= e == C && enl_group_is_carbonyl (enl_group_of (mol, ring[i]));
  }
  for (uint32_t q = 0; q < enl_molecule_rings (mol); q++) {
    uint32_t size;
    const uint32_t *other = enl_molecule_ring (mol, q, &size);
    if (q != r && is_fused_carbocycle (mol, ring, facts->size, other, size))
      facts->benzo++;
  }
}

/* The aromatic ring of `atom`, a five-membered one first. */
static bool
aromatic_ring_of (const EnlMolecule *mol, uint32_t atom, EnlRingFacts *facts)
{
  uint32_t best = ENL_NONE;

  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    bool inside = false, aromatic = true;

    for (uint32_t i = 0; i < size; i++) {
      inside |= ring[i] == atom;
      aromatic &= enl_molecule_atom (mol, ring[i])->aromatic;
    }
    if (inside && aromatic && (best == ENL_NONE || size == 5))
      best = r;
  }
  *facts = (EnlRingFacts){0};
  if (best == ENL_NONE)
    return false;
  describe_ring (mol, best, facts);
  return true;
}

static bool
azole_facts (const EnlRingFacts *ring, EnlHeteroFacts *facts)
{
  if (ring->hetero > 0)
    return tell (facts, "N-H of the azole", ENL_TIER_OTHER);
  switch (ring->nitrogens) {
  case 1:
    return tell (facts,
                 ring->benzo == 0   ? "N-H of the pyrrole"
                 : ring->benzo == 1 ? "N-H of the indole"
                                    : "N-H of the carbazole",
                 ENL_TIER_AMIDE);
  case 2:
    if (ring->adjacent_n)
      return tell (facts, ring->benzo > 0 ? "N-H of the indazole" : "N-H of the pyrazole",
                   ENL_TIER_MILD);
    return tell (facts, ring->benzo > 0 ? "N-H of the benzimidazole" : "N-H of the imidazole",
                 ENL_TIER_MILD);
  case 3:
    return tell (facts, ring->benzo > 0 ? "N-H of the benzotriazole" : "N-H of the triazole",
                 ENL_TIER_MILD);
  default:
    return tell (facts, "N-H of the tetrazole", ENL_TIER_MILD);
  }
}

/* ---- cations ---- */

/* Amine-like N on the carbon of a C=N+: the charge is shared (amidinium, guanidinium). */
static uint32_t
amines_on (const EnlMolecule *mol, uint32_t carbon, uint32_t except)
{
  uint32_t n = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, carbon); k++) {
    uint32_t other = enl_molecule_neighbour (mol, carbon, k);
    n += other != except && element_of (mol, other) == N;
  }
  return n;
}

static bool
aromatic_cation_facts (const EnlRingFacts *ring, EnlHeteroFacts *facts)
{
  if (ring->size == 6)
    return tell_cation (facts,
                        ring->nitrogens > 1 ? "N-H of the azinium ion"
                        : ring->benzo > 0   ? "N-H of the quinolinium ion"
                                            : "N-H of the pyridinium ion",
                        ENL_TIER_ACID);
  if (ring->nitrogens == 2 && ring->hetero == 0 && !ring->adjacent_n)
    return tell_cation (
        facts, ring->benzo > 0 ? "N-H of the benzimidazolium ion" : "N-H of the imidazolium ion",
        ENL_TIER_ACID);
  return tell_cation (facts, "N-H of the azolium ion", ENL_TIER_ACID);
}

static bool
iminium_facts (const EnlMolecule *mol, uint32_t atom, uint32_t carbon, EnlHeteroFacts *facts)
{
  const uint32_t amines = amines_on (mol, carbon, atom);

  if (amines > 0)
    return tell_cation (facts,
                        amines == 1 ? "N-H of the amidinium ion" : "N-H of the guanidinium ion",
                        ENL_TIER_OTHER);
  return tell_cation (facts, "N-H of the iminium ion", ENL_TIER_ACID);
}

static bool
has_aryl (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (enl_group_of (mol, enl_molecule_neighbour (mol, atom, k)) == ENL_GROUP_ARYL)
      return true;
  return false;
}

static bool
cation_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts)
{
  EnlRingFacts ring;
  uint32_t carbon = enl_atom_partner (mol, atom, 2, C);

  if (enl_molecule_atom (mol, atom)->aromatic && aromatic_ring_of (mol, atom, &ring))
    return aromatic_cation_facts (&ring, facts);
  if (carbon != ENL_NONE)
    return iminium_facts (mol, atom, carbon, facts);
  if (enl_atom_partner (mol, atom, 3, C) != ENL_NONE)
    return tell_cation (facts, "N-H of the nitrilium ion", ENL_TIER_ACID);
  if (has_aryl (mol, atom))
    return tell_cation (facts, "N-H of the anilinium ion", ENL_TIER_ACID);
  if (enl_atom_partner (mol, atom, 1, N) != ENL_NONE)
    return tell_cation (facts, "N-H of the hydrazinium ion", ENL_TIER_ACID);
  return tell_cation (facts, "N-H of the ammonium ion", ENL_TIER_ACID);
}

/* ---- =N-H ---- */

static bool
imine_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts)
{
  const uint32_t carbon = enl_atom_partner (mol, atom, 2, C);

  if (carbon != ENL_NONE) {
    uint32_t amines = amines_on (mol, carbon, atom);
    if (enl_atom_partner (mol, carbon, 2, O) != ENL_NONE)
      return tell (facts, "N-H of the isocyanic acid", ENL_TIER_OTHER);
    if (amines > 0)
      return tell (facts, amines == 1 ? "=N-H of the amidine" : "=N-H of the guanidine",
                   ENL_TIER_ALCOHOL);
    return tell (facts, "N-H of the imine", ENL_TIER_ALCOHOL);
  }
  if (enl_group_of (mol, atom) == ENL_GROUP_AZIDE)
    return tell (facts, "N-H of hydrazoic acid", ENL_TIER_MILD);
  if (enl_atom_partner (mol, atom, 2, N) != ENL_NONE)
    return tell (facts, "N-H of the diazene", ENL_TIER_OTHER);
  if (enl_atom_partner (mol, atom, 2, S) != ENL_NONE)
    return tell (facts, "N-H of the sulfoximine or sulfilimine", ENL_TIER_OTHER);
  return tell (facts, "=N-H", ENL_TIER_OTHER);
}

/* ---- neutral N with single bonds ---- */

typedef struct {
  uint32_t carbonyls, thiocarbonyls, sulfonyls, sulfinyls, phosphoryls, nitriles, imines, iminiums;
  uint32_t aryls, vinyls, amines, imine_ns, oxygens, nitros, nitrosos, azos, silyls;
  uint32_t acyl;    /* atom of the last C=O or C=S */
  uint32_t amidine; /* atom of the last C=N */
  uint32_t vinyl;   /* atom of the last C=C */
  EnlGroup acyl_group;
  bool ring; /* N-acyl bond in a ring */
} EnlAround;

static void
count_acyl (const EnlMolecule *mol, uint32_t other, uint32_t bond, EnlGroup group,
            EnlAround *around)
{
  around->carbonyls += enl_group_is_carbonyl (group);
  around->thiocarbonyls += !enl_group_is_carbonyl (group);
  around->acyl = other;
  around->acyl_group = group;
  around->ring = enl_molecule_bond (mol, bond)->ring;
}

static void
count_group (const EnlMolecule *mol, uint32_t other, uint32_t bond, EnlAround *around)
{
  const EnlGroup group = enl_group_of (mol, other);

  if (enl_group_is_carbonyl (group) || group == ENL_GROUP_THIOCARBONYL ||
      group == ENL_GROUP_THIOAMIDE)
    count_acyl (mol, other, bond, group, around);
  around->sulfonyls += group == ENL_GROUP_SULFONE;
  around->sulfinyls += group == ENL_GROUP_SULFOXIDE || group == ENL_GROUP_SULFOXIMINE;
  around->phosphoryls += group == ENL_GROUP_PHOSPHORYL;
  around->nitriles += group == ENL_GROUP_NITRILE;
  around->aryls += group == ENL_GROUP_ARYL;
  around->amines += group == ENL_GROUP_AMINE;
  around->imine_ns += group == ENL_GROUP_IMINE_N || group == ENL_GROUP_DIAZO;
  around->oxygens += group == ENL_GROUP_OXYGEN;
  around->nitros += group == ENL_GROUP_NITRO;
  around->nitrosos += group == ENL_GROUP_NITROSO;
  around->azos += group == ENL_GROUP_AZO;
  around->silyls += group == ENL_GROUP_SILYL;
  if (group == ENL_GROUP_IMINE || group == ENL_GROUP_IMINIUM) {
    around->imines += group == ENL_GROUP_IMINE;
    around->iminiums += group == ENL_GROUP_IMINIUM;
    around->amidine = other;
  }
  if (group == ENL_GROUP_VINYL) {
    around->vinyls++;
    around->vinyl = other;
  }
}

static void
look_around (const EnlMolecule *mol, uint32_t atom, EnlAround *around)
{
  *around = (EnlAround){.acyl = ENL_NONE, .amidine = ENL_NONE, .vinyl = ENL_NONE};
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (!enl_atom_is_hydrogen (mol, enl_molecule_neighbour (mol, atom, k)))
      count_group (mol, enl_molecule_neighbour (mol, atom, k), enl_molecule_bond_at (mol, atom, k),
                   around);
}

/* One C=O on N: amide, lactam, urea, carbamate, hydrazide ... */
static bool
amide_facts (const EnlMolecule *mol, uint32_t atom, const EnlAround *around, EnlHeteroFacts *facts)
{
  if (around->oxygens > 0)
    return tell (facts, "N-H of the hydroxamic acid", ENL_TIER_MILD);
  if (around->acyl_group == ENL_GROUP_CARBONIC) {
    if (amines_on (mol, around->acyl, atom) > 0)
      return tell (facts, "N-H of the urea", ENL_TIER_AMIDE);
    return tell (facts,
                 enl_atom_partner (mol, around->acyl, 1, S) != ENL_NONE ? "N-H of the thiocarbamate"
                                                                        : "N-H of the carbamate",
                 ENL_TIER_AMIDE);
  }
  if (around->amines + around->imine_ns > 0)
    return tell (facts, around->ring ? "N-H of the cyclic hydrazide" : "N-H of the hydrazide",
                 ENL_TIER_AMIDE);
  return tell (facts, around->ring ? "N-H of the lactam" : "N-H of the amide", ENL_TIER_AMIDE);
}

static bool
thioamide_facts (const EnlMolecule *mol, uint32_t atom, const EnlAround *around,
                 EnlHeteroFacts *facts)
{
  if (amines_on (mol, around->acyl, atom) > 0)
    return tell (facts, "N-H of the thiourea", ENL_TIER_MILD);
  return tell (facts, around->ring ? "N-H of the thiolactam" : "N-H of the thioamide",
               ENL_TIER_MILD);
}

static bool
acyl_facts (const EnlMolecule *mol, uint32_t atom, const EnlAround *around, EnlHeteroFacts *facts)
{
  const uint32_t acyls = around->carbonyls + around->thiocarbonyls;

  if (acyls >= 2)
    return tell (facts, "N-H of the imide", ENL_TIER_MILD);
  if (acyls == 1 && around->sulfonyls > 0)
    return tell (facts, "N-H of the acylsulfonamide", ENL_TIER_MILD);
  if (around->sulfonyls >= 2)
    return tell (facts, "N-H of the sulfonimide", ENL_TIER_MILD);
  if (around->sulfonyls == 1)
    return tell (facts, "N-H of the sulfonamide", ENL_TIER_MILD);
  if (around->thiocarbonyls == 1)
    return thioamide_facts (mol, atom, around, facts);
  return amide_facts (mol, atom, around, facts);
}

/* C=C-N-H whose C=C ends in an acceptor. */
static bool
is_push_pull (const EnlMolecule *mol, uint32_t vinyl)
{
  const uint32_t end = enl_atom_partner (mol, vinyl, 2, C);

  for (uint32_t k = 0; end != ENL_NONE && k < enl_molecule_degree (mol, end); k++) {
    uint32_t other = enl_molecule_neighbour (mol, end, k);
    if (other != vinyl && enl_group_conjugates (enl_group_of (mol, other)))
      return true;
  }
  return false;
}

static bool
amidine_facts (const EnlMolecule *mol, uint32_t atom, const EnlAround *around,
               EnlHeteroFacts *facts)
{
  const bool guanidine = amines_on (mol, around->amidine, atom) > 1;

  if (around->iminiums > 0) /* shares the charge of C=N+ */
    return tell_cation (facts,
                        guanidine ? "N-H of the guanidinium ion" : "N-H of the amidinium ion",
                        ENL_TIER_OTHER);
  return tell (facts, guanidine ? "N-H of the guanidine" : "N-H of the amidine", ENL_TIER_ALCOHOL);
}

/* The neighbouring N of a hydrazine carries C=O. */
static bool
is_outer_hydrazide (const EnlMolecule *mol, uint32_t atom)
{
  const uint32_t inner = enl_atom_partner (mol, atom, 1, N);

  for (uint32_t k = 0; inner != ENL_NONE && k < enl_molecule_degree (mol, inner); k++)
    if (enl_group_is_carbonyl (enl_group_of (mol, enl_molecule_neighbour (mol, inner, k))))
      return true;
  return false;
}

static bool
amine_facts (const EnlMolecule *mol, uint32_t atom, const EnlAround *around, EnlHeteroFacts *facts)
{
  if (around->imine_ns > 0)
    return tell (facts, "N-H of the hydrazone", ENL_TIER_OTHER);
  if (around->azos > 0)
    return tell (facts, "N-H of the triazene", ENL_TIER_OTHER);
  if (around->aryls >= 2)
    return tell (facts, "N-H of the diarylamine", ENL_TIER_AMIDE);
  if (around->amines > 0 && around->aryls == 0)
    return tell_amine (facts, is_outer_hydrazide (mol, atom) ? "outer N-H of the hydrazide"
                                                             : "N-H of the hydrazine");
  if (around->amines > 0)
    return tell (facts, "N-H of the arylhydrazine", ENL_TIER_ALCOHOL);
  if (around->aryls == 1)
    return tell (facts, "N-H of the aniline", ENL_TIER_ALCOHOL);
  if (around->vinyls > 0)
    return tell (facts,
                 is_push_pull (mol, around->vinyl) ? "N-H of the vinylogous amide"
                                                   : "N-H of the enamine",
                 ENL_TIER_OTHER);
  if (around->oxygens > 0)
    return tell (facts, "N-H of the hydroxylamine", ENL_TIER_OTHER);
  return tell_amine (facts, around->silyls > 0 ? "N-H of the silylamine" : "N-H of the amine");
}

static bool
single_bond_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts)
{
  EnlAround around;
  EnlRingFacts ring;

  look_around (mol, atom, &around);
  if (around.carbonyls + around.thiocarbonyls + around.sulfonyls > 0)
    return acyl_facts (mol, atom, &around, facts);
  if (enl_molecule_atom (mol, atom)->aromatic && aromatic_ring_of (mol, atom, &ring)) {
    if (ring.size == 5 && ring.cation) /* drawn neutral, but it shares the ring's charge */
      return aromatic_cation_facts (&ring, facts);
    if (ring.size == 5)
      return azole_facts (&ring, facts);
    return tell (facts, ring.oxo ? "N-H of the pyridone" : "N-H of the ring", ENL_TIER_MILD);
  }
  if (around.nitros + around.nitrosos > 0)
    return tell (facts, around.nitros > 0 ? "N-H of the nitramine" : "N-H of the nitrosamine",
                 ENL_TIER_OTHER);
  if (around.sulfinyls > 0)
    return tell (facts, "N-H of the sulfinamide", ENL_TIER_OTHER);
  if (around.phosphoryls > 0)
    return tell (facts, "N-H of the phosphoramide", ENL_TIER_OTHER);
  if (around.nitriles > 0)
    return tell (facts, "N-H of the cyanamide", ENL_TIER_MILD);
  if (around.imines + around.iminiums > 0)
    return amidine_facts (mol, atom, &around, facts);
  return amine_facts (mol, atom, &around, facts);
}

bool
enl_site_nitrogen_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts)
{
  const int charge = enl_molecule_atom (mol, atom)->charge;

  if (charge < 0)
    return false;
  if (charge > 0)
    return cation_facts (mol, atom, facts);
  if (enl_atom_heavy_degree (mol, atom) == 0)
    return tell_amine (facts, "N-H of ammonia");
  if (enl_atom_partner (mol, atom, 2, 0) != ENL_NONE)
    return imine_facts (mol, atom, facts);
  return single_bond_facts (mol, atom, facts);
}
