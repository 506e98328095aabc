#include "core/bases/weigh-list.h"

#include <math.h>
#include <string.h>

#include "core/bases/equivalents.h"

#define MMOL_PER_MOL 1000.0

EnlWeighScale
enl_weigh_scale_none (void)
{
  return (EnlWeighScale){NAN, NAN, NAN, 0.0, NAN, NAN};
}

/* ---- scale ---- */

static EnlStatus
substrate_mass (const EnlMolecule *mol, double *out, EnlError *err)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    if (enl_molecule_atom (mol, i)->element == 0)
      return enl_error_set (err, ENL_ERROR_CHEMISTRY, "write the whole structure",
                            "a structure with an open place '*' has no molar mass");
  *out = enl_molecule_mass (mol);
  return ENL_OK;
}

static EnlStatus
take_scale (const EnlWeighScale *scale, double molar_mass, double *mmol, EnlError *err)
{
  if (isnan (scale->mmol) == isnan (scale->grams))
    return enl_error_set (err, ENL_ERROR_RANGE, "give mmol of substrate or its mass in grams",
                          isnan (scale->mmol) ? "no amount of substrate"
                                              : "two amounts of substrate");
  *mmol = isnan (scale->mmol) ? scale->grams / molar_mass * MMOL_PER_MOL : scale->mmol;
  if (!isnan (scale->grams) && !(scale->grams > 0.0))
    return enl_error_set (err, ENL_ERROR_RANGE, "give a mass above 0", "%g g of substrate",
                          scale->grams);
  return ENL_OK;
}

/* ---- labels in a list of several ---- */

static bool
sold_as_solution (const EnlBase *base)
{
  return g_str_has_prefix (base->form, "solution");
}

static EnlStatus
check_labels (const EnlQuestion *q, const EnlWeighScale *scale, const uint32_t *base, uint32_t n,
              EnlError *err)
{
  uint32_t solutions = 0;

  if (!isnan (scale->titre) && !isnan (scale->mass_percent) && n == 1)
    return enl_error_set (err, ENL_ERROR_RANGE, "give one of them",
                          "both a titre and a mass per cent for one base");
  for (uint32_t i = 0; i < n; i++)
    solutions += sold_as_solution (enl_base_table_get (q->bases, base[i]));
  if (n > 1 && !isnan (scale->titre) && solutions == 0)
    return enl_error_set (err, ENL_ERROR_UNKNOWN, "ask for that base alone",
                          "no base of the list is sold as a solution, so whose titre is it");
  if (n > 1 && !isnan (scale->mass_percent) && solutions == n)
    return enl_error_set (err, ENL_ERROR_UNKNOWN, "ask for that base alone",
                          "every base of the list is sold as a solution, so whose mass per cent");
  return ENL_OK;
}

/* ---- one base ---- */

typedef struct {
  const EnlQuestion *question;
  const EnlWeighTable *table;
  const EnlWeighScale *scale;
  const EnlComparison *comparison;
  EnlWeighList *list;
  bool several;
} Making;

static const EnlCandidate *
candidate_of (const EnlComparison *comparison, uint32_t base)
{
  for (uint32_t i = 0; i < comparison->n_candidates; i++)
    if (comparison->candidate[i].base == base)
      return &comparison->candidate[i];
  g_assert_not_reached ();
}

/* The recommended number; by count where the equilibrium recommends none. */
static EnlStatus
take_equivalents (const Making *m, const EnlCandidate *c, double *out, char **reason, EnlError *err)
{
  g_autoptr (EnlEquivalents) e = NULL;

  if (!isnan (m->scale->equivalents)) {
    *out = m->scale->equivalents;
    *reason = g_strdup_printf ("as asked; %.3g counted", c->equivalents_needed);
    return ENL_OK;
  }
  EnlStatus status = enl_equivalents_new (m->question, c, &e, err);
  if (status != ENL_OK)
    return status;
  *out = e->recommended;
  if (isnan (*out)) {
    const EnlPractice *practice = m->question->practice;
    *out = e->needed * practice->excess;
    *reason = g_strdup_printf ("by count alone: %.0f and %.0f %% more; %s", e->needed,
                               100 * (practice->excess - 1.0), e->reason);
  } else {
    *reason = g_strdup_printf ("%s%s%s", e->reason, e->competing[0] ? "; " : "", e->competing);
  }
  return ENL_OK;
}

static void
add_hazards (const Making *m, const EnlBase *base)
{
  int index = enl_base_table_find (m->question->bases, base->id);
  const EnlCandidate *c = candidate_of (m->comparison, (uint32_t)index);

  for (uint32_t i = 0; i < c->n_cautions; i++) {
    const EnlRule *rule = c->caution[i].rule;
    if (rule->effect != ENL_EFFECT_HAZARD)
      continue;
    g_autofree char *text = g_strdup_printf ("[%s] %s", rule->id, c->caution[i].text);
    if (!g_ptr_array_find_with_equal_func (m->list->hazard, text, g_str_equal, NULL))
      g_ptr_array_add (m->list->hazard, g_steal_pointer (&text));
  }
}

/* The comparison holds for the equivalents of its question and without water; the verdict for what
 * the line puts together. */
static EnlStatus
take_verdict (const Making *m, uint32_t base, EnlWeighLine *line, EnlError *err)
{
  g_autoptr (EnlComparison) own = NULL;
  EnlConditions conditions = *m->question->conditions;
  EnlQuestion question = *m->question;

  question.conditions = &conditions;
  conditions.equivalents = line->weighing->equivalents + line->weighing->water_taken;
  conditions.water = m->scale->water;
  EnlStatus status = enl_bases_compare (&question, &own, err);
  if (status != ENL_OK)
    return status;
  const EnlCandidate *c = candidate_of (own, base);
  line->works = c->grade <= ENL_GRADE_CAUTION;
  if (line->works)
    line->verdict = g_strdup (c->words);
  else if (c->grade == ENL_GRADE_PARTIAL)
    line->verdict = g_strdup_printf ("%s: %s", c->words, c->reason);
  else
    line->verdict = g_strdup_printf ("%s: %s; %s", enl_grade_text (c->grade), c->words, c->reason);
  return ENL_OK;
}

static EnlStatus
make_line (const Making *m, uint32_t base, EnlWeighLine *line, EnlError *err)
{
  const EnlBase *b = enl_base_table_get (m->question->bases, base);
  const EnlCandidate *c = candidate_of (m->comparison, base);
  bool solution = sold_as_solution (b);
  EnlWeighOrder order = {.mmol = m->list->mmol,
                         .water = m->scale->water,
                         .titre = !m->several || solution ? m->scale->titre : NAN,
                         .mass_percent = !m->several || !solution ? m->scale->mass_percent : NAN};
  EnlStatus status = take_equivalents (m, c, &order.equivalents, &line->reason, err);

  if (status == ENL_OK)
    status = enl_weigh (m->table, b, &order, &line->weighing, err);
  if (status != ENL_OK)
    return status;
  status = take_verdict (m, base, line, err);
  if (status != ENL_OK)
    return status;
  add_hazards (m, b);
  for (uint32_t i = 0; i < line->weighing->n_parts; i++)
    if (line->weighing->part[i].base)
      add_hazards (m, line->weighing->part[i].base);
  return ENL_OK;
}

/* ---- the list ---- */

static EnlStatus
make_lines (Making *m, const uint32_t *base, uint32_t n, EnlError *err)
{
  EnlStatus status = ENL_OK;

  m->list->line = g_new0 (EnlWeighLine, n);
  for (uint32_t i = 0; status == ENL_OK && i < n; i++) {
    m->list->n_lines++;
    status = make_line (m, base[i], &m->list->line[i], err);
  }
  return status;
}

EnlStatus
enl_weigh_list_new (const EnlQuestion *question, const EnlWeighTable *table, const char *name,
                    const EnlWeighScale *scale, const uint32_t *base, uint32_t n,
                    EnlWeighList **out, EnlError *err)
{
  g_autoptr (EnlWeighList) list = g_new0 (EnlWeighList, 1);
  g_autoptr (EnlComparison) comparison = NULL;
  EnlConditions dry = *question->conditions; /* what water takes is added by enl_weigh */
  EnlQuestion q = *question;

  *out = NULL;
  dry.water = 0.0;
  q.conditions = &dry;
  list->hazard = g_ptr_array_new_with_free_func (g_free);
  EnlStatus status = substrate_mass (q.mol, &list->molar_mass, err);
  if (status == ENL_OK)
    status = take_scale (scale, list->molar_mass, &list->mmol, err);
  if (status == ENL_OK)
    status = check_labels (&q, scale, base, n, err);
  if (status == ENL_OK)
    status = enl_bases_compare (&q, &comparison, err);
  if (status != ENL_OK)
    return status;
  list->substrate = g_strdup (name);
  list->position = g_strdup (q.sites->site[q.target].position);
  list->solvent = q.conditions->solvent;
  list->deferral = enl_rule_table_deferral (q.rules);
  Making m = {&q, table, scale, comparison, list, n > 1};
  status = make_lines (&m, base, n, err);
  if (status == ENL_OK)
    *out = g_steal_pointer (&list);
  return status;
}

void
enl_weigh_list_free (EnlWeighList *list)
{
  if (!list)
    return;
  for (uint32_t i = 0; i < list->n_lines; i++) {
    enl_weighing_free (list->line[i].weighing);
    g_free (list->line[i].reason);
    g_free (list->line[i].verdict);
  }
  g_free (list->line);
  g_ptr_array_unref (list->hazard);
  g_free (list->substrate);
  g_free (list->position);
  g_free (list);
}

/* ---- text ---- */

char *
enl_weigh_line_text (const EnlWeighLine *line)
{
  const EnlWeighing *w = line->weighing;
  g_autofree char *equivalents = enl_weigh_digits (w->equivalents);
  g_autofree char *mmol = enl_weigh_digits (w->mmol);

  return g_strdup_printf ("%s equivalents, %s\u00A0mmol%s%s", equivalents, mmol,
                          w->remark[0] ? "; " : "", w->remark);
}

static void
append_part (GString *out, const EnlWeighPart *part)
{
  g_autofree char *amount = enl_weigh_amount_text (part);
  g_autofree char *form = enl_weigh_form_text (part);
  g_autofree char *mmol = enl_weigh_digits (part->mmol);

  g_string_append_printf (out, "    %s  %s", amount, part->name);
  if (mmol[0])
    g_string_append_printf (out, ", %s\u00A0mmol", mmol);
  if (!isnan (part->molar_mass)) {
    char mass[G_ASCII_DTOSTR_BUF_SIZE];
    g_ascii_formatd (mass, sizeof mass, "%.2f", part->molar_mass);
    g_string_append_printf (out, ", %s\u00A0g/mol", mass);
  }
  g_string_append_printf (out, "%s%s\n", form[0] ? "; " : "", form);
  if (part->note[0])
    g_string_append_printf (out, "      %s\n", part->note);
}

static void
append_line (GString *out, const EnlWeighLine *line)
{
  g_autofree char *head = enl_weigh_line_text (line);

  g_string_append_printf (out, "%s: %s\n  why: %s\n  outcome: %s\n", line->weighing->base->name,
                          head, line->reason, line->verdict);
  for (uint32_t i = 0; i < line->weighing->n_parts; i++)
    append_part (out, &line->weighing->part[i]);
}

char *
enl_weigh_list_text (const EnlWeighList *list)
{
  GString *out = g_string_new (NULL);
  g_autofree char *mmol = enl_weigh_digits (list->mmol);
  g_autofree char *mass = enl_weigh_mass_text (list->mmol * list->molar_mass);
  char molar_mass[G_ASCII_DTOSTR_BUF_SIZE];

  g_ascii_formatd (molar_mass, sizeof molar_mass, "%.2f", list->molar_mass);
  g_string_append_printf (out, "%s: %s\u00A0mmol, %s, %s\u00A0g/mol; site %s; pK values for %s\n",
                          list->substrate, mmol, mass, molar_mass, list->position,
                          enl_solvent_heading (list->solvent));
  for (uint32_t i = 0; i < list->n_lines; i++)
    append_line (out, &list->line[i]);
  if (list->hazard->len)
    g_string_append (out, "Cautions\n");
  for (uint32_t i = 0; i < list->hazard->len; i++)
    g_string_append_printf (out, "  %s\n", (char *)g_ptr_array_index (list->hazard, i));
  g_string_append_printf (out, "%s\n", list->deferral);
  return g_string_free (out, FALSE);
}
