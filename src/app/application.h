/* The application: opens the knowledge once and makes windows. */
#pragma once

#include "app/core-glue.h"

#define ENL_TYPE_APPLICATION (enl_application_get_type ())
G_DECLARE_FINAL_TYPE (EnlApplication, enl_application, ENL, APPLICATION, GtkApplication)

EnlApplication *enl_application_new (void);
