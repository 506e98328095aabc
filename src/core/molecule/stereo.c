#include "core/molecule/stereo.h"

#include "core/molecule/graph.h"

static bool
has_value (const EnlGraph *graph, uint32_t unit)
{
  return unit != ENL_NONE && graph->unit[unit].value != 0;
}

void
enl_stereo_clean (EnlMolecule *mol)
{
  g_autoptr (EnlGraph) graph = enl_graph_new (mol, true);

  enl_graph_settle_units (graph);
  for (uint32_t v = 0; v < enl_molecule_atoms (mol); v++)
    if (enl_molecule_atom (mol, v)->winding && !has_value (graph, graph->unit_at[v]))
      enl_molecule_edit_atom (mol, v)->winding = ENL_WINDING_NONE;
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    uint32_t unit = graph->bond_at[enl_molecule_bond (mol, b)->from];
    if (!enl_molecule_bond (mol, b)->side ||
        (has_value (graph, unit) && graph->unit[unit].bond == b))
      continue;
    EnlBond *bond = enl_molecule_edit_bond (mol, b);
    bond->side = ENL_SIDE_NONE;
    bond->side_from = bond->side_to = ENL_NONE;
  }
}
