#include "cli/explain.h"

#include <jansson.h>

/* Places of the numbers: as the pKa column, and as the text on the screen. */
#define CELL_DECIMALS 2
#define TEXT_DECIMALS 1
/* Enough for CELL_DECIMALS, little enough to leave out the noise of binary fractions. */
#define JSON_DIGITS 9

static void
append_number (GString *out, const char *format, double value)
{
  char buffer[64];

  g_string_append (out, g_ascii_formatd (buffer, sizeof buffer, format, value));
}

/* "+0.7", "-12.3" in seven columns; the parent's own value has no sign. */
static void
append_line (GString *out, const char *words, double value, bool sign)
{
  char buffer[64];

  g_ascii_formatd (buffer, sizeof buffer, sign ? "%+.1f" : "%.1f", value);
  g_string_append_printf (out, "      %7s  %s\n", buffer, words);
}

static void
append_precedents (GString *out, const EnlReference *reference, const EnlEstimate *e)
{
  if (e->n_precedents == 0)
    g_string_append (out, "      precedents: nothing like it was measured\n");
  else
    g_string_append (out, "      precedents:\n");
  for (uint32_t i = 0; i < e->n_precedents; i++) {
    const EnlReferenceRow *row = enl_reference_row (reference, e->precedent[i].row);
    char value[64], weight[64];
    g_ascii_formatd (value, sizeof value, "%.1f", row->pka);
    g_ascii_formatd (weight, sizeof weight, "%.2f", e->precedent[i].weight);
    g_string_append_printf (out, "      %7s  %s in %s, weight %s: %s (%s)\n", value, row->name,
                            enl_solvent_label (row->solvent), weight, row->smiles, row->source);
  }
}

char *
enl_explain_text (const EnlReference *reference, const EnlWhy *why, const EnlEstimate *e)
{
  GString *out = g_string_new (NULL);
  double value[ENL_WHY_LINES];

  enl_why_round (why, TEXT_DECIMALS, value);
  for (uint32_t i = 0; i < why->n_lines; i++)
    append_line (out, why->line[i].words, value[i], i > 0);
  g_string_append_printf (out, "      =");
  char sum[64];
  g_ascii_formatd (sum, sizeof sum, "%.1f", why->value);
  g_string_append_printf (out, "%6s  %s, %s\n", sum, enl_basis_text (e->basis), why->width);
  append_precedents (out, reference, e);
  return g_string_free (out, FALSE);
}

char *
enl_explain_lines (const EnlWhy *why)
{
  GString *out = g_string_new (NULL);
  double value[ENL_WHY_LINES];

  enl_why_round (why, CELL_DECIMALS, value);
  for (uint32_t i = 0; i < why->n_lines; i++) {
    g_string_append_printf (out, "%s%s ", i ? " | " : "", why->line[i].words);
    append_number (out, i ? "%+.2f" : "%.2f", value[i]);
  }
  return g_string_free (out, FALSE);
}

char *
enl_explain_structures (const EnlReference *reference, const EnlEstimate *e)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < e->n_precedents; i++) {
    const EnlReferenceRow *row = enl_reference_row (reference, e->precedent[i].row);
    g_string_append_printf (out, "%s%s ", i ? " | " : "", row->smiles);
    append_number (out, "%.2f", e->precedent[i].weight);
  }
  return g_string_free (out, FALSE);
}

static json_t *
precedent_object (const EnlReferenceRow *row, const EnlPrecedent *precedent)
{
  return json_pack ("{s:s, s:s, s:f, s:s, s:s, s:f, s:f}", "name", row->name, "smiles", row->smiles,
                    "pka", row->pka, "solvent", enl_solvent_id (row->solvent), "source",
                    row->source, "weight", precedent->weight, "likeness", precedent->likeness);
}

char *
enl_explain_json (const EnlReference *reference, const EnlWhy *why, const EnlEstimate *e)
{
  json_t *root = json_object (), *lines = json_array (), *precedents = json_array ();
  double value[ENL_WHY_LINES];

  enl_why_round (why, CELL_DECIMALS, value);
  for (uint32_t i = 0; i < why->n_lines; i++)
    json_array_append_new (
        lines, json_pack ("{s:s, s:f}", "words", why->line[i].words, "value", value[i]));
  for (uint32_t i = 0; i < e->n_precedents; i++)
    json_array_append_new (
        precedents,
        precedent_object (enl_reference_row (reference, e->precedent[i].row), &e->precedent[i]));
  json_object_set_new (root, "lines", lines);
  json_object_set_new (root, "interval", json_string (why->width));
  json_object_set_new (root, "precedents", precedents);
  char *text = json_dumps (root, JSON_COMPACT | JSON_REAL_PRECISION (JSON_DIGITS));
  char *out = g_strdup (text ? text : "null");
  free (text);
  json_decref (root);
  return out;
}
