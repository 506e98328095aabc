/* Small shifts of atoms that clear crowded places and even out bonds. */
#pragma once

#include "core/layout/sketch.h"

/* Moves atoms in many small steps until bonds are between `shortest` and `longest` and nothing
 * crowds, as far as that goes. Bond angles keep near to what they were when `stiff`. Deterministic;
 * the result may be worse: compare. */
void enl_relax (EnlSketch *sketch, double shortest, double longest, bool stiff);
