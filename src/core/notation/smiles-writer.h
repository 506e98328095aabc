/* Shared inside the SMILES writer: the walk over the molecule and the direction marks. */
#pragma once

#include "core/molecule/graph.h"
#include "core/notation/smiles.h"

typedef enum { ENL_ROLE_UNSEEN = 0, ENL_ROLE_TREE, ENL_ROLE_RING } EnlBondRole;

/* The order in which a SMILES visits a molecule: a spanning forest and its ring closures. */
typedef struct {
  const EnlMolecule *mol;
  const EnlGraph *graph; /* stereo units; their values say what is written */
  EnlSmilesFlags flags;
  uint32_t atoms;
  const uint32_t *rank;  /* steers starts and branches */
  uint32_t *parent;      /* atom before this one in the tree, or ENL_NONE */
  uint32_t *visit;       /* written position of the atom */
  uint32_t *written;     /* atom at a written position */
  uint32_t *size;        /* atoms in the branch that starts here */
  uint8_t *role;         /* per bond, EnlBondRole */
  uint8_t *order;        /* per bond, the order to write */
  int8_t *mark;          /* per bond: +1 for '/', -1 for '\', in written direction */
  int8_t *hydrogen_mark; /* per atom: the same for a hydrogen that is written for its mark */
} EnlSmilesWalk;

/* Chooses marks such that every double-bond unit with a value is stated, each once, neighbouring
 * units agree on bonds they share, and no other double bond is stated by accident. */
void enl_smiles_choose_marks (EnlSmilesWalk *walk);

/* Sets `order` of aromatic bonds to the alternation that follows from the ranks alone. */
void enl_smiles_place_double_bonds (EnlSmilesWalk *walk);

/* Children of `atom` in the order of writing; returns how many. `list` has room for its degree. */
uint32_t enl_smiles_children (const EnlSmilesWalk *walk, uint32_t atom, uint32_t *list);
