#include <stdio.h>
#include <string.h>

#include <gsl/gsl_errno.h>

#include "cli/verbs.h"
#include "core/notation/inchi.h"

static const EnlVerb verb[] = {
    {"sites", "Acidic hydrogens, ranked, with pKa, 90 % interval and nearest measured compounds.",
     "fsxl", true, enl_verb_sites},
    {"forms", "Contributing structures of the anion, with weights and charges.", "fsal", true,
     enl_verb_forms},
    {"bases", "Every base against one site: gap, conversion, verdict, cautions; best first.",
     "fsaechtl", true, enl_verb_bases},
    {"weigh", "What to weigh or measure out of chosen bases for an amount of substrate.",
     "fsaechbMGTDl", true, enl_verb_weigh},
    {"report",
     "A set, two pages for up to four substrates: structures, ranks, bases, composition, cautions, "
     "sources.",
     "osectl", true, enl_verb_report},
    {"figure", "Writes an annotated picture.", "svbaechowdml", true, enl_verb_figure},
    {"molecule", "What was read: formula, molar mass, hydrogens, rings, SMILES, InChIKey.", "f",
     true, enl_verb_molecule},
    {"validate", "Left-out errors of the estimator, class by class.", "fgkFPRpwdm", false,
     enl_verb_validate},
};

static void
print_help (void)
{
  printf ("enolith-cli VERB [options] INPUT...\n"
          "Which hydrogen comes off first, and which base takes it off.\n\n");
  for (size_t i = 0; i < ENL_COUNT (verb); i++)
    printf ("  %-10s %s\n", verb[i].name, verb[i].summary);
  printf (
      "\n'enolith-cli VERB --help' tells the options. Exit code: 0 all read, 1 an input failed,\n"
      "2 wrong usage. Enolith estimates acidity only: reactivity, quantities and safety are to\n"
      "be decided under local rules by a qualified person.\n");
}

static int
wrong_use (const char *what, const char *word)
{
  fprintf (stderr, "enolith-cli: %s%s; see 'enolith-cli --help'\n", what, word);
  return 2;
}

static int
run_verb (const EnlVerb *chosen, int argc, char **argv)
{
  EnlOptions options;
  int code = enl_options_parse (chosen, argc, argv, &options);

  if (code < 0)
    code = chosen->run (&options);
  if (code != 0 && code != 1)
    return code;
  if (fflush (stdout) != 0 || ferror (stdout)) {
    fprintf (stderr, "enolith-cli: the output could not be written\n");
    code = 1;
  }
  enl_options_clear (&options);
  return code;
}

int
main (int argc, char **argv)
{
  if (argc == 2 && strcmp (argv[1], ENL_INCHI_WORKER) == 0)
    return enl_inchi_worker_main ();
  gsl_set_error_handler_off ();
  if (argc < 2)
    return wrong_use ("no verb", "");
  if (strcmp (argv[1], "--help") == 0) {
    print_help ();
    return 0;
  }
  if (strcmp (argv[1], "--version") == 0) {
    printf ("enolith-cli %s\n", ENL_VERSION);
    return 0;
  }
  for (size_t i = 0; i < ENL_COUNT (verb); i++)
    if (strcmp (argv[1], verb[i].name) == 0)
      return run_verb (&verb[i], argc - 2, argv + 2);
  return wrong_use ("no verb ", argv[1]);
}
