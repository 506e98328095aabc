/* Why the value of the selected site is what it is: contributions that add up, and precedents.
 * Signal "changed": another explanation is shown. */
#pragma once

#include "app/core-glue.h"
#include "app/why-job.h"

#define ENL_TYPE_WHY_PANEL (enl_why_panel_get_type ())
G_DECLARE_FINAL_TYPE (EnlWhyPanel, enl_why_panel, ENL, WHY_PANEL, GtkWidget)

void enl_why_panel_follow (EnlWhyPanel *panel, EnlSession *session, EnlLook *look);
/* What is shown now, or NULL. Borrowed until the next signal. */
const EnlWhyResult *enl_why_panel_result (EnlWhyPanel *panel);
