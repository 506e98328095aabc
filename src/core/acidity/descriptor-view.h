/* What the parts of the descriptor code see of one site; private to them. */
#pragma once

#include "core/acidity/descriptor.h"

#define ENL_VIEW_MAX 16

typedef struct {
  EnlSurvey *survey;
  const EnlMolecule *mol;
  const EnlPiChange *change;
  const uint32_t *distance; /* bonds from the site */
  uint32_t site;
  uint8_t element;
  bool carbon;
  uint32_t next[ENL_VIEW_MAX]; /* neighbours that are no hydrogen atoms */
  uint32_t n_next;
  uint32_t acceptor[ENL_VIEW_MAX]; /* those of them that conjugate through C=O, C=N, NO2 ... */
  uint32_t n_acceptors;
  double *value; /* the descriptors */
} EnlSiteView;

void enl_view_fill_atom (EnlSiteView *view);
void enl_view_fill_pi (EnlSiteView *view);
void enl_view_fill_groups (EnlSiteView *view);
void enl_view_fill_rings (EnlSiteView *view);
void enl_view_fill_shape (EnlSiteView *view);
void enl_view_fill_polar (EnlSiteView *view);
void enl_view_fill_ring_sums (EnlSiteView *view);

/* Number of neighbours of the site of a kind, once enl_view_fill_groups has run. */
static inline double
enl_view_next (const EnlSiteView *view, int kind)
{
  return view->value[ENL_D_next + kind];
}

/* The ring, as enl_molecule_ring gives it, holds the atom. */
static inline bool
enl_ring_holds (const uint32_t *ring, uint32_t size, uint32_t atom)
{
  for (uint32_t k = 0; k < size; k++)
    if (ring[k] == atom)
      return true;
  return false;
}

static inline bool
enl_ring_is_aromatic (const EnlMolecule *mol, const uint32_t *ring, uint32_t size)
{
  for (uint32_t k = 0; k < size; k++)
    if (!enl_molecule_atom (mol, ring[k])->aromatic)
      return false;
  return true;
}
