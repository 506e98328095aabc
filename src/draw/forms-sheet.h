/* All contributing structures of one anion as cards, and their hybrid. */
#pragma once

#include "draw/structure-scene.h"

typedef struct {
  const char *title;         /* plain text, may be NULL */
  const EnlForms *forms;     /* borrowed while the scene is made */
  const EnlMolecule *layout; /* same atom order as the anion, with layout */
  uint32_t max_forms;        /* cards shown, the rest is told in a line; 0: 8 */
  uint32_t columns;          /* cards in a row; 0: up to 3 */
  uint32_t arrows_to;        /* form whose curved arrows are drawn on form 0; 0: the first other */
  const char *caption;       /* plain text below everything, may be NULL */
} EnlFormsSheet;

EnlScene *enl_forms_sheet (const EnlFormsSheet *sheet, const EnlTheme *theme) ENL_MUST_USE;
