#include "core/acidity/pi-parameters.h"

#include <math.h>
#include <string.h>

#include "core/base/table.h"
#include "resources/embedded.h"

int
enl_pi_parameters_type (const EnlPiParameters *parameters, const char *name)
{
  for (uint32_t i = 0; i < parameters->n_types; i++)
    if (strcmp (parameters->name[i], name) == 0)
      return (int)i;
  return -1;
}

static EnlStatus
refuse_row (const EnlTable *table, size_t row, const char *what, EnlError *err)
{
  enl_error_set (err, ENL_ERROR_FORMAT, "correct the table of pi parameters", "%s", what);
  if (err)
    err->line = enl_table_line (table, row);
  return ENL_ERROR_FORMAT;
}

static EnlStatus
add_type (const EnlTable *table, size_t row, const char *name, double value, EnlPiParameters *out,
          EnlError *err)
{
  if (out->n_types == ENL_MAX_PI_TYPES || strlen (name) >= sizeof out->name[0])
    return refuse_row (table, row, "too many kinds of orbital, or too long a name", err);
  if (enl_pi_parameters_type (out, name) >= 0)
    return refuse_row (table, row, "kind of orbital given twice", err);
  g_strlcpy (out->name[out->n_types], name, sizeof out->name[0]);
  out->h[out->n_types] = value;
  for (uint32_t i = 0; i <= out->n_types; i++)
    out->k[i][out->n_types] = out->k[out->n_types][i] = NAN;
  out->n_types++;
  return ENL_OK;
}

/* "*" for both ends fills every pair that has no row of its own. */
static EnlStatus
add_pair (const EnlTable *table, size_t row, const char *a, const char *b, double value,
          EnlPiParameters *out, EnlError *err)
{
  int i = enl_pi_parameters_type (out, a), j = enl_pi_parameters_type (out, b);

  if (strcmp (a, "*") == 0 && strcmp (b, "*") == 0) {
    for (uint32_t m = 0; m < out->n_types; m++)
      for (uint32_t n = 0; n < out->n_types; n++)
        if (isnan (out->k[m][n]))
          out->k[m][n] = value;
    return ENL_OK;
  }
  if (i < 0 || j < 0)
    return refuse_row (table, row, "pair of orbitals without an h row", err);
  out->k[i][j] = out->k[j][i] = value;
  return ENL_OK;
}

static bool
is_complete (const EnlPiParameters *parameters)
{
  for (uint32_t i = 0; i < parameters->n_types; i++)
    for (uint32_t j = 0; j < parameters->n_types; j++)
      if (isnan (parameters->k[i][j]))
        return false;
  return parameters->n_types > 0;
}

EnlStatus
enl_pi_parameters_parse (const char *text, size_t size, EnlPiParameters *out, EnlError *err)
{
  g_autoptr (EnlTable) table = NULL;
  EnlStatus status = enl_table_parse (text, size, &table, err);

  memset (out, 0, sizeof *out);
  for (size_t row = 0; status == ENL_OK && row < enl_table_rows (table); row++) {
    const char *kind = enl_table_cell (table, row, enl_table_column (table, "kind"));
    const char *a = enl_table_cell (table, row, enl_table_column (table, "a"));
    const char *b = enl_table_cell (table, row, enl_table_column (table, "b"));
    double value = enl_table_number (table, row, enl_table_column (table, "value"));

    if (isnan (value))
      status = refuse_row (table, row, "no value", err);
    else if (strcmp (kind, "h") == 0)
      status = add_type (table, row, a, value, out, err);
    else if (strcmp (kind, "k") == 0)
      status = add_pair (table, row, a, b, value, out, err);
    else
      status = refuse_row (table, row, "kind is neither 'h' nor 'k'", err);
  }
  if (status == ENL_OK && !is_complete (out))
    status = enl_error_set (err, ENL_ERROR_FORMAT, "add a row for every pair, or one for '*'",
                            "the table of pi parameters is incomplete");
  return status;
}

const EnlPiParameters *
enl_pi_parameters (void)
{
  static EnlPiParameters parameters;
  static gsize ready;

  if (g_once_init_enter (&ready)) {
    size_t size = 0;
    const char *text = enl_resource ("pi-parameters.tsv", &size);
    EnlError err;
    /* The table is part of the program, so that a fault in it is a fault of ours. */
    EnlStatus status = enl_pi_parameters_parse (text, size, &parameters, &err);
    g_assert (status == ENL_OK);
    g_once_init_leave (&ready, 1);
  }
  return &parameters;
}
