#include "core/acidity/pi-ring.h"

#include "core/acidity/pi-solve.h"

#define MOST_MEMBERS 8

static bool
ring_is_near (const EnlMolecule *mol, const uint32_t *ring, uint32_t size, uint32_t atom)
{
  for (uint32_t k = 0; k < size; k++)
    if (ring[k] == atom || enl_molecule_bond_between (mol, ring[k], atom) != ENL_NONE)
      return true;
  return false;
}

static uint32_t
overlap_of_bond (const EnlPiBasis *basis, uint32_t bond)
{
  for (uint32_t o = 0; bond != ENL_NONE && o < basis->n_overlaps; o++)
    if (basis->overlap[o].bond == bond)
      return o;
  return ENL_NONE;
}

/* Rings that hold both ends of a bond. */
static uint32_t
rings_of_bond (const EnlMolecule *mol, uint32_t a, uint32_t b)
{
  uint32_t n = 0;

  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size, found = 0;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    for (uint32_t k = 0; k < size; k++)
      found += ring[k] == a || ring[k] == b;
    n += found == 2;
  }
  return n;
}

/* The overlap that belongs to this ring and to as few others as possible; ENL_NONE where the ring
 * does not conjugate all round. */
static uint32_t
own_overlap (const EnlPiBasis *basis, const EnlMolecule *mol, const uint32_t *ring, uint32_t size)
{
  uint32_t best = ENL_NONE, fewest = UINT32_MAX;

  for (uint32_t k = 0; k < size; k++) {
    uint32_t a = ring[k], b = ring[(k + 1) % size];
    uint32_t overlap = overlap_of_bond (basis, enl_molecule_bond_between (mol, a, b));
    uint32_t shared = rings_of_bond (mol, a, b);
    if (overlap == ENL_NONE)
      return ENL_NONE;
    if (shared < fewest)
      fewest = shared, best = overlap;
  }
  return best;
}

static double
system_energy (const EnlPiBasis *basis, uint32_t system)
{
  EnlPiSolution solution;

  enl_pi_solution_init (&solution, basis, system, NULL);
  double energy = solution.energy;
  enl_pi_solution_clear (&solution);
  return energy;
}

EnlRingEnergy
enl_pi_ring_energy (const EnlPiBasis *basis, const EnlMolecule *mol, uint32_t atom)
{
  EnlRingEnergy sum = {0, 0};
  uint32_t solved = ENL_NONE; /* the system that `energy` belongs to */
  double energy = 0;

  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    if (size > MOST_MEMBERS || !ring_is_near (mol, ring, size, atom))
      continue;
    uint32_t own = own_overlap (basis, mol, ring, size);
    if (own == ENL_NONE)
      continue;
    uint32_t system = basis->system[basis->overlap[own].a];
    if (system != solved)
      energy = system_energy (basis, system), solved = system;
    basis->overlap[own].k = -basis->overlap[own].k;
    *(size % 2 ? &sum.odd : &sum.even) += energy - system_energy (basis, system);
    basis->overlap[own].k = -basis->overlap[own].k;
  }
  return sum;
}

bool
enl_pi_in_five_ring (const EnlPiBasis *basis, const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    for (uint32_t k = 0; size == 5 && k < size; k++)
      if (ring[k] == atom && own_overlap (basis, mol, ring, size) != ENL_NONE)
        return true;
  }
  return false;
}
