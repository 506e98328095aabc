#include "core/acidity/pi.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "core/acidity/pi-ring.h"
#include "core/acidity/pi-solve.h"

typedef struct {
  double energy, electrons;
} Level;

struct EnlPi {
  const EnlMolecule *mol;
  EnlConjugationAtom *fact;
  EnlPiBasis basis;
  double *system_energy;
  double *population; /* of every orbital */
  double energy;
  double *bond_order;
  double *charge;
  GArray *level; /* Level */
};

static int
compare_levels (const void *a, const void *b)
{
  const Level *x = a, *y = b;

  return (x->energy < y->energy) - (x->energy > y->energy);
}

static void
add_system (EnlPi *pi, uint32_t system, double *overlap_order)
{
  EnlPiSolution solution;

  enl_pi_solution_init (&solution, &pi->basis, system, overlap_order);
  pi->system_energy[system] = solution.energy;
  pi->energy += solution.energy;
  for (uint32_t i = 0; i < solution.n; i++) {
    Level level = {solution.level[i], solution.occupation[i]};
    pi->population[solution.orbital[i]] = solution.population[i];
    g_array_append_val (pi->level, level);
  }
  enl_pi_solution_clear (&solution);
}

/* Formal charge that pi electrons do not carry: a lone pair in the plane of a bent atom. */
static double
sigma_charge (const EnlPi *pi, uint32_t atom)
{
  double charge = pi->fact[atom].charge;

  for (uint32_t o = pi->basis.of_atom[atom];
       o < pi->basis.n_orbitals && pi->basis.orbital[o].atom == atom; o++)
    charge -= pi->basis.orbital[o].core - pi->basis.orbital[o].electrons;
  return charge;
}

static void
fill_charges (EnlPi *pi)
{
  uint32_t n = enl_molecule_atoms (pi->mol);
  g_autofree bool *charged = g_new0 (bool, pi->basis.n_systems + 1);

  for (uint32_t o = 0; o < pi->basis.n_orbitals; o++)
    if (pi->basis.orbital[o].core != pi->basis.orbital[o].electrons)
      charged[pi->basis.system[o]] = true;
  for (uint32_t i = 0; i < n; i++)
    pi->charge[i] = sigma_charge (pi, i);
  for (uint32_t o = 0; o < pi->basis.n_orbitals; o++) {
    const EnlPiOrbital *orbital = &pi->basis.orbital[o];
    double electrons =
        charged[pi->basis.system[o]] ? pi->population[o] : (double)orbital->electrons;
    pi->charge[orbital->atom] += orbital->core - electrons;
  }
}

EnlPi *
enl_pi_new (const EnlMolecule *mol)
{
  EnlPi *pi = g_new0 (EnlPi, 1);

  pi->mol = mol;
  pi->fact = enl_conjugation_facts (mol);
  enl_pi_basis_init (&pi->basis, mol, pi->fact);
  pi->system_energy = g_new0 (double, pi->basis.n_systems + 1);
  pi->population = g_new0 (double, pi->basis.n_orbitals + 1);
  pi->bond_order = g_new0 (double, enl_molecule_bonds (mol) + 1);
  pi->charge = g_new0 (double, enl_molecule_atoms (mol) + 1);
  pi->level = g_array_new (FALSE, FALSE, sizeof (Level));
  g_autofree double *overlap_order = g_new0 (double, pi->basis.n_overlaps + 1);
  for (uint32_t system = 0; system < pi->basis.n_systems; system++)
    add_system (pi, system, overlap_order);
  for (uint32_t o = 0; o < pi->basis.n_overlaps; o++)
    pi->bond_order[pi->basis.overlap[o].bond] += overlap_order[o];
  g_array_sort (pi->level, compare_levels);
  fill_charges (pi);
  return pi;
}

void
enl_pi_free (EnlPi *pi)
{
  if (!pi)
    return;
  enl_pi_basis_clear (&pi->basis);
  g_free (pi->fact);
  g_free (pi->system_energy);
  g_free (pi->population);
  g_free (pi->bond_order);
  g_free (pi->charge);
  g_array_unref (pi->level);
  g_free (pi);
}

double
enl_pi_energy (const EnlPi *pi)
{
  return pi->energy;
}

const double *
enl_pi_bond_order (const EnlPi *pi)
{
  return pi->bond_order;
}

const double *
enl_pi_charge (const EnlPi *pi)
{
  return pi->charge;
}

uint32_t
enl_pi_system (const EnlPi *pi, uint32_t atom)
{
  uint32_t orbital = pi->basis.of_atom[atom];

  return orbital == ENL_NONE ? ENL_NONE : pi->basis.system[orbital];
}

bool
enl_pi_level (const EnlPi *pi, uint32_t level, double *energy, double *electrons)
{
  if (level >= pi->level->len)
    return false;
  const Level *l = &g_array_index (pi->level, Level, level);
  *energy = l->energy;
  *electrons = l->electrons;
  return true;
}

/* ---- deprotonation ---- */

/* Energy of the atom's own pi electrons if they were not shared. */
static double
localised_energy (const EnlPiBasis *basis, uint32_t atom)
{
  const EnlPiParameters *parameters = enl_pi_parameters ();
  double energy = 0.0;

  for (uint32_t o = basis->of_atom[atom]; o < basis->n_orbitals && basis->orbital[o].atom == atom;
       o++)
    energy += basis->orbital[o].electrons * parameters->h[basis->orbital[o].type];
  return energy;
}

/* Orbital of the acid at the same place, or ENL_NONE. */
static uint32_t
acid_orbital (const EnlPi *pi, const EnlPiOrbital *orbital)
{
  uint32_t o = pi->basis.of_atom[orbital->atom];

  if (o == ENL_NONE)
    return ENL_NONE;
  o += orbital->plane;
  if (o >= pi->basis.n_orbitals || pi->basis.orbital[o].atom != orbital->atom)
    return ENL_NONE;
  return o;
}

static double
participation_of (const double *shift, uint32_t n)
{
  double sum = 0.0, squares = 0.0;

  for (uint32_t i = 0; i < n; i++) {
    double gained = MAX (shift[i], 0.0);
    sum += gained;
    squares += gained * gained;
  }
  return squares > 0.0 ? sum * sum / squares : 1.0;
}

static void
fill_levels (EnlPiChange *out, const EnlPiSolution *s)
{
  for (uint32_t i = 0; i < s->n; i++) {
    if (s->occupation[i] > 0.0)
      out->highest = s->level[i];
    if (s->occupation[i] < 2.0 && isnan (out->lowest))
      out->lowest = s->level[i];
  }
}

/* Electrons of one system of the anion beyond the uncharged atoms. */
static void
add_electrons (EnlPiChange *out, const EnlPiBasis *basis, const EnlPiSolution *s)
{
  for (uint32_t i = 0; i < s->n; i++) {
    const EnlPiOrbital *orbital = &basis->orbital[s->orbital[i]];
    double now = s->population[i] - (double)orbital->core;
    out->excess[orbital->atom] += now;
    out->shift[orbital->atom] += now;
  }
}

/* The same electrons in the acid leave what moved; the part that the pi system did not take stays
 * in a sigma lone pair of the site. */
static void
subtract_acid (EnlPiChange *out, const EnlPi *pi, const bool *system, uint32_t site)
{
  double moved = 0.0;

  for (uint32_t o = 0; o < pi->basis.n_orbitals; o++)
    if (system[pi->basis.system[o]])
      out->shift[pi->basis.orbital[o].atom] -=
          pi->population[o] - (double)pi->basis.orbital[o].core;
  for (uint32_t i = 0; i < out->n_atoms; i++)
    moved += out->shift[i];
  out->excess[site] += 1.0 - moved;
  out->shift[site] += 1.0 - moved;
}

static bool
site_is_linear (const EnlPiBasis *basis, uint32_t atom)
{
  uint32_t first = basis->of_atom[atom];

  return first != ENL_NONE && first + 1 < basis->n_orbitals &&
         basis->orbital[first + 1].atom == atom;
}

/* Marks the systems of the acid that have become part of the system of the anion. */
static void
mark_parts (const EnlPi *pi, const EnlPiBasis *basis, const EnlPiSolution *anion, bool *part)
{
  for (uint32_t i = 0; i < anion->n; i++) {
    uint32_t o = acid_orbital (pi, &basis->orbital[anion->orbital[i]]);
    if (o != ENL_NONE)
      part[pi->basis.system[o]] = true;
  }
}

/* A lone pair in the second plane of a linear site turns planes round: there the whole molecule is
 * compared, else only the system that holds the site. */
static void
compare_systems (EnlPiChange *out, const EnlPi *pi, const EnlPiBasis *basis, uint32_t atom)
{
  uint32_t own = basis->system[basis->of_atom[atom]];
  bool whole = site_is_linear (basis, atom);
  g_autofree bool *part = g_new0 (bool, pi->basis.n_systems + 1);

  for (uint32_t system = 0; system < basis->n_systems; system++) {
    if (!whole && system != own)
      continue;
    EnlPiSolution solution;
    enl_pi_solution_init (&solution, basis, system, NULL);
    out->energy_gain += solution.energy;
    add_electrons (out, basis, &solution);
    mark_parts (pi, basis, &solution, part);
    if (system == own) {
      out->n_orbitals = solution.n;
      fill_levels (out, &solution);
    }
    enl_pi_solution_clear (&solution);
  }
  for (uint32_t system = 0; system < pi->basis.n_systems; system++)
    if (part[system])
      out->energy_gain -= pi->system_energy[system];
  out->energy_gain += localised_energy (&pi->basis, atom) - localised_energy (basis, atom);
  subtract_acid (out, pi, part, atom);
}

void
enl_pi_deprotonate (const EnlPi *pi, uint32_t atom, EnlPiChange *out)
{
  uint32_t n = enl_molecule_atoms (pi->mol);
  g_autofree EnlConjugationAtom *fact = g_memdup2 (pi->fact, n * sizeof *fact);
  EnlPiBasis basis;

  g_assert (atom < n && enl_molecule_total_hydrogens (pi->mol, atom) > 0);
  memset (out, 0, sizeof *out);
  out->n_atoms = n;
  out->excess = g_new0 (double, n);
  out->shift = g_new0 (double, n);
  out->highest = out->lowest = NAN;
  enl_conjugation_deprotonate (fact, atom);
  enl_pi_basis_init (&basis, pi->mol, fact);
  if (basis.of_atom[atom] == ENL_NONE)
    out->excess[atom] = out->shift[atom] = 1.0;
  else
    compare_systems (out, pi, &basis, atom);
  EnlRingEnergy anion = enl_pi_ring_energy (&basis, pi->mol, atom);
  EnlRingEnergy acid = enl_pi_ring_energy (&pi->basis, pi->mol, atom);
  out->even_ring_gain = anion.even - acid.even;
  out->odd_ring_gain = anion.odd - acid.odd;
  out->five_ring = enl_pi_in_five_ring (&basis, pi->mol, atom);
  out->participation = participation_of (out->shift, n);
  enl_pi_basis_clear (&basis);
}

void
enl_pi_change_clear (EnlPiChange *change)
{
  g_free (change->excess);
  g_free (change->shift);
  memset (change, 0, sizeof *change);
}
