/* Are two acidic sites of one kind in a chemist's eyes? By the acidic atom itself and the groups on
 * it, whatever the fitted model makes of them: a precedent must be kin before it may be shown. */
#pragma once

#include "core/acidity/group.h"
#include "core/acidity/shells.h"

#define ENL_KIN_NEIGHBOURS 6

typedef struct {
  uint8_t element, bonding; /* bonding: saturated, double, triple or cumulated, aromatic */
  bool cation;
  uint8_t n;
  uint8_t group[ENL_KIN_NEIGHBOURS]; /* EnlGroup of every heavy neighbour */
} EnlKin;

void enl_kin_describe (const EnlMolecule *mol, uint32_t atom, EnlKin *out);

/* Share of the groups that both have in common, acceptors counting most and relatives (ketone and
 * ester, sulfone and sulfoxide) half: 0..1. 0 for different elements, bonding or charge. */
double enl_kin_overlap (const EnlKin *a, const EnlKin *b);

/* The overlap of the groups times that of the surroundings up to five bonds away: 0..1, 1 for the
 * same site. */
double enl_kin_likeness (const EnlKin *a, const EnlShells *a_shells, const EnlKin *b,
                         const EnlShells *b_shells);
