#include "core/workset/knowledge.h"

#include "core/bases/base-steps.h"
#include "resources/embedded.h"

static EnlStatus
open_tables (EnlKnowledge *k, EnlError *err)
{
  size_t size;
  const char *text = enl_resource ("acids.tsv", &size);
  EnlStatus status = enl_reference_new (text, size, &k->published, err);

  if (status == ENL_OK) {
    text = enl_resource ("bases.tsv", &size);
    status = enl_base_table_new (text, size, &k->bases, err);
  }
  if (status == ENL_OK) {
    text = enl_resource ("base-steps.tsv", &size);
    status = enl_base_table_read_steps (k->bases, text, size, err);
  }
  if (status == ENL_OK) {
    text = enl_resource ("rules.tsv", &size);
    status = enl_rule_table_new (text, size, &k->rules, err);
  }
  if (status == ENL_OK) {
    text = enl_resource ("weigh.tsv", &size);
    status = enl_weigh_table_new (text, size, k->bases, &k->weigh, err);
  }
  if (status == ENL_OK) {
    text = enl_resource ("practice.tsv", &size);
    status = enl_practice_parse (text, size, &k->practice, err);
  }
  if (status == ENL_OK) {
    text = enl_resource ("names.tsv", &size);
    status = enl_names_new (text, size, &k->names, err);
  }
  return status;
}

EnlStatus
enl_knowledge_open (const char *model, size_t size, EnlKnowledge **out, EnlError *err)
{
  g_autoptr (EnlKnowledge) k = g_new0 (EnlKnowledge, 1);

  *out = NULL;
  g_atomic_ref_count_init (&k->references);
  EnlStatus status = open_tables (k, err);
  if (status == ENL_OK)
    status = enl_estimator_open (k->published, model, size, &k->estimator, err);
  k->reference = k->published;
  if (status == ENL_OK)
    *out = g_steal_pointer (&k);
  return status;
}

EnlStatus
enl_knowledge_with_lab (const EnlKnowledge *base, const EnlLab *lab, EnlKnowledge **out,
                        EnlError *err)
{
  EnlEstimator *estimator = NULL;
  EnlStatus status = enl_estimator_with_lab (base->estimator, lab, &estimator, err);

  g_assert (!base->base);
  *out = NULL;
  if (status != ENL_OK)
    return status;
  EnlKnowledge *k = *out = g_memdup2 (base, sizeof *base);
  g_atomic_ref_count_init (&k->references);
  k->base = enl_knowledge_ref (base);
  k->estimator = estimator;
  k->reference = enl_estimator_reference (estimator);
  return ENL_OK;
}

EnlKnowledge *
enl_knowledge_ref (const EnlKnowledge *knowledge)
{
  EnlKnowledge *k = (EnlKnowledge *)knowledge; /* the count is not part of what is known */

  g_atomic_ref_count_inc (&k->references);
  return k;
}

void
enl_knowledge_free (EnlKnowledge *k)
{
  if (!k || !g_atomic_ref_count_dec (&k->references))
    return;
  enl_estimator_free (k->estimator);
  if (k->base) {
    enl_knowledge_free (k->base);
    g_free (k);
    return;
  }
  enl_reference_free (k->published);
  enl_weigh_table_free (k->weigh);
  enl_base_table_free (k->bases);
  enl_rule_table_free (k->rules);
  enl_names_free (k->names);
  g_free (k);
}
