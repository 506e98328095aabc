/* The report as pages and as HTML, and the printed list: nothing overlaps, nothing is cut, nothing
 * is left out. */
#include "draw/report-pages.h"

#include <pango/pango.h>

#include "draw/paint.h"
#include "draw/report-html.h"
#include "draw/weigh-sheet.h"
#include "tests/core/bases/ask.h"

/* A4 (ISO 216) at 96 dpi, px. */
#define A4_WIDTH  793.70
#define A4_HEIGHT 1122.52

static const struct {
  const char *label, *conditions, *substrates;
  uint32_t most_pages;
  const char *holds[5]; /* words that must stand on some page, in this order of typing */
} set_case[] = {
    {"one measured compound",
     "\"solvent\":\"dmso\"",
     "{\"name\":\"larch\",\"structure\":\"ethyl acetoacetate\",\"note\":\"batch 7\"}",
     2,
     {"pKa 14.2 in DMSO, measured [1]", "ethyl acetoacetate, pKa 14.2 in DMSO", "batch 7", "130.14",
      "qualified person"}},
    {"four of all sorts in THF",
     "\"solvent\":\"thf\",\"temperature\":-78",
     "{\"name\":\"A name that a careful person typed with all of its batch numbers & dates <7>\","
     "\"structure\":\"CC(=O)[C@@H]1CC[C@H]2[C@@H]3CCC4=CC(=O)CC[C@]4(C)[C@H]3CC[C@]12C\"},"
     "{\"name\":\"Onelongwordwithoutanyspacesthatmustbebrokensomewhereortheotherinthecard\","
     "\"structure\":\"CCOC(=O)CC(=O)Cc1ccc(O)cc1\"},"
     "{\"name\":\"no hydrogen\",\"structure\":\"benzophenone\"},"
     "{\"name\":\"broken\",\"structure\":\"CC(=O)C1CC\"}",
     2,
     {"estimated", "No enolate: ", "Cannot be read: ", "DMSO-based footing", "90\u00A0% interval"}},
    {"six take more pages",
     "\"solvent\":\"water\"",
     "{\"name\":\"a\",\"structure\":\"acetone\"},{\"name\":\"b\",\"structure\":\"acetophenone\"},"
     "{\"name\":\"c\",\"structure\":\"diethyl "
     "malonate\"},{\"name\":\"d\",\"structure\":\"camphor\"},"
     "{\"name\":\"e\",\"structure\":\"2-indanone\"},{\"name\":\"f\",\"structure\":"
     "\"nitromethane\"}",
     5,
     {"6 f", "page 1 of", "Sources", "Cautions", "in water, measured"}},
};

static EnlReport *
report_of (int row)
{
  g_autofree char *text = g_strdup_printf (
      "{\"format\":\"enolith-set\",\"version\":1,\"conditions\":{%s},\"substrates\":[%s]}",
      set_case[row].conditions, set_case[row].substrates);
  g_autoptr (EnlWorkset) set = NULL;
  EnlReport *report = NULL;
  EnlError err = {0};

  if (enl_workset_parse (text, strlen (text), &set, &err) != ENL_OK ||
      enl_report_of_set (knowledge, set, set_case[row].label, &report, &err) != ENL_OK)
    ck_abort_msg ("%s: %s", set_case[row].label, err.text);
  return report;
}

/* Every text of the pages, the breaks of lines taken out. */
static char *
all_text (GPtrArray *pages)
{
  GString *out = g_string_new (NULL);

  for (guint i = 0; i < pages->len; i++) {
    const EnlScene *page = g_ptr_array_index (pages, i);
    for (uint32_t k = 0; k < enl_scene_shapes (page); k++) {
      const char *markup = enl_scene_shape (page, k)->text;
      g_autofree char *text = NULL;
      if (markup && pango_parse_markup (markup, -1, 0, NULL, &text, NULL, NULL))
        g_string_append_printf (out, "%s ", g_strdelimit (text, "\n", ' '));
    }
  }
  return g_string_free (out, FALSE);
}

static void
check_pages (GPtrArray *pages, const char *label)
{
  for (guint i = 0; i < pages->len; i++) {
    const EnlScene *page = g_ptr_array_index (pages, i);
    g_autofree char *faults = enl_scene_faults (page);
    EnlRect frame = enl_scene_frame (page), used = enl_scene_bounds (page);
    ck_assert_msg (!faults, "%s, page %u: %s", label, i + 1, faults);
    ck_assert_double_eq_tol (frame.width, A4_WIDTH, 0.01);
    ck_assert_double_eq_tol (frame.height, A4_HEIGHT, 0.01);
    ck_assert_msg (used.x > 40 && used.y > 40 && used.x + used.width < A4_WIDTH - 40 &&
                       used.y + used.height < A4_HEIGHT - 25,
                   "%s, page %u: no margin", label, i + 1);
  }
}

START_TEST (pages_are_whole)
{
  g_autoptr (EnlReport) report = report_of (_i);
  g_autoptr (GPtrArray) pages = enl_report_pages (report, enl_theme_get (ENL_THEME_PRINT));
  g_autofree char *text = all_text (pages);

  ck_assert_msg (pages->len <= set_case[_i].most_pages, "%s: %u pages", set_case[_i].label,
                 pages->len);
  check_pages (pages, set_case[_i].label);
  for (int k = 0; k < 5; k++)
    ck_assert_msg (strstr (text, set_case[_i].holds[k]) != NULL, "%s: no '%s'", set_case[_i].label,
                   set_case[_i].holds[k]);
}
END_TEST

/* A caution told at the terminal stands in the report, too. */
START_TEST (every_caution_is_told)
{
  g_autoptr (EnlReport) report = report_of (0);
  Ask a;

  ask (&a, "CC(=O)CC(=O)OCC", 0, conditions_in (ENL_SOLVENT_DMSO, 25.0, 1.05));
  const EnlCandidate *best = &a.comparison->candidate[0];
  ck_assert_str_eq (report->substrate[0].base->id,
                    enl_base_table_get (knowledge->bases, best->base)->id);
  for (uint32_t i = 0; i < best->n_cautions; i++) {
    const EnlRule *rule = best->caution[i].rule;
    bool told = rule->effect == ENL_EFFECT_NOTE;
    for (guint k = 0; k < report->caution->len; k++)
      told |= strcmp (g_array_index (report->caution, EnlReportCaution, k).id, rule->id) == 0;
    ck_assert_msg (told, "%s is left out", rule->id);
  }
  ask_clear (&a);
}
END_TEST

START_TEST (the_chosen_base_is_taken)
{
  static const char text[] =
      "{\"format\":\"enolith-set\",\"version\":1,\"substrates\":[{\"name\":\"a\",\"structure\":"
      "\"acetone\"},{\"name\":\"b\",\"structure\":\"acetophenone\"}],"
      "\"selection\":{\"substrate\":1,\"base\":\"kotbu\"}}";
  g_autoptr (EnlWorkset) set = NULL;
  g_autoptr (EnlReport) report = NULL;

  ck_assert_int_eq (enl_workset_parse (text, strlen (text), &set, NULL), ENL_OK);
  enl_workset_select (set, 1, ENL_NONE, "kotbu");
  ck_assert_int_eq (enl_report_of_set (knowledge, set, "set", &report, NULL), ENL_OK);
  ck_assert (!report->substrate[0].chosen && report->substrate[1].chosen);
  ck_assert_str_eq (report->substrate[1].base->id, "kotbu");
}
END_TEST

START_TEST (the_same_bytes_every_time)
{
  GByteArray *bytes[2];
  char *html[2];

  for (int i = 0; i < 2; i++) {
    g_autoptr (EnlReport) report = report_of (1);
    g_autoptr (GPtrArray) pages = enl_report_pages (report, enl_theme_get (ENL_THEME_PRINT));
    ck_assert_int_eq (enl_pages_encode (pages, report->title, &bytes[i], NULL), ENL_OK);
    ck_assert_int_eq (enl_report_html (report, enl_theme_get (ENL_THEME_PRINT), &html[i], NULL),
                      ENL_OK);
  }
  ck_assert_uint_eq (bytes[0]->len, bytes[1]->len);
  ck_assert_mem_eq (bytes[0]->data, bytes[1]->data, bytes[0]->len);
  ck_assert_str_eq (html[0], html[1]);
  for (int i = 0; i < 2; i++) {
    g_byte_array_unref (bytes[i]);
    g_free (html[i]);
  }
}
END_TEST

START_TEST (html_stands_alone)
{
  g_autoptr (EnlReport) report = report_of (1);
  g_autofree char *html = NULL;
  g_autoptr (GRegex) id = g_regex_new ("\\bid=\"([^\"]+)\"", 0, 0, NULL);
  g_autoptr (GHashTable) seen = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, NULL);
  g_autoptr (GMatchInfo) match = NULL;

  ck_assert_int_eq (enl_report_html (report, enl_theme_get (ENL_THEME_PRINT), &html, NULL), ENL_OK);
  ck_assert_ptr_nonnull (strstr (html, "<svg"));
  ck_assert_ptr_nonnull (strstr (html, "dates &lt;7&gt;"));
  ck_assert_ptr_null (strstr (html, "<?xml"));
  ck_assert_ptr_null (strstr (html, "src="));
  g_regex_match (id, html, 0, &match);
  for (; g_match_info_matches (match); g_match_info_next (match, NULL)) {
    char *name = g_match_info_fetch (match, 1);
    ck_assert_msg (g_hash_table_add (seen, name), "id '%s' twice", name);
  }
  ck_assert_uint_gt (g_hash_table_size (seen), 10);
}
END_TEST

START_TEST (the_printed_list_is_whole)
{
  static const char *const id[] = {"litmp", "soft_ticl4_amine", "nbuli", "nah", "baoh2", "lickor"};
  uint32_t base[ENL_COUNT (id)];
  EnlWeighScale scale = enl_weigh_scale_none ();
  g_autoptr (EnlWeighList) list = NULL;
  Ask a;

  scale.mmol = 12.5;
  ask (&a, "CC(=O)c1ccccc1", 0, conditions_in (ENL_SOLVENT_THF, -78.0, 1.05));
  for (size_t i = 0; i < ENL_COUNT (id); i++)
    base[i] = (uint32_t)enl_base_table_find (knowledge->bases, id[i]);
  ck_assert_int_eq (enl_weigh_list_new (&a.question, knowledge->weigh,
                                        "acetophenone of the third bottle, <b>redistilled</b>",
                                        &scale, base, ENL_COUNT (id), &list, NULL),
                    ENL_OK);
  ask_clear (&a);
  g_autoptr (GPtrArray) pages = enl_weigh_pages (list, enl_theme_get (ENL_THEME_PRINT));
  g_autofree char *text = all_text (pages);
  check_pages (pages, "list");
  ck_assert_ptr_nonnull (strstr (text, "titanium tetrachloride"));
  ck_assert_ptr_nonnull (strstr (text, "amount not known here"));
  ck_assert_ptr_nonnull (strstr (text, "[H04]"));
  ck_assert_ptr_nonnull (strstr (text, "qualified person"));
  ck_assert_ptr_nonnull (strstr (text, "no procedure"));
}
END_TEST

static Suite *
report_suite (void)
{
  Suite *suite = suite_create ("draw report");
  TCase *tc = tcase_create ("all");

  tcase_add_unchecked_fixture (tc, open_knowledge, close_knowledge);
  tcase_set_timeout (tc, 60);
  tcase_add_loop_test (tc, pages_are_whole, 0, (int)ENL_COUNT (set_case));
  tcase_add_test (tc, every_caution_is_told);
  tcase_add_test (tc, the_chosen_base_is_taken);
  tcase_add_test (tc, the_same_bytes_every_time);
  tcase_add_test (tc, html_stands_alone);
  tcase_add_test (tc, the_printed_list_is_whole);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (report_suite)
