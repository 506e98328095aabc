/* The structure of a substrate with its acidic hydrogens, rank badges and pKa values. */
#pragma once

#include "core/acidity/estimate.h"
#include "core/acidity/form.h"
#include "core/acidity/site.h"
#include "draw/scene.h"

typedef struct {
  const EnlSites *sites;       /* NULL: bare structure */
  const EnlEstimate *estimate; /* one a site, or NULL */
  const uint32_t *rank;        /* site indices, most acidic first, or NULL */
  uint32_t selected;           /* site index or ENL_NONE: its hydrogen and system are lit */
  const EnlForms *forms;       /* of the selected site: which atoms and bonds to light; or NULL */
  bool numbers;                /* atom numbers (1-based input positions) beside atoms */
} EnlStructureLook;

/* Scene of a molecule with layout (assertion). Structure at theme bond length, origin anywhere. The
 * 30 most acidic sites have badges; more could not be read. */
EnlScene *enl_structure_scene (const EnlMolecule *mol, const EnlStructureLook *look,
                               const EnlTheme *theme) ENL_MUST_USE;

/* Bare structure with curved arrows and explicit charges: one contributor. `layout` is a molecule
 * with the same atom order that has the coordinates. */
EnlScene *enl_form_scene (const EnlMolecule *form, const EnlMolecule *layout, const EnlArrow *arrow,
                          uint32_t n_arrows, const EnlTheme *theme) ENL_MUST_USE;

/* The hybrid: dashed partial bonds, charge shown by area and number on each atom. */
EnlScene *enl_hybrid_scene (const EnlForms *forms, const EnlMolecule *layout,
                            const EnlTheme *theme) ENL_MUST_USE;
