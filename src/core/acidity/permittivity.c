#include "core/acidity/permittivity.h"

#include <string.h>

#include "core/base/table.h"
#include "resources/embedded.h"

static void
fill (double value[ENL_N_SOLVENTS])
{
  g_autoptr (EnlTable) table = NULL;
  size_t size = 0;
  const char *text = enl_resource ("solvents.tsv", &size);
  EnlError err;
  EnlStatus status = enl_table_parse (text, size, &table, &err);

  g_assert (status == ENL_OK);
  for (size_t row = 0; row < enl_table_rows (table); row++) {
    EnlSolvent solvent;
    bool known = enl_solvent_parse (
        enl_table_cell (table, row, enl_table_column (table, "solvent")), &solvent);
    g_assert (known);
    value[solvent] = enl_table_number (table, row, enl_table_column (table, "permittivity"));
  }
  for (int solvent = 0; solvent < ENL_N_SOLVENTS; solvent++)
    g_assert (value[solvent] >= 1);
}

double
enl_permittivity (EnlSolvent solvent)
{
  /* Filled once: the table is part of the program, so that a fault in it is a fault of ours. */
  static double value[ENL_N_SOLVENTS];
  static gsize ready;

  g_assert (solvent < ENL_N_SOLVENTS);
  if (g_once_init_enter (&ready)) {
    fill (value);
    g_once_init_leave (&ready, 1);
  }
  return value[solvent];
}
