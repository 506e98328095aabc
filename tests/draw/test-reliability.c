#include "draw/reliability-sheet.h"

#include <math.h>

#include "core/acidity/validate.h"
#include "draw/paint.h"
#include "tests/draw/sample.h"
#include "tests/runner.h"

/* An invented trial with every class in both solvents. */
#define N 120
static EnlReliabilityPoint point[N];

static void
setup (void)
{
  for (int i = 0; i < N; i++)
    point[i] = (EnlReliabilityPoint){.solvent = (EnlSolvent)(i % 2),
                                     .class_of = (EnlAcidClass)(i / 2 % ENL_N_CLASSES),
                                     .published = -4 + 0.31 * i,
                                     .left_out = -4 + 0.31 * i + 3 * sin (1.7 * i),
                                     .half = 2.7};
}

static EnlScene *
draw (EnlThemeName name)
{
  const EnlReliabilitySheet sheet = {point, N, "each compound left out in turn"};

  return enl_reliability_sheet (&sheet, enl_theme_get (name));
}

START_TEST (texts_stand_clear)
{
  g_autoptr (EnlScene) scene = draw ((EnlThemeName)_i);
  g_autofree char *faults = enl_scene_faults (scene);

  ck_assert_msg (!faults, "%s", faults);
}
END_TEST

/* One mark for a row in each of the two kinds of panel that show rows. */
START_TEST (every_row_has_its_marks)
{
  g_autoptr (EnlScene) scene = draw (ENL_THEME_LIGHT);
  uint32_t place[N] = {0}, width[N] = {0};

  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (shape->site != ENL_NONE)
      place[shape->site]++;
    if (shape->atom != ENL_NONE)
      width[shape->atom]++;
  }
  for (int i = 0; i < N; i++) {
    ck_assert_uint_eq (place[i], 1);
    ck_assert_uint_eq (width[i], 1);
  }
}
END_TEST

static const EnlShape *
mark_of (const EnlScene *scene, uint32_t row)
{
  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++)
    if (enl_scene_shape (scene, i)->site == row)
      return enl_scene_shape (scene, i);
  ck_abort_msg ("no mark for row %u", row);
  return NULL;
}

static EnlPoint
middle (const EnlShape *shape)
{
  return (EnlPoint){shape->box.x + shape->box.width / 2, shape->box.y + shape->box.height / 2};
}

/* A row that is hit exactly lies on the solid diagonal; one that is off does not. */
START_TEST (exact_estimates_lie_on_the_diagonal)
{
  point[10].left_out = point[10].published;
  point[20].left_out = point[20].published + 4;
  g_autoptr (EnlScene) scene = draw (ENL_THEME_LIGHT);
  const EnlShape *diagonal = NULL;

  for (uint32_t i = 0; i < enl_scene_shapes (scene) && !diagonal; i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (shape->kind == ENL_SHAPE_LINE && shape->tone == ENL_TONE_INK)
      diagonal = shape;
  }
  ck_assert_ptr_nonnull (diagonal);
  EnlPoint a = diagonal->point[0], b = diagonal->point[1];
  for (uint32_t row = 10; row <= 20; row += 10) {
    EnlPoint m = middle (mark_of (scene, row));
    double away = (m.y - a.y) - (m.x - a.x) * (b.y - a.y) / (b.x - a.x);
    if (row == 10)
      ck_assert_double_lt (fabs (away), 1.5); /* a triangle's box is not centred on it */
    else
      ck_assert_double_lt (away, -20);
  }
}
END_TEST

/* Shape tells the classes apart without colour. */
START_TEST (classes_differ_by_shape)
{
  g_autoptr (EnlScene) scene = draw (ENL_THEME_LIGHT);
  const EnlShape *mark[ENL_N_CLASSES];

  for (uint32_t k = 0; k < ENL_N_CLASSES; k++)
    mark[k] = mark_of (scene, 2 * k);
  for (int a = 0; a < ENL_N_CLASSES; a++)
    for (int b = 0; b < a; b++) {
      bool same = mark[a]->kind == mark[b]->kind && mark[a]->n_points == mark[b]->n_points &&
                  (mark[a]->width > 0) == (mark[b]->width > 0);
      ck_assert_msg (!same, "%s and %s", enl_acid_class_text ((EnlAcidClass)a),
                     enl_acid_class_text ((EnlAcidClass)b));
    }
}
END_TEST

/* Two-sided normal quantiles: 1.6449 for 90 %, 1.9600 for 95 % and 2.5758 for 99 % (any table of
 * the normal distribution). */
START_TEST (levels_follow_the_normal_law)
{
  ck_assert_double_eq_tol (enl_interval_scale (0.90), 1, 1e-12);
  ck_assert_double_eq_tol (enl_interval_scale (0.95), 1.9600 / 1.6449, 1e-4);
  ck_assert_double_eq_tol (enl_interval_scale (0.99), 2.5758 / 1.6449, 1e-4);
}
END_TEST

START_TEST (nothing_to_show_is_a_picture_too)
{
  const EnlReliabilitySheet sheet = {NULL, 0, "nothing"};
  g_autoptr (EnlScene) scene = enl_reliability_sheet (&sheet, enl_theme_get (ENL_THEME_PRINT));
  g_autoptr (GByteArray) picture = NULL;
  EnlError err;

  ck_assert_int_eq (
      enl_scene_encode (scene, ENL_PICTURE_SVG, &(EnlExport){.title = "empty"}, &picture, &err),
      ENL_OK);
}
END_TEST

static Suite *
reliability_suite (void)
{
  Suite *suite = suite_create ("draw reliability");
  TCase *tc = tcase_create ("all");

  tcase_add_checked_fixture (tc, setup, NULL);
  tcase_add_loop_test (tc, texts_stand_clear, 0, ENL_N_THEMES);
  tcase_add_test (tc, every_row_has_its_marks);
  tcase_add_test (tc, exact_estimates_lie_on_the_diagonal);
  tcase_add_test (tc, classes_differ_by_shape);
  tcase_add_test (tc, levels_follow_the_normal_law);
  tcase_add_test (tc, nothing_to_show_is_a_picture_too);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (reliability_suite)
