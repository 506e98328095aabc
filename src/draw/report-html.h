/* A report as one HTML file that needs nothing beside it. */
#pragma once

#include "core/base/error.h"
#include "core/workset/report.h"
#include "draw/theme.h"

/* The same bytes for the same report. New string (g_free). */
EnlStatus enl_report_html (const EnlReport *report, const EnlTheme *theme, char **out,
                           EnlError *err) ENL_MUST_USE;
