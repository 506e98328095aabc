/* Walks over the graph: fragments, distances, and the number of rings before they are known. */
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

static uint32_t
find_root (uint32_t *root, uint32_t atom)
{
  while (root[atom] != atom)
    atom = root[atom] = root[root[atom]];
  return atom;
}

/* A bond between atoms that hang together already closes a ring. */
static uint32_t
count_rings (const EnlMolecule *mol)
{
  g_autofree uint32_t *root = g_new (uint32_t, (size_t)mol->n_atoms + 1);
  uint32_t n = 0;

  for (uint32_t a = 0; a < mol->n_atoms; a++)
    root[a] = a;
  for (uint32_t i = 0; i < mol->n_bonds; i++) {
    uint32_t from = find_root (root, mol->bond[i].from), to = find_root (root, mol->bond[i].to);
    n += from == to;
    root[from] = to;
  }
  return n;
}

EnlStatus
enl_molecule_check_size (const EnlMolecule *mol, EnlError *err)
{
  const char *advice = "enter a smaller structure";
  uint32_t rings;

  if (mol->n_atoms > ENL_MAX_ATOMS)
    return enl_error_set (err, ENL_ERROR_LIMIT, advice, "%u atoms are more than %d", mol->n_atoms,
                          ENL_MAX_ATOMS);
  rings = count_rings (mol);
  if (rings > ENL_MAX_RINGS)
    return enl_error_set (err, ENL_ERROR_LIMIT, advice, "%u rings are more than %d", rings,
                          ENL_MAX_RINGS);
  return ENL_OK;
}
