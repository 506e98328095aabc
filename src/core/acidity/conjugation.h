/* Which atoms can take part in conjugation, and with what: the common ground of the pi model and
 * of the anion forms.
 *
 * The facts are chosen so that every contributing structure of one ion gives the same pi system:
 * partners (sigma bonds) do not move when electron pairs do.
 */
#pragma once

#include "core/molecule/molecule.h"

typedef struct {
  uint8_t element;
  int8_t charge;
  uint8_t sigma; /* bonded partners, counted hydrogens included */
  uint8_t pi;    /* pi bonds to other conjugating atoms */
  uint8_t unpaired;
  bool inert;    /* takes no part: metals, hydrogens, expanded octets, ... */
  bool expanded; /* S, P, halogen ... with more bonds than its octet: sulfonyl, phosphoryl */
  bool ring;     /* in a ring too small for linear (sp) atoms */
} EnlConjugationAtom;

/* Facts of every atom of a finished molecule (caller: g_free). */
EnlConjugationAtom *enl_conjugation_facts (const EnlMolecule *mol) ENL_MUST_USE;

/* Facts after the loss of a proton from `atom`. */
void enl_conjugation_deprotonate (EnlConjugationAtom *fact, uint32_t atom);

/* Both ends can take part and the bond is a covalent one. */
bool enl_conjugation_of_bond (const EnlConjugationAtom *fact, const EnlBond *bond);
