#include "app/job.h"

#include <string.h>

#include "core/notation/read.h"

typedef struct {
  EnlKnowledge *knowledge; /* held */
  char *text;
  EnlSolvent solvent;
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;

  enl_knowledge_free (order->knowledge);
  g_free (order->text);
  g_free (order);
}

void
enl_job_result_free (EnlJobResult *result)
{
  if (!result)
    return;
  enl_analysis_free (result->analysis);
  g_free (result);
}

static void
work (GTask *task, gpointer source, gpointer data, GCancellable *cancellable)
{
  const Order *order = data;
  g_autoptr (EnlMolecule) mol = NULL;
  g_autoptr (EnlJobResult) result = g_new0 (EnlJobResult, 1);

  (void)source;
  if (g_task_return_error_if_cancelled (task))
    return;
  EnlStatus status = enl_read_structure (order->knowledge->names, order->text, strlen (order->text),
                                         &mol, NULL, &result->error);
  if (g_cancellable_is_cancelled (cancellable)) {
    g_task_return_error_if_cancelled (task);
    return;
  }
  if (status == ENL_OK)
    status = enl_analysis_new (order->knowledge, mol, order->solvent, true, &result->analysis,
                               &result->error);
  g_task_return_pointer (task, g_steal_pointer (&result), (GDestroyNotify)enl_job_result_free);
}

void
enl_job_start (const EnlKnowledge *knowledge, const char *text, EnlSolvent solvent,
               GCancellable *cancellable, GAsyncReadyCallback done, gpointer data)
{
  g_autoptr (GTask) task = g_task_new (NULL, cancellable, done, data);
  Order *order = g_new0 (Order, 1);

  order->knowledge = enl_knowledge_ref (knowledge);
  order->text = g_strdup (text);
  order->solvent = solvent;
  g_task_set_task_data (task, order, order_free);
  g_task_run_in_thread (task, work);
}

EnlJobResult *
enl_job_finish (GAsyncResult *result)
{
  return g_task_propagate_pointer (G_TASK (result), NULL);
}
