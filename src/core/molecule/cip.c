#include "core/molecule/cip.h"

#include <string.h>

#include "core/molecule/cip-digraph.h"
#include "core/molecule/graph.h"

typedef struct {
  const EnlMolecule *mol;
  const EnlGraph *graph;
  EnlCip *atom_label, *bond_label;
} Labels;

const char *
enl_cip_text (EnlCip cip)
{
  static const char *text[] = {"", "R", "S", "r", "s", "E", "Z"};
  return text[cip];
}

/* Looking with the lowest ligand behind, that is from the side opposite to it: the others turn
 * anticlockwise from the lowest's own place, clockwise from here, for R. */
static EnlCip
centre_label (const Labels *l, const EnlUnit *unit, EnlCipRule last)
{
  EnlCipOrder order =
      enl_cip_order (l->mol, unit->end[0], ENL_NONE, last, l->atom_label, l->bond_label);
  int sign = unit->value;

  if (!order.decided || order.count != 4)
    return ENL_CIP_NONE;
  uint32_t list[4] = {order.atom[3], order.atom[0], order.atom[1], order.atom[2]};
  for (uint32_t i = 0; i < 4; i++)
    list[i]++; /* ENL_NONE, the unwritten ligand, becomes 0: it stands first in index order */
  for (uint32_t i = 1; i < 4; i++)
    for (uint32_t j = 0; j < i; j++)
      if (list[j] > list[i])
        sign = -sign;
  if (order.rule == ENL_CIP_RULE_5)
    return sign > 0 ? ENL_CIP_PSEUDO_R : ENL_CIP_PSEUDO_S;
  return sign > 0 ? ENL_CIP_R : ENL_CIP_S;
}

static EnlCip
double_bond_label (const Labels *l, const EnlUnit *unit, EnlCipRule last)
{
  int sign = unit->value;

  for (uint32_t row = 0; row < 2; row++) {
    EnlCipOrder order = enl_cip_order (l->mol, unit->end[row], unit->end[1 - row], last,
                                       l->atom_label, l->bond_label);
    if (!order.decided || order.count == 0 || order.atom[0] == ENL_NONE)
      return ENL_CIP_NONE;
    if (order.atom[0] != unit->ligand[row][unit->ligands[row] - 1])
      sign = -sign;
  }
  return sign > 0 ? ENL_CIP_Z : ENL_CIP_E;
}

static bool
label_unit (Labels *l, const EnlUnit *unit, EnlCipRule last)
{
  bool centre = unit->bond == ENL_NONE;
  EnlCip *label = centre ? &l->atom_label[unit->end[0]] : &l->bond_label[unit->bond];

  if (!unit->value || *label != ENL_CIP_NONE)
    return false;
  *label = centre ? centre_label (l, unit, last) : double_bond_label (l, unit, last);
  return *label != ENL_CIP_NONE;
}

/* Units that the constitution decides come first; what is left may depend on their labels, and on
 * each other's, so it is repeated while labels are found. */
static void
label_all (Labels *l)
{
  static const EnlCipRule stage[] = {ENL_CIP_RULE_2, ENL_CIP_RULE_3, ENL_CIP_RULE_5};
  bool found;

  for (size_t s = 0; s < ENL_COUNT (stage); s++)
    do {
      found = false;
      for (uint32_t u = 0; u < l->graph->units; u++)
        found |= label_unit (l, &l->graph->unit[u], stage[s]);
    } while (found && s > 0);
}

void
enl_cip_label (const EnlMolecule *mol, EnlCip *atom_label, EnlCip *bond_label)
{
  uint32_t n = enl_molecule_atoms (mol), bonds = enl_molecule_bonds (mol);
  g_autoptr (EnlGraph) graph = enl_graph_new (mol, true);
  g_autofree EnlCip *own_atom = g_new0 (EnlCip, n + 1);
  g_autofree EnlCip *own_bond = g_new0 (EnlCip, bonds + 1);
  Labels labels = {mol, graph, own_atom, own_bond};

  enl_graph_settle_units (graph);
  label_all (&labels);
  if (atom_label)
    memcpy (atom_label, own_atom, sizeof *own_atom * n);
  if (bond_label)
    memcpy (bond_label, own_bond, sizeof *own_bond * bonds);
}
