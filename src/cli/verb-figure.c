#include <math.h>
#include <stdio.h>
#include <string.h>

#include "cli/verbs.h"
#include "core/bases/equilibrium.h"
#include "draw/curve-scene.h"
#include "draw/forms-sheet.h"
#include "draw/matrix-scene.h"
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

/* ---- bases ---- */

/* The candidate of that name, or without one the best that has a curve. */
static EnlStatus
find_candidate (const Run *run, const EnlComparison *comparison, const char *name,
                const EnlCandidate **out, EnlError *err)
{
  uint32_t base = 0;

  if (name) {
    EnlStatus status = enl_base_table_look_up (run->run.knowledge->bases, name, &base, err);
    if (status != ENL_OK)
      return status;
  }
  *out = &comparison->candidate[0];
  for (uint32_t i = comparison->n_candidates; i-- > 0;) {
    const EnlCandidate *c = &comparison->candidate[i];
    if (name ? c->base == base : !isnan (c->conversion))
      *out = c;
  }
  return ENL_OK;
}

static EnlStatus
compare (const Run *run, guint index, uint32_t *site, EnlComparison **out, EnlError *err)
{
  const EnlAnalysis *a = g_ptr_array_index (run->analysis, index);
  EnlStatus status = enl_cli_site (a, run->run.options->atom, site, err);

  if (status != ENL_OK)
    return status;
  EnlQuestion q =
      enl_analysis_question (a, run->run.knowledge, *site, &run->run.options->conditions);
  return enl_bases_compare (&q, out, err);
}

static EnlStatus
curve_scene (const Run *run, guint index, const char *base, const EnlTheme *theme, EnlScene **out,
             EnlError *err)
{
  const EnlAnalysis *a = g_ptr_array_index (run->analysis, index);
  const EnlConditions *conditions = &run->run.options->conditions;
  g_autoptr (EnlComparison) comparison = NULL;
  g_autoptr (EnlCurve) curve = NULL;
  const EnlCandidate *c = NULL;
  uint32_t site;
  EnlStatus status = compare (run, index, &site, &comparison, err);

  if (status == ENL_OK)
    status = find_candidate (run, comparison, base, &c, err);
  if (status != ENL_OK)
    return status;
  EnlQuestion q = enl_analysis_question (a, run->run.knowledge, site, conditions);
  status = enl_curve_new (&q, c, ENL_SWEEP_POINTS, &curve, err);
  if (status != ENL_OK)
    return status;
  const EnlCurveSheet sheet = {.curve = curve,
                               .substrate = g_ptr_array_index (run->name, index),
                               .base = enl_base_table_get (q.bases, c->base)->name,
                               .conditions = conditions,
                               .footing = enl_footing_text (conditions->solvent)};
  *out = enl_curve_scene (&sheet, theme);
  return ENL_OK;
}

/* All curves, a substrate after the other with each base, one below the other. */
static EnlStatus
curves_scene (const Run *run, const EnlTheme *theme, EnlScene **out, EnlError *err)
{
  char *const best[] = {NULL};
  char *const *base = run->run.options->base ? run->run.options->base : best;
  double y = 0.0, width = 0.0;

  *out = enl_scene_new (theme);
  for (guint i = 0; i < run->analysis->len; i++) {
    guint k = 0;
    do {
      g_autoptr (EnlScene) part = NULL;
      EnlStatus status = curve_scene (run, i, base[k], theme, &part, err);
      if (status != ENL_OK) {
        g_clear_pointer (out, enl_scene_free);
        return status;
      }
      EnlRect frame = enl_scene_frame (part);
      enl_scene_append (*out, part, 1.0, 0.0, y);
      y += frame.height;
      width = MAX (width, frame.width);
    } while (base[k] && base[++k]);
  }
  enl_scene_set_size (*out, width, y);
  return ENL_OK;
}

/* A substrate without an acidic hydrogen keeps its column, empty. */
static EnlStatus
bases_scene (const Run *run, const EnlTheme *theme, EnlScene **out, EnlError *err)
{
  guint n = run->analysis->len;
  g_autoptr (GPtrArray) comparison =
      g_ptr_array_new_with_free_func ((GDestroyNotify)enl_comparison_free);
  g_autofree EnlMatrixColumn *column = g_new0 (EnlMatrixColumn, n);

  for (guint i = 0; i < n; i++) {
    const EnlAnalysis *a = g_ptr_array_index (run->analysis, i);
    EnlComparison *found = NULL;
    uint32_t site = ENL_NONE;
    EnlStatus status = a->sites->n_sites ? compare (run, i, &site, &found, err) : ENL_OK;
    if (status != ENL_OK)
      return status;
    g_ptr_array_add (comparison, found);
    column[i] = (EnlMatrixColumn){.name = g_ptr_array_index (run->name, i), .mol = a->mol};
    if (site != ENL_NONE) {
      column[i].site = &a->sites->site[site];
      column[i].rank = enl_analysis_rank (a, site);
      column[i].pka = a->estimate[site].value;
    }
  }
  const EnlBaseTable *bases = run->run.knowledge->bases;
  g_autoptr (EnlMatrix) matrix =
      enl_matrix_new (bases, (const EnlComparison *const *)comparison->pdata, n);
  const EnlMatrixSheet sheet = {.matrix = matrix,
                                .column = column,
                                .bases = bases,
                                .conditions = &run->run.options->conditions,
                                .caption = enl_rule_table_deferral (run->run.knowledge->rules)};
  *out = enl_matrix_scene (&sheet, theme);
  return ENL_OK;
}

/* ---- the figure ---- */

static EnlStatus
all_substrates (const Run *run, const EnlTheme *theme, EnlScene **out, EnlError *err)
{
  (void)err;
  *out = substrates_scene (run, theme);
  return ENL_OK;
}

typedef EnlStatus (*View) (const Run *run, const EnlTheme *theme, EnlScene **out, EnlError *err);

static const struct {
  const char *name;
  View make;
} view[] = {{"substrates", all_substrates},
            {"forms", forms_scene},
            {"bases", bases_scene},
            {"curve", curves_scene}};

static View
find_view (const char *name)
{
  for (size_t i = 0; name && i < ENL_COUNT (view); i++)
    if (strcmp (view[i].name, name) == 0)
      return view[i].make;
  return NULL;
}

static EnlStatus
write_figure (const Run *run, const EnlTheme *theme, EnlError *err)
{
  const EnlOptions *o = run->run.options;
  g_autoptr (EnlScene) scene = NULL;
  EnlExport how = {o->width_mm, o->dpi, false, "Enolith"};
  EnlStatus status = find_view (o->view) (run, theme, &scene, err);

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
  if (!find_view (o->view))
    return wrong_use ("--view must be substrates, forms, bases or curve");
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
