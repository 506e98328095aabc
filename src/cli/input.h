/* The structures named on the command line, one after the other. */
#pragma once

#include "cli/options.h"
#include "core/workset/knowledge.h"

/* Called for every structure that was read. `name` is its own name or its text. A status other than
 * ENL_OK counts as a failed input and is explained by `err`. */
typedef EnlStatus (*EnlVisit) (const char *name, const EnlMolecule *mol, void *data, EnlError *err);

/* Reads every INPUT and visits it. Failures are explained on standard error, one line each
 * ("name: line L, column C: what is wrong; what to do"), the others go on. Returns how many failed.
 * `caret` adds the line at fault with a caret under the character. */
uint32_t enl_input_each (const EnlNames *names, char *const *input, bool caret, EnlVisit visit,
                         void *data);
