#include "app/history.h"

#include <string.h>

struct EnlHistory {
  GPtrArray *past, *future; /* EnlWorkset, latest last */
  char *join;               /* word of the latest step, NULL: it cannot be continued */
};

static GPtrArray *
new_pile (void)
{
  return g_ptr_array_new_with_free_func ((GDestroyNotify)enl_workset_free);
}

EnlHistory *
enl_history_new (void)
{
  EnlHistory *history = g_new0 (EnlHistory, 1);

  history->past = new_pile ();
  history->future = new_pile ();
  return history;
}

void
enl_history_free (EnlHistory *history)
{
  if (!history)
    return;
  g_ptr_array_unref (history->past);
  g_ptr_array_unref (history->future);
  g_free (history->join);
  g_free (history);
}

void
enl_history_clear (EnlHistory *history)
{
  g_ptr_array_set_size (history->past, 0);
  g_ptr_array_set_size (history->future, 0);
  g_clear_pointer (&history->join, g_free);
}

void
enl_history_push (EnlHistory *history, const EnlWorkset *set, const char *join)
{
  bool joined = join && g_strcmp0 (join, history->join) == 0 && history->past->len;

  g_ptr_array_set_size (history->future, 0);
  if (!joined)
    g_ptr_array_add (history->past, enl_workset_copy (set));
  char *word = g_strdup (join);
  g_free (history->join);
  history->join = word;
}

void
enl_history_drop (EnlHistory *history)
{
  g_assert (history->past->len);
  g_ptr_array_set_size (history->past, (int)history->past->len - 1);
}

bool
enl_history_can_undo (const EnlHistory *history)
{
  return history->past->len > 0;
}

bool
enl_history_can_redo (const EnlHistory *history)
{
  return history->future->len > 0;
}

static EnlWorkset *
step (EnlHistory *history, GPtrArray *from, GPtrArray *onto, const EnlWorkset *now)
{
  if (from->len == 0)
    return NULL;
  g_clear_pointer (&history->join, g_free);
  g_ptr_array_add (onto, enl_workset_copy (now));
  return g_ptr_array_steal_index (from, from->len - 1);
}

EnlWorkset *
enl_history_undo (EnlHistory *history, const EnlWorkset *now)
{
  return step (history, history->past, history->future, now);
}

EnlWorkset *
enl_history_redo (EnlHistory *history, const EnlWorkset *now)
{
  return step (history, history->future, history->past, now);
}
