/* The physical descriptors of an acidic site.
 *
 * Every descriptor has a name; the fitted model refers to it by that name, so the order here may
 * change between versions of the model but not within one.
 */
#pragma once

#include "core/acidity/pi.h"
#include "core/acidity/survey.h"

/* Kinds of neighbour that are counted, on the acidic atom and one bond further. */
#define ENL_KIND_LIST(X)                                                                           \
  X (aldehyde)                                                                                     \
  X (ketone)                                                                                       \
  X (ester)                                                                                        \
  X (carboxylate)                                                                                  \
  X (amide)                                                                                        \
  X (thioester)                                                                                    \
  X (acyl_halide)                                                                                  \
  X (carbonic)                                                                                     \
  X (thiocarbonyl)                                                                                 \
  X (nitrile)                                                                                      \
  X (nitro)                                                                                        \
  X (sulfone)                                                                                      \
  X (sulfoxide)                                                                                    \
  X (phosphoryl)                                                                                   \
  X (phosphonium)                                                                                  \
  X (sulfonium)                                                                                    \
  X (ammonium)                                                                                     \
  X (sulfide)                                                                                      \
  X (selenide)                                                                                     \
  X (oxygen)                                                                                       \
  X (amine)                                                                                        \
  X (double_nitrogen)                                                                              \
  X (fluorine)                                                                                     \
  X (halogen)                                                                                      \
  X (aryl)                                                                                         \
  X (vinyl)                                                                                        \
  X (alkynyl)                                                                                      \
  X (imine)                                                                                        \
  X (alkyl)                                                                                        \
  X (silyl)

/* One number each. `gain` is the pi energy gain in beta. */
#define ENL_DESCRIPTOR_LIST(X)                                                                     \
  /* the acidic atom */                                                                            \
  X (is_carbon)                                                                                    \
  X (is_nitrogen)                                                                                  \
  X (is_oxygen)                                                                                    \
  X (is_chalcogen)                                                                                 \
  X (sp2_carbon)                                                                                   \
  X (sp_carbon)                                                                                    \
  X (sp2_hetero)                                                                                   \
  X (aromatic)                                                                                     \
  X (aromatic_neutral)                                                                             \
  X (cation)                                                                                       \
  X (hydrogens)                                                                                    \
  X (tertiary)                                                                                     \
  X (log_equivalents)                                                                              \
  X (cation_hydrogens)                                                                             \
  X (cation_saturated)                                                                             \
  X (cation_aryl)                                                                                  \
  X (cation_donors)                                                                                \
  X (aza_ring)                                                                                     \
  X (aza_next)                                                                                     \
  X (sp_next_to_n)                                                                                 \
  /* pi model */                                                                                   \
  X (gain)                                                                                         \
  X (gain_hetero)                                                                                  \
  X (gain_squared)                                                                                 \
  X (gain_alkyl)                                                                                   \
  X (gain_ring5)                                                                                   \
  X (gain_fluorine)                                                                                \
  X (gain_onium)                                                                                   \
  X (excess_site)                                                                                  \
  X (excess_oxygen)                                                                                \
  X (excess_nitrogen)                                                                              \
  X (excess_sulfur)                                                                                \
  X (square_all)                                                                                   \
  X (square_carbon)                                                                                \
  X (square_nitrogen)                                                                              \
  X (square_oxygen)                                                                                \
  X (square_sulfur)                                                                                \
  X (pi_size)                                                                                      \
  /* induction and charge */                                                                       \
  X (field)                                                                                        \
  X (field_far)                                                                                    \
  X (field_shared)                                                                                 \
  X (field_shared_far)                                                                             \
  X (cation_field)                                                                                 \
  X (cation_shared)                                                                                \
  X (anion_field)                                                                                  \
  X (anion_shared)                                                                                 \
  X (total_charge)                                                                                 \
  X (total_charge_hetero)                                                                          \
  X (sigma_site)                                                                                   \
  X (sigma_hydrogen)                                                                               \
  X (sigma_next)                                                                                   \
  X (sigma_beta)                                                                                   \
  X (sigma_shared)                                                                                 \
  /* acceptors together */                                                                         \
  X (acceptors)                                                                                    \
  X (acceptors_squared)                                                                            \
  X (acceptors_alkyl)                                                                              \
  X (acceptors_aryl)                                                                               \
  X (acceptors_donor)                                                                              \
  X (conjugating)                                                                                  \
  X (conjugating_aryl)                                                                             \
  X (lactone)                                                                                      \
  X (lactam)                                                                                       \
  X (aryl_ester)                                                                                   \
  X (thioamide)                                                                                    \
  X (triflyl)                                                                                      \
  X (trifluoromethyl)                                                                              \
  X (aryl_ketone)                                                                                  \
  X (sulfoximine)                                                                                  \
  X (acceptor_alkyl)                                                                               \
  X (acceptor_branches)                                                                            \
  X (acceptor_aryl)                                                                                \
  X (acceptor_fluorine)                                                                            \
  X (acceptor_halogen)                                                                             \
  X (acceptor_anion)                                                                               \
  /* elements and shapes next to it */                                                             \
  X (next_n)                                                                                       \
  X (next_o)                                                                                       \
  X (next_s)                                                                                       \
  X (next_p)                                                                                       \
  X (next_sp2)                                                                                     \
  X (next_sp)                                                                                      \
  X (next_aromatic)                                                                                \
  X (two_aryl)                                                                                     \
  X (two_aryl_tertiary)                                                                            \
  X (alpha_halogen)                                                                                \
  /* rings, strain and crowding */                                                                 \
  X (ring3)                                                                                        \
  X (ring4)                                                                                        \
  X (ring5)                                                                                        \
  X (ring6)                                                                                        \
  X (ring7)                                                                                        \
  X (rings_shared)                                                                                 \
  X (ring_acceptors)                                                                               \
  X (ring_acceptors_two)                                                                           \
  X (ring_acceptor4)                                                                               \
  X (ring_acceptor5)                                                                               \
  X (ring_acceptor6)                                                                               \
  X (ring_ester)                                                                                   \
  X (ring_amide)                                                                                   \
  X (outer_ring_acceptor)                                                                          \
  X (acceptor_ring5)                                                                               \
  X (next_ring3)                                                                                   \
  X (benzo)                                                                                        \
  X (benzo_acceptor)                                                                               \
  X (ortho)                                                                                        \
  X (heavy_beta)                                                                                   \
  X (heavy_gamma)                                                                                  \
  X (crowding)                                                                                     \
  X (heavy_atoms)                                                                                  \
  /* hydrogen bonds of a heteroatom site, in rings of 5 and 6 */                                   \
  X (donor5)                                                                                       \
  X (donor6)                                                                                       \
  X (acceptor5)                                                                                    \
  X (acceptor6)                                                                                    \
  /* aromaticity, planarity and strain of the anion */                                             \
  X (gain_five_ring)                                                                               \
  X (ring_gain_even)                                                                               \
  X (ring_gain_odd)                                                                                \
  X (strain13)                                                                                     \
  X (strain_ortho)                                                                                 \
  X (strain_ring3)                                                                                 \
  X (strain_ring4)                                                                                 \
  X (drained)                                                                                      \
  X (imide_side)                                                                                   \
  /* substituent constants along the sigma skeleton */                                             \
  X (polar_next)                                                                                   \
  X (polar_beta)                                                                                   \
  X (polar_gamma)                                                                                  \
  X (mesomeric)                                                                                    \
  X (mesomeric_squared)                                                                            \
  X (donor_next)                                                                                   \
  X (donor_acceptors)

/* Hammett sums over aromatic rings at 0..3 bonds from the acidic atom; for 1 and 2 bonds a second
 * set that counts for heteroatom sites only. */
#define ENL_RING_DISTANCES 4
#define ENL_RING_HETERO    2
#define ENL_RING_SUMS      4 /* meta, para, extra, ortho */

enum {
#define X(name) ENL_KIND_##name,
  ENL_KIND_LIST (X)
#undef X
      ENL_N_KINDS
};

enum {
#define X(name) ENL_D_##name,
  ENL_DESCRIPTOR_LIST (X)
#undef X
      ENL_D_next, /* neighbours by kind */
  ENL_D_beta = ENL_D_next + ENL_N_KINDS,
  ENL_D_ring_sums = ENL_D_beta + ENL_N_KINDS,
  ENL_D_ring_sums_hetero = ENL_D_ring_sums + ENL_RING_DISTANCES * ENL_RING_SUMS,
  ENL_D_ring_count = ENL_D_ring_sums_hetero + ENL_RING_HETERO * ENL_RING_SUMS,
  ENL_N_DESCRIPTORS = ENL_D_ring_count + ENL_RING_DISTANCES
};

/* Name of a descriptor, 0 <= index < ENL_N_DESCRIPTORS, in a new string (g_free). */
char *enl_descriptor_name (uint32_t index) ENL_MUST_USE;

/* Fills value[ENL_N_DESCRIPTORS] for a hydrogen-bearing `atom`; all finite. `pi` is that of the
 * survey's molecule. */
void enl_descriptors_fill (EnlSurvey *survey, const EnlPi *pi, uint32_t atom, double *value);
