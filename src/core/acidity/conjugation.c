#include "core/acidity/conjugation.h"

/* Smallest ring that holds a linear atom without breaking: cyclooctyne can be kept (common
 * practice). */
#define SMALLEST_RING_WITH_LINEAR_ATOM 8

enum { B = 5, C = 6, N = 7, O = 8, F = 9, SI = 14, P = 15, S = 16, CL = 17 };
enum { AS = 33, SE = 34, BR = 35, TE = 52, I = 53 };

/* Bonds an uncharged atom has within its octet; 0 for elements that do not conjugate here. */
static uint32_t
octet_valence (uint8_t element)
{
  switch (element) {
  case B:
    return 3;
  case C:
  case SI:
    return 4;
  case N:
  case P:
  case AS:
    return 3;
  case O:
  case S:
  case SE:
  case TE:
    return 2;
  case F:
  case CL:
  case BR:
  case I:
    return 1;
  default:
    return 0;
  }
}

/* Only elements beyond the second row have more bonds than their octet; a nitrogen written with
 * five bonds is drawn in an old way and is left alone as well. */
static bool
is_expanded (const EnlMolecule *mol, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (mol, atom);
  uint32_t bonds = enl_molecule_order_sum (mol, atom) + a->hydrogens;
  uint32_t usual = octet_valence (a->element);

  if (a->element == C || a->element == SI || a->element == B)
    return false;
  return usual > 0 && (int)bonds - MAX ((int)a->charge, 0) > (int)usual;
}

/* Two partners of one ring atom lie in its ring, so that it cannot be linear. */
static bool
in_tight_ring (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t size = enl_molecule_smallest_ring (mol, atom);

  return size > 0 && size < SMALLEST_RING_WITH_LINEAR_ATOM;
}

static uint8_t
count_sigma (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t count = enl_molecule_atom (mol, atom)->hydrogens;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    count += enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k))->order > 0;
  return (uint8_t)MIN (count, UINT8_MAX);
}

bool
enl_conjugation_of_bond (const EnlConjugationAtom *fact, const EnlBond *bond)
{
  return bond->order > 0 && !fact[bond->from].inert && !fact[bond->to].inert;
}

EnlConjugationAtom *
enl_conjugation_facts (const EnlMolecule *mol)
{
  uint32_t n = enl_molecule_atoms (mol);
  EnlConjugationAtom *fact = g_new0 (EnlConjugationAtom, n);

  for (uint32_t i = 0; i < n; i++) {
    const EnlAtom *a = enl_molecule_atom (mol, i);
    fact[i].element = a->element;
    fact[i].charge = a->charge;
    fact[i].unpaired = a->unpaired;
    fact[i].sigma = count_sigma (mol, i);
    fact[i].expanded = is_expanded (mol, i);
    fact[i].inert = fact[i].expanded || octet_valence (a->element) == 0;
    fact[i].ring = in_tight_ring (mol, i);
  }
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    const EnlBond *bond = enl_molecule_bond (mol, b);
    if (!enl_conjugation_of_bond (fact, bond))
      continue;
    fact[bond->from].pi = (uint8_t)(fact[bond->from].pi + bond->order - 1);
    fact[bond->to].pi = (uint8_t)(fact[bond->to].pi + bond->order - 1);
  }
  return fact;
}

void
enl_conjugation_deprotonate (EnlConjugationAtom *fact, uint32_t atom)
{
  g_assert (fact[atom].sigma > 0);
  fact[atom].sigma--;
  fact[atom].charge--;
}
