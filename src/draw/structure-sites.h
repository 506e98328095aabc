/* Acidic hydrogens, rank badges and the lit system on a structure. Steps of structure-scene.c. */
#pragma once

#include "draw/outline.h"
#include "draw/structure-scene.h"

/* A hydrogen on a short bond of its own. */
typedef struct {
  uint32_t atom, site;
  EnlPoint at; /* middle of the letter */
  EnlRect box;
} EnlDrawnHydrogen;

typedef struct {
  EnlOutline *outline;          /* borrowed */
  const EnlStructureLook *look; /* borrowed */
  uint32_t *site_of;            /* per atom, ENL_NONE outside the sites */
  GArray *hydrogen;             /* of EnlDrawnHydrogen */
} EnlSitePlan;

/* Borrows both. Marks in the outline which labels carry acidic hydrogens; call it before the labels
 * are planned. */
EnlSitePlan *enl_site_plan_new (EnlOutline *outline, const EnlStructureLook *look) ENL_MUST_USE;
void enl_site_plan_free (EnlSitePlan *plan);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlSitePlan, enl_site_plan_free)

/* Finds room for hydrogens on short bonds; where there is none the atom gets a label instead. */
void enl_site_plan_hydrogens (EnlSitePlan *plan);

/* Soft area behind the delocalised system of the selected site. */
void enl_site_plan_draw_area (const EnlSitePlan *plan, EnlScene *scene);
void enl_site_plan_draw_hydrogens (const EnlSitePlan *plan, EnlScene *scene);
/* Tone of a site's hydrogens and badge. */
EnlTone enl_site_tone (const EnlStructureLook *look, uint32_t site);
/* One badge with the value a site, at its roomiest atom; the mark alone at the others. */
void enl_site_plan_draw_badges (EnlSitePlan *plan, EnlScene *scene);
