#include "core/workset/workset.h"

#include <string.h>

#include "core/workset/workset-private.h"

static EnlSubstrate *
substrate_new (const char *name, const char *text, const char *note)
{
  EnlSubstrate *s = g_new0 (EnlSubstrate, 1);

  s->name = g_strdup (name ? name : "");
  s->text = g_strdup (text ? text : "");
  s->note = g_strdup (note ? note : "");
  return s;
}

static void
substrate_free (gpointer data)
{
  EnlSubstrate *s = data;

  g_free (s->name);
  g_free (s->text);
  g_free (s->note);
  g_free (s);
}

static void
free_base (gpointer data)
{
  enl_own_base_free (data);
}

static void
unref_json (gpointer data)
{
  json_decref (data);
}

EnlWorkset *
enl_workset_new (void)
{
  EnlWorkset *set = g_new0 (EnlWorkset, 1);

  set->substrate = g_ptr_array_new_with_free_func (substrate_free);
  set->kept = g_ptr_array_new_with_free_func (unref_json);
  set->lab = g_ptr_array_new_with_free_func ((GDestroyNotify)enl_lab_entry_free);
  set->kept_lab = g_ptr_array_new_with_free_func (unref_json);
  set->base = g_ptr_array_new_with_free_func (free_base);
  set->kept_top = json_object ();
  set->conditions = enl_conditions_default ();
  set->selection = (EnlSelection){ENL_NONE, ENL_NONE, g_strdup ("")};
  return set;
}

EnlWorkset *
enl_workset_copy (const EnlWorkset *set)
{
  EnlWorkset *copy = enl_workset_new ();

  for (uint32_t i = 0; i < set->substrate->len; i++) {
    const EnlSubstrate *s = enl_workset_get (set, i);
    g_ptr_array_add (copy->substrate, substrate_new (s->name, s->text, s->note));
    g_ptr_array_add (copy->kept, json_deep_copy (g_ptr_array_index (set->kept, i)));
  }
  for (uint32_t i = 0; i < set->lab->len; i++) {
    g_ptr_array_add (copy->lab, enl_lab_entry_copy (enl_workset_lab (set, i)));
    g_ptr_array_add (copy->kept_lab, json_deep_copy (g_ptr_array_index (set->kept_lab, i)));
  }
  for (uint32_t i = 0; i < set->base->len; i++)
    g_ptr_array_add (copy->base, enl_own_base_copy (enl_workset_base (set, i)));
  json_decref (copy->kept_top);
  copy->kept_top = json_deep_copy (set->kept_top);
  copy->conditions = set->conditions;
  enl_workset_select (copy, set->selection.substrate, set->selection.atom, set->selection.base);
  return copy;
}

void
enl_workset_free (EnlWorkset *set)
{
  if (!set)
    return;
  g_ptr_array_unref (set->substrate);
  g_ptr_array_unref (set->kept);
  g_ptr_array_unref (set->lab);
  g_ptr_array_unref (set->kept_lab);
  g_ptr_array_unref (set->base);
  json_decref (set->kept_top);
  g_free (set->selection.base);
  g_free (set);
}

uint32_t
enl_workset_size (const EnlWorkset *set)
{
  return set->substrate->len;
}

const EnlSubstrate *
enl_workset_get (const EnlWorkset *set, uint32_t index)
{
  g_assert (index < set->substrate->len);
  return g_ptr_array_index (set->substrate, index);
}

static EnlSubstrate *
edit (EnlWorkset *set, uint32_t index)
{
  g_assert (index < set->substrate->len);
  return g_ptr_array_index (set->substrate, index);
}

EnlStatus
enl_workset_insert (EnlWorkset *set, uint32_t index, const char *name, const char *text,
                    EnlError *err)
{
  g_assert (index <= set->substrate->len);
  if (set->substrate->len >= ENL_MAX_SUBSTRATES)
    return enl_error_set (err, ENL_ERROR_LIMIT, "start another set for the rest",
                          "a set holds at most %d substrates", ENL_MAX_SUBSTRATES);
  g_ptr_array_insert (set->substrate, (int)index, substrate_new (name, text, NULL));
  g_ptr_array_insert (set->kept, (int)index, json_object ());
  if (set->selection.substrate != ENL_NONE && set->selection.substrate >= index)
    set->selection.substrate++;
  return ENL_OK;
}

void
enl_workset_remove (EnlWorkset *set, uint32_t index)
{
  EnlSelection *selection = &set->selection;

  g_assert (index < set->substrate->len);
  g_ptr_array_remove_index (set->substrate, index);
  g_ptr_array_remove_index (set->kept, index);
  if (selection->substrate == ENL_NONE)
    return;
  if (selection->substrate == index)
    selection->atom = ENL_NONE;
  if (selection->substrate > index || selection->substrate == set->substrate->len)
    selection->substrate = set->substrate->len ? selection->substrate - 1 : ENL_NONE;
}

static void
move_pointer (GPtrArray *array, uint32_t from, uint32_t to)
{
  gpointer item = array->pdata[from];

  if (from < to)
    memmove (array->pdata + from, array->pdata + from + 1, (to - from) * sizeof (gpointer));
  else
    memmove (array->pdata + to + 1, array->pdata + to, (from - to) * sizeof (gpointer));
  array->pdata[to] = item;
}

void
enl_workset_move (EnlWorkset *set, uint32_t from, uint32_t to)
{
  uint32_t *selected = &set->selection.substrate;

  g_assert (from < set->substrate->len && to < set->substrate->len);
  move_pointer (set->substrate, from, to);
  move_pointer (set->kept, from, to);
  if (*selected == ENL_NONE)
    return;
  if (*selected == from)
    *selected = to;
  else if (from < *selected && *selected <= to)
    --*selected;
  else if (to <= *selected && *selected < from)
    ++*selected;
}

static void
replace (char **place, const char *text)
{
  char *copy = g_strdup (text);

  g_free (*place);
  *place = copy;
}

void
enl_workset_set_name (EnlWorkset *set, uint32_t index, const char *name)
{
  replace (&edit (set, index)->name, name);
}

void
enl_workset_set_text (EnlWorkset *set, uint32_t index, const char *text)
{
  replace (&edit (set, index)->text, text);
}

void
enl_workset_set_note (EnlWorkset *set, uint32_t index, const char *note)
{
  replace (&edit (set, index)->note, note);
}

const EnlConditions *
enl_workset_conditions (const EnlWorkset *set)
{
  return &set->conditions;
}

void
enl_workset_set_conditions (EnlWorkset *set, const EnlConditions *conditions)
{
  set->conditions = *conditions;
}

const EnlSelection *
enl_workset_selection (const EnlWorkset *set)
{
  return &set->selection;
}

void
enl_workset_select (EnlWorkset *set, uint32_t substrate, uint32_t atom, const char *base)
{
  g_assert (substrate == ENL_NONE || substrate < set->substrate->len);
  set->selection.substrate = substrate;
  set->selection.atom = atom;
  if (base)
    replace (&set->selection.base, base);
}
