#include "core/notation/smiles.h"

#include <string.h>

#include "tests/runner.h"

/* Malformed SMILES: where the fault is, what is said, and a part of the advice. */
static const struct {
  const char *smiles;
  EnlStatus code;
  size_t column, length; /* column in characters, length in bytes */
  const char *text, *advice;
} fault_case[] = {
    {"", ENL_ERROR_EMPTY, 1, 1, "no structure", "CC(=O)C"},
    {"  \t ", ENL_ERROR_EMPTY, 1, 1, "no structure", "CC(=O)C"},

    /* rings */
    {"C1CCCC", ENL_ERROR_SYNTAX, 2, 1, "ring number 1 is never closed", "other end"},
    {"C12CCCC1", ENL_ERROR_SYNTAX, 3, 1, "ring number 2 is never closed", "other end"},
    {"CC%34CC", ENL_ERROR_SYNTAX, 3, 3, "ring number 34 is never closed", "other end"},
    {"C11", ENL_ERROR_SYNTAX, 3, 1, "ring number 1 bonds an atom to itself", "another atom"},
    {"C1C1", ENL_ERROR_SYNTAX, 4, 1, "ring number 1 bonds two atoms that are bonded already",
     "remove the number"},
    {"C12CCC12", ENL_ERROR_SYNTAX, 8, 1, "ring number 2 bonds two atoms that are bonded already",
     "remove the number"},
    {"C=1CCCCC#1", ENL_ERROR_SYNTAX, 9, 2, "ring number 1 is opened with '=' and closed with '#'",
     "the same at both"},
    {"C-1CCCCC=1", ENL_ERROR_SYNTAX, 9, 2, "ring number 1 is opened with '-' and closed with '='",
     "the same at both"},
    {"F/C=C/1CCCCO/1", ENL_ERROR_SYNTAX, 13, 2,
     "ring number 1 is opened with '/' and closed with '/'", "at one end"},
    {"1CCC1", ENL_ERROR_SYNTAX, 1, 1, "ring number 1 without an atom before it", "behind an atom"},
    {"C(1CC1)", ENL_ERROR_SYNTAX, 3, 1, "ring number 1 without an atom before it",
     "behind an atom"},
    {"C%1CC", ENL_ERROR_SYNTAX, 2, 1, "'%' without two digits", "%12"},
    {"C%(10CC%(10)", ENL_ERROR_SYNTAX, 2, 1, "'%' without two digits", "%12"},
    {"C%(1000)CC", ENL_ERROR_SYNTAX, 2, 1, "'%' without two digits", "%12"},

    /* branches */
    {"CC(=O", ENL_ERROR_SYNTAX, 3, 1, "branch '(' is never closed", "add ')'"},
    {"CC(C(C)C", ENL_ERROR_SYNTAX, 3, 1, "branch '(' is never closed", "add ')'"},
    {"CC)C", ENL_ERROR_SYNTAX, 3, 1, "')' without '('", "remove it"},
    {"CC()C", ENL_ERROR_SYNTAX, 3, 2, "empty parentheses", "write a branch"},
    {"C((C))C", ENL_ERROR_SYNTAX, 3, 1, "'(' directly behind '('", "start the branch"},
    {"(C)C", ENL_ERROR_SYNTAX, 1, 1, "branch '(' without an atom before it", "carries the branch"},
    {"CC=(O)C", ENL_ERROR_SYNTAX, 3, 2, "bond '=' stands before '('", "C(=O)"},
    {"CC(=)O", ENL_ERROR_SYNTAX, 4, 1, "bond '=' leads to no atom", "second atom"},

    /* bonds and dots */
    {"CC=", ENL_ERROR_SYNTAX, 3, 1, "bond '=' leads to no atom", "second atom"},
    {"=CC", ENL_ERROR_SYNTAX, 1, 1, "bond '=' without an atom before it", "first atom"},
    {"C==C", ENL_ERROR_SYNTAX, 2, 2, "two bond symbols '==' in a row", "keep one"},
    {"C=.C", ENL_ERROR_SYNTAX, 2, 1, "bond '=' leads to no atom", "second atom"},
    {"C.=C", ENL_ERROR_SYNTAX, 3, 1, "bond '=' without an atom before it", "first atom"},
    {"C.", ENL_ERROR_SYNTAX, 2, 1, "'.' with nothing behind it", "another part"},
    {"C..C", ENL_ERROR_SYNTAX, 2, 1, "'.' with nothing behind it", "another part"},
    {"C(.)C", ENL_ERROR_SYNTAX, 3, 1, "'.' with nothing behind it", "another part"},
    {".C", ENL_ERROR_SYNTAX, 1, 1, "'.' with nothing before it", "remove it"},
    {"F/C(\\Cl)=C/F", ENL_ERROR_SYNTAX, 5, 1,
     "'/' and '\\' put both neighbours on one side of a double bond", "turn one"},

    /* brackets */
    {"C[NH3+", ENL_ERROR_SYNTAX, 2, 5, "bracket '[' is never closed", "add ']'"},
    {"C[N(C)C", ENL_ERROR_SYNTAX, 2, 6, "bracket '[' is never closed", "add ']'"},
    {"C]N", ENL_ERROR_SYNTAX, 2, 1, "']' without '['", "add '['"},
    {"C[]N", ENL_ERROR_SYNTAX, 2, 2, "empty brackets", "[Na+]"},
    {"[13]C", ENL_ERROR_SYNTAX, 4, 1, "no element symbol in the brackets", "[NH4+]"},
    {"[+]", ENL_ERROR_SYNTAX, 2, 1, "no element symbol in the brackets", "[NH4+]"},
    {"[Xx]", ENL_ERROR_UNKNOWN, 2, 2, "unknown element 'Xx'", "symbol of an element"},
    {"[CL-]", ENL_ERROR_UNKNOWN, 2, 2, "unknown element 'CL'", "write Cl"},
    {"[na+]", ENL_ERROR_UNKNOWN, 2, 2, "unknown element 'na'", "write Na"},
    {"[Foo]", ENL_ERROR_UNKNOWN, 2, 3, "unknown element 'Foo'", "symbol of an element"},
    {"[Jx]", ENL_ERROR_UNKNOWN, 2, 2, "unknown element 'Jx'", "symbol of an element"},
    {"[N+H4]", ENL_ERROR_SYNTAX, 4, 1, "hydrogen count stands too late in the brackets",
     "isotope, element"},
    {"[CH@](F)(Cl)Br", ENL_ERROR_SYNTAX, 4, 1, "chirality '@' stands too late in the brackets",
     "isotope, element"},
    {"[Fe+-]", ENL_ERROR_SYNTAX, 5, 1, "charge stands too late in the brackets",
     "isotope, element"},
    {"[C=O]", ENL_ERROR_SYNTAX, 3, 1, "'=' has no meaning in the brackets", "close the brackets"},
    {"[C 13]", ENL_ERROR_SYNTAX, 3, 1, "' ' has no meaning in the brackets", "close the brackets"},
    {"[CH3:]", ENL_ERROR_SYNTAX, 5, 1, "':' in brackets without an atom map number", "number"},
    {"[CH3:123456789]", ENL_ERROR_RANGE, 5, 10, "atom map number is too large", "8 digits"},
    {"[9999C]", ENL_ERROR_RANGE, 2, 4, "no such isotope", "three digits"},
    {"[C+16]", ENL_ERROR_RANGE, 3, 3, "charge is too large", "-15 and +15"},
    {"[CH10]", ENL_ERROR_RANGE, 3, 3, "too many hydrogens on one atom", "9"},
    {"[HH2]", ENL_ERROR_SYNTAX, 3, 2, "a hydrogen atom cannot carry hydrogens", "[H][H]"},
    {"[C@TH3](F)(Cl)(Br)I", ENL_ERROR_SYNTAX, 4, 3, "'@TH' takes a number from 1 to 2",
     "of the class"},
    {"[Pt@SP](F)(Cl)(Br)I", ENL_ERROR_SYNTAX, 5, 2, "'@SP' takes a number from 1 to 3",
     "of the class"},

    /* letters */
    {"NaCl", ENL_ERROR_SYNTAX, 1, 2, "element 'Na' needs brackets", "[Na]"},
    {"CCSi(C)C", ENL_ERROR_SYNTAX, 3, 2, "element 'Si' needs brackets", "[Si]"},
    {"CZnC", ENL_ERROR_SYNTAX, 2, 2, "element 'Zn' needs brackets", "[Zn]"},
    {"CKC", ENL_ERROR_SYNTAX, 2, 1, "element 'K' needs brackets", "[K]"},
    {"CC(H)C", ENL_ERROR_SYNTAX, 4, 1, "hydrogen needs brackets", "filled in"},
    {"CD", ENL_ERROR_SYNTAX, 2, 1, "'D' is no element symbol", "[2H]"},
    {"CR", ENL_ERROR_SYNTAX, 2, 1, "'R' is no element symbol", "*"},
    {"CCX", ENL_ERROR_SYNTAX, 3, 1, "'X' is no element symbol", "halogen"},
    {"CCL", ENL_ERROR_SYNTAX, 3, 1, "'L' is no element symbol", "small l"},
    {"Ce", ENL_ERROR_SYNTAX, 1, 2, "element 'Ce' needs brackets", "[Ce]"},
    {"CCe", ENL_ERROR_SYNTAX, 2, 2, "element 'Ce' needs brackets", "[Ce]"},
    {"Cq", ENL_ERROR_SYNTAX, 2, 1, "'q' is no atom", "B C N O P S"},
    {"Co", ENL_ERROR_CHEMISTRY, 1, 2, "aromatic 'o' is in no ring", "[Co]"},
    {"Ccc", ENL_ERROR_CHEMISTRY, 2, 1, "aromatic 'c' is in no ring", "capitals"},

    /* other characters */
    {"C\xE2\x88\x92"
     "C",
     ENL_ERROR_SYNTAX, 2, 3, "'\xE2\x88\x92' (U+2212) only looks like '-'", "type '-'"},
    {"C\xE2\x89\xA1N", ENL_ERROR_SYNTAX, 2, 3, "'\xE2\x89\xA1' (U+2261) only looks like '#'",
     "type '#'"},
    {"CC(=\xD0\x9E)C", ENL_ERROR_SYNTAX, 5, 2, "'\xD0\x9E' (U+041E) only looks like 'O'",
     "type 'O'"},
    {"C[O\xE2\x88\x92]", ENL_ERROR_SYNTAX, 4, 3, "'\xE2\x88\x92' (U+2212) only looks like '-'",
     "type '-'"},
    {"[\xD0\xA1H4]", ENL_ERROR_SYNTAX, 2, 2, "'\xD0\xA1' (U+0421) only looks like 'C'", "type 'C'"},
    {"C\xC3\xA9", ENL_ERROR_SYNTAX, 2, 2, "'\xC3\xA9' (U+00E9) has no meaning in a SMILES",
     "delete"},
    {"CO\xE2\x80\x8B", ENL_ERROR_SYNTAX, 3, 3, "invisible character U+200B in the SMILES",
     "delete"},
    {"C\xC2\xA0O", ENL_ERROR_SYNTAX, 2, 2, "invisible character U+00A0 in the SMILES", "delete"},
    {"C\xFFO", ENL_ERROR_SYNTAX, 2, 1, "byte 0xFF is no text", "UTF-8"},
    {"CC O", ENL_ERROR_SYNTAX, 3, 1, "white space inside the SMILES", "one structure"},
    {"C\x07O", ENL_ERROR_SYNTAX, 2, 1, "control character 0x07 in the SMILES", "delete"},
    {"CO+", ENL_ERROR_SYNTAX, 3, 1, "'+' outside of brackets", "[O-]"},
    {"C@H", ENL_ERROR_SYNTAX, 2, 1, "'@' outside of brackets", "[C@H]"},
    {"CC>>C", ENL_ERROR_UNSUPPORTED, 3, 1, "'>' writes a reaction, not a structure", "itself"},
    {"C~C", ENL_ERROR_SYNTAX, 2, 1, "'~' has no meaning here", "delete"},
    {"C{n}", ENL_ERROR_SYNTAX, 2, 1, "'{' has no meaning here", "delete"},

    /* aromatic rings */
    {"n1cccc1", ENL_ERROR_CHEMISTRY, 1, 1, "cannot place alternating double bonds at 'n'", "[nH]"},
    {"c1ccc2c(c1)ccn2", ENL_ERROR_CHEMISTRY, 14, 1, "cannot place alternating double bonds at 'n'",
     "[nH]"},
    {"c1cncn1", ENL_ERROR_CHEMISTRY, 4, 1, "cannot place alternating double bonds at 'n'", "[nH]"},
    {"c1ccccccc1.c1cccc1", ENL_ERROR_CHEMISTRY, 15, 1,
     "cannot place alternating double bonds at 'c'", "hydrogens and charges"},

    /* valence (all traps in test-valence.c) */
    {"CC(C)(C)(C)C", ENL_ERROR_CHEMISTRY, 2, 1, "carbon with 5 bonds", "takes 4"},
    {"CCN(C)(C)C", ENL_ERROR_CHEMISTRY, 3, 1, "nitrogen with 4 bonds", "positive charge"},
};

START_TEST (faults)
{
  EnlMolecule *mol = NULL;
  EnlError err;
  const char *smiles = fault_case[_i].smiles;

  EnlStatus code = enl_smiles_parse (smiles, strlen (smiles), &mol, &err);
  ck_assert_ptr_null (mol);
  ck_assert_msg (code == fault_case[_i].code && err.code == code, "%s: code %d, %s", smiles, code,
                 err.text);
  ck_assert_msg (strcmp (err.text, fault_case[_i].text) == 0, "%s: %s", smiles, err.text);
  ck_assert_msg (strstr (err.advice, fault_case[_i].advice), "%s: %s", smiles, err.advice);
  ck_assert_uint_eq (err.line, 1);
  ck_assert_msg (err.column == fault_case[_i].column, "%s: column %zu", smiles, err.column);
  ck_assert_msg (err.length == fault_case[_i].length, "%s: length %zu", smiles, err.length);
}
END_TEST

START_TEST (positions_refer_to_the_whole_text)
{
  const char text[] = "\n  CC(C";
  EnlMolecule *mol = NULL;
  EnlError err;

  ck_assert_int_eq (enl_smiles_parse (text, strlen (text), &mol, &err), ENL_ERROR_SYNTAX);
  ck_assert_uint_eq (err.line, 2);
  ck_assert_uint_eq (err.column, 5);
  ck_assert_uint_eq (err.offset, 5);
}
END_TEST

static Suite *
faults_suite (void)
{
  Suite *suite = suite_create ("notation smiles-faults");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, faults, 0, (int)ENL_COUNT (fault_case));
  tcase_add_test (tc, positions_refer_to_the_whole_text);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (faults_suite)
