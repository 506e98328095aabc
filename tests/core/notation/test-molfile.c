#include "core/notation/molfile.h"

#include <math.h>
#include <string.h>

#include "core/layout/layout.h"
#include "core/notation/smiles.h"
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

static EnlMolecule *
read_block (const char *label, const char *text)
{
  EnlMolecule *mol = NULL;
  EnlError err;
  EnlStatus status = enl_molfile_parse (text, strlen (text), &mol, &err);
  g_autofree char *message = status == ENL_OK ? NULL : enl_error_message (&err);

  ck_assert_msg (status == ENL_OK, "%s: %s", label, message);
  return mol;
}

static char *
canonical (const char *smiles)
{
  g_autoptr (EnlMolecule) mol = read_smiles (smiles);
  return enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
}

/* ---- reading ---- */

#define HEAD(counts)   "name\n\n\n" counts "  0  0  0  0  0  0  0  0999 V2000\n"
#define AT(x, y, rest) "    " x "    " y "    0.0000 " rest "\n"
#define END            "M  END\n"

#define V3_HEAD "name\n\n\n  0  0  0     0  0            999 V3000\nM  V30 BEGIN CTAB\n"
#define V3_END  "M  V30 END CTAB\nM  END\n"

static const struct {
  const char *label, *text, *smiles;
} block_case[] = {
    {"charges in the atom block",
     HEAD ("  2  1") AT ("0.0000", "0.0000", "N   0  3")
         AT ("1.0000", "0.0000", "C   0  0") "  1  2  1  0\n" END,
     "C[NH3+]"},
    {"M  CHG replaces the atom block",
     HEAD ("  2  1") AT ("0.0000", "0.0000", "O   0  3")
         AT ("1.0000", "0.0000", "C   0  0") "  1  2  1  0\nM  CHG  1   1  -1\n" END,
     "C[O-]"},
    {"two charges on one line",
     HEAD ("  2  0") AT ("0.0000", "0.0000", "Na  0  0")
         AT ("2.0000", "0.0000", "Cl  0  0") "M  CHG  2   1   1   2  -1\n" END,
     "[Na+].[Cl-]"},
    {"mass difference",
     HEAD ("  2  1") AT ("0.0000", "0.0000", "C   1  0")
         AT ("1.0000", "0.0000", "O   0  0") "  1  2  1  0\n" END,
     "[13CH3]O"},
    {"M  ISO",
     HEAD ("  2  1") AT ("0.0000", "0.0000", "C   0  0")
         AT ("1.0000", "0.0000", "O   0  0") "  1  2  1  0\nM  ISO  1   2  18\n" END,
     "C[18OH]"},
    {"the symbol D",
     HEAD ("  2  1") AT ("0.0000", "0.0000", "D   0  0")
         AT ("1.0000", "0.0000", "O   0  0") "  1  2  1  0\n" END,
     "[2H]O"},
    {"M  RAD doublet",
     HEAD ("  2  1") AT ("0.0000", "0.0000", "C   0  0")
         AT ("1.0000", "0.0000", "C   0  0") "  1  2  1  0\nM  RAD  1   1   2\n" END,
     "[CH2]C"},
    {"doublet in the atom block",
     HEAD ("  2  1") AT ("0.0000", "0.0000", "C   0  4")
         AT ("1.0000", "0.0000", "C   0  0") "  1  2  1  0\n" END,
     "[CH2]C"},
    {"singlet carbene",
     HEAD ("  1  0") AT ("0.0000", "0.0000", "C   0  0") "M  RAD  1   1   1\n" END, "[CH2]"},
    {"valence 15 is none", HEAD ("  1  0") AT ("0.0000", "0.0000", "C   0  0  0  0  0 15") END,
     "[C]"},
    {"valence 2 of tin",
     HEAD ("  3  2") AT ("0.0000", "0.0000", "Sn  0  0  0  0  0  4")
         AT ("1.0000", "0.0000", "C   0  0")
             AT ("-.5000", "0.8000", "C   0  0") "  1  2  1  0\n  1  3  1  0\n" END,
     "C[SnH2]C"},
    {"written hydrogens are folded",
     HEAD ("  3  2") AT ("0.0000", "0.0000", "O   0  0") AT ("1.0000", "0.0000", "H   0  0")
         AT ("-.5000", "0.8000", "H   0  0") "  1  2  1  0\n  1  3  1  0\n" END,
     "O"},
    {"nitro with five bonds",
     HEAD ("  4  3") AT ("0.0000", "0.0000", "C   0  0") AT ("1.0000", "0.0000", "N   0  0")
         AT ("1.5000", "0.8660", "O   0  0")
             AT ("1.5000", "-.8660", "O   0  0") "  1  2  1  0\n  2  3  2  0\n  2  4  2  0\n" END,
     "C[N+](=O)[O-]"},
    {"aromatic bonds: pyrrole finds its hydrogen",
     HEAD ("  5  5") AT ("0.0000", "1.0000", "N   0  0") AT ("0.9510", "0.3090", "C   0  0")
         AT ("0.5878", "-.8090", "C   0  0") AT ("-.5878", "-.8090", "C   0  0")
             AT ("-.9510", "0.3090", "C   0  0") "  1  2  4  0\n  2  3  4  0\n  3  4  4  0\n  4  5 "
                                                 " 4  0\n  5  1  4  0\n" END,
     "c1cc[nH]c1"},
    {"aromatic bonds: pyridazine needs none",
     HEAD ("  6  6") AT ("1.0000", "0.0000", "N   0  0") AT ("0.5000", "0.8660", "N   0  0")
         AT ("-.5000", "0.8660", "C   0  0") AT ("-1.000", "0.0000", "C   0  0")
             AT ("-.5000", "-.8660", "C   0  0")
                 AT ("0.5000", "-.8660", "C   0  0") "  1  2  4  0\n  2  3  4  0\n  3  4  4  0\n  "
                                                     "4  5  4  0\n  5  6  4  0\n  6  1  4  0\n" END,
     "c1ccnnc1"},
    {"wedge: (R)-alanine, N up",
     HEAD ("  6  5") AT ("0.0000", "0.0000", "C   0  0") AT ("0.8660", "-.5000", "C   0  0")
         AT ("-.8660", "-.5000", "C   0  0") AT ("0.0000", "1.0000", "N   0  0")
             AT ("1.7320", "0.0000", "O   0  0")
                 AT ("0.8660", "-1.500", "O   0  0") "  1  2  1  0\n  1  3  1  0\n  1  4  1  1\n  "
                                                     "2  5  2  0\n  2  6  1  0\n" END,
     "C[C@@H](N)C(=O)O"},
    {"the same centre hashed",
     HEAD ("  6  5") AT ("0.0000", "0.0000", "C   0  0") AT ("0.8660", "-.5000", "C   0  0")
         AT ("-.8660", "-.5000", "C   0  0") AT ("0.0000", "1.0000", "N   0  0")
             AT ("1.7320", "0.0000", "O   0  0")
                 AT ("0.8660", "-1.500", "O   0  0") "  1  2  1  0\n  1  3  1  0\n  1  4  1  6\n  "
                                                     "2  5  2  0\n  2  6  1  0\n" END,
     "C[C@H](N)C(=O)O"},
    {"a wavy bond says nothing",
     HEAD ("  6  5") AT ("0.0000", "0.0000", "C   0  0") AT ("0.8660", "-.5000", "C   0  0")
         AT ("-.8660", "-.5000", "C   0  0") AT ("0.0000", "1.0000", "N   0  0")
             AT ("1.7320", "0.0000", "O   0  0")
                 AT ("0.8660", "-1.500", "O   0  0") "  1  2  1  0\n  1  3  1  0\n  1  4  1  4\n  "
                                                     "2  5  2  0\n  2  6  1  0\n" END,
     "CC(C(=O)O)N"},
    {"E from positions",
     HEAD ("  4  3") AT ("0.0000", "0.0000", "C   0  0") AT ("0.8660", "0.5000", "C   0  0")
         AT ("1.7320", "0.0000", "C   0  0")
             AT ("2.5980", "0.5000", "C   0  0") "  1  2  1  0\n  2  3  2  0\n  3  4  1  0\n" END,
     "C/C=C/C"},
    {"crossed double bond",
     HEAD ("  4  3") AT ("0.0000", "0.0000", "C   0  0") AT ("0.8660", "0.5000", "C   0  0")
         AT ("1.7320", "0.0000", "C   0  0")
             AT ("2.5980", "0.5000", "C   0  0") "  1  2  1  0\n  2  3  2  3\n  3  4  1  0\n" END,
     "CC=CC"},
    {"Sgroups, aliases and values are passed over",
     HEAD ("  2  1") AT ("0.0000", "0.0000", "C   0  0") AT (
         "1.0000", "0.0000",
         "O   0  0") "  1  2  1  0\nA    2\nM  END of an alias\nV    1 note\nM  STY  1   1 SUP\n"
                     "M  SAL   1  1   2\nM  SMT   1 OH\n" END,
     "CO"},
    {"Windows line ends",
     "x\r\n\r\n\r\n  2  1  0  0  0  0  0  0  0  0999 V2000\r\n"
     "    0.0000    0.0000    0.0000 C   0  0\r\n    1.0000    0.0000    0.0000 O   0  0\r\n"
     "  1  2  1  0\r\nM  END\r\n",
     "CO"},
    {"before version numbers",
     "x\n\n\n  2  1  0  0  0\n    0.0000    0.0000    0.0000 C   0  0\n"
     "    1.0000    0.0000    0.0000 O   0  0\n  1  2  1  0\n",
     "CO"},
    {"V3000",
     V3_HEAD "M  V30 COUNTS 3 2 0 0 0\nM  V30 BEGIN ATOM\n"
             "M  V30 10 C 0 0 0 0\nM  V30 20 C 1 0 0 0\nM  V30 30 O 1.5 0.866 0 0 CHG=-1\n"
             "M  V30 END ATOM\nM  V30 BEGIN BOND\nM  V30 1 1 10 20\nM  V30 2 1 20 30\n"
             "M  V30 END BOND\n" V3_END,
     "CC[O-]"},
    {"V3000: joined lines, MASS, RAD, VAL",
     V3_HEAD "M  V30 COUNTS 2 1 0 0 0\nM  V30 BEGIN ATOM\n"
             "M  V30 1 C 0 -\nM  V30 0 0 0 -\nM  V30 MASS=13 RAD=2\nM  V30 2 O 1 0 0 0 VAL=2\n"
             "M  V30 END ATOM\nM  V30 BEGIN BOND\nM  V30 1 1 1 2\nM  V30 END BOND\n" V3_END,
     "[13CH2]O"},
    {"V3000: wedge",
     V3_HEAD "M  V30 COUNTS 4 3 0 0 1\nM  V30 BEGIN ATOM\nM  V30 1 C 0 0 0 0\n"
             "M  V30 2 F 0.866 -0.5 0 0\nM  V30 3 Cl -0.866 -0.5 0 0\nM  V30 4 Br 0 1 0 0\n"
             "M  V30 END ATOM\nM  V30 BEGIN BOND\nM  V30 1 1 1 2\nM  V30 2 1 1 3\n"
             "M  V30 3 1 1 4 CFG=1\nM  V30 END BOND\n" V3_END,
     "Br[C@@H](F)Cl"},
    {"V3000: Sgroups and collections are passed over",
     V3_HEAD
     "M  V30 COUNTS 1 0 1 0 0\nM  V30 BEGIN ATOM\nM  V30 1 O 0 0 0 0\nM  V30 END ATOM\n"
     "M  V30 BEGIN SGROUP\nM  V30 1 DAT 0 ATOMS=(1 1) FIELDNAME=\"a b\"\nM  V30 END SGROUP\n"
     "M  V30 BEGIN COLLECTION\nM  V30 MDLV30/STEABS ATOMS=(1 1)\nM  V30 END COLLECTION\n" V3_END,
     "O"},
    {"in space: volume gives the winding",
     HEAD ("  4  3") "    0.0000    0.0000    0.3000 C   0  0\n    1.0000    0.0000    0.0000 F   "
                     "0  0\n"
                     "   -0.5000    0.8660    0.0000 Cl  0  0\n   -0.5000   -0.8660    0.0000 Br  "
                     "0  0\n"
                     "  1  2  1  0\n  1  3  1  0\n  1  4  1  0\n" END,
     "[C@H](F)(Cl)Br"},
    {"without positions: parity 1 of four neighbours",
     HEAD ("  5  4") AT ("0.0000", "0.0000", "C   0  0  1") AT ("0.0000", "0.0000", "F   0  0")
         AT ("0.0000", "0.0000", "Cl  0  0") AT ("0.0000", "0.0000", "Br  0  0")
             AT ("0.0000", "0.0000",
                 "I   0  0") "  1  2  1  0\n  1  3  1  0\n  1  4  1  0\n  1  5  1  0\n" END,
     "F[C@@](Cl)(Br)I"},
};

START_TEST (blocks_are_read)
{
  g_autoptr (EnlMolecule) mol = read_block (block_case[_i].label, block_case[_i].text);
  g_autofree char *have = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
  g_autofree char *want = canonical (block_case[_i].smiles);

  ck_assert_msg (strcmp (have, want) == 0, "%s: %s, not %s", block_case[_i].label, have, want);
}
END_TEST

START_TEST (name_positions_and_layout)
{
  const char *text = "my compound\r\n\n\n  2  1  0  0  0  0  0  0  0  0999 V2000\n"
                     "    1.5000    0.0000    0.0000 C   0  0\n"
                     "    3.0000    0.0000    0.0000 O   0  0\n  1  2  1  0\nM  END\n";
  g_autoptr (EnlMolecule) mol = read_block ("named", text);
  const EnlAtom *oxygen = enl_molecule_atom (mol, 1);

  ck_assert_str_eq (enl_molecule_name (mol), "my compound");
  ck_assert (enl_molecule_has_layout (mol));
  ck_assert_double_eq_tol (oxygen->x - enl_molecule_atom (mol, 0)->x, 1.0, 1e-9);
  ck_assert_uint_eq (oxygen->input, 2);
  ck_assert (text[oxygen->offset] == 'O');
  ck_assert_uint_eq (oxygen->length, 1);
}
END_TEST

START_TEST (flat_and_spatial_blocks_have_no_layout)
{
  g_autoptr (EnlMolecule) flat =
      read_block ("flat", HEAD ("  2  1") AT ("0.0000", "0.0000", "C   0  0")
                              AT ("0.0000", "0.0000", "C   0  0") "  1  2  1  0\n" END);

  ck_assert (!enl_molecule_has_layout (flat));
}
END_TEST

/* ---- writing ---- */

static const char *const round_case[] = {
    "CC(C)=O",
    "C[C@H](N)C(=O)O",
    "C[C@@H](N)C(=O)O",
    "C/C=C/C",
    "C/C=C\\C",
    "CC=CC",
    "C[S@](=O)c1ccccc1",
    "[13CH3]C(=O)C",
    "[2H]C([2H])([2H])C(C)=O",
    "[2H][C@](C)(O)F",
    "C[N+](=O)[O-]",
    "[Na+].[O-]C(C)=O",
    "CC(=O)[CH-]C(C)=O",
    "C[CH2]",
    "[CH2]",
    "[C]",
    "[Fe+3]",
    "[Al]",
    "[SiH2]C",
    "[Li]CCCC",
    "c1cc[nH]c1",
    "[O-][n+]1ccccc1",
    "[H][H]",
    "[H+]",
    "N[C@](F)(Cl)Br",
    "C[P@](=O)(O)c1ccccc1",
    "C[C@]12CC[C@H]3[C@@H](CCC4=CC(=O)CC[C@]34C)[C@@H]1CC[C@@H]2O",
    "CC1(C)[C@@H]2CC[C@@]1(C)C(=O)C2",
    "C(F)(F)(F)C(F)(F)C(F)(F)C(F)(F)F",
    "[NH4+].[NH4+].[NH4+].[NH4+].[NH4+].[NH4+].[NH4+].[NH4+].[NH4+].[Cl-]",
    "O=C1C=C2CC[C@H]3[C@@H]4CC[C@H](O)[C@@]4(C)CC[C@@H]3[C@@]2(C)CC1",
};

/* Law: read after write gives the same structure, drawn or not (sides of double bonds need a
 * drawing). */
static void
round_trip (const char *smiles, bool laid_out)
{
  g_autoptr (EnlMolecule) mol = read_smiles (smiles);
  g_autofree char *block = NULL;
  EnlError err;

  if (laid_out)
    ck_assert_int_eq (enl_layout (mol, &err), ENL_OK);
  enl_molecule_set_name (mol, "a name\nof two lines");
  ck_assert_int_eq (enl_molfile_write (mol, &block, &err), ENL_OK);
  ck_assert (g_str_has_prefix (block, "a name of two lines\n"));
  g_autoptr (EnlMolecule) back = read_block (smiles, block);
  g_autofree char *have = enl_smiles_write (back, ENL_SMILES_DEFAULT, NULL);
  g_autofree char *want = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
  if (laid_out || !strpbrk (want, "/\\"))
    ck_assert_msg (strcmp (have, want) == 0, "%s, not %s\n%s", have, want, block);
  ck_assert_str_eq (enl_molecule_name (back), "a name of two lines");
}

START_TEST (blocks_are_read_back)
{
  round_trip (round_case[_i], true);
  round_trip (round_case[_i], false);
}
END_TEST

START_TEST (limits_of_the_format_are_told)
{
  g_autofree char *long_chain = g_strnfill (1000, 'C');
  g_autoptr (EnlMolecule) big = read_smiles (long_chain);
  g_autoptr (EnlMolecule) quadruple = read_smiles ("[Re]$[Re]");
  char *out = NULL;
  EnlError err;

  ck_assert_int_eq (enl_molfile_write (big, &out, &err), ENL_ERROR_LIMIT);
  ck_assert_int_eq (enl_molfile_write (quadruple, &out, &err), ENL_ERROR_UNSUPPORTED);
  ck_assert_ptr_null (out);
}
END_TEST

/* ---- SDF ---- */

START_TEST (records_and_fields)
{
  const char *sdf = "one\n...\nM  END\n> <pKa>\n26.5\n\n>  <Long Name> (7)\nfirst\nsecond\n\n$$$$\n"
                    "two\r\nM  END\r\n$$$$\r\nthree\nM  END\n\n";
  size_t size = strlen (sdf), offset = 0, start, length;

  ck_assert (enl_sdf_next (sdf, size, &offset, &start, &length));
  ck_assert (strncmp (sdf + start, "one", 3) == 0);
  g_autofree char *pka = enl_sdf_field (sdf + start, length, "pKa");
  g_autofree char *longer = enl_sdf_field (sdf + start, length, "Long Name");
  ck_assert_str_eq (pka, "26.5");
  ck_assert_str_eq (longer, "first\nsecond");
  ck_assert_ptr_null (enl_sdf_field (sdf + start, length, "pK"));
  ck_assert (enl_sdf_next (sdf, size, &offset, &start, &length));
  ck_assert (strncmp (sdf + start, "two", 3) == 0);
  ck_assert_ptr_null (enl_sdf_field (sdf + start, length, "pKa"));
  ck_assert (enl_sdf_next (sdf, size, &offset, &start, &length)); /* not closed, still a record */
  ck_assert (strncmp (sdf + start, "three", 5) == 0);
  ck_assert (!enl_sdf_next (sdf, size, &offset, &start, &length));
}
END_TEST

static Suite *
molfile_suite (void)
{
  Suite *suite = suite_create ("notation molfile");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, blocks_are_read, 0, (int)ENL_COUNT (block_case));
  tcase_add_test (tc, name_positions_and_layout);
  tcase_add_test (tc, flat_and_spatial_blocks_have_no_layout);
  tcase_add_loop_test (tc, blocks_are_read_back, 0, (int)ENL_COUNT (round_case));
  tcase_add_test (tc, limits_of_the_format_are_told);
  tcase_add_test (tc, records_and_fields);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (molfile_suite)
