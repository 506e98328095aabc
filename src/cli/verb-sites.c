#include <math.h>

#include "cli/explain.h"
#include "cli/verbs.h"
#include "core/molecule/elements.h"

static const char *const column[] = {"substrate", "rank",     "atoms",      "element",
                                     "hydrogens", "position", "pka",        "low",
                                     "high",      "basis",    "precedents", NULL};

/* With --explain; the first ones are the same, so that scripts go on. Text shows the reasons below
 * each row instead. */
static const char *const column_tsv[] = {
    "substrate", "rank",  "atoms",      "element", "hydrogens", "position",   "pka", "low",
    "high",      "basis", "precedents", "why",     "interval",  "structures", NULL};
static const char *const column_json[] = {"substrate",  "rank", "atoms", "element", "hydrogens",
                                          "position",   "pka",  "low",   "high",    "basis",
                                          "precedents", "why",  NULL};

/* "ethyl acetoacetate 14.2 (Olmstead & Bordwell ...) | ..." */
static char *
precedents (const EnlReference *reference, const EnlEstimate *e)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < e->n_precedents; i++) {
    const EnlReferenceRow *row = enl_reference_row (reference, e->precedent[i].row);
    g_autofree char *value = g_strdup_printf ("%.4g", row->pka);
    g_string_append_printf (out, "%s%s%s %s in %s (%s)", i ? " | " : "", row->lab ? "lab: " : "",
                            row->name, value, enl_solvent_label (row->solvent), row->source);
  }
  return g_string_free (out, FALSE);
}

/* A full source would make the table of the terminal several screens wide. */
static char *
short_precedents (const EnlReference *reference, const EnlEstimate *e)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < MIN (e->n_precedents, 2); i++) {
    const EnlReferenceRow *row = enl_reference_row (reference, e->precedent[i].row);
    bool same = row->solvent == e->solvent ||
                (row->solvent == ENL_SOLVENT_DMSO && e->solvent == ENL_SOLVENT_THF);
    g_string_append_printf (out, "%s%s%s %.4g%s%s", i ? "; " : "", row->lab ? "lab: " : "",
                            row->name, row->pka, same ? "" : " in ",
                            same ? "" : enl_solvent_label (row->solvent));
  }
  return g_string_free (out, FALSE);
}

/* What --explain adds to the row of site number `site`. */
static void
print_why (const EnlRun *run, const EnlAnalysis *a, uint32_t site)
{
  const EnlReference *reference = a->knowledge->reference;
  const EnlEstimate *e = &a->estimate[site];
  g_autoptr (EnlWhy) why =
      enl_why_new (a->knowledge->estimator, a->mol, a->sites, a->estimate, site);

  if (run->options->format == ENL_FORMAT_JSON) {
    g_autofree char *json = enl_explain_json (reference, why, e);
    enl_output_json (run->out, json);
  } else if (run->options->format == ENL_FORMAT_TSV) {
    g_autofree char *lines = enl_explain_lines (why);
    g_autofree char *structures = enl_explain_structures (reference, e);
    enl_output_text (run->out, lines);
    enl_output_text (run->out, why->width);
    enl_output_text (run->out, structures);
  } else {
    g_autofree char *text = enl_explain_text (reference, why, e);
    enl_output_note (run->out, text);
  }
}

static void
print_site (const EnlRun *run, const char *name, const EnlAnalysis *a, uint32_t rank)
{
  const EnlSite *site = &a->sites->site[a->rank[rank]];
  const EnlEstimate *e = &a->estimate[a->rank[rank]];
  g_autofree char *atoms = enl_cli_atoms (a->mol, site);
  g_autofree char *rows = run->options->format == ENL_FORMAT_TEXT
                              ? short_precedents (run->knowledge->reference, e)
                              : precedents (run->knowledge->reference, e);

  enl_output_text (run->out, name);
  enl_output_integer (run->out, rank + 1);
  enl_output_text (run->out, atoms);
  enl_output_text (run->out, enl_element_symbol (site->element));
  enl_output_integer (run->out, site->hydrogens);
  enl_output_text (run->out, site->position);
  enl_output_number (run->out, e->value, 2);
  enl_output_number (run->out, e->low, 2);
  enl_output_number (run->out, e->high, 2);
  enl_output_text (run->out, enl_basis_text (e->basis));
  enl_output_member (run->out, "remark", e->remark);
  enl_output_member (run->out, "footing", e->footing);
  enl_output_text (run->out, rows);
  if (run->options->explain)
    print_why (run, a, a->rank[rank]);
}

static void
print_reason (const EnlRun *run, const char *name, const char *reason)
{
  enl_output_text (run->out, name);
  enl_output_integer (run->out, 0);
  enl_output_text (run->out, "");
  enl_output_text (run->out, "");
  enl_output_integer (run->out, 0);
  enl_output_text (run->out, reason);
  for (int i = 0; i < 3; i++)
    enl_output_number (run->out, NAN, 2);
  enl_output_text (run->out, "");
  enl_output_text (run->out, "");
  if (run->options->explain && run->options->format == ENL_FORMAT_JSON)
    enl_output_json (run->out, NULL);
  for (int i = 0; run->options->explain && run->options->format == ENL_FORMAT_TSV && i < 3; i++)
    enl_output_text (run->out, "");
}

static EnlStatus
visit (const char *name, const EnlMolecule *mol, void *data, EnlError *err)
{
  const EnlRun *run = data;
  g_autoptr (EnlAnalysis) a = NULL;
  EnlStatus status =
      enl_analysis_new (run->knowledge, mol, run->options->conditions.solvent, false, &a, err);

  if (status != ENL_OK)
    return status;
  if (a->sites->no_enol)
    print_reason (run, name, a->sites->no_enol);
  for (uint32_t i = 0; i < a->sites->n_sites; i++)
    print_site (run, name, a, i);
  g_autofree char *remarks = enl_cli_remarks (a);
  enl_output_block (run->out, remarks);
  return ENL_OK;
}

int
enl_verb_sites (const EnlOptions *options)
{
  if (options->explain && options->format == ENL_FORMAT_TSV)
    return enl_cli_run (options, column_tsv, visit);
  if (options->explain && options->format == ENL_FORMAT_JSON)
    return enl_cli_run (options, column_json, visit);
  return enl_cli_run (options, column, visit);
}
