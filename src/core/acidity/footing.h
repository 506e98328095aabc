/* On what footing the values in THF stand (resources/footings.tsv).
 *
 * No thermodynamic scale in THF fits all acids: DMSO values are shown with a further uncertainty
 * that depends on the kind of anion, and the footing is named.
 */
#pragma once

#include "core/acidity/pi.h"
#include "core/acidity/site.h"
#include "core/base/table.h"

typedef enum {
  ENL_FOOTING_DELOCALISED_CARBON, /* the lone pair is spread over pi orbitals */
  ENL_FOOTING_LOCALISED_CARBON,
  ENL_FOOTING_HETEROATOM,
  ENL_FOOTING_CATION, /* the acid is a cation */
  ENL_N_FOOTINGS
} EnlFootingKind;

typedef struct {
  double sigma;         /* further standard deviation beside that of the DMSO value, pK units */
  const char *sentence; /* without full stop; static */
  const char *source;
} EnlFooting;

/* Reads the table; a missing kind or an impossible number is an ENL_ERROR_FORMAT. The texts point
 * into `table`, which the caller keeps. */
EnlStatus enl_footings_read (const EnlTable *table, EnlFooting out[ENL_N_FOOTINGS], EnlError *err);

/* Kind of a site of `mol`, for which `pi` was made. */
EnlFootingKind enl_footing_kind (const EnlMolecule *mol, const EnlPi *pi, const EnlSite *site);
/* Its row in the table that the program carries. */
const EnlFooting *enl_footing_in_thf (const EnlMolecule *mol, const EnlPi *pi, const EnlSite *site);
