/* Ring blocks: the parts of a graph that hold together by rings (its biconnected components).
 * Fused and bridged rings share a block, spiro rings do not. */
#pragma once

#include "core/layout/sketch.h"

/* Sets `block` of every bond and `n_blocks`. */
void enl_blocks_find (EnlSketch *sketch);

/* Sets in[atom] for the atoms of a block; returns how many. */
uint32_t enl_block_atoms (const EnlSketch *sketch, uint32_t block, bool *in);

/* Sets in[atom] for what can be reached from `start` without passing `barrier`; returns how many.
 * `barrier` itself is not set. */
uint32_t enl_branch_atoms (const EnlSketch *sketch, uint32_t start, uint32_t barrier, bool *in);
