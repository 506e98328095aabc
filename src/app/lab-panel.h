/* Own values: a line to enter one for the selected hydrogen, and the list of those in the set. */
#pragma once

#include "app/core-glue.h"

#define ENL_TYPE_LAB_PANEL (enl_lab_panel_get_type ())
G_DECLARE_FINAL_TYPE (EnlLabPanel, enl_lab_panel, ENL, LAB_PANEL, GtkWidget)

void enl_lab_panel_follow (EnlLabPanel *panel, EnlSession *session);
/* Keyboard into the pKa. */
void enl_lab_panel_focus (EnlLabPanel *panel);
