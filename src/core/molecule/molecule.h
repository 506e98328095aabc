/* The molecular graph: atoms, bonds, and what follows from them.
 *
 * Bonds always carry a Kekulé order; aromaticity is derived. Build with add_atom and add_bond,
 * then call enl_molecule_finish once; after that the derived facts (adjacency, rings, aromatic
 * flags) are valid until the next structural edit, which needs a new finish.
 *
 * Hydrogens: those without an atom of their own are counted in `hydrogens`. A reader folds plain
 * written hydrogens ([H] on one heavy atom, no isotope, charge or map) into that count.
 */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include "core/base/error.h"

#define ENL_NONE      UINT32_MAX /* no atom, no bond */
#define ENL_MAX_HEAVY 400        /* comfortable size; analysis refuses more, readers do not */
#define ENL_MAX_ATOMS 4000       /* readers refuse more */
#define ENL_MAX_RINGS 600        /* readers refuse more; keeps finish below about a second */

/* Turn of the neighbours of a tetrahedral atom. Order them by ascending atom index, with an
 * unwritten hydrogen (or lone pair) FIRST; looking from the first one towards the centre the other
 * three turn this way. So SMILES "N[C@](F)(Cl)Br" has ANTICLOCKWISE at C (N=0, F=2, Cl=3, Br=4). */
typedef enum { ENL_WINDING_NONE = 0, ENL_WINDING_ANTICLOCKWISE, ENL_WINDING_CLOCKWISE } EnlWinding;

/* Which side the two reference neighbours of a double bond are on. */
typedef enum { ENL_SIDE_NONE = 0, ENL_SIDE_SAME, ENL_SIDE_OPPOSITE } EnlSide;

/* How a bond was or shall be drawn; the narrow end is at `from`. */
typedef enum { ENL_WEDGE_NONE = 0, ENL_WEDGE_UP, ENL_WEDGE_DOWN, ENL_WEDGE_EITHER } EnlWedge;

typedef struct {
  uint8_t element; /* atomic number; 0 stands for any atom ('*') */
  int8_t charge;
  uint8_t hydrogens; /* hydrogens without an atom of their own */
  uint8_t unpaired;  /* unpaired electrons */
  uint16_t isotope;  /* mass number, 0 for the natural mixture */
  bool aromatic;     /* derived */
  bool exact;        /* the hydrogen count was written (bracket atom), not inferred */
  EnlWinding winding;
  uint32_t map;    /* atom map number, 0 for none */
  uint32_t input;  /* 1-based position among the atoms as they stood in the input */
  uint32_t offset; /* byte offset of the atom in the input text */
  uint32_t length; /* bytes it covers there */
  double x, y;     /* plane coordinates in bond lengths, y up; see has_layout */
} EnlAtom;

typedef struct {
  uint32_t from, to;
  uint8_t order; /* 1, 2, 3, 4; 0 for a dative or unspecified contact */
  bool aromatic; /* derived */
  bool ring;     /* derived: in at least one ring */
  EnlSide side;  /* of side_from (a neighbour of from) and side_to (a neighbour of to) */
  uint32_t side_from, side_to;
  EnlWedge wedge;
} EnlBond;

typedef struct EnlMolecule EnlMolecule;

EnlMolecule *enl_molecule_new (void) ENL_MUST_USE;
EnlMolecule *enl_molecule_copy (const EnlMolecule *mol) ENL_MUST_USE; /* derived facts included */
void enl_molecule_free (EnlMolecule *mol);                            /* NULL allowed */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlMolecule, enl_molecule_free)

const char *enl_molecule_name (const EnlMolecule *mol); /* owned by mol, "" when unnamed */
void enl_molecule_set_name (EnlMolecule *mol, const char *name);

/* ---- building ---- */

/* Copies the open fields of `atom`; returns the index. */
uint32_t enl_molecule_add_atom (EnlMolecule *mol, const EnlAtom *atom);

/* Returns the index of the bond, or ENL_NONE when the atoms are equal or already bonded. */
uint32_t enl_molecule_add_bond (EnlMolecule *mol, uint32_t from, uint32_t to, uint8_t order);

/* ENL_OK, or ENL_ERROR_LIMIT (without position) for more than ENL_MAX_ATOMS atoms or ENL_MAX_RINGS
 * rings. Readers call it before finish. */
EnlStatus enl_molecule_check_size (const EnlMolecule *mol, EnlError *err);

/* Builds adjacency, rings and aromatic flags. Does not change hydrogens, and does not judge
 * valence (enl_valence_check does). Cannot fail. */
void enl_molecule_finish (EnlMolecule *mol);

/* Editable atom or bond; call finish after changing element, charge, order or ends. */
EnlAtom *enl_molecule_edit_atom (EnlMolecule *mol, uint32_t atom);
EnlBond *enl_molecule_edit_bond (EnlMolecule *mol, uint32_t bond);

/* Removes the atoms with remove[atom], their bonds, and stereo that rested on them; `renumber`
 * (NULL allowed) receives the new index of each old atom or ENL_NONE. Needs a new finish. */
void enl_molecule_remove_atoms (EnlMolecule *mol, const bool *remove, uint32_t *renumber);

/* Counts plain hydrogen atoms ([H] by a single bond on one atom other than hydrogen or '*', without
 * isotope, charge or map) in that atom's `hydrogens` instead, keeping windings and sides (a
 * hydrogen that alone tells the side of a double bond stays). Needs adjacency or a finished
 * molecule; finishes it again and returns true when something was folded. */
bool enl_molecule_fold_hydrogens (EnlMolecule *mol);

/* ---- reading; all need a finished molecule ---- */

uint32_t enl_molecule_atoms (const EnlMolecule *mol);
uint32_t enl_molecule_bonds (const EnlMolecule *mol);
const EnlAtom *enl_molecule_atom (const EnlMolecule *mol, uint32_t atom);
const EnlBond *enl_molecule_bond (const EnlMolecule *mol, uint32_t bond);

uint32_t enl_molecule_degree (const EnlMolecule *mol, uint32_t atom); /* written neighbours */
uint32_t enl_molecule_neighbour (const EnlMolecule *mol, uint32_t atom, uint32_t k);
uint32_t enl_molecule_bond_at (const EnlMolecule *mol, uint32_t atom, uint32_t k);
uint32_t enl_molecule_bond_between (const EnlMolecule *mol, uint32_t a,
                                    uint32_t b); /* or ENL_NONE */
uint32_t enl_molecule_other_end (const EnlMolecule *mol, uint32_t bond, uint32_t atom);

/* Hydrogens on the atom: counted ones plus bonded hydrogen atoms. */
uint32_t enl_molecule_total_hydrogens (const EnlMolecule *mol, uint32_t atom);
/* Sum of bond orders to written neighbours (hydrogen atoms included, counted ones not). */
uint32_t enl_molecule_order_sum (const EnlMolecule *mol, uint32_t atom);

/* Rings: a smallest set of smallest rings, its size bonds - atoms + fragments. Atoms of one ring
 * stand in walking order. Memory is owned by mol. */
uint32_t enl_molecule_rings (const EnlMolecule *mol);
const uint32_t *enl_molecule_ring (const EnlMolecule *mol, uint32_t ring, uint32_t *size);
bool enl_molecule_in_ring (const EnlMolecule *mol, uint32_t atom);
/* Any smallest ring counts here, also one that the set leaves out. */
bool enl_molecule_in_ring_of (const EnlMolecule *mol, uint32_t atom, uint32_t size);
uint32_t enl_molecule_smallest_ring (const EnlMolecule *mol, uint32_t atom); /* 0: in none */
uint32_t enl_molecule_ring_count_of_atom (const EnlMolecule *mol, uint32_t atom);

/* Connected fragments: fills fragment[atom] with 0..n-1 and returns n. */
uint32_t enl_molecule_fragments (const EnlMolecule *mol, uint32_t *fragment);

/* Bonds on the shortest path from `from` to every atom; ENL_NONE where there is no path. */
void enl_molecule_distances (const EnlMolecule *mol, uint32_t from, uint32_t *distance);

/* Hill formula with charge ("C6H10O3", "C2H5O-"), new string (g_free). Isotopes are not marked. */
char *enl_molecule_formula (const EnlMolecule *mol) ENL_MUST_USE;
/* Molar mass in g/mol from IUPAC abridged standard atomic weights (resources/elements.tsv). */
double enl_molecule_mass (const EnlMolecule *mol);
uint32_t enl_molecule_heavy_atoms (const EnlMolecule *mol);
int enl_molecule_charge (const EnlMolecule *mol);

/* True when x and y of the atoms are meaningful. */
bool enl_molecule_has_layout (const EnlMolecule *mol);
void enl_molecule_set_has_layout (EnlMolecule *mol, bool has_layout);
