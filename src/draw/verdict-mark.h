/* The shape that says a verdict without colour: a disc filled as far as the anion forms, and signs
 * of their own for what has no share. */
#pragma once

#include "core/bases/compare.h"
#include "draw/scene.h"

EnlTone enl_verdict_tone (EnlVerdict verdict);
/* Around `centre` within `radius`. */
void enl_verdict_mark_draw (EnlScene *scene, EnlPoint centre, double radius, EnlVerdict verdict);
/* The triangle of a caution. */
void enl_caution_mark_draw (EnlScene *scene, EnlPoint centre, double radius);
