/* The composition curve of the selected base: what becomes of the selected substrate over the
 * equivalents. Left and right move the chosen equivalents, and so does a click. */
#pragma once

#include "app/core-glue.h"

#define ENL_TYPE_CURVE_PANEL (enl_curve_panel_get_type ())
G_DECLARE_FINAL_TYPE (EnlCurvePanel, enl_curve_panel, ENL, CURVE_PANEL, GtkWidget)

/* Call once. Signal "changed": another curve, or none, is shown. */
void enl_curve_panel_follow (EnlCurvePanel *panel, EnlSession *session, EnlLook *look);
/* What is shown, in words; "" when nothing is. Owned by the panel until the next change. */
const char *enl_curve_panel_words (EnlCurvePanel *panel);
