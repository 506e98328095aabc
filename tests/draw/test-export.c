#include "draw/paint.h"

#include <cairo.h>
#include <glib/gstdio.h>
#include <math.h>
#include <string.h>
#include <sys/stat.h>

#include "draw/structure-scene.h"
#include "tests/draw/sample.h"
#include "tests/runner.h"

static char *folder;

static void
make_folder (void)
{
  folder = g_dir_make_tmp ("enolith-draw-XXXXXX", NULL);
  ck_assert_ptr_nonnull (folder);
}

static void
remove_folder (void)
{
  g_autoptr (GDir) dir = g_dir_open (folder, 0, NULL);
  const char *name;

  while (dir && (name = g_dir_read_name (dir))) {
    g_autofree char *path = g_build_filename (folder, name, NULL);
    g_remove (path);
  }
  g_rmdir (folder);
  g_free (folder);
}

static EnlScene *
picture (EnlThemeName name)
{
  g_autoptr (EnlMolecule) mol = sample_molecule ("CC1(C)S[C@@H]2[C@H](NC(=O)Cc3ccccc3)C(=O)N2"
                                                 "[C@H]1C(=O)O");
  g_autoptr (SampleSites) sites = sample_sites (mol);
  EnlStructureLook look = {
      .sites = &sites->sites, .estimate = sites->estimate, .rank = sites->rank, .selected = 1};

  return enl_structure_scene (mol, &look, enl_theme_get (name));
}

static GByteArray *
encode (const EnlScene *scene, EnlPicture format, const EnlExport *options)
{
  GByteArray *bytes = NULL;
  EnlError err;

  ck_assert_msg (enl_scene_encode (scene, format, options, &bytes, &err) == ENL_OK, "%s", err.text);
  return bytes;
}

static char *
run (const char *format, const char *path, const char *other)
{
  g_autofree char *a = g_shell_quote (path), *b = g_shell_quote (other);
  g_autofree char *command = g_strdup_printf (format, a, b);
  char *out = NULL;
  int status = 0;

  ck_assert_msg (g_spawn_command_line_sync (command, &out, NULL, &status, NULL), "%s", command);
  ck_assert_msg (status == 0, "%s failed", command);
  return out;
}

static char *
export_to (const EnlScene *scene, const char *name, const EnlExport *options)
{
  char *path = g_build_filename (folder, name, NULL);
  EnlError err;

  ck_assert_msg (enl_scene_export (scene, path, options, &err) == ENL_OK, "%s", err.text);
  return path;
}

START_TEST (bytes_are_the_same_every_time)
{
  g_autoptr (EnlScene) first = picture (ENL_THEME_LIGHT), second = picture (ENL_THEME_LIGHT);
  const EnlExport options = {.width_mm = 84, .dpi = 120, .title = "twice"};

  for (EnlPicture format = ENL_PICTURE_PNG; format <= ENL_PICTURE_PDF; format++) {
    g_autoptr (GByteArray) a = encode (first, format, &options);
    g_autoptr (GByteArray) b = encode (second, format, &options);
    ck_assert_uint_eq (a->len, b->len);
    ck_assert_mem_eq (a->data, b->data, a->len);
  }
}
END_TEST

/* Read back with ImageMagick: size in pixels, resolution in dots per centimetre. */
START_TEST (png_has_the_asked_size_and_resolution)
{
  g_autoptr (EnlScene) scene = picture (ENL_THEME_PRINT);
  const EnlExport options = {.width_mm = 84, .dpi = 300};
  g_autofree char *path = export_to (scene, "a.png", &options);
  g_autofree char *told = run ("identify -units PixelsPerInch -format '%%w %%x' %s", path, "");
  double width = 0, dpi = 0;

  ck_assert_int_eq (sscanf (told, "%lf %lf", &width, &dpi), 2);
  ck_assert_double_eq_tol (width, 84 / 25.4 * 300, 0.51);
  ck_assert_double_eq_tol (dpi, 300, 0.02);
}
END_TEST

START_TEST (ground_is_painted_or_left_out)
{
  g_autoptr (EnlScene) scene = picture (ENL_THEME_DARK);

  for (int clear = 0; clear < 2; clear++) {
    const EnlExport options = {.transparent = clear};
    g_autofree char *path = export_to (scene, "t.png", &options);
    cairo_surface_t *image = cairo_image_surface_create_from_png (path);
    ck_assert_int_eq (cairo_surface_status (image), CAIRO_STATUS_SUCCESS);
    guint32 corner;
    memcpy (&corner, cairo_image_surface_get_data (image), sizeof corner);
    if (cairo_image_surface_get_format (image) == CAIRO_FORMAT_RGB24)
      corner |= 0xFF000000u;
    ck_assert_uint_eq (corner, clear ? 0 : 0xFF1C1F24u);
    cairo_surface_destroy (image);
  }
}
END_TEST

typedef struct {
  int width, height, stride;
  const unsigned char *data;
} Image;

/* Number of pixels with a channel outside [min - 48, max + 48] of the other picture's 3 x 3
 * neighbourhood: tolerant of smoothing, not of a missing or shifted line. */
static int
bad_pixels (const Image *a, const Image *b)
{
  enum { TOLERANCE = 48 };
  int bad = 0;

  for (int y = 0; y < a->height; y++)
    for (int x = 0; x < a->width; x++) {
      bool fine = true;
      for (int c = 0; c < 3; c++) {
        int low = 255, high = 0, here = a->data[y * a->stride + 4 * x + c];
        for (int v = MAX (0, y - 1); v <= MIN (b->height - 1, y + 1); v++)
          for (int u = MAX (0, x - 1); u <= MIN (b->width - 1, x + 1); u++) {
            int there = b->data[v * b->stride + 4 * u + c];
            low = MIN (low, there);
            high = MAX (high, there);
          }
        fine = fine && here >= low - TOLERANCE && here <= high + TOLERANCE;
      }
      bad += !fine;
    }
  return bad;
}

static Image
view_of (cairo_surface_t *surface)
{
  return (Image){cairo_image_surface_get_width (surface), cairo_image_surface_get_height (surface),
                 cairo_image_surface_get_stride (surface), cairo_image_surface_get_data (surface)};
}

/* An independent renderer (librsvg) must make the same picture of our SVG as cairo of the scene. */
START_TEST (svg_looks_like_the_png)
{
  g_autoptr (EnlScene) scene = picture ((EnlThemeName)_i);
  const EnlExport options = {.dpi = 96, .title = "a <title> & more"};
  g_autofree char *png = export_to (scene, "s.png", &options);
  g_autofree char *svg = export_to (scene, "s.svg", &options);
  g_autofree char *other = g_build_filename (folder, "svg.png", NULL);
  g_free (run ("rsvg-convert %s -o %s", svg, other));
  cairo_surface_t *a = cairo_image_surface_create_from_png (png);
  cairo_surface_t *b = cairo_image_surface_create_from_png (other);
  Image ours = view_of (a), theirs = view_of (b);

  ck_assert_int_le (abs (ours.width - theirs.width), 1);
  ck_assert_int_le (abs (ours.height - theirs.height), 1);
  ours.width = theirs.width = MIN (ours.width, theirs.width);
  ours.height = theirs.height = MIN (ours.height, theirs.height);
  int bad = MAX (bad_pixels (&ours, &theirs), bad_pixels (&theirs, &ours));
  ck_assert_msg (bad * 2000 < ours.width * ours.height, "%d bad pixels of %d", bad,
                 ours.width * ours.height);
  cairo_surface_destroy (a);
  cairo_surface_destroy (b);
}
END_TEST

START_TEST (svg_numbers_its_parts_afresh_and_has_a_title)
{
  g_autoptr (EnlScene) scene = picture (ENL_THEME_LIGHT);
  const EnlExport options = {.title = "a <title> & more"};
  g_autoptr (GByteArray) svg = encode (scene, ENL_PICTURE_SVG, &options);
  g_autofree char *text = g_strndup ((const char *)svg->data, svg->len);

  ck_assert_ptr_nonnull (strstr (text, "<title>a &lt;title&gt; &amp; more</title>"));
  ck_assert (!g_regex_match_simple ("surface[0-9]", text, 0, 0));
}
END_TEST

/* Read back with poppler: the words are text, the font is embedded, the page has the asked size. */
START_TEST (pdf_keeps_its_text)
{
  g_autoptr (EnlScene) scene = picture (ENL_THEME_PRINT);
  const EnlExport options = {.width_mm = 120, .title = "penam"};
  g_autofree char *pdf = export_to (scene, "p.pdf", &options);
  g_autofree char *text = run ("pdftotext -layout %s -", pdf, "");
  g_autofree char *fonts = run ("pdffonts %s", pdf, "");
  g_autofree char *info = run ("pdfinfo %s", pdf, "");
  double width = 0;

  ck_assert_ptr_nonnull (strstr (text, "13.0"));
  ck_assert_ptr_nonnull (strstr (text, "\u00B12.4"));
  ck_assert_ptr_nonnull (strstr (fonts, "DejaVuSans"));
  ck_assert (g_regex_match_simple ("TrueType.*yes yes yes", fonts, 0, 0) ||
             g_regex_match_simple ("CID TrueType.*yes yes", fonts, 0, 0));
  ck_assert_ptr_nonnull (strstr (info, "penam"));
  const char *size = strstr (info, "Page size:");
  ck_assert_ptr_nonnull (size);
  ck_assert_int_eq (sscanf (size, "Page size: %lf", &width), 1);
  ck_assert_double_eq_tol (width, 120 / 25.4 * 72, 0.02);
}
END_TEST

static const struct {
  const char *label, *name;
  EnlExport options;
  EnlStatus status;
  const char *word;
} refused[] = {
    {"no picture ending", "a.gif", {.dpi = 0}, ENL_ERROR_RANGE, ".svg"},
    {"no ending", "plain", {.dpi = 0}, ENL_ERROR_RANGE, ".png"},
    {"too wide", "a.png", {.width_mm = 5000}, ENL_ERROR_RANGE, "2000"},
    {"too narrow", "a.svg", {.width_mm = 1}, ENL_ERROR_RANGE, "5 to"},
    {"not a number", "a.pdf", {.width_mm = NAN}, ENL_ERROR_RANGE, "mm"},
    {"negative", "a.pdf", {.width_mm = -80}, ENL_ERROR_RANGE, "mm"},
    {"too fine", "a.png", {.dpi = 10000}, ENL_ERROR_RANGE, "2400"},
    {"too many pixels", "a.png", {.width_mm = 1900, .dpi = 2400}, ENL_ERROR_RANGE, "lower dpi"},
    {"missing folder", "none/a.png", {.dpi = 0}, ENL_ERROR_IO, "folder"},
};

START_TEST (what_cannot_be_made_is_refused)
{
  g_autoptr (EnlScene) scene = picture (ENL_THEME_LIGHT);
  g_autofree char *path = g_build_filename (folder, refused[_i].name, NULL);
  EnlError err = {0};

  ck_assert_msg (enl_scene_export (scene, path, &refused[_i].options, &err) == refused[_i].status,
                 "%s", refused[_i].label);
  ck_assert_msg (strstr (err.advice, refused[_i].word) || strstr (err.text, refused[_i].word),
                 "%s: %s; %s", refused[_i].label, err.text, err.advice);
  ck_assert (!g_file_test (path, G_FILE_TEST_EXISTS));
}
END_TEST

/* A file that is replaced is the old or the new one, and nothing else is left in the folder. */
START_TEST (replacing_leaves_one_whole_file)
{
  g_autoptr (EnlScene) scene = picture (ENL_THEME_LIGHT);
  g_autofree char *path = g_build_filename (folder, "x.png", NULL);
  ck_assert (g_file_set_contents (path, "old", -1, NULL));
  g_free (export_to (scene, "x.png", NULL));
  g_autoptr (GDir) dir = g_dir_open (folder, 0, NULL);
  int files = 0;

  while (g_dir_read_name (dir))
    files++;
  ck_assert_int_eq (files, 1);
  cairo_surface_t *image = cairo_image_surface_create_from_png (path);
  ck_assert_int_eq (cairo_surface_status (image), CAIRO_STATUS_SUCCESS);
  cairo_surface_destroy (image);
}
END_TEST

static Suite *
export_suite (void)
{
  Suite *suite = suite_create ("draw export");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 60);
  tcase_add_checked_fixture (tc, make_folder, remove_folder);
  tcase_add_test (tc, bytes_are_the_same_every_time);
  tcase_add_test (tc, png_has_the_asked_size_and_resolution);
  tcase_add_test (tc, ground_is_painted_or_left_out);
  tcase_add_loop_test (tc, svg_looks_like_the_png, 0, ENL_N_THEMES);
  tcase_add_test (tc, svg_numbers_its_parts_afresh_and_has_a_title);
  tcase_add_test (tc, pdf_keeps_its_text);
  tcase_add_loop_test (tc, what_cannot_be_made_is_refused, 0, (int)ENL_COUNT (refused));
  tcase_add_test (tc, replacing_leaves_one_whole_file);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (export_suite)
