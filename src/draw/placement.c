/* Candidate places on rings around the anchor, judged by what they hit, how far they are and how
 * much they leave the preferred direction (the idea of point-feature labelling: Christensen, Marks
 * and Shieber, ACM Trans. Graph. 1995, 14, 203). */
#include "draw/placement.h"

#include <math.h>

#include "draw/plane.h"

#define DIRECTIONS    32
#define FIRST_GAP     2.0
#define GAP_GROWTH    1.32
#define TIE           1e-6 /* equal costs: the first candidate, whatever rounding says */
#define SMALLEST_STEP 2.5

#define COST_OF_TURN   7.0  /* for a half turn away from the preferred direction */
#define COST_OF_LEADER 12.0 /* a leader line at all */
#define COST_OF_CROSS  45.0 /* for each thing that the leader crosses */
#define COST_OF_CROWD  0.25 /* per px that the drawing grows */

typedef struct {
  EnlPoint a, b;
  double half;
} Line;

struct EnlObstacles {
  GArray *box;  /* of EnlRect */
  GArray *line; /* of Line */
};

EnlObstacles *
enl_obstacles_new (void)
{
  EnlObstacles *obstacles = g_new0 (EnlObstacles, 1);

  obstacles->box = g_array_new (FALSE, FALSE, sizeof (EnlRect));
  obstacles->line = g_array_new (FALSE, FALSE, sizeof (Line));
  return obstacles;
}

EnlObstacles *
enl_obstacles_copy (const EnlObstacles *obstacles)
{
  EnlObstacles *copy = g_new0 (EnlObstacles, 1);

  copy->box = g_array_copy (obstacles->box);
  copy->line = g_array_copy (obstacles->line);
  return copy;
}

void
enl_obstacles_free (EnlObstacles *obstacles)
{
  if (obstacles) {
    g_array_unref (obstacles->box);
    g_array_unref (obstacles->line);
    g_free (obstacles);
  }
}

void
enl_obstacles_add_box (EnlObstacles *obstacles, EnlRect box)
{
  g_array_append_val (obstacles->box, box);
}

void
enl_obstacles_add_line (EnlObstacles *obstacles, EnlPoint a, EnlPoint b, double width)
{
  Line line = {a, b, width / 2};

  g_array_append_val (obstacles->line, line);
}

double
enl_obstacles_in_box (const EnlObstacles *obstacles, EnlRect box)
{
  double sum = 0;

  for (guint i = 0; i < obstacles->box->len; i++)
    sum += sqrt (enl_rect_overlap (g_array_index (obstacles->box, EnlRect, i), box));
  for (guint i = 0; i < obstacles->line->len; i++) {
    const Line *line = &g_array_index (obstacles->line, Line, i);
    sum += enl_segment_inside (line->a, line->b, enl_rect_grow (box, line->half));
  }
  return sum;
}

uint32_t
enl_obstacles_boxes_at (const EnlObstacles *obstacles, EnlRect box)
{
  uint32_t hits = 0;

  for (guint i = 0; i < obstacles->box->len; i++)
    hits += enl_rect_overlap (g_array_index (obstacles->box, EnlRect, i), box) > 0;
  return hits;
}

uint32_t
enl_obstacles_across (const EnlObstacles *obstacles, EnlPoint a, EnlPoint b, double near)
{
  uint32_t hits = 0;

  for (guint i = 0; i < obstacles->box->len; i++) {
    EnlRect box = g_array_index (obstacles->box, EnlRect, i);
    if (enl_rect_distance (box, a) > near)
      hits += enl_segment_inside (a, b, box) > 0;
  }
  for (guint i = 0; i < obstacles->line->len; i++) {
    const Line *line = &g_array_index (obstacles->line, Line, i);
    hits += enl_lines_cross (a, b, line->a, line->b);
  }
  return hits;
}

/* Half the extent of a box along a direction. */
static double
box_support (double width, double height, EnlPoint u)
{
  double x = fabs (u.x) > 1e-9 ? width / 2 / fabs (u.x) : INFINITY;
  double y = fabs (u.y) > 1e-9 ? height / 2 / fabs (u.y) : INFINITY;

  return fmin (x, y);
}

static double
growth (EnlRect crowd, EnlRect box)
{
  if (crowd.width <= 0)
    return 0;
  EnlRect both = enl_rect_union (crowd, box);
  return both.width - crowd.width + both.height - crowd.height;
}

static EnlPlace
judge (const EnlObstacles *obstacles, const EnlPlaceQuery *query, double angle, double gap,
       double best)
{
  EnlPoint u = enl_point_polar (angle), centre = query->anchor;
  double turn_cost = query->turn_cost > 0 ? query->turn_cost : COST_OF_TURN;
  double away = query->clearance + gap + box_support (query->width, query->height, u);

  centre = enl_point_add (centre, u, away);
  EnlRect box = {centre.x - query->width / 2, centre.y - query->height / 2, query->width,
                 query->height};
  EnlPoint hook = {box.x + query->hook.x, box.y + query->hook.y};
  EnlPlace place = {.box = box};
  place.gap = enl_point_distance (query->anchor, hook) - query->clearance - query->hook_radius;
  place.cost = fmax (gap, place.gap) + turn_cost * enl_angle_between (angle, query->toward) / G_PI +
               COST_OF_CROWD * growth (query->crowd, box);
  if (place.gap > query->leader_gap) {
    EnlPoint way = enl_point_direction (query->anchor, hook);
    EnlPoint start = enl_point_add (query->anchor, way, query->clearance + 1);
    EnlPoint end = enl_point_add (hook, way, -query->hook_radius);
    place.cost +=
        COST_OF_LEADER + COST_OF_CROSS * enl_obstacles_across (obstacles, start, end, FIRST_GAP);
  }
  if (place.cost < best) {
    double hit = enl_obstacles_in_box (obstacles, enl_rect_grow (box, query->pad));
    if (hit > 0)
      place.cost += ENL_PLACE_COLLIDES + 10 * hit;
  }
  return place;
}

/* The obstacles that a box of the query can meet: large drawings have many that are far away. */
static EnlObstacles *
neighbourhood (const EnlObstacles *obstacles, const EnlPlaceQuery *query)
{
  EnlObstacles *near = enl_obstacles_new ();
  double half =
      query->clearance + query->reach * GAP_GROWTH + query->width + query->height + query->pad;
  EnlRect room = {query->anchor.x - half, query->anchor.y - half, 2 * half, 2 * half};

  for (guint i = 0; i < obstacles->box->len; i++) {
    EnlRect box = g_array_index (obstacles->box, EnlRect, i);
    if (enl_rect_overlap (box, room) > 0)
      g_array_append_val (near->box, box);
  }
  for (guint i = 0; i < obstacles->line->len; i++) {
    Line line = g_array_index (obstacles->line, Line, i);
    if (enl_segment_inside (line.a, line.b, enl_rect_grow (room, line.half)) > 0)
      g_array_append_val (near->line, line);
  }
  return near;
}

EnlPlace
enl_obstacles_place (const EnlObstacles *obstacles, const EnlPlaceQuery *query)
{
  g_autoptr (EnlObstacles) near = neighbourhood (obstacles, query);
  EnlPlace best = {.cost = INFINITY};

  for (double gap = FIRST_GAP; gap <= query->reach && gap < best.cost;
       gap = fmax (gap * GAP_GROWTH, gap + SMALLEST_STEP))
    for (int i = 0; i < DIRECTIONS; i++) {
      double angle = query->toward + 2 * G_PI * i / DIRECTIONS;
      EnlPlace place = judge (near, query, angle, gap, best.cost);
      if (place.cost < best.cost - TIE)
        best = place;
    }
  return best;
}
