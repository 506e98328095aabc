/* Our own picture of a whole fragment, ring block by ring block and bond by bond: for structures
 * too large for CoordGen. */
#pragma once

#include "core/layout/template.h"

/* Fills the spots; needs blocks (blocks.h). */
void enl_assemble (EnlSketch *sketch, const EnlTemplates *templates);
