/* Renders SMILES to pictures for looking at:
 *   draw-tool THEME OUT.png [options] SMILES
 * Options: --bare, --numbers, --select RANK, --view structure|forms|substrates. */
#include <stdio.h>
#include <string.h>

#include "core/layout/layout.h"
#include "core/notation/smiles.h"
#include "draw/paint.h"
#include "draw/structure-scene.h"

static int
fail (const EnlError *err)
{
  g_autofree char *message = enl_error_message (err);

  fprintf (stderr, "%s\n", message);
  return 1;
}

int
main (int argc, char **argv)
{
  g_autoptr (EnlMolecule) mol = NULL;
  EnlStructureLook look = {.selected = ENL_NONE};
  EnlExport options = {.dpi = 192};
  EnlError err;

  if (argc < 4)
    return 2;
  const EnlTheme *theme = enl_theme_get ((EnlThemeName)MAX (0, enl_theme_find (argv[1])));
  const char *smiles = argv[argc - 1];
  for (int i = 3; i < argc - 1; i++)
    if (!strcmp (argv[i], "--numbers"))
      look.numbers = true;
  if (enl_smiles_parse (smiles, strlen (smiles), &mol, &err) || enl_layout (mol, &err))
    return fail (&err);
  g_autoptr (EnlScene) scene = enl_structure_scene (mol, &look, theme);
  g_autofree char *faults = enl_scene_faults (scene);
  if (faults)
    fprintf (stderr, "%s", faults);
  return enl_scene_export (scene, argv[2], &options, &err) ? fail (&err) : 0;
}
