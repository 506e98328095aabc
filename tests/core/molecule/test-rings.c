#include "core/molecule/molecule.h"

#include <stdlib.h>

#include "tests/read-structure.h"

/* Sizes of a smallest set of smallest rings; those of the cages follow from their faces (Euler). */
static const struct {
  const char *label, *smiles;
  uint32_t sizes[8]; /* ascending, 0 ends */
} ring_case[] = {
    {"chain", "CCCC(C)C", {0}},
    {"cyclopropane", "C1CC1", {3}},
    {"two separate rings", "C1CC1C1CCC1", {3, 4}},
    {"two molecules", "C1CC1.C1CCCC1", {3, 5}},
    {"decalin", "C1CCC2CCCCC2C1", {6, 6}},
    {"norbornane", "C1CC2CCC1C2", {5, 5}},
    {"bicyclo[2.2.2]octane", "C1CC2CCC1CC2", {6, 6}},
    {"bicyclo[1.1.0]butane", "C1C2C1C2", {3, 3}},
    {"spiropentane", "C1CC12CC2", {3, 3}},
    {"adamantane", "C1C2CC3CC1CC(C2)C3", {6, 6, 6}},
    {"cubane", "C12C3C4C1C5C2C3C45", {4, 4, 4, 4, 4}},
    {"tetrahedrane", "C12C3C1C23", {3, 3, 3}},
    {"prismane", "C12C3C1C1C2C13", {3, 3, 4, 4}},
    {"camphor", "CC1(C)C2CCC1(C)C(=O)C2", {5, 5}},
    {"porphine", "c1cc2cc3ccc([nH]3)cc3ccc(n3)cc3ccc([nH]3)cc1n2", {5, 5, 5, 5, 16}},
    {"paracyclophane", "C1CCCc2ccc(CCCC1)cc2", {6, 12}},
    {"macrocycle with a bridge", "C1CCCCCCCCCCC2CCCCCCCC(C1)C2", {10, 15}},
    {"steroid", "C1CCC2C(C1)CCC1C2CCC2CCCC12", {5, 6, 6, 6}},
};

static int
compare_sizes (const void *a, const void *b)
{
  return (int)*(const uint32_t *)a - (int)*(const uint32_t *)b;
}

START_TEST (smallest_rings)
{
  g_autoptr (EnlMolecule) mol = read_structure (ring_case[_i].smiles);
  uint32_t n = enl_molecule_rings (mol), size[8] = {0};

  ck_assert_uint_le (n, ENL_COUNT (size));
  for (uint32_t r = 0; r < n; r++)
    enl_molecule_ring (mol, r, &size[r]);
  qsort (size, n, sizeof *size, compare_sizes);
  for (uint32_t r = 0; r < ENL_COUNT (size); r++)
    ck_assert_msg (size[r] == ring_case[_i].sizes[r], "%s: ring %u has %u atoms",
                   ring_case[_i].label, r, size[r]);
}
END_TEST

START_TEST (ring_atoms_stand_in_walking_order)
{
  g_autoptr (EnlMolecule) mol = read_structure (ring_case[_i].smiles);

  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t n;
    const uint32_t *atom = enl_molecule_ring (mol, r, &n);
    for (uint32_t i = 0; i < n; i++) {
      uint32_t bond = enl_molecule_bond_between (mol, atom[i], atom[(i + 1) % n]);
      ck_assert_msg (bond != ENL_NONE && enl_molecule_bond (mol, bond)->ring, "%s",
                     ring_case[_i].label);
      ck_assert (enl_molecule_in_ring_of (mol, atom[i], n));
      for (uint32_t j = 0; j < i; j++)
        ck_assert_uint_ne (atom[i], atom[j]);
    }
  }
}
END_TEST

START_TEST (membership)
{
  g_autoptr (EnlMolecule) mol = read_structure ("C1CC2CCC1C2CC3CC3");

  ck_assert_uint_eq (enl_molecule_smallest_ring (mol, 2), 5);
  ck_assert_uint_eq (enl_molecule_ring_count_of_atom (mol, 2), 2);
  ck_assert_uint_eq (enl_molecule_smallest_ring (mol, 7), 0);
  ck_assert_uint_eq (enl_molecule_ring_count_of_atom (mol, 7), 0);
  ck_assert_uint_eq (enl_molecule_smallest_ring (mol, 8), 3);
  ck_assert (!enl_molecule_bond (mol, enl_molecule_bond_between (mol, 7, 8))->ring);
  ck_assert (!enl_molecule_in_ring_of (mol, 0, 6));
}
END_TEST

/* Buckminsterfullerene: 12 pentagons and 20 hexagons; the last face is the sum of the others. */
START_TEST (fullerene)
{
  const char *smiles = "c12c3c4c5c1c1c6c7c2c2c8c3c3c9c4c4c%10c5c5c1c1c6c6c%11c7c2c2c7c8c3c3c8c9c4c4"
                       "c9c%10c5c5c1c1c6c6c%11c2c2c7c3c3c8c4c4c9c5c1c1c6c2c3c41";
  g_autoptr (EnlMolecule) mol = read_structure (smiles);
  uint32_t count[7] = {0}, n;

  ck_assert_uint_eq (enl_molecule_atoms (mol), 60);
  ck_assert_uint_eq (enl_molecule_rings (mol), 31);
  for (uint32_t r = 0; r < 31; r++) {
    enl_molecule_ring (mol, r, &n);
    ck_assert_uint_le (n, 6);
    count[n]++;
  }
  ck_assert_uint_eq (count[5], 12);
  ck_assert_uint_eq (count[6], 19);
}
END_TEST

/* Renumbering must not change the sizes: ladders and wheels built in a shuffled order. */
START_TEST (order_of_atoms_does_not_matter)
{
  uint32_t place[41], total[2] = {0};
  GRand *random = g_rand_new_with_seed ((guint32)_i + 1);

  for (int turn = 0; turn < 2; turn++) {
    g_autoptr (EnlMolecule) mol = enl_molecule_new ();
    EnlAtom atom = {.element = 6};
    for (uint32_t a = 0; a < 41; a++) {
      place[a] = a;
      enl_molecule_add_atom (mol, &atom);
    }
    for (uint32_t a = 40; turn && a > 0; a--) {
      uint32_t other = (uint32_t)g_rand_int_range (random, 0, (gint32)a + 1), keep = place[a];
      place[a] = place[other];
      place[other] = keep;
    }
    for (uint32_t a = 0; a < 40; a++) {
      enl_molecule_add_bond (mol, place[a], place[(a + 1) % 40], 1);
      if (a % 5 == 0)
        enl_molecule_add_bond (mol, place[a], place[40], 1);
      if (a % 7 == 0)
        enl_molecule_add_bond (mol, place[a], place[(a * 3 + 11) % 40], 1);
    }
    enl_molecule_finish (mol);
    for (uint32_t r = 0, n; r < enl_molecule_rings (mol); r++) {
      enl_molecule_ring (mol, r, &n);
      total[turn] += n;
    }
  }
  g_rand_free (random);
  ck_assert_uint_gt (total[0], 40);
  ck_assert_uint_eq (total[0], total[1]);
}
END_TEST

static Suite *
rings_suite (void)
{
  Suite *suite = suite_create ("molecule rings");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, smallest_rings, 0, (int)ENL_COUNT (ring_case));
  tcase_add_loop_test (tc, ring_atoms_stand_in_walking_order, 0, (int)ENL_COUNT (ring_case));
  tcase_add_test (tc, membership);
  tcase_add_test (tc, fullerene);
  tcase_add_loop_test (tc, order_of_atoms_does_not_matter, 0, 10);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (rings_suite)
