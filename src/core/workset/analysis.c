#include "core/workset/analysis.h"

#include "core/layout/layout.h"
#include "core/notation/smiles.h"

static EnlStatus
run (const EnlKnowledge *knowledge, EnlAnalysis *a, bool layout, EnlError *err)
{
  EnlStatus status = enl_sites_find (a->mol, &a->sites, err);

  if (status != ENL_OK)
    return status;
  a->estimate = g_new0 (EnlEstimate, a->sites->n_sites);
  a->rank = g_new0 (uint32_t, a->sites->n_sites);
  status = enl_estimator_run (knowledge->estimator, a->mol, a->sites, a->solvent, a->estimate, err);
  if (status != ENL_OK)
    return status;
  enl_estimates_rank (a->sites, a->estimate, a->rank);
  if (layout && !enl_molecule_has_layout (a->mol))
    status = enl_layout (a->mol, err);
  return status;
}

EnlStatus
enl_analysis_new (const EnlKnowledge *knowledge, const EnlMolecule *mol, EnlSolvent solvent,
                  bool layout, EnlAnalysis **out, EnlError *err)
{
  g_autoptr (EnlAnalysis) a = g_new0 (EnlAnalysis, 1);

  *out = NULL;
  a->knowledge = enl_knowledge_ref (knowledge);
  a->mol = enl_molecule_copy (mol);
  a->solvent = solvent;
  EnlStatus status = run (knowledge, a, layout, err);
  if (status != ENL_OK)
    return status;
  a->smiles = enl_smiles_write (a->mol, ENL_SMILES_DEFAULT, NULL);
  a->known_as = enl_names_of (knowledge->names, a->smiles);
  *out = g_steal_pointer (&a);
  return ENL_OK;
}

void
enl_analysis_free (EnlAnalysis *a)
{
  if (!a)
    return;
  enl_molecule_free (a->mol);
  enl_sites_free (a->sites);
  g_free (a->estimate);
  g_free (a->rank);
  g_free (a->smiles);
  enl_knowledge_free (a->knowledge);
  g_free (a);
}

uint32_t
enl_analysis_site (const EnlAnalysis *a, uint32_t atom)
{
  if (atom != ENL_NONE) {
    const EnlSite *site = enl_sites_of_atom (a->sites, atom);
    return site ? (uint32_t)(site - a->sites->site) : ENL_NONE;
  }
  for (uint32_t i = 0; i < a->sites->n_sites; i++)
    if (a->sites->site[a->rank[i]].kind == ENL_SITE_CARBON)
      return a->rank[i];
  return a->sites->n_sites ? a->rank[0] : ENL_NONE;
}

uint32_t
enl_analysis_rank (const EnlAnalysis *a, uint32_t site)
{
  for (uint32_t i = 0; i < a->sites->n_sites; i++)
    if (a->rank[i] == site)
      return i + 1;
  g_assert_not_reached ();
}

EnlQuestion
enl_analysis_question (const EnlAnalysis *a, const EnlKnowledge *k, uint32_t site,
                       const EnlConditions *conditions)
{
  g_assert (conditions->solvent == a->solvent);
  return (EnlQuestion){.bases = k->bases,
                       .rules = k->rules,
                       .practice = &k->practice,
                       .mol = a->mol,
                       .sites = a->sites,
                       .estimate = a->estimate,
                       .target = site,
                       .conditions = conditions};
}
