/* Hückel model of the pi electrons of an acid and of its conjugate bases.
 *
 * One p orbital (two on linear atoms, at right angles) for every conjugating atom, with the
 * heteroatom parameters of F. A. Van-Catledge, J. Org. Chem. 1980, 45, 4801. Kinds of orbital
 * follow from the sigma skeleton alone, so that every contributing structure of an ion gives the
 * same result. All energies are in units of beta (a positive gain stabilises); charges are in units
 * of the elementary charge.
 */
#pragma once

#include "core/molecule/molecule.h"

typedef struct EnlPi EnlPi;

/* What the loss of one proton does to the pi system that the site belongs to afterwards. */
typedef struct {
  double energy_gain; /* Delta-E(pi): delocalisation of the new lone pair, less that of the pair
                         or pi electron which a heteroatom site already shared in the acid */
  uint32_t n_atoms;   /* of the molecule: length of the arrays */
  double *excess;     /* electrons on each atom beyond the uncharged one, in the pi system of the
                         site; 0 elsewhere. Adds up to 1 for an otherwise uncharged system */
  double *shift;      /* electrons gained on deprotonation: adds up to 1 */
  double even_ring_gain, odd_ring_gain; /* what cyclic conjugation of the rings at the site gains,
                                           by their number of members: pi-ring.h */
  bool five_ring;         /* the site is in a ring of five that conjugates all round in the anion */
  double participation;   /* number of atoms over which `shift` spreads: (sum s)^2 / sum s^2 over
                             the atoms that gain, 1 for a localised anion */
  double highest, lowest; /* energies of the highest occupied and lowest empty orbital of the
                             anion's pi system; NAN where there is none */
  uint32_t n_orbitals;    /* of that pi system; 0 when the lone pair is not part of one */
} EnlPiChange;

/* Solves every pi system of a finished molecule. Borrows `mol`. Caller: enl_pi_free. */
EnlPi *enl_pi_new (const EnlMolecule *mol) ENL_MUST_USE;
void enl_pi_free (EnlPi *pi);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlPi, enl_pi_free)

/* Pi energy of the whole molecule, isolated donor pairs included. */
double enl_pi_energy (const EnlPi *pi);

/* Pi bond order of every bond, both planes of a triple bond added. Owned by pi. */
const double *enl_pi_bond_order (const EnlPi *pi);

/* Net charge of every atom: the model's in a pi system that holds formal charge, the formal charge
 * everywhere else. Owned by pi. */
const double *enl_pi_charge (const EnlPi *pi);

/* Number of the pi system (from 0) to which the atom's first orbital belongs, or ENL_NONE. */
uint32_t enl_pi_system (const EnlPi *pi, uint32_t atom);

/* One orbital: energy and electrons in it, `level` counted from the lowest in energy (most bonding)
 * over all systems. False past the last. */
bool enl_pi_level (const EnlPi *pi, uint32_t level, double *energy, double *electrons);

/* Solves the pi system that arises when `atom`, which must carry a hydrogen, loses a proton.
 * Fills `out`; release with enl_pi_change_clear. Thread-safe: `pi` is only read. */
void enl_pi_deprotonate (const EnlPi *pi, uint32_t atom, EnlPiChange *out);
void enl_pi_change_clear (EnlPiChange *change);
G_DEFINE_AUTO_CLEANUP_CLEAR_FUNC (EnlPiChange, enl_pi_change_clear)
