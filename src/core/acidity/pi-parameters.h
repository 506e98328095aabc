/* Parameters of the Hückel model (resources/pi-parameters.tsv). */
#pragma once

#include "core/base/error.h"

#include <stdint.h>

#define ENL_MAX_PI_TYPES 32

/* Kinds of p orbital by name ("C.", "N:", ...; see the table) with their h and k in beta. */
typedef struct {
  uint32_t n_types;
  char name[ENL_MAX_PI_TYPES][8];
  double h[ENL_MAX_PI_TYPES];
  double k[ENL_MAX_PI_TYPES][ENL_MAX_PI_TYPES];
} EnlPiParameters;

/* Reads the table text; ENL_ERROR_FORMAT with the line of a row that cannot be used. */
EnlStatus enl_pi_parameters_parse (const char *text, size_t size, EnlPiParameters *out,
                                   EnlError *err) ENL_MUST_USE;

/* The table compiled into the program, parsed once; never NULL, never freed. Thread-safe. */
const EnlPiParameters *enl_pi_parameters (void);

/* Index of a kind of orbital, or -1. */
int enl_pi_parameters_type (const EnlPiParameters *parameters, const char *name);
