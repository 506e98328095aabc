/* SMILES reader, second half: from the written graph to the finished molecule. */
#include "core/notation/smiles-reader.h"

#include "core/molecule/elements.h"
#include "core/molecule/kekule.h"
#include "core/molecule/molecule-private.h"
#include "core/molecule/stereo.h"
#include "core/molecule/valence.h"

enum { NITROGEN = 7, OXYGEN = 8 };

static EnlSmilesAtom *
atom_note (EnlSmilesReader *r, uint32_t atom)
{
  return &g_array_index (r->atom, EnlSmilesAtom, atom);
}

static EnlSmilesBond *
bond_note (EnlSmilesReader *r, uint32_t bond)
{
  return &g_array_index (r->bond, EnlSmilesBond, bond);
}

/* ---- tetrahedral centres ---- */

typedef struct {
  uint32_t key;  /* order in the text */
  int64_t index; /* order in the molecule, the unwritten neighbour first */
} Seat;

static int
count_seats (EnlSmilesReader *r, uint32_t atom, Seat seat[4])
{
  const EnlMolecule *mol = r->mol;
  int n = 0;

  if (enl_molecule_degree (mol, atom) + mol->atom[atom].hydrogens > 4)
    return 0;
  for (uint32_t i = mol->first[atom]; i < mol->first[atom + 1]; i++) {
    const EnlSmilesBond *note = bond_note (r, mol->via[i]);
    uint32_t key = mol->bond[mol->via[i]].from == atom ? note->key_from : note->key_to;
    seat[n++] = (Seat){key, mol->neighbour[i]};
  }
  if (n == 3) /* the hydrogen, or the lone pair, stands where a bracket hydrogen would */
    seat[n++] = (Seat){1, -1};
  return n;
}

/* Sorts by text order; true when an odd number of neighbours changed places against the order of
 * the molecule. */
static bool
is_odd (Seat seat[4])
{
  bool odd = false;

  for (int i = 0; i < 4; i++)
    for (int j = i + 1; j < 4; j++)
      odd ^= (seat[i].key < seat[j].key) != (seat[i].index < seat[j].index);
  return odd;
}

static void
set_windings (EnlSmilesReader *r)
{
  for (uint32_t a = 0; a < r->mol->n_atoms; a++) {
    Seat seat[4];
    EnlSmilesTurn turn = (EnlSmilesTurn)atom_note (r, a)->turn;
    if (turn == TURN_NONE || count_seats (r, a, seat) != 4)
      continue;
    bool clockwise = (turn == TURN_CLOCKWISE) != is_odd (seat);
    r->mol->atom[a].winding = clockwise ? ENL_WINDING_CLOCKWISE : ENL_WINDING_ANTICLOCKWISE;
  }
}

/* ---- double bonds ---- */

/* 1 when the neighbour across link `i` lies above `atom`, -1 below, 0 not told. */
static int
height_across (EnlSmilesReader *r, uint32_t atom, uint32_t i)
{
  uint32_t bond = r->mol->via[i];
  int direction = bond_note (r, bond)->direction;

  return r->mol->bond[bond].from == atom ? direction : -direction;
}

/* What the marks tell of one end of a double bond. */
typedef struct {
  uint32_t neighbour; /* the first marked one */
  int height;         /* of it, 0 when no neighbour is marked */
  uint32_t clash;     /* bond whose mark contradicts the first, or ENL_NONE */
} End;

static End
look_at_end (EnlSmilesReader *r, uint32_t atom)
{
  End end = {ENL_NONE, 0, ENL_NONE};

  for (uint32_t i = r->mol->first[atom]; i < r->mol->first[atom + 1]; i++) {
    int height = height_across (r, atom, i);
    if (height && height == end.height)
      end.clash = r->mol->via[i];
    if (height && !end.height)
      end = (End){r->mol->neighbour[i], height, ENL_NONE};
  }
  return end;
}

static EnlStatus
set_side (EnlSmilesReader *r, EnlBond *bond)
{
  End from = look_at_end (r, bond->from), to = look_at_end (r, bond->to);

  if (!from.height || !to.height)
    return ENL_OK;
  uint32_t clash = from.clash != ENL_NONE ? from.clash : to.clash;
  if (clash != ENL_NONE)
    return enl_smiles_locate (
        r, bond_note (r, clash)->offset, 1,
        enl_error_set (r->err, ENL_ERROR_SYNTAX, "turn one of them or leave it out",
                       "'/' and '\\' put both neighbours on one side of a double bond"));
  bond->side = from.height == to.height ? ENL_SIDE_SAME : ENL_SIDE_OPPOSITE;
  bond->side_from = from.neighbour;
  bond->side_to = to.neighbour;
  return ENL_OK;
}

static EnlStatus
set_sides (EnlSmilesReader *r)
{
  EnlStatus status = ENL_OK;

  for (uint32_t i = 0; status == ENL_OK && i < r->mol->n_bonds; i++)
    if (r->mol->bond[i].order == 2 && !bond_note (r, i)->soft)
      status = set_side (r, &r->mol->bond[i]);
  return status;
}

/* ---- alternation ---- */

/* "Co", "Sn" and others read as two atoms when the brackets are forgotten. */
static bool
is_forgotten_bracket (const EnlSmilesReader *r, const EnlAtom *atom)
{
  const char *end = r->text + atom->offset;

  return atom->length == 1 && atom->offset > 0 && g_ascii_isupper (end[-1]) &&
         enl_element_find (end - 1, 2) >= 0;
}

static EnlStatus
check_rings_of_aromatic (EnlSmilesReader *r)
{
  for (uint32_t a = 0; a < r->mol->n_atoms; a++) {
    const EnlAtom *atom = &r->mol->atom[a];
    if (!atom_note (r, a)->aromatic || r->mol->smallest[a])
      continue;
    char advice[120];
    const char *symbol = enl_element_symbol (atom->element);
    size_t offset = atom->offset, length = atom->length;
    if (is_forgotten_bracket (r, atom)) {
      g_snprintf (advice, sizeof advice,
                  "write [%.2s] if the element is meant, else %s in capitals", r->text + --offset,
                  symbol);
      length++;
    } else {
      g_snprintf (advice, sizeof advice, "write %s in capitals, or close the ring", symbol);
    }
    return enl_smiles_locate (r, offset, length,
                              enl_error_set (r->err, ENL_ERROR_CHEMISTRY, advice,
                                             "aromatic '%.*s' is in no ring", (int)atom->length,
                                             r->text + atom->offset));
  }
  return ENL_OK;
}

/* An aromatic nitrogen with =O is written in full as its N-oxide. */
static void
separate_oxides (EnlSmilesReader *r)
{
  for (uint32_t a = 0; a < r->mol->n_atoms; a++) {
    EnlAtom *atom = &r->mol->atom[a];
    if (!atom_note (r, a)->aromatic || atom->element != NITROGEN || atom->charge)
      continue;
    for (uint32_t i = r->mol->first[a]; i < r->mol->first[a + 1]; i++) {
      EnlBond *bond = &r->mol->bond[r->mol->via[i]];
      EnlAtom *end = &r->mol->atom[r->mol->neighbour[i]];
      if (bond->order != 2 || bond_note (r, r->mol->via[i])->soft || end->element != OXYGEN ||
          end->charge || enl_molecule_degree (r->mol, r->mol->neighbour[i]) != 1)
        continue;
      bond->order = 1;
      atom->charge = 1;
      end->charge = -1;
    }
  }
}

/* A ring nitrogen that would make the alternation possible if it had a hydrogen, or ENL_NONE. */
static uint32_t
find_missing_hydrogen (EnlSmilesReader *r, const bool *soft)
{
  for (uint32_t a = 0; a < r->mol->n_atoms; a++) {
    EnlAtom *atom = &r->mol->atom[a];
    if (!atom_note (r, a)->aromatic || atom->element != NITROGEN || atom->charge || atom->exact ||
        enl_molecule_degree (r->mol, a) != 2)
      continue;
    atom->hydrogens = 1;
    bool placed = enl_kekule_place (r->mol, soft, ENL_KEKULE_DEFAULT, NULL);
    atom->hydrogens = 0;
    if (placed)
      return a;
  }
  return ENL_NONE;
}

static EnlStatus
report_alternation (EnlSmilesReader *r, const bool *soft, uint32_t culprit)
{
  uint32_t nitrogen = find_missing_hydrogen (r, soft);
  const EnlAtom *atom = &r->mol->atom[nitrogen != ENL_NONE ? nitrogen : culprit];

  enl_error_set (
      r->err, ENL_ERROR_CHEMISTRY,
      nitrogen != ENL_NONE ? "write [nH] if this nitrogen carries hydrogen"
                           : "check hydrogens and charges of the ring, or write its double bonds",
      "cannot place alternating double bonds at '%.*s'", (int)atom->length, r->text + atom->offset);
  return enl_smiles_locate (r, atom->offset, atom->length, ENL_ERROR_CHEMISTRY);
}

static EnlStatus
place_double_bonds (EnlSmilesReader *r)
{
  uint32_t n = r->mol->n_bonds, n_soft = 0, culprit;
  g_autofree bool *soft = g_new (bool, n + 1);

  for (uint32_t i = 0; i < n; i++)
    n_soft += soft[i] = bond_note (r, i)->soft;
  EnlStatus status = check_rings_of_aromatic (r);
  if (status != ENL_OK || !n_soft)
    return status;
  separate_oxides (r);
  if (!enl_kekule_place (r->mol, soft, ENL_KEKULE_DEFAULT, &culprit))
    return report_alternation (r, soft, culprit);
  return ENL_OK;
}

/* ---- the whole ---- */

static void
fill_hydrogens (EnlMolecule *mol)
{
  for (uint32_t a = 0; a < mol->n_atoms; a++) {
    EnlAtom *atom = &mol->atom[a];
    uint32_t sum = enl_molecule_order_sum (mol, a);
    if (atom->exact)
      atom->unpaired = enl_valence_unpaired (atom->element, atom->charge, sum + atom->hydrogens);
    else if (atom->charge == 0)
      atom->hydrogens = (uint8_t)enl_valence_implicit_hydrogens (atom->element, sum);
  }
}

static EnlStatus
check_valence (EnlSmilesReader *r)
{
  EnlStatus status = enl_valence_check (r->mol, NULL, r->err);

  if (status != ENL_OK && r->err)
    enl_smiles_locate (r, r->err->offset, r->err->length, status);
  return status;
}

EnlStatus
enl_smiles_build (EnlSmilesReader *r)
{
  EnlStatus status;

  if ((status = enl_molecule_check_size (r->mol, r->err)) != ENL_OK)
    return enl_smiles_locate (r, 0, r->size, status);
  enl_molecule_link (r->mol);
  set_windings (r);
  if ((status = set_sides (r)) != ENL_OK)
    return status;
  enl_molecule_find_rings (r->mol);
  if ((status = place_double_bonds (r)) != ENL_OK)
    return status;
  fill_hydrogens (r->mol);
  enl_valence_separate_charges (r->mol);
  if ((status = check_valence (r)) != ENL_OK)
    return status;
  enl_molecule_find_aromatic (r->mol);
  enl_stereo_clean (r->mol); /* before folding, which keeps hydrogens that stereo rests on */
  if (enl_molecule_fold_hydrogens (r->mol))
    enl_stereo_clean (r->mol);
  return ENL_OK;
}
