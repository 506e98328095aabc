/* Whatever a person may paste. InChI is left out: its child process has a target of its own. */
#include <stdlib.h>

#include "core/notation/read.h"
#include "resources/embedded.h"
#include "tests/fuzz/fuzz.h"

static EnlNames *
open_names (void)
{
  size_t size = 0;
  const char *text = enl_resource ("names.tsv", &size);
  EnlNames *names = NULL;

  g_setenv ("ENL_INCHI", "1", TRUE); /* no child is started under this mark */
  if (enl_names_new (text, size, &names, NULL) != ENL_OK)
    abort ();
  return names;
}

int
LLVMFuzzerTestOneInput (const uint8_t *data, size_t size)
{
  static EnlNames *names;
  g_autoptr (EnlMolecule) mol = NULL;
  EnlError err;

  if (!names)
    names = open_names ();
  if (enl_read_structure (names, (const char *)data, size, &mol, NULL, &err) == ENL_OK)
    return 0;
  if (err.line && err.offset > size)
    abort ();
  g_autofree char *message = enl_error_message (&err);
  return 0;
}
