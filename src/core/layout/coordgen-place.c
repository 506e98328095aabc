#include "core/layout/coordgen-place.h"

#include "core/layout/coordgen-face.h"

/* Above this many atoms CoordGen's search for a clash-free picture is cut short; beyond the limit
 * it is not asked: its time grows steeply (seconds above a hundred atoms). */
static const uint32_t quick_above = 40, most_atoms = 80;

/* Nor is it asked for wider rings: measured for plain carbocycles, 30 atoms take 0.1 s, 36 take 2
 * s, 38 more than 20 s. */
static const uint32_t widest_ring = 30;
static const double quick_effort = 0.2, full_effort = 1;

bool
enl_coordgen_can_draw (const EnlSketch *sketch)
{
  return sketch->n_atoms <= most_atoms && enl_sketch_widest_ring (sketch) <= widest_ring;
}

bool
enl_coordgen_draw (EnlSketch *sketch, const bool *held)
{
  if (!enl_coordgen_can_draw (sketch))
    return false;
  g_autofree EnlCoordgenAtom *atom = g_new0 (EnlCoordgenAtom, sketch->n_atoms + 1);
  g_autofree EnlCoordgenBond *bond = g_new0 (EnlCoordgenBond, sketch->n_bonds + 1);
  double effort = sketch->n_atoms > quick_above ? quick_effort : full_effort;

  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    atom[i] = (EnlCoordgenAtom){.element = sketch->atom[i].element,
                                .charge = sketch->atom[i].charge,
                                .hydrogens = sketch->atom[i].hydrogens,
                                .held = held && held[i],
                                .x = sketch->spot[i].x,
                                .y = sketch->spot[i].y};
  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    const EnlSketchBond *from = &sketch->bond[b];
    bond[b] = (EnlCoordgenBond){.from = from->from,
                                .to = from->to,
                                .order = from->order,
                                .side = from->side,
                                .side_from = from->side_from,
                                .side_to = from->side_to};
  }
  if (!enl_coordgen_place (atom, sketch->n_atoms, bond, sketch->n_bonds, effort))
    return false;
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    sketch->spot[i] = (EnlSpot){atom[i].x, atom[i].y};
  return true;
}
