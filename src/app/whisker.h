/* A small horizontal bar: the 90 % interval of an estimate on a common axis, its value a tick. */
#pragma once

#include <gtk/gtk.h>

#include "core/acidity/estimate.h"
#include "draw/theme.h"

#define ENL_TYPE_WHISKER (enl_whisker_get_type ())
G_DECLARE_FINAL_TYPE (EnlWhisker, enl_whisker, ENL, WHISKER, GtkWidget)

/* `low` and `high` are the ends of the axis. The theme is borrowed (static). */
GtkWidget *enl_whisker_new (const EnlEstimate *estimate, double low, double high,
                            const EnlTheme *theme);
