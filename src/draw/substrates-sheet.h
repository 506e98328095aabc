/* Several substrates side by side: title, structure with badges, and the ranked list of sites with
 * their values on one common axis. */
#pragma once

#include "draw/structure-scene.h"

typedef struct {
  const char *title;           /* plain text, may be NULL */
  const EnlMolecule *mol;      /* with layout */
  const EnlSites *sites;       /* may be NULL: bare structure */
  const EnlEstimate *estimate; /* one a site, or NULL */
  const uint32_t *rank;        /* site indices, most acidic first, or NULL */
  uint32_t selected;           /* site index or ENL_NONE */
  const EnlForms *forms;       /* of the selected site, or NULL */
} EnlSubstrateCard;

typedef struct {
  const EnlSubstrateCard *card; /* borrowed while the scene is made */
  uint32_t n_cards;
  uint32_t columns;   /* cards in a row; 0: up to 4 */
  uint32_t max_sites; /* rows of a list, the rest is told in a line; 0: 8 */
  EnlSolvent solvent;
  const char *caption; /* plain text below everything, may be NULL */
} EnlSubstratesSheet;

/* Shapes carry `substrate` = index of the card. */
EnlScene *enl_substrates_sheet (const EnlSubstratesSheet *sheet,
                                const EnlTheme *theme) ENL_MUST_USE;
