#include "core/acidity/pi-solve.h"

#include <gsl/gsl_eigen.h>
#include <gsl/gsl_matrix.h>
#include <string.h>

/* Levels closer than this (beta) count as degenerate; well above rounding, well below any real
 * splitting. */
#define DEGENERATE 1e-7

/* Fills H, and `place` of every orbital of the system; returns the number of electrons. */
static double
fill_matrix (gsl_matrix *h, const EnlPiSolution *s, const EnlPiBasis *basis, uint32_t system,
             uint32_t *place)
{
  const EnlPiParameters *parameters = enl_pi_parameters ();
  double electrons = 0.0;

  gsl_matrix_set_zero (h);
  for (uint32_t i = 0; i < s->n; i++) {
    const EnlPiOrbital *orbital = &basis->orbital[s->orbital[i]];
    gsl_matrix_set (h, i, i, parameters->h[orbital->type]);
    electrons += orbital->electrons;
    place[s->orbital[i]] = i;
  }
  for (uint32_t o = 0; o < basis->n_overlaps; o++) {
    const EnlPiOverlap *overlap = &basis->overlap[o];
    if (basis->system[overlap->a] != system)
      continue;
    gsl_matrix_set (h, place[overlap->a], place[overlap->b], overlap->k);
    gsl_matrix_set (h, place[overlap->b], place[overlap->a], overlap->k);
  }
  return electrons;
}

/* Electrons go to the most bonding levels first; degenerate levels share them equally, so that the
 * result keeps the symmetry of the molecule. */
static void
occupy (EnlPiSolution *s, double electrons)
{
  for (uint32_t first = 0; first < s->n;) {
    uint32_t last = first + 1;
    while (last < s->n && s->level[last - 1] - s->level[last] < DEGENERATE)
      last++;
    double each = MIN (2.0, electrons / (last - first));
    for (uint32_t i = first; i < last; i++)
      s->occupation[i] = each;
    electrons -= each * (last - first);
    first = last;
  }
}

static void
collect (EnlPiSolution *s, const EnlPiBasis *basis, uint32_t system, const gsl_matrix *vector,
         const uint32_t *place, double *overlap_order)
{
  for (uint32_t level = 0; level < s->n; level++) {
    s->energy += s->occupation[level] * s->level[level];
    for (uint32_t i = 0; i < s->n; i++) {
      double c = gsl_matrix_get (vector, i, level);
      s->population[i] += s->occupation[level] * c * c;
    }
  }
  for (uint32_t o = 0; overlap_order && o < basis->n_overlaps; o++) {
    const EnlPiOverlap *overlap = &basis->overlap[o];
    if (basis->system[overlap->a] != system)
      continue;
    double order = 0.0;
    for (uint32_t level = 0; level < s->n; level++)
      order += s->occupation[level] * gsl_matrix_get (vector, place[overlap->a], level) *
               gsl_matrix_get (vector, place[overlap->b], level);
    overlap_order[o] = order;
  }
}

static void
find_orbitals (EnlPiSolution *s, const EnlPiBasis *basis, uint32_t system)
{
  s->orbital = g_new (uint32_t, basis->n_orbitals + 1);
  for (uint32_t i = 0; i < basis->n_orbitals; i++)
    if (basis->system[i] == system)
      s->orbital[s->n++] = i;
  s->population = g_new0 (double, s->n + 1);
  s->level = g_new0 (double, s->n + 1);
  s->occupation = g_new0 (double, s->n + 1);
}

void
enl_pi_solution_init (EnlPiSolution *solution, const EnlPiBasis *basis, uint32_t system,
                      double *overlap_order)
{
  g_autofree uint32_t *place = g_new (uint32_t, basis->n_orbitals + 1);

  memset (solution, 0, sizeof *solution);
  find_orbitals (solution, basis, system);
  g_assert (solution->n > 0);
  gsl_matrix *h = gsl_matrix_alloc (solution->n, solution->n);
  gsl_matrix *vector = gsl_matrix_alloc (solution->n, solution->n);
  gsl_eigen_symmv_workspace *work = gsl_eigen_symmv_alloc (solution->n);
  gsl_vector_view value = gsl_vector_view_array (solution->level, solution->n);
  double electrons = fill_matrix (h, solution, basis, system, place);

  /* The QR iteration of a finite symmetric matrix always ends; both calls cannot fail here. */
  gsl_eigen_symmv (h, &value.vector, vector, work);
  gsl_eigen_symmv_sort (&value.vector, vector, GSL_EIGEN_SORT_VAL_DESC);
  occupy (solution, electrons);
  collect (solution, basis, system, vector, place, overlap_order);
  gsl_eigen_symmv_free (work);
  gsl_matrix_free (vector);
  gsl_matrix_free (h);
}

void
enl_pi_solution_clear (EnlPiSolution *solution)
{
  g_free (solution->orbital);
  g_free (solution->population);
  g_free (solution->level);
  g_free (solution->occupation);
  memset (solution, 0, sizeof *solution);
}
