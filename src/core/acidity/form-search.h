/* Enumeration of the contributing structures of a network. */
#pragma once

#include "core/acidity/form-network.h"

/* One structure: charge of every node, then pi bonds of every edge, as bytes. */
typedef struct {
  const EnlFormNetwork *network;
  GArray *byte;    /* int8_t, n_nodes + n_edges for each state */
  uint32_t n;      /* states; state 0 is the first form */
  bool incomplete; /* stopped at `limit`, or the search grew too long */
} EnlFormStates;

/* Finds up to `limit` structures, every possible place of the charge before further Kekulé copies
 * when there are more. Release with enl_form_states_clear. */
void enl_form_states_init (EnlFormStates *states, const EnlFormNetwork *network, uint32_t limit);
void enl_form_states_clear (EnlFormStates *states);

const int8_t *enl_form_state_charge (const EnlFormStates *states, uint32_t state);
const int8_t *enl_form_state_pi (const EnlFormStates *states, uint32_t state);
