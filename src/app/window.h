/* The window: columns of substrates above, anion forms and bases of the selected site below. */
#pragma once

#include "app/core-glue.h"

#define ENL_TYPE_WINDOW (enl_window_get_type ())
G_DECLARE_FINAL_TYPE (EnlWindow, enl_window, ENL, WINDOW, GtkApplicationWindow)

EnlWindow *enl_window_new (GtkApplication *application, const EnlKnowledge *knowledge);
EnlSession *enl_window_session (EnlWindow *window);
EnlLook *enl_window_look (EnlWindow *window);

/* Opens a set or a structure file; a failure is told in the window and changes nothing. */
void enl_window_open (EnlWindow *window, const char *path);
/* Shows a message in the bar under the header until it is dismissed. */
void enl_window_tell (EnlWindow *window, const char *text);
/* Keyboard into the structure line of the selected substrate. */
void enl_window_focus_line (EnlWindow *window);
