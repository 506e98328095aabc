#include "core/bases/equivalents.h"

#include <math.h>

#include "core/bases/ions.h"
#include "core/bases/judge.h"

/* The numbers a chemist weighs against each other: a deficit, the count, an excess, two each. */
static const double step_at[ENL_N_EQUIVALENT_STEPS] = {0.95, 1.0, 1.05, 2.1};
/* Equal to the count within what a balance can tell. */
#define EXACT 0.005
/* From here on the anion is the main thing in the flask. */
#define LARGELY 0.9

typedef struct {
  const EnlQuestion *question;
  const EnlCandidate *candidate;
  const EnlIons *ions;
} Advising;

/* Fraction of the anion at another number of equivalents; NAN where the base has none. */
static EnlStatus
conversion_at (const Advising *a, double equivalents, double *out, bool *shared, EnlError *err)
{
  EnlConditions conditions = *a->question->conditions;
  EnlQuestion question = *a->question;
  EnlCandidate at;

  conditions.equivalents = equivalents;
  question.conditions = &conditions;
  EnlJudge judge = enl_judge_begin (&question, a->ions);
  EnlStatus status = enl_judge_base (&judge, a->candidate->base, &at, err);
  *out = isnan (a->candidate->conversion) ? NAN : at.conversion;
  *shared = status == ENL_OK && at.verdict == ENL_VERDICT_SHARED;
  return status;
}

/* ---- words ---- */

static char *
percent (double share)
{
  return share < 0.001 ? g_strdup ("less than 0.1 %") : g_strdup_printf ("%.3g %%", 100 * share);
}

/* A hydrogen of the anion that the base can still take: the least weak second site, or ENL_NONE. */
static uint32_t
next_site (const Advising *a)
{
  const EnlQuestion *q = a->question;
  const EnlBase *base = enl_base_table_get (q->bases, a->candidate->base);
  double strength = base->irreversible ? INFINITY : a->candidate->pkah;
  uint32_t best = ENL_NONE;

  for (uint32_t i = 0; i < q->sites->n_sites; i++)
    if (i != q->target && q->sites->site[i].second && q->estimate[i].value < strength &&
        q->estimate[i].value > q->estimate[q->target].value &&
        (best == ENL_NONE || q->estimate[i].value < q->estimate[best].value))
      best = i;
  return best;
}

static char *
text_of_surplus (const Advising *a, double over)
{
  uint32_t next = next_site (a);

  if (next != ENL_NONE)
    return g_strdup_printf ("the base left over goes on to the hydrogen %s",
                            a->question->sites->site[next].position);
  return g_strdup_printf ("%.2g equivalents of base are left over, and meet what is added next",
                          over);
}

static char *
text_of_step (const Advising *a, const EnlEquivalentStep *step, double needed)
{
  double e = step->equivalents;

  if (isnan (step->conversion))
    return g_strdup ("no number to tell");
  g_autofree char *share = percent (step->conversion);
  if (e < needed - 0.1)
    return g_strdup_printf ("%s of the anion: too little, %.3g are counted", share, needed);
  if (step->shared)
    return g_strdup_printf ("%s of the anion at equilibrium, the rest is that of other sites",
                            share);
  if (step->conversion < LARGELY * MIN (1.0, e / needed))
    return g_strdup_printf ("%s of the anion: the equilibrium holds it there", share);
  if (e < needed - EXACT)
    return g_strdup_printf ("%s of the anion: some substrate stays neutral, so the anions exchange "
                            "hydrogens and settle",
                            share);
  if (e < needed + EXACT)
    return g_strdup_printf ("%s of the anion: no margin for moisture or a wrong titre", share);
  if (e <= needed * a->question->practice->excess_most)
    return g_strdup_printf ("%s of the anion: a small excess of base", share);
  g_autofree char *surplus = text_of_surplus (a, e - needed);
  return g_strdup_printf ("%s of the anion: %s", share, surplus);
}

/* ---- the recommendation ---- */

/* What the rules say of the side of a ketone that forms first (R30), or NULL. */
static const char *
kinetic_remark (const EnlCandidate *c)
{
  for (uint32_t i = 0; i < c->n_cautions; i++)
    if (g_str_has_prefix (c->caution[i].rule->id, "R30-"))
      return c->caution[i].clause;
  return NULL;
}

/* The base takes all of the substrate, and what limits this anion is the other site. */
static char *
text_of_sharing (const EnlCandidate *c, const char *share, double number)
{
  const char *kinetic = kinetic_remark (c);

  return g_strdup_printf ("they leave no neutral substrate; once the anions of its sites settle, "
                          "%s is this one at %.3g%s%s",
                          share, number, kinetic ? "; before that: " : "", kinetic ? kinetic : "");
}

static EnlStatus
recommend (const Advising *a, EnlEquivalents *out, EnlError *err)
{
  const EnlPractice *practice = a->question->practice;
  const EnlCandidate *c = a->candidate;
  const EnlBase *base = enl_base_table_get (a->question->bases, c->base);
  double number = out->needed * practice->excess, conversion;
  bool shared;
  EnlStatus status = conversion_at (a, number, &conversion, &shared, err);

  out->recommended = NAN;
  if (status != ENL_OK)
    return status;
  if (isnan (conversion)) {
    out->reason = g_strdup_printf ("no number is recommended: %s", enl_verdict_text (c->verdict));
    return ENL_OK;
  }
  g_autofree char *share = percent (conversion);
  if (shared) {
    out->recommended = number;
    out->reason = text_of_sharing (c, share, number);
    return ENL_OK;
  }
  if (conversion < LARGELY) {
    out->reason = g_strdup_printf (
        "no number of equivalents makes this base sufficient: %s of the anion at %.3g", share,
        number);
    return ENL_OK;
  }
  out->recommended = number;
  if (base->irreversible || c->gap >= practice->enough_gap)
    out->reason = g_strdup_printf ("%.0f counted and %.0f %% more, so that no free substrate is "
                                   "left; up to %.3g is usual",
                                   out->needed, 100 * (practice->excess - 1.0),
                                   out->needed * practice->excess_most);
  else
    out->reason = g_strdup_printf ("%.0f counted and %.0f %% more give %s of the anion; the rest "
                                   "stays neutral however long one waits",
                                   out->needed, 100 * (practice->excess - 1.0), share);
  return ENL_OK;
}

EnlStatus
enl_equivalents_new (const EnlQuestion *question, const EnlCandidate *candidate,
                     EnlEquivalents **out, EnlError *err)
{
  g_autoptr (EnlEquivalents) e = g_new0 (EnlEquivalents, 1);
  g_autoptr (EnlIons) ions = NULL;

  *out = NULL;
  EnlStatus status = enl_ions_new (question, &ions, err);
  if (status != ENL_OK)
    return status;
  Advising a = {question, candidate, ions};
  e->needed = candidate->equivalents_needed;
  e->competing = enl_ions_competing_text (ions, question);
  status = recommend (&a, e, err);
  for (int i = 0; status == ENL_OK && i < ENL_N_EQUIVALENT_STEPS; i++) {
    e->step[i].equivalents = step_at[i];
    status = conversion_at (&a, step_at[i], &e->step[i].conversion, &e->step[i].shared, err);
    e->step[i].text = text_of_step (&a, &e->step[i], e->needed);
  }
  if (status == ENL_OK)
    *out = g_steal_pointer (&e);
  return status;
}

void
enl_equivalents_free (EnlEquivalents *e)
{
  if (!e)
    return;
  for (int i = 0; i < ENL_N_EQUIVALENT_STEPS; i++)
    g_free (e->step[i].text);
  g_free (e->competing);
  g_free (e->reason);
  g_free (e);
}

char *
enl_equivalents_text (const EnlEquivalents *e, const char *base)
{
  GString *out = g_string_new (NULL);

  if (isnan (e->recommended))
    g_string_append_printf (out, "Equivalents of %s: %s", base, e->reason);
  else
    g_string_append_printf (out, "Equivalents of %s: %.3g (%s)", base, e->recommended, e->reason);
  g_string_append_printf (out, "%s%s\n", e->competing[0] ? "; " : "", e->competing);
  for (int i = 0; !isnan (e->step[0].conversion) && i < ENL_N_EQUIVALENT_STEPS; i++)
    g_string_append_printf (out, "  %.2f: %s\n", e->step[i].equivalents, e->step[i].text);
  return g_string_free (out, FALSE);
}
