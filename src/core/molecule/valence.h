/* Usual valences: implicit hydrogens and the check for impossible atoms. */
#pragma once

#include "core/molecule/molecule.h"

/* Hydrogens an organic-subset atom takes by OpenSMILES when written without brackets, given the
 * sum of its bond orders; 0 for elements outside the subset. */
uint32_t enl_valence_implicit_hydrogens (uint8_t element, uint32_t order_sum);

/* ENL_OK, or ENL_ERROR_CHEMISTRY for the first atom with more bonds than its element and charge
 * allow ("carbon with 5 bonds"), located in err by the atom's offset (line and column are filled by
 * the caller that has the text). `atom` (NULL allowed) receives its index. */
EnlStatus enl_valence_check (const EnlMolecule *mol, uint32_t *atom, EnlError *err);
