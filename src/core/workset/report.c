#include "core/workset/report.h"

#include <math.h>
#include <string.h>

#include "core/bases/equivalents.h"
#include "core/notation/read.h"

/* Enough for a smooth line. */
#define CURVE_POINTS 121
/* Nearest measured compounds told for an estimate. */
#define PRECEDENTS 2

typedef struct {
  const EnlKnowledge *knowledge;
  const EnlWorkset *set;
  EnlReport *report;
} Making;

/* ---- words ---- */

/* A point in every locale, a real minus sign is left to the painter. */
static char *
number_text (double value, const char *format)
{
  char text[G_ASCII_DTOSTR_BUF_SIZE];

  g_ascii_formatd (text, sizeof text, format, value);
  return g_strdup (text);
}

static char *
conditions_text (const EnlConditions *c)
{
  g_autofree char *equivalents = number_text (c->equivalents, "%.4g");
  g_autofree char *concentration = number_text (c->concentration, "%.3g");
  g_autofree char *temperature = number_text (c->temperature, "%.4g");
  g_autofree char *water = number_text (c->water, "%.3g");

  return g_strdup_printf ("pK values for %s at 25\u00A0°C; %s equivalents of base, substrate "
                          "%s\u00A0mol/L, %s\u00A0°C%s%s%s",
                          enl_solvent_heading (c->solvent), equivalents, concentration, temperature,
                          c->water > 0 ? ", " : "", c->water > 0 ? water : "",
                          c->water > 0 ? " equivalents of water" : "");
}

/* The numbers of atoms set low (Unicode), a charge left as it is. */
static char *
lowered_formula (const EnlMolecule *mol)
{
  g_autofree char *formula = enl_molecule_formula (mol);
  GString *out = g_string_new (NULL);
  bool low = false;

  for (const char *c = formula; *c; c++) {
    low = g_ascii_isdigit (*c) && (low || (c > formula && g_ascii_isalpha (c[-1])));
    if (low)
      g_string_append_unichar (out, 0x2080 + (gunichar)g_ascii_digit_value (*c));
    else
      g_string_append_c (out, *c);
  }
  return g_string_free (out, FALSE);
}

static char *
identity_text (const EnlAnalysis *a)
{
  g_autofree char *formula = lowered_formula (a->mol);
  g_autofree char *mass = number_text (enl_molecule_mass (a->mol), "%.2f");

  return g_strdup_printf ("%s, %s\u00A0g/mol%s%s", formula, mass, a->known_as ? ", " : "",
                          a->known_as ? a->known_as : "");
}

/* ---- sources ---- */

/* Number of a source from 1; a new one is appended. */
static guint
cite (EnlReport *report, const char *text)
{
  guint index;

  if (!g_ptr_array_find_with_equal_func (report->source, text, g_str_equal, &index)) {
    index = report->source->len;
    g_ptr_array_add (report->source, g_strdup (text));
  }
  return index + 1;
}

static guint
cite_row (const Making *m, const EnlAnalysis *a, uint32_t row)
{
  const EnlReferenceRow *r = enl_reference_row (a->knowledge->reference, row);
  g_autofree char *pka = number_text (r->pka, "%.4g");
  g_autofree char *text =
      g_strdup_printf ("%s, pKa %s in %s%s: %s", r->name, pka, enl_solvent_label (r->solvent),
                       r->lab ? " (lab value)" : "", r->source[0] ? r->source : "no source given");

  return cite (m->report, text);
}

/* " [1,3]" or "". */
static char *
citations (const Making *m, const EnlAnalysis *a, const EnlEstimate *e)
{
  uint32_t most = e->basis == ENL_BASIS_ESTIMATED ? PRECEDENTS : 1;
  uint32_t n = MIN (e->n_precedents, most);
  guint number[PRECEDENTS] = {0};

  if (n == 0)
    return g_strdup ("");
  for (uint32_t i = 0; i < n; i++)
    number[i] = cite_row (m, a, e->precedent[i].row);
  if (n == 1)
    return g_strdup_printf (" [%u]", number[0]);
  return g_strdup_printf (" [%u,%u]", MIN (number[0], number[1]), MAX (number[0], number[1]));
}

/* ---- sites ---- */

static char *
value_text (const Making *m, const EnlAnalysis *a, const EnlEstimate *e)
{
  g_autofree char *value = number_text (e->value, "%.1f");
  g_autofree char *low = number_text (e->low, "%.1f");
  g_autofree char *high = number_text (e->high, "%.1f");
  g_autofree char *cited = citations (m, a, e);
  g_autofree char *interval = e->basis == ENL_BASIS_MEASURED
                                  ? g_strdup ("")
                                  : g_strdup_printf (", 90\u00A0%% interval %s to %s", low, high);

  return g_strdup_printf ("pKa %s in %s%s, %s%s%s", value, enl_solvent_heading (e->solvent),
                          interval, enl_basis_text (e->basis),
                          e->outside ? ", outside experience" : "", cited);
}

static void
take_sites (const Making *m, EnlReportSubstrate *s)
{
  const EnlAnalysis *a = s->analysis;

  s->n_sites = MIN (a->sites->n_sites, ENL_REPORT_SITES);
  s->more_sites = a->sites->n_sites - s->n_sites;
  s->site = g_new0 (EnlReportSite, s->n_sites);
  for (uint32_t i = 0; i < s->n_sites; i++) {
    const EnlSite *site = &a->sites->site[a->rank[i]];
    s->site[i] = (EnlReportSite){
        .rank = i + 1,
        .basis = a->estimate[a->rank[i]].basis,
        .position = g_strdup_printf ("%s, %u\u00A0H", site->position, site->hydrogens),
        .value = value_text (m, a, &a->estimate[a->rank[i]])};
  }
}

/* ---- base ---- */

static const EnlCandidate *
choose (const Making *m, const EnlComparison *comparison, uint32_t index, bool *chosen)
{
  const EnlSelection *selection = m->set ? enl_workset_selection (m->set) : NULL;
  int wanted = -1;

  if (selection && selection->substrate == index && selection->base && selection->base[0])
    wanted = enl_base_table_find (m->report->bases, selection->base);
  *chosen = wanted >= 0;
  for (uint32_t i = 0; *chosen && i < comparison->n_candidates; i++)
    if ((int)comparison->candidate[i].base == wanted)
      return &comparison->candidate[i];
  return &comparison->candidate[0];
}

/* The share, and what it rests on. */
static char *
anion_text (const Making *m, const EnlBase *base, const EnlCandidate *c, const EnlEstimate *e)
{
  const EnlConditions *at = &m->report->at;
  g_autofree char *equivalents = number_text (at->equivalents, "%.4g");
  g_autofree char *gap = number_text (c->gap, "%+.1f");
  g_autofree char *pkah = number_text (c->pkah, "%.1f");
  g_autofree char *source = g_strdup_printf ("pKaH of %s: %s", base->name, base->source);

  if (isnan (c->conversion))
    return g_strdup_printf ("Share of the anion: not told (%s)", enl_verdict_text (c->verdict));
  g_autofree char *share = enl_share_text (c->conversion);
  g_autofree char *low = enl_share_text (c->low), *high = enl_share_text (c->high);
  GString *out = g_string_new (NULL);
  g_string_append_printf (
      out,
      "The site has lost its hydrogen in %s of the substrate (90\u00A0%% interval "
      "%s to %s) at %s equivalents",
      share, low, high, equivalents);
  if (!isnan (c->gap))
    g_string_append_printf (
        out, "; gap %s: pKaH %s of the base [%u] against the %s pKa, both for %s", gap, pkah,
        cite (m->report, source), enl_basis_text (e->basis), enl_solvent_heading (at->solvent));
  return g_string_free (out, FALSE);
}

static bool
holds_already (GArray *caution, const EnlCaution *c, const char *number)
{
  for (guint i = 0; i < caution->len; i++) {
    EnlReportCaution *known = &g_array_index (caution, EnlReportCaution, i);
    if (strcmp (known->id, c->rule->id) != 0 || strcmp (known->text, c->text) != 0)
      continue;
    char *where = g_strdup_printf ("%s, %s", known->where, number);
    g_free (known->where);
    known->where = where;
    return true;
  }
  return false;
}

static void
take_cautions (const Making *m, const EnlCandidate *c, uint32_t index)
{
  g_autofree char *number = g_strdup_printf ("%u", index + 1);

  for (uint32_t i = 0; i < c->n_cautions; i++) {
    const EnlRule *rule = c->caution[i].rule;
    if (rule->effect == ENL_EFFECT_NOTE ||
        holds_already (m->report->caution, &c->caution[i], number))
      continue;
    EnlReportCaution one = {.where = g_strdup (number),
                            .id = rule->id,
                            .effect = rule->effect,
                            .severity = rule->severity,
                            .text = g_strdup (c->caution[i].text)};
    g_array_append_val (m->report->caution, one);
  }
}

/* Rules are cited behind all values, so that their numbers come last. */
static void
cite_rules (const Making *m, const EnlRuleTable *rules)
{
  for (guint i = 0; i < m->report->caution->len; i++) {
    const EnlReportCaution *c = &g_array_index (m->report->caution, EnlReportCaution, i);
    for (uint32_t k = 0; k < enl_rule_table_size (rules); k++) {
      const EnlRule *rule = enl_rule_table_get (rules, k);
      g_autofree char *text = g_strdup_printf ("%s: %s", rule->id, rule->source);
      if (strcmp (rule->id, c->id) == 0 && strcmp (rule->source, "common practice") != 0)
        cite (m->report, text);
    }
  }
}

static EnlStatus
fill_base (const Making *m, EnlReportSubstrate *s, const EnlQuestion *q, const EnlCandidate *c,
           EnlError *err)
{
  g_autoptr (EnlEquivalents) e = NULL;
  EnlStatus status = enl_equivalents_new (q, c, &e, err);

  if (status == ENL_OK)
    status = enl_curve_new (q, c, CURVE_POINTS, &s->curve, err);
  if (status != ENL_OK)
    return status;
  s->base = enl_base_table_get (q->bases, c->base);
  s->base_title = g_strdup_printf ("%s, %s", s->base->name,
                                   s->chosen ? "the chosen base" : "first in the ranking");
  s->outcome = g_strdup_printf ("%s: %s", c->words, c->reason);
  if (isnan (e->recommended)) {
    s->equivalents = g_strdup_printf ("Equivalents: %s", e->reason);
  } else {
    g_autofree char *number = number_text (e->recommended, "%.3g");
    s->equivalents = g_strdup_printf ("Equivalents: %s recommended, %s%s%s", number, e->reason,
                                      e->competing[0] ? "; " : "", e->competing);
  }
  s->anion = anion_text (m, s->base, c, &q->estimate[q->target]);
  s->composition = enl_curve_words (s->curve, s->base->name);
  take_cautions (m, c, (uint32_t)(s - m->report->substrate));
  return ENL_OK;
}

static EnlStatus
take_base (const Making *m, EnlReportSubstrate *s, uint32_t index, EnlError *err)
{
  g_autoptr (EnlComparison) comparison = NULL;
  EnlQuestion q = enl_analysis_question (s->analysis, m->knowledge, s->selected, &m->report->at);

  q.bases = m->report->bases;
  EnlStatus status = enl_bases_compare (&q, &comparison, err);
  if (status != ENL_OK)
    return status;
  const EnlCandidate *c = choose (m, comparison, index, &s->chosen);
  return fill_base (m, s, &q, c, err);
}

/* ---- substrates ---- */

static uint32_t
wanted_atom (const Making *m, uint32_t index)
{
  const EnlSelection *selection = m->set ? enl_workset_selection (m->set) : NULL;

  return selection && selection->substrate == index ? selection->atom : ENL_NONE;
}

static EnlStatus
analyse (const Making *m, const EnlMolecule *mol, EnlReportSubstrate *s, uint32_t index,
         EnlError *err)
{
  EnlStatus status =
      enl_analysis_new (m->knowledge, mol, m->report->at.solvent, true, &s->analysis, err);

  if (status != ENL_OK)
    return status;
  g_free (s->identity);
  s->identity = identity_text (s->analysis);
  s->no_enol = g_strdup (s->analysis->sites->no_enol);
  take_sites (m, s);
  s->selected = enl_analysis_site (s->analysis, wanted_atom (m, index));
  if (s->selected == ENL_NONE)
    s->selected = enl_analysis_site (s->analysis, ENL_NONE);
  return s->selected == ENL_NONE ? ENL_OK : take_base (m, s, index, err);
}

static void
take_substrate (const Making *m, const EnlReportInput *input, uint32_t index)
{
  EnlReportSubstrate *s = &m->report->substrate[index];
  EnlError err = {0};

  s->name = g_strdup (input->name);
  s->note = g_strdup (input->note ? input->note : "");
  s->identity = g_strdup ("");
  s->selected = ENL_NONE;
  s->fault = g_strdup (input->fault);
  if (input->mol && analyse (m, input->mol, s, index, &err) != ENL_OK)
    s->fault = enl_error_message (&err);
}

static void
clear_caution (gpointer data)
{
  EnlReportCaution *c = data;

  g_free (c->where);
  g_free (c->text);
}

static int
by_weight (const void *left, const void *right)
{
  const EnlReportCaution *a = left, *b = right;

  if (a->effect != b->effect)
    return a->effect < b->effect ? -1 : 1;
  if (a->severity != b->severity)
    return a->severity > b->severity ? -1 : 1;
  return strcmp (a->id, b->id);
}

EnlStatus
enl_report_new (const EnlKnowledge *knowledge, const EnlReportInput *input, uint32_t n,
                const EnlWorkset *set, const EnlConditions *conditions, const char *title,
                EnlReport **out, EnlError *err)
{
  g_autoptr (EnlReport) report = g_new0 (EnlReport, 1);
  Making m = {knowledge, set, report};
  EnlStatus status = enl_conditions_check (conditions, err);

  *out = NULL;
  report->caution = g_array_new (FALSE, FALSE, sizeof (EnlReportCaution));
  g_array_set_clear_func (report->caution, clear_caution);
  report->source = g_ptr_array_new_with_free_func (g_free);
  if (status == ENL_OK && n == 0)
    status = enl_error_set (err, ENL_ERROR_EMPTY, "add a substrate first", "nothing to report on");
  if (status == ENL_OK && set)
    status = enl_workset_base_table (set, knowledge->bases, &report->bases, err);
  if (status != ENL_OK)
    return status;
  if (!report->bases)
    report->bases = enl_base_table_extend (knowledge->bases, NULL, 0);
  report->title = g_strdup (title);
  report->at = *conditions;
  report->conditions = conditions_text (conditions);
  report->footing = enl_footing_text (conditions->solvent);
  report->deferral = enl_rule_table_deferral (knowledge->rules);
  report->n_substrates = n;
  report->substrate = g_new0 (EnlReportSubstrate, n);
  for (uint32_t i = 0; i < n; i++)
    take_substrate (&m, &input[i], i);
  g_array_sort (report->caution, by_weight);
  cite_rules (&m, knowledge->rules);
  *out = g_steal_pointer (&report);
  return ENL_OK;
}

EnlStatus
enl_report_of_set (const EnlKnowledge *knowledge, const EnlWorkset *set, const char *title,
                   EnlReport **out, EnlError *err)
{
  uint32_t n = enl_workset_size (set);
  g_autofree EnlReportInput *input = g_new0 (EnlReportInput, n);
  g_autoptr (GPtrArray) faults = g_ptr_array_new_with_free_func (g_free);
  g_autoptr (GPtrArray) mols = g_ptr_array_new_with_free_func ((GDestroyNotify)enl_molecule_free);

  for (uint32_t i = 0; i < n; i++) {
    const EnlSubstrate *s = enl_workset_get (set, i);
    EnlMolecule *mol = NULL;
    EnlError fault;
    input[i] = (EnlReportInput){.name = s->name[0] ? s->name : s->text, .note = s->note};
    if (enl_read_structure (knowledge->names, s->text, strlen (s->text), &mol, NULL, &fault) ==
        ENL_OK) {
      g_ptr_array_add (mols, mol);
      input[i].mol = mol;
    } else {
      char *message = enl_error_message (&fault);
      g_ptr_array_add (faults, message);
      input[i].fault = message;
    }
  }
  return enl_report_new (knowledge, input, n, set, enl_workset_conditions (set), title, out, err);
}

static void
clear_substrate (EnlReportSubstrate *s)
{
  char *text[] = {s->name,       s->note,    s->identity,    s->fault, s->no_enol,
                  s->base_title, s->outcome, s->equivalents, s->anion, s->composition};

  for (size_t i = 0; i < ENL_COUNT (text); i++)
    g_free (text[i]);
  for (uint32_t i = 0; i < s->n_sites; i++) {
    g_free (s->site[i].position);
    g_free (s->site[i].value);
  }
  g_free (s->site);
  enl_curve_free (s->curve);
  enl_analysis_free (s->analysis);
}

void
enl_report_free (EnlReport *report)
{
  if (!report)
    return;
  for (uint32_t i = 0; i < report->n_substrates; i++)
    clear_substrate (&report->substrate[i]);
  g_free (report->substrate);
  g_free (report->title);
  g_free (report->conditions);
  g_array_unref (report->caution);
  g_ptr_array_unref (report->source);
  enl_base_table_free (report->bases);
  g_free (report);
}
