#include "core/molecule/kekule.h"

#include <string.h>

#include "core/molecule/molecule-private.h"
#include "core/molecule/valence.h"

enum { NITROGEN = 7 };

typedef enum { NEED_NONE, NEED_OPTIONAL, NEED_DOUBLE } Need;

/* One search for a perfect matching. Atoms of the graph stand at an even number of steps from the
 * root (outer), at an odd one (inner) or are unreached. */
typedef struct {
  const EnlMolecule *mol;
  const bool *delocalised;
  uint8_t *need;
  bool spare;       /* optional atoms may take part */
  uint32_t *mate;   /* partner of the double bond, or ENL_NONE */
  uint32_t *parent; /* of an inner atom: the outer atom before it */
  uint32_t *base;   /* stem of the blossom that holds the atom */
  uint32_t *queue;
  uint8_t *outer, *on_path, *in_blossom;
} Matching;

static bool
is_usable (const Matching *m, uint32_t link)
{
  uint32_t bond = m->mol->via[link];

  Need need = (Need)m->need[m->mol->neighbour[link]];

  return m->delocalised[bond] && m->mol->bond[bond].ring &&
         (need == NEED_DOUBLE || (need == NEED_OPTIONAL && m->spare));
}

/* A double bond is needed when the bonds counted once fall short of a usual valence. */
static Need
find_need (const EnlMolecule *mol, const bool *delocalised, EnlKekuleFlags flags, uint32_t a)
{
  const EnlAtom *atom = &mol->atom[a];
  uint32_t sum = atom->hydrogens, n_delocalised = 0;
  size_t count;
  const uint8_t *valence = enl_valence_usual (atom->element, atom->charge, &count);

  for (uint32_t i = mol->first[a]; i < mol->first[a + 1]; i++) {
    bool soft = delocalised[mol->via[i]];
    sum += soft ? 1 : mol->bond[mol->via[i]].order;
    n_delocalised += soft;
  }
  if (n_delocalised == 0)
    return NEED_NONE;
  if (count == 0)
    return NEED_OPTIONAL;
  for (size_t i = 0; i < count; i++)
    if (valence[i] == sum)
      return NEED_NONE;
    else if (valence[i] > sum)
      break;
  if (valence[count - 1] < sum)
    return NEED_NONE;
  if ((flags & ENL_KEKULE_INFER_NH) && atom->element == NITROGEN && !atom->exact && !atom->charge)
    return NEED_OPTIONAL;
  return NEED_DOUBLE;
}

/* A first matching: atoms with a single free partner are served first, since they have no choice.
 */
static uint32_t
count_free_partners (const Matching *m, uint32_t a, uint32_t *partner)
{
  uint32_t n = 0;

  for (uint32_t i = m->mol->first[a]; i < m->mol->first[a + 1]; i++)
    if (is_usable (m, i) && m->mate[m->mol->neighbour[i]] == ENL_NONE &&
        m->need[m->mol->neighbour[i]] == NEED_DOUBLE) {
      *partner = n ? *partner : m->mol->neighbour[i];
      n++;
    }
  return n;
}

static void
pair_up (Matching *m, uint32_t a, uint32_t b)
{
  m->mate[a] = b;
  m->mate[b] = a;
}

/* Pairs `a`, then whoever has no choice left because of it. */
static void
match_greedily (Matching *m, uint32_t a)
{
  uint32_t n_queue = 0, partner = ENL_NONE;

  m->queue[n_queue++] = a;
  while (n_queue) {
    a = m->queue[--n_queue];
    if (m->mate[a] != ENL_NONE || !count_free_partners (m, a, &partner))
      continue;
    pair_up (m, a, partner);
    for (int end = 0; end < 2; end++) {
      uint32_t at = end ? a : partner, unused;
      for (uint32_t i = m->mol->first[at]; i < m->mol->first[at + 1]; i++) {
        uint32_t next = m->mol->neighbour[i];
        if (is_usable (m, i) && m->mate[next] == ENL_NONE && m->need[next] == NEED_DOUBLE &&
            n_queue < m->mol->n_atoms && count_free_partners (m, next, &unused) == 1)
          m->queue[n_queue++] = next;
      }
    }
  }
}

static uint32_t
find_common_stem (Matching *m, uint32_t a, uint32_t b)
{
  memset (m->on_path, 0, m->mol->n_atoms);
  for (;;) {
    a = m->base[a];
    m->on_path[a] = 1;
    if (m->mate[a] == ENL_NONE)
      break;
    a = m->parent[m->mate[a]];
  }
  for (;;) {
    b = m->base[b];
    if (m->on_path[b])
      return b;
    b = m->parent[m->mate[b]];
  }
}

static void
mark_blossom (Matching *m, uint32_t at, uint32_t stem, uint32_t child)
{
  while (m->base[at] != stem) {
    m->in_blossom[m->base[at]] = m->in_blossom[m->base[m->mate[at]]] = 1;
    m->parent[at] = child;
    child = m->mate[at];
    at = m->parent[child];
  }
}

/* An odd ring of the search tree between outer atoms a and b shrinks to its stem; its atoms all
 * become outer. */
static uint32_t
shrink (Matching *m, uint32_t a, uint32_t b, uint32_t tail)
{
  uint32_t stem = find_common_stem (m, a, b);

  memset (m->in_blossom, 0, m->mol->n_atoms);
  mark_blossom (m, a, stem, b);
  mark_blossom (m, b, stem, a);
  for (uint32_t v = 0; v < m->mol->n_atoms; v++) {
    if (!m->in_blossom[m->base[v]])
      continue;
    m->base[v] = stem;
    if (!m->outer[v]) {
      m->outer[v] = 1;
      m->queue[tail++] = v;
    }
  }
  return tail;
}

/* Exchanges the bonds of the path that ends in the inner atom `end`. */
static void
exchange (Matching *m, uint32_t end)
{
  while (end != ENL_NONE) {
    uint32_t before = m->parent[end], next = m->mate[before];
    pair_up (m, end, before);
    end = next;
  }
}

/* Looks for a path along which `root` gets a partner: to a free atom, or, where `root` needs one,
 * to a paired atom that can do without. */
static bool
match_by_search (Matching *m, uint32_t root)
{
  bool needed = m->need[root] == NEED_DOUBLE;
  uint32_t head = 0, tail = 0;

  for (uint32_t v = 0; v < m->mol->n_atoms; v++) {
    m->parent[v] = ENL_NONE;
    m->base[v] = v;
    m->outer[v] = 0;
  }
  m->outer[root] = 1;
  m->queue[tail++] = root;
  while (head < tail) {
    uint32_t at = m->queue[head++];
    if (needed && at != root && m->need[at] == NEED_OPTIONAL) {
      uint32_t end = m->mate[at];
      m->mate[at] = ENL_NONE;
      exchange (m, end);
      return true;
    }
    for (uint32_t i = m->mol->first[at]; i < m->mol->first[at + 1]; i++) {
      uint32_t next = m->mol->neighbour[i];
      if (!is_usable (m, i) || m->base[at] == m->base[next] || m->mate[at] == next)
        continue;
      if (m->outer[next]) {
        tail = shrink (m, at, next, tail);
      } else if (m->parent[next] == ENL_NONE) {
        uint32_t mate = m->mate[next];
        m->parent[next] = at;
        if (mate == ENL_NONE) {
          exchange (m, next);
          return true;
        }
        m->outer[mate] = 1;
        m->queue[tail++] = mate;
      }
    }
  }
  return false;
}

/* Pairs what still needs a partner; returns the first atom that finds none, or ENL_NONE. */
static uint32_t
match_rest (Matching *m)
{
  uint32_t left_over = ENL_NONE;

  for (uint32_t a = 0; a < m->mol->n_atoms; a++)
    if (m->need[a] == NEED_DOUBLE && m->mate[a] == ENL_NONE && !match_by_search (m, a) &&
        left_over == ENL_NONE)
      left_over = a;
  return left_over;
}

/* Nitrogen that may go without a double bond, and then takes a hydrogen, does so only where it has
 * to: as in pyridazine, two of them that are left pair up. */
static void
match_nitrogens (Matching *m)
{
  m->spare = true;
  for (uint32_t a = 0; a < m->mol->n_atoms; a++)
    if (m->need[a] == NEED_OPTIONAL && m->mate[a] == ENL_NONE &&
        m->mol->atom[a].element == NITROGEN)
      match_by_search (m, a);
}

/* Optional atoms are called in only where it does not work without them. */
static bool
match_all (Matching *m, uint32_t *culprit)
{
  for (uint32_t a = 0; a < m->mol->n_atoms; a++)
    if (m->need[a] == NEED_DOUBLE && m->mate[a] == ENL_NONE)
      match_greedily (m, a);
  uint32_t left_over = match_rest (m);
  if (left_over != ENL_NONE) {
    m->spare = true;
    left_over = match_rest (m);
  }
  if (culprit)
    *culprit = left_over;
  return left_over == ENL_NONE;
}

static void
write_orders (EnlMolecule *mol, const bool *delocalised, const uint32_t *mate)
{
  for (uint32_t i = 0; i < mol->n_bonds; i++)
    if (delocalised[i])
      mol->bond[i].order = mate[mol->bond[i].from] == mol->bond[i].to ? 2 : 1;
}

bool
enl_kekule_place (EnlMolecule *mol, const bool *delocalised, EnlKekuleFlags flags,
                  uint32_t *culprit)
{
  size_t n = mol->n_atoms;
  g_autofree uint32_t *words = g_new (uint32_t, 4 * n + 1);
  g_autofree uint8_t *bytes = g_new0 (uint8_t, 4 * n + 1);
  Matching m = {.mol = mol, .delocalised = delocalised};

  g_assert (mol->linked);
  m.mate = words;
  m.parent = words + n;
  m.base = words + 2 * n;
  m.queue = words + 3 * n;
  m.need = bytes;
  m.outer = bytes + n;
  m.on_path = bytes + 2 * n;
  m.in_blossom = bytes + 3 * n;
  memset (m.mate, 0xFF, n * sizeof *m.mate);
  for (uint32_t a = 0; a < n; a++)
    m.need[a] = (uint8_t)find_need (mol, delocalised, flags, a);
  if (!match_all (&m, culprit))
    return false;
  if (flags & ENL_KEKULE_INFER_NH)
    match_nitrogens (&m);
  write_orders (mol, delocalised, m.mate);
  return true;
}
