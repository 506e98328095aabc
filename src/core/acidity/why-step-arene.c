/* Substituents on the aromatic rings beside the acidic atom, and benzene rings fused to them. */
#include <stdlib.h>
#include <string.h>

#include "core/acidity/why-step.h"

enum { CARBON = 6, BENZENE = 6 };

/* ---- one ring ---- */

typedef struct {
  uint32_t ring;
  const uint32_t *atom; /* in walking order */
  uint32_t size;
  uint32_t anchor;    /* place in `atom` that counts as position 1; ENL_NONE: no numbers */
  const char *called; /* "the phenyl group"; static */
} Ring;

static bool
is_near (const EnlWhyFrame *frame, uint32_t atom)
{
  return frame->role[atom] == ENL_ROLE_SITE || frame->role[atom] == ENL_ROLE_CORE;
}

/* Counts the bonds by which site or core hold the ring; `*anchor` is the place of the last. */
static uint32_t
count_holds (const EnlWhyFrame *frame, const Ring *ring, uint32_t *anchor, bool *fused)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t holds = 0;

  *fused = false;
  for (uint32_t i = 0; i < ring->size; i++)
    for (uint32_t k = 0; k < enl_molecule_degree (mol, ring->atom[i]); k++) {
      uint32_t bond = enl_molecule_bond_at (mol, ring->atom[i], k);
      if (!is_near (frame, enl_molecule_neighbour (mol, ring->atom[i], k)))
        continue;
      *anchor = i;
      *fused |= enl_molecule_bond (mol, bond)->ring;
      holds++;
    }
  return holds;
}

static uint32_t
count_heteroatoms (const EnlMolecule *mol, const Ring *ring)
{
  uint32_t n = 0;

  for (uint32_t i = 0; i < ring->size; i++)
    n += enl_molecule_atom (mol, ring->atom[i])->element != CARBON;
  return n;
}

static uint32_t
place_of (const Ring *ring, uint32_t atom)
{
  for (uint32_t i = 0; i < ring->size; i++)
    if (ring->atom[i] == atom)
      return i;
  return ENL_NONE;
}

static void
describe_base_ring (const EnlWhyFrame *frame, Ring *ring)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t hetero = count_heteroatoms (mol, ring);
  uint32_t site = place_of (ring, frame->draft->site);
  bool site_is_carbon = enl_molecule_atom (mol, frame->draft->site)->element == CARBON;

  ring->called = hetero == 0 && ring->size == BENZENE ? "the benzene ring" : "the ring";
  if (site != ENL_NONE)
    ring->anchor = hetero == 1 && !site_is_carbon ? site : ENL_NONE;
  else
    ring->anchor = hetero == 0 && frame->main != ENL_NONE ? place_of (ring, frame->main) : ENL_NONE;
}

static Ring
describe_ring (const EnlWhyFrame *frame, uint32_t index)
{
  Ring ring = {.ring = index, .anchor = ENL_NONE};
  uint32_t anchor = ENL_NONE;
  bool fused;

  ring.atom = enl_molecule_ring (frame->draft->mol, index, &ring.size);
  if (index == frame->base_ring) {
    describe_base_ring (frame, &ring);
    return ring;
  }
  uint32_t holds = count_holds (frame, &ring, &anchor, &fused);
  bool benzene = ring.size == BENZENE && count_heteroatoms (frame->draft->mol, &ring) == 0;
  if (fused)
    ring.called = benzene ? "the fused benzene ring" : "the fused ring";
  else
    ring.called = benzene ? "the phenyl group" : "the heteroaryl group";
  if (holds == 1 && !fused && benzene)
    ring.anchor = anchor;
  return ring;
}

static bool
is_beside (const EnlWhyFrame *frame, uint32_t ring)
{
  uint32_t size;
  const uint32_t *atom = enl_molecule_ring (frame->draft->mol, ring, &size);

  if (ring == frame->base_ring)
    return true;
  if (!enl_why_ring_is_aromatic (frame->draft->mol, ring))
    return false;
  for (uint32_t i = 0; i < size; i++)
    if (frame->role[atom[i]] != ENL_ROLE_AROMA && frame->role[atom[i]] != ENL_ROLE_BASE)
      return false;
  return true;
}

/* ---- its substituents ---- */

typedef struct {
  EnlWhyBranch branch;
  uint32_t place; /* steps along the ring from the anchor */
  char *prefix;
} Substituent;

static void
clear_substituent (gpointer data)
{
  g_free (((Substituent *)data)->prefix);
}

static GArray *
find_substituents (const EnlWhyFrame *frame, const Ring *ring)
{
  GArray *found = g_array_new (FALSE, FALSE, sizeof (Substituent));

  g_array_set_clear_func (found, clear_substituent);
  for (uint32_t i = 0; i < frame->branch->len; i++) {
    EnlWhyBranch branch = g_array_index (frame->branch, EnlWhyBranch, i);
    uint32_t place = place_of (ring, branch.inner);
    if (place == ENL_NONE || is_near (frame, branch.inner) ||
        enl_why_branch_is_bare (frame, branch))
      continue;
    if (ring->anchor != ENL_NONE)
      place = (place + ring->size - ring->anchor) % ring->size;
    Substituent s = {branch, place, enl_why_branch_prefix (frame, branch)};
    g_array_append_val (found, s);
  }
  return found;
}

static int
compare_numbers (const void *a, const void *b)
{
  uint32_t x = *(const uint32_t *)a, y = *(const uint32_t *)b;

  return (x > y) - (x < y);
}

/* Positions 2, 3 ... of the substituents with this prefix (NULL: all), counted either way round. */
static GArray *
locants (const GArray *all, const Ring *ring, const char *prefix, bool backwards)
{
  GArray *out = g_array_new (FALSE, FALSE, sizeof (uint32_t));

  for (uint32_t i = 0; i < all->len; i++) {
    const Substituent *s = &g_array_index (all, Substituent, i);
    uint32_t place = 1 + (backwards ? (ring->size - s->place) % ring->size : s->place);
    if (!prefix || strcmp (prefix, s->prefix) == 0)
      g_array_append_val (out, place);
  }
  qsort (out->data, out->len, sizeof (uint32_t), compare_numbers);
  return out;
}

static int
compare_locants (const GArray *a, const GArray *b)
{
  for (uint32_t i = 0; i < MIN (a->len, b->len); i++) {
    uint32_t x = g_array_index (a, uint32_t, i), y = g_array_index (b, uint32_t, i);
    if (x != y)
      return x < y ? -1 : 1;
  }
  return 0;
}

/* Lowest numbers for all together, then for this kind. */
static GArray *
best_locants (const GArray *all, const Ring *ring, const char *prefix)
{
  g_autoptr (GArray) all_forwards = locants (all, ring, NULL, false);
  g_autoptr (GArray) all_backwards = locants (all, ring, NULL, true);
  GArray *forwards = locants (all, ring, prefix, false);
  GArray *backwards = locants (all, ring, prefix, true);
  int order = compare_locants (all_forwards, all_backwards);

  if (order == 0)
    order = compare_locants (forwards, backwards);
  g_array_unref (order <= 0 ? backwards : forwards);
  return order <= 0 ? forwards : backwards;
}

static char *
multiplied (const char *prefix, uint32_t n)
{
  static const char *const plain[] = {"", "", "di", "tri", "tetra", "penta", "hexa"};
  static const char *const bracketed[] = {"", "", "bis", "tris", "tetrakis", "pentakis", "hexakis"};
  bool simple = !strpbrk (prefix, "- 0123456789") && strlen (prefix) <= strlen ("methoxy") &&
                !g_str_has_prefix (prefix, "di") && !g_str_has_prefix (prefix, "tri");

  if (n < 2 || n >= ENL_COUNT (plain))
    return g_strdup (prefix);
  return simple ? g_strconcat (plain[n], prefix, NULL)
                : g_strconcat (bracketed[n], "(", prefix, ")", NULL);
}

static char *
substituent_words (const GArray *all, const Ring *ring, const char *prefix)
{
  g_autoptr (GArray) number = best_locants (all, ring, prefix);
  g_autofree char *name = multiplied (prefix, number->len);
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; ring->anchor != ENL_NONE && i < number->len; i++)
    g_string_append_printf (out, "%s%u", i ? "," : "", g_array_index (number, uint32_t, i));
  if (out->len)
    g_string_append_c (out, '-');
  g_string_append_printf (out, "%s on %s", name, ring->called);
  return g_string_free (out, FALSE);
}

/* ---- the step ---- */

/* Every (ring, kind of substituent) with its words: the smallest words of all, and in a second
 * round the cuts of all that have them. Rings that look alike go together. */
static uint32_t
visit_kinds (const EnlWhyFrame *frame, EnlDraftEdit *edit, char **words)
{
  uint32_t rings = 0;

  for (uint32_t r = 0; r < enl_molecule_rings (frame->draft->mol); r++) {
    if (!is_beside (frame, r))
      continue;
    Ring ring = describe_ring (frame, r);
    g_autoptr (GArray) all = find_substituents (frame, &ring);
    bool cut = false;
    for (uint32_t i = 0; i < all->len; i++) {
      const Substituent *s = &g_array_index (all, Substituent, i);
      g_autofree char *mine = substituent_words (all, &ring, s->prefix);
      if (edit && strcmp (mine, *words) == 0) {
        enl_draft_edit_cut (edit, s->branch.inner, s->branch.outer);
        cut = true;
      } else if (!edit && (!*words || strcmp (mine, *words) < 0)) {
        g_free (*words);
        *words = g_steal_pointer (&mine);
      }
    }
    rings += cut;
  }
  return rings;
}

char *
enl_why_step_ring_groups (const EnlWhyFrame *frame, EnlDraftEdit *edit)
{
  char *words = NULL;

  visit_kinds (frame, NULL, &words);
  if (!words)
    return NULL;
  uint32_t rings = visit_kinds (frame, edit, &words);
  if (rings < 2)
    return words;
  char *many = g_strdup_printf ("%s, %s", words, rings == 2 ? "twice" : "several times");
  g_free (words);
  return many;
}

/* ---- fused benzene rings ---- */

/* The two atoms that the ring shares with the base ring; the other four must be bare CH. */
static bool
find_junction (const EnlWhyFrame *frame, uint32_t ring, uint32_t junction[2], uint32_t other[4])
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t size, shared = 0, own = 0;
  const uint32_t *atom = enl_molecule_ring (mol, ring, &size);

  if (size != BENZENE || ring == frame->base_ring || !enl_why_ring_is_aromatic (mol, ring))
    return false;
  for (uint32_t i = 0; i < size; i++) {
    bool base = enl_why_ring_holds (mol, frame->base_ring, atom[i]);
    if (enl_molecule_atom (mol, atom[i])->element != CARBON)
      return false;
    if (base && shared < 2)
      junction[shared++] = atom[i];
    else if (!base && own < 4 && enl_molecule_degree (mol, atom[i]) == 2)
      other[own++] = atom[i];
    else
      return false;
  }
  return shared == 2 && own == 4 && junction[0] != frame->main && junction[1] != frame->main;
}

/* Takes the four CH away; where they held both double bonds of the junction it gets one. */
static bool
remove_benzo (const EnlWhyFrame *frame, EnlDraftEdit *edit, uint32_t ring)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t junction[2], other[4], doubles = 0;

  if (!find_junction (frame, ring, junction, other))
    return false;
  uint32_t bond = enl_molecule_bond_between (mol, junction[0], junction[1]);
  for (int i = 0; i < 2; i++)
    for (int k = 0; k < 4; k++) {
      uint32_t link = enl_molecule_bond_between (mol, junction[i], other[k]);
      doubles += link != ENL_NONE && enl_molecule_bond (mol, link)->order == 2;
    }
  if (doubles == 1 || bond == ENL_NONE)
    return false;
  for (int k = 0; k < 4; k++)
    edit->gone[other[k]] = true;
  for (int i = 0; i < 2; i++)
    edit->hydrogens[junction[i]]++;
  if (doubles == 2)
    edit->order[bond] = 2;
  edit->any = true;
  return true;
}

char *
enl_why_step_benzo (const EnlWhyFrame *frame, EnlDraftEdit *edit)
{
  uint32_t n = 0;

  if (frame->base_ring == ENL_NONE)
    return NULL;
  for (uint32_t r = 0; r < enl_molecule_rings (frame->draft->mol); r++)
    n += remove_benzo (frame, edit, r);
  if (n == 0)
    return NULL;
  return g_strdup (n == 1 ? "fused benzene ring" : "two fused benzene rings");
}
