#include "draw/structure-sites.h"

#include <math.h>

#include "draw/plane.h"

#define CARBON 6

#define H_BOND      0.60 /* from the atom to the middle of its drawn-out H, bond lengths */
#define H_SIZE      0.80 /* of the atom label size; stays above 20 px in the projector theme */
#define H_SPREAD    (G_PI / 5.4) /* of two hydrogens from the middle of the free angle */
#define AREA_WIDTH  0.58         /* of the lit area, bond lengths */
#define SEEN_CHARGE 0.10  /* elementary charges; an atom with less does not light up by itself */
#define SEEN_WEIGHT 0.004 /* of a form whose bonds are lit */

static bool
has_sites (const EnlStructureLook *look)
{
  return look->sites && look->sites->n_sites > 0;
}

EnlTone
enl_site_tone (const EnlStructureLook *look, uint32_t site)
{
  return site == look->selected ? ENL_TONE_ACTIVE : ENL_TONE_SITE;
}

/* A methyl reads best as CH3; one or two hydrogens read best on bonds of their own. */
static bool
wants_label (const EnlMolecule *mol, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (mol, atom);

  return a->element != CARBON || a->hydrogens > 2;
}

EnlSitePlan *
enl_site_plan_new (EnlOutline *outline, const EnlStructureLook *look)
{
  EnlSitePlan *plan = g_new0 (EnlSitePlan, 1);

  plan->outline = outline;
  plan->look = look;
  plan->site_of = g_new (uint32_t, outline->n_atoms);
  plan->hydrogen = g_array_new (FALSE, FALSE, sizeof (EnlDrawnHydrogen));
  for (uint32_t i = 0; i < outline->n_atoms; i++)
    plan->site_of[i] = ENL_NONE;
  for (uint32_t s = 0; has_sites (look) && s < look->sites->n_sites; s++) {
    const EnlSite *site = &look->sites->site[s];
    for (uint32_t k = 0; k < site->n_atoms; k++) {
      uint32_t atom = site->atom[k];
      g_assert (atom < outline->n_atoms);
      plan->site_of[atom] = s;
      outline->hydrogen[atom] = enl_site_tone (look, s);
      outline->force_label[atom] = wants_label (outline->mol, atom);
    }
  }
  return plan;
}

void
enl_site_plan_free (EnlSitePlan *plan)
{
  if (plan) {
    g_free (plan->site_of);
    g_array_unref (plan->hydrogen);
    g_free (plan);
  }
}

/* ---- drawn-out hydrogens ---- */

static EnlDrawnHydrogen
hydrogen_at (const EnlSitePlan *plan, uint32_t atom, double angle)
{
  const EnlTheme *theme = plan->outline->theme;
  EnlDrawnHydrogen h = {.atom = atom, .site = plan->site_of[atom]};

  h.at =
      enl_point_add (plan->outline->at[atom], enl_point_polar (angle), H_BOND * theme->bond_length);
  h.box = enl_text_box (theme->family, h.at, "H", H_SIZE * theme->atom_size, false, 0.5, 0.5);
  return h;
}

static double
collision (const EnlSitePlan *plan, const EnlDrawnHydrogen *h)
{
  return enl_obstacles_in_box (plan->outline->taken, enl_rect_grow (h->box, 1.5));
}

static void
keep_hydrogen (EnlSitePlan *plan, const EnlDrawnHydrogen *h)
{
  g_array_append_val (plan->hydrogen, *h);
  enl_obstacles_add_box (plan->outline->taken, h->box);
  enl_obstacles_add_line (plan->outline->taken, plan->outline->at[h->atom], h->at,
                          plan->outline->theme->bond_width);
}

/* Tries the free angle's middle, then turns to both sides. */
static bool
draw_out (EnlSitePlan *plan, uint32_t atom)
{
  static const double turn[] = {0, 0.2, -0.2, 0.4, -0.4, 0.6, -0.6};
  uint32_t count = enl_molecule_atom (plan->outline->mol, atom)->hydrogens;
  double middle, size;

  enl_outline_free_angle (plan->outline, atom, &middle, &size);
  double spread = count == 2 ? fmin (H_SPREAD, size / 5) : 0;
  for (uint32_t i = 0; i < ENL_COUNT (turn); i++) {
    double angle = middle + turn[i] * size / 4;
    EnlDrawnHydrogen h[2] = {hydrogen_at (plan, atom, angle + spread),
                             hydrogen_at (plan, atom, angle - spread)};
    bool apart = count == 1 || enl_rect_overlap (h[0].box, h[1].box) == 0;
    if (!apart || collision (plan, &h[0]) > 0 || (count == 2 && collision (plan, &h[1]) > 0))
      continue;
    for (uint32_t k = 0; k < count; k++)
      keep_hydrogen (plan, &h[k]);
    return true;
  }
  return false;
}

void
enl_site_plan_hydrogens (EnlSitePlan *plan)
{
  for (uint32_t i = 0; i < plan->outline->n_atoms; i++) {
    if (plan->site_of[i] == ENL_NONE || plan->outline->label[i].shown)
      continue;
    if (enl_molecule_atom (plan->outline->mol, i)->hydrogens == 0)
      continue; /* its hydrogens are atoms of their own */
    if (!draw_out (plan, i))
      enl_outline_plan_label (plan->outline, i);
  }
}

void
enl_site_plan_draw_hydrogens (const EnlSitePlan *plan, EnlScene *scene)
{
  const EnlTheme *theme = plan->outline->theme;

  for (guint i = 0; i < plan->hydrogen->len; i++) {
    const EnlDrawnHydrogen *h = &g_array_index (plan->hydrogen, EnlDrawnHydrogen, i);
    EnlPoint from = plan->outline->at[h->atom];
    EnlTone tone = enl_site_tone (plan->look, h->site);
    EnlPoint u = enl_point_direction (from, h->at);
    EnlRect room = enl_rect_grow (h->box, 0.1 * theme->atom_size);
    double length = enl_point_distance (from, h->at) - enl_segment_inside (from, h->at, room);
    EnlShape *shape = enl_scene_line (scene, from, enl_point_add (from, u, length),
                                      0.8 * theme->bond_width, tone);
    shape->site = h->site;
    shape->atom = h->atom;
    shape = enl_scene_text (scene, h->at, "H", H_SIZE * theme->atom_size, false, 0.5, 0.5, tone);
    shape->site = h->site;
    shape->atom = h->atom;
  }
}

/* ---- the lit system ---- */

static bool
bond_changes (const EnlForms *forms, uint32_t bond)
{
  for (uint32_t f = 1; f < forms->n_forms; f++)
    if (forms->form[f].weight > SEEN_WEIGHT &&
        forms->form[f].order[bond] != forms->form[0].order[bond])
      return true;
  return false;
}

static void
light_atom (const EnlSitePlan *plan, EnlScene *scene, uint32_t atom)
{
  double radius = AREA_WIDTH / 2 * plan->outline->theme->bond_length;

  enl_scene_disc (scene, plan->outline->at[atom], radius, ENL_TONE_ACTIVE_SOFT)->site =
      plan->look->selected;
}

static void
light_system (const EnlSitePlan *plan, EnlScene *scene, const EnlForms *forms)
{
  const EnlMolecule *mol = plan->outline->mol;

  for (uint32_t i = 0; i < MIN (plan->outline->n_bonds, enl_molecule_bonds (forms->anion)); i++) {
    const EnlBond *bond = enl_molecule_bond (mol, i);
    if (!bond_changes (forms, i))
      continue;
    enl_scene_line (scene, plan->outline->at[bond->from], plan->outline->at[bond->to],
                    AREA_WIDTH * plan->outline->theme->bond_length, ENL_TONE_ACTIVE_SOFT)
        ->site = plan->look->selected;
  }
  for (uint32_t i = 0; i < MIN (plan->outline->n_atoms, enl_molecule_atoms (forms->anion)); i++)
    if (fabs (forms->charge[i]) > SEEN_CHARGE && enl_molecule_atom (mol, i)->charge == 0)
      light_atom (plan, scene, i);
}

void
enl_site_plan_draw_area (const EnlSitePlan *plan, EnlScene *scene)
{
  if (!has_sites (plan->look) || plan->look->selected >= plan->look->sites->n_sites)
    return;
  const EnlSite *site = &plan->look->sites->site[plan->look->selected];
  for (uint32_t k = 0; k < site->n_atoms; k++)
    light_atom (plan, scene, site->atom[k]);
  if (plan->look->forms)
    light_system (plan, scene, plan->look->forms);
}
