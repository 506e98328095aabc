/* `sites --explain`: why a value is what it is, in the three formats of the terminal. */
#pragma once

#include "core/acidity/why.h"

/* Lines, sum, width and precedents as an indented block, each line ended. New string (g_free). */
char *enl_explain_text (const EnlReference *reference, const EnlWhy *why,
                        const EnlEstimate *estimate) ENL_MUST_USE;

/* One cell each: "parent: acetone 26.50 | second acyl group (acetyl) -13.20" (the numbers add up to
 * the printed value), and structures with their weights in the order of the precedents,
 * "[CH3:1]C(C)=O 0.52 | ...". New strings (g_free). */
char *enl_explain_lines (const EnlWhy *why) ENL_MUST_USE;
char *enl_explain_structures (const EnlReference *reference,
                              const EnlEstimate *estimate) ENL_MUST_USE;

/* {"lines": [{"words", "value"}], "interval": text, "precedents": [{"name", "smiles", "pka",
 * "solvent", "source", "weight", "likeness"}]}; the values add up to the printed pKa. New string
 * (g_free). */
char *enl_explain_json (const EnlReference *reference, const EnlWhy *why,
                        const EnlEstimate *estimate) ENL_MUST_USE;
