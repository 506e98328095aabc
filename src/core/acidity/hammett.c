#include "core/acidity/hammett.h"

#include <math.h>
#include <string.h>

#include "core/base/table.h"
#include "core/notation/smiles.h"

/* Atoms of the largest fragment that is compared. */
#define MAX_FRAGMENT 24

typedef struct {
  char *name;
  EnlMolecule *mol; /* atom 0 is the point of attachment ('*') */
  uint32_t root;    /* its neighbour */
  EnlSigma sigma;
} Group;

struct EnlSubstituents {
  GArray *group; /* Group */
  EnlRingSigma effect[ENL_N_RING_EFFECTS][4];
};

static const char *const effect_name[ENL_N_RING_EFFECTS] = {
    [ENL_RING_AZA] = "aza",
    [ENL_RING_CATION] = "cation",
    [ENL_RING_FUSED] = "fused",
};

static void
clear_group (gpointer data)
{
  Group *group = data;

  g_free (group->name);
  enl_molecule_free (group->mol);
}

static double
cell_or (const EnlTable *table, size_t row, const char *column, double otherwise)
{
  double value = enl_table_number (table, row, enl_table_column (table, column));

  return isnan (value) ? otherwise : value;
}

static EnlStatus
bad_row (EnlError *err, const EnlTable *table, size_t row, const char *file, const char *what)
{
  enl_error_set (err, ENL_ERROR_FORMAT, "repair this row of the table", "%s: %s", file, what);
  if (err)
    err->line = enl_table_line (table, row), err->column = 1;
  return ENL_ERROR_FORMAT;
}

static EnlStatus
add_group (EnlSubstituents *table, const EnlTable *text, size_t row, EnlError *err)
{
  const char *smiles = enl_table_cell (text, row, enl_table_column (text, "smiles"));
  double meta = cell_or (text, row, "sigma_m", NAN), para = cell_or (text, row, "sigma_p", NAN);
  g_autoptr (EnlMolecule) mol = NULL;

  if (isnan (meta) || isnan (para))
    return ENL_OK; /* a row for other constants only */
  if (enl_smiles_parse (smiles, strlen (smiles), &mol, NULL) != ENL_OK)
    return bad_row (err, text, row, "substituents.tsv", "its structure cannot be read");
  uint32_t n = enl_molecule_atoms (mol);
  if (n < 2 || n > MAX_FRAGMENT || enl_molecule_atom (mol, 0)->element != 0 ||
      enl_molecule_degree (mol, 0) != 1)
    return bad_row (err, text, row, "substituents.tsv", "it must begin with one '*'");
  Group group = {
      .name = g_strdup (enl_table_cell (text, row, enl_table_column (text, "substituent"))),
      .root = enl_molecule_neighbour (mol, 0, 0),
      .sigma = {meta, para, cell_or (text, row, "sigma_p_minus", para)},
      .mol = mol,
  };
  mol = NULL; /* the group owns it now */
  g_array_append_val (table->group, group);
  return ENL_OK;
}

static EnlStatus
read_effects (EnlSubstituents *table, const EnlTable *text, EnlError *err)
{
  bool seen[ENL_N_RING_EFFECTS][4] = {{false}};

  for (size_t row = 0; row < enl_table_rows (text); row++) {
    const char *name = enl_table_cell (text, row, enl_table_column (text, "effect"));
    double position = cell_or (text, row, "position", 0);
    int effect = 0;
    while (effect < ENL_N_RING_EFFECTS && strcmp (name, effect_name[effect]) != 0)
      effect++;
    if (effect == ENL_N_RING_EFFECTS || !(position >= 1 && position <= 3))
      return bad_row (err, text, row, "ring-effects.tsv", "unknown effect or position");
    int place = (int)position;
    table->effect[effect][place] =
        (EnlRingSigma){cell_or (text, row, "meta", 0), cell_or (text, row, "para", 0),
                       cell_or (text, row, "extra", 0), cell_or (text, row, "ortho", 0)};
    seen[effect][place] = true;
  }
  for (int effect = 0; effect < ENL_N_RING_EFFECTS; effect++)
    for (int place = 1; place <= 3; place++)
      if (!seen[effect][place])
        return enl_error_set (err, ENL_ERROR_FORMAT, "add the row",
                              "ring-effects.tsv lacks '%s' at position %d", effect_name[effect],
                              place);
  return ENL_OK;
}

EnlStatus
enl_substituents_new (const char *groups, size_t groups_size, const char *rings, size_t rings_size,
                      EnlSubstituents **out, EnlError *err)
{
  g_autoptr (EnlSubstituents) table = g_new0 (EnlSubstituents, 1);
  g_autoptr (EnlTable) group = NULL;
  g_autoptr (EnlTable) ring = NULL;
  EnlStatus status;

  *out = NULL;
  table->group = g_array_new (FALSE, FALSE, sizeof (Group));
  g_array_set_clear_func (table->group, clear_group);
  if ((status = enl_table_parse (groups, groups_size, &group, err)) != ENL_OK ||
      (status = enl_table_parse (rings, rings_size, &ring, err)) != ENL_OK)
    return status;
  for (size_t row = 0; row < enl_table_rows (group); row++)
    if ((status = add_group (table, group, row, err)) != ENL_OK)
      return status;
  if ((status = read_effects (table, ring, err)) != ENL_OK)
    return status;
  *out = g_steal_pointer (&table);
  return ENL_OK;
}

void
enl_substituents_free (EnlSubstituents *table)
{
  if (!table)
    return;
  g_array_unref (table->group);
  g_free (table);
}

/* ---- a fragment laid over a molecule ---- */

typedef struct {
  const EnlMolecule *fragment, *mol;
  uint32_t image[MAX_FRAGMENT]; /* atom of mol under each atom of the fragment */
  uint32_t order[MAX_FRAGMENT]; /* fragment atoms, each after one of its neighbours */
  uint32_t via[MAX_FRAGMENT];   /* the neighbour that came before */
  uint32_t n;
  int best; /* score of the best overlay so far, -1 for none */
} Overlay;

static bool
same_atom (const EnlAtom *a, const EnlAtom *b)
{
  return a->element == b->element && a->charge == b->charge && a->aromatic == b->aromatic;
}

static bool
same_bond (const EnlBond *a, const EnlBond *b)
{
  return a->aromatic == b->aromatic && (a->aromatic || a->order == b->order);
}

/* Every bond of the fragment between placed atoms must be there in the molecule. */
static bool
bonds_fit (const Overlay *lay, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (lay->fragment, atom); k++) {
    uint32_t other = enl_molecule_neighbour (lay->fragment, atom, k);
    if (other == 0 || lay->image[other] == ENL_NONE)
      continue;
    uint32_t bond = enl_molecule_bond_between (lay->mol, lay->image[atom], lay->image[other]);
    if (bond == ENL_NONE)
      return false;
    if (!same_bond (
            enl_molecule_bond (lay->fragment, enl_molecule_bond_at (lay->fragment, atom, k)),
            enl_molecule_bond (lay->mol, bond)))
      return false;
  }
  return true;
}

/* Two points for every atom covered, one less for every hydrogen too many or too few. */
static int
score (const Overlay *lay)
{
  int points = 0;

  for (uint32_t k = 0; k < lay->n; k++) {
    uint32_t atom = lay->order[k];
    int have = (int)enl_molecule_total_hydrogens (lay->mol, lay->image[atom]);
    int want = (int)enl_molecule_total_hydrogens (lay->fragment, atom);
    points += 2 - abs (have - want);
  }
  return points;
}

static bool
taken (const Overlay *lay, uint32_t atom, uint32_t count)
{
  for (uint32_t k = 0; k < count; k++)
    if (lay->image[lay->order[k]] == atom)
      return true;
  return false;
}

static void
place_from (Overlay *lay, uint32_t k, uint32_t parent)
{
  if (k == lay->n) {
    lay->best = MAX (lay->best, score (lay));
    return;
  }
  uint32_t atom = lay->order[k], from = lay->image[lay->via[k]];
  for (uint32_t i = 0; i < enl_molecule_degree (lay->mol, from); i++) {
    uint32_t candidate = enl_molecule_neighbour (lay->mol, from, i);
    if (candidate == parent || taken (lay, candidate, k) ||
        !same_atom (enl_molecule_atom (lay->fragment, atom),
                    enl_molecule_atom (lay->mol, candidate)))
      continue;
    lay->image[atom] = candidate;
    if (bonds_fit (lay, atom))
      place_from (lay, k + 1, parent);
    lay->image[atom] = ENL_NONE;
  }
}

/* Order of the fragment's atoms, breadth first from its root; the '*' is left out. */
static void
order_fragment (Overlay *lay, uint32_t root)
{
  bool seen[MAX_FRAGMENT] = {[0] = true};

  lay->n = 0;
  lay->order[lay->n++] = root;
  seen[root] = true;
  for (uint32_t head = 0; head < lay->n; head++) {
    uint32_t atom = lay->order[head];
    for (uint32_t k = 0; k < enl_molecule_degree (lay->fragment, atom); k++) {
      uint32_t other = enl_molecule_neighbour (lay->fragment, atom, k);
      if (seen[other])
        continue;
      seen[other] = true;
      lay->via[lay->n] = atom;
      lay->order[lay->n++] = other;
    }
  }
}

static int
cover (const Group *group, const EnlMolecule *mol, uint32_t root, uint32_t parent)
{
  Overlay lay = {.fragment = group->mol, .mol = mol, .best = -1};

  if (!same_atom (enl_molecule_atom (group->mol, group->root), enl_molecule_atom (mol, root)))
    return -1;
  memset (lay.image, 0xff, sizeof lay.image);
  order_fragment (&lay, group->root);
  lay.image[group->root] = root;
  place_from (&lay, 1, parent);
  return lay.best;
}

bool
enl_substituents_find (const EnlSubstituents *table, const EnlMolecule *mol, uint32_t root,
                       uint32_t parent, EnlSigma *out, const char **name)
{
  int best = -1;

  *out = (EnlSigma){0, 0, 0};
  if (name)
    *name = NULL;
  for (guint i = 0; i < table->group->len; i++) {
    const Group *group = &g_array_index (table->group, Group, i);
    int points = cover (group, mol, root, parent);
    if (points <= best)
      continue;
    best = points;
    *out = group->sigma;
    if (name)
      *name = group->name;
  }
  return best >= 0;
}

EnlRingSigma
enl_substituents_ring_effect (const EnlSubstituents *table, EnlRingEffect effect, uint32_t position)
{
  g_assert (effect < ENL_N_RING_EFFECTS && position >= 1 && position <= 3);
  return table->effect[effect][position];
}
