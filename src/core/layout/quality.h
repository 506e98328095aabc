/* Measuring a picture: what hides, what crosses, how even the bonds are. */
#pragma once

#include "core/layout/geometry.h"
#include "core/layout/layout.h"

typedef struct {
  uint32_t n_atoms, n_bonds;
  const EnlSpot *spot;
  const uint32_t (*end)[2];
} EnlPicture;

/* As enl_layout_quality; lengths are INFINITY or 0 where there is no pair or bond. */
EnlLayoutQuality enl_picture_quality (const EnlPicture *picture);
