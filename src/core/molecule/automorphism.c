#include "core/molecule/automorphism.h"

#include <string.h>

#include "core/molecule/partition.h"

#define MAX_GENERATORS 64    /* kept to prune branches off the first path */
#define STEPS_BASE     20000 /* refinements before the search gives up, for a small graph */
#define STEPS_PER_ATOM 50

typedef struct {
  uint32_t *vertex; /* individualised at level 1, 2, .. */
  uint64_t *trace;
  uint32_t *lab;
  uint32_t depth;
  bool found;
} Path;

typedef struct {
  const EnlGraph *graph;
  const EnlUnit *watch;
  EnlPartition part;
  Path now, first, best;
  int8_t *order;      /* per level: trace so far against that of the best leaf, -1, 0, +1 */
  uint32_t *leader;   /* union-find over vertices */
  uint32_t *image;    /* scratch permutation */
  uint32_t *first_at; /* position in the first leaf */
  uint32_t *generator[MAX_GENERATORS];
  uint32_t generators;
  uint64_t steps, limit;
  bool turns;
} Search;

static uint32_t explore (Search *s, uint32_t level, bool like_first);

/* ---- orbits ---- */

static uint32_t
find (uint32_t *leader, uint32_t v)
{
  while (leader[v] != v) {
    leader[v] = leader[leader[v]];
    v = leader[v];
  }
  return v;
}

static void
join (uint32_t *leader, uint32_t a, uint32_t b)
{
  a = find (leader, a);
  b = find (leader, b);
  if (a < b)
    leader[b] = a;
  else
    leader[a] = b;
}

static bool
turns_watched (const Search *s)
{
  uint32_t a = s->watch->end[0], b = s->watch->end[1];

  if (s->image[a] != a && s->image[a] != b)
    return false;
  if (s->image[a] == a)
    return enl_unit_sign (s->watch, s->image) < 0;
  /* The ends of a double bond change places: count how often the upper ligand at one end becomes
   * the lower one at the other. */
  int sign = 1;
  for (uint32_t row = 0; row < 2; row++) {
    uint32_t top = s->watch->ligand[row][s->watch->ligands[row] - 1];
    uint32_t other = 1 - row;
    if (s->image[top] != s->watch->ligand[other][s->watch->ligands[other] - 1])
      sign = -sign;
  }
  return sign < 0;
}

/* Takes s->image, known to be an automorphism, into the group found so far. */
static void
add_generator (Search *s)
{
  uint32_t n = s->graph->n;

  for (uint32_t v = 0; v < n; v++)
    join (s->leader, v, s->image[v]);
  if (s->watch && turns_watched (s))
    s->turns = true;
  if (s->generators < MAX_GENERATORS)
    s->generator[s->generators++] = g_memdup2 (s->image, sizeof *s->image * n);
}

/* ---- leaves ---- */

static uint32_t
common_levels (const Search *s, const Path *path)
{
  uint32_t level = 0;

  while (level < s->now.depth && level < path->depth &&
         s->now.vertex[level + 1] == path->vertex[level + 1])
    level++;
  return level;
}

static void
keep_path (Search *s, Path *path)
{
  uint32_t n = s->graph->n, depth = s->now.depth;

  memcpy (path->vertex, s->now.vertex, sizeof *path->vertex * (depth + 1));
  memcpy (path->trace, s->now.trace, sizeof *path->trace * (depth + 1));
  memcpy (path->lab, s->part.lab, sizeof *path->lab * n);
  path->depth = depth;
  path->found = true;
}

static void
keep_best (Search *s)
{
  keep_path (s, &s->best);
  memset (s->order, 0, s->now.depth + 1);
}

static int
compare_numbers (uint64_t a, uint64_t b)
{
  return a < b ? -1 : a > b;
}

/* Colour of the arc from v to the vertex at position p in this leaf; 0 when there is none. */
static uint64_t
arc_to (const EnlGraph *graph, uint32_t v, uint32_t target)
{
  for (uint32_t a = graph->first[v]; a < graph->first[v + 1]; a++)
    if (graph->target[a] == target)
      return graph->weight[a];
  return 0;
}

static int
compare_unit_at (const EnlGraph *graph, const uint32_t *at_a, uint32_t a, const uint32_t *key_a,
                 uint32_t b, const uint32_t *key_b, const uint32_t *at_b)
{
  int sign_a = at_a[a] == ENL_NONE ? 0 : enl_unit_sign (&graph->unit[at_a[a]], key_a);
  int sign_b = at_b[b] == ENL_NONE ? 0 : enl_unit_sign (&graph->unit[at_b[b]], key_b);
  return compare_numbers ((uint64_t)(sign_a + 1), (uint64_t)(sign_b + 1));
}

/* Compares row i of the two adjacency matrices that the leaves order: the first position where one
 * has an arc of a larger colour decides. */
static int
compare_row (const Search *s, uint32_t i, const uint32_t *best_at)
{
  const EnlGraph *graph = s->graph;
  uint32_t v = s->part.lab[i], w = s->best.lab[i];
  uint32_t place = ENL_NONE;
  int result = 0;

  for (uint32_t a = graph->first[v]; a < graph->first[v + 1]; a++) {
    uint32_t p = s->part.pos[graph->target[a]];
    uint64_t other = arc_to (graph, w, s->best.lab[p]);
    if (p < place && other != graph->weight[a]) {
      place = p;
      result = compare_numbers (graph->weight[a], other);
    }
  }
  for (uint32_t a = graph->first[w]; a < graph->first[w + 1]; a++) {
    uint32_t p = best_at[graph->target[a]];
    if (p < place && arc_to (graph, v, s->part.lab[p]) == 0) {
      place = p;
      result = -1;
    }
  }
  return result;
}

/* The present leaf against the best one. */
static int
compare_leaf (Search *s)
{
  const EnlGraph *graph = s->graph;
  uint32_t *best_at = s->image;
  int result = 0;

  for (uint32_t i = 0; i < graph->n; i++)
    best_at[s->best.lab[i]] = i;
  for (uint32_t i = 0; i < graph->n && result == 0; i++)
    result = compare_row (s, i, best_at);
  for (uint32_t i = 0; i < graph->n && result == 0 && graph->units > 0; i++) {
    uint32_t v = s->part.lab[i], w = s->best.lab[i];
    result = compare_unit_at (graph, graph->unit_at, v, s->part.pos, w, best_at, graph->unit_at);
    if (result == 0)
      result = compare_unit_at (graph, graph->bond_at, v, s->part.pos, w, best_at, graph->bond_at);
  }
  return result;
}

static void
image_of_leaf (Search *s, const uint32_t *from)
{
  for (uint32_t i = 0; i < s->graph->n; i++)
    s->image[from[i]] = s->part.lab[i];
}

/* Returns the level to continue at. */
static uint32_t
leaf (Search *s, uint32_t level, bool like_first)
{
  if (!s->first.found) {
    keep_path (s, &s->first);
    keep_best (s);
    for (uint32_t i = 0; i < s->graph->n; i++)
      s->first_at[s->first.lab[i]] = i;
    return level - 1;
  }
  if (like_first && level == s->first.depth) {
    image_of_leaf (s, s->first.lab);
    if (enl_graph_is_automorphism (s->graph, s->image)) {
      add_generator (s);
      return common_levels (s, &s->first);
    }
  }
  int order = s->order[level];
  if (order == 0)
    order = compare_leaf (s);
  if (order < 0) {
    keep_best (s);
  } else if (order == 0) {
    uint32_t back = common_levels (s, &s->best);
    image_of_leaf (s, s->best.lab);
    add_generator (s);
    return back;
  }
  return level - 1;
}

/* ---- branches ---- */

/* Guesses an automorphism from the first path's node at this level to the present node: single
 * cells on each other, other cells with as many fixed vertices as possible. */
static bool
guess_automorphism (Search *s)
{
  const EnlPartition *part = &s->part;
  uint32_t n = s->graph->n;

  for (uint32_t cell = 0; cell < n; cell += part->len[cell]) {
    uint32_t end = cell + part->len[cell], free = cell;
    for (uint32_t i = cell; i < end; i++) {
      uint32_t v = s->first.lab[i];
      if (part->start[v] == cell) {
        s->image[v] = v;
        continue;
      }
      while (s->first_at[part->lab[free]] >= cell && s->first_at[part->lab[free]] < end)
        free++;
      s->image[v] = part->lab[free++];
    }
  }
  return enl_graph_is_automorphism (s->graph, s->image);
}

/* Orbits of those kept generators that fix every individualised vertex of the present node. */
static void
prefix_orbits (const Search *s, uint32_t *leader)
{
  for (uint32_t v = 0; v < s->graph->n; v++)
    leader[v] = v;
  for (uint32_t g = 0; g < s->generators; g++) {
    bool fixes = true;
    for (uint32_t l = 1; l <= s->now.depth && fixes; l++)
      fixes = s->generator[g][s->now.vertex[l]] == s->now.vertex[l];
    for (uint32_t v = 0; v < s->graph->n && fixes; v++)
      join (leader, v, s->generator[g][v]);
  }
}

/* Follows `vertex` from a node at `level`; returns the level to continue at. */
static uint32_t
branch (Search *s, uint32_t level, uint32_t vertex, bool like_first)
{
  uint32_t child = level + 1;
  uint64_t trace = enl_partition_individualise (&s->part, vertex);
  int order = s->order[level];

  s->steps++;
  s->now.depth = child;
  s->now.vertex[child] = vertex;
  s->now.trace[child] = trace;
  if (!s->first.found) {
    s->order[child] = 0;
    return explore (s, child, true);
  }
  like_first = like_first && child <= s->first.depth && trace == s->first.trace[child];
  if (order == 0)
    order = child > s->best.depth ? 1 : compare_numbers (trace, s->best.trace[child]);
  s->order[child] = (int8_t)order;
  if (!like_first && order > 0)
    return level;
  if (like_first && guess_automorphism (s)) {
    add_generator (s);
    return common_levels (s, &s->first);
  }
  return explore (s, child, like_first);
}

static bool
explored_before (uint32_t *leader, const uint32_t *member, uint32_t i)
{
  for (uint32_t j = 0; j < i; j++)
    if (find (leader, member[j]) == find (leader, member[i]))
      return true;
  return false;
}

static uint32_t
explore_cell (Search *s, uint32_t level, bool like_first, const uint32_t *member, uint32_t size)
{
  bool on_first = !s->first.found;
  uint32_t mark = enl_partition_mark (&s->part);
  g_autofree uint32_t *own = on_first ? NULL : g_new (uint32_t, s->graph->n);
  uint32_t known = ENL_NONE;

  for (uint32_t i = 0; i < size; i++) {
    if (!on_first && known != s->generators) {
      prefix_orbits (s, own);
      known = s->generators;
    }
    if (explored_before (on_first ? s->leader : own, member, i))
      continue;
    uint32_t back = branch (s, level, member[i], like_first);
    enl_partition_return (&s->part, mark);
    s->now.depth = level;
    if (back < level || s->steps > s->limit)
      return back;
  }
  return level - 1;
}

/* Searches below the present node, which stands at `level`; returns the level to continue at. */
static uint32_t
explore (Search *s, uint32_t level, bool like_first)
{
  uint32_t cell = enl_partition_target (&s->part);

  if (cell == ENL_NONE)
    return leaf (s, level, like_first);
  uint32_t size = s->part.len[cell];
  g_autofree uint32_t *member = g_memdup2 (s->part.lab + cell, sizeof *member * size);
  return explore_cell (s, level, like_first, member, size);
}

/* ---- set-up ---- */

static void
path_init (Path *path, uint32_t n)
{
  path->vertex = g_new0 (uint32_t, n + 2);
  path->trace = g_new0 (uint64_t, n + 2);
  path->lab = g_new (uint32_t, n + 1);
}

static void
path_clear (Path *path)
{
  g_free (path->vertex);
  g_free (path->trace);
  g_free (path->lab);
}

static void
run (Search *s, uint32_t n)
{
  path_init (&s->now, n);
  path_init (&s->first, n);
  path_init (&s->best, n);
  s->order = g_new0 (int8_t, n + 2);
  s->image = g_new (uint32_t, n + 1);
  s->first_at = g_new (uint32_t, n + 1);
  explore (s, 0, true);
}

static void
clear (Search *s)
{
  path_clear (&s->now);
  path_clear (&s->first);
  path_clear (&s->best);
  g_free (s->order);
  g_free (s->image);
  g_free (s->first_at);
  for (uint32_t g = 0; g < s->generators; g++)
    g_free (s->generator[g]);
}

void
enl_symmetry_search (const EnlGraph *graph, const EnlUnit *watch, EnlSymmetry *out)
{
  uint32_t n = graph->n;
  Search s = {.graph = graph, .watch = watch};

  g_assert (!watch || watch->value == 1);
  s.limit = STEPS_BASE + (uint64_t)STEPS_PER_ATOM * n;
  s.leader = g_new (uint32_t, n + 1);
  for (uint32_t v = 0; v < n; v++)
    s.leader[v] = v;
  enl_partition_init (&s.part, graph);
  out->position = g_new (uint32_t, n + 1);
  const uint32_t *lab = s.part.lab;
  bool discrete = s.part.cells == n;
  if (!discrete) {
    run (&s, n);
    lab = s.best.lab;
  }
  for (uint32_t i = 0; i < n; i++)
    out->position[lab[i]] = i;
  for (uint32_t v = 0; v < n; v++)
    s.leader[v] = find (s.leader, v);
  out->orbit = s.leader;
  out->complete = s.steps <= s.limit;
  out->turns = s.turns;
  if (!discrete)
    clear (&s);
  enl_partition_clear (&s.part);
}

void
enl_symmetry_clear (EnlSymmetry *symmetry)
{
  g_free (symmetry->position);
  g_free (symmetry->orbit);
  *symmetry = (EnlSymmetry){0};
}
