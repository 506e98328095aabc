/* Which of the marked stereo units mean anything.
 *
 * A unit is idle when a symmetry of the rest turns it over: its two arrangements are then one
 * molecule. Units may depend on each other (1,4-dimethylcyclohexane, the middle carbon of a
 * trihydroxyglutaric acid), so the units are sorted step by step into firm and idle ones:
 *   - firm: no symmetry of the graph with the firm units turns it;
 *   - firm: no symmetry of the graph with all other units turns it (one flip, another isomer);
 *   - idle: a symmetry turns it that leaves every other undecided unit as it is.
 * What stays undecided matters only together (all-cis against the others in
 * 1,3,5-trimethylcyclohexane) and is kept.
 */
#include "core/molecule/automorphism.h"
#include "core/molecule/graph.h"

#include <string.h>

#define WORK_LIMIT 100000 /* undecided units times atoms beyond which all are kept untested */

typedef enum { FIRM, OPEN, IDLE } State;

typedef struct {
  EnlGraph *graph;
  State *state;
  int *value;
  uint64_t *colour;
} Settling;

static void
set_apart (EnlGraph *graph, uint32_t u)
{
  const EnlUnit *unit = &graph->unit[u];
  uint64_t mark = (uint64_t)(u % 0xfffe + 1) << ENL_GRAPH_COLOUR_BITS;

  for (uint32_t row = 0; row < 2; row++)
    if (unit->end[row] != ENL_NONE)
      graph->colour[unit->end[row]] |= mark;
}

/* Whether a symmetry turns unit u, with the firm units in force and the open ones in force
 * (`open_count`) or also held in place (`open_fixed`). */
static bool
turns (Settling *s, uint32_t u, bool open_count, bool open_fixed)
{
  EnlGraph *graph = s->graph;
  EnlUnit watch = graph->unit[u];
  EnlSymmetry symmetry;

  watch.value = 1;
  for (uint32_t i = 0; i < graph->units; i++) {
    bool in_force = s->state[i] == FIRM || (s->state[i] == OPEN && (open_count || open_fixed));
    graph->unit[i].value = in_force && i != u ? s->value[i] : 0;
    if (i == u || (open_fixed && s->state[i] == OPEN))
      set_apart (graph, i);
  }
  enl_symmetry_search (graph, &watch, &symmetry);
  memcpy (graph->colour, s->colour, sizeof *graph->colour * graph->n);
  bool result = symmetry.turns;
  enl_symmetry_clear (&symmetry);
  return result;
}

/* Moves every open unit for which the test has the wanted outcome to `to`; true when any moved. */
static bool
move_units (Settling *s, State to, bool wanted, bool open_count, bool open_fixed)
{
  g_autofree bool *moves = g_new0 (bool, s->graph->units);
  bool any = false;

  for (uint32_t u = 0; u < s->graph->units; u++)
    if (s->state[u] == OPEN)
      any |= moves[u] = turns (s, u, open_count, open_fixed) == wanted;
  for (uint32_t u = 0; u < s->graph->units; u++)
    if (moves[u])
      s->state[u] = to;
  return any;
}

static bool
is_leaf_twin (const EnlGraph *graph, uint32_t a, uint32_t b)
{
  return graph->colour[a] == graph->colour[b] && graph->first[a + 1] - graph->first[a] == 1 &&
         graph->first[b + 1] - graph->first[b] == 1 &&
         graph->weight[graph->first[a]] == graph->weight[graph->first[b]];
}

static State
first_state (const EnlGraph *graph, const EnlUnit *unit, const uint32_t *orbit)
{
  State state = FIRM;

  for (uint32_t row = 0; row < 2; row++)
    for (uint32_t i = 1; i < unit->ligands[row]; i++)
      for (uint32_t j = 0; j < i; j++) {
        uint32_t a = unit->ligand[row][j], b = unit->ligand[row][i];
        if (is_leaf_twin (graph, a, b))
          return IDLE;
        if (orbit[a] == orbit[b])
          state = OPEN;
      }
  return state;
}

/* Fills the first states from the symmetry of the graph without any stereo; returns how many are
 * open. */
static uint32_t
start (Settling *s)
{
  EnlGraph *graph = s->graph;
  EnlSymmetry plain;
  uint32_t open = 0;

  for (uint32_t u = 0; u < graph->units; u++) {
    s->value[u] = graph->unit[u].value;
    graph->unit[u].value = 0;
  }
  enl_symmetry_search (graph, NULL, &plain);
  for (uint32_t u = 0; u < graph->units; u++) {
    s->state[u] = s->value[u] ? first_state (graph, &graph->unit[u], plain.orbit) : IDLE;
    open += s->state[u] == OPEN;
  }
  enl_symmetry_clear (&plain);
  return open;
}

void
enl_graph_settle_units (EnlGraph *graph)
{
  if (graph->units == 0)
    return;
  g_autofree State *state = g_new (State, graph->units);
  g_autofree int *value = g_new (int, graph->units);
  Settling s = {.graph = graph, .state = state, .value = value};
  uint32_t open = start (&s);

  if (open > 0 && (uint64_t)open * graph->n <= WORK_LIMIT) {
    g_autofree uint64_t *colour = g_memdup2 (graph->colour, sizeof *colour * graph->n);
    s.colour = colour;
    while (move_units (&s, FIRM, false, false, false) ||
           move_units (&s, FIRM, false, true, false) || move_units (&s, IDLE, true, false, true))
      ;
  }
  for (uint32_t u = 0; u < graph->units; u++)
    graph->unit[u].value = state[u] == IDLE ? 0 : value[u];
}
