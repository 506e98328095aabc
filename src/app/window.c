#include "app/window.h"

#include <string.h>

#include "app/column.h"
#include "app/window-private.h"

G_DEFINE_FINAL_TYPE (EnlWindow, enl_window, GTK_TYPE_APPLICATION_WINDOW)

/* ---- title ---- */

static void
refresh_title (EnlWindow *self)
{
  const char *path = enl_session_path (self->session);
  g_autofree char *name = path ? g_path_get_basename (path) : g_strdup ("Unsaved set");
  uint32_t n = enl_workset_size (enl_session_set (self->session));
  const EnlConditions *c = enl_workset_conditions (enl_session_set (self->session));
  g_autofree char *subtitle = g_strdup_printf (
      "%u substrate%s, pKa in %s%s", n, n == 1 ? "" : "s", enl_solvent_heading (c->solvent),
      enl_session_unsaved (self->session) ? ", not saved" : "");
  g_autofree char *title = g_strdup_printf ("%s - Enolith", name);

  gtk_label_set_text (self->title, name);
  gtk_label_set_text (self->subtitle, subtitle);
  gtk_window_set_title (GTK_WINDOW (self), title);
}

/* ---- columns ---- */

static GtkWidget *
column_at (EnlWindow *self, uint32_t index)
{
  GtkWidget *child = gtk_widget_get_first_child (GTK_WIDGET (self->columns));

  while (child && index--)
    child = gtk_widget_get_next_sibling (child);
  return child;
}

/* Keyboard on the picture of the selected substrate. */
void
enl_window_focus_picture (EnlWindow *self)
{
  uint32_t index = enl_workset_selection (enl_session_set (self->session))->substrate;
  GtkWidget *column = index == ENL_NONE ? NULL : column_at (self, index);

  if (column)
    enl_column_focus_picture (ENL_COLUMN (column));
}

static void
rebuild_columns (EnlWindow *self)
{
  GtkWidget *child;
  uint32_t n = enl_workset_size (enl_session_set (self->session));

  /* A column that loses the keyboard while it goes away must not hand it, and with it the
   * selection, to its neighbour. */
  gtk_window_set_focus (GTK_WINDOW (self), NULL);
  while ((child = gtk_widget_get_first_child (GTK_WIDGET (self->columns))))
    gtk_box_remove (self->columns, child);
  for (uint32_t i = 0; i < n; i++)
    gtk_box_append (self->columns, enl_column_new (self->session, self->look, i));
  gtk_widget_set_visible (GTK_WIDGET (self->hint), n == 0);
  enl_window_focus_picture (self);
}

void
enl_window_focus_line (EnlWindow *self)
{
  uint32_t index = enl_workset_selection (enl_session_set (self->session))->substrate;
  GtkWidget *column = index == ENL_NONE ? NULL : column_at (self, index);

  if (column)
    enl_column_focus_line (ENL_COLUMN (column));
}

/* ---- the selected column stays in view ---- */

static gboolean
reveal_selected (gpointer data)
{
  EnlWindow *self = data;
  uint32_t index = enl_workset_selection (enl_session_set (self->session))->substrate;
  GtkWidget *column = index == ENL_NONE ? NULL : column_at (self, index);
  graphene_rect_t bounds;

  self->reveal = 0;
  if (column && gtk_widget_compute_bounds (column, GTK_WIDGET (self->columns), &bounds))
    gtk_adjustment_clamp_page (gtk_scrolled_window_get_hadjustment (self->scroller),
                               bounds.origin.x, bounds.origin.x + bounds.size.width);
  return G_SOURCE_REMOVE;
}

/* After layout: a new column has no place before. */
static void
queue_reveal (EnlWindow *self)
{
  if (!self->reveal)
    self->reveal = g_timeout_add (50, reveal_selected, self);
}

/* ---- events ---- */

static void
on_selection_changed (EnlSession *session, EnlWindow *self)
{
  (void)session;
  enl_window_sync_actions (self);
  queue_reveal (self);
}

static void
on_set_changed (EnlSession *session, EnlWindow *self)
{
  (void)session;
  rebuild_columns (self);
}

static void
on_state_changed (EnlSession *session, EnlWindow *self)
{
  (void)session;
  refresh_title (self);
  enl_window_sync_actions (self);
}

/* The structures get the larger part; on the projector more of it, for larger type. */
static void
share_height (EnlWindow *self)
{
  int height = gtk_widget_get_height (GTK_WIDGET (self->panes));
  double share = enl_look_get (self->look) == ENL_THEME_PROJECTOR ? 0.62 : 0.59;

  if (height > 0)
    gtk_paned_set_position (self->panes, (int)(share * height));
}

static void
on_look_changed (EnlLook *look, EnlWindow *self)
{
  GtkWidget *widget = GTK_WIDGET (self);

  gtk_widget_remove_css_class (widget, "dark-look");
  gtk_widget_remove_css_class (widget, "projector");
  if (enl_look_get (look) == ENL_THEME_DARK)
    gtk_widget_add_css_class (widget, "dark-look");
  if (enl_look_get (look) == ENL_THEME_PROJECTOR)
    gtk_widget_add_css_class (widget, "projector");
  share_height (self);
  enl_window_sync_actions (self);
}

static gboolean
on_close_request (GtkWindow *window, gpointer data)
{
  EnlWindow *self = ENL_WINDOW (window);

  (void)data;
  if (self->closing || !enl_session_unsaved (self->session))
    return FALSE;
  enl_window_ask_close (self);
  return TRUE;
}

static void
on_bar_response (GtkInfoBar *bar, int response, EnlWindow *self)
{
  (void)response;
  (void)self;
  gtk_info_bar_set_revealed (bar, FALSE);
}

static gboolean
on_drop (GtkDropTarget *target, const GValue *value, double x, double y, EnlWindow *self)
{
  (void)target;
  (void)x;
  (void)y;
  if (!G_VALUE_HOLDS (value, GDK_TYPE_FILE_LIST))
    return FALSE;
  g_autoptr (GSList) files = gdk_file_list_get_files (g_value_get_boxed (value));
  for (GSList *f = files; f; f = f->next) {
    g_autofree char *path = g_file_get_path (f->data);
    if (path)
      enl_window_open (self, path);
  }
  return files != NULL;
}

void
enl_window_tell (EnlWindow *self, const char *text)
{
  gtk_label_set_text (self->message, text);
  gtk_info_bar_set_revealed (self->bar, TRUE);
}

/* ---- object ---- */

static void
enl_window_dispose (GObject *object)
{
  EnlWindow *self = ENL_WINDOW (object);

  g_clear_handle_id (&self->reveal, g_source_remove);
  g_clear_object (&self->session);
  g_clear_object (&self->look);
  G_OBJECT_CLASS (enl_window_parent_class)->dispose (object);
}

static void
enl_window_class_init (EnlWindowClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->dispose = enl_window_dispose;
  g_type_ensure (ENL_TYPE_FORMS_PANEL);
  g_type_ensure (ENL_TYPE_BASES_PANEL);
  g_type_ensure (ENL_TYPE_WHY_PANEL);
  g_type_ensure (ENL_TYPE_CURVE_PANEL);
  g_type_ensure (ENL_TYPE_MATRIX_VIEW);
  g_type_ensure (ENL_TYPE_WEIGH_PANEL);
  g_type_ensure (ENL_TYPE_LAB_PANEL);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/enolith/Enolith/window.ui");
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, title);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, subtitle);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, bar);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, message);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, scroller);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, columns);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, hint);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, forms);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, bases);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, why);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, curve);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, matrix);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, upper);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, weigh);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, details);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, lab);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, panes);
  gtk_widget_class_bind_template_child (widget_class, EnlWindow, lower);
  gtk_widget_class_bind_template_callback (widget_class, on_bar_response);
  gtk_widget_class_bind_template_callback (widget_class, on_close_request);
  enl_window_add_bindings (widget_class);
}

static void
enl_window_init (EnlWindow *self)
{
  GtkDropTarget *drop = gtk_drop_target_new (GDK_TYPE_FILE_LIST, GDK_ACTION_COPY);

  gtk_widget_init_template (GTK_WIDGET (self));
  g_signal_connect (drop, "drop", G_CALLBACK (on_drop), self);
  gtk_widget_add_controller (GTK_WIDGET (self), GTK_EVENT_CONTROLLER (drop));
}

EnlWindow *
enl_window_new (GtkApplication *application, const EnlKnowledge *knowledge)
{
  EnlWindow *self = g_object_new (ENL_TYPE_WINDOW, "application", application, NULL);

  self->session = enl_session_new (knowledge);
  self->look = enl_look_new ();
  enl_window_add_actions (self);
  g_signal_connect_object (self->session, "set-changed", G_CALLBACK (on_set_changed), self, 0);
  g_signal_connect_object (self->session, "state-changed", G_CALLBACK (on_state_changed), self, 0);
  g_signal_connect_object (self->session, "substrate-changed", G_CALLBACK (enl_window_sync_actions),
                           self, G_CONNECT_SWAPPED);
  g_signal_connect_object (self->session, "selection-changed", G_CALLBACK (on_selection_changed),
                           self, 0);
  g_signal_connect_object (self->session, "lab-changed", G_CALLBACK (enl_window_sync_actions), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (self->look, "changed", G_CALLBACK (on_look_changed), self, 0);
  enl_forms_panel_follow (self->forms, self->session, self->look);
  enl_bases_panel_follow (self->bases, self->session, self->look);
  enl_why_panel_follow (self->why, self->session, self->look);
  enl_curve_panel_follow (self->curve, self->session, self->look);
  enl_matrix_view_follow (self->matrix, self->session, self->look);
  g_signal_connect_object (self->curve, "changed", G_CALLBACK (enl_window_sync_actions), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (self->matrix, "changed", G_CALLBACK (enl_window_sync_actions), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (self->matrix, "done", G_CALLBACK (enl_window_show_columns), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (self->why, "changed", G_CALLBACK (enl_window_sync_actions), self,
                           G_CONNECT_SWAPPED);
  enl_lab_panel_follow (self->lab, self->session);
  enl_weigh_panel_follow (self->weigh, self->session, self->look);
  g_signal_connect_object (self->weigh, "changed", G_CALLBACK (enl_window_sync_actions), self,
                           G_CONNECT_SWAPPED);
  refresh_title (self);
  enl_window_sync_actions (self);
  return self;
}

EnlSession *
enl_window_session (EnlWindow *self)
{
  return self->session;
}

EnlLook *
enl_window_look (EnlWindow *self)
{
  return self->look;
}
