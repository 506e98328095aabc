/* Free room in a picture: what stands in the way, and the best place for a box near a point. */
#pragma once

#include "draw/scene.h"

typedef struct EnlObstacles EnlObstacles;

EnlObstacles *enl_obstacles_new (void) ENL_MUST_USE;
EnlObstacles *enl_obstacles_copy (const EnlObstacles *obstacles) ENL_MUST_USE;
void enl_obstacles_free (EnlObstacles *obstacles);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlObstacles, enl_obstacles_free)

void enl_obstacles_add_box (EnlObstacles *obstacles, EnlRect box);
/* A line of the given full width. */
void enl_obstacles_add_line (EnlObstacles *obstacles, EnlPoint a, EnlPoint b, double width);

/* How much a box would collide: px of lines inside it plus root of areas shared; 0 when free. */
double enl_obstacles_in_box (const EnlObstacles *obstacles, EnlRect box);
/* Number of boxes that share area with this one. */
uint32_t enl_obstacles_boxes_at (const EnlObstacles *obstacles, EnlRect box);
/* Lines crossed and boxes touched by a-b, leaving out boxes within `near` px of `a`. */
uint32_t enl_obstacles_across (const EnlObstacles *obstacles, EnlPoint a, EnlPoint b, double near);

typedef struct {
  EnlPoint anchor;      /* what the box belongs to */
  double clearance;     /* px around the anchor that are its own drawing */
  double width, height; /* of the box */
  double pad;           /* px to keep free around the box */
  EnlPoint hook;        /* point of the box, from its corner, that shall be near the anchor */
  double hook_radius;   /* px of drawing around the hook; a leader ends there */
  double toward;        /* preferred angle, as enl_point_polar */
  double turn_cost;     /* for a half turn away from it; 0: the usual */
  double reach;         /* farthest gap between anchor drawing and box that may be tried */
  double leader_gap;    /* a way to the hook longer than this needs a leader line */
  EnlRect crowd;        /* leaving this box (the drawing so far) costs a little; width 0: ignore */
} EnlPlaceQuery;

typedef struct {
  EnlRect box;
  double gap;  /* px between the drawing of the anchor and that of the hook */
  double cost; /* smaller is better; >= ENL_PLACE_COLLIDES when something is hit */
} EnlPlace;

#define ENL_PLACE_COLLIDES 1000.0

EnlPlace enl_obstacles_place (const EnlObstacles *obstacles, const EnlPlaceQuery *query);
