#include "app/forms-panel.h"

#include "app/rest.h"
#include "app/canvas.h"
#include "draw/forms-sheet.h"

/* Below this scale the labels of the cards can no longer be read at a glance. */
#define SMALLEST_SCALE 0.62

struct _EnlFormsPanel {
  GtkWidget parent;
  EnlSession *session; /* owned */
  EnlLook *look;       /* owned */
  EnlRest rest;        /* before the forms are drawn */

  GtkWidget *box;
  GtkLabel *heading;
  EnlCanvas *canvas;
};

G_DEFINE_FINAL_TYPE (EnlFormsPanel, enl_forms_panel, GTK_TYPE_WIDGET)

static void
show_nothing (EnlFormsPanel *self, const char *heading)
{
  gtk_label_set_text (self->heading, heading);
  enl_canvas_take_scene (self->canvas, NULL);
  enl_canvas_describe (self->canvas, "Anion forms", "empty");
}

static char *
describe (const EnlForms *forms)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < forms->n_forms; i++) {
    uint32_t centre = forms->form[i].centre;
    g_string_append_printf (out, "%sform %u, charge on atom %u, weight %.0f %%", i ? "; " : "",
                            i + 1, enl_molecule_atom (forms->anion, centre)->input,
                            100.0 * forms->form[i].weight);
  }
  return g_string_free (out, FALSE);
}

static void
show_forms (EnlFormsPanel *self, const EnlAnalysis *a, uint32_t site)
{
  g_autoptr (EnlForms) forms = NULL;
  EnlError err;

  if (enl_forms_of_site (a->mol, a->sites->site[site].atom[0], &forms, &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    show_nothing (self, message);
    return;
  }
  g_autofree char *heading = g_strdup_printf (
      "Anion forms of site %u, %s", enl_analysis_rank (a, site), a->sites->site[site].position);
  gtk_label_set_text (self->heading, heading);
  EnlFormsSheet sheet = {.forms = forms, .layout = a->mol};
  enl_canvas_take_scene (self->canvas, enl_forms_sheet (&sheet, enl_look_theme (self->look)));
  g_autofree char *text = describe (forms);
  enl_canvas_describe (self->canvas, heading, text);
}

static void
refresh (EnlFormsPanel *self)
{
  uint32_t site = enl_session_site (self->session);

  if (site == ENL_NONE) {
    show_nothing (self, "Anion forms: select an acidic hydrogen");
    return;
  }
  uint32_t substrate = enl_workset_selection (enl_session_set (self->session))->substrate;
  show_forms (self, enl_session_outcome (self->session, substrate).analysis, site);
}

static void
on_rest (gpointer data)
{
  refresh (data);
}

static void
on_selection_changed (EnlSession *session, EnlFormsPanel *self)
{
  (void)session;
  enl_rest_begin (&self->rest, on_rest, self);
}

static void
on_look_changed (EnlLook *look, EnlFormsPanel *self)
{
  (void)look;
  refresh (self);
}

static void
enl_forms_panel_dispose (GObject *object)
{
  EnlFormsPanel *self = ENL_FORMS_PANEL (object);

  enl_rest_stop (&self->rest);
  g_clear_pointer (&self->box, gtk_widget_unparent);
  g_clear_object (&self->session);
  g_clear_object (&self->look);
  G_OBJECT_CLASS (enl_forms_panel_parent_class)->dispose (object);
}

static void
enl_forms_panel_class_init (EnlFormsPanelClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->dispose = enl_forms_panel_dispose;
  gtk_widget_class_set_css_name (widget_class, "panel");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  g_type_ensure (ENL_TYPE_CANVAS);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/enolith/Enolith/forms-panel.ui");
  gtk_widget_class_bind_template_child (widget_class, EnlFormsPanel, box);
  gtk_widget_class_bind_template_child (widget_class, EnlFormsPanel, heading);
  gtk_widget_class_bind_template_child (widget_class, EnlFormsPanel, canvas);
}

static void
enl_forms_panel_init (EnlFormsPanel *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
  enl_canvas_set_fit (self->canvas, TRUE, 1.0);
  enl_canvas_set_smallest (self->canvas, SMALLEST_SCALE);
}

void
enl_forms_panel_follow (EnlFormsPanel *self, EnlSession *session, EnlLook *look)
{
  g_assert (!self->session);
  self->session = g_object_ref (session);
  self->look = g_object_ref (look);
  g_signal_connect_object (session, "selection-changed", G_CALLBACK (on_selection_changed), self,
                           0);
  g_signal_connect_object (look, "changed", G_CALLBACK (on_look_changed), self, 0);
  refresh (self);
}
