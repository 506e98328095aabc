#include "core/bases/ions.h"

#include <stdlib.h>
#include <string.h>

#include "core/acidity/group.h"
#include "core/bases/overlap.h"

/* ---- who goes before whom ---- */

static double
pka (const EnlQuestion *q, uint32_t site)
{
  return q->estimate[site].value;
}

/* A heteroatom acid that can stand before others: its number is that of the neutral molecule. */
static bool
is_rival (const EnlQuestion *q, uint32_t site)
{
  return q->sites->site[site].acidic_heteroatom && !q->sites->site[site].second;
}

/* For a second site without a heteroatom acid before it: the C-H between two acceptors. */
static uint32_t
most_acidic_first_site (const EnlQuestion *q)
{
  uint32_t best = ENL_NONE;

  for (uint32_t i = 0; i < q->sites->n_sites; i++)
    if (!q->sites->site[i].second && (best == ENL_NONE || pka (q, i) < pka (q, best)))
      best = i;
  return best;
}

static bool
has_rival_before (const EnlQuestion *q, uint32_t later)
{
  for (uint32_t i = 0; i < q->sites->n_sites; i++)
    if (i != later && is_rival (q, i) && pka (q, i) < pka (q, later))
      return true;
  return false;
}

/* Certain to be lost when `later` is: the estimate of `later` counts on it. */
static bool
precedes (const EnlQuestion *q, uint32_t site, uint32_t later)
{
  if (site == later || !q->sites->site[later].second || !(pka (q, site) < pka (q, later)))
    return false;
  return is_rival (q, site) || (site == most_acidic_first_site (q) && !has_rival_before (q, later));
}

/* The N-H (O-H) sits on the C=O that holds the carbanion: one charge covers both. */
static bool
shares_acceptor (const EnlQuestion *q, uint32_t rival, uint32_t carbon)
{
  const EnlSite *h = &q->sites->site[rival], *c = &q->sites->site[carbon];

  for (uint32_t k = 0; k < enl_molecule_degree (q->mol, c->atom[0]); k++) {
    uint32_t acceptor = enl_molecule_neighbour (q->mol, c->atom[0], k);
    if (!enl_group_is_acceptor (enl_group_of (q->mol, acceptor)))
      continue;
    for (uint32_t i = 0; i < h->n_atoms; i++)
      if (h->atom[i] == acceptor ||
          enl_molecule_bond_between (q->mol, h->atom[i], acceptor) != ENL_NONE)
        return true;
  }
  return false;
}

/* Takes base before `site` or beside it, by its number. */
static bool
competes (const EnlQuestion *q, uint32_t rival, uint32_t site)
{
  const EnlSite *target = &q->sites->site[site];

  if (rival == site || !is_rival (q, rival) || target->second)
    return false;
  if (pka (q, rival) < pka (q, site))
    return true;
  return target->kind == ENL_SITE_CARBON && !shares_acceptor (q, rival, site) &&
         pka (q, rival) < pka (q, site) + q->practice->competing_within;
}

/* ---- forms ---- */

/* One form while it is made up. */
typedef struct {
  EnlSpecies species;
  EnlSiteSet lost;
} Form;

/* Each atom of a class of heteroatom acids loses a hydrogen; a carbon class loses one. */
static uint32_t
hydrogens_taken (const EnlQuestion *q, uint32_t site)
{
  const EnlSite *s = &q->sites->site[site];

  return s->kind == ENL_SITE_CARBON ? 1 : s->n_atoms;
}

static double
charge_term (const EnlQuestion *q)
{
  return q->practice->second_charge[q->conditions->solvent];
}

/* `charge` for every proton that is gone already. */
static void
lose (const EnlQuestion *q, Form *form, uint32_t site, double charge, uint32_t times)
{
  form->lost.word[site / 64] |= (uint64_t)1 << (site % 64);
  for (uint32_t i = 0; i < times; i++) {
    form->species.pk_sum += pka (q, site) + charge * form->species.lost;
    form->species.lost++;
  }
}

static Form
own_form (const EnlQuestion *q, uint32_t site)
{
  Form form = {0};

  for (uint32_t other = 0; other < q->sites->n_sites; other++)
    if (precedes (q, other, site))
      lose (q, &form, other, charge_term (q), hydrogens_taken (q, other));
  lose (q, &form, site, 0.0, 1);
  return form;
}

/* The own form and every competing hydrogen; lost == 0 when nothing competes. */
static Form
stripped_form (const EnlQuestion *q, uint32_t site)
{
  Form form = own_form (q, site);
  uint32_t before = form.species.lost;

  for (uint32_t other = 0; other < q->sites->n_sites; other++)
    if (competes (q, other, site))
      lose (q, &form, other, charge_term (q), hydrogens_taken (q, other));
  return form.species.lost > before ? form : (Form){0};
}

/* A class of several equivalent heteroatom acids, all of them gone. */
static Form
all_of_class (const EnlQuestion *q, uint32_t site)
{
  Form form = {0};

  if (hydrogens_taken (q, site) > 1)
    lose (q, &form, site, charge_term (q), hydrogens_taken (q, site));
  return form;
}

/* Both hydrogens gone from a molecule for which each pKa is that of the first one. */
static Form
pair_form (const EnlQuestion *q, const EnlChargeRoom *room, uint32_t a, uint32_t b)
{
  Form form = {0};
  uint32_t other = a == b ? 1 : 0;
  bool shared = enl_charge_room_shared (room, q->sites, a, 0, b, other);

  lose (q, &form, a, 0.0, 1);
  lose (q, &form, b, shared ? q->practice->second_charge_shared : charge_term (q), 1);
  return form;
}

static bool
is_listed (const EnlIons *ions, const Form *form)
{
  for (uint32_t i = 0; i < ions->n_species; i++)
    if (ions->species[i].lost == form->species.lost &&
        memcmp (&ions->lost[i], &form->lost, sizeof form->lost) == 0)
      return true;
  return false;
}

static void
add_form (const EnlQuestion *q, EnlIons *ions, Form form)
{
  if (form.species.lost == 0 || ions->n_species == ENL_MAX_SPECIES || is_listed (ions, &form))
    return;
  ions->species[ions->n_species] = form.species;
  ions->lost[ions->n_species] = form.lost;
  ions->holds_target[ions->n_species++] = enl_site_set_has (&form.lost, q->target);
}

/* Dianions of two hydrogens neither of which is certain to go before the other. */
static void
list_pairs (const EnlQuestion *q, EnlIons *ions)
{
  const EnlSite *site = q->sites->site;
  g_autoptr (EnlChargeRoom) room = enl_charge_room_new (q->mol, q->sites);

  for (uint32_t a = 0; a < q->sites->n_sites; a++)
    for (uint32_t b = a; b < q->sites->n_sites; b++)
      if (!site[a].second && !site[b].second && (a != b || site[a].n_atoms > 1))
        add_form (q, ions, pair_form (q, room, a, b));
}

static void
list_forms (const EnlQuestion *q, EnlIons *ions)
{
  const uint32_t n = q->sites->n_sites;

  for (uint32_t i = 0; i < n; i++)
    add_form (q, ions, own_form (q, i));
  ions->own = q->target;
  for (uint32_t i = 0; i < n; i++) {
    add_form (q, ions, stripped_form (q, i));
    add_form (q, ions, all_of_class (q, i));
  }
  list_pairs (q, ions);
}

static int
by_pka (const void *a, const void *b, void *data)
{
  double left = pka (data, *(const uint32_t *)a), right = pka (data, *(const uint32_t *)b);

  return left < right ? -1 : left > right;
}

static void
list_competing (const EnlQuestion *q, EnlIons *ions)
{
  for (uint32_t i = 0; i < q->sites->n_sites; i++)
    if (precedes (q, i, q->target) || competes (q, i, q->target)) {
      ions->competing[ions->n_competing++] = i;
      ions->taken += hydrogens_taken (q, i);
    }
  g_qsort_with_data (ions->competing, (int)ions->n_competing, sizeof *ions->competing, by_pka,
                     (void *)q);
}

EnlStatus
enl_ions_new (const EnlQuestion *q, EnlIons **out, EnlError *err)
{
  *out = NULL;
  if (q->sites->n_sites > ENL_MAX_SPECIES)
    return enl_error_set (err, ENL_ERROR_LIMIT, "compare bases for a smaller part of the molecule",
                          "more than %d acidic sites", ENL_MAX_SPECIES);
  EnlIons *ions = g_new0 (EnlIons, 1);
  ions->species = g_new0 (EnlSpecies, ENL_MAX_SPECIES);
  ions->holds_target = g_new0 (bool, ENL_MAX_SPECIES);
  ions->lost = g_new0 (EnlSiteSet, ENL_MAX_SPECIES);
  ions->competing = g_new0 (uint32_t, q->sites->n_sites);
  ions->most_acidic = q->target;
  for (uint32_t i = 0; i < q->sites->n_sites; i++)
    if (pka (q, i) < pka (q, ions->most_acidic))
      ions->most_acidic = i;
  list_forms (q, ions);
  list_competing (q, ions);
  *out = ions;
  return ENL_OK;
}

void
enl_ions_free (EnlIons *ions)
{
  if (!ions)
    return;
  g_free (ions->species);
  g_free (ions->holds_target);
  g_free (ions->lost);
  g_free (ions->competing);
  g_free (ions);
}

char *
enl_ions_competing_text (const EnlIons *ions, const EnlQuestion *q)
{
  if (ions->n_competing == 0)
    return g_strdup ("");
  uint32_t first = ions->competing[0];
  bool before = q->estimate[first].value < q->estimate[q->target].value;
  const char *others = ions->n_competing > 1 ? " and others" : "";
  const char *verb = ions->n_competing > 1 ? "take" : "takes";
  if (!before)
    return g_strdup_printf ("%s%s %s base beside this site", q->sites->site[first].position, others,
                            verb);
  if (ions->taken < 1.5)
    return g_strdup_printf ("%s takes the first equivalent", q->sites->site[first].position);
  return g_strdup_printf ("%s%s %s the first %.0f equivalents", q->sites->site[first].position,
                          others, verb, ions->taken);
}
