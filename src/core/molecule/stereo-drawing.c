/* Wedges and plane coordinates to windings and sides, and windings to wedges.
 *
 * IUPAC, "Graphical representation of stereochemical configuration" (2006), Pure Appl. Chem. 78,
 * 1897: the narrow end of a wedge is at the stereocentre; a wedge between the two plain bonds of a
 * re-entrant centre (ST-1.1.10) says nothing; a wavy bond says "either".
 */
#include "core/molecule/stereo.h"

#include <math.h>

#include "core/molecule/graph.h"

#define FLAT_SINE  0.05               /* bonds nearer to a line (3 degrees) decide nothing */
#define HALF_PLANE (G_PI + FLAT_SINE) /* re-entrant: bonds leave more than this empty */
#define T_SHAPE    (G_PI - 0.35)      /* nearly so (20 degrees): clear to few readers */

/* A centre as the viewer sees it: ligands anticlockwise, and how far each is wedged. */
typedef struct {
  uint32_t count;
  uint32_t atom[4], bond[4];
  double angle[4];
  int depth[4]; /* +1 towards the viewer, -1 away */
  bool wavy;
} View;

static int
wedge_depth (const EnlBond *bond, uint32_t centre)
{
  if (bond->from != centre)
    return 0;
  return bond->wedge == ENL_WEDGE_UP ? 1 : bond->wedge == ENL_WEDGE_DOWN ? -1 : 0;
}

static View
view_of (const EnlMolecule *mol, uint32_t centre)
{
  const EnlAtom *c = enl_molecule_atom (mol, centre);
  View view = {.count = enl_molecule_degree (mol, centre)};

  for (uint32_t k = 0; k < view.count; k++) {
    uint32_t other = enl_molecule_neighbour (mol, centre, k);
    uint32_t bond = enl_molecule_bond_at (mol, centre, k);
    const EnlBond *b = enl_molecule_bond (mol, bond);
    const EnlAtom *o = enl_molecule_atom (mol, other);
    double angle = atan2 (o->y - c->y, o->x - c->x);
    uint32_t i = k;
    for (; i > 0 && view.angle[i - 1] > angle; i--) {
      view.angle[i] = view.angle[i - 1];
      view.atom[i] = view.atom[i - 1];
      view.bond[i] = view.bond[i - 1];
      view.depth[i] = view.depth[i - 1];
    }
    view.angle[i] = angle;
    view.atom[i] = other;
    view.bond[i] = bond;
    view.depth[i] = wedge_depth (b, centre);
    view.wavy = view.wavy || (b->wedge == ENL_WEDGE_EITHER && b->from == centre && b->order == 1);
  }
  return view;
}

/* Ligand between two others that leave an angle beyond `open` empty; ENL_NONE when there is none. A
 * half plane is the limit for reading, writing stays well within it. */
static uint32_t
inner_ligand (const View *view, double open)
{
  for (uint32_t i = 0; i < 3 && view->count == 3; i++) {
    double gap = view->angle[(i + 1) % 3] - view->angle[i];
    if (gap < 0)
      gap += 2 * G_PI;
    if (gap > open)
      return (i + 2) % 3;
  }
  return ENL_NONE;
}

/* Sign of the winding for the ligands in viewed order (an unwritten one first): +1 anticlockwise.
 * Of four ligands, one that comes forward sees the others turn anticlockwise as the viewer does,
 * and moving it to the front of the list costs its place in exchanges. Of three, the fourth lies
 * behind a wedge that comes forward and sees them turn clockwise. */
static int
viewed_sign (const View *view)
{
  int sign = 0;
  uint32_t inner = inner_ligand (view, HALF_PLANE);

  for (uint32_t i = 0; i < view->count; i++) {
    if (view->depth[i] == 0)
      continue;
    int vote = view->count == 3 || i % 2 ? -view->depth[i] : view->depth[i];
    if (i == inner || (sign && sign != vote))
      return 0;
    sign = vote;
  }
  return sign;
}

static EnlWinding
winding_in_index_order (const View *view, int sign)
{
  for (uint32_t i = 1; i < view->count; i++)
    for (uint32_t j = 0; j < i; j++)
      if (view->atom[j] > view->atom[i])
        sign = -sign;
  if (sign == 0)
    return ENL_WINDING_NONE;
  return sign > 0 ? ENL_WINDING_ANTICLOCKWISE : ENL_WINDING_CLOCKWISE;
}

static void
read_centre (EnlMolecule *mol, uint32_t atom)
{
  EnlUnit unit;
  EnlWinding winding = ENL_WINDING_NONE;

  if (enl_unit_of_atom (mol, atom, &unit)) {
    View view = view_of (mol, atom);
    if (!view.wavy)
      winding = winding_in_index_order (&view, viewed_sign (&view));
  }
  enl_molecule_edit_atom (mol, atom)->winding = winding;
}

/* +1 or -1: side of the line from `a` to `b` on which `c` lies; 0 when it is on the line. */
static int
side_of_line (const EnlAtom *a, const EnlAtom *b, const EnlAtom *c)
{
  double ux = b->x - a->x, uy = b->y - a->y, vx = c->x - a->x, vy = c->y - a->y;
  double sine = (ux * vy - uy * vx) / (hypot (ux, uy) * hypot (vx, vy));

  if (!(fabs (sine) > FLAT_SINE))
    return 0;
  return sine > 0 ? 1 : -1;
}

static bool
is_wavy_at (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k))->wedge == ENL_WEDGE_EITHER)
      return true;
  return false;
}

/* Two ligands of one end that are drawn on the same side of the bond are no drawing of anything. */
static int
end_side (const EnlMolecule *mol, const EnlUnit *unit, uint32_t row)
{
  const EnlAtom *from = enl_molecule_atom (mol, unit->end[0]);
  const EnlAtom *to = enl_molecule_atom (mol, unit->end[1]);
  const EnlAtom *end = row == 0 ? from : to, *other = row == 0 ? to : from;
  int first = side_of_line (end, other, enl_molecule_atom (mol, unit->ligand[row][0]));

  if (unit->ligands[row] == 2) {
    int second = side_of_line (end, other, enl_molecule_atom (mol, unit->ligand[row][1]));
    if (first == second)
      return 0;
    first = first ? first : -second;
  }
  /* Seen from one end to the other; the ends look in opposite directions. */
  return row == 0 ? first : -first;
}

static void
read_double_bond (EnlMolecule *mol, uint32_t b)
{
  EnlUnit unit;
  EnlBond *bond = enl_molecule_edit_bond (mol, b);
  int product = 0;

  if (enl_unit_of_bond (mol, b, &unit) && !is_wavy_at (mol, bond->from) &&
      !is_wavy_at (mol, bond->to))
    product = end_side (mol, &unit, 0) * end_side (mol, &unit, 1);
  bond->side = product == 0 ? ENL_SIDE_NONE : product > 0 ? ENL_SIDE_SAME : ENL_SIDE_OPPOSITE;
  bond->side_from = product ? unit.ligand[0][0] : ENL_NONE;
  bond->side_to = product ? unit.ligand[1][0] : ENL_NONE;
}

void
enl_stereo_from_drawing (EnlMolecule *mol)
{
  if (!enl_molecule_has_layout (mol))
    return;
  for (uint32_t v = 0; v < enl_molecule_atoms (mol); v++)
    read_centre (mol, v);
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++)
    read_double_bond (mol, b);
  enl_stereo_clean (mol);
}

/* ---- choosing wedges ---- */

enum {
  COST_RING = 8,    /* ring bonds stay plain where another bond is there */
  COST_CENTRE = 16, /* two centres at one wedge mislead */
  COST_T_SHAPE = 32,
  COST_MULTIPLE = 64,
  COST_CHAIN = 2, /* terminal atoms first, then chains */
  COST_CARBON = 1,
  COST_TAKEN = 1000
};

static int
wedge_cost (const EnlMolecule *mol, const View *view, uint32_t i)
{
  const EnlBond *bond = enl_molecule_bond (mol, view->bond[i]);
  const EnlAtom *other = enl_molecule_atom (mol, view->atom[i]);
  int cost = 0;

  if (bond->wedge != ENL_WEDGE_NONE || i == inner_ligand (view, HALF_PLANE))
    return COST_TAKEN;
  if (i == inner_ligand (view, T_SHAPE))
    cost += COST_T_SHAPE;
  if (bond->order != 1)
    cost += COST_MULTIPLE;
  if (other->winding)
    cost += COST_CENTRE;
  if (bond->ring)
    cost += COST_RING;
  if (enl_molecule_degree (mol, view->atom[i]) > 1)
    cost += COST_CHAIN;
  if (other->element == 6)
    cost += COST_CARBON;
  return cost;
}

static uint32_t
cheapest (const EnlMolecule *mol, const View *view, int *cost)
{
  uint32_t best = 0;

  *cost = wedge_cost (mol, view, 0);
  for (uint32_t i = 1; i < view->count; i++) {
    int other = wedge_cost (mol, view, i);
    if (other < *cost) {
      *cost = other;
      best = i;
    }
  }
  return best;
}

static void
set_wedge (EnlMolecule *mol, uint32_t centre, uint32_t b, EnlWedge wedge)
{
  EnlBond *bond = enl_molecule_edit_bond (mol, b);

  if (bond->from != centre) {
    bond->to = bond->from;
    bond->from = centre;
  }
  bond->wedge = wedge;
}

static EnlWedge
opposite (EnlWedge wedge)
{
  return wedge == ENL_WEDGE_UP ? ENL_WEDGE_DOWN : ENL_WEDGE_UP;
}

/* Four drawn ligands read best with one bond forward and the one beside it back (ST-1.1.2). */
static void
wedge_beside (EnlMolecule *mol, uint32_t centre, const View *view, uint32_t first, EnlWedge wedge)
{
  uint32_t left = (first + 1) % 4, right = (first + 3) % 4;
  int left_cost = wedge_cost (mol, view, left), right_cost = wedge_cost (mol, view, right);
  uint32_t second = right_cost < left_cost ? right : left;

  if (MIN (left_cost, right_cost) < COST_RING)
    set_wedge (mol, centre, view->bond[second], opposite (wedge));
}

static void
draw_centre (EnlMolecule *mol, uint32_t centre)
{
  View view = view_of (mol, centre);
  int cost;
  uint32_t i = cheapest (mol, &view, &cost);

  if (cost >= COST_TAKEN)
    return;
  for (uint32_t k = 0; k < view.count; k++)
    view.depth[k] = k == i;
  EnlWinding forward = winding_in_index_order (&view, viewed_sign (&view));
  EnlWedge wedge =
      forward == enl_molecule_atom (mol, centre)->winding ? ENL_WEDGE_UP : ENL_WEDGE_DOWN;
  set_wedge (mol, centre, view.bond[i], wedge);
  if (view.count == 4)
    wedge_beside (mol, centre, &view, i, wedge);
}

/* How urgent a centre is: fewer usable bonds first, and among those the ones that no other centre
 * may want count double. */
static uint32_t
freedom (const EnlMolecule *mol, uint32_t centre)
{
  View view = view_of (mol, centre);
  uint32_t sum = 0;

  for (uint32_t i = 0; i < view.count; i++)
    if (wedge_cost (mol, &view, i) < COST_TAKEN)
      sum += enl_molecule_atom (mol, view.atom[i])->winding ? 1 : 2;
  return sum;
}

static uint32_t
most_urgent (const EnlMolecule *mol, const bool *waits)
{
  uint32_t best = ENL_NONE, least = ENL_NONE;

  for (uint32_t v = 0; v < enl_molecule_atoms (mol); v++) {
    uint32_t sum = waits[v] ? freedom (mol, v) : ENL_NONE;
    if (sum < least) {
      least = sum;
      best = v;
    }
  }
  return best;
}

void
enl_stereo_draw_wedges (EnlMolecule *mol)
{
  g_autofree bool *waits = g_new0 (bool, enl_molecule_atoms (mol) + 1);
  EnlUnit unit;

  if (!enl_molecule_has_layout (mol))
    return;
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++)
    if (enl_molecule_bond (mol, b)->wedge != ENL_WEDGE_EITHER)
      enl_molecule_edit_bond (mol, b)->wedge = ENL_WEDGE_NONE;
  for (uint32_t v = 0; v < enl_molecule_atoms (mol); v++)
    waits[v] = enl_molecule_atom (mol, v)->winding && enl_unit_of_atom (mol, v, &unit);
  for (uint32_t v = most_urgent (mol, waits); v != ENL_NONE; v = most_urgent (mol, waits)) {
    draw_centre (mol, v);
    waits[v] = false;
  }
}
