#include "core/layout/fragment.h"

#include "core/layout/coordgen-face.h"

/* Above this many atoms CoordGen's search for a clash-free picture is cut short. */
static const uint32_t quick_above = 60;

static bool
place_by_coordgen (EnlSketch *sketch)
{
  g_autofree EnlCoordgenAtom *atom = g_new0 (EnlCoordgenAtom, sketch->n_atoms + 1);
  g_autofree EnlCoordgenBond *bond = g_new0 (EnlCoordgenBond, sketch->n_bonds + 1);

  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    atom[i] = (EnlCoordgenAtom){.element = sketch->atom[i].element,
                                .charge = sketch->atom[i].charge,
                                .hydrogens = sketch->atom[i].hydrogens};
  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    const EnlSketchBond *from = &sketch->bond[b];
    bond[b] = (EnlCoordgenBond){.from = from->from,
                                .to = from->to,
                                .order = from->order,
                                .side = from->side,
                                .side_from = from->side_from,
                                .side_to = from->side_to};
  }
  if (!enl_coordgen_place (atom, sketch->n_atoms, bond, sketch->n_bonds,
                           sketch->n_atoms > quick_above ? 0.2 : 1.0))
    return false;
  for (uint32_t i = 0; i < sketch->n_atoms; i++)
    sketch->spot[i] = (EnlSpot){atom[i].x, atom[i].y};
  return true;
}

EnlStatus
enl_fragment_place (EnlSketch *sketch, EnlError *err)
{
  if (sketch->n_atoms <= 1)
    return ENL_OK;
  if (!place_by_coordgen (sketch))
    return enl_error_set (err, ENL_ERROR_NUMERIC, "draw it by hand",
                          "no picture of this structure was found");
  return ENL_OK;
}
