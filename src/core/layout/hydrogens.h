/* Written hydrogen atoms: they take the room that the other atoms leave. */
#pragma once

#include "core/molecule/molecule.h"

/* True for a hydrogen atom with one bond, to an atom that is no such hydrogen itself. */
bool enl_hydrogen_hangs (const EnlMolecule *mol, uint32_t atom);

/* Places every hanging hydrogen of the molecule beside its atom, the others being placed. */
void enl_hydrogens_place (EnlMolecule *mol, const uint32_t *rank);
