#include "app/why-panel.h"

#include <math.h>

#include "app/rest.h"
#include "app/why-rows.h"

/* Effects up to this share the scale of the bars, so that small ones do not look large. */
#define LEAST_SCALE 5.0
/* Of an explanation that a new one is about to replace. */
#define OLD_OPACITY 0.45

struct _EnlWhyPanel {
  GtkWidget parent;
  EnlSession *session; /* owned */
  EnlLook *look;       /* owned */
  EnlWhyResult *result;
  GCancellable *running; /* of the worker that is waited for, or NULL */
  EnlRest rest;          /* before an explanation is asked for */
  gboolean stale;        /* the panel was hidden when the selection changed */

  GtkWidget *box, *content;
  GtkLabel *heading, *width, *none;
  GtkListBox *lines, *precedents;
};

static guint changed_signal;

G_DEFINE_FINAL_TYPE (EnlWhyPanel, enl_why_panel, GTK_TYPE_WIDGET)

/* ---- filling ---- */

static void
clear_list (GtkListBox *list)
{
  GtkWidget *row;

  while ((row = gtk_widget_get_first_child (GTK_WIDGET (list))))
    gtk_list_box_remove (list, row);
}

static void
fill_lines (EnlWhyPanel *self)
{
  const EnlWhy *why = self->result->why;
  const EnlTheme *theme = enl_look_theme (self->look);
  double value[ENL_WHY_LINES], most = LEAST_SCALE;

  enl_why_round (why, 1, value);
  for (uint32_t i = 1; i < why->n_lines; i++)
    most = MAX (most, fabs (value[i]));
  for (uint32_t i = 0; i < why->n_lines; i++)
    gtk_list_box_append (self->lines, enl_why_line_row_new (why, i, value[i], most, theme));
  gtk_list_box_append (self->lines, enl_why_sum_row_new (why, &self->result->estimate));
  gtk_label_set_text (self->width, why->width);
}

static void
fill (EnlWhyPanel *self)
{
  clear_list (self->lines);
  clear_list (self->precedents);
  gtk_widget_set_visible (self->content, self->result != NULL);
  gtk_widget_set_opacity (self->content, self->running ? OLD_OPACITY : 1);
  if (!self->result)
    return;
  fill_lines (self);
  for (uint32_t i = 0; i < self->result->n_pictures; i++)
    gtk_list_box_append (self->precedents, enl_why_precedent_row_new (&self->result->picture[i],
                                                                      enl_look_theme (self->look)));
  gtk_widget_set_visible (GTK_WIDGET (self->precedents), self->result->n_pictures > 0);
  gtk_widget_set_visible (GTK_WIDGET (self->none), self->result->n_pictures == 0);
}

static void
take_result (EnlWhyPanel *self, EnlWhyResult *result)
{
  enl_why_result_free (self->result);
  self->result = result;
  fill (self);
  g_signal_emit (self, changed_signal, 0);
}

static void
on_done (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autoptr (EnlWhyPanel) self = data; /* the reference of the job */
  EnlWhyResult *why = enl_why_job_finish (result);
  gboolean waited_for = self->running == g_task_get_cancellable (G_TASK (result));

  (void)source;
  if (!waited_for || !self->session) {
    enl_why_result_free (why);
    return;
  }
  g_clear_object (&self->running);
  take_result (self, why);
}

/* ---- asking ---- */

static void
stop_running (EnlWhyPanel *self)
{
  if (self->running)
    g_cancellable_cancel (self->running);
  g_clear_object (&self->running);
}

static void
set_heading (EnlWhyPanel *self, const char *text)
{
  gtk_label_set_text (self->heading, text);
  gtk_widget_set_tooltip_text (GTK_WIDGET (self->heading), text);
}

static void
refresh (EnlWhyPanel *self)
{
  uint32_t site = enl_session_site (self->session);

  stop_running (self);
  self->stale = !gtk_widget_get_mapped (GTK_WIDGET (self));
  if (self->stale)
    return;
  if (site == ENL_NONE) {
    set_heading (self, "Why this value: select an acidic hydrogen");
    take_result (self, NULL);
    return;
  }
  uint32_t substrate = enl_workset_selection (enl_session_set (self->session))->substrate;
  const EnlAnalysis *a = enl_session_outcome (self->session, substrate).analysis;
  g_autofree char *heading = g_strdup_printf (
      "Why this value: site %u, %s", enl_analysis_rank (a, site), a->sites->site[site].position);
  set_heading (self, heading);
  gtk_widget_set_opacity (self->content, OLD_OPACITY);
  self->running = g_cancellable_new ();
  enl_why_job_start (a, site, self->running, on_done, g_object_ref (self));
}

static void
on_rest (gpointer data)
{
  refresh (data);
}

static void
on_selection_changed (EnlSession *session, EnlWhyPanel *self)
{
  (void)session;
  enl_rest_begin (&self->rest, on_rest, self);
}

static void
on_map (EnlWhyPanel *self)
{
  if (self->session && self->stale)
    refresh (self);
}

/* Large type needs the whole width: the compounds then stand below the contributions. */
static void
on_look_changed (EnlLook *look, EnlWhyPanel *self)
{
  gboolean large = enl_look_get (look) == ENL_THEME_PROJECTOR;

  gtk_orientable_set_orientation (GTK_ORIENTABLE (self->content),
                                  large ? GTK_ORIENTATION_VERTICAL : GTK_ORIENTATION_HORIZONTAL);
  gtk_box_set_homogeneous (GTK_BOX (self->content), !large);
  fill (self);
}

/* ---- object ---- */

static void
enl_why_panel_dispose (GObject *object)
{
  EnlWhyPanel *self = ENL_WHY_PANEL (object);

  stop_running (self);
  enl_rest_stop (&self->rest);
  g_clear_pointer (&self->box, gtk_widget_unparent);
  g_clear_pointer (&self->result, enl_why_result_free);
  g_clear_object (&self->session);
  g_clear_object (&self->look);
  G_OBJECT_CLASS (enl_why_panel_parent_class)->dispose (object);
}

static void
enl_why_panel_class_init (EnlWhyPanelClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->dispose = enl_why_panel_dispose;
  gtk_widget_class_set_css_name (widget_class, "panel");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/enolith/Enolith/why-panel.ui");
  gtk_widget_class_bind_template_child (widget_class, EnlWhyPanel, box);
  gtk_widget_class_bind_template_child (widget_class, EnlWhyPanel, content);
  gtk_widget_class_bind_template_child (widget_class, EnlWhyPanel, heading);
  gtk_widget_class_bind_template_child (widget_class, EnlWhyPanel, width);
  gtk_widget_class_bind_template_child (widget_class, EnlWhyPanel, none);
  gtk_widget_class_bind_template_child (widget_class, EnlWhyPanel, lines);
  gtk_widget_class_bind_template_child (widget_class, EnlWhyPanel, precedents);
  changed_signal = g_signal_new ("changed", G_TYPE_FROM_CLASS (klass), G_SIGNAL_RUN_LAST, 0, NULL,
                                 NULL, NULL, G_TYPE_NONE, 0);
}

static void
enl_why_panel_init (EnlWhyPanel *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
  self->stale = TRUE;
  g_signal_connect (self, "map", G_CALLBACK (on_map), NULL);
}

void
enl_why_panel_follow (EnlWhyPanel *self, EnlSession *session, EnlLook *look)
{
  g_assert (!self->session);
  self->session = g_object_ref (session);
  self->look = g_object_ref (look);
  g_signal_connect_object (session, "selection-changed", G_CALLBACK (on_selection_changed), self,
                           0);
  g_signal_connect_object (look, "changed", G_CALLBACK (on_look_changed), self, 0);
  fill (self);
}

const EnlWhyResult *
enl_why_panel_result (EnlWhyPanel *self)
{
  return self->result;
}
