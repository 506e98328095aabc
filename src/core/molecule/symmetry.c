#include "core/molecule/symmetry.h"

#include "core/molecule/automorphism.h"
#include "core/molecule/graph.h"

/* Numbers the orbits 0, 1, .. in the order of the first canonical position in them, so that the
 * numbers do not depend on the input order either. */
static uint32_t
number_orbits (const EnlSymmetry *symmetry, uint32_t n, uint32_t *class_of)
{
  g_autofree uint32_t *at = g_new (uint32_t, n + 1);
  g_autofree uint32_t *number = g_new (uint32_t, n + 1);
  uint32_t classes = 0;

  for (uint32_t v = 0; v < n; v++) {
    at[symmetry->position[v]] = v;
    number[v] = ENL_NONE;
  }
  for (uint32_t i = 0; i < n; i++) {
    uint32_t orbit = symmetry->orbit[at[i]];
    if (number[orbit] == ENL_NONE)
      number[orbit] = classes++;
    class_of[at[i]] = number[orbit];
  }
  return classes;
}

static void
search (const EnlMolecule *mol, bool stereo, EnlSymmetry *symmetry)
{
  g_autoptr (EnlGraph) graph = enl_graph_new (mol, stereo);

  enl_graph_settle_units (graph);
  enl_symmetry_search (graph, NULL, symmetry);
}

uint32_t
enl_symmetry_classes (const EnlMolecule *mol, bool stereo, uint32_t *class_of)
{
  EnlSymmetry symmetry;

  search (mol, stereo, &symmetry);
  uint32_t classes = number_orbits (&symmetry, enl_molecule_atoms (mol), class_of);
  enl_symmetry_clear (&symmetry);
  return classes;
}

void
enl_canonical_ranks (const EnlMolecule *mol, uint32_t *rank)
{
  uint32_t n = enl_molecule_atoms (mol);
  EnlSymmetry symmetry;

  search (mol, true, &symmetry);
  for (uint32_t v = 0; v < n; v++)
    rank[v] = symmetry.position[v];
  enl_symmetry_clear (&symmetry);
}
