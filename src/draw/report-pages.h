/* A report as A4 pages, and its pictures alone. A set of up to four substrates fits two pages. */
#pragma once

#include "core/workset/report.h"
#include "draw/scene.h"

/* The pages (EnlScene, owned by the array), at least one. */
GPtrArray *enl_report_pages (const EnlReport *report, const EnlTheme *theme) ENL_MUST_USE;

/* The structure with its badges, no larger than `width` x `height` px, its left top corner at the
 * origin; NULL when it could not be read. */
EnlScene *enl_report_structure (const EnlReportSubstrate *substrate, const EnlTheme *theme,
                                double width, double height) ENL_MUST_USE;
/* The composition curve, `width` px wide, left top corner at the origin; NULL without one. */
EnlScene *enl_report_curve (const EnlReport *report, uint32_t substrate, const EnlTheme *theme,
                            double width) ENL_MUST_USE;
/* What is in the flask at the chosen equivalents, a bar a species, `width` px wide, left top corner
 * at the origin; NULL without a composition. */
EnlScene *enl_report_composition (const EnlReportSubstrate *substrate, const EnlTheme *theme,
                                  double width, double size) ENL_MUST_USE;
