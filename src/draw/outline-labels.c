/* Atom labels after the IUPAC Recommendations 2008 on graphical representation (Brecher, Pure Appl.
 * Chem. 2008, 80, 277; GR-2): which atoms have one, and on which side hydrogens and charge go. */
#include <math.h>
#include <string.h>

#include "core/molecule/elements.h"
#include "draw/plane.h"
#include "draw/outline.h"
#include "draw/paint.h"
#include "draw/text.h"

#define CARBON 6

/* In font sizes. */
#define PIECE_PAD     0.10 /* kept free around a piece when sides are compared */
#define LINE_TO_BOND  0.17 /* between a label and the bond that ends at it */
#define STACK_STEP    0.93 /* from a symbol to hydrogens above or below it */
#define STACK_LOWERED 0.10 /* more when hydrogens above it have a lowered count */
#define CHARGE_RISE   0.36 /* of the centre of a charge above that of the symbol */
#define TIE           1e-6
#define SCRIPT_SIZE   0.72

typedef enum { SIDE_RIGHT, SIDE_LEFT, SIDE_ABOVE, SIDE_BELOW, N_SIDES } Side;

static const double side_angle[N_SIDES] = {0, G_PI, G_PI / 2, -G_PI / 2};
/* Small preferences, radians: right before left before below and above. */
static const double side_handicap[N_SIDES] = {0, 0.05, 0.30, 0.28};

static uint32_t
double_bonds_at (const EnlOutline *outline, uint32_t atom)
{
  uint32_t count = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (outline->mol, atom); k++)
    count += enl_outline_order (outline, enl_molecule_bond_at (outline->mol, atom, k)) > 1.9;
  return count;
}

/* IUPAC GR-2.1: very small molecules show their carbons. */
static bool
in_tiny_fragment (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t degree = enl_molecule_degree (mol, atom);

  if (degree == 0)
    return true;
  return degree == 1 && enl_molecule_degree (mol, enl_molecule_neighbour (mol, atom, 0)) == 1;
}

bool
enl_outline_needs_label (const EnlOutline *outline, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (outline->mol, atom);

  if (a->element != CARBON || a->isotope || a->unpaired || outline->force_label[atom])
    return true;
  if (a->charge && !outline->hide_charges)
    return true;
  if (double_bonds_at (outline, atom) >= 2 && enl_molecule_degree (outline->mol, atom) == 2)
    return true; /* a straight cumulated carbon would vanish in the line */
  return in_tiny_fragment (outline->mol, atom);
}

static double
charge_size (const EnlTheme *theme)
{
  return theme->atom_size * SCRIPT_SIZE;
}

static EnlPiece
make_piece (const EnlTheme *theme, char *markup, double size, EnlPoint anchor, double align_x,
            EnlTone tone)
{
  EnlPiece piece = {.markup = markup, .anchor = anchor, .align_x = align_x, .tone = tone};

  piece.size = size;
  piece.bold = size < theme->atom_size; /* keeps small signs as dark as the letters */
  piece.box = enl_text_box (theme->family, anchor, markup, size, piece.bold, align_x, 0.5);
  return piece;
}

static void
add_piece (EnlOutline *outline, uint32_t atom, EnlPiece piece)
{
  EnlLabel *label = &outline->label[atom];

  g_assert (label->n_pieces < ENL_MAX_PIECES);
  label->piece[label->n_pieces++] = piece;
  enl_obstacles_add_box (outline->taken, enl_rect_grow (piece.box, 0.5));
}

/* Capital letters shall stand with their middle on the atom; text boxes have theirs lower. */
static double
capital_shift (const EnlTheme *theme)
{
  EnlRect box =
      enl_text_box (theme->family, (EnlPoint){0, 0}, "H", theme->atom_size, false, 0, 0.5);

  return -(box.y + box.height / 2);
}

/* px of bonds that a box would lie on. */
static double
bonds_under (const EnlOutline *outline, EnlRect box)
{
  double sum = 0;

  for (uint32_t i = 0; i < outline->n_bonds; i++) {
    const EnlBond *bond = enl_molecule_bond (outline->mol, i);
    double grow = bond->order > 1 || bond->wedge ? outline->theme->double_gap / 2 : 0;
    sum += enl_segment_inside (outline->at[bond->from], outline->at[bond->to],
                               enl_rect_grow (box, grow));
  }
  return sum;
}

static double
width_of (const EnlTheme *theme, const char *markup)
{
  double width, height;

  enl_text_measure (theme->family, markup, theme->atom_size, false, &width, &height);
  return width;
}

static char *
hydrogen_markup (const EnlTheme *theme, uint32_t count)
{
  if (count < 2)
    return g_strdup ("H");
  g_autofree char *digits = g_strdup_printf ("%u", count);
  g_autofree char *lowered = enl_text_lowered (digits, theme->atom_size);
  return g_strconcat ("H", lowered, NULL);
}

static EnlPiece
hydrogen_piece (const EnlOutline *outline, uint32_t atom, Side side, double symbol_width)
{
  const EnlTheme *theme = outline->theme;
  uint32_t count = enl_molecule_atom (outline->mol, atom)->hydrogens;
  char *markup = hydrogen_markup (theme, count);
  double size = theme->atom_size, align = 0;
  EnlPoint at = outline->at[atom];

  at.y += capital_shift (theme);
  if (side == SIDE_RIGHT) {
    at.x += symbol_width / 2;
  } else if (side == SIDE_LEFT) {
    at.x -= symbol_width / 2;
    align = 1;
  } else {
    bool lowered = side == SIDE_ABOVE && count > 1;
    double step = (STACK_STEP + (lowered ? STACK_LOWERED : 0)) * size;
    at.x -= width_of (theme, "H") / 2;
    at.y += side == SIDE_ABOVE ? -step : step;
  }
  EnlTone tone = outline->hydrogen[atom];
  if (tone == ENL_N_TONES)
    tone = enl_theme_element_tone (enl_molecule_atom (outline->mol, atom)->element);
  return make_piece (theme, markup, size, at, align, tone);
}

/* Smallest angle between a side and the bonds of the atom. */
static double
room_at_side (const EnlOutline *outline, uint32_t atom, Side side)
{
  double best = G_PI;

  for (uint32_t k = 0; k < enl_molecule_degree (outline->mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (outline->mol, atom, k);
    double angle = enl_point_angle (outline->at[atom], outline->at[other]);
    best = fmin (best, enl_angle_between (angle, side_angle[side]));
  }
  return best;
}

/* Hydrides of the elements to the right of the table are written with their hydrogens first. */
static bool
hydrogens_first_alone (uint8_t element)
{
  return element == 8 || element == 16 || element == 34 || element == 52 || element == 9 ||
         element == 17 || element == 35 || element == 53;
}

static Side
choose_side (const EnlOutline *outline, uint32_t atom, double symbol_width)
{
  const EnlAtom *a = enl_molecule_atom (outline->mol, atom);
  uint32_t degree = enl_molecule_degree (outline->mol, atom);
  Side best = SIDE_RIGHT;
  double best_score = -INFINITY;

  if (degree == 0)
    return hydrogens_first_alone (a->element) && !a->charge ? SIDE_LEFT : SIDE_RIGHT;
  for (Side side = 0; side < N_SIDES; side++) {
    if (degree == 1 && side >= SIDE_ABOVE)
      break; /* chain ends stay in line: OH, H3C */
    EnlPiece piece = hydrogen_piece (outline, atom, side, symbol_width);
    EnlRect box = enl_rect_grow (piece.box, PIECE_PAD * outline->theme->atom_size);
    double score = room_at_side (outline, atom, side) - side_handicap[side];
    score -= 0.15 * bonds_under (outline, box);
    score -= 0.15 * enl_obstacles_in_box (outline->taken, piece.box);
    g_free (piece.markup);
    if (score > best_score + TIE) {
      best_score = score;
      best = side;
    }
  }
  return best;
}

static char *
charge_markup (const EnlAtom *atom, bool hide_charge)
{
  GString *out = g_string_new (NULL);
  int charge = hide_charge ? 0 : atom->charge;

  for (uint32_t i = 0; i < atom->unpaired; i++)
    g_string_append (out, "\u2022");
  if (charge > 1 || charge < -1)
    g_string_append_printf (out, "%d", ABS (charge));
  if (charge)
    g_string_append (out, charge > 0 ? "+" : "\u2212");
  return g_string_free (out, FALSE);
}

/* The eight places of a charge around a label, best first; (0, 0) is the label's middle. */
static const struct {
  int x, y;
} charge_place[] = {{1, -1}, {-1, -1}, {0, -1}, {1, 0}, {-1, 0}, {1, 1}, {-1, 1}, {0, 1}};

static EnlPoint
charge_anchor (const EnlTheme *theme, EnlRect around, EnlRect symbol, EnlPoint at, uint32_t place,
               double *align)
{
  double rise = CHARGE_RISE * theme->atom_size, gap = 0.06 * theme->atom_size;
  int x = charge_place[place].x, y = charge_place[place].y;
  EnlPoint p = {at.x, at.y + y * rise};

  *align = x > 0 ? 0 : x < 0 ? 1 : 0.5;
  if (x > 0)
    p.x = around.x + around.width + gap;
  else if (x < 0)
    p.x = around.x - gap;
  else
    p.y = y < 0 ? symbol.y - 0.42 * charge_size (theme)
                : symbol.y + symbol.height + 0.42 * charge_size (theme);
  return p;
}

static void
plan_charge (EnlOutline *outline, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (outline->mol, atom);
  const EnlTheme *theme = outline->theme;
  g_autofree char *markup = charge_markup (a, outline->hide_charges);
  EnlRect around = enl_outline_atom_box (outline, atom), symbol = outline->label[atom].piece[0].box;
  EnlPiece best = {0};
  double best_score = INFINITY;

  if (!*markup)
    return;
  for (uint32_t i = 0; i < ENL_COUNT (charge_place); i++) {
    double align;
    EnlPoint anchor = charge_anchor (theme, around, symbol, outline->at[atom], i, &align);
    EnlPiece piece = make_piece (theme, markup, charge_size (theme), anchor, align,
                                 enl_theme_element_tone (a->element));
    EnlRect box = enl_rect_grow (piece.box, 1);
    bool before_hydrogens = charge_place[i].x < 0 && around.x < symbol.x - 1;
    double score = 2 * i + (before_hydrogens ? 12 : 0) +
                   10 * bonds_under (outline, enl_rect_grow (box, 1.5)) +
                   10 * enl_obstacles_in_box (outline->taken, piece.box);
    if (score < best_score - TIE) {
      best_score = score;
      best = piece;
    }
  }
  best.markup = g_steal_pointer (&markup);
  add_piece (outline, atom, best);
}

static void
plan_isotope (EnlOutline *outline, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (outline->mol, atom);
  EnlRect symbol = outline->label[atom].piece[0].box;
  EnlPoint anchor = {symbol.x - 1, outline->at[atom].y - CHARGE_RISE * outline->theme->atom_size};

  if (!a->isotope)
    return;
  add_piece (outline, atom,
             make_piece (outline->theme, g_strdup_printf ("%u", a->isotope),
                         charge_size (outline->theme), anchor, 1,
                         enl_theme_element_tone (a->element)));
}

void
enl_outline_plan_label (EnlOutline *outline, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (outline->mol, atom);
  const EnlTheme *theme = outline->theme;
  const char *symbol = enl_element_symbol (a->element);
  EnlPoint anchor = outline->at[atom];

  g_assert (!outline->label[atom].shown);
  outline->label[atom].shown = true;
  anchor.y += capital_shift (theme);
  add_piece (outline, atom,
             make_piece (theme, g_strdup (symbol), theme->atom_size, anchor, 0.5,
                         enl_theme_element_tone (a->element)));
  if (a->hydrogens) {
    double width = width_of (theme, symbol);
    add_piece (outline, atom,
               hydrogen_piece (outline, atom, choose_side (outline, atom, width), width));
  }
  plan_isotope (outline, atom);
  plan_charge (outline, atom);
}

void
enl_outline_plan_labels (EnlOutline *outline)
{
  for (uint32_t i = 0; i < outline->n_atoms; i++)
    if (enl_outline_needs_label (outline, i))
      enl_outline_plan_label (outline, i);
  for (uint32_t i = 0; i < outline->n_bonds; i++) {
    const EnlBond *bond = enl_molecule_bond (outline->mol, i);
    double width = outline->theme->bond_width;
    if (enl_outline_order (outline, i) > 1.1)
      width += 2 * outline->theme->double_gap;
    else if (bond->wedge)
      width = outline->theme->wedge_width;
    enl_obstacles_add_line (outline->taken, outline->at[bond->from], outline->at[bond->to], width);
  }
}

static double
label_distance (const EnlLabel *label, EnlPoint p)
{
  double best = INFINITY;

  for (uint32_t k = 0; k < label->n_pieces; k++)
    best = fmin (best, enl_rect_distance (label->piece[k].box, p));
  return best;
}

EnlPoint
enl_outline_trim (const EnlOutline *outline, uint32_t atom, EnlPoint far, EnlPoint near)
{
  enum { STEPS = 40, HALVINGS = 12 };
  const EnlLabel *label = &outline->label[atom];
  double pad = LINE_TO_BOND * outline->theme->atom_size, free_t = 0, hit_t = 1;
  EnlPoint way = {near.x - far.x, near.y - far.y};

  if (!label->shown)
    return near;
  for (int i = 0; i <= STEPS; i++) {
    double t = (double)i / STEPS;
    if (label_distance (label, enl_point_add (far, way, t)) < pad) {
      hit_t = t;
      break;
    }
    free_t = t;
  }
  for (int i = 0; i < HALVINGS && free_t < hit_t; i++) {
    double t = (free_t + hit_t) / 2;
    if (label_distance (label, enl_point_add (far, way, t)) < pad)
      hit_t = t;
    else
      free_t = t;
  }
  return enl_point_add (far, way, free_t);
}

void
enl_outline_draw_labels (const EnlOutline *outline, EnlScene *scene)
{
  for (uint32_t i = 0; i < outline->n_atoms; i++)
    for (uint32_t k = 0; k < outline->label[i].n_pieces; k++) {
      const EnlPiece *piece = &outline->label[i].piece[k];
      EnlShape *text = enl_scene_text (scene, piece->anchor, piece->markup, piece->size,
                                       piece->bold, piece->align_x, 0.5, piece->tone);
      text->atom = i;
    }
}
