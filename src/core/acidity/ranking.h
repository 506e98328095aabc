/* Right order: which of two acids is the stronger.
 *
 * Pairs are of two kinds: two sites of one molecule, and the same kind of site in two compounds of
 * one family (family.h); both values published for the same solvent and more than one pK unit
 * apart. The order is right when the estimates differ in the same direction as the published
 * values; equal estimates are wrong.
 *
 * Asked twice of every pair: of the fitted model, which has seen both rows, by its smoothed values
 * (never the published ones that the program shows); and with the folds of both rows left out
 * together, so that neither row nor its compound helps to place the other.
 */
#pragma once

#include "core/acidity/validate.h"

typedef enum { ENL_PAIR_SITES, ENL_PAIR_FAMILY, ENL_N_PAIR_KINDS } EnlPairKind;

typedef struct {
  EnlPairKind kind;
  uint32_t first, second; /* rows of the table */
  uint32_t family;        /* a number for each family, from 0; of the first row */
  /* pK units, first minus second. */
  double published, fitted, left_out;
} EnlPair;

/* Differences in published values up to this many pK units make no pair. */
#define ENL_PAIR_GAP 1.0

/* "sites of one molecule", "compounds of one family". */
const char *enl_pair_kind_text (EnlPairKind kind);

/* The two differences have the same sign. */
bool enl_pair_is_right (double published, double estimated);

/* All pairs of the table, new array (g_free), in the order of their rows. As enl_validate. */
EnlStatus enl_rank_pairs (const EnlReference *ref, const char *model_bytes, size_t size,
                          EnlFold fold, EnlPair **out, uint32_t *n, EnlError *err) ENL_MUST_USE;
