/* What is asked of the bases: one site of one substrate under given conditions. */
#pragma once

#include "core/acidity/estimate.h"
#include "core/acidity/site.h"
#include "core/bases/base.h"
#include "core/bases/practice.h"
#include "core/bases/rule.h"

typedef struct {
  EnlSolvent solvent;
  double equivalents;   /* of base per substrate */
  double concentration; /* substrate, mol/L */
  double temperature;   /* °C; the pK values hold at 25 and are not carried over */
  double water;         /* equivalents of water per substrate, in substrate, base or solvent */
} EnlConditions;

/* 1.05 equivalents, 0.1 mol/L, 25 °C, DMSO, no water. */
EnlConditions enl_conditions_default (void);
/* ENL_ERROR_RANGE with advice when an amount is impossible. */
EnlStatus enl_conditions_check (const EnlConditions *conditions, EnlError *err);

/* Everything is borrowed. `sites` are those of `mol`; `estimate` has one entry a site, all in
 * conditions->solvent; `target` is an index in sites. */
typedef struct {
  const EnlBaseTable *bases;
  const EnlRuleTable *rules;
  const EnlPractice *practice;
  const EnlMolecule *mol;
  const EnlSites *sites;
  const EnlEstimate *estimate;
  uint32_t target;
  const EnlConditions *conditions;
} EnlQuestion;
