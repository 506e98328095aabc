/* Groups on the acidic atom, and what hangs on the other side of the group that stays. */
#include <string.h>

#include "core/acidity/why-step.h"
#include "core/molecule/elements.h"

enum { CARBON = 6, NITROGEN = 7, OXYGEN = 8 };

static EnlWhyBranch
branch_at (const EnlWhyFrame *frame, uint32_t i)
{
  return g_array_index (frame->branch, EnlWhyBranch, i);
}

static uint32_t
strength_of (const EnlWhyFrame *frame, EnlWhyBranch branch)
{
  return enl_why_words_strength (frame->words, enl_group_of (frame->draft->mol, branch.outer));
}

/* A parent needs something that makes it an acid: a heteroatom as site, or a group with a place
 * among the parents. */
static bool
has_parent (const EnlWhyFrame *frame)
{
  const EnlMolecule *mol = frame->draft->mol;

  if (enl_molecule_atom (mol, frame->draft->site)->element != CARBON ||
      frame->base_ring != ENL_NONE)
    return true;
  if (frame->main == ENL_NONE)
    return false;
  EnlGroup group = enl_group_of (mol, frame->main);
  return group != ENL_GROUP_ALKYL && enl_why_words_strength (frame->words, group) != ENL_NONE;
}

/* ---- groups on the acidic atom ---- */

static bool
is_acyl (EnlGroup group)
{
  return enl_group_is_carbonyl (group) && group != ENL_GROUP_KETENE;
}

/* Acyl groups on the site, the parent's own included. */
static uint32_t
count_acyls (const EnlWhyFrame *frame)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint32_t site = frame->draft->site, n = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, site); k++)
    n += is_acyl (enl_group_of (mol, enl_molecule_neighbour (mol, site, k)));
  return n;
}

static char *
acyl_words (const EnlWhyFrame *frame, const char *noun)
{
  static const char *const place[] = {"", "", "second ", "third "};
  uint32_t n = count_acyls (frame);

  return g_strdup_printf ("%sacyl group (%s)", n < ENL_COUNT (place) ? place[n] : "further ", noun);
}

static const char *
times (uint32_t n)
{
  return n == 2 ? ", twice" : n > 2 ? ", three times" : "";
}

/* `n` groups of one kind; the parent may have one more. */
static char *
group_words (const EnlWhyFrame *frame, EnlGroup group, const char *noun, uint32_t n)
{
  const EnlMolecule *mol = frame->draft->mol;
  const char *where = enl_element_name (enl_molecule_atom (mol, frame->draft->site)->element);
  bool again = frame->main != ENL_NONE && enl_group_of (mol, frame->main) == group;

  if (again)
    return g_strdup_printf ("%s %s on the %s",
                            n == 1   ? "second"
                            : n == 2 ? "second and third"
                                     : "three more",
                            noun, where);
  return g_strdup_printf ("%s on the %s%s", noun, where, times (n));
}

/* The branch that goes next: the weakest, then that of the first words. ENL_NONE: none. */
static uint32_t
find_weakest (const EnlWhyFrame *frame)
{
  uint32_t best = ENL_NONE;
  g_autofree char *best_noun = NULL;

  for (uint32_t i = 0; i < frame->branch->len; i++) {
    EnlWhyBranch branch = branch_at (frame, i);
    if (branch.inner != frame->draft->site)
      continue;
    g_autofree char *noun = enl_why_branch_noun (frame, branch);
    uint32_t strength = strength_of (frame, branch);
    uint32_t old = best == ENL_NONE ? 0 : strength_of (frame, branch_at (frame, best));
    if (best == ENL_NONE || strength > old || (strength == old && strcmp (noun, best_noun) < 0)) {
      best = i;
      g_free (best_noun);
      best_noun = g_steal_pointer (&noun);
    }
  }
  return best;
}

char *
enl_why_step_groups (const EnlWhyFrame *frame, EnlDraftEdit *edit)
{
  uint32_t weakest = find_weakest (frame), n = 0;

  if (weakest == ENL_NONE || !has_parent (frame))
    return NULL;
  EnlWhyBranch first = branch_at (frame, weakest);
  g_autofree char *noun = enl_why_branch_noun (frame, first);
  if (is_acyl (enl_group_of (frame->draft->mol, first.outer))) {
    enl_draft_edit_cut (edit, first.inner, first.outer);
    return acyl_words (frame, noun);
  }
  for (uint32_t i = 0; i < frame->branch->len; i++) {
    EnlWhyBranch branch = branch_at (frame, i);
    g_autofree char *other =
        branch.inner == frame->draft->site ? enl_why_branch_noun (frame, branch) : NULL;
    if (other && strcmp (other, noun) == 0) {
      enl_draft_edit_cut (edit, branch.inner, branch.outer);
      n++;
    }
  }
  return group_words (frame, enl_group_of (frame->draft->mol, first.outer), noun, n);
}

/* ---- the other side ---- */

static const char *
carbon_words (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint8_t order = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k))->order;
    uint8_t element = enl_molecule_atom (mol, enl_molecule_neighbour (mol, atom, k))->element;
    if (order == 3)
      return "the triple bond";
    if (order == 2)
      return element == OXYGEN     ? "the C=O"
             : element == NITROGEN ? "the C=N"
             : element == CARBON   ? "the C=C"
                                   : "the C=S";
  }
  return "the next carbon";
}

static char *
far_words (const EnlWhyFrame *frame, EnlWhyBranch branch)
{
  const EnlMolecule *mol = frame->draft->mol;
  uint8_t element = enl_molecule_atom (mol, branch.inner)->element;
  bool methyl = enl_draft_caps_with_methyl (frame->draft, branch.inner);
  g_autofree char *noun = enl_why_branch_noun (frame, branch);
  g_autofree char *place = element == CARBON
                               ? g_strdup (carbon_words (mol, branch.inner))
                               : g_strdup_printf ("the %s", enl_element_name (element));

  return g_strdup_printf ("%s%s on %s", noun, methyl ? " instead of methyl" : "", place);
}

char *
enl_why_step_far_side (const EnlWhyFrame *frame, EnlDraftEdit *edit)
{
  char *best = NULL;
  uint32_t n = 0;

  if (!has_parent (frame))
    return NULL;
  for (int round = 0; round < 2; round++) /* find the first words, then cut all that have them */
    for (uint32_t i = 0; i < frame->branch->len; i++) {
      EnlWhyBranch branch = branch_at (frame, i);
      if (frame->role[branch.inner] != ENL_ROLE_CORE || enl_why_branch_is_bare (frame, branch))
        continue;
      g_autofree char *words = far_words (frame, branch);
      if (round == 0 && (!best || strcmp (words, best) < 0)) {
        g_free (best);
        best = g_steal_pointer (&words);
      } else if (round == 1 && strcmp (words, best) == 0) {
        enl_draft_edit_cut (edit, branch.inner, branch.outer);
        n++;
      }
    }
  if (n < 2)
    return best;
  char *many = g_strdup_printf ("%s%s", best, times (n));
  g_free (best);
  return many;
}
