/* The bases that a set brings along, and their place in its file:
 *
 *   "bases": [ { "name": "our phosphazene", "class": "phosphazene", "cation": "none",
 *                "pKaH": { "dmso": 24.1 }, "sigma": { "dmso": 0.5 }, "note": "batch 7",
 *                "molar_mass": 312.44, "molarity": 1.0, "mass_percent": 60, "density": 0.9 } ]
 */
#include <math.h>
#include <string.h>

#include "core/workset/workset-private.h"

uint32_t
enl_workset_bases (const EnlWorkset *set)
{
  return set->base->len;
}

const EnlOwnBase *
enl_workset_base (const EnlWorkset *set, uint32_t index)
{
  g_assert (index < set->base->len);
  return g_ptr_array_index (set->base, index);
}

EnlStatus
enl_workset_add_base (EnlWorkset *set, const EnlOwnBase *base, EnlError *err)
{
  EnlStatus status = enl_own_base_check (base, NULL, err);

  if (status != ENL_OK)
    return status;
  if (set->base->len >= ENL_MAX_OWN_BASES)
    return enl_error_set (err, ENL_ERROR_LIMIT, "remove one that is not needed",
                          "a set holds at most %d bases of its own", ENL_MAX_OWN_BASES);
  for (uint32_t i = 0; i < set->base->len; i++)
    if (g_ascii_strcasecmp (enl_workset_base (set, i)->name, base->name) == 0)
      return enl_error_set (err, ENL_ERROR_UNKNOWN, "choose another name",
                            "there is a base '%.80s' already", base->name);
  g_ptr_array_add (set->base, enl_own_base_copy (base));
  return ENL_OK;
}

void
enl_workset_remove_base (EnlWorkset *set, uint32_t index)
{
  g_assert (index < set->base->len);
  g_ptr_array_remove_index (set->base, index);
}

EnlStatus
enl_workset_base_table (const EnlWorkset *set, const EnlBaseTable *table, EnlBaseTable **out,
                        EnlError *err)
{
  EnlStatus status = ENL_OK;

  *out = NULL;
  for (uint32_t i = 0; status == ENL_OK && i < set->base->len; i++)
    status = enl_own_base_check (enl_workset_base (set, i), table, err);
  if (status == ENL_OK)
    *out = enl_base_table_extend (table, (EnlOwnBase *const *)set->base->pdata, set->base->len);
  return status;
}

/* ---- file ---- */

/* Numbers by solvent: { "dmso": 24.1 }. Returns the name of a member that is no solvent or no
 * number, or NULL. */
static const char *
read_numbers (json_t *object, double *value)
{
  const char *key;
  json_t *number;

  json_object_foreach (object, key, number)
  {
    EnlSolvent solvent;
    if (!enl_solvent_parse (key, &solvent) || !json_is_number (number))
      return key;
    value[solvent] = json_number_value (number);
  }
  return NULL;
}

static void
take_text (json_t *object, const char *member, char **place)
{
  const char *text = json_string_value (json_object_get (object, member));

  if (text) {
    g_free (*place);
    *place = g_strdup (text);
  }
}

/* How it is weighed out: members with numbers, each may be missing. */
typedef struct {
  const char *member;
  double *place;
} FormNumber;

#define N_FORM_NUMBERS 4

static void
form_numbers (EnlOwnBase *base, FormNumber *out)
{
  out[0] = (FormNumber){"molar_mass", &base->molar_mass};
  out[1] = (FormNumber){"molarity", &base->molarity};
  out[2] = (FormNumber){"mass_percent", &base->mass_percent};
  out[3] = (FormNumber){"density", &base->density};
}

/* Returns the member that is no number, or NULL. */
static const char *
read_form (json_t *object, EnlOwnBase *base)
{
  FormNumber form[N_FORM_NUMBERS];

  form_numbers (base, form);
  for (int i = 0; i < N_FORM_NUMBERS; i++) {
    json_t *number = json_object_get (object, form[i].member);
    if (number && !json_is_number (number))
      return form[i].member;
    if (number)
      *form[i].place = json_number_value (number);
  }
  return NULL;
}

static void
write_form (json_t *object, const EnlOwnBase *base)
{
  EnlOwnBase copy = *base;
  FormNumber form[N_FORM_NUMBERS];

  form_numbers (&copy, form);
  for (int i = 0; i < N_FORM_NUMBERS; i++)
    if (!isnan (*form[i].place))
      json_object_set_new (object, form[i].member, json_real (*form[i].place));
}

const char *
enl_workset_read_base (EnlWorkset *set, json_t *object, EnlError *err)
{
  const char *name = json_string_value (json_object_get (object, "name"));
  g_autoptr (EnlOwnBase) base = enl_own_base_new (name ? name : "");
  const char *wrong = read_numbers (json_object_get (object, "pKaH"), base->pkah);

  if (!wrong)
    wrong = read_numbers (json_object_get (object, "sigma"), base->sigma);
  if (wrong) {
    enl_error_set (err, ENL_ERROR_FORMAT, "write dmso, water or thf and a number without quotes",
                   "'%.60s' of a base is no solvent with a number", wrong);
    return wrong;
  }
  wrong = read_form (object, base);
  if (wrong) {
    enl_error_set (err, ENL_ERROR_FORMAT, "write a number without quotes",
                   "'%.60s' of a base is no number", wrong);
    return wrong;
  }
  take_text (object, "class", &base->family);
  take_text (object, "cation", &base->cation);
  take_text (object, "note", &base->note);
  base->irreversible = json_is_true (json_object_get (object, "irreversible"));
  if (enl_workset_add_base (set, base, err) == ENL_OK)
    return NULL;
  return name && name[0] ? name : "bases";
}

static json_t *
write_numbers (const double *value)
{
  json_t *object = json_object ();

  for (int s = 0; s < ENL_N_SOLVENTS; s++)
    if (!isnan (value[s]))
      json_object_set_new (object, enl_solvent_id ((EnlSolvent)s), json_real (value[s]));
  return object;
}

json_t *
enl_workset_write_bases (const EnlWorkset *set)
{
  json_t *array = json_array ();

  for (uint32_t i = 0; i < set->base->len; i++) {
    const EnlOwnBase *base = enl_workset_base (set, i);
    json_t *object =
        json_pack ("{s:s, s:s, s:s, s:b, s:o, s:o}", "name", base->name, "class", base->family,
                   "cation", base->cation, "irreversible", base->irreversible, "pKaH",
                   write_numbers (base->pkah), "sigma", write_numbers (base->sigma));
    write_form (object, base);
    if (base->note[0])
      json_object_set_new (object, "note", json_string (base->note));
    json_array_append_new (array, object);
  }
  return array;
}
