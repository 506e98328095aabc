#include "core/acidity/form-arrow.h"

#include <stdlib.h>

typedef struct {
  const EnlMolecule *mol;
  int8_t *bond;   /* pi bonds still to come (positive) or to go */
  int8_t *charge; /* rise of charge still to explain */
  GArray *arrow;
  bool stuck;
} Walk;

static void
add_arrow (Walk *w, uint32_t from_a, uint32_t from_b, uint32_t to_a, uint32_t to_b)
{
  EnlArrow arrow = {from_a, from_b, to_a, to_b};

  g_array_append_val (w->arrow, arrow);
}

/* A bond at `atom` that comes (`sign` 1) or goes (-1), or ENL_NONE. */
static uint32_t
find_bond (const Walk *w, uint32_t atom, int sign)
{
  for (uint32_t k = 0; k < enl_molecule_degree (w->mol, atom); k++) {
    uint32_t bond = enl_molecule_bond_at (w->mol, atom, k);
    if (w->bond[bond] * sign > 0)
      return bond;
  }
  return ENL_NONE;
}

static uint32_t
take (Walk *w, uint32_t bond, uint32_t atom)
{
  w->bond[bond] = (int8_t)(w->bond[bond] - (w->bond[bond] > 0 ? 1 : -1));
  return enl_molecule_other_end (w->mol, bond, atom);
}

/* From `at`, where a new bond has just arrived, the old bond goes on: either into the next bond or
 * into a lone pair, where the path ends. A round ends at `start`, where its first bond had gone. */
static void
follow (Walk *w, uint32_t at, uint32_t start)
{
  while (at != start) {
    uint32_t gone = find_bond (w, at, -1);
    if (gone == ENL_NONE) {
      w->stuck = true;
      return;
    }
    uint32_t far = take (w, gone, at);
    if (w->charge[far] < 0) {
      w->charge[far]++;
      add_arrow (w, at, far, far, ENL_NONE);
      return;
    }
    uint32_t next = find_bond (w, far, 1);
    if (next == ENL_NONE) {
      w->stuck = true;
      return;
    }
    uint32_t end = take (w, next, far);
    add_arrow (w, at, far, far, end);
    at = end;
  }
}

static void
walk_path (Walk *w, uint32_t atom)
{
  uint32_t bond = find_bond (w, atom, 1);

  w->charge[atom]--;
  if (bond == ENL_NONE) {
    w->stuck = true;
    return;
  }
  uint32_t end = take (w, bond, atom);
  add_arrow (w, atom, ENL_NONE, atom, end);
  follow (w, end, ENL_NONE);
}

static void
walk_round (Walk *w, uint32_t bond)
{
  uint32_t start = enl_molecule_bond (w->mol, bond)->from;
  uint32_t far = take (w, bond, start), next = find_bond (w, far, 1);

  if (next == ENL_NONE) {
    w->stuck = true;
    return;
  }
  uint32_t end = take (w, next, far);
  add_arrow (w, start, far, far, end);
  follow (w, end, start);
}

EnlArrow *
enl_form_arrows (const EnlMolecule *mol, EnlFormView from, EnlFormView to, uint32_t *n)
{
  uint32_t n_atoms = enl_molecule_atoms (mol), n_bonds = enl_molecule_bonds (mol);
  g_autofree int8_t *bond = g_new0 (int8_t, n_bonds + 1);
  g_autofree int8_t *charge = g_new0 (int8_t, n_atoms + 1);
  Walk w = {.mol = mol, .bond = bond, .charge = charge};

  w.arrow = g_array_new (FALSE, FALSE, sizeof (EnlArrow));
  for (uint32_t b = 0; b < n_bonds; b++)
    bond[b] = (int8_t)(to.order[b] - from.order[b]);
  for (uint32_t i = 0; i < n_atoms; i++)
    charge[i] = (int8_t)(to.charge[i] - from.charge[i]);
  for (uint32_t i = 0; i < n_atoms; i++)
    while (!w.stuck && charge[i] > 0)
      walk_path (&w, i);
  for (uint32_t b = 0; b < n_bonds; b++)
    while (!w.stuck && bond[b] < 0)
      walk_round (&w, b);
  if (w.stuck)
    g_array_set_size (w.arrow, 0);
  *n = w.arrow->len;
  return (EnlArrow *)(void *)g_array_free (w.arrow, w.arrow->len == 0);
}
