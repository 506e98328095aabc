#include "draw/outline.h"

#include <math.h>

#include "draw/plane.h"

#define HIT_RADIUS 0.24 /* bond lengths */

EnlOutline *
enl_outline_new (const EnlMolecule *mol, const EnlTheme *theme)
{
  g_assert (enl_molecule_has_layout (mol));
  EnlOutline *outline = g_new0 (EnlOutline, 1);
  uint32_t n = enl_molecule_atoms (mol);

  outline->mol = mol;
  outline->theme = theme;
  outline->n_atoms = n;
  outline->n_bonds = enl_molecule_bonds (mol);
  outline->at = g_new (EnlPoint, n);
  outline->label = g_new0 (EnlLabel, n);
  outline->force_label = g_new0 (bool, n);
  outline->hydrogen = g_new (EnlTone, n);
  outline->taken = enl_obstacles_new ();
  for (uint32_t i = 0; i < n; i++) {
    const EnlAtom *atom = enl_molecule_atom (mol, i);
    outline->at[i] = (EnlPoint){atom->x * theme->bond_length, -atom->y * theme->bond_length};
    outline->hydrogen[i] = ENL_N_TONES;
  }
  return outline;
}

void
enl_outline_free (EnlOutline *outline)
{
  if (!outline)
    return;
  for (uint32_t i = 0; i < outline->n_atoms; i++)
    for (uint32_t k = 0; k < outline->label[i].n_pieces; k++)
      g_free (outline->label[i].piece[k].markup);
  g_free (outline->at);
  g_free (outline->label);
  g_free (outline->force_label);
  g_free (outline->hydrogen);
  enl_obstacles_free (outline->taken);
  g_free (outline);
}

double
enl_outline_order (const EnlOutline *outline, uint32_t bond)
{
  if (outline->bond_order)
    return outline->bond_order[bond];
  return enl_molecule_bond (outline->mol, bond)->order;
}

typedef struct {
  double angle;
  uint32_t neighbour;
} Ray;

static int
compare_ray (const void *a, const void *b)
{
  double x = ((const Ray *)a)->angle, y = ((const Ray *)b)->angle;

  return (x > y) - (x < y);
}

/* The angle from one bond to the next is inside a ring when that ring has both. */
static bool
inside_ring (const EnlOutline *outline, uint32_t atom, const Ray *from, const Ray *to)
{
  for (uint32_t r = 0; r < enl_molecule_rings (outline->mol); r++) {
    uint32_t size, hits = 0;
    const uint32_t *member = enl_molecule_ring (outline->mol, r, &size);
    for (uint32_t k = 0; k < size; k++)
      hits += member[k] == atom || member[k] == from->neighbour || member[k] == to->neighbour;
    if (hits == 3 && to->angle - from->angle < G_PI)
      return true;
  }
  return false;
}

void
enl_outline_free_angle (const EnlOutline *outline, uint32_t atom, double *middle, double *size)
{
  uint32_t n = enl_molecule_degree (outline->mol, atom);
  g_autofree Ray *ray = g_new (Ray, n + 1);
  double best = -INFINITY;

  *middle = 0;
  *size = 2 * G_PI;
  if (n == 0)
    return;
  for (uint32_t k = 0; k < n; k++) {
    ray[k].neighbour = enl_molecule_neighbour (outline->mol, atom, k);
    ray[k].angle = enl_point_angle (outline->at[atom], outline->at[ray[k].neighbour]);
  }
  qsort (ray, n, sizeof *ray, compare_ray);
  ray[n] = (Ray){ray[0].angle + 2 * G_PI, ray[0].neighbour};
  for (uint32_t k = 0; k < n; k++) {
    double gap = ray[k + 1].angle - ray[k].angle;
    double score =
        gap - (n > 2 && inside_ring (outline, atom, &ray[k], &ray[k + 1]) ? G_PI / 2 : 0);
    if (score > best + 1e-6) {
      best = score;
      *size = gap;
      *middle = (ray[k + 1].angle + ray[k].angle) / 2;
    }
  }
}

EnlPoint
enl_outline_centre (const EnlOutline *outline)
{
  EnlPoint sum = {0, 0};

  for (uint32_t i = 0; i < outline->n_atoms; i++)
    sum = enl_point_add (sum, outline->at[i], 1.0 / outline->n_atoms);
  return sum;
}

EnlRect
enl_outline_atom_box (const EnlOutline *outline, uint32_t atom)
{
  const EnlLabel *label = &outline->label[atom];
  EnlRect box = {outline->at[atom].x, outline->at[atom].y, 0, 0};

  for (uint32_t k = 0; k < label->n_pieces; k++)
    box = k ? enl_rect_union (box, label->piece[k].box) : label->piece[k].box;
  return box;
}

void
enl_outline_draw_hit_areas (const EnlOutline *outline, EnlScene *scene)
{
  for (uint32_t i = 0; i < outline->n_atoms; i++) {
    EnlShape *disc = enl_scene_disc (scene, outline->at[i],
                                     HIT_RADIUS * outline->theme->bond_length, ENL_TONE_INK);
    disc->opacity = 0;
    disc->atom = i;
  }
}
