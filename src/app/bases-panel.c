#include "app/bases-panel.h"

#include <math.h>

#include "app/rest.h"
#include "app/base-item.h"
#include "app/own-base-form.h"
#include "core/bases/equivalents.h"

struct _EnlBasesPanel {
  GtkWidget parent;
  EnlSession *session; /* owned */
  GListStore *items;
  GtkSingleSelection *selection;
  gboolean filling;
  EnlRest rest;              /* before the list is filled */
  guint reveal;              /* tick that scrolls to the selected row, 0: none */
  guint frames;              /* since the list was filled */
  EnlBaseTable *bases;       /* owned: the known ones and those of the set */
  EnlComparison *comparison; /* owned: what the list shows, in its order; NULL: nothing */

  GtkWidget *box, *conditions, *details_scroller, *remove_base, *form;
  GtkMenuButton *add_base, *moisture;
  GtkLabel *heading, *details, *deferral;
  GtkSpinButton *equivalents, *concentration, *temperature, *water;
  GtkColumnView *view;
  GtkScrolledWindow *list_scroller;
};

G_DEFINE_FINAL_TYPE (EnlBasesPanel, enl_bases_panel, GTK_TYPE_WIDGET)

/* ---- cells ---- */

static void
on_setup (GtkSignalListItemFactory *factory, GtkListItem *item, gpointer data)
{
  EnlBaseCell cell = (EnlBaseCell)GPOINTER_TO_INT (data);
  gboolean number = cell >= ENL_CELL_PKAH && cell <= ENL_CELL_CONVERSION;
  GtkWidget *label = gtk_label_new (NULL);

  (void)factory;
  gtk_label_set_xalign (GTK_LABEL (label), number ? 1.0f : 0.0f);
  gtk_label_set_ellipsize (GTK_LABEL (label), number ? PANGO_ELLIPSIZE_NONE : PANGO_ELLIPSIZE_END);
  /* Least widths: where room is short words are shortened, the numbers stay whole. */
  if (cell == ENL_CELL_NAME)
    gtk_label_set_width_chars (GTK_LABEL (label), 13);
  if (cell == ENL_CELL_VERDICT)
    gtk_label_set_width_chars (GTK_LABEL (label), 12);
  if (cell == ENL_CELL_REASON)
    gtk_label_set_width_chars (GTK_LABEL (label), 24);
  if (number)
    gtk_widget_add_css_class (label, "numeric");
  gtk_list_item_set_child (item, label);
}

static void
on_bind (GtkSignalListItemFactory *factory, GtkListItem *item, gpointer data)
{
  EnlBaseItem *base = gtk_list_item_get_item (item);
  GtkWidget *label = gtk_list_item_get_child (item);
  const char *text = enl_base_item_cell (base, (EnlBaseCell)GPOINTER_TO_INT (data));

  (void)factory;
  gtk_label_set_text (GTK_LABEL (label), text);
  gtk_widget_set_tooltip_text (label, text);
}

static void
add_column (EnlBasesPanel *self, const char *title, EnlBaseCell cell, gboolean expand)
{
  GtkListItemFactory *factory = gtk_signal_list_item_factory_new ();

  g_signal_connect (factory, "setup", G_CALLBACK (on_setup), GINT_TO_POINTER (cell));
  g_signal_connect (factory, "bind", G_CALLBACK (on_bind), GINT_TO_POINTER (cell));
  g_autoptr (GtkColumnViewColumn) column = gtk_column_view_column_new (title, factory);
  gtk_column_view_column_set_expand (column, expand);
  gtk_column_view_column_set_resizable (column, TRUE);
  gtk_column_view_append_column (self->view, column);
}

/* ---- filling ---- */

/* The question that the list answers, as things stand now. False when there is none. */
static gboolean
take_question (EnlBasesPanel *self, EnlConditions *conditions, EnlQuestion *out)
{
  const EnlWorkset *set = enl_session_set (self->session);
  uint32_t site = enl_session_site (self->session);

  if (site == ENL_NONE || !self->bases)
    return FALSE;
  uint32_t substrate = enl_workset_selection (set)->substrate;
  const EnlAnalysis *a = enl_session_outcome (self->session, substrate).analysis;
  *conditions = *enl_workset_conditions (set);
  conditions->solvent = a->solvent; /* until a new analysis arrives the old one stays consistent */
  *out = enl_analysis_question (a, enl_session_knowledge (self->session), site, conditions);
  out->bases = self->bases;
  return TRUE;
}

/* Equivalents of the base in row `row`, and the footing; "" when there is nothing to say. */
static char *
advice_text (EnlBasesPanel *self, guint row)
{
  g_autoptr (EnlEquivalents) e = NULL;
  EnlConditions conditions;
  EnlQuestion question;

  if (!self->comparison || row >= self->comparison->n_candidates ||
      !take_question (self, &conditions, &question))
    return g_strdup ("");
  const EnlCandidate *c = &self->comparison->candidate[row];
  if (enl_equivalents_new (&question, c, &e, NULL) != ENL_OK)
    return g_strdup ("");
  g_autofree char *text = enl_equivalents_text (e, enl_base_table_get (self->bases, c->base)->name);
  return g_strdup_printf ("\n%s%s", text, enl_footing_text (conditions.solvent));
}

static void
show_details (EnlBasesPanel *self)
{
  EnlBaseItem *item = gtk_single_selection_get_selected_item (self->selection);
  guint row = gtk_single_selection_get_selected (self->selection);
  int base = item && self->bases ? enl_base_table_find (self->bases, enl_base_item_id (item)) : -1;

  gtk_widget_set_visible (self->remove_base,
                          base >= 0 && enl_base_table_get (self->bases, (uint32_t)base)->own);
  if (!item) {
    gtk_label_set_text (self->details, "");
    return;
  }
  g_autofree char *advice = advice_text (self, row);
  g_autofree char *text = g_strdup_printf ("%s: %s\n%s%s", enl_base_item_cell (item, ENL_CELL_NAME),
                                           enl_base_item_cell (item, ENL_CELL_REASON),
                                           enl_base_item_details (item), advice);
  gtk_label_set_text (self->details, text);
}

/* The list has rows of one height; GTK 4.8 cannot scroll to one of them by itself. */
static gboolean
reveal_row (GtkWidget *view, GdkFrameClock *clock, gpointer data)
{
  EnlBasesPanel *self = data;
  GtkAdjustment *place = gtk_scrollable_get_vadjustment (GTK_SCROLLABLE (self->view));
  guint n = g_list_model_get_n_items (G_LIST_MODEL (self->items));
  guint row = gtk_single_selection_get_selected (self->selection);

  (void)view;
  (void)clock;
  /* A tick comes before the layout of its frame: the rows have their places at the second one. */
  if (self->frames++ == 0)
    return G_SOURCE_CONTINUE;
  self->reveal = 0;
  if (row < n) {
    double height = gtk_adjustment_get_upper (place) / n;
    gtk_adjustment_clamp_page (place, row * height, (row + 1) * height);
  }
  return G_SOURCE_REMOVE;
}

static void
stop_revealing (EnlBasesPanel *self)
{
  if (self->reveal)
    gtk_widget_remove_tick_callback (GTK_WIDGET (self->view), self->reveal);
  self->reveal = 0;
}

static void
select_wanted (EnlBasesPanel *self)
{
  const char *wanted = enl_workset_selection (enl_session_set (self->session))->base;
  guint n = g_list_model_get_n_items (G_LIST_MODEL (self->items)),
        found = n ? 0 : GTK_INVALID_LIST_POSITION;

  for (guint i = 0; i < n; i++) {
    g_autoptr (EnlBaseItem) item = g_list_model_get_item (G_LIST_MODEL (self->items), i);
    if (g_strcmp0 (enl_base_item_id (item), wanted) == 0)
      found = i;
  }
  gtk_single_selection_set_selected (self->selection, found);
  stop_revealing (self);
  self->frames = 0;
  self->reveal = gtk_widget_add_tick_callback (GTK_WIDGET (self->view), reveal_row, self, NULL);
}

static void
forget (EnlBasesPanel *self)
{
  g_clear_pointer (&self->comparison, enl_comparison_free);
  g_clear_pointer (&self->bases, enl_base_table_free);
}

/* Asks anew; false with the error when there is nothing to show. */
static EnlStatus
compare (EnlBasesPanel *self, EnlError *err)
{
  EnlConditions conditions;
  EnlQuestion question;

  forget (self);
  EnlStatus status =
      enl_workset_base_table (enl_session_set (self->session),
                              enl_session_knowledge (self->session)->bases, &self->bases, err);
  if (status == ENL_OK && take_question (self, &conditions, &question))
    status = enl_bases_compare (&question, &self->comparison, err);
  return status;
}

static char *
heading_text (const EnlAnalysis *a, uint32_t site)
{
  return g_strdup_printf ("Bases for site %u, %s, in %s%s", enl_analysis_rank (a, site),
                          a->sites->site[site].position, enl_solvent_heading (a->solvent),
                          a->solvent == ENL_SOLVENT_WATER ? "; alkoxides in their own alcohol"
                                                          : "");
}

static void
fill (EnlBasesPanel *self, const EnlAnalysis *a, uint32_t site)
{
  g_autoptr (GPtrArray) items = g_ptr_array_new_with_free_func (g_object_unref);
  EnlError err;

  if (compare (self, &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    gtk_label_set_text (self->heading, message);
    g_list_store_remove_all (self->items);
    return;
  }
  for (uint32_t i = 0; i < self->comparison->n_candidates; i++) {
    const EnlCandidate *c = &self->comparison->candidate[i];
    g_ptr_array_add (items, enl_base_item_new (enl_base_table_get (self->bases, c->base), c));
  }
  g_list_store_splice (self->items, 0, g_list_model_get_n_items (G_LIST_MODEL (self->items)),
                       items->pdata, items->len);
  g_autofree char *text = heading_text (a, site);
  gtk_label_set_text (self->heading, text);
  gtk_widget_set_tooltip_text (GTK_WIDGET (self->heading), enl_footing_text (a->solvent));
}

/* Values set from here do not come back as changes: `filling` is on. */
static void
show_number (GtkSpinButton *button, double value)
{
  if (fabs (gtk_spin_button_get_value (button) - value) > 1e-9)
    gtk_spin_button_set_value (button, value);
}

static void
show_water (EnlBasesPanel *self, double water)
{
  g_autofree char *label = water > 0 ? g_strdup_printf ("H₂O %.3g", water) : g_strdup ("H₂O");

  show_number (self->water, water);
  if (g_strcmp0 (gtk_menu_button_get_label (self->moisture), label) != 0)
    gtk_menu_button_set_label (self->moisture, label);
}

static void
refresh (EnlBasesPanel *self)
{
  const EnlWorkset *set = enl_session_set (self->session);
  const EnlConditions *conditions = enl_workset_conditions (set);
  uint32_t site = enl_session_site (self->session);

  self->filling = TRUE;
  show_number (self->equivalents, conditions->equivalents);
  show_number (self->concentration, conditions->concentration);
  show_number (self->temperature, conditions->temperature);
  show_water (self, conditions->water);
  if (site == ENL_NONE) {
    forget (self);
    g_list_store_remove_all (self->items);
    gtk_label_set_text (self->heading, "Bases: select an acidic hydrogen");
  } else {
    uint32_t substrate = enl_workset_selection (set)->substrate;
    fill (self, enl_session_outcome (self->session, substrate).analysis, site);
  }
  select_wanted (self);
  self->filling = FALSE;
  show_details (self);
}

static void
on_rest (gpointer data)
{
  refresh (data);
}

static void
queue_refresh (EnlBasesPanel *self)
{
  enl_rest_begin (&self->rest, on_rest, self);
}

/* ---- events ---- */

static void
on_session_changed (EnlSession *session, EnlBasesPanel *self)
{
  (void)session;
  queue_refresh (self);
}

static void
on_selected (GtkSingleSelection *selection, GParamSpec *pspec, EnlBasesPanel *self)
{
  EnlBaseItem *item = gtk_single_selection_get_selected_item (selection);

  (void)pspec;
  if (self->filling)
    return;
  show_details (self);
  if (item) {
    self->filling = TRUE; /* our own echo need not fill the list anew */
    enl_session_select_base (self->session, enl_base_item_id (item));
    self->filling = FALSE;
  }
}

static void
on_conditions (GtkSpinButton *button, EnlBasesPanel *self)
{
  EnlConditions c = *enl_workset_conditions (enl_session_set (self->session));

  (void)button;
  if (self->filling)
    return;
  c.equivalents = gtk_spin_button_get_value (self->equivalents);
  c.concentration = gtk_spin_button_get_value (self->concentration);
  c.temperature = gtk_spin_button_get_value (self->temperature);
  c.water = gtk_spin_button_get_value (self->water);
  enl_session_set_conditions (self->session, &c, NULL);
}

static void
on_remove_base (GtkButton *button, EnlBasesPanel *self)
{
  EnlBaseItem *item = gtk_single_selection_get_selected_item (self->selection);
  g_autofree char *id = item ? g_strdup (enl_base_item_id (item)) : NULL;

  (void)button;
  if (id)
    enl_session_remove_base (self->session, id);
}

static void
on_form_shown (GtkPopover *popover, EnlBasesPanel *self)
{
  (void)popover;
  enl_own_base_form_present (ENL_OWN_BASE_FORM (self->form));
}

static void
on_selection_changed (EnlSession *session, EnlBasesPanel *self)
{
  (void)session;
  if (!self->filling)
    queue_refresh (self);
}

/* Six rows and their heading stay in sight, in the type of each look. */
#define LEAST_LIST           148
#define LEAST_LIST_PROJECTOR 194

/* On the projector the verdicts are what the audience reads. */
static void
on_look_changed (EnlLook *look, EnlBasesPanel *self)
{
  gboolean working = enl_look_get (look) != ENL_THEME_PROJECTOR;

  if (!working && (gtk_widget_get_state_flags (self->conditions) & GTK_STATE_FLAG_FOCUS_WITHIN))
    gtk_window_set_focus (GTK_WINDOW (gtk_widget_get_root (GTK_WIDGET (self))), NULL);
  gtk_widget_set_visible (self->conditions, working);
  gtk_scrolled_window_set_min_content_height (self->list_scroller,
                                              working ? LEAST_LIST : LEAST_LIST_PROJECTOR);
}

/* ---- object ---- */

static void
enl_bases_panel_dispose (GObject *object)
{
  EnlBasesPanel *self = ENL_BASES_PANEL (object);

  enl_rest_stop (&self->rest);
  if (self->view)
    stop_revealing (self);
  g_clear_pointer (&self->box, gtk_widget_unparent);
  self->view = NULL;
  forget (self);
  g_clear_object (&self->session);
  g_clear_object (&self->selection);
  G_OBJECT_CLASS (enl_bases_panel_parent_class)->dispose (object);
}

static void
enl_bases_panel_class_init (EnlBasesPanelClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->dispose = enl_bases_panel_dispose;
  gtk_widget_class_set_css_name (widget_class, "panel");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/enolith/Enolith/bases-panel.ui");
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, box);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, conditions);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, details_scroller);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, list_scroller);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, heading);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, details);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, deferral);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, equivalents);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, concentration);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, temperature);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, moisture);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, water);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, add_base);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, remove_base);
  gtk_widget_class_bind_template_child (widget_class, EnlBasesPanel, view);
  gtk_widget_class_bind_template_callback (widget_class, on_conditions);
  gtk_widget_class_bind_template_callback (widget_class, on_remove_base);
}

static void
enl_bases_panel_init (EnlBasesPanel *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
  self->items = g_list_store_new (ENL_TYPE_BASE_ITEM);
  self->selection = gtk_single_selection_new (G_LIST_MODEL (self->items));
  gtk_single_selection_set_autoselect (self->selection, FALSE);
  gtk_column_view_set_model (self->view, GTK_SELECTION_MODEL (self->selection));
  add_column (self, "Base", ENL_CELL_NAME, TRUE);
  add_column (self, "Verdict", ENL_CELL_VERDICT, FALSE);
  add_column (self, "Anion", ENL_CELL_CONVERSION, FALSE);
  add_column (self, "Gap", ENL_CELL_GAP, FALSE);
  add_column (self, "pKaH", ENL_CELL_PKAH, FALSE);
  g_signal_connect (self->selection, "notify::selected-item", G_CALLBACK (on_selected), self);
}

static void
add_form (EnlBasesPanel *self)
{
  GtkWidget *popover = gtk_popover_new ();

  self->form = enl_own_base_form_new (self->session);
  gtk_popover_set_child (GTK_POPOVER (popover), self->form);
  g_signal_connect (popover, "show", G_CALLBACK (on_form_shown), self);
  gtk_menu_button_set_popover (self->add_base, popover);
}

void
enl_bases_panel_follow (EnlBasesPanel *self, EnlSession *session, EnlLook *look)
{
  g_assert (!self->session);
  self->session = g_object_ref (session);
  add_form (self);
  gtk_label_set_text (self->deferral,
                      enl_rule_table_deferral (enl_session_knowledge (session)->rules));
  g_signal_connect_object (session, "selection-changed", G_CALLBACK (on_selection_changed), self,
                           0);
  g_signal_connect_object (session, "conditions-changed", G_CALLBACK (on_session_changed), self, 0);
  g_signal_connect_object (look, "changed", G_CALLBACK (on_look_changed), self, 0);
  refresh (self);
}
