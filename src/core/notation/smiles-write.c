#include "core/notation/smiles.h"

#include <string.h>

#include "core/molecule/automorphism.h"
#include "core/molecule/elements.h"
#include "core/molecule/valence.h"
#include "core/notation/smiles-writer.h"

typedef struct {
  EnlSmilesWalk walk;
  GString *out;
  uint32_t *digit; /* per bond, number of the open ring closure */
  bool *in_use;    /* per ring number */
  uint32_t digits;
} Writer;

/* ---- the walk: spanning forest, branch sizes, written positions ---- */

static bool
goes_before (const EnlSmilesWalk *walk, uint32_t a, uint32_t b, const uint32_t *size)
{
  if (size && size[a] != size[b])
    return size[a] < size[b];
  return walk->rank[a] < walk->rank[b];
}

static void
sort_atoms (const EnlSmilesWalk *walk, uint32_t *list, uint32_t n, const uint32_t *size)
{
  for (uint32_t i = 1; i < n; i++)
    for (uint32_t j = i; j > 0 && goes_before (walk, list[j], list[j - 1], size); j--) {
      uint32_t swap = list[j];
      list[j] = list[j - 1];
      list[j - 1] = swap;
    }
}

/* Marks bonds as tree or ring bonds below `atom` and counts the atoms of each branch. */
static void
grow (EnlSmilesWalk *walk, uint32_t atom)
{
  uint32_t degree = enl_molecule_degree (walk->mol, atom);
  uint32_t near_by[16];
  uint32_t *list = degree <= ENL_COUNT (near_by) ? near_by : g_new (uint32_t, degree);

  for (uint32_t k = 0; k < degree; k++)
    list[k] = enl_molecule_neighbour (walk->mol, atom, k);
  sort_atoms (walk, list, degree, NULL);
  walk->size[atom] = 1;
  for (uint32_t k = 0; k < degree; k++) {
    uint32_t bond = enl_molecule_bond_between (walk->mol, atom, list[k]);
    if (walk->role[bond] != ENL_ROLE_UNSEEN)
      continue;
    if (walk->size[list[k]]) {
      walk->role[bond] = ENL_ROLE_RING;
      continue;
    }
    walk->role[bond] = ENL_ROLE_TREE;
    walk->parent[list[k]] = atom;
    grow (walk, list[k]);
    walk->size[atom] += walk->size[list[k]];
  }
  if (list != near_by)
    g_free (list);
}

uint32_t
enl_smiles_children (const EnlSmilesWalk *walk, uint32_t atom, uint32_t *list)
{
  uint32_t n = 0;

  for (uint32_t k = 0; k < enl_molecule_degree (walk->mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (walk->mol, atom, k);
    if (walk->parent[other] == atom &&
        walk->role[enl_molecule_bond_at (walk->mol, atom, k)] == ENL_ROLE_TREE)
      list[n++] = other;
  }
  /* The longest branch last: it needs no parentheses. */
  sort_atoms (walk, list, n, walk->flags & ENL_SMILES_INPUT_ORDER ? NULL : walk->size);
  return n;
}

static void
number (EnlSmilesWalk *walk, uint32_t atom, uint32_t *next)
{
  g_autofree uint32_t *child = g_new (uint32_t, enl_molecule_degree (walk->mol, atom) + 1);
  uint32_t children = enl_smiles_children (walk, atom, child);

  walk->visit[atom] = *next;
  walk->written[(*next)++] = atom;
  for (uint32_t i = 0; i < children; i++)
    number (walk, child[i], next);
}

/* Fragments: by their first atom in input order, else the largest first. */
static void
walk_fragments (EnlSmilesWalk *walk)
{
  g_autofree uint32_t *by_rank = g_new (uint32_t, walk->atoms + 1);
  g_autofree uint32_t *root = g_new (uint32_t, walk->atoms + 1);
  uint32_t roots = 0, next = 0;

  for (uint32_t v = 0; v < walk->atoms; v++) {
    by_rank[walk->rank[v]] = v;
    walk->parent[v] = ENL_NONE;
  }
  for (uint32_t i = 0; i < walk->atoms; i++)
    if (walk->size[by_rank[i]] == 0) {
      root[roots++] = by_rank[i];
      grow (walk, by_rank[i]);
    }
  while (roots > 0) {
    uint32_t best = 0;
    for (uint32_t i = 1; i < roots && !(walk->flags & ENL_SMILES_INPUT_ORDER); i++)
      if (walk->size[root[i]] > walk->size[root[best]])
        best = i;
    number (walk, root[best], &next);
    memmove (root + best, root + best + 1, sizeof *root * (--roots - best));
  }
}

/* ---- atoms ---- */

static bool
is_written_aromatic (const Writer *w, uint32_t atom)
{
  return enl_molecule_atom (w->walk.mol, atom)->aromatic && !(w->walk.flags & ENL_SMILES_KEKULE);
}

static bool
in_organic_subset (const EnlAtom *a, bool aromatic)
{
  switch (a->element) {
  case 0:
  case 5:
  case 6:
  case 7:
  case 8:
  case 15:
  case 16:
    return true;
  case 9:
  case 17:
  case 35:
  case 53:
    return !aromatic;
  default:
    return false;
  }
}

/* Hydrogens a reader gives the atom when it stands without brackets. */
static uint32_t
hydrogens_without_brackets (const Writer *w, uint32_t atom)
{
  const EnlMolecule *mol = w->walk.mol;
  uint32_t sum = 0;

  if (!is_written_aromatic (w, atom)) {
    for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
      sum += w->walk.order[enl_molecule_bond_at (mol, atom, k)];
    return enl_valence_implicit_hydrogens (enl_molecule_atom (mol, atom)->element, sum);
  }
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t bond = enl_molecule_bond_at (mol, atom, k);
    sum += enl_molecule_bond (mol, bond)->aromatic ? 1 : w->walk.order[bond];
  }
  return enl_molecule_atom (mol, atom)->element == 6 && sum == 2 ? 1 : 0;
}

static bool
needs_brackets (const Writer *w, uint32_t atom, char turn)
{
  const EnlAtom *a = enl_molecule_atom (w->walk.mol, atom);

  return turn || a->charge || a->isotope || a->unpaired ||
         (a->map && w->walk.flags & ENL_SMILES_MAPS) ||
         !in_organic_subset (a, is_written_aromatic (w, atom)) ||
         a->hydrogens != hydrogens_without_brackets (w, atom);
}

static void
put_symbol (Writer *w, uint32_t atom)
{
  const char *symbol = enl_element_symbol (enl_molecule_atom (w->walk.mol, atom)->element);

  if (is_written_aromatic (w, atom))
    g_string_append_c (w->out, g_ascii_tolower (*symbol++));
  g_string_append (w->out, symbol);
}

static void
put_bracket_atom (Writer *w, uint32_t atom, char turn)
{
  const EnlAtom *a = enl_molecule_atom (w->walk.mol, atom);
  uint32_t hydrogens = a->hydrogens - (w->walk.hydrogen_mark[atom] != 0);

  g_string_append_c (w->out, '[');
  if (a->isotope)
    g_string_append_printf (w->out, "%u", a->isotope);
  put_symbol (w, atom);
  if (turn)
    g_string_append (w->out, turn == '@' ? "@" : "@@");
  if (hydrogens)
    g_string_append_c (w->out, 'H');
  if (hydrogens > 1)
    g_string_append_printf (w->out, "%u", hydrogens);
  if (a->charge)
    g_string_append_c (w->out, a->charge > 0 ? '+' : '-');
  if (ABS (a->charge) > 1)
    g_string_append_printf (w->out, "%d", ABS (a->charge));
  if (a->map && w->walk.flags & ENL_SMILES_MAPS)
    g_string_append_printf (w->out, ":%u", a->map);
  g_string_append_c (w->out, ']');
}

static void
put_atom (Writer *w, uint32_t atom, char turn)
{
  if (needs_brackets (w, atom, turn))
    put_bracket_atom (w, atom, turn);
  else
    put_symbol (w, atom);
}

/* ---- bonds and ring closures ---- */

static void
put_bond (Writer *w, uint32_t bond)
{
  static const char symbol[] = {'~', 0, '=', '#', '$'};
  const EnlBond *b = enl_molecule_bond (w->walk.mol, bond);
  bool both = is_written_aromatic (w, b->from) && is_written_aromatic (w, b->to);
  uint8_t order = w->walk.order[bond];

  if (w->walk.mark[bond])
    g_string_append_c (w->out, w->walk.mark[bond] > 0 ? '/' : '\\');
  else if (both && b->aromatic)
    return;
  else if (both && order == 1)
    g_string_append_c (w->out, '-');
  else if (order < sizeof symbol && symbol[order])
    g_string_append_c (w->out, symbol[order]);
}

static void
put_digit (Writer *w, uint32_t digit)
{
  if (digit < 10)
    g_string_append_printf (w->out, "%u", digit);
  else if (digit < 100)
    g_string_append_printf (w->out, "%%%u", digit);
  else
    g_string_append_printf (w->out, "%%(%u)", digit);
}

static uint32_t
free_digit (Writer *w)
{
  uint32_t digit = 1;

  while (w->in_use[digit])
    digit++;
  w->in_use[digit] = true;
  return digit;
}

/* Ring bonds at the atom in the order of writing: closings by number, then openings by the written
 * position of the other end. Fills the far ends; returns how many. */
static uint32_t
ring_partners (const Writer *w, uint32_t atom, uint32_t *list, uint32_t *closings)
{
  const EnlSmilesWalk *walk = &w->walk;
  uint32_t n = 0;

  *closings = 0;
  for (uint32_t pass = 0; pass < 2; pass++) {
    uint32_t from = n;
    for (uint32_t k = 0; k < enl_molecule_degree (walk->mol, atom); k++) {
      uint32_t other = enl_molecule_neighbour (walk->mol, atom, k);
      bool opens = walk->visit[other] > walk->visit[atom];
      if (walk->role[enl_molecule_bond_at (walk->mol, atom, k)] != ENL_ROLE_RING || opens != pass)
        continue;
      uint32_t i = n++;
      for (; i > from && walk->visit[list[i - 1]] > walk->visit[other]; i--)
        list[i] = list[i - 1];
      list[i] = other;
    }
    if (pass == 0)
      *closings = n;
  }
  return n;
}

static void
put_ring_digits (Writer *w, uint32_t atom, const uint32_t *partner, uint32_t n, uint32_t closings)
{
  for (uint32_t i = 0; i < n; i++) {
    uint32_t bond = enl_molecule_bond_between (w->walk.mol, atom, partner[i]);
    if (i >= closings) {
      w->digit[bond] = free_digit (w);
      put_bond (w, bond);
    }
    put_digit (w, w->digit[bond]);
  }
  /* Freed only now, so that no number stands twice at one atom. */
  for (uint32_t i = 0; i < closings; i++)
    w->in_use[w->digit[enl_molecule_bond_between (w->walk.mol, atom, partner[i])]] = false;
}

/* ---- stereo ---- */

/* '@' when the neighbours in written order turn anticlockwise, 'X' for "@@", 0 for no winding. The
 * unwritten hydrogen or lone pair stands behind the atom before the centre. */
static char
turn_of (const Writer *w, uint32_t atom, const uint32_t *partner, uint32_t partners,
         const uint32_t *child, uint32_t children)
{
  uint32_t u = w->walk.graph->unit_at[atom];
  uint32_t list[5], n = 0;

  if (u == ENL_NONE || !w->walk.graph->unit[u].value)
    return 0;
  int sign = w->walk.graph->unit[u].value;
  if (w->walk.parent[atom] != ENL_NONE)
    list[n++] = w->walk.parent[atom] + 1;
  if (w->walk.graph->unit[u].ligands[0] == 3)
    list[n++] = 0;
  for (uint32_t i = 0; i < partners; i++)
    list[n++] = partner[i] + 1;
  for (uint32_t i = 0; i < children; i++)
    list[n++] = child[i] + 1;
  for (uint32_t i = 1; i < n; i++)
    for (uint32_t j = 0; j < i; j++)
      if (list[j] > list[i])
        sign = -sign;
  return sign > 0 ? '@' : 'X';
}

/* ---- text ---- */

static void
put_marked_hydrogen (Writer *w, uint32_t atom, bool in_branch)
{
  int mark = w->walk.hydrogen_mark[atom];

  if (mark)
    g_string_append_printf (w->out, in_branch ? "(%c[H])" : "%c[H]", mark > 0 ? '/' : '\\');
}

static void
put_branch (Writer *w, uint32_t atom)
{
  uint32_t degree = enl_molecule_degree (w->walk.mol, atom);
  g_autofree uint32_t *partner = g_new (uint32_t, 2 * (size_t)degree + 1);
  uint32_t *child = partner + degree;
  uint32_t closings, partners = ring_partners (w, atom, partner, &closings);
  uint32_t children = enl_smiles_children (&w->walk, atom, child);

  put_atom (w, atom, turn_of (w, atom, partner, partners, child, children));
  put_ring_digits (w, atom, partner, partners, closings);
  put_marked_hydrogen (w, atom, children > 0);
  for (uint32_t i = 0; i < children; i++) {
    if (i + 1 < children)
      g_string_append_c (w->out, '(');
    put_bond (w, enl_molecule_bond_between (w->walk.mol, atom, child[i]));
    put_branch (w, child[i]);
    if (i + 1 < children)
      g_string_append_c (w->out, ')');
  }
}

static void
put_all (Writer *w)
{
  for (uint32_t i = 0; i < w->walk.atoms; i++) {
    uint32_t atom = w->walk.written[i];
    if (w->walk.parent[atom] != ENL_NONE)
      continue;
    if (i > 0)
      g_string_append_c (w->out, '.');
    put_branch (w, atom);
  }
}

/* ---- set-up ---- */

static void
walk_init (EnlSmilesWalk *walk, const EnlMolecule *mol, const EnlGraph *graph, EnlSmilesFlags flags,
           const uint32_t *rank)
{
  uint32_t n = enl_molecule_atoms (mol), bonds = enl_molecule_bonds (mol);

  *walk = (EnlSmilesWalk){.mol = mol, .graph = graph, .flags = flags, .atoms = n, .rank = rank};
  walk->parent = g_new (uint32_t, n + 1);
  walk->visit = g_new (uint32_t, n + 1);
  walk->written = g_new (uint32_t, n + 1);
  walk->size = g_new0 (uint32_t, n + 1);
  walk->role = g_new0 (uint8_t, bonds + 1);
  walk->order = g_new (uint8_t, bonds + 1);
  walk->mark = g_new0 (int8_t, bonds + 1);
  walk->hydrogen_mark = g_new0 (int8_t, n + 1);
  for (uint32_t b = 0; b < bonds; b++)
    walk->order[b] = enl_molecule_bond (mol, b)->order;
}

static void
walk_clear (EnlSmilesWalk *walk)
{
  g_free (walk->parent);
  g_free (walk->visit);
  g_free (walk->written);
  g_free (walk->size);
  g_free (walk->role);
  g_free (walk->order);
  g_free (walk->mark);
  g_free (walk->hydrogen_mark);
}

static char *
write_ranked (const EnlMolecule *mol, const EnlGraph *graph, EnlSmilesFlags flags,
              const uint32_t *rank, uint32_t *order)
{
  uint32_t bonds = enl_molecule_bonds (mol);
  Writer w = {.out = g_string_new (NULL)};

  walk_init (&w.walk, mol, graph, flags, rank);
  if (flags & ENL_SMILES_KEKULE && !(flags & ENL_SMILES_INPUT_ORDER))
    enl_smiles_place_double_bonds (&w.walk);
  walk_fragments (&w.walk);
  enl_smiles_choose_marks (&w.walk);
  w.digit = g_new0 (uint32_t, bonds + 1);
  w.in_use = g_new0 (bool, bonds + 2);
  put_all (&w);
  if (order)
    memcpy (order, w.walk.written, sizeof *order * w.walk.atoms);
  g_free (w.digit);
  g_free (w.in_use);
  walk_clear (&w.walk);
  return g_string_free (w.out, FALSE);
}

char *
enl_smiles_write (const EnlMolecule *mol, EnlSmilesFlags flags, uint32_t *order)
{
  g_autoptr (EnlGraph) graph = enl_graph_new (mol, !(flags & ENL_SMILES_NO_STEREO));
  uint32_t n = enl_molecule_atoms (mol);

  enl_graph_settle_units (graph);
  if (flags & ENL_SMILES_INPUT_ORDER) {
    g_autofree uint32_t *rank = g_new (uint32_t, n + 1);
    for (uint32_t v = 0; v < n; v++)
      rank[v] = v;
    return write_ranked (mol, graph, flags, rank, order);
  }
  EnlSymmetry symmetry;
  enl_symmetry_search (graph, NULL, &symmetry);
  char *text = write_ranked (mol, graph, flags, symmetry.position, order);
  enl_symmetry_clear (&symmetry);
  return text;
}
