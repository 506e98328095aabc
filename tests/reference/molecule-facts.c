/* Prints what the SMILES reader makes of every line of standard input, for a comparison with an
 * outside library. Fields are separated by tabs:
 *   ok, formula, charge, number of rings, atoms, bonds
 * with atoms as "element:charge:hydrogens:aromatic:isotope:unpaired:rings" and bonds as
 * "from-to:order:aromatic:ring", or
 *   error, offset, message.
 * With --time REPEATS it reads all lines so often and prints the microseconds for one. */
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "core/notation/smiles.h"

static void
print_atoms (const EnlMolecule *mol)
{
  for (uint32_t a = 0; a < enl_molecule_atoms (mol); a++) {
    const EnlAtom *atom = enl_molecule_atom (mol, a);
    printf ("%s%u:%d:%u:%d:%u:%u:%u", a ? " " : "", atom->element, atom->charge,
            enl_molecule_total_hydrogens (mol, a), atom->aromatic, atom->isotope, atom->unpaired,
            enl_molecule_ring_count_of_atom (mol, a));
  }
}

static void
print_bonds (const EnlMolecule *mol)
{
  for (uint32_t i = 0; i < enl_molecule_bonds (mol); i++) {
    const EnlBond *bond = enl_molecule_bond (mol, i);
    printf ("%s%u-%u:%u:%d:%d", i ? " " : "", bond->from, bond->to, bond->order, bond->aromatic,
            bond->ring);
  }
}

static void
print_facts (const char *line, size_t length)
{
  g_autoptr (EnlMolecule) mol = NULL;
  EnlError err;

  if (enl_smiles_parse (line, length, &mol, &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    printf ("error\t%zu\t%s\n", err.offset, message);
    return;
  }
  g_autofree char *formula = enl_molecule_formula (mol);
  printf ("ok\t%s\t%d\t%u\t", formula, enl_molecule_charge (mol), enl_molecule_rings (mol));
  print_atoms (mol);
  putchar ('\t');
  print_bonds (mol);
  putchar ('\n');
}

static void
print_time (GPtrArray *line, int repeats)
{
  gint64 start = g_get_monotonic_time ();

  for (int k = 0; k < repeats; k++)
    for (guint i = 0; i < line->len; i++) {
      g_autoptr (EnlMolecule) mol = NULL;
      const char *text = g_ptr_array_index (line, i);
      if (enl_smiles_parse (text, strlen (text), &mol, NULL) != ENL_OK)
        fprintf (stderr, "not read: %s\n", text);
    }
  gint64 taken = g_get_monotonic_time () - start;
  printf ("%.2f\n", (double)taken / repeats / MAX (line->len, 1));
}

int
main (int argc, char **argv)
{
  g_autoptr (GPtrArray) all = g_ptr_array_new_with_free_func (free);
  bool timing = argc == 3 && strcmp (argv[1], "--time") == 0;
  char *line = NULL;
  size_t room = 0;
  ssize_t length;

  while ((length = getline (&line, &room, stdin)) >= 0) {
    if (length && line[length - 1] == '\n')
      line[--length] = '\0';
    if (timing)
      g_ptr_array_add (all, strdup (line));
    else
      print_facts (line, (size_t)length);
  }
  if (timing)
    print_time (all, atoi (argv[2]));
  free (line);
  return 0;
}
