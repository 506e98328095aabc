#include "core/bases/compare.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "core/bases/equilibrium.h"

/* Two-sided 90 % of a normal distribution, in standard deviations. */
#define Z90 1.645
/* Lower ends of the verdicts, as fractions of the substrate. */
#define COMPLETE_FROM 0.99 /* a gap of about 4: enough to keep clear of self-condensation (R03) */
#define LARGELY_FROM  0.90
#define PARTIAL_FROM  0.10
#define TRACE_FROM    0.001
/* An irreversible base without a footing must be stronger than the site by this many units of its
 * textbook figure before it is called strong enough: more than the doubt of that figure. */
#define NOMINAL_MARGIN 5.0

/* An irreversible base stands this far above every site: then it is used up to 1e-10. */
#define OUT_OF_REACH 25.0

typedef struct {
  const EnlBaseTable *bases;
  const EnlCautionTable *cautions;
  const EnlSites *sites;
  const EnlEstimate *estimate;
  const EnlConditions *conditions;
  uint32_t target;
  EnlSpecies *species; /* ionised forms, see list_species */
  bool *holds_target;  /* the form has lost the target's hydrogen */
  uint32_t n_species;
  uint32_t n_before;    /* hydrogens that go before the target's */
  uint32_t most_acidic; /* site index */
  double ceiling;       /* pKaH of the solvent's own anion; NAN when it has no row */
} Comparing;

EnlConditions
enl_conditions_default (void)
{
  return (EnlConditions){ENL_SOLVENT_DMSO, 1.05, 0.1, 25.0};
}

EnlStatus
enl_conditions_check (const EnlConditions *c, EnlError *err)
{
  if (!(c->equivalents > 0.0 && c->equivalents <= 100.0))
    return enl_error_set (err, ENL_ERROR_RANGE, "give more than 0 and at most 100 equivalents",
                          "%g equivalents of base", c->equivalents);
  if (!(c->concentration > 0.0 && c->concentration <= 20.0))
    return enl_error_set (err, ENL_ERROR_RANGE, "give more than 0 and at most 20 mol/L",
                          "concentration %g mol/L", c->concentration);
  if (!(c->temperature >= -120.0 && c->temperature <= 200.0))
    return enl_error_set (err, ENL_ERROR_RANGE, "give a temperature from -120 to 200 °C",
                          "temperature %g °C", c->temperature);
  return ENL_OK;
}

const char *
enl_verdict_text (EnlVerdict verdict)
{
  static const char *const text[ENL_N_VERDICTS] = {
      [ENL_VERDICT_COMPLETE] = "complete",
      [ENL_VERDICT_SHARED] = "shared with other sites",
      [ENL_VERDICT_LARGELY] = "largely",
      [ENL_VERDICT_PARTIAL] = "partial",
      [ENL_VERDICT_TRACE] = "trace only",
      [ENL_VERDICT_NO] = "no",
      [ENL_VERDICT_REACTS] = "reacts otherwise",
      [ENL_VERDICT_NO_NUMBER] = "no usable number",
      [ENL_VERDICT_OFF_SCALE] = "not on this scale",
      [ENL_VERDICT_SOLVENT] = "attacks the solvent",
  };

  g_assert (verdict < ENL_N_VERDICTS);
  return text[verdict];
}

/* ---- ionised forms of the substrate ---- */

static bool
precedes (const Comparing *c, uint32_t site, uint32_t later)
{
  return site != later && c->sites->site[later].second && !c->sites->site[site].second &&
         c->sites->site[site].acidic_heteroatom &&
         c->estimate[site].value < c->estimate[later].value;
}

/* The form that has lost the hydrogen of `site` and every hydrogen that goes before it. */
static EnlSpecies
form_of_site (const Comparing *c, uint32_t site)
{
  EnlSpecies form = {c->estimate[site].value, 1};

  for (uint32_t other = 0; other < c->sites->n_sites; other++)
    if (precedes (c, other, site)) {
      form.pk_sum += c->estimate[other].value;
      form.lost++;
    }
  return form;
}

static void
list_species (Comparing *c)
{
  uint32_t n = MIN (c->sites->n_sites, ENL_MAX_SPECIES);

  c->species = g_new0 (EnlSpecies, n);
  c->holds_target = g_new0 (bool, n);
  c->n_species = n;
  for (uint32_t i = 0; i < n; i++)
    if (c->estimate[i].value < c->estimate[c->most_acidic].value)
      c->most_acidic = i;
  for (uint32_t i = 0; i < n; i++) {
    c->species[i] = form_of_site (c, i);
    c->holds_target[i] = i == c->target || precedes (c, c->target, i);
  }
  c->n_before = c->species[c->target].lost - 1;
}

/* ---- the solvent's own anion ---- */

/* A base stronger than the solvent's anion hands its proton hunger on to the solvent. The anions
 * are rows of the base table. THF has no such anion: bases that attack it are marked instead. */
static double
solvent_ceiling (const EnlBaseTable *bases, EnlSolvent solvent)
{
  static const char *const own_anion[ENL_N_SOLVENTS] = {
      [ENL_SOLVENT_DMSO] = "dimsyl_na",
      [ENL_SOLVENT_WATER] = "naoh",
  };

  if (!own_anion[solvent])
    return NAN;
  int index = enl_base_table_find (bases, own_anion[solvent]);
  return index < 0 ? NAN : enl_base_table_get (bases, (uint32_t)index)->pkah[solvent];
}

/* ---- one base ---- */

typedef struct {
  double conversion; /* fraction of the substrate that has lost the target's hydrogen */
  double ionised;    /* fraction that has lost any */
  double level;      /* fraction that has lost as many as the target's own form */
} Share;

/* Composition with the target's pKa moved by `shift`: against the base and against other sites. */
static EnlStatus
solve_at (const Comparing *c, double pkah, double shift, Share *share, EnlError *err)
{
  g_autofree EnlSpecies *form = g_memdup2 (c->species, c->n_species * sizeof *c->species);
  EnlEquilibrium problem = {form, c->n_species, c->conditions->concentration,
                            c->conditions->concentration * c->conditions->equivalents, pkah};
  g_autofree EnlComposition *at = g_new (EnlComposition, 1);

  for (uint32_t i = 0; i < c->n_species; i++)
    if (c->holds_target[i])
      form[i].pk_sum += shift;
  EnlStatus status = enl_equilibrium_solve (&problem, at, err);
  *share = (Share){0};
  for (uint32_t i = 0; status == ENL_OK && i < c->n_species; i++) {
    share->conversion += c->holds_target[i] ? at->fraction[i] : 0.0;
    share->level += form[i].lost >= form[c->target].lost ? at->fraction[i] : 0.0;
    share->ionised += at->fraction[i];
  }
  return status;
}

static EnlVerdict
verdict_of (const Share *share)
{
  if (share->conversion >= COMPLETE_FROM)
    return ENL_VERDICT_COMPLETE;
  if (share->level >= COMPLETE_FROM && share->conversion >= PARTIAL_FROM)
    return ENL_VERDICT_SHARED;
  if (share->conversion >= LARGELY_FROM)
    return ENL_VERDICT_LARGELY;
  if (share->conversion >= PARTIAL_FROM)
    return ENL_VERDICT_PARTIAL;
  return share->conversion >= TRACE_FROM ? ENL_VERDICT_TRACE : ENL_VERDICT_NO;
}

/* `sigma` is the doubt about the base, one standard deviation. */
static EnlStatus
judge_equilibrium (const Comparing *c, double pkah, double sigma, EnlCandidate *out, EnlError *err)
{
  double doubt = Z90 * hypot (c->estimate[c->target].sigma, isnan (sigma) ? 0.0 : sigma);
  Share likely, low, high;
  EnlStatus status = solve_at (c, pkah, 0.0, &likely, err);

  if (status == ENL_OK)
    status = solve_at (c, pkah, doubt, &low, err);
  if (status == ENL_OK)
    status = solve_at (c, pkah, -doubt, &high, err);
  if (status != ENL_OK)
    return status;
  out->conversion = likely.conversion;
  out->low = low.conversion;
  out->high = high.conversion;
  out->selectivity = likely.ionised > 0.0 ? likely.conversion / likely.ionised : NAN;
  out->verdict = verdict_of (&likely);
  return ENL_OK;
}

/* Stoichiometric: as a base that leaves no proton it can reach, with the sites in equilibrium among
 * themselves. */
static EnlStatus
judge_irreversible (const Comparing *c, EnlCandidate *out, EnlError *err)
{
  double strongest = c->estimate[c->target].value;

  for (uint32_t i = 0; i < c->sites->n_sites; i++)
    strongest = fmax (strongest, c->estimate[i].value);
  return judge_equilibrium (c, strongest + OUT_OF_REACH, 0.0, out, err);
}

static bool
strong_enough (const Comparing *c, const EnlBase *base)
{
  double pkah = base->pkah[c->conditions->solvent];
  double site = c->estimate[c->target].value;

  return isnan (pkah) ? base->pkah_nominal > site + NOMINAL_MARGIN : pkah > site;
}

static void
set_strength (const Comparing *c, const EnlBase *base, EnlCandidate *out)
{
  out->pkah = base->pkah[c->conditions->solvent];
  if (!isnan (c->ceiling) && out->pkah > c->ceiling) {
    out->pkah = c->ceiling;
    out->levelled = true;
  }
  out->gap = out->pkah - c->estimate[c->target].value;
}

static EnlStatus
judge (const Comparing *c, const EnlBase *base, EnlCandidate *out, EnlError *err)
{
  EnlSolvent solvent = c->conditions->solvent;

  out->pkah = out->gap = out->conversion = out->low = out->high = out->selectivity = NAN;
  out->equivalents_needed = 1.0 + c->n_before;
  if (base->attacks[solvent]) {
    out->verdict = ENL_VERDICT_SOLVENT;
  } else if (base->number_unreliable) {
    out->pkah = base->pkah[solvent];
    out->verdict = ENL_VERDICT_NO_NUMBER;
  } else if (base->irreversible && strong_enough (c, base)) {
    set_strength (c, base, out);
    return judge_irreversible (c, out, err);
  } else if (isnan (base->pkah[solvent])) {
    out->verdict = ENL_VERDICT_OFF_SCALE;
  } else {
    set_strength (c, base, out);
    return judge_equilibrium (c, out->pkah, out->levelled ? 0.0 : base->sigma[solvent], out, err);
  }
  return ENL_OK;
}

/* ---- reasons ---- */

static const char *
tail_of_partial (const Comparing *c, const EnlBase *base, const EnlCandidate *out)
{
  if (out->verdict == ENL_VERDICT_SHARED)
    return ", the rest is the anion of other sites; none stays neutral";
  if (out->selectivity < 0.5 && c->target != c->most_acidic)
    return "; another hydrogen takes the base first";
  if (base->irreversible)
    return out->conversion < COMPLETE_FROM ? "; add more base" : "";
  if (c->sites->site[c->target].alpha_carbonyl && out->conversion > 0.05)
    return "; anion and carbonyl compound side by side can condense";
  return "";
}

static char *
equilibrium_reason (const Comparing *c, const EnlBase *base, const EnlCandidate *out)
{
  const char *level = out->levelled ? " (levelled to the solvent's anion)" : "";
  g_autofree char *gap = isnan (out->gap) ? g_strdup ("stronger by far")
                                          : g_strdup_printf ("gap %+.1f%s", out->gap, level);

  g_autofree char *share = out->conversion < TRACE_FROM
                               ? g_strdup ("less than 0.1 %")
                               : g_strdup_printf ("%.3g %%", 100.0 * out->conversion);
  if (base->irreversible)
    return g_strdup_printf ("%s, and the proton does not come back: %s of the anion%s; what forms "
                            "first under mixing need not be the equilibrium anion",
                            gap, share, tail_of_partial (c, base, out));
  if (out->verdict == ENL_VERDICT_COMPLETE)
    return g_strdup_printf ("%s: the anion forms completely", gap);
  return g_strdup_printf ("%s: %s of the anion at %.3g equivalents%s", gap, share,
                          c->conditions->equivalents, tail_of_partial (c, base, out));
}

static char *
reason (const Comparing *c, const EnlBase *base, const EnlCandidate *out)
{
  const char *label = enl_solvent_label (c->conditions->solvent);

  if (out->equivalents_needed > c->conditions->equivalents + 0.1 && !isnan (out->conversion))
    return g_strdup_printf (
        "%.0f equivalents are needed: more acidic hydrogens take the first %.0f",
        out->equivalents_needed, out->equivalents_needed - 1.0);
  switch (out->verdict) {
  case ENL_VERDICT_SOLVENT:
    return g_strdup_printf ("base and %s destroy each other", label);
  case ENL_VERDICT_NO_NUMBER:
    return g_strdup (
        "its strength depends on dryness, surface or a Lewis acid, so no gap is shown");
  case ENL_VERDICT_OFF_SCALE:
    return base->irreversible
               ? g_strdup_printf ("not clearly stronger than this site, and no value in %s", label)
               : g_strdup_printf ("no value that can be set against this site in %s", label);
  default:
    return equilibrium_reason (c, base, out);
  }
}

/* ---- ranking ---- */

static int
severity (const EnlCandidate *candidate)
{
  int worst = 0;

  for (uint32_t i = 0; i < candidate->n_cautions; i++)
    worst = MAX (worst, candidate->caution[i]->severity);
  return worst;
}

static double
strength (const EnlBaseTable *bases, const EnlCandidate *candidate)
{
  const EnlBase *base = enl_base_table_get (bases, candidate->base);

  if (!isnan (candidate->pkah))
    return candidate->pkah;
  return isnan (base->pkah_nominal) ? INFINITY : base->pkah_nominal;
}

static int
by_merit (const void *left, const void *right, void *data)
{
  const EnlCandidate *a = left, *b = right;

  if (a->verdict != b->verdict)
    return a->verdict < b->verdict ? -1 : 1;
  if (a->verdict > ENL_VERDICT_LARGELY && a->conversion != b->conversion &&
      !isnan (a->conversion) && !isnan (b->conversion))
    return a->conversion > b->conversion ? -1 : 1;
  if (severity (a) != severity (b))
    return severity (a) < severity (b) ? -1 : 1;
  bool usual_a = enl_base_table_get (data, a->base)->usual;
  if (usual_a != enl_base_table_get (data, b->base)->usual)
    return usual_a ? -1 : 1;
  double pa = strength (data, a), pb = strength (data, b);
  if (pa != pb)
    return pa < pb ? -1 : 1;
  return a->base < b->base ? -1 : a->base > b->base;
}

/* A caution that comes true before the hydrogen is taken overrules the equilibrium. */
static void
apply_cautions (const Comparing *c, EnlCandidate *out)
{
  for (uint32_t i = 0; i < out->n_cautions; i++) {
    if (!(c->estimate[c->target].value > out->caution[i]->prevents_above) ||
        out->verdict > ENL_VERDICT_REACTS)
      continue;
    out->verdict = ENL_VERDICT_REACTS;
    out->conversion = out->low = out->high = out->selectivity = NAN;
    g_free (out->reason);
    out->reason = g_strdup (out->caution[i]->text);
  }
}

/* ---- the comparison ---- */

static EnlStatus
fill (const Comparing *c, EnlComparison *comparison, EnlError *err)
{
  for (uint32_t i = 0; i < comparison->n_candidates; i++) {
    EnlCandidate *candidate = &comparison->candidate[i];
    const EnlBase *base = enl_base_table_get (c->bases, i);
    candidate->base = i;
    EnlStatus status = judge (c, base, candidate, err);
    if (status != ENL_OK)
      return status;
    candidate->reason = reason (c, base, candidate);
    candidate->caution =
        enl_caution_collect (c->cautions, base, c->conditions->solvent,
                             c->sites->site[c->target].alpha_carbonyl, &candidate->n_cautions);
    apply_cautions (c, candidate);
  }
  return ENL_OK;
}

EnlStatus
enl_bases_compare (const EnlBaseTable *bases, const EnlCautionTable *cautions,
                   const EnlSites *sites, const EnlEstimate *estimate, uint32_t target,
                   const EnlConditions *conditions, EnlComparison **out, EnlError *err)
{
  g_autoptr (EnlComparison) comparison = NULL;
  Comparing c = {bases,      cautions, sites,  estimate,
                 conditions, target,   NULL,   NULL,
                 0,          0,        target, solvent_ceiling (bases, conditions->solvent)};

  *out = NULL;
  g_assert (target < sites->n_sites);
  EnlStatus status = enl_conditions_check (conditions, err);
  if (status != ENL_OK)
    return status;
  if (sites->n_sites > ENL_MAX_SPECIES)
    return enl_error_set (err, ENL_ERROR_LIMIT, "compare bases for a smaller part of the molecule",
                          "more than %d acidic sites", ENL_MAX_SPECIES);
  list_species (&c);
  comparison = g_new0 (EnlComparison, 1);
  comparison->n_candidates = enl_base_table_size (bases);
  comparison->candidate = g_new0 (EnlCandidate, comparison->n_candidates);
  status = fill (&c, comparison, err);
  g_free (c.species);
  g_free (c.holds_target);
  if (status != ENL_OK)
    return status;
  g_qsort_with_data (comparison->candidate, (int)comparison->n_candidates, sizeof (EnlCandidate),
                     by_merit, (void *)bases);
  *out = g_steal_pointer (&comparison);
  return ENL_OK;
}

void
enl_comparison_free (EnlComparison *comparison)
{
  if (!comparison)
    return;
  for (uint32_t i = 0; i < comparison->n_candidates; i++) {
    g_free (comparison->candidate[i].reason);
    g_free (comparison->candidate[i].caution);
  }
  g_free (comparison->candidate);
  g_free (comparison);
}
