#include "draw/substrates-sheet.h"

#include <math.h>
#include <string.h>

#include "draw/badge.h"
#include "draw/effect-bar.h"
#include "draw/whisker.h"
#include "tests/draw/sample.h"
#include "tests/runner.h"

/* ---- whiskers ---- */

START_TEST (axis_holds_values_in_whole_fives)
{
  const EnlEstimate e[] = {{.value = 13.3, .low = 11.2, .high = 15.4},
                           {.value = 26.5, .low = 26.5, .high = 26.5},
                           {.value = 30.1, .low = 4, .high = 77}};
  double low = 1, high = 0;

  enl_whisker_range (e, 2, &low, &high);
  ck_assert_double_eq_tol (low, 10, 1e-9);
  ck_assert_double_eq_tol (high, 30, 1e-9);
  /* a hopeless interval does not blow up the axis: 10 units beyond the outermost value */
  enl_whisker_range (e, 3, &low, &high);
  ck_assert_double_eq_tol (low, 0, 1e-9);
  ck_assert_double_eq_tol (high, 45, 1e-9);
}
END_TEST

static const EnlShape *
find_kind (const EnlScene *scene, EnlShapeKind kind, EnlTone tone)
{
  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (shape->kind == kind && shape->tone == tone)
      return shape;
  }
  return NULL;
}

START_TEST (mark_and_bar_stand_at_their_values)
{
  const EnlTheme *theme = enl_theme_get (ENL_THEME_LIGHT);
  const EnlEstimate e = {.value = 20, .low = 15, .high = 30, .basis = ENL_BASIS_ESTIMATED};
  g_autoptr (EnlScene) scene = enl_whisker_scene (&e, 10, 30, 200, 20, false, theme);
  const EnlShape *bar = find_kind (scene, ENL_SHAPE_RECT, ENL_TONE_SITE);
  const EnlShape *mark = find_kind (scene, ENL_SHAPE_DISC, ENL_TONE_SITE);
  const EnlShape *rule = find_kind (scene, ENL_SHAPE_LINE, ENL_TONE_MUTED);
  double x0 = rule->point[0].x, x1 = rule->point[1].x;

  ck_assert_double_eq_tol (mark->point[0].x, (x0 + x1) / 2, 1e-6);
  ck_assert_double_eq_tol (bar->point[0].x, x0 + (x1 - x0) / 4, 1e-6);
  ck_assert_double_eq_tol (bar->point[1].x, x1, 1e-6);
  ck_assert_double_gt (mark->width, 0); /* estimated: an outline */
  g_autofree char *faults = enl_scene_faults (scene);
  ck_assert_msg (!faults, "%s", faults);
}
END_TEST

/* ---- effects ---- */

/* Where the shapes of the bar's tone reach, and how many there are. */
static uint32_t
reach_of_effect (double effect, double most, double *left, double *right)
{
  const EnlTheme *theme = enl_theme_get (ENL_THEME_LIGHT);
  g_autoptr (EnlScene) scene = enl_effect_bar_scene (effect, most, 100, 14, theme);
  g_autofree char *faults = enl_scene_faults (scene);
  uint32_t n = 0;

  ck_assert_msg (!faults, "%s", faults);
  *left = 100, *right = 0;
  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (shape->tone != ENL_TONE_SITE)
      continue;
    *left = fmin (*left, shape->box.x);
    *right = fmax (*right, shape->box.x + shape->box.width);
    n++;
  }
  return n;
}

START_TEST (effects_point_to_their_side)
{
  double left, right, small;

  ck_assert_uint_eq (reach_of_effect (-7.3, 12.6, &left, &right), 2); /* shaft and head */
  ck_assert_double_lt (left, 50 - 0.5 * 50 * 7.3 / 12.6);
  ck_assert_double_le (right, 50 + 1e-9);
  small = left;
  reach_of_effect (-12.6, 12.6, &left, &right);
  ck_assert_double_lt (left, small);
  ck_assert_double_ge (left, 0);
  reach_of_effect (7.3, 12.6, &left, &right);
  ck_assert_double_ge (left, 50 - 1e-9);
  ck_assert_double_eq_tol (right, 100 - small, 1e-6);
  reach_of_effect (99, 12.6, &left, &right); /* never beyond the picture */
  ck_assert_double_le (right, 100);
  ck_assert_uint_eq (reach_of_effect (0.01, 12.6, &left, &right), 1); /* a dot in the middle */
  ck_assert_double_eq_tol (left + right, 100, 1e-6);
}
END_TEST

START_TEST (a_bar_that_goes_on_has_a_head)
{
  const EnlTheme *theme = enl_theme_get (ENL_THEME_LIGHT);
  const EnlEstimate e = {.value = 20, .low = 12, .high = 40};
  g_autoptr (EnlScene) inside = enl_whisker_scene (&e, 10, 40, 200, 20, false, theme);
  g_autoptr (EnlScene) cut = enl_whisker_scene (&e, 10, 30, 200, 20, true, theme);

  ck_assert_ptr_null (find_kind (inside, ENL_SHAPE_POLYGON, ENL_TONE_SITE));
  ck_assert_ptr_nonnull (find_kind (cut, ENL_SHAPE_POLYGON, ENL_TONE_ACTIVE));
}
END_TEST

/* ---- badges: the shape says the basis without colour ---- */

START_TEST (shapes_tell_the_basis)
{
  const EnlTheme *theme = enl_theme_get (ENL_THEME_LIGHT);

  for (int basis = 0; basis < ENL_N_BASES_OF_VALUE; basis++) {
    const EnlEstimate e = {.value = 20, .low = 18, .high = 22, .basis = (EnlBasis)basis};
    const EnlBadge badge = {.number = 3, .estimate = &e, .site = 0, .atom = 0};
    g_autoptr (EnlScene) scene = enl_scene_new (theme);
    enl_badge_draw_mark (scene, &badge, (EnlPoint){0, 0});
    const EnlShape *disc = find_kind (scene, ENL_SHAPE_DISC, ENL_TONE_SITE);
    const EnlShape *square = find_kind (scene, ENL_SHAPE_RECT, ENL_TONE_SITE);
    ck_assert_int_eq (square != NULL, basis == ENL_BASIS_LAB);
    ck_assert_int_eq (disc != NULL, basis != ENL_BASIS_LAB);
    if (disc)
      ck_assert_int_eq (disc->width > 0, basis == ENL_BASIS_ESTIMATED);
  }
}
END_TEST

static const struct {
  double value;
  const char *text;
} pka[] = {{14.2, "14.2"}, {-1.74, "\u22121.7"}, {-0.04, "0.0"}, {35, "35.0"}, {9.96, "10.0"}};

START_TEST (values_have_one_decimal_and_a_real_minus)
{
  g_autofree char *text = enl_pka_text (pka[_i].value);

  ck_assert_str_eq (text, pka[_i].text);
}
END_TEST

START_TEST (measured_values_have_no_interval_text)
{
  const EnlEstimate measured = {.value = 20, .low = 19, .high = 21};
  const EnlEstimate guess = {.value = 20, .low = 18.5, .high = 22.4, .basis = ENL_BASIS_ESTIMATED};
  g_autofree char *text = enl_pka_error_text (&guess);

  ck_assert_ptr_null (enl_pka_error_text (&measured));
  ck_assert_str_eq (text, "\u00B12.4");
}
END_TEST

/* ---- the sheet, with the sites that the core finds ---- */

static const char *const substrate[] = {
    "CCOC(=O)CC(C)=O", "C[C@]12CC[C@H]3[C@@H](CCC4=CC(=O)CC[C@]34C)[C@@H]1CC[C@@H]2O",
    "O=Cc1ccccc1", "CC(=O)CC(=O)CC(=O)CC(C)=O", "OC[C@H]1OC(O)[C@H](O)[C@@H](O)[C@@H]1O"};

typedef struct {
  EnlSubstrateCard card[ENL_COUNT (substrate)];
} Cards;

static void
fill_cards (Cards *cards)
{
  for (size_t i = 0; i < ENL_COUNT (substrate); i++) {
    EnlMolecule *mol = sample_molecule (substrate[i]);
    EnlSites *sites = NULL;
    EnlError err;
    ck_assert_int_eq (enl_sites_find (mol, &sites, &err), ENL_OK);
    EnlEstimate *e = g_new0 (EnlEstimate, sites->n_sites + 1);
    uint32_t *rank = g_new0 (uint32_t, sites->n_sites + 1);
    for (uint32_t s = 0; s < sites->n_sites; s++) {
      e[s] = (EnlEstimate){.value = 15.0 + s,
                           .low = 12.6 + s,
                           .high = 17.1 + s,
                           .basis = (EnlBasis)(s % ENL_N_BASES_OF_VALUE)};
      rank[s] = s;
    }
    cards->card[i] = (EnlSubstrateCard){.title = substrate[i],
                                        .mol = mol,
                                        .sites = sites,
                                        .estimate = e,
                                        .rank = rank,
                                        .selected = 0};
  }
}

static void
clear_cards (Cards *cards)
{
  for (size_t i = 0; i < ENL_COUNT (substrate); i++) {
    enl_molecule_free ((EnlMolecule *)cards->card[i].mol);
    enl_sites_free ((EnlSites *)cards->card[i].sites);
    g_free ((EnlEstimate *)cards->card[i].estimate);
    g_free ((uint32_t *)cards->card[i].rank);
  }
}

START_TEST (sheet_is_clear_in_every_theme)
{
  Cards cards;
  fill_cards (&cards);
  for (uint32_t columns = 0; columns < 3; columns++) {
    const EnlSubstratesSheet sheet = {.card = cards.card,
                                      .n_cards = ENL_COUNT (substrate),
                                      .columns = columns,
                                      .max_sites = 4,
                                      .caption = "invented values & <none> of them measured"};
    g_autoptr (EnlScene) scene = enl_substrates_sheet (&sheet, enl_theme_get ((EnlThemeName)_i));
    g_autofree char *faults = enl_scene_faults (scene);
    g_autofree char *dump = enl_scene_dump (scene);
    ck_assert_msg (!faults, "%s", faults);
    ck_assert_ptr_nonnull (strstr (dump, "substrate=4"));
    ck_assert_ptr_nonnull (strstr (dump, "No enolate: ")); /* the aldehyde says why */
    ck_assert_ptr_nonnull (strstr (dump, "&amp; &lt;none&gt;"));
    ck_assert_ptr_nonnull (strstr (dump, "weaker site"));
  }
  clear_cards (&cards);
}
END_TEST

START_TEST (the_caption_names_the_footing)
{
  const EnlTheme *theme = enl_theme_get (ENL_THEME_PRINT);
  Cards cards;

  fill_cards (&cards);
  EnlSubstratesSheet sheet = {.card = cards.card, .n_cards = 1, .solvent = ENL_SOLVENT_THF};
  g_autoptr (EnlScene) thf = enl_substrates_sheet (&sheet, theme);
  sheet.solvent = ENL_SOLVENT_DMSO;
  g_autoptr (EnlScene) dmso = enl_substrates_sheet (&sheet, theme);
  g_autofree char *thf_dump = enl_scene_dump (thf);
  g_autofree char *dmso_dump = enl_scene_dump (dmso);
  ck_assert_ptr_nonnull (strstr (thf_dump, "pKa in THF (DMSO-based footing)"));
  ck_assert_ptr_null (strstr (dmso_dump, "footing"));
  clear_cards (&cards);
}
END_TEST

START_TEST (empty_and_bare_sheets_are_fine)
{
  const EnlTheme *theme = enl_theme_get (ENL_THEME_LIGHT);
  g_autoptr (EnlMolecule) mol = sample_molecule ("C1CCCCC1");
  const EnlSubstrateCard card = {.mol = mol, .selected = ENL_NONE};
  const EnlSubstratesSheet none = {.n_cards = 0}, bare = {.card = &card, .n_cards = 1};
  g_autoptr (EnlScene) a = enl_substrates_sheet (&none, theme);
  g_autoptr (EnlScene) b = enl_substrates_sheet (&bare, theme);

  ck_assert_double_gt (enl_scene_frame (a).width, 1);
  ck_assert_double_gt (enl_scene_frame (a).height, 1);
  ck_assert_ptr_null (enl_scene_faults (b));
}
END_TEST

static Suite *
sheets_suite (void)
{
  Suite *suite = suite_create ("draw sheets");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 60);
  tcase_add_test (tc, axis_holds_values_in_whole_fives);
  tcase_add_test (tc, mark_and_bar_stand_at_their_values);
  tcase_add_test (tc, a_bar_that_goes_on_has_a_head);
  tcase_add_test (tc, effects_point_to_their_side);
  tcase_add_test (tc, shapes_tell_the_basis);
  tcase_add_loop_test (tc, values_have_one_decimal_and_a_real_minus, 0, (int)ENL_COUNT (pka));
  tcase_add_test (tc, measured_values_have_no_interval_text);
  tcase_add_loop_test (tc, sheet_is_clear_in_every_theme, 0, ENL_N_THEMES);
  tcase_add_test (tc, the_caption_names_the_footing);
  tcase_add_test (tc, empty_and_bare_sheets_are_fine);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (sheets_suite)
