/* What own values say together: combined where they agree, reported where they do not.
 *
 * Values of one site in one solvent agree when no two of them differ by more than twice their
 * combined sigma. Agreeing values are combined with weights 1 / sigma^2, and the site says how many
 * there are. Of contradictory values one is shown (the smallest sigma, then the first) with an
 * interval that covers all, and their pull on the neighbours is weakened by the ratio of Birge
 * (Phys. Rev. 1932, 40, 207): the spread found over the spread that their sigmas promise.
 */
#pragma once

#include "core/acidity/lab.h"
#include "core/acidity/reference.h"

typedef struct {
  double value, low, high, sigma; /* as in EnlEstimate */
  uint32_t shown;                 /* row of the lab whose value is shown, the first when combined */
  uint32_t n;                     /* how many values there are */
  bool contradicts;               /* each other, or the published value */
  char *remark; /* one sentence without full stop; NULL when there is nothing to say */
} EnlLabSite;

typedef struct {
  EnlLabSite *site;
  uint32_t n_sites;
  uint32_t *site_of; /* for each row of the lab its index in `site` */
  uint32_t n_rows;
} EnlLabJudgement;

/* Sigmas with which the rows enter the model. `ref` holds the rows of `lab` behind the published
 * ones; `sigma` has one place for each of them. */
void enl_lab_sigmas (const EnlLab *lab, const EnlReference *ref, double *sigma);

/* What the model says of a row when it does not know the own values of that site and solvent. */
typedef struct {
  double value, half; /* half width of its 90 % interval */
  bool known;         /* false where it has no experience: nothing to differ from */
} EnlLabExpectation;

/* `expectation` has one place for each row of the lab; `published` is the table without them.
 * Caller: enl_lab_judgement_free. */
EnlLabJudgement *enl_lab_judge (const EnlLab *lab, const EnlReference *ref,
                                const EnlReference *published,
                                const EnlLabExpectation *expectation) ENL_MUST_USE;
void enl_lab_judgement_free (EnlLabJudgement *judgement);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlLabJudgement, enl_lab_judgement_free)
