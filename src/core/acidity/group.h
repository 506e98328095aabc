/* Functional groups as an acidic atom sees them: what kind of substituent a neighbour is.
 *
 * The kind is that of the atom through which the group is attached: the C of C=O and C≡N, the N of
 * NO2, the S of SO2. Sites, their words and the descriptors of the estimator all ask here, so that
 * a ketone is the same thing everywhere. All functions need a finished molecule, touch no shared
 * state and cannot fail.
 */
#pragma once

#include "core/molecule/molecule.h"

typedef enum {
  ENL_GROUP_OTHER, /* whatever has no row of its own, metals among them */
  /* carbon without a heteroatom of importance */
  ENL_GROUP_ALKYL,   /* sp3 carbon; see enl_group_is_cf3 for the fluorinated one */
  ENL_GROUP_VINYL,   /* C=C that is not aromatic, cumulated ones included */
  ENL_GROUP_ALKYNYL, /* C≡C */
  ENL_GROUP_ARYL,    /* aromatic carbon, heteroaromatic rings included */
  /* C=O, by what else the carbon carries */
  ENL_GROUP_ALDEHYDE,
  ENL_GROUP_KETONE,
  ENL_GROUP_ESTER,       /* lactones by ENL_TRAIT_RING, aryl esters by ENL_TRAIT_ARYL */
  ENL_GROUP_THIOESTER,   /* C(=O)S, C(=O)Se */
  ENL_GROUP_AMIDE,       /* lactams by ENL_TRAIT_RING; hydrazides and hydroxamic acids too */
  ENL_GROUP_IMIDE,       /* C(=O)N-C=O and C(=O)N-C=S */
  ENL_GROUP_ACID,        /* C(=O)OH, C(=O)SH, C(=O)OOH */
  ENL_GROUP_CARBOXYLATE, /* C(=O)O-, C(=O)S- */
  ENL_GROUP_ANHYDRIDE,   /* acyl O on C=O, C=S, S=O or P=O */
  ENL_GROUP_ACYL_HALIDE,
  ENL_GROUP_ACYL_SILANE, /* C(=O)Si, also Ge, Sn, B */
  ENL_GROUP_KETENE,      /* C=C=O */
  ENL_GROUP_CARBONIC,    /* C=O between heteroatoms only: carbonate, carbamate, urea, isocyanate */
  /* other carbon acceptors */
  ENL_GROUP_THIOCARBONYL, /* C=S, C=Se, C=Te */
  ENL_GROUP_THIOAMIDE,    /* the same with N on the carbon */
  ENL_GROUP_IMINE,        /* C=N: imine, oxime, hydrazone, amidine, nitrone */
  ENL_GROUP_IMINIUM,      /* C=N+ */
  ENL_GROUP_NITRILE,
  ENL_GROUP_DIAZO, /* C=N2 */
  /* nitrogen */
  ENL_GROUP_AMINE,      /* any other neutral or anionic N, amide N included */
  ENL_GROUP_AMMONIUM,   /* N+, onium or aromatic; ENL_TRAIT_HYDROGEN when it carries H */
  ENL_GROUP_N_OXIDE,    /* N+(O-): amine oxide, nitrone, pyridine oxide */
  ENL_GROUP_ISOCYANIDE, /* N≡C through N */
  ENL_GROUP_NITRO,
  ENL_GROUP_NITROSO,
  ENL_GROUP_AZO,     /* N=N */
  ENL_GROUP_AZIDE,   /* N=N=N */
  ENL_GROUP_IMINE_N, /* C=N through N */
  /* oxygen and halogens */
  ENL_GROUP_OXYGEN, /* ether, ester, alcohol ... through O */
  ENL_GROUP_FLUORINE,
  ENL_GROUP_HALOGEN, /* Cl, Br, I, At */
  /* sulfur, and selenium and tellurium in the same state */
  ENL_GROUP_SULFIDE,     /* divalent S */
  ENL_GROUP_SELENIDE,    /* divalent Se, Te */
  ENL_GROUP_SULFOXIDE,   /* S=O with two more single bonds, also S+(O-) */
  ENL_GROUP_SULFONE,     /* S(=O)2: sulfone, sulfonate, sulfonamide; triflones by ENL_TRAIT_CF3 */
  ENL_GROUP_SULFOXIMINE, /* S(=O)=N */
  ENL_GROUP_SULFILIMINE, /* S=N */
  ENL_GROUP_SULFONIUM,   /* S+ */
  ENL_GROUP_SULFOXONIUM, /* S+(=O) */
  /* phosphorus and the rest */
  ENL_GROUP_PHOSPHINE,   /* P with three single bonds; As too */
  ENL_GROUP_PHOSPHORYL,  /* P=O, P=S, P=N, P+(O-) */
  ENL_GROUP_PHOSPHONIUM, /* P+ */
  ENL_GROUP_SILYL,       /* Si, Ge, Sn */
  ENL_GROUP_BORYL,
  ENL_N_GROUPS
} EnlGroup;

/* Further marks of a group, or-ed together. */
typedef enum {
  ENL_TRAIT_RING = 1 << 0,  /* the group's own bond is in a ring: lactone, lactam, cyclic ketone,
                               cyclic sulfone */
  ENL_TRAIT_ARYL = 1 << 1,  /* aryl ketone, aryl ester, anilide, aryl sulfone ... */
  ENL_TRAIT_VINYL = 1 << 2, /* C=C on the carbonyl carbon: enone, enal, unsaturated ester */
  ENL_TRAIT_CF3 = 1 << 3,   /* carries a perfluoroalkyl carbon: COCF3, SO2CF3 */
  ENL_TRAIT_HYDROGEN =
      1 << 4, /* an acidic H on the heteroatom: N-H of the amide or ammonium, O-H */
} EnlTrait;

/* Kind of the group that is attached through `atom`. */
EnlGroup enl_group_of (const EnlMolecule *mol, uint32_t atom);
/* Its traits, EnlTrait values or-ed. */
unsigned enl_group_traits (const EnlMolecule *mol, uint32_t atom);
/* "ketone C=O", "nitro group": the words that follow "the"; static, never empty. */
const char *enl_group_label (EnlGroup group);

/* C=O of any kind, ketene and carbonic ones included. */
bool enl_group_is_carbonyl (EnlGroup group);
/* Stabilises a carbanion on the next atom through its pi system: C=O, C=S, C=N, C≡N, NO2 ... but
 * not plain C=C, C≡C and aryl. */
bool enl_group_conjugates (EnlGroup group);
/* Stabilises a carbanion on the next atom, through pi system or polarisation: the former and
 * S(=O), SO2, P=O, S+, P+, N+ (an ammonium with N-H loses that H instead: look at its trait). */
bool enl_group_is_acceptor (EnlGroup group);

/* Carbon of a CF3 group, or of a longer chain with two or more F on it. */
bool enl_group_is_cf3 (const EnlMolecule *mol, uint32_t atom);

/* ---- small questions about atoms ---- */

bool enl_atom_is_hydrogen (const EnlMolecule *mol, uint32_t atom);
bool enl_atom_is_halogen (const EnlMolecule *mol, uint32_t atom);
/* Alkali, alkaline earth and transition metals, lanthanides, actinides, Al, Ga, In, Tl; the heavier
 * elements of groups 14 to 16 (Sn, Pb, Sb, Bi, Te) count as covalent partners. */
bool enl_atom_is_metal (const EnlMolecule *mol, uint32_t atom);
/* Neighbours that are not hydrogen atoms. */
uint32_t enl_atom_heavy_degree (const EnlMolecule *mol, uint32_t atom);
/* Neighbour of `element` (0: any) across a bond of `order` that is not aromatic, or ENL_NONE. */
uint32_t enl_atom_partner (const EnlMolecule *mol, uint32_t atom, uint8_t order, uint8_t element);
/* No multiple bond and not aromatic. */
bool enl_atom_is_saturated (const EnlMolecule *mol, uint32_t atom);
/* Positive charge that no bonded negative atom makes up for (so not the N of nitro). */
bool enl_atom_is_cation (const EnlMolecule *mol, uint32_t atom);
