/* A small form that adds a base to the set; lives in a popover of the bases panel. */
#pragma once

#include "app/core-glue.h"

#define ENL_TYPE_OWN_BASE_FORM (enl_own_base_form_get_type ())
G_DECLARE_FINAL_TYPE (EnlOwnBaseForm, enl_own_base_form, ENL, OWN_BASE_FORM, GtkWidget)

GtkWidget *enl_own_base_form_new (EnlSession *session);
/* Names the solvent of the number, and puts the cursor in the name. */
void enl_own_base_form_present (EnlOwnBaseForm *form);
