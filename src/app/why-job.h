/* Explaining one value off the main thread. */
#pragma once

#include <gio/gio.h>

#include "core/acidity/why.h"
#include "core/workset/analysis.h"

/* A measured compound, ready to be drawn. */
typedef struct {
  EnlMolecule *mol; /* with layout, or NULL when it could not be laid out */
  EnlSites *sites;
  uint32_t site; /* the measured one, ENL_NONE when it is no site by our rules */
  const EnlReferenceRow *row;
  EnlPrecedent precedent;
} EnlWhyPicture;

typedef struct {
  EnlKnowledge *knowledge; /* held: the rows belong to it */
  EnlWhy *why;
  EnlEstimate estimate;
  EnlWhyPicture picture[ENL_MAX_PRECEDENTS];
  uint32_t n_pictures;
} EnlWhyResult;

void enl_why_result_free (EnlWhyResult *result);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlWhyResult, enl_why_result_free)

/* Starts a worker on a copy of what it needs of the analysis. A cancelled job still calls back, and
 * its finish returns NULL. */
void enl_why_job_start (const EnlAnalysis *analysis, uint32_t site, GCancellable *cancellable,
                        GAsyncReadyCallback done, gpointer data);
/* Caller: enl_why_result_free. */
EnlWhyResult *enl_why_job_finish (GAsyncResult *result);
