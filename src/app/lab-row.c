#include "app/lab-row.h"

#define INDEX_KEY "enl-lab-index"

static GtkWidget *
label_new (const char *text, const char *css)
{
  GtkWidget *label = gtk_label_new (text);

  gtk_label_set_xalign (GTK_LABEL (label), 0.0f);
  gtk_label_set_wrap (GTK_LABEL (label), TRUE);
  gtk_label_set_wrap_mode (GTK_LABEL (label), PANGO_WRAP_WORD_CHAR);
  if (css)
    gtk_widget_add_css_class (label, css);
  return label;
}

static const char *
title_of (const EnlLabEntry *e)
{
  return e->name[0] ? e->name : e->structure;
}

/* "24.1, sigma 0.3, in DMSO; second run" */
static char *
value_text (const EnlLabEntry *e)
{
  return g_strdup_printf ("%.4g, sigma %.3g, in %s%s%s", e->pka, e->sigma,
                          enl_solvent_label (e->solvent), e->note[0] ? "; " : "", e->note);
}

static GtkWidget *
remove_button_new (uint32_t index, const char *title)
{
  GtkWidget *button = gtk_button_new_from_icon_name ("user-trash-symbolic");
  g_autofree char *spoken = g_strdup_printf ("Remove the lab value of %s", title);

  gtk_widget_add_css_class (button, "flat");
  gtk_widget_set_valign (button, GTK_ALIGN_START);
  gtk_widget_set_tooltip_text (button, "Remove this lab value (can be undone)");
  gtk_accessible_update_property (GTK_ACCESSIBLE (button), GTK_ACCESSIBLE_PROPERTY_LABEL, spoken,
                                  -1);
  gtk_actionable_set_action_name (GTK_ACTIONABLE (button), "lab.remove");
  gtk_actionable_set_action_target (GTK_ACTIONABLE (button), "u", index);
  return button;
}

/* The remark or fault, marked by a sign as well as by its colour. */
static char *
remark_text (const EnlLabOutcome *outcome)
{
  if (outcome->fault) {
    g_autofree char *message = enl_error_message (outcome->fault);
    return g_strdup_printf ("\u26A0 not used: %s", message);
  }
  if (!outcome->remark)
    return NULL;
  return g_strconcat (outcome->contradicts ? "\u26A0 " : "", outcome->remark, NULL);
}

GtkWidget *
enl_lab_row_new (EnlSession *session, uint32_t index)
{
  const EnlLabEntry *e = enl_workset_lab (enl_session_set (session), index);
  EnlLabOutcome outcome = enl_session_lab_outcome (session, index);
  GtkWidget *row = gtk_list_box_row_new (), *box = gtk_box_new (GTK_ORIENTATION_HORIZONTAL, 4);
  GtkWidget *words = gtk_box_new (GTK_ORIENTATION_VERTICAL, 0);
  g_autofree char *value = value_text (e);
  g_autofree char *remark = remark_text (&outcome);
  g_autofree char *spoken = g_strdup_printf ("%s, pKa %s%s%s", title_of (e), value,
                                             remark ? "; " : "", remark ? remark : "");

  gtk_box_append (GTK_BOX (words), label_new (title_of (e), "lab-title"));
  gtk_box_append (GTK_BOX (words), label_new (value, "numeric"));
  if (remark)
    gtk_box_append (
        GTK_BOX (words),
        label_new (remark, outcome.fault || outcome.contradicts ? "lab-warning" : "lab-remark"));
  gtk_widget_set_hexpand (words, TRUE);
  gtk_box_append (GTK_BOX (box), words);
  gtk_box_append (GTK_BOX (box), remove_button_new (index, title_of (e)));
  gtk_list_box_row_set_child (GTK_LIST_BOX_ROW (row), box);
  gtk_widget_set_tooltip_text (row, e->structure);
  gtk_accessible_update_property (GTK_ACCESSIBLE (row), GTK_ACCESSIBLE_PROPERTY_LABEL, spoken, -1);
  g_object_set_data (G_OBJECT (row), INDEX_KEY, GUINT_TO_POINTER (index));
  return row;
}

uint32_t
enl_lab_row_index (GtkListBoxRow *row)
{
  return GPOINTER_TO_UINT (g_object_get_data (G_OBJECT (row), INDEX_KEY));
}
