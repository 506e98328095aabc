#include "draw/curved-arrow.h"

#include <math.h>

#include "draw/plane.h"

/* In atom label sizes. */
#define DOT_RADIUS   0.085
#define DOT_DISTANCE 0.30 /* between the two dots */
#define PAIR_ROOM    0.46
#define HEAD         0.50
#define START_GAP    0.16
#define END_GAP      0.20

/* Radians from the way of its arrow to a lone pair, so that the shaft has room to bend. */
#define PAIR_TURN      1.35
#define PAIR_TURN_COST 40

/* How far the shaft bends, in chord lengths; the first that meets nothing is taken. */
static const double bend[] = {0.42, 0.6, 0.3, 0.85, 1.15, 1.6};

#define COST_BOX    25.0 /* per sample inside a label */
#define COST_CROSS  14.0 /* per bond or arrow crossed */
#define COST_BEND   6.0
#define COST_INSIDE 3.0 /* bending towards the middle of the molecule */
#define TIE         1e-6
#define SAMPLES     16

static EnlPoint
middle_of (const EnlOutline *outline, uint32_t a, uint32_t b)
{
  return (EnlPoint){(outline->at[a].x + outline->at[b].x) / 2,
                    (outline->at[a].y + outline->at[b].y) / 2};
}

static EnlPoint
end_of (const EnlOutline *outline, const EnlArrow *arrow)
{
  if (arrow->to_b == ENL_NONE)
    return outline->at[arrow->to_a];
  return middle_of (outline, arrow->to_a, arrow->to_b);
}

EnlLonePair
enl_lone_pair_draw (EnlOutline *outline, EnlScene *scene, uint32_t atom, const EnlArrow *arrow)
{
  double em = outline->theme->atom_size;
  EnlRect own = outline->label[atom].shown
                    ? outline->label[atom].piece[0].box
                    : (EnlRect){outline->at[atom].x, outline->at[atom].y, 0, 0};
  EnlPlaceQuery query = {.anchor = outline->at[atom],
                         .clearance = fmin (own.width, own.height) / 2,
                         .width = PAIR_ROOM * em,
                         .height = PAIR_ROOM * em,
                         .pad = 0.5,
                         .hook = {PAIR_ROOM * em / 2, PAIR_ROOM * em / 2},
                         .reach = outline->theme->bond_length,
                         .leader_gap = INFINITY};
  double ignored;

  enl_outline_free_angle (outline, atom, &query.toward, &ignored);
  EnlPlace place = enl_obstacles_place (outline->taken, &query);
  for (int side = -1; arrow && side <= 1; side += 2) {
    double way = enl_point_angle (outline->at[atom], end_of (outline, arrow));
    query.toward = way + side * PAIR_TURN;
    query.turn_cost = PAIR_TURN_COST;
    EnlPlace other = enl_obstacles_place (outline->taken, &query);
    if (side < 0 || other.cost < place.cost - TIE)
      place = other;
  }
  EnlLonePair pair = {.drawn = true, .at = enl_rect_centre (place.box)};
  pair.out = enl_point_direction (outline->at[atom], pair.at);
  EnlPoint along = enl_point_left (pair.out);
  for (int side = -1; side <= 1; side += 2)
    enl_scene_disc (scene, enl_point_add (pair.at, along, side * DOT_DISTANCE * em / 2),
                    DOT_RADIUS * em, ENL_TONE_INK)
        ->atom = atom;
  enl_obstacles_add_box (outline->taken, place.box);
  return pair;
}

EnlPoint
enl_arrow_head_draw (EnlScene *scene, EnlPoint tip, EnlPoint direction, double size, EnlTone tone)
{
  EnlPoint n = enl_point_left (direction);
  EnlPoint back = enl_point_add (tip, direction, -size),
           notch = enl_point_add (tip, direction, -0.7 * size);
  const EnlPoint corner[4] = {tip, enl_point_add (back, n, 0.42 * size), notch,
                              enl_point_add (back, n, -0.42 * size)};

  enl_scene_polygon (scene, corner, 4, tone);
  return notch;
}

/* Free distance that an arrow keeps from the middle of a bond: clear of its second line. */
static double
bond_clearance (const EnlOutline *outline, uint32_t a, uint32_t b)
{
  uint32_t bond = enl_molecule_bond_between (outline->mol, a, b);
  double order = bond == ENL_NONE ? 1 : enl_outline_order (outline, bond);

  return (order > 1 ? 0.75 * outline->theme->double_gap : 0) + outline->theme->bond_width;
}

typedef struct {
  EnlPoint curve[4];
  EnlPoint tip, heading;
  double cost;
} Shaft;

/* A point beside the middle of a bond, on the side that `ref` points to, and the way out there. */
static EnlPoint
beside_bond (const EnlOutline *outline, uint32_t a, uint32_t b, EnlPoint ref, double gap,
             EnlPoint *out)
{
  EnlPoint n = enl_point_left (enl_point_direction (outline->at[a], outline->at[b]));

  if (n.x * ref.x + n.y * ref.y < 0)
    n = (EnlPoint){-n.x, -n.y};
  *out = n;
  return enl_point_add (middle_of (outline, a, b), n, gap + bond_clearance (outline, a, b));
}

/* Shaft of one arrow that bends by `bulge` chord lengths to the left (negative: to the right). */
static void
aim (const EnlOutline *outline, const EnlArrow *arrow, const EnlLonePair *pair, double bulge,
     Shaft *shaft)
{
  double em = outline->theme->atom_size;
  bool from_pair = arrow->from_b == ENL_NONE;
  EnlPoint start =
      from_pair ? pair[arrow->from_a].at : middle_of (outline, arrow->from_a, arrow->from_b);
  EnlPoint end = end_of (outline, arrow), out;
  EnlPoint n = enl_point_left (enl_point_direction (start, end));
  double length = fmax (enl_point_distance (start, end), 0.6 * outline->theme->bond_length);
  double high = fabs (bulge) * length;
  EnlPoint side = {bulge < 0 ? -n.x : n.x, bulge < 0 ? -n.y : n.y}, p1, p2;

  if (from_pair) {
    out = pair[arrow->from_a].out;
    start = enl_point_add (start, out, START_GAP * em);
    out = enl_point_add (out, side, 0.6);
  } else {
    start = beside_bond (outline, arrow->from_a, arrow->from_b, side, START_GAP * em, &out);
  }
  p1 = enl_point_add (start, out, high);
  if (arrow->to_b != ENL_NONE) {
    EnlPoint ref = from_pair ? (EnlPoint){start.x - end.x, start.y - end.y} : side;
    end = beside_bond (outline, arrow->to_a, arrow->to_b, ref, END_GAP * em, &out);
    p2 = enl_point_add (end, out, high);
  } else {
    p2 = enl_point_add (enl_point_add (end, side, high), enl_point_direction (end, start),
                        0.15 * length);
    end = enl_outline_trim (outline, arrow->to_a, p2, end);
    if (!outline->label[arrow->to_a].shown)
      end = enl_point_add (end, enl_point_direction (end, p2), END_GAP * em);
  }
  shaft->tip = end;
  shaft->heading = enl_point_direction (p2, end);
  shaft->curve[0] = start;
  shaft->curve[1] = p1;
  shaft->curve[2] = p2;
  shaft->curve[3] = enl_point_add (end, shaft->heading, -0.7 * HEAD * em);
}

static double
shaft_cost (const EnlOutline *outline, const Shaft *shaft)
{
  double cost = 0;

  for (int i = 0; i < SAMPLES; i++) {
    EnlPoint a = enl_curve_at (shaft->curve, (double)i / SAMPLES);
    EnlPoint b = enl_curve_at (shaft->curve, (double)(i + 1) / SAMPLES);
    EnlRect spot = {b.x - 2, b.y - 2, 4, 4};
    cost += COST_CROSS * enl_obstacles_across (outline->taken, a, b, INFINITY);
    cost += COST_BOX * enl_obstacles_boxes_at (outline->taken, spot);
  }
  EnlPoint way = {shaft->curve[3].x - shaft->curve[0].x, shaft->curve[3].y - shaft->curve[0].y};
  EnlPoint middle = enl_curve_at (shaft->curve, 0.5),
           flat = enl_point_add (shaft->curve[0], way, 0.5);
  EnlPoint centre = enl_outline_centre (outline);
  if (enl_point_distance (middle, centre) < enl_point_distance (flat, centre))
    cost += COST_INSIDE;
  return cost;
}

void
enl_curved_arrow_draw (EnlOutline *outline, EnlScene *scene, const EnlArrow *arrow,
                       const EnlLonePair *pair)
{
  const EnlTheme *theme = outline->theme;
  Shaft best = {.cost = INFINITY};

  for (uint32_t i = 0; i < ENL_COUNT (bend); i++)
    for (int side = -1; side <= 1; side += 2) {
      Shaft shaft;
      aim (outline, arrow, pair, side * bend[i], &shaft);
      shaft.cost = shaft_cost (outline, &shaft) + COST_BEND * fabs (bend[i] - bend[0]);
      if (shaft.cost < best.cost - TIE)
        best = shaft;
    }
  enl_scene_curve (scene, best.curve, theme->bond_width, ENL_TONE_ARROW);
  enl_arrow_head_draw (scene, best.tip, best.heading, HEAD * theme->atom_size, ENL_TONE_ARROW);
  for (int i = 0; i < SAMPLES; i++)
    enl_obstacles_add_line (outline->taken, enl_curve_at (best.curve, (double)i / SAMPLES),
                            enl_curve_at (best.curve, (double)(i + 1) / SAMPLES),
                            theme->bond_width + 2);
}
