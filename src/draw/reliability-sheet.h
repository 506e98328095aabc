/* How far to trust the estimates, as a picture: published against left-out values for both
 * solvents, the share of published values inside intervals of several widths, and the size of the
 * errors against the stated width. */
#pragma once

#include "core/acidity/model.h"
#include "draw/scene.h"

/* One published value that the model was not shown. pK units. */
typedef struct {
  EnlSolvent solvent; /* DMSO or water */
  EnlAcidClass class_of;
  double published, left_out;
  double half; /* half width of its 90 % interval */
} EnlReliabilityPoint;

typedef struct {
  const EnlReliabilityPoint *point; /* borrowed while the scene is made */
  uint32_t n_points;
  const char *left_out; /* plain text: what was left out together */
} EnlReliabilitySheet;

/* Classes differ by shape and by tone. Marks of the first kind of panel carry `site` = index of the
 * point, those of the last `atom` = index; no other shape has an owner. */
EnlScene *enl_reliability_sheet (const EnlReliabilitySheet *sheet,
                                 const EnlTheme *theme) ENL_MUST_USE;
