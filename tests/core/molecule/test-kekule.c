#include "core/molecule/kekule.h"

#include <string.h>

#include "core/molecule/valence.h"
#include "tests/read-structure.h"

/* Aromatic text whose alternation a greedy choice can miss: odd rings, bridges, cages. */
static const struct {
  const char *label, *smiles;
  uint32_t n_double;
} placed_case[] = {
    {"benzene", "c1ccccc1", 3},
    {"azulene", "c1ccc2cccc2cc1", 5},
    {"phenanthrene", "c1ccc2c(c1)ccc1ccccc12", 7},
    {"pyrene", "c1cc2ccc3cccc4ccc(c1)c2c34", 8},
    {"perylene", "c1cc2cccc3c4cccc5cccc(c(c1)c23)c45", 10},
    {"fluoranthene", "c1ccc2c(c1)-c1cccc3cccc-2c13", 8},
    {"acenaphthylene", "c1cc2c3c(c1)cccc3cc2", 6},
    {"corannulene", "c1cc2ccc3ccc4ccc5ccc1c1c2c3c4c51", 10},
    {"indolizine", "c1ccn2cccc2c1", 4},
    {"purine", "c1ncc2nc[nH]c2n1", 4},
    {"porphine", "c1cc2cc3ccc([nH]3)cc3ccc(n3)cc3ccc([nH]3)cc1n2", 11},
    {"biphenyl", "c1ccccc1c1ccccc1", 6},
    {"cyclopentadienide", "[cH-]1cccc1", 2},
    {"tropylium", "c1ccc[cH+]cc1", 3},
    {"thiophene 1-oxide", "O=s1cccc1", 3},
    {"any atom as CH2", "*1cccc1", 2},
    {"any atom as N", "*1ccccc1", 3},
    {"any atom beside benzene stays out", "c1ccc2c(c1)*C*2", 3},
    {"written aromatic bonds", "C:1:C:C:C:C:C:1", 3},
};

START_TEST (every_atom_gets_its_valence)
{
  g_autoptr (EnlMolecule) mol = read_structure (placed_case[_i].smiles);
  uint32_t n_double = 0;

  for (uint32_t i = 0; i < enl_molecule_bonds (mol); i++)
    n_double += enl_molecule_bond (mol, i)->order == 2;
  ck_assert_msg (n_double == placed_case[_i].n_double, "%s: %u double bonds", placed_case[_i].label,
                 n_double);
  for (uint32_t a = 0; a < enl_molecule_atoms (mol); a++)
    if (enl_molecule_atom (mol, a)->element == 6 && !enl_molecule_atom (mol, a)->charge)
      ck_assert_uint_eq (enl_molecule_order_sum (mol, a) + enl_molecule_atom (mol, a)->hydrogens,
                         4);
}
END_TEST

static EnlMolecule *
build_ring (const uint8_t *element, uint32_t n)
{
  EnlMolecule *mol = enl_molecule_new ();

  for (uint32_t a = 0; a < n; a++) {
    EnlAtom atom = {.element = element[a]};
    enl_molecule_add_atom (mol, &atom);
  }
  for (uint32_t a = 0; a < n; a++)
    enl_molecule_add_bond (mol, a, (a + 1) % n, 1);
  enl_molecule_finish (mol);
  return mol;
}

START_TEST (hydrogens_on_nitrogen_can_be_inferred)
{
  const uint8_t pyrrole[] = {7, 6, 6, 6, 6}, pyridine[] = {7, 6, 6, 6, 6, 6};
  const bool soft[] = {true, true, true, true, true, true};
  g_autoptr (EnlMolecule) five = build_ring (pyrrole, 5);
  g_autoptr (EnlMolecule) six = build_ring (pyridine, 6);
  uint32_t culprit = 77;

  ck_assert (!enl_kekule_place (five, soft, ENL_KEKULE_DEFAULT, &culprit));
  ck_assert_uint_lt (culprit, 5);
  ck_assert (enl_kekule_place (five, soft, ENL_KEKULE_INFER_NH, &culprit));
  ck_assert_uint_eq (enl_molecule_order_sum (five, 0), 2);
  ck_assert (enl_kekule_place (six, soft, ENL_KEKULE_INFER_NH, NULL));
  ck_assert_uint_eq (enl_molecule_order_sum (six, 0), 3);
}
END_TEST

START_TEST (fixed_orders_are_kept)
{
  g_autoptr (EnlMolecule) mol = read_structure ("O=c1cc[nH]cc1");

  ck_assert_uint_eq (enl_molecule_bond (mol, 0)->order, 2);
  ck_assert_uint_eq (enl_molecule_order_sum (mol, 4), 2);
  ck_assert_uint_eq (enl_molecule_order_sum (mol, 1), 4);
}
END_TEST

static Suite *
kekule_suite (void)
{
  Suite *suite = suite_create ("molecule kekule");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, every_atom_gets_its_valence, 0, (int)ENL_COUNT (placed_case));
  tcase_add_test (tc, hydrogens_on_nitrogen_can_be_inferred);
  tcase_add_test (tc, fixed_orders_are_kept);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (kekule_suite)
