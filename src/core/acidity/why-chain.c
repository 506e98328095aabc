#include "core/acidity/why-chain.h"

#include <string.h>

#include "core/acidity/why-step.h"

/* More steps than any molecule of ordinary size takes: a guard against going round in circles. */
#define MOST_STEPS 64

static const char rest[] = "rest of the molecule";

typedef struct {
  EnlDraft draft;
  char *words;
} Step;

static void
clear_step (gpointer data)
{
  Step *step = data;

  enl_draft_clear (&step->draft);
  g_free (step->words);
}

typedef char *(*StepFunction) (const EnlWhyFrame *, EnlDraftEdit *);

/* Makes one step of a kind on `draft`; its words, or NULL when there was nothing to do. */
static char *
advance (EnlDraft *draft, StepFunction step)
{
  EnlWhyFrame frame;
  EnlDraftEdit edit;

  enl_why_frame_init (&frame, draft, enl_why_words ());
  enl_draft_edit_init (&edit, draft);
  char *words = step (&frame, &edit);
  g_assert (!words == !edit.any);
  EnlDraft next = words ? enl_draft_edit_make (&edit) : *draft;
  enl_why_frame_clear (&frame);
  enl_draft_edit_clear (&edit);
  if (words)
    enl_draft_clear (draft);
  *draft = next;
  return words;
}

/* ---- rings: all openings, and the trimming of what then hangs free, are one step ---- */

static bool
open_one (EnlDraft *draft, uint32_t *size)
{
  EnlWhyFrame frame;
  EnlDraftEdit edit;

  enl_why_frame_init (&frame, draft, enl_why_words ());
  enl_draft_edit_init (&edit, draft);
  bool found = enl_why_step_open_ring (&frame, &edit, size);
  EnlDraft next = found ? enl_draft_edit_make (&edit) : *draft;
  enl_why_frame_clear (&frame);
  enl_draft_edit_clear (&edit);
  if (found)
    enl_draft_clear (draft);
  *draft = next;
  return found;
}

static char *
ring_words (const EnlDraft *draft, uint32_t size, uint32_t opened)
{
  EnlWhyFrame frame;

  enl_why_frame_init (&frame, draft, enl_why_words ());
  char *words = enl_why_step_ring_words (&frame, size, opened);
  enl_why_frame_clear (&frame);
  return words;
}

static char *
open_rings (EnlDraft *draft)
{
  EnlDraft work = {enl_molecule_copy (draft->mol), draft->site};
  uint32_t size = 0, other, opened = 0;

  while (opened < MOST_STEPS && open_one (&work, opened ? &other : &size))
    opened++;
  char *words = opened ? ring_words (draft, size, opened) : NULL;
  for (int i = 0; words && i < MOST_STEPS; i++) {
    g_autofree char *chains = advance (&work, enl_why_step_chains);
    if (!chains)
      break;
  }
  EnlDraft old = words ? *draft : work;
  if (words)
    *draft = work;
  enl_draft_clear (&old);
  return words;
}

/* ---- the chain ---- */

static char *
next_step (EnlDraft *draft)
{
  char *words;

  if (enl_why_words_parent (enl_why_words (), draft->mol, draft->site))
    return NULL;
  if ((words = advance (draft, enl_why_step_trim)) ||
      (words = advance (draft, enl_why_step_ring_groups)) ||
      (words = advance (draft, enl_why_step_benzo)) || (words = open_rings (draft)) ||
      (words = advance (draft, enl_why_step_groups)))
    return words;
  return advance (draft, enl_why_step_far_side);
}

/* Two steps with the same words one after the other are one. */
static void
add_step (GArray *steps, const EnlDraft *draft, char *words)
{
  Step step = {{enl_molecule_copy (draft->mol), draft->site}, words};
  Step *last = steps->len ? &g_array_index (steps, Step, steps->len - 1) : NULL;

  if (last && strcmp (last->words, words) == 0) {
    clear_step (last);
    *last = step;
    return;
  }
  g_array_append_val (steps, step);
}

static GArray *
find_steps (const EnlMolecule *mol, uint32_t site)
{
  GArray *steps = g_array_new (FALSE, FALSE, sizeof (Step));
  EnlDraft draft = enl_draft_new (mol, site);

  g_array_set_clear_func (steps, clear_step);
  for (int i = 0; i < MOST_STEPS; i++) {
    char *words = next_step (&draft);
    if (!words)
      break;
    add_step (steps, &draft, words);
  }
  enl_draft_clear (&draft);
  return steps;
}

EnlWhyChain *
enl_why_chain_new (const EnlMolecule *mol, uint32_t site)
{
  EnlWhyChain *chain = g_new0 (EnlWhyChain, 1);
  g_autoptr (GArray) steps = find_steps (mol, site);
  uint32_t room = ENL_WHY_MAX_LINKS - 1;
  uint32_t from = steps->len > room ? steps->len - room : 0;

  chain->link[chain->n++] = (EnlWhyLink){enl_molecule_copy (mol), site, NULL};
  /* Too many: the outermost become one. */
  for (uint32_t i = from; i < steps->len; i++) {
    const Step *step = &g_array_index (steps, Step, i);
    chain->link[chain->n++] = (EnlWhyLink){
        .mol = enl_molecule_copy (step->draft.mol),
        .site = step->draft.site,
        .words = g_strdup (from > 0 && i == from ? rest : step->words),
    };
  }
  return chain;
}

void
enl_why_chain_free (EnlWhyChain *chain)
{
  if (!chain)
    return;
  for (uint32_t i = 0; i < chain->n; i++) {
    enl_molecule_free (chain->link[i].mol);
    g_free (chain->link[i].words);
  }
  g_free (chain);
}
