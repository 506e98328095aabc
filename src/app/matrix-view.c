#include "app/matrix-view.h"

#include "app/rest.h"
#include "draw/matrix-scene.h"
#include "draw/paint.h"
#include "draw/plane.h"

/* More columns are not drawn; the caption says how many there are. */
#define MOST_COLUMNS 24
struct _EnlMatrixView {
  GtkWidget parent;
  EnlSession *session; /* owned */
  EnlLook *look;       /* owned */
  EnlBaseTable *bases; /* owned: the known ones and those of the set */
  EnlConditions conditions;
  GPtrArray *comparison; /* of EnlComparison or NULL, one a column that is done */
  uint32_t first, n;     /* substrates in the columns */
  EnlMatrix *matrix;     /* NULL: still at work, or nothing to show */
  EnlScene *scene;       /* of the last matrix */
  GskRenderNode *node;   /* the painted scene, NULL: paint anew */
  uint32_t row, column;  /* the present cell */
  char *words;
  gboolean usual; /* the selected site was the usual one of its substrate when the work began */
  EnlRest rest;   /* before the work begins */
  guint working;  /* idle source that compares the next substrate, 0: none */
  gboolean stale; /* hidden when something changed */
};

static guint changed_signal, done_signal;

G_DEFINE_FINAL_TYPE (EnlMatrixView, enl_matrix_view, GTK_TYPE_WIDGET)

/* ---- words ---- */

static void
set_words (EnlMatrixView *self, char *words)
{
  g_free (self->words);
  self->words = words;
  gtk_accessible_update_property (GTK_ACCESSIBLE (self), GTK_ACCESSIBLE_PROPERTY_LABEL,
                                  "Matrix of substrates and bases",
                                  GTK_ACCESSIBLE_PROPERTY_DESCRIPTION, words ? words : "", -1);
  g_signal_emit (self, changed_signal, 0);
}

static const char *
name_of (EnlMatrixView *self, uint32_t substrate)
{
  const EnlSubstrate *s = enl_workset_get (enl_session_set (self->session), substrate);

  return s->name[0] ? s->name : s->text;
}

static char *
cell_text (EnlMatrixView *self, uint32_t row, uint32_t column)
{
  uint32_t base = self->matrix->row[row];
  const EnlMatrixCell *cell = enl_matrix_cell (self->matrix, base, column);
  const char *name = name_of (self, self->first + column);

  if (!cell->asked)
    return g_strdup_printf ("%s has no acidic hydrogen", name);
  return g_strdup_printf ("%s with %s: %s; %s", name, enl_base_table_get (self->bases, base)->name,
                          enl_verdict_text (cell->verdict), cell->reason);
}

static void
tell_cell (EnlMatrixView *self)
{
  if (self->matrix && self->matrix->n_rows && self->n)
    set_words (self, cell_text (self, self->row, self->column));
}

/* ---- the present cell ---- */

static const EnlShape *
cell_shape (EnlMatrixView *self)
{
  if (!self->matrix || !self->scene || self->row >= self->matrix->n_rows)
    return NULL;
  for (uint32_t i = 0; i < enl_scene_shapes (self->scene); i++) {
    const EnlShape *shape = enl_scene_shape (self->scene, i);
    if (shape->kind == ENL_SHAPE_RECT && shape->substrate == self->column &&
        shape->atom == self->matrix->row[self->row])
      return shape;
  }
  return NULL;
}

static void
reveal (EnlMatrixView *self)
{
  GtkWidget *scroller = gtk_widget_get_ancestor (GTK_WIDGET (self), GTK_TYPE_SCROLLED_WINDOW);
  const EnlShape *shape = cell_shape (self);

  if (!scroller || !shape)
    return;
  EnlRect box = enl_rect_grow (shape->box, 8);
  gtk_adjustment_clamp_page (gtk_scrolled_window_get_hadjustment (GTK_SCROLLED_WINDOW (scroller)),
                             box.x, box.x + box.width);
  gtk_adjustment_clamp_page (gtk_scrolled_window_get_vadjustment (GTK_SCROLLED_WINDOW (scroller)),
                             box.y, box.y + box.height);
}

/* Where the session's substrate and base are, as far as the matrix has them. */
static void
take_selection (EnlMatrixView *self)
{
  const EnlSelection *selection = enl_workset_selection (enl_session_set (self->session));

  if (selection->substrate != ENL_NONE && selection->substrate >= self->first &&
      selection->substrate < self->first + self->n)
    self->column = selection->substrate - self->first;
  for (uint32_t i = 0; i < self->matrix->n_rows; i++)
    if (g_strcmp0 (enl_base_table_get (self->bases, self->matrix->row[i])->id, selection->base) ==
        0)
      self->row = i;
  self->row = self->matrix->n_rows ? MIN (self->row, self->matrix->n_rows - 1) : 0;
  self->column = self->n ? MIN (self->column, self->n - 1) : 0;
  gtk_widget_queue_draw (GTK_WIDGET (self));
  tell_cell (self);
}

static void
go_to (EnlMatrixView *self, int64_t row, int64_t column)
{
  if (!self->matrix || !self->matrix->n_rows || !self->n)
    return;
  self->row = (uint32_t)CLAMP (row, 0, (int64_t)self->matrix->n_rows - 1);
  self->column = (uint32_t)CLAMP (column, 0, (int64_t)self->n - 1);
  reveal (self);
  const char *base = enl_base_table_get (self->bases, self->matrix->row[self->row])->id;
  g_autofree char *id = g_strdup (base);
  uint32_t substrate = self->first + self->column;
  gtk_widget_queue_draw (GTK_WIDGET (self));
  tell_cell (self);
  if (enl_workset_selection (enl_session_set (self->session))->substrate != substrate)
    enl_session_select (self->session, substrate, ENL_NONE);
  enl_session_select_base (self->session, id);
}

/* ---- the work, a substrate at a time between events ---- */

static void
stop (EnlMatrixView *self)
{
  g_clear_handle_id (&self->working, g_source_remove);
  g_clear_pointer (&self->matrix, enl_matrix_free);
  g_clear_pointer (&self->comparison, g_ptr_array_unref);
  g_clear_pointer (&self->bases, enl_base_table_free);
}

static uint32_t
site_of (EnlMatrixView *self, uint32_t substrate, const EnlAnalysis *a)
{
  uint32_t site = ENL_NONE;

  if (!a)
    return ENL_NONE;
  if (enl_workset_selection (enl_session_set (self->session))->substrate == substrate)
    site = enl_session_site (self->session);
  return site != ENL_NONE ? site : enl_analysis_site (a, ENL_NONE);
}

static const EnlAnalysis *
analysis_of (EnlMatrixView *self, uint32_t substrate)
{
  const EnlAnalysis *a = enl_session_outcome (self->session, substrate).analysis;

  return a && a->solvent == self->conditions.solvent ? a : NULL;
}

/* The selected substrate stands with the same site as when it is not selected. */
static gboolean
has_usual_site (EnlMatrixView *self, uint32_t selected)
{
  const EnlAnalysis *a = selected == ENL_NONE ? NULL : analysis_of (self, selected);

  return !a || site_of (self, selected, a) == enl_analysis_site (a, ENL_NONE);
}

static void
make_picture (EnlMatrixView *self)
{
  const EnlKnowledge *k = enl_session_knowledge (self->session);
  uint32_t size = enl_workset_size (enl_session_set (self->session));
  g_autofree EnlMatrixColumn *column = g_new0 (EnlMatrixColumn, self->n);
  g_autofree char *more =
      size > self->n ? g_strdup_printf ("%u more substrates are not shown. ", size - self->n)
                     : g_strdup ("");
  g_autofree char *caption = g_strconcat (more, enl_rule_table_deferral (k->rules), NULL);

  for (uint32_t i = 0; i < self->n; i++) {
    const EnlAnalysis *a = analysis_of (self, self->first + i);
    uint32_t site = site_of (self, self->first + i, a);
    column[i] = (EnlMatrixColumn){.name = name_of (self, self->first + i)};
    column[i].mol = a ? a->mol : NULL;
    if (site == ENL_NONE)
      continue;
    column[i].site = &a->sites->site[site];
    column[i].rank = enl_analysis_rank (a, site);
    column[i].pka = a->estimate[site].value;
  }
  self->matrix =
      enl_matrix_new (self->bases, (const EnlComparison *const *)self->comparison->pdata, self->n);
  const EnlMatrixSheet sheet = {.matrix = self->matrix,
                                .column = column,
                                .bases = self->bases,
                                .conditions = &self->conditions,
                                .caption = caption};
  g_clear_pointer (&self->node, gsk_render_node_unref);
  enl_scene_free (self->scene);
  self->scene = enl_matrix_scene (&sheet, enl_look_theme (self->look));
  gtk_widget_queue_resize (GTK_WIDGET (self));
  take_selection (self);
}

static gboolean
work (gpointer data)
{
  EnlMatrixView *self = data;
  uint32_t substrate = self->first + self->comparison->len;
  EnlComparison *found = NULL;

  if (self->comparison->len == self->n) {
    self->working = 0;
    make_picture (self);
    return G_SOURCE_REMOVE;
  }
  const EnlAnalysis *a = analysis_of (self, substrate);
  uint32_t site = site_of (self, substrate, a);
  if (site != ENL_NONE) {
    EnlQuestion q =
        enl_analysis_question (a, enl_session_knowledge (self->session), site, &self->conditions);
    q.bases = self->bases;
    if (enl_bases_compare (&q, &found, NULL) != ENL_OK)
      found = NULL;
  }
  g_ptr_array_add (self->comparison, found);
  return G_SOURCE_CONTINUE;
}

static void
begin (EnlMatrixView *self)
{
  const EnlWorkset *set = enl_session_set (self->session);
  uint32_t size = enl_workset_size (set), selected = enl_workset_selection (set)->substrate;
  EnlError err;

  stop (self);
  self->stale = !gtk_widget_get_mapped (GTK_WIDGET (self));
  if (self->stale)
    return;
  if (enl_workset_base_table (set, enl_session_knowledge (self->session)->bases, &self->bases,
                              &err) != ENL_OK) {
    set_words (self, enl_error_message (&err));
    return;
  }
  self->conditions = *enl_workset_conditions (set);
  self->usual = has_usual_site (self, selected);
  self->n = MIN (size, MOST_COLUMNS);
  self->first = selected == ENL_NONE || selected < MOST_COLUMNS / 2
                    ? 0
                    : MIN (selected - MOST_COLUMNS / 2, size - self->n);
  self->comparison = g_ptr_array_new_with_free_func ((GDestroyNotify)enl_comparison_free);
  set_words (self, g_strdup_printf ("comparing %u substrates", self->n));
  self->working = g_idle_add (work, self);
}

static void
on_rest (gpointer data)
{
  begin (data);
}

/* What the work borrows from the session ends with the signal: it begins anew. */
static void
queue_begin (EnlMatrixView *self)
{
  stop (self);
  enl_rest_begin (&self->rest, on_rest, self);
}

/* Another base, or a substrate whose usual site it is, needs no new matrix. */
static void
on_selection_changed (EnlSession *session, EnlMatrixView *self)
{
  (void)session;
  if (self->stale)
    return;
  uint32_t selected = enl_workset_selection (enl_session_set (self->session))->substrate;
  gboolean shown = self->matrix && selected != ENL_NONE && selected >= self->first &&
                   selected < self->first + self->n;
  if (shown && self->usual && has_usual_site (self, selected))
    take_selection (self);
  else
    queue_begin (self);
}

static void
enl_matrix_view_map (GtkWidget *widget)
{
  EnlMatrixView *self = ENL_MATRIX_VIEW (widget);

  GTK_WIDGET_CLASS (enl_matrix_view_parent_class)->map (widget);
  if (self->stale && self->session)
    begin (self);
}

static void
enl_matrix_view_unmap (GtkWidget *widget)
{
  EnlMatrixView *self = ENL_MATRIX_VIEW (widget);

  stop (self);
  self->stale = TRUE;
  GTK_WIDGET_CLASS (enl_matrix_view_parent_class)->unmap (widget);
  set_words (self, NULL);
}

/* ---- picture ---- */

static GskRenderNode *
paint (EnlMatrixView *self, EnlRect frame)
{
  GtkSnapshot *snapshot = gtk_snapshot_new ();
  graphene_rect_t area = GRAPHENE_RECT_INIT (0, 0, (float)frame.width, (float)frame.height);
  cairo_t *cr = gtk_snapshot_append_cairo (snapshot, &area);

  enl_scene_paint (self->scene, cr);
  cairo_destroy (cr);
  return gtk_snapshot_free_to_node (snapshot);
}

static void
enl_matrix_view_snapshot (GtkWidget *widget, GtkSnapshot *snapshot)
{
  EnlMatrixView *self = ENL_MATRIX_VIEW (widget);
  const EnlShape *cell = cell_shape (self);

  if (!self->scene)
    return;
  if (!self->node)
    self->node = paint (self, enl_scene_frame (self->scene));
  if (self->node)
    gtk_snapshot_append_node (snapshot, self->node);
  if (!cell)
    return;
  EnlColour c = enl_look_theme (self->look)->tone[ENL_TONE_ACTIVE];
  GdkRGBA rim = {(float)c.red, (float)c.green, (float)c.blue, 1};
  const GdkRGBA colour[4] = {rim, rim, rim, rim};
  const float width[4] = {2, 2, 2, 2};
  graphene_rect_t box = GRAPHENE_RECT_INIT ((float)cell->box.x, (float)cell->box.y,
                                            (float)cell->box.width, (float)cell->box.height);
  GskRoundedRect around;
  gsk_rounded_rect_init_from_rect (&around, &box, 3);
  gtk_snapshot_append_border (snapshot, &around, width, colour);
}

static void
enl_matrix_view_measure (GtkWidget *widget, GtkOrientation orientation, int for_size, int *minimum,
                         int *natural, int *minimum_baseline, int *natural_baseline)
{
  EnlMatrixView *self = ENL_MATRIX_VIEW (widget);
  EnlRect frame = self->scene ? enl_scene_frame (self->scene) : (EnlRect){0, 0, 40, 40};

  (void)for_size;
  *minimum = *natural =
      (int)(orientation == GTK_ORIENTATION_HORIZONTAL ? frame.width : frame.height) + 1;
  *minimum_baseline = *natural_baseline = -1;
}

/* ---- events ---- */

/* Row and column of the cell at a place; false beside the cells. */
static gboolean
cell_at (EnlMatrixView *self, double x, double y, uint32_t *row, uint32_t *column)
{
  const EnlShape *shape = self->matrix ? enl_scene_hit (self->scene, x, y, 0) : NULL;

  if (!shape || shape->substrate == ENL_NONE)
    return FALSE;
  *column = shape->substrate;
  for (*row = 0; *row < self->matrix->n_rows; ++*row)
    if (self->matrix->row[*row] == shape->atom)
      return TRUE;
  return FALSE;
}

static void
on_pressed (GtkGestureClick *gesture, int n, double x, double y, EnlMatrixView *self)
{
  uint32_t row, column;

  (void)gesture;
  (void)n;
  gtk_widget_grab_focus (GTK_WIDGET (self));
  if (cell_at (self, x, y, &row, &column))
    go_to (self, row, column);
}

static gboolean
on_query_tooltip (GtkWidget *widget, int x, int y, gboolean keyboard, GtkTooltip *tooltip,
                  gpointer data)
{
  EnlMatrixView *self = ENL_MATRIX_VIEW (widget);
  uint32_t row = self->row, column = self->column;

  (void)data;
  if (!self->matrix || !self->matrix->n_rows || !self->n)
    return FALSE;
  if (!keyboard && !cell_at (self, x, y, &row, &column))
    return FALSE;
  g_autofree char *text = cell_text (self, row, column);
  gtk_tooltip_set_text (tooltip, text);
  return TRUE;
}

static gboolean
on_key (GtkEventControllerKey *controller, guint key, guint code, GdkModifierType state,
        EnlMatrixView *self)
{
  static const struct {
    guint key;
    int down, right;
  } way[] = {{GDK_KEY_Up, -1, 0},       {GDK_KEY_Down, 1, 0},      {GDK_KEY_Left, 0, -1},
             {GDK_KEY_Right, 0, 1},     {GDK_KEY_Page_Up, -10, 0}, {GDK_KEY_Page_Down, 10, 0},
             {GDK_KEY_Home, -10000, 0}, {GDK_KEY_End, 10000, 0}};

  (void)controller;
  (void)code;
  if (state & (GDK_CONTROL_MASK | GDK_ALT_MASK | GDK_SHIFT_MASK))
    return FALSE;
  if (key == GDK_KEY_Escape) {
    g_signal_emit (self, done_signal, 0);
    return TRUE;
  }
  for (size_t i = 0; i < G_N_ELEMENTS (way); i++)
    if (way[i].key == key) {
      go_to (self, (int64_t)self->row + way[i].down, (int64_t)self->column + way[i].right);
      return TRUE;
    }
  return FALSE;
}

/* ---- object ---- */

static void
enl_matrix_view_dispose (GObject *object)
{
  EnlMatrixView *self = ENL_MATRIX_VIEW (object);

  stop (self);
  enl_rest_stop (&self->rest);
  g_clear_pointer (&self->node, gsk_render_node_unref);
  g_clear_pointer (&self->scene, enl_scene_free);
  g_clear_pointer (&self->words, g_free);
  g_clear_object (&self->session);
  g_clear_object (&self->look);
  G_OBJECT_CLASS (enl_matrix_view_parent_class)->dispose (object);
}

static void
enl_matrix_view_class_init (EnlMatrixViewClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->dispose = enl_matrix_view_dispose;
  widget_class->snapshot = enl_matrix_view_snapshot;
  widget_class->measure = enl_matrix_view_measure;
  widget_class->map = enl_matrix_view_map;
  widget_class->unmap = enl_matrix_view_unmap;
  gtk_widget_class_set_css_name (widget_class, "matrix");
  gtk_widget_class_set_accessible_role (widget_class, GTK_ACCESSIBLE_ROLE_IMG);
  changed_signal = g_signal_new ("changed", G_TYPE_FROM_CLASS (klass), G_SIGNAL_RUN_LAST, 0, NULL,
                                 NULL, NULL, G_TYPE_NONE, 0);
  done_signal = g_signal_new ("done", G_TYPE_FROM_CLASS (klass), G_SIGNAL_RUN_LAST, 0, NULL, NULL,
                              NULL, G_TYPE_NONE, 0);
}

static void
enl_matrix_view_init (EnlMatrixView *self)
{
  GtkGesture *click = gtk_gesture_click_new ();
  GtkEventController *keys = gtk_event_controller_key_new ();

  self->stale = TRUE;
  gtk_widget_set_focusable (GTK_WIDGET (self), TRUE);
  gtk_widget_set_has_tooltip (GTK_WIDGET (self), TRUE);
  gtk_widget_set_halign (GTK_WIDGET (self), GTK_ALIGN_CENTER);
  gtk_widget_set_valign (GTK_WIDGET (self), GTK_ALIGN_START);
  g_signal_connect (self, "query-tooltip", G_CALLBACK (on_query_tooltip), NULL);
  g_signal_connect (click, "pressed", G_CALLBACK (on_pressed), self);
  g_signal_connect (keys, "key-pressed", G_CALLBACK (on_key), self);
  gtk_widget_add_controller (GTK_WIDGET (self), GTK_EVENT_CONTROLLER (click));
  gtk_widget_add_controller (GTK_WIDGET (self), keys);
}

void
enl_matrix_view_follow (EnlMatrixView *self, EnlSession *session, EnlLook *look)
{
  g_assert (!self->session);
  self->session = g_object_ref (session);
  self->look = g_object_ref (look);
  g_signal_connect_object (session, "set-changed", G_CALLBACK (queue_begin), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (session, "substrate-changed", G_CALLBACK (queue_begin), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (session, "conditions-changed", G_CALLBACK (queue_begin), self,
                           G_CONNECT_SWAPPED);
  g_signal_connect_object (session, "selection-changed", G_CALLBACK (on_selection_changed), self,
                           0);
  g_signal_connect_object (look, "changed", G_CALLBACK (queue_begin), self, G_CONNECT_SWAPPED);
}

const char *
enl_matrix_view_words (EnlMatrixView *self)
{
  return self->words ? self->words : "";
}
