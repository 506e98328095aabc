/* The covariance of two sites.
 *
 *   k = offset + linear + smooth
 *
 * offset  a constant for all, for the element, for the element in its solvent
 * linear  products of the (standardised) descriptors: effects that add up
 * smooth  (1 + r^2 / (2 shape length^2))^-shape of the same descriptors, each with a relevance of
 *         its own: how effects change with what they act on. The rational quadratic kernel, a
 *         mixture of Gaussian ones of all lengths
 *
 * Every part has a share that all elements and solvents have in common and one of its own for each:
 * the simplest case of a coregionalised process (Rasmussen and Williams, Gaussian Processes for
 * Machine Learning, 2006, ch. 4.2 for the kernels, ch. 5.1 for the relevances, ch. 9.1 for several
 * outputs).
 */
#pragma once

#include "core/acidity/estimate.h"
#include "core/acidity/hyper.h"
#include "core/acidity/shells.h"

/* Prior variance of each of the constants: wide enough to be free, (20 pK units)^2. */
#define ENL_OFFSET_VARIANCE 400.0
/* Standardised descriptors are held within this many standard deviations. */
#define ENL_DESCRIPTOR_CLIP 10.0

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
  float smooth[ENL_N_DESCRIPTORS];
} EnlRelevance;

void enl_relevance_init (EnlRelevance *relevance, const EnlHyper *hyper);

/* What the covariance of one pair is made of. */
typedef struct {
  double linear, square; /* mean product and weighted squared distance of the descriptors */
  bool same_element, same_solvent;
} EnlKernelParts;

/* Both sets must be standardised. */
void enl_kernel_pair (const EnlRelevance *relevance, const EnlSiteSet *a, uint32_t i,
                      const EnlSiteSet *b, uint32_t j, EnlKernelParts *parts);
/* The shares of the linear and of the smooth part that a pair has in common. */
double enl_kernel_linear_share (const EnlHyper *hyper, const EnlKernelParts *parts);
double enl_kernel_smooth_share (const EnlHyper *hyper, const EnlKernelParts *parts);
/* The offset with the linear part, and the smooth part: their sum is the covariance. */
double enl_kernel_linear (const EnlHyper *hyper, const EnlKernelParts *parts);
double enl_kernel_smooth (const EnlHyper *hyper, const EnlKernelParts *parts);
/* The whole covariance, without noise. */
double enl_kernel_value (const EnlHyper *hyper, const EnlKernelParts *parts);
