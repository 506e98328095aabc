#include "core/bases/caution.h"

#include <stdlib.h>
#include <string.h>

#include "core/base/table.h"

#define DEFERRAL_ID "DEFER"

typedef struct {
  EnlCaution caution;
  char **base;    /* ids, "family:NAME" or "*" */
  char **solvent; /* empty: any */
  bool carbonyl;  /* only for sites next to C=O */
} Rule;

struct EnlCautionTable {
  EnlTable *text; /* owns the strings of the cautions */
  Rule *rule;
  uint32_t n;
  const char *deferral;
};

static char **
split_list (const char *text)
{
  char **part = g_strsplit (text, ";", -1);

  for (char **p = part; *p; p++)
    g_strstrip (*p);
  return part;
}

static void
read_rule (EnlCautionTable *table, size_t row)
{
  const EnlTable *t = table->text;
  Rule *rule = &table->rule[table->n];
  const char *id = enl_table_cell (t, row, enl_table_column (t, "id"));
  const char *text = enl_table_cell (t, row, enl_table_column (t, "text"));

  if (strcmp (id, DEFERRAL_ID) == 0) {
    table->deferral = text;
    return;
  }
  rule->caution.id = id;
  rule->caution.text = text;
  rule->caution.source = enl_table_cell (t, row, enl_table_column (t, "source"));
  rule->caution.severity = atoi (enl_table_cell (t, row, enl_table_column (t, "severity")));
  rule->caution.prevents_above = enl_table_number (t, row, enl_table_column (t, "prevents_above"));
  rule->base = split_list (enl_table_cell (t, row, enl_table_column (t, "bases")));
  rule->solvent = split_list (enl_table_cell (t, row, enl_table_column (t, "solvents")));
  rule->carbonyl = strcmp (enl_table_cell (t, row, enl_table_column (t, "carbonyl")), "yes") == 0;
  table->n++;
}

static EnlStatus
check_columns (const EnlTable *table, EnlError *err)
{
  static const char *const needed[] = {"id",       "severity", "bases",  "solvents",
                                       "carbonyl", "text",     "source", "prevents_above"};

  return enl_table_require (table, needed, ENL_COUNT (needed), "caution table", err);
}

EnlStatus
enl_caution_table_new (const char *text, size_t size, EnlCautionTable **out, EnlError *err)
{
  g_autoptr (EnlCautionTable) table = g_new0 (EnlCautionTable, 1);

  *out = NULL;
  EnlStatus status = enl_table_parse (text, size, &table->text, err);
  if (status == ENL_OK)
    status = check_columns (table->text, err);
  if (status != ENL_OK)
    return status;
  table->rule = g_new0 (Rule, enl_table_rows (table->text));
  for (size_t row = 0; row < enl_table_rows (table->text); row++)
    read_rule (table, row);
  if (!table->deferral)
    return enl_error_set (err, ENL_ERROR_FORMAT, "restore the row with id DEFER",
                          "the deferral to a qualified person is missing");
  *out = g_steal_pointer (&table);
  return ENL_OK;
}

void
enl_caution_table_free (EnlCautionTable *table)
{
  if (!table)
    return;
  for (uint32_t i = 0; i < table->n; i++) {
    g_strfreev (table->rule[i].base);
    g_strfreev (table->rule[i].solvent);
  }
  g_free (table->rule);
  enl_table_free (table->text);
  g_free (table);
}

const char *
enl_caution_deferral (const EnlCautionTable *table)
{
  return table->deferral;
}

static bool
names_base (char *const *list, const EnlBase *base)
{
  for (char *const *p = list; *p; p++) {
    if (strcmp (*p, "*") == 0 || strcmp (*p, base->id) == 0)
      return true;
    if (g_str_has_prefix (*p, "family:") && strcmp (*p + strlen ("family:"), base->family) == 0)
      return true;
  }
  return false;
}

static bool
names_solvent (char *const *list, EnlSolvent solvent)
{
  return !list[0] || !list[0][0] ||
         g_strv_contains ((const char *const *)list, enl_solvent_id (solvent));
}

const EnlCaution **
enl_caution_collect (const EnlCautionTable *table, const EnlBase *base, EnlSolvent solvent,
                     bool carbonyl, uint32_t *n)
{
  GPtrArray *found = g_ptr_array_new ();

  for (uint32_t i = 0; i < table->n; i++) {
    const Rule *rule = &table->rule[i];
    if (names_base (rule->base, base) && names_solvent (rule->solvent, solvent) &&
        (!rule->carbonyl || carbonyl))
      g_ptr_array_add (found, (gpointer)&rule->caution);
  }
  *n = found->len;
  if (found->len == 0) {
    g_ptr_array_unref (found);
    return NULL;
  }
  return (const EnlCaution **)g_ptr_array_free (found, FALSE);
}
