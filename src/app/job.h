/* Reading and analysing one structure line off the main thread. */
#pragma once

#include <gio/gio.h>

#include "core/workset/analysis.h"

typedef struct {
  EnlAnalysis *analysis; /* NULL when the text could not be read or analysed */
  EnlError error;        /* then: why */
} EnlJobResult;

void enl_job_result_free (EnlJobResult *result);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlJobResult, enl_job_result_free)

/* Starts a worker on a copy of `text`. `knowledge` is only read, and held.
 * A cancelled job still calls back, and its finish returns NULL. */
void enl_job_start (const EnlKnowledge *knowledge, const char *text, EnlSolvent solvent,
                    GCancellable *cancellable, GAsyncReadyCallback done, gpointer data);
/* Caller: enl_job_result_free. */
EnlJobResult *enl_job_finish (GAsyncResult *result);
