/* Direction marks '/' and '\' for double bonds.
 *
 * A mark says on which side of one end of a double bond a ligand lies. Every unit has one free sign
 * ("side": where the reference ligand of its first end lies); a marked bond that two units share,
 * as in a diene, ties their signs. Marks are placed unit by unit; a unit takes marks that are there
 * already and adds the cheapest ones that fit. Where nothing fits (an odd number of cis bonds
 * around a conjugated ring), the unit's hydrogen is written out to carry the mark.
 */
#include "core/notation/smiles-writer.h"

typedef struct {
  EnlSmilesWalk *walk;
  int8_t *side; /* per unit, 0 while free */
  bool *done;
} Marks;

enum { COST_NEW = 1, COST_RING = 2, COST_SHARED = 4, COST_HYDROGEN = 32, COST_STRAY = 64 };

/* Where the ligand lies as seen from the end in `row`, given the unit's side. */
static int
ligand_sign (const EnlUnit *unit, uint32_t row, uint32_t ligand, int side)
{
  int sign = row == 0 ? side : side * unit->value;
  return ligand == unit->ligand[row][unit->ligands[row] - 1] ? sign : -sign;
}

static int
written_sign (const EnlSmilesWalk *walk, uint32_t end, uint32_t ligand, int sign)
{
  return walk->visit[end] < walk->visit[ligand] ? sign : -sign;
}

/* Side of the unit that the mark on the bond from its end to the ligand means. */
static int
side_from_mark (const EnlSmilesWalk *walk, const EnlUnit *unit, uint32_t row, uint32_t ligand,
                int mark)
{
  int sign = written_sign (walk, unit->end[row], ligand, mark);
  return sign * ligand_sign (unit, row, ligand, 1);
}

static uint32_t
unit_ending_at (const EnlSmilesWalk *walk, uint32_t atom)
{
  uint32_t u = walk->graph->bond_at[atom];
  return u != ENL_NONE && walk->graph->unit[u].value ? u : ENL_NONE;
}

static bool
has_mark (const EnlSmilesWalk *walk, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (walk->mol, atom); k++)
    if (walk->mark[enl_molecule_bond_at (walk->mol, atom, k)])
      return true;
  return walk->hydrogen_mark[atom] != 0;
}

/* A mark on a bond to `atom` would state a double bond there that has no value. */
static bool
makes_stray (const EnlSmilesWalk *walk, uint32_t atom)
{
  EnlUnit unit;

  if (unit_ending_at (walk, atom) != ENL_NONE)
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (walk->mol, atom); k++) {
    uint32_t bond = enl_molecule_bond_at (walk->mol, atom, k);
    if (enl_unit_of_bond (walk->mol, bond, &unit) &&
        has_mark (walk, enl_molecule_other_end (walk->mol, bond, atom)))
      return true;
  }
  return false;
}

/* Cost of stating the end by the bond to `ligand`; 0: stated already, -1: does not fit. */
static int
cost_of (const Marks *m, uint32_t u, uint32_t row, uint32_t ligand)
{
  const EnlSmilesWalk *walk = m->walk;
  const EnlUnit *unit = &walk->graph->unit[u];
  uint32_t bond = enl_molecule_bond_between (walk->mol, unit->end[row], ligand);
  int sign = ligand_sign (unit, row, ligand, m->side[u]);
  int mark = written_sign (walk, unit->end[row], ligand, sign);
  uint32_t other = unit_ending_at (walk, ligand);
  int cost = COST_NEW;

  if (walk->mark[bond])
    return walk->mark[bond] == mark ? 0 : -1;
  if (other != ENL_NONE && other != u) {
    uint32_t other_row = walk->graph->unit[other].end[1] == ligand;
    int side = side_from_mark (walk, &walk->graph->unit[other], other_row, unit->end[row], mark);
    if (m->side[other] && m->side[other] != side)
      return -1;
    cost += COST_SHARED;
  }
  if (walk->role[bond] == ENL_ROLE_RING)
    cost += COST_RING;
  return makes_stray (walk, ligand) ? cost + COST_STRAY : cost;
}

static void
set_mark (Marks *m, uint32_t u, uint32_t row, uint32_t ligand)
{
  EnlSmilesWalk *walk = m->walk;
  const EnlUnit *unit = &walk->graph->unit[u];
  uint32_t bond = enl_molecule_bond_between (walk->mol, unit->end[row], ligand);
  int sign = ligand_sign (unit, row, ligand, m->side[u]);
  uint32_t other = unit_ending_at (walk, ligand);

  walk->mark[bond] = (int8_t)written_sign (walk, unit->end[row], ligand, sign);
  if (other != ENL_NONE && other != u) {
    uint32_t other_row = walk->graph->unit[other].end[1] == ligand;
    m->side[other] = (int8_t)side_from_mark (walk, &walk->graph->unit[other], other_row,
                                             unit->end[row], walk->mark[bond]);
  }
}

/* The ligand that states the end best for the unit's present side: by cost, then by written
 * position. ENL_NONE with the cost of the written-out hydrogen, or G_MAXINT where there is none. */
static uint32_t
best_ligand (const Marks *m, uint32_t u, uint32_t row, int *cost)
{
  const EnlUnit *unit = &m->walk->graph->unit[u];
  const EnlAtom *end = enl_molecule_atom (m->walk->mol, unit->end[row]);
  uint32_t best = ENL_NONE;

  *cost = end->hydrogens == 1 ? COST_HYDROGEN : G_MAXINT;
  for (uint32_t i = 0; i < unit->ligands[row]; i++) {
    uint32_t ligand = unit->ligand[row][i];
    int this_cost = cost_of (m, u, row, ligand);
    if (this_cost < 0 || this_cost > *cost)
      continue;
    if (this_cost == *cost && best != ENL_NONE && m->walk->visit[ligand] > m->walk->visit[best])
      continue;
    *cost = this_cost;
    best = ligand;
  }
  return best;
}

static void
state_end (Marks *m, uint32_t u, uint32_t row)
{
  const EnlUnit *unit = &m->walk->graph->unit[u];
  int cost;
  uint32_t best = best_ligand (m, u, row, &cost);

  if (cost == 0)
    return;
  if (best != ENL_NONE)
    set_mark (m, u, row, best);
  else if (cost == COST_HYDROGEN)
    m->walk->hydrogen_mark[unit->end[row]] =
        (int8_t)-ligand_sign (unit, row, unit->ligand[row][unit->ligands[row] - 1], m->side[u]);
}

static int
cost_of_side (Marks *m, uint32_t u, int side)
{
  int cost[2];

  m->side[u] = (int8_t)side;
  for (uint32_t row = 0; row < 2; row++) {
    best_ligand (m, u, row, &cost[row]);
    cost[row] = MIN (cost[row], 1 << 20);
  }
  m->side[u] = 0;
  return cost[0] + cost[1];
}

/* A free unit takes the side that costs less with the marks around it; where both cost the same,
 * the one that makes '/' the first mark written. */
static void
choose_side (Marks *m, uint32_t u, uint32_t first_row)
{
  const EnlUnit *unit = &m->walk->graph->unit[u];
  int plus = cost_of_side (m, u, 1), minus = cost_of_side (m, u, -1), cost;

  m->side[u] = plus <= minus ? 1 : -1;
  uint32_t ligand = best_ligand (m, u, first_row, &cost);
  if (plus == minus && ligand != ENL_NONE)
    m->side[u] = (int8_t)side_from_mark (m->walk, unit, first_row, ligand, 1);
}

static bool
touches_done (const Marks *m, const EnlUnit *unit)
{
  for (uint32_t row = 0; row < 2; row++)
    for (uint32_t i = 0; i < unit->ligands[row]; i++) {
      uint32_t other = unit_ending_at (m->walk, unit->ligand[row][i]);
      if (other != ENL_NONE && m->done[other])
        return true;
    }
  return false;
}

/* The next unit: one whose side is tied already, else one beside a unit that is done (so that
 * conjugated units are settled from one end), else the one that is written first. */
static uint32_t
next_unit (const Marks *m)
{
  const EnlSmilesWalk *walk = m->walk;
  uint32_t best = ENL_NONE;
  uint64_t best_order = UINT64_MAX;

  for (uint32_t u = 0; u < walk->graph->units; u++) {
    const EnlUnit *unit = &walk->graph->unit[u];
    if (unit->bond == ENL_NONE || !unit->value || m->done[u])
      continue;
    uint64_t order = MIN (walk->visit[unit->end[0]], walk->visit[unit->end[1]]);
    if (!m->side[u])
      order += touches_done (m, unit) ? UINT64_C (1) << 32 : UINT64_C (2) << 32;
    if (order < best_order) {
      best_order = order;
      best = u;
    }
  }
  return best;
}

void
enl_smiles_choose_marks (EnlSmilesWalk *walk)
{
  g_autofree int8_t *side = g_new0 (int8_t, walk->graph->units + 1);
  g_autofree bool *done = g_new0 (bool, walk->graph->units + 1);
  Marks m = {walk, side, done};

  for (uint32_t u = next_unit (&m); u != ENL_NONE; u = next_unit (&m)) {
    const EnlUnit *unit = &walk->graph->unit[u];
    uint32_t first_row = walk->visit[unit->end[1]] < walk->visit[unit->end[0]];
    if (!side[u])
      choose_side (&m, u, first_row);
    state_end (&m, u, first_row);
    state_end (&m, u, 1 - first_row);
    done[u] = true;
  }
}
