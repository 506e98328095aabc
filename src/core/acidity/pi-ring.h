/* Aromaticity of rings in the Hückel model. */
#pragma once

#include "core/acidity/pi-orbital.h"

/* Cyclic parts of the pi energy (beta) of the rings at `atom`: those of up to eight members that
 * hold it or one of its neighbours and conjugate all round. Rings with an even and with an odd
 * number of members are added up apart: the model makes too much of ions in odd rings. For each of
 * them the sign of one overlap is turned, which makes an aromatic ring antiaromatic and the
 * reverse; the energy lost is the ring's share: positive where the ring is aromatic. After J.
 * Aihara, J. Am. Chem. Soc. 1976, 98, 2750 and E. Heilbronner, Tetrahedron Lett. 1964, 5, 1923. */
typedef struct {
  double even, odd;
} EnlRingEnergy;

EnlRingEnergy enl_pi_ring_energy (const EnlPiBasis *basis, const EnlMolecule *mol, uint32_t atom);
/* `atom` is a member of a ring of five that conjugates all round. */
bool enl_pi_in_five_ring (const EnlPiBasis *basis, const EnlMolecule *mol, uint32_t atom);
