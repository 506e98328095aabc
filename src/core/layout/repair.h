/* Clearing overlaps: branches are mirrored, turned or exchanged about single bonds, then atoms
 * shifted a little. Only what makes the picture better is kept; ring blocks stay rigid. */
#pragma once

#include "core/layout/sketch.h"

/* Mirrors branches until every double bond outside rings is drawn on its side. */
void enl_repair_sides (EnlSketch *sketch);

/* Needs blocks (blocks.h). With `even`, bonds are evened out at the end, which would spoil the
 * foreshortened bonds of a template. The work is bounded and counted, not timed: the same picture
 * on every machine. */
void enl_repair_crowding (EnlSketch *sketch, bool even);
