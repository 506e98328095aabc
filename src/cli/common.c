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

int
enl_cli_run (const EnlOptions *options, const char *const *column, EnlVisit visit)
{
  EnlKnowledge *knowledge = enl_cli_knowledge ();
  if (!knowledge)
    return 1;
  EnlRun run = {knowledge, options, enl_output_new (options->format, column)};
  uint32_t failed = enl_input_each (knowledge->names, options->input,
                                    options->format == ENL_FORMAT_TEXT, visit, &run);

  enl_output_finish (run.out);
  enl_knowledge_free (knowledge);
  return failed > 0;
}
