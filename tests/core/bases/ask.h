/* A question to the bases from SMILES, with the whole knowledge of the program. */
#pragma once

#include "core/bases/compare.h"
#include "core/workset/analysis.h"
#include "resources/model.h"
#include "tests/read-structure.h"

static EnlKnowledge *knowledge;

static inline void
open_knowledge (void)
{
  size_t size;
  const char *model = enl_model ("model.bin", &size);
  EnlError err = {0};

  if (enl_knowledge_open (model, size, &knowledge, &err) != ENL_OK)
    ck_abort_msg ("line %zu, column %zu: %s; %s", err.line, err.column, err.text, err.advice);
}

static inline void
close_knowledge (void)
{
  enl_knowledge_free (knowledge);
}

typedef struct {
  EnlAnalysis *analysis;
  EnlConditions conditions;
  EnlQuestion question;
  EnlComparison *comparison;
} Ask;

/* `atom` is 1-based, 0: the most acidic C-H. */
static inline void
ask (Ask *a, const char *smiles, uint32_t atom, EnlConditions conditions)
{
  EnlMolecule *mol = read_structure (smiles);
  EnlError err = {0};

  a->conditions = conditions;
  ck_assert_int_eq (
      enl_analysis_new (knowledge, mol, conditions.solvent, false, &a->analysis, &err), ENL_OK);
  enl_molecule_free (mol);
  uint32_t site = enl_analysis_site (a->analysis, atom ? atom - 1 : ENL_NONE);
  ck_assert_msg (site != ENL_NONE, "%s: atom %u is no site", smiles, atom);
  a->question = enl_analysis_question (a->analysis, knowledge, site, &a->conditions);
  if (enl_bases_compare (&a->question, &a->comparison, &err) != ENL_OK)
    ck_abort_msg ("%s: %s", smiles, err.text);
}

static inline void
ask_clear (Ask *a)
{
  enl_comparison_free (a->comparison);
  enl_analysis_free (a->analysis);
}

static inline EnlConditions
conditions_in (EnlSolvent solvent, double temperature, double equivalents)
{
  EnlConditions c = enl_conditions_default ();

  c.solvent = solvent;
  c.temperature = temperature;
  c.equivalents = equivalents;
  return c;
}

static inline const EnlCandidate *
candidate_of (const Ask *a, const char *id)
{
  int base = enl_base_table_find (a->question.bases, id);

  for (uint32_t i = 0; base >= 0 && i < a->comparison->n_candidates; i++)
    if ((int)a->comparison->candidate[i].base == base)
      return &a->comparison->candidate[i];
  ck_abort_msg ("no candidate %s", id);
  return NULL;
}

static inline const EnlCaution *
caution_of (const EnlCandidate *candidate, const char *rule)
{
  for (uint32_t i = 0; i < candidate->n_cautions; i++)
    if (strcmp (candidate->caution[i].rule->id, rule) == 0)
      return &candidate->caution[i];
  return NULL;
}
