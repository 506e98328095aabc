/* Own values: reading, joining the model, contradictions. Structures and values are invented. */
#include "core/acidity/lab.h"

#include <math.h>

#include <gsl/gsl_errno.h>
#include <gsl/gsl_linalg.h>

#include "core/acidity/estimator.h"
#include "core/acidity/model.h"
#include "core/base/table.h"
#include "resources/model.h"
#include "tests/core/acidity/acidity-help.h"
#include "tests/runner.h"

static EnlReference *acids;
static EnlEstimator *base;
static const char *bytes;
static size_t size;

static void
setup (void)
{
  EnlError err;

  acids = open_acids ();
  bytes = enl_model ("model.bin", &size);
  ck_assert_int_eq (enl_estimator_open (acids, bytes, size, &base, &err), ENL_OK);
}

static void
teardown (void)
{
  enl_estimator_free (base);
  enl_reference_free (acids);
}

/* ---- files ---- */

#define HEAD "structure\tatom\tsolvent\tpka\tsigma\n"

static const struct {
  const char *label, *text, *message;
} bad_case[] = {
    {"nothing", "", "the table is empty; give a header line with column names"},
    {"a header alone", HEAD,
     "there is no value below the header; write one value a line below the header"},
    {"no solvent column", "structure\tpka\nCC#N\t31\n",
     "line 1, column 1: column 'solvent' is missing; begin with a header line, tabs between "
     "columns"},
    {"an unknown column", "# own\nstructure\tsolvent\tpka\tsigam\n",
     "line 2, column 23: column 'sigam' is not known here; the columns are structure, atom, "
     "solvent, pka, sigma, name, note and source"},
    {"a column twice", "structure\tsolvent\tpka\tpka\n",
     "line 1, column 23: column 'pka' stands twice; the columns are structure, atom, solvent, "
     "pka, sigma, name, note and source"},
    {"a decimal comma", HEAD "CC#N\t1\tdmso\t31,3\t\n",
     "line 2, column 13: the pKa is not a number; write the pKa with a point, as in 24.7"},
    {"no pKa", HEAD "CC#N\t1\tdmso\n",
     "line 2, column 12: the pKa is not a number; write the pKa with a point, as in 24.7"},
    {"far off", HEAD "CC#N\t1\tdmso\t313\t\n",
     "line 2, column 13: a pKa must lie between -20 and 65; look for a slip of the pen"},
    {"sigma of nothing", HEAD "CC#N\t1\tdmso\t31.3\t0\n",
     "line 2, column 18: a sigma must be above 0 and at most 20; write one standard deviation in "
     "pK units"},
    {"endless sigma", HEAD "CC#N\t1\tdmso\t31.3\tinf\n",
     "line 2, column 18: the sigma is not a number; write one standard deviation, as in 0.3"},
    {"THF", HEAD "CC#N\t1\tthf\t31.3\t\n",
     "line 2, column 8: a value in THF cannot join: no single scale exists there, and numbers of "
     "its footings must not be mixed; give the value in dmso or water"},
    {"a solvent from elsewhere", HEAD "CC#N\t1\ttar\t31.3\t\n",
     "line 2, column 8: 'tar' is no known solvent; write dmso or water"},
    {"a broken ring in line 3", HEAD "CC#N\t\tdmso\t31.3\t\nC1CC\t\tdmso\t31.3\t\n",
     "line 3, column 2: ring number 1 is never closed; write the number at the other end of the "
     "ring, "
     "too"},
    {"two sites and no choice", HEAD "CC(=O)CC(=O)OCC\t\tdmso\t14\t\n",
     "line 2, column 1: the structure has 2 acidic sites, and none is chosen; choose among the "
     "acidic atoms 1, 4: by 'atom', or by a mark as in [CH2:1]"},
    {"no hydrogen", HEAD "CC(=O)C\t2\tdmso\t14\t\n",
     "line 2, column 9: atom 2 carries no hydrogen; choose among the acidic atoms 1: by 'atom', or "
     "by a mark as in [CH2:1]"},
    {"no site", HEAD "CC(=O)CC(=O)OCC\t8\tdmso\t14\t\n",
     "line 2, column 17: atom 8 is no acidic site; choose among the acidic atoms 1, 4: by 'atom', "
     "or by a mark as in [CH2:1]"},
    {"beyond the last atom", HEAD "CC#N\t9\tdmso\t14\t\n",
     "line 2, column 6: no atom 9 (a plain hydrogen or beyond the last atom); count the atoms of "
     "the structure from 1"},
    {"no acid", HEAD "CCCC\t\tdmso\t50\t\n",
     "line 2, column 1: no acidic hydrogen in this structure; give the acid that was measured"},
    {"mark against atom", HEAD "C[C:2](=O)[CH2:1]C(=O)OCC\t1\tdmso\t14\t\n",
     "line 2, column 27: the structure marks another acidic atom as well; mark one atom only, or "
     "leave 'atom' empty"},
    {"Latin-1", HEAD "CC#N\t\tdmso\t31\t\n\xE9\n",
     "line 3, column 1: a character that is not UTF-8; save the table as UTF-8 text"},
    {"too many cells", "structure\tsolvent\tpka\nCC#N\tdmso\t31\t0.3\n",
     "line 2, column 1: row has 4 cells, the header has 3; remove the extra tab characters"},
};

START_TEST (faults_say_where_and_what_to_do)
{
  EnlLab *lab = NULL;
  EnlError err = {0};

  ck_assert_int_ne (enl_lab_parse (NULL, bad_case[_i].text, strlen (bad_case[_i].text), &lab, &err),
                    ENL_OK);
  g_autofree char *message = enl_error_message (&err);
  ck_assert_msg (strcmp (message, bad_case[_i].message) == 0, "%s: %s", bad_case[_i].label,
                 message);
  ck_assert_ptr_null (lab);
}
END_TEST

static EnlLab *
read_lab (const char *text)
{
  EnlLab *lab = NULL;
  EnlError err = {0};

  if (enl_lab_parse (NULL, text, strlen (text), &lab, &err) != ENL_OK)
    ck_abort_msg ("%s", err.text);
  return lab;
}

START_TEST (good_files_are_read)
{
  g_autoptr (EnlLab) lab =
      read_lab ("\xEF\xBB\xBF# remarks are skipped\r\nPKA\tSolvent\tstructure\tnote\r\n"
                "31.5\twater\tCC#N\tfirst run\r\n24\tDMSO\t CC(=O)[CH2:1]C(=O)OCC.[Na+].[Cl-] \n");
  const EnlLabRow *a = enl_lab_row (lab, 0), *b = enl_lab_row (lab, 1);

  ck_assert_uint_eq (enl_lab_size (lab), 2);
  ck_assert_double_eq (a->entry->pka, 31.5);
  ck_assert_double_eq (a->entry->sigma, ENL_LAB_USUAL_SIGMA);
  ck_assert_int_eq (a->entry->solvent, ENL_SOLVENT_WATER);
  ck_assert_str_eq (a->entry->note, "first run");
  ck_assert_uint_eq (a->entry->line, 3);
  ck_assert_uint_eq (a->site, 0);
  ck_assert_uint_eq (b->site, 3);
  ck_assert_uint_eq (enl_molecule_heavy_atoms (b->mol), 9); /* the salt beside it is gone */
}
END_TEST

START_TEST (joined_files_hold_a_value_once)
{
  const char *text = HEAD "CC#N\t1\tdmso\t31\t\nCC#N\t1\tdmso\t31\t\n";
  g_autoptr (EnlLab) a = read_lab (text);
  g_autoptr (EnlLab) b = read_lab (text);

  /* two runs with one result are two values; the same file again is not */
  ck_assert_int_eq (enl_lab_append (a, b, NULL), ENL_OK);
  ck_assert_uint_eq (enl_lab_size (a), 2);
}
END_TEST

/* ---- joining the model ---- */

typedef struct {
  EnlMolecule *mol;
  EnlSites *sites;
  EnlEstimate *out;
} Result;

static Result
run (const EnlEstimator *estimator, const char *smiles, EnlSolvent solvent)
{
  Result r = {.mol = read_smiles (smiles)};

  ck_assert_int_eq (enl_sites_find (r.mol, &r.sites, NULL), ENL_OK);
  r.out = g_new0 (EnlEstimate, r.sites->n_sites + 1);
  ck_assert_int_eq (enl_estimator_run (estimator, r.mol, r.sites, solvent, r.out, NULL), ENL_OK);
  return r;
}

static void
clear (Result *r)
{
  g_free (r->out);
  enl_sites_free (r->sites);
  enl_molecule_free (r->mol);
}

/* Estimate at the atom with map 1; its texts belong to the estimator. */
static EnlEstimate
ask (const EnlEstimator *estimator, const char *smiles, EnlSolvent solvent)
{
  Result r = run (estimator, smiles, solvent);
  const EnlSite *site = enl_sites_of_atom (r.sites, mapped_atom (r.mol));

  ck_assert_ptr_nonnull (site);
  EnlEstimate e = r.out[site - r.sites->site];
  clear (&r);
  return e;
}

static EnlEstimator *
with_lab (const char *text)
{
  g_autoptr (EnlLab) lab = read_lab (text);
  EnlEstimator *estimator = NULL;
  EnlError err = {0};

  if (enl_estimator_with_lab (base, lab, &estimator, &err) != ENL_OK)
    ck_abort_msg ("%s", err.text);
  return estimator;
}

#define OWN_ROWS                                                                                   \
  "O=C(CC(C)C)c1ccc(CCC)cc1\t3\tdmso\t27.6\t0.2\n"                                                 \
  "CCCCC(=O)CC(=O)OC\t7\twater\t9.6\t0.4\n"                                                        \
  "O=C(CCl)c1ccc(CC)cc1\t3\tdmso\t21.4\t0.15\n"

static const char *const near_by[] = {
    "O=C([CH2:1]C(C)CC)c1ccc(CC)cc1",
    "CCCC(=O)[CH2:1]C(=O)OCC",
    "O=C([CH2:1]Cl)c1ccc(C)cc1",
    "CCOC(=O)[CH2:1]C#N",
};

/* An estimate by plain dense algebra over the whole table, lab rows among the others. */
typedef struct {
  EnlReference *table;
  EnlModel *model;
  EnlSiteSet *rows;
  gsl_matrix *factor;
  gsl_vector *alpha;
  EnlConstants *constants;
} Scratch;

static char *
table_with (const char *const *own, uint32_t n)
{
  size_t length = 0;
  const char *text = enl_resource ("acids.tsv", &length);
  g_autoptr (EnlTable) table = NULL;
  GString *out = g_string_new_len (text, (gssize)length);

  ck_assert_int_eq (enl_table_parse (text, length, &table, NULL), ENL_OK);
  for (uint32_t i = 0; i < n; i++)
    for (size_t c = 0; c < enl_table_columns (table); c++) {
      static const char *const field[] = {"smiles", "solvent", "pka", "sigma"};
      g_auto (GStrv) cell = g_strsplit (own[i], " ", -1);
      for (int f = 0; f < 4; f++)
        if (strcmp (enl_table_header (table, c), field[f]) == 0)
          g_string_append (out, cell[f]);
      g_string_append_c (out, c + 1 < enl_table_columns (table) ? '\t' : '\n');
    }
  return g_string_free (out, FALSE);
}

static void
scratch_init (Scratch *s, const char *const *own, uint32_t n_own)
{
  g_autofree char *text = table_with (own, n_own);
  EnlKernelParts parts;

  ck_assert_int_eq (enl_reference_new (text, strlen (text), &s->table, NULL), ENL_OK);
  ck_assert_int_eq (enl_model_open (acids, bytes, size, &s->model, NULL), ENL_OK);
  ck_assert_int_eq (enl_model_describe (s->table, &s->rows, NULL), ENL_OK);
  ck_assert_int_eq (enl_constants_new (&s->constants, NULL), ENL_OK);
  enl_site_set_standardise (s->rows, s->model->centre, s->model->scale);
  uint32_t n = s->rows->n;
  ck_assert_uint_eq (n, enl_reference_rows (acids) + n_own);
  s->factor = gsl_matrix_alloc (n, n);
  s->alpha = gsl_vector_alloc (n);
  for (uint32_t i = 0; i < n; i++) {
    const EnlReferenceRow *row = enl_reference_row (s->table, i);
    for (uint32_t j = 0; j < n; j++) {
      enl_kernel_pair (&s->model->relevance, s->rows, i, s->rows, j, &parts);
      double noise = i == j ? s->model->hyper.value[ENL_H_noise] + row->sigma * row->sigma : 0;
      gsl_matrix_set (s->factor, i, j, enl_kernel_value (&s->model->hyper, &parts) + noise);
    }
    gsl_vector_set (s->alpha, i, row->pka - ENL_PRIOR_PKA);
  }
  ck_assert_int_eq (gsl_linalg_cholesky_decomp1 (s->factor), GSL_SUCCESS);
  gsl_linalg_cholesky_svx (s->factor, s->alpha);
}

static void
scratch_clear (Scratch *s)
{
  gsl_matrix_free (s->factor);
  gsl_vector_free (s->alpha);
  enl_site_set_free (s->rows);
  enl_constants_free (s->constants);
  enl_model_free (s->model);
  enl_reference_free (s->table);
}

static double
scratch_ask (const Scratch *s, const char *smiles, EnlSolvent solvent)
{
  g_autoptr (EnlMolecule) mol = read_smiles (smiles);
  g_autoptr (EnlSiteSet) site = enl_site_set_new (1);
  g_autoptr (EnlSurvey) survey = enl_survey_new (mol, s->constants);
  g_autoptr (EnlPi) pi = enl_pi_new (mol);
  double value = ENL_PRIOR_PKA;
  EnlKernelParts parts;

  enl_site_set_describe (site, 0, survey, pi, mapped_atom (mol), solvent);
  enl_site_set_link (site);
  enl_site_set_standardise (site, s->model->centre, s->model->scale);
  for (uint32_t i = 0; i < s->rows->n; i++) {
    enl_kernel_pair (&s->model->relevance, site, 0, s->rows, i, &parts);
    value += enl_kernel_value (&s->model->hyper, &parts) * gsl_vector_get (s->alpha, i);
  }
  return value;
}

START_TEST (joining_equals_a_model_made_from_scratch)
{
  static const char *const own[] = {"O=C([CH2:1]C(C)C)c1ccc(CCC)cc1 dmso 27.6 0.2",
                                    "CCCCC(=O)[CH2:1]C(=O)OC water 9.6 0.4",
                                    "O=C([CH2:1]Cl)c1ccc(CC)cc1 dmso 21.4 0.15"};
  g_autoptr (EnlEstimator) estimator = with_lab (HEAD OWN_ROWS);
  Scratch scratch;

  scratch_init (&scratch, own, ENL_COUNT (own));
  for (size_t i = 0; i < ENL_COUNT (near_by); i++)
    for (int solvent = ENL_SOLVENT_DMSO; solvent <= ENL_SOLVENT_WATER; solvent++) {
      EnlEstimate e = ask (estimator, near_by[i], (EnlSolvent)solvent);
      if (e.basis != ENL_BASIS_ESTIMATED)
        continue;
      ck_assert_double_eq_tol (e.value, scratch_ask (&scratch, near_by[i], (EnlSolvent)solvent),
                               1e-8);
    }
  scratch_clear (&scratch);
}
END_TEST

START_TEST (removing_restores_every_bit)
{
  for (size_t i = 0; i < ENL_COUNT (near_by); i++) {
    EnlEstimate before = ask (base, near_by[i], ENL_SOLVENT_DMSO);
    g_autoptr (EnlEstimator) own = with_lab (HEAD OWN_ROWS);
    EnlEstimate between = ask (own, near_by[i], ENL_SOLVENT_DMSO);
    g_autoptr (EnlLab) none = enl_lab_new ();
    g_autoptr (EnlEstimator) again = NULL;

    ck_assert_int_eq (enl_estimator_with_lab (base, none, &again, NULL), ENL_OK);
    EnlEstimate after = ask (again, near_by[i], ENL_SOLVENT_DMSO);
    ck_assert_mem_eq (&before, &after, sizeof before);
    if (before.basis == ENL_BASIS_ESTIMATED)
      ck_assert_double_ne (before.value, between.value);
  }
}
END_TEST

START_TEST (own_values_stand_and_shift_the_neighbours)
{
  g_autoptr (EnlEstimator) own = with_lab (HEAD "O=C(CC(C)C)c1ccc(CCC)cc1\t3\tdmso\t30\t0.2\n");
  EnlEstimate before = ask (base, near_by[0], ENL_SOLVENT_DMSO);
  EnlEstimate after = ask (own, near_by[0], ENL_SOLVENT_DMSO);
  EnlEstimate itself = ask (own, "O=C([CH2:1]C(C)C)c1ccc(CCC)cc1", ENL_SOLVENT_DMSO);
  EnlEstimate water = ask (own, "O=C([CH2:1]C(C)C)c1ccc(CCC)cc1", ENL_SOLVENT_WATER);
  const EnlReference *ref = enl_estimator_reference (own);

  ck_assert_double_gt (after.value, before.value + 0.5);
  ck_assert_double_lt (after.high - after.low, before.high - before.low);
  ck_assert (enl_reference_row (ref, after.precedent[0].row)->lab);
  ck_assert_int_eq (itself.basis, ENL_BASIS_LAB);
  ck_assert_double_eq (itself.value, 30);
  ck_assert_double_eq_tol (itself.high - itself.low, 2 * 1.645 * 0.2, 1e-9);
  ck_assert_uint_eq (itself.row, enl_reference_rows (acids));
  ck_assert_double_eq (enl_reference_row (ref, (uint32_t)itself.row)->pka, 30);
  ck_assert_int_eq (water.basis, ENL_BASIS_ESTIMATED);
}
END_TEST

START_TEST (own_before_published)
{
  /* 14.2 in DMSO is published: Olmstead and Bordwell, J. Org. Chem. 1980, 45, 3299. */
  g_autoptr (EnlEstimator) own = with_lab (HEAD "CC(=O)CC(=O)OCC\t4\tdmso\t14.3\t0.3\n");
  EnlEstimate e = ask (own, "CC(=O)[CH2:1]C(=O)OCC", ENL_SOLVENT_DMSO);

  ck_assert_int_eq (e.basis, ENL_BASIS_LAB);
  ck_assert_double_eq (e.value, 14.3);
  ck_assert_ptr_null (e.remark); /* the two agree */
}
END_TEST

/* Same site: symmetry, spelling, stereo as for the published rows. */
static const struct {
  const char *label, *row, *asked;
  bool found;
} same_case[] = {
    {"the other end of a symmetric ketone", "CCC(=O)CC\t2\tdmso", "CCC(=O)[CH2:1]C", true},
    {"another spelling", "CCCCC(=O)CC(=O)OC\t7\tdmso", "COC(=O)[CH2:1]C(=O)CCCC", true},
    {"another site", "CCCCC(=O)CC(=O)OC\t7\tdmso", "COC(=O)CC(=O)[CH2:1]CCC", false},
    {"another solvent", "CCCCC(=O)CC(=O)OC\t7\twater", "COC(=O)[CH2:1]C(=O)CCCC", false},
    {"flat serves every isomer", "CCCC1CCCC(C)C1=O\t4\tdmso", "CCC[C@:1]1([H])CCC[C@@H](C)C1=O",
     true},
    {"an isomer is not another", "CCC[C@@H]1CCC[C@@H](C)C1=O\t4\tdmso",
     "CCC[C@@H:1]1CCC[C@H](C)C1=O", false},
    {"without stereo one isomer serves", "CCC[C@@H]1CCC[C@@H](C)C1=O\t4\tdmso",
     "CCC[CH:1]1CCCC(C)C1=O", true},
    {"the other N of an amidinium ion", "CCCC(=[NH2+])N\t6\tdmso", "CCCC(=[NH2+:1])N", true},
    {"a salt is its acid", "CCC(=O)Cc1ccc(C(=O)[O-])cc1.[Na+]\t5\tdmso",
     "CCC(=O)[CH2:1]c1ccc(C(=O)[O-])cc1", true},
};

START_TEST (the_same_site_is_recognised)
{
  g_autofree char *text = g_strconcat (HEAD, same_case[_i].row, "\t25.25\t0.3\n", NULL);
  g_autoptr (EnlEstimator) own = with_lab (text);
  EnlEstimate e = ask (own, same_case[_i].asked, ENL_SOLVENT_DMSO);

  ck_assert_msg ((e.basis == ENL_BASIS_LAB) == same_case[_i].found, "%s", same_case[_i].label);
}
END_TEST

START_TEST (a_second_site_is_that_of_the_anion)
{
  g_autoptr (EnlEstimator) own = with_lab (HEAD "CCC(=O)c1ccc(C(=O)O)cc1\t2\tdmso\t27\t0.3\n");
  EnlEstimate neutral = ask (own, "C[CH2:1]C(=O)c1ccc(C(=O)O)cc1", ENL_SOLVENT_DMSO);
  EnlEstimate anion = ask (own, "C[CH2:1]C(=O)c1ccc(C(=O)[O-])cc1", ENL_SOLVENT_DMSO);

  ck_assert_int_eq (neutral.basis, ENL_BASIS_LAB);
  ck_assert_double_eq (neutral.value, 27);
  ck_assert_int_eq (anion.basis, ENL_BASIS_LAB);
}
END_TEST

START_TEST (in_thf_an_own_value_is_moved_like_any_other)
{
  g_autoptr (EnlEstimator) own = with_lab (HEAD "CCCCC(=O)CC(=O)OC\t7\tdmso\t14\t0.2\n");
  EnlEstimate e = ask (own, "CCCCC(=O)[CH2:1]C(=O)OC", ENL_SOLVENT_THF);

  ck_assert_int_eq (e.basis, ENL_BASIS_ESTIMATED);
  ck_assert_double_eq (e.value, 14);
  ck_assert_double_gt (e.high - e.low, 4);
  ck_assert_ptr_nonnull (e.footing);
}
END_TEST

/* ---- contradictions ---- */

#define KETONE "O=C(CC(C)C)c1ccc(CCC)cc1\t3\tdmso\t"

static const struct {
  const char *label, *rows, *asked;
  double value, low, high;
  bool contradicts;
  const char *remark; /* a part of it, NULL: none at all */
} verdict_case[] = {
    {"one value as expected", KETONE "25.6\t0.3\n", "O=C([CH2:1]C(C)C)c1ccc(CCC)cc1", 25.6,
     25.6 - 0.4935, 25.6 + 0.4935, false, NULL},
    {"two that agree", KETONE "25.4\t0.3\n" KETONE "25.8\t0.3\n", "O=C([CH2:1]C(C)C)c1ccc(CCC)cc1",
     25.6, 25.6 - 1.645 * 0.3 / M_SQRT2, 25.6 + 1.645 * 0.3 / M_SQRT2, false,
     "2 lab values, combined: 25.4 (sigma 0.3, line 2) and 25.8 (sigma 0.3, line 3)"},
    {"two that do not", KETONE "25.4\t0.3\n" KETONE "27.8\t0.2\n", "O=C([CH2:1]C(C)C)c1ccc(CCC)cc1",
     27.8, 25.4 - 1.645 * 0.3, 27.8 + 1.645 * 0.2, true,
     "lab values disagree: 25.4 (sigma 0.3, line 2) and 27.8 (sigma 0.2, line 3); 27.8 is shown, "
     "with an interval that covers all"},
    {"equal sigmas: the first is shown", KETONE "25.4\t0.3\n" KETONE "27.8\t0.3\n",
     "O=C([CH2:1]C(C)C)c1ccc(CCC)cc1", 25.4, 25.4 - 1.645 * 0.3, 27.8 + 1.645 * 0.3, true,
     "25.4 is shown"},
    /* 24.7: Matthews et al., JACS 1975, 97, 7006 (row of acids.tsv) */
    {"against the published value", "CC(=O)c1ccccc1\t1\tdmso\t23\t0.2\n", "[CH3:1]C(=O)c1ccccc1",
     23, 23 - 1.645 * 0.2, 23 + 1.645 * 0.2, true,
     "lab value 23 (sigma 0.2, line 2) disagrees with the published 24.7 (sigma 0.1, Matthews"},
    {"far from the estimate", KETONE "31\t0.3\n", "O=C([CH2:1]C(C)C)c1ccc(CCC)cc1", 31, 31 - 0.4935,
     31 + 0.4935, false, "lab value differs from the estimate 2"},
};

START_TEST (contradictions_are_told)
{
  g_autofree char *text = g_strconcat (HEAD, verdict_case[_i].rows, NULL);
  g_autoptr (EnlEstimator) own = with_lab (text);
  EnlEstimate e = ask (own, verdict_case[_i].asked, ENL_SOLVENT_DMSO);
  const EnlLabJudgement *judgement = enl_estimator_lab (own);

  ck_assert_int_eq (e.basis, ENL_BASIS_LAB);
  ck_assert_double_eq_tol (e.value, verdict_case[_i].value, 1e-9);
  ck_assert_double_eq_tol (e.low, verdict_case[_i].low, 1e-9);
  ck_assert_double_eq_tol (e.high, verdict_case[_i].high, 1e-9);
  ck_assert_uint_eq (judgement->n_sites, 1);
  ck_assert_int_eq (judgement->site[0].contradicts, verdict_case[_i].contradicts);
  ck_assert_msg (verdict_case[_i].remark ? e.remark && strstr (e.remark, verdict_case[_i].remark)
                                         : !e.remark,
                 "%s: %s", verdict_case[_i].label, e.remark);
}
END_TEST

/* The estimate named in a remark is the one that the program gives once the value is removed. */
START_TEST (the_estimate_without_it_is_the_one_without_it)
{
  const char *others = "O=C(CCC)c1ccc(CCC)cc1\t3\tdmso\t26.6\t0.2\n"
                       "O=C(CCl)c1ccc(CC)cc1\t3\tdmso\t21.4\t0.15\n";
  g_autofree char *without_text = g_strconcat (HEAD, others, NULL);
  g_autofree char *with_text = g_strconcat (HEAD KETONE "33\t0.3\n", others, NULL);
  g_autoptr (EnlEstimator) own = with_lab (with_text);
  g_autoptr (EnlEstimator) rest = with_lab (without_text);
  const char *asked = "O=C([CH2:1]C(C)C)c1ccc(CCC)cc1";
  EnlEstimate without = ask (rest, asked, ENL_SOLVENT_DMSO);
  EnlEstimate with = ask (own, asked, ENL_SOLVENT_DMSO);
  g_autofree char *words = g_strdup_printf ("differs from the estimate %.1f ± %.1f without it",
                                            without.value, (without.high - without.low) / 2);

  ck_assert_msg (with.remark && strstr (with.remark, words), "%s / %s", with.remark, words);
}
END_TEST

/* The ratio of Birge: values 25.4 and 27.8 with sigma 0.3 have chi^2 = 32, so that each enters with
 * sqrt(32) times its sigma (by hand). */
START_TEST (contradictory_values_pull_less)
{
  g_autoptr (EnlEstimator) own = with_lab (HEAD KETONE "25.4\t0.3\n" KETONE "27.8\t0.3\n");
  const EnlReference *ref = enl_estimator_reference (own);
  uint32_t n = enl_reference_rows (acids);

  ck_assert_double_eq_tol (enl_reference_row (ref, n)->sigma, 0.3 * sqrt (32), 1e-9);
  ck_assert_double_eq_tol (enl_reference_row (ref, n + 1)->sigma, 0.3 * sqrt (32), 1e-9);
  ck_assert_uint_eq (enl_reference_first_alike (ref, n + 1), n);
}
END_TEST

static Suite *
lab_suite (void)
{
  Suite *suite = suite_create ("acidity lab");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 60);
  tcase_add_unchecked_fixture (tc, setup, teardown);
  tcase_add_loop_test (tc, faults_say_where_and_what_to_do, 0, (int)ENL_COUNT (bad_case));
  tcase_add_test (tc, good_files_are_read);
  tcase_add_test (tc, joined_files_hold_a_value_once);
  tcase_add_test (tc, joining_equals_a_model_made_from_scratch);
  tcase_add_test (tc, removing_restores_every_bit);
  tcase_add_test (tc, own_values_stand_and_shift_the_neighbours);
  tcase_add_test (tc, own_before_published);
  tcase_add_loop_test (tc, the_same_site_is_recognised, 0, (int)ENL_COUNT (same_case));
  tcase_add_test (tc, a_second_site_is_that_of_the_anion);
  tcase_add_test (tc, in_thf_an_own_value_is_moved_like_any_other);
  tcase_add_loop_test (tc, contradictions_are_told, 0, (int)ENL_COUNT (verdict_case));
  tcase_add_test (tc, the_estimate_without_it_is_the_one_without_it);
  tcase_add_test (tc, contradictory_values_pull_less);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (lab_suite)
