/* Cages without a drawn template: build the ring block in space and look at it from the side that
 * hides least. */
#pragma once

#include "core/layout/sketch.h"

#define ENL_SOLID_VIEWS 6

/* Writes up to ENL_SOLID_VIEWS different pictures of the sketch (n_atoms spots each, one after the
 * other, best first) into `spot`; returns how many. Mean bond length 1. */
uint32_t enl_solid_views (const EnlSketch *sketch, EnlSpot *spot);
