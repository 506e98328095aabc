#include <stdio.h>

#include "cli/verbs.h"
#include "core/acidity/validate.h"
#include "resources/embedded.h"
#include "resources/model.h"

static const char *const column[] = {"class", "solvent", "n",       "mae", "median",
                                     "rmse",  "max",     "cover90", NULL};

static void
print_score (EnlOutput *out, const EnlScore *score)
{
  enl_output_text (out, score->class_name);
  enl_output_text (out, enl_solvent_id (score->solvent));
  enl_output_integer (out, score->n);
  enl_output_number (out, score->mae, 3);
  enl_output_number (out, score->median, 3);
  enl_output_number (out, score->rmse, 3);
  enl_output_number (out, score->max, 2);
  enl_output_number (out, score->cover90, 3);
}

static EnlStatus
validate (const EnlOptions *options, EnlFold fold, EnlError *err)
{
  g_autoptr (EnlReference) reference = NULL;
  g_autofree EnlScore *score = NULL;
  size_t size, model_size;
  const char *text = enl_resource ("acids.tsv", &size);
  const char *model = enl_model ("model.bin", &model_size);
  uint32_t n;
  EnlStatus status = enl_reference_new (text, size, &reference, err);

  if (status == ENL_OK)
    status = enl_validate (reference, model, model_size, fold, &score, &n, err);
  if (status != ENL_OK)
    return status;
  EnlOutput *out = enl_output_new (options->format, column);
  for (uint32_t i = 0; i < n; i++)
    print_score (out, &score[i]);
  enl_output_block (out, fold == ENL_FOLD_COMPOUND
                             ? "Left out: every compound in turn, with all its sites and solvents."
                             : "Left out: every family of compounds in turn.");
  enl_output_finish (out);
  return ENL_OK;
}

int
enl_verb_validate (const EnlOptions *options)
{
  EnlFold fold;
  EnlError err = {0};

  if (!enl_fold_parse (options->fold, &fold)) {
    fprintf (stderr, "enolith-cli validate: --fold must be compound or cluster\n");
    return 2;
  }
  if (validate (options, fold, &err) == ENL_OK)
    return 0;
  g_autofree char *message = enl_error_message (&err);
  fprintf (stderr, "enolith-cli validate: %s\n", message);
  return 1;
}
