/* The elements: symbols, standard atomic weights, electronegativities, usual valences. */
#pragma once

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

#define ENL_N_ELEMENTS 119 /* 0 ('*') to 118 */

/* "C"; "*" for 0. */
const char *enl_element_symbol (uint8_t element);
/* Atomic number of a symbol of `length` bytes in its exact case; -1 when there is none. */
int enl_element_find (const char *symbol, size_t length);
/* IUPAC abridged standard atomic weight (2021), g/mol; mass number of the longest-lived isotope
 * where there is no standard weight. */
double enl_element_weight (uint8_t element);
/* Pauling electronegativity; NAN where there is none. */
double enl_element_electronegativity (uint8_t element);
