/* A pKa with its uncertainty and its origin. */
#pragma once

#include <stdbool.h>
#include <stdint.h>

typedef enum { ENL_SOLVENT_DMSO, ENL_SOLVENT_WATER, ENL_SOLVENT_THF, ENL_N_SOLVENTS } EnlSolvent;

/* "dmso", "water", "thf": the words of files and of the terminal. */
const char *enl_solvent_id (EnlSolvent solvent);
/* "DMSO", "water", "THF": the words of the screen. */
const char *enl_solvent_label (EnlSolvent solvent);
/* "DMSO", "water", "THF (DMSO-based footing)": where pKa values stand below or beside. */
const char *enl_solvent_heading (EnlSolvent solvent);
/* False for an unknown word; case does not matter. */
bool enl_solvent_parse (const char *text, EnlSolvent *out);

typedef enum {
  ENL_BASIS_MEASURED,
  ENL_BASIS_LAB,
  ENL_BASIS_ESTIMATED,
  ENL_N_BASES_OF_VALUE
} EnlBasis;

/* "measured", "lab", "estimated". */
const char *enl_basis_text (EnlBasis basis);

#define ENL_MAX_PRECEDENTS 5

typedef struct {
  uint32_t row;    /* of the reference table (enl_reference_...) */
  double weight;   /* share in the smooth part of the estimate, 0..1 */
  double likeness; /* of the surroundings of the acidic atoms, 0..1 */
} EnlPrecedent;

/* pK units at 25 °C, uncorrected for statistical factors as published. `low`..`high` is the 90 %
 * interval, `sigma` ONE standard deviation. */
typedef struct {
  double value, low, high, sigma;
  EnlSolvent solvent;
  EnlBasis basis;
  int row;             /* of the reference table when measured or the user's own, else -1 */
  bool outside;        /* outside the experience of the model: see `remark` */
  const char *remark;  /* sentence or NULL: second deprotonation, outside, contradictory own values;
                          static, or owned by the estimator */
  const char *footing; /* static sentence in THF: on what footing the value stands; else NULL */
  EnlPrecedent precedent[ENL_MAX_PRECEDENTS]; /* largest weight first; for a measured or own
                                                 value the first one is the row itself with
                                                 weight 1 */
  uint32_t n_precedents;
} EnlEstimate;
