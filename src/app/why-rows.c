#include "app/why-rows.h"

#include <math.h>

#include "app/canvas.h"
#include "app/effect-bar.h"
#include "draw/badge.h"
#include "draw/structure-scene.h"

#define PICTURE_WIDTH  112
#define PICTURE_HEIGHT 68
/* Structures are drawn at most at this part of their usual size. */
#define LARGEST_SCALE 0.6

static GtkWidget *
label_new (const char *text, const char *css, float xalign)
{
  GtkWidget *label = gtk_label_new (text);

  gtk_label_set_xalign (GTK_LABEL (label), xalign);
  if (css)
    gtk_widget_add_css_class (label, css);
  return label;
}

static GtkWidget *
wrapping_new (const char *text, const char *css)
{
  GtkWidget *label = label_new (text, css, 0.0f);

  gtk_label_set_wrap (GTK_LABEL (label), TRUE);
  gtk_label_set_wrap_mode (GTK_LABEL (label), PANGO_WRAP_WORD_CHAR);
  gtk_label_set_width_chars (GTK_LABEL (label), 10);
  gtk_widget_set_hexpand (label, TRUE);
  return label;
}

static GtkWidget *
row_new (GtkWidget *child, const char *spoken)
{
  GtkWidget *row = gtk_list_box_row_new ();

  gtk_list_box_row_set_child (GTK_LIST_BOX_ROW (row), child);
  gtk_list_box_row_set_activatable (GTK_LIST_BOX_ROW (row), FALSE);
  gtk_accessible_update_property (GTK_ACCESSIBLE (row), GTK_ACCESSIBLE_PROPERTY_LABEL, spoken, -1);
  return row;
}

/* "+0.4", "−12.3", with a real minus sign. */
static char *
effect_text (double value)
{
  g_autofree char *size = enl_pka_text (fabs (value));

  return g_strconcat (value < 0 ? "\u2212" : "+", size, NULL);
}

static GtkWidget *
number_new (const char *text)
{
  GtkWidget *number = label_new (text, "numeric", 1.0f);

  gtk_label_set_width_chars (GTK_LABEL (number), 6);
  gtk_widget_set_valign (number, GTK_ALIGN_CENTER);
  return number;
}

GtkWidget *
enl_why_line_row_new (const EnlWhy *why, uint32_t index, double value, double most,
                      const EnlTheme *theme)
{
  GtkWidget *box = gtk_box_new (GTK_ORIENTATION_HORIZONTAL, 8);
  g_autofree char *number = index ? effect_text (value) : enl_pka_text (value);
  const char *words = why->line[index].words;
  g_autofree char *spoken = g_strdup_printf ("%s, %s", words, number);
  g_autofree char *meaning =
      index == 0 ? g_strdup ("pKa of the simplest acid of this kind by the model")
                 : g_strdup_printf ("%s: the model's pKa with it minus that without it, %s", words,
                                    number);

  gtk_box_append (GTK_BOX (box), wrapping_new (words, NULL));
  if (index) {
    GtkWidget *bar = enl_effect_bar_new (value, most, theme);
    gtk_widget_set_valign (bar, GTK_ALIGN_CENTER);
    gtk_box_append (GTK_BOX (box), bar);
  }
  gtk_box_append (GTK_BOX (box), number_new (number));
  GtkWidget *row = row_new (box, spoken);
  gtk_widget_set_tooltip_text (row, meaning);
  return row;
}

GtkWidget *
enl_why_sum_row_new (const EnlWhy *why, const EnlEstimate *e)
{
  GtkWidget *box = gtk_box_new (GTK_ORIENTATION_HORIZONTAL, 8);
  g_autofree char *number = enl_pka_text (why->value);
  g_autofree char *words =
      g_strdup_printf ("pKa in %s, %s", enl_solvent_label (e->solvent), enl_basis_text (e->basis));
  g_autofree char *spoken = g_strdup_printf ("sum: %s, %s", words, number);

  gtk_box_append (GTK_BOX (box), wrapping_new (words, NULL));
  gtk_box_append (GTK_BOX (box), number_new (number));
  GtkWidget *row = row_new (box, spoken);
  gtk_widget_add_css_class (row, "why-sum");
  gtk_widget_set_tooltip_text (row, "the lines above add up to this");
  return row;
}

/* ---- precedents ---- */

static GtkWidget *
structure_new (const EnlWhyPicture *picture, const EnlTheme *theme)
{
  EnlCanvas *canvas = g_object_new (ENL_TYPE_CANVAS, NULL);

  if (picture->mol) {
    /* Only the measured hydrogen is marked, others of the compound are no matter here. */
    EnlSites one = {.n_sites = picture->site == ENL_NONE ? 0 : 1};
    if (one.n_sites)
      one.site = &picture->sites->site[picture->site];
    EnlStructureLook look = {.sites = &one, .selected = one.n_sites ? 0 : ENL_NONE};
    enl_canvas_set_fit (canvas, TRUE, LARGEST_SCALE);
    enl_canvas_take_scene (canvas, enl_structure_scene (picture->mol, &look, theme));
  }
  gtk_widget_set_focusable (GTK_WIDGET (canvas), FALSE);
  gtk_widget_set_can_target (GTK_WIDGET (canvas), FALSE);
  double large = theme->text_size / enl_theme_get (ENL_THEME_LIGHT)->text_size;
  enl_canvas_set_size (canvas, (int)(large * PICTURE_WIDTH), (int)(large * PICTURE_HEIGHT));
  enl_canvas_describe (canvas, picture->row->name, picture->row->smiles);
  return GTK_WIDGET (canvas);
}

static char *
weight_text (const EnlWhyPicture *picture)
{
  if (picture->precedent.weight >= 1)
    return g_strdup ("this very hydrogen, weight 100 %");
  return g_strdup_printf ("weight %.0f %%, %.0f %% alike", 100 * picture->precedent.weight,
                          100 * picture->precedent.likeness);
}

GtkWidget *
enl_why_precedent_row_new (const EnlWhyPicture *picture, const EnlTheme *theme)
{
  const EnlReferenceRow *row = picture->row;
  GtkWidget *box = gtk_box_new (GTK_ORIENTATION_HORIZONTAL, 8);
  GtkWidget *words = gtk_box_new (GTK_ORIENTATION_VERTICAL, 0);
  g_autofree char *number = enl_pka_text (row->pka);
  g_autofree char *value = g_strdup_printf ("%s in %s", number, enl_solvent_label (row->solvent));
  g_autofree char *weight = weight_text (picture);
  g_autofree char *spoken =
      g_strdup_printf ("%s, pKa %s, %s, %s", row->name, value, weight, row->source);
  g_autofree char *whole =
      g_strdup_printf ("%s\n%s, %s\n%s", row->name, value, weight, row->source);
  GtkWidget *name = wrapping_new (row->name, NULL);
  GtkWidget *source = label_new (row->source, "why-source", 0.0f);

  gtk_label_set_lines (GTK_LABEL (name), 2);
  gtk_label_set_ellipsize (GTK_LABEL (name), PANGO_ELLIPSIZE_END);
  gtk_label_set_ellipsize (GTK_LABEL (source), PANGO_ELLIPSIZE_END);
  gtk_widget_set_valign (words, GTK_ALIGN_CENTER);
  gtk_box_append (GTK_BOX (words), name);
  gtk_box_append (GTK_BOX (words), label_new (value, "why-value", 0.0f));
  gtk_box_append (GTK_BOX (words), wrapping_new (weight, "why-source"));
  gtk_box_append (GTK_BOX (words), source);
  gtk_box_append (GTK_BOX (box), structure_new (picture, theme));
  gtk_box_append (GTK_BOX (box), words);
  GtkWidget *out = row_new (box, spoken);
  gtk_widget_set_tooltip_text (out, whole);
  return out;
}
