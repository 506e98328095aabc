#include "core/acidity/lab-judge.h"

#include <math.h>

/* Half width of the 90 % interval of a normal law in standard deviations. */
#define NORMAL_WIDTH 1.645
/* Values agree within this many combined standard deviations. */
#define AGREEMENT 2.0

/* The rows for one site in one solvent. */
typedef struct {
  const EnlLab *lab;
  uint32_t *row, n;
} Group;

static const EnlLabEntry *
entry_of (const Group *group, uint32_t k)
{
  return enl_lab_row (group->lab, group->row[k])->entry;
}

/* All rows whose site is that of row `first`, itself included. */
static Group
group_of (const EnlLab *lab, const EnlReference *ref, uint32_t first)
{
  uint32_t n = enl_lab_size (lab), offset = enl_reference_rows (ref) - n;
  Group group = {lab, g_new (uint32_t, n + 1), 0};

  for (uint32_t i = first; i < n; i++)
    if (enl_reference_first_alike (ref, offset + i) == offset + first)
      group.row[group.n++] = i;
  return group;
}

static bool
leads (const EnlLab *lab, const EnlReference *ref, uint32_t row)
{
  uint32_t offset = enl_reference_rows (ref) - enl_lab_size (lab);

  return enl_reference_first_alike (ref, offset + row) == offset + row;
}

static bool
disagree (double a, double sigma_a, double b, double sigma_b)
{
  return fabs (a - b) > AGREEMENT * hypot (sigma_a, sigma_b);
}

static bool
is_split (const Group *group)
{
  for (uint32_t i = 0; i < group->n; i++)
    for (uint32_t k = 0; k < i; k++) {
      const EnlLabEntry *a = entry_of (group, i), *b = entry_of (group, k);
      if (disagree (a->pka, a->sigma, b->pka, b->sigma))
        return true;
    }
  return false;
}

/* Mean with weights 1 / sigma^2; returns its sigma. */
static double
weighted_mean (const Group *group, double *mean)
{
  double sum = 0, weight = 0;

  for (uint32_t k = 0; k < group->n; k++) {
    const EnlLabEntry *e = entry_of (group, k);
    sum += e->pka / (e->sigma * e->sigma);
    weight += 1 / (e->sigma * e->sigma);
  }
  *mean = sum / weight;
  return 1 / sqrt (weight);
}

static double
birge_ratio (const Group *group)
{
  double mean, square = 0;

  weighted_mean (group, &mean);
  for (uint32_t k = 0; k < group->n; k++) {
    const EnlLabEntry *e = entry_of (group, k);
    square += (e->pka - mean) * (e->pka - mean) / (e->sigma * e->sigma);
  }
  return fmax (1, sqrt (square / (group->n - 1)));
}

void
enl_lab_sigmas (const EnlLab *lab, const EnlReference *ref, double *sigma)
{
  for (uint32_t i = 0; i < enl_lab_size (lab); i++) {
    if (!leads (lab, ref, i))
      continue;
    Group group = group_of (lab, ref, i);
    double ratio = is_split (&group) ? birge_ratio (&group) : 1;
    for (uint32_t k = 0; k < group.n; k++)
      sigma[group.row[k]] = ratio * entry_of (&group, k)->sigma;
    g_free (group.row);
  }
}

/* ---- words ---- */

/* As typed, to four digits, with a point in every locale. */
static void
add_number (GString *out, const char *format, double value)
{
  char digits[G_ASCII_DTOSTR_BUF_SIZE];

  g_string_append (out, g_ascii_formatd (digits, sizeof digits, format, value));
}

/* "24.1 (sigma 0.3, line 3, second run)" */
static void
add_value (GString *out, const EnlLabEntry *e)
{
  add_number (out, "%.4g", e->pka);
  g_string_append (out, " (sigma ");
  add_number (out, "%.3g", e->sigma);
  if (e->line)
    g_string_append_printf (out, ", line %zu", e->line);
  if (e->note[0])
    g_string_append_printf (out, ", %s", e->note);
  g_string_append_c (out, ')');
}

static void
add_values (GString *out, const Group *group)
{
  for (uint32_t k = 0; k < group->n; k++) {
    g_string_append (out, k == 0 ? "" : k + 1 < group->n ? ", " : " and ");
    add_value (out, entry_of (group, k));
  }
}

static void
begin_clause (GString *out)
{
  if (out->len)
    g_string_append (out, "; ");
}

/* ---- judging ---- */

static void
show_combined (const Group *group, EnlLabSite *site, GString *words)
{
  site->sigma = weighted_mean (group, &site->value);
  if (group->n == 1) /* to the last bit */
    site->value = entry_of (group, 0)->pka, site->sigma = entry_of (group, 0)->sigma;
  site->shown = group->row[0];
  site->low = site->value - NORMAL_WIDTH * site->sigma;
  site->high = site->value + NORMAL_WIDTH * site->sigma;
  if (group->n == 1)
    return;
  g_string_append_printf (words, "%u lab values, combined: ", group->n);
  add_values (words, group);
}

static void
show_one (const Group *group, EnlLabSite *site, GString *words)
{
  const EnlLabEntry *best = entry_of (group, 0);

  site->shown = group->row[0];
  site->low = INFINITY;
  site->high = -INFINITY;
  for (uint32_t k = 0; k < group->n; k++) {
    const EnlLabEntry *e = entry_of (group, k);
    site->low = fmin (site->low, e->pka - NORMAL_WIDTH * e->sigma);
    site->high = fmax (site->high, e->pka + NORMAL_WIDTH * e->sigma);
    if (e->sigma < best->sigma)
      best = e, site->shown = group->row[k];
  }
  site->value = best->pka;
  site->sigma = fmax (site->high - site->value, site->value - site->low) / NORMAL_WIDTH;
  site->contradicts = true;
  g_string_append (words, "lab values disagree: ");
  add_values (words, group);
  g_string_append (words, "; ");
  add_number (words, "%.4g", best->pka);
  g_string_append (words, " is shown, with an interval that covers all");
}

/* Every value that contradicts the published one of the same site. True when there is one. */
static bool
compare_published (const Group *group, const EnlReferenceRow *first, const EnlReference *published,
                   EnlLabSite *site, GString *words)
{
  int row = enl_reference_find (published, first->mol, first->site, first->solvent);
  const EnlReferenceRow *known = row < 0 ? NULL : enl_reference_row (published, (uint32_t)row);

  for (uint32_t k = 0; known && k < group->n; k++) {
    const EnlLabEntry *e = entry_of (group, k);
    if (!disagree (e->pka, e->sigma, known->pka, known->sigma))
      continue;
    site->contradicts = true;
    begin_clause (words);
    g_string_append (words, "lab value ");
    add_value (words, e);
    g_string_append (words, " disagrees with the published ");
    add_number (words, "%.4g", known->pka);
    g_string_append (words, " (sigma ");
    add_number (words, "%.3g", known->sigma);
    g_string_append_printf (words, ", %s)", known->source);
  }
  return known != NULL;
}

static void
compare_expected (const EnlLabExpectation *expected, const EnlLabSite *site, GString *words)
{
  if (!expected->known || fabs (site->value - expected->value) <= expected->half)
    return;
  begin_clause (words);
  g_string_append (words, "lab value differs from the estimate ");
  add_number (words, "%.1f", expected->value);
  g_string_append (words, " ± ");
  add_number (words, "%.1f", expected->half);
  g_string_append (words, " without it");
}

static void
judge_group (const Group *group, const EnlReference *ref, const EnlReference *published,
             const EnlLabExpectation *expectation, EnlLabSite *site)
{
  uint32_t offset = enl_reference_rows (ref) - enl_lab_size (group->lab);
  const EnlReferenceRow *first = enl_reference_row (ref, offset + group->row[0]);
  GString *words = g_string_new (NULL);

  site->n = group->n;
  if (is_split (group))
    show_one (group, site, words);
  else
    show_combined (group, site, words);
  if (!compare_published (group, first, published, site, words))
    compare_expected (&expectation[group->row[0]], site, words);
  site->remark = g_string_free (words, words->len == 0);
}

EnlLabJudgement *
enl_lab_judge (const EnlLab *lab, const EnlReference *ref, const EnlReference *published,
               const EnlLabExpectation *expectation)
{
  EnlLabJudgement *judgement = g_new0 (EnlLabJudgement, 1);

  judgement->n_rows = enl_lab_size (lab);
  judgement->site = g_new0 (EnlLabSite, judgement->n_rows + 1);
  judgement->site_of = g_new0 (uint32_t, judgement->n_rows + 1);
  for (uint32_t i = 0; i < judgement->n_rows; i++) {
    if (!leads (lab, ref, i))
      continue;
    Group group = group_of (lab, ref, i);
    for (uint32_t k = 0; k < group.n; k++)
      judgement->site_of[group.row[k]] = judgement->n_sites;
    judge_group (&group, ref, published, expectation, &judgement->site[judgement->n_sites++]);
    g_free (group.row);
  }
  return judgement;
}

void
enl_lab_judgement_free (EnlLabJudgement *judgement)
{
  if (!judgement)
    return;
  for (uint32_t i = 0; i < judgement->n_sites; i++)
    g_free (judgement->site[i].remark);
  g_free (judgement->site);
  g_free (judgement->site_of);
  g_free (judgement);
}
