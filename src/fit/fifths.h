/* The sternest judgement: hyperparameters, model and interval widths from four fifths of the
 * compounds, scores on the last fifth, in turn for all five. */
#pragma once

#include "core/base/error.h"

#include <stdint.h>

/* Reads the table of acids in `text` and prints a line of scores for every class and solvent. */
EnlStatus enl_fifths_print (const char *text, size_t size, uint32_t steps,
                            EnlError *err) ENL_MUST_USE;
