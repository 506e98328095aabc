#include "core/molecule/symmetry.h"

#include <string.h>

#include "core/molecule/automorphism.h"
#include "tests/read-structure.h"
#include "tests/renumber.h"

#define C60                                                                                        \
  "c12c3c4c5c1c1c6c7c2c2c8c3c3c9c4c4c%10c5c5c1c1c6c6c%11c7c2c2c7c8c3c3c8c9c4c4c9c%10c5c5c1c1c6c6c" \
  "%11c2c2c7c3c3c8c4c4c9c5c1c1c6c2c3c41"
#define GLUCOSYL "O[C@H]3[C@H](O)[C@@H](O)[C@H](O[C@@H]3CO)"
#define CYCLODEXTRIN                                                                               \
  "OC[C@H]1O[C@@H]2O[C@H]3[C@H](O)[C@@H](O)[C@H](O[C@@H]3CO)" GLUCOSYL GLUCOSYL GLUCOSYL GLUCOSYL  \
  "O[C@H]1[C@H](O)[C@H]2O"

/* Numbers of classes by hand, from the symmetry of the structure. */
static const struct {
  const char *label, *smiles;
  uint32_t plain, stereo, reflected;
} class_case[] = {
    {"acetone", "CC(=O)C", 3, 3, 3},
    {"acetylacetone", "CC(=O)CC(=O)C", 4, 4, 4},
    {"benzene, drawn with alternating bonds", "C1=CC=CC=C1", 1, 1, 1},
    {"o-xylene: both Kekulé drawings alike", "CC1=CC=CC=C1C", 4, 4, 4},
    {"acetate keeps O and O- apart", "CC(=O)[O-]", 4, 4, 4},
    {"butenedioic acid", "OC(=O)/C=C/C(=O)O", 4, 4, 4},
    {"meso-tartaric acid: R and S apart", "O[C@@H]([C@@H](O)C(=O)O)C(=O)O", 5, 10, 5},
    {"L-tartaric acid: both centres alike", "O[C@H]([C@@H](O)C(=O)O)C(=O)O", 5, 5, 5},
    {"deuterium sets a methyl apart", "CC(=O)C[2H]", 5, 5, 5},
    {"rings that refine alike: C3 beside C6", "C1CC1.C1CCCCC1", 2, 2, 2},
    {"rings that refine alike: two C4 beside C8", "C1CCC1.C1CCC1.C1CCCCCCC1", 2, 2, 2},
    {"cubane", "C12C3C4C1C5C2C3C45", 1, 1, 1},
    {"adamantane", "C1C2CC3CC1CC(C2)C3", 2, 2, 2},
    {"dodecahedrane", "C12C3C4C5C1C6C7C2C8C3C9C4C1C5C6C2C7C8C9C12", 1, 1, 1},
    {"buckminsterfullerene", C60, 1, 1, 1},
    {"neopentane", "CC(C)(C)C", 2, 2, 2},
    {"a diene, one bond cis and one trans", "C/C=C/C=C\\C", 3, 6, 6},
    {"diene, both trans", "C/C=C/C=C/C", 3, 3, 3},
    {"cis-1,4-dimethylcyclohexane", "C[C@H]1CC[C@@H](C)CC1", 3, 4, 3},
    {"1,3,5-trimethylcyclohexane, one against two", "C[C@H]1C[C@@H](C)C[C@H](C)C1", 3, 9, 6},
    {"1,3,5-trimethylcyclohexane, all cis", "C[C@H]1C[C@@H](C)C[C@@H](C)C1", 3, 3, 3},
    {"cis-2,6-dimethylcyclohexanone", "C[C@H]1CCC[C@@H](C)C1=O", 6, 9, 6},
    {"trans-2,6-dimethylcyclohexanone", "C[C@H]1CCC[C@H](C)C1=O", 6, 6, 6},
    {"arms that are mirror images", "C[C@H](F)CC(O)C[C@H](F)C", 6, 10, 6},
    {"arms alike, beside another centre", "C[C@H](F)CC(O)(C[C@@H](F)C)C[C@H](Cl)C", 10, 10, 10},
    {"two waters", "O.O", 1, 1, 1},
};

START_TEST (classes_are_counted)
{
  g_autoptr (EnlMolecule) mol = read_structure (class_case[_i].smiles);
  uint32_t class_of[100];

  ck_assert_msg (enl_symmetry_classes (mol, false, class_of) == class_case[_i].plain,
                 "%s: %u classes", class_case[_i].label,
                 enl_symmetry_classes (mol, false, class_of));
  ck_assert_msg (enl_symmetry_classes (mol, true, class_of) == class_case[_i].stereo,
                 "%s: %u classes with stereo", class_case[_i].label,
                 enl_symmetry_classes (mol, true, class_of));
  uint32_t reflected = enl_symmetry_reflected_classes (mol, class_of);
  ck_assert_msg (reflected == class_case[_i].reflected, "%s: %u classes with reflections",
                 class_case[_i].label, reflected);
}
END_TEST

START_TEST (empty_molecule_has_no_classes)
{
  g_autoptr (EnlMolecule) mol = enl_molecule_new ();
  uint32_t unused;

  enl_molecule_finish (mol);
  ck_assert_uint_eq (enl_symmetry_classes (mol, true, &unused), 0);
  enl_canonical_ranks (mol, &unused);
}
END_TEST

/* ---- against every permutation of small graphs ---- */

#define SMALL 6

/* A graph on SMALL atoms of two elements with single and double bonds, valence regardless. */
static EnlMolecule *
random_graph (GRand *rand)
{
  EnlMolecule *mol = enl_molecule_new ();
  int dense = g_rand_int_range (rand, 2, 6);

  for (uint32_t v = 0; v < SMALL; v++) {
    EnlAtom atom = {.element = g_rand_int_range (rand, 0, 4) ? 6 : 7};
    enl_molecule_add_atom (mol, &atom);
  }
  for (uint32_t v = 0; v < SMALL; v++)
    for (uint32_t w = 0; w < v; w++)
      if (g_rand_int_range (rand, 0, 8) < dense)
        enl_molecule_add_bond (mol, v, w, g_rand_int_range (rand, 0, 4) ? 1 : 2);
  enl_molecule_finish (mol);
  return mol;
}

static int
kind_of_bond (const EnlMolecule *mol, uint32_t a, uint32_t b)
{
  uint32_t bond = enl_molecule_bond_between (mol, a, b);
  if (bond == ENL_NONE)
    return -1;
  return enl_molecule_bond (mol, bond)->aromatic ? 9 : enl_molecule_bond (mol, bond)->order;
}

static bool
keeps_graph (const EnlMolecule *mol, const uint32_t *image)
{
  for (uint32_t v = 0; v < SMALL; v++) {
    if (enl_molecule_atom (mol, v)->element != enl_molecule_atom (mol, image[v])->element)
      return false;
    for (uint32_t w = 0; w < v; w++)
      if (kind_of_bond (mol, v, w) != kind_of_bond (mol, image[v], image[w]))
        return false;
  }
  return true;
}

/* Tries every completion of image[0 .. k - 1]; alike[v][w] when an automorphism maps v on w. */
static void
try_all (const EnlMolecule *mol, uint32_t *image, uint32_t k, bool alike[SMALL][SMALL])
{
  if (k == SMALL) {
    for (uint32_t v = 0; keeps_graph (mol, image) && v < SMALL; v++)
      alike[v][image[v]] = true;
    return;
  }
  for (uint32_t w = 0; w < SMALL; w++) {
    bool used = false;
    for (uint32_t i = 0; i < k; i++)
      used |= image[i] == w;
    image[k] = w;
    if (!used)
      try_all (mol, image, k + 1, alike);
  }
}

START_TEST (classes_are_exact)
{
  GRand *rand = g_rand_new_with_seed ((guint32)_i);
  g_autoptr (EnlMolecule) mol = random_graph (rand);
  bool alike[SMALL][SMALL] = {{false}};
  uint32_t image[SMALL], class_of[SMALL];

  g_rand_free (rand);
  try_all (mol, image, 0, alike);
  enl_symmetry_classes (mol, false, class_of);
  for (uint32_t v = 0; v < SMALL; v++)
    for (uint32_t w = 0; w < SMALL; w++)
      ck_assert_msg ((class_of[v] == class_of[w]) == alike[v][w], "graph %d: atoms %u and %u", _i,
                     v, w);
}
END_TEST

/* ---- one order for every numbering ---- */

static const char *const order_case[] = {
    "CC(=O)C[C@H](N)C(=O)O",
    "O[C@@H]([C@@H](O)C(=O)O)C(=O)O",
    "C12C3C4C1C5C2C3C45",
    "C1CC1.C1CCCCC1.C1CCC1",
    "C[C@H]1CC[C@@H](C)CC1",
    "C/C=C/C=C\\C=C\\C",
    C60,
    CYCLODEXTRIN,
};

static void
check_same_graph (const EnlMolecule *a, const uint32_t *rank_a, const EnlMolecule *b,
                  const uint32_t *rank_b)
{
  uint32_t n = enl_molecule_atoms (a);
  g_autofree uint32_t *at = g_new (uint32_t, n);

  for (uint32_t v = 0; v < n; v++)
    at[rank_b[v]] = v;
  for (uint32_t v = 0; v < n; v++) {
    ck_assert_uint_eq (enl_molecule_atom (a, v)->element,
                       enl_molecule_atom (b, at[rank_a[v]])->element);
    for (uint32_t w = 0; w < v; w++)
      ck_assert_int_eq (kind_of_bond (a, v, w), kind_of_bond (b, at[rank_a[v]], at[rank_a[w]]));
  }
}

START_TEST (ranks_ignore_the_numbering)
{
  g_autoptr (EnlMolecule) mol = read_structure (order_case[_i]);
  uint32_t n = enl_molecule_atoms (mol), rank[100], other_rank[100], place[100], classes[100];
  GRand *rand = g_rand_new_with_seed (7);

  enl_canonical_ranks (mol, rank);
  uint32_t count = enl_symmetry_classes (mol, true, classes);
  for (int round = 0; round < 10; round++) {
    uint32_t other_classes[100];
    shuffle (place, n, rand);
    g_autoptr (EnlMolecule) other = renumber (mol, place);
    enl_canonical_ranks (other, other_rank);
    check_same_graph (mol, rank, other, other_rank);
    ck_assert_uint_eq (enl_symmetry_classes (other, true, other_classes), count);
    for (uint32_t v = 0; v < n; v++)
      ck_assert_uint_eq (other_classes[place[v]], classes[v]);
  }
  g_rand_free (rand);
}
END_TEST

/* Graphs that make careless searches explode; the step limit must not be reached. */
static const struct {
  const char *label, *head, *unit, *tail;
  uint32_t times;
} hard_case[] = {
    {"separate waters", "O", ".O", "", 300},
    {"chain of phenylenes", "c1ccc(cc1)", "-c1ccc(cc1)", "-c1ccccc1", 60},
    {"tert-butyl groups on a chain", "C", "C(C(C)(C)C)", "C", 80},
    {"cubanes", "C", ".C12C3C4C1C5C2C3C45", "", 40},
    {"fullerenes", C60, "." C60, "", 5},
    {"cyclodextrin", CYCLODEXTRIN, "", "", 0},
};

START_TEST (symmetrical_structures_are_searched_completely)
{
  GString *text = g_string_new (hard_case[_i].head);
  EnlSymmetry symmetry;

  for (uint32_t i = 0; i < hard_case[_i].times; i++)
    g_string_append (text, hard_case[_i].unit);
  g_string_append (text, hard_case[_i].tail);
  g_autoptr (EnlMolecule) mol = read_structure (text->str);
  g_autoptr (EnlGraph) graph = enl_graph_new (mol, true);
  enl_symmetry_search (graph, NULL, &symmetry);
  ck_assert_msg (symmetry.complete, "%s: gave up", hard_case[_i].label);
  enl_symmetry_clear (&symmetry);
  g_string_free (text, TRUE);
}
END_TEST

static Suite *
symmetry_suite (void)
{
  Suite *suite = suite_create ("molecule symmetry");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 60);
  tcase_add_loop_test (tc, classes_are_counted, 0, (int)ENL_COUNT (class_case));
  tcase_add_test (tc, empty_molecule_has_no_classes);
  tcase_add_loop_test (tc, classes_are_exact, 0, 120);
  tcase_add_loop_test (tc, ranks_ignore_the_numbering, 0, (int)ENL_COUNT (order_case));
  tcase_add_loop_test (tc, symmetrical_structures_are_searched_completely, 0,
                       (int)ENL_COUNT (hard_case));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (symmetry_suite)
