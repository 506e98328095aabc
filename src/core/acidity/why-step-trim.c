/* What is far from the acidic atom, and alkyl groups longer than methyl. */
#include <string.h>

#include "core/acidity/why-step.h"

enum { CARBON = 6 };

/* Heavy atoms from the frame to which a branch is followed before everything is cut. */
#define NEAR 2
#define FAR  4

static const char longer_alkyl[] = "larger alkyl groups";
static const char rest[] = "rest of the molecule";

static EnlWhyBranch
branch_at (const EnlWhyFrame *frame, uint32_t i)
{
  return g_array_index (frame->branch, EnlWhyBranch, i);
}

/* What stands on an aromatic ring beside the site counts as a branch of its own. */
static bool
is_ring (const EnlWhyFrame *frame, EnlWhyBranch branch)
{
  return frame->role[branch.outer] == ENL_ROLE_AROMA;
}

static bool
is_carbon (const EnlMolecule *mol, uint32_t atom)
{
  return enl_molecule_atom (mol, atom)->element == CARBON;
}

/* Cut between `near` and `beyond`, where `near` is the atom number `depth` of its branch?
 * Everything goes from aromatic rings; halogens stay on their carbon, and the O of an ester on its
 * C=O. */
static bool
is_cut_here (const EnlWhyFrame *frame, EnlWhyBranch cut, uint32_t depth)
{
  const EnlMolecule *mol = frame->draft->mol;

  if (depth < NEAR || enl_why_branch_is_bare (frame, cut))
    return false;
  if (depth >= FAR || enl_molecule_atom (mol, cut.inner)->aromatic)
    return true;
  if (is_carbon (mol, cut.outer))
    return is_carbon (mol, cut.inner);
  return !enl_atom_is_halogen (mol, cut.outer) && is_carbon (mol, cut.inner) &&
         enl_atom_is_saturated (mol, cut.inner);
}

typedef struct {
  const EnlWhyFrame *frame;
  EnlDraftEdit *edit;
  uint32_t *depth; /* per atom; 0: not reached */
  bool alkyl;      /* all that was cut is saturated hydrocarbon */
} Walk;

/* Breadth first from the root of a branch. */
static void
walk_branch (Walk *walk, EnlWhyBranch branch)
{
  const EnlMolecule *mol = walk->frame->draft->mol;
  g_autofree uint32_t *queue = g_new (uint32_t, enl_molecule_atoms (mol) + 1);
  uint32_t head = 0, tail = 0;

  walk->depth[branch.outer] = 1;
  queue[tail++] = branch.outer;
  while (head < tail) {
    uint32_t atom = queue[head++];
    for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
      EnlWhyBranch next = {atom, enl_molecule_neighbour (mol, atom, k)};
      if (walk->depth[next.outer] || (atom == branch.outer && next.outer == branch.inner))
        continue;
      if (enl_draft_can_cut (walk->frame->draft, enl_molecule_bond_at (mol, atom, k)) &&
          is_cut_here (walk->frame, next, walk->depth[atom])) {
        walk->alkyl &= enl_why_branch_is_alkyl (walk->frame, next);
        enl_draft_edit_cut (walk->edit, next.inner, next.outer);
        continue;
      }
      walk->depth[next.outer] = walk->depth[atom] + 1;
      queue[tail++] = next.outer;
    }
  }
}

static char *
trim_far (const EnlWhyFrame *frame, EnlDraftEdit *edit)
{
  g_autofree uint32_t *depth = g_new0 (uint32_t, enl_molecule_atoms (frame->draft->mol) + 1);
  Walk walk = {frame, edit, depth, true};

  for (uint32_t i = 0; i < frame->branch->len; i++)
    if (!is_ring (frame, branch_at (frame, i)) &&
        !enl_why_branch_group (frame, branch_at (frame, i)))
      walk_branch (&walk, branch_at (frame, i));
  if (!edit->any)
    return NULL;
  return g_strdup (walk.alkyl ? longer_alkyl : rest);
}

/* ---- on the first atom of a branch ---- */

/* Cuts of one kind (alkyl or not) on saturated first atoms. */
static GArray *
find_near (const EnlWhyFrame *frame, bool alkyl)
{
  const EnlMolecule *mol = frame->draft->mol;
  GArray *found = g_array_new (FALSE, FALSE, sizeof (EnlWhyBranch));

  for (uint32_t i = 0; i < frame->branch->len; i++) {
    EnlWhyBranch branch = branch_at (frame, i);
    uint32_t root = branch.outer;
    if (!is_carbon (mol, root) || !enl_atom_is_saturated (mol, root) ||
        enl_why_branch_group (frame, branch))
      continue;
    for (uint32_t k = 0; k < enl_molecule_degree (mol, root); k++) {
      EnlWhyBranch next = {root, enl_molecule_neighbour (mol, root, k)};
      if (next.outer != branch.inner &&
          enl_draft_can_cut (frame->draft, enl_molecule_bond_at (mol, root, k)) &&
          enl_why_branch_is_alkyl (frame, next) == alkyl)
        g_array_append_val (found, next);
    }
  }
  return found;
}

static char *
near_words (const EnlWhyFrame *frame, const GArray *cut)
{
  g_autofree char *noun = enl_why_branch_noun (frame, g_array_index (cut, EnlWhyBranch, 0));

  for (uint32_t i = 1; i < cut->len; i++) {
    g_autofree char *other = enl_why_branch_noun (frame, g_array_index (cut, EnlWhyBranch, i));
    if (strcmp (noun, other) != 0)
      return g_strdup ("groups one carbon further out");
  }
  return g_strdup_printf ("%s one carbon further out%s", noun,
                          cut->len == 2  ? ", twice"
                          : cut->len > 2 ? ", several times"
                                         : "");
}

static char *
trim_near (const EnlWhyFrame *frame, EnlDraftEdit *edit, bool alkyl)
{
  g_autoptr (GArray) cut = find_near (frame, alkyl);

  if (cut->len == 0)
    return NULL;
  for (uint32_t i = 0; i < cut->len; i++) {
    EnlWhyBranch branch = g_array_index (cut, EnlWhyBranch, i);
    enl_draft_edit_cut (edit, branch.inner, branch.outer);
  }
  return alkyl ? g_strdup (longer_alkyl) : near_words (frame, cut);
}

char *
enl_why_step_chains (const EnlWhyFrame *frame, EnlDraftEdit *edit)
{
  char *words = trim_far (frame, edit);

  return words ? words : trim_near (frame, edit, true);
}

char *
enl_why_step_trim (const EnlWhyFrame *frame, EnlDraftEdit *edit)
{
  char *words = trim_far (frame, edit);

  if (!words)
    words = trim_near (frame, edit, false);
  return words ? words : trim_near (frame, edit, true);
}
