/* Prints anion forms for the check against an independent program, and for looking at.
 *
 * dump-forms enumerate FILE   each line "SMILES atom": every contributor of the conjugate base that
 *                             loses a proton from that 1-based atom, one JSON object a line
 * dump-forms cards SMILES A   the collapsed forms with weights, charges and arrows
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

#include "core/acidity/form-search.h"
#include "core/acidity/form.h"
#include "core/molecule/elements.h"
#include "core/notation/smiles.h"

#define REPEATS 6

static EnlMolecule *
read_or_complain (const char *text)
{
  EnlMolecule *mol = NULL;
  EnlError err;

  if (enl_smiles_parse (text, strlen (text), &mol, &err) == ENL_OK)
    return mol;
  g_autofree char *message = enl_error_message (&err);
  fprintf (stderr, "%s: %s\n", text, message);
  return NULL;
}

/* Atoms as [element, charge, hydrogens] and bonds as [from, to, order], so that the reader needs
 * no notation of ours. */
static void
print_structure (const EnlMolecule *mol)
{
  printf ("{\"atoms\":[");
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    const EnlAtom *atom = enl_molecule_atom (mol, i);
    printf ("%s[%u,%d,%u]", i ? "," : "", atom->element, atom->charge, atom->hydrogens);
  }
  printf ("],\"bonds\":[");
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    const EnlBond *bond = enl_molecule_bond (mol, b);
    printf ("%s[%u,%u,%u]", b ? "," : "", bond->from, bond->to, bond->order);
  }
  printf ("]}");
}

static void
make_set (const EnlMolecule *anion)
{
  g_autoptr (GPtrArray) networks = enl_form_networks (anion, ENL_NONE);

  for (uint32_t i = 0; i < networks->len; i++) {
    EnlFormStates states;
    enl_form_states_init (&states, networks->pdata[i], ENL_MAX_FORMS);
    enl_form_states_clear (&states);
  }
}

static void
make_molecules (const EnlMolecule *anion)
{
  g_autoptr (GPtrArray) forms = NULL;
  bool capped = false;
  EnlStatus status = enl_forms_enumerate (anion, &forms, &capped, NULL);

  g_assert (status == ENL_OK);
}

/* Microseconds of one call, the fastest of REPEATS. */
static double
time_call (void (*call) (const EnlMolecule *anion), const EnlMolecule *anion)
{
  double best = HUGE_VAL;

  for (int i = 0; i < REPEATS; i++) {
    struct timespec start, end;
    clock_gettime (CLOCK_MONOTONIC, &start);
    call (anion);
    clock_gettime (CLOCK_MONOTONIC, &end);
    best = MIN (best, (double)(end.tv_sec - start.tv_sec) * 1e6 +
                          (double)(end.tv_nsec - start.tv_nsec) / 1e3);
  }
  return best;
}

static bool
enumerate_line (char *line)
{
  uint32_t site = 0;
  char *blank = strpbrk (line, " \t");
  if (!blank)
    return false;
  *blank = '\0';
  site = (uint32_t)strtoul (blank + 1, NULL, 10);
  g_autoptr (EnlMolecule) mol = read_or_complain (line);
  g_autoptr (EnlForms) of_site = NULL;
  g_autoptr (GPtrArray) forms = NULL;
  EnlError err;
  bool capped = false;
  if (!mol || enl_forms_of_site (mol, site - 1, &of_site, &err) != ENL_OK ||
      enl_forms_enumerate (of_site->anion, &forms, &capped, &err) != ENL_OK)
    return false;
  printf ("{\"acid\":\"%s\",\"site\":%u,\"capped\":%s,\"us_set\":%.2f,\"us_molecules\":%.2f,"
          "\"forms\":[",
          line, site, capped ? "true" : "false", time_call (make_set, of_site->anion),
          time_call (make_molecules, of_site->anion));
  for (uint32_t i = 0; i < forms->len; i++) {
    if (i)
      putchar (',');
    print_structure (forms->pdata[i]);
  }
  printf ("]}\n");
  return true;
}

static int
enumerate_file (const char *path)
{
  g_autofree char *text = NULL;
  int failed = 0;

  if (!g_file_get_contents (path, &text, NULL, NULL))
    return 1;
  g_auto (GStrv) line = g_strsplit (text, "\n", -1);
  for (size_t i = 0; line[i]; i++)
    if (line[i][0] && !enumerate_line (line[i]))
      failed = 1;
  return failed;
}

static void
print_end (uint32_t a, uint32_t b)
{
  if (b == ENL_NONE)
    printf ("%u", a + 1);
  else
    printf ("%u-%u", a + 1, b + 1);
}

static void
print_card (const EnlForms *forms, uint32_t index)
{
  const EnlForm *form = &forms->form[index];
  g_autoptr (EnlMolecule) mol = enl_forms_molecule (forms, index);
  g_autofree char *smiles = enl_smiles_write (mol, ENL_SMILES_KEKULE, NULL);

  printf ("%u  x%-3u %.3f  centre %u  %s ", index, form->copies, form->weight, form->centre + 1,
          smiles);
  for (uint32_t i = 0; i < form->n_arrows; i++) {
    printf (" ");
    print_end (form->arrow[i].from_a, form->arrow[i].from_b);
    printf (">");
    print_end (form->arrow[i].to_a, form->arrow[i].to_b);
  }
  printf ("\n");
}

static int
print_cards (const char *smiles, const char *atom)
{
  g_autoptr (EnlMolecule) mol = read_or_complain (smiles);
  g_autoptr (EnlForms) forms = NULL;
  EnlError err;

  if (!mol)
    return 1;
  if (enl_forms_of_site (mol, (uint32_t)strtoul (atom, NULL, 10) - 1, &forms, &err) != ENL_OK) {
    fprintf (stderr, "%s; %s\n", err.text, err.advice);
    return 1;
  }
  printf ("%s: %u forms of %u%s%s%s\n", smiles, forms->n_forms, forms->n_all,
          forms->capped ? ", capped" : "", forms->note ? ", " : "", forms->note ? forms->note : "");
  for (uint32_t i = 0; i < forms->n_forms; i++)
    print_card (forms, i);
  for (uint32_t i = 0; i < enl_molecule_atoms (forms->anion); i++)
    if (forms->charge[i] < -0.005 || forms->charge[i] > 0.005)
      printf (" %s%u %+.2f", enl_element_symbol (enl_molecule_atom (forms->anion, i)->element),
              i + 1, forms->charge[i]);
  printf ("\n");
  return 0;
}

int
main (int argc, char **argv)
{
  if (argc == 3 && strcmp (argv[1], "enumerate") == 0)
    return enumerate_file (argv[2]);
  if (argc == 4 && strcmp (argv[1], "cards") == 0)
    return print_cards (argv[2], argv[3]);
  fprintf (stderr, "usage: dump-forms enumerate FILE | cards SMILES ATOM\n");
  return 2;
}
