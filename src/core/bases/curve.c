#include "core/bases/curve.h"

#include <math.h>
#include <string.h>

#include "core/acidity/estimator.h"
#include "core/bases/judge.h"

/* A form that never reaches this share has no line. */
#define SHOWN_FROM 0.005
/* Sites that a label names. */
#define NAMED_SITES 4

typedef struct {
  const EnlQuestion *question;
  const EnlIons *ions;
  const EnlSweep *sweep;
  const EnlComposition *at; /* the chosen equivalents */
  uint32_t *rank;           /* 1-based, of every site */
  EnlCurve *curve;
} Drafting;

/* ---- words ---- */

char *
enl_share_text (double share)
{
  if (share > 0.9995)
    return g_strdup ("100\u00A0%");
  if (share >= 0.0995)
    return g_strdup_printf ("%.*f\u00A0%%", share > 0.9895 ? 1 : 0, 100.0 * share);
  if (share >= 0.001)
    return g_strdup_printf ("%.1f\u00A0%%", 100.0 * share);
  return g_strdup ("<\u00A00.1\u00A0%");
}

static int
charge_of (const EnlMolecule *mol)
{
  int charge = 0;

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    charge += enl_molecule_atom (mol, i)->charge;
  return charge;
}

static const char *
kind_word (int charge)
{
  static const char *const anion[] = {"uncharged form", "anion", "dianion", "trianion"};

  if (charge > 0)
    return "cation";
  return charge < -3 ? "polyanion" : anion[-charge];
}

static char *
form_label (const Drafting *d, uint32_t species)
{
  const EnlSiteSet *lost = &d->ions->lost[species];
  const EnlSpecies *form = &d->ions->species[species];
  int charge = charge_of (d->question->mol) - (int)form->lost;
  GString *out = g_string_new (kind_word (charge));
  uint32_t n = 0;

  for (uint32_t r = 1; r <= d->question->sites->n_sites; r++)
    for (uint32_t i = 0; i < d->question->sites->n_sites; i++)
      if (d->rank[i] == r && enl_site_set_has (lost, i))
        if (n++ < NAMED_SITES)
          g_string_append_printf (out, n > 1 ? " + %u" : ", site %u", r);
  if (n > NAMED_SITES)
    g_string_append_printf (out, " and %u more", n - NAMED_SITES);
  if (n == 1 && form->lost > 1)
    g_string_append_printf (out, " (%u H)", form->lost);
  return g_string_free (out, FALSE);
}

/* ---- lines ---- */

static EnlCurveLine *
add_line (Drafting *d, EnlCurveKind kind, char *label, const double *fraction, double chosen)
{
  EnlCurve *curve = d->curve;
  EnlCurveLine *line;

  curve->line = g_renew (EnlCurveLine, curve->line, curve->n_lines + 1);
  line = &curve->line[curve->n_lines++];
  *line = (EnlCurveLine){.kind = kind, .label = label, .chosen = chosen};
  line->fraction = g_memdup2 (fraction, d->sweep->n_points * sizeof *fraction);
  for (uint32_t i = 0; i < d->sweep->n_points; i++)
    line->peak = fmax (line->peak, fraction[i]);
  return line;
}

typedef struct {
  uint32_t species;
  bool holds_target;
  double peak;
} Entry;

static int
by_interest (const void *a, const void *b)
{
  const Entry *left = a, *right = b;

  if (left->holds_target != right->holds_target)
    return left->holds_target ? -1 : 1;
  if (left->peak != right->peak)
    return left->peak > right->peak ? -1 : 1;
  return left->species < right->species ? -1 : 1;
}

static int
by_peak (const void *a, const void *b)
{
  const Entry *left = a, *right = b;

  return left->peak != right->peak ? (left->peak > right->peak ? -1 : 1)
                                   : by_interest (left, right);
}

static const double *
row_of (const EnlSweep *sweep, uint32_t species)
{
  return sweep->fraction + (size_t)species * sweep->n_points;
}

static void
add_others (Drafting *d, const Entry *entry, uint32_t n)
{
  g_autofree double *sum = g_new0 (double, d->sweep->n_points);
  double chosen = 0.0, peak = 0.0;

  for (uint32_t i = 0; i < n; i++) {
    const double *row = row_of (d->sweep, entry[i].species);
    chosen += d->at->fraction[entry[i].species];
    for (uint32_t k = 0; k < d->sweep->n_points; k++)
      sum[k] += row[k];
  }
  for (uint32_t k = 0; k < d->sweep->n_points; k++)
    peak = fmax (peak, sum[k]);
  if (peak >= SHOWN_FROM)
    add_line (d, ENL_CURVE_OTHERS, g_strdup ("other forms together"), sum, chosen);
}

/* The forms with the highest peaks get lines; those of the site asked about come first. */
static void
add_forms (Drafting *d)
{
  const uint32_t n = d->ions->n_species;
  g_autofree Entry *entry = g_new0 (Entry, n);
  uint32_t shown = 0;

  for (uint32_t i = 0; i < n; i++) {
    entry[i] = (Entry){i, d->ions->holds_target[i], 0.0};
    for (uint32_t k = 0; k < d->sweep->n_points; k++)
      entry[i].peak = fmax (entry[i].peak, row_of (d->sweep, i)[k]);
  }
  qsort (entry, n, sizeof *entry, by_peak);
  while (shown < MIN (n, ENL_CURVE_FORMS) && entry[shown].peak >= SHOWN_FROM)
    shown++;
  qsort (entry, shown, sizeof *entry, by_interest);
  for (uint32_t i = 0; i < shown; i++) {
    uint32_t s = entry[i].species;
    EnlCurveLine *line =
        add_line (d, ENL_CURVE_FORM, form_label (d, s), row_of (d->sweep, s), d->at->fraction[s]);
    line->lost = d->ions->lost[s];
    line->holds_target = d->ions->holds_target[s];
  }
  add_others (d, entry + shown, n - shown);
}

static double
unused_at (const EnlMixture *m, const EnlComposition *at)
{
  if (!m->stoichiometric)
    return at->form[0][0];
  return m->problem.removed > 0.0 ? at->unused / m->problem.removed : 0.0;
}

/* ---- the curve ---- */

static uint32_t *
ranks_of (const EnlQuestion *q)
{
  g_autofree uint32_t *order = g_new0 (uint32_t, q->sites->n_sites);
  uint32_t *rank = g_new0 (uint32_t, q->sites->n_sites);

  enl_estimates_rank (q->sites, q->estimate, order);
  for (uint32_t i = 0; i < q->sites->n_sites; i++)
    rank[order[i]] = i + 1;
  return rank;
}

static EnlStatus
draft (const EnlQuestion *q, const EnlCandidate *c, uint32_t n_points, EnlCurve *curve,
       EnlError *err)
{
  g_autoptr (EnlIons) ions = NULL;
  g_autoptr (EnlSweep) sweep = NULL;
  g_auto (EnlMixture) m = {0};
  g_autofree EnlComposition *at = g_new0 (EnlComposition, 1);
  g_autofree uint32_t *rank = ranks_of (q);
  double most = fmax (ENL_SWEEP_MOST, ceil (curve->chosen));
  EnlStatus status = enl_ions_new (q, &ions, err);

  if (status != ENL_OK)
    return status;
  EnlJudge judge = enl_judge_begin (q, ions);
  enl_judge_mixture (&judge, c, &m);
  status = enl_equilibrium_solve (&m.problem, at, err);
  if (status == ENL_OK)
    status = enl_sweep_new (&m.problem, m.stoichiometric, most, n_points, &sweep, err);
  if (status != ENL_OK)
    return status;
  Drafting d = {q, ions, sweep, at, rank, curve};
  add_forms (&d);
  add_line (&d, ENL_CURVE_SUBSTRATE, g_strdup ("substrate"), sweep->neutral, at->neutral);
  add_line (&d, ENL_CURVE_BASE, g_strdup ("base left over, of the base added"), sweep->unused,
            unused_at (&m, at));
  curve->n_points = n_points;
  curve->equivalents = g_memdup2 (sweep->equivalents, n_points * sizeof (double));
  curve->worst = sweep->worst;
  return ENL_OK;
}

EnlStatus
enl_curve_new (const EnlQuestion *q, const EnlCandidate *c, uint32_t n_points, EnlCurve **out,
               EnlError *err)
{
  g_autoptr (EnlCurve) curve = g_new0 (EnlCurve, 1);
  EnlStatus status = ENL_OK;

  *out = NULL;
  curve->chosen = q->conditions->equivalents;
  curve->low = c->low;
  curve->high = c->high;
  curve->stoichiometric = c->stoichiometric;
  if (isnan (c->conversion))
    curve->missing = g_strdup (c->reason);
  else
    status = draft (q, c, n_points, curve, err);
  if (status == ENL_OK)
    *out = g_steal_pointer (&curve);
  return status;
}

void
enl_curve_free (EnlCurve *curve)
{
  if (!curve)
    return;
  for (uint32_t i = 0; i < curve->n_lines; i++) {
    g_free (curve->line[i].label);
    g_free (curve->line[i].fraction);
  }
  g_free (curve->line);
  g_free (curve->equivalents);
  g_free (curve->missing);
  g_free (curve);
}

char *
enl_curve_words (const EnlCurve *curve, const char *base)
{
  GString *out = g_string_new (NULL);

  if (curve->missing) {
    g_string_printf (out, "No composition curve for %s: %s.", base, curve->missing);
    return g_string_free (out, FALSE);
  }
  g_string_printf (out, "At %.4g equivalents of %s: ", curve->chosen, base);
  for (uint32_t i = 0; i < curve->n_lines; i++) {
    g_autofree char *share = enl_share_text (curve->line[i].chosen);
    g_string_append_printf (out, "%s%s: %s", i ? "; " : "", curve->line[i].label, share);
  }
  g_string_append_c (out, '.');
  return g_string_free (out, FALSE);
}
