#include "app/whisker.h"

struct _EnlWhisker {
  GtkWidget parent;
  EnlEstimate estimate;
  double low, high;
  const EnlTheme *theme;
};

G_DEFINE_FINAL_TYPE (EnlWhisker, enl_whisker, GTK_TYPE_WIDGET)

static float
place (const EnlWhisker *self, double value, double width)
{
  double share = (value - self->low) / (self->high - self->low);

  return (float) (CLAMP (share, 0.0, 1.0) * width);
}

static void
fill (GtkSnapshot *snapshot, const EnlColour *c, double opacity, float x, float y, float width,
      float height)
{
  GdkRGBA rgba = { (float) c->red, (float) c->green, (float) c->blue,
                   (float) (c->alpha * opacity) };

  gtk_snapshot_append_color (snapshot, &rgba, &GRAPHENE_RECT_INIT (x, y, width, height));
}

static void
enl_whisker_snapshot (GtkWidget *widget, GtkSnapshot *snapshot)
{
  EnlWhisker *self = ENL_WHISKER (widget);
  float width = (float) gtk_widget_get_width (widget);
  float middle = (float) gtk_widget_get_height (widget) / 2;
  float low = place (self, self->estimate.low, width), high = place (self, self->estimate.high, width);
  float value = place (self, self->estimate.value, width);
  const EnlColour *muted = &self->theme->tone[ENL_TONE_MUTED];
  const EnlColour *tone = &self->theme->tone[ENL_TONE_SITE];

  fill (snapshot, muted, 0.35, 0, middle - 0.5f, width, 1);
  fill (snapshot, tone, 0.45, low, middle - 2.5f, MAX (high - low, 1), 5);
  fill (snapshot, tone, 1.0, MIN (value, width - 2) - 1, middle - 6, 3, 12);
}

static void
enl_whisker_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum,
                     int *natural, int *minimum_baseline, int *natural_baseline)
{
  (void) widget;
  (void) for_size;
  *minimum = orientation == GTK_ORIENTATION_HORIZONTAL ? 48 : 14;
  *natural = orientation == GTK_ORIENTATION_HORIZONTAL ? 90 : 14;
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
