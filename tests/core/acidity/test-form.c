#include "core/acidity/form.h"

#include <math.h>
#include <string.h>

#include "core/acidity/nnls.h"
#include "core/acidity/pi.h"
#include "core/molecule/symmetry.h"
#include "core/molecule/valence.h"
#include "core/notation/smiles.h"
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

static EnlForms *
forms_of (const char *smiles, uint32_t atom)
{
  g_autoptr (EnlMolecule) mol = read_smiles (smiles);
  EnlForms *forms = NULL;
  EnlError err;
  EnlStatus status = enl_forms_of_site (mol, atom, &forms, &err);

  ck_assert_msg (status == ENL_OK, "%s: %s", smiles, status == ENL_OK ? "" : err.text);
  return forms;
}

/* Weight of the card whose moved pair sits on `centre` or on one of its copies, per copy of the
 * charge pattern: summed over all contributors centred on that very atom. */
static double
weight_on (const EnlForms *forms, uint32_t centre)
{
  double weight = 0.0;

  for (uint32_t i = 0; i < forms->n_all; i++)
    if (forms->all[i].centre == centre)
      weight += forms->all[i].weight;
  return weight;
}

/* ---- a table of anions, with what a textbook draws ---- */

static const struct {
  const char *label, *smiles;
  uint32_t atom; /* from 0 */
  uint32_t n_forms, n_all, first_copies;
} count_case[] = {
    {"acetone enolate", "CC(=O)C", 0, 2, 2, 1},
    {"acetylacetonate", "CC(=O)CC(=O)C", 3, 2, 3, 1},
    {"nitronate", "C[N+](=O)[O-]", 0, 2, 3, 2},
    {"ester enolate", "CC(=O)OCC", 0, 2, 2, 1},
    {"phenoxide", "Oc1ccccc1", 0, 3, 5, 2},
    {"cyclopentadienide", "C1C=CC=C1", 0, 1, 5, 5},
    {"malonate", "COC(=O)CC(=O)OC", 4, 2, 3, 1},
    {"dimedone", "O=C1CC(=O)CC(C)(C)C1", 2, 2, 3, 1},
    {"cyanoacetate", "N#CCC(=O)OCC", 2, 3, 3, 1},
    {"fluorenide", "C1c2ccccc2-c2ccccc12", 0, 7, 22, 4},
    {"benzyl", "Cc1ccccc1", 0, 3, 5, 2},
    {"pyrrolide", "c1cc[nH]c1", 3, 3, 5, 1},
    {"acetate", "CC(=O)O", 3, 1, 2, 2},
    {"amide N-H", "CC(=O)NC", 3, 2, 2, 1},
    {"vinylogous dienolate", "CC=CC(=O)C", 0, 3, 3, 1},
    {"2-naphtholate", "Oc1ccc2ccccc2c1", 0, 6, 9, 3},
    {"imidazolide", "c1c[nH]cn1", 2, 3, 5, 2},
    {"tetrazolide", "c1nnn[nH]1", 4, 3, 5, 2},
    {"thioamide N-H", "CC(=S)NC", 3, 2, 2, 1},
    {"sulfone", "CS(=O)(=O)C", 0, 1, 1, 1},
    {"terminal alkyne", "C#CC", 0, 1, 1, 1},
    {"nitrile", "CC#N", 0, 2, 2, 1},
    {"propargyl and allenyl", "CC#C", 0, 2, 2, 1},
    {"cyanide", "C#N", 0, 1, 1, 1},
    {"sulfinate: both oxygens", "CS(=O)O", 3, 1, 2, 2},
    {"azo", "CN=Nc1ccccc1", 0, 4, 7, 2},
    {"beta-carboxylate dianion", "[O-]C(=O)CC(=O)C", 3, 3, 5, 2},
    {"bis-enolate dianion of acetylacetone", "[CH2-]C(=O)CC(=O)C", 3, 5, 5, 1},
    {"pyridinium ylide to anhydrobase", "C[n+]1ccc(C)cc1", 5, 3, 5, 2},
    {"phosphonium ylide: no pi form", "C[P+](C)(C)C", 0, 1, 1, 1},
    {"azomethine ylide", "CC=[N+](C)C", 4, 2, 2, 1},
    {"remote nitro stays as drawn", "CC(=O)CCC[N+](=O)[O-]", 0, 2, 2, 1},
    {"remote phenyl stays as drawn", "CC(=O)CCc1ccccc1", 0, 2, 2, 1},
    {"aryl carbanion: pair in the plane", "c1ccccc1", 0, 1, 2, 2},
    {"hydrogen with an atom of its own", "[2H]C([2H])([2H])C(=O)C", 1, 2, 2, 1},
    {"amidinium beside an enolate", "CC(=O)CC(N)=[NH2+]", 3, 3, 5, 2},
};

START_TEST (counts)
{
  g_autoptr (EnlForms) forms = forms_of (count_case[_i].smiles, count_case[_i].atom);

  ck_assert_msg (forms->n_all == count_case[_i].n_all, "%s: %u contributors", count_case[_i].label,
                 forms->n_all);
  ck_assert_msg (forms->n_forms == count_case[_i].n_forms, "%s: %u cards", count_case[_i].label,
                 forms->n_forms);
  ck_assert_msg (forms->form[0].copies == count_case[_i].first_copies, "%s: %u copies",
                 count_case[_i].label, forms->form[0].copies);
  ck_assert (!forms->capped);
}
END_TEST

/* ---- laws that hold for every anion ---- */

static double
total (const double *value, uint32_t n)
{
  double sum = 0.0;

  for (uint32_t i = 0; i < n; i++)
    sum += value[i];
  return sum;
}

static void
check_weights (const EnlForms *forms, const char *label)
{
  double sum = 0.0, sum_all = 0.0;
  uint32_t copies = 0;

  for (uint32_t i = 0; i < forms->n_forms; i++) {
    ck_assert_msg (forms->form[i].weight >= 0.0, "%s", label);
    ck_assert_msg (i < 2 || forms->form[i].weight <= forms->form[i - 1].weight + 1e-9, "%s: order",
                   label);
    ck_assert_uint_eq (forms->form[i].card, i);
    sum += forms->form[i].weight;
    copies += forms->form[i].copies;
  }
  for (uint32_t i = 0; i < forms->n_all; i++)
    sum_all += forms->all[i].weight;
  ck_assert_double_eq_tol (sum, 1.0, 1e-9);
  ck_assert_double_eq_tol (sum_all, 1.0, 1e-9);
  ck_assert_uint_eq (copies, forms->n_all);
}

/* Every form is a molecule with the charge of the anion, usual valences and the hydrogens of the
 * anion, and no more formal charges than form 0. */
static void
check_molecules (const EnlForms *forms, const char *label)
{
  int charge = enl_molecule_charge (forms->anion);

  for (uint32_t i = 0; i < forms->n_forms; i++) {
    g_autoptr (EnlMolecule) mol = enl_forms_molecule (forms, i);
    g_autofree char *formula = enl_molecule_formula (mol);
    g_autofree char *expected = enl_molecule_formula (forms->anion);
    EnlError err;
    int charges = 0, charges_first = 0;
    for (uint32_t a = 0; a < enl_molecule_atoms (mol); a++) {
      charges += abs (forms->form[i].charge[a]);
      charges_first += abs (forms->form[0].charge[a]);
    }
    ck_assert_msg (enl_molecule_charge (mol) == charge, "%s: form %u", label, i);
    ck_assert_msg (enl_valence_check (mol, NULL, &err) == ENL_OK, "%s: form %u: %s", label, i,
                   err.text);
    ck_assert_str_eq (formula, expected);
    ck_assert_msg (charges <= charges_first, "%s: form %u separates charge", label, i);
  }
}

typedef struct {
  int *order, *charge;
} Sheet;

static void
move_pair (const EnlForms *forms, const EnlArrow *arrow, Sheet *sheet)
{
  if (arrow->from_b == ENL_NONE) {
    sheet->charge[arrow->from_a] += 2;
  } else {
    uint32_t bond = enl_molecule_bond_between (forms->anion, arrow->from_a, arrow->from_b);
    ck_assert_uint_ne (bond, ENL_NONE);
    sheet->order[bond]--;
    sheet->charge[arrow->from_a]++;
    sheet->charge[arrow->from_b]++;
  }
  if (arrow->to_b == ENL_NONE) {
    sheet->charge[arrow->to_a] -= 2;
  } else {
    uint32_t bond = enl_molecule_bond_between (forms->anion, arrow->to_a, arrow->to_b);
    ck_assert_uint_ne (bond, ENL_NONE);
    sheet->order[bond]++;
    sheet->charge[arrow->to_a]--;
    sheet->charge[arrow->to_b]--;
  }
}

/* Two electrons move with every arrow: a lone pair is its atom's own, a bond is shared. Following
 * the arrows of a form from form 0 must give that form's bonds and charges. */
static void
check_arrows (const EnlForms *forms, const char *label)
{
  uint32_t n = enl_molecule_atoms (forms->anion), n_bonds = enl_molecule_bonds (forms->anion);
  g_autofree int *order = g_new (int, n_bonds + 1);
  g_autofree int *charge = g_new (int, n + 1);
  Sheet sheet = {order, charge};

  for (uint32_t i = 0; i < forms->n_all; i++) {
    const EnlForm *form = &forms->all[i];
    if (i > 0 && form->n_arrows == 0) /* two pairs meet in one bond: dianions only */
      ck_assert_msg (enl_molecule_charge (forms->anion) <= -2, "%s: no arrows", label);
    for (uint32_t b = 0; b < n_bonds; b++)
      order[b] = forms->all[0].order[b];
    for (uint32_t a = 0; a < n; a++)
      charge[a] = forms->all[0].charge[a];
    for (uint32_t k = 0; k < form->n_arrows; k++)
      move_pair (forms, &form->arrow[k], &sheet);
    for (uint32_t b = 0; b < n_bonds && form->n_arrows; b++)
      ck_assert_msg (order[b] == form->order[b], "%s: form %u, bond %u", label, i, b);
    for (uint32_t a = 0; a < n && form->n_arrows; a++)
      ck_assert_msg (charge[a] == form->charge[a], "%s: form %u, atom %u", label, i, a);
  }
}

static bool
changes (const EnlForms *forms, uint32_t atom)
{
  for (uint32_t i = 1; i < forms->n_all; i++)
    if (forms->all[i].charge[atom] != forms->all[0].charge[atom])
      return true;
  return false;
}

/* Atoms that a symmetry of the sigma skeleton exchanges carry the same charge in the hybrid and,
 * where pairs move, the same weight of forms. */
static void
check_symmetry (const EnlForms *forms, const char *label)
{
  uint32_t n = enl_molecule_atoms (forms->anion);
  g_autofree uint32_t *class_of = g_new (uint32_t, n + 1);
  g_autoptr (EnlMolecule) skeleton = enl_molecule_copy (forms->anion);

  for (uint32_t b = 0; b < enl_molecule_bonds (skeleton); b++)
    enl_molecule_edit_bond (skeleton, b)->order = 1;
  for (uint32_t i = 0; i < n; i++)
    enl_molecule_edit_atom (skeleton, i)->charge = 0;
  enl_molecule_finish (skeleton);
  enl_symmetry_classes (skeleton, false, class_of);
  for (uint32_t i = 0; i < n; i++)
    for (uint32_t j = 0; j < i; j++) {
      double minus[2] = {0.0, 0.0};
      if (class_of[i] != class_of[j])
        continue;
      ck_assert_msg (fabs (forms->charge[i] - forms->charge[j]) < 1e-6, "%s: atoms %u, %u", label,
                     i, j);
      if (!changes (forms, i) && !changes (forms, j))
        continue;
      for (uint32_t k = 0; k < forms->n_all; k++) {
        minus[0] += forms->all[k].weight * (forms->all[k].charge[i] < 0);
        minus[1] += forms->all[k].weight * (forms->all[k].charge[j] < 0);
      }
      ck_assert_msg (fabs (minus[0] - minus[1]) < 1e-6, "%s: weights of %u, %u", label, i, j);
    }
}

START_TEST (laws)
{
  const char *label = count_case[_i].label;
  g_autoptr (EnlForms) forms = forms_of (count_case[_i].smiles, count_case[_i].atom);

  check_weights (forms, label);
  check_molecules (forms, label);
  check_arrows (forms, label);
  check_symmetry (forms, label);
  ck_assert_double_eq_tol (total (forms->charge, enl_molecule_atoms (forms->anion)),
                           enl_molecule_charge (forms->anion), 1e-6);
  ck_assert_uint_eq (forms->form[0].n_arrows, 0);
  ck_assert_int_eq (forms->form[0].charge[forms->site_atom],
                    enl_molecule_atom (forms->anion, forms->site_atom)->charge);
}
END_TEST

/* Renumbering the atoms leaves counts, weights and charges as they are. */
static const struct {
  const char *label, *a;
  uint32_t atom_a;
  const char *b;
  uint32_t atom_b;
} renumber_case[] = {
    {"cyanoacetate", "N#CCC(=O)OCC", 2, "CCOC(CC#N)=O", 4},
    {"benzoylacetone", "CC(=O)CC(=O)c1ccccc1", 3, "c1ccc(cc1)C(=O)CC(C)=O", 8},
    {"4-nitrophenylacetone", "CC(=O)Cc1ccc(cc1)[N+](=O)[O-]", 3, "[O-][N+](=O)c1ccc(CC(C)=O)cc1",
     7},
    {"indene", "C1C=Cc2ccccc12", 0, "c1ccc2C=CCc2c1", 6},
};

START_TEST (numbering_does_not_matter)
{
  g_autoptr (EnlForms) a = forms_of (renumber_case[_i].a, renumber_case[_i].atom_a);
  g_autoptr (EnlForms) b = forms_of (renumber_case[_i].b, renumber_case[_i].atom_b);

  ck_assert_uint_eq (a->n_all, b->n_all);
  ck_assert_uint_eq (a->n_forms, b->n_forms);
  for (uint32_t i = 0; i < a->n_forms; i++) {
    ck_assert_double_eq_tol (a->form[i].weight, b->form[i].weight, 1e-8);
    ck_assert_uint_eq (a->form[i].copies, b->form[i].copies);
    ck_assert_double_eq_tol (a->charge[a->form[i].centre], b->charge[b->form[i].centre], 1e-6);
  }
}
END_TEST

/* ---- what the weights must say ---- */

/* More negative charge, and more weight, on the first atom than on the second. */
static const struct {
  const char *label, *smiles;
  uint32_t site, more, less;
} more_case[] = {
    {"acetone: O over C", "CC(=O)C", 0, 2, 0},
    {"acetaldehyde: O over C", "CC=O", 0, 2, 0},
    {"ethyl acetate: O over C", "CC(=O)OCC", 0, 2, 0},
    {"dimethylacetamide: O over C", "CC(=O)N(C)C", 0, 2, 0},
    {"acetophenone: O over C", "CC(=O)c1ccccc1", 0, 2, 0},
    {"phenylacetone: O over C", "CC(=O)Cc1ccccc1", 3, 2, 3},
    {"acetylacetone: O over C", "CC(=O)CC(=O)C", 3, 2, 3},
    {"malonate: O over C", "COC(=O)CC(=O)OC", 4, 3, 4},
    {"nitromethane: O over C", "C[N+](=O)[O-]", 0, 2, 0},
    {"dienolate: O over gamma C", "CC=CC(=O)C", 0, 4, 0},
    {"phenoxide: O over para C", "Oc1ccccc1", 0, 0, 4},
    {"acetamide N-H: O over N", "CC(=O)NC", 3, 2, 3},
    {"pyrrolide: N over C2", "c1cc[nH]c1", 3, 3, 2},
    {"imidazolide: N over C4", "c1c[nH]cn1", 2, 2, 1},
    {"2-naphtholate: C1 over C3", "Oc1ccc2ccccc2c1", 0, 10, 2},
    {"benzyl: CH2 over ortho", "Cc1ccccc1", 0, 0, 2},
};

START_TEST (more_charge_here_than_there)
{
  g_autoptr (EnlForms) forms = forms_of (more_case[_i].smiles, more_case[_i].site);
  uint32_t more = more_case[_i].more, less = more_case[_i].less;

  ck_assert_msg (forms->charge[more] < forms->charge[less] - 0.02, "%s: %g, %g",
                 more_case[_i].label, forms->charge[more], forms->charge[less]);
  ck_assert_msg (weight_on (forms, more) > weight_on (forms, less) + 0.02, "%s: %g, %g",
                 more_case[_i].label, weight_on (forms, more), weight_on (forms, less));
}
END_TEST

START_TEST (acetylacetonate_shares)
{
  g_autoptr (EnlForms) forms = forms_of ("CC(=O)CC(=O)C", 3);

  ck_assert_double_eq_tol (weight_on (forms, 2), weight_on (forms, 5), 1e-9);
  ck_assert_double_gt (weight_on (forms, 2), weight_on (forms, 3));
  ck_assert_uint_eq (forms->form[1].copies, 2);
  /* Both C-C bonds of the chelate ring are alike, between single and double. */
  uint32_t left = enl_molecule_bond_between (forms->anion, 1, 3);
  uint32_t right = enl_molecule_bond_between (forms->anion, 3, 4);
  ck_assert_double_eq_tol (forms->bond_order[left], forms->bond_order[right], 1e-9);
  ck_assert_double_gt (forms->bond_order[left], 1.2);
  ck_assert_double_lt (forms->bond_order[left], 1.8);
}
END_TEST

START_TEST (weights_reproduce_the_pi_charges)
{
  /* Cyclopentadienide: five equal copies; benzyl by its non-bonding orbital: 4/7 on CH2 and 1/7 on
   * each ortho and para carbon (H. C. Longuet-Higgins, J. Chem. Phys. 1950, 18, 265). */
  g_autoptr (EnlForms) ring = forms_of ("C1C=CC=C1", 0);
  g_autoptr (EnlForms) benzyl = forms_of ("Cc1ccccc1", 0);

  for (uint32_t i = 0; i < 5; i++)
    ck_assert_double_eq_tol (weight_on (ring, i), 0.2, 1e-9);
  ck_assert_double_eq_tol (weight_on (benzyl, 0), 4.0 / 7.0, 0.01);
  ck_assert_double_eq_tol (weight_on (benzyl, 2), 1.0 / 7.0, 0.01);
  ck_assert_double_eq_tol (weight_on (benzyl, 4), 1.0 / 7.0, 0.01);
}
END_TEST

/* ---- arrows ---- */

START_TEST (arrows_follow_the_path)
{
  g_autoptr (EnlForms) forms = forms_of ("CC=CC(=O)C", 0);
  static const EnlArrow expected[] = {{0, ENL_NONE, 0, 1}, {1, 2, 2, 3}, {3, 4, 4, ENL_NONE}};
  const EnlForm *form = &forms->form[1];

  ck_assert_uint_eq (form->centre, 4);
  ck_assert_uint_eq (form->n_arrows, ENL_COUNT (expected));
  for (uint32_t i = 0; i < form->n_arrows; i++) {
    ck_assert_uint_eq (form->arrow[i].from_a, expected[i].from_a);
    ck_assert_uint_eq (form->arrow[i].from_b, expected[i].from_b);
    ck_assert_uint_eq (form->arrow[i].to_a, expected[i].to_a);
    ck_assert_uint_eq (form->arrow[i].to_b, expected[i].to_b);
  }
}
END_TEST

/* ---- notes ---- */

static const struct {
  const char *label, *smiles;
  uint32_t atom;
  const char *note; /* NULL: none */
} note_case[] = {
    {"sulfone", "CS(=O)(=O)C", 0, "stabilised by induction and polarisation: S(=O)2"},
    {"sulfonyl ketone", "CC(=O)CS(=O)(=O)C", 3,
     "also stabilised by induction and polarisation: S(=O)2"},
    {"sulfoxide", "CS(=O)C", 0, "stabilised by induction and polarisation: S(=O)"},
    {"phosphonate", "COP(=O)(OC)CC(=O)OC", 6,
     "also stabilised by induction and polarisation: P(=O)"},
    {"phosphonium", "C[P+](C)(C)C", 0, "stabilised by induction and polarisation: P+"},
    {"ammonium", "C[N+](C)(C)CC(=O)OC", 4, "also stabilised by induction and polarisation: N+"},
    {"dithiane", "C1SCCCS1", 0, "stabilised by induction and polarisation: S"},
    {"ketone", "CC(=O)C", 0, NULL},
};

START_TEST (notes)
{
  g_autoptr (EnlForms) forms = forms_of (note_case[_i].smiles, note_case[_i].atom);

  if (note_case[_i].note)
    ck_assert_str_eq (forms->note, note_case[_i].note);
  else
    ck_assert_ptr_null (forms->note);
}
END_TEST

/* ---- faults and limits ---- */

START_TEST (faults)
{
  g_autoptr (EnlMolecule) mol = read_smiles ("CC(=O)C");
  EnlForms *forms = NULL;
  EnlError err;

  ck_assert_int_eq (enl_forms_of_site (mol, 4, &forms, &err), ENL_ERROR_RANGE);
  ck_assert_ptr_null (forms);
  ck_assert_int_eq (enl_forms_of_site (mol, 2, &forms, &err), ENL_ERROR_RANGE);
  ck_assert (strstr (err.text, "atom 3") != NULL);
  g_autofree char *chain = g_strnfill (ENL_MAX_HEAVY + 1, 'C');
  g_autoptr (EnlMolecule) large = read_smiles (chain);
  ck_assert_int_eq (enl_forms_of_site (large, 0, &forms, &err), ENL_ERROR_LIMIT);
  GPtrArray *list = NULL;
  bool capped = false;
  ck_assert_int_eq (enl_forms_enumerate (large, &list, &capped, &err), ENL_ERROR_LIMIT);
}
END_TEST

/* Beyond the cap every place of the charge is still there, and the weights keep their symmetry. */
START_TEST (cap)
{
  g_autoptr (EnlForms) forms =
      forms_of ("C1(c2ccc(-c3ccccc3)cc2)C(c2ccc(-c3ccccc3)cc2)=C(c2ccc(-c3ccccc3)cc2)"
                "C(c2ccc(-c3ccccc3)cc2)=C1(c2ccc(-c3ccccc3)cc2)",
                0);

  ck_assert (forms->capped);
  ck_assert_uint_eq (forms->n_all, ENL_MAX_FORMS);
  /* Five ring carbons, and in each of five biphenylyl groups two ortho and one para carbon of
   * either ring. */
  uint32_t places = 0;
  for (uint32_t i = 0; i < enl_molecule_atoms (forms->anion); i++)
    places += i == 0 || changes (forms, i);
  ck_assert_uint_eq (places, 5 + 5 * 6);
  check_weights (forms, "capped");
  check_symmetry (forms, "capped");
}
END_TEST

START_TEST (enumerate_takes_every_system)
{
  /* An enolate (2), and a nitro group apart from it (2): four combinations, no doubles. */
  g_autoptr (EnlMolecule) anion = read_smiles ("[CH2-]C(=O)CCC[N+](=O)[O-]");
  g_autoptr (GPtrArray) list = NULL;
  g_autoptr (GHashTable) seen = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, NULL);
  bool capped = true;
  EnlError err;

  ck_assert_int_eq (enl_forms_enumerate (anion, &list, &capped, &err), ENL_OK);
  ck_assert_uint_eq (list->len, 4);
  ck_assert (!capped);
  for (uint32_t i = 0; i < list->len; i++) {
    const EnlMolecule *mol = list->pdata[i];
    GString *key = g_string_new (NULL);
    for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++)
      g_string_append_printf (key, "%u", enl_molecule_bond (mol, b)->order);
    ck_assert (g_hash_table_add (seen, g_string_free (key, FALSE)));
  }
}
END_TEST

/* ---- non-negative least squares ---- */

START_TEST (least_squares)
{
  /* Onto the simplex: (0.9, 0.4, -0.5) is nearest to (0.75, 0.25, 0). */
  const double identity[9] = {1, 0, 0, 0, 1, 0, 0, 0, 1};
  const double point[3] = {0.9, 0.4, -0.5};
  /* Two columns that are nearly alike share what either could carry alone. */
  const double alike[4] = {1.01, 1.0, 1.0, 1.01};
  const double both[2] = {1.0, 1.0};
  const double indefinite[1] = {-1.0};
  double x[3];

  ck_assert (enl_nnls_solve (identity, point, 3, 1.0, x));
  ck_assert_double_eq_tol (x[0], 0.75, 1e-12);
  ck_assert_double_eq_tol (x[1], 0.25, 1e-12);
  ck_assert_double_eq_tol (x[2], 0.0, 1e-12);
  ck_assert (enl_nnls_solve (alike, both, 2, 1.0, x));
  ck_assert_double_eq_tol (x[0], 0.5, 1e-9);
  ck_assert_double_eq_tol (x[1], 0.5, 1e-9);
  ck_assert (!enl_nnls_solve (indefinite, both, 1, 1.0, x));
}
END_TEST

/* Conditions of Karush, Kuhn and Tucker: the gradient is the same on all variables in use, and no
 * smaller on those at zero. */
START_TEST (least_squares_is_optimal)
{
  enum { N = 24, ROWS = 9 };
  g_autoptr (GRand) random = g_rand_new_with_seed ((guint32)_i + 7);
  double column[N][ROWS], gram[N * N], linear[N], target[ROWS], x[N], level = NAN;

  for (int r = 0; r < ROWS; r++) {
    target[r] = g_rand_double_range (random, -1.0, 1.0);
    for (int i = 0; i < N; i++)
      column[i][r] = g_rand_int_range (random, -1, 2);
  }
  for (int i = 0; i < N; i++) {
    linear[i] = 0.0;
    for (int r = 0; r < ROWS; r++)
      linear[i] += column[i][r] * target[r];
    for (int j = 0; j < N; j++) {
      gram[i * N + j] = i == j ? 0.01 : 0.0;
      for (int r = 0; r < ROWS; r++)
        gram[i * N + j] += column[i][r] * column[j][r];
    }
  }
  ck_assert (enl_nnls_solve (gram, linear, N, 1.0, x));
  ck_assert_double_eq_tol (total (x, N), 1.0, 1e-9);
  for (int pass = 0; pass < 2; pass++)
    for (int i = 0; i < N; i++) {
      double gradient = -linear[i];
      for (int j = 0; j < N; j++)
        gradient += gram[i * N + j] * x[j];
      ck_assert_double_ge (x[i], 0.0);
      if (pass == 0 && x[i] > 1e-9) {
        level = isnan (level) ? gradient : level;
        ck_assert_double_eq_tol (gradient, level, 1e-7);
      } else if (pass == 1) {
        ck_assert_double_ge (gradient, level - 1e-7);
      }
    }
}
END_TEST

START_TEST (a_typed_anion_has_the_forms_of_its_acid)
{
  const char anion[] = "CC(=O)[CH-]C(C)=O";
  EnlMolecule *mol = NULL;
  EnlForms *forms = NULL;
  EnlError err;

  ck_assert_int_eq (enl_smiles_parse (anion, strlen (anion), &mol, &err), ENL_OK);
  ck_assert_int_eq (enl_forms_of_anion (mol, 0, &forms, &err), ENL_ERROR_RANGE);
  ck_assert_ptr_null (forms);
  ck_assert_int_eq (enl_forms_of_anion (mol, 99, &forms, &err), ENL_ERROR_RANGE);
  ck_assert_int_eq (enl_forms_of_anion (mol, 3, &forms, &err), ENL_OK);
  ck_assert_uint_eq (forms->n_all, 3);
  ck_assert_double_eq_tol (forms->all[1].weight, forms->all[2].weight, 1e-9);
  ck_assert_double_gt (forms->all[1].weight, forms->all[0].weight);
  enl_forms_free (forms);
  enl_molecule_free (mol);
}
END_TEST

static Suite *
form_suite (void)
{
  Suite *suite = suite_create ("acidity form");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 60);
  tcase_add_loop_test (tc, counts, 0, (int)ENL_COUNT (count_case));
  tcase_add_loop_test (tc, laws, 0, (int)ENL_COUNT (count_case));
  tcase_add_loop_test (tc, numbering_does_not_matter, 0, (int)ENL_COUNT (renumber_case));
  tcase_add_loop_test (tc, more_charge_here_than_there, 0, (int)ENL_COUNT (more_case));
  tcase_add_test (tc, acetylacetonate_shares);
  tcase_add_test (tc, weights_reproduce_the_pi_charges);
  tcase_add_test (tc, arrows_follow_the_path);
  tcase_add_loop_test (tc, notes, 0, (int)ENL_COUNT (note_case));
  tcase_add_test (tc, faults);
  tcase_add_test (tc, cap);
  tcase_add_test (tc, enumerate_takes_every_system);
  tcase_add_test (tc, least_squares);
  tcase_add_loop_test (tc, least_squares_is_optimal, 0, 20);
  tcase_add_test (tc, a_typed_anion_has_the_forms_of_its_acid);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (form_suite)
