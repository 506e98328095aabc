/* A structure on its way down to its parent acid: pieces cut off, rings opened, ends capped.
 *
 * Where a single bond is cut the stump gets a hydrogen, or a methyl group where a hydrogen would
 * make another kind of compound: at the carbon of C=O, C=S and C=N, and at heteroatoms. The acidic
 * atom always gets a hydrogen.
 */
#pragma once

#include "core/molecule/molecule.h"

typedef struct {
  EnlMolecule *mol; /* owned, finished; no stereo, no maps */
  uint32_t site;    /* the acidic atom */
} EnlDraft;

/* Copy of a molecule; also of one with stereo and maps. */
EnlDraft enl_draft_new (const EnlMolecule *mol, uint32_t site) ENL_MUST_USE;
void enl_draft_clear (EnlDraft *draft);

/* Single, neither in a ring nor aromatic, between two atoms that are neither hydrogen nor metal. */
bool enl_draft_can_cut (const EnlDraft *draft, uint32_t bond);
/* The stump at `atom` is a methyl group. */
bool enl_draft_caps_with_methyl (const EnlDraft *draft, uint32_t atom);
/* Fills part[atom]: true for everything on the side of `outer` of the bond `inner`-`outer`, which
 * is in no ring. Returns the number of heavy atoms there. */
uint32_t enl_draft_branch (const EnlDraft *draft, uint32_t inner, uint32_t outer, bool *part);
/* The branch as a molecule with '*' in place of `inner`. Caller: enl_molecule_free. */
EnlMolecule *enl_draft_branch_molecule (const EnlDraft *draft, uint32_t inner,
                                        uint32_t outer) ENL_MUST_USE;

/* Changes are collected, then made at once. */
typedef struct {
  const EnlDraft *draft;
  bool *gone;     /* per atom */
  bool *broken;   /* per bond */
  uint8_t *order; /* per bond */
  int *hydrogens; /* per atom: hydrogens to add */
  int *methyls;   /* per atom: methyl groups to add */
  bool any;
} EnlDraftEdit;

void enl_draft_edit_init (EnlDraftEdit *edit, const EnlDraft *draft);
void enl_draft_edit_clear (EnlDraftEdit *edit);
/* Takes the branch behind `inner`-`outer` off. */
void enl_draft_edit_cut (EnlDraftEdit *edit, uint32_t inner, uint32_t outer);
/* Opens a ring at a single bond; both ends are capped. */
void enl_draft_edit_open (EnlDraftEdit *edit, uint32_t bond);
/* The changed structure; the site stays. */
EnlDraft enl_draft_edit_make (const EnlDraftEdit *edit) ENL_MUST_USE;
