/* How good the estimates are, in numbers, lists and a picture. */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "cli/verbs.h"
#include "core/acidity/family.h"
#include "core/acidity/model.h"
#include "core/acidity/ranking.h"
#include "core/acidity/validate.h"
#include "core/notation/names.h"
#include "draw/paint.h"
#include "draw/reliability-sheet.h"
#include "resources/embedded.h"
#include "resources/model.h"

/* Half width of a normal 90 % interval in standard deviations. */
#define NORMAL_90 1.6449

typedef struct {
  const EnlOptions *options;
  EnlFold fold;
  const char *bytes;
  size_t size;
  EnlReference *ref;
  EnlPair *pair;
  uint32_t n_pairs;
} Run;

/* ---- scores ---- */

static EnlStatus
print_scores (const Run *run, EnlError *err)
{
  static const char *const column[] = {"class", "solvent", "n",       "mae", "median",
                                       "rmse",  "max",     "cover90", NULL};
  g_autofree EnlScore *score = NULL;
  uint32_t n;
  EnlStatus status = enl_validate (run->ref, run->bytes, run->size, run->fold, &score, &n, err);

  if (status != ENL_OK)
    return status;
  EnlOutput *out = enl_output_new (run->options->format, column);
  for (uint32_t i = 0; i < n; i++) {
    enl_output_text (out, score[i].class_name);
    enl_output_text (out, enl_solvent_id (score[i].solvent));
    enl_output_integer (out, score[i].n);
    enl_output_number (out, score[i].mae, 3);
    enl_output_number (out, score[i].median, 3);
    enl_output_number (out, score[i].rmse, 3);
    enl_output_number (out, score[i].max, 2);
    enl_output_number (out, score[i].cover90, 3);
  }
  enl_output_block (out, run->fold == ENL_FOLD_COMPOUND
                             ? "Left out: every compound in turn, with all its sites and solvents."
                             : "Left out: every family of compounds in turn.");
  enl_output_finish (out);
  return ENL_OK;
}

/* ---- order ---- */

typedef struct {
  uint32_t pairs, fitted, left_out;
} Count;

static void
count_pair (Count *count, const EnlPair *pair)
{
  count->pairs++;
  count->fitted += enl_pair_is_right (pair->published, pair->fitted);
  count->left_out += enl_pair_is_right (pair->published, pair->left_out);
}

static void
print_count (EnlOutput *out, const Count *count)
{
  enl_output_integer (out, count->pairs);
  enl_output_number (out, (double)count->fitted / count->pairs, 3);
  enl_output_number (out, (double)count->left_out / count->pairs, 3);
}

/* Rows of both kinds in each solvent, then over all solvents, then over everything. */
static void
print_ranking (const Run *run)
{
  static const char *const column[] = {"pairs", "solvent", "n", "fitted", "left_out", NULL};
  EnlOutput *out = enl_output_new (run->options->format, column);

  for (int kind = 0; kind <= ENL_N_PAIR_KINDS; kind++)
    for (int solvent = 0; solvent <= ENL_MODEL_SOLVENTS; solvent++) {
      Count count = {0};
      for (uint32_t i = 0; i < run->n_pairs; i++) {
        const EnlPair *pair = &run->pair[i];
        EnlSolvent own = enl_reference_row (run->ref, pair->first)->solvent;
        if ((kind == ENL_N_PAIR_KINDS || pair->kind == (EnlPairKind)kind) &&
            (solvent == ENL_MODEL_SOLVENTS || own == (EnlSolvent)solvent))
          count_pair (&count, pair);
      }
      if (count.pairs == 0 || (kind == ENL_N_PAIR_KINDS && solvent < ENL_MODEL_SOLVENTS))
        continue;
      enl_output_text (out,
                       kind == ENL_N_PAIR_KINDS ? "all" : enl_pair_kind_text ((EnlPairKind)kind));
      enl_output_text (out, solvent == ENL_MODEL_SOLVENTS ? "both"
                                                          : enl_solvent_id ((EnlSolvent)solvent));
      print_count (out, &count);
    }
  enl_output_block (out, "Right order, as a share of the pairs whose published values differ by "
                         "more than 1:\nof the fitted model, and with both compounds left out.");
  enl_output_finish (out);
}

/* Family and name of its parent compound, where that has one. */
static void
print_family (EnlOutput *out, const EnlNames *names, const EnlReferenceRow *row)
{
  g_autofree char *family = enl_family_of (row->mol, row->site);
  const char *end = strchr (family, ' ');
  g_autofree char *core = end ? g_strndup (family, (gsize)(end - family)) : g_strdup (family);

  enl_output_text (out, family);
  enl_output_text (out, enl_names_of (names, core));
}

static void
print_families (const Run *run, const EnlNames *names)
{
  static const char *const column[] = {"family", "parent",   "solvent", "n",
                                       "fitted", "left_out", NULL};
  EnlOutput *out = enl_output_new (run->options->format, column);
  g_autofree bool *done = g_new0 (bool, run->n_pairs + 1);

  for (uint32_t i = 0; i < run->n_pairs; i++) {
    const EnlPair *first = &run->pair[i];
    const EnlReferenceRow *row = enl_reference_row (run->ref, first->first);
    Count count = {0};
    if (done[i] || first->kind != ENL_PAIR_FAMILY)
      continue;
    for (uint32_t j = i; j < run->n_pairs; j++) {
      const EnlPair *pair = &run->pair[j];
      if (pair->kind != ENL_PAIR_FAMILY || pair->family != first->family ||
          enl_reference_row (run->ref, pair->first)->solvent != row->solvent)
        continue;
      done[j] = true;
      count_pair (&count, pair);
    }
    print_family (out, names, row);
    enl_output_text (out, enl_solvent_id (row->solvent));
    print_count (out, &count);
  }
  enl_output_finish (out);
}

static void
print_wrong_pairs (const Run *run, const EnlNames *names)
{
  static const char *const column[] = {"pairs",  "family",    "parent", "solvent",  "first",
                                       "second", "published", "fitted", "left_out", NULL};
  EnlOutput *out = enl_output_new (run->options->format, column);

  for (uint32_t i = 0; i < run->n_pairs; i++) {
    const EnlPair *pair = &run->pair[i];
    const EnlReferenceRow *first = enl_reference_row (run->ref, pair->first);
    if (enl_pair_is_right (pair->published, pair->left_out) &&
        enl_pair_is_right (pair->published, pair->fitted))
      continue;
    enl_output_text (out, enl_pair_kind_text (pair->kind));
    print_family (out, names, first);
    enl_output_text (out, enl_solvent_id (first->solvent));
    enl_output_text (out, first->name);
    enl_output_text (out, enl_reference_row (run->ref, pair->second)->name);
    enl_output_number (out, pair->published, 2);
    enl_output_number (out, pair->fitted, 2);
    enl_output_number (out, pair->left_out, 2);
  }
  enl_output_block (out, "Differences first - second; in the wrong order fitted or left out.");
  enl_output_finish (out);
}

static EnlStatus
with_names (const Run *run, void (*print) (const Run *run, const EnlNames *names), EnlError *err)
{
  g_autoptr (EnlNames) names = NULL;
  size_t size;
  const char *text = enl_resource ("names.tsv", &size);
  EnlStatus status = enl_names_new (text, size, &names, err);

  if (status == ENL_OK)
    print (run, names);
  return status;
}

/* ---- rows ---- */

static double
residual (const EnlReference *ref, const EnlLeftOut *row, uint32_t i)
{
  double z = (row[i].predicted - enl_reference_row (ref, i)->pka) / (row[i].half / NORMAL_90);

  return isfinite (z) ? z : 0;
}

typedef struct {
  double size;
  uint32_t row;
} Place;

static int
compare_places (const void *a, const void *b)
{
  const Place *x = a, *y = b;

  if (x->size != y->size)
    return x->size < y->size ? 1 : -1;
  return (x->row > y->row) - (x->row < y->row);
}

static void
print_row (EnlOutput *out, const EnlReferenceRow *row, const EnlLeftOut *left, double z)
{
  enl_output_text (out, row->name);
  enl_output_text (out, row->smiles);
  enl_output_text (out, enl_solvent_id (row->solvent));
  enl_output_number (out, row->pka, 2);
  enl_output_number (out, left->predicted, 2);
  enl_output_number (out, left->predicted - left->half, 2);
  enl_output_number (out, left->predicted + left->half, 2);
  enl_output_number (out, z, 2);
  enl_output_text (out, enl_acid_class_text (enl_acid_class (row->mol, row->site)));
}

static void
print_rows (const Run *run, const EnlLeftOut *left)
{
  static const char *const column[] = {"name", "smiles", "solvent",  "published", "left_out",
                                       "low",  "high",   "residual", "class",     NULL};
  uint32_t n = enl_reference_rows (run->ref);
  g_autofree Place *place = g_new (Place, n + 1);
  EnlOutput *out = enl_output_new (run->options->format, column);

  for (uint32_t i = 0; i < n; i++)
    place[i] = (Place){fabs (residual (run->ref, left, i)), i};
  qsort (place, n, sizeof *place, compare_places);
  for (uint32_t i = 0; i < n; i++) {
    uint32_t at = place[i].row;
    print_row (out, enl_reference_row (run->ref, at), &left[at], residual (run->ref, left, at));
  }
  enl_output_block (out, "residual: (left_out - published) / standard deviation of the estimate.");
  enl_output_finish (out);
}

/* ---- picture ---- */

static EnlStatus
write_plot (const Run *run, const EnlLeftOut *left, EnlError *err)
{
  const EnlOptions *o = run->options;
  const EnlTheme *theme = enl_theme_get ((EnlThemeName)enl_theme_find (o->theme));
  uint32_t n = enl_reference_rows (run->ref);
  g_autofree EnlReliabilityPoint *point = g_new (EnlReliabilityPoint, n + 1);

  for (uint32_t i = 0; i < n; i++) {
    const EnlReferenceRow *row = enl_reference_row (run->ref, i);
    point[i] = (EnlReliabilityPoint){row->solvent, enl_acid_class (row->mol, row->site), row->pka,
                                     left[i].predicted, left[i].half};
  }
  const EnlReliabilitySheet sheet = {.point = point,
                                     .n_points = n,
                                     .left_out = run->fold == ENL_FOLD_COMPOUND
                                                     ? "each compound left out in turn"
                                                     : "each family left out in turn"};
  g_autoptr (EnlScene) scene = enl_reliability_sheet (&sheet, theme);
  const EnlExport how = {
      .width_mm = o->width_mm, .dpi = o->dpi, .title = "Enolith: reliability of the estimates"};
  return enl_scene_export (scene, o->plot, &how, err);
}

/* ---- the verb ---- */

static EnlStatus
show_rows (const Run *run, EnlError *err)
{
  g_autofree EnlLeftOut *left = NULL;
  EnlStatus status = enl_validate_rows (run->ref, run->bytes, run->size, run->fold, &left, err);

  if (status == ENL_OK && run->options->listing == ENL_LISTING_ROWS)
    print_rows (run, left);
  if (status == ENL_OK && run->options->plot)
    status = write_plot (run, left, err);
  return status;
}

static EnlStatus
show_order (const Run *run, EnlError *err)
{
  switch (run->options->listing) {
  case ENL_LISTING_FAMILIES:
    return with_names (run, print_families, err);
  case ENL_LISTING_PAIRS:
    return with_names (run, print_wrong_pairs, err);
  case ENL_LISTING_USUAL: /* a script gets one table at a time */
    if (run->options->format == ENL_FORMAT_TEXT && !run->options->plot) {
      printf ("\n");
      print_ranking (run);
    }
    return ENL_OK;
  default:
    print_ranking (run);
    return ENL_OK;
  }
}

static EnlStatus
show (Run *run, EnlError *err)
{
  const EnlOptions *o = run->options;
  EnlStatus status;

  if (o->listing == ENL_LISTING_USUAL && !o->plot && (status = print_scores (run, err)) != ENL_OK)
    return status;
  if ((o->listing == ENL_LISTING_ROWS || o->plot) && (status = show_rows (run, err)) != ENL_OK)
    return status;
  if (o->listing == ENL_LISTING_ROWS)
    return ENL_OK;
  status =
      enl_rank_pairs (run->ref, run->bytes, run->size, run->fold, &run->pair, &run->n_pairs, err);
  return status == ENL_OK ? show_order (run, err) : status;
}

static int
check_options (const EnlOptions *o, EnlFold *fold)
{
  const char *fault = NULL;

  if (!enl_fold_parse (o->fold, fold))
    fault = "--fold must be compound or cluster";
  else if (o->plot && enl_picture_find (o->plot) < 0)
    fault = "--plot must name a file that ends in .png, .svg or .pdf";
  else if (enl_theme_find (o->theme) < 0)
    fault = "--theme must be light, dark, print or projector";
  if (fault)
    fprintf (stderr, "enolith-cli validate: %s; see 'enolith-cli validate --help'\n", fault);
  return fault ? 2 : 0;
}

int
enl_verb_validate (const EnlOptions *options)
{
  Run run = {.options = options};
  EnlError err = {0};
  size_t size;
  const char *text = enl_resource ("acids.tsv", &size);
  int code = check_options (options, &run.fold);

  if (code)
    return code;
  run.bytes = enl_model ("model.bin", &run.size);
  EnlStatus status = enl_reference_new (text, size, &run.ref, &err);
  if (status == ENL_OK)
    status = show (&run, &err);
  enl_reference_free (run.ref);
  g_free (run.pair);
  if (status == ENL_OK)
    return 0;
  g_autofree char *message = enl_error_message (&err);
  fprintf (stderr, "enolith-cli validate: %s\n", message);
  return 1;
}
