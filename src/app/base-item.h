/* One candidate base as a list item, its cells ready to show. */
#pragma once

#include "app/core-glue.h"

#define ENL_TYPE_BASE_ITEM (enl_base_item_get_type ())
G_DECLARE_FINAL_TYPE (EnlBaseItem, enl_base_item, ENL, BASE_ITEM, GObject)

typedef enum {
  ENL_CELL_NAME,
  ENL_CELL_PKAH,
  ENL_CELL_GAP,
  ENL_CELL_CONVERSION,
  ENL_CELL_VERDICT,
  ENL_CELL_REASON,
  ENL_N_CELLS
} EnlBaseCell;

EnlBaseItem *enl_base_item_new (const EnlBase *base, const EnlCandidate *candidate);
const char *enl_base_item_id (EnlBaseItem *item);
const char *enl_base_item_cell (EnlBaseItem *item, EnlBaseCell cell);
/* Cautions and notes, a line each; "" for none. */
const char *enl_base_item_details (EnlBaseItem *item);
