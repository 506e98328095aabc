/* The site finder against the published acids (resources/acids.tsv): every measured hydrogen is a
 * site, and the claimed order of tiers contradicts no published value. */
#include "core/acidity/site-private.h"

#include <math.h>
#include <string.h>

#include "core/base/table.h"
#include "core/notation/smiles.h"
#include "resources/embedded.h"
#include "tests/runner.h"

static EnlTable *
open_acids (void)
{
  size_t size = 0;
  const char *text = enl_resource ("acids.tsv", &size);
  EnlTable *table = NULL;
  EnlError err;

  ck_assert_int_eq (enl_table_parse (text, size, &table, &err), ENL_OK);
  return table;
}

static EnlMolecule *
read_row (const EnlTable *table, size_t row, uint32_t *marked)
{
  const char *smiles = enl_table_cell (table, row, enl_table_column (table, "smiles"));
  EnlMolecule *mol = NULL;
  EnlError err;

  if (enl_smiles_parse (smiles, strlen (smiles), &mol, &err) != ENL_OK)
    ck_abort_msg ("line %zu: '%s': %s", enl_table_line (table, row), smiles, err.text);
  for (*marked = 0; *marked < enl_molecule_atoms (mol); (*marked)++)
    if (enl_molecule_atom (mol, *marked)->map == 1)
      return mol;
  ck_abort_msg ("line %zu: no atom is marked", enl_table_line (table, row));
  return NULL;
}

START_TEST (every_measured_hydrogen_is_a_site)
{
  g_autoptr (EnlTable) table = open_acids ();
  size_t missing = 0;

  for (size_t row = 0; row < enl_table_rows (table); row++) {
    uint32_t marked;
    g_autoptr (EnlMolecule) mol = read_row (table, row, &marked);
    g_autoptr (EnlSites) sites = NULL;
    const EnlSite *site;

    ck_assert_int_eq (enl_sites_find (mol, &sites, NULL), ENL_OK);
    site = enl_sites_of_atom (sites, marked);
    if (site == NULL) {
      g_printerr ("no site: %s\n", enl_table_cell (table, row, 0));
      missing++;
    }
  }
  ck_assert_uint_gt (enl_table_rows (table), 700);
  ck_assert_uint_eq (missing, 0);
}
END_TEST

/* ---- tiers ---- */

typedef struct {
  double low, high;
  size_t low_row, high_row, n;
} Range;

static EnlTier
tier_of (const EnlMolecule *mol, uint32_t atom)
{
  EnlCarbonFacts carbon;
  EnlHeteroFacts hetero;

  if (enl_molecule_atom (mol, atom)->element == 6)
    return enl_site_carbon_facts (mol, atom, &carbon) ? enl_site_carbon_tier (mol, atom, &carbon)
                                                      : ENL_TIER_OTHER;
  return enl_site_hetero_facts (mol, atom, &hetero) ? hetero.tier : ENL_TIER_OTHER;
}

/* The order is one of neutral and singly charged first acids: a carbanion beside a carboxylate or
 * another negative charge is measured as a later step. */
static bool
is_first_step (const EnlMolecule *mol)
{
  return enl_molecule_charge (mol) >= 0;
}

static void
collect_ranges (const EnlTable *table, const char *solvent, Range range[ENL_N_TIERS])
{
  const int pka = enl_table_column (table, "pka"), in = enl_table_column (table, "solvent");

  for (int t = 0; t < ENL_N_TIERS; t++)
    range[t] = (Range){INFINITY, -INFINITY, 0, 0, 0};
  for (size_t row = 0; row < enl_table_rows (table); row++) {
    uint32_t marked;
    g_autoptr (EnlMolecule) mol = read_row (table, row, &marked);
    const double value = enl_table_number (table, row, pka);
    Range *r = &range[tier_of (mol, marked)];

    if (strcmp (enl_table_cell (table, row, in), solvent) != 0 || !is_first_step (mol))
      continue;
    r->n++;
    if (value < r->low) {
      r->low = value;
      r->low_row = row;
    }
    if (value > r->high) {
      r->high = value;
      r->high_row = row;
    }
  }
}

static void
check_order (const char *solvent)
{
  g_autoptr (EnlTable) table = open_acids ();
  Range range[ENL_N_TIERS];
  size_t pairs = 0;

  collect_ranges (table, solvent, range);
  for (int a = 0; a < ENL_N_TIERS; a++)
    for (int b = 0; b < ENL_N_TIERS; b++) {
      if (!enl_tier_precedes ((EnlTier)a, (EnlTier)b) || range[a].n == 0 || range[b].n == 0)
        continue;
      pairs++;
      ck_assert_msg (range[a].high < range[b].low,
                     "%s: tier %d reaches %.2f (%s), tier %d %.2f (%s)", solvent, a, range[a].high,
                     enl_table_cell (table, range[a].high_row, 0), b, range[b].low,
                     enl_table_cell (table, range[b].low_row, 0));
    }
  ck_assert_uint_ge (pairs, 12);
}

START_TEST (tiers_do_not_overlap_in_dmso)
{
  check_order ("dmso");
}
END_TEST

START_TEST (tiers_do_not_overlap_in_water)
{
  check_order ("water");
}
END_TEST

static Suite *
site_table_suite (void)
{
  Suite *suite = suite_create ("acidity site table");
  TCase *tc = tcase_create ("all");

  tcase_add_test (tc, every_measured_hydrogen_is_a_site);
  tcase_add_test (tc, tiers_do_not_overlap_in_dmso);
  tcase_add_test (tc, tiers_do_not_overlap_in_water);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (site_table_suite)
