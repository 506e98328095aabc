/* Work that waits until a flood of changes has rested.
 *
 * While a structure is typed every letter changes the selection; panels follow when it stops. */
#pragma once

#include <glib.h>

typedef struct {
  guint pending; /* timeout, 0: none */
  void (*act) (gpointer data);
  gpointer data;
} EnlRest;

/* Calls `act` with `data` once no further call has come for a while. Starts zeroed; `rest` and
 * `data` must outlive it or see enl_rest_stop. */
void enl_rest_begin (EnlRest *rest, void (*act) (gpointer data), gpointer data);
/* Forgets what waits. */
void enl_rest_stop (EnlRest *rest);
