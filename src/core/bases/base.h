/* The base table (resources/bases.tsv): what a base is, how strong, how it is sold, and what to
 * beware of. */
#pragma once

#include <stdbool.h>
#include <stdint.h>

#include "core/acidity/estimate.h"
#include "core/base/error.h"

#define ENL_MAX_FURTHER 3

typedef struct {
  const char *id, *name, *smiles, *conjugate_acid, *cation, *family, *nucleophilicity, *steric;
  const char *typical_solvents, *typical_temperature, *incompatible, *note, *source, *thf_scale;
  const char *spellings;        /* other spellings, "tBuOK;KOBut"; NULL or "" for none */
  bool attacks[ENL_N_SOLVENTS]; /* is destroyed by, or destroys, this solvent */
  double pkah_nominal;    /* textbook figure without a footing, NAN for none: says only that an
                             irreversible base is strong enough, never enters an equilibrium */
  bool usual;             /* on the shelf of an ordinary laboratory (common practice) */
  bool irreversible;      /* the conjugate acid leaves or cannot give the proton back */
  bool number_unreliable; /* carbonate, fluoride, phosphate, soft-enolisation set: the number does
                             not describe what happens; no gap verdict is shown */
  bool soft;              /* a soft-enolisation set: metal or silyl group and amine */
  bool adds_to_carbonyl;  /* organolithium or Grignard reagent */
  bool beta_hydride;      /* can hand a beta-hydride to C=O */
  bool own;               /* added by the user, see own-base.h */
  double pkah[ENL_N_SOLVENTS];                     /* NAN: not on this scale */
  double sigma[ENL_N_SOLVENTS];                    /* one standard deviation */
  double further[ENL_N_SOLVENTS][ENL_MAX_FURTHER]; /* pKaH of further protons, base-steps.h */
  uint32_t n_further[ENL_N_SOLVENTS];
  /* As it is usually sold; NAN where that says nothing. */
  const char *form;    /* "solution in THF", "dispersion in mineral oil" */
  double molar_mass;   /* g/mol, of the base alone where the row is a mixture */
  double molarity;     /* mol/L of a solution */
  double mass_percent; /* base in a dispersion, solution or damp solid */
  double density;      /* g/mL of a liquid or solution */
} EnlBase;

typedef struct EnlBaseTable EnlBaseTable;

EnlStatus enl_base_table_new (const char *text, size_t size, EnlBaseTable **out,
                              EnlError *err) ENL_MUST_USE;
void enl_base_table_free (EnlBaseTable *table);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlBaseTable, enl_base_table_free)
uint32_t enl_base_table_size (const EnlBaseTable *table);
const EnlBase *enl_base_table_get (const EnlBaseTable *table, uint32_t index);
/* Index by id or by name, case does not matter; -1 when unknown. For ids that the program keeps. */
int enl_base_table_find (const EnlBaseTable *table, const char *text);
/* Index of what a person calls a base: id, name, name without its remark in brackets, the
 * abbreviation in those brackets, or another spelling of the table ("tBuOK"). Case, hyphens and
 * other signs do not matter, "tert" is "t" and "sec" is "s"; an exact id or name goes first.
 * ENL_ERROR_UNKNOWN with the nearest ids as advice when no base, or more than one, is meant. */
EnlStatus enl_base_table_look_up (const EnlBaseTable *table, const char *text, uint32_t *out,
                                  EnlError *err) ENL_MUST_USE;
