#include <math.h>
#include <stdio.h>
#include <string.h>

#include "cli/verbs.h"

/* json has more to say: the columns from JSON_ONLY on are left out of text and tsv. */
static const char *const json_column[] = {"substrate", "base",    "equiv",  "mmol",    "molar_mass",
                                          "amount",    "unit",    "exact",  "reagent", "form",
                                          "reason",    "verdict", "remark", "note",    "hazard",
                                          "deferral",  "footing", NULL};
#define JSON_ONLY 7

/* The id alone, or with the part of a base that is not weighed as such. */
static char *
base_cell (const EnlWeighing *w, const EnlWeighPart *part)
{
  return part->base == w->base ? g_strdup (w->base->id)
                               : g_strdup_printf ("%s: %s", w->base->id, part->name);
}

/* A cell with three significant digits. */
static void
put_digits (EnlOutput *out, double value)
{
  g_autofree char *digits = enl_weigh_digits (value);
  const char *point = strchr (digits, '.');

  enl_output_number (out, digits[0] ? g_ascii_strtod (digits, NULL) : NAN,
                     point ? (int)strlen (point + 1) : 0);
}

static void
put_json_cells (const EnlRun *run, const EnlWeighList *list, const EnlWeighLine *line,
                const EnlWeighPart *part, double amount)
{
  g_autofree char *form = enl_weigh_form_text (part);
  g_autoptr (GString) hazard = g_string_new (NULL);

  for (uint32_t i = 0; i < list->hazard->len; i++)
    g_string_append_printf (hazard, "%s%s", i ? ". " : "",
                            (char *)g_ptr_array_index (list->hazard, i));
  enl_output_number (run->out, amount, 6);
  enl_output_text (run->out, part->name);
  enl_output_text (run->out, form);
  enl_output_text (run->out, line->reason);
  enl_output_text (run->out, line->verdict);
  enl_output_text (run->out, line->weighing->remark);
  enl_output_text (run->out, part->note);
  enl_output_text (run->out, hazard->str);
  enl_output_text (run->out, list->deferral);
  enl_output_text (run->out, enl_solvent_heading (list->solvent));
}

static void
put_row (const EnlRun *run, const EnlWeighList *list, const EnlWeighLine *line,
         const EnlWeighPart *part, double amount, const char *unit)
{
  g_autofree char *base = base_cell (line->weighing, part);

  enl_output_text (run->out, list->substrate);
  enl_output_text (run->out, base);
  put_digits (run->out, line->weighing->equivalents);
  put_digits (run->out, part->mmol);
  enl_output_number (run->out, part->molar_mass, 2);
  put_digits (run->out, amount);
  enl_output_text (run->out, unit);
  if (run->options->format == ENL_FORMAT_JSON)
    put_json_cells (run, list, line, part, amount);
}

/* A volume first where there is one; a part without an amount has one row that says so. */
static void
put_part (const EnlRun *run, const EnlWeighList *list, const EnlWeighLine *line,
          const EnlWeighPart *part)
{
  if (!isnan (part->ml))
    put_row (run, list, line, part, part->ml, "mL");
  if (!isnan (part->mg))
    put_row (run, list, line, part, part->mg, "mg");
  if (isnan (part->ml) && isnan (part->mg))
    put_row (run, list, line, part, NAN, "");
}

/* Indices in the base table of what --base names. */
static EnlStatus
find_bases (const EnlRun *run, const EnlBaseTable *bases, uint32_t *base, EnlError *err)
{
  for (guint i = 0; run->options->base[i]; i++) {
    EnlStatus status = enl_base_table_look_up (bases, run->options->base[i], &base[i], err);
    if (status != ENL_OK)
      return status;
  }
  return ENL_OK;
}

static EnlStatus
visit (const char *name, const EnlMolecule *mol, void *data, EnlError *err)
{
  const EnlRun *run = data;
  guint n = g_strv_length (run->options->base);
  g_autofree uint32_t *base = g_new0 (uint32_t, n);
  g_autoptr (EnlAnalysis) a = NULL;
  g_autoptr (EnlWeighList) list = NULL;
  EnlWeighScale scale = run->options->scale;
  uint32_t site;
  EnlStatus status =
      enl_analysis_new (run->knowledge, mol, run->options->conditions.solvent, false, &a, err);

  if (status == ENL_OK)
    status = enl_cli_site (a, run->options->atom, &site, err);
  if (status != ENL_OK)
    return status;
  EnlQuestion question = enl_analysis_question (a, run->knowledge, site, &run->options->conditions);
  if (run->bases)
    question.bases = run->bases;
  status = find_bases (run, question.bases, base, err);
  scale.water = question.conditions->water;
  if (status == ENL_OK)
    status =
        enl_weigh_list_new (&question, run->knowledge->weigh, name, &scale, base, n, &list, err);
  if (status != ENL_OK)
    return status;
  for (uint32_t i = 0; i < list->n_lines; i++)
    for (uint32_t k = 0; k < list->line[i].weighing->n_parts; k++)
      put_part (run, list, &list->line[i], &list->line[i].weighing->part[k]);
  g_autofree char *text = enl_weigh_list_text (list);
  g_autofree char *block = g_strconcat ("\n", g_strchomp (text), NULL);
  enl_output_block (run->out, block);
  return ENL_OK;
}

static int
wrong_use (const char *text)
{
  fprintf (stderr, "enolith-cli weigh: %s; see 'enolith-cli weigh --help'\n", text);
  return 2;
}

/* Numbers that fit no substrate are a wrong use; they are told once, not for every input. */
static int
check_options (const EnlOptions *o)
{
  EnlError err;
  EnlWeighOrder order = {.mmol = isnan (o->scale.mmol) ? 1.0 : o->scale.mmol,
                         .equivalents = o->conditions.equivalents,
                         .water = o->conditions.water,
                         .titre = o->scale.titre,
                         .mass_percent = o->scale.mass_percent};

  if (!o->base)
    return wrong_use ("no base: give --base");
  if (isnan (o->scale.mmol) == isnan (o->scale.grams))
    return wrong_use (isnan (o->scale.mmol) ? "no amount: give --mmol or --grams"
                                            : "two amounts: give --mmol or --grams");
  if (!isnan (o->scale.grams) && !(o->scale.grams > 0.0))
    return wrong_use ("--grams must be above 0");
  if (enl_weigh_order_check (&order, &err) != ENL_OK) {
    g_autofree char *text = g_strdup_printf ("%s: %s", err.text, err.advice);
    return wrong_use (text);
  }
  return 0;
}

int
enl_verb_weigh (const EnlOptions *options)
{
  const char *column[ENL_COUNT (json_column)] = {NULL};
  size_t n = options->format == ENL_FORMAT_JSON ? ENL_COUNT (json_column) : JSON_ONLY;
  int code = check_options (options);

  if (code != 0)
    return code;
  memcpy (column, json_column, n * sizeof *column);
  return enl_cli_run (options, column, visit);
}
