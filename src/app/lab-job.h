/* Checking the own values of a set and conditioning the model on them, off the main thread. */
#pragma once

#include <gio/gio.h>

#include "core/workset/knowledge.h"
#include "core/workset/workset.h"

typedef struct {
  EnlLab *lab;             /* the values that can be used; tags are their indices in the set */
  EnlError *fault;         /* for each value of the set: code ENL_OK or why it is left out */
  uint32_t n;              /* values of the set */
  EnlKnowledge *knowledge; /* held: with these values */
} EnlLabResult;

void enl_lab_result_free (EnlLabResult *result);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlLabResult, enl_lab_result_free)

/* Starts a worker on a copy of the set. `knowledge`, without own values, is held. A cancelled job
 * still calls back, and its finish returns NULL. */
void enl_lab_job_start (const EnlKnowledge *knowledge, const EnlWorkset *set,
                        GCancellable *cancellable, GAsyncReadyCallback done, gpointer data);
/* Caller: enl_lab_result_free. */
EnlLabResult *enl_lab_job_finish (GAsyncResult *result);
