#include "app/lab-panel.h"

#include <math.h>
#include <string.h>

#include "app/lab-row.h"
#include "core/notation/smiles.h"

struct _EnlLabPanel {
  GtkWidget parent;
  EnlSession *session; /* owned */
  uint32_t editing;    /* own value in the fields, ENL_NONE: a new one */
  gboolean chosen;     /* `editing` was picked from the list, whatever the site shows */
  uint32_t substrate, atom, filled; /* selection and own value that the fields were filled for */
  EnlSolvent solvent;

  GtkWidget *box, *form;
  GtkLabel *target, *fault, *empty;
  GtkEntry *pka, *sigma, *note;
  GtkButton *keep, *discard;
  GtkListBox *list;
};

G_DEFINE_FINAL_TYPE (EnlLabPanel, enl_lab_panel, GTK_TYPE_WIDGET)

/* ---- the site in hand ---- */

/* Current analysis of the selected substrate, with its site; NULL when there is none. */
static const EnlAnalysis *
selected (EnlLabPanel *self, uint32_t *site)
{
  uint32_t substrate = enl_workset_selection (enl_session_set (self->session))->substrate;

  *site = enl_session_site (self->session);
  if (substrate == ENL_NONE || *site == ENL_NONE)
    return NULL;
  EnlOutcome outcome = enl_session_outcome (self->session, substrate);
  return outcome.current ? outcome.analysis : NULL;
}

static const EnlLabEntry *
edited (EnlLabPanel *self)
{
  const EnlWorkset *set = enl_session_set (self->session);

  if (self->editing == ENL_NONE || self->editing >= enl_workset_lab_size (set))
    return NULL;
  return enl_workset_lab (set, self->editing);
}

/* SMILES with the site marked, so that later edits of the substrate leave the value where it was
 * measured. */
static char *
marked_structure (const EnlAnalysis *a, uint32_t site)
{
  g_autoptr (EnlMolecule) mol = enl_molecule_copy (a->mol);

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    enl_molecule_edit_atom (mol, i)->map = i == a->sites->site[site].atom[0];
  enl_molecule_finish (mol);
  return enl_smiles_write (mol, ENL_SMILES_MAPS, NULL);
}

static const char *
compound_name (EnlLabPanel *self, const EnlAnalysis *a)
{
  const EnlWorkset *set = enl_session_set (self->session);
  const EnlSubstrate *s = enl_workset_get (set, enl_workset_selection (set)->substrate);

  return s->name[0] ? s->name : a->known_as ? a->known_as : a->smiles;
}

/* ---- fields ---- */

static void
set_field (GtkEntry *entry, const char *text)
{
  gtk_editable_set_text (GTK_EDITABLE (entry), text);
}

static void
show_fault (EnlLabPanel *self, EnlLabField field, const EnlError *err)
{
  gtk_widget_remove_css_class (GTK_WIDGET (self->pka), "error");
  gtk_widget_remove_css_class (GTK_WIDGET (self->sigma), "error");
  gtk_widget_set_visible (GTK_WIDGET (self->fault), err != NULL);
  if (!err)
    return;
  if (field == ENL_LAB_PKA)
    gtk_widget_add_css_class (GTK_WIDGET (self->pka), "error");
  if (field == ENL_LAB_SIGMA)
    gtk_widget_add_css_class (GTK_WIDGET (self->sigma), "error");
  g_autofree char *message = enl_error_message (err);
  gtk_label_set_text (self->fault, message);
}

static void
fill_fields (EnlLabPanel *self, const EnlLabEntry *e)
{
  g_autofree char *pka = e && isfinite (e->pka) ? g_strdup_printf ("%.10g", e->pka) : g_strdup ("");
  g_autofree char *sigma = g_strdup_printf ("%.10g", e ? e->sigma : ENL_LAB_USUAL_SIGMA);

  set_field (self->pka, g_strdelimit (pka, ",", '.'));
  set_field (self->sigma, g_strdelimit (sigma, ",", '.'));
  set_field (self->note, e ? e->note : "");
  gtk_button_set_label (self->keep, e ? "Change value" : "Keep value");
  gtk_widget_set_sensitive (GTK_WIDGET (self->discard), e != NULL);
  show_fault (self, ENL_LAB_PKA, NULL);
}

/* A form that is switched off with the keyboard in it would keep the keyboard. */
static void
allow_form (EnlLabPanel *self, gboolean allowed)
{
  if (!allowed && (gtk_widget_get_state_flags (self->form) & GTK_STATE_FLAG_FOCUS_WITHIN))
    gtk_window_set_focus (GTK_WINDOW (gtk_widget_get_root (self->form)), NULL);
  gtk_widget_set_sensitive (self->form, allowed);
}

static void
show_target (EnlLabPanel *self, const EnlAnalysis *a, uint32_t site, const EnlLabEntry *e)
{
  g_autofree char *text = NULL;

  if (self->chosen && e)
    text = g_strdup_printf ("%s, in %s", e->name[0] ? e->name : e->structure,
                            enl_solvent_label (e->solvent));
  else if (!a)
    text = g_strdup ("Select an acidic hydrogen to enter its value.");
  else if (a->solvent == ENL_SOLVENT_THF)
    text = g_strdup ("A value in THF cannot join: no single scale exists there. Switch to DMSO or "
                     "water to enter one.");
  else
    text = g_strdup_printf ("%s, site %u: %s, in %s", compound_name (self, a),
                            enl_analysis_rank (a, site), a->sites->site[site].position,
                            enl_solvent_label (a->solvent));
  gtk_label_set_text (self->target, text);
  allow_form (self, (self->chosen && e) || (a && a->solvent != ENL_SOLVENT_THF));
}

static void
refresh_form (EnlLabPanel *self)
{
  uint32_t site;
  const EnlAnalysis *a = selected (self, &site);

  if (!self->chosen)
    self->editing = a ? enl_session_lab_shown (self->session, a, site) : ENL_NONE;
  if (!edited (self))
    self->chosen = FALSE;
  show_target (self, a, site, edited (self));
}

/* Fills the fields anew for another hydrogen, solvent or value; `always`: after values changed.
 * Else what is being typed stays. */
static void
refill (EnlLabPanel *self, gboolean always)
{
  const EnlWorkset *set = enl_session_set (self->session);
  const EnlSelection *now = enl_workset_selection (set);
  EnlSolvent solvent = enl_workset_conditions (set)->solvent;
  gboolean moved =
      now->substrate != self->substrate || now->atom != self->atom || solvent != self->solvent;

  if (moved)
    self->chosen = FALSE;
  refresh_form (self);
  if (!always && !moved && self->editing == self->filled)
    return;
  self->substrate = now->substrate;
  self->atom = now->atom;
  self->solvent = solvent;
  self->filled = self->editing;
  fill_fields (self, edited (self));
}

/* ---- list ---- */

static void
refresh_list (EnlLabPanel *self)
{
  const EnlWorkset *set = enl_session_set (self->session);
  GtkWidget *child;

  while ((child = gtk_widget_get_first_child (GTK_WIDGET (self->list))) &&
         GTK_IS_LIST_BOX_ROW (child))
    gtk_list_box_remove (self->list, child);
  for (uint32_t i = 0; i < enl_workset_lab_size (set); i++)
    gtk_list_box_append (self->list, enl_lab_row_new (self->session, i));
  gtk_widget_set_visible (GTK_WIDGET (self->empty), enl_workset_lab_size (set) == 0);
}

/* Selects the hydrogen in the set that own value `index` is about, if there is one. */
static void
select_site (EnlLabPanel *self, uint32_t index)
{
  uint32_t n = enl_workset_size (enl_session_set (self->session));

  for (uint32_t i = 0; i < n; i++) {
    EnlOutcome outcome = enl_session_outcome (self->session, i);
    for (uint32_t s = 0; outcome.current && s < outcome.analysis->sites->n_sites; s++)
      if (enl_session_lab_belongs (self->session, index, outcome.analysis, s)) {
        enl_session_select (self->session, i, outcome.analysis->sites->site[s].atom[0]);
        return;
      }
  }
}

/* ---- events ---- */

static void
on_row_activated (GtkListBox *list, GtkListBoxRow *row, EnlLabPanel *self)
{
  uint32_t index = enl_lab_row_index (row);

  (void)list;
  select_site (self, index);
  self->editing = index;
  self->chosen = TRUE;
  refill (self, TRUE);
  gtk_widget_grab_focus (GTK_WIDGET (self->pka));
}

static double
number_in (GtkEntry *entry)
{
  const char *text = gtk_editable_get_text (GTK_EDITABLE (entry));
  char *end;
  double value = g_ascii_strtod (text, &end);

  while (g_ascii_isspace (*end))
    end++;
  return end == text || *end ? NAN : value;
}

/* What the fields say, for the value being edited or for the selected site. NULL when there is
 * neither. */
static EnlLabEntry *
read_fields (EnlLabPanel *self)
{
  uint32_t site;
  const EnlAnalysis *a = selected (self, &site);
  const EnlLabEntry *old = edited (self);

  if (!old && (!a || a->solvent == ENL_SOLVENT_THF))
    return NULL;
  EnlLabEntry *entry = old ? enl_lab_entry_copy (old) : enl_lab_entry_new ();
  if (!old) {
    g_free (entry->structure);
    entry->structure = marked_structure (a, site);
    g_free (entry->name);
    entry->name = g_strdup (compound_name (self, a));
    entry->solvent = a->solvent;
  }
  entry->pka = number_in (self->pka);
  entry->sigma = number_in (self->sigma);
  g_free (entry->note);
  entry->note = g_strstrip (g_strdup (gtk_editable_get_text (GTK_EDITABLE (self->note))));
  return entry;
}

static void
keep (EnlLabPanel *self)
{
  g_autoptr (EnlLabEntry) entry = read_fields (self);
  EnlLabField field = ENL_LAB_NOTE;
  EnlError err;

  if (!entry)
    return;
  EnlStatus status = enl_lab_entry_check (entry, &field, &err);
  if (status == ENL_OK && edited (self))
    enl_session_set_lab (self->session, self->editing, entry);
  else if (status == ENL_OK)
    status = enl_session_add_lab (self->session, &entry, 1, NULL, &err);
  show_fault (self, field, status == ENL_OK ? NULL : &err);
}

static void
on_activate (GtkEntry *entry, EnlLabPanel *self)
{
  (void)entry;
  keep (self);
}

static void
on_keep (GtkButton *button, EnlLabPanel *self)
{
  (void)button;
  keep (self);
}

static void
remove_value (EnlLabPanel *self, uint32_t index)
{
  if (index >= enl_workset_lab_size (enl_session_set (self->session)))
    return;
  self->chosen = FALSE;
  /* the button that was pressed may be about to go */
  gtk_widget_grab_focus (GTK_WIDGET (self->pka));
  enl_session_remove_lab (self->session, index);
}

static void
on_discard (GtkButton *button, EnlLabPanel *self)
{
  (void)button;
  remove_value (self, self->editing);
}

static void
act_remove (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  (void)action;
  remove_value (data, g_variant_get_uint32 (parameter));
}

static void
on_typed (GtkEditable *editable, EnlLabPanel *self)
{
  (void)editable;
  show_fault (self, ENL_LAB_PKA, NULL);
}

static void
on_selection_changed (EnlSession *session, EnlLabPanel *self)
{
  (void)session;
  refill (self, FALSE);
}

static void
on_lab_changed (EnlSession *session, EnlLabPanel *self)
{
  (void)session;
  refresh_list (self);
  refill (self, TRUE);
}

/* ---- object ---- */

static void
enl_lab_panel_dispose (GObject *object)
{
  EnlLabPanel *self = ENL_LAB_PANEL (object);

  g_clear_pointer (&self->box, gtk_widget_unparent);
  g_clear_object (&self->session);
  G_OBJECT_CLASS (enl_lab_panel_parent_class)->dispose (object);
}

static void
enl_lab_panel_class_init (EnlLabPanelClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->dispose = enl_lab_panel_dispose;
  gtk_widget_class_set_css_name (widget_class, "panel");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/enolith/Enolith/lab-panel.ui");
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, box);
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, form);
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, target);
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, fault);
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, empty);
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, pka);
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, sigma);
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, note);
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, keep);
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, discard);
  gtk_widget_class_bind_template_child (widget_class, EnlLabPanel, list);
  gtk_widget_class_bind_template_callback (widget_class, on_row_activated);
  gtk_widget_class_bind_template_callback (widget_class, on_activate);
  gtk_widget_class_bind_template_callback (widget_class, on_typed);
  gtk_widget_class_bind_template_callback (widget_class, on_keep);
  gtk_widget_class_bind_template_callback (widget_class, on_discard);
  gtk_widget_class_add_binding_action (widget_class, GDK_KEY_Escape, 0, "win.lab-values", NULL);
}

static void
enl_lab_panel_init (EnlLabPanel *self)
{
  static const GActionEntry entry[] = {{"remove", act_remove, "u", NULL, NULL, {0}}};
  g_autoptr (GSimpleActionGroup) actions = g_simple_action_group_new ();

  gtk_widget_init_template (GTK_WIDGET (self));
  self->editing = ENL_NONE;
  g_action_map_add_action_entries (G_ACTION_MAP (actions), entry, G_N_ELEMENTS (entry), self);
  gtk_widget_insert_action_group (GTK_WIDGET (self), "lab", G_ACTION_GROUP (actions));
}

void
enl_lab_panel_follow (EnlLabPanel *self, EnlSession *session)
{
  g_assert (!self->session);
  self->session = g_object_ref (session);
  g_signal_connect_object (session, "selection-changed", G_CALLBACK (on_selection_changed), self,
                           0);
  g_signal_connect_object (session, "lab-changed", G_CALLBACK (on_lab_changed), self, 0);
  refresh_list (self);
  refill (self, TRUE);
}

void
enl_lab_panel_focus (EnlLabPanel *self)
{
  gtk_widget_grab_focus (GTK_WIDGET (self->pka));
}
