/* What was asked for on the command line. */
#pragma once

#include "cli/output.h"
#include "core/bases/compare.h"
#include "core/bases/weigh-list.h"

/* What validate prints. */
typedef enum {
  ENL_LISTING_USUAL,
  ENL_LISTING_RANKING,
  ENL_LISTING_FAMILIES,
  ENL_LISTING_PAIRS,
  ENL_LISTING_ROWS
} EnlListing;

typedef struct {
  EnlFormat format;
  EnlConditions conditions;
  uint32_t atom; /* 1-based position in the input, 0: the most acidic C-H */
  const char *view, *out, *theme, *fold, *plot;
  EnlListing listing;
  bool explain; /* sites: add why */
  double width_mm, dpi;
  char **base;         /* ids or names of bases, NULL-terminated, or NULL */
  EnlWeighScale scale; /* of weigh; equivalents NAN unless given */
  char **lab;          /* files with own values, NULL-terminated, or NULL */
  char **input;        /* NULL-terminated */
} EnlOptions;

typedef struct {
  const char *name, *summary;
  const char *options; /* letters of the options it takes, see options.c */
  bool needs_input;
  int (*run) (const EnlOptions *options);
} EnlVerb;

/* Parses the arguments behind the verb. Returns -1 to go on, else the exit code: 0 after --help, 2
 * after a wrong use, which has been explained on standard error. */
int enl_options_parse (const EnlVerb *verb, int argc, char **argv, EnlOptions *out);
void enl_options_clear (EnlOptions *options);
