#include "core/layout/hydrogens.h"

#include <math.h>

#include "core/layout/geometry.h"

bool
enl_hydrogen_hangs (const EnlMolecule *mol, uint32_t atom)
{
  return enl_molecule_atom (mol, atom)->element == 1 && enl_molecule_degree (mol, atom) == 1 &&
         enl_molecule_atom (mol, enl_molecule_neighbour (mol, atom, 0))->element != 1;
}

static EnlSpot
spot_of (const EnlMolecule *mol, uint32_t atom)
{
  return (EnlSpot){enl_molecule_atom (mol, atom)->x, enl_molecule_atom (mol, atom)->y};
}

/* Hanging hydrogens of `atom` by rank into `hung`, directions of the other neighbours into
 * `taken`. */
static uint32_t
gather_neighbours (const EnlMolecule *mol, const uint32_t *rank, uint32_t atom, uint32_t *hung,
                   double *taken, uint32_t *n_taken)
{
  EnlSpot centre = spot_of (mol, atom);
  uint32_t n_hung = 0;

  *n_taken = 0;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (!enl_hydrogen_hangs (mol, other)) {
      EnlSpot out = enl_spot_minus (spot_of (mol, other), centre);
      taken[(*n_taken)++] = atan2 (out.y, out.x);
      continue;
    }
    uint32_t at = n_hung++;
    for (; at > 0 && rank[hung[at - 1]] > rank[other]; at--)
      hung[at] = hung[at - 1];
    hung[at] = other;
  }
  return n_hung;
}

/* Room around `spot`: distance to the nearest placed atom that is not `centre`, at most 1. */
static double
room_at (const EnlMolecule *mol, EnlSpot spot, uint32_t centre, const bool *placed)
{
  double room = 1;

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    if (placed[i] && i != centre)
      room = fmin (room, enl_spot_distance (spot, spot_of (mol, i)));
  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    const EnlBond *bond = enl_molecule_bond (mol, b);
    if (placed[bond->from] && placed[bond->to] && bond->from != centre && bond->to != centre)
      room = fmin (room,
                   enl_spot_to_segment (spot, spot_of (mol, bond->from), spot_of (mol, bond->to)));
  }
  return room;
}

static EnlSpot
beside (EnlSpot centre, double angle, double length)
{
  return (EnlSpot){centre.x + length * cos (angle), centre.y + length * sin (angle)};
}

/* Turns of the whole group of hydrogens that are tried, mildest first, and bond lengths. */
static const double trial_turn[] = {0, 15, -15, 30, -30, 45, -45, 60, -60, 120, -120, 180};
static const double trial_length[] = {1.0, 0.85, 0.7};

/* The best of the trials by the least room of its hydrogens; a milder trial wins a near draw. */
static void
choose_places (const EnlMolecule *mol, uint32_t atom, const double *made, uint32_t n,
               const bool *placed, EnlSpot *best)
{
  const double worth_it = 0.08, enough = 0.6;
  double best_room = -1;

  for (size_t l = 0; l < ENL_COUNT (trial_length); l++) {
    for (size_t t = 0; t < ENL_COUNT (trial_turn); t++) {
      double room = 1;
      for (uint32_t k = 0; k < n; k++) {
        double angle = made[k] + trial_turn[t] * G_PI / 180;
        room = fmin (room, room_at (mol, beside (spot_of (mol, atom), angle, trial_length[l]), atom,
                                    placed));
      }
      if (room <= best_room + worth_it)
        continue;
      best_room = room;
      for (uint32_t k = 0; k < n; k++)
        best[k] =
            beside (spot_of (mol, atom), made[k] + trial_turn[t] * G_PI / 180, trial_length[l]);
    }
    if (best_room >= enough)
      return;
  }
}

static void
place_around (EnlMolecule *mol, const uint32_t *rank, uint32_t atom, bool *placed)
{
  uint32_t degree = enl_molecule_degree (mol, atom), n_taken;
  g_autofree uint32_t *hung = g_new (uint32_t, degree + 1);
  g_autofree double *angle = g_new (double, 2 * degree + 2);
  g_autofree EnlSpot *spot = g_new0 (EnlSpot, degree + 1);
  double *made = angle + degree + 1;
  uint32_t n = gather_neighbours (mol, rank, atom, hung, angle, &n_taken);

  if (n == 0)
    return;
  enl_spread_directions (angle, n_taken, made, n);
  choose_places (mol, atom, made, n, placed, spot);
  for (uint32_t k = 0; k < n; k++) {
    EnlAtom *hydrogen = enl_molecule_edit_atom (mol, hung[k]);
    hydrogen->x = spot[k].x;
    hydrogen->y = spot[k].y;
    placed[hung[k]] = true;
  }
}

void
enl_hydrogens_place (EnlMolecule *mol, const uint32_t *rank)
{
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree bool *placed = g_new (bool, n + 1);
  g_autofree uint32_t *at_rank = g_new (uint32_t, n + 1);

  for (uint32_t i = 0; i < n; i++) {
    placed[i] = !enl_hydrogen_hangs (mol, i);
    at_rank[rank[i]] = i;
  }
  for (uint32_t r = 0; r < n; r++)
    if (placed[at_rank[r]] && enl_molecule_atom (mol, at_rank[r])->element != 1)
      place_around (mol, rank, at_rank[r], placed);
}
