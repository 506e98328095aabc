/* CoordGen on a sketch. */
#pragma once

#include "core/layout/sketch.h"

/* Fills the spots; atoms with held[atom] true keep theirs up to a common shift or turn (NULL:
 * none). False, with spots unchanged, when CoordGen gives up. */
bool enl_coordgen_draw (EnlSketch *sketch, const bool *held) ENL_MUST_USE;
