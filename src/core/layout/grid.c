#include "core/layout/grid.h"

#include <math.h>

#include "core/layout/geometry.h"

/* Chains of entries per cell; -1 ends a chain. */
typedef struct {
  int32_t *head, *next;
} Layer;

struct EnlGrid {
  double left, bottom, cell;
  int32_t columns, rows;
  Layer atom, bond;
};

/* Cells per side; a wider picture gets wider cells. */
static const int32_t most_cells = 128;

EnlSpot
enl_bond_middle (const EnlSketch *sketch, uint32_t bond)
{
  EnlSpot from = sketch->spot[sketch->bond[bond].from], to = sketch->spot[sketch->bond[bond].to];
  return (EnlSpot){(from.x + to.x) / 2, (from.y + to.y) / 2};
}

static void
set_frame (EnlGrid *grid, const EnlSketch *sketch)
{
  double right = -INFINITY, top = -INFINITY;

  grid->left = grid->bottom = INFINITY;
  grid->cell = 1;
  for (uint32_t i = 0; i < sketch->n_atoms; i++) {
    grid->left = fmin (grid->left, sketch->spot[i].x), right = fmax (right, sketch->spot[i].x);
    grid->bottom = fmin (grid->bottom, sketch->spot[i].y), top = fmax (top, sketch->spot[i].y);
  }
  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    grid->cell = fmax (grid->cell, enl_spot_distance (sketch->spot[sketch->bond[b].from],
                                                      sketch->spot[sketch->bond[b].to]));
  /* A crowding atom stands up to half a bond and a little more from the middle of a bond. */
  grid->cell *= 1.01;
  grid->cell = fmax (grid->cell, fmax (right - grid->left, top - grid->bottom) / most_cells);
  grid->columns = (int32_t)((right - grid->left) / grid->cell) + 1;
  grid->rows = (int32_t)((top - grid->bottom) / grid->cell) + 1;
}

static int32_t
column_of (const EnlGrid *grid, double x)
{
  return (int32_t)floor ((x - grid->left) / grid->cell);
}

static int32_t
row_of (const EnlGrid *grid, double y)
{
  return (int32_t)floor ((y - grid->bottom) / grid->cell);
}

static void
layer_init (Layer *layer, int32_t cells, uint32_t entries)
{
  layer->head = g_new (int32_t, cells);
  layer->next = g_new (int32_t, entries + 1);
  for (int32_t k = 0; k < cells; k++)
    layer->head[k] = -1;
}

static void
layer_add (const EnlGrid *grid, Layer *layer, EnlSpot spot, uint32_t entry)
{
  int32_t column = CLAMP (column_of (grid, spot.x), 0, grid->columns - 1);
  int32_t row = CLAMP (row_of (grid, spot.y), 0, grid->rows - 1);
  int32_t cell = row * grid->columns + column;

  layer->next[entry] = layer->head[cell];
  layer->head[cell] = (int32_t)entry;
}

EnlGrid *
enl_grid_new (const EnlSketch *sketch, const bool *member)
{
  EnlGrid *grid = g_new0 (EnlGrid, 1);

  set_frame (grid, sketch);
  layer_init (&grid->atom, grid->columns * grid->rows, sketch->n_atoms);
  layer_init (&grid->bond, grid->columns * grid->rows, sketch->n_bonds);
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    if (!member || member[i])
      layer_add (grid, &grid->atom, sketch->spot[i], i);
  for (uint32_t b = 0; b < sketch->n_bonds; b++)
    if (!member || member[sketch->bond[b].from] || member[sketch->bond[b].to])
      layer_add (grid, &grid->bond, enl_bond_middle (sketch, b), b);
  return grid;
}

void
enl_grid_free (EnlGrid *grid)
{
  if (!grid)
    return;
  g_free (grid->atom.head);
  g_free (grid->atom.next);
  g_free (grid->bond.head);
  g_free (grid->bond.next);
  g_free (grid);
}

static uint32_t
layer_near (const EnlGrid *grid, const Layer *layer, EnlSpot spot, uint32_t *found)
{
  int32_t column = column_of (grid, spot.x), row = row_of (grid, spot.y);
  uint32_t n = 0;

  for (int32_t r = MAX (row - 1, 0); r <= MIN (row + 1, grid->rows - 1); r++)
    for (int32_t c = MAX (column - 1, 0); c <= MIN (column + 1, grid->columns - 1); c++)
      for (int32_t k = layer->head[r * grid->columns + c]; k >= 0; k = layer->next[k])
        found[n++] = (uint32_t)k;
  return n;
}

uint32_t
enl_grid_atoms_near (const EnlGrid *grid, EnlSpot spot, uint32_t *found)
{
  return layer_near (grid, &grid->atom, spot, found);
}

uint32_t
enl_grid_bonds_near (const EnlGrid *grid, EnlSpot spot, uint32_t *found)
{
  return layer_near (grid, &grid->bond, spot, found);
}
