#include "core/acidity/predict.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "core/acidity/gaussian.h"
#include "core/acidity/group.h"
#include "core/acidity/kinship.h"
#include "core/molecule/elements.h"

/* Uncertainty that a new measurement would have by itself: as most rows of the table. */
#define PUBLISHED_SIGMA 0.2
/* Share of the prior variance of the smooth parts that may be left before a site counts as unlike
 * anything measured. */
#define NOVEL_SHARE 0.75
/* Precedents weigh at least this much. */
#define LEAST_WEIGHT 0.01
/* Precedents are at least so alike (kinship.h). Over all pairs of different compounds of the table
 * with the acidic hydrogen on one element and measured in one solvent, published values differ by
 * 7.6 units on average when nothing is alike and still by 6.5 at a likeness of 0.60 to 0.65; then
 * by 5.8, and from 0.70 on by 2.7 and less: from here on one tells about the other. */
#define LEAST_LIKENESS 0.65

/* Published values of the acids of one element in one solvent, from lowest to highest. */
typedef struct {
  double lowest, highest;
} Span;

struct EnlPredictor {
  const EnlReference *ref;
  const EnlConstants *constants;
  EnlConstants *owned_constants; /* NULL: those of the predictor that this one extends */
  EnlModel *model;
  bool site_seen[ENL_N_ELEMENTS]; /* elements of acidic atoms in the table */
  bool seen[ENL_N_ELEMENTS];      /* elements anywhere in its molecules */
  bool beside[ENL_N_GROUPS];      /* groups next to an acidic carbon of the table */
  uint32_t *compound;             /* first row of the compound of every row */
  Span span[ENL_N_CLASSES][ENL_MODEL_SOLVENTS];
  EnlKin *kin; /* of every row */
};

/* C-H acids share one span. */
static EnlAcidClass
class_of_span (const EnlMolecule *mol, uint32_t atom)
{
  EnlAcidClass class_of = enl_acid_class (mol, atom);

  return class_of == ENL_CLASS_ALPHA ? ENL_CLASS_CARBON : class_of;
}

static void
note_span (EnlPredictor *predictor, const EnlReferenceRow *row)
{
  Span *span = &predictor->span[class_of_span (row->mol, row->site)][row->solvent];

  span->lowest = MIN (span->lowest, row->pka);
  span->highest = MAX (span->highest, row->pka);
}

static void
note_experience (EnlPredictor *predictor, const EnlReferenceRow *row)
{
  uint8_t element = enl_molecule_atom (row->mol, row->site)->element;

  predictor->site_seen[element] = true;
  for (uint32_t k = 0; k < enl_molecule_atoms (row->mol); k++)
    predictor->seen[enl_molecule_atom (row->mol, k)->element] = true;
  for (uint32_t k = 0; element == 6 && k < enl_molecule_degree (row->mol, row->site); k++)
    predictor->beside[enl_group_of (row->mol, enl_molecule_neighbour (row->mol, row->site, k))] =
        true;
}

/* Notes compounds and experience of the rows from number `first` on. */
static void
note_rows (EnlPredictor *predictor, uint32_t first)
{
  uint32_t n = enl_reference_rows (predictor->ref);

  predictor->compound = g_new (uint32_t, n + 1);
  enl_model_compound_folds (predictor->ref, predictor->compound);
  predictor->kin = g_renew (EnlKin, predictor->kin, n + 1);
  for (uint32_t i = first; i < n; i++) {
    const EnlReferenceRow *row = enl_reference_row (predictor->ref, i);
    note_experience (predictor, row);
    note_span (predictor, row);
    enl_kin_describe (row->mol, row->site, &predictor->kin[i]);
  }
}

EnlStatus
enl_predictor_open (const EnlReference *ref, const char *bytes, size_t size, EnlPredictor **out,
                    EnlError *err)
{
  g_autoptr (EnlPredictor) predictor = g_new0 (EnlPredictor, 1);
  EnlStatus status;

  *out = NULL;
  predictor->ref = ref;
  if ((status = enl_model_open (ref, bytes, size, &predictor->model, err)) != ENL_OK ||
      (status = enl_constants_new (&predictor->owned_constants, err)) != ENL_OK)
    return status;
  predictor->constants = predictor->owned_constants;
  for (int i = 0; i < ENL_N_CLASSES * ENL_MODEL_SOLVENTS; i++)
    predictor->span[i / ENL_MODEL_SOLVENTS][i % ENL_MODEL_SOLVENTS] = (Span){HUGE_VAL, -HUGE_VAL};
  note_rows (predictor, 0);
  predictor->seen[1] = true;
  *out = g_steal_pointer (&predictor);
  return ENL_OK;
}

EnlStatus
enl_predictor_extend (const EnlPredictor *base, const EnlReference *ref, EnlPredictor **out,
                      EnlError *err)
{
  g_autoptr (EnlPredictor) predictor = g_memdup2 (base, sizeof *base);

  *out = NULL;
  predictor->ref = ref;
  predictor->owned_constants = NULL;
  predictor->compound = NULL;
  predictor->kin = g_memdup2 (base->kin, base->model->rows->n * sizeof *base->kin);
  predictor->model = NULL;
  EnlStatus status = enl_model_extend (base->model, ref, &predictor->model, err);
  if (status != ENL_OK)
    return status;
  note_rows (predictor, base->model->rows->n);
  *out = g_steal_pointer (&predictor);
  return ENL_OK;
}

void
enl_predictor_free (EnlPredictor *predictor)
{
  if (!predictor)
    return;
  enl_model_free (predictor->model);
  enl_constants_free (predictor->owned_constants);
  g_free (predictor->compound);
  g_free (predictor->kin);
  g_free (predictor);
}

/* ---- one molecule ---- */

typedef struct {
  const EnlPredictor *predictor;
  EnlSiteSet *sites;
  uint32_t n, m;    /* rows of the table, sites */
  double *k;        /* covariance of every row with every site, m x n */
  double *alike;    /* its smooth parts as a share of the prior ones, m x n */
  double *weight;   /* weight of every row in the prediction of every site, m x n */
  double *prior;    /* variance of each site before anything is known */
  double *smooth;   /* that of the smooth parts alone */
  double *variance; /* variance that is left */
} Batch;

static void
batch_clear (Batch *batch)
{
  enl_site_set_free (batch->sites);
  g_free (batch->k);
  g_free (batch->alike);
  g_free (batch->weight);
  g_free (batch->prior);
  g_free (batch->smooth);
  g_free (batch->variance);
}

static void
describe (Batch *batch, const EnlMolecule *mol, const uint32_t *atom, EnlSolvent solvent)
{
  const EnlModel *model = batch->predictor->model;
  g_autoptr (EnlSurvey) survey = enl_survey_new (mol, batch->predictor->constants);
  g_autoptr (EnlPi) pi = enl_pi_new (mol);

  batch->sites = enl_site_set_new (batch->m);
  for (uint32_t s = 0; s < batch->m; s++)
    enl_site_set_describe (batch->sites, s, survey, pi, atom[s], solvent);
  enl_site_set_link (batch->sites);
  enl_site_set_standardise (batch->sites, model->centre, model->scale);
}

static void
fill_covariance (Batch *batch)
{
  const EnlModel *model = batch->predictor->model;
  EnlKernelParts parts;

  for (uint32_t s = 0; s < batch->m; s++) {
    enl_kernel_pair (&model->relevance, batch->sites, s, batch->sites, s, &parts);
    batch->smooth[s] = enl_kernel_smooth (&model->hyper, &parts);
    batch->prior[s] = enl_kernel_linear (&model->hyper, &parts) + batch->smooth[s];
    for (uint32_t i = 0; i < batch->n; i++) {
      size_t at = (size_t)s * batch->n + i;
      enl_kernel_pair (&model->relevance, batch->sites, s, model->rows, i, &parts);
      double smooth = enl_kernel_smooth (&model->hyper, &parts);
      batch->k[at] = enl_kernel_linear (&model->hyper, &parts) + smooth;
      batch->alike[at] = smooth / batch->smooth[s];
    }
  }
}

/* Forward substitution gives the variance that is left; the backward one the weight with which
 * every published value enters. */
static void
solve (Batch *batch)
{
  const EnlModel *model = batch->predictor->model;
  size_t total = (size_t)batch->n * batch->m;

  batch->weight = g_new (double, total + 1);
  memcpy (batch->weight, batch->k, total * sizeof (double));
  enl_gaussian_forward (model->factor, batch->n, batch->weight, batch->m);
  for (uint32_t s = 0; s < batch->m; s++) {
    const double *part = batch->weight + (size_t)s * batch->n;
    batch->variance[s] = batch->prior[s] - enl_gaussian_dot (part, part, batch->n);
  }
  enl_gaussian_backward (model->factor, batch->n, batch->weight, batch->m);
}

/* ---- precedents ---- */

/* Puts `candidate` into its place among the heaviest so far; a compound keeps its heavier row. */
static void
offer (const EnlPredictor *predictor, EnlPrediction *out, EnlPrecedent candidate)
{
  EnlPrecedent *list = out->precedent;
  uint32_t n = out->n_precedents, at;

  for (at = 0; at < n; at++)
    if (predictor->compound[list[at].row] == predictor->compound[candidate.row]) {
      if (list[at].weight >= candidate.weight)
        return;
      memmove (list + at, list + at + 1, (n - at - 1) * sizeof *list);
      n--;
      break;
    }
  for (at = n; at > 0 && list[at - 1].weight < candidate.weight; at--)
    ;
  if (at == ENL_MAX_PRECEDENTS)
    return;
  n = MIN (n, ENL_MAX_PRECEDENTS - 1);
  memmove (list + at + 1, list + at, (n - at) * sizeof *list);
  list[at] = candidate;
  out->n_precedents = n + 1;
}

/* Rows that are both alike and influential: weight in the prediction times likeness of the smooth
 * parts, as a share of all such products; among them those that a chemist would call alike. Of one
 * compound in two solvents the heavier row stands for both. */
static void
pick_precedents (const Batch *batch, uint32_t s, const EnlKin *kin, EnlPrediction *out)
{
  const EnlPredictor *predictor = batch->predictor;
  const double *weight = batch->weight + (size_t)s * batch->n;
  const double *alike = batch->alike + (size_t)s * batch->n;
  double sum = 0;

  out->n_precedents = 0;
  for (uint32_t i = 0; i < batch->n; i++) {
    double share = MAX (weight[i], 0) * alike[i];
    sum += share;
    if (share <= 0)
      continue;
    double likeness = enl_kin_likeness (kin, &batch->sites->shells[s], &predictor->kin[i],
                                        &predictor->model->rows->shells[i]);
    if (likeness >= LEAST_LIKENESS)
      offer (predictor, out, (EnlPrecedent){i, share, likeness});
  }
  while (out->n_precedents && out->precedent[out->n_precedents - 1].weight < LEAST_WEIGHT * sum)
    out->n_precedents--;
  for (uint32_t k = 0; k < out->n_precedents; k++)
    out->precedent[k].weight /= sum;
}

/* ---- experience ---- */

static const char *
strangeness (const Batch *batch, const EnlMolecule *mol, uint32_t atom, EnlSolvent solvent,
             uint32_t s, double value)
{
  const EnlPredictor *predictor = batch->predictor;
  const Span *span = &predictor->span[class_of_span (mol, atom)][solvent];
  double left = batch->variance[s] / batch->smooth[s];

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    const EnlAtom *a = enl_molecule_atom (mol, i);
    if (a->unpaired)
      return "outside its experience: no radical was measured";
    if (a->element == 6 && a->charge > 0 && !a->aromatic)
      return "outside its experience: no carbocation was measured";
    if (!predictor->seen[a->element])
      return "outside its experience: no acid with this element was measured";
  }
  if (!predictor->site_seen[enl_molecule_atom (mol, atom)->element])
    return "outside its experience: no hydrogen on this element was measured";
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    EnlGroup group = enl_group_of (mol, enl_molecule_neighbour (mol, atom, k));
    if (enl_molecule_atom (mol, atom)->element == 6 && enl_group_is_acceptor (group) &&
        !predictor->beside[group])
      return "outside its experience: no hydrogen beside this group was measured";
  }
  if (left > NOVEL_SHARE)
    return "outside its experience: nothing alike was measured";
  if (value > span->highest)
    return "outside its experience: weaker than every acid of this kind that was measured";
  if (value < span->lowest)
    return "outside its experience: stronger than every acid of this kind that was measured";
  return NULL;
}

/* Half width of the 90 % interval for a new measurement at `atom`, from the variance that is
 * left in the model. */
static double
half_width (const EnlModel *model, const EnlMolecule *mol, uint32_t atom, EnlSolvent solvent,
            double left)
{
  double variance =
      MAX (left, 0) + model->hyper.value[ENL_H_noise] + PUBLISHED_SIGMA * PUBLISHED_SIGMA;

  return sqrt (variance) * model->width[enl_acid_class (mol, atom)][solvent];
}

/* The block of the inverse covariance that belongs to the last rows is the inverse of the lower
 * right block of the factor times its transpose: the closed form of leaving out needs no more. */
void
enl_predictor_left_out (const EnlPredictor *predictor, const uint32_t *fold, double *value,
                        double *half)
{
  const EnlModel *model = predictor->model;
  uint32_t n = model->rows->n, first = n;

  while (first > 0 && enl_reference_row (predictor->ref, first - 1)->lab)
    first--;
  uint32_t m = n - first;
  g_autofree double *block = g_new (double, ENL_PACKED (m, 0) + 1);
  for (uint32_t i = 0; i < m; i++)
    memcpy (block + ENL_PACKED (i, 0), model->factor + ENL_PACKED (first + i, first),
            (i + 1) * sizeof *block);
  g_autofree double *inverse = enl_gaussian_inverse (block, m);
  enl_gaussian_left_out (inverse, model->alpha + first, m, fold, value, half);
  for (uint32_t i = 0; i < m; i++) {
    const EnlReferenceRow *row = enl_reference_row (predictor->ref, first + i);
    double left = half[i] - enl_model_row_noise (model, row);
    value[i] += row->pka;
    half[i] = half_width (model, row->mol, row->site, row->solvent, left);
  }
}

void
enl_predictor_run (const EnlPredictor *predictor, const EnlMolecule *mol, const uint32_t *atom,
                   uint32_t n, EnlSolvent solvent, EnlPrediction *out)
{
  const EnlModel *model = predictor->model;
  Batch batch = {.predictor = predictor, .n = model->rows->n, .m = n};

  g_assert (solvent == ENL_SOLVENT_DMSO || solvent == ENL_SOLVENT_WATER);
  if (n == 0)
    return;
  batch.k = g_new (double, (size_t)batch.n *n + 1);
  batch.alike = g_new (double, (size_t)batch.n *n + 1);
  batch.prior = g_new (double, n);
  batch.smooth = g_new (double, n);
  batch.variance = g_new (double, n);
  describe (&batch, mol, atom, solvent);
  fill_covariance (&batch);
  solve (&batch);
  for (uint32_t s = 0; s < n; s++) {
    double value =
        ENL_PRIOR_PKA + enl_gaussian_dot (batch.k + (size_t)s * batch.n, model->alpha, batch.n);
    out[s] = (EnlPrediction){
        .value = value,
        .half = half_width (model, mol, atom[s], solvent, batch.variance[s]),
        .outside = strangeness (&batch, mol, atom[s], solvent, s, value),
    };
    EnlKin kin;
    enl_kin_describe (mol, atom[s], &kin);
    pick_precedents (&batch, s, &kin, &out[s]);
  }
  batch_clear (&batch);
}
