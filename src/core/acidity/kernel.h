/* The covariance of two sites.
 *
 *   k = offset + linear + smooth + environment
 *
 * offset       a constant for all, for the element, for the element in its solvent
 * linear       products of the (standardised) descriptors, weighted by their relevance
 * smooth       exp (-distance / length) of the same descriptors
 * environment  exp (-(1 - likeness) * decay) of the atom shells, within one element
 *
 * Every part has a share that all solvents have in common and one of its own for each solvent: the
 * simplest case of a coregionalised process (Rasmussen and Williams, Gaussian Processes for
 * Machine Learning, 2006, ch. 4 for the kernels, ch. 9.1 for several outputs).
 */
#pragma once

#include "core/acidity/estimate.h"
#include "core/acidity/hyper.h"

/* Prior variance of each of the constants: wide enough to be free, (20 pK units)^2. */
#define ENL_OFFSET_VARIANCE 400.0
/* Standardised descriptors are held within this many standard deviations. */
#define ENL_DESCRIPTOR_CLIP 4.0

/* Many sites with what the kernel needs of them. Owned arrays unless said otherwise. */
typedef struct {
  uint32_t n;
  const float *z;    /* n x ENL_N_DESCRIPTORS: raw, then standardised */
  float *owned_z;    /* the same, or NULL when they stand in the bytes of a model file */
  EnlShells *shells; /* their marks stand in `marks` */
  GArray *marks;
  uint8_t *element, *solvent;
} EnlSiteSet;

/* With zeros for descriptors. */
EnlSiteSet *enl_site_set_new (uint32_t n) ENL_MUST_USE;
void enl_site_set_free (EnlSiteSet *set);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlSiteSet, enl_site_set_free)

/* Describes `atom` of the survey's molecule as entry `index`; descriptors are stored raw. Call
 * enl_site_set_link after the last entry. */
void enl_site_set_describe (EnlSiteSet *set, uint32_t index, EnlSurvey *survey, const EnlPi *pi,
                            uint32_t atom, EnlSolvent solvent);
void enl_site_set_link (EnlSiteSet *set);

/* The entries of `a`, then those of `b`, in a new set; both are linked. */
EnlSiteSet *enl_site_set_join (const EnlSiteSet *a, const EnlSiteSet *b) ENL_MUST_USE;

/* Standardises z in place: (z - centre) / scale, clipped; descriptors of scale 0 become 0. */
void enl_site_set_standardise (EnlSiteSet *set, const double *centre, const double *scale);

/* The relevances as the kernel uses them. */
typedef struct {
  float linear[ENL_N_DESCRIPTORS], smooth[ENL_N_DESCRIPTORS];
} EnlRelevance;

void enl_relevance_init (EnlRelevance *relevance, const EnlHyper *hyper);

/* What the covariance of one pair is made of. */
typedef struct {
  double linear, distance, likeness;
  bool same_element, same_solvent;
} EnlKernelParts;

/* Fills all but the likeness; both sets must be standardised. */
void enl_kernel_pair (const EnlRelevance *relevance, const EnlSiteSet *a, uint32_t i,
                      const EnlSiteSet *b, uint32_t j, EnlKernelParts *parts);
/* The shells' likeness by their weights. */
double enl_kernel_likeness (const EnlHyper *hyper, const double likeness[ENL_N_SHELLS]);
/* Both of them. */
void enl_kernel_parts (const EnlHyper *hyper, const EnlRelevance *relevance, const EnlSiteSet *a,
                       uint32_t i, const EnlSiteSet *b, uint32_t j, EnlKernelParts *parts);
double enl_kernel_smooth (const EnlHyper *hyper, const EnlKernelParts *parts);
double enl_kernel_environment (const EnlHyper *hyper, const EnlKernelParts *parts);
/* The whole covariance, without noise. */
double enl_kernel_value (const EnlHyper *hyper, const EnlKernelParts *parts);
