/* The inside of the window, for its own files only. */
#pragma once

#include "app/bases-panel.h"
#include "app/curve-panel.h"
#include "app/forms-panel.h"
#include "app/matrix-view.h"
#include "app/why-panel.h"
#include "app/lab-panel.h"
#include "app/weigh-panel.h"
#include "app/window.h"

struct _EnlWindow {
  GtkApplicationWindow parent;
  EnlSession *session;
  EnlLook *look;
  gboolean closing; /* unsaved changes were settled */
  guint reveal;     /* idle source that brings the selected column into view, 0: none */

  GtkLabel *title, *subtitle;
  GtkInfoBar *bar;
  GtkLabel *message;
  GtkScrolledWindow *scroller;
  GtkBox *columns;
  GtkLabel *hint;
  EnlFormsPanel *forms;
  EnlBasesPanel *bases;
  EnlWhyPanel *why;
  EnlCurvePanel *curve;
  EnlMatrixView *matrix;
  GtkStack *upper;   /* pages "columns" and "matrix" */
  GtkStack *details; /* pages "forms", "why" and "curve" */
  EnlLabPanel *lab;
  EnlWeighPanel *weigh;
  GtkPaned *panes, *lower;
};

/* Keyboard on the picture of the selected substrate. */
void enl_window_focus_picture (EnlWindow *window);

/* window-actions.c */
void enl_window_add_actions (EnlWindow *window);
void enl_window_add_bindings (GtkWidgetClass *klass);
/* Brings enabled flags and states in line with the session. */
void enl_window_sync_actions (EnlWindow *window);

/* Puts the columns back in the place of the matrix. */
void enl_window_show_columns (EnlWindow *window);

/* window-files.c */
void enl_window_choose_open (EnlWindow *window);
void enl_window_choose_save (EnlWindow *window, gboolean then_close);
/* Asks once about unsaved changes; closes when they are settled. */
void enl_window_ask_close (EnlWindow *window);

/* window-print.c */
void enl_window_copy_list (EnlWindow *window);
void enl_window_save_list (EnlWindow *window, const char *path);
void enl_window_choose_list (EnlWindow *window);
/* In a worker; says where it was written, or why not. PDF or, by its ending, HTML. */
void enl_window_save_report (EnlWindow *window, const char *path);
void enl_window_choose_report (EnlWindow *window);

/* window-state.c: the "state" action, a JSON text that tests read. */
char *enl_window_state (EnlWindow *window);
