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

typedef enum { ENL_PICTURE_PNG, ENL_PICTURE_SVG, ENL_PICTURE_PDF } EnlPicture;

/* Picture format by the ending of a file name, any case; -1 when it is none of .png, .svg, .pdf. */
int enl_picture_find (const char *path);

/* The bytes of a picture, the same for the same scene in every run. ENL_ERROR_RANGE for a size or
 * resolution that cannot be made. Caller: g_byte_array_unref. */
EnlStatus enl_scene_encode (const EnlScene *scene, EnlPicture format, const EnlExport *options,
                            GByteArray **out, EnlError *err) ENL_MUST_USE;

/* Writes FILE.png, .svg or .pdf by its ending. ENL_ERROR_RANGE for another ending or impossible
 * size, ENL_ERROR_IO when the file cannot be written; nothing is left half-written. */
EnlStatus enl_scene_export (const EnlScene *scene, const char *path, const EnlExport *options,
                            EnlError *err) ENL_MUST_USE;

/* Scenes (EnlScene, at least one, equal sizes) as the pages of one PDF at their natural size; the
 * same bytes for the same scenes. Caller: g_byte_array_unref. */
EnlStatus enl_pages_encode (GPtrArray *pages, const char *title, GByteArray **out,
                            EnlError *err) ENL_MUST_USE;

/* Writes a whole file or nothing. ENL_ERROR_IO with advice. */
EnlStatus enl_file_write (const char *path, const void *data, size_t size,
                          EnlError *err) ENL_MUST_USE;

/* Advance width and line height of a text in px; the same on every target. */
void enl_text_measure (const char *family, const char *markup, double size, bool bold,
                       double *width, double *height);
