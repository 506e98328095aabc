#include "draw/plane.h"

#include <math.h>

double
enl_point_distance (EnlPoint a, EnlPoint b)
{
  return hypot (b.x - a.x, b.y - a.y);
}

EnlPoint
enl_point_direction (EnlPoint a, EnlPoint b)
{
  double length = enl_point_distance (a, b);

  if (length < 1e-9)
    return (EnlPoint){1, 0};
  return (EnlPoint){(b.x - a.x) / length, (b.y - a.y) / length};
}

EnlPoint
enl_point_polar (double angle)
{
  return (EnlPoint){cos (angle), -sin (angle)};
}

double
enl_point_angle (EnlPoint a, EnlPoint b)
{
  return atan2 (a.y - b.y, b.x - a.x);
}

EnlPoint
enl_point_left (EnlPoint direction)
{
  return (EnlPoint){direction.y, -direction.x};
}

double
enl_angle_between (double a, double b)
{
  double d = fabs (remainder (a - b, 2 * G_PI));

  return d;
}

double
enl_segment_distance (EnlPoint a, EnlPoint b, EnlPoint p)
{
  double dx = b.x - a.x, dy = b.y - a.y, square = dx * dx + dy * dy;
  double t = square > 0 ? ((p.x - a.x) * dx + (p.y - a.y) * dy) / square : 0;

  t = CLAMP (t, 0, 1);
  return hypot (a.x + t * dx - p.x, a.y + t * dy - p.y);
}

static double
turn (EnlPoint a, EnlPoint b, EnlPoint c)
{
  return (b.x - a.x) * (c.y - a.y) - (b.y - a.y) * (c.x - a.x);
}

bool
enl_lines_cross (EnlPoint a, EnlPoint b, EnlPoint c, EnlPoint d)
{
  return turn (a, b, c) * turn (a, b, d) < 0 && turn (c, d, a) * turn (c, d, b) < 0;
}

/* Clipping after Liang and Barsky, ACM Trans. Graph. 1984, 3, 1. */
double
enl_segment_inside (EnlPoint a, EnlPoint b, EnlRect rect)
{
  double dx = b.x - a.x, dy = b.y - a.y, low = 0, high = 1;
  const double p[4] = {-dx, dx, -dy, dy};
  const double q[4] = {a.x - rect.x, rect.x + rect.width - a.x, a.y - rect.y,
                       rect.y + rect.height - a.y};

  for (int i = 0; i < 4; i++) {
    if (p[i] == 0) {
      if (q[i] < 0)
        return 0;
    } else if (p[i] < 0) {
      low = fmax (low, q[i] / p[i]);
    } else {
      high = fmin (high, q[i] / p[i]);
    }
  }
  return high > low ? (high - low) * hypot (dx, dy) : 0;
}

EnlPoint
enl_curve_at (const EnlPoint point[4], double t)
{
  double u = 1 - t;
  const double w[4] = {u * u * u, 3 * u * u * t, 3 * u * t * t, t * t * t};
  EnlPoint at = {0};

  for (int i = 0; i < 4; i++)
    at = enl_point_add (at, point[i], w[i]);
  return at;
}

EnlRect
enl_rect_grow (EnlRect rect, double by)
{
  return (EnlRect){rect.x - by, rect.y - by, rect.width + 2 * by, rect.height + 2 * by};
}

EnlRect
enl_rect_union (EnlRect a, EnlRect b)
{
  double x0 = fmin (a.x, b.x), y0 = fmin (a.y, b.y);
  double x1 = fmax (a.x + a.width, b.x + b.width), y1 = fmax (a.y + a.height, b.y + b.height);

  return (EnlRect){x0, y0, x1 - x0, y1 - y0};
}

EnlPoint
enl_rect_centre (EnlRect rect)
{
  return (EnlPoint){rect.x + rect.width / 2, rect.y + rect.height / 2};
}

double
enl_rect_overlap (EnlRect a, EnlRect b)
{
  double w = fmin (a.x + a.width, b.x + b.width) - fmax (a.x, b.x);
  double h = fmin (a.y + a.height, b.y + b.height) - fmax (a.y, b.y);

  return w > 0 && h > 0 ? w * h : 0;
}

double
enl_rect_distance (EnlRect rect, EnlPoint p)
{
  double dx = fmax (fmax (rect.x - p.x, p.x - rect.x - rect.width), 0);
  double dy = fmax (fmax (rect.y - p.y, p.y - rect.y - rect.height), 0);

  return hypot (dx, dy);
}
