#include <math.h>

#include "cli/verbs.h"

static const char *const column[] = {"substrate",   "atom",       "base",     "pkah",
                                     "gap",         "conversion", "low",      "high",
                                     "selectivity", "verdict",    "cautions", NULL};

/* The reason, then the cautions: "gap +15.6: ... [H05] Evolves hydrogen ... [R12] ..." */
static char *
cautions (const EnlCandidate *candidate, bool only_ids)
{
  GString *out = g_string_new (candidate->reason);

  for (uint32_t i = 0; i < candidate->n_cautions; i++) {
    const EnlCaution *caution = candidate->caution[i];
    if (only_ids)
      g_string_append_printf (out, "%s%s", i ? " " : "; ", caution->id);
    else
      g_string_append_printf (out, ". [%s] %s (%s)", caution->id, caution->text, caution->source);
  }
  return g_string_free (out, FALSE);
}

static void
print_candidate (const EnlRun *run, const char *name, uint32_t position, const EnlCandidate *c)
{
  const EnlBase *base = enl_base_table_get (run->knowledge->bases, c->base);
  g_autofree char *text = cautions (c, run->options->format == ENL_FORMAT_TEXT);

  enl_output_text (run->out, name);
  enl_output_integer (run->out, position);
  enl_output_text (run->out, base->id);
  enl_output_number (run->out, c->pkah, 2);
  enl_output_number (run->out, c->gap, 2);
  enl_output_number (run->out, c->conversion, 6);
  enl_output_number (run->out, c->low, 6);
  enl_output_number (run->out, c->high, 6);
  enl_output_number (run->out, c->selectivity, 4);
  enl_output_text (run->out, enl_verdict_text (c->verdict));
  enl_output_text (run->out, text);
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
  if (status == ENL_OK)
    status = enl_bases_compare (run->knowledge->bases, run->knowledge->cautions, a->sites,
                                a->estimate, site, &run->options->conditions, &comparison, err);
  if (status != ENL_OK)
    return status;
  uint32_t position = enl_molecule_atom (a->mol, a->sites->site[site].atom[0])->input;
  for (uint32_t i = 0; i < comparison->n_candidates; i++)
    print_candidate (run, name, position, &comparison->candidate[i]);
  enl_output_block (run->out, enl_caution_deferral (run->knowledge->cautions));
  return ENL_OK;
}

int
enl_verb_bases (const EnlOptions *options)
{
  return enl_cli_run (options, column, visit);
}
