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

/* An isomorphism from the molecule to its mirror image, by their canonical orders. False for a
 * chiral molecule. */
static bool
find_reflection (EnlGraph *graph, const EnlSymmetry *symmetry, uint32_t *image)
{
  g_autofree uint32_t *at = g_new (uint32_t, graph->n + 1);
  EnlSymmetry mirrored;

  for (uint32_t u = 0; u < graph->units; u++)
    if (graph->unit[u].bond == ENL_NONE)
      graph->unit[u].value = -graph->unit[u].value;
  enl_symmetry_search (graph, NULL, &mirrored);
  for (uint32_t v = 0; v < graph->n; v++)
    at[mirrored.position[v]] = v;
  for (uint32_t v = 0; v < graph->n; v++)
    image[v] = at[symmetry->position[v]];
  enl_symmetry_clear (&mirrored);
  return enl_graph_is_reflection (graph, image);
}

static uint32_t
orbit_of (const uint32_t *orbit, uint32_t v)
{
  while (orbit[v] != v)
    v = orbit[v];
  return v;
}

/* All reflections are one of them followed by a rotation, so one joins all that they join. */
static void
join_by_reflection (EnlSymmetry *symmetry, const uint32_t *image, uint32_t n)
{
  for (uint32_t v = 0; v < n; v++) {
    uint32_t a = orbit_of (symmetry->orbit, v), b = orbit_of (symmetry->orbit, image[v]);
    symmetry->orbit[MAX (a, b)] = MIN (a, b);
  }
  for (uint32_t v = 0; v < n; v++)
    symmetry->orbit[v] = orbit_of (symmetry->orbit, v);
}

uint32_t
enl_symmetry_reflected_classes (const EnlMolecule *mol, uint32_t *class_of)
{
  uint32_t n = enl_molecule_atoms (mol);
  g_autoptr (EnlGraph) graph = enl_graph_new (mol, true);
  g_autofree uint32_t *image = g_new (uint32_t, n + 1);
  EnlSymmetry symmetry;

  enl_graph_settle_units (graph);
  enl_symmetry_search (graph, NULL, &symmetry);
  if (graph->units > 0 && find_reflection (graph, &symmetry, image))
    join_by_reflection (&symmetry, image, n);
  uint32_t classes = number_orbits (&symmetry, n, class_of);
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
