/* The picture of one ring block with its direct neighbours. */
#pragma once

#include "core/layout/template.h"

typedef enum {
  ENL_BLOCK_KEPT,     /* the present picture is good */
  ENL_BLOCK_TEMPLATE, /* redrawn from a template of the whole block: mind its orientation */
  ENL_BLOCK_REDRAWN   /* redrawn in another way */
} EnlBlockPicture;

/* `part` is a ring block (core[atom] true) with its direct outer neighbours, with a present picture
 * of the core when `drawn`. Compares that with templates and views in space, and leaves the best in
 * the spots of the core and, unless kept, of the neighbours. */
EnlBlockPicture enl_block_draw (EnlSketch *part, const bool *core, bool drawn,
                                const EnlTemplates *templates);
