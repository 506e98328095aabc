/* Rings that hold the acidic atom or its group: compared with their open-chain forms. */
#include "core/acidity/why-step.h"

enum { CARBON = 6 };

static bool
is_kept (const EnlWhyFrame *frame, uint32_t atom)
{
  return frame->role[atom] == ENL_ROLE_SITE || frame->role[atom] == ENL_ROLE_CORE;
}

/* The ring to open next: with the site in it before those with only its group; the smallest. */
static uint32_t
find_ring (const EnlWhyFrame *frame)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t best = ENL_NONE, best_size = 0;
  bool best_site = false;

  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *atom = enl_molecule_ring (mol, r, &size);
    bool site = enl_why_ring_holds (mol, r, frame->draft->site), kept = false;
    for (uint32_t i = 0; i < size; i++)
      kept |= is_kept (frame, atom[i]);
    if (!kept || r == frame->base_ring || enl_why_ring_is_aromatic (mol, r))
      continue;
    bool better = site != best_site ? site
                  : size != best_size
                      ? size < best_size
                      : enl_why_ring_rank (frame, r) < enl_why_ring_rank (frame, best);
    if (best == ENL_NONE || better)
      best = r, best_size = size, best_site = site;
  }
  return best;
}

typedef struct {
  uint32_t at_main;  /* 1: touches the group that stays */
  uint32_t far_site; /* bonds to the site, larger first */
  uint32_t far_main;
  uint32_t hetero; /* 1: not between carbons */
  uint32_t low, high;
} Place;

static int
compare_places (const Place *a, const Place *b)
{
  if (a->at_main != b->at_main)
    return a->at_main < b->at_main ? -1 : 1;
  if (a->far_site != b->far_site)
    return a->far_site > b->far_site ? -1 : 1;
  if (a->far_main != b->far_main)
    return a->far_main > b->far_main ? -1 : 1;
  if (a->hetero != b->hetero)
    return a->hetero < b->hetero ? -1 : 1;
  if (a->low != b->low)
    return a->low < b->low ? -1 : 1;
  return (a->high > b->high) - (a->high < b->high);
}

typedef struct {
  const EnlWhyFrame *frame;
  uint32_t *to_site, *to_main; /* bonds, per atom */
} Distances;

static Place
judge (const Distances *d, const EnlBond *b)
{
  const EnlMolecule *mol = d->frame->draft->mol;
  const uint32_t *rank = d->frame->rank;

  return (Place){
      .at_main = d->frame->role[b->from] == ENL_ROLE_CORE || d->frame->role[b->to] == ENL_ROLE_CORE,
      .far_site = MIN (d->to_site[b->from], d->to_site[b->to]),
      .far_main = d->to_main ? MIN (d->to_main[b->from], d->to_main[b->to]) : 0,
      .hetero = enl_molecule_atom (mol, b->from)->element != CARBON ||
                enl_molecule_atom (mol, b->to)->element != CARBON,
      .low = MIN (rank[b->from], rank[b->to]),
      .high = MAX (rank[b->from], rank[b->to]),
  };
}

static bool
can_open (const EnlWhyFrame *frame, const EnlBond *b)
{
  const EnlMolecule *mol = frame->draft->mol;

  return b->order == 1 && !b->aromatic && b->from != frame->draft->site &&
         b->to != frame->draft->site && !enl_atom_is_metal (mol, b->from) &&
         !enl_atom_is_metal (mol, b->to) && !(is_kept (frame, b->from) && is_kept (frame, b->to));
}

/* The bond of the ring farthest from what makes the acid. */
static uint32_t
find_bond (const Distances *d, uint32_t ring)
{
  const EnlMolecule *mol = d->frame->draft->mol;
  uint32_t size, best = ENL_NONE;
  const uint32_t *atom = enl_molecule_ring (mol, ring, &size);
  Place best_place = {0};

  for (uint32_t i = 0; i < size; i++) {
    uint32_t bond = enl_molecule_bond_between (mol, atom[i], atom[(i + 1) % size]);
    const EnlBond *b = enl_molecule_bond (mol, bond);
    if (!can_open (d->frame, b))
      continue;
    Place place = judge (d, b);
    if (best == ENL_NONE || compare_places (&place, &best_place) < 0)
      best = bond, best_place = place;
  }
  return best;
}

bool
enl_why_step_open_ring (const EnlWhyFrame *frame, EnlDraftEdit *edit, uint32_t *size)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t n = enl_molecule_atoms (mol), ring = find_ring (frame);
  g_autofree uint32_t *to_site = g_new (uint32_t, n + 1);
  g_autofree uint32_t *to_main = g_new (uint32_t, n + 1);
  Distances d = {frame, to_site, frame->main == ENL_NONE ? NULL : to_main};

  if (ring == ENL_NONE)
    return false;
  enl_molecule_distances (mol, frame->draft->site, to_site);
  if (frame->main != ENL_NONE)
    enl_molecule_distances (mol, frame->main, to_main);
  uint32_t bond = find_bond (&d, ring);
  if (bond == ENL_NONE)
    return false;
  enl_molecule_ring (mol, ring, size);
  enl_draft_edit_open (edit, bond);
  return true;
}

/* ---- words ---- */

static const char *
size_words (uint32_t size)
{
  static const char *const word[] = {"three", "four", "five", "six", "seven", "eight"};

  return size >= 3 && size - 3 < ENL_COUNT (word) ? word[size - 3] : NULL;
}

/* Groups of this kind beside the site, in one ring with it. */
static uint32_t
count_in_ring (const EnlWhyFrame *frame, EnlGroup group)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t n = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, frame->draft->site); k++) {
    uint32_t atom = enl_molecule_neighbour (mol, frame->draft->site, k);
    const EnlBond *bond =
        enl_molecule_bond (mol, enl_molecule_bond_at (mol, frame->draft->site, k));
    n += bond->ring && enl_group_of (mol, atom) == group &&
         (enl_group_traits (mol, atom) & ENL_TRAIT_RING);
  }
  return n;
}

char *
enl_why_step_ring_words (const EnlWhyFrame *frame, uint32_t size, uint32_t opened)
{
  const char *word = size_words (size);
  bool site = enl_molecule_in_ring (frame->draft->mol, frame->draft->site);
  uint32_t esters = count_in_ring (frame, ENL_GROUP_ESTER);
  uint32_t amides = count_in_ring (frame, ENL_GROUP_AMIDE) + count_in_ring (frame, ENL_GROUP_IMIDE);

  if (opened > 1)
    return g_strdup (site ? "fused or bridged ring system" : "rings of the group beside it");
  if (esters == 1)
    return g_strdup ("lactone ring (E ester)");
  if (esters > 1)
    return g_strdup ("ring of two esters (both E)");
  if (count_in_ring (frame, ENL_GROUP_IMIDE))
    return g_strdup ("imide ring");
  if (amides)
    return g_strdup ("lactam ring");
  if (!word)
    return g_strdup_printf ("%u-membered ring%s", size, site ? "" : " of the group beside it");
  return g_strdup_printf ("%s-membered ring%s", word, site ? "" : " of the group beside it");
}
