/* The inside of the equilibrium: the proton balance as a function of the proton activity. */
#pragma once

#include "core/bases/equilibrium.h"

/* ENL_OK when the problem can be solved. */
EnlStatus enl_balance_check (const EnlEquilibrium *problem, EnlError *err);

/* Protons that left, less protons that are bound, mol/L: rises with `proton` (-log10 of the
 * activity). `*problem` must have passed the check. */
double enl_balance_at (const EnlEquilibrium *problem, double proton);
/* Protons that can be taken from everything together, mol/L, without the solvent's own. */
double enl_balance_capacity (const EnlEquilibrium *problem);

/* The interval of -log10 of the activity that holds every transition with a wide margin. */
void enl_balance_bracket (const EnlEquilibrium *problem, double *low, double *high);

/* Root within low..high; the end at which the balance comes nearest to zero when there is none. */
double enl_balance_root (const EnlEquilibrium *problem, double low, double high);

/* Composition at one activity. */
void enl_balance_compose (const EnlEquilibrium *problem, double proton, EnlComposition *out);
