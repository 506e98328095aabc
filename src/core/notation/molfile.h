/* Connection tables: CTfile formats V2000 and V3000 (published format description), SDF. */
#pragma once

#include "core/molecule/molecule.h"

/* Reads one molfile block. Coordinates are kept (has_layout) when they are not all zero, scaled to
 * bond length 1; stereo is taken from wedges. */
EnlStatus enl_molfile_parse (const char *text, size_t size, EnlMolecule **out,
                             EnlError *err) ENL_MUST_USE;

/* V2000 block, new string (g_free). Beyond 999 atoms or bonds: ENL_ERROR_LIMIT. */
EnlStatus enl_molfile_write (const EnlMolecule *mol, char **out, EnlError *err) ENL_MUST_USE;

/* Steps through an SDF: finds the record that starts at *offset, moves *offset behind its "$$$$"
 * line and hands out its span. False at the end. */
bool enl_sdf_next (const char *text, size_t size, size_t *offset, size_t *start, size_t *length);
/* Value of a data field ("> <name>") of a record; NULL when absent. New string (g_free). */
char *enl_sdf_field (const char *record, size_t size, const char *name);
