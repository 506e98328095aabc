/* Aromatic flags by electron counting in rings and fused ring systems.
 *
 * The rules are the common ones of cheminformatics (those of Daylight's theory manual and of the
 * RDKit book, section "Aromaticity"; Hückel's 4n + 2):
 * - every ring atom offers 0, 1 or 2 pi electrons by its bonds, lone pairs and charge; a double
 *   bond out of the ring to a more electronegative atom takes its electron along (pyridone,
 * tropone) and leaves an empty orbital;
 * - a ring of such atoms, or a set of fused ones, whose outline holds 4n + 2 electrons is aromatic
 *   (fused sets have azulene found);
 * - bonds that lie inside a set are aromatic only by a smaller set.
 */
#include "core/molecule/molecule-private.h"

#include <string.h>

#include "core/molecule/elements.h"

enum {
  MAX_FUSED = 6,       /* rings in one set; larger sets add nothing known and cost much */
  MAX_FUSED_SIZE = 24, /* larger rings are judged alone */
  MAX_SETS = 200000,   /* sets tried in one system, so that no graph can stall the program */
  LAST_LIGHT = 18,     /* argon: heavier atoms are left out but for selenium and tellurium */
  SELENIUM = 34,
  TELLURIUM = 52
};

/* Least and most pi electrons that an atom brings; most < 0: it cannot be in an aromatic ring. */
typedef struct {
  int8_t least, most;
  bool wild; /* an atom of any element */
} Offer;

static const Offer no_offer = {0, -1, false};

/* The bonds of an atom as electron counting sees them. */
typedef struct {
  int bonds;      /* neighbours, hydrogens included */
  int order_sum;  /* hydrogens included */
  int n_multiple; /* bonds of order 2 and more */
  bool ring_multiple;
  uint32_t partner; /* atom at the other end of a multiple bond out of the ring, or ENL_NONE */
} Surroundings;

static Surroundings
look_around (const EnlMolecule *mol, uint32_t a)
{
  int hydrogens = mol->atom[a].hydrogens;
  Surroundings s = {hydrogens, hydrogens, 0, false, ENL_NONE};

  for (uint32_t i = mol->first[a]; i < mol->first[a + 1]; i++) {
    const EnlBond *bond = &mol->bond[mol->via[i]];
    s.bonds++;
    s.order_sum += bond->order;
    if (bond->order < 2)
      continue;
    s.n_multiple++;
    if (bond->ring)
      s.ring_multiple = true;
    else
      s.partner = mol->neighbour[i];
  }
  return s;
}

/* More outer electrons, or as many and nearer to the nucleus. */
static bool
attracts_more (uint8_t element, uint8_t than)
{
  int a = enl_element_outer_electrons (element), b = enl_element_outer_electrons (than);

  return a != b ? a > b : element < than;
}

static int
find_default_valence (uint8_t element, int charge)
{
  size_t count;
  const uint8_t *valence = enl_element_valences ((uint8_t)(element - charge), &count);

  return count ? valence[0] : -1;
}

/* Electrons that the atom has outside of sigma bonds and of lone pairs that stay at home; -1 when
 * it has no place in a pi system. */
static int
count_free_electrons (const EnlAtom *atom, const Surroundings *s)
{
  int valence = find_default_valence (atom->element, 0);

  if (valence <= 1 || s->bonds > 3)
    return -1;
  int lone = enl_element_outer_electrons (atom->element) - valence - atom->charge;
  int free = valence - s->bonds + MAX (lone, 0) - atom->unpaired;
  /* A triple bond or a cumulated one brings one electron to each of two pi systems. */
  if (free > 1 && s->order_sum - s->bonds > 1)
    free = 1;
  return free;
}

static Offer
count_offer (const EnlMolecule *mol, uint32_t a, const Surroundings *s)
{
  const EnlAtom *atom = &mol->atom[a];
  const Offer none = {0, 0, false}, one = {1, 1, false}, two = {2, 2, false};
  int free = count_free_electrons (atom, s);
  bool drained =
      s->partner != ENL_NONE && attracts_more (mol->atom[s->partner].element, atom->element);

  if (free < 0)
    return no_offer;
  if (free == 0)
    return s->partner != ENL_NONE ? none : s->ring_multiple ? one : no_offer;
  if (free == 1) {
    if (s->partner != ENL_NONE)
      return drained ? none : one;
    return s->n_multiple ? one : atom->charge == 1 ? none : no_offer;
  }
  return (free - drained) % 2 ? one : two;
}

static bool
is_possible (const EnlAtom *atom, const Surroundings *s)
{
  int usual;

  if (atom->element > LAST_LIGHT && atom->element != SELENIUM && atom->element != TELLURIUM)
    return false;
  if (s->n_multiple > 1 && s->order_sum - s->bonds > 1)
    return false;
  if (atom->unpaired && (atom->element != 6 || atom->charge))
    return false;
  usual = find_default_valence (atom->element, 0);
  return usual <= 0 || s->order_sum <= find_default_valence (atom->element, atom->charge);
}

static Offer
judge_atom (const EnlMolecule *mol, uint32_t a)
{
  const EnlAtom *atom = &mol->atom[a];
  Surroundings s = look_around (mol, a);

  if (atom->element == 0)
    return s.ring_multiple ? (Offer){1, 1, true} : (Offer){1, 2, true};
  if (atom->charge > atom->element || !is_possible (atom, &s))
    return no_offer;
  return count_offer (mol, a, &s);
}

/* ---- rings and sets of rings ---- */

typedef struct {
  EnlMolecule *mol;
  Offer *offer;       /* per atom */
  uint32_t n;         /* candidate rings */
  uint32_t *ring;     /* their numbers in the molecule */
  uint32_t *bond;     /* beside mol->ring_atom: the bond to the next atom of the ring */
  uint8_t *seen_atom; /* times an atom lies in the set at hand */
  uint8_t *seen_bond; /* the same for a bond */
  uint8_t *beside;    /* n x n: two candidates share a bond */
  uint32_t *member;   /* candidates of the system at hand */
  uint32_t n_member;
  uint32_t tried;
} Counter;

static bool
is_candidate (const Counter *c, uint32_t ring)
{
  const EnlMolecule *mol = c->mol;
  bool all_wild = true;

  for (uint32_t i = mol->ring_first[ring]; i < mol->ring_first[ring + 1]; i++) {
    Offer offer = c->offer[mol->ring_atom[i]];
    if (offer.most < 0)
      return false;
    all_wild = all_wild && mol->atom[mol->ring_atom[i]].element == 0;
  }
  return !all_wild;
}

static uint32_t
ring_size (const EnlMolecule *mol, uint32_t ring)
{
  return mol->ring_first[ring + 1] - mol->ring_first[ring];
}

/* Bond between atom `i` of the ring and the one after it. */
static uint32_t
ring_bond (const Counter *c, uint32_t ring, uint32_t i)
{
  return c->bond[c->mol->ring_first[ring] + i];
}

static void
look_up_bonds (Counter *c)
{
  const EnlMolecule *mol = c->mol;

  for (uint32_t k = 0; k < c->n; k++) {
    uint32_t start = mol->ring_first[c->ring[k]], size = ring_size (mol, c->ring[k]);
    for (uint32_t i = 0; i < size; i++)
      c->bond[start + i] = enl_molecule_bond_between (mol, mol->ring_atom[start + i],
                                                      mol->ring_atom[start + (i + 1) % size]);
  }
}

static void
count_in (Counter *c, uint32_t candidate, int step)
{
  const EnlMolecule *mol = c->mol;
  uint32_t ring = c->ring[candidate];

  for (uint32_t i = 0; i < ring_size (mol, ring); i++) {
    c->seen_atom[mol->ring_atom[mol->ring_first[ring] + i]] += (uint8_t)step;
    c->seen_bond[ring_bond (c, ring, i)] += (uint8_t)step;
  }
}

/* The outline of the set: atoms in one or two of its rings (an atom in three is inside). Each is
 * visited once. */
static bool
has_4n_plus_2 (Counter *c, const uint32_t *set, uint32_t n)
{
  const EnlMolecule *mol = c->mol;
  int least = 0, most = 0, wild = 0;

  for (uint32_t k = 0; k < n; k++)
    for (uint32_t i = mol->ring_first[c->ring[set[k]]]; i < mol->ring_first[c->ring[set[k]] + 1];
         i++) {
      uint32_t a = mol->ring_atom[i];
      uint8_t times = c->seen_atom[a];
      if (times == 0 || times > 2)
        continue;
      least += c->offer[a].least;
      most += c->offer[a].most;
      wild += c->offer[a].most > c->offer[a].least;
      c->seen_atom[a] = times | 0x80; /* done */
    }
  for (uint32_t k = 0; k < n; k++)
    for (uint32_t i = mol->ring_first[c->ring[set[k]]]; i < mol->ring_first[c->ring[set[k]] + 1];
         i++)
      c->seen_atom[mol->ring_atom[i]] &= 0x7F;
  if (wild > 1)
    return false;
  if (most < 6)
    return most == 2;
  for (int e = least; e <= most; e++)
    if (e % 4 == 2)
      return true;
  return false;
}

static void
mark_aromatic (Counter *c, const uint32_t *set, uint32_t n)
{
  EnlMolecule *mol = c->mol;

  for (uint32_t k = 0; k < n; k++) {
    uint32_t ring = c->ring[set[k]];
    for (uint32_t i = 0; i < ring_size (mol, ring); i++) {
      uint32_t bond = ring_bond (c, ring, i);
      mol->atom[mol->ring_atom[mol->ring_first[ring] + i]].aromatic = true;
      if (c->seen_bond[bond] == 1)
        mol->bond[bond].aromatic = true;
    }
  }
}

static void
judge_set (Counter *c, const uint32_t *set, uint32_t n)
{
  c->tried++;
  for (uint32_t k = 0; k < n; k++)
    count_in (c, set[k], 1);
  if (has_4n_plus_2 (c, set, n))
    mark_aromatic (c, set, n);
  for (uint32_t k = 0; k < n; k++)
    count_in (c, set[k], -1);
}

/* Connected sets of `wanted` candidates, each once: grow by a ring beside the set that is beside no
 * earlier one (S. Wernicke, IEEE/ACM Trans. Comput. Biol. Bioinform. 2006, 3, 347). `reach` lists
 * the rings that may still be added. */
static void
grow_set (Counter *c, uint32_t *set, uint32_t n, uint32_t wanted, const uint32_t *reach,
          uint32_t n_reach)
{
  if (n == wanted) {
    judge_set (c, set, n);
    return;
  }
  g_autofree uint32_t *next = g_new (uint32_t, c->n_member);
  while (n_reach && c->tried < MAX_SETS) {
    uint32_t pick = reach[--n_reach], n_next = n_reach;
    memcpy (next, reach, n_reach * sizeof *next);
    for (uint32_t i = 0; i < c->n_member; i++) {
      uint32_t ring = c->member[i];
      bool fresh = ring > set[0] && ring != pick && c->beside[(size_t)pick * c->n + ring];
      for (uint32_t k = 0; fresh && k < n; k++)
        fresh = ring != set[k] && !c->beside[(size_t)set[k] * c->n + ring];
      if (fresh)
        next[n_next++] = ring;
    }
    set[n] = pick;
    grow_set (c, set, n + 1, wanted, next, n_next);
  }
}

static void
judge_sets_of (Counter *c, uint32_t wanted)
{
  uint32_t set[MAX_FUSED];
  g_autofree uint32_t *reach = g_new (uint32_t, c->n_member);

  for (uint32_t m = 0; m < c->n_member; m++) {
    uint32_t n_reach = 0;
    set[0] = c->member[m];
    for (uint32_t i = 0; wanted > 1 && i < c->n_member; i++)
      if (c->member[i] > set[0] && c->beside[(size_t)set[0] * c->n + c->member[i]])
        reach[n_reach++] = c->member[i];
    grow_set (c, set, 1, wanted, reach, n_reach);
  }
}

static bool
all_bonds_are_aromatic (const Counter *c)
{
  for (uint32_t m = 0; m < c->n_member; m++)
    for (uint32_t i = 0; i < ring_size (c->mol, c->ring[c->member[m]]); i++)
      if (!c->mol->bond[ring_bond (c, c->ring[c->member[m]], i)].aromatic)
        return false;
  return true;
}

static void
judge_system (Counter *c)
{
  c->tried = 0;
  for (uint32_t size = 1; size <= MIN (c->n_member, MAX_FUSED); size++) {
    if (all_bonds_are_aromatic (c))
      return;
    judge_sets_of (c, size);
  }
}

static uint32_t
count_common_bonds (const Counter *c, uint32_t candidate)
{
  uint32_t n = 0;

  for (uint32_t i = 0; i < ring_size (c->mol, c->ring[candidate]); i++)
    n += c->seen_bond[ring_bond (c, c->ring[candidate], i)] != 0;
  return n;
}

/* Rings are fused when they have exactly one bond in common; the big ring of a porphyrin, which
 * shares two bonds with each small one, stands alone. */
static void
find_neighbours (Counter *c)
{
  for (uint32_t a = 0; a < c->n; a++) {
    if (ring_size (c->mol, c->ring[a]) > MAX_FUSED_SIZE)
      continue;
    count_in (c, a, 1);
    for (uint32_t b = a + 1; b < c->n; b++)
      if (ring_size (c->mol, c->ring[b]) <= MAX_FUSED_SIZE && count_common_bonds (c, b) == 1)
        c->beside[(size_t)a * c->n + b] = c->beside[(size_t)b * c->n + a] = 1;
    count_in (c, a, -1);
  }
}

/* Collects in `member` the candidates fused with `start`, ascending. */
static void
collect_system (Counter *c, uint32_t start, bool *done)
{
  c->n_member = 0;
  c->member[c->n_member++] = start;
  done[start] = true;
  for (uint32_t i = 0; i < c->n_member; i++)
    for (uint32_t b = 0; b < c->n; b++)
      if (!done[b] && c->beside[(size_t)c->member[i] * c->n + b]) {
        done[b] = true;
        c->member[c->n_member++] = b;
      }
}

void
enl_molecule_find_aromatic (EnlMolecule *mol)
{
  Counter c = {.mol = mol};

  for (uint32_t a = 0; a < mol->n_atoms; a++)
    mol->atom[a].aromatic = false;
  for (uint32_t i = 0; i < mol->n_bonds; i++)
    mol->bond[i].aromatic = false;
  mol->finished = true;
  if (mol->n_rings == 0)
    return;
  g_autofree Offer *offer = g_new (Offer, mol->n_atoms);
  size_t n_rings = (size_t)mol->n_rings + mol->n_spare;
  g_autofree uint32_t *rings = g_new (uint32_t, 2 * n_rings + mol->n_ring_atoms);
  c.offer = offer;
  c.ring = rings;
  c.member = rings + n_rings;
  c.bond = rings + 2 * n_rings;
  for (uint32_t a = 0; a < mol->n_atoms; a++)
    c.offer[a] = mol->smallest[a] ? judge_atom (mol, a) : no_offer;
  for (uint32_t r = 0; r < n_rings; r++)
    if (is_candidate (&c, r))
      c.ring[c.n++] = r;
  if (c.n == 0)
    return;
  g_autofree uint8_t *seen = g_new0 (uint8_t, (size_t)mol->n_atoms + mol->n_bonds);
  g_autofree uint8_t *beside = g_new0 (uint8_t, (size_t)c.n * c.n);
  g_autofree bool *done = g_new0 (bool, c.n);
  c.seen_atom = seen;
  c.seen_bond = seen + mol->n_atoms;
  c.beside = beside;
  look_up_bonds (&c);
  find_neighbours (&c);
  for (uint32_t k = 0; k < c.n; k++)
    if (!done[k]) {
      collect_system (&c, k, done);
      judge_system (&c);
    }
}
