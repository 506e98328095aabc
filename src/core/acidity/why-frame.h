/* What stays and what goes when an acid is compared with simpler ones: the acidic atom, the group
 * that makes it acidic in the first place, the aromatic rings beside them, and the branches on all
 * of these. */
#pragma once

#include "core/acidity/why-draft.h"
#include "core/acidity/why-words.h"

typedef enum {
  ENL_ROLE_OUTER, /* none of the others */
  ENL_ROLE_SITE,  /* the acidic atom */
  ENL_ROLE_CORE,  /* the group that the parent keeps */
  ENL_ROLE_BASE,  /* the ring that the parent keeps */
  ENL_ROLE_AROMA  /* an aromatic ring beside site or core that goes */
} EnlWhyRole;

typedef struct {
  uint32_t inner, outer; /* a bond that can be cut; `inner` has a role, `outer` goes */
} EnlWhyBranch;

typedef struct {
  const EnlDraft *draft; /* borrowed */
  const EnlWhyWords *words;
  uint32_t main;      /* atom through which the parent's group is attached; ENL_NONE: it is a ring
                         with the site in it, or there is none */
  uint32_t base_ring; /* ENL_NONE or a ring of the molecule */
  EnlWhyRole *role;   /* per atom */
  uint32_t *rank;     /* per atom: canonical */
  GArray *branch;     /* EnlWhyBranch, canonical order */
} EnlWhyFrame;

/* Borrows draft and words. */
void enl_why_frame_init (EnlWhyFrame *frame, const EnlDraft *draft, const EnlWhyWords *words);
void enl_why_frame_clear (EnlWhyFrame *frame);

/* Every atom of the ring is aromatic. */
bool enl_why_ring_is_aromatic (const EnlMolecule *mol, uint32_t ring);
bool enl_why_ring_holds (const EnlMolecule *mol, uint32_t ring, uint32_t atom);
/* Canonical name of a ring for ties: the smallest rank in it, and the sum of all. */
uint64_t enl_why_ring_rank (const EnlWhyFrame *frame, uint32_t ring);

/* Saturated hydrocarbon throughout. */
bool enl_why_branch_is_alkyl (const EnlWhyFrame *frame, EnlWhyBranch branch);
/* The branch is the methyl group that a cut would put there. */
bool enl_why_branch_is_bare (const EnlWhyFrame *frame, EnlWhyBranch branch);
/* Words of the table, or NULL. */
const EnlWhyGroup *enl_why_branch_group (const EnlWhyFrame *frame, EnlWhyBranch branch);
/* "phenyl", "fluorine"; "alkyl" or "C9H7O group" for what has no name. New string (g_free). */
char *enl_why_branch_noun (const EnlWhyFrame *frame, EnlWhyBranch branch) ENL_MUST_USE;
/* The same in front of a ring: "phenyl", "fluoro". New string (g_free). */
char *enl_why_branch_prefix (const EnlWhyFrame *frame, EnlWhyBranch branch) ENL_MUST_USE;
