/* Curved arrows for moves of electron pairs (IUPAC Glossary of terms used in physical organic
 * chemistry, 2022: "curly arrows"; double barb for a pair). */
#pragma once

#include "core/acidity/form.h"
#include "draw/outline.h"

/* Centre of the drawn lone pair of every atom; `drawn` false where there is none. */
typedef struct {
  bool drawn;
  EnlPoint at;
  EnlPoint out; /* unit vector away from the atom */
} EnlLonePair;

/* Draws two dots beside the atom where there is room and keeps the place. `arrow`, when not NULL,
 * will start here: the pair then stands on the side of the arrow's end. */
EnlLonePair enl_lone_pair_draw (EnlOutline *outline, EnlScene *scene, uint32_t atom,
                                const EnlArrow *arrow);

/* Draws one arrow, bent to the side where it meets least, and keeps its place. `pair` has one
 * entry an atom. */
void enl_curved_arrow_draw (EnlOutline *outline, EnlScene *scene, const EnlArrow *arrow,
                            const EnlLonePair *pair);

/* Filled barbed head with its tip at `tip`; returns where the shaft ends. */
EnlPoint enl_arrow_head_draw (EnlScene *scene, EnlPoint tip, EnlPoint direction, double size,
                              EnlTone tone);
