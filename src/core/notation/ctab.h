/* Inside of the connection table readers: a plain table, filled from V2000 or V3000 text, and the
 * one way from there to a molecule. */
#pragma once

#include "core/molecule/molecule.h"

/* Steps through the lines of a text; "\r\n" and "\n" both end one. */
typedef struct {
  const char *text;
  size_t size;
  const char *line; /* the present line, `length` bytes without its end */
  size_t start, length;
  size_t next; /* offset of the line after it */
} EnlLines;

/* False at the end of the text; `line` is then empty and stands there. */
bool enl_lines_step (EnlLines *lines);

typedef enum {
  ENL_RADICAL_NONE,
  ENL_RADICAL_SINGLET,
  ENL_RADICAL_DOUBLET,
  ENL_RADICAL_TRIPLET
} EnlRadical;

#define ENL_VALENCE_DEFAULT (-1) /* no valence written: hydrogens by the usual rule */
#define ENL_BOND_AROMATIC   4
#define ENL_BOND_CONTACT    9

typedef struct {
  uint8_t element;
  int charge, isotope;
  EnlRadical radical;
  int valence; /* bonds including hydrogens, or ENL_VALENCE_DEFAULT */
  int parity;  /* 1 odd, 2 even, else none */
  uint32_t map;
  double x, y, z;
  size_t offset, length; /* its element symbol in the text */
} EnlCtabAtom;

typedef struct {
  uint32_t from, to; /* from 0 */
  int type;          /* 1, 2, 3, ENL_BOND_AROMATIC, ENL_BOND_CONTACT */
  EnlWedge wedge;
  size_t offset, length;
} EnlCtabBond;

typedef struct {
  const char *text; /* the whole text, for positions */
  size_t size;
  GArray *atom, *bond; /* EnlCtabAtom, EnlCtabBond; owned */
  EnlError *err;
} EnlCtab;

/* Error at `length` bytes from `offset` of the text. */
EnlStatus enl_ctab_fault (const EnlCtab *ctab, EnlStatus code, size_t offset, size_t length,
                          const char *advice, const char *format, ...) G_GNUC_PRINTF (6, 7);

/* Element of a symbol, which may be D or T (then `*isotope` is set). Query and group symbols:
 * ENL_ERROR_UNSUPPORTED; others: ENL_ERROR_UNKNOWN. */
EnlStatus enl_ctab_element (const EnlCtab *ctab, size_t offset, size_t length, uint8_t *element,
                            int *isotope);

/* Bond type of its number in the file; query types: ENL_ERROR_UNSUPPORTED. */
EnlStatus enl_ctab_bond_type (const EnlCtab *ctab, long type, size_t offset, size_t length);

/* Readers of the two versions; `lines` stands on the counts line. */
EnlStatus enl_ctab_read_v2000 (EnlCtab *ctab, EnlLines *lines);
EnlStatus enl_ctab_read_v3000 (EnlCtab *ctab, EnlLines *lines);

/* The molecule of a filled table: Kekulé orders, hydrogens, stereo, valence checked. */
EnlStatus enl_ctab_build (const EnlCtab *ctab, EnlMolecule **out);

/* Hydrogens an atom of a molfile has when no valence is written for it. */
uint32_t enl_ctab_usual_hydrogens (uint8_t element, int charge, EnlRadical radical,
                                   uint32_t order_sum);
