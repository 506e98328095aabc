#include "core/acidity/shells.h"

#include <stdlib.h>

/* Weights of the marks: what is coarse counts half. */
#define COARSE 0.5f
#define FINE   1.0f

/* Families of marks, so that equal numbers in different families stay apart. */
enum { MARK_ELEMENT = 1, MARK_ATOM, MARK_NEIGHBOURS, MARK_RING_ATOM, MARK_HYDROGENS, MARK_RING };

#define MAX_NEIGHBOURS 16

/* FNV-1a over the bytes of `value`. */
static uint32_t
mix (uint32_t hash, uint32_t value)
{
  for (int shift = 0; shift < 32; shift += 8) {
    hash ^= (value >> shift) & 0xff;
    hash *= 16777619u;
  }
  return hash;
}

static uint32_t
start_hash (uint32_t family)
{
  return mix (2166136261u, family);
}

static int
sign (int value)
{
  return (value > 0) - (value < 0);
}

/* Element, hybridisation, aromaticity and sign of the charge in one number. */
static uint32_t
atom_code (const EnlSurvey *survey, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (enl_survey_molecule (survey), atom);

  return (uint32_t)a->element << 8 | (uint32_t)enl_survey_hybrid (survey, atom) << 4 |
         (uint32_t)a->aromatic << 2 | (uint32_t)(sign (a->charge) + 1);
}

static int
compare_numbers (const void *a, const void *b)
{
  uint32_t x = *(const uint32_t *)a, y = *(const uint32_t *)b;

  return (x > y) - (x < y);
}

static uint32_t
neighbour_hash (const EnlSurvey *survey, uint32_t atom)
{
  const EnlMolecule *mol = enl_survey_molecule (survey);
  uint32_t code[MAX_NEIGHBOURS], n = 0;
  uint32_t hash = mix (start_hash (MARK_NEIGHBOURS), atom_code (survey, atom));

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom) && n < MAX_NEIGHBOURS; k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    const EnlBond *bond = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k));
    if (!enl_atom_is_hydrogen (mol, other))
      code[n++] = atom_code (survey, other) << 4 | (bond->aromatic ? 5u : bond->order);
  }
  qsort (code, n, sizeof *code, compare_numbers);
  for (uint32_t k = 0; k < n; k++)
    hash = mix (hash, code[k]);
  return hash;
}

static void
add_mark (GArray *store, uint32_t token, float count)
{
  EnlMark mark = {token, count};

  g_array_append_val (store, mark);
}

static void
add_site_marks (const EnlSurvey *survey, uint32_t atom, GArray *store)
{
  const EnlMolecule *mol = enl_survey_molecule (survey);
  uint32_t hydrogens = enl_molecule_total_hydrogens (mol, atom);

  add_mark (store, mix (mix (start_hash (MARK_HYDROGENS), atom_code (survey, atom)), hydrogens),
            FINE);
  add_mark (store, mix (start_hash (MARK_ELEMENT), enl_molecule_atom (mol, atom)->element), FINE);
  for (uint32_t size = 3; size <= 8; size++)
    if (enl_molecule_in_ring_of (mol, atom, size))
      add_mark (store, mix (start_hash (MARK_RING), size), FINE);
}

static void
add_atom_marks (const EnlSurvey *survey, uint32_t atom, GArray *store)
{
  const EnlMolecule *mol = enl_survey_molecule (survey);
  uint32_t code = atom_code (survey, atom);

  add_mark (store, mix (start_hash (MARK_ELEMENT), enl_molecule_atom (mol, atom)->element), COARSE);
  add_mark (store, mix (start_hash (MARK_ATOM), code), FINE);
  add_mark (store, neighbour_hash (survey, atom), FINE);
  if (enl_molecule_in_ring (mol, atom))
    add_mark (store,
              mix (mix (start_hash (MARK_RING_ATOM), code), enl_molecule_smallest_ring (mol, atom)),
              COARSE);
}

static int
compare_marks (const void *a, const void *b)
{
  return compare_numbers (&((const EnlMark *)a)->token, &((const EnlMark *)b)->token);
}

/* Sorts the marks from `begin` on and adds up equal ones. */
static void
tidy (GArray *store, uint32_t begin, float *total)
{
  EnlMark *mark = &g_array_index (store, EnlMark, 0);
  uint32_t end = store->len, to = begin;

  *total = 0;
  if (begin == end)
    return;
  qsort (mark + begin, end - begin, sizeof *mark, compare_marks);
  for (uint32_t i = begin; i < end; i++) {
    *total += mark[i].count;
    if (to > begin && mark[to - 1].token == mark[i].token)
      mark[to - 1].count += mark[i].count;
    else
      mark[to++] = mark[i];
  }
  g_array_set_size (store, to);
}

void
enl_shells_collect (EnlSurvey *survey, uint32_t atom, GArray *store, EnlShells *out)
{
  const EnlMolecule *mol = enl_survey_molecule (survey);
  const uint32_t *distance = enl_survey_distances (survey, atom);
  uint32_t first = store->len, n = enl_molecule_atoms (mol);

  *out = (EnlShells){0};
  for (uint32_t d = 0; d < ENL_N_SHELLS; d++) {
    uint32_t begin = store->len;
    out->start[d] = begin - first;
    if (d == 0)
      add_site_marks (survey, atom, store);
    for (uint32_t i = 0; d > 0 && i < n; i++)
      if (distance[i] == d && !enl_atom_is_hydrogen (mol, i))
        add_atom_marks (survey, i, store);
    tidy (store, begin, &out->total[d]);
  }
  out->start[ENL_N_SHELLS] = store->len - first;
}

/* Sum of the smaller counts of the marks that both have. */
static double
shared (const EnlMark *a, const EnlMark *a_end, const EnlMark *b, const EnlMark *b_end)
{
  double sum = 0;

  while (a < a_end && b < b_end) {
    if (a->token < b->token) {
      a++;
    } else if (a->token > b->token) {
      b++;
    } else {
      sum += MIN (a->count, b->count);
      a++, b++;
    }
  }
  return sum;
}

void
enl_shells_compare (const EnlShells *a, const EnlShells *b, double likeness[ENL_N_SHELLS])
{
  for (int d = 0; d < ENL_N_SHELLS; d++) {
    double small = shared (a->mark + a->start[d], a->mark + a->start[d + 1], b->mark + b->start[d],
                           b->mark + b->start[d + 1]);
    double large = (double)a->total[d] + (double)b->total[d] - small;
    likeness[d] = large > 0 ? small / large : 1;
  }
}

double
enl_shells_likeness (const EnlShells *a, const EnlShells *b)
{
  double likeness[ENL_N_SHELLS], sum = 0, weight = 1, weights = 0;

  enl_shells_compare (a, b, likeness);
  for (int d = 0; d < ENL_N_SHELLS; d++, weight /= 2) {
    sum += weight * likeness[d];
    weights += weight;
  }
  return sum / weights;
}
