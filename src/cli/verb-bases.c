#include <math.h>
#include <string.h>

#include "cli/verbs.h"
#include "core/bases/equivalents.h"

/* json has more to say: the columns from JSON_ONLY on are left out of text and tsv. */
static const char *const json_column[] = {
    "substrate", "atom",        "base",      "pkah",        "gap",    "conversion", "low",
    "high",      "selectivity", "verdict",   "cautions",    "name",   "grade",      "reason",
    "hazard",    "needed",      "competing", "recommended", "advice", "at_0.95",    "at_1.00",
    "at_1.05",   "at_2.10",     "footing",   "deferral",    NULL};
#define JSON_ONLY 11

/* The reason, then the cautions: "gap +15.6: ... [H05] Evolves hydrogen ... [R12] ..." */
static char *
cautions (const EnlCandidate *candidate, bool only_ids)
{
  GString *out = g_string_new (candidate->reason);

  for (uint32_t i = 0; i < candidate->n_cautions; i++) {
    const EnlCaution *caution = &candidate->caution[i];
    if (only_ids)
      g_string_append_printf (out, "%s%s", i ? " " : "; ", caution->rule->id);
    else
      g_string_append_printf (out, ". [%s] %s (%s)", caution->rule->id, caution->text,
                              caution->rule->source);
  }
  return g_string_free (out, FALSE);
}

/* Sentences of the hazards alone. */
static char *
hazards (const EnlCandidate *c)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < c->n_cautions; i++)
    if (c->caution[i].rule->effect == ENL_EFFECT_HAZARD)
      g_string_append_printf (out, "%s%s", out->len ? ". " : "", c->caution[i].text);
  return g_string_free (out, FALSE);
}

static EnlStatus
add_json_cells (const EnlRun *run, const EnlQuestion *q, const EnlCandidate *c, EnlError *err)
{
  g_autoptr (EnlEquivalents) e = NULL;
  g_autofree char *hazard = hazards (c);
  EnlStatus status = enl_equivalents_new (q, c, &e, err);

  if (status != ENL_OK)
    return status;
  enl_output_text (run->out, enl_base_table_get (q->bases, c->base)->name);
  enl_output_text (run->out, enl_grade_text (c->grade));
  enl_output_text (run->out, c->reason);
  enl_output_text (run->out, hazard);
  enl_output_number (run->out, e->needed, 0);
  enl_output_text (run->out, e->competing);
  enl_output_number (run->out, e->recommended, 2);
  enl_output_text (run->out, e->reason);
  for (int i = 0; i < ENL_N_EQUIVALENT_STEPS; i++)
    enl_output_number (run->out, e->step[i].conversion, 6);
  enl_output_text (run->out, enl_footing_text (q->conditions->solvent));
  enl_output_text (run->out, enl_rule_table_deferral (q->rules));
  return ENL_OK;
}

static EnlStatus
print_candidate (const EnlRun *run, const char *name, uint32_t position, const EnlQuestion *q,
                 const EnlCandidate *c, EnlError *err)
{
  g_autofree char *text = cautions (c, run->options->format == ENL_FORMAT_TEXT);

  enl_output_text (run->out, name);
  enl_output_integer (run->out, position);
  enl_output_text (run->out, enl_base_table_get (q->bases, c->base)->id);
  enl_output_number (run->out, c->pkah, 2);
  enl_output_number (run->out, c->gap, 2);
  enl_output_number (run->out, c->conversion, 6);
  enl_output_number (run->out, c->low, 6);
  enl_output_number (run->out, c->high, 6);
  enl_output_number (run->out, c->selectivity, 4);
  enl_output_text (run->out, c->words);
  enl_output_member (run->out, "remark", q->estimate[q->target].remark);
  enl_output_member (run->out, "site_footing", q->estimate[q->target].footing);
  enl_output_text (run->out, text);
  return run->options->format == ENL_FORMAT_JSON ? add_json_cells (run, q, c, err) : ENL_OK;
}

/* Below the table in text: what the ids stand for is told for the best base only, with its
 * equivalents; --format tsv and json tell it for all. */
static EnlStatus
print_advice (const EnlRun *run, const EnlQuestion *q, const EnlCandidate *best, EnlError *err)
{
  g_autoptr (EnlEquivalents) e = NULL;
  const char *name = enl_base_table_get (q->bases, best->base)->name;
  EnlStatus status = enl_equivalents_new (q, best, &e, err);

  if (status != ENL_OK)
    return status;
  g_autofree char *advice = enl_equivalents_text (e, name);
  GString *out = g_string_new (enl_footing_text (q->conditions->solvent));
  g_string_append_printf (out, "\n%s: %s; %s.\n", name, enl_grade_text (best->grade), best->reason);
  for (uint32_t i = 0; i < best->n_cautions; i++)
    g_string_append_printf (out, "  [%s] %s (%s)\n", best->caution[i].rule->id,
                            best->caution[i].text, best->caution[i].rule->source);
  g_string_append_printf (out, "%s%s", advice, enl_rule_table_deferral (q->rules));
  enl_output_block (run->out, out->str);
  g_string_free (out, TRUE);
  return ENL_OK;
}

/* What to know about the value of the site that all gaps rest on. */
static void
print_value (const EnlRun *run, const EnlAnalysis *a, uint32_t site)
{
  const EnlEstimate *e = &a->estimate[site];
  g_autofree char *line = g_strdup_printf (
      "  site: %s, pKa %.1f (%.1f to %.1f) in %s, %s%s%s", a->sites->site[site].position, e->value,
      e->low, e->high, enl_solvent_heading (e->solvent), enl_basis_text (e->basis),
      e->remark ? "; " : "", e->remark ? e->remark : "");

  enl_output_block (run->out, line);
  if (e->footing) {
    g_autofree char *footing = g_strdup_printf ("  %s", e->footing);
    enl_output_block (run->out, footing);
  }
}

static EnlStatus
visit (const char *name, const EnlMolecule *mol, void *data, EnlError *err)
{
  const EnlRun *run = data;
  g_autoptr (EnlAnalysis) a = NULL;
  g_autoptr (EnlComparison) comparison = NULL;
  uint32_t site;
  EnlStatus status =
      enl_analysis_new (run->knowledge, mol, run->options->conditions.solvent, false, &a, err);

  if (status == ENL_OK)
    status = enl_cli_site (a, run->options->atom, &site, err);
  if (status != ENL_OK)
    return status;
  EnlQuestion question = enl_analysis_question (a, run->knowledge, site, &run->options->conditions);
  if (run->bases)
    question.bases = run->bases;
  status = enl_bases_compare (&question, &comparison, err);
  uint32_t position = enl_molecule_atom (a->mol, a->sites->site[site].atom[0])->input;
  for (uint32_t i = 0; status == ENL_OK && i < comparison->n_candidates; i++)
    status = print_candidate (run, name, position, &question, &comparison->candidate[i], err);
  if (status == ENL_OK)
    print_value (run, a, site);
  if (status == ENL_OK && run->options->format == ENL_FORMAT_TEXT)
    status = print_advice (run, &question, &comparison->candidate[0], err);
  return status;
}

int
enl_verb_bases (const EnlOptions *options)
{
  const char *column[ENL_COUNT (json_column)] = {NULL};
  size_t n = options->format == ENL_FORMAT_JSON ? ENL_COUNT (json_column) : JSON_ONLY;

  memcpy (column, json_column, n * sizeof *column);
  return enl_cli_run (options, column, visit);
}
