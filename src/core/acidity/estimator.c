#include "core/acidity/estimator.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "core/acidity/footing.h"
#include "core/acidity/part.h"
#include "core/acidity/permittivity.h"
#include "core/acidity/predict.h"

/* Half width of the 90 % interval of a normal law in standard deviations. */
#define NORMAL_WIDTH 1.645
/* Extra standard deviations (pK units) for what the fit cannot see. */
#define SECOND_SIGMA 2.0 /* second deprotonations: few were measured */
#define FAR_SIGMA    3.0 /* outside the experience of the model */
/* No acid that this program is for lies beyond these. */
#define LEAST_PKA -20.0
#define MOST_PKA  65.0

static const char remark_second[] =
    "second deprotonation: another hydrogen goes first, and the number is that of its anion";
static const char remark_second_neutral[] =
    "second deprotonation: another hydrogen goes first; the number is for the neutral molecule, "
    "the anion is much less acidic";

struct EnlEstimator {
  gatomicrefcount references;
  EnlEstimator *base; /* held: what this one extends, or NULL */
  const EnlReference *ref;
  EnlReference *owned_ref; /* the same where own values stand behind the published ones */
  EnlPredictor *predictor;
  EnlLabJudgement *lab; /* NULL without own values */
};

EnlStatus
enl_estimator_open (const EnlReference *ref, const char *bytes, size_t size, EnlEstimator **out,
                    EnlError *err)
{
  g_autoptr (EnlEstimator) estimator = g_new0 (EnlEstimator, 1);
  EnlStatus status = enl_predictor_open (ref, bytes, size, &estimator->predictor, err);

  *out = NULL;
  g_atomic_ref_count_init (&estimator->references);
  if (status != ENL_OK)
    return status;
  estimator->ref = ref;
  *out = g_steal_pointer (&estimator);
  return ENL_OK;
}

EnlEstimator *
enl_estimator_ref (EnlEstimator *estimator)
{
  g_atomic_ref_count_inc (&estimator->references);
  return estimator;
}

void
enl_estimator_free (EnlEstimator *estimator)
{
  if (!estimator || !g_atomic_ref_count_dec (&estimator->references))
    return;
  enl_predictor_free (estimator->predictor);
  enl_lab_judgement_free (estimator->lab);
  enl_reference_free (estimator->owned_ref);
  enl_estimator_free (estimator->base);
  g_free (estimator);
}

const EnlReference *
enl_estimator_reference (const EnlEstimator *estimator)
{
  return estimator->ref;
}

const EnlLabJudgement *
enl_estimator_lab (const EnlEstimator *estimator)
{
  return estimator->lab;
}

/* ---- one run ---- */

typedef struct {
  const EnlEstimator *estimator;
  const EnlMolecule *mol;
  const EnlSites *sites;
  EnlSolvent solvent; /* whose scale is used: DMSO for THF */
  bool paired;        /* anions hold on to their cations: THF */
  EnlEstimate *out;
} Run;

static void
set_interval (EnlEstimate *e, double half)
{
  e->sigma = half / NORMAL_WIDTH;
  e->low = e->value - half;
  e->high = e->value + half;
}

/* Adds an independent uncertainty of `sigma` to the interval. */
static void
widen (EnlEstimate *e, double sigma)
{
  set_interval (e, NORMAL_WIDTH * sqrt (e->sigma * e->sigma + sigma * sigma));
}

static void
take_prediction (const Run *run, const EnlPrediction *prediction, EnlEstimate *e)
{
  *e = (EnlEstimate){
      .value = prediction->value,
      .solvent = run->solvent,
      .basis = ENL_BASIS_ESTIMATED,
      .row = -1,
      .outside = prediction->outside != NULL,
      .remark = prediction->outside,
      .n_precedents = prediction->n_precedents,
  };
  memcpy (e->precedent, prediction->precedent, sizeof e->precedent);
  set_interval (e, prediction->half);
  if (e->outside)
    widen (e, FAR_SIGMA);
  if (!(e->value >= LEAST_PKA && e->value <= MOST_PKA)) {
    e->value = CLAMP (isfinite (e->value) ? e->value : MOST_PKA, LEAST_PKA, MOST_PKA);
    e->outside = true;
    e->remark = "outside its experience: the model runs off the scale";
    widen (e, FAR_SIGMA);
  }
}

static void
take_published (const EnlReferenceRow *published, EnlEstimate *e)
{
  e->value = published->pka;
  e->basis = ENL_BASIS_MEASURED;
  e->remark = NULL;
  set_interval (e, NORMAL_WIDTH * published->sigma);
}

/* `row` is one of the own values for the site, and becomes the one that is shown. */
static void
take_lab (const EnlEstimator *estimator, int *row, EnlEstimate *e)
{
  const EnlLabJudgement *lab = estimator->lab;
  uint32_t first = enl_reference_rows (estimator->ref) - lab->n_rows;
  const EnlLabSite *site = &lab->site[lab->site_of[(uint32_t)*row - first]];

  e->value = site->value;
  e->low = site->low;
  e->high = site->high;
  e->sigma = site->sigma;
  e->basis = ENL_BASIS_LAB;
  e->remark = site->remark;
  *row = (int)(first + site->shown);
}

/* Puts an own or published value in place of the estimate; the row leads its precedents. */
static void
take_row (const Run *run, int row, EnlEstimate *e)
{
  const EnlReferenceRow *known = enl_reference_row (run->estimator->ref, (uint32_t)row);
  EnlEstimate old = *e;

  if (known->lab)
    take_lab (run->estimator, &row, e);
  else
    take_published (known, e);
  e->row = row;
  e->outside = false;
  e->precedent[0] = (EnlPrecedent){(uint32_t)row, 1, 1};
  e->n_precedents = 1;
  for (uint32_t i = 0; i < old.n_precedents && e->n_precedents < ENL_MAX_PRECEDENTS; i++)
    if (old.precedent[i].row != (uint32_t)row)
      e->precedent[e->n_precedents++] = old.precedent[i];
}

uint32_t
enl_estimator_atom (const EnlMolecule *mol, const EnlSite *site)
{
  for (uint32_t k = 0; k < site->n_atoms; k++)
    if (enl_molecule_atom (mol, site->atom[k])->charge > 0)
      return site->atom[k];
  return site->atom[0];
}

/* Row for any of the atoms of a site, or -1. */
static int
row_of_site (const EnlSite *site, const int *row)
{
  int found = -1;

  for (uint32_t k = 0; k < site->n_atoms; k++)
    if (found < 0 || row[site->atom[k]] > found) /* own rows stand behind the published ones */
      found = row[site->atom[k]];
  return found;
}

/* Estimates the sites for which second == `second` on `mol` (the molecule, or its anion with the
 * same atom numbers), then lets published values of that very species take over. */
static void
fill_sites (const Run *run, const EnlMolecule *mol, bool second)
{
  uint32_t n = 0;
  g_autofree uint32_t *atom = g_new (uint32_t, run->sites->n_sites + 1);
  g_autofree uint32_t *site = g_new (uint32_t, run->sites->n_sites + 1);
  g_autofree EnlPrediction *prediction = g_new0 (EnlPrediction, run->sites->n_sites + 1);
  g_autofree int *row = g_new (int, enl_molecule_atoms (mol) + 1);

  for (uint32_t i = 0; i < run->sites->n_sites; i++)
    if (run->sites->site[i].second == second) {
      atom[n] = enl_estimator_atom (mol, &run->sites->site[i]);
      site[n++] = i;
    }
  if (n == 0)
    return;
  enl_predictor_run (run->estimator->predictor, mol, atom, n, run->solvent, prediction);
  enl_reference_find_all (run->estimator->ref, mol, run->solvent, row);
  for (uint32_t k = 0; k < n; k++) {
    int published = row_of_site (&run->sites->site[site[k]], row);
    take_prediction (run, &prediction[k], &run->out[site[k]]);
    if (published >= 0)
      take_row (run, published, &run->out[site[k]]);
  }
}

/* ---- second deprotonations ---- */

/* The site that goes first: the lowest estimate among the acidic heteroatoms, else among all. */
static const EnlSite *
first_to_go (const EnlSites *sites, const EnlEstimate *estimate, double *value)
{
  const EnlSite *best = NULL;

  for (int any = 0; any < 2 && !best; any++)
    for (uint32_t i = 0; i < sites->n_sites; i++) {
      const EnlSite *site = &sites->site[i];
      if (site->second || (!any && !site->acidic_heteroatom))
        continue;
      if (!best || estimate[i].value < *value)
        best = site, *value = estimate[i].value;
    }
  return best;
}

/* The conjugate base with unchanged atom numbers, or NULL when the hydrogen is an atom of its own
 * (an isotope). */
static EnlMolecule *
conjugate_base (const EnlMolecule *mol, uint32_t atom)
{
  if (enl_molecule_atom (mol, atom)->hydrogens == 0)
    return NULL;
  EnlMolecule *base = enl_molecule_copy (mol);
  EnlAtom *a = enl_molecule_edit_atom (base, atom);
  a->hydrogens--;
  a->charge--;
  enl_molecule_finish (base);
  return base;
}

EnlMolecule *
enl_estimator_first_anion (const EnlMolecule *mol, const EnlSites *sites,
                           const EnlEstimate *estimate)
{
  double value = 0;
  const EnlSite *first = first_to_go (sites, estimate, &value);

  return first ? conjugate_base (mol, enl_estimator_atom (mol, first)) : NULL;
}

/* What the charge of the first anion costs the second hydrogen. The model learned it from anions in
 * water, for want of others; free ions in DMSO feel it more, by the ratio of the permittivities
 * (Coulomb's law). In THF a cation stays with every charge and makes up for much of it, as lithium
 * dienolates show: nothing is added there. */
static void
add_charge_cost (const Run *run, const EnlSite *site, EnlEstimate *e)
{
  uint32_t atom = enl_estimator_atom (run->mol, site);
  double more = enl_permittivity (ENL_SOLVENT_WATER) / enl_permittivity (run->solvent) - 1;
  EnlPrediction neutral;

  if (run->paired || more <= 0)
    return;
  enl_predictor_run (run->estimator->predictor, run->mol, &atom, 1, run->solvent, &neutral);
  double cost = more * MAX (e->value - neutral.value, 0);
  e->value = MIN (e->value + cost, MOST_PKA);
  widen (e, cost);
}

static void
fill_seconds (const Run *run)
{
  double floor = 0;
  const EnlSite *first = first_to_go (run->sites, run->out, &floor);
  g_autoptr (EnlMolecule) base =
      first ? conjugate_base (run->mol, enl_estimator_atom (run->mol, first)) : NULL;
  g_autofree int *row = g_new (int, enl_molecule_atoms (run->mol) + 1);

  fill_sites (run, base ? base : run->mol, true);
  enl_reference_find_all (run->estimator->ref, run->mol, run->solvent, row);
  for (uint32_t i = 0; i < run->sites->n_sites; i++) {
    const EnlSite *site = &run->sites->site[i];
    EnlEstimate *e = &run->out[i];
    if (!site->second)
      continue;
    /* A published value of the neutral molecule stands: someone measured that very hydrogen. */
    int published = row_of_site (site, row);
    if (published >= 0)
      take_row (run, published, e);
    if (e->basis != ENL_BASIS_ESTIMATED)
      continue;
    if (base)
      add_charge_cost (run, site, e);
    e->value = MAX (e->value, floor); /* a second loss is never easier than the first */
    e->outside = true;
    e->remark = base ? remark_second : remark_second_neutral;
    widen (e, base ? SECOND_SIGMA : FAR_SIGMA);
  }
}

/* Values of the scale in DMSO, on the footing that THF lacks. */
static void
move_to_thf (const EnlMolecule *mol, const EnlSites *sites, EnlEstimate *out)
{
  g_autoptr (EnlPi) pi = enl_pi_new (mol);

  for (uint32_t i = 0; i < sites->n_sites; i++) {
    const EnlFooting *footing = enl_footing_in_thf (mol, pi, &sites->site[i]);
    out[i].solvent = ENL_SOLVENT_THF;
    out[i].basis = ENL_BASIS_ESTIMATED; /* also where it was measured in DMSO */
    out[i].row = -1;
    out[i].footing = footing->sentence;
    widen (&out[i], footing->sigma);
  }
}

/* One fragment, THF on the scale of DMSO. */
static void
run_fragment (const EnlEstimator *estimator, const EnlMolecule *mol, const EnlSites *sites,
              EnlSolvent solvent, EnlEstimate *out)
{
  Run run = {
      .estimator = estimator,
      .mol = mol,
      .sites = sites,
      .solvent = solvent == ENL_SOLVENT_THF ? ENL_SOLVENT_DMSO : solvent,
      .paired = solvent == ENL_SOLVENT_THF,
      .out = out,
  };
  bool seconds = false;

  for (uint32_t i = 0; i < sites->n_sites; i++)
    seconds |= sites->site[i].second;
  fill_sites (&run, mol, false);
  if (seconds)
    fill_seconds (&run);
}

/* Each fragment of a salt or mixture by itself. */
static void
run_fragments (const EnlEstimator *estimator, const EnlMolecule *mol, const EnlSites *sites,
               EnlSolvent solvent, EnlEstimate *out)
{
  g_autofree uint32_t *fragment = g_new (uint32_t, enl_molecule_atoms (mol) + 1);
  g_autofree EnlEstimate *found = g_new0 (EnlEstimate, sites->n_sites + 1);
  uint32_t n = enl_molecule_fragments (mol, fragment);

  if (n <= 1) {
    run_fragment (estimator, mol, sites, solvent, out);
    return;
  }
  for (uint32_t f = 0; f < n; f++) {
    g_autoptr (EnlPart) part = enl_part_new (mol, sites, fragment, f);
    if (part->sites.n_sites == 0)
      continue;
    run_fragment (estimator, part->mol, &part->sites, solvent, found);
    for (uint32_t i = 0; i < part->sites.n_sites; i++)
      out[part->site_of[i]] = found[i];
  }
}

EnlStatus
enl_estimator_run (const EnlEstimator *estimator, const EnlMolecule *mol, const EnlSites *sites,
                   EnlSolvent solvent, EnlEstimate *out, EnlError *err)
{
  g_assert (solvent < ENL_N_SOLVENTS);
  if (enl_molecule_heavy_atoms (mol) > ENL_MAX_HEAVY)
    return enl_error_set (err, ENL_ERROR_LIMIT, "give a smaller structure",
                          "more than %d heavy atoms", ENL_MAX_HEAVY);
  run_fragments (estimator, mol, sites, solvent, out);
  if (solvent == ENL_SOLVENT_THF)
    move_to_thf (mol, sites, out);
  return ENL_OK;
}

/* ---- own values ---- */

/* What was measured at a site that another hydrogen precedes is the anion: `row` gets that. Fills
 * what the model makes of the site without own values. */
static EnlStatus
settle_species (const EnlEstimator *base, EnlReferenceRow *row, EnlMolecule **owned,
                EnlLabExpectation *expectation, EnlError *err)
{
  g_autoptr (EnlSites) sites = NULL;
  EnlStatus status = enl_sites_find (row->mol, &sites, err);

  if (status != ENL_OK)
    return status;
  g_autofree EnlEstimate *out = g_new0 (EnlEstimate, sites->n_sites + 1);
  const EnlSite *site = enl_sites_of_atom (sites, row->site);
  g_assert (site); /* lab.c has looked */
  row->site = enl_estimator_atom (row->mol, site);
  run_fragment (base, row->mol, sites, row->solvent, out);
  expectation->known = !out[site - sites->site].outside;
  if (!site->second)
    return ENL_OK;
  *owned = enl_estimator_first_anion (row->mol, sites, out);
  row->mol = *owned ? *owned : row->mol;
  return ENL_OK;
}

static EnlReferenceRow
row_of_entry (const EnlLabRow *row)
{
  const EnlLabEntry *e = row->entry;

  return (EnlReferenceRow){
      .name = e->name[0] ? e->name : e->structure,
      .source = e->source[0] ? e->source : "own value",
      .note = e->note,
      .pka = e->pka,
      .sigma = e->sigma,
      .solvent = e->solvent,
      .mol = row->mol,
      .site = row->site,
  };
}

static EnlReference *
extend_table (const EnlReference *published, const EnlLab *lab, EnlReferenceRow *extra)
{
  uint32_t n = enl_lab_size (lab);
  g_autofree double *sigma = g_new (double, n + 1);
  g_autoptr (EnlReference) as_typed = enl_reference_extend (published, extra, n);

  enl_lab_sigmas (lab, as_typed, sigma);
  for (uint32_t i = 0; i < n; i++)
    extra[i].sigma = sigma[i];
  return enl_reference_extend (published, extra, n);
}

static void
judge_lab (EnlEstimator *estimator, const EnlLab *lab, EnlLabExpectation *expectation)
{
  uint32_t n = enl_lab_size (lab), first = enl_reference_rows (estimator->ref) - n;
  g_autofree uint32_t *fold = g_new (uint32_t, n + 1);
  g_autofree double *value = g_new (double, n + 1);
  g_autofree double *half = g_new (double, n + 1);

  for (uint32_t i = 0; i < n; i++)
    fold[i] = enl_reference_first_alike (estimator->ref, first + i);
  enl_predictor_left_out (estimator->predictor, fold, value, half);
  for (uint32_t i = 0; i < n; i++) {
    expectation[i].value = value[i];
    expectation[i].half = half[i];
  }
  estimator->lab = enl_lab_judge (lab, estimator->ref, estimator->base->ref, expectation);
}

EnlStatus
enl_estimator_with_lab (EnlEstimator *base, const EnlLab *lab, EnlEstimator **out, EnlError *err)
{
  uint32_t n = enl_lab_size (lab);
  g_autofree EnlReferenceRow *extra = g_new0 (EnlReferenceRow, n + 1);
  g_autofree EnlLabExpectation *expectation = g_new0 (EnlLabExpectation, n + 1);
  g_autoptr (GPtrArray) anions = g_ptr_array_new_with_free_func ((GDestroyNotify)enl_molecule_free);

  g_assert (!base->lab);
  *out = n ? NULL : enl_estimator_ref (base);
  if (n == 0)
    return ENL_OK;
  for (uint32_t i = 0; i < n; i++) {
    EnlMolecule *anion = NULL;
    extra[i] = row_of_entry (enl_lab_row (lab, i));
    EnlStatus status = settle_species (base, &extra[i], &anion, &expectation[i], err);
    if (status != ENL_OK)
      return status;
    g_ptr_array_add (anions, anion);
  }
  g_autoptr (EnlEstimator) estimator = g_new0 (EnlEstimator, 1);
  g_atomic_ref_count_init (&estimator->references);
  estimator->base = enl_estimator_ref (base);
  estimator->ref = estimator->owned_ref = extend_table (base->ref, lab, extra);
  EnlStatus status =
      enl_predictor_extend (base->predictor, estimator->ref, &estimator->predictor, err);
  if (status != ENL_OK)
    return status;
  judge_lab (estimator, lab, expectation);
  *out = g_steal_pointer (&estimator);
  return ENL_OK;
}

/* ---- for explanations ---- */

double
enl_estimator_model_value (const EnlEstimator *estimator, const EnlMolecule *mol, uint32_t atom,
                           EnlSolvent solvent)
{
  EnlPrediction prediction = {0};

  enl_predictor_run (estimator->predictor, mol, &atom, 1,
                     solvent == ENL_SOLVENT_THF ? ENL_SOLVENT_DMSO : solvent, &prediction);
  return isfinite (prediction.value) ? prediction.value : MOST_PKA;
}

bool
enl_estimator_is_held (const EnlEstimate *estimate)
{
  return estimate->value == LEAST_PKA || estimate->value == MOST_PKA;
}

/* ---- ranking ---- */

typedef struct {
  double value;
  uint32_t hydrogens, atom, site;
} Place;

static int
compare_places (const void *a, const void *b)
{
  const Place *x = a, *y = b;

  if (x->value != y->value)
    return x->value < y->value ? -1 : 1;
  if (x->hydrogens != y->hydrogens)
    return x->hydrogens > y->hydrogens ? -1 : 1;
  return (x->atom > y->atom) - (x->atom < y->atom);
}

void
enl_estimates_rank (const EnlSites *sites, const EnlEstimate *estimate, uint32_t *rank)
{
  g_autofree Place *place = g_new (Place, sites->n_sites + 1);

  for (uint32_t i = 0; i < sites->n_sites; i++)
    place[i] = (Place){estimate[i].value, sites->site[i].hydrogens, sites->site[i].atom[0], i};
  qsort (place, sites->n_sites, sizeof *place, compare_places);
  for (uint32_t i = 0; i < sites->n_sites; i++)
    rank[i] = place[i].site;
}
