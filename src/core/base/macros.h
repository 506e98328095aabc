/* Small compiler helpers shared by every layer. */
#pragma once

#include <glib.h>

/* The caller must look at the result (a handle to free, or a status). */
#define ENL_MUST_USE __attribute__ ((warn_unused_result))

/* Number of elements of an array whose size the compiler knows. */
#define ENL_COUNT(array) (sizeof (array) / sizeof ((array)[0]))
