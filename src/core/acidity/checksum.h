/* A fingerprint against accidental damage and mix-ups (not against malice). */
#pragma once

#include <stddef.h>
#include <stdint.h>

/* FNV-1a of 64 bits, taken over words of 8 bytes for speed. */
uint64_t enl_checksum (const void *data, size_t size);
