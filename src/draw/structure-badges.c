/* Where the badge of a site goes: the roomiest of its equivalent atoms, as near as nothing is in
 * the way. All badges are placed in order of rank, then each once more with the others in place.
 * The other equivalent atoms get the mark without value: a plain dot would read as a radical. */
#include <math.h>

#include "draw/badge.h"
#include "draw/plane.h"
#include "draw/structure-sites.h"

#define MAX_BADGES  30   /* sites with a badge; weaker ones keep their toned hydrogens */
#define MAX_TRIED   24   /* equivalent atoms that are compared */
#define REACH       7.0  /* bond lengths searched around an atom */
#define LEADER_GAP  0.42 /* bond lengths to the badge above which a leader helps */
#define PAD         0.10 /* kept free around a badge, bond lengths */
#define MIRROR_COST 4.0  /* reading order is mark, value; the other way round must pay */
#define TIE         1e-6 /* px; see placement.c */
#define PASSES      3
#define MARK_REACH  1.0  /* bond lengths searched for a mark without value */
#define LEADER      0.55 /* bond widths */

/* What a badge belongs to: the hydrogens of one atom. */
static EnlPlaceQuery
query_at (const EnlSitePlan *plan, uint32_t atom)
{
  const EnlOutline *outline = plan->outline;
  const EnlTheme *theme = outline->theme;
  EnlPlaceQuery query = {.anchor = outline->at[atom], .clearance = 0.35 * theme->atom_size};
  EnlPoint sum = {0, 0};
  uint32_t n = 0;

  for (guint i = 0; i < plan->hydrogen->len; i++) {
    const EnlDrawnHydrogen *h = &g_array_index (plan->hydrogen, EnlDrawnHydrogen, i);
    if (h->atom == atom) {
      sum = enl_point_add (sum, h->at, 1);
      n++;
    }
  }
  const EnlLabel *label = &outline->label[atom];
  double ignored;
  enl_outline_free_angle (outline, atom, &query.toward, &ignored);
  if (n)
    query.anchor = (EnlPoint){sum.x / n, sum.y / n};
  else if (label->n_pieces > 1)
    query.anchor = enl_rect_centre (label->piece[1].box);
  if (enl_point_distance (query.anchor, outline->at[atom]) > 1)
    query.toward = enl_point_angle (outline->at[atom], query.anchor);
  query.pad = PAD * theme->bond_length;
  query.leader_gap = LEADER_GAP * theme->bond_length;
  query.reach = REACH * theme->bond_length;
  return query;
}

typedef struct {
  EnlBadge badge;
  EnlPlace place;
  EnlPlaceQuery query;
  bool mirrored;
} Choice;

static EnlPoint
hook_of (const Choice *choice)
{
  return (EnlPoint){choice->place.box.x + choice->query.hook.x,
                    choice->place.box.y + choice->query.hook.y};
}

static bool
on_own_hydrogen (const EnlSitePlan *plan, uint32_t atom, EnlPoint p)
{
  for (guint i = 0; i < plan->hydrogen->len; i++) {
    const EnlDrawnHydrogen *h = &g_array_index (plan->hydrogen, EnlDrawnHydrogen, i);
    if (h->atom == atom && enl_rect_distance (h->box, p) < 2)
      return true;
  }
  return false;
}

/* False when the badge is so near that it needs no leader. */
static bool
leader_of (const EnlSitePlan *plan, const Choice *choice, EnlPoint *start, EnlPoint *end)
{
  EnlPoint way = enl_point_direction (choice->query.anchor, hook_of (choice));
  double length = enl_point_distance (choice->query.anchor, hook_of (choice));
  double first = choice->query.clearance + 2.5, from = first;

  for (double t = first; t < length; t++)
    if (on_own_hydrogen (plan, choice->badge.atom, enl_point_add (choice->query.anchor, way, t)))
      from = t + 1;
  *start = enl_point_add (choice->query.anchor, way, from);
  *end = enl_point_add (hook_of (choice), way, -choice->query.hook_radius - 1);
  return choice->place.gap > choice->query.leader_gap;
}

static void
occupy (const EnlSitePlan *plan, EnlObstacles *taken, const Choice *choice, double width)
{
  EnlPoint start, end;

  enl_obstacles_add_box (taken, choice->place.box);
  if (leader_of (plan, choice, &start, &end))
    enl_obstacles_add_line (taken, start, end, width);
}

static void
choose_place (const EnlSitePlan *plan, const EnlObstacles *taken, EnlRect crowd, Choice *choice)
{
  const EnlTheme *theme = plan->outline->theme;
  const EnlSite *site = &plan->look->sites->site[choice->badge.site];
  double best = INFINITY;

  for (uint32_t k = 0; k < MIN (site->n_atoms, MAX_TRIED); k++)
    for (int mirrored = 0; mirrored < 2; mirrored++) {
      EnlPlaceQuery query = query_at (plan, site->atom[k]);
      query.crowd = crowd;
      query.hook = enl_badge_hook (&choice->badge, theme, mirrored);
      query.hook_radius = enl_badge_radius (&choice->badge, theme);
      enl_badge_size (&choice->badge, theme, &query.width, &query.height);
      EnlPlace place = enl_obstacles_place (taken, &query);
      place.cost += mirrored ? MIRROR_COST : 0;
      if (place.cost >= best - TIE)
        continue;
      best = place.cost;
      choice->place = place;
      choice->query = query;
      choice->badge.atom = site->atom[k];
      choice->mirrored = mirrored;
    }
}

static void
place_all (const EnlSitePlan *plan, EnlRect crowd, Choice *choice, uint32_t n)
{
  double leader = LEADER * plan->outline->theme->bond_width;

  for (int pass = 0; pass < PASSES; pass++)
    for (uint32_t i = 0; i < n; i++) {
      g_autoptr (EnlObstacles) taken = enl_obstacles_copy (plan->outline->taken);
      for (uint32_t j = 0; j < (pass ? n : i); j++)
        if (j != i)
          occupy (plan, taken, &choice[j], leader);
      choose_place (plan, taken, crowd, &choice[i]);
    }
}

static void
draw_choice (const EnlSitePlan *plan, EnlScene *scene, const Choice *choice)
{
  EnlPoint start, end;

  if (leader_of (plan, choice, &start, &end)) {
    EnlShape *line = enl_scene_line (scene, start, end, LEADER * plan->outline->theme->bond_width,
                                     enl_site_tone (plan->look, choice->badge.site));
    line->site = choice->badge.site;
    line->atom = choice->badge.atom;
    line->opacity = 0.75;
  }
  enl_badge_draw (scene, &choice->badge, choice->place.box, choice->mirrored);
}

static void
draw_mark (EnlSitePlan *plan, EnlScene *scene, EnlBadge badge, uint32_t atom)
{
  EnlPlaceQuery query = query_at (plan, atom);
  double radius = enl_badge_radius (&badge, plan->outline->theme);

  badge.atom = atom;
  query.width = query.height = 2 * radius;
  query.hook = (EnlPoint){radius, radius};
  query.hook_radius = radius;
  query.leader_gap = INFINITY;
  query.reach = MARK_REACH * plan->outline->theme->bond_length;
  EnlPlace place = enl_obstacles_place (plan->outline->taken, &query);
  if (place.cost >= ENL_PLACE_COLLIDES)
    return; /* the hydrogens in their tone still tell */
  enl_badge_draw_mark (scene, &badge, enl_rect_centre (place.box));
  enl_obstacles_add_box (plan->outline->taken, place.box);
}

void
enl_site_plan_draw_badges (EnlSitePlan *plan, EnlScene *scene)
{
  const EnlStructureLook *look = plan->look;

  if (!look->sites || !look->rank || look->sites->n_sites == 0)
    return;
  uint32_t n = MIN (look->sites->n_sites, MAX_BADGES);
  g_autofree Choice *choice = g_new0 (Choice, n);
  for (uint32_t i = 0; i < n; i++) {
    uint32_t s = look->rank[i];
    choice[i].badge = (EnlBadge){.number = i + 1,
                                 .estimate = look->estimate ? &look->estimate[s] : NULL,
                                 .selected = s == look->selected,
                                 .site = s,
                                 .atom = look->sites->site[s].atom[0]};
  }
  place_all (plan, enl_scene_bounds (scene), choice, n);
  for (uint32_t i = 0; i < n; i++) {
    draw_choice (plan, scene, &choice[i]);
    occupy (plan, plan->outline->taken, &choice[i], LEADER * plan->outline->theme->bond_width);
  }
  for (uint32_t i = 0; i < n; i++)
    for (uint32_t k = 0; k < look->sites->site[choice[i].badge.site].n_atoms; k++) {
      uint32_t atom = look->sites->site[choice[i].badge.site].atom[k];
      if (atom != choice[i].badge.atom)
        draw_mark (plan, scene, choice[i].badge, atom);
    }
}
