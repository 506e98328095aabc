#include "app/rest.h"

#define REST_MS 60

static gboolean
on_rest (gpointer data)
{
  EnlRest *rest = data;

  rest->pending = 0;
  rest->act (rest->data);
  return G_SOURCE_REMOVE;
}

void
enl_rest_begin (EnlRest *rest, void (*act) (gpointer data), gpointer data)
{
  enl_rest_stop (rest);
  rest->act = act;
  rest->data = data;
  rest->pending = g_timeout_add (REST_MS, on_rest, rest);
}

void
enl_rest_stop (EnlRest *rest)
{
  g_clear_handle_id (&rest->pending, g_source_remove);
}
