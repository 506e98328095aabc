/* Everything the program knows before it has seen a substrate: opened once, then only read. */
#pragma once

#include "core/acidity/estimator.h"
#include "core/bases/compare.h"
#include "core/bases/weigh.h"
#include "core/notation/names.h"

typedef struct EnlKnowledge EnlKnowledge;

struct EnlKnowledge {
  const EnlReference *reference; /* where the row numbers of estimates and precedents count */
  EnlEstimator *estimator;
  EnlBaseTable *bases;
  EnlRuleTable *rules;
  EnlWeighTable *weigh;
  EnlPractice practice;
  EnlNames *names;
  /* the inside */
  EnlReference *published;
  EnlKnowledge *base; /* held: whose tables these are; NULL: its own */
  gatomicrefcount references;
};

/* Opens the tables inside the program and the fitted model (`model` is borrowed and must outlive
 * the result). Caller: enl_knowledge_free. */
EnlStatus enl_knowledge_open (const char *model, size_t size, EnlKnowledge **out,
                              EnlError *err) ENL_MUST_USE;
/* The same knowledge with a user's own values; holds `base`, itself without own values, for its
 * tables. */
EnlStatus enl_knowledge_with_lab (const EnlKnowledge *base, const EnlLab *lab, EnlKnowledge **out,
                                  EnlError *err) ENL_MUST_USE;
/* Holds it: threads and results may outlive the one who opened it. */
EnlKnowledge *enl_knowledge_ref (const EnlKnowledge *knowledge);
/* Gives back one reference; the last one frees. NULL allowed. */
void enl_knowledge_free (EnlKnowledge *knowledge);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlKnowledge, enl_knowledge_free)
