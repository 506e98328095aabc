#include "app/whisker.h"

#include "draw/paint.h"
#include "draw/whisker.h"

struct _EnlWhisker {
  GtkWidget parent;
  EnlEstimate estimate;
  double low, high;
  const EnlTheme *theme;
};

G_DEFINE_FINAL_TYPE (EnlWhisker, enl_whisker, GTK_TYPE_WIDGET)

static void
enl_whisker_snapshot (GtkWidget *widget, GtkSnapshot *snapshot)
{
  EnlWhisker *self = ENL_WHISKER (widget);
  int width = gtk_widget_get_width (widget), height = gtk_widget_get_height (widget);
  g_autoptr (EnlScene) scene =
      enl_whisker_scene (&self->estimate, self->low, self->high, width, height, false, self->theme);
  graphene_rect_t area = GRAPHENE_RECT_INIT (0, 0, (float)width, (float)height);
  cairo_t *cr = gtk_snapshot_append_cairo (snapshot, &area);

  enl_scene_paint (scene, cr);
  cairo_destroy (cr);
}

static void
enl_whisker_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum,
                     int *natural, int *minimum_baseline, int *natural_baseline)
{
  (void)widget;
  (void)for_size;
  *minimum = orientation == GTK_ORIENTATION_HORIZONTAL ? 48 : 16;
  *natural = orientation == GTK_ORIENTATION_HORIZONTAL ? 90 : 16;
  *minimum_baseline = *natural_baseline = -1;
}

static void
enl_whisker_class_init (EnlWhiskerClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  widget_class->snapshot = enl_whisker_snapshot;
  widget_class->measure = enl_whisker_measure;
  gtk_widget_class_set_css_name (widget_class, "whisker");
  gtk_widget_class_set_accessible_role (widget_class, GTK_ACCESSIBLE_ROLE_IMG);
}

static void
enl_whisker_init (EnlWhisker *self)
{
  self->high = 1.0;
}

GtkWidget *
enl_whisker_new (const EnlEstimate *estimate, double low, double high, const EnlTheme *theme)
{
  EnlWhisker *self = g_object_new (ENL_TYPE_WHISKER, NULL);
  g_autofree char *text = g_strdup_printf ("90 %% interval %.1f to %.1f, axis %.0f to %.0f",
                                           estimate->low, estimate->high, low, high);

  self->estimate = *estimate;
  self->low = low;
  self->high = high;
  self->theme = theme;
  gtk_widget_set_tooltip_text (GTK_WIDGET (self), text);
  gtk_accessible_update_property (GTK_ACCESSIBLE (self), GTK_ACCESSIBLE_PROPERTY_LABEL, text, -1);
  return GTK_WIDGET (self);
}
