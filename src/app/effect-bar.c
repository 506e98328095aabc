#include "app/effect-bar.h"

#include "draw/effect-bar.h"
#include "draw/paint.h"

#define WIDTH  76
#define HEIGHT 14

struct _EnlEffectBar {
  GtkWidget parent;
  double effect, most;
  const EnlTheme *theme;
};

G_DEFINE_FINAL_TYPE (EnlEffectBar, enl_effect_bar, GTK_TYPE_WIDGET)

static void
enl_effect_bar_snapshot (GtkWidget *widget, GtkSnapshot *snapshot)
{
  EnlEffectBar *self = ENL_EFFECT_BAR (widget);
  int width = gtk_widget_get_width (widget), height = gtk_widget_get_height (widget);

  if (width < 4 || height < 4)
    return;
  g_autoptr (EnlScene) scene =
      enl_effect_bar_scene (self->effect, self->most, width, height, self->theme);
  graphene_rect_t area = GRAPHENE_RECT_INIT (0, 0, (float)width, (float)height);
  cairo_t *cr = gtk_snapshot_append_cairo (snapshot, &area);
  enl_scene_paint (scene, cr);
  cairo_destroy (cr);
}

static void
enl_effect_bar_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum,
                        int *natural, int *minimum_baseline, int *natural_baseline)
{
  (void)widget;
  (void)for_size;
  *minimum = *natural = orientation == GTK_ORIENTATION_HORIZONTAL ? WIDTH : HEIGHT;
  *minimum_baseline = *natural_baseline = -1;
}

static void
enl_effect_bar_class_init (EnlEffectBarClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  widget_class->snapshot = enl_effect_bar_snapshot;
  widget_class->measure = enl_effect_bar_measure;
  gtk_widget_class_set_css_name (widget_class, "effect");
  gtk_widget_class_set_accessible_role (widget_class, GTK_ACCESSIBLE_ROLE_PRESENTATION);
}

static void
enl_effect_bar_init (EnlEffectBar *self)
{
  self->most = 1;
}

GtkWidget *
enl_effect_bar_new (double effect, double most, const EnlTheme *theme)
{
  EnlEffectBar *self = g_object_new (ENL_TYPE_EFFECT_BAR, NULL);

  self->effect = effect;
  self->most = most;
  self->theme = theme;
  return GTK_WIDGET (self);
}
