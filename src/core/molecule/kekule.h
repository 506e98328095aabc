/* From delocalised bonds, as aromatic notations write them, to alternating double bonds. */
#pragma once

#include "core/molecule/molecule.h"

typedef enum {
  ENL_KEKULE_DEFAULT = 0,
  ENL_KEKULE_INFER_NH = 1 /* uncharged nitrogen without exact hydrogens may go without a double
                             bond (it then gets its hydrogen by valence), as molfiles need */
} EnlKekuleFlags;

/* Gives every bond with delocalised[bond] the order 1 or 2 so that each atom reaches a usual
 * valence: a perfect matching, found if there is one (J. Edmonds, Can. J. Math. 1965, 17, 449).
 * Needs ring flags (a finished molecule) and uses fixed orders, charges and counted hydrogens;
 * bonds outside of rings become single. Finish again afterwards. False when it is impossible:
 * `*culprit` (NULL allowed) is an atom that is left over, orders are then undefined. */
bool enl_kekule_place (EnlMolecule *mol, const bool *delocalised, EnlKekuleFlags flags,
                       uint32_t *culprit) ENL_MUST_USE;
