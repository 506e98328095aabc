#include "core/acidity/why.h"

#include <math.h>

#include "core/acidity/why-chain.h"
#include "core/acidity/why-words.h"
#include "core/molecule/valence.h"
#include "resources/model.h"
#include "tests/core/acidity/acidity-help.h"
#include "tests/renumber.h"
#include "tests/runner.h"

/* A sum of a few numbers below 100 has no larger error in double precision. */
#define EXACT 1e-9

static EnlReference *acids;
static EnlEstimator *estimator;

static void
setup (void)
{
  size_t size = 0;
  const char *bytes = enl_model ("model.bin", &size);
  EnlError err;

  acids = open_acids ();
  ck_assert_int_eq (enl_estimator_open (acids, bytes, size, &estimator, &err), ENL_OK);
}

static void
teardown (void)
{
  enl_estimator_free (estimator);
  enl_reference_free (acids);
}

/* ---- one molecule ---- */

typedef struct {
  EnlSites *sites;
  EnlEstimate *estimate;
} Result;

static Result
analyse (const EnlMolecule *mol, EnlSolvent solvent)
{
  Result r = {0};
  EnlError err;

  ck_assert_int_eq (enl_sites_find (mol, &r.sites, &err), ENL_OK);
  r.estimate = g_new0 (EnlEstimate, r.sites->n_sites + 1);
  ck_assert_int_eq (enl_estimator_run (estimator, mol, r.sites, solvent, r.estimate, &err), ENL_OK);
  return r;
}

static void
clear (Result *r)
{
  g_free (r->estimate);
  enl_sites_free (r->sites);
}

/* As written on a page: the rounded lines are the rounded value. */
static void
check_rounding (const EnlWhy *why, int decimals, const char *label)
{
  double out[ENL_WHY_LINES], sum = 0, unit = pow (10, -decimals);
  g_autofree char *value = g_strdup_printf ("%.*f", decimals, why->value);

  enl_why_round (why, decimals, out);
  for (uint32_t i = 0; i < why->n_lines; i++) {
    sum += out[i];
    ck_assert_msg (fabs (out[i] - why->line[i].value) <= unit + EXACT, "%s: %s %g for %g", label,
                   why->line[i].words, out[i], why->line[i].value);
  }
  ck_assert_msg (fabs (sum - g_ascii_strtod (value, NULL)) < EXACT, "%s: %.3f is not %s", label,
                 sum, value);
}

static void
check_why (const EnlWhy *why, const EnlEstimate *e, const char *label)
{
  double sum = 0;

  ck_assert_msg (why->n_lines >= 1 && why->n_lines <= ENL_WHY_LINES, "%s: %u lines", label,
                 why->n_lines);
  for (uint32_t i = 0; i < why->n_lines; i++) {
    ck_assert_msg (why->line[i].words && *why->line[i].words, "%s: line without words", label);
    ck_assert_msg (isfinite (why->line[i].value), "%s: %s", label, why->line[i].words);
    sum += why->line[i].value;
  }
  ck_assert_msg (fabs (sum - e->value) < EXACT, "%s: lines give %.12f, shown is %.12f", label, sum,
                 e->value);
  ck_assert_double_eq (why->value, e->value);
  ck_assert_msg (why->width && strstr (why->width, "90 %"), "%s: %s", label, why->width);
  check_rounding (why, 1, label);
  check_rounding (why, 2, label);
}

/* All sites of a molecule. */
static void
check_sites (const EnlMolecule *mol, EnlSolvent solvent, const char *label)
{
  Result r = analyse (mol, solvent);

  for (uint32_t i = 0; i < r.sites->n_sites; i++) {
    g_autoptr (EnlWhy) why = enl_why_new (estimator, mol, r.sites, r.estimate, i);
    check_why (why, &r.estimate[i], label);
  }
  clear (&r);
}

/* ---- a chemist's words ---- */

typedef struct {
  const char *label, *smiles;
  EnlSolvent solvent;
  const char *line[4]; /* pieces of lines, in this order */
} WordCase;

static const WordCase word_case[] = {
    {"acetone is its own parent", "[CH3:1]C(C)=O", ENL_SOLVENT_DMSO, {"parent: acetone"}},
    {"beta-diketone",
     "CC(=O)[CH2:1]C(C)=O",
     ENL_SOLVENT_DMSO,
     {"parent: acetone", "second acyl group (acetyl)", "measured minus model"}},
    {"three acyl groups",
     "CC(=O)[CH:1](C(C)=O)C(C)=O",
     ENL_SOLVENT_DMSO,
     {"parent: acetone", "second acyl group (acetyl)", "third acyl group (acetyl)"}},
    {"beta-keto ester: the ketone stays",
     "CC(=O)[CH2:1]C(=O)OCC",
     ENL_SOLVENT_DMSO,
     {"parent: acetone", "second acyl group (ester)"}},
    {"deoxybenzoin",
     "O=C(c1ccccc1)[CH2:1]c1ccccc1",
     ENL_SOLVENT_DMSO,
     {"parent: acetone", "phenyl instead of methyl on the C=O", "phenyl on the carbon"}},
    {"ring substituent with its number",
     "CC(=O)[CH2:1]c1ccc([N+](=O)[O-])cc1",
     ENL_SOLVENT_DMSO,
     {"parent: acetone", "phenyl on the carbon", "4-nitro on the phenyl group"}},
    {"picric acid: lowest numbers",
     "[OH:1]c1c([N+](=O)[O-])cc([N+](=O)[O-])cc1[N+](=O)[O-]",
     ENL_SOLVENT_DMSO,
     {"parent: phenol", "2,4,6-trinitro on the benzene ring"}},
    {"cyclic ketone against its open form",
     "O=C1[CH2:1]CCC1",
     ENL_SOLVENT_DMSO,
     {"parent: acetone", "methyl on the carbon", "five-membered ring"}},
    {"Meldrum's acid",
     "CC1(C)OC(=O)[CH2:1]C(=O)O1",
     ENL_SOLVENT_DMSO,
     {"parent: methyl acetate", "second acyl group (ester)", "ring of two esters (both E)"}},
    {"lactone",
     "O=C1[CH2:1]CCO1",
     ENL_SOLVENT_DMSO,
     {"parent: methyl acetate", "methyl on the carbon", "lactone ring (E ester)"}},
    {"camphor",
     "CC1(C)C2CCC1(C)C(=O)[CH2:1]2",
     ENL_SOLVENT_DMSO,
     {"parent: acetone", "isopropyl on the carbon", "bridged ring system"}},
    {"fluorene",
     "[CH2:1]1c2ccccc2-c2ccccc21",
     ENL_SOLVENT_DMSO,
     {"parent: cyclopentadiene", "two fused benzene rings"}},
    {"indole", "c1ccc2[nH:1]ccc2c1", ENL_SOLVENT_DMSO, {"parent: pyrrole", "fused benzene ring"}},
    {"malononitrile",
     "[CH2:1](C#N)C#N",
     ENL_SOLVENT_DMSO,
     {"parent: acetonitrile", "second cyano on the carbon"}},
    {"vinylogous", "CC(=O)C=C[CH3:1]", ENL_SOLVENT_DMSO, {"parent: propene", "acetyl on the C=C"}},
    {"onium",
     "O=C([CH2:1][P+](c1ccccc1)(c1ccccc1)c1ccccc1)c1ccccc1",
     ENL_SOLVENT_DMSO,
     {"parent: acetone", "phenyl instead", "triphenylphosphonium on the carbon"}},
    {"alkyl chains are one line",
     "CCCCCC[CH2:1]C(=O)N(CC)CC",
     ENL_SOLVENT_DMSO,
     {"parent: N,N-dimethylacetamide", "larger alkyl groups"}},
    {"phthalimide",
     "O=C1[NH:1]C(=O)c2ccccc12",
     ENL_SOLVENT_DMSO,
     {"parent: acetamide, N-H", "second acyl group (benzoyl)", "imide ring"}},
    {"second deprotonation", "[CH3:1]C(=O)O", ENL_SOLVENT_DMSO, {"acetic acid, C-H", "the anion"}},
    {"THF shows what was measured in DMSO",
     "CC(=O)[CH2:1]C(C)=O",
     ENL_SOLVENT_THF,
     {"parent: acetone", "second acyl", "measured in DMSO"}},
    {"salt: its own fragment only",
     "CC(=O)[CH2:1]C(C)=O.[Na+].[Cl-]",
     ENL_SOLVENT_DMSO,
     {"parent: acetone", "second acyl"}},
};

START_TEST (words_of_lines)
{
  const WordCase *c = &word_case[_i];
  g_autoptr (EnlMolecule) mol = read_smiles (c->smiles);
  Result r = analyse (mol, c->solvent);
  const EnlSite *site = enl_sites_of_atom (r.sites, mapped_atom (mol));
  uint32_t at = 0;

  ck_assert_msg (site, "%s", c->label);
  uint32_t index = (uint32_t)(site - r.sites->site);
  g_autoptr (EnlWhy) why = enl_why_new (estimator, mol, r.sites, r.estimate, index);
  check_why (why, &r.estimate[index], c->label);
  for (size_t k = 0; k < ENL_COUNT (c->line) && c->line[k]; k++) {
    while (at < why->n_lines && !strstr (why->line[at].words, c->line[k]))
      at++;
    ck_assert_msg (at < why->n_lines, "%s: no line '%s' in its place", c->label, c->line[k]);
  }
  clear (&r);
}
END_TEST

/* Differences of published values in DMSO (rows of acids.tsv: acetone 26.5, acetylacetone 13.3,
 * acetophenone 24.7, deoxybenzoin 17.7). */
START_TEST (effects_are_those_of_the_table)
{
  static const struct {
    const char *smiles, *line;
    double effect;
  } effect_case[] = {
      {"CC(=O)[CH2:1]C(C)=O", "second acyl group (acetyl)", 13.3 - 26.5},
      {"[CH3:1]C(=O)c1ccccc1", "phenyl instead of methyl on the C=O", 24.7 - 26.5},
      {"O=C(c1ccccc1)[CH2:1]c1ccccc1", "phenyl on the carbon", 17.7 - 24.7},
  };

  for (size_t k = 0; k < ENL_COUNT (effect_case); k++) {
    g_autoptr (EnlMolecule) mol = read_smiles (effect_case[k].smiles);
    Result r = analyse (mol, ENL_SOLVENT_DMSO);
    const EnlSite *site = enl_sites_of_atom (r.sites, mapped_atom (mol));
    g_autoptr (EnlWhy) why =
        enl_why_new (estimator, mol, r.sites, r.estimate, (uint32_t)(site - r.sites->site));
    double found = NAN;
    for (uint32_t i = 0; i < why->n_lines; i++)
      if (strcmp (why->line[i].words, effect_case[k].line) == 0)
        found = why->line[i].value;
    /* The model follows the table within a few tenths there. */
    ck_assert_msg (fabs (found - effect_case[k].effect) < 0.6, "%s: %g", effect_case[k].line,
                   found);
    clear (&r);
  }
}
END_TEST

START_TEST (widths_have_a_reason)
{
  static const struct {
    const char *smiles;
    EnlSolvent solvent;
    const char *words;
  } width_case[] = {
      {"CC(=O)[CH2:1]C(C)=O", ENL_SOLVENT_DMSO, "the uncertainty of the published value"},
      {"CC(=O)[CH2:1]C(C)=O", ENL_SOLVENT_THF, "the uncertainty of the value in DMSO; widened"},
      {"O=C1[CH2:1]c2ccccc2C1", ENL_SOLVENT_DMSO, "nine in ten alpha C-H acids in DMSO"},
      {"O=C1[CH2:1]c2ccccc2C1", ENL_SOLVENT_WATER, "% alike"},
      {"CC(=O)C=C[CH3:1]", ENL_SOLVENT_DMSO, "nothing like it was measured"},
      {"[CH3:1]C(=O)O", ENL_SOLVENT_DMSO, "widened: second deprotonation"},
  };

  for (size_t k = 0; k < ENL_COUNT (width_case); k++) {
    g_autoptr (EnlMolecule) mol = read_smiles (width_case[k].smiles);
    Result r = analyse (mol, width_case[k].solvent);
    const EnlSite *site = enl_sites_of_atom (r.sites, mapped_atom (mol));
    g_autoptr (EnlWhy) why =
        enl_why_new (estimator, mol, r.sites, r.estimate, (uint32_t)(site - r.sites->site));
    ck_assert_msg (strstr (why->width, width_case[k].words), "%s: %s", width_case[k].smiles,
                   why->width);
    clear (&r);
  }
}
END_TEST

/* ---- laws ---- */

START_TEST (lines_add_up_on_every_published_acid)
{
  for (uint32_t i = 0; i < enl_reference_rows (acids); i++) {
    const EnlReferenceRow *row = enl_reference_row (acids, i);
    check_sites (row->mol, row->solvent, row->smiles);
  }
}
END_TEST

static void
check_links (const EnlMolecule *mol, uint32_t site, const char *label)
{
  g_autoptr (EnlWhyChain) chain = enl_why_chain_new (mol, site);
  uint32_t before = UINT32_MAX;

  ck_assert_uint_ge (chain->n, 1);
  for (uint32_t k = 0; k < chain->n; k++) {
    const EnlWhyLink *link = &chain->link[k];
    EnlError err = {0};
    uint32_t n = enl_molecule_atoms (link->mol), heavy = enl_molecule_heavy_atoms (link->mol);
    g_autofree uint32_t *fragment = g_new (uint32_t, n);
    g_autofree char *smiles = enl_smiles_write (link->mol, ENL_SMILES_DEFAULT, NULL);

    ck_assert_msg (enl_valence_check (link->mol, NULL, &err) == ENL_OK, "%s: %s: %s", label, smiles,
                   err.text);
    ck_assert_msg (enl_molecule_fragments (link->mol, fragment) == 1, "%s: %s", label, smiles);
    ck_assert_msg (enl_molecule_total_hydrogens (link->mol, link->site) >= 1, "%s: %s", label,
                   smiles);
    ck_assert_int_eq (enl_molecule_atom (link->mol, link->site)->element,
                      enl_molecule_atom (mol, site)->element);
    ck_assert_int_eq (enl_molecule_atom (link->mol, link->site)->charge,
                      enl_molecule_atom (mol, site)->charge);
    /* A stump of methyl can make up for one atom that went, two for a ring bond. */
    ck_assert_msg (before == UINT32_MAX || heavy <= before + 2, "%s: %s", label, smiles);
    ck_assert_msg ((k == 0) == !link->words, "%s: %s", label, smiles);
    before = heavy;
  }
}

START_TEST (links_are_molecules)
{
  for (uint32_t i = 0; i < enl_reference_rows (acids); i++) {
    const EnlReferenceRow *row = enl_reference_row (acids, i);
    g_autofree uint32_t *fragment = g_new (uint32_t, enl_molecule_atoms (row->mol));
    if (enl_molecule_fragments (row->mol, fragment) == 1)
      check_links (row->mol, row->site, row->smiles);
  }
}
END_TEST

/* The lines of the site that holds `atom`, as one text. */
static char *
lines_of (const EnlMolecule *mol, uint32_t atom)
{
  Result r = analyse (mol, ENL_SOLVENT_DMSO);
  const EnlSite *site = enl_sites_of_atom (r.sites, atom);
  GString *out = g_string_new (NULL);

  if (site) {
    g_autoptr (EnlWhy) why =
        enl_why_new (estimator, mol, r.sites, r.estimate, (uint32_t)(site - r.sites->site));
    for (uint32_t i = 0; i < why->n_lines; i++)
      g_string_append_printf (out, "%s %.4f\n", why->line[i].words, why->line[i].value + 1e-7);
  }
  clear (&r);
  return g_string_free (out, FALSE);
}

START_TEST (order_of_atoms_does_not_matter)
{
  g_autoptr (GRand) rand = g_rand_new_with_seed (20);

  /* Every seventh row, so that the whole table is sampled in little time. */
  for (uint32_t i = 0; i < enl_reference_rows (acids); i += 7) {
    const EnlReferenceRow *row = enl_reference_row (acids, i);
    g_autofree uint32_t *place = g_new (uint32_t, enl_molecule_atoms (row->mol));
    shuffle (place, enl_molecule_atoms (row->mol), rand);
    g_autoptr (EnlMolecule) other = renumber (row->mol, place);
    g_autofree char *a = lines_of (row->mol, row->site), *b = lines_of (other, place[row->site]);
    ck_assert_msg (strcmp (a, b) == 0, "%s:\n%s%s", row->smiles, a, b);
  }
}
END_TEST

/* A tree of random atoms with a few rings closed; multiple bonds where there is room. */
static EnlMolecule *
random_molecule (GRand *rand)
{
  static const uint8_t element[] = {6, 6, 6, 6, 6, 6, 7, 8, 8, 16, 9, 17, 15, 14};
  static const int valence[] = {4, 4, 4, 4, 4, 4, 3, 2, 2, 2, 1, 1, 3, 4};
  uint32_t n = (uint32_t)g_rand_int_range (rand, 2, 40);
  EnlMolecule *mol = enl_molecule_new ();
  g_autofree int *room = g_new (int, n);

  for (uint32_t i = 0; i < n; i++) {
    int kind = g_rand_int_range (rand, 0, ENL_COUNT (element));
    room[i] = valence[kind];
    enl_molecule_add_atom (mol, &(EnlAtom){.element = element[kind], .input = i + 1});
    for (int tries = 0; i > 0 && tries < 20; tries++) {
      uint32_t other = (uint32_t)g_rand_int_range (rand, 0, (gint32)i);
      int most = MIN (MIN (room[i], room[other]), 3);
      int order = most < 1 ? 0 : 1 + (most > 1 && g_rand_int_range (rand, 0, 3) == 0);
      if (!order)
        continue;
      enl_molecule_add_bond (mol, i, other, (uint8_t)order);
      room[i] -= order, room[other] -= order;
      break;
    }
  }
  for (int tries = g_rand_int_range (rand, 0, 8); tries > 0; tries--) {
    uint32_t a = (uint32_t)g_rand_int_range (rand, 0, (gint32)n);
    uint32_t b = (uint32_t)g_rand_int_range (rand, 0, (gint32)n);
    if (room[a] && room[b] && enl_molecule_add_bond (mol, a, b, 1) != ENL_NONE)
      room[a]--, room[b]--;
  }
  for (uint32_t i = 0; i < n; i++)
    enl_molecule_edit_atom (mol, i)->hydrogens = (uint8_t)MAX (room[i], 0);
  enl_molecule_finish (mol);
  return mol;
}

START_TEST (random_molecules)
{
  g_autoptr (GRand) rand = g_rand_new_with_seed (1234);

  for (int i = 0; i < 150; i++) {
    g_autoptr (EnlMolecule) mol = random_molecule (rand);
    g_autofree char *smiles = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
    check_sites (mol, i % 2 ? ENL_SOLVENT_WATER : ENL_SOLVENT_THF, smiles);
  }
}
END_TEST

static const char *const odd_case[] = {
    "[2H]C([2H])([2H])C(C)=O",
    "[13CH3]C(C)=O",
    "[Na+].CC(=O)[CH-]C(C)=O",
    "CC(=O)CC(C)=O.OC(=O)c1ccccc1.[Cl-].C[NH3+]",
    "C12C3C4C1C5C2C3C45C(=O)C",
    "O",
    "[NH4+]",
    "[OH3+]",
    "C#N",
    "CC=C=O",
    "CC(=O)[Fe]",
    "CC(=O)C([Cu])C",
    "[CH3]",
    "C[CH]C(C)=O",
    "C*C(=O)C",
    "OB(O)c1ccccc1",
    "CC(=O)OC(C)=O",
    "C[N+](C)(C)CC(=O)[O-]",
    "c1ccc2c(c1)ccc1c2ccc2ccccc21",
    "Cc1ccc2c(c1)C(=O)c1ccccc1C2",
    "C1CC1C(=O)C",
    "O=C1CC1",
    "O=C1C=CC(=O)C=C1",
    "C1COCCOCCOCCOCCO1",
    "CC(=O)C=CC=CC=CC=CC=CC",
};

START_TEST (odd_molecules)
{
  g_autoptr (EnlMolecule) mol = read_smiles (odd_case[_i]);

  for (int solvent = 0; solvent < ENL_N_SOLVENTS; solvent++)
    check_sites (mol, (EnlSolvent)solvent, odd_case[_i]);
}
END_TEST

/* 400 heavy atoms: a chain of keto groups, and a polymer of fused rings. */
START_TEST (large_molecules)
{
  GString *chain = g_string_new ("CC"), *rings = g_string_new ("CC(=O)C1CCCCC1");

  for (int i = 0; i < 99; i++)
    g_string_append (chain, "CCC(=O)");
  for (int i = 0; i < 48; i++)
    g_string_append (rings, "C2CCC(=O)CCC2");
  const char *text[] = {chain->str, rings->str};
  for (int k = 0; k < 2; k++) {
    g_autoptr (EnlMolecule) mol = read_smiles (text[k]);
    ck_assert_uint_le (enl_molecule_heavy_atoms (mol), ENL_MAX_HEAVY);
    Result r = analyse (mol, ENL_SOLVENT_DMSO);
    g_autoptr (EnlWhy) why = enl_why_new (estimator, mol, r.sites, r.estimate, 0);
    check_why (why, &r.estimate[0], "large molecule");
    clear (&r);
  }
  g_string_free (chain, TRUE);
  g_string_free (rings, TRUE);
}
END_TEST

/* ---- rounding and tables ---- */

START_TEST (rounding_shares_the_remainder)
{
  EnlWhy why = {.line = {{NULL, 1.04}, {NULL, 2.04}, {NULL, 3.04}, {NULL, -0.04}}, .n_lines = 4};
  double out[ENL_WHY_LINES];

  why.value = 1.04 + 2.04 + 3.04 - 0.04;
  check_rounding (&why, 1, "remainders");
  enl_why_round (&why, 1, out);
  ck_assert_double_eq_tol (out[0] + out[1] + out[2] + out[3], 6.1, EXACT);
}
END_TEST

START_TEST (tables_with_faults)
{
  static const struct {
    const char *label, *text;
  } fault[] = {
      {"no site", "kind\tsmiles\twords\tprefix\tsource\nparent\tCC(=O)C\tacetone\t\tx\n"},
      {"twice", "kind\tsmiles\twords\tprefix\tsource\ngroup\t*C\tmethyl\tmethyl\tx\n"
                "group\tC*\tmethyl\tmethyl\tx\n"},
      {"SMILES", "kind\tsmiles\twords\tprefix\tsource\ngroup\t*C(\tmethyl\tmethyl\tx\n"},
      {"kind", "kind\tsmiles\twords\tprefix\tsource\nthing\t*C\tmethyl\tmethyl\tx\n"},
      {"column", "kind\tsmiles\twords\tsource\n"},
  };

  for (size_t k = 0; k < ENL_COUNT (fault); k++) {
    EnlWhyWords *words = NULL;
    EnlError err = {0};
    EnlStatus status = enl_why_words_parse (fault[k].text, strlen (fault[k].text), &words, &err);
    ck_assert_msg (status == ENL_ERROR_FORMAT, "%s", fault[k].label);
    ck_assert_ptr_null (words);
    ck_assert_msg (err.text[0], "%s", fault[k].label);
  }
}
END_TEST

/* A parent explains itself in one line (and one for the published value). */
START_TEST (parents_stand_alone)
{
  const EnlWhyWords *words = enl_why_words ();
  static const char *const parent[] = {"[CH3:1]C(C)=O", "[CH3:1][N+](=O)[O-]", "c1ccccc1[OH:1]",
                                       "c1cc[nH+:1]cc1"};

  for (size_t k = 0; k < ENL_COUNT (parent); k++) {
    g_autoptr (EnlMolecule) mol = read_smiles (parent[k]);
    g_autoptr (EnlWhyChain) chain = enl_why_chain_new (mol, mapped_atom (mol));
    ck_assert_msg (enl_why_words_parent (words, mol, mapped_atom (mol)), "%s", parent[k]);
    ck_assert_msg (chain->n == 1, "%s", parent[k]);
  }
}
END_TEST

static Suite *
why_suite (void)
{
  Suite *suite = suite_create ("acidity why");
  TCase *tc = tcase_create ("why");

  tcase_add_checked_fixture (tc, setup, teardown);
  tcase_set_timeout (tc, 120);
  tcase_add_loop_test (tc, words_of_lines, 0, ENL_COUNT (word_case));
  tcase_add_test (tc, effects_are_those_of_the_table);
  tcase_add_test (tc, widths_have_a_reason);
  tcase_add_test (tc, lines_add_up_on_every_published_acid);
  tcase_add_test (tc, links_are_molecules);
  tcase_add_test (tc, order_of_atoms_does_not_matter);
  tcase_add_test (tc, random_molecules);
  tcase_add_loop_test (tc, odd_molecules, 0, ENL_COUNT (odd_case));
  tcase_add_test (tc, large_molecules);
  tcase_add_test (tc, rounding_shares_the_remainder);
  tcase_add_test (tc, tables_with_faults);
  tcase_add_test (tc, parents_stand_alone);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (why_suite)
