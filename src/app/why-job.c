#include "app/why-job.h"

#include <string.h>

#include "core/layout/layout.h"

typedef struct {
  EnlKnowledge *knowledge; /* held */
  EnlMolecule *mol;
  EnlEstimate *estimate;
  uint32_t site;
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;

  enl_molecule_free (order->mol);
  enl_knowledge_free (order->knowledge);
  g_free (order->estimate);
  g_free (order);
}

void
enl_why_result_free (EnlWhyResult *result)
{
  if (!result)
    return;
  for (uint32_t i = 0; i < result->n_pictures; i++) {
    enl_molecule_free (result->picture[i].mol);
    enl_sites_free (result->picture[i].sites);
  }
  enl_why_free (result->why);
  enl_knowledge_free (result->knowledge);
  g_free (result);
}

static EnlWhyPicture
picture_of (const EnlReferenceRow *row, EnlPrecedent precedent)
{
  EnlWhyPicture picture = {
      .mol = enl_molecule_copy (row->mol), .site = ENL_NONE, .row = row, .precedent = precedent};

  if (!enl_molecule_has_layout (picture.mol) && enl_layout (picture.mol, NULL) != ENL_OK)
    g_clear_pointer (&picture.mol, enl_molecule_free);
  if (picture.mol && enl_sites_find (picture.mol, &picture.sites, NULL) == ENL_OK) {
    const EnlSite *site = enl_sites_of_atom (picture.sites, row->site);
    if (site)
      picture.site = (uint32_t)(site - picture.sites->site);
  }
  return picture;
}

static void
work (GTask *task, gpointer source, gpointer data, GCancellable *cancellable)
{
  const Order *order = data;
  g_autoptr (EnlWhyResult) result = g_new0 (EnlWhyResult, 1);
  EnlSites *sites = NULL;

  (void)source;
  if (g_task_return_error_if_cancelled (task))
    return;
  /* Sites are found in the same order again: estimates belong to them. */
  if (enl_sites_find (order->mol, &sites, NULL) != ENL_OK) {
    g_task_return_pointer (task, NULL, NULL);
    return;
  }
  result->knowledge = enl_knowledge_ref (order->knowledge);
  result->estimate = order->estimate[order->site];
  result->why =
      enl_why_new (order->knowledge->estimator, order->mol, sites, order->estimate, order->site);
  enl_sites_free (sites);
  const EnlEstimate *e = &result->estimate;
  for (uint32_t i = 0; i < e->n_precedents && !g_cancellable_is_cancelled (cancellable); i++)
    result->picture[result->n_pictures++] = picture_of (
        enl_reference_row (order->knowledge->reference, e->precedent[i].row), e->precedent[i]);
  g_task_return_pointer (task, g_steal_pointer (&result), (GDestroyNotify)enl_why_result_free);
}

void
enl_why_job_start (const EnlAnalysis *analysis, uint32_t site, GCancellable *cancellable,
                   GAsyncReadyCallback done, gpointer data)
{
  g_autoptr (GTask) task = g_task_new (NULL, cancellable, done, data);
  Order *order = g_new0 (Order, 1);
  size_t size = analysis->sites->n_sites * sizeof (EnlEstimate);

  order->knowledge = enl_knowledge_ref (analysis->knowledge);
  order->mol = enl_molecule_copy (analysis->mol);
  order->estimate = g_memdup2 (analysis->estimate, size);
  order->site = site;
  g_task_set_task_data (task, order, order_free);
  g_task_run_in_thread (task, work);
}

EnlWhyResult *
enl_why_job_finish (GAsyncResult *result)
{
  return g_task_propagate_pointer (G_TASK (result), NULL);
}
