/* Weigh-out of the selected base for the selected substrate and site: scale, equivalents, titre,
 * content and water are typed in place, the amounts follow. */
#pragma once

#include "app/core-glue.h"
#include "core/bases/weigh-list.h"

#define ENL_TYPE_WEIGH_PANEL (enl_weigh_panel_get_type ())
G_DECLARE_FINAL_TYPE (EnlWeighPanel, enl_weigh_panel, ENL, WEIGH_PANEL, GtkWidget)

/* Emits "changed" when the list is another. */
void enl_weigh_panel_follow (EnlWeighPanel *panel, EnlSession *session, EnlLook *look);
/* Keyboard into the amount. */
void enl_weigh_panel_focus (EnlWeighPanel *panel);
/* The list on show; NULL when there is none, then `fault` says why. Both borrowed until the next
 * change. */
const EnlWeighList *enl_weigh_panel_list (EnlWeighPanel *panel, const char **fault);
/* Brings the list in line with what was typed last. */
void enl_weigh_panel_settle (EnlWeighPanel *panel);
