#include "app/curve-panel.h"

#include <math.h>

#include "app/rest.h"
#include "core/bases/curve.h"
#include "core/bases/equilibrium.h"
#include "draw/curve-scene.h"
#include "draw/paint.h"

/* Equivalents that an arrow key moves, and to which a click is rounded. */
#define STEP         0.05
#define LEAST_WIDTH  300
#define LEAST_HEIGHT 150

struct _EnlCurvePanel {
  GtkWidget parent;
  EnlSession *session; /* owned */
  EnlLook *look;       /* owned */
  EnlCurve *curve;     /* NULL: nothing to show */
  EnlConditions conditions;
  char *base, *substrate, *words;
  EnlScene *scene;     /* for the present size, NULL: to be made */
  GskRenderNode *node; /* the painted scene, NULL: paint anew */
  EnlRest rest;        /* before it asks anew */
  gboolean stale;      /* the panel was hidden when something changed */
};

static guint changed_signal;

G_DEFINE_FINAL_TYPE (EnlCurvePanel, enl_curve_panel, GTK_TYPE_WIDGET)

/* ---- asking ---- */

static void
forget_picture (EnlCurvePanel *self)
{
  g_clear_pointer (&self->node, gsk_render_node_unref);
  g_clear_pointer (&self->scene, enl_scene_free);
  gtk_widget_queue_draw (GTK_WIDGET (self));
}

static void
forget (EnlCurvePanel *self)
{
  g_clear_pointer (&self->curve, enl_curve_free);
  g_clear_pointer (&self->base, g_free);
  g_clear_pointer (&self->substrate, g_free);
  g_clear_pointer (&self->words, g_free);
  forget_picture (self);
}

/* The chosen base alone, or all of them to find the best one. */
static EnlStatus
find_curve (EnlCurvePanel *self, const EnlQuestion *q, const char *wanted, EnlError *err)
{
  g_autoptr (EnlComparison) comparison = NULL;
  int base = wanted[0] ? enl_base_table_find (q->bases, wanted) : -1;
  EnlStatus status = base >= 0 ? enl_bases_compare_one (q, (uint32_t)base, &comparison, err)
                               : enl_bases_compare (q, &comparison, err);

  if (status != ENL_OK)
    return status;
  self->base = g_strdup (enl_base_table_get (q->bases, comparison->candidate[0].base)->name);
  return enl_curve_new (q, &comparison->candidate[0], ENL_SWEEP_POINTS, &self->curve, err);
}

static EnlStatus
ask (EnlCurvePanel *self, uint32_t site, EnlError *err)
{
  const EnlWorkset *set = enl_session_set (self->session);
  const EnlSelection *selection = enl_workset_selection (set);
  const EnlAnalysis *a = enl_session_outcome (self->session, selection->substrate).analysis;
  const EnlSubstrate *substrate = enl_workset_get (set, selection->substrate);
  g_autoptr (EnlBaseTable) bases = NULL;
  const EnlKnowledge *k = enl_session_knowledge (self->session);

  self->conditions = *enl_workset_conditions (set);
  self->conditions.solvent = a->solvent; /* until a new analysis arrives */
  self->substrate = g_strdup (substrate->name[0] ? substrate->name : substrate->text);
  EnlStatus status = enl_workset_base_table (set, k->bases, &bases, err);
  if (status != ENL_OK)
    return status;
  EnlQuestion q = enl_analysis_question (a, k, site, &self->conditions);
  q.bases = bases;
  return find_curve (self, &q, selection->base, err);
}

static void
describe (EnlCurvePanel *self)
{
  gtk_accessible_update_property (GTK_ACCESSIBLE (self), GTK_ACCESSIBLE_PROPERTY_LABEL,
                                  "Composition curve", GTK_ACCESSIBLE_PROPERTY_DESCRIPTION,
                                  self->words ? self->words : "", -1);
  g_signal_emit (self, changed_signal, 0);
}

static void
refresh (EnlCurvePanel *self)
{
  uint32_t site = enl_session_site (self->session);
  EnlError err;

  self->stale = !gtk_widget_get_mapped (GTK_WIDGET (self));
  if (self->stale)
    return;
  forget (self);
  if (site == ENL_NONE)
    self->words = g_strdup ("Composition curve: select an acidic hydrogen");
  else if (ask (self, site, &err) != ENL_OK)
    self->words = enl_error_message (&err);
  else
    self->words = enl_curve_words (self->curve, self->base);
  describe (self);
}

static void
on_rest (gpointer data)
{
  refresh (data);
}

static void
queue_refresh (EnlCurvePanel *self)
{
  enl_rest_begin (&self->rest, on_rest, self);
}

static void
enl_curve_panel_map (GtkWidget *widget)
{
  GTK_WIDGET_CLASS (enl_curve_panel_parent_class)->map (widget);
  if (ENL_CURVE_PANEL (widget)->stale)
    refresh (ENL_CURVE_PANEL (widget));
}

/* ---- picture ---- */

static void
make_scene (EnlCurvePanel *self, int width, int height)
{
  const EnlCurveSheet sheet = {.curve = self->curve,
                               .substrate = self->substrate,
                               .base = self->base,
                               .conditions = &self->conditions,
                               .width = width,
                               .height = height};

  self->scene = enl_curve_scene (&sheet, enl_look_theme (self->look));
}

/* The texts may need more room than there is. */
static double
scale_of (EnlCurvePanel *self)
{
  EnlRect frame = enl_scene_frame (self->scene);

  return MIN (1.0, MIN (gtk_widget_get_width (GTK_WIDGET (self)) / frame.width,
                        gtk_widget_get_height (GTK_WIDGET (self)) / frame.height));
}

static GskRenderNode *
paint (EnlCurvePanel *self, int width, int height)
{
  GtkSnapshot *snapshot = gtk_snapshot_new ();
  graphene_rect_t area = GRAPHENE_RECT_INIT (0, 0, (float)width, (float)height);
  cairo_t *cr = gtk_snapshot_append_cairo (snapshot, &area);
  double scale = scale_of (self);

  cairo_scale (cr, scale, scale);
  enl_scene_paint (self->scene, cr);
  cairo_destroy (cr);
  return gtk_snapshot_free_to_node (snapshot);
}

static void
show_words (EnlCurvePanel *self, GtkSnapshot *snapshot, int width)
{
  g_autoptr (PangoLayout) layout =
      gtk_widget_create_pango_layout (GTK_WIDGET (self), self->words ? self->words : "");
  GdkRGBA colour;

  gtk_style_context_get_color (gtk_widget_get_style_context (GTK_WIDGET (self)), &colour);
  pango_layout_set_width (layout, width * PANGO_SCALE);
  gtk_snapshot_append_layout (snapshot, layout, &colour);
}

static void
enl_curve_panel_snapshot (GtkWidget *widget, GtkSnapshot *snapshot)
{
  EnlCurvePanel *self = ENL_CURVE_PANEL (widget);
  int width = gtk_widget_get_width (widget), height = gtk_widget_get_height (widget);

  if (width < LEAST_HEIGHT || height < 8)
    return;
  if (!self->curve) {
    show_words (self, snapshot, width);
    return;
  }
  if (!self->scene)
    make_scene (self, width, height);
  if (!self->node)
    self->node = paint (self, width, height);
  if (self->node)
    gtk_snapshot_append_node (snapshot, self->node);
}

static void
enl_curve_panel_size_allocate (GtkWidget *widget, int width, int height, int baseline)
{
  (void)width;
  (void)height;
  (void)baseline;
  forget_picture (ENL_CURVE_PANEL (widget));
}

static void
enl_curve_panel_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum,
                         int *natural, int *minimum_baseline, int *natural_baseline)
{
  (void)widget;
  (void)for_size;
  *minimum = *natural = orientation == GTK_ORIENTATION_HORIZONTAL ? LEAST_WIDTH : LEAST_HEIGHT;
  *minimum_baseline = *natural_baseline = -1;
}

/* ---- reading and moving ---- */

/* Equivalents below a place of the widget; NAN outside the axes. */
static double
equivalents_at (EnlCurvePanel *self, double x)
{
  if (!self->scene || !self->curve || self->curve->n_lines == 0)
    return NAN;
  for (uint32_t i = 0; i < enl_scene_shapes (self->scene); i++) {
    const EnlShape *shape = enl_scene_shape (self->scene, i);
    if (shape->kind != ENL_SHAPE_PATH || shape->atom == ENL_NONE)
      continue;
    double left = shape->point[0].x, right = shape->point[shape->n_points - 1].x;
    double share = (x / scale_of (self) - left) / (right - left);
    double most = self->curve->equivalents[self->curve->n_points - 1];
    return share < 0 || share > 1 ? NAN : share * most;
  }
  return NAN;
}

static double
value_at (const EnlCurve *curve, const EnlCurveLine *line, double equivalents)
{
  double place = equivalents / curve->equivalents[curve->n_points - 1] * (curve->n_points - 1);
  uint32_t before = MIN ((uint32_t)place, curve->n_points - 2);

  return line->fraction[before] +
         (place - before) * (line->fraction[before + 1] - line->fraction[before]);
}

static gboolean
on_query_tooltip (GtkWidget *widget, int x, int y, gboolean keyboard, GtkTooltip *tooltip,
                  gpointer data)
{
  EnlCurvePanel *self = ENL_CURVE_PANEL (widget);
  double equivalents = keyboard ? NAN : equivalents_at (self, x);
  GString *text = g_string_new (NULL);

  (void)y;
  (void)data;
  if (isnan (equivalents)) {
    g_string_append (text, self->words ? self->words : "");
  } else {
    g_string_printf (text, "%.2f equivalents", equivalents);
    for (uint32_t i = 0; i < self->curve->n_lines; i++) {
      const EnlCurveLine *line = &self->curve->line[i];
      g_autofree char *share = enl_share_text (value_at (self->curve, line, equivalents));
      g_string_append_printf (text, "\n%s: %s", line->label, share);
    }
  }
  gtk_tooltip_set_text (tooltip, text->str);
  gboolean any = text->len > 0;
  g_string_free (text, TRUE);
  return any;
}

static void
choose (EnlCurvePanel *self, double equivalents)
{
  EnlConditions c = *enl_workset_conditions (enl_session_set (self->session));

  c.equivalents = MAX (STEP, STEP * round (equivalents / STEP));
  enl_session_set_conditions (self->session, &c, NULL);
}

static void
on_pressed (GtkGestureClick *gesture, int n, double x, double y, EnlCurvePanel *self)
{
  double equivalents = equivalents_at (self, x);

  (void)gesture;
  (void)n;
  (void)y;
  gtk_widget_grab_focus (GTK_WIDGET (self));
  if (!isnan (equivalents))
    choose (self, equivalents);
}

static gboolean
on_key (GtkEventControllerKey *controller, guint key, guint code, GdkModifierType state,
        EnlCurvePanel *self)
{
  double now = enl_workset_conditions (enl_session_set (self->session))->equivalents;
  const GdkModifierType held = GDK_CONTROL_MASK | GDK_ALT_MASK | GDK_SHIFT_MASK;

  (void)controller;
  (void)code;
  if ((state & held) || (key != GDK_KEY_Left && key != GDK_KEY_Right))
    return FALSE;
  choose (self, now + (key == GDK_KEY_Right ? STEP : -STEP));
  return TRUE;
}

/* ---- object ---- */

static void
enl_curve_panel_dispose (GObject *object)
{
  EnlCurvePanel *self = ENL_CURVE_PANEL (object);

  enl_rest_stop (&self->rest);
  forget (self);
  g_clear_object (&self->session);
  g_clear_object (&self->look);
  G_OBJECT_CLASS (enl_curve_panel_parent_class)->dispose (object);
}

static void
enl_curve_panel_class_init (EnlCurvePanelClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->dispose = enl_curve_panel_dispose;
  widget_class->snapshot = enl_curve_panel_snapshot;
  widget_class->size_allocate = enl_curve_panel_size_allocate;
  widget_class->measure = enl_curve_panel_measure;
  widget_class->map = enl_curve_panel_map;
  gtk_widget_class_set_css_name (widget_class, "curve");
  gtk_widget_class_set_accessible_role (widget_class, GTK_ACCESSIBLE_ROLE_IMG);
  changed_signal = g_signal_new ("changed", G_TYPE_FROM_CLASS (klass), G_SIGNAL_RUN_LAST, 0, NULL,
                                 NULL, NULL, G_TYPE_NONE, 0);
}

static void
enl_curve_panel_init (EnlCurvePanel *self)
{
  GtkGesture *click = gtk_gesture_click_new ();
  GtkEventController *keys = gtk_event_controller_key_new ();

  self->stale = TRUE;
  gtk_widget_set_focusable (GTK_WIDGET (self), TRUE);
  gtk_widget_set_has_tooltip (GTK_WIDGET (self), TRUE);
  gtk_widget_set_overflow (GTK_WIDGET (self), GTK_OVERFLOW_HIDDEN);
  g_signal_connect (self, "query-tooltip", G_CALLBACK (on_query_tooltip), NULL);
  g_signal_connect (click, "pressed", G_CALLBACK (on_pressed), self);
  g_signal_connect (keys, "key-pressed", G_CALLBACK (on_key), self);
  gtk_widget_add_controller (GTK_WIDGET (self), GTK_EVENT_CONTROLLER (click));
  gtk_widget_add_controller (GTK_WIDGET (self), keys);
}

void
enl_curve_panel_follow (EnlCurvePanel *self, EnlSession *session, EnlLook *look)
{
  g_assert (!self->session);
  self->session = g_object_ref (session);
  self->look = g_object_ref (look);
  g_signal_connect_object (session, "selection-changed", G_CALLBACK (queue_refresh), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (session, "conditions-changed", G_CALLBACK (queue_refresh), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (look, "changed", G_CALLBACK (queue_refresh), self, G_CONNECT_SWAPPED);
}

const char *
enl_curve_panel_words (EnlCurvePanel *self)
{
  return self->words ? self->words : "";
}
