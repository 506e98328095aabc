#include "core/layout/orient.h"

#include <math.h>

#include "core/layout/geometry.h"

/* Weights of the wishes. */
static const double flat_weight = 2.4, raster_weight = 1, ring_weight = 0.4, fusion_weight = 0.7,
                    upright_weight = 0.4, symmetry_weight = 0.8;

/* The picture as it came stays when another is hardly better. */
static const double stay_bonus = 0.1, mirror_malus = 0.02;

/* A bond this near to a wished direction (radians) counts as on it; a mirrored atom this near to
 * another (bond lengths) counts as its image. */
static const double on_raster = 3 * G_PI / 180, on_image = 0.12;

/* A level axis of symmetry is nearly as good as an upright one. */
static const double level_axis = 0.9;

/* Symmetry is looked for up to this many atoms. */
static const uint32_t symmetry_below = 120;

/* A turn of the plane, after a reflection in the x axis when `mirror`. */
typedef struct {
  double turn;
  bool mirror;
} Pose;

static EnlSpot
posed (EnlSpot p, Pose pose)
{
  p.y = pose.mirror ? -p.y : p.y;
  return enl_spot_turned (p, (EnlSpot){0, 0}, pose.turn);
}

static double
bond_angle (const EnlSketch *sketch, uint32_t bond)
{
  const EnlSketchBond *b = &sketch->bond[bond];
  EnlSpot way = enl_spot_minus (sketch->spot[b->to], sketch->spot[b->from]);
  return atan2 (way.y, way.x);
}

/* True for a bond that two rings share. */
static bool
is_fusion (const EnlSketch *sketch, uint32_t bond)
{
  uint32_t end[2] = {sketch->bond[bond].from, sketch->bond[bond].to};

  for (int e = 0; e < 2; e++) {
    uint32_t in_block = 0;
    for (uint32_t k = sketch->first[end[e]]; k < sketch->first[end[e] + 1]; k++)
      in_block += sketch->bond[sketch->via[k]].block == sketch->bond[bond].block;
    if (in_block < 3)
      return false;
  }
  return sketch->bond[bond].block != ENL_NONE;
}

/* Bonds on the raster of 30 degrees; ring bonds upright or level (a symmetric ring then has an
 * upright or level axis); bonds between fused rings upright (the rings then stand in a row). */
static double
score_bonds (const EnlSketch *posed_sketch)
{
  double raster = 0, ring = 0, fusion = 0, n_ring = 0, n_fusion = 0;

  for (uint32_t b = 0; b < posed_sketch->n_bonds; b++) {
    double angle = bond_angle (posed_sketch, b);
    raster += fabs (remainder (angle, G_PI / 6)) < on_raster;
    if (posed_sketch->bond[b].block == ENL_NONE)
      continue;
    n_ring++;
    ring += fabs (remainder (angle, G_PI / 2)) < on_raster;
    if (!is_fusion (posed_sketch, b))
      continue;
    n_fusion++;
    fusion += fabs (remainder (angle - G_PI / 2, G_PI)) < on_raster;
  }
  return raster_weight * raster / fmax (1, posed_sketch->n_bonds) +
         ring_weight * ring / fmax (1, n_ring) + fusion_weight * fusion / fmax (1, n_fusion);
}

/* f |f| with f = (width - height) / (width + height): matters for long pictures, hardly for compact
 * ones. */
static double
flatness (const EnlSketch *sketch)
{
  double low_x = INFINITY, high_x = -INFINITY, low_y = INFINITY, high_y = -INFINITY;

  for (uint32_t i = 0; i < sketch->n_atoms; i++) {
    low_x = fmin (low_x, sketch->spot[i].x), high_x = fmax (high_x, sketch->spot[i].x);
    low_y = fmin (low_y, sketch->spot[i].y), high_y = fmax (high_y, sketch->spot[i].y);
  }
  double width = high_x - low_x, height = high_y - low_y;
  double flat = width + height > 0 ? (width - height) / (width + height) : 0;
  return flat * fabs (flat);
}

/* Terminal double bonds (carbonyl groups) upwards, and of two poses alike the one that has them on
 * the right. */
static double
uprightness (const EnlSketch *sketch)
{
  double sum = 0, n = 0;

  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    const EnlSketchBond *bond = &sketch->bond[b];
    bool from_end = enl_sketch_degree (sketch, bond->from) == 1;
    bool to_end = enl_sketch_degree (sketch, bond->to) == 1;
    double angle = bond_angle (sketch, b);
    if (bond->order != 2 || from_end == to_end)
      continue;
    sum += (sin (angle) + 0.2 * cos (angle)) * (to_end ? 1 : -1);
    n++;
  }
  return n > 0 ? sum / sqrt (n) : 0;
}

/* Share of the atoms that have an image when the picture is reflected left to right or, with
 * `upside_down`, top to bottom. */
static double
mirror_symmetry (const EnlSketch *sketch, bool upside_down)
{
  EnlSpot middle = {0, 0};
  double hits = 0;

  for (uint32_t i = 0; i < sketch->n_atoms; i++) {
    middle.x += sketch->spot[i].x / sketch->n_atoms;
    middle.y += sketch->spot[i].y / sketch->n_atoms;
  }
  for (uint32_t i = 0; i < sketch->n_atoms; i++) {
    EnlSpot image = sketch->spot[i];
    if (upside_down)
      image.y = 2 * middle.y - image.y;
    else
      image.x = 2 * middle.x - image.x;
    for (uint32_t j = 0; j < sketch->n_atoms; j++)
      if (fabs (sketch->spot[j].x - image.x) < on_image &&
          fabs (sketch->spot[j].y - image.y) < on_image) {
        hits++;
        break;
      }
  }
  return hits / sketch->n_atoms;
}

/* `trial` is the sketch with spots of its own, which are overwritten. */
static double
score_pose (const EnlSketch *sketch, EnlSketch *trial, Pose pose)
{
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    trial->spot[i] = posed (sketch->spot[i], pose);
  double score = flat_weight * flatness (trial) + score_bonds (trial) +
                 upright_weight * uprightness (trial) - (pose.mirror ? mirror_malus : 0);
  if (sketch->n_atoms < symmetry_below)
    score += symmetry_weight *
             fmax (mirror_symmetry (trial, false), level_axis * mirror_symmetry (trial, true));
  return score;
}

/* Directions of the bonds within 30 degrees, each once. */
static GArray *
distinct_angles (const EnlSketch *sketch)
{
  const double same = 1e-3;
  GArray *list = g_array_new (FALSE, FALSE, sizeof (double));

  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    double angle = bond_angle (sketch, b);
    bool known = false;
    for (guint k = 0; k < list->len && !known; k++)
      known = fabs (remainder (angle - g_array_index (list, double, k), G_PI / 6)) < same;
    if (!known)
      g_array_append_val (list, angle);
  }
  return list;
}

void
enl_orient (EnlSketch *sketch)
{
  const double better = 1e-6;
  const Pose as_is = {0, false};
  g_autofree EnlSpot *spot = g_new0 (EnlSpot, sketch->n_atoms + 1);
  EnlSketch trial = *sketch;
  trial.spot = spot;
  double best = score_pose (sketch, &trial, as_is) + stay_bonus;
  Pose best_pose = as_is;
  g_autoptr (GArray) angle = distinct_angles (sketch);

  for (guint a = 0; a < angle->len; a++)
    for (int k = 0; k < 24; k++) {
      double base = g_array_index (angle, double, a);
      Pose pose = {k % 12 * G_PI / 6 + (k >= 12 ? base : -base), k >= 12};
      double score = score_pose (sketch, &trial, pose);
      if (score > best + better)
        best = score, best_pose = pose;
    }
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    sketch->spot[i] = posed (sketch->spot[i], best_pose);
}
