/* The composition curve and the matrix of bases as pictures, with the whole knowledge behind. */
#include <math.h>
#include <string.h>

#include "core/bases/equilibrium.h"
#include "draw/curve-scene.h"
#include "draw/matrix-scene.h"
#include "draw/plane.h"
#include "draw/text.h"
#include "draw/verdict-mark.h"
#include "tests/core/bases/ask.h"
#include "tests/runner.h"

/* Invented names; the long one has a word that no column can hold. */
#define LONG_NAME                                                                                  \
  "batch 17 of the 3-oxo ester with a name as nobody would write it: "                             \
  "ethyl-2-cyclohexyl-4-(3,5-dimethoxyphenyl)-3-oxobutanoate-from-the-second-crop"

/* The last but one has twelve sites, the last none. */
static const struct {
  const char *smiles, *name;
} subject[] = {
    {"CC(=O)c1ccccc1", "acetophenone"},
    {"CCOC(=O)C(C1CCCCC1)C(=O)Cc1cc(OC)cc(OC)c1", LONG_NAME},
    {"CC(=O)CC(=O)OCC", "ethyl acetoacetate"},
    {"Oc1ccc(cc1)C(C)=O", "4'-hydroxyacetophenone"},
    {"CC1(C)C2CCC1(C)C(=O)C2", "camphor & more <odd> \"signs\""},
    {"C[N+](=O)[O-]", "nitromethane"},
    {"CC(=O)CCC(=O)CCC(=O)OCC(=O)CC(=O)CCC(=O)NCC(=O)Nc1ccc(O)cc1", "many sites"},
    {"O=C(c1ccccc1)c1ccccc1", "benzophenone"},
};

static EnlAnalysis *
analyse (const char *smiles, EnlSolvent solvent)
{
  EnlMolecule *mol = read_structure (smiles);
  EnlAnalysis *a;

  ck_assert_int_eq (enl_analysis_new (knowledge, mol, solvent, true, &a, NULL), ENL_OK);
  enl_molecule_free (mol);
  return a;
}

static void
expect_no_faults (const EnlScene *scene, const char *what, int theme)
{
  g_autofree char *faults = enl_scene_faults (scene);

  ck_assert_msg (!faults, "%s in %s: %s", what, enl_theme_id ((EnlThemeName)theme), faults);
}

/* ---- curves ---- */

static EnlCurve *
curve_for (const EnlAnalysis *a, const EnlConditions *c, const char *base)
{
  g_autoptr (EnlComparison) comparison = NULL;
  EnlQuestion q = enl_analysis_question (a, knowledge, enl_analysis_site (a, ENL_NONE), c);
  int wanted = enl_base_table_find (q.bases, base);
  EnlCurve *curve = NULL;

  ck_assert_int_eq (enl_bases_compare (&q, &comparison, NULL), ENL_OK);
  for (uint32_t i = 0; i < comparison->n_candidates; i++)
    if ((int)comparison->candidate[i].base == wanted)
      ck_assert_int_eq (
          enl_curve_new (&q, &comparison->candidate[i], ENL_SWEEP_POINTS, &curve, NULL), ENL_OK);
  ck_assert_ptr_nonnull (curve);
  return curve;
}

START_TEST (curves_have_no_faults)
{
  static const char *const base[] = {"naotbu", "nah", "dbu", "k2co3", "soft_bu2botf_dipea"};
  static const double size[][2] = {{0, 0}, {620, 220}, {420, 180}, {1200, 700}};
  EnlAnalysis *a = analyse (subject[_i].smiles, ENL_SOLVENT_DMSO);
  EnlConditions c = conditions_in (ENL_SOLVENT_DMSO, 25.0, 2.15);

  c.water = 0.2;
  for (size_t b = 0; a->sites->n_sites && b < ENL_COUNT (base); b++) {
    g_autoptr (EnlCurve) curve = curve_for (a, &c, base[b]);
    for (int theme = 0; theme < ENL_N_THEMES; theme++)
      for (size_t k = 0; k < ENL_COUNT (size); k++) {
        const EnlCurveSheet sheet = {.curve = curve,
                                     .substrate = subject[_i].name,
                                     .base = base[b],
                                     .conditions = &c,
                                     .footing = k == 0 ? enl_footing_text (c.solvent) : NULL,
                                     .width = size[k][0],
                                     .height = size[k][1]};
        g_autoptr (EnlScene) scene = enl_curve_scene (&sheet, enl_theme_get ((EnlThemeName)theme));
        expect_no_faults (scene, base[b], theme);
      }
  }
  enl_analysis_free (a);
}
END_TEST

static const EnlShape *
path_of (const EnlScene *scene, uint32_t line)
{
  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (shape->kind == ENL_SHAPE_PATH && shape->atom == line)
      return shape;
  }
  ck_abort_msg ("line %u is not drawn", line);
  return NULL;
}

/* Height of a path at x, px. */
static double
height_at (const EnlShape *path, double x)
{
  for (uint32_t i = 1; i < path->n_points; i++) {
    EnlPoint a = path->point[i - 1], b = path->point[i];
    if (x >= a.x - 1e-9 && x <= b.x + 1e-9 && b.x > a.x)
      return a.y + (b.y - a.y) * (x - a.x) / (b.x - a.x);
  }
  ck_abort_msg ("the line does not reach %g", x);
  return 0;
}

START_TEST (lines_stand_at_their_numbers_and_differ)
{
  EnlAnalysis *a = analyse (subject[6].smiles, ENL_SOLVENT_DMSO);
  EnlConditions c = conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.3);
  g_autoptr (EnlCurve) curve = curve_for (a, &c, "dimsyl_na");
  const EnlCurveSheet sheet = {
      .curve = curve, .substrate = "many sites", .base = "dimsyl sodium", .conditions = &c};
  g_autoptr (EnlScene) scene = enl_curve_scene (&sheet, enl_theme_get (ENL_THEME_LIGHT));
  const EnlShape *first = path_of (scene, 0);
  double left = first->point[0].x, right = first->point[first->n_points - 1].x;
  double bottom = -INFINITY, top = INFINITY;

  ck_assert_uint_ge (curve->n_lines, 5);
  const EnlCurveLine *neutral = NULL;
  for (uint32_t i = 0; i < curve->n_lines; i++)
    if (curve->line[i].kind == ENL_CURVE_SUBSTRATE) {
      neutral = &curve->line[i];
      top = path_of (scene, i)->point[0].y; /* nothing is lost without base */
      bottom = height_at (path_of (scene, i), right);
    }
  ck_assert_ptr_nonnull (neutral);
  ck_assert_double_lt (neutral->fraction[ENL_SWEEP_POINTS - 1], 1e-4);
  for (uint32_t i = 0; i < curve->n_lines; i++) {
    const EnlShape *path = path_of (scene, i);
    for (uint32_t k = 0; k < ENL_SWEEP_POINTS; k += 7) {
      double x = left + (right - left) * k / (ENL_SWEEP_POINTS - 1);
      double y = bottom - (bottom - top) * curve->line[i].fraction[k];
      ck_assert_double_eq_tol (height_at (path, x), y, 0.3);
    }
    for (uint32_t k = 0; k < i; k++) {
      const EnlShape *other = path_of (scene, k);
      ck_assert_msg (other->tone != path->tone && (other->dash != path->dash || i - k > 1),
                     "lines %u and %u look alike", k, i);
      ck_assert_str_ne (curve->line[k].label, curve->line[i].label);
    }
  }
  enl_analysis_free (a);
}
END_TEST

START_TEST (a_base_without_a_number_says_why)
{
  EnlAnalysis *a = analyse (subject[0].smiles, ENL_SOLVENT_DMSO);
  EnlConditions c = conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.0);
  g_autoptr (EnlCurve) curve = curve_for (a, &c, "k2co3");
  const EnlCurveSheet sheet = {
      .curve = curve, .substrate = "acetophenone", .base = "potassium carbonate", .conditions = &c};
  g_autoptr (EnlScene) scene = enl_curve_scene (&sheet, enl_theme_get (ENL_THEME_PRINT));
  g_autofree char *dump = enl_scene_dump (scene);
  g_autofree char *words = enl_curve_words (curve, "potassium carbonate");

  ck_assert_ptr_nonnull (strstr (dump, "No composition curve"));
  ck_assert_ptr_null (strstr (dump, "path "));
  ck_assert_ptr_nonnull (strstr (words, curve->missing));
  enl_analysis_free (a);
}
END_TEST

/* ---- matrices ---- */

typedef struct {
  uint32_t n;
  EnlAnalysis *analysis[ENL_COUNT (subject)];
  EnlComparison *comparison[ENL_COUNT (subject)];
  EnlMatrixColumn column[ENL_COUNT (subject)];
  EnlConditions conditions;
  EnlMatrix *matrix;
} Table;

static void
table_init (Table *t, uint32_t n, EnlSolvent solvent)
{
  *t = (Table){.n = n, .conditions = conditions_in (solvent, 25.0, 1.05)};
  for (uint32_t i = 0; i < n; i++) {
    EnlAnalysis *a = t->analysis[i] = analyse (subject[i].smiles, solvent);
    uint32_t site = enl_analysis_site (a, ENL_NONE);
    t->column[i] = (EnlMatrixColumn){.name = subject[i].name, .mol = a->mol};
    if (site == ENL_NONE)
      continue;
    EnlQuestion q = enl_analysis_question (a, knowledge, site, &t->conditions);
    ck_assert_int_eq (enl_bases_compare (&q, &t->comparison[i], NULL), ENL_OK);
    t->column[i].site = &a->sites->site[site];
    t->column[i].rank = enl_analysis_rank (a, site);
    t->column[i].pka = a->estimate[site].value;
  }
  t->matrix = enl_matrix_new (knowledge->bases, (const EnlComparison *const *)t->comparison, n);
}

static void
table_clear (Table *t)
{
  enl_matrix_free (t->matrix);
  for (uint32_t i = 0; i < t->n; i++) {
    enl_comparison_free (t->comparison[i]);
    enl_analysis_free (t->analysis[i]);
  }
}

static EnlScene *
table_scene (const Table *t, int theme)
{
  const EnlMatrixSheet sheet = {.matrix = t->matrix,
                                .column = t->column,
                                .bases = knowledge->bases,
                                .conditions = &t->conditions,
                                .caption = enl_rule_table_deferral (knowledge->rules)};

  return enl_matrix_scene (&sheet, enl_theme_get ((EnlThemeName)theme));
}

START_TEST (matrices_have_no_faults)
{
  static const EnlSolvent solvent[] = {ENL_SOLVENT_DMSO, ENL_SOLVENT_WATER, ENL_SOLVENT_THF};
  Table t;

  table_init (&t, (uint32_t)_i, solvent[_i % 3]);
  for (int theme = 0; theme < ENL_N_THEMES; theme++) {
    g_autoptr (EnlScene) scene = table_scene (&t, theme);
    expect_no_faults (scene, "matrix", theme);
  }
  table_clear (&t);
}
END_TEST

/* Every base stands once: in a row with a cell for every substrate, or among those without verdict;
 * what a cell says is what the comparison says. */
START_TEST (matrix_is_complete_and_true)
{
  Table t;
  uint32_t n = ENL_COUNT (subject), all = enl_base_table_size (knowledge->bases);
  g_autofree uint32_t *times = g_new0 (uint32_t, all);

  table_init (&t, n, ENL_SOLVENT_DMSO);
  g_autoptr (EnlScene) scene = table_scene (&t, ENL_THEME_LIGHT);
  for (uint32_t i = 0; i < t.matrix->n_rows; i++)
    times[t.matrix->row[i]]++;
  for (uint32_t i = 0; i < t.matrix->n_unjudged; i++)
    times[t.matrix->unjudged[i]]++;
  for (uint32_t i = 0; i < all; i++)
    ck_assert_uint_eq (times[i], 1);
  for (uint32_t k = 0; k < n; k++)
    for (uint32_t i = 0; t.comparison[k] && i < all; i++) {
      const EnlCandidate *c = &t.comparison[k]->candidate[i];
      const EnlMatrixCell *cell = enl_matrix_cell (t.matrix, c->base, k);
      ck_assert (cell->asked && cell->verdict == c->verdict && cell->grade == c->grade);
    }
  uint32_t cells = 0;
  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    cells += shape->kind == ENL_SHAPE_RECT && shape->substrate != ENL_NONE;
  }
  ck_assert_uint_eq (cells, n * t.matrix->n_rows);
  table_clear (&t);
}
END_TEST

/* A class stays together; the first row works at least as well as the last of its class. */
START_TEST (classes_stand_together)
{
  Table t;
  g_autoptr (GHashTable) seen = g_hash_table_new (g_str_hash, g_str_equal);
  const char *family = "";

  table_init (&t, 3, ENL_SOLVENT_DMSO);
  for (uint32_t i = 0; i < t.matrix->n_rows; i++) {
    const char *next = enl_base_table_get (knowledge->bases, t.matrix->row[i])->family;
    if (strcmp (next, family) == 0)
      continue;
    ck_assert_msg (!g_hash_table_contains (seen, next), "class %s twice", next);
    g_hash_table_add (seen, (void *)next);
    family = next;
  }
  const EnlMatrixCell *best = enl_matrix_cell (t.matrix, t.matrix->row[0], 0);
  ck_assert_int_eq (best->verdict, ENL_VERDICT_COMPLETE);
  table_clear (&t);
}
END_TEST

/* Neither word nor shape needs the colour. */
START_TEST (marks_and_words_are_distinct)
{
  char *dump[ENL_N_VERDICTS];

  for (int v = 0; v < ENL_N_VERDICTS; v++) {
    g_autoptr (EnlScene) scene = enl_scene_new (enl_theme_get (ENL_THEME_PRINT));
    enl_verdict_mark_draw (scene, (EnlPoint){0, 0}, 10, (EnlVerdict)v);
    GString *shapes = g_string_new (NULL);
    for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
      const EnlShape *s = enl_scene_shape (scene, i);
      g_string_append_printf (shapes, "%d %u %d", s->kind, s->n_points, s->dash);
      for (uint32_t k = 0; k < s->n_points; k++)
        g_string_append_printf (shapes, " %.1f %.1f", s->point[k].x, s->point[k].y);
    }
    dump[v] = g_string_free (shapes, FALSE);
    EnlRect box = enl_scene_bounds (scene);
    ck_assert (box.x >= -10.5 && box.y >= -11.5 && box.width <= 21 && box.height <= 23);
    for (int k = 0; k < v; k++) {
      ck_assert_str_ne (dump[k], dump[v]);
      ck_assert_str_ne (enl_verdict_word ((EnlVerdict)k), enl_verdict_word ((EnlVerdict)v));
    }
  }
  for (int v = 0; v < ENL_N_VERDICTS; v++)
    g_free (dump[v]);
}
END_TEST

START_TEST (short_wraps_keep_their_lines)
{
  const char *family = enl_theme_get (ENL_THEME_LIGHT)->family;

  for (uint32_t lines = 1; lines < 5; lines++) {
    g_autofree char *text = enl_text_wrap_short (family, LONG_NAME, 12, false, 130, lines);
    g_autofree char *fits = enl_text_wrap_short (family, "two words", 12, false, 130, lines);
    g_auto (GStrv) line = g_strsplit (text, "\n", -1);
    ck_assert_uint_eq (g_strv_length (line), lines);
    ck_assert (g_str_has_suffix (text, "…"));
    ck_assert_str_eq (fits, "two words");
    for (char **l = line; *l; l++) {
      EnlRect box = enl_text_box (family, (EnlPoint){0, 0}, *l, 12, false, 0, 0);
      ck_assert_double_le (box.width, 131);
    }
  }
}
END_TEST

static Suite *
balance_suite (void)
{
  Suite *suite = suite_create ("curve and matrix");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 120);
  tcase_add_checked_fixture (tc, open_knowledge, close_knowledge);
  tcase_add_loop_test (tc, curves_have_no_faults, 0, (int)ENL_COUNT (subject));
  tcase_add_test (tc, lines_stand_at_their_numbers_and_differ);
  tcase_add_test (tc, a_base_without_a_number_says_why);
  tcase_add_loop_test (tc, matrices_have_no_faults, 1, (int)ENL_COUNT (subject) + 1);
  tcase_add_test (tc, matrix_is_complete_and_true);
  tcase_add_test (tc, classes_stand_together);
  tcase_add_test (tc, marks_and_words_are_distinct);
  tcase_add_test (tc, short_wraps_keep_their_lines);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (balance_suite)
