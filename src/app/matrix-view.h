/* All substrates against all bases, in the place of the columns. One cell is the present one: arrow
 * keys and clicks move it and select its substrate and base. Escape asks to go back. */
#pragma once

#include "app/core-glue.h"

#define ENL_TYPE_MATRIX_VIEW (enl_matrix_view_get_type ())
G_DECLARE_FINAL_TYPE (EnlMatrixView, enl_matrix_view, ENL, MATRIX_VIEW, GtkWidget)

/* Call once. Signals: "changed": another matrix, or cell, is shown; "done": Escape was pressed. */
void enl_matrix_view_follow (EnlMatrixView *view, EnlSession *session, EnlLook *look);
/* The present cell in words, or how far the comparison is; "" while the view is hidden. Owned by
 * the view until the next change. */
const char *enl_matrix_view_words (EnlMatrixView *view);
