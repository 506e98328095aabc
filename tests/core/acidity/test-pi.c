#include "core/acidity/pi.h"

#include <math.h>
#include <string.h>

#include "core/acidity/pi-parameters.h"
#include "core/notation/smiles.h"
#include "resources/embedded.h"
#include "tests/runner.h"

static EnlMolecule *
read_smiles (const char *text)
{
  EnlMolecule *mol = NULL;
  EnlError err;
  EnlStatus status = enl_smiles_parse (text, strlen (text), &mol, &err);

  ck_assert_msg (status == ENL_OK, "%s: %s", text, status == ENL_OK ? "" : err.text);
  return mol;
}

static double
sum_of (const double *value, uint32_t n)
{
  double sum = 0.0;

  for (uint32_t i = 0; i < n; i++)
    sum += value[i];
  return sum;
}

/* Gains of the conjugate bases that the project's method description lists (Hückel energies with
 * Van-Catledge's parameters); the first atom of the SMILES is the site. */
static const struct {
  const char *label, *smiles;
  double gain;
} gain_case[] = {
    {"toluene", "Cc1ccccc1", 0.72},
    {"N,N-dimethylacetamide", "CC(=O)N(C)C", 1.02},
    {"acetonitrile", "CC#N", 1.05},
    {"ethyl acetate", "CC(=O)OCC", 1.12},
    {"acetone", "CC(=O)C", 1.20},
    {"nitromethane", "C[N+](=O)[O-]", 1.46},
    {"phenylacetone", "C(c1ccccc1)C(=O)C", 1.68},
    {"indene", "C1C=Cc2ccccc12", 1.75},
    {"acetylacetone", "C(C(=O)C)C(=O)C", 1.93},
    {"cyclopentadiene", "C1C=CC=C1", 2.00},
    {"propane: nothing to share with", "C(C)C", 0.0},
    {"propyne, terminal: sp lone pair", "C#CC", 0.0},
    {"benzene: lone pair in the plane", "c1ccccc1", 0.0},
    {"propene: allyl, 2 sqrt 2 - 2", "CC=C", 0.8284271},
    {"propyne, methyl: as allyl", "CC#C", 0.8284271},
    {"allene: lone pair along C=C", "C=C=C", 0.8284271},
};

START_TEST (gains)
{
  g_autoptr (EnlMolecule) mol = read_smiles (gain_case[_i].smiles);
  g_autoptr (EnlPi) pi = enl_pi_new (mol);
  g_auto (EnlPiChange) change;

  enl_pi_deprotonate (pi, 0, &change);
  ck_assert_msg (fabs (change.energy_gain - gain_case[_i].gain) < 0.03, "%s: %g, not %g",
                 gain_case[_i].label, change.energy_gain, gain_case[_i].gain);
  ck_assert_double_eq_tol (sum_of (change.shift, change.n_atoms), 1.0, 1e-9);
  ck_assert_double_eq_tol (sum_of (change.excess, change.n_atoms), 1.0, 1e-9);
  ck_assert_double_ge (change.participation, 1.0 - 1e-9);
}
END_TEST

/* Contributing structures of one ion, drawn in the same atom order. */
static const struct {
  const char *label, *a, *b;
} drawing_case[] = {
    {"enolate", "[CH2-]C(=O)C", "C=C([O-])C"},
    {"nitronate", "[CH2-][N+](=O)[O-]", "C=[N+]([O-])[O-]"},
    {"ketenimide", "[CH2-]C#N", "C=C=[N-]"},
    {"propargyl", "[CH2-]C#C", "C=C=[CH-]"},
    {"phenoxide", "[O-]c1ccccc1", "O=C1[CH-]C=CC=C1"},
    {"amidinium", "CC(=[NH2+])N", "CC(N)=[NH2+]"},
    {"diazo", "C=[N+]=[N-]", "[CH2-][N+]#N"},
    {"azide", "CN=[N+]=[N-]", "C[N-][N+]#N"},
    {"nitro", "C[N+](=O)[O-]", "C[N+]([O-])=O"},
    {"pyridinium ylide", "[CH2-]c1cc[n+](C)cc1", "C=C1C=CN(C)C=C1"},
};

START_TEST (drawing_does_not_matter)
{
  g_autoptr (EnlMolecule) a = read_smiles (drawing_case[_i].a);
  g_autoptr (EnlMolecule) b = read_smiles (drawing_case[_i].b);
  g_autoptr (EnlPi) pi_a = enl_pi_new (a);
  g_autoptr (EnlPi) pi_b = enl_pi_new (b);

  ck_assert_uint_eq (enl_molecule_atoms (a), enl_molecule_atoms (b));
  ck_assert_double_eq_tol (enl_pi_energy (pi_a), enl_pi_energy (pi_b), 1e-9);
  for (uint32_t i = 0; i < enl_molecule_bonds (a); i++) {
    const EnlBond *bond = enl_molecule_bond (a, i);
    uint32_t same = enl_molecule_bond_between (b, bond->from, bond->to);
    ck_assert_double_eq_tol (enl_pi_bond_order (pi_a)[i], enl_pi_bond_order (pi_b)[same], 1e-9);
  }
}
END_TEST

/* Values that follow from the secular determinant on paper. */
START_TEST (benzene_and_butadiene)
{
  g_autoptr (EnlMolecule) benzene = read_smiles ("c1ccccc1");
  g_autoptr (EnlMolecule) butadiene = read_smiles ("C=CC=C");
  g_autoptr (EnlPi) pi6 = enl_pi_new (benzene);
  g_autoptr (EnlPi) pi4 = enl_pi_new (butadiene);
  double energy = 0.0, electrons = 0.0;

  ck_assert_double_eq_tol (enl_pi_energy (pi6), 8.0, 1e-9);
  for (uint32_t i = 0; i < 6; i++)
    ck_assert_double_eq_tol (enl_pi_bond_order (pi6)[i], 2.0 / 3.0, 1e-9);
  ck_assert_double_eq_tol (enl_pi_energy (pi4), 2.0 * sqrt (5.0), 1e-9);
  ck_assert_double_eq_tol (enl_pi_bond_order (pi4)[0], 2.0 / sqrt (5.0), 1e-9);
  ck_assert (enl_pi_level (pi4, 1, &energy, &electrons));
  ck_assert_double_eq_tol (energy, (sqrt (5.0) - 1.0) / 2.0, 1e-9);
  ck_assert_double_eq_tol (electrons, 2.0, 1e-12);
  ck_assert (!enl_pi_level (pi4, 4, &energy, &electrons));
}
END_TEST

START_TEST (allene_planes_are_apart)
{
  g_autoptr (EnlMolecule) allene = read_smiles ("C=C=C");
  g_autoptr (EnlMolecule) ketene = read_smiles ("C=C=O");
  g_autoptr (EnlPi) pi = enl_pi_new (allene);
  g_autoptr (EnlPi) pi_ketene = enl_pi_new (ketene);

  ck_assert_double_eq_tol (enl_pi_energy (pi), 4.0, 1e-9);
  ck_assert_uint_ne (enl_pi_system (pi, 0), enl_pi_system (pi, 2));
  ck_assert_uint_ne (enl_pi_system (pi_ketene, 0), enl_pi_system (pi_ketene, 2));
}
END_TEST

START_TEST (charges)
{
  g_autoptr (EnlMolecule) acetate = read_smiles ("CC(=O)[O-]");
  g_autoptr (EnlMolecule) anion = read_smiles ("[CH-]1C=CC=C1");
  g_autoptr (EnlMolecule) nitro = read_smiles ("CC[N+](=O)[O-]");
  g_autoptr (EnlPi) pi = enl_pi_new (acetate);
  g_autoptr (EnlPi) pi5 = enl_pi_new (anion);
  g_autoptr (EnlPi) pi_nitro = enl_pi_new (nitro);

  ck_assert_double_eq_tol (enl_pi_charge (pi)[2], enl_pi_charge (pi)[3], 1e-9);
  ck_assert_double_lt (enl_pi_charge (pi)[2], -0.5);
  ck_assert_double_eq_tol (sum_of (enl_pi_charge (pi), 4), -1.0, 1e-9);
  for (uint32_t i = 0; i < 5; i++)
    ck_assert_double_eq_tol (enl_pi_charge (pi5)[i], -0.2, 1e-9);
  ck_assert_double_eq_tol (enl_pi_charge (pi_nitro)[3], enl_pi_charge (pi_nitro)[4], 1e-9);
  ck_assert_double_eq_tol (sum_of (enl_pi_charge (pi_nitro), 5), 0.0, 1e-9);
}
END_TEST

/* Sites on heteroatoms count only what the anion gains beyond the acid's own donor. */
START_TEST (heteroatom_sites)
{
  g_autoptr (EnlMolecule) acid = read_smiles ("CC(=O)O");
  g_autoptr (EnlMolecule) alcohol = read_smiles ("CCO");
  g_autoptr (EnlMolecule) phenol = read_smiles ("Oc1ccccc1");
  g_autoptr (EnlPi) pi_acid = enl_pi_new (acid);
  g_autoptr (EnlPi) pi_alcohol = enl_pi_new (alcohol);
  g_autoptr (EnlPi) pi_phenol = enl_pi_new (phenol);
  g_auto (EnlPiChange) a, b, c;

  enl_pi_deprotonate (pi_acid, 3, &a);
  enl_pi_deprotonate (pi_alcohol, 2, &b);
  enl_pi_deprotonate (pi_phenol, 0, &c);
  ck_assert_double_eq_tol (b.energy_gain, 0.0, 1e-9);
  ck_assert_double_gt (c.energy_gain, b.energy_gain + 0.1);
  ck_assert_double_gt (a.energy_gain, c.energy_gain);
  ck_assert_double_eq_tol (a.excess[2], a.excess[3], 1e-9);
  ck_assert_double_eq_tol (sum_of (c.shift, c.n_atoms), 1.0, 1e-9);
}
END_TEST

START_TEST (parameter_table_faults)
{
  static const struct {
    const char *label, *text;
    size_t line;
  } row[] = {
      {"no value", "kind\ta\tb\tvalue\tsource\nh\tC.\t\t\tx\n", 2},
      {"unknown kind", "kind\ta\tb\tvalue\tsource\nh\tC.\t\t0\tx\nq\tC.\tC.\t1\tx\n", 3},
      {"pair without h", "kind\ta\tb\tvalue\tsource\nh\tC.\t\t0\tx\nk\tC.\tN.\t1\tx\n", 3},
      {"twice", "kind\ta\tb\tvalue\tsource\nh\tC.\t\t0\tx\nh\tC.\t\t0\tx\n", 3},
      {"incomplete", "kind\ta\tb\tvalue\tsource\nh\tC.\t\t0\tx\n", 0},
  };
  EnlPiParameters parameters;
  EnlError err = {0};

  for (size_t i = 0; i < ENL_COUNT (row); i++) {
    EnlStatus status =
        enl_pi_parameters_parse (row[i].text, strlen (row[i].text), &parameters, &err);
    ck_assert_msg (status == ENL_ERROR_FORMAT, "%s", row[i].label);
    ck_assert_msg (err.line == row[i].line, "%s: line %zu", row[i].label, err.line);
  }
  ck_assert_int_ge (enl_pi_parameters_type (enl_pi_parameters (), "N:"), 0);
  ck_assert_int_eq (enl_pi_parameters_type (enl_pi_parameters (), "Zz"), -1);
}
END_TEST

static Suite *
pi_suite (void)
{
  Suite *suite = suite_create ("acidity pi");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, gains, 0, (int)ENL_COUNT (gain_case));
  tcase_add_loop_test (tc, drawing_does_not_matter, 0, (int)ENL_COUNT (drawing_case));
  tcase_add_test (tc, benzene_and_butadiene);
  tcase_add_test (tc, allene_planes_are_apart);
  tcase_add_test (tc, charges);
  tcase_add_test (tc, heteroatom_sites);
  tcase_add_test (tc, parameter_table_faults);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (pi_suite)
