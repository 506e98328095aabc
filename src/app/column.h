/* One substrate of the set: name, structure line, picture, ranked sites. */
#pragma once

#include "app/core-glue.h"

#define ENL_TYPE_COLUMN (enl_column_get_type ())
G_DECLARE_FINAL_TYPE (EnlColumn, enl_column, ENL, COLUMN, GtkWidget)

/* Shows substrate `index` of the session; follows its signals as long as it lives. */
GtkWidget *enl_column_new (EnlSession *session, EnlLook *look, uint32_t index);
/* Puts the keyboard into the structure line. */
void enl_column_focus_line (EnlColumn *column);
/* Puts it on the picture, where nothing is typed by accident. */
void enl_column_focus_picture (EnlColumn *column);
