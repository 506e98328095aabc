/* Candidate bases for the selected site, best first, with what to beware of. */
#pragma once

#include "app/core-glue.h"

#define ENL_TYPE_BASES_PANEL (enl_bases_panel_get_type ())
G_DECLARE_FINAL_TYPE (EnlBasesPanel, enl_bases_panel, ENL, BASES_PANEL, GtkWidget)

void enl_bases_panel_follow (EnlBasesPanel *panel, EnlSession *session, EnlLook *look);
