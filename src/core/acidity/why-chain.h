/* The acids between a molecule and its parent, each one idea simpler than the one before. */
#pragma once

#include "core/molecule/molecule.h"

/* Structures of a chain at most, the molecule and its parent included: each costs a prediction. */
#define ENL_WHY_MAX_LINKS 10

typedef struct {
  EnlMolecule *mol; /* finished */
  uint32_t site;    /* the acidic atom */
  char *words;      /* what the link before has and this one has not; NULL for the first */
} EnlWhyLink;

typedef struct {
  EnlWhyLink link[ENL_WHY_MAX_LINKS];
  uint32_t n; /* at least 1 */
} EnlWhyChain;

/* `mol` has one fragment. The same chain comes out for every order of atoms. */
EnlWhyChain *enl_why_chain_new (const EnlMolecule *mol, uint32_t site) ENL_MUST_USE;
void enl_why_chain_free (EnlWhyChain *chain);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlWhyChain, enl_why_chain_free)
