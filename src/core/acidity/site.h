/* Acidic sites: which hydrogens a base could take, in words a chemist uses.
 *
 * A site is a class of equivalent hydrogens; see enl_sites_find.
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
  bool acidic_heteroatom; /* O-H, N-H, S-H, cation acid: a competing acid for an enolate chemist */
  bool diastereotopic;    /* CH2 hydrogens next to a stereocentre */
  bool second;            /* another site of the molecule (COOH, OH ...) is certain to go first */
  char *position;         /* "alpha to both C=O", "O-H of the carboxylic acid", ... */
} EnlSite;

/* Owned arrays; `site` is in ascending order of its first atom (ranking needs estimates). */
typedef struct {
  EnlSite *site;
  uint32_t n_sites;
  bool has_carbon_acid; /* at least one C-H site */
  char *no_enol;        /* why no enolate can form ("no hydrogen on the carbons next to C=O"), or
                           NULL when there is an enolisable C-H or no carbonyl-like group at all is
                           to be explained; then n_sites may still be > 0 (O-H, N-H ...) */
} EnlSites;

/* Finds every acidic site of a finished molecule, after the list in DEVELOPERS.md ("Sites").
 * `*out` is never NULL on ENL_OK; ENL_ERROR_LIMIT beyond ENL_MAX_HEAVY heavy atoms.
 * Caller: enl_sites_free. */
EnlStatus enl_sites_find (const EnlMolecule *mol, EnlSites **out, EnlError *err) ENL_MUST_USE;
void enl_sites_free (EnlSites *sites);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlSites, enl_sites_free)

/* Site that holds `atom`, or NULL. Owned by sites. */
const EnlSite *enl_sites_of_atom (const EnlSites *sites, uint32_t atom);
