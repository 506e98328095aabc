#include "draw/whisker.h"

#include <math.h>

#include "draw/badge.h"
#include "draw/paint.h"

#define GRID       5.0  /* pK units between ticks */
#define FAR        10.0 /* pK units of an interval shown beyond the outermost value */
#define MARK       0.46 /* radius of the mark, badge radii */
#define BAR        0.40 /* height of the bar, badge radii */
#define BAR_ALPHA  0.45
#define RULE_ALPHA 0.40
#define LONG_AXIS  8 /* ticks; with more every second one has a number */

void
enl_whisker_range (const EnlEstimate *estimate, uint32_t n, double *low, double *high)
{
  double first = INFINITY, last = -INFINITY, left = INFINITY, right = -INFINITY;

  for (uint32_t i = 0; i < n; i++) {
    first = fmin (first, estimate[i].value);
    last = fmax (last, estimate[i].value);
    left = fmin (left, estimate[i].low);
    right = fmax (right, estimate[i].high);
  }
  if (n == 0)
    return;
  left = fmin (first, fmax (left, first - FAR));
  right = fmax (last, fmin (right, last + FAR));
  left = GRID * floor (left / GRID);
  right = GRID * ceil (right / GRID);
  if (right <= left)
    right = left + GRID;
  *low = *low > *high ? left : fmin (*low, left);
  *high = fmax (*high, right);
}

static double
position (EnlRect area, double value, double low, double high)
{
  return area.x + (value - low) / (high - low) * area.width;
}

/* A head that says: the bar goes on. */
static void
draw_overflow (EnlScene *scene, double x, double y, double way, EnlTone tone)
{
  double r = 0.45 * enl_scene_theme (scene)->badge_radius;
  const EnlPoint corner[3] = {{x, y}, {x - way * r, y - 0.7 * r}, {x - way * r, y + 0.7 * r}};

  enl_scene_polygon (scene, corner, 3, tone);
}

static void
draw_bar (EnlScene *scene, EnlRect area, const EnlEstimate *e, double low, double high,
          EnlTone tone)
{
  double r = enl_scene_theme (scene)->badge_radius, y = area.y + area.height / 2;
  double from = position (area, fmax (e->low, low), low, high);
  double to = position (area, fmin (e->high, high), low, high);

  if (to - from < 1)
    return;
  enl_scene_rect (scene, (EnlRect){from, y - BAR * r / 2, to - from, BAR * r}, BAR * r / 2, tone)
      ->opacity = BAR_ALPHA;
  if (e->low < low)
    draw_overflow (scene, area.x, y, -1, tone);
  if (e->high > high)
    draw_overflow (scene, area.x + area.width, y, 1, tone);
}

void
enl_whisker_mark_draw (EnlScene *scene, EnlPoint at, EnlBasis basis, EnlTone tone)
{
  double r = MARK * enl_scene_theme (scene)->badge_radius, line = 0.34 * r;

  switch (basis) {
  case ENL_BASIS_LAB:
    enl_scene_rect (scene, (EnlRect){at.x - r, at.y - r, 2 * r, 2 * r}, 0.2 * r, tone);
    break;
  case ENL_BASIS_ESTIMATED:
    enl_scene_disc (scene, at, r - line / 2, ENL_TONE_GROUND);
    enl_scene_disc (scene, at, r - line / 2, tone)->width = line;
    break;
  case ENL_BASIS_MEASURED:
  case ENL_N_BASES_OF_VALUE:
    enl_scene_disc (scene, at, r, tone);
    break;
  }
}

void
enl_whisker_draw (EnlScene *scene, EnlRect area, const EnlEstimate *estimate, double low,
                  double high, bool selected)
{
  EnlTone tone = selected ? ENL_TONE_ACTIVE : ENL_TONE_SITE;
  double y = area.y + area.height / 2, inset = MARK * enl_scene_theme (scene)->badge_radius;
  EnlRect inner = {area.x + inset, area.y, area.width - 2 * inset, area.height};

  g_assert (high > low && inner.width > 0);
  enl_scene_line (scene, (EnlPoint){inner.x, y}, (EnlPoint){inner.x + inner.width, y}, 1,
                  ENL_TONE_MUTED)
      ->opacity = RULE_ALPHA;
  draw_bar (scene, inner, estimate, low, high, tone);
  double value = CLAMP (estimate->value, low, high);
  enl_whisker_mark_draw (scene, (EnlPoint){position (inner, value, low, high), y}, estimate->basis,
                         tone);
}

void
enl_whisker_axis_draw (EnlScene *scene, EnlRect area, double low, double high)
{
  const EnlTheme *theme = enl_scene_theme (scene);
  double inset = MARK * theme->badge_radius, tick = 0.4 * theme->badge_radius;
  EnlRect inner = {area.x + inset, area.y, area.width - 2 * inset, area.height};
  int n = (int)lround ((high - low) / GRID), every = 1 + n / LONG_AXIS;

  enl_scene_line (scene, (EnlPoint){inner.x, area.y}, (EnlPoint){inner.x + inner.width, area.y}, 1,
                  ENL_TONE_MUTED);
  for (int i = 0; i <= n; i++) {
    double x = position (inner, low + i * GRID, low, high);
    enl_scene_line (scene, (EnlPoint){x, area.y}, (EnlPoint){x, area.y + tick}, 1, ENL_TONE_MUTED);
    if (i % every)
      continue;
    g_autofree char *number = g_strdup_printf ("%s%d", low + i * GRID < 0 ? "\u2212" : "",
                                               abs ((int)lround (low + i * GRID)));
    enl_scene_text (scene, (EnlPoint){x, area.y + tick + 1}, number, theme->small_size, false, 0.5,
                    0, ENL_TONE_MUTED);
  }
}

EnlScene *
enl_whisker_scene (const EnlEstimate *estimate, double low, double high, double width,
                   double height, bool selected, const EnlTheme *theme)
{
  EnlScene *scene = enl_scene_new (theme);

  enl_scene_set_size (scene, width, height);
  enl_whisker_draw (scene, (EnlRect){0, 0, width, height}, estimate, low, high, selected);
  return scene;
}
