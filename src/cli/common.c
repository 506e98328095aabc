#include <stdio.h>

#include "cli/verbs.h"
#include "resources/model.h"

EnlKnowledge *
enl_cli_knowledge (void)
{
  EnlKnowledge *knowledge = NULL;
  EnlError err = {0};
  size_t size;
  const char *model = enl_model ("model.bin", &size);

  if (enl_knowledge_open (model, size, &knowledge, &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    fprintf (stderr, "enolith-cli: the program's own tables are damaged: %s\n", message);
  }
  return knowledge;
}

EnlStatus
enl_cli_site (const EnlAnalysis *analysis, uint32_t position, uint32_t *site, EnlError *err)
{
  uint32_t atom = ENL_NONE;

  for (uint32_t i = 0; position && i < enl_molecule_atoms (analysis->mol); i++)
    if (enl_molecule_atom (analysis->mol, i)->input == position)
      atom = i;
  if (position && atom == ENL_NONE)
    return enl_error_set (err, ENL_ERROR_UNKNOWN, "choose one that 'enolith-cli sites' lists",
                          "no atom %u (a plain hydrogen or beyond the last atom)", position);
  *site = enl_analysis_site (analysis, atom);
  if (*site != ENL_NONE)
    return ENL_OK;
  if (position)
    return enl_error_set (err, ENL_ERROR_UNKNOWN, "choose one that 'enolith-cli sites' lists",
                          "atom %u is no acidic site", position);
  return enl_error_set (err, ENL_ERROR_UNKNOWN, "choose another compound", "no acidic hydrogen: %s",
                        analysis->sites->no_enol ? analysis->sites->no_enol : "no site found");
}

char *
enl_cli_atoms (const EnlMolecule *mol, const EnlSite *site)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < site->n_atoms; i++)
    g_string_append_printf (out, i ? ",%u" : "%u", enl_molecule_atom (mol, site->atom[i])->input);
  return g_string_free (out, FALSE);
}

/* One line a sentence, in the order of ranks: "site 1: ..." or "sites 1, 3: ...". */
static void
list_sentences (const EnlAnalysis *a, bool footing, GString *out)
{
  for (uint32_t i = 0; i < a->sites->n_sites; i++) {
    const EnlEstimate *e = &a->estimate[a->rank[i]];
    const char *sentence = footing ? e->footing : e->remark;
    GString *sites = g_string_new (NULL);
    uint32_t n = 0;
    bool said = !sentence;
    for (uint32_t k = 0; !said && k < a->sites->n_sites; k++) {
      const EnlEstimate *other = &a->estimate[a->rank[k]];
      if (g_strcmp0 (footing ? other->footing : other->remark, sentence) != 0)
        continue;
      said = k < i;
      g_string_append_printf (sites, n++ ? ", %u" : "%u", k + 1);
    }
    if (!said)
      g_string_append_printf (out, "  site%s %s: %s\n", n > 1 ? "s" : "", sites->str, sentence);
    g_string_free (sites, TRUE);
  }
}

char *
enl_cli_remarks (const EnlAnalysis *a)
{
  GString *out = g_string_new (NULL);

  list_sentences (a, false, out);
  list_sentences (a, true, out);
  return g_string_free (out, FALSE);
}

int
enl_cli_run (const EnlOptions *options, const char *const *column, EnlVisit visit)
{
  EnlRun run;

  if (!enl_cli_begin (&run, options))
    return 1;
  run.out = enl_output_new (options->format, column);
  uint32_t failed = enl_cli_visit (&run, options->format == ENL_FORMAT_TEXT, visit);
  enl_output_finish (run.out);
  enl_cli_end (&run);
  return failed > 0;
}
