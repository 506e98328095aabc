#include "app/column.h"

#include <string.h>

#include "app/canvas.h"
#include "app/site-row.h"
#include "draw/structure-scene.h"

#define LARGEST_SCALE 1.5

struct _EnlColumn {
  GtkWidget parent;
  EnlSession *session; /* owned */
  EnlLook *look;       /* owned */
  uint32_t index;
  gboolean filling; /* the widgets are being set from the session */
  double low, high; /* axis of the rows shown */

  GtkWidget *box;
  GtkEntry *name, *line;
  GtkButton *left, *right, *remove;
  GtkLabel *fault, *identity, *footing;
  GtkSpinner *spinner;
  EnlCanvas *canvas;
  GtkListBox *sites;
};

G_DEFINE_FINAL_TYPE (EnlColumn, enl_column, GTK_TYPE_WIDGET)

static gboolean
is_selected (EnlColumn *self)
{
  return enl_workset_selection (enl_session_set (self->session))->substrate == self->index;
}

static uint32_t
selected_site (EnlColumn *self)
{
  return is_selected (self) ? enl_session_site (self->session) : ENL_NONE;
}

/* ---- picture ---- */

static char *
describe (const EnlAnalysis *a)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < a->sites->n_sites; i++) {
    uint32_t s = a->rank[i];
    g_string_append_printf (out, "%s%u: %s, pKa %.1f", i ? "; " : "", i + 1,
                            a->sites->site[s].position, a->estimate[s].value);
  }
  if (a->sites->no_enol)
    g_string_append_printf (out, "%s%s", out->len ? "; " : "", a->sites->no_enol);
  return g_string_free (out, FALSE);
}

static void
refresh_picture (EnlColumn *self)
{
  EnlOutcome outcome = enl_session_outcome (self->session, self->index);
  const EnlAnalysis *a = outcome.analysis;
  g_autoptr (EnlForms) forms = NULL;
  uint32_t site = selected_site (self);

  if (!a) {
    enl_canvas_take_scene (self->canvas, NULL);
    enl_canvas_describe (self->canvas, "Structure", "empty");
    return;
  }
  if (site != ENL_NONE &&
      enl_forms_of_site (a->mol, a->sites->site[site].atom[0], &forms, NULL) != ENL_OK)
    forms = NULL;
  EnlStructureLook look = {a->sites, a->estimate, a->rank, site, forms, false};
  enl_canvas_take_scene (self->canvas,
                         enl_structure_scene (a->mol, &look, enl_look_theme (self->look)));
  g_autofree char *text = describe (a);
  enl_canvas_describe (self->canvas, "Structure", text);
  if (outcome.current)
    gtk_widget_remove_css_class (GTK_WIDGET (self->canvas), "stale");
  else
    gtk_widget_add_css_class (GTK_WIDGET (self->canvas), "stale");
}

/* ---- structure line ---- */

static void
mark_fault (EnlColumn *self, const EnlError *error)
{
  g_autoptr (PangoAttrList) marks = pango_attr_list_new ();

  if (error && error->line) {
    PangoAttribute *under = pango_attr_underline_new (PANGO_UNDERLINE_ERROR);
    under->start_index = (guint)error->offset;
    under->end_index = (guint)(error->offset + error->length);
    pango_attr_list_insert (marks, under);
  }
  gtk_entry_set_attributes (self->line, marks);
  gtk_widget_set_visible (GTK_WIDGET (self->fault), error != NULL);
  if (!error)
    return;
  g_autofree char *message = enl_error_message (error);
  gtk_label_set_text (self->fault, message);
}

/* "C6H10O3" with lowered digits. */
static char *
pretty_formula (const EnlMolecule *mol)
{
  g_autofree char *plain = enl_molecule_formula (mol);
  GString *out = g_string_new (NULL);

  for (const char *p = plain; *p; p++) {
    bool charge = p > plain && (p[-1] == '+' || p[-1] == '-');
    if (g_ascii_isdigit (*p) && !charge)
      g_string_append_unichar (out, 0x2080 + (gunichar)(*p - '0'));
    else
      g_string_append_c (out, *p);
  }
  return g_string_free (out, FALSE);
}

static void
refresh_identity (EnlColumn *self)
{
  EnlOutcome outcome = enl_session_outcome (self->session, self->index);
  const EnlAnalysis *a = outcome.analysis;
  GString *text = g_string_new (NULL);

  if (a) {
    g_autofree char *formula = pretty_formula (a->mol);
    g_string_append_printf (text, "%s%s%s, %.2f g/mol", a->known_as ? a->known_as : "",
                            a->known_as ? ", " : "", formula, enl_molecule_mass (a->mol));
    if (outcome.error)
      g_string_append (text, " (last good structure)");
  } else if (!outcome.error) {
    g_string_append (text, "Type or paste a structure above: SMILES, InChI, a name or groups.");
  }
  gtk_label_set_text (self->identity, text->str);
  gtk_widget_set_tooltip_text (GTK_WIDGET (self->identity), a ? a->smiles : NULL);
  g_string_free (text, TRUE);
}

/* ---- ranked sites ---- */

static void
clear_list (GtkListBox *list)
{
  GtkWidget *child;

  while ((child = gtk_widget_get_first_child (GTK_WIDGET (list))))
    gtk_list_box_remove (list, child);
}

static void
mark_row (EnlColumn *self)
{
  uint32_t site = selected_site (self);

  self->filling = TRUE;
  gtk_list_box_unselect_all (self->sites);
  for (int i = 0;; i++) {
    GtkListBoxRow *row = gtk_list_box_get_row_at_index (self->sites, i);
    if (!row)
      break;
    if (site != ENL_NONE && enl_site_row_site (row) == site)
      gtk_list_box_select_row (self->sites, row);
  }
  self->filling = FALSE;
}

static void
refresh_sites (EnlColumn *self)
{
  const EnlAnalysis *a = enl_session_outcome (self->session, self->index).analysis;
  gboolean focused = gtk_widget_get_focus_child (GTK_WIDGET (self->sites)) != NULL;

  if (focused) /* the row with the keyboard goes away */
    enl_column_focus_picture (self);
  clear_list (self->sites);
  gtk_widget_set_visible (GTK_WIDGET (self->footing),
                          a && a->solvent == ENL_SOLVENT_THF && a->sites->n_sites);
  if (!a)
    return;
  enl_session_range (self->session, &self->low, &self->high);
  if (a->sites->no_enol)
    gtk_list_box_append (self->sites, enl_site_reason_row_new (a->sites->no_enol));
  for (uint32_t i = 0; i < a->sites->n_sites; i++)
    gtk_list_box_append (
        self->sites, enl_site_row_new (a, i, self->low, self->high, enl_look_theme (self->look)));
  mark_row (self);
}

/* ---- all of it ---- */

static void
set_entry (GtkEntry *entry, const char *text)
{
  if (strcmp (gtk_editable_get_text (GTK_EDITABLE (entry)), text) != 0)
    gtk_editable_set_text (GTK_EDITABLE (entry), text);
}

static void
refresh_name (EnlColumn *self, const EnlSubstrate *s)
{
  const EnlAnalysis *a = enl_session_outcome (self->session, self->index).analysis;
  g_autofree char *numbered = g_strdup_printf ("Substrate %u", self->index + 1);

  set_entry (self->name, s->name);
  gtk_widget_set_tooltip_text (GTK_WIDGET (self->name),
                               s->name[0] ? s->name : "Name of the substrate");
  gtk_entry_set_placeholder_text (self->name, a && a->known_as ? a->known_as : numbered);
}

/* A widget that hides with the keyboard in it would hand it to whatever comes next. */
static void
show (EnlColumn *self, GtkWidget *widget, gboolean shown)
{
  if (!shown && (gtk_widget_get_state_flags (widget) & GTK_STATE_FLAG_FOCUS_WITHIN))
    enl_column_focus_picture (self);
  gtk_widget_set_visible (widget, shown);
}

/* On the projector the audience reads and nobody types; the buttons stand on the selected column
 * only, so that names have room. */
static void
refresh_chrome (EnlColumn *self)
{
  gboolean typing = enl_look_get (self->look) != ENL_THEME_PROJECTOR;
  gboolean buttons = typing && is_selected (self);

  show (self, GTK_WIDGET (self->line), typing);
  show (self, GTK_WIDGET (self->left), buttons);
  show (self, GTK_WIDGET (self->right), buttons);
  show (self, GTK_WIDGET (self->remove), buttons);
}

static void
refresh_selection (EnlColumn *self)
{
  refresh_chrome (self);
  if (is_selected (self))
    gtk_widget_add_css_class (GTK_WIDGET (self), "selected");
  else
    gtk_widget_remove_css_class (GTK_WIDGET (self), "selected");
}

static void
refresh (EnlColumn *self)
{
  const EnlWorkset *set = enl_session_set (self->session);

  if (self->index >= enl_workset_size (set))
    return; /* about to be removed */
  const EnlSubstrate *s = enl_workset_get (set, self->index);
  EnlOutcome outcome = enl_session_outcome (self->session, self->index);
  self->filling = TRUE;
  refresh_name (self, s);
  set_entry (self->line, s->text);
  self->filling = FALSE;
  mark_fault (self, outcome.error);
  gtk_spinner_set_spinning (self->spinner, outcome.running);
  gtk_widget_set_opacity (GTK_WIDGET (self->spinner), outcome.running ? 1.0 : 0.0);
  gtk_widget_set_sensitive (GTK_WIDGET (self->left), self->index > 0);
  gtk_widget_set_sensitive (GTK_WIDGET (self->right), self->index + 1 < enl_workset_size (set));
  refresh_identity (self);
  refresh_selection (self);
  refresh_picture (self);
  refresh_sites (self);
}

/* ---- events ---- */

static void
on_substrate_changed (EnlSession *session, guint index, EnlColumn *self)
{
  double low, high;

  if (index == self->index) {
    refresh (self);
  } else if (self->index < enl_workset_size (enl_session_set (session))) {
    enl_session_range (session, &low, &high);
    if (low != self->low || high != self->high)
      refresh_sites (self); /* the common axis has moved */
  }
}

static void
on_selection_changed (EnlSession *session, EnlColumn *self)
{
  gboolean was = gtk_widget_has_css_class (GTK_WIDGET (self), "selected");

  (void)session;
  if (self->index >= enl_workset_size (enl_session_set (self->session)))
    return;
  if (!was && !is_selected (self))
    return;
  refresh_selection (self);
  refresh_picture (self);
  mark_row (self);
}

static void
on_look_changed (EnlLook *look, EnlColumn *self)
{
  (void)look;
  refresh (self);
}

static void
on_name_changed (GtkEditable *editable, EnlColumn *self)
{
  if (!self->filling)
    enl_session_set_name (self->session, self->index, gtk_editable_get_text (editable));
}

static void
on_line_changed (GtkEditable *editable, EnlColumn *self)
{
  if (self->filling)
    return;
  mark_fault (self, NULL);
  enl_session_set_text (self->session, self->index, gtk_editable_get_text (editable));
}

static void
select_this (EnlColumn *self)
{
  if (!is_selected (self))
    enl_session_select (self->session, self->index, ENL_NONE);
}

static void
on_focus_enter (GtkEventControllerFocus *controller, EnlColumn *self)
{
  (void)controller;
  if (self->index < enl_workset_size (enl_session_set (self->session)))
    select_this (self);
}

static void
pick_site (EnlColumn *self, uint32_t site)
{
  const EnlAnalysis *a = enl_session_outcome (self->session, self->index).analysis;

  if (a && site < a->sites->n_sites)
    enl_session_select (self->session, self->index, a->sites->site[site].atom[0]);
}

static void
on_row_selected (GtkListBox *list, GtkListBoxRow *row, EnlColumn *self)
{
  (void)list;
  if (!self->filling && row && enl_site_row_site (row) != ENL_NONE)
    pick_site (self, enl_site_row_site (row));
}

static void
on_picked (EnlCanvas *canvas, guint site, guint atom, EnlColumn *self)
{
  const EnlAnalysis *a = enl_session_outcome (self->session, self->index).analysis;

  (void)canvas;
  if (site == ENL_NONE && atom != ENL_NONE && a) {
    const EnlSite *of_atom = enl_sites_of_atom (a->sites, atom);
    site = of_atom ? (uint32_t)(of_atom - a->sites->site) : ENL_NONE;
  }
  if (site != ENL_NONE)
    pick_site (self, site);
  else
    select_this (self);
}

static void
on_left (GtkButton *button, EnlColumn *self)
{
  (void)button;
  enl_session_move (self->session, self->index, self->index - 1);
}

static void
on_right (GtkButton *button, EnlColumn *self)
{
  (void)button;
  enl_session_move (self->session, self->index, self->index + 1);
}

static void
on_remove (GtkButton *button, EnlColumn *self)
{
  (void)button;
  enl_session_remove (self->session, self->index);
}

/* ---- object ---- */

static void
enl_column_dispose (GObject *object)
{
  EnlColumn *self = ENL_COLUMN (object);

  g_clear_pointer (&self->box, gtk_widget_unparent);
  g_clear_object (&self->session);
  g_clear_object (&self->look);
  G_OBJECT_CLASS (enl_column_parent_class)->dispose (object);
}

static void
bind_children (GtkWidgetClass *klass)
{
  gtk_widget_class_bind_template_child (klass, EnlColumn, box);
  gtk_widget_class_bind_template_child (klass, EnlColumn, name);
  gtk_widget_class_bind_template_child (klass, EnlColumn, line);
  gtk_widget_class_bind_template_child (klass, EnlColumn, left);
  gtk_widget_class_bind_template_child (klass, EnlColumn, right);
  gtk_widget_class_bind_template_child (klass, EnlColumn, remove);
  gtk_widget_class_bind_template_child (klass, EnlColumn, fault);
  gtk_widget_class_bind_template_child (klass, EnlColumn, identity);
  gtk_widget_class_bind_template_child (klass, EnlColumn, footing);
  gtk_widget_class_bind_template_child (klass, EnlColumn, spinner);
  gtk_widget_class_bind_template_child (klass, EnlColumn, canvas);
  gtk_widget_class_bind_template_child (klass, EnlColumn, sites);
}

static void
bind_callbacks (GtkWidgetClass *klass)
{
  gtk_widget_class_bind_template_callback (klass, on_name_changed);
  gtk_widget_class_bind_template_callback (klass, on_line_changed);
  gtk_widget_class_bind_template_callback (klass, on_row_selected);
  gtk_widget_class_bind_template_callback (klass, on_picked);
  gtk_widget_class_bind_template_callback (klass, on_left);
  gtk_widget_class_bind_template_callback (klass, on_right);
  gtk_widget_class_bind_template_callback (klass, on_remove);
  gtk_widget_class_bind_template_callback (klass, on_focus_enter);
}

static void
enl_column_class_init (EnlColumnClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->dispose = enl_column_dispose;
  gtk_widget_class_set_css_name (widget_class, "column");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  g_type_ensure (ENL_TYPE_CANVAS);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/enolith/Enolith/column.ui");
  bind_children (widget_class);
  bind_callbacks (widget_class);
}

static void
enl_column_init (EnlColumn *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
  enl_canvas_set_fit (self->canvas, TRUE, LARGEST_SCALE);
}

GtkWidget *
enl_column_new (EnlSession *session, EnlLook *look, uint32_t index)
{
  EnlColumn *self = g_object_new (ENL_TYPE_COLUMN, NULL);

  self->session = g_object_ref (session);
  self->look = g_object_ref (look);
  self->index = index;
  g_signal_connect_object (session, "substrate-changed", G_CALLBACK (on_substrate_changed), self,
                           0);
  g_signal_connect_object (session, "selection-changed", G_CALLBACK (on_selection_changed), self,
                           0);
  g_signal_connect_object (look, "changed", G_CALLBACK (on_look_changed), self, 0);
  refresh (self);
  return GTK_WIDGET (self);
}

void
enl_column_focus_line (EnlColumn *self)
{
  gtk_widget_grab_focus (GTK_WIDGET (self->line));
}

void
enl_column_focus_picture (EnlColumn *self)
{
  gtk_widget_grab_focus (GTK_WIDGET (self->canvas));
}
