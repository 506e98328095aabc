/* Renders SMILES to a picture for looking at:
 *   draw-tool THEME OUT.png [options] SMILES...
 * Options: --bare, --numbers, --select RANK, --view structure|substrates|forms, --site RANK.
 * The values beside the badges are invented. */
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "core/layout/layout.h"
#include "core/notation/smiles.h"
#include "draw/forms-sheet.h"
#include "draw/paint.h"
#include "draw/substrates-sheet.h"

typedef struct {
  const EnlTheme *theme;
  bool bare, numbers;
  uint32_t selected; /* rank from 0, ENL_NONE */
  const char *view;
  GPtrArray *smiles;
} Wish;

typedef struct {
  EnlMolecule *mol;
  EnlSites *sites;
  EnlEstimate *estimate;
  uint32_t *rank;
} Substrate;

static void
die (const char *what, const EnlError *err)
{
  g_autofree char *message = enl_error_message (err);

  fprintf (stderr, "%s: %s\n", what, message);
  exit (1);
}

static void
invent_values (Substrate *s)
{
  s->estimate = g_new0 (EnlEstimate, s->sites->n_sites + 1);
  s->rank = g_new0 (uint32_t, s->sites->n_sites + 1);
  for (uint32_t i = 0; i < s->sites->n_sites; i++) {
    double value = 14.2 + 3.3 * i;
    s->rank[i] = i;
    s->estimate[i] = (EnlEstimate){.value = value,
                                   .low = value - 1.9 - 0.4 * i,
                                   .high = value + 2.1 + 0.3 * i,
                                   .basis = (EnlBasis)(2 - (i + 1) % 3)};
  }
}

static void
read_substrate (const char *smiles, Substrate *s)
{
  EnlError err;

  if (enl_smiles_parse (smiles, strlen (smiles), &s->mol, &err) || enl_layout (s->mol, &err) ||
      enl_sites_find (s->mol, &s->sites, &err))
    die (smiles, &err);
  invent_values (s);
}

static EnlForms *
forms_of (const Substrate *s, uint32_t rank)
{
  EnlForms *forms = NULL;
  EnlError err;

  if (rank >= s->sites->n_sites)
    return NULL;
  if (enl_forms_of_site (s->mol, s->sites->site[s->rank[rank]].atom[0], &forms, &err))
    die ("forms", &err);
  return forms;
}

static EnlScene *
draw_substrates (const Wish *wish, const Substrate *s, uint32_t n)
{
  g_autofree EnlSubstrateCard *card = g_new0 (EnlSubstrateCard, n);

  for (uint32_t i = 0; i < n; i++) {
    card[i] = (EnlSubstrateCard){.title = g_ptr_array_index (wish->smiles, i),
                                 .mol = s[i].mol,
                                 .sites = s[i].sites,
                                 .estimate = s[i].estimate,
                                 .rank = s[i].rank,
                                 .selected = ENL_NONE};
    if (wish->selected < s[i].sites->n_sites) {
      card[i].selected = s[i].rank[wish->selected];
      card[i].forms = forms_of (&s[i], wish->selected);
    }
  }
  const EnlSubstratesSheet sheet = {
      .card = card, .n_cards = n, .caption = "Values invented for looking at."};
  EnlScene *scene = enl_substrates_sheet (&sheet, wish->theme);
  for (uint32_t i = 0; i < n; i++)
    enl_forms_free ((EnlForms *)card[i].forms);
  return scene;
}

static EnlScene *
draw_one (const Wish *wish, const Substrate *s)
{
  g_autoptr (EnlForms) forms = forms_of (s, wish->selected);
  EnlStructureLook look = {.selected = ENL_NONE, .numbers = wish->numbers};

  if (strcmp (wish->view, "forms") == 0 && forms) {
    const EnlFormsSheet sheet = {.title = "conjugate base", .forms = forms, .layout = s->mol};
    return enl_forms_sheet (&sheet, wish->theme);
  }
  if (!wish->bare) {
    look.sites = s->sites;
    look.estimate = s->estimate;
    look.rank = s->rank;
    look.forms = forms;
    if (forms)
      look.selected = s->rank[wish->selected];
  }
  return enl_structure_scene (s->mol, &look, wish->theme);
}

static Wish
read_arguments (int argc, char **argv)
{
  Wish wish = {.selected = ENL_NONE, .view = "structure", .smiles = g_ptr_array_new ()};

  if (argc < 4 || enl_theme_find (argv[1]) < 0) {
    fprintf (stderr, "draw-tool THEME OUT.png [options] SMILES...\n");
    exit (2);
  }
  wish.theme = enl_theme_get ((EnlThemeName)enl_theme_find (argv[1]));
  for (int i = 3; i < argc; i++) {
    if (!strcmp (argv[i], "--numbers"))
      wish.numbers = true;
    else if (!strcmp (argv[i], "--bare"))
      wish.bare = true;
    else if (!strcmp (argv[i], "--select") && i + 1 < argc)
      wish.selected = (uint32_t)atoi (argv[++i]) - 1;
    else if (!strcmp (argv[i], "--view") && i + 1 < argc)
      wish.view = argv[++i];
    else
      g_ptr_array_add (wish.smiles, argv[i]);
  }
  return wish;
}

int
main (int argc, char **argv)
{
  Wish wish = read_arguments (argc, argv);
  uint32_t n = wish.smiles->len;
  g_autofree Substrate *s = g_new0 (Substrate, n + 1);
  EnlExport options = {.dpi = 144};
  EnlError err;

  for (uint32_t i = 0; i < n; i++)
    read_substrate (g_ptr_array_index (wish.smiles, i), &s[i]);
  g_autoptr (EnlScene) scene = strcmp (wish.view, "substrates") == 0 ? draw_substrates (&wish, s, n)
                                                                     : draw_one (&wish, &s[0]);
  g_autofree char *faults = enl_scene_faults (scene);
  if (faults)
    fprintf (stderr, "%s", faults);
  if (enl_scene_export (scene, argv[2], &options, &err))
    die (argv[2], &err);
  for (uint32_t i = 0; i < n; i++) {
    enl_molecule_free (s[i].mol);
    enl_sites_free (s[i].sites);
    g_free (s[i].estimate);
    g_free (s[i].rank);
  }
  g_ptr_array_unref (wish.smiles);
  return faults != NULL;
}
