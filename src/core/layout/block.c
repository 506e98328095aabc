#include "core/layout/block.h"

#include <math.h>
#include <string.h>

#include "core/layout/coordgen-place.h"
#include "core/layout/geometry.h"
#include "core/layout/orient.h"
#include "core/layout/relax.h"
#include "core/layout/solid.h"
#include "core/layout/spring.h"
#include "core/layout/strain.h"
#include "core/layout/stubs.h"

/* A present picture with less strain than this is not worth redrawing. */
static const double good_enough = 0.6;

/* Views in space are for cages; beyond this many atoms they cost too much. */
static const uint32_t solid_below = 60;

/* Head start of a drawn template, and what a view in space must be better by than a flat one: the
 * trade knows the templates, and flat rings are easier to read. */
static const double template_bonus = 4, solid_malus = 1.5, fused_template_malus = 0.3;

/* Of several templates of one system the first is the usual picture; the others wait until their
 * neighbours fit better by this much each. */
static const double later_template_malus = 0.6;

/* Mirror images of templates are for neighbours that do not fit otherwise. */
static const double mirror_malus = 0.3;

/* Ways of laying templates on a part of a block that are tried: each is a run of CoordGen. */
static const uint32_t most_runs = 24;

/* Bonds of redrawn cages may be foreshortened within these. */
static const double short_bond = 0.75, long_bond = 1.35;

static const double wrong_side_cost = 20;

typedef struct {
  EnlSketch *part; /* its spots are the candidate under test */
  const bool *core;
  EnlSketch *ring; /* the core alone; source is the atom in part */
  EnlSpot *best;   /* of part */
  double best_cost;
  EnlBlockPicture kind;
} Choice;

/* Cost of what part's spots show now. Bonds to neighbours always have length 1. */
static double
picture_cost (const EnlSketch *part)
{
  double cost = enl_strain_crowding (part) + enl_strain_stretch (part);

  for (uint32_t b = 0; b < part->n_bonds; b++)
    cost += enl_sketch_side_right (part, b) ? 0 : wrong_side_cost;
  return cost;
}

/* A carbonyl that points up or to the right, and a hetero atom on top, read most easily: a choice
 * among equals. */
static double
taste_cost (const EnlSketch *part, const bool *core)
{
  double cost = 0;

  for (uint32_t b = 0; b < part->n_bonds; b++) {
    const EnlSketchBond *bond = &part->bond[b];
    if (bond->order != 2 || core[bond->from] == core[bond->to])
      continue;
    uint32_t in = core[bond->from] ? bond->from : bond->to,
             out = core[bond->from] ? bond->to : bond->from;
    EnlSpot way = enl_spot_minus (part->spot[out], part->spot[in]);
    cost -= 0.02 * way.y + 0.01 * way.x;
  }
  for (uint32_t i = 0; i < part->n_atoms; i++)
    if (core[i] && part->atom[i].element != 6)
      cost -= 0.03 * part->spot[i].y;
  return cost;
}

/* Takes the core from `spot` (of choice->ring), adds the neighbours, and keeps it if it is best. */
static void
consider (Choice *choice, const EnlSpot *spot, double malus, EnlBlockPicture kind)
{
  const double better = 1e-6;

  for (uint32_t i = 0; i < choice->ring->n_atoms; i++)
    choice->part->spot[choice->ring->atom[i].source] = spot[i];
  enl_stubs_place (choice->part, choice->core);
  double cost = picture_cost (choice->part) + taste_cost (choice->part, choice->core) + malus;
  if (cost >= choice->best_cost - better)
    return;
  choice->best_cost = cost;
  choice->kind = kind;
  memcpy (choice->best, choice->part->spot, choice->part->n_atoms * sizeof (EnlSpot));
}

typedef struct {
  Choice *choice;
  uint32_t n_atoms, n_earlier; /* of the template; templates of this system tried before */
  bool matched;
  uint32_t *runs; /* of CoordGen for part templates */
} TemplateTrial;

/* A template and its mirror image. What the drawing itself strains is no fault of this fit. */
static bool
consider_template (const uint32_t *image, const EnlSpot *spot, void *data)
{
  TemplateTrial *trial = data;
  EnlSketch *ring = trial->choice->ring;

  trial->matched = true;
  for (int mirror = 0; mirror < 2; mirror++) {
    for (uint32_t t = 0; t < ring->n_atoms; t++)
      ring->spot[image[t]] = (EnlSpot){mirror ? -spot[t].x : spot[t].x, spot[t].y};
    double own = enl_strain_crowding (ring) + enl_strain_stretch (ring);
    consider (trial->choice, ring->spot,
              later_template_malus * trial->n_earlier + mirror * mirror_malus - template_bonus -
                  own,
              ENL_BLOCK_TEMPLATE);
  }
  return true;
}

/* A template that is a part of the block: CoordGen draws the other rings to it. */
static bool
consider_part_template (const uint32_t *image, const EnlSpot *spot, void *data)
{
  const TemplateTrial *of = data;
  EnlSketch *ring = of->choice->ring;
  g_autofree bool *held = g_new0 (bool, ring->n_atoms + 1);

  for (uint32_t t = 0; t < of->n_atoms; t++) {
    ring->spot[image[t]] = spot[t];
    held[image[t]] = true;
  }
  if (++*of->runs > most_runs || !enl_coordgen_draw (ring, held))
    return false;
  consider (of->choice, ring->spot, fused_template_malus, ENL_BLOCK_REDRAWN);
  enl_relax (ring, short_bond, long_bond, false);
  consider (of->choice, ring->spot, fused_template_malus, ENL_BLOCK_REDRAWN);
  return true;
}

static void
consider_templates (Choice *choice, const EnlTemplates *templates)
{
  TemplateTrial trial = {.choice = choice};

  for (uint32_t k = 0; k < enl_templates_count (templates); k++) {
    trial.matched = false;
    enl_template_match (templates, k, choice->ring, true, consider_template, &trial);
    trial.n_earlier += trial.matched;
  }
}

static void
consider_part_templates (Choice *choice, const EnlTemplates *templates)
{
  uint32_t runs = 0;

  for (uint32_t k = 0; k < enl_templates_count (templates); k++) {
    TemplateTrial trial = {
        .choice = choice, .n_atoms = enl_template_atoms (templates, k), .runs = &runs};
    enl_template_match (templates, k, choice->ring, false, consider_part_template, &trial);
  }
}

static void
consider_views (Choice *choice)
{
  uint32_t n = choice->ring->n_atoms;
  g_autofree EnlSpot *view = g_new0 (EnlSpot, ENL_SOLID_VIEWS * n + 1);
  uint32_t n_views = enl_solid_views (choice->ring, view);

  for (uint32_t k = 0; k < n_views; k++) {
    memcpy (choice->ring->spot, view + k * n, n * sizeof (EnlSpot));
    enl_relax (choice->ring, short_bond, long_bond, false);
    enl_orient (choice->ring);
    consider (choice, choice->ring->spot, solid_malus, ENL_BLOCK_REDRAWN);
  }
}

/* The present picture counts as it stands, neighbours included; the same block with its neighbours
 * placed anew and a relaxed copy of it compete. */
static void
consider_present (Choice *choice)
{
  uint32_t n = choice->ring->n_atoms;

  choice->best_cost = picture_cost (choice->part);
  memcpy (choice->best, choice->part->spot, choice->part->n_atoms * sizeof (EnlSpot));
  choice->kind = ENL_BLOCK_KEPT;
  if (choice->best_cost < good_enough)
    return;
  g_autofree EnlSpot *before = g_memdup2 (choice->ring->spot, n * sizeof (EnlSpot));
  consider (choice, choice->ring->spot, 0, ENL_BLOCK_REDRAWN);
  enl_relax (choice->ring, short_bond, long_bond, false);
  consider (choice, choice->ring->spot, 0, ENL_BLOCK_REDRAWN);
  memcpy (choice->ring->spot, before, n * sizeof (EnlSpot));
}

static void
consider_alone (Choice *choice)
{
  if (!enl_coordgen_draw (choice->ring, NULL))
    enl_spring_draw (choice->ring);
  consider (choice, choice->ring->spot, 0, ENL_BLOCK_REDRAWN);
}

EnlBlockPicture
enl_block_draw (EnlSketch *part, const bool *core, bool drawn, const EnlTemplates *templates)
{
  g_autoptr (EnlSketch) ring = enl_sketch_part (part, core);
  g_autofree EnlSpot *best = g_new0 (EnlSpot, part->n_atoms + 1);
  Choice choice = {.part = part, .core = core, .ring = ring, .best = best, .best_cost = INFINITY};

  if (drawn)
    consider_present (&choice);
  consider_templates (&choice, templates);
  if (choice.kind != ENL_BLOCK_TEMPLATE && choice.best_cost >= good_enough) {
    consider_alone (&choice);
    if (choice.best_cost >= good_enough && ring->n_atoms < solid_below) {
      consider_part_templates (&choice, templates);
      consider_views (&choice);
    }
  }
  memcpy (part->spot, best, part->n_atoms * sizeof (EnlSpot));
  return choice.kind;
}
