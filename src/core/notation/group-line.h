/* Inside of the reader of lines of groups. A chain is read from left to right, every unit is joined
 * to the last atom that still has a free bond.
 *
 *   line   = { prefix } unit { [bond] unit | branch }
 *   prefix = terminal with a count, or a branch with a count: "Ph2", "(CH3)2", "H2"
 *   unit   = atom with its hydrogens ("CH2"), or one of the written-together groups
 *            CO CO2 COO CHO CN CS NO2 N3 SO SO2 SO3 and, from the left, O2C OOC OHC NC O2N
 *   branch = "(" line ")" [count]: hangs on the last atom; when it has two free ends, like
 *            (CH2)4, its copies form a chain
 */
#pragma once

#include "core/molecule/molecule.h"

typedef struct {
  const char *text;
  size_t size, at;
  EnlMolecule *mol;
  GArray *open;     /* int, free bonds of every atom */
  uint32_t current; /* the atom that the next unit hangs on; ENL_NONE at a start */
  GArray *waiting;  /* uint32_t, atoms that the next chain atom takes ("Ph2" before "CO") */
  int waiting_hydrogens;
  size_t waiting_at; /* where they were written */
  int order;         /* of the next bond: 1, or what "=" or "#" said */
  int lead;          /* 1 where the first atom will get one more bond later: in a leading branch */
  int depth;
  EnlError *err;
} EnlGroupLine;

/* Error at `length` bytes from `at`. */
EnlStatus enl_group_fault (EnlGroupLine *line, EnlStatus code, size_t at, size_t length,
                           const char *advice, const char *format, ...) G_GNUC_PRINTF (6, 7);

/* ---- looking at the text ---- */

/* Byte so far ahead of the reading point; 0 behind the end. */
char enl_group_peek (const EnlGroupLine *line, size_t ahead);
bool enl_group_looks_at (const EnlGroupLine *line, const char *word);
/* True when the text, or the branch, ends so far ahead. */
bool enl_group_ends_after (const EnlGroupLine *line, size_t ahead);
/* Reads a count behind a unit; 1 when there is none, 0 when it is out of range. */
int enl_group_read_count (EnlGroupLine *line);
/* The error for a count out of range that was read from `at` on. */
EnlStatus enl_group_bad_count (EnlGroupLine *line, size_t at);

/* ---- atoms and bonds ---- */

/* Free bonds of an atom, to be changed in place. */
int *enl_group_open (EnlGroupLine *line, uint32_t atom);
/* New atom, written from `at` to the reading point. */
uint32_t enl_group_add_atom (EnlGroupLine *line, uint8_t element, int hydrogens, int open,
                             size_t at);
void enl_group_join (EnlGroupLine *line, uint32_t a, uint32_t b, int order);
EnlStatus enl_group_too_many_bonds (EnlGroupLine *line, uint32_t atom, size_t at);
/* Bonds that the next chain atom will have to what stands left of it, hydrogens included. */
int enl_group_bonds (const EnlGroupLine *line);
/* Joins chain atom `atom`, written from `at` on, to what stands left of it. */
EnlStatus enl_group_attach (EnlGroupLine *line, uint32_t atom, size_t at);
/* Double-bonded (or other) partner that the unit itself brings; returns it. */
uint32_t enl_group_add_partner (EnlGroupLine *line, uint32_t atom, uint8_t element, int order,
                                int left_open, size_t at);

/* ---- groups written together (group-written.c) ---- */

/* Reads one if it stands here; *taken says so. What it means depends on how many bonds its first
 * atom already has: CO is a carbonyl group in CH3COCH3, and an ether in (CH3)3COCH3. */
EnlStatus enl_group_read_written (EnlGroupLine *line, bool *taken);
