/* Bonds after the IUPAC Recommendations 2008 (Brecher, Pure Appl. Chem. 2008, 80, 277; GR-1): side
 * of the second line, wedges, hashes and waves. */
#include <math.h>

#include "draw/plane.h"
#include "draw/outline.h"

#define LARGEST_PLAIN_RING 8     /* second lines point inside up to this size */
#define INNER_AT_60        0.577 /* shortening of an inner line in units of the gap, 120° corner */
#define CROSSING_GAP       0.09  /* half the gap where a bond passes behind another, bond lengths */
#define PARTIAL            0.12  /* orders this close to a whole number are drawn as whole */

typedef struct {
  const EnlOutline *outline;
  EnlScene *scene;
  uint32_t bond;
  uint32_t from, to;
  EnlPoint a, b; /* atom positions */
  EnlPoint u, n; /* along and to the left */
  double length;
} Stroke;

static Stroke
make_stroke (const EnlOutline *outline, EnlScene *scene, uint32_t bond)
{
  const EnlBond *data = enl_molecule_bond (outline->mol, bond);
  Stroke s = {.outline = outline, .scene = scene, .bond = bond, .from = data->from, .to = data->to};

  s.a = outline->at[s.from];
  s.b = outline->at[s.to];
  s.u = enl_point_direction (s.a, s.b);
  s.n = enl_point_left (s.u);
  s.length = enl_point_distance (s.a, s.b);
  return s;
}

/* Trims a line that runs along the bond at both labels. False when nothing is left. */
static bool
trim_both (const Stroke *s, EnlPoint *a, EnlPoint *b)
{
  EnlPoint start = enl_outline_trim (s->outline, s->from, *b, *a);
  EnlPoint end = enl_outline_trim (s->outline, s->to, *a, *b);
  double along = (end.x - start.x) * s->u.x + (end.y - start.y) * s->u.y;

  *a = start;
  *b = end;
  return along > 0;
}

static EnlShape *
stroke_line (const Stroke *s, EnlPoint a, EnlPoint b, EnlDash dash)
{
  if (!trim_both (s, &a, &b))
    return NULL;
  EnlShape *line = enl_scene_line (s->scene, a, b, s->outline->theme->bond_width, ENL_TONE_INK);
  line->bond = s->bond;
  line->dash = dash;
  return line;
}

static EnlPoint
beside (EnlPoint p, EnlPoint n, double by)
{
  return enl_point_add (p, n, by);
}

/* ---- the second line of a double bond ---- */

/* Positive: left of from-to; 0: both lines beside the axis. */
static double
side_of (const Stroke *s, EnlPoint p)
{
  return (p.x - s->a.x) * s->n.x + (p.y - s->a.y) * s->n.y;
}

static EnlPoint
ring_centre (const EnlOutline *outline, uint32_t ring)
{
  uint32_t size;
  const uint32_t *atom = enl_molecule_ring (outline->mol, ring, &size);
  EnlPoint sum = {0, 0};

  for (uint32_t k = 0; k < size; k++)
    sum = enl_point_add (sum, outline->at[atom[k]], 1.0 / size);
  return sum;
}

/* Rings that want the inner line: aromatic ones first, then six-membered, then many double bonds.
 */
static double
ring_claim (const EnlOutline *outline, uint32_t ring, uint32_t from, uint32_t to)
{
  uint32_t size, hits = 0, aromatic = 0, doubles = 0;
  const uint32_t *atom = enl_molecule_ring (outline->mol, ring, &size);

  if (size > LARGEST_PLAIN_RING)
    return -1;
  for (uint32_t k = 0; k < size; k++) {
    uint32_t bond = enl_molecule_bond_between (outline->mol, atom[k], atom[(k + 1) % size]);
    hits += atom[k] == from || atom[k] == to;
    aromatic += enl_molecule_bond (outline->mol, bond)->aromatic;
    doubles += enl_outline_order (outline, bond) > 1.4;
  }
  if (hits < 2)
    return -1;
  return 100.0 * (aromatic == size) + 20.0 * (size == 6) + 5.0 * doubles + 1.0 / size;
}

static bool
side_by_ring (const Stroke *s, double *side)
{
  double best = -1;

  if (!enl_molecule_bond (s->outline->mol, s->bond)->ring)
    return false;
  for (uint32_t r = 0; r < enl_molecule_rings (s->outline->mol); r++) {
    double claim = ring_claim (s->outline, r, s->from, s->to);
    if (claim > best) {
      best = claim;
      *side = side_of (s, ring_centre (s->outline, r)) > 0 ? 1 : -1;
    }
  }
  return best >= 0;
}

/* Neighbours of both ends on the left and on the right, leaving out those in line. */
static void
count_sides (const Stroke *s, uint32_t *left, uint32_t *right)
{
  const EnlMolecule *mol = s->outline->mol;

  *left = *right = 0;
  for (int end = 0; end < 2; end++) {
    uint32_t atom = end ? s->to : s->from, other = end ? s->from : s->to;
    for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
      uint32_t neighbour = enl_molecule_neighbour (mol, atom, k);
      double across = side_of (s, s->outline->at[neighbour]);
      if (neighbour == other || fabs (across) < 0.1 * s->length)
        continue;
      *(across > 0 ? left : right) += 1;
    }
  }
}

static bool
labelled_end (const Stroke *s, uint32_t atom)
{
  return enl_molecule_degree (s->outline->mol, atom) == 1 && s->outline->label[atom].shown;
}

/* -1, 0 or 1. */
static double
second_line_side (const Stroke *s)
{
  double side = 0;
  uint32_t left, right;

  if (side_by_ring (s, &side))
    return side;
  if (labelled_end (s, s->from) || labelled_end (s, s->to))
    return 0;
  count_sides (s, &left, &right);
  if (left != right)
    return left > right ? 1 : -1;
  bool end = enl_molecule_degree (s->outline->mol, s->from) == 1 ||
             enl_molecule_degree (s->outline->mol, s->to) == 1;
  if (end || left != 1)
    return 0;
  return side_of (s, enl_outline_centre (s->outline)) >= 0 ? 1 : -1;
}

/* How much the inner line is shorter at one end so that it meets the inner side of the next bond.
 */
static double
inner_cut (const Stroke *s, uint32_t atom, uint32_t other, double side, double gap)
{
  const EnlMolecule *mol = s->outline->mol;
  double smallest = G_PI;
  double along = enl_point_angle (s->outline->at[atom], s->outline->at[other]);

  if (enl_molecule_degree (mol, atom) == 1)
    return 0;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t neighbour = enl_molecule_neighbour (mol, atom, k);
    if (neighbour == other || side_of (s, s->outline->at[neighbour]) * side <= 0)
      continue;
    double angle = enl_point_angle (s->outline->at[atom], s->outline->at[neighbour]);
    smallest = fmin (smallest, enl_angle_between (along, angle));
  }
  if (smallest > 0.95 * G_PI)
    return INNER_AT_60 * gap;
  return fmin (gap / tan (smallest / 2), 0.35 * s->length);
}

static void
draw_beside (const Stroke *s, double side, double gap, EnlDash dash)
{
  EnlPoint a = beside (s->a, s->n, side * gap), b = beside (s->b, s->n, side * gap);

  a = enl_point_add (a, s->u, inner_cut (s, s->from, s->to, side, gap));
  b = enl_point_add (b, s->u, -inner_cut (s, s->to, s->from, side, gap));
  stroke_line (s, a, b, dash);
}

static void
draw_double (const Stroke *s, EnlDash second)
{
  double gap = s->outline->theme->double_gap, side = second_line_side (s);

  if (side != 0) {
    stroke_line (s, s->a, s->b, ENL_DASH_SOLID);
    draw_beside (s, side, gap, second);
    return;
  }
  gap *= 0.5;
  stroke_line (s, beside (s->a, s->n, gap), beside (s->b, s->n, gap), ENL_DASH_SOLID);
  stroke_line (s, beside (s->a, s->n, -gap), beside (s->b, s->n, -gap), second);
}

static void
draw_triple (const Stroke *s, EnlDash third)
{
  double gap = 0.85 * s->outline->theme->double_gap, cut = 0.08 * s->length;
  EnlPoint a = enl_point_add (s->a, s->u, cut), b = enl_point_add (s->b, s->u, -cut);

  stroke_line (s, s->a, s->b, ENL_DASH_SOLID);
  stroke_line (s, beside (a, s->n, gap), beside (b, s->n, gap), ENL_DASH_SOLID);
  stroke_line (s, beside (a, s->n, -gap), beside (b, s->n, -gap), third);
}

static void
draw_quadruple (const Stroke *s)
{
  double gap = 0.6 * s->outline->theme->double_gap;

  for (int k = -3; k <= 3; k += 2)
    stroke_line (s, beside (s->a, s->n, k * gap / 2), beside (s->b, s->n, k * gap / 2),
                 ENL_DASH_SOLID);
}

/* ---- stereo bonds; the narrow end is at `from` ---- */

static void
draw_wedge (const Stroke *s)
{
  EnlPoint a = s->a, b = s->b;

  if (!trim_both (s, &a, &b))
    return;
  double narrow = s->outline->theme->bond_width / 2, wide = s->outline->theme->wedge_width / 2;
  const EnlPoint corner[4] = {beside (a, s->n, narrow), beside (b, s->n, wide),
                              beside (b, s->n, -wide), beside (a, s->n, -narrow)};
  enl_scene_polygon (s->scene, corner, 4, ENL_TONE_INK)->bond = s->bond;
}

static void
draw_hash (const Stroke *s)
{
  EnlPoint a = s->a, b = s->b;

  if (!trim_both (s, &a, &b))
    return;
  double line = 0.8 * s->outline->theme->bond_width, length = enl_point_distance (a, b);
  int n = (int)fmax (4, round (length / (2.9 * line)));
  for (int k = 0; k <= n; k++) {
    double t = (double)k / n, half = 0.5 * (line + t * (s->outline->theme->wedge_width - line));
    EnlPoint c = enl_point_add (a, s->u, t * length);
    enl_scene_line (s->scene, beside (c, s->n, half), beside (c, s->n, -half), line, ENL_TONE_INK)
        ->bond = s->bond;
  }
}

static void
draw_wave (const Stroke *s)
{
  EnlPoint a = s->a, b = s->b;

  if (!trim_both (s, &a, &b))
    return;
  double length = enl_point_distance (a, b), high = 0.62 * s->outline->theme->wedge_width;
  int n = (int)fmax (4, round (length / (0.62 * s->outline->theme->wedge_width)));
  for (int k = 0; k < n; k++) {
    EnlPoint from = enl_point_add (a, s->u, length * k / n);
    EnlPoint to = enl_point_add (a, s->u, length * (k + 1) / n);
    double by = k % 2 ? -high : high;
    const EnlPoint curve[4] = {from, beside (from, s->n, by), beside (to, s->n, by), to};
    enl_scene_curve (s->scene, curve, s->outline->theme->bond_width, ENL_TONE_INK)->bond = s->bond;
  }
}

/* ---- plain bonds ---- */

/* Where along the bond (0..1) a bond with a higher number passes in front, or -1. */
static double
passes_behind (const Stroke *s)
{
  for (uint32_t i = s->bond + 1; i < s->outline->n_bonds; i++) {
    const EnlBond *other = enl_molecule_bond (s->outline->mol, i);
    EnlPoint c = s->outline->at[other->from], d = s->outline->at[other->to];
    if (!enl_lines_cross (s->a, s->b, c, d))
      continue;
    double c_off = fabs (side_of (s, c)), d_off = fabs (side_of (s, d));
    EnlPoint hit = enl_point_add (c, (EnlPoint){d.x - c.x, d.y - c.y}, c_off / (c_off + d_off));
    return enl_point_distance (s->a, hit) / s->length;
  }
  return -1;
}

static void
draw_single (const Stroke *s)
{
  double t = passes_behind (s), gap = CROSSING_GAP * s->outline->theme->bond_length;

  if (t < 0 || t * s->length < 2 * gap || (1 - t) * s->length < 2 * gap) {
    stroke_line (s, s->a, s->b, ENL_DASH_SOLID);
    return;
  }
  stroke_line (s, s->a, enl_point_add (s->a, s->u, t * s->length - gap), ENL_DASH_SOLID);
  stroke_line (s, enl_point_add (s->a, s->u, t * s->length + gap), s->b, ENL_DASH_SOLID);
}

static void
draw_by_wedge (const Stroke *s, EnlWedge wedge)
{
  switch (wedge) {
  case ENL_WEDGE_UP:
    draw_wedge (s);
    break;
  case ENL_WEDGE_DOWN:
    draw_hash (s);
    break;
  case ENL_WEDGE_EITHER:
    draw_wave (s);
    break;
  case ENL_WEDGE_NONE:
    draw_single (s);
    break;
  }
}

static void
draw_bond (const Stroke *s)
{
  double order = enl_outline_order (s->outline, s->bond);

  if (s->length < 1e-6)
    return;
  if (order < PARTIAL)
    stroke_line (s, s->a, s->b, ENL_DASH_DOTTED);
  else if (order <= 1 + PARTIAL)
    draw_by_wedge (s, enl_molecule_bond (s->outline->mol, s->bond)->wedge);
  else if (order < 2 - PARTIAL)
    draw_double (s, ENL_DASH_DASHED);
  else if (order <= 2 + PARTIAL)
    draw_double (s, ENL_DASH_SOLID);
  else if (order < 3.5)
    draw_triple (s, order < 3 - PARTIAL ? ENL_DASH_DASHED : ENL_DASH_SOLID);
  else
    draw_quadruple (s);
}

void
enl_outline_draw_bonds (const EnlOutline *outline, EnlScene *scene)
{
  for (uint32_t i = 0; i < outline->n_bonds; i++) {
    Stroke stroke = make_stroke (outline, scene, i);
    draw_bond (&stroke);
  }
}
