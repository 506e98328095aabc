#include "core/layout/geometry.h"

#include <math.h>
#include <stdlib.h>

double
enl_spot_length (EnlSpot a)
{
  return hypot (a.x, a.y);
}

double
enl_spot_distance (EnlSpot a, EnlSpot b)
{
  return hypot (a.x - b.x, a.y - b.y);
}

double
enl_spot_to_segment (EnlSpot p, EnlSpot a, EnlSpot b)
{
  EnlSpot along = enl_spot_minus (b, a), out = enl_spot_minus (p, a);
  double square = enl_spot_dot (along, along);
  double t = square > 0 ? enl_spot_dot (out, along) / square : 0;

  t = CLAMP (t, 0.0, 1.0);
  return hypot (out.x - t * along.x, out.y - t * along.y);
}

bool
enl_segments_cross (EnlSpot a, EnlSpot b, EnlSpot c, EnlSpot d)
{
  EnlSpot ab = enl_spot_minus (b, a), cd = enl_spot_minus (d, c);
  double c_side = enl_spot_cross (ab, enl_spot_minus (c, a));
  double d_side = enl_spot_cross (ab, enl_spot_minus (d, a));
  double a_side = enl_spot_cross (cd, enl_spot_minus (a, c));
  double b_side = enl_spot_cross (cd, enl_spot_minus (b, c));

  return c_side * d_side < 0 && a_side * b_side < 0;
}

EnlSpot
enl_spot_turned (EnlSpot p, EnlSpot centre, double angle)
{
  double c = cos (angle), s = sin (angle);
  EnlSpot out = enl_spot_minus (p, centre);

  return (EnlSpot){centre.x + c * out.x - s * out.y, centre.y + s * out.x + c * out.y};
}

EnlSpot
enl_spot_mirrored (EnlSpot p, EnlSpot a, EnlSpot b)
{
  EnlSpot along = enl_spot_minus (b, a), out = enl_spot_minus (p, a);
  double t = enl_spot_dot (out, along) / enl_spot_dot (along, along);

  return (EnlSpot){a.x + 2 * t * along.x - out.x, a.y + 2 * t * along.y - out.y};
}

static int
compare_angles (const void *a, const void *b)
{
  double p = *(const double *)a, q = *(const double *)b;
  return (p > q) - (p < q);
}

void
enl_widest_gap (double *angle, uint32_t n, double *start, double *width)
{
  /* Equal gaps must not be told apart by rounding. */
  const double tie = 1e-6;

  *start = 0;
  *width = 2 * G_PI;
  if (n == 0)
    return;
  for (uint32_t i = 0; i < n; i++) {
    angle[i] = fmod (angle[i], 2 * G_PI);
    if (angle[i] < -tie)
      angle[i] += 2 * G_PI;
  }
  qsort (angle, n, sizeof *angle, compare_angles);
  *width = -1;
  for (uint32_t i = 0; i < n; i++) {
    double next = i + 1 < n ? angle[i + 1] : angle[0] + 2 * G_PI;
    if (next - angle[i] > *width + tie) {
      *start = angle[i];
      *width = next - angle[i];
    }
  }
}

void
enl_spread_directions (double *taken, uint32_t n_taken, double *made, uint32_t n)
{
  double start, width;

  enl_widest_gap (taken, n_taken, &start, &width);
  if (n_taken == 0) {
    double step = n == 2 ? 2 * G_PI / 3 : 2 * G_PI / MAX (n, 1);
    double from = n == 2 ? -G_PI / 6 - step : 0;
    for (uint32_t i = 0; i < n; i++)
      made[i] = from + step * i;
    return;
  }
  if (n_taken == 1 && n == 1) {
    made[0] = start + 2 * G_PI / 3;
    return;
  }
  for (uint32_t i = 0; i < n; i++)
    made[i] = start + width * (i + 1) / (n + 1);
}
