/* Runs a fuzz target over the files of the folders given, so that every fault once found stays
 * found with any compiler. */
#include <stdio.h>
#include <stdlib.h>

#include <glib.h>

#include "tests/fuzz/fuzz.h"

static int
replay_folder (const char *folder)
{
  g_autoptr (GDir) dir = g_dir_open (folder, 0, NULL);
  const char *name;
  int count = 0;

  while (dir && (name = g_dir_read_name (dir))) {
    g_autofree char *path = g_build_filename (folder, name, NULL);
    g_autofree char *data = NULL;
    size_t size = 0;
    if (!g_file_get_contents (path, &data, &size, NULL))
      continue;
    /* A copy of exactly that size, so that a reader that runs over its end is caught. */
    g_autofree uint8_t *exact = g_memdup2 (data, size);
    LLVMFuzzerTestOneInput (exact, size);
    count++;
  }
  return count;
}

int
main (int argc, char **argv)
{
  int count = 0;

  for (int i = 1; i < argc; i++)
    count += replay_folder (argv[i]);
  printf ("%d passed, %d failed\n", count, count ? 0 : 1);
  return count ? EXIT_SUCCESS : EXIT_FAILURE; /* an empty corpus tests nothing */
}
