/* Painting and saving a scene with cairo and Pango. */
#pragma once

#include <cairo.h>

#include "core/base/error.h"
#include "draw/scene.h"

/* Paints at the current transformation. Ground is painted only by the export functions. */
void enl_scene_paint (const EnlScene *scene, cairo_t *cr);

typedef struct {
  double width_mm; /* 0: natural size at 96 dpi */
  double dpi;      /* PNG only; 0 means 96 */
  bool transparent;
  const char *title; /* document metadata, may be NULL */
} EnlExport;

/* Writes FILE.png, .svg or .pdf by its ending. ENL_ERROR_RANGE for another ending or impossible
 * size, ENL_ERROR_IO when the file cannot be written; nothing is left half-written. */
EnlStatus enl_scene_export (const EnlScene *scene, const char *path, const EnlExport *options,
                            EnlError *err) ENL_MUST_USE;

/* Size of a text in px; the same on every target. */
void enl_text_measure (const char *family, const char *markup, double size, bool bold,
                       double *width, double *height);
