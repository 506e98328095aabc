#include "core/bases/rule.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "core/base/table.h"
#include "core/bases/trigger.h"

#define DEFERRAL_ID  "DEFER"
#define MAX_SEVERITY 3

typedef struct {
  EnlRule rule;
  EnlTrigger *trigger;
} Row;

struct EnlRuleTable {
  EnlTable *text; /* owns the strings of the rules */
  Row *row;
  uint32_t n;
  const char *deferral;
};

const char *
enl_effect_text (EnlEffect effect)
{
  static const char *const text[ENL_N_EFFECTS] = {
      [ENL_EFFECT_REACTS] = "reacts",
      [ENL_EFFECT_WARN] = "warn",
      [ENL_EFFECT_HAZARD] = "hazard",
      [ENL_EFFECT_NOTE] = "note",
  };

  g_assert (effect < ENL_N_EFFECTS);
  return text[effect];
}

/* ---- reading ---- */

typedef struct {
  const char *text; /* of the whole file */
  size_t size;
  const EnlTable *table;
  size_t row;
  EnlError *err;
} Reading;

/* Byte offset of a cell in the file. */
static size_t
place_of_cell (const Reading *r, int column)
{
  const char *at = r->text, *end = r->text + r->size;

  for (size_t line = 1; line < enl_table_line (r->table, r->row) && at < end; line++) {
    const char *stop = memchr (at, '\n', (size_t)(end - at));
    at = stop ? stop + 1 : end;
  }
  for (int i = 0; i < column && at < end; i++) {
    const char *stop = memchr (at, '\t', (size_t)(end - at));
    at = stop ? stop + 1 : end;
  }
  return (size_t)(at - r->text);
}

static const char *
cell (const Reading *r, const char *column)
{
  return enl_table_cell (r->table, r->row, enl_table_column (r->table, column));
}

static EnlStatus
fault (const Reading *r, const char *column, const char *advice, const char *what)
{
  const char *text = cell (r, column);

  enl_error_set (r->err, ENL_ERROR_FORMAT, advice, "%s '%.60s' of rule '%.30s' %s", column, text,
                 cell (r, "id"), what);
  enl_error_locate (r->err, r->text, r->size,
                    place_of_cell (r, enl_table_column (r->table, column)), MAX (strlen (text), 1));
  return ENL_ERROR_FORMAT;
}

static EnlStatus
read_trigger (const Reading *r, Row *row)
{
  const char *when = cell (r, "when");
  EnlError inner = {0};
  EnlStatus status = enl_trigger_parse (when, strlen (when), &row->trigger, &inner);

  if (status == ENL_OK)
    return ENL_OK;
  enl_error_set (r->err, ENL_ERROR_FORMAT, inner.advice, "rule '%.30s': %.150s", cell (r, "id"),
                 inner.text);
  enl_error_locate (r->err, r->text, r->size,
                    place_of_cell (r, enl_table_column (r->table, "when")) + inner.offset,
                    inner.length);
  return ENL_ERROR_FORMAT;
}

/* Every {name} of the sentence must be a fact that can be printed. */
static bool
placeholders_are_known (const char *sentence)
{
  for (const char *p = strchr (sentence, '{'); p; p = strchr (p, '{')) {
    const char *end = strchr (++p, '}');
    int fact = end ? enl_fact_find (p, (size_t)(end - p)) : -1;
    if (fact < 0 || enl_fact_kind ((size_t)fact) == ENL_FACT_FLAG)
      return false;
  }
  return true;
}

static bool
id_is_new (const EnlRuleTable *table, const char *id)
{
  for (uint32_t i = 0; i < table->n; i++)
    if (strcmp (table->row[i].rule.id, id) == 0)
      return false;
  return id[0] != '\0';
}

static EnlStatus
read_rule (const Reading *r, EnlRuleTable *table)
{
  Row *row = &table->row[table->n];
  const char *effect = cell (r, "effect"), *severity = cell (r, "severity");

  if (!id_is_new (table, cell (r, "id")))
    return fault (r, "id", "give every rule an id of its own", "is empty or used twice");
  row->rule = (EnlRule){cell (r, "id"), cell (r, "sentence"), cell (r, "source"), ENL_N_EFFECTS, 0};
  for (int i = 0; i < ENL_N_EFFECTS; i++)
    if (strcmp (enl_effect_text ((EnlEffect)i), effect) == 0)
      row->rule.effect = (EnlEffect)i;
  if (row->rule.effect == ENL_N_EFFECTS)
    return fault (r, "effect", "write reacts, warn, hazard or note", "is unknown");
  if (!g_ascii_isdigit (severity[0]) || severity[1] || atoi (severity) > MAX_SEVERITY)
    return fault (r, "severity", "write 0, 1, 2 or 3", "is no degree");
  row->rule.severity = atoi (severity);
  if (!row->rule.sentence[0] || !placeholders_are_known (row->rule.sentence))
    return fault (r, "sentence", "name a phrase, word or number fact between { and }",
                  "is empty or holds an unknown {fact}");
  if (!row->rule.source[0])
    return fault (r, "source", "write the source or 'common practice'", "is missing");
  return read_trigger (r, row);
}

static EnlStatus
read_rows (Reading *r, EnlRuleTable *table)
{
  EnlStatus status = ENL_OK;

  for (r->row = 0; status == ENL_OK && r->row < enl_table_rows (table->text); r->row++) {
    if (strcmp (cell (r, "id"), DEFERRAL_ID) == 0) {
      table->deferral = cell (r, "sentence");
      continue;
    }
    status = read_rule (r, table);
    table->n++; /* a failed row may hold nothing, which is freed like any other */
  }
  return status;
}

EnlStatus
enl_rule_table_new (const char *text, size_t size, EnlRuleTable **out, EnlError *err)
{
  static const char *const needed[] = {"id", "effect", "severity", "when", "sentence", "source"};
  g_autoptr (EnlRuleTable) table = g_new0 (EnlRuleTable, 1);

  *out = NULL;
  EnlStatus status = enl_table_parse (text, size, &table->text, err);
  if (status == ENL_OK)
    status = enl_table_require (table->text, needed, ENL_COUNT (needed), "rule table", err);
  if (status != ENL_OK)
    return status;
  table->row = g_new0 (Row, enl_table_rows (table->text) + 1);
  Reading r = {text, size, table->text, 0, err};
  status = read_rows (&r, table);
  if (status != ENL_OK)
    return status;
  if (!table->deferral)
    return enl_error_set (err, ENL_ERROR_FORMAT, "restore the row with id " DEFERRAL_ID,
                          "the deferral to a qualified person is missing");
  *out = g_steal_pointer (&table);
  return ENL_OK;
}

void
enl_rule_table_free (EnlRuleTable *table)
{
  if (!table)
    return;
  for (uint32_t i = 0; i < table->n; i++)
    enl_trigger_free (table->row[i].trigger);
  g_free (table->row);
  enl_table_free (table->text);
  g_free (table);
}

uint32_t
enl_rule_table_size (const EnlRuleTable *table)
{
  return table->n;
}

const EnlRule *
enl_rule_table_get (const EnlRuleTable *table, uint32_t index)
{
  g_assert (index < table->n);
  return &table->row[index].rule;
}

const char *
enl_rule_table_deferral (const EnlRuleTable *table)
{
  return table->deferral;
}

/* ---- applying ---- */

static void
append_fact (GString *out, size_t fact, const EnlFactValue *value)
{
  switch (enl_fact_kind (fact)) {
  case ENL_FACT_NUMBER:
    if (isnan (value[fact].number))
      g_string_append (out, "unknown");
    else
      g_string_append_printf (out, "%.3g", value[fact].number);
    break;
  case ENL_FACT_WORD:
    g_string_append (out, value[fact].word);
    break;
  default:
    g_string_append (out, value[fact].phrase);
  }
}

static char *
fill_sentence (const char *sentence, const EnlFactValue *value)
{
  GString *out = g_string_new (NULL);

  for (const char *p = sentence; *p; p++) {
    const char *end = *p == '{' ? strchr (p, '}') : NULL;
    if (!end) {
      g_string_append_c (out, *p);
      continue;
    }
    append_fact (out, (size_t)enl_fact_find (p + 1, (size_t)(end - p - 1)), value);
    p = end;
  }
  return g_string_free (out, FALSE);
}

static int
by_weight (const void *left, const void *right, void *data)
{
  const EnlRule *a = ((const EnlCaution *)left)->rule, *b = ((const EnlCaution *)right)->rule;

  (void)data;
  if (a->effect != b->effect)
    return a->effect < b->effect ? -1 : 1;
  return b->severity - a->severity;
}

EnlCaution *
enl_rule_table_apply (const EnlRuleTable *table, const EnlFactValue *value, uint32_t *n)
{
  GArray *found = g_array_new (FALSE, FALSE, sizeof (EnlCaution));

  for (uint32_t i = 0; i < table->n; i++) {
    const Row *row = &table->row[i];
    if (enl_trigger_holds (row->trigger, value)) {
      EnlCaution caution = {&row->rule, fill_sentence (row->rule.sentence, value), NULL};
      caution.text = g_strdup (caution.clause);
      caution.text[0] = g_ascii_toupper (caution.text[0]);
      g_array_append_val (found, caution);
    }
  }
  *n = found->len;
  if (found->len) /* g_qsort_with_data is stable: equal ones stay in the order of the table */
    g_qsort_with_data (found->data, (int)found->len, sizeof (EnlCaution), by_weight, NULL);
  return (EnlCaution *)g_array_free (found, found->len == 0);
}

void
enl_cautions_free (EnlCaution *caution, uint32_t n)
{
  for (uint32_t i = 0; i < n; i++) {
    g_free (caution[i].clause);
    g_free (caution[i].text);
  }
  g_free (caution);
}
