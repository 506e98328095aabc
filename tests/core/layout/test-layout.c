#include "core/layout/layout.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "core/molecule/stereo.h"
#include "core/molecule/symmetry.h"
#include "core/notation/smiles.h"
#include "tests/core/layout/ring-cases.h"
#include "tests/runner.h"

static EnlMolecule *
read_molecule (const char *smiles)
{
  EnlMolecule *mol = NULL;
  EnlError err;
  EnlStatus status = enl_smiles_parse (smiles, strlen (smiles), &mol, &err);

  ck_assert_msg (status == ENL_OK, "%s: %s", smiles, status == ENL_OK ? "" : err.text);
  return mol;
}

static EnlMolecule *
lay_out (const char *smiles)
{
  EnlMolecule *mol = read_molecule (smiles);
  EnlError err;

  ck_assert_msg (enl_layout (mol, &err) == ENL_OK, "%s: no layout", smiles);
  ck_assert (enl_molecule_has_layout (mol));
  return mol;
}

/* The same structure with its atoms and bonds in another order (multiplicative shuffle), without
 * windings, which depend on the order. */
static EnlMolecule *
shuffled_copy (const EnlMolecule *mol, uint32_t seed)
{
  uint32_t n = enl_molecule_atoms (mol), m = enl_molecule_bonds (mol);
  g_autofree uint32_t *to = g_new (uint32_t, n + 1);
  g_autofree uint32_t *from = g_new (uint32_t, n + 1);
  EnlMolecule *copy = enl_molecule_new ();

  for (uint32_t i = 0; i < n; i++)
    from[i] = i;
  for (uint32_t i = n; i-- > 1;) {
    seed = seed * 1664525u + 1013904223u;
    uint32_t j = (seed >> 8) % (i + 1), keep = from[i];
    from[i] = from[j], from[j] = keep;
  }
  for (uint32_t i = 0; i < n; i++) {
    EnlAtom atom = *enl_molecule_atom (mol, from[i]);
    atom.winding = ENL_WINDING_NONE;
    atom.x = atom.y = 0;
    to[from[i]] = enl_molecule_add_atom (copy, &atom);
  }
  for (uint32_t k = m; k-- > 0;) {
    const EnlBond *bond = enl_molecule_bond (mol, k);
    uint32_t b = enl_molecule_add_bond (copy, to[bond->to], to[bond->from], bond->order);
    EnlBond *made = enl_molecule_edit_bond (copy, b);
    made->side = bond->side;
    made->side_from = bond->side == ENL_SIDE_NONE ? ENL_NONE : to[bond->side_to];
    made->side_to = bond->side == ENL_SIDE_NONE ? ENL_NONE : to[bond->side_from];
  }
  enl_molecule_finish (copy);
  return copy;
}

/* Largest distance between atoms of the same canonical rank. */
static double
largest_difference (const EnlMolecule *a, const EnlMolecule *b)
{
  uint32_t n = enl_molecule_atoms (a);
  g_autofree uint32_t *rank_a = g_new (uint32_t, n + 1);
  g_autofree uint32_t *rank_b = g_new (uint32_t, n + 1);
  g_autofree uint32_t *at = g_new (uint32_t, n + 1);
  double worst = 0;

  enl_canonical_ranks (a, rank_a);
  enl_canonical_ranks (b, rank_b);
  for (uint32_t i = 0; i < n; i++)
    at[rank_b[i]] = i;
  for (uint32_t i = 0; i < n; i++) {
    const EnlAtom *p = enl_molecule_atom (a, i), *q = enl_molecule_atom (b, at[rank_a[i]]);
    worst = fmax (worst, hypot (p->x - q->x, p->y - q->y));
  }
  return worst;
}

/* ---- ring systems ---- */

START_TEST (ring_systems_are_clear)
{
  const RingCase *row = &ring_case[_i];
  g_autoptr (EnlMolecule) mol = lay_out (row->smiles);
  EnlLayoutQuality q = enl_layout_quality (mol);
  double low = row->cage ? 0.6 : 0.85, high = row->cage ? 1.6 : 1.15;

  ck_assert_msg (q.closest >= 0.35, "%s: closest %.3f", row->label, q.closest);
  ck_assert_msg (q.overlaps == 0, "%s: %u overlaps", row->label, q.overlaps);
  ck_assert_msg (q.crossings <= row->crossings, "%s: %u crossings", row->label, q.crossings);
  ck_assert_msg (q.shortest_bond >= low && q.longest_bond <= high, "%s: bonds %.3f to %.3f",
                 row->label, q.shortest_bond, q.longest_bond);
}
END_TEST

START_TEST (picture_does_not_depend_on_the_input_order)
{
  const RingCase *row = &ring_case[_i];
  g_autoptr (EnlMolecule) mol = lay_out (row->smiles);

  for (uint32_t seed = 1; seed <= 3; seed++) {
    g_autoptr (EnlMolecule) other = shuffled_copy (mol, seed * 7919);
    ck_assert_int_eq (enl_layout (other, NULL), ENL_OK);
    double difference = largest_difference (mol, other);
    ck_assert_msg (difference < 1e-6, "%s: order %u differs by %g", row->label, seed, difference);
  }
}
END_TEST

/* ---- stereochemistry ---- */

static const struct {
  const char *label, *smiles;
} side_case[] = {
    {"E-pent-3-en-2-one", "C/C=C/C(C)=O"},
    {"Z-pent-3-en-2-one", "C/C=C\\C(C)=O"},
    {"sorbic ester", "C/C=C/C=C/C(=O)OC"},
    {"2Z,4E-dienoate", "C/C=C/C=C\\C(=O)OC"},
    {"tetrasubstituted", "CC/C(C)=C(/C)C(=O)OC"},
    {"Z-stilbene", "C(=C\\c1ccccc1)\\c1ccccc1"},
    {"oxime", "C/C(=N\\O)c1ccccc1"},
    {"retinal", "CC1=C(C(C)(C)CCC1)/C=C/C(C)=C/C=C/C(C)=C/C=O"},
    {"11-cis-retinal", "CC1=C(C(C)(C)CCC1)/C=C/C(C)=C\\C=C\\C(C)=C\\C=O"},
    {"benzylidene camphor", "CC1(C)C2CCC1(C)C(=O)/C2=C/c1ccccc1"},
    {"arachidonic acid", "CCCCC/C=C\\C/C=C\\C/C=C\\C/C=C\\CCCC(O)=O"},
    {"explicit hydrogens", "[2H]/C(C)=C(/[2H])C(C)=O"},
};

static double
side_of (const EnlMolecule *mol, uint32_t a, uint32_t b, uint32_t c)
{
  const EnlAtom *p = enl_molecule_atom (mol, a), *q = enl_molecule_atom (mol, b);
  const EnlAtom *r = enl_molecule_atom (mol, c);

  return (q->x - p->x) * (r->y - p->y) - (q->y - p->y) * (r->x - p->x);
}

START_TEST (double_bonds_are_drawn_on_their_side)
{
  g_autoptr (EnlMolecule) mol = lay_out (side_case[_i].smiles);
  uint32_t checked = 0;

  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    const EnlBond *bond = enl_molecule_bond (mol, b);
    if (bond->side == ENL_SIDE_NONE)
      continue;
    double product = side_of (mol, bond->from, bond->to, bond->side_from) *
                     side_of (mol, bond->from, bond->to, bond->side_to);
    ck_assert_msg (bond->side == ENL_SIDE_SAME ? product > 0.1 : product < -0.1,
                   "%s: bond %u on the wrong side", side_case[_i].label, b);
    checked++;
  }
  ck_assert_msg (checked > 0, "%s: no sided bond was read", side_case[_i].label);
}
END_TEST

static const struct {
  const char *label, *smiles;
} winding_case[] = {
    {"L-alanine", "C[C@H](N)C(O)=O"},
    {"R-carvone", "CC1=CC[C@H](CC1=O)C(C)=C"},
    {"menthone", "C[C@@H]1CC[C@H](C(=O)C1)C(C)C"},
    {"testosterone", "C[C@]12CC[C@H]3[C@@H](CCC4=CC(=O)CC[C@]34C)[C@@H]1CC[C@@H]2O"},
    {"penicillin", "CC1(C)S[C@@H]2[C@H](NC(C)=O)C(=O)N2[C@H]1C(O)=O"},
    {"glucose", "OC[C@H]1OC(O)[C@H](O)[C@@H](O)[C@@H]1O"},
};

START_TEST (wedges_tell_the_windings)
{
  g_autoptr (EnlMolecule) mol = lay_out (winding_case[_i].smiles);
  g_autoptr (EnlMolecule) copy = enl_molecule_copy (mol);
  uint32_t centres = 0;

  for (uint32_t i = 0; i < enl_molecule_atoms (copy); i++)
    enl_molecule_edit_atom (copy, i)->winding = ENL_WINDING_NONE;
  enl_stereo_from_drawing (copy);
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    EnlWinding want = enl_molecule_atom (mol, i)->winding;
    centres += want != ENL_WINDING_NONE;
    ck_assert_msg (enl_molecule_atom (copy, i)->winding == want, "%s: atom %u",
                   winding_case[_i].label, i);
  }
  ck_assert_uint_gt (centres, 0);
}
END_TEST

/* ---- small and special inputs ---- */

static const struct {
  const char *label, *smiles;
} small_case[] = {
    {"methane", "C"},
    {"ammonium", "[NH4+]"},
    {"sodium acetate", "[Na+].CC([O-])=O"},
    {"three fragments", "[Na+].[Na+].O=C([O-])CC([O-])=O"},
    {"hydrogen", "[H][H]"},
    {"deuterated acetone", "[2H]C([2H])([2H])C(=O)C([2H])([2H])[2H]"},
    {"deuterated cyclohexanone", "O=C1C([2H])([2H])CCCC1([2H])[2H]"},
    {"deuterated water", "[2H]O[2H]"},
    {"methane-d4", "[2H]C([2H])([2H])[2H]"},
    {"deuterated camphor", "CC1(C)C2CCC1(C)C(=O)C2([2H])[2H]"},
    {"deuteride", "[2H-].[Na+]"},
    {"carbon dioxide", "O=C=O"},
    {"allene", "CC=C=CC(C)=O"},
    {"ynone", "CC#CC(=O)C#N"},
    {"sulfone", "CS(=O)(=O)CC(=O)C"},
    {"phosphonate", "CCOP(=O)(OCC)CC(=O)OC"},
    {"isolated ions", "[Li+].[Cl-].[Mg+2].[Cl-].[Cl-]"},
    {"any atom", "*CC(=O)*"},
    {"methylmagnesium bromide", "C[Mg]Br"},
    {"hexafluoroacetone", "FC(F)(F)C(=O)C(F)(F)F"},
    {"tetraphenylmethane", "c1ccccc1C(c1ccccc1)(c1ccccc1)c1ccccc1"},
    {"square complex", "N[Pt](N)(Cl)Cl"},
};

START_TEST (small_and_special_structures)
{
  g_autoptr (EnlMolecule) mol = lay_out (small_case[_i].smiles);
  EnlLayoutQuality q = enl_layout_quality (mol);

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    ck_assert (isfinite (enl_molecule_atom (mol, i)->x) &&
               isfinite (enl_molecule_atom (mol, i)->y));
  ck_assert_msg (q.overlaps == 0, "%s: %u overlaps", small_case[_i].label, q.overlaps);
  ck_assert_msg (q.closest >= 0.35, "%s: closest %.3f", small_case[_i].label, q.closest);
  ck_assert_msg (q.crossings == 0, "%s: %u crossings", small_case[_i].label, q.crossings);
}
END_TEST

START_TEST (an_empty_molecule_has_a_layout)
{
  g_autoptr (EnlMolecule) mol = enl_molecule_new ();

  enl_molecule_finish (mol);
  ck_assert_int_eq (enl_layout (mol, NULL), ENL_OK);
  ck_assert (enl_molecule_has_layout (mol));
  ck_assert_uint_eq (enl_layout_quality (mol).overlaps, 0);
}
END_TEST

START_TEST (quality_sees_what_is_wrong)
{
  g_autoptr (EnlMolecule) mol = read_molecule ("CCCC.C");
  const double x[] = {0, 1.3, 1.3, 0.4, 0.6}, y[] = {0, 0, 0.9, -0.5, 0.1};

  for (uint32_t i = 0; i < 5; i++) {
    enl_molecule_edit_atom (mol, i)->x = x[i];
    enl_molecule_edit_atom (mol, i)->y = y[i];
  }
  EnlLayoutQuality q = enl_layout_quality (mol);
  ck_assert_uint_eq (q.crossings, 1); /* first and third bond */
  ck_assert_uint_eq (q.overlaps, 1);  /* methane on the first bond */
  ck_assert_double_eq_tol (q.closest, hypot (0.6, 0.1), 1e-9);
  ck_assert_double_eq_tol (q.shortest_bond, 0.9, 1e-9);
  ck_assert_double_eq_tol (q.longest_bond, hypot (0.9, 1.4), 1e-9);
}
END_TEST

/* ---- orientation (IUPAC 2008, GR-3: Pure Appl. Chem. 2008, 80, 277) ---- */

static double
width_over_height (const EnlMolecule *mol)
{
  double low_x = INFINITY, high_x = -INFINITY, low_y = INFINITY, high_y = -INFINITY;

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    const EnlAtom *atom = enl_molecule_atom (mol, i);
    low_x = fmin (low_x, atom->x), high_x = fmax (high_x, atom->x);
    low_y = fmin (low_y, atom->y), high_y = fmax (high_y, atom->y);
  }
  return (high_x - low_x) / (high_y - low_y);
}

START_TEST (long_structures_lie_flat)
{
  g_autoptr (EnlMolecule) chain = lay_out ("CCCCCCCC(=O)CCCC");
  g_autoptr (EnlMolecule) tetracene = lay_out ("c1ccc2cc3cc4ccccc4cc3cc2c1");

  ck_assert_double_gt (width_over_height (chain), 3);
  ck_assert_double_gt (width_over_height (tetracene), 3);
}
END_TEST

START_TEST (a_carbonyl_group_stands_upright)
{
  static const char *const text[] = {"O=C(C)C", "O=C(c1ccccc1)c1ccccc1", "O=C1c2ccccc2Cc2ccccc12",
                                     "O=C1CCCCC1"};

  for (size_t k = 0; k < ENL_COUNT (text); k++) {
    g_autoptr (EnlMolecule) mol = lay_out (text[k]);
    const EnlAtom *o = enl_molecule_atom (mol, 0), *c = enl_molecule_atom (mol, 1);
    ck_assert_msg (o->y - c->y > 0.99 && fabs (o->x - c->x) < 0.05, "%s: (%.2f, %.2f)", text[k],
                   o->x - c->x, o->y - c->y);
  }
}
END_TEST

/* Common practice: ring A of a steroid lower left, ring D upper right, methyl groups up. */
START_TEST (a_steroid_stands_as_usual)
{
  g_autoptr (EnlMolecule) mol = lay_out ("O=C1CCC2(C)C(=C1)CCC1C2CCC2(C)C1CCC2O");
  const EnlAtom *o3 = enl_molecule_atom (mol, 0), *c10 = enl_molecule_atom (mol, 4);
  const EnlAtom *c19 = enl_molecule_atom (mol, 5), *o17 = enl_molecule_atom (mol, 20);

  ck_assert_uint_eq (o17->element, 8);
  ck_assert (o3->x < c10->x && o3->y < c10->y);
  ck_assert (o17->x > c10->x && o17->y > c10->y);
  ck_assert_double_gt (c19->y - c10->y, 0.9);
}
END_TEST

/* ---- size ---- */

static char *
peptide (uint32_t residues)
{
  GString *text = g_string_new ("N");

  for (uint32_t k = 0; k < residues; k++)
    g_string_append_printf (text, "C(Cc1ccccc1)C(=O)%c", k + 1 < residues ? 'N' : 'O');
  return g_string_free (text, FALSE);
}

static char *
ring (uint32_t atoms)
{
  GString *text = g_string_new ("O=C1");

  for (uint32_t k = 0; k + 3 < atoms; k++)
    g_string_append_c (text, 'C');
  g_string_append (text, "CC1");
  return g_string_free (text, FALSE);
}

START_TEST (large_structures_come_in_time)
{
  const uint32_t residues[] = {2, 5, 11, 18, 36};
  const uint32_t rings[] = {31, 40, 120, 399};

  for (size_t k = 0; k < ENL_COUNT (residues) + ENL_COUNT (rings); k++) {
    bool is_peptide = k < ENL_COUNT (residues);
    g_autofree char *text =
        is_peptide ? peptide (residues[k]) : ring (rings[k - ENL_COUNT (residues)]);
    g_autoptr (EnlMolecule) mol = lay_out (text);
    EnlLayoutQuality q = enl_layout_quality (mol);
    ck_assert_msg (q.overlaps == 0, "%u atoms: %u overlaps", enl_molecule_atoms (mol), q.overlaps);
    ck_assert_msg (q.crossings == 0, "%u atoms: %u crossings", enl_molecule_atoms (mol),
                   q.crossings);
  }
}
END_TEST

START_TEST (a_huge_structure_is_refused)
{
  g_autofree char *text = ring (ENL_LAYOUT_MAX_ATOMS + 1); /* and one oxygen */
  g_autoptr (EnlMolecule) mol = read_molecule (text);
  EnlError err;

  ck_assert_int_eq (enl_layout (mol, &err), ENL_ERROR_LIMIT);
  ck_assert (!enl_molecule_has_layout (mol));
  ck_assert (err.text[0] && err.advice[0]);
}
END_TEST

static Suite *
layout_suite (void)
{
  Suite *suite = suite_create ("layout");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 240);
  tcase_add_loop_test (tc, ring_systems_are_clear, 0, (int)ENL_COUNT (ring_case));
  tcase_add_loop_test (tc, picture_does_not_depend_on_the_input_order, 0,
                       (int)ENL_COUNT (ring_case));
  tcase_add_loop_test (tc, double_bonds_are_drawn_on_their_side, 0, (int)ENL_COUNT (side_case));
  tcase_add_loop_test (tc, wedges_tell_the_windings, 0, (int)ENL_COUNT (winding_case));
  tcase_add_loop_test (tc, small_and_special_structures, 0, (int)ENL_COUNT (small_case));
  tcase_add_test (tc, an_empty_molecule_has_a_layout);
  tcase_add_test (tc, quality_sees_what_is_wrong);
  tcase_add_test (tc, long_structures_lie_flat);
  tcase_add_test (tc, a_carbonyl_group_stands_upright);
  tcase_add_test (tc, a_steroid_stands_as_usual);
  tcase_add_test (tc, large_structures_come_in_time);
  tcase_add_test (tc, a_huge_structure_is_refused);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (layout_suite)
