/* The family of an acid: what is left of it when every substituent is taken off.
 *
 * The core holds the acidic atom and what makes it acidic:
 * - on a carbon acid its unsaturated, aromatic and polarising neighbours (C=O, C≡N, NO2, SO2, P+,
 *   aryl, C=C ...), never its alkyl groups, halogens or OR, SR and NR2;
 * - on an N-H, O-H or S-H acid all its neighbours;
 * - of every such group its multiple bonds, the first atom of what else it carries (so that ketone,
 *   ester, amide and acid differ, and aryl from alkyl), CF3 whole, and aromatic ring systems whole.
 * Everything else is a substituent and becomes hydrogen. A ring that closes through substituents is
 * told behind the core: cycloalkanones are one family whatever their size.
 *
 * So ring-substituted acetophenones and phenacyl halides are one family, phenacyl sulfones another,
 * phenols a third. The definition is this program's own.
 */
#pragma once

#include "core/molecule/molecule.h"

/* Canonical SMILES of the core, with " in a ring" behind it where a ring closes outside the core.
 * Two acids of one family have the same acidic element. New string (g_free). */
char *enl_family_of (const EnlMolecule *mol, uint32_t atom) ENL_MUST_USE;
