/* The own values of a set. */
#include <math.h>
#include <string.h>

#include "core/workset/workset-private.h"

uint32_t
enl_workset_lab_size (const EnlWorkset *set)
{
  return set->lab->len;
}

const EnlLabEntry *
enl_workset_lab (const EnlWorkset *set, uint32_t index)
{
  g_assert (index < set->lab->len);
  return g_ptr_array_index (set->lab, index);
}

EnlStatus
enl_workset_add_lab (EnlWorkset *set, const EnlLabEntry *entry, EnlError *err)
{
  if (set->lab->len >= ENL_MAX_LAB)
    return enl_error_set (err, ENL_ERROR_LIMIT, "remove what is far from your compounds",
                          "a set holds at most %d lab values", ENL_MAX_LAB);
  g_ptr_array_add (set->lab, enl_lab_entry_copy (entry));
  g_ptr_array_add (set->kept_lab, json_object ());
  return ENL_OK;
}

void
enl_workset_set_lab (EnlWorkset *set, uint32_t index, const EnlLabEntry *entry)
{
  EnlLabEntry *copy = enl_lab_entry_copy (entry); /* `entry` may be the old one */

  g_assert (index < set->lab->len);
  enl_lab_entry_free (set->lab->pdata[index]);
  set->lab->pdata[index] = copy;
}

void
enl_workset_remove_lab (EnlWorkset *set, uint32_t index)
{
  g_assert (index < set->lab->len);
  g_ptr_array_remove_index (set->lab, index);
  g_ptr_array_remove_index (set->kept_lab, index);
}

bool
enl_workset_same_lab (const EnlWorkset *a, const EnlWorkset *b)
{
  if (a->lab->len != b->lab->len)
    return false;
  for (uint32_t i = 0; i < a->lab->len; i++)
    if (!enl_lab_entry_equal (enl_workset_lab (a, i), enl_workset_lab (b, i)))
      return false;
  return true;
}

EnlLab *
enl_workset_lab_check (const EnlWorkset *set, const EnlNames *names, EnlError *fault)
{
  EnlLab *lab = enl_lab_new ();

  for (uint32_t i = 0; i < set->lab->len; i++) {
    EnlError err = {0};
    if (enl_lab_add (lab, names, enl_workset_lab (set, i), i, NULL, &err) == ENL_OK)
      err.code = ENL_OK;
    if (fault)
      fault[i] = err;
  }
  return lab;
}

/* ---- reading ---- */

static void
take_text (json_t *object, EnlLabField field, char **text)
{
  const char *value = json_string_value (json_object_get (object, enl_lab_field_name (field)));

  if (!value)
    return;
  g_free (*text);
  *text = g_strdup (value);
}

/* null stands for a number that was none when the set was saved. */
static EnlStatus
take_number (const EnlReading *r, json_t *object, EnlLabField field, double *value)
{
  json_t *number = json_object_get (object, enl_lab_field_name (field));

  if (!number)
    return ENL_OK;
  if (!json_is_number (number) && !json_is_null (number))
    return enl_reading_fault (r, enl_lab_field_name (field), "write a number without quotes",
                              "is not a number");
  *value = json_is_null (number) ? NAN : json_number_value (number);
  return ENL_OK;
}

static EnlStatus
read_value (const EnlReading *r, json_t *object, EnlWorkset *set)
{
  static const char *const known[] = {"structure", "atom", "solvent", "pka", "sigma",
                                      "name",      "note", "source",  NULL};
  g_autoptr (EnlLabEntry) entry = enl_lab_entry_new ();
  const char *solvent = json_string_value (json_object_get (object, "solvent"));
  json_t *atom = json_object_get (object, "atom");

  if (solvent && !enl_solvent_parse (solvent, &entry->solvent))
    return enl_reading_fault (r, "lab", "write dmso or water",
                              "holds a value in an unknown solvent");
  if (atom && (json_integer_value (atom) < 1 || json_integer_value (atom) > ENL_MAX_ATOMS))
    return enl_reading_fault (r, "lab", "write the position of the acidic atom, from 1",
                              "holds an atom that is no position");
  entry->atom = (uint32_t)json_integer_value (atom);
  take_text (object, ENL_LAB_STRUCTURE, &entry->structure);
  take_text (object, ENL_LAB_NAME, &entry->name);
  take_text (object, ENL_LAB_NOTE, &entry->note);
  take_text (object, ENL_LAB_SOURCE, &entry->source);
  EnlStatus status = take_number (r, object, ENL_LAB_PKA, &entry->pka);
  if (status == ENL_OK)
    status = take_number (r, object, ENL_LAB_SIGMA, &entry->sigma);
  if (status == ENL_OK)
    status = enl_workset_add_lab (set, entry, r->err);
  if (status != ENL_OK)
    return status;
  json_t **kept = (json_t **)&set->kept_lab->pdata[set->kept_lab->len - 1];
  json_decref (*kept);
  *kept = enl_json_rest (object, known);
  return ENL_OK;
}

EnlStatus
enl_workset_read_lab (const EnlReading *r, json_t *array, EnlWorkset *set)
{
  size_t index;
  json_t *item;

  if (array && !json_is_array (array))
    return enl_reading_fault (r, "lab", "write a list in square brackets", "is not a list");
  json_array_foreach (array, index, item)
  {
    if (!json_is_object (item))
      return enl_reading_fault (r, "lab", "write every value in braces", "holds something else");
    EnlStatus status = read_value (r, item, set);
    if (status != ENL_OK)
      return status;
  }
  return ENL_OK;
}

/* ---- writing ---- */

static void
write_text (json_t *object, EnlLabField field, const char *text)
{
  if (text[0])
    json_object_set_new (object, enl_lab_field_name (field), json_string (text));
}

static json_t *
write_value (const EnlLabEntry *e, json_t *kept)
{
  json_t *object = json_object ();

  write_text (object, ENL_LAB_NAME, e->name);
  write_text (object, ENL_LAB_STRUCTURE, e->structure);
  if (e->atom)
    json_object_set_new (object, "atom", json_integer (e->atom));
  json_object_set_new (object, "solvent", json_string (enl_solvent_id (e->solvent)));
  /* json knows no NAN: a value that was no number comes back as none */
  json_object_set_new (object, "pka", isfinite (e->pka) ? json_real (e->pka) : json_null ());
  json_object_set_new (object, "sigma", isfinite (e->sigma) ? json_real (e->sigma) : json_null ());
  write_text (object, ENL_LAB_NOTE, e->note);
  write_text (object, ENL_LAB_SOURCE, e->source);
  json_object_update_missing (object, kept);
  return object;
}

json_t *
enl_workset_write_lab (const EnlWorkset *set)
{
  json_t *array = json_array ();

  for (uint32_t i = 0; i < set->lab->len; i++)
    json_array_append_new (
        array, write_value (enl_workset_lab (set, i), g_ptr_array_index (set->kept_lab, i)));
  return array;
}
