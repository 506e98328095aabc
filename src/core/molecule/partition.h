/* Ordered partition of the vertices of a graph, refined until it is equitable: vertices of one cell
 * have equally coloured arcs into every other cell, and equal stereo arrangements where the cells
 * of their ligands decide one.
 *
 * Method: McKay and Piperno, "Practical graph isomorphism, II", J. Symb. Comput. 2014, 60, 94.
 * Every step depends on cells and colours alone, never on vertex numbers.
 */
#pragma once

#include "core/molecule/graph.h"

typedef struct {
  const EnlGraph *graph;
  uint32_t cells;
  uint32_t *lab;   /* vertex at a position; a cell is a run of positions */
  uint32_t *pos;   /* position of a vertex */
  uint32_t *start; /* start position of the vertex's cell, its present colour */
  uint32_t *len;   /* length of the cell that starts at a position */
  /* private */
  uint32_t *split; /* start positions in the order of their making, to take them back */
  uint32_t splits;
  uint32_t *queue, head, queued;
  bool *in_queue;
  uint64_t *count;
  uint32_t *touched, *touched_cell, *tail;
  uint64_t hash;
  void *memory;
} EnlPartition;

/* Cells by vertex colour, refined. Clear with enl_partition_clear. */
void enl_partition_init (EnlPartition *part, const EnlGraph *graph);
void enl_partition_clear (EnlPartition *part);

/* Sets `vertex` before the others of its cell and refines. Returns a number that is equal for steps
 * which an automorphism maps on each other. */
uint64_t enl_partition_individualise (EnlPartition *part, uint32_t vertex);

/* Mark of the present state, and the way back to it. */
uint32_t enl_partition_mark (const EnlPartition *part);
void enl_partition_return (EnlPartition *part, uint32_t mark);

/* Start of the first cell of smallest size above one; ENL_NONE when all are single. */
uint32_t enl_partition_target (const EnlPartition *part);
