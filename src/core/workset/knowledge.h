/* Everything the program knows before it has seen a substrate: opened once, then only read. */
#pragma once

#include "core/acidity/estimator.h"
#include "core/bases/compare.h"
#include "core/notation/names.h"

typedef struct {
  EnlReference *reference;
  EnlEstimator *estimator;
  EnlBaseTable *bases;
  EnlRuleTable *rules;
  EnlPractice practice;
  EnlNames *names;
} EnlKnowledge;

/* Opens the tables inside the program and the fitted model (`model` is borrowed and must outlive
 * the result). Caller: enl_knowledge_free. */
EnlStatus enl_knowledge_open (const char *model, size_t size, EnlKnowledge **out,
                              EnlError *err) ENL_MUST_USE;
void enl_knowledge_free (EnlKnowledge *knowledge);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlKnowledge, enl_knowledge_free)
