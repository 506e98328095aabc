#include "core/layout/quality.h"

#include <math.h>

#include "core/layout/layout.h"

/* An atom this near to another atom, or to a bond that is not its own, hides it (bond lengths). */
static const double hiding_distance = 0.25;

static void
measure_atoms (const EnlPicture *picture, EnlLayoutQuality *quality)
{
  for (uint32_t i = 0; i < picture->n_atoms; i++) {
    bool hides = false;
    for (uint32_t j = 0; j < picture->n_atoms; j++) {
      double distance = j == i ? INFINITY : enl_spot_distance (picture->spot[i], picture->spot[j]);
      quality->closest = fmin (quality->closest, distance);
      hides |= distance < hiding_distance;
    }
    for (uint32_t b = 0; b < picture->n_bonds && !hides; b++) {
      const uint32_t *end = picture->end[b];
      hides = end[0] != i && end[1] != i &&
              enl_spot_to_segment (picture->spot[i], picture->spot[end[0]], picture->spot[end[1]]) <
                  hiding_distance;
    }
    quality->overlaps += hides;
  }
}

static void
measure_bonds (const EnlPicture *picture, EnlLayoutQuality *quality)
{
  for (uint32_t b = 0; b < picture->n_bonds; b++) {
    const uint32_t *p = picture->end[b];
    double length = enl_spot_distance (picture->spot[p[0]], picture->spot[p[1]]);
    quality->shortest_bond = fmin (quality->shortest_bond, length);
    quality->longest_bond = fmax (quality->longest_bond, length);
    for (uint32_t c = 0; c < b; c++) {
      const uint32_t *q = picture->end[c];
      if (p[0] == q[0] || p[0] == q[1] || p[1] == q[0] || p[1] == q[1])
        continue;
      quality->crossings += enl_segments_cross (picture->spot[p[0]], picture->spot[p[1]],
                                                picture->spot[q[0]], picture->spot[q[1]]);
    }
  }
}

EnlLayoutQuality
enl_picture_quality (const EnlPicture *picture)
{
  EnlLayoutQuality quality = {.closest = INFINITY, .shortest_bond = INFINITY};

  measure_atoms (picture, &quality);
  measure_bonds (picture, &quality);
  return quality;
}

EnlLayoutQuality
enl_layout_quality (const EnlMolecule *mol)
{
  uint32_t n = enl_molecule_atoms (mol), m = enl_molecule_bonds (mol);
  g_autofree EnlSpot *spot = g_new (EnlSpot, n + 1);
  g_autofree uint32_t (*end)[2] = g_malloc_n (m + 1, sizeof *end);

  for (uint32_t i = 0; i < n; i++)
    spot[i] = (EnlSpot){enl_molecule_atom (mol, i)->x, enl_molecule_atom (mol, i)->y};
  for (uint32_t b = 0; b < m; b++) {
    end[b][0] = enl_molecule_bond (mol, b)->from;
    end[b][1] = enl_molecule_bond (mol, b)->to;
  }
  return enl_picture_quality (&(EnlPicture){n, m, spot, (const uint32_t (*)[2])end});
}
