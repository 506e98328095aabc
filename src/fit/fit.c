/* enolith-fit: makes the model of the estimator.
 *
 *   enolith-fit tune ACIDS.tsv OUT.tsv [STEPS [START.tsv]]  finds the hyperparameters
 *   enolith-fit build ACIDS.tsv HYPER.tsv OUT.bin           fits the model (part of the build)
 *   enolith-fit score ACIDS.tsv HYPER.tsv [cluster|rows]    prints left-out scores
 *   enolith-fit fifths ACIDS.tsv [STEPS]                    tunes on four fifths, scores the fifth
 *   enolith-fit describe ACIDS.tsv                          prints the raw descriptors of every row
 *   enolith-fit numbers ACIDS.tsv HYPER.tsv OUT.tsv [EVERY] writes what the model says, with all
 *                                                           digits that shall agree between
 * machines
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "core/acidity/validate.h"
#include "fit/fifths.h"
#include "fit/tune.h"

#define USUAL_STEPS 140

static int
fail (const char *what, const EnlError *err)
{
  g_autofree char *message = enl_error_message (err);

  fprintf (stderr, "enolith-fit: %s: %s\n", what, message);
  return EXIT_FAILURE;
}

static bool
load (const char *path, char **text, size_t *size, EnlError *err)
{
  g_autoptr (GError) error = NULL;

  if (g_file_get_contents (path, text, size, &error))
    return true;
  enl_error_set (err, ENL_ERROR_IO, "give a file that can be read", "%s", error->message);
  return false;
}

static EnlStatus
load_reference (const char *path, EnlReference **ref, EnlError *err)
{
  g_autofree char *text = NULL;
  size_t size = 0;

  if (!load (path, &text, &size, err))
    return ENL_ERROR_IO;
  return enl_reference_new (text, size, ref, err);
}

static EnlStatus
load_hyper (const char *path, EnlHyper *hyper, EnlError *err)
{
  g_autofree char *text = NULL;
  size_t size = 0;

  if (!load (path, &text, &size, err))
    return ENL_ERROR_IO;
  return enl_hyper_parse (text, size, hyper, err);
}

static bool
save (const char *path, const char *data, size_t size, EnlError *err)
{
  g_autoptr (GError) error = NULL;

  if (g_file_set_contents (path, data, (gssize)size, &error))
    return true;
  enl_error_set (err, ENL_ERROR_IO, "give a place that can be written", "%s", error->message);
  return false;
}

static char *
write_hyper (const EnlHyper *hyper)
{
  GString *text = g_string_new (
      "# estimator.tsv: hyperparameters of the estimator; names as in src/core/acidity/hyper.h\n"
      "# and descriptor.h. Made by\n"
      "#   enolith-fit tune resources/acids.tsv resources/estimator.tsv\n"
      "# Variances in pK units squared; relevances without unit, 1 where nothing was learned.\n"
      "name\tvalue\tsource\n");

  for (uint32_t i = 0; i < ENL_N_HYPER; i++) {
    g_autofree char *name = enl_hyper_name (i);
    char number[G_ASCII_DTOSTR_BUF_SIZE];
    g_string_append_printf (text, "%s\t%s\tfit\n", name,
                            g_ascii_formatd (number, sizeof number, "%.5g", hyper->value[i]));
  }
  return g_string_free (text, FALSE);
}

static int
tune (int argc, char **argv)
{
  g_autoptr (EnlReference) ref = NULL;
  g_autoptr (EnlTuner) tuner = NULL;
  uint32_t steps = argc > 4 ? (uint32_t)atoi (argv[4]) : USUAL_STEPS;
  EnlHyper hyper;
  EnlError err;

  enl_hyper_init (&hyper);
  if (load_reference (argv[2], &ref, &err) != ENL_OK)
    return fail (argv[2], &err);
  if (argc > 5 && load_hyper (argv[5], &hyper, &err) != ENL_OK)
    return fail (argv[5], &err);
  if (enl_tuner_new (ref, &tuner, &err) != ENL_OK)
    return fail ("tune", &err);
  enl_tuner_run (tuner, &hyper, steps, true);
  g_autofree char *text = write_hyper (&hyper);
  if (!save (argv[3], text, strlen (text), &err))
    return fail (argv[3], &err);
  return EXIT_SUCCESS;
}

static EnlStatus
fit_files (char **argv, EnlReference **ref, GByteArray **bytes, EnlError *err)
{
  g_autoptr (EnlModel) model = NULL;
  EnlHyper hyper;
  EnlStatus status;

  if ((status = load_reference (argv[2], ref, err)) != ENL_OK ||
      (status = load_hyper (argv[3], &hyper, err)) != ENL_OK ||
      (status = enl_model_build (*ref, &hyper, &model, err)) != ENL_OK)
    return status;
  *bytes = enl_model_write (model, *ref);
  return ENL_OK;
}

static int
build (int argc, char **argv)
{
  g_autoptr (EnlReference) ref = NULL;
  g_autoptr (GByteArray) bytes = NULL;
  EnlError err;

  if (argc != 5)
    return EXIT_FAILURE;
  if (fit_files (argv, &ref, &bytes, &err) != ENL_OK)
    return fail ("build", &err);
  if (!save (argv[4], (const char *)bytes->data, bytes->len, &err))
    return fail (argv[4], &err);
  return EXIT_SUCCESS;
}

static int
print_rows (const EnlReference *ref, const GByteArray *bytes)
{
  g_autofree EnlLeftOut *row = NULL;
  EnlError err;

  if (enl_validate_rows (ref, (const char *)bytes->data, bytes->len, ENL_FOLD_COMPOUND, &row,
                         &err) != ENL_OK)
    return fail ("score", &err);
  printf ("name\tsmiles\tsolvent\tpka\tpredicted\tsd\thalf\n");
  for (uint32_t i = 0; i < enl_reference_rows (ref); i++) {
    const EnlReferenceRow *r = enl_reference_row (ref, i);
    printf ("%s\t%s\t%s\t%g\t%.2f\t%.2f\t%.2f\n", r->name, r->smiles, enl_solvent_id (r->solvent),
            r->pka, row[i].predicted, row[i].sd, row[i].half);
  }
  return EXIT_SUCCESS;
}

static int
score (int argc, char **argv)
{
  g_autoptr (EnlReference) ref = NULL;
  g_autoptr (GByteArray) bytes = NULL;
  g_autofree EnlScore *scores = NULL;
  EnlFold fold = ENL_FOLD_COMPOUND;
  uint32_t n = 0;
  EnlError err;

  if (fit_files (argv, &ref, &bytes, &err) != ENL_OK)
    return fail ("score", &err);
  if (argc > 4 && !enl_fold_parse (argv[4], &fold))
    return print_rows (ref, bytes);
  if (enl_validate (ref, (const char *)bytes->data, bytes->len, fold, &scores, &n, &err) != ENL_OK)
    return fail ("score", &err);
  for (uint32_t i = 0; i < n; i++)
    printf ("%-6s %-24s n %3u  MAE %.2f  median %.2f  rmse %.2f  max %.1f  cover %.2f\n",
            enl_solvent_id (scores[i].solvent), scores[i].class_name, scores[i].n, scores[i].mae,
            scores[i].median, scores[i].rmse, scores[i].max, scores[i].cover90);
  return EXIT_SUCCESS;
}

static int
fifths (int argc, char **argv)
{
  g_autofree char *text = NULL;
  size_t size = 0;
  EnlError err;

  if (!load (argv[2], &text, &size, &err) ||
      enl_fifths_print (text, size, argc > 3 ? (uint32_t)atoi (argv[3]) : USUAL_STEPS, &err) !=
          ENL_OK)
    return fail ("fifths", &err);
  return EXIT_SUCCESS;
}

static int
describe (int argc G_GNUC_UNUSED, char **argv)
{
  g_autoptr (EnlReference) ref = NULL;
  g_autoptr (EnlSiteSet) set = NULL;
  EnlError err;

  if (load_reference (argv[2], &ref, &err) != ENL_OK ||
      enl_model_describe (ref, &set, &err) != ENL_OK)
    return fail (argv[2], &err);
  printf ("smiles\tsolvent");
  for (uint32_t k = 0; k < ENL_N_DESCRIPTORS; k++) {
    g_autofree char *name = enl_descriptor_name (k);
    printf ("\t%s", name);
  }
  for (uint32_t i = 0; i < set->n; i++) {
    const EnlReferenceRow *row = enl_reference_row (ref, i);
    printf ("\n%s\t%s", row->smiles, enl_solvent_id (row->solvent));
    for (uint32_t k = 0; k < ENL_N_DESCRIPTORS; k++)
      printf ("\t%.6g", (double)set->z[(size_t)i * ENL_N_DESCRIPTORS + k]);
  }
  printf ("\n");
  return EXIT_SUCCESS;
}

/* Every so many rows of the table stand in the list of numbers. */
#define USUAL_EVERY 8

static EnlStatus
write_numbers (const EnlReference *ref, const GByteArray *bytes, uint32_t every, GString *text,
               EnlError *err)
{
  g_autoptr (EnlModel) model = NULL;
  g_autofree EnlLeftOut *left = NULL;
  g_autofree double *fitted = g_new (double, enl_reference_rows (ref) + 1);
  EnlStatus status;

  if ((status = enl_model_open (ref, (const char *)bytes->data, bytes->len, &model, err)) !=
          ENL_OK ||
      (status = enl_validate_rows (ref, (const char *)bytes->data, bytes->len, ENL_FOLD_COMPOUND,
                                   &left, err)) != ENL_OK)
    return status;
  enl_model_fitted (model, ref, fitted);
  for (uint32_t i = 0; i < enl_reference_rows (ref); i += every) {
    const EnlReferenceRow *row = enl_reference_row (ref, i);
    const double value[] = {fitted[i], left[i].predicted, left[i].sd, left[i].half};
    g_string_append_printf (text, "%s\t%s", row->smiles, enl_solvent_id (row->solvent));
    for (size_t k = 0; k < ENL_COUNT (value); k++) {
      char number[G_ASCII_DTOSTR_BUF_SIZE];
      g_string_append_printf (text, "\t%s",
                              g_ascii_formatd (number, sizeof number, "%.8f", value[k]));
    }
    g_string_append_c (text, '\n');
  }
  return ENL_OK;
}

static int
numbers (int argc, char **argv)
{
  g_autoptr (EnlReference) ref = NULL;
  g_autoptr (GByteArray) bytes = NULL;
  g_autoptr (GString) text = g_string_new (
      "# What the model says about some rows of resources/acids.tsv: the fitted value, and value,\n"
      "# standard deviation and half width of the 90 % interval when the compound is left out.\n"
      "# After a change of the model: meson compile -C BUILD model-numbers\n"
      "smiles\tsolvent\tfitted\tleft_out\tsd\thalf\n");
  int every = argc > 5 ? atoi (argv[5]) : USUAL_EVERY;
  EnlError err;

  if (fit_files (argv, &ref, &bytes, &err) != ENL_OK ||
      write_numbers (ref, bytes, (uint32_t)MAX (every, 1), text, &err) != ENL_OK)
    return fail ("numbers", &err);
  if (!save (argv[4], text->str, text->len, &err))
    return fail (argv[4], &err);
  return EXIT_SUCCESS;
}

int
main (int argc, char **argv)
{
  static const struct {
    const char *verb;
    int (*run) (int argc, char **argv);
    int least;
  } verb[] = {{"tune", tune, 4},     {"build", build, 5},       {"score", score, 4},
              {"fifths", fifths, 3}, {"describe", describe, 3}, {"numbers", numbers, 5}};

  for (size_t i = 0; argc > 1 && i < ENL_COUNT (verb); i++)
    if (strcmp (argv[1], verb[i].verb) == 0 && argc >= verb[i].least)
      return verb[i].run (argc, argv);
  fprintf (stderr, "usage: enolith-fit tune ACIDS.tsv OUT.tsv [STEPS [START.tsv]]\n"
                   "       enolith-fit build ACIDS.tsv HYPER.tsv OUT.bin\n"
                   "       enolith-fit score ACIDS.tsv HYPER.tsv [cluster|rows]\n"
                   "       enolith-fit fifths ACIDS.tsv [STEPS]\n"
                   "       enolith-fit describe ACIDS.tsv\n"
                   "       enolith-fit numbers ACIDS.tsv HYPER.tsv OUT.tsv [EVERY]\n");
  return 2;
}
