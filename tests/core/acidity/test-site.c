/* Sites of single structures, their words and flags, and laws that hold for all. */
#include "core/acidity/site.h"

#include <string.h>

#include "core/base/table.h"
#include "core/notation/smiles.h"
#include "resources/embedded.h"
#include "tests/core/acidity/site-cases.h"
#include "tests/runner.h"

static EnlMolecule *
read_smiles (const char *label, const char *smiles)
{
  EnlMolecule *mol = NULL;
  EnlError err;

  if (enl_smiles_parse (smiles, strlen (smiles), &mol, &err) != ENL_OK)
    ck_abort_msg ("%s: '%s': %s", label, smiles, err.text);
  return mol;
}

static void
append_flags (GString *text, const EnlSite *site)
{
  if (!(site->alpha_carbonyl || site->acidic_heteroatom || site->diastereotopic || site->second))
    return;
  g_string_append_printf (text, " %s%s%s%s", site->alpha_carbonyl ? "a" : "",
                          site->acidic_heteroatom ? "h" : "", site->diastereotopic ? "d" : "",
                          site->second ? "2" : "");
}

/* The form in which site-cases.h writes sites. */
static char *
sites_text (const EnlMolecule *mol, const EnlSites *sites)
{
  GString *text = g_string_new (NULL);

  for (uint32_t i = 0; i < sites->n_sites; i++) {
    const EnlSite *site = &sites->site[i];

    g_string_append (text, i > 0 ? "|" : "");
    for (uint32_t k = 0; k < site->n_atoms; k++)
      g_string_append_printf (text, "%s%u", k > 0 ? "," : "",
                              enl_molecule_atom (mol, site->atom[k])->input);
    g_string_append_printf (text, " %uH", site->hydrogens);
    append_flags (text, site);
    g_string_append_printf (text, ": %s", site->position);
  }
  return g_string_free (text, FALSE);
}

START_TEST (sites_of_one_structure)
{
  const EnlSiteCase *row = &site_case[_i];
  g_autoptr (EnlMolecule) mol = read_smiles (row->label, row->smiles);
  g_autoptr (EnlSites) sites = NULL;
  g_autofree char *text = NULL;
  bool carbon = false;

  ck_assert_int_eq (enl_sites_find (mol, &sites, NULL), ENL_OK);
  text = sites_text (mol, sites);
  ck_assert_msg (strcmp (text, row->sites) == 0, "%s: expected '%s', found '%s'", row->label,
                 row->sites, text);
  ck_assert_msg (g_strcmp0 (sites->no_enol, row->reason) == 0, "%s: expected '%s', found '%s'",
                 row->label, row->reason, sites->no_enol);
  for (uint32_t i = 0; i < sites->n_sites; i++)
    carbon |= sites->site[i].element == 6;
  ck_assert_msg (sites->has_carbon_acid == carbon, "%s: has_carbon_acid", row->label);
}
END_TEST

/* ---- laws ---- */

static int
compare_text (gconstpointer a, gconstpointer b)
{
  return strcmp (*(const char *const *)a, *(const char *const *)b);
}

/* Sites without atom numbers, sorted: what must not change when atoms are renumbered. */
static char *
unordered_text (const EnlMolecule *mol)
{
  g_autoptr (EnlSites) sites = NULL;
  g_autoptr (GPtrArray) line = g_ptr_array_new_with_free_func (g_free);
  GString *text = g_string_new (NULL);

  ck_assert_int_eq (enl_sites_find (mol, &sites, NULL), ENL_OK);
  for (uint32_t i = 0; i < sites->n_sites; i++) {
    const EnlSite *site = &sites->site[i];
    const char *number = strstr (site->position, ", atom ");
    GString *one = g_string_new (NULL);

    g_string_printf (one, "%u atoms %uH kind %d", site->n_atoms, site->hydrogens, site->kind);
    append_flags (one, site);
    g_string_append_printf (
        one, ": %.*s",
        (int)(number != NULL ? number - site->position : (ptrdiff_t)strlen (site->position)),
        site->position);
    g_ptr_array_add (line, g_string_free (one, FALSE));
  }
  g_ptr_array_sort (line, compare_text);
  for (guint i = 0; i < line->len; i++)
    g_string_append_printf (text, "%s|", (const char *)line->pdata[i]);
  g_string_append (text, sites->no_enol != NULL ? sites->no_enol : "");
  return g_string_free (text, FALSE);
}

static void
check_rewritten (const char *label, const EnlMolecule *mol, EnlSmilesFlags flags)
{
  g_autofree char *smiles = enl_smiles_write (mol, flags, NULL);
  g_autoptr (EnlMolecule) again = read_smiles (label, smiles);
  g_autofree char *before = unordered_text (mol), *after = unordered_text (again);

  ck_assert_msg (strcmp (before, after) == 0, "%s as '%s': '%s' became '%s'", label, smiles, before,
                 after);
}

START_TEST (numbering_and_drawing_do_not_matter)
{
  size_t size = 0;
  const char *text = enl_resource ("acids.tsv", &size);
  g_autoptr (EnlTable) table = NULL;

  ck_assert_int_eq (enl_table_parse (text, size, &table, NULL), ENL_OK);
  for (size_t row = 0; row < enl_table_rows (table); row++) {
    const char *smiles = enl_table_cell (table, row, enl_table_column (table, "smiles"));
    g_autoptr (EnlMolecule) mol = read_smiles (smiles, smiles);

    check_rewritten (smiles, mol, ENL_SMILES_DEFAULT);
    check_rewritten (smiles, mol, ENL_SMILES_KEKULE);
  }
  for (size_t i = 0; i < ENL_COUNT (site_case); i++) {
    g_autoptr (EnlMolecule) mol = read_smiles (site_case[i].label, site_case[i].smiles);

    check_rewritten (site_case[i].label, mol, ENL_SMILES_DEFAULT);
    check_rewritten (site_case[i].label, mol, ENL_SMILES_KEKULE);
  }
}
END_TEST

static void
check_positions (const char *smiles)
{
  g_autoptr (EnlMolecule) mol = read_smiles (smiles, smiles);
  g_autoptr (EnlSites) sites = NULL;

  ck_assert_int_eq (enl_sites_find (mol, &sites, NULL), ENL_OK);
  for (uint32_t i = 0; i < sites->n_sites; i++) {
    ck_assert_msg (strlen (sites->site[i].position) <= 60, "'%s' is long (%s)",
                   sites->site[i].position, smiles);
    for (uint32_t j = 0; j < i; j++)
      ck_assert_msg (strcmp (sites->site[i].position, sites->site[j].position) != 0,
                     "'%s' twice in %s", sites->site[i].position, smiles);
  }
}

START_TEST (positions_are_short_and_distinct)
{
  size_t size = 0;
  const char *text = enl_resource ("acids.tsv", &size);
  g_autoptr (EnlTable) table = NULL;

  ck_assert_int_eq (enl_table_parse (text, size, &table, NULL), ENL_OK);
  for (size_t row = 0; row < enl_table_rows (table); row++)
    check_positions (enl_table_cell (table, row, enl_table_column (table, "smiles")));
  for (size_t i = 0; i < ENL_COUNT (site_case); i++)
    check_positions (site_case[i].smiles);
  check_positions ("CC(=O)C1CC(C(C)=O)C(C#N)(CC(=O)CC)CC1CC(=O)CCC(=O)Cc1ccccc1");
}
END_TEST

START_TEST (a_site_is_found_by_any_of_its_atoms)
{
  g_autoptr (EnlMolecule) mol = read_smiles ("acetylacetone", "CC(=O)CC(C)=O");
  g_autoptr (EnlSites) sites = NULL;

  ck_assert_int_eq (enl_sites_find (mol, &sites, NULL), ENL_OK);
  ck_assert_ptr_eq (enl_sites_of_atom (sites, 0), &sites->site[0]);
  ck_assert_ptr_eq (enl_sites_of_atom (sites, 5), &sites->site[0]);
  ck_assert_ptr_eq (enl_sites_of_atom (sites, 3), &sites->site[1]);
  ck_assert_ptr_null (enl_sites_of_atom (sites, 1));
  ck_assert_ptr_null (enl_sites_of_atom (sites, 99));
}
END_TEST

START_TEST (size_limit)
{
  g_autoptr (GString) smiles = g_string_new ("CC(=O)");
  g_autoptr (EnlMolecule) largest = NULL, larger = NULL;
  EnlSites *sites = NULL;
  EnlError err;

  while (smiles->len < 6 + ENL_MAX_HEAVY - 3)
    g_string_append_c (smiles, 'C');
  largest = read_smiles ("largest", smiles->str);
  ck_assert_uint_eq (enl_molecule_heavy_atoms (largest), ENL_MAX_HEAVY);
  ck_assert_int_eq (enl_sites_find (largest, &sites, &err), ENL_OK);
  ck_assert_uint_eq (sites->n_sites, 2);
  enl_sites_free (sites);
  g_string_append_c (smiles, 'C');
  larger = read_smiles ("larger", smiles->str);
  ck_assert_int_eq (enl_sites_find (larger, &sites, &err), ENL_ERROR_LIMIT);
  ck_assert_ptr_null (sites);
  ck_assert (err.text[0] != '\0' && err.advice[0] != '\0');
}
END_TEST

START_TEST (nothing_and_null)
{
  g_autoptr (EnlMolecule) empty = enl_molecule_new ();
  EnlSites *sites = NULL;

  enl_molecule_finish (empty);
  ck_assert_int_eq (enl_sites_find (empty, &sites, NULL), ENL_OK);
  ck_assert_uint_eq (sites->n_sites, 0);
  ck_assert (!sites->has_carbon_acid);
  enl_sites_free (sites);
  enl_sites_free (NULL);
}
END_TEST

static Suite *
site_suite (void)
{
  Suite *suite = suite_create ("acidity site");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, sites_of_one_structure, 0, (int)ENL_COUNT (site_case));
  tcase_add_test (tc, numbering_and_drawing_do_not_matter);
  tcase_add_test (tc, positions_are_short_and_distinct);
  tcase_add_test (tc, a_site_is_found_by_any_of_its_atoms);
  tcase_add_test (tc, size_limit);
  tcase_add_test (tc, nothing_and_null);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (site_suite)
