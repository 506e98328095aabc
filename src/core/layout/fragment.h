/* One connected fragment: from a graph in canonical order to a picture. */
#pragma once

#include "core/layout/template.h"

/* Fills the spots: bond length 1, y up, upright. Cannot fail: where CoordGen gives up our own
 * assembly takes over. */
void enl_fragment_draw (EnlSketch *sketch, const EnlTemplates *templates);
