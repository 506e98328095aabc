/* Facts of the molecule: groups that a base attacks. Only the fragment of the site counts. */
#include "core/bases/fact-view.h"

#include <string.h>

enum { C = 6, N = 7, O = 8, SI = 14 };

static bool
has_group (const EnlFactView *v, EnlGroup group)
{
  for (uint32_t i = 0; i < v->n_atoms; i++)
    if (v->inside[i] && v->group[i] == group)
      return true;
  return false;
}

/* `test` holds for some atom of this group. */
static bool
any_atom (const EnlFactView *v, EnlGroup group, bool (*test) (const EnlFactView *, uint32_t))
{
  for (uint32_t i = 0; i < v->n_atoms; i++)
    if (v->inside[i] && v->group[i] == group && test (v, i))
      return true;
  return false;
}

/* A carbon beside the C=O carries a hydrogen that the site rules count. */
static bool
is_enolisable (const EnlFactView *v, uint32_t carbonyl)
{
  for (uint32_t k = 0; k < enl_molecule_degree (v->question->mol, carbonyl); k++)
    if (enl_fact_is_acidic_carbon (v, enl_molecule_neighbour (v->question->mol, carbonyl, k)))
      return true;
  return false;
}

static bool
is_not_enolisable (const EnlFactView *v, uint32_t carbonyl)
{
  return !is_enolisable (v, carbonyl);
}

/* ---- plain groups ---- */

static void
find_aldehyde (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_group (v, ENL_GROUP_ALDEHYDE);
}

static void
find_aldehyde_no_alpha (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = any_atom (v, ENL_GROUP_ALDEHYDE, is_not_enolisable);
}

static void
find_ketone (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_group (v, ENL_GROUP_KETONE);
}

static void
find_ketone_no_alpha (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = any_atom (v, ENL_GROUP_KETONE, is_not_enolisable);
}

static void
find_acyl_halide (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_group (v, ENL_GROUP_ACYL_HALIDE);
}

static void
find_anhydride (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_group (v, ENL_GROUP_ANHYDRIDE);
}

static void
find_thioester (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_group (v, ENL_GROUP_THIOESTER);
}

static void
find_nitrile (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_group (v, ENL_GROUP_NITRILE);
}

static void
find_imide (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_group (v, ENL_GROUP_IMIDE);
}

static bool
is_in_ring (const EnlFactView *v, uint32_t carbonyl)
{
  return enl_group_traits (v->question->mol, carbonyl) & ENL_TRAIT_RING;
}

static bool
is_open (const EnlFactView *v, uint32_t carbonyl)
{
  return !is_in_ring (v, carbonyl);
}

static void
find_ester (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = any_atom (v, ENL_GROUP_ESTER, is_open);
}

static void
find_lactone (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = any_atom (v, ENL_GROUP_ESTER, is_in_ring);
}

/* An ester whose alkoxy part sits outside the ring of its C=O counts as open for exchange. */
static uint32_t
alkoxy_oxygen (const EnlMolecule *mol, uint32_t ester)
{
  return enl_atom_partner (mol, ester, 1, O);
}

/* Carbon behind the ester oxygen, or ENL_NONE. */
static uint32_t
alkoxy_carbon (const EnlMolecule *mol, uint32_t ester)
{
  uint32_t oxygen = alkoxy_oxygen (mol, ester);

  for (uint32_t k = 0; oxygen != ENL_NONE && k < enl_molecule_degree (mol, oxygen); k++)
    if (enl_molecule_neighbour (mol, oxygen, k) != ester)
      return enl_molecule_neighbour (mol, oxygen, k);
  return ENL_NONE;
}

/* ---- names of esters ---- */

static const char *
alkoxy_name (const EnlMolecule *mol, uint32_t ester)
{
  static const struct {
    const char *code, *name;
  } known[] = {
      {"6.3()", "methyl ester"},
      {"6.2(6.3())", "ethyl ester"},
      {"6.2(6.2(6.3()))", "propyl ester"},
      {"6.1(6.3()6.3())", "isopropyl ester"},
      {"6.2(6.2(6.2(6.3())))", "butyl ester"},
      {"6.0(6.3()6.3()6.3())", "tert-butyl ester"},
  };
  uint32_t carbon = alkoxy_carbon (mol, ester);

  if (enl_group_traits (mol, ester) & ENL_TRAIT_RING)
    return "lactone";
  if (carbon == ENL_NONE)
    return "ester";
  if (enl_molecule_atom (mol, carbon)->aromatic)
    return "aryl ester";
  g_autofree char *code = enl_fact_alkoxy_code (mol, alkoxy_oxygen (mol, ester), carbon);
  for (size_t i = 0; i < ENL_COUNT (known); i++)
    if (strcmp (known[i].code, code) == 0)
      return known[i].name;
  return "ester";
}

static void
find_ester_name (const EnlFactView *v, EnlFactValue *out)
{
  for (uint32_t i = 0; i < v->n_atoms; i++)
    if (v->inside[i] && v->group[i] == ENL_GROUP_ESTER) {
      g_strlcpy (out->phrase, alkoxy_name (v->question->mol, i), ENL_FACT_PHRASE_BYTES);
      return;
    }
}

/* ---- electrophiles ---- */

/* C=O that an organometallic adds to: an amide with N-H loses that hydrogen first and is then no
 * electrophile. */
static bool
is_electrophile (const EnlFactView *v, uint32_t atom)
{
  switch (v->group[atom]) {
  case ENL_GROUP_ALDEHYDE:
  case ENL_GROUP_KETONE:
  case ENL_GROUP_ESTER:
  case ENL_GROUP_THIOESTER:
  case ENL_GROUP_ANHYDRIDE:
  case ENL_GROUP_ACYL_HALIDE:
  case ENL_GROUP_ACYL_SILANE:
  case ENL_GROUP_KETENE:
    return true;
  case ENL_GROUP_AMIDE:
  case ENL_GROUP_IMIDE:
    return !(enl_group_traits (v->question->mol, atom) & ENL_TRAIT_HYDROGEN);
  default:
    return false;
  }
}

static void
find_electrophile (const EnlFactView *v, EnlFactValue *out)
{
  for (uint32_t i = 0; i < v->n_atoms; i++)
    out->flag |= v->inside[i] && is_electrophile (v, i);
}

static bool
activates_alkene (EnlGroup group)
{
  return (enl_group_is_carbonyl (group) && group != ENL_GROUP_CARBONIC &&
          group != ENL_GROUP_CARBOXYLATE && group != ENL_GROUP_ACID && group != ENL_GROUP_KETENE) ||
         group == ENL_GROUP_NITRILE || group == ENL_GROUP_NITRO || group == ENL_GROUP_SULFONE;
}

/* C=C with an acceptor at one end and no donor (O, N) at the other. */
static bool
is_michael_alkene (const EnlFactView *v, uint32_t alpha)
{
  const EnlMolecule *mol = v->question->mol;
  uint32_t beta = enl_atom_partner (mol, alpha, 2, C);
  bool activated = false;

  if (beta == ENL_NONE || v->group[beta] != ENL_GROUP_VINYL)
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, alpha); k++)
    activated |= activates_alkene (v->group[enl_molecule_neighbour (mol, alpha, k)]);
  for (uint32_t k = 0; k < enl_molecule_degree (mol, beta); k++) {
    EnlGroup group = v->group[enl_molecule_neighbour (mol, beta, k)];
    activated &= group != ENL_GROUP_OXYGEN && group != ENL_GROUP_AMINE;
  }
  return activated;
}

static void
find_michael (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = any_atom (v, ENL_GROUP_VINYL, is_michael_alkene);
}

/* ---- two carbonyls ---- */

/* Carbon between two C=O, with or without hydrogen. */
static bool
is_between_carbonyls (const EnlFactView *v, uint32_t atom)
{
  const EnlMolecule *mol = v->question->mol;
  uint32_t carbonyls = 0, strong = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    EnlGroup group = v->group[enl_molecule_neighbour (mol, atom, k)];
    carbonyls += group == ENL_GROUP_KETONE || group == ENL_GROUP_ALDEHYDE ||
                 group == ENL_GROUP_ESTER || group == ENL_GROUP_THIOESTER;
    strong += group == ENL_GROUP_KETONE || group == ENL_GROUP_ALDEHYDE;
  }
  return carbonyls >= 2 && strong >= 1;
}

/* No hydrogen left, so no anion protects it; malonates keep out (two esters cleave slowly). */
static bool
is_quaternary_between (const EnlFactView *v, uint32_t atom)
{
  return is_between_carbonyls (v, atom) &&
         enl_molecule_total_hydrogens (v->question->mol, atom) == 0;
}

static void
find_dicarbonyl (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = any_atom (v, ENL_GROUP_ALKYL, is_between_carbonyls);
}

static void
find_dicarbonyl_quaternary (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = any_atom (v, ENL_GROUP_ALKYL, is_quaternary_between);
}

static bool
is_closed_diketone (const EnlFactView *v, uint32_t atom)
{
  const EnlMolecule *mol = v->question->mol;

  for (uint32_t k = 0; is_not_enolisable (v, atom) && k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (v->group[other] == ENL_GROUP_KETONE && is_not_enolisable (v, other))
      return true;
  }
  return false;
}

static void
find_closed_diketone (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = any_atom (v, ENL_GROUP_KETONE, is_closed_diketone);
}

/* ---- silyl groups ---- */

static bool
is_on_oxygen (const EnlFactView *v, uint32_t silicon)
{
  return enl_fact_element (v, silicon) == SI &&
         enl_atom_partner (v->question->mol, silicon, 1, O) != ENL_NONE;
}

static void
find_silyl_ether (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = any_atom (v, ENL_GROUP_SILYL, is_on_oxygen);
}

#define FLAG(name, find, meaning)                                                                  \
  {                                                                                                \
    name, ENL_FACT_FLAG, ENL_FACT_OF_QUESTION, find, meaning                                       \
  }

const EnlFact enl_fact_of_molecule[] = {
    FLAG ("molecule.aldehyde", find_aldehyde, "an aldehyde"),
    FLAG ("molecule.aldehyde_no_alpha", find_aldehyde_no_alpha, "an aldehyde that cannot enolise"),
    FLAG ("molecule.ketone", find_ketone, "a ketone"),
    FLAG ("molecule.ketone_no_alpha", find_ketone_no_alpha, "a ketone that cannot enolise"),
    FLAG ("molecule.closed_diketone", find_closed_diketone, "a 1,2-diketone that cannot enolise"),
    FLAG ("molecule.acyl_halide", find_acyl_halide, "an acyl halide"),
    FLAG ("molecule.anhydride", find_anhydride, "an anhydride"),
    FLAG ("molecule.ester", find_ester, "an open-chain ester"),
    FLAG ("molecule.lactone", find_lactone, "a lactone"),
    FLAG ("molecule.thioester", find_thioester, "a thioester"),
    FLAG ("molecule.imide", find_imide, "an imide or N-acyl oxazolidinone"),
    FLAG ("molecule.nitrile", find_nitrile, "a nitrile"),
    FLAG ("molecule.electrophile", find_electrophile,
          "a C=O that organometallics add to: all but acids and amides with N-H"),
    FLAG ("molecule.michael_acceptor", find_michael, "C=C with an acceptor and no donor on it"),
    FLAG ("molecule.dicarbonyl", find_dicarbonyl, "a ketone or aldehyde C=O in 1,3 to another C=O"),
    FLAG ("molecule.dicarbonyl_quaternary", find_dicarbonyl_quaternary,
          "the same without hydrogen between them"),
    FLAG ("molecule.silyl_ether", find_silyl_ether, "silicon on oxygen"),
    {"ester.name", ENL_FACT_PHRASE, ENL_FACT_OF_QUESTION, find_ester_name,
     "'methyl ester', 'lactone' ... of the first ester"},
    {NULL, ENL_FACT_FLAG, ENL_FACT_OF_QUESTION, NULL, NULL},
};
