/* The structures named on the command line, one after the other. */
#pragma once

#include "cli/options.h"
#include "core/workset/knowledge.h"
#include "core/workset/workset.h"

/* Called for every structure that was read. `name` is its own name or its text. A status other than
 * ENL_OK counts as a failed input and is explained by `err`. */
typedef EnlStatus (*EnlVisit) (const char *name, const EnlMolecule *mol, void *data, EnlError *err);

/* Called with a set before its substrates are visited, and with NULL behind them. What it says is
 * wrong counts as a failed input. `path` is its file. */
typedef uint32_t (*EnlVisitSet) (const char *path, const EnlWorkset *set, void *data);

/* Reads every INPUT and visits it. Failures are explained on standard error, one line each
 * ("name: line L, column C: what is wrong; what to do"), the others go on. Returns how many failed.
 * `caret` adds the line at fault with a caret under the character. */
uint32_t enl_input_each (const EnlNames *names, char *const *input, bool caret, EnlVisit visit,
                         void *data);
/* The same; sets are told to `visit_set`. */
uint32_t enl_input_each_in_sets (const EnlNames *names, char *const *input, bool caret,
                                 EnlVisit visit, EnlVisitSet visit_set, void *data);

/* "name: line L, column C: what is wrong; what to do" on standard error, the name shortened to one
 * line that fits. */
void enl_input_explain (const char *name, const EnlError *err);
