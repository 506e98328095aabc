#include "core/acidity/hyper.h"

#include <math.h>
#include <string.h>

#include "core/base/table.h"

static const struct {
  const char *name;
  double start;
} plain[ENL_H_relevance] = {
    [ENL_H_noise] = {"noise", 0.05},
    [ENL_H_linear_common] = {"linear_common", 10},
    [ENL_H_linear_element] = {"linear_element", 10},
    [ENL_H_linear_solvent] = {"linear_solvent", 0.3},
    [ENL_H_smooth_common] = {"smooth_common", 3},
    [ENL_H_smooth_element] = {"smooth_element", 8},
    [ENL_H_smooth_solvent] = {"smooth_solvent", 0.3},
    [ENL_H_smooth_length] = {"smooth_length", 10},
    [ENL_H_smooth_shape] = {"smooth_shape", 2},
};

void
enl_hyper_init (EnlHyper *hyper)
{
  for (int i = 0; i < ENL_N_HYPER; i++)
    hyper->value[i] = i < ENL_H_relevance ? plain[i].start : 1;
}

char *
enl_hyper_name (uint32_t index)
{
  g_assert (index < ENL_N_HYPER);
  if (index < ENL_H_relevance)
    return g_strdup (plain[index].name);
  g_autofree char *descriptor = enl_descriptor_name (index - ENL_H_relevance);
  return g_strdup_printf ("relevance.%s", descriptor);
}

EnlStatus
enl_hyper_parse (const char *text, size_t size, EnlHyper *out, EnlError *err)
{
  g_autoptr (EnlTable) table = NULL;
  g_autoptr (GHashTable) index = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, NULL);
  EnlStatus status = enl_table_parse (text, size, &table, err);

  if (status != ENL_OK)
    return status;
  enl_hyper_init (out);
  for (uint32_t i = 0; i < ENL_N_HYPER; i++)
    g_hash_table_insert (index, enl_hyper_name (i), GUINT_TO_POINTER (i + 1));
  for (size_t row = 0; row < enl_table_rows (table); row++) {
    const char *name = enl_table_cell (table, row, enl_table_column (table, "name"));
    double value = enl_table_number (table, row, enl_table_column (table, "value"));
    guint known = GPOINTER_TO_UINT (g_hash_table_lookup (index, name));
    if (known == 0 || !(value > 0) || !isfinite (value)) {
      enl_error_set (err, ENL_ERROR_FORMAT, "make the table again with 'enolith-fit tune'",
                     known ? "the value of '%s' is not a positive number"
                           : "unknown hyperparameter '%s'",
                     name);
      if (err)
        err->line = enl_table_line (table, row), err->column = 1;
      return ENL_ERROR_FORMAT;
    }
    out->value[known - 1] = value;
  }
  return ENL_OK;
}
