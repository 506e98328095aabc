/* A plain picture of any graph: distances on paper follow distances along bonds. */
#pragma once

#include "core/layout/sketch.h"

/* Fills the spots of a connected sketch. A single ring becomes a regular polygon. Otherwise stress
 * majorisation (Gansner, Koren and North, Graph Drawing 2004) from a classical scaling start, then
 * bonds evened out. */
void enl_spring_draw (EnlSketch *sketch);
