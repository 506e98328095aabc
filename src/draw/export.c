/* Scenes as files: PNG with its resolution, SVG and PDF, the same bytes in every run. */
#include <cairo-pdf.h>
#include <cairo-svg.h>
#include <cairo.h>
#include <errno.h>
#include <math.h>
#include <string.h>

#include "draw/plane.h"
#include "draw/paint.h"

#define PX_PER_INCH 96.0
#define MM_PER_INCH 25.4
#define PT_PER_PX   0.75

/* What a viewer and a machine with little memory can still open. */
#define MAX_SIDE   20000.0 /* px or vector units */
#define MAX_PIXELS 64e6
#define MIN_DPI    30.0
#define MAX_DPI    2400.0
#define MIN_MM     5.0
#define MAX_MM     2000.0

/* A picture has no use for the moment it was written, and equal pictures shall be equal files. */
#define FIXED_DATE "2000-01-01T00:00:00Z"

typedef struct {
  const EnlScene *scene;
  const EnlExport *options;
  EnlRect frame;
  double scale;         /* from scene px to picture px at 96 dpi */
  double width, height; /* px at 96 dpi */
  double dpi;
} Plan;

static const EnlExport no_options = {0};

int
enl_picture_find (const char *path)
{
  static const char *const ending[] = {
      [ENL_PICTURE_PNG] = ".png", [ENL_PICTURE_SVG] = ".svg", [ENL_PICTURE_PDF] = ".pdf"};
  g_autofree char *lower = g_ascii_strdown (path, -1);

  for (int i = 0; i < (int)ENL_COUNT (ending); i++)
    if (g_str_has_suffix (lower, ending[i]))
      return i;
  return -1;
}

static EnlStatus
check_numbers (const EnlExport *options, EnlError *err)
{
  if (options->width_mm != 0 && !(options->width_mm >= MIN_MM && options->width_mm <= MAX_MM))
    return enl_error_set (err, ENL_ERROR_RANGE, "give 5 to 2000 mm",
                          "a width of %g mm is outside what can be made", options->width_mm);
  if (options->dpi != 0 && !(options->dpi >= MIN_DPI && options->dpi <= MAX_DPI))
    return enl_error_set (err, ENL_ERROR_RANGE, "give 30 to 2400 dpi",
                          "a resolution of %g dpi is outside what can be made", options->dpi);
  return ENL_OK;
}

static EnlStatus
make_plan (const EnlScene *scene, EnlPicture format, const EnlExport *options, Plan *plan,
           EnlError *err)
{
  EnlStatus status = check_numbers (options, err);

  if (status)
    return status;
  *plan = (Plan){.scene = scene, .options = options, .frame = enl_scene_frame (scene), .scale = 1};
  plan->dpi = options->dpi > 0 ? options->dpi : PX_PER_INCH;
  if (options->width_mm > 0)
    plan->scale = options->width_mm / MM_PER_INCH * PX_PER_INCH / plan->frame.width;
  plan->width = plan->frame.width * plan->scale;
  plan->height = plan->frame.height * plan->scale;
  double factor = format == ENL_PICTURE_PNG ? plan->dpi / PX_PER_INCH : 1;
  double w = plan->width * factor, h = plan->height * factor;
  if (!(w <= MAX_SIDE && h <= MAX_SIDE) || (format == ENL_PICTURE_PNG && w * h > MAX_PIXELS))
    return enl_error_set (err, ENL_ERROR_RANGE,
                          format == ENL_PICTURE_PNG
                              ? "take a lower dpi, a smaller width, or save SVG or PDF"
                              : "take a smaller width",
                          "a picture of %.0f x %.0f pixels is too big to be made", w, h);
  return ENL_OK;
}

static void
paint_plan (const Plan *plan, cairo_t *cr)
{
  if (!plan->options->transparent) {
    EnlColour c = enl_scene_theme (plan->scene)->tone[ENL_TONE_GROUND];
    cairo_set_source_rgba (cr, c.red, c.green, c.blue, c.alpha);
    cairo_paint (cr);
  }
  cairo_scale (cr, plan->scale, plan->scale);
  cairo_translate (cr, -plan->frame.x, -plan->frame.y);
  enl_scene_paint (plan->scene, cr);
}

static cairo_status_t
collect (void *closure, const unsigned char *data, unsigned int length)
{
  g_byte_array_append (closure, data, length);
  return CAIRO_STATUS_SUCCESS;
}

static EnlStatus
cairo_failed (cairo_status_t status, EnlError *err)
{
  if (status == CAIRO_STATUS_SUCCESS)
    return ENL_OK;
  return enl_error_set (err, ENL_ERROR_IO, "take a smaller width or another format",
                        "the picture could not be made: %s", cairo_status_to_string (status));
}

static void
put_u32 (guint8 *at, guint32 value)
{
  value = GUINT32_TO_BE (value);
  memcpy (at, &value, sizeof value);
}

/* CRC-32 as in the PNG specification (ISO/IEC 15948), annex D. */
static guint32
png_crc (const guint8 *data, gsize size)
{
  guint32 crc = 0xFFFFFFFFu;

  for (gsize i = 0; i < size; i++) {
    crc ^= data[i];
    for (int bit = 0; bit < 8; bit++)
      crc = (crc >> 1) ^ (crc & 1 ? 0xEDB88320u : 0);
  }
  return ~crc;
}

/* Tells the resolution: a pHYs chunk behind the header chunk, which is always 8 + 25 bytes. */
static void
png_set_resolution (GByteArray *png, double dpi)
{
  enum { HEADER = 33, CHUNK = 21 };
  guint32 per_metre = (guint32)lround (dpi / MM_PER_INCH * 1000);
  guint8 chunk[CHUNK];
  guint old = png->len;

  put_u32 (chunk, 9);
  memcpy (chunk + 4, "pHYs", 4);
  put_u32 (chunk + 8, per_metre);
  put_u32 (chunk + 12, per_metre);
  chunk[16] = 1; /* the unit is the metre */
  put_u32 (chunk + 17, png_crc (chunk + 4, 13));
  g_byte_array_set_size (png, old + CHUNK);
  memmove (png->data + HEADER + CHUNK, png->data + HEADER, old - HEADER);
  memcpy (png->data + HEADER, chunk, CHUNK);
}

static EnlStatus
encode_png (const Plan *plan, GByteArray *out, EnlError *err)
{
  double factor = plan->dpi / PX_PER_INCH;
  int width = (int)MAX (1, lround (plan->width * factor));
  int height = (int)MAX (1, lround (plan->height * factor));
  cairo_surface_t *surface = cairo_image_surface_create (CAIRO_FORMAT_ARGB32, width, height);
  cairo_t *cr = cairo_create (surface);

  cairo_scale (cr, factor, factor);
  paint_plan (plan, cr);
  cairo_status_t status = cairo_status (cr);
  if (!status)
    status = cairo_surface_write_to_png_stream (surface, collect, out);
  cairo_destroy (cr);
  cairo_surface_destroy (surface);
  if (status)
    return cairo_failed (status, err);
  png_set_resolution (out, plan->dpi);
  return ENL_OK;
}

static EnlStatus
finish_vector (const Plan *plan, cairo_surface_t *surface, double scale, EnlError *err)
{
  cairo_t *cr = cairo_create (surface);

  cairo_scale (cr, scale, scale);
  paint_plan (plan, cr);
  cairo_show_page (cr);
  cairo_status_t status = cairo_status (cr);
  cairo_destroy (cr);
  cairo_surface_finish (surface);
  if (!status)
    status = cairo_surface_status (surface);
  cairo_surface_destroy (surface);
  return cairo_failed (status, err);
}

static EnlStatus
encode_pdf (const Plan *plan, GByteArray *out, EnlError *err)
{
  const char *title = plan->options->title;
  cairo_surface_t *surface = cairo_pdf_surface_create_for_stream (
      collect, out, plan->width * PT_PER_PX, plan->height * PT_PER_PX);

  cairo_pdf_surface_set_metadata (surface, CAIRO_PDF_METADATA_CREATE_DATE, FIXED_DATE);
  cairo_pdf_surface_set_metadata (surface, CAIRO_PDF_METADATA_CREATOR, "Enolith");
  if (title)
    cairo_pdf_surface_set_metadata (surface, CAIRO_PDF_METADATA_TITLE, title);
  return finish_vector (plan, surface, PT_PER_PX, err);
}

EnlStatus
enl_pages_encode (GPtrArray *pages, const char *title, GByteArray **out, EnlError *err)
{
  g_autoptr (GByteArray) bytes = g_byte_array_new ();
  EnlRect first = enl_scene_frame (g_ptr_array_index (pages, 0));
  cairo_surface_t *surface = cairo_pdf_surface_create_for_stream (
      collect, bytes, first.width * PT_PER_PX, first.height * PT_PER_PX);
  cairo_t *cr = cairo_create (surface);

  *out = NULL;
  cairo_pdf_surface_set_metadata (surface, CAIRO_PDF_METADATA_CREATE_DATE, FIXED_DATE);
  cairo_pdf_surface_set_metadata (surface, CAIRO_PDF_METADATA_CREATOR, "Enolith");
  cairo_pdf_surface_set_metadata (surface, CAIRO_PDF_METADATA_TITLE, title);
  for (guint i = 0; i < pages->len; i++) {
    const EnlExport plain = {0};
    const EnlScene *page = g_ptr_array_index (pages, i);
    const Plan plan = {
        .scene = page, .options = &plain, .frame = enl_scene_frame (page), .scale = 1};
    cairo_save (cr);
    cairo_scale (cr, PT_PER_PX, PT_PER_PX);
    paint_plan (&plan, cr);
    cairo_restore (cr);
    cairo_show_page (cr);
  }
  cairo_status_t status = cairo_status (cr);
  cairo_destroy (cr);
  cairo_surface_finish (surface);
  if (!status)
    status = cairo_surface_status (surface);
  cairo_surface_destroy (surface);
  if (!status)
    *out = g_steal_pointer (&bytes);
  return cairo_failed (status, err);
}

/* cairo numbers its surfaces over the life of the process; our files do not tell. */
static void
svg_settle (GByteArray *svg, const char *title)
{
  g_autoptr (GRegex) number = g_regex_new ("surface[0-9]+", 0, 0, NULL);
  g_autofree char *settled =
      g_regex_replace_literal (number, (const char *)svg->data, svg->len, 0, "surface", 0, NULL);
  const char *root = strstr (settled, "<svg");
  const char *inner = root ? strchr (root, '>') : NULL;

  g_byte_array_set_size (svg, 0);
  if (title && inner) {
    g_autofree char *element = g_markup_printf_escaped ("\n<title>%s</title>", title);
    g_byte_array_append (svg, (const guint8 *)settled, (guint)(inner + 1 - settled));
    g_byte_array_append (svg, (const guint8 *)element, (guint)strlen (element));
    g_byte_array_append (svg, (const guint8 *)inner + 1, (guint)strlen (inner + 1));
  } else {
    g_byte_array_append (svg, (const guint8 *)settled, (guint)strlen (settled));
  }
}

static EnlStatus
encode_svg (const Plan *plan, GByteArray *out, EnlError *err)
{
  cairo_surface_t *surface =
      cairo_svg_surface_create_for_stream (collect, out, plan->width, plan->height);

  cairo_svg_surface_set_document_unit (surface, CAIRO_SVG_UNIT_PX);
  EnlStatus status = finish_vector (plan, surface, 1, err);
  if (!status)
    svg_settle (out, plan->options->title);
  return status;
}

EnlStatus
enl_scene_encode (const EnlScene *scene, EnlPicture format, const EnlExport *options,
                  GByteArray **out, EnlError *err)
{
  static EnlStatus (*const encoder[]) (const Plan *, GByteArray *,
                                       EnlError *) = {[ENL_PICTURE_PNG] = encode_png,
                                                      [ENL_PICTURE_SVG] = encode_svg,
                                                      [ENL_PICTURE_PDF] = encode_pdf};
  Plan plan;

  *out = NULL;
  EnlStatus status = make_plan (scene, format, options ? options : &no_options, &plan, err);
  if (status)
    return status;
  g_autoptr (GByteArray) bytes = g_byte_array_new ();
  status = encoder[format](&plan, bytes, err);
  if (!status)
    *out = g_steal_pointer (&bytes);
  return status;
}

/* Consistent: a temporary file beside it, flushed, then renamed. */
EnlStatus
enl_file_write (const char *path, const void *data, size_t size, EnlError *err)
{
  g_autoptr (GError) problem = NULL;

  if (!g_file_set_contents_full (path, data, (gssize)size,
                                 G_FILE_SET_CONTENTS_CONSISTENT | G_FILE_SET_CONTENTS_DURABLE, 0666,
                                 &problem))
    return enl_error_set (err, ENL_ERROR_IO, "choose a folder that exists and may be written to",
                          "'%s' cannot be written: %s", path, problem->message);
  return ENL_OK;
}

EnlStatus
enl_scene_export (const EnlScene *scene, const char *path, const EnlExport *options, EnlError *err)
{
  int format = enl_picture_find (path);
  g_autoptr (GByteArray) bytes = NULL;

  if (format < 0)
    return enl_error_set (err, ENL_ERROR_RANGE, "end the file name in .png, .svg or .pdf",
                          "'%s' has no ending of a picture", path);
  EnlStatus status = enl_scene_encode (scene, (EnlPicture)format, options, &bytes, err);
  if (status)
    return status;
  return enl_file_write (path, bytes->data, bytes->len, err);
}
