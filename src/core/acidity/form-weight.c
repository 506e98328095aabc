#include "core/acidity/form-weight.h"

#include <math.h>
#include <string.h>

#include "core/acidity/nnls.h"
#include "core/acidity/pi-parameters.h"
#include "core/molecule/elements.h"
#include "core/molecule/symmetry.h"

/* Strength of the pull towards the weights that form energies alone would give: a hundredth of a
 * unit charge squared, enough to make the answer unique, too little to be seen otherwise. */
#define PULL 0.01
/* Spread of those energies, in beta: how much better a form must be to weigh e times more. */
#define ENERGY_SPREAD 0.5
/* Rounds of neighbourhood refinement; atoms further apart than this never decide. */
#define MAX_ROUNDS 24

typedef struct {
  const EnlMolecule *anion;
  const EnlFormStates *states;
  const EnlFormNetwork *network;
  uint32_t *pattern; /* of every state */
  uint32_t n_patterns;
  uint32_t *state_of; /* a state of every pattern */
  uint32_t *copies;   /* states of every pattern */
  uint32_t *orbit;    /* of every pattern */
  uint32_t n_orbits;
  uint32_t *members; /* patterns of every orbit */
} Groups;

static const int8_t *
charges_of_pattern (const Groups *g, uint32_t pattern)
{
  return enl_form_state_charge (g->states, g->state_of[pattern]);
}

static uint64_t
mix (uint64_t a, uint64_t b)
{
  uint64_t z = a + 0x9E3779B97F4A7C15u + b * 0xBF58476D1CE4E5B9u;

  z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9u;
  z = (z ^ (z >> 27)) * 0x94D049BB133111EBu;
  return z ^ (z >> 31);
}

static void
find_patterns (Groups *g)
{
  g_autoptr (GHashTable) seen =
      g_hash_table_new_full (g_bytes_hash, g_bytes_equal, (GDestroyNotify)g_bytes_unref, NULL);

  for (uint32_t state = 0; state < g->states->n; state++) {
    GBytes *key =
        g_bytes_new_static (enl_form_state_charge (g->states, state), g->network->n_nodes);
    void *found = NULL;
    if (g_hash_table_lookup_extended (seen, key, NULL, &found)) {
      g->pattern[state] = GPOINTER_TO_UINT (found);
      g_bytes_unref (key);
    } else {
      g->pattern[state] = g->n_patterns;
      g->state_of[g->n_patterns] = state;
      g_hash_table_insert (seen, key, GUINT_TO_POINTER (g->n_patterns++));
    }
    g->copies[g->pattern[state]]++;
  }
}

/* Symmetry classes of the sigma skeleton: pairs of electrons may be anywhere. */
static void
classify_skeleton (const EnlMolecule *anion, uint32_t *class_of)
{
  g_autoptr (EnlMolecule) skeleton = enl_molecule_copy (anion);

  for (uint32_t b = 0; b < enl_molecule_bonds (skeleton); b++)
    enl_molecule_edit_bond (skeleton, b)->order = 1;
  for (uint32_t i = 0; i < enl_molecule_atoms (skeleton); i++)
    enl_molecule_edit_atom (skeleton, i)->charge = 0;
  enl_molecule_finish (skeleton);
  enl_symmetry_classes (skeleton, false, class_of);
}

/* A number that patterns share when a symmetry of the skeleton turns one into the other: classes
 * and charges, refined by those of the neighbours. */
static uint64_t
key_of_pattern (const Groups *g, uint32_t pattern, const uint32_t *class_of, uint64_t *colour,
                uint64_t *next)
{
  uint32_t n = enl_molecule_atoms (g->anion);
  const int8_t *charge = charges_of_pattern (g, pattern);
  uint64_t key = 0;

  for (uint32_t i = 0; i < n; i++)
    colour[i] = mix (class_of[i], 2);
  for (uint32_t k = 0; k < g->network->n_nodes; k++) {
    uint32_t atom = g->network->node[k].atom;
    colour[atom] = mix (class_of[atom], (uint64_t)(charge[k] + 10));
  }
  for (uint32_t round = 0; round < MIN (n, MAX_ROUNDS); round++) {
    for (uint32_t i = 0; i < n; i++) {
      uint64_t sum = 0;
      for (uint32_t k = 0; k < enl_molecule_degree (g->anion, i); k++)
        sum += mix (colour[enl_molecule_neighbour (g->anion, i, k)], 1);
      next[i] = mix (colour[i], sum);
    }
    memcpy (colour, next, n * sizeof *colour);
  }
  for (uint32_t i = 0; i < n; i++)
    key += mix (colour[i], 3);
  return key;
}

static void
find_orbits (Groups *g)
{
  uint32_t n = enl_molecule_atoms (g->anion);
  g_autofree uint32_t *class_of = g_new0 (uint32_t, n + 1);
  g_autofree uint64_t *colour = g_new (uint64_t, 2 * n + 1);
  g_autofree uint64_t *key = g_new (uint64_t, g->n_patterns + 1);

  if (g->n_patterns > 1)
    classify_skeleton (g->anion, class_of);
  for (uint32_t p = 0; p < g->n_patterns; p++) {
    key[p] = key_of_pattern (g, p, class_of, colour, colour + n);
    g->orbit[p] = g->n_orbits;
    for (uint32_t q = 0; q < p; q++)
      if (key[q] == key[p]) {
        g->orbit[p] = g->orbit[q];
        break;
      }
    g->n_orbits += g->orbit[p] == g->n_orbits;
    g->members[g->orbit[p]]++;
  }
}

/* ---- weights ---- */

static double
parameter_of (uint8_t element, char kind)
{
  const EnlPiParameters *parameters = enl_pi_parameters ();
  char name[8];

  g_snprintf (name, sizeof name, "%s%c", enl_element_symbol (element), kind);
  int type = enl_pi_parameters_type (parameters, name);
  return type < 0 ? 0.0 : parameters->h[type];
}

/* Energy of a form in beta as far as it depends on where the charges are: a lone pair is held as
 * strongly as the h of its atom, and so is one that a cation misses. */
static double
energy_of_pattern (const Groups *g, uint32_t pattern)
{
  const int8_t *charge = charges_of_pattern (g, pattern);
  double energy = 0.0;

  for (uint32_t k = 0; k < g->network->n_nodes; k++) {
    uint8_t element = enl_molecule_atom (g->anion, g->network->node[k].atom)->element;
    if (charge[k] < 0)
      energy += parameter_of (element, '.');
    else if (charge[k] > 0)
      energy -= parameter_of (element, ':');
  }
  return energy;
}

/* What form energies alone would give: a Boltzmann-like share of every orbit. */
static void
fill_prior (const Groups *g, double *prior)
{
  g_autofree double *energy = g_new (double, g->n_patterns + 1);
  double best = -INFINITY, sum = 0.0;

  for (uint32_t p = 0; p < g->n_patterns; p++) {
    energy[p] = energy_of_pattern (g, p);
    best = MAX (best, energy[p]);
  }
  for (uint32_t p = 0; p < g->n_patterns; p++) {
    double share = exp ((energy[p] - best) / ENERGY_SPREAD);
    prior[g->orbit[p]] += share;
    sum += share;
  }
  for (uint32_t o = 0; o < g->n_orbits; o++)
    prior[o] /= sum;
}

/* Charges of every orbit, averaged over its patterns: `column[orbit * nodes + node]`. */
static void
fill_columns (const Groups *g, double *column)
{
  uint32_t nodes = g->network->n_nodes;

  for (uint32_t p = 0; p < g->n_patterns; p++) {
    const int8_t *charge = charges_of_pattern (g, p);
    for (uint32_t k = 0; k < nodes; k++)
      column[(size_t)g->orbit[p] * nodes + k] += charge[k] / (double)g->members[g->orbit[p]];
  }
}

/* Charges to reproduce: the pi model's; about a sulfonyl, phosphoryl ... where there is no such
 * model, the average over all forms. */
static void
fill_target (const Groups *g, const double *charge, double *target)
{
  for (uint32_t k = 0; k < g->network->n_nodes; k++) {
    target[k] = charge[g->network->node[k].atom];
    if (!g->network->expanded)
      continue;
    target[k] = 0.0;
    for (uint32_t p = 0; p < g->n_patterns; p++)
      target[k] += charges_of_pattern (g, p)[k] / (double)g->n_patterns;
  }
}

static double
dot (const double *a, const double *b, uint32_t n)
{
  double sum = 0.0;

  for (uint32_t i = 0; i < n; i++)
    sum += a[i] * b[i];
  return sum;
}

/* Minimises |C w - q|^2 + PULL sum over patterns (share - prior)^2. */
static void
solve_orbits (const Groups *g, const double *charge, double *weight)
{
  uint32_t n = g->n_orbits, nodes = g->network->n_nodes;
  g_autofree double *column = g_new0 (double, (size_t)n *nodes + 1);
  g_autofree double *target = g_new0 (double, nodes + 1);
  g_autofree double *prior = g_new0 (double, n + 1);
  g_autofree double *gram = g_new0 (double, (size_t)n *n + 1);
  g_autofree double *linear = g_new0 (double, n + 1);

  fill_columns (g, column);
  fill_target (g, charge, target);
  fill_prior (g, prior);
  for (uint32_t i = 0; i < n; i++) {
    const double *own = column + (size_t)i * nodes;
    for (uint32_t j = 0; j < n; j++)
      gram[(size_t)i * n + j] = dot (own, column + (size_t)j * nodes, nodes);
    gram[(size_t)i * n + i] += PULL / g->members[i];
    linear[i] = dot (own, target, nodes) + PULL * prior[i] / g->members[i];
  }
  bool solved = enl_nnls_solve (gram, linear, n, 1.0, weight);
  g_assert (solved); /* the pull makes the matrix positive definite */
}

void
enl_form_weights_init (EnlFormWeights *weights, const EnlMolecule *anion,
                       const EnlFormStates *states, const double *charge)
{
  uint32_t n = states->n;
  g_autofree uint32_t *counts = g_new0 (uint32_t, 5 * n + 1);
  g_autofree double *of_orbit = g_new0 (double, n + 1);
  Groups g = {
      .anion = anion,
      .states = states,
      .network = states->network,
      .pattern = counts,
      .state_of = counts + n,
      .copies = counts + 2 * n,
      .orbit = counts + 3 * n,
      .members = counts + 4 * n,
  };

  find_patterns (&g);
  find_orbits (&g);
  solve_orbits (&g, charge, of_orbit);
  weights->n_cards = g.n_orbits;
  weights->card = g_new (uint32_t, n + 1);
  weights->weight = g_new (double, n + 1);
  for (uint32_t i = 0; i < n; i++) {
    uint32_t p = g.pattern[i], o = g.orbit[p];
    weights->card[i] = o;
    weights->weight[i] = of_orbit[o] / g.members[o] / g.copies[p];
  }
}

void
enl_form_weights_clear (EnlFormWeights *weights)
{
  g_free (weights->card);
  g_free (weights->weight);
  memset (weights, 0, sizeof *weights);
}
