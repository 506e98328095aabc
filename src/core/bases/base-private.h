/* The inside of the base table, for the files that make one. */
#pragma once

#include "core/bases/base.h"

/* `n` rows of zeroes. */
EnlBaseTable *enl_base_table_allocate (uint32_t n) ENL_MUST_USE;
EnlBase *enl_base_table_edit (EnlBaseTable *table, uint32_t index);
/* A copy of the text that lives as long as the table. */
const char *enl_base_table_keep (EnlBaseTable *table, const char *text);
