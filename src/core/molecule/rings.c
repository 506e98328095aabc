/* A smallest set of smallest rings, as a minimum cycle basis.
 *
 * 1. A depth-first walk splits the bonds into blocks (R. E. Tarjan, SIAM J. Comput. 1972, 1, 146);
 *    a block of one bond is in no ring, all bonds of a larger one are.
 * 2. A block with as many bonds as atoms is one ring.
 * 3. In any other block the candidates are, for every root, the cycles made of two shortest paths
 *    that meet in an atom or across a bond (P. Vismara, Electron. J. Combin. 1997, 4, R9; only
 *    atoms of lower rank than the root, so that each cycle comes up once). They are tried from
 *    short to long, and kept when they are not the sum (modulo 2) of kept ones.
 *
 * Cages have more than one such set; which one is found depends on the order of atoms. So every
 * candidate that is no sum of shorter rings is kept beside the set ("spare"): set and spare rings
 * together do not depend on the order, and aromaticity is judged on both.
 *
 * Candidates are made in windows of length, so that a usual molecule never walks farther than half
 * a common ring.
 */
#include "core/molecule/molecule-private.h"

#include <string.h>

enum {
  FIRST_WINDOW = 8, /* rings up to here are looked for first; longer ones are uncommon */
  MAX_SPARE = 1000  /* spare rings kept; graphs with more are no molecules that anyone drew */
};

typedef struct {
  uint32_t length, root, left, right; /* left and right: the atoms where the two paths end */
  uint32_t top;                       /* atom that joins them, or ENL_NONE for a bond */
} Candidate;

typedef struct {
  EnlMolecule *mol;
  uint32_t *local; /* atom to number inside the block */

  /* the block at hand */
  uint32_t n_atoms, n_bonds;
  const uint32_t *bond; /* bonds of the block */
  uint32_t *atom;       /* number to atom */
  uint32_t *first, *next_atom, *next_bond;
  uint32_t *parent; /* n_atoms x n_atoms, by root */
  uint32_t *distance, *queue;
  GArray *candidate;
  uint64_t *row; /* kept cycles as sets of bonds, one row each */
  uint32_t *row_with_pivot;
  uint32_t words, rank, wanted;
  uint32_t shorter; /* kept cycles that are shorter than those at hand */

  /* the result */
  GArray *ring_first, *ring_atom;
  GArray *spare_first, *spare_atom;
} Search;

/* ---- blocks ---- */

typedef struct {
  uint32_t *order, *low, *step, *came_by; /* per atom */
  uint32_t *walk, *pending;               /* stack of atoms, stack of bonds */
  uint32_t n_walk, n_pending, clock;
} Blocks;

static void find_rings_of_block (Search *search, const uint32_t *bond, uint32_t n_bonds);

/* The bonds above and including `last` on the stack are one block. */
static void
close_block (Search *search, Blocks *b, uint32_t last)
{
  uint32_t start = b->n_pending;

  while (b->pending[--start] != last)
    ;
  uint32_t n = b->n_pending - start;
  if (n > 1) {
    for (uint32_t i = start; i < b->n_pending; i++)
      search->mol->bond[b->pending[i]].ring = true;
    find_rings_of_block (search, b->pending + start, n);
  }
  b->n_pending = start;
}

static void
enter (Blocks *b, const EnlMolecule *mol, uint32_t atom, uint32_t bond)
{
  b->order[atom] = b->low[atom] = ++b->clock;
  b->step[atom] = mol->first[atom];
  b->came_by[atom] = bond;
  b->walk[b->n_walk++] = atom;
}

static void
leave (Search *search, Blocks *b, uint32_t atom)
{
  b->n_walk--;
  if (b->n_walk == 0)
    return;
  uint32_t below = b->walk[b->n_walk - 1];
  b->low[below] = MIN (b->low[below], b->low[atom]);
  if (b->low[atom] >= b->order[below])
    close_block (search, b, b->came_by[atom]);
}

static void
walk_blocks (Search *search, Blocks *b, uint32_t start)
{
  const EnlMolecule *mol = search->mol;

  enter (b, mol, start, ENL_NONE);
  while (b->n_walk) {
    uint32_t atom = b->walk[b->n_walk - 1];
    if (b->step[atom] == mol->first[atom + 1]) {
      leave (search, b, atom);
      continue;
    }
    uint32_t link = b->step[atom]++;
    uint32_t next = mol->neighbour[link], bond = mol->via[link];
    if (bond == b->came_by[atom])
      continue;
    if (b->order[next] == 0) {
      b->pending[b->n_pending++] = bond;
      enter (b, mol, next, bond);
    } else if (b->order[next] < b->order[atom]) {
      b->pending[b->n_pending++] = bond;
      b->low[atom] = MIN (b->low[atom], b->order[next]);
    }
  }
}

/* ---- one block ---- */

/* Numbers the atoms of the block and builds its adjacency. */
static void
number_block (Search *search, const uint32_t *bond, uint32_t n_bonds)
{
  const EnlMolecule *mol = search->mol;

  search->bond = bond;
  search->n_bonds = n_bonds;
  search->n_atoms = 0;
  for (uint32_t i = 0; i < n_bonds; i++)
    search->local[mol->bond[bond[i]].from] = search->local[mol->bond[bond[i]].to] = ENL_NONE;
  for (uint32_t i = 0; i < n_bonds; i++)
    for (int end = 0; end < 2; end++) {
      uint32_t a = end ? mol->bond[bond[i]].to : mol->bond[bond[i]].from;
      if (search->local[a] != ENL_NONE)
        continue;
      search->local[a] = search->n_atoms;
      search->atom[search->n_atoms++] = a;
    }
  memset (search->first, 0, (search->n_atoms + 1) * sizeof (uint32_t));
  for (uint32_t i = 0; i < n_bonds; i++) {
    search->first[search->local[mol->bond[bond[i]].from]]++;
    search->first[search->local[mol->bond[bond[i]].to]]++;
  }
  for (uint32_t a = 0, sum = 0; a <= search->n_atoms; a++)
    search->first[a] = sum += a < search->n_atoms ? search->first[a] : 0;
  for (uint32_t i = n_bonds; i-- > 0;) {
    uint32_t from = search->local[mol->bond[bond[i]].from];
    uint32_t to = search->local[mol->bond[bond[i]].to];
    search->next_atom[--search->first[from]] = to;
    search->next_bond[search->first[from]] = i;
    search->next_atom[--search->first[to]] = from;
    search->next_bond[search->first[to]] = i;
  }
}

static void
add_simple_ring (Search *search)
{
  uint32_t came_by = ENL_NONE, at = 0;

  for (uint32_t i = 0; i < search->n_atoms; i++) {
    g_array_append_val (search->ring_atom, search->atom[at]);
    uint32_t link = search->first[at];
    if (search->next_bond[link] == came_by)
      link++;
    came_by = search->next_bond[link];
    at = search->next_atom[link];
  }
  g_array_append_val (search->ring_first, search->ring_atom->len);
}

/* Shortest paths from `root` over atoms of lower number, up to `depth` bonds. */
static uint32_t
spread_from (Search *search, uint32_t root, uint32_t depth)
{
  uint32_t *parent = search->parent + (size_t)root * search->n_atoms;
  uint32_t head = 0, tail = 0;

  for (uint32_t a = 0; a <= root; a++)
    search->distance[a] = ENL_NONE;
  search->distance[root] = 0;
  search->queue[tail++] = root;
  while (head < tail) {
    uint32_t a = search->queue[head++];
    if (search->distance[a] == depth)
      break;
    for (uint32_t i = search->first[a]; i < search->first[a + 1]; i++) {
      uint32_t next = search->next_atom[i];
      if (next >= root || search->distance[next] != ENL_NONE)
        continue;
      search->distance[next] = search->distance[a] + 1;
      parent[next] = a;
      search->queue[tail++] = next;
    }
  }
  return tail;
}

/* True when the stored paths from `root` to a and b, equally far, share the root alone. */
static bool
are_apart (const Search *search, uint32_t root, uint32_t a, uint32_t b)
{
  const uint32_t *parent = search->parent + (size_t)root * search->n_atoms;

  while (a != b) {
    a = parent[a];
    b = parent[b];
  }
  return a == root;
}

static void
propose (Search *search, uint32_t root, uint32_t left, uint32_t right, uint32_t top,
         uint32_t shortest, uint32_t longest)
{
  uint32_t length = 2 * search->distance[left] + (top == ENL_NONE ? 1 : 2);

  if (length < shortest || length > longest || !are_apart (search, root, left, right))
    return;
  Candidate candidate = {length, root, left, right, top};
  g_array_append_val (search->candidate, candidate);
}

/* Cycles through `root` that close at atom `a`: across a bond between equally distant atoms, or
 * where two shortest paths meet in `a`. */
static void
propose_at (Search *search, uint32_t root, uint32_t a, uint32_t shortest, uint32_t longest)
{
  const uint32_t *distance = search->distance;

  for (uint32_t i = search->first[a]; i < search->first[a + 1]; i++) {
    uint32_t left = search->next_atom[i];
    if (left > root || distance[left] == ENL_NONE)
      continue;
    if (distance[left] == distance[a] && left < a)
      propose (search, root, left, a, ENL_NONE, shortest, longest);
    if (distance[left] + 1 != distance[a])
      continue;
    for (uint32_t j = i + 1; j < search->first[a + 1]; j++) {
      uint32_t right = search->next_atom[j];
      if (right <= root && distance[right] == distance[left])
        propose (search, root, left, right, a, shortest, longest);
    }
  }
}

static int
compare_candidates (const void *a, const void *b)
{
  const Candidate *x = a, *y = b;

  if (x->length != y->length)
    return x->length < y->length ? -1 : 1;
  if (x->root != y->root)
    return x->root > y->root ? -1 : 1;
  return 0;
}

static void
flip (uint64_t *set, uint32_t bond)
{
  set[bond / 64] ^= UINT64_C (1) << (bond % 64);
}

static uint32_t
find_lowest (const uint64_t *set, uint32_t words)
{
  for (uint32_t w = 0; w < words; w++)
    if (set[w])
      return w * 64 + (uint32_t)__builtin_ctzll (set[w]);
  return ENL_NONE;
}

typedef enum { RING_SUM, RING_SPARE, RING_NEW } RingKind;

/* Reduces the cycle in the next free row by the kept rows. New: something is left, and the row is
 * kept. Spare: a sum of kept rings, but not of shorter ones alone. */
static RingKind
judge_row (Search *search)
{
  uint64_t *set = search->row + (size_t)search->rank * search->words;
  RingKind kind = RING_SUM;

  for (;;) {
    uint32_t pivot = find_lowest (set, search->words);
    if (pivot == ENL_NONE)
      return kind;
    uint32_t other = search->row_with_pivot[pivot];
    if (other == ENL_NONE) {
      search->row_with_pivot[pivot] = search->rank++;
      return RING_NEW;
    }
    if (other >= search->shorter)
      kind = RING_SPARE;
    const uint64_t *row = search->row + (size_t)other * search->words;
    for (uint32_t w = pivot / 64; w < search->words; w++)
      set[w] ^= row[w];
  }
}

static uint32_t
find_local_bond (const Search *search, uint32_t a, uint32_t b)
{
  for (uint32_t i = search->first[a]; i < search->first[a + 1]; i++)
    if (search->next_atom[i] == b)
      return search->next_bond[i];
  g_assert_not_reached ();
}

static void
flip_path (Search *search, uint64_t *set, uint32_t root, uint32_t a)
{
  const uint32_t *parent = search->parent + (size_t)root * search->n_atoms;

  for (; a != root; a = parent[a])
    flip (set, find_local_bond (search, a, parent[a]));
}

static void
add_candidate_ring (Search *search, const Candidate *c, GArray *first, GArray *atoms)
{
  const uint32_t *parent = search->parent + (size_t)c->root * search->n_atoms;
  uint32_t *ring = search->queue; /* free between walks */
  uint32_t n = 0, half;

  for (uint32_t a = c->left; a != c->root; a = parent[a])
    ring[n++] = search->atom[a];
  ring[n++] = search->atom[c->root];
  half = n;
  for (uint32_t a = c->right; a != c->root; a = parent[a])
    ring[n++] = search->atom[a];
  for (uint32_t i = half, j = n; i + 1 < j; i++) { /* the right path was walked backwards */
    uint32_t swap = ring[i];
    ring[i] = ring[--j];
    ring[j] = swap;
  }
  if (c->top != ENL_NONE)
    ring[n++] = search->atom[c->top];
  g_array_append_vals (atoms, ring, n);
  g_array_append_val (first, atoms->len);
}

static void
try_candidate (Search *search, const Candidate *c)
{
  uint64_t *set = search->row + (size_t)search->rank * search->words;

  memset (set, 0, search->words * sizeof *set);
  flip_path (search, set, c->root, c->left);
  flip_path (search, set, c->root, c->right);
  if (c->top == ENL_NONE) {
    flip (set, find_local_bond (search, c->left, c->right));
  } else {
    flip (set, find_local_bond (search, c->left, c->top));
    flip (set, find_local_bond (search, c->top, c->right));
  }
  RingKind kind = judge_row (search);
  if (kind == RING_NEW)
    add_candidate_ring (search, c, search->ring_first, search->ring_atom);
  else if (kind == RING_SPARE && search->spare_first->len <= MAX_SPARE)
    add_candidate_ring (search, c, search->spare_first, search->spare_atom);
}

/* Up to the last one that is as long as the longest ring of the set. */
static void
try_candidates (Search *search)
{
  uint32_t length = 0;

  for (uint32_t i = 0; i < search->candidate->len; i++) {
    const Candidate *c = &g_array_index (search->candidate, Candidate, i);
    bool complete = search->rank == search->wanted;
    if (complete && (c->length > length || search->spare_first->len > MAX_SPARE))
      return;
    if (c->length > length)
      search->shorter = search->rank;
    length = c->length;
    try_candidate (search, c);
  }
}

static void
search_window (Search *search, uint32_t shortest, uint32_t longest)
{
  g_array_set_size (search->candidate, 0);
  for (uint32_t root = search->n_atoms; root-- > 2;) {
    uint32_t reached = spread_from (search, root, longest / 2);
    for (uint32_t i = 0; i < reached; i++)
      propose_at (search, root, search->queue[i], shortest, longest);
  }
  g_array_sort (search->candidate, compare_candidates);
  try_candidates (search);
}

static void
find_rings_of_block (Search *search, const uint32_t *bond, uint32_t n_bonds)
{
  number_block (search, bond, n_bonds);
  search->wanted = n_bonds - search->n_atoms + 1;
  if (search->wanted == 1) {
    add_simple_ring (search);
    return;
  }
  size_t square = (size_t)search->n_atoms * search->n_atoms;
  search->words = (n_bonds + 63) / 64;
  search->rank = 0;
  g_autofree uint32_t *parents = g_new (uint32_t, square);
  g_autofree uint64_t *rows = g_new (uint64_t, (size_t)(search->wanted + 1) * search->words);
  g_autofree uint32_t *pivots = g_new (uint32_t, n_bonds);
  memset (pivots, 0xFF, n_bonds * sizeof *pivots);
  search->parent = parents;
  search->row = rows;
  search->row_with_pivot = pivots;
  for (uint32_t shortest = 3, longest = FIRST_WINDOW; search->rank < search->wanted;) {
    g_assert (shortest <= n_bonds);
    search_window (search, shortest, longest);
    shortest = longest + 1;
    longest = 2 * longest;
  }
}

/* ---- the whole molecule ---- */

static void
copy_rings (uint32_t *first, uint32_t *atom, uint32_t start, const GArray *from_first,
            const GArray *from_atom)
{
  for (uint32_t r = 0; r < from_first->len; r++)
    first[r] = start + g_array_index (from_first, uint32_t, r);
  if (from_atom->len)
    memcpy (atom + start, from_atom->data, from_atom->len * sizeof *atom);
}

static void
store_rings (Search *search)
{
  EnlMolecule *mol = search->mol;
  uint32_t n_rings = search->ring_first->len - 1, n_spare = search->spare_first->len - 1;

  enl_molecule_make_ring_block (mol, n_rings, n_spare,
                                search->ring_atom->len + search->spare_atom->len);
  copy_rings (mol->ring_first, mol->ring_atom, 0, search->ring_first, search->ring_atom);
  copy_rings (mol->ring_first + n_rings, mol->ring_atom, search->ring_atom->len,
              search->spare_first, search->spare_atom);
  memset (mol->ring_count, 0, mol->n_atoms * sizeof (uint32_t));
  memset (mol->smallest, 0, mol->n_atoms * sizeof (uint32_t));
  for (uint32_t r = 0; r < n_rings; r++) {
    uint32_t size = mol->ring_first[r + 1] - mol->ring_first[r];
    for (uint32_t i = mol->ring_first[r]; i < mol->ring_first[r + 1]; i++) {
      uint32_t a = mol->ring_atom[i];
      mol->ring_count[a]++;
      mol->smallest[a] = mol->smallest[a] ? MIN (mol->smallest[a], size) : size;
    }
  }
}

/* One block of memory for all arrays whose size is known: returns it, to be freed. */
static uint32_t *
share_memory (Search *search, Blocks *b)
{
  size_t n = search->mol->n_atoms, m = search->mol->n_bonds;
  uint32_t *memory = g_new0 (uint32_t, 10 * n + 1 + 5 * m), *p = memory;

  b->order = p, p += n; /* zero: not seen */
  b->low = p, p += n;
  b->step = p, p += n;
  b->came_by = p, p += n;
  b->walk = p, p += n;
  b->pending = p, p += m;
  search->local = p, p += n;
  search->atom = p, p += n;
  search->distance = p, p += n;
  search->queue = p, p += n;
  search->first = p, p += n + 1;
  search->next_atom = p, p += 2 * m;
  search->next_bond = p;
  return memory;
}

static GArray *
new_list (bool with_zero)
{
  GArray *list = g_array_new (FALSE, FALSE, sizeof (uint32_t));
  uint32_t zero = 0;

  if (with_zero)
    g_array_append_val (list, zero);
  return list;
}

void
enl_molecule_find_rings (EnlMolecule *mol)
{
  Search search = {.mol = mol};
  Blocks blocks = {0};

  g_assert (mol->linked);
  for (uint32_t i = 0; i < mol->n_bonds; i++)
    mol->bond[i].ring = false;
  /* These only free; `search` is what is used. */
  g_autofree G_GNUC_UNUSED uint32_t *memory = share_memory (&search, &blocks);
  g_autoptr (GArray) G_GNUC_UNUSED ring_first = search.ring_first = new_list (true);
  g_autoptr (GArray) G_GNUC_UNUSED ring_atom = search.ring_atom = new_list (false);
  g_autoptr (GArray) G_GNUC_UNUSED spare_first = search.spare_first = new_list (true);
  g_autoptr (GArray) G_GNUC_UNUSED spare_atom = search.spare_atom = new_list (false);
  g_autoptr (GArray) candidate = g_array_new (FALSE, FALSE, sizeof (Candidate));
  search.candidate = candidate;
  for (uint32_t a = 0; a < mol->n_atoms; a++)
    if (blocks.order[a] == 0)
      walk_blocks (&search, &blocks, a);
  store_rings (&search);
}
