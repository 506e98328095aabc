/* Turns one notation into another, record by record, for a comparison with an outside library.
 *
 *   dump-notation read-sdf      SDF on standard input -> a line "ok SMILES" or "error MESSAGE" each
 *   dump-notation write-sdf     SMILES lines -> SDF, laid out ("-" as the name where it failed)
 *   dump-notation write-flat    SMILES lines -> SDF without coordinates
 *   dump-notation inchi         SMILES lines -> "ok INCHI KEY" or "error MESSAGE"
 *   dump-notation read-inchi    InChI lines -> "ok SMILES" or "error MESSAGE"
 * Fields are separated by tabs. */
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "core/layout/layout.h"
#include "core/notation/inchi.h"
#include "core/notation/molfile.h"
#include "core/notation/smiles.h"

static void
print_error (const EnlError *err)
{
  g_autofree char *message = enl_error_message (err);

  printf ("error\t%s\n", message);
}

static void
print_smiles (const EnlMolecule *mol)
{
  g_autofree char *smiles = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);

  printf ("ok\t%s\n", smiles);
}

static void
read_sdf (void)
{
  GString *all = g_string_new (NULL);
  char buffer[65536];
  size_t n, offset = 0, start, length;

  while ((n = fread (buffer, 1, sizeof buffer, stdin)) > 0)
    g_string_append_len (all, buffer, (gssize)n);
  while (enl_sdf_next (all->str, all->len, &offset, &start, &length)) {
    g_autoptr (EnlMolecule) mol = NULL;
    EnlError err;
    if (enl_molfile_parse (all->str + start, length, &mol, &err) == ENL_OK)
      print_smiles (mol);
    else
      print_error (&err);
  }
  g_string_free (all, TRUE);
}

static void
print_block (EnlMolecule *mol, bool laid_out)
{
  g_autofree char *block = NULL;
  EnlError err;

  if ((laid_out && enl_layout (mol, &err) != ENL_OK) ||
      enl_molfile_write (mol, &block, &err) != ENL_OK)
    printf ("-\n\n\n  0  0  0  0  0  0  0  0  0  0999 V2000\nM  END\n$$$$\n");
  else
    printf ("%s$$$$\n", block);
}

static void
print_inchi (const EnlMolecule *mol)
{
  g_autofree char *inchi = NULL, *key = NULL;
  EnlError err;

  if (enl_inchi_write (mol, &inchi, &key, &err) == ENL_OK)
    printf ("ok\t%s\t%s\n", inchi, key);
  else
    print_error (&err);
}

static void
treat_line (const char *mode, const char *line, size_t length)
{
  g_autoptr (EnlMolecule) mol = NULL;
  EnlError err;
  bool from_inchi = strcmp (mode, "read-inchi") == 0;
  EnlStatus status = from_inchi ? enl_inchi_parse (line, length, &mol, &err)
                                : enl_smiles_parse (line, length, &mol, &err);

  if (status != ENL_OK && g_str_has_prefix (mode, "write"))
    print_block (enl_molecule_new (), false);
  else if (status != ENL_OK)
    print_error (&err);
  else if (from_inchi)
    print_smiles (mol);
  else if (strcmp (mode, "inchi") == 0)
    print_inchi (mol);
  else
    print_block (mol, strcmp (mode, "write-sdf") == 0);
}

int
main (int argc, char **argv)
{
  char *line = NULL;
  size_t room = 0;
  ssize_t length;

  if (argc == 2 && strcmp (argv[1], ENL_INCHI_WORKER) == 0)
    return enl_inchi_worker_main ();
  if (argc != 2)
    return EXIT_FAILURE;
  if (strcmp (argv[1], "read-sdf") == 0) {
    read_sdf ();
    return EXIT_SUCCESS;
  }
  while ((length = getline (&line, &room, stdin)) >= 0) {
    if (length && line[length - 1] == '\n')
      line[--length] = '\0';
    treat_line (argv[1], line, (size_t)length);
  }
  free (line);
  return EXIT_SUCCESS;
}
