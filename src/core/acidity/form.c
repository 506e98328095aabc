#include "core/acidity/form.h"

#include <stdlib.h>
#include <string.h>

#include "core/acidity/form-arrow.h"
#include "core/acidity/form-note.h"
#include "core/acidity/form-search.h"
#include "core/acidity/form-weight.h"
#include "core/acidity/pi.h"
#include "core/molecule/stereo.h"

/* ---- the conjugate base ---- */

static EnlStatus
check_size (const EnlMolecule *mol, EnlError *err)
{
  if (enl_molecule_heavy_atoms (mol) > ENL_MAX_HEAVY)
    return enl_error_set (err, ENL_ERROR_LIMIT, "use a smaller model of it",
                          "more than %d heavy atoms", ENL_MAX_HEAVY);
  return ENL_OK;
}

static uint32_t
find_hydrogen_atom (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    if (enl_molecule_atom (mol, other)->element == 1)
      return other;
  }
  return ENL_NONE;
}

/* `*site` is moved when an atom before it went. */
static EnlMolecule *
make_anion (const EnlMolecule *mol, uint32_t *site)
{
  EnlMolecule *anion = enl_molecule_copy (mol);
  EnlAtom *atom = enl_molecule_edit_atom (anion, *site);

  atom->charge--;
  atom->winding = ENL_WINDING_NONE;
  atom->exact = true;
  if (atom->hydrogens > 0) {
    atom->hydrogens--;
  } else {
    uint32_t n = enl_molecule_atoms (mol);
    g_autofree bool *remove = g_new0 (bool, n + 1);
    g_autofree uint32_t *renumber = g_new0 (uint32_t, n + 1);
    remove[find_hydrogen_atom (mol, *site)] = true;
    enl_molecule_remove_atoms (anion, remove, renumber);
    *site = renumber[*site];
  }
  enl_molecule_finish (anion);
  enl_stereo_clean (anion);
  return anion;
}

/* ---- contributors from states ---- */

static void
form_clear (EnlForm *form)
{
  g_free (form->order);
  g_free (form->charge);
  g_free (form->arrow);
}

/* The first form as drawn; a state is laid over it. */
static void
fill_base (const EnlMolecule *anion, EnlForm *form)
{
  uint32_t n = enl_molecule_atoms (anion), n_bonds = enl_molecule_bonds (anion);

  form->order = g_new0 (uint8_t, n_bonds + 1);
  form->charge = g_new0 (int8_t, n + 1);
  form->copies = 1;
  for (uint32_t b = 0; b < n_bonds; b++)
    form->order[b] = enl_molecule_bond (anion, b)->order;
  for (uint32_t i = 0; i < n; i++)
    form->charge[i] = enl_molecule_atom (anion, i)->charge;
}

static void
apply_state (EnlForm *form, const EnlFormStates *states, uint32_t state)
{
  const EnlFormNetwork *network = states->network;
  const int8_t *charge = enl_form_state_charge (states, state);
  const int8_t *pi = enl_form_state_pi (states, state);

  for (uint32_t k = 0; k < network->n_nodes; k++)
    form->charge[network->node[k].atom] = charge[k];
  for (uint32_t e = 0; e < network->n_edges; e++)
    form->order[network->edge[e].bond] = (uint8_t)(1 + pi[e]);
}

/* Where the moved pair sits: the atom whose charge fell; the site when none did. */
static uint32_t
find_centre (const EnlForms *forms, const EnlForm *form)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (forms->anion); i++)
    if (form->charge[i] < enl_molecule_atom (forms->anion, i)->charge)
      return i;
  return forms->site_atom;
}

static void
copy_form (const EnlForms *forms, const EnlForm *from, EnlForm *to)
{
  *to = *from;
  to->order = g_memdup2 (from->order, enl_molecule_bonds (forms->anion) + 1);
  to->charge = g_memdup2 (from->charge, enl_molecule_atoms (forms->anion) + 1);
  to->arrow = g_memdup2 (from->arrow, from->n_arrows * sizeof *from->arrow);
}

/* ---- order: form 0, then cards by falling weight, in a card the nearest first ---- */

typedef struct {
  const EnlForm *all;
  const double *card_weight;
  uint32_t card_of_start;
} Order;

static int
compare_forms (const void *a, const void *b, void *data)
{
  const uint32_t *x = a, *y = b;
  const Order *order = data;
  uint32_t card_x = order->all[*x].card, card_y = order->all[*y].card;

  if (card_x == card_y)
    return (*x > *y) - (*x < *y);
  if (card_x == order->card_of_start || card_y == order->card_of_start)
    return card_x == order->card_of_start ? -1 : 1;
  /* Weights that agree to nine digits are equal but for rounding. */
  double difference = order->card_weight[card_y] - order->card_weight[card_x];
  if (difference > 1e-9 || difference < -1e-9)
    return difference > 0.0 ? 1 : -1;
  return (card_x > card_y) - (card_x < card_y);
}

/* Sorts forms->all, whose cards are still those of `weights`, and numbers the cards anew. */
static void
sort_all (EnlForms *forms, const EnlFormWeights *weights)
{
  uint32_t n = forms->n_all, card = 0;
  g_autofree double *card_weight = g_new0 (double, weights->n_cards + 1);
  g_autofree uint32_t *place = g_new (uint32_t, n + 1);
  EnlForm *sorted = g_new0 (EnlForm, n);
  Order order = {forms->all, card_weight, weights->card[0]};

  for (uint32_t i = 0; i < n; i++) {
    place[i] = i;
    card_weight[weights->card[i]] += weights->weight[i];
  }
  g_qsort_with_data (place, (int)n, sizeof *place, compare_forms, &order);
  for (uint32_t i = 0; i < n; i++) {
    sorted[i] = forms->all[place[i]];
    card += i > 0 && weights->card[place[i]] != weights->card[place[i - 1]];
    sorted[i].card = card;
  }
  g_free (forms->all);
  forms->all = sorted;
}

static void
collapse (EnlForms *forms)
{
  forms->form = g_new0 (EnlForm, forms->n_all);
  for (uint32_t i = 0; i < forms->n_all; i++) {
    EnlForm *form = &forms->form[forms->all[i].card];
    if (forms->all[i].card == forms->n_forms) {
      copy_form (forms, &forms->all[i], form);
      forms->n_forms++;
    } else {
      form->copies++;
      form->weight += forms->all[i].weight;
    }
  }
}

/* ---- hybrid ---- */

static void
fill_hybrid (EnlForms *forms, const double *charge, const EnlFormStates *states)
{
  uint32_t n = enl_molecule_atoms (forms->anion), n_bonds = enl_molecule_bonds (forms->anion);
  bool expanded = states && states->network->expanded;

  forms->charge = g_memdup2 (charge, n * sizeof *charge);
  forms->bond_order = g_new0 (double, n_bonds + 1);
  for (uint32_t i = 0; i < forms->n_all; i++)
    for (uint32_t b = 0; b < n_bonds; b++)
      forms->bond_order[b] += forms->all[i].weight * forms->all[i].order[b];
  for (uint32_t k = 0; expanded && k < states->network->n_nodes; k++) {
    uint32_t atom = states->network->node[k].atom;
    forms->charge[atom] = 0.0;
    for (uint32_t i = 0; i < forms->n_all; i++)
      forms->charge[atom] += forms->all[i].weight * forms->all[i].charge[atom];
  }
}

/* ---- forms of a site ---- */

static void
add_arrows (EnlForms *forms)
{
  EnlFormView start = {forms->all[0].order, forms->all[0].charge};

  for (uint32_t i = 1; i < forms->n_all; i++) {
    EnlFormView end = {forms->all[i].order, forms->all[i].charge};
    forms->all[i].arrow = enl_form_arrows (forms->anion, start, end, &forms->all[i].n_arrows);
  }
}

static void
fill_single (EnlForms *forms, const double *charge)
{
  forms->n_all = 1;
  forms->all = g_new0 (EnlForm, 1);
  fill_base (forms->anion, &forms->all[0]);
  forms->all[0].weight = 1.0;
  forms->all[0].centre = forms->site_atom;
  collapse (forms);
  fill_hybrid (forms, charge, NULL);
}

static void
fill_from_states (EnlForms *forms, const double *charge, const EnlFormNetwork *network)
{
  EnlFormStates states;
  EnlFormWeights weights;

  enl_form_states_init (&states, network, ENL_MAX_FORMS);
  enl_form_weights_init (&weights, forms->anion, &states, charge);
  forms->capped = states.incomplete;
  forms->n_all = states.n;
  forms->all = g_new0 (EnlForm, states.n);
  for (uint32_t i = 0; i < states.n; i++) {
    EnlForm *form = &forms->all[i];
    fill_base (forms->anion, form);
    apply_state (form, &states, i);
    form->card = weights.card[i];
    form->weight = weights.weight[i];
    form->centre = find_centre (forms, form);
  }
  sort_all (forms, &weights);
  add_arrows (forms);
  collapse (forms);
  fill_hybrid (forms, charge, &states);
  enl_form_weights_clear (&weights);
  enl_form_states_clear (&states);
}

/* Forms, weights and hybrid of forms->anion, whose charge sits on forms->site_atom. */
static void
fill (EnlForms *forms)
{
  g_autoptr (EnlPi) pi = enl_pi_new (forms->anion);
  g_autoptr (GPtrArray) networks = enl_form_networks (forms->anion, forms->site_atom);

  if (networks->len == 0)
    fill_single (forms, enl_pi_charge (pi));
  else
    fill_from_states (forms, enl_pi_charge (pi), networks->pdata[0]);
  forms->note = enl_form_note (forms);
}

EnlStatus
enl_forms_of_site (const EnlMolecule *mol, uint32_t atom, EnlForms **out, EnlError *err)
{
  EnlStatus status = check_size (mol, err);

  *out = NULL;
  if (status != ENL_OK)
    return status;
  if (atom >= enl_molecule_atoms (mol))
    return enl_error_set (err, ENL_ERROR_RANGE, "name an atom of this structure",
                          "there is no atom %u: the structure has %u", atom + 1,
                          enl_molecule_atoms (mol));
  if (enl_molecule_total_hydrogens (mol, atom) == 0)
    return enl_error_set (err, ENL_ERROR_RANGE, "name an atom that carries a hydrogen",
                          "atom %u has no hydrogen to lose", atom + 1);
  EnlForms *forms = g_new0 (EnlForms, 1);
  forms->site_atom = atom;
  forms->anion = make_anion (mol, &forms->site_atom);
  fill (forms);
  *out = forms;
  return ENL_OK;
}

EnlStatus
enl_forms_of_anion (const EnlMolecule *anion, uint32_t atom, EnlForms **out, EnlError *err)
{
  EnlStatus status = check_size (anion, err);

  *out = NULL;
  if (status != ENL_OK)
    return status;
  if (atom >= enl_molecule_atoms (anion) || enl_molecule_atom (anion, atom)->charge >= 0)
    return enl_error_set (err, ENL_ERROR_RANGE, "name an atom drawn with a negative charge",
                          "atom %u carries no negative charge", atom + 1);
  EnlForms *forms = g_new0 (EnlForms, 1);
  forms->site_atom = atom;
  forms->anion = enl_molecule_copy (anion);
  fill (forms);
  *out = forms;
  return ENL_OK;
}

void
enl_forms_free (EnlForms *forms)
{
  if (!forms)
    return;
  for (uint32_t i = 0; i < forms->n_forms; i++)
    form_clear (&forms->form[i]);
  for (uint32_t i = 0; i < forms->n_all; i++)
    form_clear (&forms->all[i]);
  g_free (forms->form);
  g_free (forms->all);
  g_free (forms->charge);
  g_free (forms->bond_order);
  g_free (forms->note);
  enl_molecule_free (forms->anion);
  g_free (forms);
}

/* ---- molecules of forms ---- */

/* A double bond that was none in `anion` has no known side, and one that is gone needs none. */
static EnlMolecule *
make_molecule (const EnlMolecule *anion, const EnlForm *form)
{
  EnlMolecule *mol = enl_molecule_copy (anion);
  bool changed = false;

  for (uint32_t b = 0; b < enl_molecule_bonds (mol); b++) {
    if (enl_molecule_bond (mol, b)->order == form->order[b])
      continue;
    changed = true;
    EnlBond *bond = enl_molecule_edit_bond (mol, b);
    bond->order = form->order[b];
    bond->side = ENL_SIDE_NONE;
  }
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    if (enl_molecule_atom (mol, i)->charge == form->charge[i])
      continue;
    EnlAtom *atom = enl_molecule_edit_atom (mol, i);
    atom->charge = form->charge[i];
    atom->exact = true;
    changed = true;
  }
  if (changed)
    enl_molecule_finish (mol);
  return mol;
}

EnlMolecule *
enl_forms_molecule (const EnlForms *forms, uint32_t form)
{
  g_assert (form < forms->n_forms);
  return make_molecule (forms->anion, &forms->form[form]);
}

EnlMolecule *
enl_forms_molecule_of_all (const EnlForms *forms, uint32_t index)
{
  g_assert (index < forms->n_all);
  return make_molecule (forms->anion, &forms->all[index]);
}

/* Adds every combination of the forms so far with the states of one more network. */
static bool
combine (const EnlFormStates *states, GPtrArray *forms, const EnlMolecule *anion)
{
  uint32_t before = forms->len;

  for (uint32_t state = 1; state < states->n; state++)
    for (uint32_t i = 0; i < before; i++) {
      const EnlForm *form = forms->pdata[i];
      if (forms->len == ENL_MAX_FORMS)
        return false;
      EnlForm *next = g_new0 (EnlForm, 1);
      next->order = g_memdup2 (form->order, enl_molecule_bonds (anion) + 1);
      next->charge = g_memdup2 (form->charge, enl_molecule_atoms (anion) + 1);
      apply_state (next, states, state);
      g_ptr_array_add (forms, next);
    }
  return true;
}

static void
form_free (void *form)
{
  form_clear (form);
  g_free (form);
}

static void
molecule_free (void *mol)
{
  enl_molecule_free (mol);
}

EnlStatus
enl_forms_enumerate (const EnlMolecule *anion, GPtrArray **out, bool *capped, EnlError *err)
{
  EnlStatus status = check_size (anion, err);

  *out = NULL;
  *capped = false;
  if (status != ENL_OK)
    return status;
  g_autoptr (GPtrArray) networks = enl_form_networks (anion, ENL_NONE);
  g_autoptr (GPtrArray) forms = g_ptr_array_new_with_free_func (form_free);
  EnlForm *start = g_new0 (EnlForm, 1);
  fill_base (anion, start);
  g_ptr_array_add (forms, start);
  for (uint32_t i = 0; i < networks->len; i++) {
    EnlFormStates states;
    enl_form_states_init (&states, networks->pdata[i], ENL_MAX_FORMS);
    *capped |= states.incomplete;
    *capped |= !combine (&states, forms, anion);
    enl_form_states_clear (&states);
  }
  *out = g_ptr_array_new_with_free_func (molecule_free);
  for (uint32_t i = 0; i < forms->len; i++)
    g_ptr_array_add (*out, make_molecule (anion, forms->pdata[i]));
  return ENL_OK;
}
