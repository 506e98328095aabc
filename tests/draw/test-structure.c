#include "draw/structure-scene.h"

#include <math.h>
#include <string.h>

#include "draw/paint.h"
#include "draw/plane.h"
#include "tests/draw/sample.h"
#include "tests/runner.h"

#define H 0.8660254037844386 /* sin 60 */

static EnlScene *
draw (const EnlMolecule *mol, const SampleSites *sample, EnlThemeName name)
{
  EnlStructureLook look = {.selected = ENL_NONE};

  if (sample) {
    look.sites = &sample->sites;
    look.estimate = sample->estimate;
    look.rank = sample->rank;
    look.selected = sample->sites.n_sites > 1 ? 1 : ENL_NONE;
  }
  return enl_structure_scene (mol, &look, enl_theme_get (name));
}

/* ---- golden scenes, with coordinates of our own ---- */

static const SampleSpot diketone[] = {{0, 0},       {H, 0.5},     {H, 1.5},  {2 * H, 0},
                                      {3 * H, 0.5}, {3 * H, 1.5}, {4 * H, 0}};
static const SampleSpot phenol[] = {{0, 1},     {H, 0.5},  {H, -0.5}, {0, -1},
                                    {-H, -0.5}, {-H, 0.5}, {0, 2}};
static const SampleSpot nitromethane[] = {{0, 0}, {H, 0.5}, {H, 1.5}, {2 * H, 0}};
static const SampleSpot pyrrole[] = {
    {0, 0.85}, {0.81, 0.26}, {0.5, -0.69}, {-0.5, -0.69}, {-0.81, 0.26}};

static const struct {
  const char *name, *smiles;
  const SampleSpot *spot;
  bool sites;
} golden[] = {
    {"diketone", "CC(=O)CC(=O)C", diketone, true},
    {"phenol", "C1=CC=CC=C1O", phenol, false},
    {"nitromethane", "C[N+](=O)[O-]", nitromethane, true},
    {"pyrrole", "N1C=CC=C1", pyrrole, true},
};

START_TEST (scene_is_as_agreed)
{
  g_autoptr (EnlMolecule) mol = sample_placed (golden[_i].smiles, golden[_i].spot);
  g_autoptr (SampleSites) sites = golden[_i].sites ? sample_sites (mol) : NULL;
  g_autoptr (EnlScene) scene = draw (mol, sites, ENL_THEME_LIGHT);
  g_autofree char *dump = enl_scene_dump (scene);
  g_autofree char *path = g_strdup_printf ("%s/tests/draw/golden/%s.scene",
                                           g_getenv ("ENL_SOURCE_DIR"), golden[_i].name);
  g_autofree char *agreed = NULL;

  if (g_getenv ("ENL_UPDATE_GOLDEN"))
    ck_assert (g_file_set_contents (path, dump, -1, NULL));
  ck_assert_msg (g_file_get_contents (path, &agreed, NULL, NULL), "%s is missing", path);
  ck_assert_msg (strcmp (dump, agreed) == 0, "%s is now:\n%s", golden[_i].name, dump);
}
END_TEST

/* ---- laws ---- */

static void
transform (EnlMolecule *mol, double angle, double dx, double dy)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    EnlAtom *a = enl_molecule_edit_atom (mol, i);
    double x = a->x * cos (angle) - a->y * sin (angle), y = a->x * sin (angle) + a->y * cos (angle);
    a->x = x + dx;
    a->y = y + dy;
  }
}

static const char *const law_case[] = {"CCOC(=O)CC(C)=O", "CC1CCCCC1=O",
                                       "COC(=O)[C@@H](N)Cc1ccccc1", "N#CC(C#N)c1ccncc1",
                                       "O=C1CC(=O)c2ccccc12"};

START_TEST (a_moved_molecule_gives_the_moved_scene)
{
  const double dx = 3.0, dy = -5.0;
  g_autoptr (EnlMolecule) mol = sample_molecule (law_case[_i]);
  g_autoptr (SampleSites) sites = sample_sites (mol);
  g_autoptr (EnlScene) before = draw (mol, sites, ENL_THEME_LIGHT);
  transform (mol, 0, dx, dy);
  g_autoptr (EnlScene) after = draw (mol, sites, ENL_THEME_LIGHT);
  double px = enl_theme_get (ENL_THEME_LIGHT)->bond_length;

  ck_assert_uint_eq (enl_scene_shapes (before), enl_scene_shapes (after));
  for (uint32_t i = 0; i < enl_scene_shapes (before); i++) {
    const EnlShape *a = enl_scene_shape (before, i), *b = enl_scene_shape (after, i);
    ck_assert_int_eq (a->kind, b->kind);
    for (uint32_t k = 0; k < a->n_points; k++) {
      ck_assert_double_eq_tol (b->point[k].x - a->point[k].x, dx * px, 1e-3);
      ck_assert_double_eq_tol (b->point[k].y - a->point[k].y, -dy * px, 1e-3);
    }
  }
}
END_TEST

/* Symbols turn with their atoms and stay upright; bonds between unlabelled atoms turn with them. */
START_TEST (a_turned_molecule_gives_the_turned_scene)
{
  const double angle = 0.7;
  g_autoptr (EnlMolecule) mol = sample_molecule ("C1CCC2=CC=CC=C2C1");
  g_autoptr (EnlScene) before = draw (mol, NULL, ENL_THEME_PRINT);
  transform (mol, angle, 0, 0);
  g_autoptr (EnlScene) after = draw (mol, NULL, ENL_THEME_PRINT);

  ck_assert_uint_eq (enl_scene_shapes (before), enl_scene_shapes (after));
  for (uint32_t i = 0; i < enl_scene_shapes (before); i++) {
    const EnlShape *a = enl_scene_shape (before, i), *b = enl_scene_shape (after, i);
    for (uint32_t k = 0; k < a->n_points; k++) {
      EnlPoint p = a->point[k];
      ck_assert_double_eq_tol (b->point[k].x, p.x * cos (angle) + p.y * sin (angle), 1e-6);
      ck_assert_double_eq_tol (b->point[k].y, -p.x * sin (angle) + p.y * cos (angle), 1e-6);
    }
  }
}
END_TEST

static const EnlShape *
text_of_atom (const EnlScene *scene, uint32_t atom, const char *text)
{
  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (shape->kind == ENL_SHAPE_TEXT && shape->atom == atom && strcmp (shape->text, text) == 0)
      return shape;
  }
  return NULL;
}

START_TEST (hydrogens_turn_to_the_free_side)
{
  for (int way = -1; way <= 1; way += 2) {
    const SampleSpot spot[] = {{0, 0}, {-way * H, 0.5}, {-2 * way * H, 0}};
    g_autoptr (EnlMolecule) mol = sample_placed ("OCC", spot);
    g_autoptr (EnlScene) scene = draw (mol, NULL, ENL_THEME_LIGHT);
    const EnlShape *o = text_of_atom (scene, 0, "O"), *h = text_of_atom (scene, 0, "H");
    ck_assert (o && h);
    ck_assert_double_gt (way * (h->box.x - o->box.x), 0);
  }
}
END_TEST

/* Inner lines of a benzene ring lie inside and are shorter (IUPAC 2008, GR-1.10). */
START_TEST (second_lines_point_into_the_ring)
{
  g_autoptr (EnlMolecule) mol = sample_placed ("C1=CC=CC=C1O", phenol);
  g_autoptr (EnlScene) scene = draw (mol, NULL, ENL_THEME_LIGHT);
  double side = enl_theme_get (ENL_THEME_LIGHT)->bond_length;
  uint32_t inner = 0;

  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *line = enl_scene_shape (scene, i);
    if (line->kind != ENL_SHAPE_LINE || line->bond >= 6)
      continue;
    double length = enl_point_distance (line->point[0], line->point[1]);
    double middle = hypot ((line->point[0].x + line->point[1].x) / 2,
                           (line->point[0].y + line->point[1].y) / 2);
    if (middle > 0.8 * side)
      continue;
    inner++;
    ck_assert_double_lt (length, 0.9 * side);
    ck_assert_double_gt (middle, 0.6 * side);
  }
  ck_assert_uint_eq (inner, 3);
}
END_TEST

/* ---- nothing collides ---- */

/* Invented and everyday structures; rings, cages, chains, charges, crowded centres. */
static const char *const assorted[] = {
    "CCOC(=O)CC(C)=O",
    "CC(=O)CC(C)=O",
    "CC1(C)C2CCC1(C)C(=O)C2",
    "C[C@]12CC[C@H]3[C@@H](CCC4=CC(=O)CC[C@]34C)[C@@H]1CC[C@@H]2O",
    "CC1CCCCC1=O",
    "CC1(C)CC(=O)CC(=O)C1",
    "CC1(C)OC(=O)CC(=O)O1",
    "COC(=O)[C@@H](N)Cc1ccccc1",
    "C[N+](=O)[O-]",
    "CC[C@H]1OC(=O)[C@H](C)[C@@H](O)[C@H](C)[C@@H](O)[C@](C)(O)C[C@@H](C)C(=O)[C@H](C)[C@@H](O)"
    "[C@]1(C)O",
    "Cn1c(=O)c2c(ncn2C)n(C)c1=O",
    "C[n+]1ccn(C)c1",
    "CC1(C)S[C@@H]2[C@H](NC(=O)Cc3ccccc3)C(=O)N2[C@H]1C(=O)O",
    "O=Cc1ccccc1",
    "C",
    "CO",
    "C=O",
    "O",
    "C=C=C",
    "CC#N",
    "N#CCC#N",
    "C1CCCCC1=C(C)C",
    "C/C=C/C(=O)C",
    "C=CC(=O)OC",
    "CC(C)=C(C)C",
    "CS(=O)(=O)CC(=O)c1ccccc1",
    "COP(=O)(OC)CC(=O)OC",
    "C[Si](C)(C)CC#N",
    "c1ccc2c(c1)[nH]c1ccccc12",
    "[2H]C([2H])([2H])C(C)=O",
    "[CH2-]C(C)=O",
    "[NH3+]CC(=O)[O-]",
    "C[N+](C)(C)CC(=O)c1ccc(O)cc1",
    "O=C1c2ccccc2C(=O)C1",
    "O=C1CCC2CC1C2",
    "C1C2CC3CC1CC(C2)C3",
    "O=C1CC2CCC1CC2",
    "NC(=O)NC(=O)CC(=O)N",
    "O=C1CC(=O)NC(=O)N1",
    "OC(=O)CC(O)(CC(=O)O)C(=O)O",
    "CC(=O)C(C(C)=O)C(C)=O",
    "N#CC(C#N)C#N",
    "c1ccc(cc1)C(c1ccccc1)c1ccccc1",
    "CC(=O)c1c(O)cc(O)cc1O",
    "O=C(CCl)CBr",
    "FC(F)(F)C(=O)CC(=O)c1cccs1",
    "CC(=O)SCC(N)=O",
    "CCN(CC)C(=O)CC#N",
    "COC(=O)C1CCCC1=O",
    "O=C1CCCCCCCCCCC1",
    "O=C1C=CC(=O)C=C1",
    "C1=CCC=C1",
    "CC(=O)CC(=O)CC(=O)CC(C)=O",
    "OC1=C(O)C(=O)OC1C(O)CO",
    "NCC(=O)NCC(=O)NCC(=O)O",
    "C[S+](C)CC(=O)OC",
    "c1ccc(cc1)[P+](CC(=O)C)(c1ccccc1)c1ccccc1",
    "O=C1OC(=O)C=C1",
    "CC(C)(C)C(=O)C",
    "C1CC1C(=O)CC(=O)C1CC1",
    "O=c1cc[nH]c(=O)[nH]1",
    "CC(=O)C[C@@H]1C[C@H]1CC(C)=O",
};

/* Every site has exactly one value. */
static void
check_values (const EnlScene *scene, const SampleSites *sites, const char *label)
{
  double value_size = enl_scene_theme (scene)->text_size;

  for (uint32_t s = 0; s < sites->sites.n_sites; s++) {
    uint32_t values = 0;
    for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
      const EnlShape *shape = enl_scene_shape (scene, i);
      values += shape->kind == ENL_SHAPE_TEXT && shape->site == s && shape->bold &&
                fabs (shape->size - value_size) < 1e-9;
    }
    ck_assert_msg (values == 1, "%s: site %u has %u values", label, s, values);
  }
}

static double
smallest_text (const EnlScene *scene)
{
  double least = INFINITY;

  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *shape = enl_scene_shape (scene, i);
    if (shape->kind == ENL_SHAPE_TEXT)
      least = fmin (least, shape->size * (strstr (shape->text, "size='70%'") ? 0.7 : 1));
  }
  return least;
}

START_TEST (nothing_collides)
{
  g_autoptr (EnlMolecule) mol = sample_molecule (assorted[_i]);
  g_autoptr (SampleSites) sites = sample_sites (mol);

  for (EnlThemeName name = 0; name < ENL_N_THEMES; name++) {
    g_autoptr (EnlScene) scene = draw (mol, sites, name);
    g_autofree char *faults = enl_scene_faults (scene);
    g_autofree char *collisions = sample_collisions (scene);
    ck_assert_msg (!faults, "%s, %s: %s", assorted[_i], enl_theme_id (name), faults);
    ck_assert_msg (!collisions, "%s, %s: %s", assorted[_i], enl_theme_id (name), collisions);
    check_values (scene, sites, assorted[_i]);
    /* nobody at the back of a room reads less */
    if (name == ENL_THEME_PROJECTOR)
      ck_assert_double_ge (smallest_text (scene), 20);
  }
}
END_TEST

START_TEST (numbers_are_input_positions)
{
  g_autoptr (EnlMolecule) mol = sample_molecule ("CC(=O)CC(C)=O");
  EnlStructureLook look = {.selected = ENL_NONE, .numbers = true};
  g_autoptr (EnlScene) scene = enl_structure_scene (mol, &look, enl_theme_get (ENL_THEME_LIGHT));
  g_autofree char *faults = enl_scene_faults (scene);

  ck_assert_msg (!faults, "%s", faults);
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    g_autofree char *number = g_strdup_printf ("%u", i + 1);
    ck_assert_ptr_nonnull (text_of_atom (scene, i, number));
  }
}
END_TEST

static Suite *
structure_suite (void)
{
  Suite *suite = suite_create ("draw structure");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 30);
  tcase_add_loop_test (tc, scene_is_as_agreed, 0, (int)ENL_COUNT (golden));
  tcase_add_loop_test (tc, a_moved_molecule_gives_the_moved_scene, 0, (int)ENL_COUNT (law_case));
  tcase_add_test (tc, a_turned_molecule_gives_the_turned_scene);
  tcase_add_test (tc, hydrogens_turn_to_the_free_side);
  tcase_add_test (tc, second_lines_point_into_the_ring);
  tcase_add_loop_test (tc, nothing_collides, 0, (int)ENL_COUNT (assorted));
  tcase_add_test (tc, numbers_are_input_positions);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (structure_suite)
