#include "core/molecule/partition.h"

#include <stdlib.h>
#include <string.h>

typedef struct {
  uint64_t key;
  uint32_t vertex;
} Keyed;

static void
mix (EnlPartition *part, uint64_t value)
{
  part->hash = (part->hash ^ value) * UINT64_C (0x9E3779B97F4A7C15);
  part->hash ^= part->hash >> 29;
}

static int
by_key (const void *a, const void *b)
{
  uint64_t x = ((const Keyed *)a)->key, y = ((const Keyed *)b)->key;
  return x < y ? -1 : x > y;
}

static void
place (EnlPartition *part, uint32_t vertex, uint32_t position)
{
  part->lab[position] = vertex;
  part->pos[vertex] = position;
}

static void
exchange (EnlPartition *part, uint32_t a, uint32_t b)
{
  uint32_t va = part->lab[a], vb = part->lab[b];
  place (part, vb, a);
  place (part, va, b);
}

static void
enqueue (EnlPartition *part, uint32_t cell)
{
  uint32_t n = part->graph->n;

  if (part->in_queue[cell])
    return;
  part->in_queue[cell] = true;
  part->queue[(part->head + part->queued++) % n] = cell;
}

static uint32_t
dequeue (EnlPartition *part)
{
  uint32_t cell = part->queue[part->head];

  part->head = (part->head + 1) % part->graph->n;
  part->queued--;
  part->in_queue[cell] = false;
  return cell;
}

/* Makes positions at .. at + len - 1, the last ones of an older cell, a cell of their own. */
static void
cut (EnlPartition *part, uint32_t at, uint32_t len)
{
  uint32_t old = part->start[part->lab[at]];

  part->len[old] -= len;
  part->len[at] = len;
  for (uint32_t i = at; i < at + len; i++)
    part->start[part->lab[i]] = at;
  part->split[part->splits++] = at;
  part->cells++;
}

/* Sorts positions from .. to - 1 by count. */
static void
sort_range (EnlPartition *part, uint32_t from, uint32_t to)
{
  if (to - from <= 12) {
    for (uint32_t i = from + 1; i < to; i++)
      for (uint32_t j = i; j > from && part->count[part->lab[j - 1]] > part->count[part->lab[j]];
           j--)
        exchange (part, j - 1, j);
    return;
  }
  g_autofree Keyed *list = g_new (Keyed, to - from);
  for (uint32_t i = from; i < to; i++)
    list[i - from] = (Keyed){part->count[part->lab[i]], part->lab[i]};
  qsort (list, to - from, sizeof *list, by_key);
  for (uint32_t i = from; i < to; i++)
    place (part, list[i - from].vertex, i);
}

/* Queues the parts of a cell that was cut: all of them when the cell was waiting anyway, else all
 * but the largest (Hopcroft's rule: what the whole says is known already). */
static void
enqueue_parts (EnlPartition *part, uint32_t cell, uint32_t end, bool waiting)
{
  uint32_t largest = cell;

  for (uint32_t s = cell; s < end; s += part->len[s])
    if (part->len[s] > part->len[largest])
      largest = s;
  for (uint32_t s = cell; s < end; s += part->len[s])
    if (waiting || s != largest)
      enqueue (part, s);
}

/* Cuts the cell by the counts of its touched vertices, which stand in its last `tail` positions. */
static void
cut_by_count (EnlPartition *part, uint32_t cell)
{
  uint32_t end = cell + part->len[cell], from = end - part->tail[cell];
  bool waiting = part->in_queue[cell], was_cut = false;

  part->tail[cell] = 0;
  sort_range (part, from, end);
  mix (part, ((uint64_t)cell << 32) + from);
  /* From the back, so that each cut takes the last positions of what is left of the cell. */
  for (uint32_t to = end; to > from;) {
    uint64_t count = part->count[part->lab[to - 1]];
    uint32_t at = to - 1;
    while (at > from && part->count[part->lab[at - 1]] == count)
      at--;
    mix (part, count);
    mix (part, at);
    if (at > cell) {
      cut (part, at, to - at);
      was_cut = true;
    }
    to = at;
  }
  if (was_cut)
    enqueue_parts (part, cell, end, waiting);
}

/* Notes `amount` (above 0) for a vertex; true when it is the vertex's first in this round. */
static void
touch (EnlPartition *part, uint32_t vertex, uint64_t amount, uint32_t *touched, uint32_t *cells)
{
  if (part->count[vertex] == 0) {
    uint32_t cell = part->start[vertex];
    part->touched[(*touched)++] = vertex;
    if (part->tail[cell]++ == 0)
      part->touched_cell[(*cells)++] = cell;
    exchange (part, part->pos[vertex], cell + part->len[cell] - part->tail[cell]);
  }
  part->count[vertex] += amount;
}

static int
by_number (const void *a, const void *b)
{
  uint32_t x = *(const uint32_t *)a, y = *(const uint32_t *)b;
  return x < y ? -1 : x > y;
}

static void
sort_numbers (uint32_t *list, uint32_t n)
{
  if (n > 12) {
    qsort (list, n, sizeof *list, by_number);
    return;
  }
  for (uint32_t i = 1; i < n; i++)
    for (uint32_t j = i; j > 0 && list[j - 1] > list[j]; j--) {
      uint32_t swap = list[j];
      list[j] = list[j - 1];
      list[j - 1] = swap;
    }
}

static void
cut_touched (EnlPartition *part, uint32_t touched, uint32_t cells)
{
  sort_numbers (part->touched_cell, cells);
  for (uint32_t i = 0; i < cells; i++)
    cut_by_count (part, part->touched_cell[i]);
  for (uint32_t i = 0; i < touched; i++)
    part->count[part->touched[i]] = 0;
}

static void
refine_by_cell (EnlPartition *part, uint32_t cell)
{
  const EnlGraph *graph = part->graph;
  uint32_t touched = 0, cells = 0;

  /* Touching moves vertices inside their cells, this one included: walk over a copy. */
  uint32_t len = part->len[cell];
  uint32_t small[16];
  uint32_t *member = len <= ENL_COUNT (small) ? small : g_new (uint32_t, len);
  memcpy (member, part->lab + cell, sizeof *member * len);
  for (uint32_t i = 0; i < len; i++)
    for (uint32_t a = graph->first[member[i]]; a < graph->first[member[i] + 1]; a++)
      touch (part, graph->target[a], graph->weight[a], &touched, &cells);
  if (member != small)
    g_free (member);
  cut_touched (part, touched, cells);
}

/* 1: the cells do not decide it yet; 2 or 3: they do. */
static uint64_t
unit_code (const EnlPartition *part, const EnlUnit *unit)
{
  int sign = enl_unit_sign (unit, part->start);
  return sign == 0 ? 1 : sign < 0 ? 2 : 3;
}

static void
refine_by_stereo (EnlPartition *part)
{
  uint32_t touched = 0, cells = 0;

  for (uint32_t u = 0; u < part->graph->units; u++) {
    const EnlUnit *unit = &part->graph->unit[u];
    if (!unit->value)
      continue;
    uint64_t code = unit_code (part, unit);
    if (unit->bond == ENL_NONE) {
      touch (part, unit->end[0], code, &touched, &cells);
    } else {
      touch (part, unit->end[0], code << 2, &touched, &cells);
      touch (part, unit->end[1], code << 2, &touched, &cells);
    }
  }
  cut_touched (part, touched, cells);
}

static void
refine (EnlPartition *part)
{
  do {
    while (part->queued > 0) {
      uint32_t cell = dequeue (part);
      mix (part, cell);
      if (part->cells < part->graph->n)
        refine_by_cell (part, cell);
    }
    if (part->graph->units > 0)
      refine_by_stereo (part);
  } while (part->queued > 0);
  mix (part, part->cells);
}

static void
allocate (EnlPartition *part, uint32_t n)
{
  size_t words = 9 * (size_t)n + 9;
  uint64_t *memory = g_malloc0 (words * sizeof (uint32_t) + (n + 1) * sizeof (uint64_t) + n + 1);

  part->memory = memory;
  part->count = memory;
  part->lab = (uint32_t *)(memory + n + 1);
  part->pos = part->lab + n + 1;
  part->start = part->pos + n + 1;
  part->len = part->start + n + 1;
  part->split = part->len + n + 1;
  part->queue = part->split + n + 1;
  part->touched = part->queue + n + 1;
  part->touched_cell = part->touched + n + 1;
  part->tail = part->touched_cell + n + 1;
  part->in_queue = (bool *)(part->tail + n + 1);
}

void
enl_partition_init (EnlPartition *part, const EnlGraph *graph)
{
  *part = (EnlPartition){.graph = graph};
  allocate (part, graph->n);
  if (graph->n == 0)
    return;
  for (uint32_t v = 0; v < graph->n; v++) {
    place (part, v, v);
    part->count[v] = graph->colour[v];
  }
  part->len[0] = graph->n;
  part->cells = 1;
  part->tail[0] = graph->n;
  enqueue (part, 0);
  cut_by_count (part, 0);
  memset (part->count, 0, sizeof *part->count * graph->n);
  refine (part);
}

void
enl_partition_clear (EnlPartition *part)
{
  g_free (part->memory);
  *part = (EnlPartition){0};
}

uint64_t
enl_partition_individualise (EnlPartition *part, uint32_t vertex)
{
  uint32_t cell = part->start[vertex], len = part->len[cell];

  part->hash = cell;
  if (len > 1) {
    exchange (part, part->pos[vertex], cell);
    cut (part, cell + 1, len - 1);
    enqueue (part, cell);
  }
  refine (part);
  return part->hash;
}

uint32_t
enl_partition_mark (const EnlPartition *part)
{
  return part->splits;
}

void
enl_partition_return (EnlPartition *part, uint32_t mark)
{
  while (part->splits > mark) {
    uint32_t at = part->split[--part->splits], len = part->len[at];
    uint32_t into = part->start[part->lab[at - 1]];
    for (uint32_t i = at; i < at + len; i++)
      part->start[part->lab[i]] = into;
    part->len[into] += len;
    part->cells--;
  }
}

uint32_t
enl_partition_target (const EnlPartition *part)
{
  uint32_t best = ENL_NONE, n = part->graph->n;

  if (part->cells == n)
    return ENL_NONE;
  for (uint32_t s = 0; s < n; s += part->len[s])
    if (part->len[s] > 1 && (best == ENL_NONE || part->len[s] < part->len[best])) {
      best = s;
      if (part->len[s] == 2)
        break;
    }
  return best;
}
