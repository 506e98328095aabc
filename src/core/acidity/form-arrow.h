/* Curved arrows: the electron pairs that move between two contributing structures. */
#pragma once

#include "core/acidity/form.h"

/* One structure of `mol`: order of every bond, charge of every atom. */
typedef struct {
  const uint8_t *order;
  const int8_t *charge;
} EnlFormView;

/* Arrows from one structure to another of the same ion, each path from the atom that gives up a
 * lone pair to the atom that receives one, then closed rounds (Kekulé shifts). Returns a new array
 * (g_free) with its length in `n`; NULL with 0 when they are alike, or when no set of single moves
 * leads from the one to the other (two lone pairs meeting in one bond). */
EnlArrow *enl_form_arrows (const EnlMolecule *mol, EnlFormView from, EnlFormView to,
                           uint32_t *n) ENL_MUST_USE;
