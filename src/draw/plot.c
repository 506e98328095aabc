#include "draw/plot.h"

#include <math.h>

#include "draw/plane.h"
#include "draw/text.h"

#define MARK 3.4 /* radius of a mark, px */
#define TICK 4.0
#define LINE 1.0

static double
share (const EnlPlot *plot, double value, double low, double high)
{
  double u = CLAMP ((value - low) / (high - low), 0, 1);

  return plot->root ? sqrt (u) : u;
}

EnlPoint
enl_plot_place (const EnlPlot *plot, double x, double y)
{
  double u = share (plot, x, plot->x_low, plot->x_high);
  double v = share (plot, y, plot->y_low, plot->y_high);

  return (EnlPoint){plot->area.x + u * plot->area.width,
                    plot->area.y + (1 - v) * plot->area.height};
}

double
enl_plot_head (const EnlTheme *theme)
{
  return enl_text_line_height (theme->family, theme->text_size) +
         enl_text_line_height (theme->family, theme->small_size) + 10;
}

double
enl_plot_foot (const EnlTheme *theme)
{
  return 2 * enl_text_line_height (theme->family, theme->small_size) + TICK + 8;
}

static void
draw_number (EnlScene *scene, EnlPoint at, double value, int decimals, double align_x,
             double align_y)
{
  double shown = fabs (value) < 1e-9 ? 0 : value;
  char number[G_ASCII_DTOSTR_BUF_SIZE];

  g_ascii_formatd (number, sizeof number, decimals ? "%.1f" : "%.0f", fabs (shown));
  g_autofree char *text = g_strconcat (shown < 0 ? "\u2212" : "", number, NULL);
  enl_scene_text (scene, at, text, enl_scene_theme (scene)->small_size, false, align_x, align_y,
                  ENL_TONE_MUTED);
}

/* The k-th tick at or above `low`. */
static double
tick (const EnlPlot *plot, double low, double step, int k)
{
  if (plot->root)
    return k * step * k * step;
  return step * (ceil (low / step - 1e-9) + k);
}

static void
draw_ticks (EnlScene *scene, const EnlPlot *plot, const EnlPlotWords *words)
{
  double bottom = plot->area.y + plot->area.height, value;

  for (int k = 0; (value = tick (plot, plot->x_low, words->x_step, k)) <= plot->x_high + 1e-9;
       k++) {
    EnlPoint at = enl_plot_place (plot, value, plot->y_low);
    enl_scene_line (scene, at, (EnlPoint){at.x, bottom + TICK}, LINE, ENL_TONE_MUTED);
    draw_number (scene, (EnlPoint){at.x, bottom + TICK + 1},
                 words->x_decimals ? value : value * words->factor, words->x_decimals, 0.5, 0);
  }
  for (int k = 0; (value = tick (plot, plot->y_low, words->y_step, k)) <= plot->y_high + 1e-9;
       k++) {
    EnlPoint at = enl_plot_place (plot, plot->x_low, value);
    enl_scene_line (scene, at, (EnlPoint){at.x - TICK, at.y}, LINE, ENL_TONE_MUTED);
    draw_number (scene, (EnlPoint){at.x - TICK - 3, at.y}, value * words->factor, 0, 1, 0.5);
  }
}

void
enl_plot_axes (EnlScene *scene, const EnlPlot *plot, const EnlPlotWords *words)
{
  const EnlTheme *theme = enl_scene_theme (scene);
  const EnlRect *a = &plot->area;
  double small = enl_text_line_height (theme->family, theme->small_size);
  double foot = a->y + a->height + TICK + small + 3;

  enl_scene_rect (scene, *a, 0, ENL_TONE_PANEL);
  enl_scene_rect (scene, *a, 0, ENL_TONE_MUTED)->width = LINE;
  draw_ticks (scene, plot, words);
  enl_scene_text (scene, (EnlPoint){a->x, a->y - small - 10}, words->title, theme->text_size, true,
                  0, 1, ENL_TONE_INK);
  enl_scene_text (scene, (EnlPoint){a->x, a->y - 8}, words->y_title, theme->small_size, false, 0, 1,
                  ENL_TONE_MUTED);
  enl_scene_text (scene, (EnlPoint){a->x + a->width, foot}, words->x_title, theme->small_size,
                  false, 1, 0, ENL_TONE_MUTED);
}

EnlShape *
enl_plot_diagonal (EnlScene *scene, const EnlPlot *plot, double offset)
{
  double from = fmax (plot->x_low, plot->y_low - offset);
  double to = fmin (plot->x_high, plot->y_high - offset);

  if (from >= to)
    return NULL;
  return enl_scene_line (scene, enl_plot_place (plot, from, from + offset),
                         enl_plot_place (plot, to, to + offset), LINE, ENL_TONE_MUTED);
}

/* Farther than this from the straight line a point is kept, px. */
#define BEND 0.12

/* Marks what has to stay between two kept points (Douglas & Peucker, Cartographica 1973, 10, 112).
 */
static void
keep_bends (const EnlPoint *point, bool *kept, uint32_t from, uint32_t to)
{
  double most = BEND;
  uint32_t at = from;

  for (uint32_t i = from + 1; i < to; i++) {
    double off = enl_segment_distance (point[from], point[to], point[i]);
    if (off > most)
      most = off, at = i;
  }
  if (at == from)
    return;
  kept[at] = true;
  keep_bends (point, kept, from, at);
  keep_bends (point, kept, at, to);
}

EnlShape *
enl_plot_path (EnlScene *scene, const EnlPlot *plot, const double *x, const double *y, uint32_t n,
               double width, EnlTone tone)
{
  g_autofree EnlPoint *point = g_new (EnlPoint, n);
  g_autofree bool *kept = g_new0 (bool, n);
  uint32_t count = 0;

  g_assert (n >= 2);
  for (uint32_t i = 0; i < n; i++)
    point[i] = enl_plot_place (plot, x[i], y[i]);
  kept[0] = kept[n - 1] = true;
  keep_bends (point, kept, 0, n - 1);
  for (uint32_t i = 0; i < n; i++)
    if (kept[i])
      point[count++] = point[i];
  return enl_scene_path (scene, point, count, width, tone);
}

EnlShape *
enl_plot_mark (EnlScene *scene, EnlPoint at, const EnlPlotMark *mark)
{
  const double r = MARK, h = 1.25 * MARK;
  EnlShape *ring;

  switch (mark->shape) {
  case ENL_MARK_RING:
    ring = enl_scene_disc (scene, at, r - 0.6, mark->tone);
    ring->width = 1.2;
    return ring;
  case ENL_MARK_SQUARE:
    return enl_scene_rect (scene, (EnlRect){at.x - 0.85 * r, at.y - 0.85 * r, 1.7 * r, 1.7 * r}, 0,
                           mark->tone);
  case ENL_MARK_TRIANGLE:
    return enl_scene_polygon (
        scene,
        (EnlPoint[]){{at.x, at.y - h}, {at.x + h, at.y + 0.8 * h}, {at.x - h, at.y + 0.8 * h}}, 3,
        mark->tone);
  case ENL_MARK_DIAMOND:
    return enl_scene_polygon (
        scene, (EnlPoint[]){{at.x, at.y - h}, {at.x + h, at.y}, {at.x, at.y + h}, {at.x - h, at.y}},
        4, mark->tone);
  case ENL_MARK_DISC:
  default:
    return enl_scene_disc (scene, at, r, mark->tone);
  }
}
