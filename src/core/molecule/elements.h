/* The elements: symbols, standard atomic weights, electronegativities, usual valences.
 *
 * Everything comes from resources/elements.tsv, read once on first use. */
#pragma once

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

#define ENL_N_ELEMENTS     119 /* 0 ('*') to 118 */
#define ENL_MAX_USUAL_BOND 8   /* places for usual valences of one element */

/* "C"; "*" for 0. */
const char *enl_element_symbol (uint8_t element);
/* "carbon"; "any atom" for 0. */
const char *enl_element_name (uint8_t element);
/* Atomic number of a symbol of `length` bytes in its exact case; -1 when there is none. */
int enl_element_find (const char *symbol, size_t length);
/* IUPAC abridged standard atomic weight (2021), g/mol; mass number of the longest-lived isotope
 * where there is no standard weight. */
double enl_element_weight (uint8_t element);
/* Pauling electronegativity; NAN where there is none. */
double enl_element_electronegativity (uint8_t element);

/* Usual numbers of bonds of the neutral atom, ascending; `*count` is 0 where none are listed (d and
 * f elements, '*'). Static storage. */
const uint8_t *enl_element_valences (uint8_t element, size_t *count);
/* Valences that unwritten hydrogens of an OpenSMILES organic-subset atom fill; 0 for others. */
const uint8_t *enl_element_unwritten_valences (uint8_t element, size_t *count);
/* True when more bonds than the largest usual valence are an error. */
bool enl_element_is_strict (uint8_t element);
/* Outer s and p electrons of the neutral atom of an s or p element, else 0. */
uint8_t enl_element_outer_electrons (uint8_t element);
