#include "core/bases/judge.h"

#include <math.h>
#include <string.h>

#include "core/acidity/group.h"

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

/* The weakest acid that an irreversible base is certain to take. */
static double
reach_of (const EnlJudge *j, const EnlBase *base)
{
  double pkah = base->pkah[j->question->conditions->solvent];

  return isnan (pkah) ? base->pkah_nominal - NOMINAL_MARGIN : pkah;
}

void
enl_judge_mixture (const EnlJudge *j, const EnlCandidate *c, EnlMixture *out)
{
  const EnlBase *base = enl_base_table_get (j->question->bases, c->base);

  enl_mixture_init (out, j->question, j->ions, base, c->stoichiometric ? NAN : c->pkah,
                    reach_of (j, base));
}

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

/* Composition with the site's pKa and the base's pKaH moved. `pkah` NAN: taken for good. */
static EnlStatus
solve_at (const EnlJudge *j, const EnlCandidate *c, double site, double base, Share *share,
          EnlError *err)
{
  const EnlIons *ions = j->ions;
  g_auto (EnlMixture) m = {0};
  g_autofree EnlComposition *at = g_new (EnlComposition, 1);

  enl_judge_mixture (j, c, &m);
  enl_mixture_shift (&m, ions, site, base);
  EnlStatus status = enl_equilibrium_solve (&m.problem, at, err);
  *share = (Share){0};
  for (uint32_t i = 0; status == ENL_OK && i < ions->n_species; i++) {
    share->conversion += ions->holds_target[i] ? at->fraction[i] : 0.0;
    share->level += ions->species[i].lost >= ions->species[ions->own].lost ? at->fraction[i] : 0.0;
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

/* `sigma` is the doubt about the base, one standard deviation. The interval is that of the gap: its
 * ends are the likeliest pair of errors that make it so wide, where the error of the base moves the
 * base against all sites together and that of the site the site alone. */
static EnlStatus
judge_equilibrium (const EnlJudge *j, double sigma, EnlCandidate *out, EnlError *err)
{
  double of_site = site_estimate (j)->sigma, of_gap = hypot (of_site, sigma);
  double site = of_gap > 0.0 ? Z90 * of_site * of_site / of_gap : 0.0;
  double base = of_gap > 0.0 ? Z90 * sigma * sigma / of_gap : 0.0;
  Share likely, low, high;
  EnlStatus status = solve_at (j, out, 0.0, 0.0, &likely, err);

  if (status == ENL_OK)
    status = solve_at (j, out, site, -base, &low, err);
  if (status == ENL_OK)
    status = solve_at (j, out, -site, base, &high, err);
  if (status != ENL_OK)
    return status;
  out->gap_low = out->gap - Z90 * of_gap;
  out->gap_high = out->gap + Z90 * of_gap;
  out->conversion = likely.conversion;
  out->low = low.conversion;
  out->high = high.conversion;
  out->selectivity = likely.ionised > 0.0 ? likely.conversion / likely.ionised : NAN;
  out->verdict = verdict_of (&likely);
  return ENL_OK;
}

/* ---- one base ---- */

static bool
strong_enough (const EnlJudge *j, const EnlBase *base)
{
  return reach_of (j, base) > site_estimate (j)->value;
}

/* The C-H of a carboxylic acid or of its salt. */
static bool
is_beside_carboxyl (const EnlMolecule *mol, const EnlSite *site)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, site->atom[0]); k++) {
    EnlGroup group = enl_group_of (mol, enl_molecule_neighbour (mol, site->atom[0], k));
    if (group == ENL_GROUP_ACID || group == ENL_GROUP_CARBOXYLATE)
      return true;
  }
  return false;
}

/* Where another C-H or a carboxylic O-H of the same system is gone before this C-H, a solid hydride
 * is not counted on to take it, whatever its textbook figure says (common practice: LDA, or n-BuLi
 * after the hydride; Huckin & Weiler, J. Am. Chem. Soc. 1974, 96, 1082; Creger, ibid. 1967, 89,
 * 2500). A phenol O-H elsewhere does not hinder it. */
static bool
stops_at_first (const EnlJudge *j, const EnlBase *base)
{
  const EnlQuestion *q = j->question;
  const EnlSite *site = &q->sites->site[q->target];

  if (site->kind != ENL_SITE_CARBON || strcmp (base->family, "hydride") != 0)
    return false;
  for (uint32_t i = 0; site->second && i < j->ions->n_competing; i++)
    if (q->sites->site[j->ions->competing[i]].kind == ENL_SITE_CARBON)
      return true;
  return is_beside_carboxyl (q->mol, site);
}

/* Equivalents that water takes before the site does. */
static double
water_before (const EnlJudge *j)
{
  const EnlQuestion *q = j->question;
  double pka = enl_mixture_water_pka (q->bases, q->conditions->solvent);

  return pka < site_estimate (j)->value ? q->conditions->water : 0.0;
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
  out->pkah = out->gap = out->gap_low = out->gap_high = NAN;
  out->conversion = out->low = out->high = out->selectivity = NAN;
  out->equivalents_needed = 1.0 + j->ions->taken + water_before (j);
  out->own_alcohol = stands_for_own_alcohol (j, base);
  if (base->attacks[solvent]) {
    out->verdict = ENL_VERDICT_SOLVENT;
  } else if (base->number_unreliable) {
    out->pkah = base->pkah[solvent];
    out->verdict = ENL_VERDICT_NO_NUMBER;
  } else if (stops_at_first (j, base)) {
    out->verdict = ENL_VERDICT_OFF_SCALE;
  } else if (base->irreversible && strong_enough (j, base)) {
    set_strength (j, base, out);
    out->stoichiometric = true;
    return judge_equilibrium (j, 0.0, out, err);
  } else if (isnan (base->pkah[solvent])) {
    out->verdict = ENL_VERDICT_OFF_SCALE;
  } else {
    set_strength (j, base, out);
    return judge_equilibrium (j, doubt_of_base (j, base, out), out, err);
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

/* "1.05 equivalents are too few for this site, 2.1 is the number: " where the count alone is what
 * is missing; else "". */
static char *
count_text (const EnlJudge *j, const EnlCandidate *out)
{
  double given = j->question->conditions->equivalents;
  bool strong = isnan (out->gap) || out->gap > 0.0;

  if (!strong || j->ions->n_competing == 0 || given > out->equivalents_needed - 0.1)
    return g_strdup ("");
  return g_strdup_printf ("%.3g equivalents do not reach this site in full, %.3g is the number: ",
                          given, out->equivalents_needed * j->question->practice->excess);
}

static char *
equilibrium_reason (const EnlJudge *j, const EnlBase *base, const EnlCandidate *out)
{
  g_autofree char *gap = gap_text (out), *share = share_text (out->conversion);
  g_autofree char *count = count_text (j, out);

  if (base->irreversible)
    return g_strdup_printf ("%s%s, and the proton does not come back: %s of the anion%s", count,
                            gap, share, tail_of_partial (j, base, out));
  if (out->verdict == ENL_VERDICT_COMPLETE)
    return g_strdup_printf ("%s: the anion forms completely", gap);
  return g_strdup_printf ("%s%s: %s of the anion at %.3g equivalents%s", count, gap, share,
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
    if (stops_at_first (j, base))
      return g_strdup (
          "the solid hydride takes the first hydrogen; that it takes this one from the "
          "anion is not counted on, LDA or n-BuLi is used for it");
    return base->irreversible
               ? g_strdup_printf ("not clearly stronger than this site, and no value in %s", label)
               : g_strdup_printf ("no value that can be set against this site in %s", label);
  default:
    return equilibrium_reason (j, base, out);
  }
}
