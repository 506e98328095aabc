#include "core/acidity/why.h"

#include <math.h>
#include <string.h>

#include "core/acidity/model.h"
#include "core/acidity/part.h"
#include "core/acidity/why-chain.h"
#include "core/acidity/why-words.h"
#include "core/notation/smiles.h"

/* What a footing adds is told from this on (pK units); less is rounding of the sum. */
#define NOTHING 1e-9
/* Effects below this are shown as 0.0. */
#define TINY 0.05

/* ---- what is explained: the fragment, its site, its estimates ---- */

typedef struct {
  const EnlEstimator *estimator;
  const EnlMolecule *mol;
  const EnlSites *sites;
  EnlEstimate *estimate; /* owned, as sites */
  uint32_t site;
} Question;

static double
ask_model (const Question *q, const EnlMolecule *mol, uint32_t atom)
{
  return enl_estimator_model_value (q->estimator, mol, atom, q->estimate[q->site].solvent);
}

/* ---- lines before they are brought down to six ---- */

typedef struct {
  char *words;
  double value;
  bool fixed; /* never merged into the rest */
} Draft;

static void
add_line (GArray *lines, char *words, double value, bool fixed)
{
  Draft line = {words, value, fixed};

  g_array_append_val (lines, line);
}

static void
clear_line (gpointer data)
{
  g_free (((Draft *)data)->words);
}

/* Name of a compound of the table of acids, or NULL. */
static const char *
published_name (const EnlReference *ref, const EnlMolecule *mol)
{
  g_autofree char *key = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);

  for (uint32_t i = 0; i < enl_reference_rows (ref); i++)
    if (strcmp (enl_reference_row (ref, i)->key, key) == 0)
      return enl_reference_row (ref, i)->name;
  return NULL;
}

static char *
parent_words (const Question *q, const EnlWhyChain *chain)
{
  const EnlWhyLink *last = &chain->link[chain->n - 1];
  const char *name = enl_why_words_parent (enl_why_words (), last->mol, last->site);

  if (!name)
    name = published_name (enl_estimator_reference (q->estimator), last->mol);
  if (name)
    return g_strdup_printf ("parent: %s", name);
  if (chain->n == 1)
    return g_strdup ("the model's value; there is no simpler acid to compare with");
  g_autofree char *formula = enl_molecule_formula (last->mol);
  return g_strdup_printf ("parent: the core %s", formula);
}

/* Parent first, then from the inside outwards. Returns the model's value of the molecule. */
static double
add_chain (const Question *q, GArray *lines)
{
  g_autoptr (EnlWhyChain) chain =
      enl_why_chain_new (q->mol, enl_estimator_atom (q->mol, &q->sites->site[q->site]));
  double inner = 0;

  for (uint32_t k = chain->n; k-- > 0;) {
    const EnlWhyLink *link = &chain->link[k];
    double value = ask_model (q, link->mol, link->site);
    if (k + 1 == chain->n)
      add_line (lines, parent_words (q, chain), value, true);
    else
      add_line (lines, g_strdup (chain->link[k + 1].words), value - inner, false);
    inner = value;
  }
  return inner;
}

/* Largest value among the sites that can go first, so that a second one can only be held at it. */
static double
first_value (const Question *q)
{
  double value = -HUGE_VAL;

  for (uint32_t i = 0; i < q->sites->n_sites; i++)
    if (!q->sites->site[i].second && q->estimate[i].value <= q->estimate[q->site].value)
      value = MAX (value, q->estimate[i].value);
  return value;
}

static const char *
closing_words (const Question *q)
{
  const EnlReference *ref = enl_estimator_reference (q->estimator);
  const EnlEstimate *e = &q->estimate[q->site];

  if (e->basis == ENL_BASIS_MEASURED)
    return "measured minus model";
  if (e->basis == ENL_BASIS_LAB)
    return "own value minus model";
  if (e->solvent == ENL_SOLVENT_THF && e->n_precedents && e->precedent[0].weight >= 1)
    return enl_reference_row (ref, e->precedent[0].row)->lab ? "own DMSO value minus model"
                                                             : "measured in DMSO minus model";
  if (enl_estimator_is_held (e))
    return "held at the end of the scale";
  if (e->value > first_value (q))
    return "free ions in DMSO feel the first charge more than in water";
  return "held at the hydrogen that goes first";
}

/* What tables and footings add to the model's `value` of the molecule as drawn. */
static void
add_closing (const Question *q, double value, GArray *lines)
{
  const EnlEstimate *e = &q->estimate[q->site];
  const EnlSite *site = &q->sites->site[q->site];

  if (site->second && e->basis == ENL_BASIS_ESTIMATED) {
    g_autoptr (EnlMolecule) anion = enl_estimator_first_anion (q->mol, q->sites, q->estimate);
    if (anion) {
      double of_anion = ask_model (q, anion, enl_estimator_atom (anion, site));
      add_line (lines, g_strdup ("the anion, after the first hydrogen has left"), of_anion - value,
                true);
      value = of_anion;
    }
  }
  if (fabs (e->value - value) > NOTHING)
    add_line (lines, g_strdup (closing_words (q)), e->value - value, true);
}

/* ---- six lines ---- */

static bool
is_rest (const Draft *line)
{
  return !line->fixed && strcmp (line->words, "rest of the molecule") == 0;
}

/* The step that goes into the rest next: the rest of the molecule, else the smallest effect. */
static uint32_t
find_smallest (const GArray *lines)
{
  uint32_t best = ENL_NONE;

  for (uint32_t i = 0; i < lines->len; i++) {
    const Draft *line = &g_array_index (lines, Draft, i);
    if (line->fixed)
      continue;
    if (is_rest (line))
      return i;
    if (best == ENL_NONE || fabs (line->value) < fabs (g_array_index (lines, Draft, best).value))
      best = i;
  }
  return best;
}

/* Lines that would all read 0.0 say more as one. */
static uint32_t
count_tiny (const GArray *lines)
{
  uint32_t n = 0;

  for (uint32_t i = 0; i < lines->len; i++) {
    const Draft *line = &g_array_index (lines, Draft, i);
    n += !line->fixed && fabs (line->value) < TINY;
  }
  return n;
}

/* Moves the least of the lines into one of the rest, in front of the closing lines. */
static void
merge_small (GArray *lines)
{
  uint32_t tiny = count_tiny (lines), merged = 0, place = lines->len;
  uint32_t over = lines->len > ENL_WHY_LINES ? lines->len - ENL_WHY_LINES + 1 : 0;
  uint32_t wanted = MAX (over, tiny > 1 ? tiny : 0);
  double sum = 0;

  for (; merged < wanted; merged++) {
    uint32_t i = find_smallest (lines);
    if (i == ENL_NONE)
      break;
    sum += g_array_index (lines, Draft, i).value;
    g_array_remove_index (lines, i);
  }
  if (merged == 0)
    return;
  for (place = 1; place < lines->len && !g_array_index (lines, Draft, place).fixed; place++)
    ;
  Draft line = {g_strdup_printf ("rest (%u more)", merged), sum, true};
  g_array_insert_val (lines, place, line);
}

/* ---- the width ---- */

static const char *
class_words (EnlAcidClass class)
{
  static const char *const words[ENL_N_CLASSES] = {
      [ENL_CLASS_ALPHA] = "alpha C-H acids", [ENL_CLASS_CARBON] = "C-H acids",
      [ENL_CLASS_NITROGEN] = "N-H acids",    [ENL_CLASS_OXYGEN] = "O-H acids",
      [ENL_CLASS_CHALCOGEN] = "S-H acids",
  };

  return words[class];
}

static double
nearest (const EnlEstimate *e)
{
  double best = 0;

  for (uint32_t i = 0; i < e->n_precedents; i++)
    best = MAX (best, e->precedent[i].likeness);
  return best;
}

/* Where the width of an estimate comes from. */
static void
add_estimate_width (const Question *q, GString *out)
{
  const EnlEstimate *e = &q->estimate[q->site];
  EnlAcidClass class = enl_acid_class (q->mol, q->sites->site[q->site].atom[0]);

  if (e->n_precedents == 0)
    g_string_append (out, "nothing like it was measured; ");
  else
    g_string_append_printf (out, "the nearest measured compound is %.0f %% alike; ",
                            100 * nearest (e));
  g_string_append_printf (out, "nine in ten %s in %s lay inside such intervals when left out",
                          class_words (class), e->solvent == ENL_SOLVENT_WATER ? "water" : "DMSO");
}

static char *
width_words (const Question *q)
{
  const EnlEstimate *e = &q->estimate[q->site];
  bool known = e->n_precedents && e->precedent[0].weight >= 1;
  GString *out = g_string_new (NULL);

  g_string_append_printf (out, "±%.1f (90 %%): ", (e->high - e->low) / 2);
  if (e->basis == ENL_BASIS_MEASURED)
    g_string_append (out, "the uncertainty of the published value");
  else if (e->basis == ENL_BASIS_LAB)
    g_string_append (out, "the uncertainty of your own value");
  else if (known)
    g_string_append (out, "the uncertainty of the value in DMSO");
  else
    add_estimate_width (q, out);
  if (e->remark)
    g_string_append_printf (out, "; %s%s", e->basis == ENL_BASIS_ESTIMATED ? "widened: " : "",
                            e->remark);
  if (e->footing)
    g_string_append_printf (out, "; widened: %s", e->footing);
  return g_string_free (out, FALSE);
}

/* ---- all together ---- */

static EnlWhy *
answer (const Question *q)
{
  EnlWhy *why = g_new0 (EnlWhy, 1);
  g_autoptr (GArray) lines = g_array_new (FALSE, FALSE, sizeof (Draft));

  g_array_set_clear_func (lines, clear_line);
  add_closing (q, add_chain (q, lines), lines);
  merge_small (lines);
  g_assert (lines->len <= ENL_WHY_LINES);
  why->value = q->estimate[q->site].value;
  for (uint32_t i = 0; i < lines->len; i++) {
    Draft *line = &g_array_index (lines, Draft, i);
    why->line[why->n_lines++] = (EnlWhyLine){g_steal_pointer (&line->words), line->value};
  }
  why->width = width_words (q);
  return why;
}

/* The fragment with the site as a molecule of its own; estimates follow their sites. */
static EnlWhy *
answer_fragment (const Question *whole, const uint32_t *fragment)
{
  uint32_t index = fragment[whole->sites->site[whole->site].atom[0]];
  g_autoptr (EnlPart) part = enl_part_new (whole->mol, whole->sites, fragment, index);
  Question q = {.estimator = whole->estimator, .mol = part->mol, .sites = &part->sites};

  q.estimate = g_new0 (EnlEstimate, part->sites.n_sites + 1);
  for (uint32_t i = 0; i < part->sites.n_sites; i++) {
    q.estimate[i] = whole->estimate[part->site_of[i]];
    if (part->site_of[i] == whole->site)
      q.site = i;
  }
  EnlWhy *why = answer (&q);
  g_free (q.estimate);
  return why;
}

EnlWhy *
enl_why_new (const EnlEstimator *estimator, const EnlMolecule *mol, const EnlSites *sites,
             const EnlEstimate *estimate, uint32_t site)
{
  g_autofree uint32_t *fragment = g_new (uint32_t, enl_molecule_atoms (mol) + 1);
  Question q = {.estimator = estimator,
                .mol = mol,
                .sites = sites,
                .estimate = (EnlEstimate *)estimate,
                .site = site};

  g_assert (site < sites->n_sites);
  if (enl_molecule_fragments (mol, fragment) > 1)
    return answer_fragment (&q, fragment);
  return answer (&q);
}

void
enl_why_free (EnlWhy *why)
{
  if (!why)
    return;
  for (uint32_t i = 0; i < why->n_lines; i++)
    g_free (why->line[i].words);
  g_free (why->width);
  g_free (why);
}

/* ---- rounding ---- */

/* The value as printed, in units of the last place. */
static double
printed (double value, int decimals, double scale)
{
  char format[16], buffer[64];

  g_snprintf (format, sizeof format, "%%.%df", decimals);
  g_ascii_formatd (buffer, sizeof buffer, format, value);
  return round (g_ascii_strtod (buffer, NULL) * scale);
}

void
enl_why_round (const EnlWhy *why, int decimals, double *out)
{
  double scale = pow (10, decimals), left = printed (why->value, decimals, scale);

  for (uint32_t i = 0; i < why->n_lines; i++) {
    out[i] = floor (why->line[i].value * scale);
    left -= out[i];
  }
  /* The largest remainders are rounded up; a line is never moved twice before all were once. */
  g_autofree bool *up = g_new0 (bool, why->n_lines + 1);
  for (uint32_t n = 0; n < why->n_lines && left >= 0.5; n++, left--) {
    uint32_t best = ENL_NONE;
    for (uint32_t i = 0; i < why->n_lines; i++)
      if (!up[i] && (best == ENL_NONE || why->line[i].value * scale - out[i] >
                                             why->line[best].value * scale - out[best]))
        best = i;
    up[best] = true;
    out[best]++;
  }
  for (uint32_t i = 0; i < why->n_lines; i++)
    out[i] /= scale;
}
