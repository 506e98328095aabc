#include "app/weigh-panel.h"

#include <math.h>

#include "app/rest.h"

struct _EnlWeighPanel {
  GtkWidget parent;
  EnlSession *session; /* owned */
  EnlBaseTable *bases; /* owned; rows of the list are in it */
  EnlWeighList *list;  /* owned; NULL: see fault */
  char *fault;         /* owned; "" for none */
  char *base;          /* owned; id of the base that titre and content were typed for */
  EnlRest rest;        /* before it weighs anew */
  gboolean filling;
  gboolean large; /* the projector: no small type, nothing to type into */

  GtkWidget *box, *fields, *output;
  GtkLabel *heading, *result, *cautions, *problem;
  GtkEntry *amount, *equivalents, *titre, *content, *water;
  GtkDropDown *unit;
};

G_DEFINE_FINAL_TYPE (EnlWeighPanel, enl_weigh_panel, GTK_TYPE_WIDGET)

enum { CHANGED, N_SIGNALS };
static guint signals[N_SIGNALS];

enum { UNIT_MMOL, UNIT_GRAMS };

/* ---- reading the fields ---- */

/* An empty field is NAN. A comma is read as a point. */
static gboolean
read_field (GtkEntry *entry, const char *what, double *out, EnlError *err)
{
  g_autofree char *text =
      g_strstrip (g_strdelimit (g_strdup (gtk_editable_get_text (GTK_EDITABLE (entry))), ",", '.'));
  char *end;

  gtk_widget_remove_css_class (GTK_WIDGET (entry), "error");
  *out = NAN;
  if (!text[0])
    return TRUE;
  *out = g_ascii_strtod (text, &end);
  if (end != text && !*end && isfinite (*out))
    return TRUE;
  gtk_widget_add_css_class (GTK_WIDGET (entry), "error");
  enl_error_set (err, ENL_ERROR_SYNTAX, "write digits with a point, such as 2.5",
                 "%s '%.40s' is no number", what, text);
  return FALSE;
}

static gboolean
read_scale (EnlWeighPanel *self, EnlWeighScale *out, EnlError *err)
{
  gboolean grams = gtk_drop_down_get_selected (self->unit) == UNIT_GRAMS;
  double water;

  *out = enl_weigh_scale_none ();
  if (!read_field (self->amount, "amount", grams ? &out->grams : &out->mmol, err) ||
      !read_field (self->equivalents, "equivalents", &out->equivalents, err) ||
      !read_field (self->titre, "titre", &out->titre, err) ||
      !read_field (self->content, "content", &out->mass_percent, err) ||
      !read_field (self->water, "water", &water, err))
    return FALSE;
  out->water = isnan (water) ? 0.0 : water;
  return TRUE;
}

/* ---- weighing ---- */

/* The selected base, or the one that stands first. */
static EnlStatus
find_base (const EnlQuestion *q, const char *wanted, uint32_t *out, EnlError *err)
{
  g_autoptr (EnlComparison) comparison = NULL;
  int found = wanted && wanted[0] ? enl_base_table_find (q->bases, wanted) : -1;

  if (found >= 0) {
    *out = (uint32_t)found;
    return ENL_OK;
  }
  EnlStatus status = enl_bases_compare (q, &comparison, err);
  if (status == ENL_OK)
    *out = comparison->candidate[0].base;
  return status;
}

/* A label belongs to one bottle: another base begins without it. */
static void
forget_label (EnlWeighPanel *self, const char *base)
{
  if (g_strcmp0 (self->base, base) == 0)
    return;
  if (self->base) {
    self->filling = TRUE;
    gtk_editable_set_text (GTK_EDITABLE (self->titre), "");
    gtk_editable_set_text (GTK_EDITABLE (self->content), "");
    self->filling = FALSE;
  }
  g_free (self->base);
  self->base = g_strdup (base);
}

static EnlStatus
weigh (EnlWeighPanel *self, EnlError *err)
{
  const EnlWorkset *set = enl_session_set (self->session);
  const EnlKnowledge *knowledge = enl_session_knowledge (self->session);
  uint32_t site = enl_session_site (self->session), base;
  EnlWeighScale scale;

  if (site == ENL_NONE)
    return enl_error_set (err, ENL_ERROR_EMPTY, "select one on a structure",
                          "no acidic hydrogen selected");
  EnlStatus status = enl_workset_base_table (set, knowledge->bases, &self->bases, err);
  if (status != ENL_OK)
    return status;
  uint32_t substrate = enl_workset_selection (set)->substrate;
  const EnlAnalysis *a = enl_session_outcome (self->session, substrate).analysis;
  EnlConditions conditions = *enl_workset_conditions (set);
  conditions.solvent = a->solvent;
  EnlQuestion question = enl_analysis_question (a, knowledge, site, &conditions);
  question.bases = self->bases;
  status = find_base (&question, enl_workset_selection (set)->base, &base, err);
  if (status != ENL_OK)
    return status;
  forget_label (self, enl_base_table_get (self->bases, base)->id);
  if (!read_scale (self, &scale, err))
    return err->code;
  const EnlSubstrate *s = enl_workset_get (set, substrate);
  return enl_weigh_list_new (&question, knowledge->weigh, s->name[0] ? s->name : s->text, &scale,
                             &base, 1, &self->list, err);
}

/* ---- showing ---- */

static void
append_part (GString *out, const EnlWeighPart *part, const char *lesser)
{
  g_autofree char *amount = enl_weigh_amount_text (part);
  g_autofree char *form = enl_weigh_form_text (part);
  g_autofree char *line = g_markup_printf_escaped (
      "<span size='large' weight='bold'>%s</span>  %s\n<span size='%s'>%s%s%s</span>\n", amount,
      part->name, lesser, form, form[0] && part->note[0] ? "; " : "", part->note);

  g_string_append (out, line);
}

static char *
result_markup (const EnlWeighList *list, gboolean large)
{
  const char *lesser = large ? "medium" : "small";
  const EnlWeighLine *line = &list->line[0];
  GString *out = g_string_new (NULL);
  g_autofree char *head = enl_weigh_line_text (line);
  g_autofree char *mmol = enl_weigh_digits (list->mmol);
  g_autofree char *mass = enl_weigh_mass_text (list->mmol * list->molar_mass);

  for (uint32_t i = 0; i < line->weighing->n_parts; i++)
    append_part (out, &line->weighing->part[i], lesser);
  g_autofree char *rest = g_markup_printf_escaped (
      "for %s\u00A0mmol of substrate (%s): %s\n<span size='%s'>%s\n%s</span>", mmol, mass, head,
      lesser, line->reason, line->verdict);
  g_string_append (out, rest);
  return g_string_free (out, FALSE);
}

static char *
cautions_text (const EnlWeighList *list)
{
  GString *out = g_string_new (NULL);

  for (guint i = 0; i < list->hazard->len; i++)
    g_string_append_printf (out, "%s\n", (char *)g_ptr_array_index (list->hazard, i));
  g_string_append (out, list->deferral);
  return g_string_free (out, FALSE);
}

static void
show_list (EnlWeighPanel *self)
{
  g_autofree char *markup = self->list ? result_markup (self->list, self->large) : g_strdup ("");
  g_autofree char *cautions = self->list ? cautions_text (self->list) : g_strdup ("");
  g_autofree char *heading =
      self->list ? g_strdup_printf ("Weigh out: %s", self->list->line[0].weighing->base->name)
                 : g_strdup ("Weigh out");

  gtk_label_set_text (self->heading, heading);
  gtk_label_set_markup (self->result, markup);
  gtk_label_set_text (self->cautions, cautions);
  gtk_label_set_text (self->problem, self->fault);
  gtk_widget_set_visible (GTK_WIDGET (self->problem), self->fault[0] != '\0');
  gtk_widget_set_visible (self->output, self->list != NULL);
}

static void
refresh (EnlWeighPanel *self)
{
  EnlError err = {0};

  enl_rest_stop (&self->rest);
  g_clear_pointer (&self->list, enl_weigh_list_free);
  g_clear_pointer (&self->bases, enl_base_table_free);
  g_clear_pointer (&self->fault, g_free);
  self->fault = weigh (self, &err) == ENL_OK ? g_strdup ("") : enl_error_message (&err);
  show_list (self);
  g_signal_emit (self, signals[CHANGED], 0);
}

/* ---- events ---- */

static void
on_rest (gpointer data)
{
  refresh (data);
}

/* Nobody looks at a hidden panel: it weighs when it is shown. */
static void
queue_refresh (EnlWeighPanel *self)
{
  enl_rest_stop (&self->rest);
  if (gtk_widget_get_mapped (GTK_WIDGET (self)))
    enl_rest_begin (&self->rest, on_rest, self);
}

static void
on_typed (GtkWidget *widget, EnlWeighPanel *self)
{
  (void)widget;
  if (!self->filling && self->session)
    queue_refresh (self);
}

static void
on_unit (GtkDropDown *unit, GParamSpec *pspec, EnlWeighPanel *self)
{
  (void)pspec;
  on_typed (GTK_WIDGET (unit), self);
}

static void
on_activate (GtkEntry *entry, EnlWeighPanel *self)
{
  (void)entry;
  refresh (self);
}

/* The water of the conditions is what was measured or guessed for this flask. */
static void
on_conditions (EnlSession *session, EnlWeighPanel *self)
{
  double water = enl_workset_conditions (enl_session_set (session))->water;
  char text[G_ASCII_DTOSTR_BUF_SIZE] = "";

  if (water > 0.0)
    g_ascii_formatd (text, sizeof text, "%.4g", water);
  self->filling = TRUE;
  gtk_editable_set_text (GTK_EDITABLE (self->water), text);
  self->filling = FALSE;
  queue_refresh (self);
}

/* On the projector the amounts are what the audience reads. */
static void
on_look_changed (EnlLook *look, EnlWeighPanel *self)
{
  self->large = enl_look_get (look) == ENL_THEME_PROJECTOR;
  if (self->large && (gtk_widget_get_state_flags (self->fields) & GTK_STATE_FLAG_FOCUS_WITHIN))
    gtk_window_set_focus (GTK_WINDOW (gtk_widget_get_root (GTK_WIDGET (self))), NULL);
  gtk_widget_set_visible (self->fields, !self->large);
  show_list (self);
}

/* ---- object ---- */

static void
enl_weigh_panel_map (GtkWidget *widget)
{
  GTK_WIDGET_CLASS (enl_weigh_panel_parent_class)->map (widget);
  queue_refresh (ENL_WEIGH_PANEL (widget));
}

static void
enl_weigh_panel_dispose (GObject *object)
{
  EnlWeighPanel *self = ENL_WEIGH_PANEL (object);

  enl_rest_stop (&self->rest);
  g_clear_pointer (&self->box, gtk_widget_unparent);
  g_clear_pointer (&self->list, enl_weigh_list_free);
  g_clear_pointer (&self->bases, enl_base_table_free);
  g_clear_pointer (&self->fault, g_free);
  g_clear_pointer (&self->base, g_free);
  g_clear_object (&self->session);
  G_OBJECT_CLASS (enl_weigh_panel_parent_class)->dispose (object);
}

static void
enl_weigh_panel_class_init (EnlWeighPanelClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->dispose = enl_weigh_panel_dispose;
  widget_class->map = enl_weigh_panel_map;
  signals[CHANGED] = g_signal_new ("changed", ENL_TYPE_WEIGH_PANEL, G_SIGNAL_RUN_LAST, 0, NULL,
                                   NULL, NULL, G_TYPE_NONE, 0);
  gtk_widget_class_set_css_name (widget_class, "panel");
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_set_template_from_resource (widget_class, "/org/enolith/Enolith/weigh-panel.ui");
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, box);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, output);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, fields);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, heading);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, result);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, cautions);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, problem);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, amount);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, equivalents);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, titre);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, content);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, water);
  gtk_widget_class_bind_template_child (widget_class, EnlWeighPanel, unit);
  gtk_widget_class_bind_template_callback (widget_class, on_typed);
  gtk_widget_class_bind_template_callback (widget_class, on_unit);
  gtk_widget_class_bind_template_callback (widget_class, on_activate);
}

static void
enl_weigh_panel_init (EnlWeighPanel *self)
{
  self->fault = g_strdup ("");
  gtk_widget_init_template (GTK_WIDGET (self));
}

void
enl_weigh_panel_follow (EnlWeighPanel *self, EnlSession *session, EnlLook *look)
{
  g_assert (!self->session);
  self->session = g_object_ref (session);
  g_signal_connect_object (session, "selection-changed", G_CALLBACK (queue_refresh), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (session, "substrate-changed", G_CALLBACK (queue_refresh), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (session, "conditions-changed", G_CALLBACK (on_conditions), self, 0);
  g_signal_connect_object (look, "changed", G_CALLBACK (on_look_changed), self, 0);
}

void
enl_weigh_panel_focus (EnlWeighPanel *self)
{
  gtk_widget_grab_focus (GTK_WIDGET (self->amount));
}

const EnlWeighList *
enl_weigh_panel_list (EnlWeighPanel *self, const char **fault)
{
  *fault = self->fault;
  return self->list;
}

void
enl_weigh_panel_settle (EnlWeighPanel *self)
{
  refresh (self);
}
