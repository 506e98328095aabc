/* Acidic sites: which hydrogens a base could take, in words a chemist uses.
 *
 * Sites. A site is a class of equivalent hydrogens that a base stronger than pKaH 45 (DMSO) could
 * take, or that take base first. These make sites:
 *
 * - sp3 C-H beside an acceptor: C=O of any kind, C=S, C=N, C≡N, NO2, NO, N=N, S(=O), SO2,
 *   sulfoximine, sulfilimine, P=O, P+, S+, N+ without H, N-oxide, isocyanide, and N of a true imine
 *   (2-azaallyl). N+ of an azolium or amidinium shares its charge and does not count.
 * - sp3 C-H beside an aromatic ring, C=C or C≡C: benzylic, allylic, propargylic, vinylogous along
 *   up to four C=C, cyclopentadiene, indene and fluorene, and anthrone-like across the ring.
 * - C-H with three halogens or perfluoroalkyl groups, or with two of Cl, Br, I; between two or
 * three of S, Se, P.
 * - sp and sp2 C-H: terminal alkyne, HCN, diazo carbon, allene and ketene, and the carbon of an
 *   azolium or formamidinium ion between its heteroatoms.
 * - O-H, N-H, S-H, Se-H, Te-H, P-H, As-H, hydrogen halides, and H on cations. An atom that carries
 *   the negative charge itself has no site, except HS-.
 *
 * No sites: formyl, plain sp3, vinyl and aryl C-H (that of neutral azoles too); C-H on O or N of an
 * ester or amide; C-H beside one divalent S, Si or B; carbon in a pi complex of a metal; Si-H, B-H
 * and metal hydrides.
 *
 * Two geometric rules take an acceptor or pi neighbour away. Bredt: no C=C at the bridgehead of a
 * bicycle unless the ring in which it is trans has nine members (site-carbon.c has the sources);
 * S, P and onium neighbours need no C=C. Strain: no C=C inside a three-membered ring, so none for
 * cyclopropanone and cyclopropene, while a cyclopropyl ketone keeps its C-H.
 *
 * Equivalence is that of the graph with its stereo: mirror images are one site, cis and trans or
 * other diastereomeric arms are two. The two hydrogens of a CH2 are one site even when
 * diastereotopic (flag). Symmetric amidinium, azolium and 1,3-dicarbonyl ions are taken
 * without regard to which atom the charge was drawn on. Deuterium and tritium count as hydrogens of
 * their site; labelled and unlabelled positions are two sites.
 *
 * The flag `second` is set where another hydrogen of the same fragment is certain to leave first:
 * beside an own COOH, SO2OH or P(=O)OH; at the outer (gamma) side of a 1,3-dicarbonyl whose middle
 * has a hydrogen; or where the published ranges of the two kinds of acid do not overlap in DMSO nor
 * in water (site-order.c). It is not set where the order depends on substituents: an amide N-H and
 * a ketone's alpha C-H, an alcohol and an ester.
 *
 * Positions are at most 60 characters and differ within a molecule; where the same words would
 * stand twice, the hydrogens ("CH3 side"), the kind of ketone, a neighbour, the ring or at last the
 * atom's number tells them apart.
 */
#pragma once

#include "core/molecule/molecule.h"

typedef enum {
  ENL_SITE_CARBON,     /* C-H next to something that stabilises the carbanion */
  ENL_SITE_NITROGEN,   /* N-H, neutral */
  ENL_SITE_OXYGEN,     /* O-H */
  ENL_SITE_CHALCOGEN,  /* S-H, Se-H, Te-H */
  ENL_SITE_PHOSPHORUS, /* P-H */
  ENL_SITE_CATION,     /* H on a positively charged N, O, S, P, or on an N that shares the charge */
  ENL_SITE_HALOGEN,    /* hydrogen halides, as in a salt written with HCl */
  ENL_N_SITE_KINDS
} EnlSiteKind;

typedef struct {
  uint32_t *atom; /* symmetry-equivalent acidic atoms, ascending */
  uint32_t n_atoms;
  uint32_t hydrogens; /* of the whole class */
  EnlSiteKind kind;
  uint8_t element;
  bool alpha_carbonyl;    /* carbon directly on a C=O carbon (aldehyde ... acyl halide) */
  bool acidic_heteroatom; /* a competing acid for an enolate chemist: all but C-H and the N-H of
                             plain amines, hydrazines and ammonia */
  bool diastereotopic;    /* the two H of a CH2 differ: a stereocentre or two ring faces */
  bool second;            /* another site of the molecule (COOH, OH ...) is certain to go first */
  char *position;         /* "alpha to both C=O", "O-H of the carboxylic acid", ... */
} EnlSite;

/* Owned arrays; `site` is in ascending order of its first atom (ranking needs estimates). */
typedef struct {
  EnlSite *site;
  uint32_t n_sites;
  bool has_carbon_acid; /* at least one C-H site */
  char *no_enol;        /* why no enolate can form ("the carbon next to C=O carries no hydrogen"),
                           or, without any C=O, why no C-H is acidic at all ("no group here
                           stabilises a carbanion"); NULL when there is an enolisable C-H, or no
                           C=O but another C-H site. n_sites may be > 0 beside it (O-H ...) */
} EnlSites;

/* Finds every acidic site of a finished molecule, after the rules above.
 * `*out` is never NULL on ENL_OK; ENL_ERROR_LIMIT beyond ENL_MAX_HEAVY heavy atoms.
 * Caller: enl_sites_free. */
EnlStatus enl_sites_find (const EnlMolecule *mol, EnlSites **out, EnlError *err) ENL_MUST_USE;
void enl_sites_free (EnlSites *sites);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlSites, enl_sites_free)

/* Site that holds `atom`, or NULL. Owned by sites. */
const EnlSite *enl_sites_of_atom (const EnlSites *sites, uint32_t atom);
