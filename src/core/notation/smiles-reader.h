/* Shared by the files of the SMILES reader: text -> tokens (smiles-parse.c), bracket atoms
 * (smiles-bracket.c), wording of faults (smiles-fault.c), graph to molecule (smiles-build.c). */
#pragma once

#include "core/molecule/molecule.h"

#define ENL_SMILES_MAX_SIZE  1000000 /* bytes; longer text is refused at once */
#define ENL_SMILES_MAX_BONDS (ENL_MAX_ATOMS + ENL_MAX_RINGS)

/* Ring numbers: 0 to 99 as in OpenSMILES, and %(100) to %(999), a common extension that large cages
 * and sheets need. */
#define ENL_SMILES_RINGS 1000

typedef enum { TURN_NONE, TURN_ANTICLOCKWISE, TURN_CLOCKWISE } EnlSmilesTurn;

typedef struct {
  bool aromatic; /* written in lower case */
  uint8_t turn;  /* EnlSmilesTurn */
} EnlSmilesAtom;

/* What the molecule does not keep of a bond. The keys tell where in the list of neighbours of
 * `from` and of `to` the bond stands: 0 for the atom before, else text offset + 2 (1 is left for
 * the hydrogen of a bracket). */
typedef struct {
  uint32_t key_from, key_to;
  uint32_t offset;  /* of the bond symbol */
  int8_t direction; /* 1: `to` lies above `from`, -1: below, 0: not told */
  bool soft;        /* order left to the alternation of double bonds */
} EnlSmilesBond;

typedef struct {
  uint32_t atom, offset, length, bond_offset;
  char bond;
  bool open;
} EnlSmilesRing;

typedef struct {
  uint32_t atom, offset; /* that carries the branch; of '(' */
} EnlSmilesBranch;

typedef struct {
  const char *text;
  size_t size; /* without trailing white space; offsets count from the start of the whole text */
  size_t at;
  EnlError *err;
  EnlMolecule *mol;
  GArray *atom;   /* EnlSmilesAtom */
  GArray *bond;   /* EnlSmilesBond */
  GArray *branch; /* EnlSmilesBranch, the open ones */
  EnlSmilesRing ring[ENL_SMILES_RINGS];
  uint32_t previous; /* atom to bond to, or ENL_NONE */
  size_t symbol_at;  /* where the pending bond symbol stands */
  char symbol;       /* pending bond symbol, or 0 */
  bool fresh;        /* nothing behind '(' yet */
  bool dotted;       /* nothing behind '.' yet */
  size_t dot_at;
} EnlSmilesReader;

/* Gives the fault just set in r->err its place; returns `status`. */
EnlStatus enl_smiles_locate (EnlSmilesReader *r, size_t offset, size_t length, EnlStatus status);

/* Reports the character at r->at, which no rule takes, as well as it can be explained. */
EnlStatus enl_smiles_report_character (EnlSmilesReader *r);
/* The same for an element symbol of a bracket that does not exist. */
EnlStatus enl_smiles_report_element (EnlSmilesReader *r, size_t offset);

/* Reads "[...]" from r->at and moves behind it. */
EnlStatus enl_smiles_read_bracket (EnlSmilesReader *r, EnlAtom *atom, EnlSmilesAtom *more);

/* From the written graph to the finished molecule: stereo, alternation, hydrogens, checks. */
EnlStatus enl_smiles_build (EnlSmilesReader *r);
