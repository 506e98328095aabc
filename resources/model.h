/* The fitted model, built from the tables by enolith-fit and compiled into the program. */
#pragma once

#include <stddef.h>

/* Bytes of "model.bin", or NULL for another name. Static storage: never freed. */
const char *enl_model (const char *name, size_t *size);
