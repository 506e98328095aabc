#include "core/acidity/estimate.h"

#include <glib.h>

static const struct {
  const char *id, *label, *heading;
} solvent_word[ENL_N_SOLVENTS] = {
    [ENL_SOLVENT_DMSO] = {"dmso", "DMSO", "DMSO"},
    [ENL_SOLVENT_WATER] = {"water", "water", "water"},
    [ENL_SOLVENT_THF] = {"thf", "THF", "THF (DMSO-based footing)"},
};

const char *
enl_solvent_id (EnlSolvent solvent)
{
  g_assert (solvent < ENL_N_SOLVENTS);
  return solvent_word[solvent].id;
}

const char *
enl_solvent_label (EnlSolvent solvent)
{
  g_assert (solvent < ENL_N_SOLVENTS);
  return solvent_word[solvent].label;
}

const char *
enl_solvent_heading (EnlSolvent solvent)
{
  g_assert (solvent < ENL_N_SOLVENTS);
  return solvent_word[solvent].heading;
}

bool
enl_solvent_parse (const char *text, EnlSolvent *out)
{
  for (int i = 0; i < ENL_N_SOLVENTS; i++)
    if (g_ascii_strcasecmp (text, solvent_word[i].id) == 0) {
      *out = (EnlSolvent)i;
      return true;
    }
  return false;
}

const char *
enl_basis_text (EnlBasis basis)
{
  static const char *const text[ENL_N_BASES_OF_VALUE] = {
      [ENL_BASIS_MEASURED] = "measured",
      [ENL_BASIS_LAB] = "lab",
      [ENL_BASIS_ESTIMATED] = "estimated",
  };

  g_assert (basis < ENL_N_BASES_OF_VALUE);
  return text[basis];
}
