#include "core/bases/own-base.h"

#include <math.h>
#include <string.h>

#include "core/bases/base-private.h"

#define NAME_CHARACTERS 80
/* Wider than any acid that was ever measured or estimated. */
#define LOWEST_PKAH  -30.0
#define HIGHEST_PKAH 80.0
#define WIDEST_SIGMA 20.0
/* More than any reagent has. */
#define HEAVIEST  10000.0 /* g/mol */
#define STRONGEST 50.0    /* mol/L */
#define DENSEST   25.0    /* g/mL */

EnlOwnBase *
enl_own_base_new (const char *name)
{
  EnlOwnBase *base = g_new0 (EnlOwnBase, 1);

  base->name = g_strstrip (g_strdup (name));
  base->family = g_strdup ("amine");
  base->cation = g_strdup ("none");
  base->note = g_strdup ("");
  for (int s = 0; s < ENL_N_SOLVENTS; s++)
    base->pkah[s] = base->sigma[s] = NAN;
  base->molar_mass = base->molarity = base->mass_percent = base->density = NAN;
  return base;
}

EnlOwnBase *
enl_own_base_copy (const EnlOwnBase *base)
{
  EnlOwnBase *copy = g_memdup2 (base, sizeof *base);

  copy->name = g_strdup (base->name);
  copy->family = g_strdup (base->family);
  copy->cation = g_strdup (base->cation);
  copy->note = g_strdup (base->note);
  return copy;
}

void
enl_own_base_free (EnlOwnBase *base)
{
  if (!base)
    return;
  g_free (base->name);
  g_free (base->family);
  g_free (base->cation);
  g_free (base->note);
  g_free (base);
}

/* ---- checking ---- */

static EnlStatus
check_numbers (const EnlOwnBase *base, EnlError *err)
{
  int numbers = 0;

  for (int s = 0; s < ENL_N_SOLVENTS; s++) {
    const char *label = enl_solvent_label ((EnlSolvent)s);
    if (isnan (base->pkah[s]))
      continue;
    numbers++;
    if (!(base->pkah[s] >= LOWEST_PKAH && base->pkah[s] <= HIGHEST_PKAH))
      return enl_error_set (err, ENL_ERROR_RANGE, "give a pKaH from -30 to 80",
                            "pKaH %g of '%s' in %s", base->pkah[s], base->name, label);
    if (!(base->sigma[s] > 0.0 && base->sigma[s] <= WIDEST_SIGMA))
      return enl_error_set (err, ENL_ERROR_RANGE,
                            "say how sure the number is: a standard deviation above 0, at most 20",
                            "'%s' has no usable sigma in %s", base->name, label);
  }
  if (numbers == 0)
    return enl_error_set (err, ENL_ERROR_RANGE, "give its pKaH in dmso, water or thf",
                          "'%s' has no strength", base->name);
  return ENL_OK;
}

/* All but the unknown ones must be amounts that exist. */
static EnlStatus
check_form (const EnlOwnBase *base, EnlError *err)
{
  const struct {
    double value, most;
    const char *what;
  } number[] = {{base->molar_mass, HEAVIEST, "molar mass, g/mol,"},
                {base->molarity, STRONGEST, "molarity, mol/L,"},
                {base->mass_percent, 100.0, "mass per cent"},
                {base->density, DENSEST, "density, g/mL,"}};

  for (size_t i = 0; i < ENL_COUNT (number); i++)
    if (!isnan (number[i].value) && !(number[i].value > 0.0 && number[i].value <= number[i].most))
      return enl_error_set (err, ENL_ERROR_RANGE, "give a number above 0 that can be true, or none",
                            "%s %g of '%.80s'", number[i].what, number[i].value, base->name);
  return ENL_OK;
}

static EnlStatus
check_against (const EnlOwnBase *base, const EnlBaseTable *table, EnlError *err)
{
  bool family = false, cation = false;

  if (enl_base_table_find (table, base->name) >= 0)
    return enl_error_set (err, ENL_ERROR_UNKNOWN, "choose another name",
                          "there is a base '%.80s' already", base->name);
  for (uint32_t i = 0; i < enl_base_table_size (table); i++) {
    family |= strcmp (enl_base_table_get (table, i)->family, base->family) == 0;
    cation |= strcmp (enl_base_table_get (table, i)->cation, base->cation) == 0;
  }
  if (!family)
    return enl_error_set (err, ENL_ERROR_RANGE,
                          "write a class of the base table: amine, alkoxide, amide, hydride ...",
                          "'%.60s' is no class of bases", base->family);
  if (!cation)
    return enl_error_set (err, ENL_ERROR_RANGE, "write none, Li, Na, K, Cs, Mg, MgX or R4N",
                          "'%.60s' is no cation of the base table", base->cation);
  return ENL_OK;
}

EnlStatus
enl_own_base_check (const EnlOwnBase *base, const EnlBaseTable *table, EnlError *err)
{
  if (!base->name[0] || g_utf8_strlen (base->name, -1) > NAME_CHARACTERS)
    return enl_error_set (err, ENL_ERROR_RANGE, "give a name of 1 to 80 characters",
                          "a base has no usable name");
  EnlStatus status = check_numbers (base, err);
  if (status == ENL_OK)
    status = check_form (base, err);
  return status == ENL_OK && table ? check_against (base, table, err) : status;
}

/* ---- extending ---- */

static void
fill_row (EnlBaseTable *table, EnlBase *row, const EnlOwnBase *own)
{
  static const EnlBase blank = {.smiles = "",
                                .conjugate_acid = "",
                                .nucleophilicity = "",
                                .steric = "",
                                .typical_solvents = "",
                                .typical_temperature = "",
                                .incompatible = "",
                                .source = "added by the user",
                                .thf_scale = "",
                                .form = ""};

  *row = blank;
  row->id = row->name = enl_base_table_keep (table, own->name);
  row->family = enl_base_table_keep (table, own->family);
  row->cation = enl_base_table_keep (table, own->cation);
  row->note = enl_base_table_keep (table, own->note);
  row->own = row->usual = true;
  row->irreversible = own->irreversible;
  row->pkah_nominal = NAN;
  row->molar_mass = own->molar_mass;
  row->molarity = own->molarity;
  row->mass_percent = own->mass_percent;
  row->density = own->density;
  memcpy (row->pkah, own->pkah, sizeof row->pkah);
  memcpy (row->sigma, own->sigma, sizeof row->sigma);
}

EnlBaseTable *
enl_base_table_extend (const EnlBaseTable *table, EnlOwnBase *const *own, uint32_t n)
{
  uint32_t size = enl_base_table_size (table);
  EnlBaseTable *out = enl_base_table_allocate (size + n);

  for (uint32_t i = 0; i < size; i++)
    *enl_base_table_edit (out, i) = *enl_base_table_get (table, i);
  for (uint32_t i = 0; i < n; i++)
    fill_row (out, enl_base_table_edit (out, size + i), own[i]);
  return out;
}
