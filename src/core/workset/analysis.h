/* The whole analysis of one substrate in one solvent: structure, sites, estimates, ranks. */
#pragma once

#include "core/acidity/form.h"
#include "core/workset/knowledge.h"

typedef struct {
  EnlKnowledge *knowledge; /* held: what the estimates rest on, with the own values of then */
  EnlMolecule *mol;        /* a copy; with layout when it was asked for */
  EnlSites *sites;
  EnlEstimate *estimate; /* one a site */
  uint32_t *rank;        /* site indices, most acidic first */
  EnlSolvent solvent;
  char *smiles;         /* canonical */
  const char *known_as; /* a name of this compound in the name table, or NULL */
} EnlAnalysis;

/* `layout` asks for plane coordinates (kept where the molecule has them already). */
EnlStatus enl_analysis_new (const EnlKnowledge *knowledge, const EnlMolecule *mol,
                            EnlSolvent solvent, bool layout, EnlAnalysis **out,
                            EnlError *err) ENL_MUST_USE;
void enl_analysis_free (EnlAnalysis *analysis);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlAnalysis, enl_analysis_free)

/* Site index that holds `atom`; ENL_NONE gives the most acidic C-H site, or the most acidic site of
 * all where there is no C-H site. ENL_NONE when nothing matches. */
uint32_t enl_analysis_site (const EnlAnalysis *analysis, uint32_t atom);
/* 1-based rank of a site. */
uint32_t enl_analysis_rank (const EnlAnalysis *analysis, uint32_t site);

/* The question which base takes the hydrogen of `site`. Everything in it is borrowed from the
 * arguments; the conditions must be in the solvent of the analysis. */
EnlQuestion enl_analysis_question (const EnlAnalysis *analysis, const EnlKnowledge *knowledge,
                                   uint32_t site, const EnlConditions *conditions);
