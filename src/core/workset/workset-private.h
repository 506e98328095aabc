/* The inside of a set, for its own files only. */
#pragma once

#include <jansson.h>

#include "core/workset/workset.h"

struct EnlWorkset {
  GPtrArray *substrate; /* EnlSubstrate */
  GPtrArray *kept;      /* json_t object a substrate: members this version does not know */
  json_t *kept_top;     /* the same for the set itself */
  EnlConditions conditions;
  EnlSelection selection;
};
