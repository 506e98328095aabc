/* Turning a picture upright. */
#pragma once

#include "core/layout/sketch.h"

/* Turns the picture after IUPAC's recommendations on graphical representation (Pure Appl. Chem.
 * 2008, 80, 277, GR-3.2 to GR-3.4): long axis horizontal, as many bonds as possible at multiples of
 * 30 degrees from the vertical, then carbonyls upright. Angles do not change. */
void enl_orient (EnlSketch *sketch);
