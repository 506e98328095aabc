#include "app/lab-job.h"

typedef struct {
  EnlKnowledge *knowledge; /* held */
  EnlWorkset *set;
} Order;

static void
order_free (gpointer data)
{
  Order *order = data;

  enl_knowledge_free (order->knowledge);
  enl_workset_free (order->set);
  g_free (order);
}

void
enl_lab_result_free (EnlLabResult *result)
{
  if (!result)
    return;
  enl_lab_free (result->lab);
  g_free (result->fault);
  enl_knowledge_free (result->knowledge);
  g_free (result);
}

/* A model that cannot be conditioned (it never was seen) leaves out all values and says so. */
static void
give_up (EnlLabResult *result, const EnlError *err)
{
  for (uint32_t i = 0; i < result->n; i++)
    if (result->fault[i].code == ENL_OK)
      result->fault[i] = *err;
  enl_lab_free (result->lab);
  result->lab = enl_lab_new ();
}

static void
work (GTask *task, gpointer source, gpointer data, GCancellable *cancellable)
{
  const Order *order = data;
  g_autoptr (EnlLabResult) result = g_new0 (EnlLabResult, 1);
  EnlError err = {0};

  (void)source;
  (void)cancellable;
  if (g_task_return_error_if_cancelled (task))
    return;
  result->n = enl_workset_lab_size (order->set);
  result->fault = g_new0 (EnlError, result->n + 1);
  result->lab = enl_workset_lab_check (order->set, order->knowledge->names, result->fault);
  if (enl_knowledge_with_lab (order->knowledge, result->lab, &result->knowledge, &err) != ENL_OK)
    give_up (result, &err);
  g_task_return_pointer (task, g_steal_pointer (&result), (GDestroyNotify)enl_lab_result_free);
}

void
enl_lab_job_start (const EnlKnowledge *knowledge, const EnlWorkset *set, GCancellable *cancellable,
                   GAsyncReadyCallback done, gpointer data)
{
  g_autoptr (GTask) task = g_task_new (NULL, cancellable, done, data);
  Order *order = g_new0 (Order, 1);

  order->knowledge = enl_knowledge_ref (knowledge);
  order->set = enl_workset_copy (set);
  g_task_set_task_data (task, order, order_free);
  g_task_run_in_thread (task, work);
}

EnlLabResult *
enl_lab_job_finish (GAsyncResult *result)
{
  return g_task_propagate_pointer (G_TASK (result), NULL);
}
