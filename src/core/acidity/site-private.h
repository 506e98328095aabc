/* What the parts of the site finder share. */
#pragma once

#include "core/acidity/group.h"
#include "core/acidity/site.h"

/* Why a C-H is listed; the first that fits in this order. */
typedef enum {
  ENL_CARBON_NONE,      /* no site */
  ENL_CARBON_CYANIDE,   /* HCN */
  ENL_CARBON_ACETYLENE, /* C≡C-H */
  ENL_CARBON_AZOLIUM,   /* H on the carbon between N+ and N, O or S */
  ENL_CARBON_DIAZO,     /* H on C=N2 */
  ENL_CARBON_CUMULENE,  /* H on C=C=C, C=C=O, C=C=N */
  ENL_CARBON_ACCEPTOR,  /* beside an acceptor */
  ENL_CARBON_PI,        /* beside C=C, C≡C or an aromatic ring */
  ENL_CARBON_POLYHALO,
  ENL_CARBON_BETWEEN /* between two or three of S, Se, P */
} EnlCarbonReason;

/* A saturated carbon has at most four neighbours. */
#define ENL_MAX_ALPHA 4

/* What an acidic (or nearly acidic) carbon is bound to. */
typedef struct {
  EnlCarbonReason reason;
  uint32_t acceptor[ENL_MAX_ALPHA]; /* atoms of acceptors that the anion can use */
  EnlGroup group[ENL_MAX_ALPHA];    /* their kinds */
  uint32_t n_acceptors, n_carbonyls;
  uint32_t aryl[ENL_MAX_ALPHA]; /* aromatic neighbours that the anion can use */
  uint32_t n_aryls, n_vinyls, n_alkynyls;
  uint32_t n_sulfides, n_selenides, n_phosphines, n_halogens;
  uint32_t ring5;  /* aromatic-anion ring: 0 none, 1 cyclopentadiene, 2 indene, 3 fluorene */
  uint32_t depth;  /* C=C units between the carbon and the vinylogous acceptor, 0: none */
  uint32_t far;    /* atom of the vinylogous acceptor when depth > 0 */
  uint32_t across; /* C=O opposite in an anthrone-like ring, ENL_NONE for none */
  bool far_alkyne; /* the path starts with C≡C */
  bool bredt;      /* an acceptor or pi neighbour is out of reach: bridgehead */
  bool strain;     /* ... because C=C would lie inside a three-membered ring */
} EnlCarbonFacts;

/* Examines a carbon; true when its hydrogens make a site. With false, `bredt` and `strain` may
 * still tell why not. */
bool enl_site_carbon_facts (const EnlMolecule *mol, uint32_t atom, EnlCarbonFacts *facts);
/* The outer side of a 1,3-dicarbonyl whose middle can lose a hydrogen, and so loses it first. */
bool enl_site_is_dicarbonyl_gamma (const EnlMolecule *mol, uint32_t atom,
                                   const EnlCarbonFacts *facts);
/* Position in words, new string. */
char *enl_site_carbon_words (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts);

/* Order in which hydrogens leave, as far as it is certain: see site-order.c. */
typedef enum {
  ENL_TIER_OTHER,   /* range too wide to say anything */
  ENL_TIER_ACID,    /* carboxylic, sulfonic, phosphoric acids, hydrogen halides, N+-H of amines */
  ENL_TIER_MILD,    /* phenol, thiol, imide, sulfonamide, azole, thioamide, hydroxamic acid */
  ENL_TIER_AMIDE,   /* amide, urea, carbamate, oxime, pyrrole, diarylamine */
  ENL_TIER_ALCOHOL, /* alcohol, aniline, amidine, imine */
  ENL_TIER_PLAIN_ALCOHOL, /* alcohol without polar groups near */
  ENL_TIER_STRONG_CH,     /* two acceptors, or nitro */
  ENL_TIER_MIDDLE_CH,     /* one acceptor and an aryl or heteroatom, or a hydrocarbon acid */
  ENL_TIER_KETONE_CH,     /* one ketone or aldehyde, nothing else */
  ENL_TIER_ESTER_CH,      /* one ester, nitrile or sulfone, nothing else */
  ENL_TIER_FEEBLE_CH,     /* one amide, carboxylate, sulfoxide, aryl or vinyl, nothing else */
  ENL_N_TIERS
} EnlTier;

EnlTier enl_site_carbon_tier (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts);
/* True when hydrogens of tier `a` leave before those of tier `b` whatever else the two sites
 * carry: the published ranges of the two tiers do not overlap in DMSO nor in water (the tests hold
 * this against resources/acids.tsv). */
bool enl_tier_precedes (EnlTier a, EnlTier b);

/* What a hydrogen-bearing heteroatom is. */
typedef struct {
  EnlSiteKind kind;
  const char *words; /* static position text */
  EnlTier tier;
  bool competing; /* strong enough to consume a base meant for an enolate */
} EnlHeteroFacts;

/* True when the hydrogens of this atom (not carbon) make a site. */
bool enl_site_hetero_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts);
/* The part of it for nitrogen. */
bool enl_site_nitrogen_facts (const EnlMolecule *mol, uint32_t atom, EnlHeteroFacts *facts);

/* A site under construction. */
typedef struct {
  EnlCarbonFacts carbon; /* when site.kind is ENL_SITE_CARBON */
  EnlTier tier;
} EnlSiteFacts;

/* Adds "(CH3 side)", "(atom 7)" ... until no two positions read the same. */
void enl_site_words_distinct (const EnlMolecule *mol, EnlSites *sites, const EnlSiteFacts *facts);
/* Sets the flag `second`. `fragment` numbers the molecule's parts. */
void enl_site_order_flags (const EnlMolecule *mol, EnlSites *sites, const EnlSiteFacts *facts,
                           const uint32_t *fragment);
/* Why no enolate (or no carbanion at all) can form, new string, or NULL. */
char *enl_site_no_enol (const EnlMolecule *mol, const EnlSites *sites, const EnlSiteFacts *facts);
