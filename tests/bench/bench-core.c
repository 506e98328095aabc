/* Times core over a list of SMILES and prints microseconds of CPU per operation.
 *
 * Usage: bench-core read|forms|analysis|bases FILE. The comparison with RDKit in the same run is in
 * bench-core.py; nothing here judges. */
#include <stdio.h>
#include <string.h>
#include <time.h>

#include <gsl/gsl_errno.h>

#include "core/notation/smiles.h"
#include "core/workset/analysis.h"
#include "resources/model.h"

/* Every operation is repeated over the list until this much CPU time has gone. */
#define AT_LEAST_SECONDS 1.0

typedef struct {
  GPtrArray *text; /* char * */
  GPtrArray *mol;  /* EnlMolecule */
  EnlKnowledge *knowledge;
} Bench;

typedef void (*Operation) (const Bench *bench, guint index);

static double
cpu_seconds (void)
{
  struct timespec now;

  clock_gettime (CLOCK_PROCESS_CPUTIME_ID, &now);
  return (double)now.tv_sec + 1e-9 * (double)now.tv_nsec;
}

static void
op_read (const Bench *bench, guint index)
{
  const char *text = g_ptr_array_index (bench->text, index);
  EnlMolecule *mol;

  if (enl_smiles_parse (text, strlen (text), &mol, NULL) != ENL_OK)
    g_error ("cannot read %s", text);
  enl_molecule_free (mol);
}

/* Contributors of the first anionic atom's molecule: the list holds anions for this operation. */
static void
op_forms (const Bench *bench, guint index)
{
  GPtrArray *forms = NULL;
  bool capped;

  if (enl_forms_enumerate (g_ptr_array_index (bench->mol, index), &forms, &capped, NULL) != ENL_OK)
    g_error ("no contributors for entry %u", index);
  g_ptr_array_unref (forms);
}

static void
op_analysis (const Bench *bench, guint index)
{
  EnlAnalysis *a;
  EnlForms *forms;
  const EnlMolecule *mol = g_ptr_array_index (bench->mol, index);

  if (enl_analysis_new (bench->knowledge, mol, ENL_SOLVENT_DMSO, false, &a, NULL) != ENL_OK)
    g_error ("no analysis for entry %u", index);
  for (uint32_t s = 0; s < a->sites->n_sites; s++)
    if (enl_forms_of_site (a->mol, a->sites->site[s].atom[0], &forms, NULL) == ENL_OK)
      enl_forms_free (forms);
  enl_analysis_free (a);
}

static void
read_list (Bench *bench, const char *path)
{
  g_autofree char *text = NULL;

  if (!g_file_get_contents (path, &text, NULL, NULL))
    g_error ("cannot read %s", path);
  g_auto (GStrv) line = g_strsplit (text, "\n", -1);
  for (char **l = line; *l; l++) {
    EnlMolecule *mol;
    if (!**l)
      continue;
    if (enl_smiles_parse (*l, strlen (*l), &mol, NULL) != ENL_OK)
      g_error ("cannot read %s", *l);
    g_ptr_array_add (bench->text, g_strdup (*l));
    g_ptr_array_add (bench->mol, mol);
  }
}

static double
microseconds_each (const Bench *bench, Operation run)
{
  double start = cpu_seconds (), spent;
  size_t done = 0;

  do {
    for (guint i = 0; i < bench->text->len; i++)
      run (bench, i);
    done += bench->text->len;
    spent = cpu_seconds () - start;
  } while (spent < AT_LEAST_SECONDS);
  return 1e6 * spent / (double)done;
}

int
main (int argc, char **argv)
{
  Bench bench = {g_ptr_array_new_with_free_func (g_free),
                 g_ptr_array_new_with_free_func ((GDestroyNotify)enl_molecule_free), NULL};
  size_t size;
  const char *model = enl_model ("model.bin", &size);

  if (argc != 3)
    g_error ("usage: bench-core OPERATION FILE");
  gsl_set_error_handler_off ();
  Operation run = strcmp (argv[1], "read") == 0    ? op_read
                  : strcmp (argv[1], "forms") == 0 ? op_forms
                                                   : op_analysis;
  double start = cpu_seconds ();
  if (run == op_analysis && enl_knowledge_open (model, size, &bench.knowledge, NULL) != ENL_OK)
    g_error ("the tables cannot be opened");
  double opening = cpu_seconds () - start;
  read_list (&bench, argv[2]);
  printf ("%.3f %.3f\n", microseconds_each (&bench, run), 1e3 * opening);
  g_ptr_array_unref (bench.text);
  g_ptr_array_unref (bench.mol);
  enl_knowledge_free (bench.knowledge);
  return 0;
}
