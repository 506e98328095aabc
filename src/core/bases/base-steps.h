/* Further protons that a base can take (resources/base-steps.tsv): carbonate becomes
 * hydrogencarbonate, then carbonic acid. */
#pragma once

#include "core/bases/base.h"

/* Fills EnlBase.further. ENL_ERROR_FORMAT with the line for an unknown base or solvent, a step out
 * of turn, or a pKaH that is missing or not below the step before. */
EnlStatus enl_base_table_read_steps (EnlBaseTable *table, const char *text, size_t size,
                                     EnlError *err) ENL_MUST_USE;
