/* Named commands: menu, buttons, shortcuts and tests trigger the same code. */
#include <string.h>

#include "app/window-private.h"

static void
act_add (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  EnlWindow *self = data;
  EnlError err;

  (void)action;
  (void)parameter;
  if (enl_session_add (self->session, "", "", &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    enl_window_tell (self, message);
    return;
  }
  enl_window_focus_line (self);
}

static void
act_new (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  EnlWindow *self = data;

  (void)action;
  (void)parameter;
  g_action_group_activate_action (G_ACTION_GROUP (gtk_window_get_application (GTK_WINDOW (self))),
                                  "new-window", NULL);
}

static void
act_open (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  (void)parameter;
  enl_window_choose_open (data);
}

static void
act_open_path (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  enl_window_open (data, g_variant_get_string (parameter, NULL));
}

static void
save_to (EnlWindow *self, const char *path)
{
  EnlError err;

  if (enl_session_save (self->session, path, &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    enl_window_tell (self, message);
  }
}

static void
act_save (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  EnlWindow *self = data;

  (void)action;
  (void)parameter;
  if (enl_session_path (self->session))
    save_to (self, NULL);
  else
    enl_window_choose_save (self, FALSE);
}

static void
act_save_as (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  (void)parameter;
  enl_window_choose_save (data, FALSE);
}

static void
act_save_path (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  save_to (data, g_variant_get_string (parameter, NULL));
}

static void
act_undo (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  (void)parameter;
  enl_session_undo (((EnlWindow *)data)->session);
}

static void
act_redo (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  (void)parameter;
  enl_session_redo (((EnlWindow *)data)->session);
}

/* Selects the next (+1) or previous (-1) substrate. */
static void
act_step (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  EnlWindow *self = data;
  const EnlWorkset *set = enl_session_set (self->session);
  int64_t n = enl_workset_size (set), at = enl_workset_selection (set)->substrate;
  int64_t to = at == ENL_NONE ? 0 : CLAMP (at + g_variant_get_int32 (parameter), 0, n - 1);

  (void)action;
  if (n)
    enl_session_select (self->session, (uint32_t)to, ENL_NONE);
}

/* Selects the site that is this many ranks further. */
static void
act_step_site (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  EnlWindow *self = data;
  uint32_t site = enl_session_site (self->session);

  (void)action;
  if (site == ENL_NONE)
    return;
  uint32_t substrate = enl_workset_selection (enl_session_set (self->session))->substrate;
  const EnlAnalysis *a = enl_session_outcome (self->session, substrate).analysis;
  int64_t rank = (int64_t)enl_analysis_rank (a, site) - 1 + g_variant_get_int32 (parameter);
  if (rank >= 0 && rank < a->sites->n_sites)
    enl_session_select (self->session, substrate, a->sites->site[a->rank[rank]].atom[0]);
}

/* Moves the selected substrate. */
static void
act_move (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  EnlWindow *self = data;
  const EnlWorkset *set = enl_session_set (self->session);
  int64_t from = enl_workset_selection (set)->substrate;
  int64_t to = from + g_variant_get_int32 (parameter);

  (void)action;
  if (from != ENL_NONE && to >= 0 && to < enl_workset_size (set))
    enl_session_move (self->session, (uint32_t)from, (uint32_t)to);
}

static void
change_solvent (GSimpleAction *action, GVariant *value, gpointer data)
{
  EnlWindow *self = data;
  EnlConditions c = *enl_workset_conditions (enl_session_set (self->session));

  (void)action;
  if (enl_solvent_parse (g_variant_get_string (value, NULL), &c.solvent))
    enl_session_set_conditions (self->session, &c, NULL);
}

static void
change_look (GSimpleAction *action, GVariant *value, gpointer data)
{
  EnlWindow *self = data;
  int theme = enl_theme_find (g_variant_get_string (value, NULL));

  (void)action;
  if (theme == ENL_THEME_LIGHT || theme == ENL_THEME_DARK || theme == ENL_THEME_PROJECTOR)
    enl_look_set (self->look, (EnlThemeName)theme);
}

/* What stands beside the bases: the anion's forms, why the value is what it is, or the composition
 * curve. */
static void
change_detail (GSimpleAction *action, GVariant *value, gpointer data)
{
  EnlWindow *self = data;
  const char *page = g_variant_get_string (value, NULL);

  (void)action;
  if (gtk_stack_get_child_by_name (self->details, page))
    gtk_stack_set_visible_child_name (self->details, page);
  if (strcmp (page, "weigh") == 0)
    enl_weigh_panel_focus (self->weigh);
  enl_window_sync_actions (self);
}

static void
act_projector (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  EnlWindow *self = data;
  gboolean on = enl_look_get (self->look) == ENL_THEME_PROJECTOR;

  (void)action;
  (void)parameter;
  enl_look_set (self->look, on ? ENL_THEME_LIGHT : ENL_THEME_PROJECTOR);
}

static void
act_line (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  (void)parameter;
  enl_window_focus_line (data);
}

/* The panel of own values comes with the keyboard in it, and gives it back. */
static void
change_lab (GSimpleAction *action, GVariant *value, gpointer data)
{
  EnlWindow *self = data;
  gboolean shown = g_variant_get_boolean (value);

  if (!shown && (gtk_widget_get_state_flags (GTK_WIDGET (self->lab)) & GTK_STATE_FLAG_FOCUS_WITHIN))
    enl_window_focus_picture (self);
  gtk_widget_set_visible (GTK_WIDGET (self->lab), shown);
  if (shown)
    enl_lab_panel_focus (self->lab);
  g_simple_action_set_state (action, value);
}

/* The matrix of bases in the place of the columns. */
static void
change_matrix (GSimpleAction *action, GVariant *value, gpointer data)
{
  EnlWindow *self = data;
  gboolean shown = g_variant_get_boolean (value);

  /* A stack hands the keyboard to what it shows, and a column with the keyboard is selected. */
  gtk_window_set_focus (GTK_WINDOW (self), NULL);
  gtk_stack_set_visible_child_name (self->upper, shown ? "matrix" : "columns");
  g_simple_action_set_state (action, value);
  if (shown)
    gtk_widget_grab_focus (GTK_WIDGET (self->matrix));
  else
    enl_window_focus_picture (self);
}

void
enl_window_show_columns (EnlWindow *self)
{
  g_action_group_change_action_state (G_ACTION_GROUP (self), "matrix",
                                      g_variant_new_boolean (FALSE));
}

static void
act_weigh_copy (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  (void)parameter;
  enl_window_copy_list (data);
}

static void
act_weigh_save (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  (void)parameter;
  enl_window_choose_list (data);
}

static void
act_weigh_path (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  enl_window_save_list (data, g_variant_get_string (parameter, NULL));
}

static void
act_report (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  (void)parameter;
  enl_window_choose_report (data);
}

static void
act_report_path (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  enl_window_save_report (data, g_variant_get_string (parameter, NULL));
}

static const GActionEntry entry[] = {
    {"add", act_add, NULL, NULL, NULL, {0}},
    {"new", act_new, NULL, NULL, NULL, {0}},
    {"open", act_open, NULL, NULL, NULL, {0}},
    {"open-path", act_open_path, "s", NULL, NULL, {0}},
    {"save", act_save, NULL, NULL, NULL, {0}},
    {"save-as", act_save_as, NULL, NULL, NULL, {0}},
    {"save-path", act_save_path, "s", NULL, NULL, {0}},
    {"undo", act_undo, NULL, NULL, NULL, {0}},
    {"redo", act_redo, NULL, NULL, NULL, {0}},
    {"step", act_step, "i", NULL, NULL, {0}},
    {"step-site", act_step_site, "i", NULL, NULL, {0}},
    {"move", act_move, "i", NULL, NULL, {0}},
    {"structure-line", act_line, NULL, NULL, NULL, {0}},
    {"projector", act_projector, NULL, NULL, NULL, {0}},
    {"solvent", NULL, "s", "'dmso'", change_solvent, {0}},
    {"look", NULL, "s", "'light'", change_look, {0}},
    {"detail", NULL, "s", "'forms'", change_detail, {0}},
    {"matrix", NULL, NULL, "false", change_matrix, {0}},
    {"lab-values", NULL, NULL, "false", change_lab, {0}},
    {"weigh-copy", act_weigh_copy, NULL, NULL, NULL, {0}},
    {"weigh-save", act_weigh_save, NULL, NULL, NULL, {0}},
    {"weigh-path", act_weigh_path, "s", NULL, NULL, {0}},
    {"report", act_report, NULL, NULL, NULL, {0}},
    {"report-path", act_report_path, "s", NULL, NULL, {0}},
    {"state", NULL, NULL, "''", NULL, {0}},
};

void
enl_window_add_actions (EnlWindow *self)
{
  g_action_map_add_action_entries (G_ACTION_MAP (self), entry, G_N_ELEMENTS (entry), self);
}

/* Bubble-phase bindings: a focused entry keeps its own Ctrl+Z. */
void
enl_window_add_bindings (GtkWidgetClass *klass)
{
  const GdkModifierType ctrl = GDK_CONTROL_MASK, alt = GDK_ALT_MASK;

  gtk_widget_class_add_binding_action (klass, GDK_KEY_z, ctrl, "win.undo", NULL);
  gtk_widget_class_add_binding_action (klass, GDK_KEY_z, ctrl | GDK_SHIFT_MASK, "win.redo", NULL);
  gtk_widget_class_add_binding_action (klass, GDK_KEY_Z, ctrl | GDK_SHIFT_MASK, "win.redo", NULL);
  gtk_widget_class_add_binding_action (klass, GDK_KEY_Right, alt, "win.step", "i", 1);
  gtk_widget_class_add_binding_action (klass, GDK_KEY_Left, alt, "win.step", "i", -1);
  gtk_widget_class_add_binding_action (klass, GDK_KEY_Down, alt, "win.step-site", "i", 1);
  gtk_widget_class_add_binding_action (klass, GDK_KEY_Up, alt, "win.step-site", "i", -1);
  gtk_widget_class_add_binding_action (klass, GDK_KEY_Right, alt | GDK_SHIFT_MASK, "win.move", "i",
                                       1);
  gtk_widget_class_add_binding_action (klass, GDK_KEY_Left, alt | GDK_SHIFT_MASK, "win.move", "i",
                                       -1);
}

static void
set_enabled (EnlWindow *self, const char *name, gboolean enabled)
{
  GAction *action = g_action_map_lookup_action (G_ACTION_MAP (self), name);

  g_simple_action_set_enabled (G_SIMPLE_ACTION (action), enabled);
}

static void
set_state (EnlWindow *self, const char *name, const char *text)
{
  GAction *action = g_action_map_lookup_action (G_ACTION_MAP (self), name);

  g_simple_action_set_state (G_SIMPLE_ACTION (action), g_variant_new_string (text));
}

void
enl_window_sync_actions (EnlWindow *self)
{
  const EnlConditions *c = enl_workset_conditions (enl_session_set (self->session));
  g_autofree char *state = enl_window_state (self);

  set_enabled (self, "undo", enl_session_can_undo (self->session));
  set_enabled (self, "redo", enl_session_can_redo (self->session));
  set_state (self, "solvent", enl_solvent_id (c->solvent));
  set_state (self, "look", enl_theme_id (enl_look_get (self->look)));
  set_state (self, "detail", gtk_stack_get_visible_child_name (self->details));
  set_state (self, "state", state);
}
