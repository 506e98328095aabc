/* Facts of a base, and of a base together with the molecule and the conditions. */
#include "core/bases/fact-view.h"

#include <math.h>
#include <string.h>

#include "core/notation/smiles.h"

enum { C = 6, O = 8 };

/* ---- words and marks of the table ---- */

static void
find_id (const EnlFactView *v, EnlFactValue *out)
{
  out->word = v->base->id;
}

static void
find_family (const EnlFactView *v, EnlFactValue *out)
{
  out->word = v->base->family;
}

static void
find_cation (const EnlFactView *v, EnlFactValue *out)
{
  out->word = v->base->cation;
}

static void
find_steric (const EnlFactView *v, EnlFactValue *out)
{
  out->word = v->base->steric;
}

static void
find_irreversible (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = v->base->irreversible;
}

static void
find_soft (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = v->base->soft;
}

static void
find_number_holds (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = !v->base->number_unreliable;
}

static void
find_on_scale (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = !isnan (v->base->pkah[v->question->conditions->solvent]);
}

static void
find_adds (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = v->base->adds_to_carbonyl;
}

static void
find_beta_hydride (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = v->base->beta_hydride;
}

/* The word before the colon: "low to moderate: slow on esters". */
static void
find_nucleophilicity (const EnlFactView *v, EnlFactValue *out)
{
  static const char *const degree[] = {"none", "low", "moderate", "high"};
  const char *text = v->base->nucleophilicity;
  size_t size = strcspn (text, ":;(");
  double sum = 0.0;
  int n = 0;

  for (int i = 0; i < (int)ENL_COUNT (degree); i++)
    if (g_strstr_len (text, (gssize)size, degree[i])) {
      sum += i;
      n++;
    }
  out->number = n ? sum / n : NAN;
}

static void
find_usual_solvent (const EnlFactView *v, EnlFactValue *out)
{
  EnlSolvent solvent = v->question->conditions->solvent;

  out->flag = v->candidate->own_alcohol || !v->base->typical_solvents[0] ||
              strstr (v->base->typical_solvents, enl_solvent_label (solvent)) != NULL;
}

/* "-78 to 0": the two ends; NAN where the cell says something else. */
static void
read_range (const char *text, double *low, double *high)
{
  char *end;

  *low = g_ascii_strtod (text, &end);
  *high = end != text && g_str_has_prefix (end, " to ") ? g_ascii_strtod (end + 4, NULL) : NAN;
  if (isnan (*high))
    *low = NAN;
}

static void
find_coldest (const EnlFactView *v, EnlFactValue *out)
{
  double high;

  read_range (v->base->typical_temperature, &out->number, &high);
}

static void
find_warmest (const EnlFactView *v, EnlFactValue *out)
{
  double low;

  read_range (v->base->typical_temperature, &low, &out->number);
}

static void
find_below_range (const EnlFactView *v, EnlFactValue *out)
{
  double low, high;

  read_range (v->base->typical_temperature, &low, &high);
  out->flag = v->question->conditions->temperature < low;
}

static void
find_above_range (const EnlFactView *v, EnlFactValue *out)
{
  double low, high;

  read_range (v->base->typical_temperature, &low, &high);
  out->flag = v->question->conditions->temperature > high;
}

/* ---- strength ---- */

static void
find_gap (const EnlFactView *v, EnlFactValue *out)
{
  out->number = v->candidate->gap;
}

static void
find_conversion (const EnlFactView *v, EnlFactValue *out)
{
  out->number = v->candidate->conversion;
}

static void
find_own_alcohol (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = v->candidate->own_alcohol;
}

/* A part of 10^6 at least, or no number that says otherwise: a fast reaction of the anion can then
 * run through it. Without a number on this footing, one that is clearly strong enough. */
#define REACH        1e-6
#define CLEAR_MARGIN 5.0

static void
find_reaches (const EnlFactView *v, EnlFactValue *out)
{
  if (!isnan (v->candidate->conversion))
    out->flag = v->candidate->conversion >= REACH;
  else if (v->base->number_unreliable)
    out->flag = true;
  else
    out->flag =
        v->base->pkah_nominal > v->question->estimate[v->question->target].value + CLEAR_MARGIN;
}

/* ---- alkoxide against ester ---- */

static char *
code_of_alcohol (const char *smiles)
{
  g_autoptr (EnlMolecule) mol = NULL;

  if (enl_smiles_parse (smiles, strlen (smiles), &mol, NULL) != ENL_OK)
    return NULL;
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    if (enl_molecule_atom (mol, i)->element == O && enl_molecule_degree (mol, i) == 1)
      return enl_fact_alkoxy_code (mol, i, enl_molecule_neighbour (mol, i, 0));
  return NULL;
}

static bool
matches (const EnlFactView *v, uint32_t ester, const char *code)
{
  const EnlMolecule *mol = v->question->mol;
  uint32_t oxygen = enl_atom_partner (mol, ester, 1, O);

  for (uint32_t k = 0; oxygen != ENL_NONE && k < enl_molecule_degree (mol, oxygen); k++) {
    uint32_t carbon = enl_molecule_neighbour (mol, oxygen, k);
    if (carbon == ester)
      continue;
    g_autofree char *own = enl_fact_alkoxy_code (mol, oxygen, carbon);
    return strcmp (own, code) == 0;
  }
  return false;
}

static void
find_alkoxide_differs (const EnlFactView *v, EnlFactValue *out)
{
  if (strcmp (v->base->family, "alkoxide") != 0)
    return;
  g_autofree char *code = code_of_alcohol (v->base->conjugate_acid);
  for (uint32_t i = 0; i < v->n_atoms; i++)
    if (v->inside[i] && v->group[i] == ENL_GROUP_ESTER &&
        !(enl_group_traits (v->question->mol, i) & ENL_TRAIT_RING))
      out->flag |= !code || !matches (v, i, code);
}

#define FLAG(name, find, meaning)                                                                  \
  {                                                                                                \
    name, ENL_FACT_FLAG, ENL_FACT_OF_BASE, find, meaning                                           \
  }
#define NUMBER(name, find, meaning)                                                                \
  {                                                                                                \
    name, ENL_FACT_NUMBER, ENL_FACT_OF_BASE, find, meaning                                         \
  }
#define WORD(name, find, meaning)                                                                  \
  {                                                                                                \
    name, ENL_FACT_WORD, ENL_FACT_OF_BASE, find, meaning                                           \
  }

const EnlFact enl_fact_of_base[] = {
    WORD ("base.id", find_id, "id of the base table"),
    WORD ("base.family", find_family, "class of the base table"),
    WORD ("base.cation", find_cation, "Li, Na, K, Cs, MgX ... or none"),
    WORD ("base.steric", find_steric, "small, medium or large"),
    NUMBER ("base.nucleophilicity", find_nucleophilicity, "0 none, 1 low, 2 moderate, 3 high"),
    FLAG ("base.irreversible", find_irreversible, "the proton cannot come back"),
    FLAG ("base.soft", find_soft, "a soft-enolisation set of metal or silyl group and amine"),
    FLAG ("base.number_holds", find_number_holds, "its pKaH describes what happens"),
    FLAG ("base.on_scale", find_on_scale, "has a pKaH on the footing in use"),
    FLAG ("base.adds_to_carbonyl", find_adds, "organolithium or Grignard reagent"),
    FLAG ("base.beta_hydride", find_beta_hydride, "can hand a beta-hydride to C=O"),
    FLAG ("base.usual_solvent", find_usual_solvent, "the solvent is one of its usual ones"),
    NUMBER ("base.coldest", find_coldest, "lower end of its usual temperatures, °C"),
    NUMBER ("base.warmest", find_warmest, "upper end of its usual temperatures, °C"),
    FLAG ("base.below_range", find_below_range, "colder than it is usually used"),
    FLAG ("base.above_range", find_above_range, "warmer than it is usually used"),
    FLAG ("base.alkoxide_differs", find_alkoxide_differs,
          "alkoxide, and an open-chain ester with another alkoxy group"),
    FLAG ("base.own_alcohol", find_own_alcohol, "alkoxide in its own alcohol, water-like footing"),
    FLAG ("base.reaches", find_reaches, "forms the anion at least in part of a million"),
    NUMBER ("gap", find_gap, "pKaH less pKa of the site; unknown off the scale"),
    NUMBER ("conversion", find_conversion, "fraction of the substrate that is this anion"),
    {NULL, ENL_FACT_FLAG, ENL_FACT_OF_BASE, NULL, NULL},
};
