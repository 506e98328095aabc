/* What the descriptors of all sites of one molecule share: computed once, kept together.
 *
 * Not shared between threads: distances are filled in as they are asked for.
 */
#pragma once

#include "core/acidity/group.h"
#include "core/acidity/hammett.h"
#include "core/acidity/polarity.h"

typedef enum { ENL_HYBRID_OTHER, ENL_HYBRID_SP, ENL_HYBRID_SP2, ENL_HYBRID_SP3 } EnlHybrid;

/* The constants that descriptors need; borrowed by every survey. */
typedef struct {
  EnlSubstituents *substituents;
  EnlPolarityTable *polarity;
} EnlConstants;

typedef struct EnlSurvey EnlSurvey;

/* Reads the tables that the program carries. Caller: enl_constants_free. */
EnlStatus enl_constants_new (EnlConstants **out, EnlError *err) ENL_MUST_USE;
void enl_constants_free (EnlConstants *constants);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlConstants, enl_constants_free)

/* `mol` is finished; both are borrowed. */
EnlSurvey *enl_survey_new (const EnlMolecule *mol, const EnlConstants *constants) ENL_MUST_USE;
void enl_survey_free (EnlSurvey *survey);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlSurvey, enl_survey_free)

const EnlMolecule *enl_survey_molecule (const EnlSurvey *survey);
EnlGroup enl_survey_group (const EnlSurvey *survey, uint32_t atom);
EnlHybrid enl_survey_hybrid (const EnlSurvey *survey, uint32_t atom);
/* Pauling electronegativity relative to carbon; 0 for hydrogen atoms (they count as part of their
 * heavy atom) and elements without a value. */
double enl_survey_pull (const EnlSurvey *survey, uint32_t atom);
/* Formal charge that no bonded opposite charge makes up for. */
int enl_survey_free_charge (const EnlSurvey *survey, uint32_t atom);
/* Net sigma charge of the atom, and of each of its unwritten hydrogens (polarity.h). */
double enl_survey_charge (const EnlSurvey *survey, uint32_t atom);
double enl_survey_hydrogen_charge (const EnlSurvey *survey, uint32_t atom);
/* Number of atoms that graph symmetry makes equivalent to this one, itself included. */
uint32_t enl_survey_equivalents (const EnlSurvey *survey, uint32_t atom);
/* Row of bond distances from `atom`; ENL_NONE where there is no path. */
const uint32_t *enl_survey_distances (EnlSurvey *survey, uint32_t atom);
/* Substituent constants of what hangs on aromatic atom `from` through its neighbour `root`. */
EnlSigma enl_survey_sigma (EnlSurvey *survey, uint32_t from, uint32_t root);
const EnlConstants *enl_survey_constants (const EnlSurvey *survey);
