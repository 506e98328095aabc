/* Breadth-first walks over the graph: fragments and distances. */
#include "core/molecule/molecule-private.h"

/* Numbers everything reachable from `from` by its distance; `queue` has room for all atoms. Returns
 * how many atoms were reached; they stand in `queue` in order of distance. */
static uint32_t
spread (const EnlMolecule *mol, uint32_t from, uint32_t *distance, uint32_t *queue)
{
  uint32_t head = 0, tail = 0;

  distance[from] = 0;
  queue[tail++] = from;
  while (head < tail) {
    uint32_t atom = queue[head++];
    for (uint32_t i = mol->first[atom]; i < mol->first[atom + 1]; i++) {
      uint32_t next = mol->neighbour[i];
      if (distance[next] == ENL_NONE) {
        distance[next] = distance[atom] + 1;
        queue[tail++] = next;
      }
    }
  }
  return tail;
}

uint32_t
enl_molecule_fragments (const EnlMolecule *mol, uint32_t *fragment)
{
  g_assert (mol->linked);
  g_autofree uint32_t *distance = g_new (uint32_t, 2 * (size_t)mol->n_atoms + 1);
  uint32_t *queue = distance + mol->n_atoms;
  uint32_t n = 0;

  for (uint32_t a = 0; a < mol->n_atoms; a++)
    distance[a] = ENL_NONE;
  for (uint32_t a = 0; a < mol->n_atoms; a++) {
    if (distance[a] != ENL_NONE)
      continue;
    uint32_t reached = spread (mol, a, distance, queue);
    for (uint32_t i = 0; i < reached; i++)
      fragment[queue[i]] = n;
    n++;
  }
  return n;
}

void
enl_molecule_distances (const EnlMolecule *mol, uint32_t from, uint32_t *distance)
{
  g_assert (mol->linked && from < mol->n_atoms);
  g_autofree uint32_t *queue = g_new (uint32_t, mol->n_atoms);

  for (uint32_t a = 0; a < mol->n_atoms; a++)
    distance[a] = ENL_NONE;
  spread (mol, from, distance, queue);
}
