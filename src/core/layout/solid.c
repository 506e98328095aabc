#include "core/layout/solid.h"

#include <math.h>
#include <stdlib.h>

#include "core/layout/strain.h"

typedef struct {
  double x, y, z;
} Point;

/* Distances in bond lengths between atoms one, two, and three or more bonds apart in a saturated
 * skeleton: tetrahedral angle for two bonds (sqrt (8 / 3)), a right angle within a four-ring. */
static const double two_bonds = 1.633, two_in_square = 1.414, three_bonds = 2.0, farther = 2.4;

static const uint32_t build_rounds = 400, starts = 8, directions = 240;

/* A fixed sequence of numbers in -1..1 (linear congruential, Numerical Recipes' constants): starts
 * must be the same in every run. */
static double
next_number (uint32_t *state)
{
  *state = *state * 1664525u + 1013904223u;
  return (double)(*state >> 8) / 8388608.0 - 1;
}

/* How far apart each pair wants to be; negative: at least that far. */
static double *
wanted_distances (const EnlSketch *s)
{
  uint32_t n = s->n_atoms;
  double *want = g_new (double, n *n);

  for (uint32_t i = 0; i < n * n; i++)
    want[i] = -farther;
  for (uint32_t i = 0; i < n; i++)
    for (uint32_t k = s->first[i]; k < s->first[i + 1]; k++) {
      uint32_t j = s->neighbour[k];
      for (uint32_t l = s->first[j]; l < s->first[j + 1]; l++) {
        uint32_t m = s->neighbour[l];
        for (uint32_t o = s->first[m]; o < s->first[m + 1]; o++)
          want[i * n + s->neighbour[o]] = -three_bonds;
      }
    }
  for (uint32_t i = 0; i < n; i++)
    for (uint32_t k = s->first[i]; k < s->first[i + 1]; k++) {
      uint32_t j = s->neighbour[k];
      for (uint32_t l = s->first[j]; l < s->first[j + 1]; l++) {
        double *w = &want[i * n + s->neighbour[l]];
        *w = fabs (*w - two_bonds) < 1e-9 ? two_in_square : *w == two_in_square ? *w : two_bonds;
      }
    }
  for (uint32_t b = 0; b < s->n_bonds; b++)
    want[s->bond[b].from * n + s->bond[b].to] = want[s->bond[b].to * n + s->bond[b].from] = 1;
  return want;
}

/* One round of moving every pair towards its distance; returns the misfit left before it. */
static double
build_once (Point *p, const double *want, uint32_t n, double share)
{
  double misfit = 0;

  for (uint32_t i = 0; i < n; i++)
    for (uint32_t j = 0; j < i; j++) {
      Point d = {p[i].x - p[j].x, p[i].y - p[j].y, p[i].z - p[j].z};
      double length = sqrt (d.x * d.x + d.y * d.y + d.z * d.z) + 1e-9;
      double w = want[i * n + j];
      if (w < 0 && length >= -w)
        continue;
      double off = fabs (w) - length;
      double weight = w == 1 ? 1 : w > 0 ? 0.5 : 0.15;
      double f = share * weight * off / length;
      misfit += weight * off * off;
      p[i] = (Point){p[i].x + f * d.x, p[i].y + f * d.y, p[i].z + f * d.z};
      p[j] = (Point){p[j].x - f * d.x, p[j].y - f * d.y, p[j].z - f * d.z};
    }
  return misfit;
}

static void
centre_points (Point *p, uint32_t n)
{
  Point c = {0, 0, 0};

  for (uint32_t i = 0; i < n; i++)
    c = (Point){c.x + p[i].x / n, c.y + p[i].y / n, c.z + p[i].z / n};
  for (uint32_t i = 0; i < n; i++)
    p[i] = (Point){p[i].x - c.x, p[i].y - c.y, p[i].z - c.z};
}

/* The best body out of several starts. */
static Point *
build_body (const EnlSketch *sketch)
{
  uint32_t n = sketch->n_atoms, state = 12345;
  g_autofree double *want = wanted_distances (sketch);
  Point *best = g_new0 (Point, n + 1);
  g_autofree Point *trial = g_new (Point, n + 1);
  double best_misfit = INFINITY, misfit = 0, size = cbrt ((double)n);

  for (uint32_t s = 0; s < starts; s++) {
    for (uint32_t i = 0; i < n; i++) {
      trial[i].x = size * next_number (&state);
      trial[i].y = size * next_number (&state);
      trial[i].z = size * next_number (&state);
    }
    for (uint32_t k = 0; k < build_rounds; k++)
      misfit = build_once (trial, want, n, k < build_rounds / 2 ? 0.3 : 0.15);
    if (misfit < best_misfit - 1e-6) {
      best_misfit = misfit;
      for (uint32_t i = 0; i < n; i++)
        best[i] = trial[i];
    }
  }
  centre_points (best, n);
  return best;
}

/* Parallel projection along a direction given by its height (-1..1) and turn about the z axis,
 * enlarged to a mean bond length of 1. */
static void
project (const EnlSketch *sketch, const Point *body, double height, double turn, EnlSpot *spot)
{
  double flat = sqrt (fmax (0, 1 - height * height)), c = cos (turn), s = sin (turn), sum = 0;

  for (uint32_t i = 0; i < sketch->n_atoms; i++) {
    Point p = body[i];
    spot[i].x = -s * p.x + c * p.y;
    spot[i].y = -height * c * p.x - height * s * p.y + flat * p.z;
  }
  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    EnlSpot from = spot[sketch->bond[b].from], to = spot[sketch->bond[b].to];
    sum += hypot (from.x - to.x, from.y - to.y);
  }
  double scale = sum > 0 ? sketch->n_bonds / sum : 1;
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    spot[i] = (EnlSpot){spot[i].x * scale, spot[i].y * scale};
}

typedef struct {
  double cost, height, turn;
} View;

static int
compare_views (const void *a, const void *b)
{
  double p = ((const View *)a)->cost, q = ((const View *)b)->cost;
  return (p > q) - (p < q);
}

uint32_t
enl_solid_views (const EnlSketch *sketch, EnlSpot *spot)
{
  g_autofree Point *body = build_body (sketch);
  g_autofree View *view = g_new (View, directions);
  EnlSketch look = *sketch; /* same graph, own spots */
  g_autofree EnlSpot *own = g_new0 (EnlSpot, sketch->n_atoms + 1);
  uint32_t n = MIN (ENL_SOLID_VIEWS, directions);

  look.spot = own;
  for (uint32_t k = 0; k < directions; k++) { /* an even spiral over the half sphere */
    view[k].height = 1 - (k + 0.5) / directions;
    view[k].turn = k * G_PI * (3 - sqrt (5));
    project (sketch, body, view[k].height, view[k].turn, own);
    view[k].cost = enl_strain_crowding (&look) + enl_strain_stretch (&look);
  }
  qsort (view, directions, sizeof *view, compare_views);
  for (uint32_t k = 0; k < n; k++)
    project (sketch, body, view[k].height, view[k].turn, spot + k * sketch->n_atoms);
  return n;
}
