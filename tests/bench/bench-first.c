/* CPU time from the start of the program to the first estimate, in milliseconds.
 *
 * Usage: bench-first SMILES
 * Prints: opening of all tables and the fitted model, the first estimate, a second one, and a
 * reference (GSL factors a matrix of 500 rows) that says how fast this machine is. Nothing here
 * judges: bench-first.py does. */
#include <stdio.h>
#include <string.h>
#include <time.h>

#include <gsl/gsl_errno.h>
#include <gsl/gsl_linalg.h>

#include "core/notation/smiles.h"
#include "core/workset/analysis.h"
#include "resources/model.h"

#define REFERENCE_ROWS 500

static double
cpu_milliseconds (void)
{
  struct timespec now;

  clock_gettime (CLOCK_PROCESS_CPUTIME_ID, &now);
  return 1e3 * (double)now.tv_sec + 1e-6 * (double)now.tv_nsec;
}

static double
estimate (const EnlKnowledge *knowledge, const char *smiles)
{
  double start = cpu_milliseconds ();
  EnlMolecule *mol;
  EnlAnalysis *a;

  if (enl_smiles_parse (smiles, strlen (smiles), &mol, NULL) != ENL_OK ||
      enl_analysis_new (knowledge, mol, ENL_SOLVENT_DMSO, false, &a, NULL) != ENL_OK ||
      a->sites->n_sites == 0)
    g_error ("no estimate for %s", smiles);
  double spent = cpu_milliseconds () - start;
  enl_analysis_free (a);
  enl_molecule_free (mol);
  return spent;
}

static double
reference (void)
{
  gsl_matrix *m = gsl_matrix_alloc (REFERENCE_ROWS, REFERENCE_ROWS);

  for (size_t i = 0; i < REFERENCE_ROWS; i++)
    for (size_t j = 0; j < REFERENCE_ROWS; j++)
      gsl_matrix_set (m, i, j, i == j ? REFERENCE_ROWS : 1.0 / (1.0 + (double)(i + j)));
  double start = cpu_milliseconds ();
  if (gsl_linalg_cholesky_decomp1 (m) != GSL_SUCCESS)
    g_error ("the reference cannot be factored");
  double spent = cpu_milliseconds () - start;
  gsl_matrix_free (m);
  return spent;
}

int
main (int argc, char **argv)
{
  EnlKnowledge *knowledge;
  size_t size;

  if (argc != 2)
    g_error ("usage: bench-first SMILES");
  gsl_set_error_handler_off ();
  const char *model = enl_model ("model.bin", &size);
  double start = cpu_milliseconds ();
  if (enl_knowledge_open (model, size, &knowledge, NULL) != ENL_OK)
    g_error ("the tables cannot be opened");
  double opening = cpu_milliseconds () - start;
  double first = estimate (knowledge, argv[1]), second = estimate (knowledge, argv[1]);
  enl_knowledge_free (knowledge);
  printf ("%.3f %.3f %.3f %.3f\n", opening, first, second, reference ());
  return 0;
}
