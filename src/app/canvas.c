#include "app/canvas.h"

#include "draw/paint.h"

/* A click this near a shape picks it, px on the screen. */
#define REACH 6.0
/* Room around the scene, px. */
#define MARGIN 6.0
/* Below this size the picture is not worth drawing. */
#define SMALLEST 8

struct _EnlCanvas {
  GtkWidget parent;
  EnlScene *scene;
  GskRenderNode *node; /* the painted scene at the present size, NULL: paint anew */
  gboolean fit;
  double largest, smallest;
  int width, height; /* asked for when above 0 */
};

static guint picked_signal;

G_DEFINE_FINAL_TYPE (EnlCanvas, enl_canvas, GTK_TYPE_WIDGET)

/* Scale and offset from scene to widget. */
static void
transform (EnlCanvas *self, double *scale, double *dx, double *dy)
{
  EnlRect frame = enl_scene_frame (self->scene);
  double width = gtk_widget_get_width (GTK_WIDGET (self));
  double height = gtk_widget_get_height (GTK_WIDGET (self));

  *scale = 1.0;
  if (self->fit && frame.width > 0.0 && frame.height > 0.0)
    *scale = MIN (self->largest,
                  MIN ((width - 2 * MARGIN) / frame.width, (height - 2 * MARGIN) / frame.height));
  *scale = MAX (*scale, 0.01);
  *dx = self->fit ? (width - *scale * frame.width) / 2 - *scale * frame.x : -frame.x;
  *dy = self->fit ? (height - *scale * frame.height) / 2 - *scale * frame.y : -frame.y;
}

static GskRenderNode *
paint (EnlCanvas *self, int width, int height)
{
  GtkSnapshot *snapshot = gtk_snapshot_new ();
  graphene_rect_t area = GRAPHENE_RECT_INIT (0, 0, (float)width, (float)height);
  cairo_t *cr = gtk_snapshot_append_cairo (snapshot, &area);
  double scale, dx, dy;

  transform (self, &scale, &dx, &dy);
  cairo_translate (cr, dx, dy);
  cairo_scale (cr, scale, scale);
  enl_scene_paint (self->scene, cr);
  cairo_destroy (cr);
  return gtk_snapshot_free_to_node (snapshot);
}

static void
enl_canvas_snapshot (GtkWidget *widget, GtkSnapshot *snapshot)
{
  EnlCanvas *self = ENL_CANVAS (widget);
  int width = gtk_widget_get_width (widget), height = gtk_widget_get_height (widget);

  if (!self->scene || width < SMALLEST || height < SMALLEST)
    return;
  if (!self->node)
    self->node = paint (self, width, height);
  if (self->node)
    gtk_snapshot_append_node (snapshot, self->node);
}

static void
enl_canvas_size_allocate (GtkWidget *widget, int width, int height, int baseline)
{
  (void)width;
  (void)height;
  (void)baseline;
  g_clear_pointer (&ENL_CANVAS (widget)->node, gsk_render_node_unref);
}

static void
enl_canvas_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum,
                    int *natural, int *minimum_baseline, int *natural_baseline)
{
  EnlCanvas *self = ENL_CANVAS (widget);

  (void)for_size;
  *minimum_baseline = *natural_baseline = -1;
  *minimum = 40;
  if (self->width > 0) {
    *minimum = *natural = orientation == GTK_ORIENTATION_HORIZONTAL ? self->width : self->height;
    return;
  }
  if (self->scene) {
    EnlRect frame = enl_scene_frame (self->scene);
    double size = orientation == GTK_ORIENTATION_HORIZONTAL ? frame.width : frame.height;
    *natural = (int)size + 1;
    *minimum = MAX (*minimum, self->fit ? (int)(self->smallest * size) : *natural);
  }
  *natural = MAX (*natural, *minimum);
}

static const EnlShape *
shape_at (EnlCanvas *self, double x, double y)
{
  double scale, dx, dy;

  if (!self->scene)
    return NULL;
  transform (self, &scale, &dx, &dy);
  return enl_scene_hit (self->scene, (x - dx) / scale, (y - dy) / scale, REACH / scale);
}

static void
on_pressed (GtkGestureClick *gesture, int n, double x, double y, gpointer data)
{
  EnlCanvas *self = data;
  const EnlShape *shape = shape_at (self, x, y);

  (void)gesture;
  (void)n;
  g_signal_emit (self, picked_signal, 0, shape ? shape->site : ENL_NONE,
                 shape ? shape->atom : ENL_NONE);
}

static void
on_motion (GtkEventControllerMotion *controller, double x, double y, gpointer data)
{
  EnlCanvas *self = data;
  const EnlShape *shape = shape_at (self, x, y);

  (void)controller;
  gtk_widget_set_cursor_from_name (GTK_WIDGET (self),
                                   shape && shape->site != ENL_NONE ? "pointer" : NULL);
}

static void
enl_canvas_finalize (GObject *object)
{
  EnlCanvas *self = ENL_CANVAS (object);

  g_clear_pointer (&self->node, gsk_render_node_unref);
  enl_scene_free (self->scene);
  G_OBJECT_CLASS (enl_canvas_parent_class)->finalize (object);
}

static void
enl_canvas_class_init (EnlCanvasClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->finalize = enl_canvas_finalize;
  widget_class->snapshot = enl_canvas_snapshot;
  widget_class->size_allocate = enl_canvas_size_allocate;
  widget_class->measure = enl_canvas_measure;
  gtk_widget_class_set_css_name (widget_class, "canvas");
  gtk_widget_class_set_accessible_role (widget_class, GTK_ACCESSIBLE_ROLE_IMG);
  picked_signal = g_signal_new ("picked", G_TYPE_FROM_CLASS (klass), G_SIGNAL_RUN_LAST, 0, NULL,
                                NULL, NULL, G_TYPE_NONE, 2, G_TYPE_UINT, G_TYPE_UINT);
}

static void
enl_canvas_init (EnlCanvas *self)
{
  GtkGesture *click = gtk_gesture_click_new ();
  GtkEventController *motion = gtk_event_controller_motion_new ();

  self->fit = TRUE;
  self->largest = 1.4;
  gtk_widget_set_focusable (GTK_WIDGET (self), TRUE);
  gtk_widget_set_overflow (GTK_WIDGET (self), GTK_OVERFLOW_HIDDEN);
  g_signal_connect (click, "pressed", G_CALLBACK (on_pressed), self);
  g_signal_connect (motion, "motion", G_CALLBACK (on_motion), self);
  gtk_widget_add_controller (GTK_WIDGET (self), GTK_EVENT_CONTROLLER (click));
  gtk_widget_add_controller (GTK_WIDGET (self), motion);
}

void
enl_canvas_take_scene (EnlCanvas *self, EnlScene *scene)
{
  enl_scene_free (self->scene);
  self->scene = scene;
  g_clear_pointer (&self->node, gsk_render_node_unref);
  if (self->fit && self->smallest <= 0.0)
    gtk_widget_queue_draw (GTK_WIDGET (self));
  else
    gtk_widget_queue_resize (GTK_WIDGET (self));
}

void
enl_canvas_set_fit (EnlCanvas *self, gboolean fit, double largest)
{
  self->fit = fit;
  self->largest = largest;
  gtk_widget_queue_resize (GTK_WIDGET (self));
}

void
enl_canvas_set_size (EnlCanvas *self, int width, int height)
{
  self->width = width;
  self->height = height;
  gtk_widget_queue_resize (GTK_WIDGET (self));
}

void
enl_canvas_set_smallest (EnlCanvas *self, double smallest)
{
  self->smallest = smallest;
  gtk_widget_queue_resize (GTK_WIDGET (self));
}

void
enl_canvas_describe (EnlCanvas *self, const char *label, const char *description)
{
  gtk_accessible_update_property (GTK_ACCESSIBLE (self), GTK_ACCESSIBLE_PROPERTY_LABEL, label,
                                  GTK_ACCESSIBLE_PROPERTY_DESCRIPTION, description, -1);
}
