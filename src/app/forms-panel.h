/* The anion of the selected site: contributing structures, weights and the hybrid. */
#pragma once

#include "app/core-glue.h"

#define ENL_TYPE_FORMS_PANEL (enl_forms_panel_get_type ())
G_DECLARE_FINAL_TYPE (EnlFormsPanel, enl_forms_panel, ENL, FORMS_PANEL, GtkWidget)

void enl_forms_panel_follow (EnlFormsPanel *panel, EnlSession *session, EnlLook *look);
