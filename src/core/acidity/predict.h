/* What the fitted model says about sites of a molecule, before tables and footings come in. */
#pragma once

#include "core/acidity/model.h"

typedef struct {
  double value;        /* pK units */
  double half;         /* half width of the 90 % interval, calibrated */
  const char *outside; /* why the model has no experience here (static), or NULL */
  EnlPrecedent precedent[ENL_MAX_PRECEDENTS];
  uint32_t n_precedents;
} EnlPrediction;

typedef struct EnlPredictor EnlPredictor;

/* As enl_estimator_open. */
EnlStatus enl_predictor_open (const EnlReference *ref, const char *bytes, size_t size,
                              EnlPredictor **out, EnlError *err) ENL_MUST_USE;
/* The predictor of `base` conditioned on the further rows of `ref` (enl_reference_extend) as well.
 * `base` and `ref` are borrowed and must outlive it. */
EnlStatus enl_predictor_extend (const EnlPredictor *base, const EnlReference *ref,
                                EnlPredictor **out, EnlError *err) ENL_MUST_USE;
void enl_predictor_free (EnlPredictor *predictor);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlPredictor, enl_predictor_free)

/* What an extended predictor would say about its own further rows if it did not know them. Rows
 * with the same number in `fold` leave together; all arrays have one place for each further row.
 * Fills value and half, the half width of the 90 % interval, as enl_predictor_run. */
void enl_predictor_left_out (const EnlPredictor *predictor, const uint32_t *fold, double *value,
                             double *half);

/* Predicts `n` hydrogen-bearing atoms of one molecule in DMSO or water. Thread-safe. */
void enl_predictor_run (const EnlPredictor *predictor, const EnlMolecule *mol, const uint32_t *atom,
                        uint32_t n, EnlSolvent solvent, EnlPrediction *out);
