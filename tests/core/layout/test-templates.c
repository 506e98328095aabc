#include "core/layout/template.h"

#include <string.h>

#include "core/layout/quality.h"
#include "tests/runner.h"

/* Quality of the drawn template. */
static EnlLayoutQuality
measure_template (const EnlTemplates *templates, uint32_t index)
{
  uint32_t n_bonds = 0;
  const uint32_t (*end)[2] = enl_template_bonds (templates, index, &n_bonds);
  EnlPicture picture = {enl_template_atoms (templates, index), n_bonds,
                        enl_template_spots (templates, index), end};

  return enl_picture_quality (&picture);
}

START_TEST (templates_are_clear_pictures)
{
  g_autoptr (EnlTemplates) templates = enl_templates_new ();

  ck_assert_uint_ge (enl_templates_count (templates), 20);
  for (uint32_t k = 0; k < enl_templates_count (templates); k++) {
    EnlLayoutQuality q = measure_template (templates, k);
    const char *name = enl_template_name (templates, k);
    ck_assert_msg (q.overlaps == 0 && q.closest >= 0.35, "%s: closest %.3f", name, q.closest);
    ck_assert_msg (q.crossings == enl_template_crossings (templates, k), "%s: %u crossings", name,
                   q.crossings);
    ck_assert_msg (q.shortest_bond >= 0.6 && q.longest_bond <= 1.5, "%s: bonds %.2f to %.2f", name,
                   q.shortest_bond, q.longest_bond);
  }
}
END_TEST

static const struct {
  const char *label, *row;
} damaged_case[] = {
    {"no comma", "a\t1-2-3-1\t0,0 1,0 0.5\t0\t"},
    {"a letter", "a\t1-2-3-1\t0,0 1,0 x,1\t0\t"},
    {"an atom that is not there", "a\t1-2-4-1\t0,0 1,0 0.5,1\t0\t"},
    {"atom 0", "a\t0-1-2-0\t0,0 1,0 0.5,1\t0\t"},
    {"a bond twice", "a\t1-2-3-1-2\t0,0 1,0 0.5,1\t0\t"},
    {"a bond to itself", "a\t1-1-2-3\t0,0 1,0 0.5,1\t0\t"},
    {"two pieces", "a\t1-2-3-1 4-5-6-4\t0,0 1,0 0.5,1 3,0 4,0 3.5,1\t0\t"},
    {"no atoms", "a\t1-2-3-1\t\t0\t"},
};

START_TEST (damaged_rows_are_told_with_their_line)
{
  g_autofree char *text =
      g_strdup_printf ("name\twalks\tspots\tcrossings\tnote\n# remark\n%s\n", damaged_case[_i].row);
  EnlTemplates *templates = NULL;
  EnlError err;

  ck_assert_msg (enl_templates_parse (text, strlen (text), &templates, &err) == ENL_ERROR_FORMAT,
                 "%s was read", damaged_case[_i].label);
  ck_assert_ptr_null (templates);
  ck_assert_uint_eq (err.line, 3);
}
END_TEST

static Suite *
template_suite (void)
{
  Suite *suite = suite_create ("layout templates");
  TCase *tc = tcase_create ("all");

  tcase_add_test (tc, templates_are_clear_pictures);
  tcase_add_loop_test (tc, damaged_rows_are_told_with_their_line, 0, (int)ENL_COUNT (damaged_case));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (template_suite)
