#include "core/molecule/molecule.h"

#include <string.h>

#include "tests/read-structure.h"

static EnlMolecule *
build_chain (uint32_t n)
{
  EnlMolecule *mol = enl_molecule_new ();
  EnlAtom atom = {.element = 6};

  for (uint32_t a = 0; a < n; a++) {
    enl_molecule_add_atom (mol, &atom);
    if (a)
      ck_assert_uint_eq (enl_molecule_add_bond (mol, a - 1, a, 1), a - 1);
  }
  return mol;
}

START_TEST (bonds_are_refused_twice_and_to_self)
{
  g_autoptr (EnlMolecule) mol = build_chain (3);

  ck_assert_uint_eq (enl_molecule_add_bond (mol, 1, 0, 2), ENL_NONE);
  ck_assert_uint_eq (enl_molecule_add_bond (mol, 2, 2, 1), ENL_NONE);
  ck_assert_uint_eq (enl_molecule_bonds (mol), 2);
  ck_assert_uint_eq (enl_molecule_bond (mol, 0)->order, 1);
}
END_TEST

START_TEST (adjacency_is_in_order_of_bonds)
{
  g_autoptr (EnlMolecule) mol = read_structure ("CC(=O)CN");

  ck_assert_uint_eq (enl_molecule_degree (mol, 1), 3);
  ck_assert_uint_eq (enl_molecule_neighbour (mol, 1, 0), 0);
  ck_assert_uint_eq (enl_molecule_neighbour (mol, 1, 1), 2);
  ck_assert_uint_eq (enl_molecule_neighbour (mol, 1, 2), 3);
  ck_assert_uint_eq (enl_molecule_bond_at (mol, 1, 1), 1);
  ck_assert_uint_eq (enl_molecule_bond_between (mol, 2, 1), 1);
  ck_assert_uint_eq (enl_molecule_bond_between (mol, 0, 4), ENL_NONE);
  ck_assert_uint_eq (enl_molecule_other_end (mol, 2, 3), 1);
  ck_assert_uint_eq (enl_molecule_order_sum (mol, 1), 4);
}
END_TEST

START_TEST (distances_and_fragments)
{
  g_autoptr (EnlMolecule) mol = read_structure ("CC(C)CO.N.[Na+]");
  uint32_t distance[7], fragment[7];
  const uint32_t far[7] = {1, 0, 1, 1, 2, ENL_NONE, ENL_NONE};
  const uint32_t part[7] = {0, 0, 0, 0, 0, 1, 2};

  enl_molecule_distances (mol, 1, distance);
  ck_assert_uint_eq (enl_molecule_fragments (mol, fragment), 3);
  for (int a = 0; a < 7; a++) {
    ck_assert_uint_eq (distance[a], far[a]);
    ck_assert_uint_eq (fragment[a], part[a]);
  }
}
END_TEST

START_TEST (a_copy_stands_alone)
{
  g_autoptr (EnlMolecule) mol = read_structure ("c1ccccc1C(C)=O");
  enl_molecule_set_name (mol, "acetophenone");
  EnlMolecule *copy = enl_molecule_copy (mol);
  EnlAtom more = {.element = 8};

  enl_molecule_add_bond (mol, enl_molecule_add_atom (mol, &more), 0, 1);
  enl_molecule_set_name (mol, enl_molecule_name (mol)); /* its own name */
  ck_assert_str_eq (enl_molecule_name (mol), "acetophenone");
  ck_assert_str_eq (enl_molecule_name (copy), "acetophenone");
  ck_assert_uint_eq (enl_molecule_atoms (copy), 9);
  ck_assert_uint_eq (enl_molecule_rings (copy), 1);
  ck_assert_uint_eq (enl_molecule_degree (copy, 0), 2);
  ck_assert (enl_molecule_in_ring_of (copy, 5, 6) && !enl_molecule_in_ring (copy, 6));
  EnlMolecule *again = enl_molecule_copy (copy);
  enl_molecule_free (copy);
  ck_assert (enl_molecule_atom (again, 3)->aromatic);
  enl_molecule_free (again);
  enl_molecule_free (NULL);
}
END_TEST

START_TEST (an_empty_molecule_is_no_trap)
{
  g_autoptr (EnlMolecule) mol = enl_molecule_new ();

  enl_molecule_finish (mol);
  g_autoptr (EnlMolecule) copy = enl_molecule_copy (mol);
  g_autofree char *formula = enl_molecule_formula (copy);
  ck_assert_uint_eq (enl_molecule_rings (copy), 0);
  ck_assert_uint_eq (enl_molecule_fragments (copy, NULL), 0);
  ck_assert_str_eq (formula, "");
  ck_assert_str_eq (enl_molecule_name (copy), "");
  ck_assert (!enl_molecule_fold_hydrogens (mol));
}
END_TEST

/* Masses: sums of the IUPAC abridged standard atomic weights (2021) by hand. */
static const struct {
  const char *smiles, *formula;
  double mass;
  int charge;
  uint32_t heavy;
} sum_case[] = {
    {"CC(=O)CC(C)=O", "C5H8O2", 100.117, 0, 7},
    {"CC[O-]", "C2H5O-", 45.061, -1, 3},
    {"[NH4+].[Cl-]", "ClH4N", 53.489, 0, 2},
    {"[Ca+2]", "Ca+2", 40.078, 2, 1},
    {"[2H]OC", "CH4O", 32.042, 0, 2},
    {"OS(=O)(=O)O", "H2O4S", 98.072, 0, 5},
    {"Brc1ccccc1I", "C6H4BrI", 282.902, 0, 8},
    {"[H][H]", "H2", 2.016, 0, 0},
    {"*C", "CH3*", 15.035, 0, 2},
    {"[O-]C(=O)C(=O)[O-]", "C2O4-2", 88.018, -2, 6},
};

START_TEST (sums_over_atoms)
{
  g_autoptr (EnlMolecule) mol = read_structure (sum_case[_i].smiles);
  g_autofree char *formula = enl_molecule_formula (mol);

  ck_assert_str_eq (formula, sum_case[_i].formula);
  ck_assert_double_eq_tol (enl_molecule_mass (mol), sum_case[_i].mass, 1e-9);
  ck_assert_int_eq (enl_molecule_charge (mol), sum_case[_i].charge);
  ck_assert_uint_eq (enl_molecule_heavy_atoms (mol), sum_case[_i].heavy);
}
END_TEST

START_TEST (removal_renumbers_and_forgets_stereo_that_lost_its_ground)
{
  g_autoptr (EnlMolecule) mol = read_structure ("C[C@H](F)O/C=C/[C@](F)(Cl)Br");
  bool remove[11] = {false};
  uint32_t renumber[11];

  remove[2] = remove[6] = true; /* the fluorine, and the carbon at the far end of C=C */
  enl_molecule_remove_atoms (mol, remove, renumber);
  enl_molecule_finish (mol);
  ck_assert_uint_eq (enl_molecule_atoms (mol), 8);
  ck_assert_uint_eq (enl_molecule_bonds (mol), 4);
  ck_assert_uint_eq (renumber[2], ENL_NONE);
  ck_assert_uint_eq (renumber[7], 5);
  ck_assert_int_eq (enl_molecule_atom (mol, 1)->winding, ENL_WINDING_NONE);
  uint32_t bond = enl_molecule_bond_between (mol, renumber[4], renumber[5]);
  ck_assert_int_eq (enl_molecule_bond (mol, bond)->side, ENL_SIDE_NONE);
  ck_assert_uint_eq (enl_molecule_bond (mol, bond)->side_from, ENL_NONE);
  ck_assert_uint_eq (enl_molecule_atom (mol, 5)->input, 8);
}
END_TEST

static const struct {
  const char *label, *smiles;
  uint32_t atoms, hydrogens_of_first;
} fold_case[] = {
    {"methane", "C([H])([H])([H])[H]", 1, 4},
    {"deuterium stays", "C[2H]", 2, 4},
    {"mapped hydrogen stays", "C[H:1]", 2, 4},
    {"hydride stays", "[H-]", 1, 0},
    {"H2 stays", "[H][H]", 2, 1},
    {"hydrogen on any atom stays", "*[H]", 2, 1},
    {"imine geometry needs its hydrogen", "C(/C)=N/[H]", 4, 1},
    {"imine without geometry does not", "C(C)=N[H]", 3, 1},
    {"marks on an imine with equal ends", "C(C)(/C)=N/[H]", 4, 0},
    {"marks on =CH2", "C(/F)=C/[H]", 3, 1},
    {"marks on =CH2, both written", "C(/F)=C(\\[H])[H]", 3, 1},
};

START_TEST (plain_hydrogens_are_folded)
{
  g_autoptr (EnlMolecule) mol = read_structure (fold_case[_i].smiles);

  ck_assert_msg (enl_molecule_atoms (mol) == fold_case[_i].atoms, "%s: %u atoms",
                 fold_case[_i].label, enl_molecule_atoms (mol));
  ck_assert_msg (enl_molecule_total_hydrogens (mol, 0) == fold_case[_i].hydrogens_of_first, "%s",
                 fold_case[_i].label);
}
END_TEST

START_TEST (folding_keeps_input_positions)
{
  g_autoptr (EnlMolecule) mol = read_structure ("[H]OC([H])=C");

  ck_assert_uint_eq (enl_molecule_atoms (mol), 3);
  ck_assert_uint_eq (enl_molecule_atom (mol, 0)->input, 2);
  ck_assert_uint_eq (enl_molecule_atom (mol, 1)->input, 3);
  ck_assert_uint_eq (enl_molecule_atom (mol, 2)->input, 5);
  ck_assert_uint_eq (enl_molecule_atom (mol, 2)->offset, 11);
}
END_TEST

START_TEST (size_is_limited)
{
  g_autoptr (EnlMolecule) long_chain = build_chain (ENL_MAX_ATOMS + 1);
  g_autoptr (EnlMolecule) ladder = build_chain (2 * ENL_MAX_RINGS + 4);
  EnlError err;

  ck_assert_int_eq (enl_molecule_check_size (long_chain, &err), ENL_ERROR_LIMIT);
  for (uint32_t a = 0; a < ENL_MAX_RINGS; a++)
    enl_molecule_add_bond (ladder, a, 2 * ENL_MAX_RINGS + 3 - a, 1);
  ck_assert_int_eq (enl_molecule_check_size (ladder, &err), ENL_OK);
  enl_molecule_add_bond (ladder, ENL_MAX_RINGS, ENL_MAX_RINGS + 3, 1);
  ck_assert_int_eq (enl_molecule_check_size (ladder, &err), ENL_ERROR_LIMIT);
  ck_assert_str_eq (err.text, "601 rings are more than 600");
}
END_TEST

static Suite *
molecule_suite (void)
{
  Suite *suite = suite_create ("molecule");
  TCase *tc = tcase_create ("all");

  tcase_add_test (tc, bonds_are_refused_twice_and_to_self);
  tcase_add_test (tc, adjacency_is_in_order_of_bonds);
  tcase_add_test (tc, distances_and_fragments);
  tcase_add_test (tc, a_copy_stands_alone);
  tcase_add_test (tc, an_empty_molecule_is_no_trap);
  tcase_add_loop_test (tc, sums_over_atoms, 0, (int)ENL_COUNT (sum_case));
  tcase_add_test (tc, removal_renumbers_and_forgets_stereo_that_lost_its_ground);
  tcase_add_loop_test (tc, plain_hydrogens_are_folded, 0, (int)ENL_COUNT (fold_case));
  tcase_add_test (tc, folding_keeps_input_positions);
  tcase_add_test (tc, size_is_limited);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (molecule_suite)
