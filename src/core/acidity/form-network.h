/* The part of an ion over which electron pairs can move, as a small network.
 *
 * A contributing structure is a choice of charge for every node and of pi bonds for every edge such
 * that at each node  pi bonds - charge  keeps its value: a pair that leaves a bond
 * stays as a lone pair on one end. Partners never move, and no form has more charges than
 * the first: no new charge separation.
 */
#pragma once

#include "core/acidity/conjugation.h"

typedef struct {
  uint32_t atom;
  int8_t charge;  /* in the first form */
  int8_t balance; /* pi bonds - charge: the same in every form */
  bool can_minus; /* may carry -1, 0, +1 */
  bool can_neutral;
  bool can_plus;
  uint32_t first, n; /* of its edges in `incident` */
} EnlFormNode;

typedef struct {
  uint32_t a, b; /* nodes */
  uint32_t bond;
  uint8_t pi;  /* pi bonds in the first form */
  uint8_t max; /* pi bonds possible */
} EnlFormEdge;

typedef struct {
  EnlFormNode *node;
  uint32_t n_nodes;
  EnlFormEdge *edge;
  uint32_t n_edges;
  uint32_t *incident; /* edges of every node, one after the other */
  int charge;         /* sum over the nodes */
  int charges;        /* sum of the absolute charges of the first form: the limit */
  bool expanded;      /* pairs move about a sulfonyl, phosphoryl ...: outside the pi model */
} EnlFormNetwork;

/* Networks of `anion` that hold a formal charge, largest number of nodes first; only the one with
 * `atom` unless that is ENL_NONE. A GPtrArray of EnlFormNetwork, perhaps empty (g_ptr_array_unref).
 */
GPtrArray *enl_form_networks (const EnlMolecule *anion, uint32_t atom) ENL_MUST_USE;
