/* The rows of the panel "why this value". */
#pragma once

#include "app/core-glue.h"
#include "app/why-job.h"

/* Words, bar and number of line `index`, rounded to `value`; `most` is the largest effect. The
 * first line, the parent, has no bar. */
GtkWidget *enl_why_line_row_new (const EnlWhy *why, uint32_t index, double value, double most,
                                 const EnlTheme *theme);
/* The sum under them. */
GtkWidget *enl_why_sum_row_new (const EnlWhy *why, const EnlEstimate *estimate);
/* A measured compound: structure with the acidic hydrogen marked, name, value, weight, source. */
GtkWidget *enl_why_precedent_row_new (const EnlWhyPicture *picture, const EnlTheme *theme);
