/* Where the neighbours of a ring block go. */
#pragma once

#include "core/layout/sketch.h"

/* Places each group of atoms that hangs on one core atom: part is a ring block (core[atom] true,
 * already placed) with its direct outer neighbours, which get bonds of length 1 in the directions
 * with the most room. Neighbours come in the order of the atoms. */
void enl_stubs_place (EnlSketch *part, const bool *core);
