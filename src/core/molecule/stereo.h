/* Stereochemistry: between drawing (wedges, coordinates) and graph (winding, side). */
#pragma once

#include "core/molecule/molecule.h"

/* From coordinates and wedges of a drawing to windings and sides. Wavy bonds give none. */
void enl_stereo_from_drawing (EnlMolecule *mol);

/* Chooses wedges (narrow end at the stereocentre) that show the windings, for a molecule with
 * layout. */
void enl_stereo_draw_wedges (EnlMolecule *mol);

/* Removes windings and sides at atoms and bonds that are no stereo units (two equal neighbours,
 * small rings), as readers and writers do. */
void enl_stereo_clean (EnlMolecule *mol);
