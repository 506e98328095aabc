#include "core/bases/base-steps.h"

#include <math.h>

#include "core/base/table.h"
#include "core/bases/base-private.h"

static EnlStatus
fault (const EnlTable *table, size_t row, const char *what, EnlError *err)
{
  enl_error_set (err, ENL_ERROR_FORMAT, "give steps 2, 3 ... of a known base, each pKaH lower",
                 "%s", what);
  if (err)
    err->line = enl_table_line (table, row), err->column = 1;
  return ENL_ERROR_FORMAT;
}

static EnlStatus
read_row (const EnlTable *table, size_t row, EnlBaseTable *bases, EnlError *err)
{
  const char *id = enl_table_cell (table, row, enl_table_column (table, "base"));
  const char *word = enl_table_cell (table, row, enl_table_column (table, "solvent"));
  double step = enl_table_number (table, row, enl_table_column (table, "step"));
  double pkah = enl_table_number (table, row, enl_table_column (table, "pKaH"));
  int index = enl_base_table_find (bases, id);
  EnlSolvent solvent;

  if (index < 0)
    return fault (table, row, "a base that the base table does not have", err);
  if (!enl_solvent_parse (word, &solvent))
    return fault (table, row, "an unknown solvent", err);
  EnlBase *base = enl_base_table_edit (bases, (uint32_t)index);
  uint32_t n = base->n_further[solvent];
  double before = n ? base->further[solvent][n - 1] : base->pkah[solvent];
  if (n == ENL_MAX_FURTHER || step != n + 2)
    return fault (table, row, "a step out of turn", err);
  if (!(pkah < before))
    return fault (table, row, "a pKaH that is missing or not below the step before", err);
  base->further[solvent][n] = pkah;
  base->n_further[solvent]++;
  return ENL_OK;
}

EnlStatus
enl_base_table_read_steps (EnlBaseTable *bases, const char *text, size_t size, EnlError *err)
{
  static const char *const needed[] = {"base", "solvent", "step", "pKaH", "source"};
  g_autoptr (EnlTable) table = NULL;
  EnlStatus status = enl_table_parse (text, size, &table, err);

  if (status == ENL_OK)
    status = enl_table_require (table, needed, ENL_COUNT (needed), "table of base steps", err);
  for (size_t row = 0; status == ENL_OK && row < enl_table_rows (table); row++)
    status = read_row (table, row, bases, err);
  return status;
}
