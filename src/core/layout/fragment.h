/* One connected fragment: from a graph in canonical order to a picture. */
#pragma once

#include "core/layout/sketch.h"

/* Fills the spots: bond length 1, y up. ENL_ERROR_NUMERIC when no usable picture was found. */
EnlStatus enl_fragment_place (EnlSketch *sketch, EnlError *err) ENL_MUST_USE;
