#include "core/bases/practice.h"

#include <math.h>
#include <string.h>

#include "core/base/table.h"

static double *
place_of (EnlPractice *out, const char *key)
{
  const struct {
    const char *key;
    double *place;
  } known[] = {
      {"alcohol_doubt", &out->alcohol_doubt},
      {"second_charge_dmso", &out->second_charge[ENL_SOLVENT_DMSO]},
      {"second_charge_water", &out->second_charge[ENL_SOLVENT_WATER]},
      {"second_charge_thf", &out->second_charge[ENL_SOLVENT_THF]},
      {"second_charge_shared", &out->second_charge_shared},
      {"competing_within", &out->competing_within},
      {"enough_gap", &out->enough_gap},
      {"excess", &out->excess},
      {"excess_most", &out->excess_most},
      {"deficit", &out->deficit},
  };

  for (size_t i = 0; i < ENL_COUNT (known); i++)
    if (strcmp (known[i].key, key) == 0)
      return known[i].place;
  return NULL;
}

static EnlStatus
read_rows (const EnlTable *table, EnlPractice *out, size_t *seen, EnlError *err)
{
  int key = enl_table_column (table, "key"), value = enl_table_column (table, "value");

  for (size_t row = 0; row < enl_table_rows (table); row++) {
    double *place = place_of (out, enl_table_cell (table, row, key));
    double number = enl_table_number (table, row, value);
    if (!place || !isfinite (number) || !isnan (*place)) {
      enl_error_set (err, ENL_ERROR_FORMAT, "give every known key once, with a number",
                     "key '%.60s' is unknown, repeated or without a number",
                     enl_table_cell (table, row, key));
      if (err)
        err->line = enl_table_line (table, row), err->column = 1;
      return ENL_ERROR_FORMAT;
    }
    *place = number;
    ++*seen;
  }
  return ENL_OK;
}

EnlStatus
enl_practice_parse (const char *text, size_t size, EnlPractice *out, EnlError *err)
{
  static const char *const needed[] = {"key", "value", "source"};
  const size_t all = sizeof *out / sizeof (double);
  g_autoptr (EnlTable) table = NULL;
  size_t seen = 0;

  for (size_t i = 0; i < all; i++)
    ((double *)out)[i] = NAN;
  EnlStatus status = enl_table_parse (text, size, &table, err);
  if (status == ENL_OK)
    status = enl_table_require (table, needed, ENL_COUNT (needed), "practice table", err);
  if (status == ENL_OK)
    status = read_rows (table, out, &seen, err);
  if (status == ENL_OK && seen != all)
    return enl_error_set (err, ENL_ERROR_FORMAT, "restore the missing rows",
                          "the practice table has %zu of %zu numbers", seen, all);
  return status;
}
