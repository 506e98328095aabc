/* What the child process that reads InChI text tells its parent: plain lines, checked by the parent
 * as any other input, since the library behind it is not to be trusted.
 *
 *   enolith-inchi 1
 *   atom SYMBOL CHARGE H PROTIUM DEUTERIUM TRITIUM MASS RADICAL     (one for each atom, from 0)
 *   bond FROM TO ORDER
 *   centre PARITY ATOM N0 N1 N2 N3          (1 odd, 2 even; InChI API's order of neighbours)
 *   double PARITY N0 FROM TO N3
 *   end
 *
 * or, in place of all that, "fault TEXT".
 */
#pragma once

#include "core/molecule/molecule.h"

/* Molecule of an answer. A "fault" line gives ENL_ERROR_SYNTAX with its text, anything that is no
 * answer ENL_ERROR_FORMAT. Errors have no position. */
EnlStatus enl_inchi_answer_parse (const char *answer, size_t size, EnlMolecule **out,
                                  EnlError *err) ENL_MUST_USE;
