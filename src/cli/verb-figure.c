#include <stdio.h>
#include <string.h>

#include "cli/verbs.h"
#include "draw/forms-sheet.h"
#include "draw/paint.h"
#include "draw/substrates-sheet.h"

typedef struct {
  EnlRun run;
  GPtrArray *analysis; /* EnlAnalysis, in the order of the inputs */
  GPtrArray *name;
} Run;

static EnlStatus
visit (const char *name, const EnlMolecule *mol, void *data, EnlError *err)
{
  Run *run = data;
  EnlAnalysis *a;
  EnlStatus status = enl_analysis_new (run->run.knowledge, mol,
                                       run->run.options->conditions.solvent, true, &a, err);

  if (status != ENL_OK)
    return status;
  g_ptr_array_add (run->analysis, a);
  g_ptr_array_add (run->name, g_strdup (name));
  return ENL_OK;
}

static EnlScene *
substrates_scene (const Run *run, const EnlTheme *theme)
{
  g_autofree EnlSubstrateCard *card = g_new0 (EnlSubstrateCard, run->analysis->len);

  for (guint i = 0; i < run->analysis->len; i++) {
    const EnlAnalysis *a = g_ptr_array_index (run->analysis, i);
    card[i] = (EnlSubstrateCard){
        g_ptr_array_index (run->name, i), a->mol, a->sites, a->estimate, a->rank, ENL_NONE, NULL};
  }
  const EnlSubstratesSheet sheet = {
      .card = card, .n_cards = run->analysis->len, .solvent = run->run.options->conditions.solvent};
  return enl_substrates_sheet (&sheet, theme);
}

/* All anions, one below the other. */
static EnlStatus
forms_scene (const Run *run, const EnlTheme *theme, EnlScene **out, EnlError *err)
{
  double y = 0.0;

  *out = enl_scene_new (theme);
  for (guint i = 0; i < run->analysis->len; i++) {
    const EnlAnalysis *a = g_ptr_array_index (run->analysis, i);
    g_autoptr (EnlForms) forms = NULL;
    uint32_t site;
    EnlStatus status = enl_cli_site (a, run->run.options->atom, &site, err);
    if (status == ENL_OK)
      status = enl_forms_of_site (a->mol, a->sites->site[site].atom[0], &forms, err);
    if (status != ENL_OK) {
      g_clear_pointer (out, enl_scene_free);
      return status;
    }
    EnlFormsSheet sheet = {
        .title = g_ptr_array_index (run->name, i), .forms = forms, .layout = a->mol};
    g_autoptr (EnlScene) part = enl_forms_sheet (&sheet, theme);
    EnlRect frame = enl_scene_frame (part);
    enl_scene_append (*out, part, 1.0, -frame.x, y - frame.y);
    y += frame.height;
  }
  return ENL_OK;
}

static EnlStatus
write_figure (const Run *run, const EnlTheme *theme, EnlError *err)
{
  const EnlOptions *o = run->run.options;
  g_autoptr (EnlScene) scene = NULL;
  EnlExport how = {o->width_mm, o->dpi, false, "Enolith"};
  EnlStatus status = ENL_OK;

  if (strcmp (o->view, "forms") == 0)
    status = forms_scene (run, theme, &scene, err);
  else
    scene = substrates_scene (run, theme);
  return status == ENL_OK ? enl_scene_export (scene, o->out, &how, err) : status;
}

static int
wrong_use (const char *text)
{
  fprintf (stderr, "enolith-cli figure: %s; see 'enolith-cli figure --help'\n", text);
  return 2;
}

static int
check_options (const EnlOptions *o)
{
  if (!o->view || (strcmp (o->view, "substrates") != 0 && strcmp (o->view, "forms") != 0))
    return wrong_use ("--view must be substrates or forms");
  if (!o->out || enl_picture_find (o->out) < 0)
    return wrong_use ("--out must name a file that ends in .png, .svg or .pdf");
  if (enl_theme_find (o->theme) < 0)
    return wrong_use ("--theme must be light, dark, print or projector");
  return 0;
}

static int
make_figure (Run *run)
{
  const EnlTheme *theme = enl_theme_get ((EnlThemeName)enl_theme_find (run->run.options->theme));
  uint32_t failed = enl_cli_visit (&run->run, true, visit);
  EnlError err = {0};

  if (run->analysis->len == 0)
    return 1;
  if (write_figure (run, theme, &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    fprintf (stderr, "%s: %s\n", run->run.options->out, message);
    return 1;
  }
  return failed > 0;
}

int
enl_verb_figure (const EnlOptions *options)
{
  int code = check_options (options);
  Run run;

  if (code != 0)
    return code;
  if (!enl_cli_begin (&run.run, options))
    return 1;
  run.analysis = g_ptr_array_new_with_free_func ((GDestroyNotify)enl_analysis_free);
  run.name = g_ptr_array_new_with_free_func (g_free);
  code = make_figure (&run);
  g_ptr_array_unref (run.analysis);
  g_ptr_array_unref (run.name);
  enl_cli_end (&run.run);
  return code;
}
