/* A plot with two number axes: frame, ticks, guides, marks and curves. */
#pragma once

#include "draw/scene.h"

typedef struct {
  EnlRect area; /* inside the axes, px */
  double x_low, x_high, y_low, y_high;
  bool root; /* distances go by the square root: numbers start at 0, ticks are squares */
} EnlPlot;

typedef enum {
  ENL_MARK_DISC,
  ENL_MARK_RING,
  ENL_MARK_SQUARE,
  ENL_MARK_TRIANGLE,
  ENL_MARK_DIAMOND
} EnlMarkShape;

typedef struct {
  EnlMarkShape shape;
  EnlTone tone;
} EnlPlotMark;

typedef struct {
  const char *title, *x_title, *y_title; /* plain text; the y title stands above the axis */
  double x_step, y_step;                 /* between ticks with numbers; their roots if so */
  double factor;                         /* a number shows its value times this (100: per cent) */
  int x_decimals; /* of the numbers on the x axis, which go without the factor if above 0 */
} EnlPlotWords;

/* Place of a pair of numbers; values outside the axes are moved to their edge. */
EnlPoint enl_plot_place (const EnlPlot *plot, double x, double y);

/* Frame, ticks, numbers and titles. The titles stand above the area, the x title below it. */
void enl_plot_axes (EnlScene *scene, const EnlPlot *plot, const EnlPlotWords *words);
/* Height that enl_plot_axes takes above and below the area. */
double enl_plot_head (const EnlTheme *theme);
double enl_plot_foot (const EnlTheme *theme);

/* The line y = x + offset inside the axes, thin; the caller sets tone and dash. NULL when it does
 * not meet them. */
EnlShape *enl_plot_diagonal (EnlScene *scene, const EnlPlot *plot, double offset);

/* A line through n pairs of numbers, points that a line through their neighbours passes left out.
 */
EnlShape *enl_plot_path (EnlScene *scene, const EnlPlot *plot, const double *x, const double *y,
                         uint32_t n, double width, EnlTone tone);

/* One shape for each mark. */
EnlShape *enl_plot_mark (EnlScene *scene, EnlPoint at, const EnlPlotMark *mark);
