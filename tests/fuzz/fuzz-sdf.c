/* Stepping through an SDF must move on and stay inside the text. */
#include <stdlib.h>

#include "core/notation/molfile.h"
#include "tests/fuzz/fuzz.h"

int
LLVMFuzzerTestOneInput (const uint8_t *data, size_t size)
{
  const char *text = (const char *)data;
  size_t offset = 0, start, length;

  for (;;) {
    size_t before = offset;
    if (!enl_sdf_next (text, size, &offset, &start, &length))
      break;
    if (offset <= before || offset > size || start + length > size)
      abort ();
    g_autofree char *field = enl_sdf_field (text + start, length, "pKa");
    g_autoptr (EnlMolecule) mol = NULL;
    if (enl_molfile_parse (text + start, length, &mol, NULL) != ENL_OK)
      continue;
  }
  return 0;
}
