/* The composition curve as a picture: the share of every species against the equivalents of one
 * base, with the chosen equivalents marked. */
#pragma once

#include "core/bases/curve.h"
#include "draw/scene.h"

typedef struct {
  const EnlCurve *curve; /* borrowed while the scene is made */
  const char *substrate; /* name, plain text */
  const char *base;      /* name, plain text */
  const EnlConditions *conditions;
  const char *footing;  /* what the numbers stand for; NULL: not told */
  double width, height; /* wanted, px; 0: natural. Where this is too low the head is left out, and
                           the scene is larger where its texts need room even so */
} EnlCurveSheet;

/* Every line has a tone, a pattern and a mark of its own and its label at its end; shapes of a line
 * carry `atom` = its number in the curve. */
EnlScene *enl_curve_scene (const EnlCurveSheet *sheet, const EnlTheme *theme) ENL_MUST_USE;
