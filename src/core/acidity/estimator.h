/* The fitted model: pKa of a site with an honest interval.
 *
 * A Gaussian process over physical descriptors and atom environments, fitted ahead on the
 * reference table (Rasmussen & Williams, Gaussian Processes for Machine Learning, 2006, ch. 2, 5).
 */
#pragma once

#include "core/acidity/lab-judge.h"
#include "core/acidity/reference.h"
#include "core/acidity/site.h"

typedef struct EnlEstimator EnlEstimator;

/* Opens a fitted model of `size` bytes made by enolith-fit from the same reference table
 * (ENL_ERROR_FORMAT otherwise). Borrows `ref` and `bytes`: both must outlive the estimator. */
EnlStatus enl_estimator_open (const EnlReference *ref, const char *bytes, size_t size,
                              EnlEstimator **out, EnlError *err) ENL_MUST_USE;
/* The estimator of `base`, conditioned on own values as well: they stand at their sites, shift what
 * resembles them and lead the precedents. `base`, itself without own values, stays as it is and is
 * held; without a row in `lab` the result is `base` again. An own value for a site that another
 * hydrogen precedes is that of the anion. `lab` need not outlive it. Thread-safe. */
EnlStatus enl_estimator_with_lab (EnlEstimator *base, const EnlLab *lab, EnlEstimator **out,
                                  EnlError *err) ENL_MUST_USE;
EnlEstimator *enl_estimator_ref (EnlEstimator *estimator);
/* Gives back one reference; the last one frees. NULL allowed. */
void enl_estimator_free (EnlEstimator *estimator);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlEstimator, enl_estimator_free)

/* The table in which its row numbers count: published rows, then own ones. Borrowed. */
const EnlReference *enl_estimator_reference (const EnlEstimator *estimator);
/* What the own values say together, borrowed; NULL when there are none. */
const EnlLabJudgement *enl_estimator_lab (const EnlEstimator *estimator);

/* Estimates every site of a molecule in one solvent; `out` has sites->n_sites places. A site with
 * an own value gets that, one that the table holds the measured value. In THF the DMSO-based value
 * is given with a wider interval, and the footing is named (footing.h).
 * Each fragment of a salt or mixture is taken by itself. Thread-safe: touches no shared state. */
EnlStatus enl_estimator_run (const EnlEstimator *estimator, const EnlMolecule *mol,
                             const EnlSites *sites, EnlSolvent solvent, EnlEstimate *out,
                             EnlError *err) ENL_MUST_USE;

/* ---- what an explanation asks (why.h) ---- */

/* The atom that stands for a site. Where mesomerism makes several atoms one site it is the one that
 * carries the charge as drawn, as in the rows of the table: the N of C=NH2+ in an amidinium ion. */
uint32_t enl_estimator_atom (const EnlMolecule *mol, const EnlSite *site);
/* What the model alone says of a hydrogen-bearing `atom` of a molecule of one fragment: published
 * values are left aside; THF is the scale in DMSO. pK units, finite. */
double enl_estimator_model_value (const EnlEstimator *estimator, const EnlMolecule *mol,
                                  uint32_t atom, EnlSolvent solvent);
/* The anion, atoms numbered as in `mol`, for which the sites marked `second` of a molecule of one
 * fragment were estimated; NULL when it was the molecule itself. Caller: enl_molecule_free. */
EnlMolecule *enl_estimator_first_anion (const EnlMolecule *mol, const EnlSites *sites,
                                        const EnlEstimate *estimate) ENL_MUST_USE;
/* The value was held at an end of the scale because the model runs off it. */
bool enl_estimator_is_held (const EnlEstimate *estimate);

/* Order of the sites by rising pKa (ties: more hydrogens first, then atom); fills rank[n_sites]
 * with site indices, most acidic first. */
void enl_estimates_rank (const EnlSites *sites, const EnlEstimate *estimate, uint32_t *rank);
