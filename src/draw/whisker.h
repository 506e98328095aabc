/* A pKa on an axis: the value as a mark, its 90 % interval as a bar.
 *
 * Marks repeat the badge's shapes: solid disc measured, outlined disc estimated, square lab value.
 * A bar that leaves the axis ends in an arrow head.
 */
#pragma once

#include "core/acidity/estimate.h"
#include "draw/scene.h"

/* Widens low..high (pKa) to whole fives that hold every value and, up to 10 units beyond the
 * outermost value, every interval. Start with low > high for an empty range. */
void enl_whisker_range (const EnlEstimate *estimate, uint32_t n, double *low, double *high);

/* Draws into `area`, middle line at half height. */
void enl_whisker_draw (EnlScene *scene, EnlRect area, const EnlEstimate *estimate, double low,
                       double high, bool selected);
/* The mark of a value alone. */
void enl_whisker_mark_draw (EnlScene *scene, EnlPoint at, EnlBasis basis, EnlTone tone);
/* Axis line at the top of `area` with ticks and numbers below it. */
void enl_whisker_axis_draw (EnlScene *scene, EnlRect area, double low, double high);

/* One whisker of the given size in px as a scene of its own, for a row of a list. */
EnlScene *enl_whisker_scene (const EnlEstimate *estimate, double low, double high, double width,
                             double height, bool selected, const EnlTheme *theme) ENL_MUST_USE;
