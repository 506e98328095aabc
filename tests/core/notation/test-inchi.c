#include "core/notation/inchi.h"

#include <string.h>

#include "core/notation/inchi-answer.h"
#include "core/notation/names.h"
#include "core/notation/smiles.h"
#include "resources/embedded.h"
#include "tests/runner.h"

static EnlMolecule *
read_smiles (const char *smiles)
{
  EnlMolecule *mol = NULL;
  EnlError err;

  ck_assert_msg (enl_smiles_parse (smiles, strlen (smiles), &mol, &err) == ENL_OK, "%s: %s", smiles,
                 err.text);
  return mol;
}

/* Standard InChI and InChIKey of well-known compounds, as published in public databases (from
 * memory). */
static const struct {
  const char *smiles, *inchi, *key; /* NULL: not compared */
} write_case[] = {
    {"CC(C)=O", "InChI=1S/C3H6O/c1-3(2)4/h1-2H3", "CSCPPACGZOOCGX-UHFFFAOYSA-N"},
    {"CCO", "InChI=1S/C2H6O/c1-2-3/h3H,2H2,1H3", "LFQSCWFLJHTTHZ-UHFFFAOYSA-N"},
    {"O", "InChI=1S/H2O/h1H2", "XLYOFNOQVPJJNP-UHFFFAOYSA-N"},
    {"C", "InChI=1S/CH4/h1H4", "VNWKTOKETHGBQD-UHFFFAOYSA-N"},
    {"c1ccccc1", "InChI=1S/C6H6/c1-2-4-6-5-3-1/h1-6H", "UHOVQNZJYSORNB-UHFFFAOYSA-N"},
    {"C[C@H](N)C(=O)O", "InChI=1S/C3H7NO2/c1-2(4)3(5)6/h2H,4H2,1H3,(H,5,6)/t2-/m0/s1",
     "QNAYBMKLOCPYGJ-REOHCLBHSA-N"},
    {"C[C@@H](N)C(=O)O", "InChI=1S/C3H7NO2/c1-2(4)3(5)6/h2H,4H2,1H3,(H,5,6)/t2-/m1/s1",
     "QNAYBMKLOCPYGJ-UWTATZPHSA-N"},
    {"C/C=C/C", "InChI=1S/C4H8/c1-3-4-2/h3-4H,1-2H3/b4-3+", "IAQRGUVFOMOMEM-ONEGZZNKSA-N"},
    {"C/C=C\\C", "InChI=1S/C4H8/c1-3-4-2/h3-4H,1-2H3/b4-3-", "IAQRGUVFOMOMEM-ARJAWSKDSA-N"},
    {"CN1C=NC2=C1C(=O)N(C(=O)N2C)C", NULL, "RYYVLZVUVIJVGH-UHFFFAOYSA-N"},
    {"CC(=O)Oc1ccccc1C(=O)O", NULL, "BSYNRYMUTXBXSQ-UHFFFAOYSA-N"},
    {"CC(=O)CC(C)=O", NULL, "YRKCREAYFQTBPV-UHFFFAOYSA-N"},
    {"CCOC(=O)CC(C)=O", NULL, "XYIBRDXRRQCHLP-UHFFFAOYSA-N"},
    {"C[C@]12CC[C@H]3[C@@H](CCC4=CC(=O)CC[C@]34C)[C@@H]1CC[C@@H]2O", NULL,
     "MUMGGOZAMZWBJJ-DYKIIFRCSA-N"}, /* testosterone */
    {"CC(=O)[C@H]1CC[C@H]2[C@@H]3CCC4=CC(=O)CC[C@]4(C)[C@H]3CC[C@]12C", NULL,
     "RJKFOVLPORLFTN-LEKSSAKUSA-N"}, /* progesterone */
    {"[O-][N+](=O)C", NULL, "LYGJENNIWJXYER-UHFFFAOYSA-N"},
};

START_TEST (known_compounds_get_their_inchi_and_key)
{
  g_autoptr (EnlMolecule) mol = read_smiles (write_case[_i].smiles);
  g_autofree char *inchi = NULL, *key = NULL;
  EnlError err;

  ck_assert_msg (enl_inchi_write (mol, &inchi, &key, &err) == ENL_OK, "%s", err.text);
  if (write_case[_i].inchi)
    ck_assert_str_eq (inchi, write_case[_i].inchi);
  ck_assert_str_eq (key, write_case[_i].key);
}
END_TEST

/* InChIKeys of named compounds of the table, as published in public databases (from memory): they
 * check the stereochemistry of the table's structures. */
static const char *const named_key[][2] = {
    {"testosterone", "MUMGGOZAMZWBJJ-DYKIIFRCSA-N"},
    {"progesterone", "RJKFOVLPORLFTN-LEKSSAKUSA-N"},
    {"androstenedione", "AEMFNILZOJDQLW-QAGGRKNESA-N"},
    {"estrone", "DNXHEGUUPJUMQT-CBZIJGRNSA-N"},
    {"cortisone", "MFYSYFVPBJMHGN-ZPOLXVRWSA-N"},
    {"hydrocortisone", "JYGXADMDTFJGBT-VWUMJDOOSA-N"},
    {"dehydroepiandrosterone", "FMGSKLZLMKYGDP-USOAJAOKSA-N"},
    {"dihydrotestosterone", "NVKAWKQGWWIWPM-ABEVXSGRSA-N"},
    {"cholest-4-en-3-one", "NYOXRYYXRWJDKP-GYKMGIIDSA-N"},
    {"(+)-camphor", "DSSYKIVIOFKYAU-XCBNKYQSSA-N"},
    {"(R)-carvone", "ULDHMXUKGWMISQ-SECBINFHSA-N"},
    {"menthone", "NFLGAXVYCFJBMK-BDAKNGLRSA-N"},
    {"naproxen", "CMWTZPSULFXXJA-VIFPVBQESA-N"},
    {"L-proline", "ONIBWKKTOPOVIA-BYPYZUCNSA-N"},
    {"L-phenylalanine", "COLNVLDHVKWLRT-QMMMGPOBSA-N"},
    {"L-leucine", "ROHFNLRQFUQHCH-YFKPBYRVSA-N"},
    {"ascorbic acid", "CIWBSHSKHKDKBQ-JLAZNSOCSA-N"},
    {"D-glucose (open chain)", "GZCGUPFRVQAUEE-SLPGGIOYSA-N"},
    {"beta-ionone", "PSQYTAPXSHCGMF-BQYQJAHWSA-N"},
    {"cinnamaldehyde", "KJPRLNWUNMBNBZ-QPJJXVBHSA-N"},
    {"cyclohexanone", "JHIVVAPYMSGYDF-UHFFFAOYSA-N"},
    {"diethyl malonate", "IYXGSMUGOJNHAZ-UHFFFAOYSA-N"},
    {"dimedone", "BADXJIPKFRBFOT-UHFFFAOYSA-N"},
    {"acetophenone", "KWOLFJPFCHCOCG-UHFFFAOYSA-N"},
    {"benzophenone", "RWCCWEUUXYIKHB-UHFFFAOYSA-N"},
    {"Meldrum's acid", "GXHFUVWIGNLZSC-UHFFFAOYSA-N"},
};

START_TEST (named_compounds_have_their_keys)
{
  size_t size = 0;
  const char *text = enl_resource ("names.tsv", &size), *name = named_key[_i][0];
  g_autoptr (EnlNames) names = NULL;

  ck_assert_int_eq (enl_names_new (text, size, &names, NULL), ENL_OK);
  const char *smiles = enl_names_find (names, name, strlen (name));
  ck_assert_msg (smiles, "%s", name);
  g_autoptr (EnlMolecule) mol = read_smiles (smiles);
  g_autofree char *key = NULL;
  ck_assert_int_eq (enl_inchi_write (mol, NULL, &key, NULL), ENL_OK);
  ck_assert_msg (strcmp (key, named_key[_i][1]) == 0, "%s: %s, not %s", name, key,
                 named_key[_i][1]);
}
END_TEST

static const char *const round_case[] = {
    "CC(C)=O",
    "CCO",
    "O",
    "c1ccccc1",
    "C[C@H](N)C(=O)O",
    "C[C@@H](N)C(=O)O",
    "N[C@](F)(Cl)Br",
    "N[C@@](F)(Cl)Br",
    "C/C=C/C",
    "C/C=C\\C",
    "C/C(Cl)=C(\\F)Br",
    "C/C=N/O",
    "C/C=C/C=C\\C(=O)C",
    "[13CH3]C(=O)C",
    "[2H]C([2H])([2H])C(C)=O",
    "[2H][C@](C)(O)c1ccccc1",
    "C[C@@H]([2H])O",
    "C[N+](=O)[O-]",
    "[Na+].[O-]C(C)=O",
    "CC(=O)[CH-]C(C)=O",
    "C[CH2]",
    "C[S@](=O)c1ccccc1",
    "C1CC[C@H]2CC(=O)CC[C@]2(C)C1",
    "C[C@]12CC[C@H]3[C@@H](CCC4=CC(=O)CC[C@]34C)[C@@H]1CC[C@@H]2O",
    "CC1(C)[C@@H]2CC[C@@]1(C)C(=O)C2",
    "C[C@H](O)[C@@H](O)C(=O)[C@H](O)CO",
    "N#CC(C#N)C#N",
    "C1=CC2=CC=CC=C2N1",
    "O=c1cc[nH]c2ccccc12",
};

/* Law: reading the InChI of a structure gives a structure with that InChI. */
START_TEST (inchi_text_is_read_back)
{
  g_autoptr (EnlMolecule) mol = read_smiles (round_case[_i]), back = NULL;
  g_autofree char *first = NULL, *second = NULL;
  EnlError err;

  ck_assert_int_eq (enl_inchi_write (mol, &first, NULL, &err), ENL_OK);
  ck_assert_msg (enl_inchi_parse (first, strlen (first), &back, &err) == ENL_OK, "%s: %s", first,
                 err.text);
  ck_assert_int_eq (enl_inchi_write (back, &second, NULL, &err), ENL_OK);
  g_autofree char *smiles = enl_smiles_write (back, ENL_SMILES_DEFAULT, NULL);
  ck_assert_msg (strcmp (first, second) == 0, "%s\n%s\n%s", first, second, smiles);
}
END_TEST

START_TEST (a_read_inchi_is_a_whole_molecule)
{
  const char *text = "InChI=1S/C3H7NO2/c1-2(4)3(5)6/h2H,4H2,1H3,(H,5,6)/t2-/m0/s1";
  g_autoptr (EnlMolecule) mol = NULL;

  ck_assert_int_eq (enl_inchi_parse (text, strlen (text), &mol, NULL), ENL_OK);
  ck_assert_uint_eq (enl_molecule_atoms (mol), 6); /* the library's explicit hydrogen is folded */
  g_autofree char *smiles = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
  g_autoptr (EnlMolecule) alanine = read_smiles ("C[C@H](N)C(=O)O");
  g_autofree char *want = enl_smiles_write (alanine, ENL_SMILES_DEFAULT, NULL);
  ck_assert_str_eq (smiles, want);
}
END_TEST

static const struct {
  const char *text;
  EnlStatus status;
  size_t column;
} bad_case[] = {
    {"InChI=1S/c7", ENL_ERROR_SYNTAX, 1},     /* crashes the library */
    {"InChI=1S/O/c11-", ENL_ERROR_SYNTAX, 1}, /* crashes the library */
    {"InChI=1S/C3H6O/c1-3(2", ENL_ERROR_SYNTAX, 1},
    {"InChI=1S/Xx2", ENL_ERROR_SYNTAX, 1},
    {"InChI=2S/C3H6O/c1-3(2)4/h1-2H3", ENL_ERROR_SYNTAX, 7},
    {"inchi=1S/CH4/h1H4", ENL_ERROR_SYNTAX, 1},
    {"InChI=1S/", ENL_ERROR_SYNTAX, 9},
    {"InChI=1S/C3H6O/c1-3(2)4/", ENL_ERROR_SYNTAX, 24},
    {"InChI=1S/C3H6O/c1-3(2)4/h1-2H3 acetone", ENL_ERROR_SYNTAX, 31},
    {"InChI=1S/CH4/h1H4\xFF", ENL_ERROR_SYNTAX, 18},
    {"", ENL_ERROR_EMPTY, 0},
};

START_TEST (bad_text_is_refused)
{
  EnlMolecule *mol = NULL;
  EnlError err = {0};
  EnlStatus status = enl_inchi_parse (bad_case[_i].text, strlen (bad_case[_i].text), &mol, &err);

  ck_assert_msg (status == bad_case[_i].status, "%s: %s", bad_case[_i].text, err.text);
  ck_assert_msg (err.column == bad_case[_i].column, "%s: column %zu (%s)", bad_case[_i].text,
                 err.column, err.text);
  ck_assert_ptr_null (mol);
}
END_TEST

START_TEST (what_inchi_cannot_hold_is_told)
{
  g_autofree char *big = g_strnfill (1024, 'C');
  g_autoptr (EnlMolecule) any = read_smiles ("*C"), large = read_smiles (big),
                          none = enl_molecule_new ();
  g_autofree char *inchi = NULL;
  EnlError err;

  ck_assert_int_eq (enl_inchi_write (any, &inchi, NULL, &err), ENL_ERROR_UNSUPPORTED);
  ck_assert_int_eq (enl_inchi_write (large, &inchi, NULL, &err), ENL_ERROR_LIMIT);
  enl_molecule_finish (none);
  ck_assert_int_eq (enl_inchi_write (none, &inchi, NULL, &err), ENL_ERROR_EMPTY);
  ck_assert_ptr_null (inchi);
}
END_TEST

static void *
write_many (void *data)
{
  g_autoptr (EnlMolecule) mol = read_smiles ("CC(C)=O");
  int *right = data;

  for (int i = 0; i < 200; i++) {
    g_autofree char *key = NULL;
    if (enl_inchi_write (mol, NULL, &key, NULL) == ENL_OK)
      *right += strcmp (key, "CSCPPACGZOOCGX-UHFFFAOYSA-N") == 0;
  }
  return NULL;
}

START_TEST (threads_take_turns)
{
  GThread *thread[4];
  int right[4] = {0};

  for (int i = 0; i < 4; i++)
    thread[i] = g_thread_new ("inchi", write_many, &right[i]);
  for (int i = 0; i < 4; i++) {
    g_thread_join (thread[i]);
    ck_assert_int_eq (right[i], 200);
  }
}
END_TEST

static const char *const bad_answer[] = {
    "",
    "hello",
    "enolith-inchi 1\n",
    "enolith-inchi 1\nend\n",
    "enolith-inchi 1\natom C 0 4 0 0 0 0 0\n",
    "enolith-inchi 1\natom Xx 0 4 0 0 0 0 0\nend\n",
    "enolith-inchi 1\natom C 0 4 0 0 0 0\nend\n",
    "enolith-inchi 1\natom C 0 400 0 0 0 0 0\nend\n",
    "enolith-inchi 1\natom C 0 3 0 0 0 0 0\nbond 0 1 1\nend\n",
    "enolith-inchi 1\natom C 0 3 0 0 0 0 0\nbond 0 0 1\nend\n",
    "enolith-inchi 1\natom C 0 3 0 0 0 0 0\natom C 0 3 0 0 0 0 0\nbond 0 1 7\nend\n",
    "enolith-inchi 1\natom C 0 3 0 0 0 0 0\ncentre 1 0 0 0 0 0\nend\n",
    "enolith-inchi 1\natom C 0 3 0 0 0 0 0\ncentre 1 0 1 2 3 4\nend\n",
    "enolith-inchi 1\natom C 0 3 0 0 0 0 0\ndouble 1 0 0 9 9\nend\n",
    "enolith-inchi 1\natom C 0 3 0 0 0 0 0 9\nend\n",
    "enolith-inchi 1\nwhat 1 2 3\nend\n",
};

START_TEST (answers_of_the_child_are_checked)
{
  EnlMolecule *mol = NULL;
  EnlError err;

  ck_assert_int_eq (enl_inchi_answer_parse (bad_answer[_i], strlen (bad_answer[_i]), &mol, &err),
                    ENL_ERROR_FORMAT);
  ck_assert_ptr_null (mol);
}
END_TEST

static Suite *
inchi_suite (void)
{
  Suite *suite = suite_create ("notation inchi");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 30);
  tcase_add_loop_test (tc, known_compounds_get_their_inchi_and_key, 0, (int)ENL_COUNT (write_case));
  tcase_add_loop_test (tc, named_compounds_have_their_keys, 0, (int)ENL_COUNT (named_key));
  tcase_add_loop_test (tc, inchi_text_is_read_back, 0, (int)ENL_COUNT (round_case));
  tcase_add_test (tc, a_read_inchi_is_a_whole_molecule);
  tcase_add_loop_test (tc, bad_text_is_refused, 0, (int)ENL_COUNT (bad_case));
  tcase_add_test (tc, what_inchi_cannot_hold_is_told);
  tcase_add_test (tc, threads_take_turns);
  tcase_add_loop_test (tc, answers_of_the_child_are_checked, 0, (int)ENL_COUNT (bad_answer));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (inchi_suite)
