/* Times core over a list of SMILES and prints microseconds of CPU per operation.
 *
 * Usage: bench-core read|forms|analysis|bases|curve FILE. The comparison with RDKit in the same run
 * is in bench-core.py; nothing here judges. */
#include <math.h>
#include <stdio.h>
#include <string.h>
#include <time.h>

#include <gsl/gsl_errno.h>

#include "core/bases/curve.h"
#include "core/bases/equilibrium.h"
#include "core/notation/smiles.h"
#include "core/workset/analysis.h"
#include "resources/model.h"

/* Every operation is repeated over the list until this much CPU time has gone. */
#define AT_LEAST_SECONDS 1.0
/* What is promised for the operations on bases holds for so many sites. */
#define MANY_SITES 8

typedef struct {
  GPtrArray *text;                  /* char * */
  GPtrArray *mol;                   /* EnlMolecule */
  GPtrArray *analysis, *comparison; /* EnlAnalysis, EnlComparison: for operations on bases */
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

/* Site, with its estimates ready, that a comparison asks about: filled before the clock starts. */
static EnlAnalysis *
analysis_at (const Bench *bench, guint index)
{
  return g_ptr_array_index (bench->analysis, index);
}

/* The base with the number nearest above the site: its curve bends most. */
static const EnlCandidate *
hardest (const EnlComparison *comparison)
{
  const EnlCandidate *best = &comparison->candidate[0];

  for (uint32_t i = 0; i < comparison->n_candidates; i++) {
    const EnlCandidate *c = &comparison->candidate[i];
    if (!isnan (c->conversion) && !isnan (c->gap) &&
        (isnan (best->conversion) || isnan (best->gap) || fabs (c->gap) < fabs (best->gap)))
      best = c;
  }
  return best;
}

static EnlConditions
usual_conditions (void)
{
  EnlConditions conditions = enl_conditions_default ();

  conditions.water = 0.05;
  return conditions;
}

/* Every base of the table, then the curve of one. */
static void
op_bases (const Bench *bench, guint index)
{
  const EnlAnalysis *a = analysis_at (bench, index);
  const EnlConditions conditions = usual_conditions ();
  EnlQuestion q =
      enl_analysis_question (a, bench->knowledge, enl_analysis_site (a, ENL_NONE), &conditions);
  EnlComparison *comparison;
  EnlCurve *curve;

  if (enl_bases_compare (&q, &comparison, NULL) != ENL_OK ||
      enl_curve_new (&q, hardest (comparison), ENL_SWEEP_POINTS, &curve, NULL) != ENL_OK)
    g_error ("no comparison for entry %u", index);
  enl_curve_free (curve);
  enl_comparison_free (comparison);
}

/* The curve alone, its base judged before. */
static void
op_curve (const Bench *bench, guint index)
{
  const EnlAnalysis *a = analysis_at (bench, index);
  const EnlConditions conditions = usual_conditions ();
  EnlQuestion q =
      enl_analysis_question (a, bench->knowledge, enl_analysis_site (a, ENL_NONE), &conditions);
  EnlCurve *curve;

  if (enl_curve_new (&q, hardest (g_ptr_array_index (bench->comparison, index)), ENL_SWEEP_POINTS,
                     &curve, NULL) != ENL_OK)
    g_error ("no curve for entry %u", index);
  enl_curve_free (curve);
}

/* What the operations on bases start from. */
static void
analyse_list (Bench *bench)
{
  for (guint i = 0; i < bench->mol->len; i++) {
    const EnlConditions conditions = usual_conditions ();
    EnlAnalysis *a;
    EnlComparison *comparison;
    if (enl_analysis_new (bench->knowledge, g_ptr_array_index (bench->mol, i), ENL_SOLVENT_DMSO,
                          false, &a, NULL) != ENL_OK ||
        a->sites->n_sites < MANY_SITES)
      g_error ("fewer than %d sites in entry %u", MANY_SITES, i);
    EnlQuestion q =
        enl_analysis_question (a, bench->knowledge, enl_analysis_site (a, ENL_NONE), &conditions);
    if (enl_bases_compare (&q, &comparison, NULL) != ENL_OK)
      g_error ("no comparison for entry %u", i);
    g_ptr_array_add (bench->analysis, a);
    g_ptr_array_add (bench->comparison, comparison);
  }
}

static Operation
operation_of (const char *word)
{
  static const struct {
    const char *word;
    Operation run;
  } known[] = {{"read", op_read},
               {"forms", op_forms},
               {"analysis", op_analysis},
               {"bases", op_bases},
               {"curve", op_curve}};

  for (size_t i = 0; i < ENL_COUNT (known); i++)
    if (strcmp (known[i].word, word) == 0)
      return known[i].run;
  g_error ("no operation %s", word);
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
                 g_ptr_array_new_with_free_func ((GDestroyNotify)enl_molecule_free),
                 g_ptr_array_new_with_free_func ((GDestroyNotify)enl_analysis_free),
                 g_ptr_array_new_with_free_func ((GDestroyNotify)enl_comparison_free), NULL};
  size_t size;
  const char *model = enl_model ("model.bin", &size);

  if (argc != 3)
    g_error ("usage: bench-core OPERATION FILE");
  gsl_set_error_handler_off ();
  Operation run = operation_of (argv[1]);
  bool knows = run != op_read && run != op_forms;
  double start = cpu_seconds ();
  if (knows && enl_knowledge_open (model, size, &bench.knowledge, NULL) != ENL_OK)
    g_error ("the tables cannot be opened");
  double opening = cpu_seconds () - start;
  read_list (&bench, argv[2]);
  if (run == op_bases || run == op_curve)
    analyse_list (&bench);
  printf ("%.3f %.3f\n", microseconds_each (&bench, run), 1e3 * opening);
  g_ptr_array_unref (bench.text);
  g_ptr_array_unref (bench.mol);
  g_ptr_array_unref (bench.comparison);
  g_ptr_array_unref (bench.analysis);
  enl_knowledge_free (bench.knowledge);
  return 0;
}
