/* Connection tables: CTfile formats V2000 and V3000 (published format description), SDF. */
#pragma once

#include "core/molecule/molecule.h"

/* True when one of the first lines is a counts line: the text is meant as a molfile. */
bool enl_molfile_recognise (const char *text, size_t size);

/* Reads one molfile block, ends at "M  END" (what follows, like the data fields of an SDF record,
 * is left alone). The three header lines may be fewer or more, as pasting leaves them. Coordinates
 * are kept (has_layout) when they are drawn in the plane, scaled to bond length 1. Stereo is taken
 * from wedges and positions; from the positions alone when they are spatial; from the parities of
 * the atom lines when there are no positions. Neutral nitrogen with five bonds gets its usual form
 * with separated charges. Query features, R groups and atom lists: ENL_ERROR_UNSUPPORTED. */
EnlStatus enl_molfile_parse (const char *text, size_t size, EnlMolecule **out,
                             EnlError *err) ENL_MUST_USE;

/* V2000 block, new string (g_free). Beyond 999 atoms or bonds: ENL_ERROR_LIMIT. Windings are shown
 * as wedges when the molecule has a layout, else as parities; double bonds of unknown side are
 * marked "either". */
EnlStatus enl_molfile_write (const EnlMolecule *mol, char **out, EnlError *err) ENL_MUST_USE;

/* Steps through an SDF: finds the record that starts at *offset, moves *offset behind its "$$$$"
 * line and hands out its span. False at the end (white space behind the last record is none). */
bool enl_sdf_next (const char *text, size_t size, size_t *offset, size_t *start, size_t *length);
/* Value of a data field ("> <name>") of a record, its lines joined by '\n'; NULL when absent. New
 * string (g_free). */
char *enl_sdf_field (const char *record, size_t size, const char *name);
