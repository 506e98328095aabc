/* An effect on a pKa as a bar from a middle line: to the left what makes the hydrogen more acidic,
 * to the right what makes it less so. The bar ends in an arrow head, so that its direction can be
 * seen without the line; an effect of less than 0.05 is a dot on the line. */
#pragma once

#include "draw/scene.h"

/* `most` (> 0, pK units) reaches the edge of the picture of the given size in px. */
EnlScene *enl_effect_bar_scene (double effect, double most, double width, double height,
                                const EnlTheme *theme) ENL_MUST_USE;
