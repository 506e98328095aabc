#include <stdio.h>
#include <string.h>

#include "cli/verbs.h"
#include "draw/paint.h"
#include "draw/report-html.h"
#include "draw/report-pages.h"

typedef struct {
  EnlRun run;
  GPtrArray *mol, *name; /* of the inputs that are no set */
} Run;

static EnlStatus
visit (const char *name, const EnlMolecule *mol, void *data, EnlError *err)
{
  Run *run = data;

  (void)err;
  g_ptr_array_add (run->mol, enl_molecule_copy (mol));
  g_ptr_array_add (run->name, g_strdup (name));
  return ENL_OK;
}

static bool
is_html (const char *path)
{
  g_autofree char *lower = g_ascii_strdown (path, -1);

  return g_str_has_suffix (lower, ".html");
}

static EnlStatus
write_report (const EnlReport *report, const char *path, EnlError *err)
{
  const EnlTheme *theme = enl_theme_get (ENL_THEME_PRINT);

  if (is_html (path)) {
    g_autofree char *html = NULL;
    EnlStatus status = enl_report_html (report, theme, &html, err);
    return status == ENL_OK ? enl_file_write (path, html, strlen (html), err) : status;
  }
  g_autoptr (GPtrArray) pages = enl_report_pages (report, theme);
  g_autoptr (GByteArray) bytes = NULL;
  EnlStatus status = enl_pages_encode (pages, report->title, &bytes, err);
  return status == ENL_OK ? enl_file_write (path, bytes->data, bytes->len, err) : status;
}

/* Substrates that cannot be read stand in the report with the reason, and count as failed. */
static uint32_t
tell_faults (const EnlReport *report)
{
  uint32_t failed = 0;

  for (uint32_t i = 0; i < report->n_substrates; i++)
    if (report->substrate[i].fault) {
      fprintf (stderr, "%s: %s\n", report->substrate[i].name, report->substrate[i].fault);
      failed++;
    }
  return failed;
}

static int
finish (const char *path, EnlStatus status, const EnlReport *report, const EnlError *err)
{
  EnlError problem = *err;

  if (status == ENL_OK)
    status = write_report (report, path, &problem);
  if (status != ENL_OK) {
    enl_input_explain (path, &problem);
    return 1;
  }
  return tell_faults (report) > 0;
}

/* A set with its own conditions, bases and lab values. */
static int
report_on_set (Run *run, const char *path)
{
  g_autoptr (EnlWorkset) set = NULL;
  g_autoptr (EnlReport) report = NULL;
  g_autoptr (EnlKnowledge) with_lab = NULL;
  EnlError err = {0};
  EnlStatus status = enl_workset_load (path, &set, &err);

  if (status != ENL_OK) {
    enl_input_explain (path, &err);
    return 1;
  }
  const EnlKnowledge *knowledge = run->run.knowledge;
  if (enl_workset_lab_size (set) > 0) {
    g_autoptr (EnlLab) lab = enl_workset_lab_check (set, knowledge->names, NULL);
    status = enl_knowledge_with_lab (run->run.base, lab, &with_lab, &err);
    knowledge = with_lab;
  }
  g_autofree char *name = g_path_get_basename (path);
  name[strlen (name) - strlen (ENL_WORKSET_SUFFIX)] = '\0';
  if (status == ENL_OK)
    status = enl_report_of_set (knowledge, set, name, &report, &err);
  return finish (run->run.options->out, status, report, &err);
}

/* Structures from the command line, lists or files. */
static int
report_on_structures (Run *run)
{
  const EnlOptions *o = run->run.options;
  uint32_t failed = enl_cli_visit (&run->run, true, visit);
  g_autofree EnlReportInput *input = g_new0 (EnlReportInput, run->mol->len + 1);
  g_autoptr (EnlReport) report = NULL;
  EnlError err = {0};

  for (guint i = 0; i < run->mol->len; i++)
    input[i] = (EnlReportInput){.name = g_ptr_array_index (run->name, i),
                                .mol = g_ptr_array_index (run->mol, i)};
  EnlStatus status = enl_report_new (run->run.knowledge, input, run->mol->len, NULL, &o->conditions,
                                     "Acidity report", &report, &err);
  int code = finish (o->out, status, report, &err);
  return failed > 0 ? 1 : code;
}

static int
wrong_use (const char *text)
{
  fprintf (stderr, "enolith-cli report: %s; see 'enolith-cli report --help'\n", text);
  return 2;
}

static int
check_options (const EnlOptions *o)
{
  uint32_t sets = 0, inputs = g_strv_length (o->input);

  if (!o->out || !(is_html (o->out) || enl_picture_find (o->out) == ENL_PICTURE_PDF))
    return wrong_use ("--out must name a file that ends in .pdf or .html");
  for (uint32_t i = 0; i < inputs; i++)
    sets += g_str_has_suffix (o->input[i], ENL_WORKSET_SUFFIX);
  if (sets > 0 && inputs > 1)
    return wrong_use ("a set has its own conditions: report on one set at a time");
  return 0;
}

int
enl_verb_report (const EnlOptions *options)
{
  int code = check_options (options);
  Run run;

  if (code != 0)
    return code;
  if (!enl_cli_begin (&run.run, options))
    return 1;
  run.mol = g_ptr_array_new_with_free_func ((GDestroyNotify)enl_molecule_free);
  run.name = g_ptr_array_new_with_free_func (g_free);
  code = g_str_has_suffix (options->input[0], ENL_WORKSET_SUFFIX)
             ? report_on_set (&run, options->input[0])
             : report_on_structures (&run);
  g_ptr_array_unref (run.mol);
  g_ptr_array_unref (run.name);
  enl_cli_end (&run.run);
  return code;
}
