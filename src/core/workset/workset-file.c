#include <stdlib.h>
#include <string.h>

#include "core/workset/workset-private.h"

#define FORMAT  "enolith-set"
#define VERSION 1
/* A set of 2,000 large molfiles stays far below this. */
#define MAX_FILE_BYTES (64u << 20)

/* ---- reading ---- */

/* A JSON value has no place of its own after parsing: point at its member name in the text. */
EnlStatus
enl_reading_fault (const EnlReading *r, const char *member, const char *advice, const char *what)
{
  g_autofree char *quoted = g_strdup_printf ("\"%s\"", member);
  const char *place = g_strstr_len (r->text, (gssize)r->size, quoted);

  enl_error_set (r->err, ENL_ERROR_FORMAT, advice, "'%s' %s", member, what);
  enl_error_locate (r->err, r->text, r->size, place ? (size_t)(place - r->text) : 0,
                    place ? strlen (quoted) : 1);
  return ENL_ERROR_FORMAT;
}

static const char *
take_string (json_t *object, const char *member)
{
  const char *text = json_string_value (json_object_get (object, member));

  return text ? text : "";
}

static EnlStatus
take_number (const EnlReading *r, json_t *object, const char *member, double *value)
{
  json_t *number = json_object_get (object, member);

  if (!number)
    return ENL_OK;
  if (!json_is_number (number))
    return enl_reading_fault (r, member, "write a number without quotes", "is not a number");
  *value = json_number_value (number);
  return ENL_OK;
}

static EnlStatus
read_conditions (const EnlReading *r, json_t *object, EnlWorkset *set)
{
  EnlConditions c = enl_conditions_default ();
  const char *solvent = take_string (object, "solvent");

  if (solvent[0] && !enl_solvent_parse (solvent, &c.solvent))
    return enl_reading_fault (r, "solvent", "write dmso, water or thf", "names an unknown solvent");
  EnlStatus status = take_number (r, object, "equivalents", &c.equivalents);
  if (status == ENL_OK)
    status = take_number (r, object, "concentration", &c.concentration);
  if (status == ENL_OK)
    status = take_number (r, object, "temperature", &c.temperature);
  if (status == ENL_OK)
    status = take_number (r, object, "water", &c.water);
  if (status == ENL_OK)
    status = enl_conditions_check (&c, r->err);
  if (status == ENL_OK)
    set->conditions = c;
  return status;
}

static uint32_t
take_index (json_t *object, const char *member)
{
  json_t *number = json_object_get (object, member);
  json_int_t value = json_is_integer (number) ? json_integer_value (number) : -1;

  return value >= 0 && value < (json_int_t)ENL_NONE ? (uint32_t)value : ENL_NONE;
}

static void
read_selection (json_t *object, EnlWorkset *set)
{
  uint32_t substrate = take_index (object, "substrate");
  uint32_t atom = take_index (object, "atom");

  if (substrate >= enl_workset_size (set))
    substrate = ENL_NONE;
  enl_workset_select (set, substrate, substrate == ENL_NONE ? ENL_NONE : atom,
                      take_string (object, "base"));
}

json_t *
enl_json_rest (json_t *object, const char *const *known)
{
  json_t *rest = json_deep_copy (object);

  for (; *known; known++)
    json_object_del (rest, *known);
  return rest;
}

static EnlStatus
read_substrates (const EnlReading *r, json_t *array, EnlWorkset *set)
{
  static const char *const known[] = {"name", "structure", "note", NULL};
  size_t index;
  json_t *item;

  if (!json_is_array (array))
    return enl_reading_fault (r, "substrates", "write a list in square brackets", "is not a list");
  json_array_foreach (array, index, item)
  {
    if (!json_is_object (item))
      return enl_reading_fault (r, "substrates", "write every substrate in braces",
                                "holds something else");
    EnlStatus status = enl_workset_insert (set, (uint32_t)index, take_string (item, "name"),
                                           take_string (item, "structure"), r->err);
    if (status != ENL_OK)
      return status;
    enl_workset_set_note (set, (uint32_t)index, take_string (item, "note"));
    json_decref (set->kept->pdata[index]);
    set->kept->pdata[index] = enl_json_rest (item, known);
  }
  return ENL_OK;
}

/* Points at the text `quote` of a base in the file. */
static EnlStatus
read_bases (const EnlReading *r, json_t *array, EnlWorkset *set)
{
  size_t index;
  json_t *item;

  if (array && !json_is_array (array))
    return enl_reading_fault (r, "bases", "write a list in square brackets", "is not a list");
  json_array_foreach (array, index, item)
  {
    EnlError inner;
    const char *quote = enl_workset_read_base (set, item, &inner);
    if (!quote)
      continue;
    enl_reading_fault (r, quote, inner.advice, "");
    if (r->err)
      g_strlcpy (r->err->text, inner.text, sizeof r->err->text);
    return ENL_ERROR_FORMAT;
  }
  return ENL_OK;
}

static EnlStatus
read_root (const EnlReading *r, json_t *root, EnlWorkset *set)
{
  static const char *const known[] = {"format", "version",   "conditions", "substrates",
                                      "lab",    "selection", "bases",      NULL};

  if (!json_is_object (root) || strcmp (take_string (root, "format"), FORMAT) != 0)
    return enl_reading_fault (r, "format", "open a file that Enolith has saved",
                              "does not say enolith-set");
  if (json_integer_value (json_object_get (root, "version")) > VERSION)
    return enl_reading_fault (r, "version", "open it with a newer Enolith",
                              "is newer than this program");
  EnlStatus status = read_substrates (r, json_object_get (root, "substrates"), set);
  if (status == ENL_OK)
    status = read_conditions (r, json_object_get (root, "conditions"), set);
  if (status == ENL_OK)
    status = enl_workset_read_lab (r, json_object_get (root, "lab"), set);
  if (status == ENL_OK)
    status = read_bases (r, json_object_get (root, "bases"), set);
  if (status != ENL_OK)
    return status;
  read_selection (json_object_get (root, "selection"), set);
  json_decref (set->kept_top);
  set->kept_top = enl_json_rest (root, known);
  return ENL_OK;
}

EnlStatus
enl_workset_parse (const char *text, size_t size, EnlWorkset **out, EnlError *err)
{
  g_autoptr (EnlWorkset) set = enl_workset_new ();
  EnlReading r = {text, size, err};
  json_error_t where;

  *out = NULL;
  if (size == 0)
    return enl_error_set (err, ENL_ERROR_EMPTY, "open a file that Enolith has saved",
                          "the file is empty");
  if (size > MAX_FILE_BYTES)
    return enl_error_set (err, ENL_ERROR_LIMIT, "split the set", "the file is larger than 64 MB");
  json_t *root = json_loadb (text, size, JSON_REJECT_DUPLICATES, &where);
  if (!root) {
    enl_error_set (err, ENL_ERROR_FORMAT, "correct the text or open another copy",
                   "not a readable set: %.150s", where.text);
    enl_error_locate (err, text, size, (size_t)MAX (where.position, 0), 1);
    return ENL_ERROR_FORMAT;
  }
  EnlStatus status = read_root (&r, root, set);
  json_decref (root);
  if (status == ENL_OK)
    *out = g_steal_pointer (&set);
  return status;
}

/* ---- writing ---- */

static json_t *
write_substrate (const EnlSubstrate *s, json_t *kept)
{
  json_t *object = json_object ();

  json_object_set_new (object, "name", json_string (s->name));
  json_object_set_new (object, "structure", json_string (s->text));
  if (s->note[0])
    json_object_set_new (object, "note", json_string (s->note));
  json_object_update_missing (object, kept);
  return object;
}

static json_t *
write_conditions (const EnlConditions *c)
{
  return json_pack ("{s:s, s:f, s:f, s:f, s:f}", "solvent", enl_solvent_id (c->solvent),
                    "equivalents", c->equivalents, "concentration", c->concentration,
                    "temperature", c->temperature, "water", c->water);
}

static json_t *
write_selection (const EnlSelection *selection)
{
  json_t *object = json_object ();

  if (selection->substrate != ENL_NONE)
    json_object_set_new (object, "substrate", json_integer (selection->substrate));
  if (selection->atom != ENL_NONE)
    json_object_set_new (object, "atom", json_integer (selection->atom));
  if (selection->base[0])
    json_object_set_new (object, "base", json_string (selection->base));
  return object;
}

char *
enl_workset_write (const EnlWorkset *set)
{
  json_t *root = json_object (), *substrates = json_array ();

  json_object_set_new (root, "format", json_string (FORMAT));
  json_object_set_new (root, "version", json_integer (VERSION));
  json_object_set_new (root, "conditions", write_conditions (&set->conditions));
  for (uint32_t i = 0; i < enl_workset_size (set); i++)
    json_array_append_new (
        substrates, write_substrate (enl_workset_get (set, i), g_ptr_array_index (set->kept, i)));
  json_object_set_new (root, "substrates", substrates);
  if (enl_workset_lab_size (set))
    json_object_set_new (root, "lab", enl_workset_write_lab (set));
  if (enl_workset_bases (set))
    json_object_set_new (root, "bases", enl_workset_write_bases (set));
  json_object_set_new (root, "selection", write_selection (&set->selection));
  json_object_update_missing (root, set->kept_top);
  char *text = json_dumps (root, JSON_INDENT (2) | JSON_REAL_PRECISION (15));
  char *out = g_strconcat (text, "\n", NULL);
  free (text);
  json_decref (root);
  return out;
}

/* ---- files ---- */

static EnlStatus
io_fault (const GError *error, const char *advice, EnlError *err)
{
  return enl_error_set (err, ENL_ERROR_IO, advice, "%.190s", error->message);
}

EnlStatus
enl_workset_load (const char *path, EnlWorkset **out, EnlError *err)
{
  g_autofree char *text = NULL;
  g_autoptr (GError) error = NULL;
  size_t size = 0;

  *out = NULL;
  if (!g_file_get_contents (path, &text, &size, &error))
    return io_fault (error, "check the path and the permissions", err);
  return enl_workset_parse (text, size, out, err);
}

EnlStatus
enl_workset_save (const EnlWorkset *set, const char *path, EnlError *err)
{
  g_autofree char *text = enl_workset_write (set);
  g_autoptr (GError) error = NULL;

  if (!g_file_set_contents_full (path, text, -1,
                                 G_FILE_SET_CONTENTS_CONSISTENT | G_FILE_SET_CONTENTS_DURABLE, 0644,
                                 &error))
    return io_fault (error, "save in another folder; the set is still open", err);
  return ENL_OK;
}
