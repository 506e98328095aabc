/* One line of the ranked list: badge, position, interval, value, basis. */
#pragma once

#include <gtk/gtk.h>

#include "core/workset/analysis.h"
#include "draw/theme.h"

/* A row for the site at this 0-based place of the ranking; the axis runs from `low` to `high`. */
GtkWidget *enl_site_row_new (const EnlAnalysis *analysis, uint32_t place, double low, double high,
                             const EnlTheme *theme);
/* A row without a badge that says why nothing enolises. */
GtkWidget *enl_site_reason_row_new (const char *reason);
/* Site index of a row, ENL_NONE for a reason. */
uint32_t enl_site_row_site (GtkListBoxRow *row);
