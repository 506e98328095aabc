/* Own values at the terminal: --lab and those of sets; the bases of sets. */
#include <stdio.h>

#include "cli/verbs.h"

/* Contradictions are told once for each acid, and the verb goes on. */
static void
warn (const EnlRun *run, const char *path, const EnlLab *lab, const EnlKnowledge *knowledge)
{
  const EnlLabJudgement *judgement = enl_estimator_lab (knowledge->estimator);

  for (uint32_t i = 0; judgement && i < judgement->n_sites; i++) {
    const EnlLabSite *site = &judgement->site[i];
    const EnlLabEntry *entry = enl_lab_row (lab, site->shown)->entry;
    g_autofree char *what =
        g_strdup_printf ("%s in %s", entry->name[0] ? entry->name : entry->structure,
                         enl_solvent_label (entry->solvent));
    if (site->contradicts &&
        g_hash_table_add (run->told, g_strconcat (what, entry->structure, NULL)))
      fprintf (stderr, "%s: warning: %s: %s\n", path, what, site->remark);
  }
}

static EnlStatus
read_file (const EnlNames *names, const char *path, EnlLab *into, EnlError *err)
{
  g_autofree char *text = NULL;
  g_autoptr (GError) error = NULL;
  g_autoptr (EnlLab) lab = NULL;
  size_t size = 0;

  if (!g_file_get_contents (path, &text, &size, &error))
    return enl_error_set (err, ENL_ERROR_IO, "check the path", "%.190s", error->message);
  EnlStatus status = enl_lab_parse (names, text, size, &lab, err);
  return status == ENL_OK ? enl_lab_append (into, lab, err) : status;
}

static bool
read_option (EnlRun *run)
{
  EnlError err = {0};
  EnlStatus status = ENL_OK;
  char *const *path = run->options->lab;

  run->lab = enl_lab_new ();
  if (!path)
    return true;
  for (; status == ENL_OK && *path; path++)
    status = read_file (run->knowledge->names, *path, run->lab, &err);
  if (status == ENL_OK)
    status = enl_knowledge_with_lab (run->knowledge, run->lab, &run->own, &err);
  if (status != ENL_OK) {
    enl_input_explain (path[-1], &err);
    return false;
  }
  warn (run, run->options->lab[1] ? "--lab" : path[-1], run->lab, run->own);
  run->knowledge = run->own;
  return true;
}

bool
enl_cli_begin (EnlRun *run, const EnlOptions *options)
{
  *run = (EnlRun){.knowledge = enl_cli_knowledge (), .options = options};
  if (!run->knowledge)
    return false;
  run->base = (EnlKnowledge *)run->knowledge;
  run->told = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, NULL);
  if (read_option (run))
    return true;
  enl_cli_end (run);
  return false;
}

void
enl_cli_end (EnlRun *run)
{
  enl_knowledge_free (run->of_set);
  enl_knowledge_free (run->own);
  enl_knowledge_free (run->base);
  enl_lab_free (run->lab);
  enl_base_table_free (run->bases);
  g_hash_table_unref (run->told);
}

/* ---- sets ---- */

static uint32_t
explain_faults (const char *path, const EnlError *fault, uint32_t n)
{
  uint32_t failed = 0;

  for (uint32_t i = 0; i < n; i++) {
    g_autofree char *name = g_strdup_printf ("%s, lab value %u", path, i + 1);
    if (fault[i].code == ENL_OK)
      continue;
    enl_input_explain (name, &fault[i]);
    failed++;
  }
  return failed;
}

/* Values of the set join those of --lab as long as its substrates are read. */
static uint32_t
enter_set (EnlRun *run, const char *path, const EnlWorkset *set)
{
  uint32_t n = enl_workset_lab_size (set);
  g_autofree EnlError *fault = g_new0 (EnlError, n + 1);
  g_autoptr (EnlLab) of_set = enl_workset_lab_check (set, run->base->names, fault);
  g_autoptr (EnlLab) all = enl_lab_new ();
  uint32_t failed = explain_faults (path, fault, n);
  EnlError err;
  EnlStatus status = enl_lab_append (all, run->lab, &err);

  if (enl_lab_size (of_set) == 0)
    return failed;
  if (status == ENL_OK)
    status = enl_lab_append (all, of_set, &err);
  if (status == ENL_OK)
    status = enl_knowledge_with_lab (run->base, all, &run->of_set, &err);
  if (status != ENL_OK) {
    enl_input_explain (path, &err);
    return failed + 1;
  }
  warn (run, path, all, run->of_set);
  run->knowledge = run->of_set;
  return failed;
}

/* So do its bases. */
static uint32_t
take_bases (EnlRun *run, const char *path, const EnlWorkset *set)
{
  EnlError err;

  if (enl_workset_base_table (set, run->base->bases, &run->bases, &err) == ENL_OK)
    return 0;
  enl_input_explain (path, &err);
  return 1;
}

static uint32_t
visit_set (const char *path, const EnlWorkset *set, void *data)
{
  EnlRun *run = data;

  g_clear_pointer (&run->bases, enl_base_table_free);
  if (set)
    return take_bases (run, path, set) + enter_set (run, path, set);
  run->knowledge = run->own ? run->own : run->base;
  g_clear_pointer (&run->of_set, enl_knowledge_free);
  return 0;
}

uint32_t
enl_cli_visit (EnlRun *run, bool caret, EnlVisit visit)
{
  return enl_input_each_in_sets (run->base->names, run->options->input, caret, visit, visit_set,
                                 run);
}
