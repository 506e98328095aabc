/* One contributor with its charges, lone pairs and curved arrows; and the hybrid of them all. */
#include <math.h>

#include "draw/badge.h"
#include "draw/curved-arrow.h"
#include "draw/outline.h"
#include "draw/paint.h"
#include "draw/plane.h"
#include "draw/structure-scene.h"

#define DISC_AT_ONE  0.52 /* radius for a whole elementary charge, bond lengths; area is charge */
#define DISC_OPACITY 0.26
#define SEEN_CHARGE  0.06 /* elementary charges; smaller ones are not shown */

/* A stereo bond is kept where its centre is still tetrahedral. */
static void
copy_wedge (EnlMolecule *copy, const EnlMolecule *layout, uint32_t bond)
{
  EnlBond *to = enl_molecule_edit_bond (copy, bond);
  uint32_t old = enl_molecule_bond_between (layout, to->from, to->to);

  to->wedge = ENL_WEDGE_NONE;
  if (old == ENL_NONE)
    return;
  const EnlBond *from = enl_molecule_bond (layout, old);
  if (from->wedge == ENL_WEDGE_NONE || to->order != 1 ||
      enl_molecule_atom (copy, from->from)->charge < 0 ||
      enl_molecule_order_sum (copy, from->from) != enl_molecule_degree (copy, from->from))
    return;
  if (to->from != from->from) {
    uint32_t end = to->from, side = to->side_from;
    to->from = to->to;
    to->to = end;
    to->side_from = to->side_to;
    to->side_to = side;
  }
  to->wedge = from->wedge;
}

static EnlMolecule *
with_layout (const EnlMolecule *mol, const EnlMolecule *layout)
{
  EnlMolecule *copy = enl_molecule_copy (mol);

  g_assert (enl_molecule_has_layout (layout));
  g_assert (enl_molecule_atoms (mol) == enl_molecule_atoms (layout));
  for (uint32_t i = 0; i < enl_molecule_atoms (copy); i++) {
    enl_molecule_edit_atom (copy, i)->x = enl_molecule_atom (layout, i)->x;
    enl_molecule_edit_atom (copy, i)->y = enl_molecule_atom (layout, i)->y;
  }
  for (uint32_t i = 0; i < enl_molecule_bonds (copy); i++)
    copy_wedge (copy, layout, i);
  enl_molecule_finish (copy);
  enl_molecule_set_has_layout (copy, true);
  return copy;
}

/* The negative end of a drawn dipole (nitro, N-oxide, ylide) is no anionic centre. */
static bool
anionic_centre (const EnlMolecule *mol, uint32_t atom)
{
  if (enl_molecule_atom (mol, atom)->charge >= 0)
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t next = enl_molecule_neighbour (mol, atom, k);
    int balance = enl_molecule_atom (mol, next)->charge;
    if (balance <= 0)
      continue;
    bool lightest = true; /* of two negative ends, the carbanion is the centre */
    for (uint32_t j = 0; j < enl_molecule_degree (mol, next); j++) {
      const EnlAtom *end = enl_molecule_atom (mol, enl_molecule_neighbour (mol, next, j));
      balance += MIN (0, end->charge);
      if (end->charge < 0 && end->element < enl_molecule_atom (mol, atom)->element)
        lightest = false;
    }
    if (balance >= 0 || !lightest)
      return false;
  }
  return true;
}

static const EnlArrow *
arrow_from (const EnlArrow *arrow, uint32_t n, uint32_t atom)
{
  for (uint32_t i = 0; i < n; i++)
    if (arrow[i].from_b == ENL_NONE && arrow[i].from_a == atom)
      return &arrow[i];
  return NULL;
}

EnlScene *
enl_form_scene (const EnlMolecule *form, const EnlMolecule *layout, const EnlArrow *arrow,
                uint32_t n_arrows, const EnlTheme *theme)
{
  EnlScene *scene = enl_scene_new (theme);
  g_autoptr (EnlMolecule) mol = with_layout (form, layout);
  g_autoptr (EnlOutline) outline = enl_outline_new (mol, theme);
  g_autofree EnlLonePair *pair = g_new0 (EnlLonePair, outline->n_atoms);

  enl_outline_plan_labels (outline);
  enl_outline_draw_bonds (outline, scene);
  enl_outline_draw_labels (outline, scene);
  enl_outline_draw_hit_areas (outline, scene);
  for (uint32_t i = 0; i < outline->n_atoms; i++) {
    const EnlArrow *start = arrow_from (arrow, n_arrows, i);
    if (start || anionic_centre (mol, i))
      pair[i] = enl_lone_pair_draw (outline, scene, i, start);
  }
  for (uint32_t i = 0; i < n_arrows; i++)
    enl_curved_arrow_draw (outline, scene, &arrow[i], pair);
  return scene;
}

/* ---- hybrid ---- */

static double
charge_radius (const EnlOutline *outline, double charge)
{
  return DISC_AT_ONE * outline->theme->bond_length * sqrt (fabs (charge));
}

static void
draw_charge_area (const EnlOutline *outline, EnlScene *scene, uint32_t atom, double charge)
{
  double radius = charge_radius (outline, charge);
  EnlTone tone = charge < 0 ? ENL_TONE_CHARGE : ENL_TONE_CHARGE_PLUS;
  EnlShape *disc = enl_scene_disc (scene, outline->at[atom], radius, tone);

  disc->atom = atom;
  disc->opacity = DISC_OPACITY;
  if (charge > 0) { /* a broken rim repeats what the colour says */
    EnlShape *rim = enl_scene_disc (scene, outline->at[atom], radius, tone);
    rim->atom = atom;
    rim->width = 0.7 * outline->theme->bond_width;
    rim->dash = ENL_DASH_DASHED;
  }
}

static char *
charge_text (double charge)
{
  char digits[G_ASCII_DTOSTR_BUF_SIZE];

  g_ascii_formatd (digits, sizeof digits, "%.2f", fabs (charge));
  return g_strconcat (charge < 0 ? "\u2212" : "+", digits, NULL);
}

static void
draw_charge_number (EnlOutline *outline, EnlScene *scene, uint32_t atom, double charge)
{
  const EnlTheme *theme = outline->theme;
  g_autofree char *text = charge_text (charge);
  EnlRect ink =
      enl_text_box (theme->family, (EnlPoint){0, 0}, text, theme->small_size, true, 0.5, 0.5);
  EnlRect own = enl_outline_atom_box (outline, atom);
  EnlPlaceQuery query = {
      .anchor = outline->at[atom],
      .clearance = fmax (0.3 * fmin (own.width, own.height), charge_radius (outline, charge)),
      .width = ink.width,
      .height = ink.height,
      .pad = 0.06 * theme->bond_length,
      .hook = {ink.width / 2, ink.height / 2},
      .reach = 2 * theme->bond_length,
      .leader_gap = theme->bond_length};
  double ignored;

  enl_outline_free_angle (outline, atom, &query.toward, &ignored);
  EnlPlace place = enl_obstacles_place (outline->taken, &query);
  EnlPoint at = enl_rect_centre (place.box);
  at.x -= ink.x + ink.width / 2;
  at.y -= ink.y + ink.height / 2;
  EnlShape *shape = enl_scene_text (scene, at, text, theme->small_size, true, 0.5, 0.5,
                                    charge < 0 ? ENL_TONE_CHARGE : ENL_TONE_CHARGE_PLUS);
  shape->atom = atom;
  enl_obstacles_add_box (outline->taken, shape->box);
}

EnlScene *
enl_hybrid_scene (const EnlForms *forms, const EnlMolecule *layout, const EnlTheme *theme)
{
  EnlScene *scene = enl_scene_new (theme);
  g_autoptr (EnlMolecule) mol = with_layout (forms->anion, layout);
  g_autoptr (EnlOutline) outline = enl_outline_new (mol, theme);

  outline->bond_order = forms->bond_order;
  outline->hide_charges = true;
  enl_outline_plan_labels (outline);
  for (uint32_t i = 0; i < outline->n_atoms; i++)
    if (fabs (forms->charge[i]) >= SEEN_CHARGE) {
      double inner = 0.8 * charge_radius (outline, forms->charge[i]);
      draw_charge_area (outline, scene, i, forms->charge[i]);
      enl_obstacles_add_box (
          outline->taken,
          (EnlRect){outline->at[i].x - inner, outline->at[i].y - inner, 2 * inner, 2 * inner});
    }
  enl_outline_draw_bonds (outline, scene);
  enl_outline_draw_labels (outline, scene);
  enl_outline_draw_hit_areas (outline, scene);
  for (uint32_t i = 0; i < outline->n_atoms; i++)
    if (fabs (forms->charge[i]) >= SEEN_CHARGE)
      draw_charge_number (outline, scene, i, forms->charge[i]);
  return scene;
}
