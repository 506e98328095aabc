/* One place for what every widget of the window includes. */
#pragma once

#include <gtk/gtk.h>

#include "app/session.h"
#include "draw/theme.h"

/* The look of the window: light, dark or projector. Signal "changed". */
#define ENL_TYPE_LOOK (enl_look_get_type ())
G_DECLARE_FINAL_TYPE (EnlLook, enl_look, ENL, LOOK, GObject)

EnlLook *enl_look_new (void);
EnlThemeName enl_look_get (EnlLook *look);
const EnlTheme *enl_look_theme (EnlLook *look); /* static */
/* Light, dark or projector; sets the toolkit's own dark preference too. */
void enl_look_set (EnlLook *look, EnlThemeName name);
