/* Reading whatever a person typed or pasted. */
#pragma once

#include "core/notation/names.h"

typedef enum {
  ENL_NOTATION_SMILES,
  ENL_NOTATION_INCHI,
  ENL_NOTATION_MOLFILE,
  ENL_NOTATION_NAME,
  ENL_NOTATION_GROUPS /* a line of groups: "PhCH2CO2Et" */
} EnlNotation;

/* Recognises the notation of `text` (surrounding white space ignored) and reads it: InChI by its
 * prefix, molfile by its counts line, else a known name, else SMILES, else a line of groups. The
 * error is that of the notation the text most resembles, with a near name as advice where there is
 * one; positions refer to `text`. `notation` may be NULL; `names` may be NULL (no names). */
EnlStatus enl_read_structure (const EnlNames *names, const char *text, size_t size,
                              EnlMolecule **out, EnlNotation *notation, EnlError *err) ENL_MUST_USE;

/* A line of a list of structures: "CC=O ethanal". Byte spans in the line. */
typedef struct {
  size_t start, end;     /* the structure */
  size_t name, name_end; /* what stands behind it, without white space; the structure's own text
                            when nothing does */
} EnlListLine;

/* Splits a line. The structure ends at the first white space, unless the whole line is a known name
 * ("ethyl acetoacetate"). False for a blank line. `names` may be NULL. */
bool enl_read_list_line (const EnlNames *names, const char *line, size_t size, EnlListLine *out);
