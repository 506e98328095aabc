/* How bad a picture is, as one number: what hides, what crosses, what is stretched. Zero is a
 * picture without fault; a hidden atom costs about ten, a crossing about five. */
#pragma once

#include "core/layout/sketch.h"

/* Cost of what stands too near or crosses, over all atoms and bonds. */
double enl_strain_crowding (const EnlSketch *sketch);

/* The part of it between the atoms with inside[atom] true and the others: what changes when the
 * inner part is moved as a whole. */
double enl_strain_between (const EnlSketch *sketch, const bool *inside);

/* Cost of bonds away from length 1. */
double enl_strain_stretch (const EnlSketch *sketch);

/* A pair of atoms that stand in each other's way (ends of bonds that cross, an atom and an end of
 * the bond that it hides). */
typedef struct {
  uint32_t a, b;
  double cost;
} EnlClash;

/* The clashes of a picture, worst first; new array (g_free). */
EnlClash *enl_strain_clashes (const EnlSketch *sketch, uint32_t *n) ENL_MUST_USE;
