/* The hierarchical digraph of one atom: the tree of all ways out of it.
 *
 * A multiple bond adds duplicates of its far atom, a ring that closes ends in a duplicate of the
 * atom that is met again; duplicates have no ligands. The tree is grown sphere by sphere, only
 * below ligands that still tie. In every sphere the sets of atoms are compared in the order that
 * the spheres before have given to their branches.
 */
#pragma once

#include "core/molecule/cip.h"

typedef enum {
  ENL_CIP_RULE_1A, /* higher atomic number first */
  ENL_CIP_RULE_1B, /* duplicate of an atom nearer to the root first */
  ENL_CIP_RULE_2,  /* higher mass number first */
  ENL_CIP_RULE_3,  /* Z before E before none */
  ENL_CIP_RULE_4A, /* R, S before r, s before none */
  ENL_CIP_RULE_4C, /* r before s */
  ENL_CIP_RULE_5,  /* R before S */
  ENL_CIP_RULES
} EnlCipRule;

/* Ligands of the root: atom index, or ENL_NONE for an unwritten hydrogen or lone pair. */
typedef struct {
  uint32_t count;
  uint32_t atom[5]; /* highest priority first */
  bool decided;     /* no two tie */
  EnlCipRule rule;  /* the last rule that was needed */
} EnlCipOrder;

/* Orders the ligands of `root`, `skip` (an atom or ENL_NONE) left out, by the rules up to `last`.
 * Labels of other units, as known so far, serve rules 3 to 5. */
EnlCipOrder enl_cip_order (const EnlMolecule *mol, uint32_t root, uint32_t skip, EnlCipRule last,
                           const EnlCip *atom_label, const EnlCip *bond_label);
