#include "core/molecule/cip-digraph.h"

#include <math.h>
#include <string.h>

#include "core/molecule/elements.h"

#define MAX_NODES  20000 /* a tree larger than this is left undecided; cages double every sphere */
#define MAX_SPHERE 400

typedef enum { REAL, HYDROGEN, LONE_PAIR, BOND_DUPLICATE, RING_DUPLICATE } Kind;

typedef struct {
  uint32_t atom;   /* ENL_NONE for what is not written */
  uint32_t parent; /* node; ENL_NONE at the root */
  uint32_t depth;  /* sphere */
  uint32_t origin; /* sphere of the atom that a ring duplicate stands for */
  uint32_t first;  /* its children are slot[first] .. slot[first + count - 1], best first */
  uint32_t count;
  double number; /* atomic number; a mean for duplicates in aromatic rings */
  Kind kind;
  bool tied; /* with the sibling before it */
  bool idle; /* below a ligand that is ranked already */
} Node;

typedef struct {
  const EnlMolecule *mol;
  const EnlCip *atom_label, *bond_label;
  Node *node;
  uint32_t *slot;
  uint32_t nodes, room, skip;
  uint32_t level[MAX_SPHERE + 2]; /* first node of a sphere */
  uint32_t spheres;
  bool overflow;
} Tree;

/* ---- growing ---- */

static bool
add_node (Tree *tree, uint32_t parent, uint32_t atom, Kind kind, double number, uint32_t origin)
{
  if (tree->nodes >= MAX_NODES) {
    tree->overflow = true;
    return false;
  }
  if (tree->nodes == tree->room) {
    tree->room = tree->room ? 2 * tree->room : 64;
    tree->node = g_renew (Node, tree->node, tree->room);
    tree->slot = g_renew (uint32_t, tree->slot, tree->room);
  }
  uint32_t n = tree->nodes++;
  tree->slot[n] = n;
  tree->node[n] =
      (Node){.atom = atom, .parent = parent, .kind = kind, .number = number, .origin = origin};
  if (parent != ENL_NONE) {
    Node *p = &tree->node[parent];
    if (p->count++ == 0)
      p->first = n;
    tree->node[n].depth = p->depth + 1;
    tree->node[n].idle = p->idle;
    tree->node[n].tied = p->count > 1;
  }
  return true;
}

/* The double bond of an aromatic ring atom may go to any ring neighbour that has one: its duplicate
 * has the mean of their atomic numbers (P-92.1.4.2). 0 for an atom without such a bond. */
static double
aromatic_duplicate (const EnlMolecule *mol, uint32_t atom)
{
  double sum = 0;
  uint32_t partners = 0;
  bool has_double = false;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    const EnlBond *bond = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k));
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    bool other_double = false;
    if (!bond->aromatic)
      continue;
    has_double = has_double || bond->order == 2;
    for (uint32_t j = 0; j < enl_molecule_degree (mol, other); j++) {
      const EnlBond *next = enl_molecule_bond (mol, enl_molecule_bond_at (mol, other, j));
      other_double = other_double || (next->aromatic && next->order == 2);
    }
    if (other_double) {
      sum += enl_molecule_atom (mol, other)->element;
      partners++;
    }
  }
  return has_double ? sum / partners : 0;
}

static uint32_t
sphere_on_path (const Tree *tree, uint32_t node, uint32_t atom)
{
  for (uint32_t n = node; n != ENL_NONE; n = tree->node[n].parent)
    if (tree->node[n].atom == atom)
      return tree->node[n].depth;
  return ENL_NONE;
}

static void
add_neighbour (Tree *tree, uint32_t n, uint32_t other, const EnlBond *bond)
{
  uint32_t parent = tree->node[n].parent;
  double number = enl_molecule_atom (tree->mol, other)->element;
  uint32_t copies = bond->aromatic || bond->order < 1 ? 0 : bond->order - 1u;

  if (parent == ENL_NONE || tree->node[parent].atom != other) {
    uint32_t sphere = sphere_on_path (tree, n, other);
    if (sphere == ENL_NONE)
      add_node (tree, n, other, REAL, number, 0);
    else
      add_node (tree, n, other, RING_DUPLICATE, number, sphere);
  }
  while (copies-- > 0)
    add_node (tree, n, other, BOND_DUPLICATE, number, 0);
}

static void
expand (Tree *tree, uint32_t n)
{
  const EnlMolecule *mol = tree->mol;
  uint32_t atom = tree->node[n].atom;

  if (tree->node[n].kind != REAL || tree->node[n].idle)
    return;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (tree->node[n].parent == ENL_NONE && other == tree->skip)
      continue;
    add_neighbour (tree, n, other, enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k)));
  }
  double mean = aromatic_duplicate (mol, atom);
  if (mean > 0)
    add_node (tree, n, atom, BOND_DUPLICATE, mean, 0);
  for (uint32_t h = 0; h < enl_molecule_atom (mol, atom)->hydrogens; h++)
    add_node (tree, n, ENL_NONE, HYDROGEN, 1, 0);
}

static void
grow_sphere (Tree *tree)
{
  uint32_t from = tree->level[tree->spheres - 1], to = tree->nodes;

  tree->level[tree->spheres++] = to;
  for (uint32_t n = from; n < to && !tree->overflow; n++)
    expand (tree, n);
  tree->level[tree->spheres] = tree->nodes;
}

/* ---- keys ---- */

static double
mass_of (const Tree *tree, const Node *node)
{
  if (node->kind == HYDROGEN)
    return enl_element_weight (1);
  if (node->kind != REAL)
    return 0;
  const EnlAtom *a = enl_molecule_atom (tree->mol, node->atom);
  return a->isotope ? a->isotope : enl_element_weight (a->element);
}

static bool
shares_ring (const Tree *tree, uint32_t atom)
{
  uint32_t root = tree->node[0].atom;

  for (uint32_t r = 0; r < enl_molecule_rings (tree->mol); r++) {
    uint32_t size, hits = 0;
    const uint32_t *ring = enl_molecule_ring (tree->mol, r, &size);
    for (uint32_t i = 0; i < size; i++)
      hits += ring[i] == root || ring[i] == atom;
    if (hits == 2)
      return true;
  }
  return false;
}

static EnlCip
label_of (const Tree *tree, const Node *node)
{
  if (node->kind != REAL || shares_ring (tree, node->atom))
    return ENL_CIP_NONE;
  return tree->atom_label[node->atom];
}

static EnlCip
bond_label_of (const Tree *tree, const Node *node)
{
  if (node->kind != REAL || node->parent == ENL_NONE)
    return ENL_CIP_NONE;
  uint32_t bond = enl_molecule_bond_between (tree->mol, node->atom, tree->node[node->parent].atom);
  return bond == ENL_NONE ? ENL_CIP_NONE : tree->bond_label[bond];
}

static double
label_key (const Tree *tree, const Node *node, EnlCipRule rule)
{
  EnlCip label = rule == ENL_CIP_RULE_3 ? bond_label_of (tree, node) : label_of (tree, node);
  bool chiral = label == ENL_CIP_R || label == ENL_CIP_S;
  bool pseudo = label == ENL_CIP_PSEUDO_R || label == ENL_CIP_PSEUDO_S;

  switch (rule) {
  case ENL_CIP_RULE_3:
    return label == ENL_CIP_Z ? 2 : label == ENL_CIP_E ? 1 : 0;
  case ENL_CIP_RULE_4A:
    return chiral ? 2 : pseudo ? 1 : 0;
  case ENL_CIP_RULE_4C:
    return label == ENL_CIP_PSEUDO_R;
  default:
    return label == ENL_CIP_R;
  }
}

static double
key_of (const Tree *tree, uint32_t n, EnlCipRule rule)
{
  const Node *node = &tree->node[n];

  switch (rule) {
  case ENL_CIP_RULE_1A:
    return node->number;
  case ENL_CIP_RULE_1B:
    return node->kind == RING_DUPLICATE ? MAX_SPHERE + 1.0 - node->origin : 0;
  case ENL_CIP_RULE_2:
    return mass_of (tree, node);
  default:
    return label_key (tree, node, rule);
  }
}

/* ---- comparing ---- */

static int
compare_keys (const Tree *tree, uint32_t a, uint32_t b, EnlCipRule rule)
{
  double x = key_of (tree, a, rule), y = key_of (tree, b, rule);

  if (fabs (x - y) < 1e-9)
    return 0;
  return x > y ? 1 : -1;
}

/* Compares what stands in `sphere` below two nodes that tie in the spheres before: the sets of
 * children in the order of their branches. A missing atom is lower than any other. */
static int
compare_sphere (const Tree *tree, uint32_t a, uint32_t b, uint32_t sphere, EnlCipRule rule)
{
  const Node *x = &tree->node[a], *y = &tree->node[b];
  int result = 0;

  if (x->depth == sphere)
    return compare_keys (tree, a, b, rule);
  for (uint32_t i = 0; i < MIN (x->count, y->count) && result == 0; i++)
    result =
        compare_sphere (tree, tree->slot[x->first + i], tree->slot[y->first + i], sphere, rule);
  if (result == 0 && x->count != y->count)
    result = x->count > y->count ? 1 : -1;
  return result;
}

/* Sorts runs of tied children of one node by what they hold in `sphere`; true when ties went. */
static void
sort_children (Tree *tree, uint32_t parent, uint32_t sphere, EnlCipRule rule)
{
  const Node *p = &tree->node[parent];
  uint32_t *slot = tree->slot + p->first;

  for (uint32_t from = 0, to; from < p->count; from = to) {
    for (to = from + 1; to < p->count && tree->node[slot[to]].tied; to++)
      ;
    for (uint32_t i = from + 1; i < to; i++)
      for (uint32_t j = i;
           j > from && compare_sphere (tree, slot[j], slot[j - 1], sphere, rule) > 0; j--) {
        uint32_t swap = slot[j];
        slot[j] = slot[j - 1];
        slot[j - 1] = swap;
      }
    tree->node[slot[from]].tied = false;
    for (uint32_t i = from + 1; i < to; i++)
      tree->node[slot[i]].tied = compare_sphere (tree, slot[i], slot[i - 1], sphere, rule) == 0;
  }
}

static void
sort_sphere (Tree *tree, uint32_t sphere, EnlCipRule rule)
{
  for (uint32_t d = sphere; d-- > 0;)
    for (uint32_t n = tree->level[d]; n < tree->level[d + 1]; n++)
      if (!tree->node[n].idle && tree->node[n].count > 1)
        sort_children (tree, n, sphere, rule);
}

/* Marks what is below ranked ligands as done with; true when no ligands tie. */
static bool
settle_ligands (Tree *tree)
{
  const Node *root = &tree->node[0];
  bool decided = true;

  for (uint32_t i = 0; i < root->count; i++) {
    Node *ligand = &tree->node[tree->slot[root->first + i]];
    bool next = i + 1 < root->count && tree->node[tree->slot[root->first + i + 1]].tied;
    ligand->idle = !ligand->tied && !next;
    decided = decided && !ligand->tied;
  }
  for (uint32_t n = tree->level[1] + root->count; n < tree->nodes; n++)
    tree->node[n].idle = tree->node[tree->node[n].parent].idle;
  return decided;
}

/* ---- one root ---- */

static void
plant (Tree *tree, uint32_t root, uint32_t ligands)
{
  add_node (tree, ENL_NONE, root, REAL, enl_molecule_atom (tree->mol, root)->element, 0);
  tree->spheres = 1;
  grow_sphere (tree);
  if (ligands == 3 && tree->skip == ENL_NONE && tree->node[0].count >= 3 &&
      enl_molecule_atom (tree->mol, root)->hydrogens == 0 &&
      enl_molecule_degree (tree->mol, root) == 3) {
    add_node (tree, 0, ENL_NONE, LONE_PAIR, 0, 0);
    tree->level[tree->spheres] = tree->nodes;
  }
}

static bool
apply_rule (Tree *tree, EnlCipRule rule)
{
  for (uint32_t sphere = 1; sphere < MAX_SPHERE; sphere++) {
    if (sphere >= tree->spheres)
      grow_sphere (tree);
    if (tree->overflow || tree->level[sphere] == tree->level[sphere + 1])
      return false;
    sort_sphere (tree, sphere, rule);
    if (settle_ligands (tree))
      return true;
  }
  return false;
}

static void
read_order (const Tree *tree, EnlCipOrder *order)
{
  const Node *root = &tree->node[0];

  for (uint32_t i = 0; i < root->count && order->count < ENL_COUNT (order->atom); i++) {
    const Node *node = &tree->node[tree->slot[root->first + i]];
    if (node->kind == REAL || node->kind == HYDROGEN || node->kind == LONE_PAIR)
      order->atom[order->count++] = node->atom;
  }
}

EnlCipOrder
enl_cip_order (const EnlMolecule *mol, uint32_t root, uint32_t skip, EnlCipRule last,
               const EnlCip *atom_label, const EnlCip *bond_label)
{
  Tree tree = {.mol = mol, .skip = skip, .atom_label = atom_label, .bond_label = bond_label};
  EnlCipOrder order = {0};

  plant (&tree, root, enl_molecule_degree (mol, root));
  for (EnlCipRule rule = 0; rule <= last && !order.decided && !tree.overflow; rule++) {
    order.rule = rule;
    order.decided = apply_rule (&tree, rule);
  }
  read_order (&tree, &order);
  g_free (tree.node);
  g_free (tree.slot);
  return order;
}
