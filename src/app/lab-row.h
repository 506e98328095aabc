/* One line of the list of own values: the compound, the value, what there is to say. */
#pragma once

#include "app/core-glue.h"

/* A row for own value `index` of the session's set. Its button triggers the action
 * "lab.remove" with the index. */
GtkWidget *enl_lab_row_new (EnlSession *session, uint32_t index);
/* Index of a row. */
uint32_t enl_lab_row_index (GtkListBoxRow *row);
