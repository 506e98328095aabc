/* One effect of "why this value" as a small signed bar. */
#pragma once

#include <gtk/gtk.h>

#include "draw/theme.h"

#define ENL_TYPE_EFFECT_BAR (enl_effect_bar_get_type ())
G_DECLARE_FINAL_TYPE (EnlEffectBar, enl_effect_bar, ENL, EFFECT_BAR, GtkWidget)

/* As enl_effect_bar_scene. The theme is borrowed (static). */
GtkWidget *enl_effect_bar_new (double effect, double most, const EnlTheme *theme);
