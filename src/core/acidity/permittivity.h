/* Relative permittivity of the solvents (resources/solvents.tsv). */
#pragma once

#include "core/acidity/estimate.h"

/* At 25 °C; 1 would be the vacuum. Thread-safe. */
double enl_permittivity (EnlSolvent solvent);
