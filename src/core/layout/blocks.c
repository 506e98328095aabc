#include "core/layout/blocks.h"

/* Hopcroft and Tarjan's depth-first search (Commun. ACM 1973, 16, 372), without recursion. */
typedef struct {
  EnlSketch *sketch;
  uint32_t *depth, *low; /* ENL_NONE: not visited */
  uint32_t *next;        /* next neighbour to try */
  uint32_t *parent;      /* bond by which the atom was reached */
  uint32_t *path, n_path;
  uint32_t *open, n_open; /* bonds not yet given to a block */
} Search;

static void
close_block (Search *s, uint32_t bond)
{
  uint32_t size = 0, at = s->n_open;

  do {
    at--;
    size++;
  } while (s->open[at] != bond);
  if (size > 1) {
    for (uint32_t k = at; k < s->n_open; k++)
      s->sketch->bond[s->open[k]].block = s->sketch->n_blocks;
    s->sketch->n_blocks++;
  }
  s->n_open = at;
}

static void
visit (Search *s, uint32_t atom, uint32_t by_bond, uint32_t depth)
{
  s->depth[atom] = s->low[atom] = depth;
  s->next[atom] = s->sketch->first[atom];
  s->parent[atom] = by_bond;
  s->path[s->n_path++] = atom;
}

static void
leave (Search *s, uint32_t atom)
{
  s->n_path--;
  if (s->parent[atom] == ENL_NONE)
    return;
  uint32_t up = enl_sketch_other_end (s->sketch, s->parent[atom], atom);
  s->low[up] = MIN (s->low[up], s->low[atom]);
  if (s->low[atom] >= s->depth[up])
    close_block (s, s->parent[atom]);
}

static void
search_from (Search *s, uint32_t start)
{
  visit (s, start, ENL_NONE, 0);
  while (s->n_path > 0) {
    uint32_t atom = s->path[s->n_path - 1];
    if (s->next[atom] == s->sketch->first[atom + 1]) {
      leave (s, atom);
      continue;
    }
    uint32_t k = s->next[atom]++;
    uint32_t other = s->sketch->neighbour[k], bond = s->sketch->via[k];
    if (bond == s->parent[atom])
      continue;
    if (s->depth[other] == ENL_NONE) {
      s->open[s->n_open++] = bond;
      visit (s, other, bond, s->depth[atom] + 1);
    } else if (s->depth[other] < s->depth[atom]) {
      s->open[s->n_open++] = bond;
      s->low[atom] = MIN (s->low[atom], s->depth[other]);
    }
  }
}

void
enl_blocks_find (EnlSketch *sketch)
{
  uint32_t n = sketch->n_atoms + 1;
  g_autofree uint32_t *room = g_new (uint32_t, 5 * n + sketch->n_bonds + 1);
  Search s = {.sketch = sketch,
              .depth = room,
              .low = room + n,
              .next = room + 2 * n,
              .parent = room + 3 * n,
              .path = room + 4 * n,
              .open = room + 5 * n};

  sketch->n_blocks = 0;
  for (uint32_t i = 0; i < n; i++)
    s.depth[i] = ENL_NONE;
  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    sketch->bond[b].block = ENL_NONE;
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    if (s.depth[i] == ENL_NONE)
      search_from (&s, i);
}

uint32_t
enl_block_atoms (const EnlSketch *sketch, uint32_t block, bool *in)
{
  uint32_t n = 0;

  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    in[i] = false;
  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    if (sketch->bond[b].block == block)
      in[sketch->bond[b].from] = in[sketch->bond[b].to] = true;
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    n += in[i];
  return n;
}

uint32_t
enl_branch_atoms (const EnlSketch *sketch, uint32_t start, uint32_t barrier, bool *in)
{
  g_autofree uint32_t *queue = g_new (uint32_t, sketch->n_atoms + 1);
  uint32_t n = 0;

  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    in[i] = false;
  in[start] = true;
  queue[n++] = start;
  for (uint32_t done = 0; done < n; done++)
    for (uint32_t k = sketch->first[queue[done]]; k < sketch->first[queue[done] + 1]; k++) {
      uint32_t other = sketch->neighbour[k];
      if (other == barrier || in[other])
        continue;
      in[other] = true;
      queue[n++] = other;
    }
  return n;
}
