/* The tables of this folder, compiled into the program. */
#pragma once

#include <stddef.h>

/* Bytes of the resource file `name` ("acids.tsv"), or NULL for a name that is not there.
 * A zero byte follows the last one. Static storage: never freed. */
const char *enl_resource (const char *name, size_t *size);
