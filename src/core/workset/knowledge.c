#include "core/workset/knowledge.h"

#include "resources/embedded.h"

static EnlStatus
open_tables (EnlKnowledge *k, EnlError *err)
{
  size_t size;
  const char *text = enl_resource ("acids.tsv", &size);
  EnlStatus status = enl_reference_new (text, size, &k->reference, err);

  if (status == ENL_OK) {
    text = enl_resource ("bases.tsv", &size);
    status = enl_base_table_new (text, size, &k->bases, err);
  }
  if (status == ENL_OK) {
    text = enl_resource ("rules.tsv", &size);
    status = enl_rule_table_new (text, size, &k->rules, err);
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
  EnlStatus status = open_tables (k, err);
  if (status == ENL_OK)
    status = enl_estimator_open (k->reference, model, size, &k->estimator, err);
  if (status == ENL_OK)
    *out = g_steal_pointer (&k);
  return status;
}

void
enl_knowledge_free (EnlKnowledge *k)
{
  if (!k)
    return;
  enl_estimator_free (k->estimator);
  enl_reference_free (k->reference);
  enl_base_table_free (k->bases);
  enl_rule_table_free (k->rules);
  enl_names_free (k->names);
  g_free (k);
}
