/* Squares of the plane with what stands in them, so that near things are found without asking
 * everything. */
#pragma once

#include "core/layout/sketch.h"

typedef struct EnlGrid EnlGrid;

/* Over all atoms (by spot) and bonds (by middle) with member[atom] true, or a bond with such an
 * end; NULL: everything. A cell is as wide as the longest bond of the sketch and at least 1, so
 * that whatever touches or crowds stands in the same or in a neighbouring cell. */
EnlGrid *enl_grid_new (const EnlSketch *sketch, const bool *member) ENL_MUST_USE;
void enl_grid_free (EnlGrid *grid);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlGrid, enl_grid_free)

/* Atoms (or bonds) in the nine cells around a spot: fills `found` (room for all atoms or bonds of
 * the sketch) in a fixed order and returns how many. */
uint32_t enl_grid_atoms_near (const EnlGrid *grid, EnlSpot spot, uint32_t *found);
uint32_t enl_grid_bonds_near (const EnlGrid *grid, EnlSpot spot, uint32_t *found);

EnlSpot enl_bond_middle (const EnlSketch *sketch, uint32_t bond);
