#include "core/bases/ions.h"

#include <stdlib.h>

#include "core/acidity/group.h"

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

/* Each atom of a class of heteroatom acids loses a hydrogen; a carbon class loses one. */
static uint32_t
hydrogens_taken (const EnlQuestion *q, uint32_t site)
{
  const EnlSite *s = &q->sites->site[site];

  return s->kind == ENL_SITE_CARBON ? 1 : s->n_atoms;
}

static void
lose (EnlSpecies *form, double pk, double charge, uint32_t times)
{
  for (uint32_t i = 0; i < times; i++) {
    form->pk_sum += pk + charge * form->lost;
    form->lost++;
  }
}

static EnlSpecies
own_form (const EnlQuestion *q, uint32_t site)
{
  EnlSpecies form = {0.0, 0};
  double charge = q->practice->second_charge[q->conditions->solvent];

  for (uint32_t other = 0; other < q->sites->n_sites; other++)
    if (precedes (q, other, site))
      lose (&form, pka (q, other), charge, hydrogens_taken (q, other));
  lose (&form, pka (q, site), 0.0, 1);
  return form;
}

/* The own form and every competing hydrogen; lost == 0 when nothing competes. */
static EnlSpecies
stripped_form (const EnlQuestion *q, uint32_t site, bool *holds_target)
{
  EnlSpecies form = own_form (q, site);
  double charge = q->practice->second_charge[q->conditions->solvent];
  uint32_t before = form.lost;

  *holds_target = site == q->target;
  for (uint32_t other = 0; other < q->sites->n_sites; other++)
    if (competes (q, other, site)) {
      lose (&form, pka (q, other), charge, hydrogens_taken (q, other));
      *holds_target |= other == q->target;
    }
  return form.lost > before ? form : (EnlSpecies){0.0, 0};
}

static void
add_form (EnlIons *ions, EnlSpecies form, bool holds_target)
{
  if (form.lost == 0 || ions->n_species == ENL_MAX_SPECIES)
    return;
  ions->species[ions->n_species] = form;
  ions->holds_target[ions->n_species++] = holds_target;
}

/* A class of several equivalent heteroatom acids, all of them gone. */
static EnlSpecies
all_of_class (const EnlQuestion *q, uint32_t site)
{
  EnlSpecies form = {0.0, 0};

  if (hydrogens_taken (q, site) > 1)
    lose (&form, pka (q, site), q->practice->second_charge[q->conditions->solvent],
          hydrogens_taken (q, site));
  return form;
}

static void
list_forms (const EnlQuestion *q, EnlIons *ions)
{
  const uint32_t n = q->sites->n_sites;
  bool holds;

  for (uint32_t i = 0; i < n; i++)
    add_form (ions, own_form (q, i), i == q->target || precedes (q, q->target, i));
  ions->own = q->target;
  EnlSpecies form = stripped_form (q, q->target, &holds);
  add_form (ions, form, holds);
  for (uint32_t i = 0; i < n; i++) {
    form = i == q->target ? (EnlSpecies){0.0, 0} : stripped_form (q, i, &holds);
    add_form (ions, form, holds);
    add_form (ions, all_of_class (q, i), i == q->target);
  }
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
