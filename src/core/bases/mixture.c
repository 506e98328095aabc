#include "core/bases/mixture.h"

#include <math.h>

double
enl_mixture_water_pka (const EnlBaseTable *bases, EnlSolvent solvent)
{
  int index = enl_base_table_find (bases, "naoh");

  if (index < 0 || solvent == ENL_SOLVENT_WATER)
    return NAN;
  return enl_base_table_get (bases, (uint32_t)index)->pkah[ENL_SOLVENT_DMSO];
}

/* pK of the ions of water where it is the solvent and so lends and takes protons itself; NAN
 * elsewhere, and for an alkoxide, which stands for its own alcohol there (stronger than the ions of
 * water allow). */
static double
ions_of_water (const EnlBaseTable *bases, EnlSolvent solvent, double pkah)
{
  int index = enl_base_table_find (bases, "naoh");

  if (index < 0 || solvent != ENL_SOLVENT_WATER)
    return NAN;
  double own = enl_base_table_get (bases, (uint32_t)index)->pkah[ENL_SOLVENT_WATER];
  return pkah > own ? NAN : own;
}

/* The further protons count only where the first one has the strength of the table: levelled to the
 * solvent's anion there is one step. */
static EnlAcceptor
acceptor_of (const EnlBase *base, EnlSolvent solvent, double amount, double pkah)
{
  EnlAcceptor a = enl_acceptor_bare (amount, pkah);

  if (base && pkah == base->pkah[solvent])
    for (uint32_t i = 0; i < base->n_further[solvent] && a.steps < ENL_MAX_STEPS; i++)
      a.pka[a.steps++] = base->further[solvent][i];
  return a;
}

/* pKa of the last proton of a form: against the easiest form that has lost one less. */
static double
last_pka (const EnlSpecies *species, uint32_t n, const EnlSpecies *form)
{
  double before = form->lost == 1 ? 0.0 : INFINITY;

  for (uint32_t i = 0; i < n; i++)
    if (species[i].lost + 1 == form->lost)
      before = fmin (before, species[i].pk_sum);
  return isfinite (before) ? form->pk_sum - before : form->pk_sum / form->lost;
}

/* A hydride takes no second proton from an enolate, however much of it there is. */
static void
drop_unreachable (EnlMixture *m, const EnlIons *ions, double reach)
{
  for (uint32_t i = 0; i < ions->n_species; i++)
    if (last_pka (ions->species, ions->n_species, &ions->species[i]) > reach)
      m->species[i].pk_sum = INFINITY;
}

void
enl_mixture_init (EnlMixture *m, const EnlQuestion *q, const EnlIons *ions, const EnlBase *base,
                  double pkah, double reach)
{
  const EnlConditions *c = q->conditions;
  double amount = c->concentration * c->equivalents, water = c->concentration * c->water;
  double water_pka = enl_mixture_water_pka (q->bases, c->solvent);
  double own_ions = ions_of_water (q->bases, c->solvent, pkah);
  uint32_t n = 0;

  /* Hydroxide in water is one of these ions: what is added is charge, and they do the rest. */
  *m = (EnlMixture){.stoichiometric = isnan (pkah) || pkah == own_ions};
  m->species = g_memdup2 (ions->species, ions->n_species * sizeof *ions->species);
  if (isnan (pkah))
    drop_unreachable (m, ions, reach);
  else if (!m->stoichiometric)
    m->acceptor[n++] = acceptor_of (base, c->solvent, amount, pkah);
  if (water > 0.0 && !isnan (water_pka)) {
    m->acceptor[n] = enl_acceptor_bare (water, water_pka);
    m->acceptor[n++].brought = 1.0;
  }
  m->problem = (EnlEquilibrium){.species = m->species,
                                .n_species = ions->n_species,
                                .substrate = c->concentration,
                                .acceptor = m->acceptor,
                                .n_acceptors = n,
                                .removed = m->stoichiometric ? amount : 0.0,
                                .autoprotolysis = own_ions};
}

void
enl_mixture_clear (EnlMixture *m)
{
  g_clear_pointer (&m->species, g_free);
}

void
enl_mixture_shift (EnlMixture *m, const EnlIons *ions, double site, double base)
{
  for (uint32_t i = 0; i < ions->n_species; i++)
    if (ions->holds_target[i])
      m->species[i].pk_sum += site;
  for (uint32_t k = 0; !m->stoichiometric && k < m->acceptor[0].steps; k++)
    m->acceptor[0].pka[k] += base;
}
