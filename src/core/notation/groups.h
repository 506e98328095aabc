/* Group abbreviations, and structures written as a line of groups. */
#pragma once

#include "core/molecule/molecule.h"
#include "core/notation/names.h" /* enl_group_find */

/* Reads a condensed formula or a line of group abbreviations: "CH3COCH2CO2Et", "PhCH2CHO",
 * "(CH3)2CHCOMe", "CH2(CO2Et)2". Strict: every atom must end with its usual number of bonds, and
 * what could mean two things is an error that says how to write it. Double and triple bonds between
 * other atoms than those of CO, CO2, CHO, CN, NO2, SO, SO2 are written with = and #. The molecule
 * is finished. */
EnlStatus enl_groups_parse (const char *text, size_t size, EnlMolecule **out,
                            EnlError *err) ENL_MUST_USE;

/* Length in bytes of the longest abbreviation at the start of `text` that may stand in such a line,
 * with its SMILES; 0 when there is none. */
size_t enl_group_match (const char *text, size_t size, const char **smiles);
