/* Layout of structures from outside the project: NCI open database structures, as shipped in
 * Debian's rdkit-data (Data/NCI/first_5K.smi), every 16th line. */
#include "core/layout/layout.h"

#include <stdio.h>
#include <string.h>

#include "core/notation/smiles.h"
#include "tests/runner.h"

static const char path[] = "/usr/share/RDKit/Data/NCI/first_5K.smi";

typedef struct {
  uint32_t laid_out, refused, clear, uncrossed, even, wrong_side;
} Count;

static bool
sides_are_right (const EnlMolecule *mol)
{
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    const EnlBond *bond = enl_molecule_bond (mol, b);
    if (bond->side == ENL_SIDE_NONE)
      continue;
    const EnlAtom *p = enl_molecule_atom (mol, bond->from), *q = enl_molecule_atom (mol, bond->to);
    const EnlAtom *r = enl_molecule_atom (mol, bond->side_from);
    const EnlAtom *s = enl_molecule_atom (mol, bond->side_to);
    double first = (q->x - p->x) * (r->y - p->y) - (q->y - p->y) * (r->x - p->x);
    double second = (q->x - p->x) * (s->y - p->y) - (q->y - p->y) * (s->x - p->x);
    if ((first * second > 0) != (bond->side == ENL_SIDE_SAME))
      return false;
  }
  return true;
}

static void
count_line (char *line, Count *count)
{
  g_autoptr (EnlMolecule) mol = NULL;

  line[strcspn (line, " \t\r\n")] = '\0';
  if (enl_smiles_parse (line, strlen (line), &mol, NULL) != ENL_OK) {
    count->refused++; /* the file holds structures of impossible valence */
    return;
  }
  ck_assert_msg (enl_layout (mol, NULL) == ENL_OK, "%s: no layout", line);
  EnlLayoutQuality q = enl_layout_quality (mol);
  bool clear = q.overlaps == 0 && q.closest >= 0.35;
  count->laid_out++;
  count->clear += clear;
  count->uncrossed += q.crossings == 0;
  count->even += enl_molecule_bonds (mol) == 0 || (q.shortest_bond > 0.85 && q.longest_bond < 1.15);
  count->wrong_side += !sides_are_right (mol);
  if (!clear)
    g_printerr ("# not clear: %s (closest %.2f, overlaps %u)\n", line, q.closest, q.overlaps);
}

START_TEST (outside_structures_are_clear)
{
  FILE *file = fopen (path, "r");
  char line[4096];
  Count count = {0};

  ck_assert_msg (file != NULL, "%s is missing: install rdkit-data", path);
  for (uint32_t number = 0; fgets (line, sizeof line, file); number++)
    if (number % 16 == 0)
      count_line (line, &count);
  fclose (file);
  g_printerr ("# %u structures: %u clear, %u without crossing, %u with even bonds, %u refused\n",
              count.laid_out, count.clear, count.uncrossed, count.even, count.refused);
  ck_assert_uint_ge (count.laid_out, 300);
  ck_assert_uint_le (count.refused, 6);
  ck_assert_double_ge (count.clear, 0.99 * count.laid_out);
  ck_assert_double_ge (count.uncrossed, 0.98 * count.laid_out);
  ck_assert_double_ge (count.even, 0.95 * count.laid_out);
  ck_assert_uint_eq (count.wrong_side, 0);
}
END_TEST

static Suite *
statistic_suite (void)
{
  Suite *suite = suite_create ("layout of outside structures");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 240);
  tcase_add_test (tc, outside_structures_are_clear);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (statistic_suite)
