#include "core/bases/compare.h"

#include <math.h>
#include <string.h>

#include "core/bases/fact-view.h"
#include "core/bases/judge.h"

EnlConditions
enl_conditions_default (void)
{
  return (EnlConditions){ENL_SOLVENT_DMSO, 1.05, 0.1, 25.0, 0.0};
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
  if (!(c->water >= 0.0 && c->water <= 100.0))
    return enl_error_set (err, ENL_ERROR_RANGE, "give 0 to 100 equivalents of water",
                          "%g equivalents of water", c->water);
  if (!(c->temperature >= -120.0 && c->temperature <= 200.0))
    return enl_error_set (err, ENL_ERROR_RANGE, "give a temperature from -120 to 200 °C",
                          "temperature %g °C", c->temperature);
  return ENL_OK;
}

/* ---- words ---- */

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
      [ENL_VERDICT_SOLVENT] = "attacks the solvent",
      [ENL_VERDICT_NO_NUMBER] = "no usable number",
      [ENL_VERDICT_OFF_SCALE] = "not on this scale",
  };

  g_assert (verdict < ENL_N_VERDICTS);
  return text[verdict];
}

const char *
enl_grade_text (EnlGrade grade)
{
  static const char *const text[ENL_N_GRADES] = {
      [ENL_GRADE_CLEAN] = "works cleanly", [ENL_GRADE_CAUTION] = "works, with a caution",
      [ENL_GRADE_PARTIAL] = "partial",     [ENL_GRADE_FAILS] = "does not work",
      [ENL_GRADE_UNJUDGED] = "not judged",
  };

  g_assert (grade < ENL_N_GRADES);
  return text[grade];
}

const char *
enl_footing_text (EnlSolvent solvent)
{
  static const char *const text[ENL_N_SOLVENTS] = {
      [ENL_SOLVENT_DMSO] =
          "DMSO footing: bases are free of the alcohol or water that tames them in "
          "protic media; choose water for those.",
      [ENL_SOLVENT_WATER] =
          "Water-like footing for protic media: an alkoxide stands for its own alcohol, with the "
          "numbers of the water scale as a rough guide and wider intervals; the excess of alcohol "
          "lowers what is shown.",
      [ENL_SOLVENT_THF] = "THF footing: lithium amides on the scale of Fraser and Mansour against "
                          "DMSO-based acids, with wide intervals.",
  };

  g_assert (solvent < ENL_N_SOLVENTS);
  return text[solvent];
}

static EnlGrade
grade_of (EnlVerdict verdict, bool warned)
{
  switch (verdict) {
  case ENL_VERDICT_COMPLETE:
    return warned ? ENL_GRADE_CAUTION : ENL_GRADE_CLEAN;
  case ENL_VERDICT_SHARED:
  case ENL_VERDICT_LARGELY:
    return ENL_GRADE_CAUTION;
  case ENL_VERDICT_PARTIAL:
  case ENL_VERDICT_TRACE:
    return ENL_GRADE_PARTIAL;
  case ENL_VERDICT_NO:
  case ENL_VERDICT_REACTS:
  case ENL_VERDICT_SOLVENT:
    return ENL_GRADE_FAILS;
  default:
    return ENL_GRADE_UNJUDGED;
  }
}

/* The first caution of this effect, or NULL; they are sorted by effect and severity. */
static const EnlCaution *
first_of (const EnlCandidate *c, EnlEffect effect)
{
  for (uint32_t i = 0; i < c->n_cautions; i++)
    if (c->caution[i].rule->effect == effect)
      return &c->caution[i];
  return NULL;
}

/* ---- one base ---- */

static void
forbid (EnlCandidate *out, const EnlCaution *why)
{
  out->verdict = ENL_VERDICT_REACTS;
  out->conversion = out->low = out->high = out->selectivity = NAN;
  out->reason = g_strdup (why->clause);
}

static void
set_words (const EnlJudge *judge, EnlCandidate *out)
{
  const EnlCaution *reaction = first_of (out, ENL_EFFECT_REACTS);
  const EnlCaution *warning = first_of (out, ENL_EFFECT_WARN);

  if (reaction && out->verdict != ENL_VERDICT_SOLVENT) {
    forbid (out, reaction);
  } else {
    g_autofree char *reason = enl_judge_reason (judge, out);
    bool told =
        warning && (out->verdict <= ENL_VERDICT_TRACE || out->verdict == ENL_VERDICT_NO_NUMBER);
    out->reason =
        told ? g_strdup_printf ("%s; but: %s", reason, warning->clause) : g_steal_pointer (&reason);
  }
  bool warned = warning && out->verdict <= ENL_VERDICT_TRACE;
  out->grade = grade_of (out->verdict, warned);
  out->words =
      g_strconcat (enl_verdict_text (out->verdict), warned ? ", with a caution" : "", NULL);
}

typedef struct {
  EnlJudge judge;
  EnlFactView view;
  EnlFactValue *value; /* one a fact */
} Comparing;

static EnlStatus
fill_candidate (Comparing *c, uint32_t base, EnlCandidate *out, EnlError *err)
{
  EnlStatus status = enl_judge_base (&c->judge, base, out, err);

  if (status != ENL_OK)
    return status;
  c->view.base = enl_base_table_get (c->judge.question->bases, base);
  c->view.candidate = out;
  enl_fact_view_find (&c->view, ENL_FACT_OF_BASE, c->value);
  out->caution = enl_rule_table_apply (c->judge.question->rules, c->value, &out->n_cautions);
  set_words (&c->judge, out);
  return ENL_OK;
}

static void
clear_candidate (EnlCandidate *c)
{
  g_free (c->words);
  g_free (c->reason);
  enl_cautions_free (c->caution, c->n_cautions);
}

/* ---- ranking ---- */

/* Worst severity of what counts for the order: remarks do not. */
static int
severity (const EnlCandidate *candidate, EnlEffect effect)
{
  const EnlCaution *worst = first_of (candidate, effect);

  return worst ? worst->rule->severity : 0;
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
compare_numbers (double a, double b)
{
  return a < b ? -1 : a > b;
}

/* Shares that differ by less are equal: the doubt is far larger. */
#define EQUAL_SHARE 0.001

/* Up to "works, with a caution" the bases are equals in what they do; below, the share decides. */
static int
by_outcome (const EnlCandidate *a, const EnlCandidate *b)
{
  int order = compare_numbers (a->grade, b->grade);

  if (order == 0 && a->grade != ENL_GRADE_CAUTION)
    order = compare_numbers (a->verdict, b->verdict);
  if (order == 0 && a->grade > ENL_GRADE_CAUTION && !isnan (a->conversion) &&
      !isnan (b->conversion))
    order =
        compare_numbers (round (b->conversion / EQUAL_SHARE), round (a->conversion / EQUAL_SHARE));
  return order ? order
               : compare_numbers (severity (a, ENL_EFFECT_WARN), severity (b, ENL_EFFECT_WARN));
}

/* Hazards below this are comparable: an everyday base comes first among them. */
#define EXTREME 3

static int
by_shelf (const EnlBaseTable *bases, const EnlCandidate *a, const EnlCandidate *b)
{
  int hazard_a = severity (a, ENL_EFFECT_HAZARD), hazard_b = severity (b, ENL_EFFECT_HAZARD);
  bool usual_a = enl_base_table_get (bases, a->base)->usual;
  bool usual_b = enl_base_table_get (bases, b->base)->usual;

  if ((hazard_a >= EXTREME) != (hazard_b >= EXTREME))
    return hazard_a >= EXTREME ? 1 : -1;
  if (usual_a != usual_b)
    return usual_a ? -1 : 1;
  return compare_numbers (hazard_a, hazard_b);
}

static int
by_merit (const void *left, const void *right, void *data)
{
  const EnlCandidate *a = left, *b = right;
  const EnlBaseTable *bases = data;
  int order = by_outcome (a, b);

  if (order == 0)
    order = by_shelf (bases, a, b);
  if (order == 0)
    order = compare_numbers (strength (bases, a), strength (bases, b));
  return order ? order : compare_numbers (a->base, b->base);
}

/* ---- the comparison ---- */

/* The candidates are the bases of the table from `first` on. */
static EnlStatus
fill (const EnlQuestion *q, const EnlIons *ions, uint32_t first, EnlComparison *comparison,
      EnlError *err)
{
  Comparing c = {.judge = enl_judge_begin (q, ions)};
  EnlStatus status = ENL_OK;

  enl_fact_view_init (&c.view, q, ions);
  c.value = g_new0 (EnlFactValue, enl_fact_count ());
  enl_fact_view_find (&c.view, ENL_FACT_OF_QUESTION, c.value);
  for (uint32_t i = 0; status == ENL_OK && i < comparison->n_candidates; i++)
    status = fill_candidate (&c, first + i, &comparison->candidate[i], err);
  g_free (c.value);
  enl_fact_view_clear (&c.view);
  return status;
}

static EnlStatus
compare (const EnlQuestion *q, uint32_t first, uint32_t n, EnlComparison **out, EnlError *err)
{
  g_autoptr (EnlComparison) comparison = NULL;
  g_autoptr (EnlIons) ions = NULL;

  *out = NULL;
  g_assert (q->target < q->sites->n_sites);
  EnlStatus status = enl_conditions_check (q->conditions, err);
  if (status == ENL_OK)
    status = enl_ions_new (q, &ions, err);
  if (status != ENL_OK)
    return status;
  comparison = g_new0 (EnlComparison, 1);
  comparison->n_candidates = n;
  comparison->candidate = g_new0 (EnlCandidate, comparison->n_candidates);
  status = fill (q, ions, first, comparison, err);
  if (status != ENL_OK)
    return status;
  g_qsort_with_data (comparison->candidate, (int)comparison->n_candidates, sizeof (EnlCandidate),
                     by_merit, (void *)q->bases);
  *out = g_steal_pointer (&comparison);
  return ENL_OK;
}

EnlStatus
enl_bases_compare (const EnlQuestion *q, EnlComparison **out, EnlError *err)
{
  return compare (q, 0, enl_base_table_size (q->bases), out, err);
}

EnlStatus
enl_bases_compare_one (const EnlQuestion *q, uint32_t base, EnlComparison **out, EnlError *err)
{
  g_assert (base < enl_base_table_size (q->bases));
  return compare (q, base, 1, out, err);
}

void
enl_comparison_free (EnlComparison *comparison)
{
  if (!comparison)
    return;
  for (uint32_t i = 0; i < comparison->n_candidates; i++)
    clear_candidate (&comparison->candidate[i]);
  g_free (comparison->candidate);
  g_free (comparison);
}
