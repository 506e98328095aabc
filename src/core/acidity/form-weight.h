/* Weights of contributing structures from the charges of the pi model. */
#pragma once

#include "core/acidity/form-search.h"

/* The states of a network, grouped: states with the same charges (Kekulé copies) and those that a
 * symmetry of the skeleton exchanges are one card. */
typedef struct {
  uint32_t *card; /* of every state; card 0 holds state 0 */
  uint32_t n_cards;
  double *weight; /* of every state, adding up to 1 */
} EnlFormWeights;

/* `charge` is the net charge of every atom of `anion` in the pi model. Release with
 * enl_form_weights_clear. */
void enl_form_weights_init (EnlFormWeights *weights, const EnlMolecule *anion,
                            const EnlFormStates *states, const double *charge);
void enl_form_weights_clear (EnlFormWeights *weights);
