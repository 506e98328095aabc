/* What is in the flask: the substrate's ionised forms, the base with all its own forms, and water
 * as an impurity, as one equilibrium. */
#pragma once

#include "core/bases/equilibrium.h"
#include "core/bases/ions.h"

typedef struct {
  EnlEquilibrium problem; /* points into this object: do not copy it */
  EnlSpecies *species;
  EnlAcceptor acceptor[2]; /* the base, unless stoichiometric, then the water */
  bool stoichiometric;     /* the base takes its protons for good, or is an ion of the solvent */
} EnlMixture;

/* `pkah` is the strength with which `base` acts; NAN: it takes its protons for good, down to acids
 * of pKa `reach`; forms that need more stay empty. Borrows nothing after the call. Release with
 * enl_mixture_clear. */
void enl_mixture_init (EnlMixture *mixture, const EnlQuestion *question, const EnlIons *ions,
                       const EnlBase *base, double pkah, double reach);
void enl_mixture_clear (EnlMixture *mixture);
G_DEFINE_AUTO_CLEANUP_CLEAR_FUNC (EnlMixture, enl_mixture_clear)

/* Moves the pKa of the question's site by `site` and the base by `base`, both pK units: the site
 * against base and other sites alike, the base against all sites at once. */
void enl_mixture_shift (EnlMixture *mixture, const EnlIons *ions, double site, double base);

/* pKa of water on the footing of `solvent`: the table's own row of sodium hydroxide (DMSO-based in
 * THF, as the sites are); NAN where it is the solvent or the row is missing. */
double enl_mixture_water_pka (const EnlBaseTable *bases, EnlSolvent solvent);
