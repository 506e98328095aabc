#include "core/acidity/form-network.h"

#include <stdlib.h>

enum { C = 6, N = 7, O = 8, P = 15, S = 16, AS = 33, SE = 34, TE = 52 };

typedef struct {
  const EnlMolecule *mol;
  const EnlConjugationAtom *fact;
  bool *member;    /* atom is a node */
  bool *hub;       /* expanded atom about which terminal atoms share charge */
  uint8_t *pi;     /* pi bonds of the atom inside the network */
  bool *may_minus; /* an electron pair can arrive here */
  bool *may_plus;  /* a lone pair can leave here towards a cation */
} Draft;

static bool
is_chalcogen (uint8_t element)
{
  return element == O || element == S || element == SE || element == TE;
}

/* One partner only, which is an expanded atom: =O or -O(-) of a sulfonyl, phosphoryl ... */
static bool
is_terminal_on_hub (const Draft *d, uint32_t atom)
{
  return is_chalcogen (d->fact[atom].element) && d->fact[atom].sigma == 1 &&
         enl_molecule_degree (d->mol, atom) == 1 && !d->fact[atom].inert &&
         d->fact[enl_molecule_neighbour (d->mol, atom, 0)].expanded;
}

static bool
has_terminal_anion (const Draft *d, uint32_t hub)
{
  for (uint32_t k = 0; k < enl_molecule_degree (d->mol, hub); k++) {
    uint32_t other = enl_molecule_neighbour (d->mol, hub, k);
    if (is_terminal_on_hub (d, other) && d->fact[other].charge == -1)
      return true;
  }
  return false;
}

static bool
is_edge (const Draft *d, const EnlBond *bond)
{
  if (bond->order == 0 || !d->member[bond->from] || !d->member[bond->to])
    return false;
  if (d->hub[bond->from] || d->hub[bond->to])
    return is_terminal_on_hub (d, d->hub[bond->from] ? bond->to : bond->from);
  return !is_terminal_on_hub (d, bond->from) && !is_terminal_on_hub (d, bond->to);
}

/* Conjugating atoms with a pi bond or an anionic lone pair; neutral donors join when a cation is
 * about that their pair could reach (decided later by may_plus). */
static bool
is_member (const EnlConjugationAtom *f)
{
  bool hetero = f->element == N || f->element == P || f->element == AS || is_chalcogen (f->element);

  if (f->inert || f->unpaired || f->charge < -1 || f->charge > 1)
    return false;
  if (f->element != C && !hetero)
    return false;
  if (f->pi > 0)
    return f->element != C || f->charge <= 0;
  return f->charge == -1 ||
         (hetero && f->charge == 0 && f->sigma <= (is_chalcogen (f->element) ? 2 : 3));
}

static void
find_members (Draft *d)
{
  uint32_t n = enl_molecule_atoms (d->mol);

  for (uint32_t i = 0; i < n; i++) {
    d->hub[i] = d->fact[i].expanded && has_terminal_anion (d, i);
    d->member[i] = d->hub[i] || is_member (&d->fact[i]);
  }
  for (uint32_t b = 0; b < enl_molecule_bonds (d->mol); b++) {
    const EnlBond *bond = enl_molecule_bond (d->mol, b);
    if (!is_edge (d, bond))
      continue;
    d->pi[bond->from] = (uint8_t)(d->pi[bond->from] + bond->order - 1);
    d->pi[bond->to] = (uint8_t)(d->pi[bond->to] + bond->order - 1);
  }
}

/* ---- where pairs can arrive and leave ---- */

static bool
bond_is_pi (const Draft *d, uint32_t atom, uint32_t k)
{
  return enl_molecule_bond (d->mol, enl_molecule_bond_at (d->mol, atom, k))->order > 1;
}

static bool
edge_at (const Draft *d, uint32_t atom, uint32_t k)
{
  return is_edge (d, enl_molecule_bond (d->mol, enl_molecule_bond_at (d->mol, atom, k)));
}

/* A pair on `x` beside y=z can end on z: walk over all such steps. Walks may cross themselves,
 * so that this marks a few atoms too many; the search sorts them out. */
static void
mark_minus (Draft *d)
{
  uint32_t n = enl_molecule_atoms (d->mol);
  g_autoptr (GArray) queue = g_array_new (FALSE, FALSE, sizeof (uint32_t));

  for (uint32_t i = 0; i < n; i++)
    if (d->member[i] && d->fact[i].charge == -1) {
      d->may_minus[i] = true;
      g_array_append_val (queue, i);
    }
  for (uint32_t q = 0; q < queue->len; q++) {
    uint32_t x = g_array_index (queue, uint32_t, q);
    for (uint32_t k = 0; k < enl_molecule_degree (d->mol, x); k++) {
      uint32_t y = enl_molecule_neighbour (d->mol, x, k);
      for (uint32_t m = 0; edge_at (d, x, k) && m < enl_molecule_degree (d->mol, y); m++) {
        uint32_t z = enl_molecule_neighbour (d->mol, y, m);
        if (!edge_at (d, y, m) || !bond_is_pi (d, y, m) || d->may_minus[z] || d->hub[z])
          continue;
        d->may_minus[z] = true;
        g_array_append_val (queue, z);
      }
    }
  }
}

static bool
is_mobile_cation (const Draft *d, uint32_t atom)
{
  if (!d->member[atom] || d->fact[atom].charge != 1 || d->pi[atom] == 0)
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (d->mol, atom); k++)
    if (d->fact[enl_molecule_neighbour (d->mol, atom, k)].charge < 0)
      return false; /* nitro, N-oxide: the charges belong together */
  return true;
}

/* From y of y=z(+): a donor on y, or on v of y-w=v, can give its pair. */
static void
mark_plus (Draft *d)
{
  uint32_t n = enl_molecule_atoms (d->mol);
  g_autoptr (GArray) queue = g_array_new (FALSE, FALSE, sizeof (uint32_t));
  g_autofree bool *poor = g_new0 (bool, n + 1);

  for (uint32_t i = 0; i < n; i++)
    for (uint32_t k = 0; is_mobile_cation (d, i) && k < enl_molecule_degree (d->mol, i); k++) {
      uint32_t y = enl_molecule_neighbour (d->mol, i, k);
      if (edge_at (d, i, k) && bond_is_pi (d, i, k) && !poor[y]) {
        poor[y] = true;
        g_array_append_val (queue, y);
      }
    }
  for (uint32_t q = 0; q < queue->len; q++) {
    uint32_t y = g_array_index (queue, uint32_t, q);
    for (uint32_t k = 0; k < enl_molecule_degree (d->mol, y); k++) {
      uint32_t w = enl_molecule_neighbour (d->mol, y, k);
      if (!edge_at (d, y, k))
        continue;
      if (d->fact[w].charge == 0 && d->pi[w] == 0)
        d->may_plus[w] = true;
      for (uint32_t m = 0; m < enl_molecule_degree (d->mol, w); m++) {
        uint32_t v = enl_molecule_neighbour (d->mol, w, m);
        if (v == y || poor[v] || !edge_at (d, w, m) || !bond_is_pi (d, w, m))
          continue;
        poor[v] = true;
        g_array_append_val (queue, v);
      }
    }
  }
}

/* Donors that no cation can use are no nodes after all. */
static void
drop_idle_donors (Draft *d)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (d->mol); i++)
    if (d->member[i] && !d->hub[i] && d->pi[i] == 0 && d->fact[i].charge == 0 && !d->may_plus[i] &&
        !is_terminal_on_hub (d, i))
      d->member[i] = false;
}

/* ---- networks ---- */

static bool
beside_linear (const Draft *d, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (d->mol, atom); k++)
    if (edge_at (d, atom, k) && d->pi[enl_molecule_neighbour (d->mol, atom, k)] >= 2)
      return true;
  return false;
}

/* Pi bonds the atom can have: two only where a linear atom can be, in step with the pi model. */
static int
most_pi (const Draft *d, uint32_t atom)
{
  const EnlConjugationAtom *f = &d->fact[atom];

  if (d->hub[atom] || d->pi[atom] >= 2)
    return d->pi[atom];
  return d->pi[atom] == 1 && f->charge == -1 && !f->ring && beside_linear (d, atom) ? 2 : 1;
}

static EnlFormNode
make_node (const Draft *d, uint32_t atom)
{
  int8_t charge = d->fact[atom].charge;
  EnlFormNode node = {.atom = atom, .charge = charge};

  node.balance = (int8_t)(d->pi[atom] - charge);
  if (d->hub[atom]) {
    node.can_minus = charge == -1;
    node.can_neutral = charge == 0;
    node.can_plus = charge == 1;
    return node;
  }
  node.can_minus = charge == -1 || (charge == 0 && d->may_minus[atom]);
  node.can_neutral = charge >= 0 || node.balance <= most_pi (d, atom);
  node.can_plus = charge == 1 || d->may_plus[atom];
  return node;
}

static void
network_free (void *data)
{
  EnlFormNetwork *network = data;

  g_free (network->node);
  g_free (network->edge);
  g_free (network->incident);
  g_free (network);
}

static uint8_t
most_pi_of_bond (const Draft *d, const EnlBond *bond)
{
  bool linear = most_pi (d, bond->from) == 2 && most_pi (d, bond->to) == 2;

  if (d->hub[bond->from] || d->hub[bond->to])
    return 1;
  return linear || bond->order > 2 ? 2 : 1;
}

static void
add_edges (EnlFormNetwork *network, const Draft *d, const uint32_t *node_of)
{
  uint32_t place = 0;

  for (uint32_t b = 0; b < enl_molecule_bonds (d->mol); b++) {
    const EnlBond *bond = enl_molecule_bond (d->mol, b);
    if (!is_edge (d, bond) || node_of[bond->from] == ENL_NONE || node_of[bond->to] == ENL_NONE)
      continue;
    network->edge[network->n_edges++] = (EnlFormEdge){
        .a = node_of[bond->from],
        .b = node_of[bond->to],
        .bond = b,
        .pi = (uint8_t)(bond->order - 1),
        .max = most_pi_of_bond (d, bond),
    };
  }
  for (uint32_t i = 0; i < network->n_nodes; i++) {
    network->node[i].first = place;
    for (uint32_t e = 0; e < network->n_edges; e++)
      if (network->edge[e].a == i || network->edge[e].b == i)
        network->incident[place++] = e;
    network->node[i].n = place - network->node[i].first;
  }
}

/* The network of all atoms whose `part` is `wanted`. */
static EnlFormNetwork *
make_network (const Draft *d, const uint32_t *part, uint32_t wanted)
{
  uint32_t n = enl_molecule_atoms (d->mol), n_bonds = enl_molecule_bonds (d->mol);
  EnlFormNetwork *network = g_new0 (EnlFormNetwork, 1);
  g_autofree uint32_t *node_of = g_new (uint32_t, n + 1);

  network->node = g_new0 (EnlFormNode, n + 1);
  network->edge = g_new0 (EnlFormEdge, n_bonds + 1);
  network->incident = g_new0 (uint32_t, 2 * n_bonds + 1);
  for (uint32_t i = 0; i < n; i++) {
    node_of[i] = ENL_NONE;
    if (part[i] != wanted)
      continue;
    node_of[i] = network->n_nodes;
    network->node[network->n_nodes++] = make_node (d, i);
    network->charge += d->fact[i].charge;
    network->charges += abs (d->fact[i].charge);
    network->expanded |= d->hub[i];
  }
  add_edges (network, d, node_of);
  return network;
}

static void
spread (const Draft *d, uint32_t *part, uint32_t start, uint32_t number)
{
  g_autoptr (GArray) stack = g_array_new (FALSE, FALSE, sizeof (uint32_t));

  part[start] = number;
  g_array_append_val (stack, start);
  while (stack->len) {
    uint32_t i = g_array_index (stack, uint32_t, stack->len - 1);
    g_array_set_size (stack, stack->len - 1);
    for (uint32_t k = 0; k < enl_molecule_degree (d->mol, i); k++) {
      uint32_t j = enl_molecule_neighbour (d->mol, i, k);
      if (!edge_at (d, i, k) || part[j] != ENL_NONE)
        continue;
      part[j] = number;
      g_array_append_val (stack, j);
    }
  }
}

static int
compare_networks (const void *a, const void *b)
{
  const EnlFormNetwork *x = *(EnlFormNetwork *const *)a, *y = *(EnlFormNetwork *const *)b;

  return (x->n_nodes < y->n_nodes) - (x->n_nodes > y->n_nodes);
}

static GPtrArray *
split (const Draft *d, uint32_t atom)
{
  uint32_t n = enl_molecule_atoms (d->mol);
  g_autofree uint32_t *part = g_new (uint32_t, n + 1);
  GPtrArray *networks = g_ptr_array_new_with_free_func (network_free);

  for (uint32_t i = 0; i < n; i++)
    part[i] = ENL_NONE;
  for (uint32_t i = 0; i < n; i++) {
    bool wanted = atom == ENL_NONE ? d->fact[i].charge != 0 : i == atom;
    if (!wanted || !d->member[i] || part[i] != ENL_NONE)
      continue;
    spread (d, part, i, i);
    g_ptr_array_add (networks, make_network (d, part, i));
  }
  g_ptr_array_sort (networks, compare_networks);
  return networks;
}

GPtrArray *
enl_form_networks (const EnlMolecule *anion, uint32_t atom)
{
  uint32_t n = enl_molecule_atoms (anion);
  g_autofree EnlConjugationAtom *fact = enl_conjugation_facts (anion);
  g_autofree bool *flags = g_new0 (bool, 4 * n + 1);
  g_autofree uint8_t *pi = g_new0 (uint8_t, n + 1);
  Draft draft = {
      .mol = anion,
      .fact = fact,
      .member = flags,
      .hub = flags + n,
      .may_minus = flags + 2 * n,
      .may_plus = flags + 3 * n,
      .pi = pi,
  };

  find_members (&draft);
  mark_minus (&draft);
  mark_plus (&draft);
  drop_idle_donors (&draft);
  return split (&draft, atom);
}
