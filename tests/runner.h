/* The main function of a Check suite. It also serves as the child that reads InChI text, which the
 * program under test starts from its own file. */
#pragma once

#include <check.h>
#include <stdlib.h>
#include <string.h>

#include "core/base/macros.h"
#include "core/notation/inchi.h"

/* Runs the suite. With ENL_BUILD_DIR set the results also go to check-logs/NAME.log there, with
 * Check's own closing line, which TAP output does not have. */
static inline int
enl_test_run (Suite *suite)
{
  SRunner *runner = srunner_create (suite);
  const char *build = g_getenv ("ENL_BUILD_DIR");
  g_autofree char *log = NULL;

  if (build) {
    g_autofree char *folder = g_build_filename (build, "check-logs", NULL);
    log = g_strdup_printf ("%s/%s.log", folder, g_get_prgname ());
    g_mkdir_with_parents (folder, 0755);
    srunner_set_log (runner, log);
  }
  srunner_run_all (runner, CK_ENV);
  int failed = srunner_ntests_failed (runner);
  srunner_free (runner);
  return failed ? EXIT_FAILURE : EXIT_SUCCESS;
}

/* Defines main for a runner with one suite made by `suite_function ()`. */
#define ENL_TEST_MAIN(suite_function)                                                              \
  int main (int argc, char **argv)                                                                 \
  {                                                                                                \
    if (argc == 2 && strcmp (argv[1], ENL_INCHI_WORKER) == 0)                                      \
      return enl_inchi_worker_main ();                                                             \
    g_autofree char *name = g_path_get_basename (argv[0]);                                         \
    g_set_prgname (name);                                                                          \
    return enl_test_run (suite_function ());                                                       \
  }
