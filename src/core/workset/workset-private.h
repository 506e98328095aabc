/* The inside of a set, for its own files only. */
#pragma once

#include <jansson.h>

#include "core/workset/workset.h"

/* What is left of `object` once the known members are gone, to be written back later. */
json_t *enl_json_rest (json_t *object, const char *const *known);

/* A text being read, to say where a fault is. */
typedef struct {
  const char *text;
  size_t size;
  EnlError *err;
} EnlReading;

/* "'member' what; advice", at the first place of that name in the text. */
EnlStatus enl_reading_fault (const EnlReading *r, const char *member, const char *advice,
                             const char *what);

/* workset-lab.c: the member "lab". `array` NULL: there is none. */
EnlStatus enl_workset_read_lab (const EnlReading *r, json_t *array, EnlWorkset *set);
json_t *enl_workset_write_lab (const EnlWorkset *set);

struct EnlWorkset {
  GPtrArray *substrate; /* EnlSubstrate */
  GPtrArray *kept;      /* json_t object a substrate: members this version does not know */
  GPtrArray *lab;       /* EnlLabEntry */
  GPtrArray *kept_lab;  /* json_t object a lab value */
  json_t *kept_top;     /* the same for the set itself */
  EnlConditions conditions;
  EnlSelection selection;
  GPtrArray *base; /* EnlOwnBase */
};

/* Adds the base of a JSON object. NULL when all is well; else `err` is filled and the text at fault
 * is returned (borrowed from the object), for a position in the file. */
const char *enl_workset_read_base (EnlWorkset *set, json_t *object, EnlError *err);
json_t *enl_workset_write_bases (const EnlWorkset *set);
