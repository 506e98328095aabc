/* A structure on its way to a scene: coordinates in px, atom labels in pieces, and what is taken.
 *
 * Order of work: enl_outline_new, choose which hydrogens to show, enl_outline_plan_labels, then
 * enl_outline_draw_bonds and enl_outline_draw_labels. Shared by the structure, form and hybrid
 * scenes.
 */
#pragma once

#include "core/molecule/molecule.h"
#include "draw/placement.h"
#include "draw/scene.h"

/* One text of an atom label; each is placed by itself so that bonds can be trimmed at it. */
typedef struct {
  char *markup;
  EnlPoint anchor;
  double align_x, size;
  bool bold;
  EnlTone tone;
  EnlRect box; /* ink */
} EnlPiece;

#define ENL_MAX_PIECES 4 /* isotope, symbol, hydrogens, charge */

typedef struct {
  bool shown;
  EnlPiece piece[ENL_MAX_PIECES];
  uint32_t n_pieces;
} EnlLabel;

typedef struct {
  const EnlMolecule *mol;   /* borrowed */
  const EnlTheme *theme;    /* static */
  const double *bond_order; /* borrowed, NULL: the orders of the molecule */
  bool hide_charges;        /* hybrid: the charge is shown otherwise */
  uint32_t n_atoms, n_bonds;
  EnlPoint *at;        /* per atom */
  EnlLabel *label;     /* per atom */
  bool *force_label;   /* per atom: show a carbon too */
  EnlTone *hydrogen;   /* per atom: tone of the hydrogens in the label; ENL_N_TONES: as the atom */
  EnlObstacles *taken; /* bonds and labels planned so far */
} EnlOutline;

/* Borrows mol, which has a layout (assertion). */
EnlOutline *enl_outline_new (const EnlMolecule *mol, const EnlTheme *theme) ENL_MUST_USE;
void enl_outline_free (EnlOutline *outline);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlOutline, enl_outline_free)

/* Order of a bond as it shall be drawn, possibly between two whole numbers. */
double enl_outline_order (const EnlOutline *outline, uint32_t bond);

/* True when IUPAC's recommendations or the outline ask for a label on this atom. */
bool enl_outline_needs_label (const EnlOutline *outline, uint32_t atom);
/* Plans the labels of all atoms that need one; fills `taken` with bonds and labels. */
void enl_outline_plan_labels (EnlOutline *outline);
/* Plans one more label, of an atom that has none. */
void enl_outline_plan_label (EnlOutline *outline, uint32_t atom);

/* Where a line from `far` to `near` (close to the atom) must end so as not to touch its label. */
EnlPoint enl_outline_trim (const EnlOutline *outline, uint32_t atom, EnlPoint far, EnlPoint near);

void enl_outline_draw_bonds (const EnlOutline *outline, EnlScene *scene);
void enl_outline_draw_labels (const EnlOutline *outline, EnlScene *scene);
/* Invisible discs that make atoms easy to hit. */
void enl_outline_draw_hit_areas (const EnlOutline *outline, EnlScene *scene);

/* The best free angle around an atom: its middle and its size (2 pi for a lone atom). The widest
 * one, but rather outside of rings than inside. */
void enl_outline_free_angle (const EnlOutline *outline, uint32_t atom, double *middle,
                             double *size);
/* Mean of the atom positions. */
EnlPoint enl_outline_centre (const EnlOutline *outline);
/* All planned label pieces of an atom together; a point box for an unlabelled atom. */
EnlRect enl_outline_atom_box (const EnlOutline *outline, uint32_t atom);
