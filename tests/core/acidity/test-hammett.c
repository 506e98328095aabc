#include "core/acidity/hammett.h"

#include "tests/core/acidity/acidity-help.h"
#include "tests/runner.h"

static EnlSubstituents *table;

static void
setup (void)
{
  size_t n_groups = 0, n_rings = 0;
  const char *groups = enl_resource ("substituents.tsv", &n_groups);
  const char *rings = enl_resource ("ring-effects.tsv", &n_rings);

  ck_assert_int_eq (enl_substituents_new (groups, n_groups, rings, n_rings, &table, NULL), ENL_OK);
}

static void
teardown (void)
{
  enl_substituents_free (table);
}

/* The group is on the atom with map 1, the aromatic atom that carries it has map 2. Constants:
 * Hansch, Leo and Taft, Chem. Rev. 1991, 91, 165 (as in substituents.tsv). */
static const struct {
  const char *label, *smiles, *name;
  double meta, para;
} group[] = {
    {"nitro", "O=[N+:1]([O-])[c:2]1ccccc1", "NO2", 0.71, 0.78},
    {"nitrile", "N#[C:1][c:2]1ccccc1", "CN", 0.56, 0.66},
    {"methyl", "[CH3:1][c:2]1ccccc1", "CH3", -0.07, -0.17},
    {"methoxy beside hydroxy", "C[O:1][c:2]1ccc(O)cc1", "OCH3", 0.12, -0.27},
    {"hydroxy", "[OH:1][c:2]1ccccc1", "OH", 0.12, -0.37},
    {"dimethylamino", "C[N:1](C)[c:2]1ccccc1", "N(CH3)2", -0.16, -0.83},
    {"trifluoromethyl", "F[C:1](F)(F)[c:2]1ccccc1", "CF3", 0.43, 0.54},
    {"acetyl", "C[C:1](=O)[c:2]1ccccc1", "COCH3", 0.38, 0.5},
    {"ethoxycarbonyl", "CCO[C:1](=O)[c:2]1ccccc1", "COOC2H5", 0.37, 0.45},
    {"tert-butoxycarbonyl counts as ethoxycarbonyl", "CC(C)(C)O[C:1](=O)[c:2]1ccccc1", "COOC2H5",
     0.37, 0.45},
    {"trimethylammonio", "C[N+:1](C)(C)[c:2]1ccccc1", "N(CH3)3+", 0.88, 0.82},
    {"phenyl", "c1cccc[c:1]1-[c:2]1ccccc1", "C6H5", 0.06, -0.01},
    {"a longer alkyl counts as propyl or butyl", "CCCCCC[CH2:1][c:2]1ccccc1", "n-C4H9", -0.08,
     -0.16},
};

static uint32_t
atom_with_map (const EnlMolecule *mol, uint32_t map)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    if (enl_molecule_atom (mol, i)->map == map)
      return i;
  return ENL_NONE;
}

START_TEST (groups_have_their_constants)
{
  g_autoptr (EnlMolecule) mol = read_smiles (group[_i].smiles);
  uint32_t root = atom_with_map (mol, 1), parent = atom_with_map (mol, 2);
  const char *name = NULL;
  EnlSigma sigma;

  ck_assert (enl_substituents_find (table, mol, root, parent, &sigma, &name));
  ck_assert_msg (strcmp (name, group[_i].name) == 0, "%s: %s", group[_i].label, name);
  ck_assert_double_eq_tol (sigma.meta, group[_i].meta, 1e-9);
  ck_assert_double_eq_tol (sigma.para, group[_i].para, 1e-9);
}
END_TEST

START_TEST (unknown_groups_have_none)
{
  g_autoptr (EnlMolecule) mol = read_smiles ("[Xe:1][c:2]1ccccc1");
  EnlSigma sigma = {1, 1, 1};

  ck_assert (!enl_substituents_find (table, mol, atom_with_map (mol, 1), atom_with_map (mol, 2),
                                     &sigma, NULL));
  ck_assert_double_eq (sigma.meta, 0);
}
END_TEST

START_TEST (ring_nitrogen_acts_like_a_strong_acceptor)
{
  EnlRingSigma meta = enl_substituents_ring_effect (table, ENL_RING_AZA, 2);
  EnlRingSigma para = enl_substituents_ring_effect (table, ENL_RING_AZA, 3);

  ck_assert_double_gt (meta.meta, 0.5);
  ck_assert_double_gt (para.para, meta.meta);
  ck_assert_double_eq (meta.para, 0);
}
END_TEST

static const struct {
  const char *label, *groups, *rings;
} fault[] = {
    {"no star", "substituent\tsmiles\tsigma_m\tsigma_p\nx\tCC\t1\t1\n", NULL},
    {"unreadable", "substituent\tsmiles\tsigma_m\tsigma_p\nx\t*C(\t1\t1\n", NULL},
    {"unknown effect", NULL, "effect\tposition\tmeta\nmagic\t1\t1\n"},
    {"missing effect", NULL, "effect\tposition\tmeta\naza\t1\t1\n"},
};

START_TEST (damaged_tables_are_refused)
{
  static const char good_groups[] = "substituent\tsmiles\tsigma_m\tsigma_p\nx\t*C\t1\t1\n";
  size_t n_rings = 0;
  const char *groups = fault[_i].groups ? fault[_i].groups : good_groups;
  const char *rings =
      fault[_i].rings ? fault[_i].rings : enl_resource ("ring-effects.tsv", &n_rings);
  EnlSubstituents *none = NULL;
  EnlError err;

  ck_assert_int_eq (
      enl_substituents_new (groups, strlen (groups), rings, strlen (rings), &none, &err),
      ENL_ERROR_FORMAT);
  ck_assert_ptr_null (none);
}
END_TEST

static Suite *
hammett_suite (void)
{
  Suite *suite = suite_create ("acidity hammett");
  TCase *tc = tcase_create ("all");

  tcase_add_unchecked_fixture (tc, setup, teardown);
  tcase_add_loop_test (tc, groups_have_their_constants, 0, (int)ENL_COUNT (group));
  tcase_add_test (tc, unknown_groups_have_none);
  tcase_add_test (tc, ring_nitrogen_acts_like_a_strong_acceptor);
  tcase_add_loop_test (tc, damaged_tables_are_refused, 0, (int)ENL_COUNT (fault));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (hammett_suite)
