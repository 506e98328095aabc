#include "core/acidity/why-frame.h"

#include "core/molecule/symmetry.h"

enum { HYDROGEN = 1, CARBON = 6, NITROGEN = 7 };

/* ---- rings ---- */

bool
enl_why_ring_is_aromatic (const EnlMolecule *mol, uint32_t ring)
{
  uint32_t size;
  const uint32_t *atom = enl_molecule_ring (mol, ring, &size);

  for (uint32_t i = 0; i < size; i++)
    if (!enl_molecule_atom (mol, atom[i])->aromatic)
      return false;
  return true;
}

bool
enl_why_ring_holds (const EnlMolecule *mol, uint32_t ring, uint32_t wanted)
{
  uint32_t size;
  const uint32_t *atom = enl_molecule_ring (mol, ring, &size);

  for (uint32_t i = 0; i < size; i++)
    if (atom[i] == wanted)
      return true;
  return false;
}

uint64_t
enl_why_ring_rank (const EnlWhyFrame *frame, uint32_t ring)
{
  uint32_t size, least = UINT32_MAX;
  const uint32_t *atom = enl_molecule_ring (frame->draft->mol, ring, &size);
  uint64_t sum = 0;

  for (uint32_t i = 0; i < size; i++) {
    least = MIN (least, frame->rank[atom[i]]);
    sum += frame->rank[atom[i]];
  }
  return (uint64_t)least << 32 | sum;
}

/* A five-membered ring whose other four atoms are two C=C (or parts of fused arenes). */
static bool
is_cyclopentadiene (const EnlMolecule *mol, uint32_t ring, uint32_t site)
{
  uint32_t size;
  const uint32_t *atom = enl_molecule_ring (mol, ring, &size);

  if (size != 5 || enl_molecule_atom (mol, site)->element != CARBON ||
      !enl_atom_is_saturated (mol, site))
    return false;
  for (uint32_t i = 0; i < size; i++) {
    uint32_t a = atom[i];
    if (a == site)
      continue;
    if (enl_molecule_atom (mol, a)->element != CARBON || enl_atom_is_saturated (mol, a))
      return false;
    bool inside = enl_molecule_atom (mol, a)->aromatic;
    for (uint32_t j = 0; j < size && !inside; j++) {
      uint32_t bond = enl_molecule_bond_between (mol, a, atom[j]);
      inside = bond != ENL_NONE && enl_molecule_bond (mol, bond)->order == 2;
    }
    if (!inside)
      return false;
  }
  return true;
}

/* The smallest ring with `atom` that the parent keeps. */
static uint32_t
find_base_ring (const EnlWhyFrame *frame, uint32_t atom, bool site)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t best = ENL_NONE, best_size = 0;

  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    enl_molecule_ring (mol, r, &size);
    if (!enl_why_ring_holds (mol, r, atom) ||
        !(enl_why_ring_is_aromatic (mol, r) || (site && is_cyclopentadiene (mol, r, atom))))
      continue;
    if (best == ENL_NONE || size < best_size ||
        (size == best_size && enl_why_ring_rank (frame, r) < enl_why_ring_rank (frame, best)))
      best = r, best_size = size;
  }
  return best;
}

static void
take_base_ring (EnlWhyFrame *frame, uint32_t ring)
{
  uint32_t size;
  const uint32_t *atom = enl_molecule_ring (frame->draft->mol, ring, &size);

  frame->base_ring = ring;
  for (uint32_t i = 0; i < size; i++)
    if (frame->role[atom[i]] == ENL_ROLE_OUTER)
      frame->role[atom[i]] = ENL_ROLE_BASE;
}

/* ---- the group that stays ---- */

static bool
is_heteroatom (const EnlMolecule *mol, uint32_t atom)
{
  uint8_t element = enl_molecule_atom (mol, atom)->element;

  return element > HYDROGEN && element != CARBON && !enl_atom_is_metal (mol, atom);
}

static void
take_core (EnlWhyFrame *frame, uint32_t atom)
{
  if (frame->role[atom] == ENL_ROLE_OUTER)
    frame->role[atom] = ENL_ROLE_CORE;
}

/* Follows multiple bonds from `atom`: N=N=N, C=C=O; and the O or N on the N of C=N. */
static void
take_multiple (EnlWhyFrame *frame, uint32_t from, uint32_t atom)
{
  const EnlMolecule *mol = frame->draft->mol;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t next = enl_molecule_neighbour (mol, atom, k);
    const EnlBond *bond = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k));
    if (next == from || frame->role[next] != ENL_ROLE_OUTER)
      continue;
    bool on_nitrogen =
        enl_molecule_atom (mol, atom)->element == NITROGEN && is_heteroatom (mol, next);
    if (bond->aromatic || (bond->order < 2 && !on_nitrogen))
      continue;
    take_core (frame, next);
    if (bond->order >= 2)
      take_multiple (frame, atom, next);
  }
}

static bool
has_double_heteroatom (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k))->order >= 2 &&
        is_heteroatom (mol, enl_molecule_neighbour (mol, atom, k)))
      return true;
  return false;
}

static void
take_main (EnlWhyFrame *frame, uint32_t atom)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t ring = find_base_ring (frame, atom, false);

  frame->main = atom;
  take_core (frame, atom);
  if (ring != ENL_NONE) {
    frame->role[atom] = ENL_ROLE_BASE;
    take_base_ring (frame, ring);
    return;
  }
  take_multiple (frame, frame->draft->site, atom);
  if (!is_heteroatom (mol, atom) && !has_double_heteroatom (mol, atom))
    return;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (is_heteroatom (mol, enl_molecule_neighbour (mol, atom, k)))
      take_core (frame, enl_molecule_neighbour (mol, atom, k));
}

typedef struct {
  uint32_t strength, in_ring, heavy, rank, atom;
} Candidate;

static Candidate
judge (const EnlWhyFrame *frame, uint32_t k)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t site = frame->draft->site, atom = enl_molecule_neighbour (mol, site, k);
  uint32_t bond = enl_molecule_bond_at (mol, site, k);
  g_autofree bool *part = g_new (bool, enl_molecule_atoms (mol) + 1);
  bool ring = enl_molecule_bond (mol, bond)->ring;

  return (Candidate){
      .strength = enl_why_words_strength (frame->words, enl_group_of (mol, atom)),
      .in_ring = ring,
      .heavy = ring ? 0 : enl_draft_branch (frame->draft, site, atom, part),
      .rank = frame->rank[atom],
      .atom = atom,
  };
}

static bool
is_better (const Candidate *a, const Candidate *b)
{
  if (a->strength != b->strength)
    return a->strength < b->strength;
  if (a->in_ring != b->in_ring)
    return a->in_ring < b->in_ring;
  if (a->heavy != b->heavy)
    return a->heavy < b->heavy;
  return a->rank < b->rank;
}

/* The neighbour across a multiple bond, else that of the strongest group. */
static uint32_t
find_main (const EnlWhyFrame *frame)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t site = frame->draft->site;
  Candidate best = {.strength = ENL_NONE, .atom = ENL_NONE};

  for (uint32_t k = 0; k < enl_molecule_degree (mol, site); k++) {
    uint32_t bond = enl_molecule_bond_at (mol, site, k);
    if (enl_atom_is_hydrogen (mol, enl_molecule_neighbour (mol, site, k)))
      continue;
    Candidate candidate = judge (frame, k);
    if (enl_molecule_bond (mol, bond)->order >= 2)
      candidate.strength = 0;
    if (best.atom == ENL_NONE || is_better (&candidate, &best))
      best = candidate;
  }
  return best.atom;
}

/* ---- aromatic rings beside it, branches ---- */

static bool
is_kept (const EnlWhyFrame *frame, uint32_t atom)
{
  return frame->role[atom] == ENL_ROLE_SITE || frame->role[atom] == ENL_ROLE_CORE;
}

static bool
touches (const EnlWhyFrame *frame, uint32_t ring)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t size;
  const uint32_t *atom = enl_molecule_ring (mol, ring, &size);

  for (uint32_t i = 0; i < size; i++)
    for (uint32_t k = 0; k < enl_molecule_degree (mol, atom[i]); k++)
      if (is_kept (frame, enl_molecule_neighbour (mol, atom[i], k)))
        return true;
  return false;
}

static void
take_aromatic_rings (EnlWhyFrame *frame)
{
  const EnlMolecule *mol = frame->draft->mol;

  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *atom = enl_molecule_ring (mol, r, &size);
    if (r == frame->base_ring || !enl_why_ring_is_aromatic (mol, r) || !touches (frame, r))
      continue;
    for (uint32_t i = 0; i < size; i++)
      if (frame->role[atom[i]] == ENL_ROLE_OUTER)
        frame->role[atom[i]] = ENL_ROLE_AROMA;
  }
}

static bool
goes (const EnlWhyFrame *frame, uint32_t inner, uint32_t outer)
{
  if (frame->role[outer] == ENL_ROLE_AROMA)
    return is_kept (frame, inner);
  return frame->role[outer] == ENL_ROLE_OUTER;
}

static int
compare_branches (gconstpointer a, gconstpointer b, gpointer data)
{
  const EnlWhyBranch *x = a, *y = b;
  const uint32_t *rank = data;

  if (x->inner != y->inner)
    return rank[x->inner] < rank[y->inner] ? -1 : 1;
  return rank[x->outer] < rank[y->outer] ? -1 : rank[x->outer] > rank[y->outer];
}

static void
list_branches (EnlWhyFrame *frame)
{
  const EnlMolecule *mol = frame->draft->mol;

  for (uint32_t i = 0; i < enl_molecule_bonds (mol); i++) {
    const EnlBond *b = enl_molecule_bond (mol, i);
    if (!enl_draft_can_cut (frame->draft, i))
      continue;
    for (int turn = 0; turn < 2; turn++) {
      EnlWhyBranch branch = {turn ? b->to : b->from, turn ? b->from : b->to};
      if (frame->role[branch.inner] != ENL_ROLE_OUTER && goes (frame, branch.inner, branch.outer))
        g_array_append_val (frame->branch, branch);
    }
  }
  g_array_sort_with_data (frame->branch, compare_branches, frame->rank);
}

void
enl_why_frame_init (EnlWhyFrame *frame, const EnlDraft *draft, const EnlWhyWords *words)
{
  uint32_t n = enl_molecule_atoms (draft->mol);

  *frame = (EnlWhyFrame){
      .draft = draft,
      .words = words,
      .main = ENL_NONE,
      .base_ring = ENL_NONE,
      .role = g_new0 (EnlWhyRole, n + 1),
      .rank = g_new0 (uint32_t, n + 1),
      .branch = g_array_new (FALSE, FALSE, sizeof (EnlWhyBranch)),
  };
  enl_canonical_ranks (draft->mol, frame->rank);
  frame->role[draft->site] = ENL_ROLE_SITE;
  uint32_t ring = find_base_ring (frame, draft->site, true);
  if (ring != ENL_NONE) {
    take_base_ring (frame, ring);
  } else {
    uint32_t atom = find_main (frame);
    if (atom != ENL_NONE)
      take_main (frame, atom);
  }
  take_aromatic_rings (frame);
  list_branches (frame);
}

void
enl_why_frame_clear (EnlWhyFrame *frame)
{
  g_free (frame->role);
  g_free (frame->rank);
  g_array_unref (frame->branch);
}

/* ---- words of a branch ---- */

bool
enl_why_branch_is_alkyl (const EnlWhyFrame *frame, EnlWhyBranch branch)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree bool *part = g_new (bool, n + 1);

  enl_draft_branch (frame->draft, branch.inner, branch.outer, part);
  for (uint32_t a = 0; a < n; a++) {
    const EnlAtom *atom = enl_molecule_atom (mol, a);
    if (part[a] &&
        !(atom->element == HYDROGEN || (atom->element == CARBON && !atom->charge &&
                                        !atom->unpaired && enl_atom_is_saturated (mol, a))))
      return false;
  }
  return true;
}

bool
enl_why_branch_is_bare (const EnlWhyFrame *frame, EnlWhyBranch branch)
{
  const EnlMolecule *mol = frame->draft->mol;
  const EnlAtom *atom = enl_molecule_atom (mol, branch.outer);

  return enl_draft_caps_with_methyl (frame->draft, branch.inner) && atom->element == CARBON &&
         atom->hydrogens == 3 && !atom->isotope && enl_molecule_degree (mol, branch.outer) == 1;
}

const EnlWhyGroup *
enl_why_branch_group (const EnlWhyFrame *frame, EnlWhyBranch branch)
{
  g_autoptr (EnlMolecule) mol =
      enl_draft_branch_molecule (frame->draft, branch.inner, branch.outer);

  return enl_why_words_group (frame->words, mol);
}

static bool
has_isotope (const EnlWhyFrame *frame, EnlWhyBranch branch)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree bool *part = g_new (bool, n + 1);

  enl_draft_branch (frame->draft, branch.inner, branch.outer, part);
  for (uint32_t a = 0; a < n; a++)
    if (part[a] && enl_molecule_atom (mol, a)->isotope)
      return true;
  return false;
}

static char *
formula_words (const EnlWhyFrame *frame, EnlWhyBranch branch)
{
  if (enl_why_branch_is_alkyl (frame, branch))
    return g_strdup (has_isotope (frame, branch) ? "labelled alkyl" : "alkyl");
  g_autoptr (EnlMolecule) mol =
      enl_draft_branch_molecule (frame->draft, branch.inner, branch.outer);
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree bool *remove = g_new0 (bool, n + 1);
  for (uint32_t a = 0; a < n; a++)
    remove[a] = enl_molecule_atom (mol, a)->element == 0;
  enl_molecule_remove_atoms (mol, remove, NULL);
  enl_molecule_finish (mol);
  g_autofree char *formula = enl_molecule_formula (mol);
  return g_strdup_printf ("%s group", formula);
}

char *
enl_why_branch_noun (const EnlWhyFrame *frame, EnlWhyBranch branch)
{
  const EnlWhyGroup *group = enl_why_branch_group (frame, branch);

  return group ? g_strdup (group->noun) : formula_words (frame, branch);
}

char *
enl_why_branch_prefix (const EnlWhyFrame *frame, EnlWhyBranch branch)
{
  const EnlWhyGroup *group = enl_why_branch_group (frame, branch);

  return group ? g_strdup (group->prefix) : formula_words (frame, branch);
}
