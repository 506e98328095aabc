/* Hückel solution of one pi system. */
#pragma once

#include "core/acidity/pi-orbital.h"

typedef struct {
  uint32_t n;         /* orbitals */
  uint32_t *orbital;  /* their indices in the basis, ascending */
  double energy;      /* sum over electrons, beta */
  double *population; /* electrons in each of them */
  double *level;      /* energies, most bonding first */
  double *occupation; /* electrons in each level; equal in degenerate ones */
} EnlPiSolution;

/* Solves system `system` of `basis`. When `overlap_order` is not NULL (basis->n_overlaps places),
 * the entries of this system are filled. Release with enl_pi_solution_clear. */
void enl_pi_solution_init (EnlPiSolution *solution, const EnlPiBasis *basis, uint32_t system,
                           double *overlap_order);
void enl_pi_solution_clear (EnlPiSolution *solution);
