#include "draw/forms-sheet.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "draw/plane.h"
#include "tests/draw/sample.h"
#include "tests/runner.h"

static const struct {
  const char *label, *smiles;
  uint32_t atom; /* acidic atom */
} anion[] = {
    {"ethyl acetoacetate", "CCOC(=O)CC(C)=O", 5},
    {"acetone", "CC(C)=O", 0},
    {"2-methylcyclohexanone, CH2 side", "CC1CCCCC1=O", 5},
    {"phenylacetone", "CC(=O)Cc1ccccc1", 3},
    {"nitromethane", "C[N+](=O)[O-]", 0},
    {"malononitrile", "N#CCC#N", 2},
    {"cyclopentadiene", "C1C=CC=C1", 0},
    {"enone, gamma", "CC(=O)C=CC", 5},
    {"phenol", "Oc1ccccc1", 0},
    {"imide", "O=C1CCC(=O)N1", 6},
};

static EnlForms *
forms_of (const EnlMolecule *mol, uint32_t atom)
{
  EnlForms *forms = NULL;
  EnlError err;

  ck_assert_msg (enl_forms_of_site (mol, atom, &forms, &err) == ENL_OK, "%s", err.text);
  return forms;
}

static EnlPoint
place_of (const EnlMolecule *layout, uint32_t a, uint32_t b, double px)
{
  const EnlAtom *p = enl_molecule_atom (layout, a);
  const EnlAtom *q = b == ENL_NONE ? p : enl_molecule_atom (layout, b);

  return (EnlPoint){(p->x + q->x) / 2 * px, -(p->y + q->y) / 2 * px};
}

/* The n-th shape of a kind in the tone of arrows. */
static const EnlShape *
arrow_part (const EnlScene *scene, EnlShapeKind kind, uint32_t n)
{
  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (shape->tone == ENL_TONE_ARROW && shape->kind == kind && n-- == 0)
      return shape;
  }
  return NULL;
}

static void
check_clear_of_texts (const EnlScene *scene, const EnlShape *curve, const char *label)
{
  for (int k = 1; k < 20; k++) {
    EnlPoint p = enl_curve_at (curve->point, k / 20.0);
    for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
      const EnlShape *text = enl_scene_shape (scene, i);
      ck_assert_msg (text->kind != ENL_SHAPE_TEXT || enl_rect_distance (text->box, p) > 0.3,
                     "%s: an arrow crosses \"%s\"", label, text->text);
    }
  }
}

/* Arrows start at their pair or bond, end at their bond or atom, and leave the labels alone. */
START_TEST (arrows_lead_from_source_to_target)
{
  const EnlTheme *theme = enl_theme_get (ENL_THEME_LIGHT);
  double px = theme->bond_length;
  g_autoptr (EnlMolecule) mol = sample_molecule (anion[_i].smiles);
  g_autoptr (EnlForms) forms = forms_of (mol, anion[_i].atom);
  g_autoptr (EnlMolecule) first = enl_forms_molecule (forms, 0);

  ck_assert (forms->n_forms > 1 || forms->form[0].copies > 1);
  for (uint32_t f = 1; f < forms->n_forms; f++) {
    const EnlForm *form = &forms->form[f];
    g_autoptr (EnlScene) scene = enl_form_scene (first, mol, form->arrow, form->n_arrows, theme);
    for (uint32_t a = 0; a < form->n_arrows; a++) {
      const EnlArrow *arrow = &form->arrow[a];
      const EnlShape *shaft = arrow_part (scene, ENL_SHAPE_CURVE, a);
      const EnlShape *head = arrow_part (scene, ENL_SHAPE_POLYGON, a);
      ck_assert (shaft && head);
      EnlPoint source = place_of (mol, arrow->from_a, arrow->from_b, px);
      EnlPoint target = place_of (mol, arrow->to_a, arrow->to_b, px);
      double start = enl_point_distance (shaft->point[0], source);
      double end = enl_point_distance (head->point[0], target);
      ck_assert_msg (start < 0.85 * px, "%s: starts %.0f px off", anion[_i].label, start);
      ck_assert_msg (end < 0.5 * px, "%s: ends %.0f px off", anion[_i].label, end);
      check_clear_of_texts (scene, shaft, anion[_i].label);
    }
    ck_assert_ptr_null (arrow_part (scene, ENL_SHAPE_CURVE, form->n_arrows));
  }
}
END_TEST

START_TEST (every_form_is_clear)
{
  g_autoptr (EnlMolecule) mol = sample_molecule (anion[_i].smiles);
  g_autoptr (EnlForms) forms = forms_of (mol, anion[_i].atom);

  for (EnlThemeName name = 0; name < ENL_N_THEMES; name++)
    for (uint32_t f = 0; f < forms->n_forms; f++) {
      g_autoptr (EnlMolecule) form = enl_forms_molecule (forms, f);
      g_autoptr (EnlScene) scene = enl_form_scene (form, mol, NULL, 0, enl_theme_get (name));
      g_autofree char *faults = enl_scene_faults (scene);
      g_autofree char *collisions = sample_collisions (scene);
      ck_assert_msg (!faults && !collisions, "%s, form %u: %s%s", anion[_i].label, f,
                     faults ? faults : "", collisions ? collisions : "");
    }
}
END_TEST

static double
read_charge (const char *text)
{
  static const char minus[] = "\u2212";

  if (strncmp (text, minus, strlen (minus)) == 0)
    return -g_ascii_strtod (text + strlen (minus), NULL);
  ck_assert_int_eq (*text, '+');
  return g_ascii_strtod (text + 1, NULL);
}

/* Area of the disc per charge is the same everywhere, and the number beside it is the charge. */
START_TEST (hybrid_shows_charge_by_area_and_number)
{
  const EnlTheme *theme = enl_theme_get (ENL_THEME_DARK);
  g_autoptr (EnlMolecule) mol = sample_molecule (anion[_i].smiles);
  g_autoptr (EnlForms) forms = forms_of (mol, anion[_i].atom);
  g_autoptr (EnlScene) scene = enl_hybrid_scene (forms, mol, theme);
  g_autofree char *faults = enl_scene_faults (scene);
  uint32_t discs = 0, numbers = 0;
  double scale = 0;

  ck_assert_msg (!faults, "%s: %s", anion[_i].label, faults);
  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *s = enl_scene_shape (scene, i);
    if (s->tone != ENL_TONE_CHARGE && s->tone != ENL_TONE_CHARGE_PLUS)
      continue;
    double charge = forms->charge[s->atom];
    ck_assert_int_eq (s->tone == ENL_TONE_CHARGE, charge < 0);
    if (s->kind == ENL_SHAPE_TEXT) {
      numbers++;
      ck_assert_double_eq_tol (read_charge (s->text), charge, 0.0051);
    } else if (s->width == 0) {
      double here = s->radius * s->radius / fabs (charge);
      ck_assert (discs == 0 || fabs (here - scale) < 1e-6 * scale);
      scale = here;
      discs++;
    }
  }
  ck_assert_uint_gt (discs, 1);
  ck_assert_uint_eq (discs, numbers);
}
END_TEST

START_TEST (sheet_tells_all_weights)
{
  g_autoptr (EnlMolecule) mol = sample_molecule (anion[_i].smiles);
  g_autoptr (EnlForms) forms = forms_of (mol, anion[_i].atom);
  const EnlFormsSheet sheet = {.title = anion[_i].label, .forms = forms, .layout = mol};

  for (EnlThemeName name = 0; name < ENL_N_THEMES; name++) {
    g_autoptr (EnlScene) scene = enl_forms_sheet (&sheet, enl_theme_get (name));
    g_autofree char *faults = enl_scene_faults (scene);
    double sum = 0;
    uint32_t cards = 0;
    ck_assert_msg (!faults, "%s: %s", anion[_i].label, faults);
    for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
      const EnlShape *s = enl_scene_shape (scene, i);
      cards += s->kind == ENL_SHAPE_RECT && s->tone == ENL_TONE_PANEL;
      if (s->kind == ENL_SHAPE_TEXT && g_str_has_suffix (s->text, "\u00A0%") && s->text[0] != 'u')
        sum += g_ascii_strtod (s->text, NULL);
    }
    ck_assert_uint_eq (cards, forms->n_forms + 1);
    ck_assert_double_eq_tol (sum, 100, 0.51 * forms->n_forms);
  }
}
END_TEST

START_TEST (a_long_sheet_says_what_it_leaves_out)
{
  g_autoptr (EnlMolecule) mol = sample_molecule ("CC(=O)Cc1ccccc1");
  g_autoptr (EnlForms) forms = forms_of (mol, 3);
  const EnlFormsSheet sheet = {.forms = forms, .layout = mol, .max_forms = 2};
  g_autoptr (EnlScene) scene = enl_forms_sheet (&sheet, enl_theme_get (ENL_THEME_LIGHT));
  g_autofree char *dump = enl_scene_dump (scene);
  g_autofree char *words = g_strdup_printf ("and %u more forms, together", forms->n_forms - 2);

  ck_assert_uint_gt (forms->n_forms, 3);
  ck_assert_ptr_nonnull (strstr (dump, words));
}
END_TEST

static Suite *
forms_suite (void)
{
  Suite *suite = suite_create ("draw forms");
  TCase *tc = tcase_create ("all");
  const int n = (int)ENL_COUNT (anion);

  tcase_set_timeout (tc, 60);
  tcase_add_loop_test (tc, arrows_lead_from_source_to_target, 0, n);
  tcase_add_loop_test (tc, every_form_is_clear, 0, n);
  tcase_add_loop_test (tc, hybrid_shows_charge_by_area_and_number, 0, n);
  tcase_add_loop_test (tc, sheet_tells_all_weights, 0, n);
  tcase_add_test (tc, a_long_sheet_says_what_it_leaves_out);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (forms_suite)
