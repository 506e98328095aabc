#include "core/layout/fragment.h"

#include <math.h>
#include <string.h>

#include "core/layout/assemble.h"
#include "core/layout/block.h"
#include "core/layout/blocks.h"
#include "core/layout/coordgen-place.h"
#include "core/layout/geometry.h"
#include "core/layout/orient.h"
#include "core/layout/repair.h"
#include "core/layout/strain.h"

/* A picture with less strain than this is final; another must be better by that. */
static const double good_enough = 0.3, better_by = 0.1;

static const double wrong_side_cost = 20;

static void draw_rest (EnlSketch *sketch, const EnlTemplates *templates, bool *upright);

/* A ring block with its outer neighbours, taken out of a sketch. */
typedef struct {
  EnlSketch *part;
  bool *core;
  uint32_t size; /* atoms of the block */
  EnlBlockPicture kind;
} Cutout;

static void
cutout_clear (Cutout *cut)
{
  enl_sketch_free (cut->part);
  g_free (cut->core);
  *cut = (Cutout){0};
}

static Cutout
cut_block (const EnlSketch *sketch, uint32_t block)
{
  uint32_t n = sketch->n_atoms;
  g_autofree bool *in = g_new0 (bool, n + 1);
  g_autofree bool *keep = g_new0 (bool, n + 1);
  Cutout cut = {.core = g_new0 (bool, n + 1)};

  cut.size = enl_block_atoms (sketch, block, in);
  memcpy (keep, in, n);
  for (uint32_t b = 0; b < sketch->n_bonds; b++) {
    keep[sketch->bond[b].from] |= in[sketch->bond[b].to];
    keep[sketch->bond[b].to] |= in[sketch->bond[b].from];
  }
  cut.part = enl_sketch_part (sketch, keep);
  for (uint32_t i = 0; i < cut.part->n_atoms; i++)
    cut.core[i] = in[cut.part->atom[i].source];
  return cut;
}

/* The block that must be redrawn and sets the frame: a template before others, a large one before
 * small ones. False when CoordGen's picture is good everywhere. */
static bool
choose_block (const EnlSketch *sketch, const EnlTemplates *templates, Cutout *chosen)
{
  *chosen = (Cutout){.kind = ENL_BLOCK_KEPT};
  for (uint32_t block = 0; block < sketch->n_blocks; block++) {
    Cutout cut = cut_block (sketch, block);
    cut.kind = enl_block_draw (cut.part, cut.core, true, templates);
    bool known = cut.kind == ENL_BLOCK_TEMPLATE, known_before = chosen->kind == ENL_BLOCK_TEMPLATE;
    if (cut.kind != ENL_BLOCK_KEPT && (chosen->kind == ENL_BLOCK_KEPT || known > known_before ||
                                       (known == known_before && cut.size > chosen->size))) {
      cutout_clear (chosen);
      *chosen = cut;
    } else {
      cutout_clear (&cut);
    }
  }
  return chosen->kind != ENL_BLOCK_KEPT;
}

/* Mean direction of the bonds from `centre` (of the whole) into the branch, drawn in `drawn` whose
 * atom i is `source[i]` of the whole (NULL: the same). */
static EnlSpot
way_into (const EnlSketch *drawn, const uint32_t *place, const EnlSketch *whole, uint32_t centre,
          const bool *branch)
{
  EnlSpot sum = {0, 0};

  for (uint32_t k = whole->first[centre]; k < whole->first[centre + 1]; k++) {
    uint32_t other = whole->neighbour[k];
    if (branch[other] && place[other] != ENL_NONE)
      sum = enl_spot_plus (sum,
                           enl_spot_minus (drawn->spot[place[other]], drawn->spot[place[centre]]));
  }
  return sum;
}

static void
index_sources (const EnlSketch *part, uint32_t n, uint32_t *place)
{
  for (uint32_t i = 0; i < n; i++)
    place[i] = ENL_NONE;
  for (uint32_t i = 0; i < part->n_atoms; i++)
    place[part->atom[i].source] = i;
}

/* Draws what hangs on the block atom `centre` behind `start` on its own and joins it in the
 * direction the cutout has for it. */
static void
join_branch (EnlSketch *sketch, const Cutout *cut, uint32_t centre, uint32_t start, bool *branch,
             const EnlTemplates *templates)
{
  uint32_t n = sketch->n_atoms;
  g_autofree uint32_t *place = g_new (uint32_t, n + 1);
  bool upright;

  enl_branch_atoms (sketch, start, centre, branch);
  index_sources (cut->part, n, place);
  EnlSpot want = way_into (cut->part, place, sketch, centre, branch);
  branch[centre] = true;
  g_autoptr (EnlSketch) part = enl_sketch_part (sketch, branch);
  branch[centre] = false;
  draw_rest (part, templates, &upright);
  index_sources (part, n, place);
  EnlSpot have = way_into (part, place, sketch, centre, branch);
  double angle = atan2 (want.y, want.x) - atan2 (have.y, have.x);
  EnlSpot hub = part->spot[place[centre]];
  for (uint32_t i = 0; i < n; i++)
    if (branch[i])
      sketch->spot[i] = enl_spot_plus (
          sketch->spot[centre],
          enl_spot_turned (enl_spot_minus (part->spot[place[i]], hub), (EnlSpot){0, 0}, angle));
}

/* The block as in the cutout, everything else drawn branch by branch around it. */
static void
draw_around (EnlSketch *sketch, const Cutout *cut, const EnlTemplates *templates)
{
  uint32_t n = sketch->n_atoms;
  g_autofree bool *done = g_new0 (bool, n + 1);
  g_autofree bool *branch = g_new0 (bool, n + 1);

  for (uint32_t i = 0; i < cut->part->n_atoms; i++)
    if (cut->core[i]) {
      sketch->spot[cut->part->atom[i].source] = cut->part->spot[i];
      done[cut->part->atom[i].source] = true;
    }
  for (uint32_t i = 0; i < cut->part->n_atoms; i++) {
    uint32_t centre = cut->part->atom[i].source;
    if (!cut->core[i])
      continue;
    for (uint32_t k = sketch->first[centre]; k < sketch->first[centre + 1]; k++) {
      uint32_t start = sketch->neighbour[k];
      if (done[start])
        continue;
      join_branch (sketch, cut, centre, start, branch, templates);
      for (uint32_t j = 0; j < n; j++)
        done[j] |= branch[j];
    }
  }
}

/* CoordGen's picture with its poor ring blocks redrawn. False when it gives none. */
static bool
draw_by_coordgen (EnlSketch *sketch, const EnlTemplates *templates, bool *upright)
{
  Cutout cut;

  if (!enl_coordgen_draw (sketch, NULL))
    return false;
  if (choose_block (sketch, templates, &cut)) {
    draw_around (sketch, &cut, templates);
    *upright = cut.kind == ENL_BLOCK_TEMPLATE;
  }
  cutout_clear (&cut);
  return true;
}

static void
repair (EnlSketch *sketch, bool from_template)
{
  enl_repair_sides (sketch);
  enl_repair_crowding (sketch, !from_template);
}

static double
cost_of (const EnlSketch *sketch)
{
  return enl_strain_crowding (sketch) + enl_strain_stretch (sketch) +
         (enl_sketch_sides_right (sketch) ? 0 : wrong_side_cost);
}

/* Everything but the final turn; `upright` tells that the picture has an orientation of its own.
 * CoordGen clears crowded places by stretching bonds: then our own assembly competes. */
static void
draw_rest (EnlSketch *sketch, const EnlTemplates *templates, bool *upright)
{
  size_t size = sketch->n_atoms * sizeof (EnlSpot);

  *upright = false;
  if (sketch->n_atoms <= 1)
    return;
  enl_blocks_find (sketch);
  if (!draw_by_coordgen (sketch, templates, upright)) {
    enl_assemble (sketch, templates);
    repair (sketch, false);
    return;
  }
  repair (sketch, *upright);
  double cost = cost_of (sketch);
  if (*upright || cost < good_enough)
    return;
  g_autofree EnlSpot *before = g_memdup2 (sketch->spot, size);
  enl_assemble (sketch, templates);
  repair (sketch, false);
  if (cost_of (sketch) >= cost - better_by)
    memcpy (sketch->spot, before, size);
}

void
enl_fragment_draw (EnlSketch *sketch, const EnlTemplates *templates)
{
  bool upright;

  draw_rest (sketch, templates, &upright);
  if (!upright)
    enl_orient (sketch);
}
