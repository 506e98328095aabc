#include "core/acidity/pi-orbital.h"

#include <string.h>

#include "core/molecule/elements.h"

enum { B = 5, C = 6, N = 7, O = 8, SI = 14, P = 15, AS = 33 };

/* ---- which orbitals an atom brings ---- */

typedef struct {
  uint8_t count;
  uint8_t electrons[2];
  uint8_t core[2];
} Slots;

static bool
is_halogen (uint8_t element)
{
  return element == 9 || element == 17 || element == 35 || element == 53;
}

/* An atom without a pi bond: donor, carbanion or empty orbital. */
static Slots
slots_without_bond (const EnlConjugationAtom *f)
{
  bool three = f->element == N || f->element == P || f->element == AS;
  Slots none = {0}, pair = {1, {2}, {(uint8_t)(2 + MIN (f->charge, 0))}}, empty = {1, {0}, {0}};

  if (f->charge < -1)
    return none;
  switch (f->element) {
  case B:
    return f->charge == 0 && f->sigma <= 3 ? empty : none;
  case C:
    if (f->charge < 0)
      return pair;
    empty.core[0] = 1; /* a cation lost the electron, a radical keeps it */
    empty.electrons[0] = f->unpaired > 0;
    return f->charge > 0 || f->unpaired > 0 ? empty : none;
  case SI:
    return none;
  default:
    if (f->charge > 0 || (three && f->sigma > 3) || (is_halogen (f->element) && f->charge < 0))
      return none;
    return pair;
  }
}

/* An atom with one or two pi bonds. A lone pair in the plane of a bent atom stays outside, unless
 * the partner is linear: then it lies in the second plane (propargyl, diazo, azide). */
static Slots
slots_with_bond (const EnlConjugationAtom *f, bool beside_linear)
{
  Slots slots = {.count = (uint8_t)MIN (f->pi, 2), .electrons = {1, 1}, .core = {1, 1}};

  if (f->charge > 0 && f->element != C && f->element != B)
    slots.core[0] = (uint8_t)(1 + f->charge);
  if (f->pi == 1 && f->charge == -1 && !f->ring && beside_linear) {
    slots.count = 2;
    slots.electrons[0] = 2;
  }
  return slots;
}

static bool
beside_linear (const EnlMolecule *mol, const EnlConjugationAtom *fact, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (!fact[other].inert && fact[other].pi >= 2)
      return true;
  }
  return false;
}

/* ---- names of the kinds ---- */

static bool
is_terminal_oxygen (const EnlConjugationAtom *f)
{
  return f->element == O && f->sigma == 1 && !f->inert;
}

static bool
has_neighbour (const EnlMolecule *mol, const EnlConjugationAtom *fact, uint32_t atom,
               bool (*want) (const EnlConjugationAtom *f))
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (want (&fact[enl_molecule_neighbour (mol, atom, k)]))
      return true;
  return false;
}

static bool
is_full_nitrogen (const EnlConjugationAtom *f)
{
  return f->element == N && f->sigma == 3 && !f->inert;
}

/* Index of the kind, or -1 for an element that the table does not have. */
static int
find_type (const EnlMolecule *mol, const EnlConjugationAtom *fact, uint32_t atom, uint8_t core)
{
  const EnlPiParameters *parameters = enl_pi_parameters ();
  char name[8];

  if (is_full_nitrogen (&fact[atom]) && has_neighbour (mol, fact, atom, is_terminal_oxygen))
    return enl_pi_parameters_type (parameters, "N(O)");
  if (is_terminal_oxygen (&fact[atom]) && has_neighbour (mol, fact, atom, is_full_nitrogen))
    return enl_pi_parameters_type (parameters, "O(N)");
  g_snprintf (name, sizeof name, "%s%c", enl_element_symbol (fact[atom].element),
              core >= 2 ? ':' : '.');
  return enl_pi_parameters_type (parameters, name);
}

static void
add_orbitals (EnlPiBasis *basis, const EnlMolecule *mol, const EnlConjugationAtom *fact,
              uint32_t atom)
{
  const EnlConjugationAtom *f = &fact[atom];
  Slots slots = {0};

  basis->of_atom[atom] = ENL_NONE;
  if (!f->inert)
    slots = f->pi ? slots_with_bond (f, beside_linear (mol, fact, atom)) : slots_without_bond (f);
  for (uint8_t s = 0; s < slots.count; s++) {
    int type = find_type (mol, fact, atom, slots.core[s]);
    if (type < 0)
      return;
    if (s == 0)
      basis->of_atom[atom] = basis->n_orbitals;
    basis->orbital[basis->n_orbitals++] = (EnlPiOrbital){
        .atom = atom,
        .plane = s,
        .electrons = slots.electrons[s],
        .core = slots.core[s],
        .type = type,
    };
  }
}

/* ---- overlaps ---- */

static bool
is_linear (const EnlPiBasis *basis, uint32_t atom)
{
  uint32_t first = basis->of_atom[atom];

  return first != ENL_NONE && first + 1 < basis->n_orbitals &&
         basis->orbital[first + 1].atom == atom;
}

static uint32_t
next_linear (const EnlPiBasis *basis, const EnlMolecule *mol, uint32_t atom, uint32_t before)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (other != before && is_linear (basis, other))
      return other;
  }
  return ENL_NONE;
}

/* Plane of the linear atom that the bent neighbour `bent` shares. Along a row of linear atoms the
 * two ends are coplanar when the row is even (alkynes, butatrienes) and at right angles when it is
 * odd (allenes, ketenes); in an odd row the end with the lower atom number takes plane 0. */
static uint8_t
plane_towards (const EnlPiBasis *basis, const EnlMolecule *mol, uint32_t linear, uint32_t bent)
{
  uint32_t atom = linear, before = bent, length = 1;

  for (uint32_t next; (next = next_linear (basis, mol, atom, before)) != ENL_NONE; length++) {
    before = atom;
    atom = next;
    if (atom == linear || length > enl_molecule_atoms (mol))
      return 0; /* a ring of linear atoms: no ends */
  }
  if (length % 2 == 0)
    return 0;
  if (length > 1)
    return linear > atom;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, linear); k++) {
    uint32_t other = enl_molecule_neighbour (mol, linear, k);
    if (other < bent && basis->of_atom[other] != ENL_NONE)
      return 1;
  }
  return 0;
}

static void
add_overlap (EnlPiBasis *basis, uint32_t a, uint32_t b, uint32_t bond)
{
  const EnlPiParameters *parameters = enl_pi_parameters ();

  basis->overlap[basis->n_overlaps++] = (EnlPiOverlap){
      .a = a,
      .b = b,
      .bond = bond,
      .k = parameters->k[basis->orbital[a].type][basis->orbital[b].type],
  };
}

static void
add_overlaps (EnlPiBasis *basis, const EnlMolecule *mol, const EnlConjugationAtom *fact,
              uint32_t bond)
{
  const EnlBond *b = enl_molecule_bond (mol, bond);
  uint32_t i = basis->of_atom[b->from], j = basis->of_atom[b->to];

  if (!enl_conjugation_of_bond (fact, b) || i == ENL_NONE || j == ENL_NONE)
    return;
  bool from = is_linear (basis, b->from), to = is_linear (basis, b->to);
  if (from && to) {
    add_overlap (basis, i, j, bond);
    add_overlap (basis, i + 1, j + 1, bond);
  } else if (from) {
    add_overlap (basis, i + plane_towards (basis, mol, b->from, b->to), j, bond);
  } else if (to) {
    add_overlap (basis, i, j + plane_towards (basis, mol, b->to, b->from), bond);
  } else {
    add_overlap (basis, i, j, bond);
  }
}

/* ---- systems: connected sets of orbitals ---- */

static uint32_t
root_of (uint32_t *parent, uint32_t i)
{
  while (parent[i] != i)
    i = parent[i] = parent[parent[i]];
  return i;
}

static void
number_systems (EnlPiBasis *basis)
{
  g_autofree uint32_t *parent = g_new (uint32_t, basis->n_orbitals + 1);

  for (uint32_t i = 0; i < basis->n_orbitals; i++)
    parent[i] = i;
  for (uint32_t o = 0; o < basis->n_overlaps; o++) {
    uint32_t a = root_of (parent, basis->overlap[o].a), b = root_of (parent, basis->overlap[o].b);
    parent[MAX (a, b)] = MIN (a, b);
  }
  for (uint32_t i = 0; i < basis->n_orbitals; i++) {
    uint32_t root = root_of (parent, i);
    basis->system[i] = root == i ? basis->n_systems++ : basis->system[root];
  }
}

void
enl_pi_basis_init (EnlPiBasis *basis, const EnlMolecule *mol, const EnlConjugationAtom *fact)
{
  uint32_t n = enl_molecule_atoms (mol), n_bonds = enl_molecule_bonds (mol);

  memset (basis, 0, sizeof *basis);
  basis->of_atom = g_new (uint32_t, n + 1);
  basis->orbital = g_new (EnlPiOrbital, 2 * n + 1);
  basis->overlap = g_new (EnlPiOverlap, 2 * n_bonds + 1);
  basis->system = g_new (uint32_t, 2 * n + 1);
  for (uint32_t i = 0; i < n; i++)
    add_orbitals (basis, mol, fact, i);
  for (uint32_t b = 0; b < n_bonds; b++)
    add_overlaps (basis, mol, fact, b);
  number_systems (basis);
}

void
enl_pi_basis_clear (EnlPiBasis *basis)
{
  g_free (basis->of_atom);
  g_free (basis->orbital);
  g_free (basis->overlap);
  g_free (basis->system);
  memset (basis, 0, sizeof *basis);
}
