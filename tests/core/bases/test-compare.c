#include "core/bases/compare.h"

#include <math.h>

#include "core/bases/equivalents.h"
#include "tests/core/bases/ask.h"

#define ACETOPHENONE        "CC(=O)c1ccccc1"
#define ACETOACETATE        "CC(=O)CC(=O)OCC"
#define HYDROXYACETONE      "CC(=O)Cc1ccc(O)cc1" /* 4-hydroxyphenylacetone */
#define KETO_AMIDE          "CC(=O)CCC(=O)NC"
#define BROMOACETOPHENONE   "BrCC(=O)c1ccccc1"
#define BOC_ALANINE_METHYL  "COC(=O)C(C)NC(=O)OC(C)(C)C"
#define CHLOROCYCLOHEXANONE "O=C1CCCCC1Cl"

/* Published pKa (resources/acids.tsv): ethyl acetoacetate 14.2 (DMSO) and 10.68 (water),
 * acetophenone 24.7 (DMSO), acetone 26.5 (DMSO) and 19.27 (water); pKaH of the bases: NaOEt 29.8,
 * DBU 13.9, Et3N 9.0 (DMSO; resources/bases.tsv). Verdicts follow from them, or from the rule whose
 * id stands beside (resources/rules.tsv has its source). */
static const struct {
  const char *label, *structure, *base;
  uint32_t atom;
  EnlSolvent solvent;
  double temperature, equivalents;
  EnlVerdict verdict;
  EnlGrade grade;
  const char *rule;
} verdict_case[] = {
    {"acetoacetate, ethoxide in DMSO", ACETOACETATE, "naoet", 0, ENL_SOLVENT_DMSO, 25, 1.05,
     ENL_VERDICT_COMPLETE, ENL_GRADE_CLEAN, NULL},
    {"acetoacetate, DBU", ACETOACETATE, "dbu", 0, ENL_SOLVENT_DMSO, 25, 1.05, ENL_VERDICT_PARTIAL,
     ENL_GRADE_PARTIAL, NULL},
    {"acetoacetate, triethylamine", ACETOACETATE, "et3n", 0, ENL_SOLVENT_DMSO, 25, 1.05,
     ENL_VERDICT_TRACE, ENL_GRADE_PARTIAL, NULL},
    {"acetophenone, triethylamine", ACETOPHENONE, "et3n", 0, ENL_SOLVENT_DMSO, 25, 1.05,
     ENL_VERDICT_NO, ENL_GRADE_FAILS, NULL},
    {"acetophenone, carbonate", ACETOPHENONE, "k2co3", 0, ENL_SOLVENT_DMSO, 25, 1.05,
     ENL_VERDICT_NO_NUMBER, ENL_GRADE_UNJUDGED, "R50"},
    {"acetophenone, LDA in THF", ACETOPHENONE, "lda", 0, ENL_SOLVENT_THF, -78, 1.05,
     ENL_VERDICT_COMPLETE, ENL_GRADE_CLEAN, NULL},
    {"acetophenone, LDA in DMSO", ACETOPHENONE, "lda", 0, ENL_SOLVENT_DMSO, 25, 1.05,
     ENL_VERDICT_SOLVENT, ENL_GRADE_FAILS, NULL},
    {"KHMDS has no value in THF", ACETOPHENONE, "khmds", 0, ENL_SOLVENT_THF, -78, 1.05,
     ENL_VERDICT_OFF_SCALE, ENL_GRADE_UNJUDGED, "R01"},
    {"DBU's THF number is of another scale", ACETOACETATE, "dbu", 0, ENL_SOLVENT_THF, 25, 1.05,
     ENL_VERDICT_OFF_SCALE, ENL_GRADE_UNJUDGED, "R01"},
    {"butyllithium adds to a ketone", ACETOPHENONE, "nbuli", 0, ENL_SOLVENT_THF, -78, 1.05,
     ENL_VERDICT_REACTS, ENL_GRADE_FAILS, "R12"},
    {"butyllithium and a 1,3-diketone", "CC(=O)CC(C)=O", "nbuli", 4, ENL_SOLVENT_THF, -78, 1.05,
     ENL_VERDICT_COMPLETE, ENL_GRADE_CAUTION, "R12-acidic"},
    {"butyllithium in water", ACETOPHENONE, "nbuli", 0, ENL_SOLVENT_WATER, 25, 1.05,
     ENL_VERDICT_SOLVENT, ENL_GRADE_FAILS, NULL},
    {"soft enolisation set", ACETOPHENONE, "soft_ticl4_amine", 0, ENL_SOLVENT_DMSO, 25, 1.05,
     ENL_VERDICT_NO_NUMBER, ENL_GRADE_UNJUDGED, "R43"},
    /* textbook situations, common practice */
    {"acetoacetate and ethoxide in ethanol: full", ACETOACETATE, "naoet", 0, ENL_SOLVENT_WATER, 25,
     1.05, ENL_VERDICT_COMPLETE, ENL_GRADE_CLEAN, NULL},
    {"acetone and ethoxide in ethanol: partial, aldol", "CC(=O)C", "naoet", 0, ENL_SOLVENT_WATER,
     25, 1.05, ENL_VERDICT_PARTIAL, ENL_GRADE_PARTIAL, "R03-ketone"},
    {"acetone and ethoxide on the DMSO footing are no clean pair", "CC(=O)C", "naoet", 0,
     ENL_SOLVENT_DMSO, 25, 1.05, ENL_VERDICT_COMPLETE, ENL_GRADE_CAUTION, "R60"},
    {"cyclohexanone and cold LDA: full", "O=C1CCCCC1", "lda", 0, ENL_SOLVENT_THF, -78, 1.05,
     ENL_VERDICT_COMPLETE, ENL_GRADE_CLEAN, NULL},
    {"methyl phenylacetate and ethoxide: ester exchange", "COC(=O)Cc1ccccc1", "naoet", 0,
     ENL_SOLVENT_DMSO, 25, 1.05, ENL_VERDICT_COMPLETE, ENL_GRADE_CAUTION, "R10"},
    {"the phenol takes the first equivalent", HYDROXYACETONE, "lda", 4, ENL_SOLVENT_THF, -78, 1.05,
     ENL_VERDICT_PARTIAL, ENL_GRADE_PARTIAL, "R06-short"},
    {"two equivalents reach the ketone", HYDROXYACETONE, "lda", 4, ENL_SOLVENT_THF, -78, 2.1,
     ENL_VERDICT_COMPLETE, ENL_GRADE_CLEAN, "R06-enough"},
    {"amide N-H beside an alpha site: count two", KETO_AMIDE, "lda", 4, ENL_SOLVENT_THF, -78, 1.05,
     ENL_VERDICT_SHARED, ENL_GRADE_CAUTION, "R06-short"},
    {"chlorocyclohexanone and methoxide: Favorskii", CHLOROCYCLOHEXANONE, "naome", 0,
     ENL_SOLVENT_DMSO, 25, 1.05, ENL_VERDICT_REACTS, ENL_GRADE_FAILS, "R16"},
    {"propanal and cold LDA: aldol", "CCC=O", "lda", 0, ENL_SOLVENT_THF, -78, 1.05,
     ENL_VERDICT_COMPLETE, ENL_GRADE_CAUTION, "R03-aldehyde"},
    {"acetyl chloride and cold LDA", "CC(=O)Cl", "lda", 0, ENL_SOLVENT_THF, -78, 1.05,
     ENL_VERDICT_REACTS, ENL_GRADE_FAILS, "R09-ketene"},
    {"bromoacetophenone and methyl Grignard", BROMOACETOPHENONE, "memgbr", 0, ENL_SOLVENT_THF, 25,
     1.05, ENL_VERDICT_REACTS, ENL_GRADE_FAILS, "R12-halo"},
    {"bromoacetophenone and tert-butyllithium", BROMOACETOPHENONE, "tbuli", 0, ENL_SOLVENT_THF, -78,
     1.05, ENL_VERDICT_REACTS, ENL_GRADE_FAILS, "R12-halo"},
    {"isobutyric acid and two methyllithium: ketone", "CC(C)C(=O)O", "meli", 2, ENL_SOLVENT_THF, 25,
     2.1, ENL_VERDICT_REACTS, ENL_GRADE_FAILS, "R12-acid"},
    {"acetic acid and two methyl Grignard", "CC(=O)O", "memgbr", 1, ENL_SOLVENT_THF, 25, 2.1,
     ENL_VERDICT_REACTS, ENL_GRADE_FAILS, "R12-acid-magnesium"},
    {"ethyl acetate and sodium hydride: Claisen", "CC(=O)OCC", "nah", 0, ENL_SOLVENT_THF, 25, 1.05,
     ENL_VERDICT_COMPLETE, ENL_GRADE_CAUTION, "R02-ester"},
    {"sodium hydride takes one hydrogen of acetoacetate", ACETOACETATE, "nah", 1, ENL_SOLVENT_THF,
     25, 2.1, ENL_VERDICT_OFF_SCALE, ENL_GRADE_UNJUDGED, NULL},
    {"two butyllithium reach the outer carbon", ACETOACETATE, "nbuli", 1, ENL_SOLVENT_THF, -78, 2.1,
     ENL_VERDICT_COMPLETE, ENL_GRADE_CAUTION, "R12-dianion"},
    {"ethyl acetate and hydroxide in water", "CC(=O)OCC", "naoh", 0, ENL_SOLVENT_WATER, 25, 1.05,
     ENL_VERDICT_REACTS, ENL_GRADE_FAILS, "R11"},
};

START_TEST (verdicts)
{
  Ask a;

  ask (&a, verdict_case[_i].structure, verdict_case[_i].atom,
       conditions_in (verdict_case[_i].solvent, verdict_case[_i].temperature,
                      verdict_case[_i].equivalents));
  const EnlCandidate *c = candidate_of (&a, verdict_case[_i].base);
  const char *rule = verdict_case[_i].rule;
  ck_assert_uint_eq (a.comparison->n_candidates, enl_base_table_size (a.question.bases));
  ck_assert_msg (c->verdict == verdict_case[_i].verdict, "%s: %s (%s)", verdict_case[_i].label,
                 c->words, c->reason);
  ck_assert_msg (c->grade == verdict_case[_i].grade, "%s: %s (%s)", verdict_case[_i].label,
                 enl_grade_text (c->grade), c->reason);
  ck_assert_msg (!rule || caution_of (c, rule), "%s: no %s", verdict_case[_i].label, rule);
  /* what speaks against the base is said in its one sentence, too */
  if (rule && c->grade != ENL_GRADE_UNJUDGED && c->grade != ENL_GRADE_CLEAN &&
      c->caution[0].rule->id == caution_of (c, rule)->rule->id)
    ck_assert_msg (strstr (c->reason, c->caution[0].clause), "%s", c->reason);
  ask_clear (&a);
}
END_TEST

START_TEST (borrowed_numbers_are_never_used)
{
  for (EnlSolvent s = ENL_SOLVENT_DMSO; s < ENL_N_SOLVENTS; s++) {
    Ask a;
    ask (&a, ACETOPHENONE, 0, conditions_in (s, 25.0, 1.05));
    for (uint32_t i = 0; i < a.comparison->n_candidates; i++) {
      const EnlCandidate *c = &a.comparison->candidate[i];
      const EnlBase *base = enl_base_table_get (a.question.bases, c->base);
      if (isnan (base->pkah[s]))
        ck_assert_msg (isnan (c->gap), "%s has a gap without a value", base->id);
    }
    ask_clear (&a);
  }
}
END_TEST

/* A water number stands for the alcohol when the base is an alkoxide, and for water otherwise. */
START_TEST (alkoxides_stand_for_their_own_alcohol)
{
  Ask a;

  ask (&a, "CC(=O)C", 0, conditions_in (ENL_SOLVENT_WATER, 25.0, 1.05));
  const EnlCandidate *ethoxide = candidate_of (&a, "naoet"), *hydroxide = candidate_of (&a, "naoh"),
                     *guanidine = candidate_of (&a, "tbd");
  ck_assert (ethoxide->own_alcohol && !ethoxide->levelled && !hydroxide->own_alcohol);
  ck_assert_double_eq_tol (ethoxide->pkah, 15.9, 1e-9);
  ck_assert (guanidine->levelled);
  ck_assert_double_eq_tol (guanidine->pkah, hydroxide->pkah, 1e-12);
  ck_assert_ptr_nonnull (strstr (ethoxide->reason, "in its own alcohol, water-like footing"));
  ck_assert_ptr_nonnull (strstr (enl_footing_text (ENL_SOLVENT_WATER), "own alcohol"));
  /* the doubt of the footing: 1.645 times 1.5 units, times one half in log10 x / (1 - x) */
  double spread =
      log10 (ethoxide->high / (1 - ethoxide->high)) - log10 (ethoxide->low / (1 - ethoxide->low));
  ck_assert_double_gt (spread, 1.645 * 1.5);
  ask_clear (&a);
  ask (&a, "CC(=O)C", 0, conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.05));
  ck_assert (!candidate_of (&a, "naoet")->own_alcohol);
  ask_clear (&a);
}
END_TEST

START_TEST (interval_holds_the_value_and_shrinks_with_certainty)
{
  Ask a;

  ask (&a, ACETOACETATE, 0, conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.05));
  const EnlCandidate *sure = candidate_of (&a, "dbu");
  ck_assert (sure->low < sure->conversion && sure->conversion < sure->high);
  EnlEstimate *unsure =
      g_memdup2 (a.analysis->estimate, a.analysis->sites->n_sites * sizeof *a.analysis->estimate);
  unsure[a.question.target].sigma = 3.0;
  EnlQuestion q = a.question;
  EnlComparison *wider;
  q.estimate = unsure;
  ck_assert_int_eq (enl_bases_compare (&q, &wider, NULL), ENL_OK);
  Ask b = {.question = q, .comparison = wider};
  const EnlCandidate *wide = candidate_of (&b, "dbu");
  ck_assert (wide->low < sure->low && wide->high > sure->high);
  enl_comparison_free (wider);
  g_free (unsure);
  ask_clear (&a);
}
END_TEST

START_TEST (two_sites_share_what_a_strong_base_takes)
{
  Ask a;
  const char *const strong[] = {"lda", "nah", "kh"};

  ask (&a, "CC1CCCCC1=O", 6, conditions_in (ENL_SOLVENT_THF, 25.0, 1.05));
  ck_assert_uint_eq (a.analysis->sites->n_sites, 2);
  double apart = a.analysis->estimate[1 - a.question.target].value -
                 a.analysis->estimate[a.question.target].value;
  double share = 1.0 / (1.0 + pow (10.0, -apart)); /* K = 10^apart between the anions */
  for (size_t i = 0; i < ENL_COUNT (strong); i++) {
    const EnlCandidate *found = candidate_of (&a, strong[i]);
    ck_assert_double_eq_tol (found->conversion, share, 1e-3);
    ck_assert_double_eq_tol (found->selectivity, share, 1e-3);
    ck_assert_ptr_null (strstr (found->reason, "self-aldol"));
  }
  ask_clear (&a);
}
END_TEST

/* ---- ranking ---- */

static int
worst (const EnlCandidate *c, EnlEffect effect)
{
  int severity = 0;

  for (uint32_t i = 0; i < c->n_cautions; i++)
    if (c->caution[i].rule->effect == effect)
      severity = MAX (severity, c->caution[i].rule->severity);
  return severity;
}

static void
check_order (const Ask *a)
{
  for (uint32_t i = 1; i < a->comparison->n_candidates; i++) {
    const EnlCandidate *x = &a->comparison->candidate[i - 1], *y = x + 1;
    ck_assert_int_le (x->grade, y->grade);
    ck_assert (x->reason && x->reason[0] && x->words[0]);
    if (x->grade != y->grade)
      continue;
    if (x->grade == ENL_GRADE_CAUTION)
      ck_assert_int_le (worst (x, ENL_EFFECT_WARN), worst (y, ENL_EFFECT_WARN));
    bool usual_x = enl_base_table_get (a->question.bases, x->base)->usual;
    bool usual_y = enl_base_table_get (a->question.bases, y->base)->usual;
    int hazard_x = worst (x, ENL_EFFECT_HAZARD), hazard_y = worst (y, ENL_EFFECT_HAZARD);
    /* an everyday base before an unusual one unless its hazard is extreme */
    if (x->grade == ENL_GRADE_CLEAN && (hazard_x >= 3) == (hazard_y >= 3))
      ck_assert (usual_x >= usual_y);
    if (x->grade == ENL_GRADE_CLEAN && usual_x == usual_y)
      ck_assert_int_le (hazard_x, hazard_y);
    if (x->grade == ENL_GRADE_CLEAN && hazard_x == hazard_y && usual_x == usual_y &&
        !isnan (x->pkah) && !isnan (y->pkah))
      ck_assert_double_le (x->pkah, y->pkah);
    if (x->grade == ENL_GRADE_PARTIAL && x->verdict == y->verdict)
      ck_assert_double_ge (x->conversion, y->conversion - 0.001);
  }
}

/* Sodium hydroxide, 0.105 mol/L, with 0.1 mol/L acetone (pKa 19.27): pH 13.02, so the enolate is
 * 10^(13.02 - 19.27) of it (Henderson-Hasselbalch, by hand). */
START_TEST (water_is_there_in_excess)
{
  Ask a;

  ask (&a, "CC(=O)C", 0, conditions_in (ENL_SOLVENT_WATER, 25.0, 1.05));
  const EnlCandidate *c = candidate_of (&a, "naoh");
  ck_assert_double_eq_tol (log10 (c->conversion), 14.0 + log10 (0.105) - 19.27, 0.02);
  ck_assert_int_eq (c->verdict, ENL_VERDICT_NO);
  ask_clear (&a);
}
END_TEST

START_TEST (order_is_best_first_and_mildest_among_equals)
{
  static const char *const structure[] = {ACETOACETATE, "CC(=O)C", "CCC(=O)OCC", "CS(C)=O"};

  for (size_t i = 0; i < ENL_COUNT (structure); i++)
    for (EnlSolvent s = ENL_SOLVENT_DMSO; s < ENL_N_SOLVENTS; s++) {
      Ask a;
      ask (&a, structure[i], 0, conditions_in (s, 25.0, 1.05));
      check_order (&a);
      ask_clear (&a);
    }
}
END_TEST

START_TEST (words_are_distinct)
{
  for (int i = 0; i < ENL_N_VERDICTS; i++)
    for (int j = 0; j < i; j++)
      ck_assert_str_ne (enl_verdict_text ((EnlVerdict)i), enl_verdict_text ((EnlVerdict)j));
  for (int i = 0; i < ENL_N_GRADES; i++)
    for (int j = 0; j < i; j++)
      ck_assert_str_ne (enl_grade_text ((EnlGrade)i), enl_grade_text ((EnlGrade)j));
  for (int i = 0; i < ENL_N_SOLVENTS; i++)
    for (int j = 0; j < i; j++)
      ck_assert_str_ne (enl_footing_text ((EnlSolvent)i), enl_footing_text ((EnlSolvent)j));
}
END_TEST

START_TEST (impossible_conditions_are_refused)
{
  EnlConditions c = enl_conditions_default ();
  EnlError err;

  c.equivalents = 0.0;
  ck_assert_int_eq (enl_conditions_check (&c, &err), ENL_ERROR_RANGE);
  c = enl_conditions_default ();
  c.concentration = -1.0;
  ck_assert_int_eq (enl_conditions_check (&c, &err), ENL_ERROR_RANGE);
  c = enl_conditions_default ();
  c.temperature = NAN;
  ck_assert_int_eq (enl_conditions_check (&c, &err), ENL_ERROR_RANGE);
  ck_assert (err.advice[0]);
}
END_TEST

/* ---- the centre that is lost is named ---- */

START_TEST (epimerisable_centres_are_named)
{
  static const struct {
    const char *structure, *label;
    uint32_t atom;
  } centre[] = {
      /* descriptors by the Cahn-Ingold-Prelog rules, checked with RDKit */
      {"C[C@@H](C(=O)c1ccccc1)c1ccccc1", "(R) centre at atom 2", 2},
      {"C[C@H](C(=O)c1ccccc1)c1ccccc1", "(S) centre at atom 2", 2},
  };

  for (size_t i = 0; i < ENL_COUNT (centre); i++) {
    Ask a;
    ask (&a, centre[i].structure, centre[i].atom, conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.05));
    const EnlCaution *found = caution_of (candidate_of (&a, "kotbu"), "R20");
    ck_assert_msg (found && strstr (found->text, centre[i].label), "%s: %s", centre[i].structure,
                   found ? found->text : "no caution");
    ask_clear (&a);
  }
}
END_TEST

/* ---- equivalents ---- */

static EnlEquivalents *
equivalents_of (const Ask *a, const char *base)
{
  EnlEquivalents *e = NULL;

  ck_assert_int_eq (enl_equivalents_new (&a->question, candidate_of (a, base), &e, NULL), ENL_OK);
  return e;
}

START_TEST (equivalents_follow_the_count)
{
  Ask a;

  ask (&a, HYDROXYACETONE, 4, conditions_in (ENL_SOLVENT_THF, -78.0, 1.05));
  EnlEquivalents *e = equivalents_of (&a, "lda");
  ck_assert_double_eq_tol (e->needed, 2.0, 1e-12);
  ck_assert_double_eq_tol (e->recommended, 2.1, 1e-12);
  ck_assert_ptr_nonnull (strstr (e->competing, "phenol O-H takes the first equivalent"));
  ck_assert_double_lt (e->step[2].conversion, 0.2);
  ck_assert_double_gt (e->step[3].conversion, 0.99);
  enl_equivalents_free (e);
  ask_clear (&a);
  /* an amide N-H that is a little weaker than the site still counts (rule R06) */
  ask (&a, KETO_AMIDE, 4, conditions_in (ENL_SOLVENT_THF, -78.0, 1.05));
  e = equivalents_of (&a, "lda");
  ck_assert_double_eq_tol (e->needed, 2.0, 1e-12);
  enl_equivalents_free (e);
  ask_clear (&a);
  /* the N-H of a beta-keto amide sits on the C=O of the carbanion and does not count */
  ask (&a, "CC(=O)CC(=O)Nc1ccccc1", 4, conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.05));
  e = equivalents_of (&a, "naoet");
  ck_assert_double_eq_tol (e->needed, 1.0, 1e-12);
  enl_equivalents_free (e);
  ask_clear (&a);
}
END_TEST

/* Without competing acids a strong base gives what the count says: x = min (1, E). */
START_TEST (conversion_at_the_steps_is_stoichiometric)
{
  static const double expected[ENL_N_EQUIVALENT_STEPS] = {0.95, 1.0, 1.0, 1.0};
  Ask a;

  ask (&a, "O=C1CCCCC1", 0, conditions_in (ENL_SOLVENT_THF, -78.0, 1.05));
  EnlEquivalents *e = equivalents_of (&a, "lda");
  g_autofree char *text = enl_equivalents_text (e, "LDA");
  for (int i = 0; i < ENL_N_EQUIVALENT_STEPS; i++) {
    ck_assert_double_eq_tol (e->step[i].conversion, expected[i], 1e-4);
    for (int j = 0; j < i; j++)
      ck_assert_str_ne (e->step[i].text, e->step[j].text);
  }
  ck_assert_double_eq_tol (e->recommended, 1.05, 1e-12);
  ck_assert_ptr_nonnull (strstr (text, "2.10"));
  enl_equivalents_free (e);
  ask_clear (&a);
}
END_TEST

START_TEST (a_weak_base_gets_no_recommended_number)
{
  Ask a;

  ask (&a, "CC(=O)C", 0, conditions_in (ENL_SOLVENT_WATER, 25.0, 1.05));
  EnlEquivalents *e = equivalents_of (&a, "naoet");
  ck_assert (isnan (e->recommended));
  ck_assert_ptr_nonnull (strstr (e->step[0].text, "equilibrium holds it"));
  enl_equivalents_free (e);
  e = equivalents_of (&a, "k2co3");
  ck_assert (isnan (e->recommended) && isnan (e->step[0].conversion));
  enl_equivalents_free (e);
  ask_clear (&a);
}
END_TEST

/* The second equivalent of LDA goes to the outer carbon of a 1,3-dicarbonyl (rule R07). */
START_TEST (surplus_base_goes_to_the_next_hydrogen)
{
  Ask a;

  ask (&a, ACETOACETATE, 4, conditions_in (ENL_SOLVENT_THF, -78.0, 1.05));
  EnlEquivalents *e = equivalents_of (&a, "lda");
  ck_assert_ptr_nonnull (strstr (e->step[3].text, "gamma of the 1,3-dicarbonyl"));
  enl_equivalents_free (e);
  ask_clear (&a);
  ask (&a, ACETOACETATE, 1, conditions_in (ENL_SOLVENT_THF, -78.0, 2.1));
  const EnlCandidate *lda = candidate_of (&a, "lda");
  ck_assert_double_eq_tol (lda->equivalents_needed, 2.0, 1e-12);
  ck_assert_double_gt (lda->conversion, 0.9);
  ask_clear (&a);
}
END_TEST

/* ---- the base table ---- */

/* Molar masses of the table against those of the structures (standard atomic weights of IUPAC, in
 * resources/elements.tsv); mixtures name the base alone. */
START_TEST (base_table_is_complete)
{
  const EnlBaseTable *t = knowledge->bases;

  ck_assert_uint_eq (enl_base_table_size (t), 80);
  for (uint32_t i = 0; i < enl_base_table_size (t); i++) {
    const EnlBase *b = enl_base_table_get (t, i);
    ck_assert_msg (b->family[0] && b->cation[0] && b->steric[0] && b->typical_solvents[0] &&
                       b->typical_temperature[0] && b->form[0] && b->source[0],
                   "%s misses a cell", b->id);
    ck_assert_msg (b->molar_mass > 7.9, "%s: molar mass %g", b->id, b->molar_mass);
    for (int s = 0; s < ENL_N_SOLVENTS; s++)
      ck_assert_msg (isnan (b->pkah[s]) || b->sigma[s] > 0.0, "%s: number without doubt", b->id);
    if (b->soft || strchr (b->name, '/') || strstr (b->name, "LiCl") || strstr (b->name, "alumina"))
      continue;
    g_autoptr (EnlMolecule) mol = read_structure (b->smiles);
    ck_assert_msg (fabs (enl_molecule_mass (mol) - b->molar_mass) < 0.02, "%s: %g, not %g", b->id,
                   b->molar_mass, enl_molecule_mass (mol));
  }
}
END_TEST

/* ---- what a chemist reads first ---- */

static uint32_t
rank_of (const Ask *a, const char *base)
{
  return (uint32_t)(candidate_of (a, base) - a->comparison->candidate);
}

/* Kinetic deprotonation of ketones and esters by hindered lithium amides is common practice. */
START_TEST (a_lithium_amide_comes_before_sodium_hydride)
{
  static const char *const structure[] = {"CC(=O)OCC", "CC(=O)c1ccccc1", "O=C1CCCCC1"};
  static const double temperature[] = {25.0, -78.0};

  for (size_t i = 0; i < ENL_COUNT (structure); i++)
    for (size_t t = 0; t < ENL_COUNT (temperature); t++) {
      Ask a;
      ask (&a, structure[i], 0, conditions_in (ENL_SOLVENT_THF, temperature[t], 1.05));
      ck_assert_msg (rank_of (&a, "lda") < rank_of (&a, "nah"), "%s", structure[i]);
      ask_clear (&a);
    }
}
END_TEST

/* LDA before organolithiums for the outer carbon of acetoacetate, also where the count is short and
 * the shares differ in the last digit only. */
START_TEST (equal_shares_do_not_decide_the_order)
{
  static const double equivalents[] = {1.05, 2.1};

  for (size_t i = 0; i < ENL_COUNT (equivalents); i++) {
    Ask a;
    ask (&a, ACETOACETATE, 1, conditions_in (ENL_SOLVENT_THF, -78.0, equivalents[i]));
    ck_assert_uint_lt (rank_of (&a, "lda"), rank_of (&a, "nbuli"));
    ck_assert_uint_lt (rank_of (&a, "nbuli"), rank_of (&a, "nah"));
    ask_clear (&a);
  }
}
END_TEST

/* Potassium tert-butoxide in DMSO is an everyday pair, a phosphazene is not (common practice). */
START_TEST (an_everyday_base_comes_before_a_phosphazene)
{
  Ask a;

  ask (&a, ACETOPHENONE, 0, conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.05));
  ck_assert_uint_eq (rank_of (&a, "kotbu"), 0);
  ck_assert_uint_gt (rank_of (&a, "p4_tbu"), 0);
  ask_clear (&a);
}
END_TEST

/* The N-H of a carbamate takes the first equivalent (rule R06). */
START_TEST (too_few_equivalents_are_told_first)
{
  Ask a;

  ask (&a, BOC_ALANINE_METHYL, 5, conditions_in (ENL_SOLVENT_THF, -78.0, 1.05));
  ck_assert_msg (g_str_has_prefix (candidate_of (&a, "lda")->reason,
                                   "1.05 equivalents do not reach this site in full, 2.1 is"),
                 "%s", candidate_of (&a, "lda")->reason);
  ask_clear (&a);
  ask (&a, BOC_ALANINE_METHYL, 5, conditions_in (ENL_SOLVENT_THF, -78.0, 2.1));
  ck_assert_ptr_null (strstr (candidate_of (&a, "lda")->reason, "do not reach"));
  ask_clear (&a);
}
END_TEST

/* Two sides of one ketone: the base suffices; the cold amide takes the CH2 first (House 1969). */
START_TEST (sharing_is_not_called_a_weak_base)
{
  Ask a;

  ask (&a, "CC1CCCCC1=O", 6, conditions_in (ENL_SOLVENT_THF, -78.0, 1.05));
  EnlEquivalents *e = equivalents_of (&a, "lda");
  ck_assert_double_eq_tol (e->recommended, 1.05, 1e-12);
  ck_assert_ptr_null (strstr (e->reason, "sufficient"));
  ck_assert_ptr_nonnull (strstr (e->reason, "kinetic conditions favour this less substituted"));
  enl_equivalents_free (e);
  ask_clear (&a);
}
END_TEST

static Suite *
compare_suite (void)
{
  Suite *suite = suite_create ("base comparison");
  TCase *tc = tcase_create ("all");

  tcase_add_checked_fixture (tc, open_knowledge, close_knowledge);
  tcase_add_loop_test (tc, verdicts, 0, (int)ENL_COUNT (verdict_case));
  tcase_add_test (tc, borrowed_numbers_are_never_used);
  tcase_add_test (tc, alkoxides_stand_for_their_own_alcohol);
  tcase_add_test (tc, interval_holds_the_value_and_shrinks_with_certainty);
  tcase_add_test (tc, two_sites_share_what_a_strong_base_takes);
  tcase_add_test (tc, water_is_there_in_excess);
  tcase_add_test (tc, order_is_best_first_and_mildest_among_equals);
  tcase_add_test (tc, words_are_distinct);
  tcase_add_test (tc, impossible_conditions_are_refused);
  tcase_add_test (tc, epimerisable_centres_are_named);
  tcase_add_test (tc, equivalents_follow_the_count);
  tcase_add_test (tc, conversion_at_the_steps_is_stoichiometric);
  tcase_add_test (tc, a_weak_base_gets_no_recommended_number);
  tcase_add_test (tc, surplus_base_goes_to_the_next_hydrogen);
  tcase_add_test (tc, a_lithium_amide_comes_before_sodium_hydride);
  tcase_add_test (tc, an_everyday_base_comes_before_a_phosphazene);
  tcase_add_test (tc, equal_shares_do_not_decide_the_order);
  tcase_add_test (tc, too_few_equivalents_are_told_first);
  tcase_add_test (tc, sharing_is_not_called_a_weak_base);
  tcase_add_test (tc, base_table_is_complete);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (compare_suite)
