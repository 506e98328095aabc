/* The rank badge of a site and the words of its value.
 *
 * The shape says where the value comes from: a solid disc is measured, an outlined disc estimated
 * (broken outline: outside the experience of the model), a square the user's own lab value.
 */
#pragma once

#include "core/acidity/estimate.h"
#include "draw/scene.h"

typedef struct {
  uint32_t number;             /* rank, from 1 */
  const EnlEstimate *estimate; /* borrowed, or NULL */
  bool selected;
  uint32_t site, atom; /* ownership of the shapes, ENL_NONE for nothing */
} EnlBadge;

/* Radius of the mark; larger for two digits. */
double enl_badge_radius (const EnlBadge *badge, const EnlTheme *theme);
/* The mark alone, its middle at `centre`. */
void enl_badge_draw_mark (EnlScene *scene, const EnlBadge *badge, EnlPoint centre);

/* Size of mark, value and uncertainty in one row. */
void enl_badge_size (const EnlBadge *badge, const EnlTheme *theme, double *width, double *height);
/* The row in `box` (of that size); `mirrored` puts the mark to the right of its value. */
void enl_badge_draw (EnlScene *scene, const EnlBadge *badge, EnlRect box, bool mirrored);
/* Middle of the mark in such a box, from its corner. */
EnlPoint enl_badge_hook (const EnlBadge *badge, const EnlTheme *theme, bool mirrored);

/* "14.2", one decimal, real minus sign, "14.2" in every locale. New string (g_free). */
char *enl_pka_text (double value) ENL_MUST_USE;
/* "±2.1", half the 90 % interval (the larger half when it is lopsided); NULL for a measured value.
 * New string (g_free). */
char *enl_pka_error_text (const EnlEstimate *estimate) ENL_MUST_USE;
