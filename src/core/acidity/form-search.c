#include "core/acidity/form-search.h"

#include <stdlib.h>
#include <string.h>

/* Steps of one search before it counts as too long (about 20 ms), and states looked at before the
 * best `limit` of them are chosen. */
#define MAX_STEPS  400000
#define MAX_STATES 4096
/* States kept for each pinned charge when a full search is too long. */
#define MAX_PINNED 8

typedef struct {
  const EnlFormNetwork *network;
  GArray *byte;
  uint32_t found, limit;
  uint32_t steps;
  bool stopped;
  int8_t *charge;    /* chosen, valid where done */
  int8_t *pi;        /* chosen pi bonds of every edge, -1 while open */
  uint8_t *used;     /* pi bonds already at the node */
  uint8_t *capacity; /* pi bonds that its open edges could still take */
  uint8_t *open;     /* open edges of the node */
  bool *done;
  uint32_t pinned; /* node that must carry -1, or ENL_NONE */
  int sum, charges;
  uint32_t minus_left; /* nodes not done that could carry -1 */
} Search;

static void visit (Search *s);

static void
record (Search *s)
{
  g_array_append_vals (s->byte, s->charge, s->network->n_nodes);
  g_array_append_vals (s->byte, s->pi, s->network->n_edges);
  s->found++;
  s->stopped = s->found >= s->limit;
}

/* The node with the fewest open edges leaves the least choice. */
static uint32_t
pick (const Search *s)
{
  uint32_t best = ENL_NONE;

  for (uint32_t i = 0; i < s->network->n_nodes; i++) {
    if (s->done[i])
      continue;
    if (best == ENL_NONE || s->open[i] < s->open[best])
      best = i;
    if (s->open[best] == 0)
      break;
  }
  return best;
}

static void
set_edge (Search *s, uint32_t edge, int8_t pi)
{
  const EnlFormEdge *e = &s->network->edge[edge];

  s->pi[edge] = pi;
  s->used[e->a] = (uint8_t)(s->used[e->a] + pi);
  s->used[e->b] = (uint8_t)(s->used[e->b] + pi);
  s->capacity[e->a] = (uint8_t)(s->capacity[e->a] - e->max);
  s->capacity[e->b] = (uint8_t)(s->capacity[e->b] - e->max);
  s->open[e->a]--;
  s->open[e->b]--;
}

static void
open_edge (Search *s, uint32_t edge)
{
  const EnlFormEdge *e = &s->network->edge[edge];

  s->used[e->a] = (uint8_t)(s->used[e->a] - s->pi[edge]);
  s->used[e->b] = (uint8_t)(s->used[e->b] - s->pi[edge]);
  s->capacity[e->a] = (uint8_t)(s->capacity[e->a] + e->max);
  s->capacity[e->b] = (uint8_t)(s->capacity[e->b] + e->max);
  s->open[e->a]++;
  s->open[e->b]++;
  s->pi[edge] = -1;
}

static bool
allows (const EnlFormNode *node, int charge)
{
  return charge < 0 ? node->can_minus : charge > 0 ? node->can_plus : node->can_neutral;
}

/* Some charge of this node still agrees with the bonds it has and can have. */
static bool
is_hopeful (const Search *s, uint32_t i)
{
  const EnlFormNode *node = &s->network->node[i];

  for (int charge = -1; charge <= 1; charge++) {
    int want = node->balance + charge - s->used[i];
    if (allows (node, charge) && want >= 0 && want <= s->capacity[i])
      return true;
  }
  return false;
}

/* Gives `want` pi bonds to the open edges of node `i` from its `k`-th on, in every way. */
static void
distribute (Search *s, uint32_t i, uint32_t k, int want)
{
  const EnlFormNode *node = &s->network->node[i];

  while (k < node->n && s->pi[s->network->incident[node->first + k]] >= 0)
    k++;
  if (k == node->n) {
    if (want == 0)
      visit (s);
    return;
  }
  uint32_t edge = s->network->incident[node->first + k];
  const EnlFormEdge *e = &s->network->edge[edge];
  uint32_t other = e->a == i ? e->b : e->a;
  for (int step = 0; step <= e->max && !s->stopped; step++) {
    int pi = (e->pi + step) % (e->max + 1); /* as in the first form before other ways */
    if (pi > want)
      continue;
    set_edge (s, edge, (int8_t)pi);
    if (want - pi <= s->capacity[i] && (s->done[other] || is_hopeful (s, other)))
      distribute (s, i, k + 1, want - pi);
    open_edge (s, edge);
  }
}

/* The charge left to place must be possible with the nodes left and the charges allowed. */
static bool
within_budget (const Search *s)
{
  int left = s->network->charge - s->sum;

  return abs (left) <= s->network->charges - s->charges && -left <= (int)s->minus_left;
}

static void
try_charge (Search *s, uint32_t i, int charge)
{
  const EnlFormNode *node = &s->network->node[i];
  int want = node->balance + charge - s->used[i];

  if (!allows (node, charge) || want < 0 || want > s->capacity[i] ||
      (i == s->pinned && charge != -1))
    return;
  s->charge[i] = (int8_t)charge;
  s->sum += charge;
  s->charges += abs (charge);
  if (within_budget (s))
    distribute (s, i, 0, want);
  s->sum -= charge;
  s->charges -= abs (charge);
}

static void
visit (Search *s)
{
  uint32_t i = pick (s);

  if (++s->steps > MAX_STEPS)
    s->stopped = true;
  if (s->stopped)
    return;
  if (i == ENL_NONE) {
    if (s->sum == s->network->charge)
      record (s);
    return;
  }
  int8_t first = s->network->node[i].charge;
  s->done[i] = true;
  s->minus_left -= s->network->node[i].can_minus;
  try_charge (s, i, first);
  for (int charge = 0; charge >= -1 && !s->stopped; charge--)
    if (charge != first)
      try_charge (s, i, charge);
  if (first != 1 && !s->stopped)
    try_charge (s, i, 1);
  s->minus_left += s->network->node[i].can_minus;
  s->done[i] = false;
}

/* One search; appends to `byte` and returns the number found. */
static uint32_t
run (const EnlFormNetwork *network, uint32_t pinned, uint32_t limit, GArray *byte, bool *stopped)
{
  uint32_t n = network->n_nodes, n_edges = network->n_edges;
  g_autofree uint8_t *counts = g_new0 (uint8_t, 3 * n + 1);
  g_autofree int8_t *chosen = g_new0 (int8_t, n + n_edges + 1);
  g_autofree bool *done = g_new0 (bool, n + 1);
  Search s = {
      .network = network,
      .byte = byte,
      .limit = limit,
      .charge = chosen,
      .pi = chosen + n,
      .used = counts,
      .capacity = counts + n,
      .open = counts + 2 * n,
      .done = done,
      .pinned = pinned,
  };

  memset (s.pi, -1, n_edges);
  for (uint32_t e = 0; e < n_edges; e++) {
    s.capacity[network->edge[e].a] =
        (uint8_t)(s.capacity[network->edge[e].a] + network->edge[e].max);
    s.capacity[network->edge[e].b] =
        (uint8_t)(s.capacity[network->edge[e].b] + network->edge[e].max);
    s.open[network->edge[e].a]++;
    s.open[network->edge[e].b]++;
  }
  for (uint32_t i = 0; i < n; i++)
    s.minus_left += network->node[i].can_minus;
  visit (&s);
  *stopped = s.stopped;
  return s.found;
}

/* ---- choosing among too many ---- */

typedef struct {
  const int8_t *byte;
  uint32_t distance; /* edges and charges unlike the first form */
  bool first;        /* nearest of its charge pattern */
  bool twice;        /* found before, by another search */
  uint32_t place;    /* in the order of compare_pattern: breaks ties */
} Ranked;

/* By charge pattern, in it by distance; equal states become neighbours. */
static int
compare_pattern (const void *a, const void *b, void *data)
{
  const Ranked *x = a, *y = b;
  const EnlFormNetwork *network = data;
  int order = memcmp (x->byte, y->byte, network->n_nodes);

  if (order == 0)
    order = (x->distance > y->distance) - (x->distance < y->distance);
  return order ? order : memcmp (x->byte, y->byte, network->n_nodes + network->n_edges);
}

static int
compare_rank (const void *a, const void *b)
{
  const Ranked *x = a, *y = b;

  if (x->twice != y->twice)
    return x->twice ? 1 : -1;
  if (x->first != y->first)
    return x->first ? -1 : 1;
  if (x->distance != y->distance)
    return x->distance < y->distance ? -1 : 1;
  return (x->place > y->place) - (x->place < y->place);
}

static uint32_t
distance_between (const int8_t *a, const int8_t *b, uint32_t size)
{
  uint32_t distance = 0;

  for (uint32_t i = 0; i < size; i++)
    distance += a[i] != b[i];
  return distance;
}

static void
rank_states (const EnlFormStates *states, Ranked *ranked)
{
  EnlFormNetwork *network = (EnlFormNetwork *)states->network;
  uint32_t nodes = network->n_nodes, size = nodes + network->n_edges;
  const int8_t *start = (const int8_t *)states->byte->data;

  for (uint32_t i = 0; i < states->n; i++) {
    ranked[i].byte = start + (size_t)i * size;
    ranked[i].distance = distance_between (ranked[i].byte, start, size);
  }
  g_qsort_with_data (ranked, (int)states->n, sizeof *ranked, compare_pattern, network);
  for (uint32_t i = 0; i < states->n; i++) {
    ranked[i].place = i;
    ranked[i].first = i == 0 || memcmp (ranked[i].byte, ranked[i - 1].byte, nodes) != 0;
    ranked[i].twice = i > 0 && memcmp (ranked[i].byte, ranked[i - 1].byte, size) == 0;
  }
  qsort (ranked, states->n, sizeof *ranked, compare_rank);
}

/* Orders the states by nearness to the first form, one of each charge pattern before the rest, and
 * keeps `limit` of them. */
static void
choose (EnlFormStates *states, uint32_t limit)
{
  uint32_t size = states->network->n_nodes + states->network->n_edges, kept = 0;
  g_autofree Ranked *ranked = g_new0 (Ranked, states->n + 1);
  GArray *chosen = g_array_new (FALSE, FALSE, 1);

  rank_states (states, ranked);
  while (kept < states->n && kept < limit && !ranked[kept].twice)
    g_array_append_vals (chosen, ranked[kept++].byte, size);
  if (kept < states->n && !ranked[kept].twice)
    states->incomplete = true;
  g_array_unref (states->byte);
  states->byte = chosen;
  states->n = kept;
}

static void
append_start (EnlFormStates *states)
{
  const EnlFormNetwork *network = states->network;

  for (uint32_t i = 0; i < network->n_nodes; i++)
    g_array_append_val (states->byte, network->node[i].charge);
  for (uint32_t e = 0; e < network->n_edges; e++)
    g_array_append_val (states->byte, network->edge[e].pi);
  states->n++;
}

void
enl_form_states_init (EnlFormStates *states, const EnlFormNetwork *network, uint32_t limit)
{
  bool stopped = false;

  memset (states, 0, sizeof *states);
  states->network = network;
  states->byte = g_array_new (FALSE, FALSE, 1);
  append_start (states);
  states->n += run (network, ENL_NONE, MAX_STATES, states->byte, &stopped);
  for (uint32_t i = 0; stopped && i < network->n_nodes; i++) {
    bool pinned_stopped = false;
    if (network->node[i].can_minus)
      states->n += run (network, i, MAX_PINNED, states->byte, &pinned_stopped);
  }
  states->incomplete = stopped;
  choose (states, limit);
}

void
enl_form_states_clear (EnlFormStates *states)
{
  g_array_unref (states->byte);
  memset (states, 0, sizeof *states);
}

static const int8_t *
state_at (const EnlFormStates *states, uint32_t state)
{
  uint32_t size = states->network->n_nodes + states->network->n_edges;

  g_assert (state < states->n);
  return (const int8_t *)states->byte->data + (size_t)state * size;
}

const int8_t *
enl_form_state_charge (const EnlFormStates *states, uint32_t state)
{
  return state_at (states, state);
}

const int8_t *
enl_form_state_pi (const EnlFormStates *states, uint32_t state)
{
  return state_at (states, state) + states->network->n_nodes;
}
