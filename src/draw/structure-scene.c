/* The structure of a substrate: from back to front the lit area, bonds, labels, drawn-out acidic
 * hydrogens, numbers and badges. */
#include "draw/structure-scene.h"

#include <math.h>

#include "draw/plane.h"
#include "draw/outline.h"
#include "draw/structure-sites.h"

static void
draw_number (EnlOutline *outline, EnlScene *scene, uint32_t atom)
{
  const EnlTheme *theme = outline->theme;
  uint32_t input = enl_molecule_atom (outline->mol, atom)->input;
  g_autofree char *text = g_strdup_printf ("%u", input ? input : atom + 1);
  EnlRect own = enl_outline_atom_box (outline, atom);
  EnlRect ink =
      enl_text_box (theme->family, (EnlPoint){0, 0}, text, theme->small_size, false, 0.5, 0.5);
  EnlPlaceQuery query = {.anchor = enl_rect_centre (own),
                         .clearance = 0.25 * fmin (own.width, own.height),
                         .width = ink.width,
                         .height = ink.height,
                         .pad = 1.5,
                         .hook = {ink.width / 2, ink.height / 2},
                         .reach = theme->bond_length,
                         .leader_gap = INFINITY};
  double free_angle;

  enl_outline_free_angle (outline, atom, &query.toward, &free_angle);
  EnlPlace place = enl_obstacles_place (outline->taken, &query);
  EnlPoint at = enl_rect_centre (place.box);
  at.x -= ink.x + ink.width / 2;
  at.y -= ink.y + ink.height / 2;
  EnlShape *shape =
      enl_scene_text (scene, at, text, theme->small_size, false, 0.5, 0.5, ENL_TONE_MUTED);
  shape->atom = atom;
  enl_obstacles_add_box (outline->taken, shape->box);
}

EnlScene *
enl_structure_scene (const EnlMolecule *mol, const EnlStructureLook *look, const EnlTheme *theme)
{
  static const EnlStructureLook bare = {.selected = ENL_NONE};
  EnlScene *scene = enl_scene_new (theme);
  g_autoptr (EnlOutline) outline = enl_outline_new (mol, theme);
  g_autoptr (EnlSitePlan) plan = enl_site_plan_new (outline, look ? look : &bare);

  enl_outline_plan_labels (outline);
  enl_site_plan_hydrogens (plan);
  enl_site_plan_draw_area (plan, scene);
  enl_outline_draw_bonds (outline, scene);
  enl_outline_draw_labels (outline, scene);
  enl_outline_draw_hit_areas (outline, scene);
  enl_site_plan_draw_hydrogens (plan, scene);
  if (look && look->numbers)
    for (uint32_t i = 0; i < outline->n_atoms; i++)
      draw_number (outline, scene, i);
  enl_site_plan_draw_badges (plan, scene);
  return scene;
}
