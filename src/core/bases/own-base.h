/* A base that the user adds to a set: a name and a strength on at least one footing. */
#pragma once

#include "core/bases/base.h"

#define ENL_MAX_OWN_BASES 200

typedef struct {
  char *name;   /* also its id */
  char *family; /* class as in the base table, "amine" */
  char *cation; /* "none", "Li", "Na" ... */
  char *note;
  double pkah[ENL_N_SOLVENTS];  /* NAN: not on this scale */
  double sigma[ENL_N_SOLVENTS]; /* one standard deviation, wherever there is a pKaH */
  bool irreversible;
  /* How it is weighed out, as in EnlBase; NAN: not told. */
  double molar_mass, molarity, mass_percent, density;
} EnlOwnBase;

/* An amine without cation and numbers. */
EnlOwnBase *enl_own_base_new (const char *name) ENL_MUST_USE;
EnlOwnBase *enl_own_base_copy (const EnlOwnBase *base) ENL_MUST_USE;
void enl_own_base_free (EnlOwnBase *base); /* NULL allowed */
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlOwnBase, enl_own_base_free)

/* ENL_ERROR_RANGE with advice when the name is empty or long, a number is missing or impossible, or
 * the class or the cation is unknown to `table`; ENL_ERROR_UNKNOWN when the name is taken there.
 * With `table` NULL only name and numbers are looked at. */
EnlStatus enl_own_base_check (const EnlOwnBase *base, const EnlBaseTable *table, EnlError *err);

/* The rows of `table` and behind them the own ones, which must have passed the check. Borrows the
 * texts of `table` (which must outlive it) and copies the others. Caller: enl_base_table_free. */
EnlBaseTable *enl_base_table_extend (const EnlBaseTable *table, EnlOwnBase *const *own,
                                     uint32_t n) ENL_MUST_USE;
