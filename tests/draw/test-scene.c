#include "draw/scene.h"

#include <math.h>
#include <string.h>

#include "draw/paint.h"
#include "draw/plane.h"
#include "draw/text.h"
#include "tests/runner.h"

static const EnlTheme *
light (void)
{
  return enl_theme_get (ENL_THEME_LIGHT);
}

START_TEST (bounds_count_line_width_and_outlines)
{
  g_autoptr (EnlScene) scene = enl_scene_new (light ());

  enl_scene_line (scene, (EnlPoint){10, 20}, (EnlPoint){30, 20}, 4, ENL_TONE_INK);
  EnlRect b = enl_scene_bounds (scene);
  ck_assert_double_eq_tol (b.x, 8, 1e-9);
  ck_assert_double_eq_tol (b.height, 4, 1e-9);
  enl_scene_disc (scene, (EnlPoint){50, 20}, 7, ENL_TONE_SITE)->width = 2;
  b = enl_scene_bounds (scene);
  ck_assert_double_eq_tol (b.x + b.width, 58, 1e-9);
  enl_scene_disc (scene, (EnlPoint){500, 20}, 7, ENL_TONE_SITE)->opacity = 0;
  ck_assert_double_eq_tol (enl_scene_bounds (scene).width, b.width, 1e-9);
}
END_TEST

START_TEST (append_scales_then_moves)
{
  g_autoptr (EnlScene) part = enl_scene_new (light ());
  g_autoptr (EnlScene) whole = enl_scene_new (light ());

  enl_scene_text (part, (EnlPoint){3, 5}, "ab", 10, false, 0, 0, ENL_TONE_INK)->atom = 6;
  enl_scene_append (whole, part, 2, 100, 200);
  const EnlShape *a = enl_scene_shape (part, 0), *b = enl_scene_shape (whole, 0);
  ck_assert_double_eq_tol (b->point[0].x, 106, 1e-9);
  ck_assert_double_eq_tol (b->point[0].y, 210, 1e-9);
  ck_assert_double_eq_tol (b->size, 20, 1e-9);
  ck_assert_double_eq_tol (b->box.width, 2 * a->box.width, 1e-9);
  ck_assert_uint_eq (b->atom, 6);
  /* scaled text has the box that a new text of that size would get */
  EnlRect fresh = enl_text_box (light ()->family, b->point[0], "ab", 20, false, 0, 0);
  ck_assert_double_eq_tol (fresh.width, b->box.width, 0.01);
}
END_TEST

START_TEST (hit_takes_the_topmost_owner_in_reach)
{
  g_autoptr (EnlScene) scene = enl_scene_new (light ());

  enl_scene_line (scene, (EnlPoint){0, 0}, (EnlPoint){100, 0}, 2, ENL_TONE_INK)->bond = 3;
  EnlShape *area = enl_scene_disc (scene, (EnlPoint){0, 0}, 10, ENL_TONE_INK);
  area->atom = 1;
  area->opacity = 0;
  enl_scene_disc (scene, (EnlPoint){50, 0}, 10, ENL_TONE_INK); /* nobody's */
  ck_assert_uint_eq (enl_scene_hit (scene, 50, 1, 2)->bond, 3);
  ck_assert_uint_eq (enl_scene_hit (scene, 4, 0, 2)->atom, 1);
  ck_assert_ptr_null (enl_scene_hit (scene, 50, 40, 2));
  ck_assert_ptr_nonnull (enl_scene_hit (scene, 50, 40, 45));
}
END_TEST

START_TEST (curve_is_hit_along_its_bow)
{
  g_autoptr (EnlScene) scene = enl_scene_new (light ());
  const EnlPoint bow[4] = {{0, 0}, {0, 40}, {60, 40}, {60, 0}};

  enl_scene_curve (scene, bow, 2, ENL_TONE_ARROW)->site = 2;
  ck_assert_ptr_nonnull (enl_scene_hit (scene, 30, 30, 1)); /* its middle is at 3/4 of 40 */
  ck_assert_ptr_null (enl_scene_hit (scene, 30, 3, 5));
}
END_TEST

START_TEST (faults_find_overlap_and_frame)
{
  g_autoptr (EnlScene) scene = enl_scene_new (light ());

  enl_scene_set_size (scene, 120, 40);
  enl_scene_text (scene, (EnlPoint){10, 20}, "left", 14, false, 0, 0.5, ENL_TONE_INK);
  enl_scene_text (scene, (EnlPoint){80, 20}, "ok", 14, false, 0, 0.5, ENL_TONE_INK);
  ck_assert_ptr_null (enl_scene_faults (scene));
  enl_scene_text (scene, (EnlPoint){20, 22}, "over", 14, false, 0, 0.5, ENL_TONE_INK);
  g_autofree char *overlap = enl_scene_faults (scene);
  ck_assert_ptr_nonnull (overlap);
  ck_assert_ptr_nonnull (strstr (overlap, "\"left\" and \"over\" overlap"));
  enl_scene_disc (scene, (EnlPoint){118, 20}, 5, ENL_TONE_INK);
  g_autofree char *frame = enl_scene_faults (scene);
  ck_assert_ptr_nonnull (strstr (frame, "leaves the frame"));
}
END_TEST

START_TEST (dump_has_a_line_a_shape)
{
  g_autoptr (EnlScene) scene = enl_scene_new (light ());

  enl_scene_line (scene, (EnlPoint){1.234, -0.001}, (EnlPoint){5, 6}, 1.5, ENL_TONE_MUTED)->dash =
      ENL_DASH_DOTTED;
  enl_scene_text (scene, (EnlPoint){7, 8}, "a\nb", 9, true, 0.5, 1, ENL_TONE_SITE)->site = 4;
  g_autofree char *dump = enl_scene_dump (scene);
  ck_assert_str_eq (dump, "line muted 1.23 0.00 5.00 6.00 width 1.50 dotted\n"
                          "text site 7.00 8.00 size 9.00 bold align 0.50 1.00 site=4 \"a|b\"\n");
}
END_TEST

/* Pango's own markup for subscripts changes with the scale of the context; ours must not. */
START_TEST (text_measures_do_not_depend_on_scripts_or_targets)
{
  g_autofree char *lowered = enl_text_lowered ("2", 20);
  g_autofree char *markup = g_strconcat ("CH", lowered, NULL);
  double w, h, plain_w, plain_h;

  enl_text_measure (light ()->family, markup, 20, false, &w, &h);
  enl_text_measure (light ()->family, "CH", 20, false, &plain_w, &plain_h);
  ck_assert_double_eq_tol (h, plain_h, 1e-6);
  ck_assert_double_gt (w, plain_w + 5);
  ck_assert_double_lt (w, plain_w + 12);
  EnlRect plain = enl_text_box (light ()->family, (EnlPoint){0, 0}, "CH", 20, false, 0, 0);
  EnlRect both = enl_text_box (light ()->family, (EnlPoint){0, 0}, markup, 20, false, 0, 0);
  ck_assert_double_eq_tol (plain.y, both.y, 0.05);                          /* same capitals */
  ck_assert_double_gt (both.y + both.height, plain.y + plain.height + 1.5); /* lowered digit */
}
END_TEST

START_TEST (wrapped_text_keeps_to_the_width)
{
  const char plain[] = "alpha to both C=O & beside <nothing> else";
  g_autofree char *markup = enl_text_wrap (light ()->family, plain, 12, false, 120);
  double w, h, line;

  enl_text_measure (light ()->family, markup, 12, false, &w, &h);
  line = enl_text_line_height (light ()->family, 12);
  ck_assert_double_le (w, 120.01);
  ck_assert_double_gt (h, 1.9 * line);
  ck_assert_ptr_nonnull (strstr (markup, "&amp;"));
  ck_assert_ptr_nonnull (strchr (markup, '\n'));
}
END_TEST

START_TEST (a_long_word_is_broken)
{
  const char plain[] = "of CC(=O)CC(=O)CC(=O)CC(=O)CC(=O)CC(C)=O here";
  g_autofree char *markup = enl_text_wrap (light ()->family, plain, 12, false, 100);
  double w, h;

  enl_text_measure (light ()->family, markup, 12, false, &w, &h);
  ck_assert_double_le (w, 100.01);
  g_strdelimit (markup, "\n", ' ');
  g_auto (GStrv) part = g_strsplit (markup, " ", -1);
  g_autofree char *together = g_strjoinv ("", part);
  ck_assert_str_eq (together, "ofCC(=O)CC(=O)CC(=O)CC(=O)CC(=O)CC(C)=Ohere");
}
END_TEST

START_TEST (clipping_and_crossing)
{
  const EnlRect box = {10, 10, 20, 10};

  ck_assert_double_eq_tol (enl_segment_inside ((EnlPoint){0, 15}, (EnlPoint){100, 15}, box), 20,
                           1e-9);
  ck_assert_double_eq_tol (enl_segment_inside ((EnlPoint){12, 12}, (EnlPoint){15, 16}, box), 5,
                           1e-9);
  ck_assert_double_eq_tol (enl_segment_inside ((EnlPoint){0, 5}, (EnlPoint){100, 5}, box), 0, 1e-9);
  ck_assert (
      enl_lines_cross ((EnlPoint){0, 0}, (EnlPoint){9, 9}, (EnlPoint){0, 9}, (EnlPoint){9, 0}));
  ck_assert (
      !enl_lines_cross ((EnlPoint){0, 0}, (EnlPoint){9, 9}, (EnlPoint){0, 0}, (EnlPoint){9, 0}));
}
END_TEST

static Suite *
scene_suite (void)
{
  Suite *suite = suite_create ("draw scene");
  TCase *tc = tcase_create ("all");

  tcase_add_test (tc, bounds_count_line_width_and_outlines);
  tcase_add_test (tc, append_scales_then_moves);
  tcase_add_test (tc, hit_takes_the_topmost_owner_in_reach);
  tcase_add_test (tc, curve_is_hit_along_its_bow);
  tcase_add_test (tc, faults_find_overlap_and_frame);
  tcase_add_test (tc, dump_has_a_line_a_shape);
  tcase_add_test (tc, text_measures_do_not_depend_on_scripts_or_targets);
  tcase_add_test (tc, wrapped_text_keeps_to_the_width);
  tcase_add_test (tc, a_long_word_is_broken);
  tcase_add_test (tc, clipping_and_crossing);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (scene_suite)
