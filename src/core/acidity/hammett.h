/* Substituent constants (resources/substituents.tsv) and what ring atoms do in their place.
 *
 * A group without a row of its own takes the constants of the row that covers most of it, as a
 * chemist would: CO2tBu counts as CO2Et, NHCOEt as NHCOCH3.
 */
#pragma once

#include "core/molecule/molecule.h"

/* Hammett constants (Hansch, Leo and Taft, Chem. Rev. 1991, 91, 165); dimensionless. */
typedef struct {
  double meta, para, para_minus;
} EnlSigma;

/* Sums over a ring seen from one of its atoms: meta, para, what para-minus adds to para, ortho. */
typedef struct {
  double meta, para, extra, ortho;
} EnlRingSigma;

typedef struct EnlSubstituents EnlSubstituents;

/* Reads substituents.tsv and ring-effects.tsv. */
EnlStatus enl_substituents_new (const char *groups, size_t groups_size, const char *rings,
                                size_t rings_size, EnlSubstituents **out,
                                EnlError *err) ENL_MUST_USE;
void enl_substituents_free (EnlSubstituents *table);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlSubstituents, enl_substituents_free)

/* Constants of the group attached to `parent` through `root`; false (and zeros) when no row has
 * anything in common with it. `name` (NULL allowed) receives the row's name. */
bool enl_substituents_find (const EnlSubstituents *table, const EnlMolecule *mol, uint32_t root,
                            uint32_t parent, EnlSigma *out, const char **name);

/* Constants of a ring member in place of CH, for positions 1 (ortho), 2 (meta), 3 (para). */
typedef enum { ENL_RING_AZA, ENL_RING_CATION, ENL_RING_FUSED, ENL_N_RING_EFFECTS } EnlRingEffect;
EnlRingSigma enl_substituents_ring_effect (const EnlSubstituents *table, EnlRingEffect effect,
                                           uint32_t position);
