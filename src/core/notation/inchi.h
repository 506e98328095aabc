/* IUPAC International Chemical Identifier through the InChI library. */
#pragma once

#include "core/molecule/molecule.h"

/* Standard InChI and key of a molecule (two-dimensional stereo from windings and sides). New
 * strings (g_free); either pointer may be NULL. Serialised by a lock inside. */
EnlStatus enl_inchi_write (const EnlMolecule *mol, char **inchi, char **key,
                           EnlError *err) ENL_MUST_USE;

/* Reads InChI text. The library crashes on some bad texts, so it runs in a child process with
 * limits on time and memory: the running program (/proc/self/exe) started with the single argument
 * ENL_INCHI_WORKER, whose main must then return enl_inchi_worker_main (). ENL_ERROR_SYNTAX for bad
 * text, ENL_ERROR_IO when no child could be started. */
#define ENL_INCHI_WORKER "--inchi-worker"
EnlStatus enl_inchi_parse (const char *text, size_t size, EnlMolecule **out,
                           EnlError *err) ENL_MUST_USE;
int enl_inchi_worker_main (void);
