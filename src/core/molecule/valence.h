/* Usual valences: implicit hydrogens, unpaired electrons and the check for impossible atoms. */
#pragma once

#include "core/molecule/molecule.h"

/* Hydrogens an organic-subset atom takes by OpenSMILES when written without brackets, given the
 * sum of its bond orders; 0 for elements outside the subset. */
uint32_t enl_valence_implicit_hydrogens (uint8_t element, uint32_t order_sum);

/* Usual numbers of bonds of an atom, ascending. A charged atom of an s or p element bonds like the
 * neutral one with as many outer electrons in its row (N+ like C, O- like F, P- like S). `*count`
 * is 0 where no rule is known (d and f elements, '*'). Static storage. */
const uint8_t *enl_valence_usual (uint8_t element, int charge, size_t *count);

/* Unpaired electrons of an atom with `bonds` bonds (hydrogens included) that is written without
 * the hydrogens that would pair them: electrons missing to the octet, but no more than the atom has
 * left, as common practice for SMILES brackets ([CH3] 1, [O] 2, [BH3] 0). 0 for d and f elements.
 */
uint8_t enl_valence_unpaired (uint8_t element, int charge, uint32_t bonds);

/* Gives nitrogen written with five bonds its usual form with separated charges: nitro, N-oxide
 * (N=O), diazo and azide (N#N at the end). Readers call it after hydrogens are counted. True when
 * something changed. Works on a finished molecule; finish again after a change. */
bool enl_valence_separate_charges (EnlMolecule *mol);

/* ENL_OK, or ENL_ERROR_CHEMISTRY for the first atom with more bonds than its element and charge
 * allow ("carbon with 5 bonds"), located in err by the atom's offset (line and column are filled by
 * the caller that has the text). `atom` (NULL allowed) receives its index. */
EnlStatus enl_valence_check (const EnlMolecule *mol, uint32_t *atom, EnlError *err);
