#include "core/acidity/checksum.h"

#include <string.h>

#define OFFSET_BASIS 14695981039346656037ull
#define PRIME        1099511628211ull

uint64_t
enl_checksum (const void *data, size_t size)
{
  const unsigned char *byte = data;
  uint64_t hash = OFFSET_BASIS ^ size;

  for (size_t i = 0; i < size; i += 8) {
    uint64_t word = 0;
    memcpy (&word, byte + i, size - i < 8 ? size - i : 8);
    hash = (hash ^ word) * PRIME;
    hash ^= hash >> 29; /* carries the high bits back down: a product only moves them up */
  }
  return hash;
}
