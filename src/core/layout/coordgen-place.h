/* CoordGen on a sketch. */
#pragma once

#include "core/layout/sketch.h"

/* False for what CoordGen would need too long for: large structures, wide macrocycles. */
bool enl_coordgen_can_draw (const EnlSketch *sketch);

/* Fills the spots; atoms with held[atom] true keep theirs up to a common shift or turn (NULL:
 * none). False, with spots unchanged, when CoordGen gives up or
 * cannot be asked. */
bool enl_coordgen_draw (EnlSketch *sketch, const bool *held) ENL_MUST_USE;
