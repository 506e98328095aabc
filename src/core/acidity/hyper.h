/* Hyperparameters of the model by name (resources/estimator.tsv, made by `enolith-fit tune`). */
#pragma once

#include "core/acidity/descriptor.h"

/* All are positive. Variances in pK units squared; see kernel.h for what they scale. */
enum {
  ENL_H_noise,
  ENL_H_linear_common,
  ENL_H_linear_element,
  ENL_H_linear_solvent,
  ENL_H_smooth_common,
  ENL_H_smooth_element,
  ENL_H_smooth_solvent, /* solvent-specific share, relative to the common one */
  ENL_H_smooth_length,
  ENL_H_smooth_shape,
  ENL_H_relevance, /* of every descriptor in the smooth part */
  ENL_N_HYPER = ENL_H_relevance + ENL_N_DESCRIPTORS
};

typedef struct {
  double value[ENL_N_HYPER];
} EnlHyper;

/* The values that tuning starts from and is drawn towards. */
void enl_hyper_init (EnlHyper *hyper);

/* "noise", "smooth_length", "relevance.gain" ...; new string (g_free). */
char *enl_hyper_name (uint32_t index) ENL_MUST_USE;

/* Reads rows `name value`; a name that is not listed keeps its starting value, an unknown name or a
 * value that is not positive is an ENL_ERROR_FORMAT with its line. */
EnlStatus enl_hyper_parse (const char *text, size_t size, EnlHyper *out,
                           EnlError *err) ENL_MUST_USE;
