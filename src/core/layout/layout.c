#include "core/layout/layout.h"

#include <math.h>
#include <stdlib.h>

#include "core/layout/fragment.h"
#include "core/layout/hydrogens.h"
#include "core/molecule/stereo.h"
#include "core/molecule/symmetry.h"

/* Room between fragments that stand side by side, in bond lengths. */
static const double fragment_gap = 1.5;

typedef struct {
  uint32_t index, heavy, best_rank;
} Fragment;

/* Large fragments first; equal ones by rank, so that the input order does not show. */
static int
compare_fragments (const void *a, const void *b)
{
  const Fragment *p = a, *q = b;

  if (p->heavy != q->heavy)
    return p->heavy > q->heavy ? -1 : 1;
  return (p->best_rank > q->best_rank) - (p->best_rank < q->best_rank);
}

static Fragment *
order_fragments (const EnlMolecule *mol, const uint32_t *rank, const uint32_t *of, uint32_t n)
{
  Fragment *list = g_new0 (Fragment, n + 1);

  for (uint32_t f = 0; f < n; f++)
    list[f] = (Fragment){.index = f, .best_rank = ENL_NONE};
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    list[of[i]].heavy += enl_molecule_atom (mol, i)->element != 1;
    list[of[i]].best_rank = MIN (list[of[i]].best_rank, rank[i]);
  }
  qsort (list, n, sizeof *list, compare_fragments);
  return list;
}

static void
lay_out_fragment (EnlMolecule *mol, const uint32_t *rank, const uint32_t *of, uint32_t fragment,
                  const EnlTemplates *templates)
{
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree bool *keep = g_new (bool, n + 1);

  for (uint32_t i = 0; i < n; i++)
    keep[i] = of[i] == fragment && !enl_hydrogen_hangs (mol, i);
  g_autoptr (EnlSketch) sketch = enl_sketch_new (mol, rank, keep);
  enl_fragment_draw (sketch, templates);
  for (uint32_t i = 0; i < sketch->n_atoms; i++) {
    EnlAtom *atom = enl_molecule_edit_atom (mol, sketch->atom[i].source);
    atom->x = sketch->spot[i].x;
    atom->y = sketch->spot[i].y;
  }
}

/* Shifts the fragment so that its box starts at `left` and is centred on y = 0; hydrogens that are
 * not placed yet do not count, but move along. Returns the right edge. */
static double
shift_fragment (EnlMolecule *mol, const uint32_t *of, uint32_t fragment, bool with_hydrogens,
                double left)
{
  double low_x = INFINITY, high_x = -INFINITY, low_y = INFINITY, high_y = -INFINITY;
  uint32_t n = enl_molecule_atoms (mol);

  for (uint32_t i = 0; i < n; i++) {
    const EnlAtom *atom = enl_molecule_atom (mol, i);
    if (of[i] != fragment || (!with_hydrogens && enl_hydrogen_hangs (mol, i)))
      continue;
    low_x = fmin (low_x, atom->x), high_x = fmax (high_x, atom->x);
    low_y = fmin (low_y, atom->y), high_y = fmax (high_y, atom->y);
  }
  for (uint32_t i = 0; i < n; i++) {
    if (of[i] != fragment)
      continue;
    EnlAtom *atom = enl_molecule_edit_atom (mol, i);
    atom->x += left - low_x;
    atom->y -= (low_y + high_y) / 2;
  }
  return left + high_x - low_x;
}

static void
set_side_by_side (EnlMolecule *mol, const uint32_t *of, const Fragment *list, uint32_t n,
                  bool with_hydrogens)
{
  double left = 0;

  for (uint32_t k = 0; k < n; k++)
    left = shift_fragment (mol, of, list[k].index, with_hydrogens, left) + fragment_gap;
}

static bool
all_finite (const EnlMolecule *mol)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    if (!isfinite (enl_molecule_atom (mol, i)->x) || !isfinite (enl_molecule_atom (mol, i)->y))
      return false;
  return true;
}

EnlStatus
enl_layout (EnlMolecule *mol, EnlError *err)
{
  uint32_t n = enl_molecule_atoms (mol);
  if (n > ENL_LAYOUT_MAX_ATOMS)
    return enl_error_set (
        err, ENL_ERROR_LIMIT, "give coordinates with it or use a smaller structure",
        "a picture of %u atoms is too large to lay out (at most %d)", n, ENL_LAYOUT_MAX_ATOMS);
  g_autofree uint32_t *rank = g_new0 (uint32_t, n + 1);
  g_autofree uint32_t *of = g_new0 (uint32_t, n + 1);

  enl_canonical_ranks (mol, rank);
  uint32_t n_fragments = enl_molecule_fragments (mol, of);
  g_autofree Fragment *list = order_fragments (mol, rank, of, n_fragments);
  g_autoptr (EnlTemplates) templates = enl_templates_new ();
  for (uint32_t k = 0; k < n_fragments; k++)
    lay_out_fragment (mol, rank, of, list[k].index, templates);
  set_side_by_side (mol, of, list, n_fragments, false);
  enl_hydrogens_place (mol, rank);
  set_side_by_side (mol, of, list, n_fragments, true);
  if (!all_finite (mol))
    return enl_error_set (err, ENL_ERROR_NUMERIC, "draw it by hand or give coordinates",
                          "no picture of this structure was found");
  enl_molecule_set_has_layout (mol, true);
  enl_stereo_draw_wedges (mol);
  return ENL_OK;
}
