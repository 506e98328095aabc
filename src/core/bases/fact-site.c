/* Facts of the site in question and its surroundings. */
#include "core/bases/fact-view.h"

#include <math.h>

enum { C = 6, N = 7, O = 8, S = 16, P = 15 };

static const EnlSite *
target (const EnlFactView *v)
{
  return &v->question->sites->site[v->question->target];
}

static const EnlMolecule *
molecule (const EnlFactView *v)
{
  return v->question->mol;
}

static bool
is_carbon_site (const EnlFactView *v)
{
  return target (v)->kind == ENL_SITE_CARBON;
}

/* First neighbour of the acidic carbon with this group, or ENL_NONE. */
static uint32_t
beside (const EnlFactView *v, EnlGroup group)
{
  for (uint32_t k = 0; is_carbon_site (v) && k < enl_molecule_degree (molecule (v), v->atom); k++) {
    uint32_t next = enl_molecule_neighbour (molecule (v), v->atom, k);
    if (v->group[next] == group)
      return next;
  }
  return ENL_NONE;
}

static void
find_carbon (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = is_carbon_site (v);
}

static void
find_pka (const EnlFactView *v, EnlFactValue *out)
{
  out->number = v->question->estimate[v->question->target].value;
}

static void
find_hydrogens (const EnlFactView *v, EnlFactValue *out)
{
  out->number = enl_molecule_total_hydrogens (molecule (v), v->atom);
}

static void
find_alpha_carbonyl (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = target (v)->alpha_carbonyl;
}

static void
find_alpha_aldehyde (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = beside (v, ENL_GROUP_ALDEHYDE) != ENL_NONE;
}

static void
find_alpha_ketone (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = beside (v, ENL_GROUP_KETONE) != ENL_NONE;
}

static void
find_alpha_ester (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = beside (v, ENL_GROUP_ESTER) != ENL_NONE;
}

/* The salt counts as the acid: its C-H is the same. */
static void
find_alpha_acid (const EnlFactView *v, EnlFactValue *out)
{
  out->flag =
      beside (v, ENL_GROUP_ACID) != ENL_NONE || beside (v, ENL_GROUP_CARBOXYLATE) != ENL_NONE;
}

static void
find_alpha_thioester (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = beside (v, ENL_GROUP_THIOESTER) != ENL_NONE;
}

static void
find_alpha_aryl_ester (const EnlFactView *v, EnlFactValue *out)
{
  uint32_t ester = beside (v, ENL_GROUP_ESTER);

  if (ester == ENL_NONE)
    return;
  uint32_t oxygen = enl_atom_partner (molecule (v), ester, 1, O);
  for (uint32_t k = 0; oxygen != ENL_NONE && k < enl_molecule_degree (molecule (v), oxygen); k++)
    out->flag |= enl_molecule_atom (molecule (v), enl_molecule_neighbour (molecule (v), oxygen, k))
                     ->aromatic;
}

static void
find_alpha_imide (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = beside (v, ENL_GROUP_IMIDE) != ENL_NONE;
}

static void
find_alpha_amide (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = beside (v, ENL_GROUP_AMIDE) != ENL_NONE;
}

/* Ester O bound to a carbon with three carbons on it. */
static void
find_alpha_tert_butyl (const EnlFactView *v, EnlFactValue *out)
{
  const EnlMolecule *mol = molecule (v);
  uint32_t ester = beside (v, ENL_GROUP_ESTER);
  uint32_t oxygen = ester == ENL_NONE ? ENL_NONE : enl_atom_partner (mol, ester, 1, O);

  for (uint32_t k = 0; oxygen != ENL_NONE && k < enl_molecule_degree (mol, oxygen); k++) {
    uint32_t next = enl_molecule_neighbour (mol, oxygen, k);
    out->flag |= next != ester && enl_atom_is_saturated (mol, next) &&
                 enl_atom_heavy_degree (mol, next) == 4;
  }
}

static void
find_between (const EnlFactView *v, EnlFactValue *out)
{
  uint32_t acceptors = 0;

  for (uint32_t k = 0; is_carbon_site (v) && k < enl_molecule_degree (molecule (v), v->atom); k++) {
    EnlGroup group = v->group[enl_molecule_neighbour (molecule (v), v->atom, k)];
    acceptors += enl_group_is_acceptor (group) && group != ENL_GROUP_CARBOXYLATE;
  }
  out->flag = acceptors >= 2;
}

/* The acidic carbon, C=O, a carbon with hydrogen, C=O: the outer side of a 1,3-dicarbonyl. */
static bool
is_outer_of (const EnlFactView *v, uint32_t carbonyl)
{
  const EnlMolecule *mol = molecule (v);

  for (uint32_t k = 0; k < enl_molecule_degree (mol, carbonyl); k++) {
    uint32_t middle = enl_molecule_neighbour (mol, carbonyl, k);
    if (middle == v->atom || !enl_fact_is_acidic_carbon (v, middle))
      continue;
    for (uint32_t j = 0; j < enl_molecule_degree (mol, middle); j++) {
      uint32_t far = enl_molecule_neighbour (mol, middle, j);
      if (far != carbonyl && enl_group_is_carbonyl (v->group[far]))
        return true;
    }
  }
  return false;
}

static void
find_gamma_dicarbonyl (const EnlFactView *v, EnlFactValue *out)
{
  EnlFactValue between = {0};

  find_between (v, &between);
  for (uint32_t k = 0; is_carbon_site (v) && k < enl_molecule_degree (molecule (v), v->atom); k++) {
    uint32_t next = enl_molecule_neighbour (molecule (v), v->atom, k);
    if (enl_group_is_carbonyl (v->group[next]) && !between.flag)
      out->flag |= is_outer_of (v, next);
  }
}

/* ---- enones ---- */

/* C=O with a C=C on it, seen from the side that has none. */
static void
find_enone_outer (const EnlFactView *v, EnlFactValue *out)
{
  uint32_t ketone = beside (v, ENL_GROUP_KETONE);

  out->flag = ketone != ENL_NONE && (enl_group_traits (molecule (v), ketone) & ENL_TRAIT_VINYL);
}

/* On a C=C whose other end carries C=O. */
static bool
is_gamma_through (const EnlFactView *v, uint32_t beta)
{
  const EnlMolecule *mol = molecule (v);
  uint32_t alpha =
      v->group[beta] == ENL_GROUP_VINYL ? enl_atom_partner (mol, beta, 2, C) : ENL_NONE;

  for (uint32_t k = 0; alpha != ENL_NONE && k < enl_molecule_degree (mol, alpha); k++) {
    uint32_t next = enl_molecule_neighbour (mol, alpha, k);
    if (next != beta && enl_group_is_carbonyl (v->group[next]))
      return true;
  }
  return false;
}

static void
find_enone_gamma (const EnlFactView *v, EnlFactValue *out)
{
  for (uint32_t k = 0; is_carbon_site (v) && k < enl_molecule_degree (molecule (v), v->atom); k++)
    out->flag |= is_gamma_through (v, enl_molecule_neighbour (molecule (v), v->atom, k));
}

/* ---- crowding and substitution ---- */

/* Heavy atoms on one arm of a C=O: 3 for tert-butyl; an aryl with both ortho positions taken blocks
 * both faces and counts 5. */
static uint32_t
crowding_of_arm (const EnlMolecule *mol, uint32_t arm, uint32_t carbonyl)
{
  uint32_t ortho = 0;

  if (!enl_molecule_atom (mol, arm)->aromatic)
    return enl_atom_heavy_degree (mol, arm) - 1;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, arm); k++) {
    uint32_t next = enl_molecule_neighbour (mol, arm, k);
    ortho += next != carbonyl && enl_atom_heavy_degree (mol, next) > 2;
  }
  return ortho == 2 ? 5 : 1;
}

static void
find_crowding (const EnlFactView *v, EnlFactValue *out)
{
  const EnlMolecule *mol = molecule (v);
  uint32_t ketone = beside (v, ENL_GROUP_KETONE);

  out->number = NAN;
  if (ketone == ENL_NONE)
    return;
  out->number = 0.0;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, ketone); k++) {
    uint32_t arm = enl_molecule_neighbour (mol, ketone, k);
    if (enl_fact_element (v, arm) == C)
      out->number += crowding_of_arm (mol, arm, ketone);
  }
}

/* Hydrogens of the enolisable carbon on the other side of the ketone; 0 when there is none. */
static uint32_t
hydrogens_opposite (const EnlFactView *v)
{
  const EnlMolecule *mol = molecule (v);
  uint32_t ketone = beside (v, ENL_GROUP_KETONE);

  for (uint32_t k = 0; ketone != ENL_NONE && k < enl_molecule_degree (mol, ketone); k++) {
    uint32_t other = enl_molecule_neighbour (mol, ketone, k);
    if (other != v->atom && enl_fact_is_acidic_carbon (v, other) &&
        enl_atom_is_saturated (mol, other))
      return enl_molecule_total_hydrogens (mol, other);
  }
  return 0;
}

static void
find_more_substituted (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = hydrogens_opposite (v) > enl_molecule_total_hydrogens (molecule (v), v->atom);
}

static void
find_less_substituted (const EnlFactView *v, EnlFactValue *out)
{
  uint32_t opposite = hydrogens_opposite (v);

  out->flag = opposite > 0 && opposite < enl_molecule_total_hydrogens (molecule (v), v->atom);
}

static void
find_benzylic (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = beside (v, ENL_GROUP_ARYL) != ENL_NONE;
}

/* One R beside the C=O and two H: the enolate can be E or Z. */
static void
find_geometry (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = target (v)->alpha_carbonyl && !enl_molecule_in_ring (molecule (v), v->atom) &&
              enl_molecule_total_hydrogens (molecule (v), v->atom) == 2 &&
              enl_atom_heavy_degree (molecule (v), v->atom) == 2;
}

/* ---- leaving groups on the next carbon ---- */

static bool
is_acyl_or_sulfonyl (EnlGroup group)
{
  return enl_group_is_carbonyl (group) || group == ENL_GROUP_SULFONE ||
         group == ENL_GROUP_PHOSPHORYL;
}

static bool
leaves_fast (const EnlFactView *v, uint32_t atom, uint32_t from)
{
  const EnlMolecule *mol = molecule (v);

  if (v->group[atom] == ENL_GROUP_HALOGEN || v->group[atom] == ENL_GROUP_SULFONE ||
      v->group[atom] == ENL_GROUP_NITRO || v->group[atom] == ENL_GROUP_SULFONIUM ||
      (v->group[atom] == ENL_GROUP_AMMONIUM && enl_molecule_total_hydrogens (mol, atom) == 0))
    return true;
  for (uint32_t k = 0; enl_fact_element (v, atom) == O && k < enl_molecule_degree (mol, atom);
       k++) {
    uint32_t behind = enl_molecule_neighbour (mol, atom, k);
    if (behind != from && is_acyl_or_sulfonyl (v->group[behind]))
      return true;
  }
  return false;
}

static bool
leaves_slowly (const EnlFactView *v, uint32_t atom)
{
  return v->group[atom] == ENL_GROUP_OXYGEN || v->group[atom] == ENL_GROUP_AMINE ||
         v->group[atom] == ENL_GROUP_AMMONIUM || v->group[atom] == ENL_GROUP_SULFIDE ||
         v->group[atom] == ENL_GROUP_FLUORINE;
}

/* `fast`: halide, sulfonate, carboxylate ...; else ether, alcohol, amine ... */
static bool
has_beta_leaving_group (const EnlFactView *v, bool fast)
{
  const EnlMolecule *mol = molecule (v);

  for (uint32_t k = 0; is_carbon_site (v) && k < enl_molecule_degree (mol, v->atom); k++) {
    uint32_t beta = enl_molecule_neighbour (mol, v->atom, k);
    if (enl_fact_element (v, beta) != C || !enl_atom_is_saturated (mol, beta) ||
        enl_group_is_cf3 (mol, beta))
      continue;
    for (uint32_t j = 0; j < enl_molecule_degree (mol, beta); j++) {
      uint32_t x = enl_molecule_neighbour (mol, beta, j);
      bool quick = leaves_fast (v, x, beta);
      if (x != v->atom && (fast ? quick : !quick && leaves_slowly (v, x)))
        return true;
    }
  }
  return false;
}

static void
find_beta_leaving (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_beta_leaving_group (v, true);
}

static void
find_beta_slow (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = has_beta_leaving_group (v, false);
}

/* ---- stereo ---- */

static void
find_centre (const EnlFactView *v, EnlFactValue *out)
{
  if (is_carbon_site (v))
    enl_fact_centre_phrase (v, v->atom, out->phrase);
}

/* Another acidic carbon that is a drawn centre: the most acidic one, or ENL_NONE. */
static uint32_t
other_centre (const EnlFactView *v, double *pka)
{
  const EnlQuestion *q = v->question;
  uint32_t found = ENL_NONE;

  *pka = NAN;
  for (uint32_t i = 0; i < q->sites->n_sites; i++) {
    const EnlSite *site = &q->sites->site[i];
    uint32_t atom = site->atom[0];
    if (i == q->target || site->kind != ENL_SITE_CARBON || !v->inside[atom] ||
        enl_molecule_atom (q->mol, atom)->winding == ENL_WINDING_NONE)
      continue;
    if (found == ENL_NONE || q->estimate[i].value < *pka) {
      found = atom;
      *pka = q->estimate[i].value;
    }
  }
  return found;
}

static void
find_other_centre (const EnlFactView *v, EnlFactValue *out)
{
  double pka;
  uint32_t atom = other_centre (v, &pka);

  if (atom != ENL_NONE)
    enl_fact_centre_phrase (v, atom, out->phrase);
}

static void
find_other_gap (const EnlFactView *v, EnlFactValue *out)
{
  double pka;

  other_centre (v, &pka);
  out->number = v->candidate->pkah - pka;
}

#define FLAG(name, find, meaning)                                                                  \
  {                                                                                                \
    name, ENL_FACT_FLAG, ENL_FACT_OF_QUESTION, find, meaning                                       \
  }
#define NUMBER(name, find, meaning)                                                                \
  {                                                                                                \
    name, ENL_FACT_NUMBER, ENL_FACT_OF_QUESTION, find, meaning                                     \
  }
#define PHRASE(name, find, meaning)                                                                \
  {                                                                                                \
    name, ENL_FACT_PHRASE, ENL_FACT_OF_QUESTION, find, meaning                                     \
  }

const EnlFact enl_fact_of_site[] = {
    FLAG ("site.carbon", find_carbon, "a C-H"),
    NUMBER ("site.pka", find_pka, "pKa in the solvent"),
    NUMBER ("site.hydrogens", find_hydrogens, "hydrogens on the acidic atom"),
    FLAG ("site.alpha_carbonyl", find_alpha_carbonyl, "C-H directly on any C=O"),
    FLAG ("site.alpha_aldehyde", find_alpha_aldehyde, "C-H on an aldehyde C=O"),
    FLAG ("site.alpha_ketone", find_alpha_ketone, "C-H on a ketone C=O"),
    FLAG ("site.alpha_ester", find_alpha_ester, "C-H on an ester or lactone C=O"),
    FLAG ("site.alpha_aryl_ester", find_alpha_aryl_ester, "... whose alkoxy part is an aryloxy"),
    FLAG ("site.alpha_tert_alkyl_ester", find_alpha_tert_butyl, "... tertiary alkoxy (t-Bu)"),
    FLAG ("site.alpha_acid", find_alpha_acid, "C-H on the C=O of a carboxylic acid or its salt"),
    FLAG ("site.alpha_thioester", find_alpha_thioester, "C-H on a thioester C=O"),
    FLAG ("site.alpha_imide", find_alpha_imide, "C-H on the C=O of an imide, N-acyl oxazolidinone"),
    FLAG ("site.alpha_amide", find_alpha_amide, "C-H on an amide C=O"),
    FLAG ("site.between", find_between, "C-H between two acceptors"),
    FLAG ("site.gamma_dicarbonyl", find_gamma_dicarbonyl, "outer C-H of a 1,3-dicarbonyl"),
    FLAG ("site.enone_outer", find_enone_outer, "C-H on the saturated side of an enone"),
    FLAG ("site.enone_gamma", find_enone_gamma, "C-H at the end of a C=C that carries C=O"),
    FLAG ("site.benzylic", find_benzylic, "C-H on an aromatic ring"),
    FLAG ("site.two_geometries", find_geometry, "open-chain C(=O)CH2R: E or Z enolate"),
    NUMBER (
        "site.crowding", find_crowding,
        "heavy atoms on both arms of the ketone; 5 for an aryl with both ortho positions taken"),
    FLAG ("site.more_substituted", find_more_substituted, "fewer H than across the ketone"),
    FLAG ("site.less_substituted", find_less_substituted, "more H than across the ketone"),
    FLAG ("site.beta_leaving_group", find_beta_leaving,
          "halide, sulfonate, carboxylate, onium, sulfonyl or nitro on the next carbon"),
    FLAG ("site.beta_slow_leaving_group", find_beta_slow,
          "ether, alcohol, amine, sulfide or fluoride on the next carbon"),
    PHRASE ("site.centre", find_centre, "the acidic carbon as a drawn stereocentre"),
    PHRASE ("other.centre", find_other_centre, "another acidic carbon that is a drawn centre"),
    {"other.gap", ENL_FACT_NUMBER, ENL_FACT_OF_BASE, find_other_gap,
     "pKaH less the pKa of that other centre"},
    {NULL, ENL_FACT_FLAG, ENL_FACT_OF_QUESTION, NULL, NULL},
};
