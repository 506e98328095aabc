/* Text layout that comes out the same on screen, in PNG, SVG and PDF. */
#pragma once

#include <pango/pango.h>

#include "core/base/macros.h"
#include "draw/scene.h"

/* A layout of Pango markup. Font context and hinting are fixed, so that sizes do not depend on the
 * target. Caller: g_object_unref. Markup that cannot be parsed is shown as plain text. */
PangoLayout *enl_text_layout (const char *family, const char *markup, double size,
                              bool bold) ENL_MUST_USE;

/* Size used for alignment: advance width, and lines times the plain line height, whatever small
 * raised or lowered parts the markup has. */
void enl_text_extents (PangoLayout *layout, double *width, double *height);

/* Ink rectangle relative to the top left corner of the alignment box. */
EnlRect enl_text_ink (PangoLayout *layout);

/* From the top of the layout that Pango makes to the top of the alignment box: raised parts can
 * make Pango's first line taller. */
double enl_text_lift (PangoLayout *layout);

/* Plain text broken into lines no wider than `width` px, as markup with line feeds (g_free). A word
 * that is longer (a SMILES) is broken between characters. */
char *enl_text_wrap (const char *family, const char *plain, double size, bool bold,
                     double width) ENL_MUST_USE;

/* The same with at most `lines` lines; what is left out is told by an ellipsis (g_free). */
char *enl_text_wrap_short (const char *family, const char *plain, double size, bool bold,
                           double width, uint32_t lines) ENL_MUST_USE;

/* Wrapped plain text with its left top corner at `at`; returns the y below it. */
double enl_scene_paragraph (EnlScene *scene, EnlPoint at, double width, const char *plain,
                            double size, bool bold, EnlTone tone);

/* Height of one line of plain text, px. */
double enl_text_line_height (const char *family, double size);

/* Markup for subscript and superscript: lowered and raised small text at font size `size`. Pango's
 * own <sub> and <sup> come out wrong under a scaled context. New string (g_free). */
char *enl_text_lowered (const char *markup, double size) ENL_MUST_USE;
char *enl_text_raised (const char *markup, double size) ENL_MUST_USE;
