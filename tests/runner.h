/* The main function of a Check suite. */
#pragma once

#include <check.h>
#include <stdlib.h>

#include "core/base/macros.h"

/* Defines main for a runner with one suite made by `suite_function ()`. */
#define ENL_TEST_MAIN(suite_function)                                                              \
  int main (void)                                                                                  \
  {                                                                                                \
    SRunner *runner = srunner_create (suite_function ());                                          \
    srunner_run_all (runner, CK_ENV);                                                              \
    int failed = srunner_ntests_failed (runner);                                                   \
    srunner_free (runner);                                                                         \
    return failed ? EXIT_FAILURE : EXIT_SUCCESS;                                                   \
  }
