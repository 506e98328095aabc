/* A model on trial: the closed form of leaving out, row by row, for the files that judge it. */
#pragma once

#include "core/acidity/model.h"
#include "core/acidity/validate.h"

typedef struct {
  const EnlReference *ref;
  EnlModel *model;
  uint32_t n;
  uint32_t *fold; /* rows with the same number leave together */
  EnlAcidClass *class_of;
  double *error; /* predicted - published when the fold is left out */
  double *sd;    /* as the model states it, before calibration */
  double *half;  /* half width of the 90 % interval; NAN when it cannot be calibrated */
} EnlTrial;

/* As enl_validate; `ref` must outlive the trial. */
EnlStatus enl_trial_new (const EnlReference *ref, const char *model_bytes, size_t size,
                         EnlFold fold, EnlTrial **out, EnlError *err) ENL_MUST_USE;
void enl_trial_free (EnlTrial *trial);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlTrial, enl_trial_free)
