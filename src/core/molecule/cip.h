/* Stereodescriptors by the Cahn-Ingold-Prelog sequence rules.
 *
 * Source: IUPAC, Nomenclature of Organic Chemistry, Recommendations 2013, P-92 and P-93;
 * Prelog and Helmchen, Angew. Chem. Int. Ed. Engl. 1982, 21, 567; Hanson et al., J. Chem. Inf.
 * Model. 2018, 58, 1755.
 */
#pragma once

#include "core/molecule/molecule.h"

typedef enum {
  ENL_CIP_NONE = 0, /* no stereo unit, or the rules below do not decide it */
  ENL_CIP_R,
  ENL_CIP_S,
  ENL_CIP_PSEUDO_R, /* "r": the ligands differ by being mirror images only (rule 5) */
  ENL_CIP_PSEUDO_S,
  ENL_CIP_E,
  ENL_CIP_Z
} EnlCip;

/* "R", "S", "r", "s", "E", "Z"; "" for none. */
const char *enl_cip_text (EnlCip cip);

/* Fill atom_label[atom] and bond_label[bond] (either may be NULL) from the windings and sides.
 * Rules 1a, 1b and 2 are followed in full. Rules 3, 4a, 4c and 5 compare the descriptors that units
 * outside the rings of the centre have in the molecule, and rule 4b is left out; a unit that needs
 * more gets no label. */
void enl_cip_label (const EnlMolecule *mol, EnlCip *atom_label, EnlCip *bond_label);
