/* The fitted model: from the table of acids to numbers, and to and from its file.
 *
 * File (native byte order, made at build time by `enolith-fit build` and carried in the program):
 * a header with magic, version, byte order mark, sizes, the checksum of the table of acids and that
 * of what follows; then the arrays one after the other. Any disagreement is an ENL_ERROR_FORMAT.
 */
#pragma once

#include "core/acidity/kernel.h"
#include "core/acidity/reference.h"

/* Classes of acid for which intervals are calibrated and scores are given. */
typedef enum {
  ENL_CLASS_ALPHA,    /* C-H on a carbon next to C=O */
  ENL_CLASS_CARBON,   /* any other C-H */
  ENL_CLASS_NITROGEN, /* N-H, cations included */
  ENL_CLASS_OXYGEN,
  ENL_CLASS_CHALCOGEN, /* S-H and the like; also what has no class of its own */
  ENL_N_CLASSES
} EnlAcidClass;

/* "alpha C-H", "other C-H", "N-H", "O-H", "S-H"; static. */
const char *enl_acid_class_text (EnlAcidClass class_of);

EnlAcidClass enl_acid_class (const EnlMolecule *mol, uint32_t atom);

#define ENL_MODEL_SOLVENTS 2 /* DMSO, water */

/* pKa that the model expects before it has seen anything; the free constants of the kernel make
 * up for its arbitrariness. */
#define ENL_PRIOR_PKA 20.0

typedef struct {
  EnlHyper hyper;
  EnlRelevance relevance;
  double centre[ENL_N_DESCRIPTORS], scale[ENL_N_DESCRIPTORS];
  EnlSiteSet *rows;                 /* as in the table, standardised */
  const double *factor;             /* packed Cholesky factor of the covariance with noise */
  const double *alpha;              /* inverse covariance times (pKa - ENL_PRIOR_PKA) */
  void *owned_factor, *owned_alpha; /* NULL where they stand in the bytes of an opened file */
  /* Half width of the 90 % interval in units of the model's standard deviation, so that left-out
   * compounds of the class fall inside nine times of ten. */
  double width[ENL_N_CLASSES][ENL_MODEL_SOLVENTS];
} EnlModel;

/* Fits to the whole table; ENL_ERROR_NUMERIC when the covariance cannot be factored. */
EnlStatus enl_model_build (const EnlReference *ref, const EnlHyper *hyper, EnlModel **out,
                           EnlError *err) ENL_MUST_USE;
/* The model of `base` conditioned on further rows as well: `ref` is its table with rows of a user
 * behind (enl_reference_extend). Hyperparameters, centre, scale and calibration stay, and the new
 * rows enter with their own sigma as noise like all others, so the result is that of fitting the
 * whole table on the same footing. Copies what it needs. */
EnlStatus enl_model_extend (const EnlModel *base, const EnlReference *ref, EnlModel **out,
                            EnlError *err) ENL_MUST_USE;
void enl_model_free (EnlModel *model);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlModel, enl_model_free)

/* Describes all rows of the table: raw descriptors, linked. */
EnlStatus enl_model_describe (const EnlReference *ref, EnlSiteSet **out,
                              EnlError *err) ENL_MUST_USE;
/* Mean and standard deviation of every raw descriptor (0 where it does not vary). */
void enl_model_moments (const EnlSiteSet *raw, double *centre, double *scale);

/* Variance of a published value about the model. */
double enl_model_row_noise (const EnlModel *model, const EnlReferenceRow *row);

/* Fills fold[row]: rows of one compound, in whatever solvent and for whatever site, share one. */
void enl_model_compound_folds (const EnlReference *ref, uint32_t *fold);

/* Left-out errors (predicted - published) and standard deviations for any folds. */
void enl_model_left_out (const EnlModel *model, const uint32_t *fold, double *error, double *sd);

/* What the model says at its own rows: the smoothed value, not the published one. */
void enl_model_fitted (const EnlModel *model, const EnlReference *ref, double *value);

/* Half width, in standard deviations, that holds nine tenths of the rows for which `use` is true
 * and which are not in `skip_fold` (ENL_NONE: none); NAN below `at_least` rows. */
double enl_model_width_of (const double *error, const double *sd, const bool *use,
                           const uint32_t *fold, uint32_t skip_fold, uint32_t n, uint32_t at_least);

/* The file, in a new byte array. */
GByteArray *enl_model_write (const EnlModel *model, const EnlReference *ref) ENL_MUST_USE;
/* Reads it again; `ref` must be the table it was made from. Large arrays stay where they are:
 * `bytes` must outlive the model. */
EnlStatus enl_model_open (const EnlReference *ref, const char *bytes, size_t size, EnlModel **out,
                          EnlError *err) ENL_MUST_USE;
