#include "core/bases/judge.h"

#include <math.h>
#include <string.h>

/* Two-sided 90 % of a normal distribution, in standard deviations. */
#define Z90 1.645
/* Lower ends of the verdicts, as fractions of the substrate. */
#define COMPLETE_FROM 0.99 /* a gap of about 4: enough to keep clear of self-condensation (R03) */
#define LARGELY_FROM  0.90
#define SHARED_FROM   0.10
#define PARTIAL_FROM  0.01
#define TRACE_FROM    0.001
/* An irreversible base without a footing must be stronger than the site by this many units of its
 * textbook figure before it is called strong enough: more than the doubt of that figure. */
#define NOMINAL_MARGIN 5.0

/* An irreversible base stands this far above every site: then it is used up to 1e-10. */
#define OUT_OF_REACH 25.0

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

EnlJudge
enl_judge_begin (const EnlQuestion *question, const EnlIons *ions)
{
  return (EnlJudge){question, ions,
                    solvent_ceiling (question->bases, question->conditions->solvent)};
}

/* ---- the equilibrium ---- */

typedef struct {
  double conversion; /* fraction of the substrate that has lost the target's hydrogen */
  double ionised;    /* fraction that has lost any */
  double level;      /* fraction that has lost as many as the target's own form */
} Share;

static const EnlEstimate *
site_estimate (const EnlJudge *j)
{
  return &j->question->estimate[j->question->target];
}

/* Composition with the target's pKa moved by `shift`: against the base and against other sites. */
static EnlStatus
solve_at (const EnlJudge *j, double pkah, double shift, Share *share, EnlError *err)
{
  const EnlIons *ions = j->ions;
  const EnlConditions *conditions = j->question->conditions;
  g_autofree EnlSpecies *form = g_memdup2 (ions->species, ions->n_species * sizeof *ions->species);
  EnlEquilibrium problem = {form, ions->n_species, conditions->concentration,
                            conditions->concentration * conditions->equivalents, pkah};
  g_autofree EnlComposition *at = g_new (EnlComposition, 1);

  for (uint32_t i = 0; i < ions->n_species; i++)
    if (ions->holds_target[i])
      form[i].pk_sum += shift;
  EnlStatus status = enl_equilibrium_solve (&problem, at, err);
  *share = (Share){0};
  for (uint32_t i = 0; status == ENL_OK && i < ions->n_species; i++) {
    share->conversion += ions->holds_target[i] ? at->fraction[i] : 0.0;
    share->level += form[i].lost >= form[ions->own].lost ? at->fraction[i] : 0.0;
    share->ionised += at->fraction[i];
  }
  return status;
}

static EnlVerdict
verdict_of (const Share *share)
{
  if (share->conversion >= COMPLETE_FROM)
    return ENL_VERDICT_COMPLETE;
  if (share->level >= COMPLETE_FROM && share->conversion >= SHARED_FROM)
    return ENL_VERDICT_SHARED;
  if (share->conversion >= LARGELY_FROM)
    return ENL_VERDICT_LARGELY;
  if (share->conversion >= PARTIAL_FROM)
    return ENL_VERDICT_PARTIAL;
  return share->conversion >= TRACE_FROM ? ENL_VERDICT_TRACE : ENL_VERDICT_NO;
}

/* `sigma` is the doubt about the base, one standard deviation. */
static EnlStatus
judge_equilibrium (const EnlJudge *j, double pkah, double sigma, EnlCandidate *out, EnlError *err)
{
  double doubt = Z90 * hypot (site_estimate (j)->sigma, isnan (sigma) ? 0.0 : sigma);
  Share likely, low, high;
  EnlStatus status = solve_at (j, pkah, 0.0, &likely, err);

  if (status == ENL_OK)
    status = solve_at (j, pkah, doubt, &low, err);
  if (status == ENL_OK)
    status = solve_at (j, pkah, -doubt, &high, err);
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
judge_irreversible (const EnlJudge *j, EnlCandidate *out, EnlError *err)
{
  const EnlQuestion *q = j->question;
  double strongest = site_estimate (j)->value;

  for (uint32_t i = 0; i < q->sites->n_sites; i++)
    strongest = fmax (strongest, q->estimate[i].value);
  return judge_equilibrium (j, strongest + OUT_OF_REACH, 0.0, out, err);
}

/* ---- one base ---- */

static bool
strong_enough (const EnlJudge *j, const EnlBase *base)
{
  double pkah = base->pkah[j->question->conditions->solvent];
  double site = site_estimate (j)->value;

  return isnan (pkah) ? base->pkah_nominal > site + NOMINAL_MARGIN : pkah > site;
}

/* Nobody makes an alkoxide in water: on the water footing it stands for its own alcohol, where the
 * numbers of the water scale hold roughly. */
static bool
stands_for_own_alcohol (const EnlJudge *j, const EnlBase *base)
{
  return j->question->conditions->solvent == ENL_SOLVENT_WATER &&
         strcmp (base->family, "alkoxide") == 0;
}

static void
set_strength (const EnlJudge *j, const EnlBase *base, EnlCandidate *out)
{
  out->pkah = base->pkah[j->question->conditions->solvent];
  if (!isnan (j->ceiling) && out->pkah > j->ceiling && !out->own_alcohol) {
    out->pkah = j->ceiling;
    out->levelled = true;
  }
  out->gap = out->pkah - site_estimate (j)->value;
}

static double
doubt_of_base (const EnlJudge *j, const EnlBase *base, const EnlCandidate *out)
{
  double sigma = base->sigma[j->question->conditions->solvent];

  if (out->levelled)
    return 0.0;
  if (isnan (sigma))
    sigma = 0.0;
  return out->own_alcohol ? hypot (sigma, j->question->practice->alcohol_doubt) : sigma;
}

EnlStatus
enl_judge_base (const EnlJudge *j, uint32_t index, EnlCandidate *out, EnlError *err)
{
  EnlSolvent solvent = j->question->conditions->solvent;
  const EnlBase *base = enl_base_table_get (j->question->bases, index);

  *out = (EnlCandidate){.base = index};
  out->pkah = out->gap = out->conversion = out->low = out->high = out->selectivity = NAN;
  out->equivalents_needed = 1.0 + j->ions->taken;
  out->own_alcohol = stands_for_own_alcohol (j, base);
  if (base->attacks[solvent]) {
    out->verdict = ENL_VERDICT_SOLVENT;
  } else if (base->number_unreliable) {
    out->pkah = base->pkah[solvent];
    out->verdict = ENL_VERDICT_NO_NUMBER;
  } else if (base->irreversible && strong_enough (j, base)) {
    set_strength (j, base, out);
    return judge_irreversible (j, out, err);
  } else if (isnan (base->pkah[solvent])) {
    out->verdict = ENL_VERDICT_OFF_SCALE;
  } else {
    set_strength (j, base, out);
    return judge_equilibrium (j, out->pkah, doubt_of_base (j, base, out), out, err);
  }
  return ENL_OK;
}

/* ---- words ---- */

static char *
share_text (double share)
{
  return share < TRACE_FROM ? g_strdup ("less than 0.1 %")
                            : g_strdup_printf ("%.3g %%", 100.0 * share);
}

static const char *
tail_of_partial (const EnlJudge *j, const EnlBase *base, const EnlCandidate *out)
{
  if (out->verdict == ENL_VERDICT_SHARED)
    return ", the rest is the anion of other sites; none stays neutral";
  if (out->selectivity < 0.5 && j->question->target != j->ions->most_acidic &&
      j->ions->n_competing == 0) /* competing acids are told by their rule */
    return "; another hydrogen takes the base first";
  if (base->irreversible && out->conversion < COMPLETE_FROM)
    return "; add more base";
  return "";
}

static char *
gap_text (const EnlCandidate *out)
{
  const char *medium = out->own_alcohol ? "in its own alcohol, water-like footing: " : "";
  const char *level = out->levelled ? " (levelled to the solvent's anion)" : "";

  return isnan (out->gap) ? g_strdup ("stronger by far")
                          : g_strdup_printf ("%sgap %+.1f%s", medium, out->gap, level);
}

static char *
equilibrium_reason (const EnlJudge *j, const EnlBase *base, const EnlCandidate *out)
{
  g_autofree char *gap = gap_text (out), *share = share_text (out->conversion);

  if (base->irreversible)
    return g_strdup_printf ("%s, and the proton does not come back: %s of the anion%s", gap, share,
                            tail_of_partial (j, base, out));
  if (out->verdict == ENL_VERDICT_COMPLETE)
    return g_strdup_printf ("%s: the anion forms completely", gap);
  return g_strdup_printf ("%s: %s of the anion at %.3g equivalents%s", gap, share,
                          j->question->conditions->equivalents, tail_of_partial (j, base, out));
}

char *
enl_judge_reason (const EnlJudge *j, const EnlCandidate *out)
{
  const EnlBase *base = enl_base_table_get (j->question->bases, out->base);
  const char *label = enl_solvent_label (j->question->conditions->solvent);

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
    return equilibrium_reason (j, base, out);
  }
}
