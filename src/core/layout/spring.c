#include "core/layout/spring.h"

#include <math.h>

#include "core/layout/geometry.h"
#include "core/layout/relax.h"

static const uint32_t power_rounds = 100, stress_rounds = 80;

/* Bond lengths after evening out. */
static const double short_bond = 0.85, long_bond = 1.15;

static bool
is_single_ring (const EnlSketch *s)
{
  for (uint32_t i = 0; i < s->n_atoms; i++)
    if (enl_sketch_degree (s, i) != 2)
      return false;
  return s->n_atoms > 2;
}

static void
draw_polygon (EnlSketch *s)
{
  double radius = 0.5 / sin (G_PI / s->n_atoms);
  uint32_t at = 0, before = ENL_NONE;

  for (uint32_t k = 0; k < s->n_atoms; k++) {
    double angle = G_PI / 2 + 2 * G_PI * k / s->n_atoms;
    s->spot[at] = (EnlSpot){radius * cos (angle), radius * sin (angle)};
    uint32_t next = s->neighbour[s->first[at]];
    next = next == before ? s->neighbour[s->first[at] + 1] : next;
    before = at;
    at = next;
  }
}

/* Bonds between all pairs, row by row. */
static double *
all_distances (const EnlSketch *s)
{
  uint32_t n = s->n_atoms;
  double *distance = g_new (double, (size_t)n *n);
  g_autofree uint32_t *queue = g_new (uint32_t, n + 1);

  for (uint32_t i = 0; i < n; i++) {
    double *row = distance + (size_t)i * n;
    uint32_t length = 0;
    for (uint32_t j = 0; j < n; j++)
      row[j] = -1;
    row[i] = 0;
    queue[length++] = i;
    for (uint32_t done = 0; done < length; done++)
      for (uint32_t k = s->first[queue[done]]; k < s->first[queue[done] + 1]; k++)
        if (row[s->neighbour[k]] < 0) {
          row[s->neighbour[k]] = row[queue[done]] + 1;
          queue[length++] = s->neighbour[k];
        }
  }
  return distance;
}

/* Doubly centred squared distances: the matrix of classical scaling (Torgerson 1952). */
static double *
centred_squares (const double *distance, uint32_t n)
{
  double *b = g_new (double, (size_t)n *n);
  g_autofree double *mean = g_new0 (double, n + 1);
  double all = 0;

  for (uint32_t i = 0; i < n; i++) {
    for (uint32_t j = 0; j < n; j++)
      mean[i] += distance[(size_t)i * n + j] * distance[(size_t)i * n + j] / n;
    all += mean[i] / n;
  }
  for (uint32_t i = 0; i < n; i++)
    for (uint32_t j = 0; j < n; j++) {
      double square = distance[(size_t)i * n + j] * distance[(size_t)i * n + j];
      b[(size_t)i * n + j] = -0.5 * (square - mean[i] - mean[j] + all);
    }
  return b;
}

static void
normalise (double *v, uint32_t n)
{
  double sum = 0;

  for (uint32_t i = 0; i < n; i++)
    sum += v[i] * v[i];
  for (uint32_t i = 0; i < n; i++)
    v[i] /= sqrt (sum) + 1e-12;
}

/* Leading eigenvector of b orthogonal to `other` (NULL: none) by the power method; returns the
 * square root of its eigenvalue. */
static double
leading_vector (const double *b, uint32_t n, const double *other, double *v)
{
  g_autofree double *next = g_new (double, n + 1);
  double value = 0;

  for (uint32_t i = 0; i < n; i++)
    v[i] = sin (1.0 + 1.7 * i); /* no symmetry of its own */
  for (uint32_t k = 0; k < power_rounds; k++) {
    double along = 0;
    for (uint32_t i = 0; other && i < n; i++)
      along += other[i] * v[i];
    for (uint32_t i = 0; other && i < n; i++)
      v[i] -= along * other[i];
    normalise (v, n);
    for (uint32_t i = 0; i < n; i++) {
      next[i] = 0;
      for (uint32_t j = 0; j < n; j++)
        next[i] += b[(size_t)i * n + j] * v[j];
    }
    value = 0;
    for (uint32_t i = 0; i < n; i++)
      value += v[i] * next[i];
    for (uint32_t i = 0; i < n; i++)
      v[i] = next[i];
  }
  normalise (v, n);
  return sqrt (fmax (value, 0));
}

static void
start_by_scaling (EnlSketch *s, const double *distance)
{
  uint32_t n = s->n_atoms;
  g_autofree double *b = centred_squares (distance, n);
  g_autofree double *u = g_new (double, 2 * n + 1);
  double *v = u + n;
  double scale_u = leading_vector (b, n, NULL, u), scale_v = leading_vector (b, n, u, v);

  for (uint32_t i = 0; i < n; i++)
    s->spot[i] = (EnlSpot){scale_u * u[i], scale_v * v[i]};
}

/* Moves each atom to where all the others together want it. */
static void
majorise (EnlSketch *s, const double *distance)
{
  uint32_t n = s->n_atoms;

  for (uint32_t k = 0; k < stress_rounds; k++)
    for (uint32_t i = 0; i < n; i++) {
      EnlSpot sum = {0, 0};
      double weights = 0;
      for (uint32_t j = 0; j < n; j++) {
        if (j == i)
          continue;
        double want = distance[(size_t)i * n + j], weight = 1 / (want * want);
        EnlSpot out = enl_spot_minus (s->spot[i], s->spot[j]);
        double f = want / (enl_spot_length (out) + 1e-9);
        sum.x += weight * (s->spot[j].x + f * out.x);
        sum.y += weight * (s->spot[j].y + f * out.y);
        weights += weight;
      }
      s->spot[i] = (EnlSpot){sum.x / weights, sum.y / weights};
    }
}

void
enl_spring_draw (EnlSketch *sketch)
{
  if (is_single_ring (sketch)) {
    draw_polygon (sketch);
    return;
  }
  if (sketch->n_atoms < 2)
    return;
  g_autofree double *distance = all_distances (sketch);
  start_by_scaling (sketch, distance);
  majorise (sketch, distance);
  enl_relax (sketch, short_bond, long_bond, false);
}
