#include "app/site-row.h"

#include <math.h>

#include "app/whisker.h"

#define SITE_KEY "enl-site"

static GtkWidget *
label_new (const char *text, const char *css, float xalign)
{
  GtkWidget *label = gtk_label_new (text);

  gtk_label_set_xalign (GTK_LABEL (label), xalign);
  gtk_widget_add_css_class (label, css);
  return label;
}

static GtkWidget *
position_new (const EnlSite *site)
{
  g_autofree char *count = g_strdup_printf ("%u H, %s", site->hydrogens, site->position);
  GtkWidget *label = label_new (count, "site-position", 0.0f);

  gtk_label_set_wrap (GTK_LABEL (label), TRUE);
  gtk_label_set_wrap_mode (GTK_LABEL (label), PANGO_WRAP_WORD_CHAR);
  gtk_label_set_lines (GTK_LABEL (label), 3);
  gtk_label_set_ellipsize (GTK_LABEL (label), PANGO_ELLIPSIZE_END);
  gtk_label_set_width_chars (GTK_LABEL (label), 12);
  gtk_widget_set_hexpand (label, TRUE);
  gtk_widget_set_tooltip_text (label, count);
  return label;
}

/* "14.2", or "24.1 ± 1.6" with half the 90 % interval (the larger half) where the value was not
 * published. */
static char *
value_text (const EnlEstimate *e)
{
  if (e->basis == ENL_BASIS_MEASURED)
    return g_strdup_printf ("%.1f", e->value);
  return g_strdup_printf ("%.1f ± %.1f", e->value, fmax (e->high - e->value, e->value - e->low));
}

/* "lab", with a sign where there is something to say about it. */
static char *
basis_text (const EnlEstimate *e)
{
  const char *sign = e->basis == ENL_BASIS_LAB && e->remark ? "\u26A0 " : "";

  return g_strconcat (sign, enl_basis_text (e->basis), NULL);
}

/* Remark and footing, a line each; NULL when there is neither. */
static char *
details_text (const EnlEstimate *e)
{
  if (!e->remark && !e->footing)
    return NULL;
  return g_strconcat (e->remark ? e->remark : "", e->remark && e->footing ? "\n" : "",
                      e->footing ? e->footing : "", NULL);
}

static GtkWidget *
row_new (GtkWidget *box, uint32_t site)
{
  GtkWidget *row = gtk_list_box_row_new ();

  gtk_list_box_row_set_child (GTK_LIST_BOX_ROW (row), box);
  g_object_set_data (G_OBJECT (row), SITE_KEY, GUINT_TO_POINTER (site));
  return row;
}

GtkWidget *
enl_site_row_new (const EnlAnalysis *a, uint32_t place, double low, double high,
                  const EnlTheme *theme)
{
  const EnlSite *site = &a->sites->site[a->rank[place]];
  const EnlEstimate *e = &a->estimate[a->rank[place]];
  GtkWidget *box = gtk_box_new (GTK_ORIENTATION_HORIZONTAL, 8);
  g_autofree char *rank = g_strdup_printf ("%u", place + 1);
  g_autofree char *value = value_text (e);
  GtkWidget *badge = label_new (rank, "badge", 0.5f);
  GtkWidget *number = label_new (value, "site-value", 1.0f);
  g_autofree char *origin = basis_text (e);
  GtkWidget *basis = label_new (origin, "site-basis", 1.0f);
  GtkWidget *stack = gtk_box_new (GTK_ORIENTATION_VERTICAL, 0);

  gtk_widget_add_css_class (badge, enl_basis_text (e->basis));
  gtk_widget_set_valign (badge, GTK_ALIGN_CENTER);
  gtk_widget_set_valign (stack, GTK_ALIGN_CENTER);
  gtk_box_append (GTK_BOX (stack), number);
  gtk_box_append (GTK_BOX (stack), basis);
  gtk_box_append (GTK_BOX (box), badge);
  gtk_box_append (GTK_BOX (box), position_new (site));
  gtk_box_append (GTK_BOX (box), enl_whisker_new (e, low, high, theme));
  gtk_box_append (GTK_BOX (box), stack);
  GtkWidget *row = row_new (box, a->rank[place]);
  g_autofree char *details = details_text (e);
  g_autofree char *spoken = g_strdup_printf (
      "rank %s, %s, %u H, pKa %s, %s%s%s", rank, site->position, site->hydrogens, value,
      enl_basis_text (e->basis), details ? ", " : "", details ? details : "");
  gtk_accessible_update_property (GTK_ACCESSIBLE (row), GTK_ACCESSIBLE_PROPERTY_LABEL, spoken, -1);
  if (details)
    gtk_widget_set_tooltip_text (row, details);
  return row;
}

GtkWidget *
enl_site_reason_row_new (const char *reason)
{
  GtkWidget *label = label_new (reason, "site-reason", 0.0f);
  GtkWidget *row;

  gtk_label_set_wrap (GTK_LABEL (label), TRUE);
  row = row_new (label, ENL_NONE);
  gtk_list_box_row_set_selectable (GTK_LIST_BOX_ROW (row), FALSE);
  gtk_list_box_row_set_activatable (GTK_LIST_BOX_ROW (row), FALSE);
  return row;
}

uint32_t
enl_site_row_site (GtkListBoxRow *row)
{
  return GPOINTER_TO_UINT (g_object_get_data (G_OBJECT (row), SITE_KEY));
}
