/* The ionised forms of a substrate that an equilibrium with a base counts, and which hydrogens take
 * base before the site in question.
 *
 * Every site gives a form that has lost its hydrogen and those that are certain to leave before it
 * (EnlSite.second: its estimate is that of the anion already). Beside it stands the form in which
 * every competing O-H, N-H ... is lost too: there the pKa values are those of neutral molecules, so
 * each further charge costs EnlPractice.second_charge. Dianions of any two hydrogens that are first
 * ones by their estimates follow the same sum; where both charges would share their room (two sides
 * of one C=O) they cost second_charge_shared instead. Equal forms are listed once.
 */
#pragma once

#include "core/bases/equilibrium.h"
#include "core/bases/question.h"

/* Sites by index. */
typedef struct {
  uint64_t word[ENL_MAX_SPECIES / 64];
} EnlSiteSet;

static inline bool
enl_site_set_has (const EnlSiteSet *set, uint32_t site)
{
  return set->word[site / 64] >> (site % 64) & 1;
}

typedef struct {
  EnlSpecies *species;
  EnlSiteSet *lost;    /* sites that have lost a hydrogen in each form */
  bool *holds_target;  /* the form has lost the target's hydrogen */
  uint32_t n_species;  /* at most ENL_MAX_SPECIES */
  uint32_t own;        /* species of the target with what certainly precedes it */
  uint32_t *competing; /* sites that take base before or beside the target, most acidic first */
  uint32_t n_competing;
  double taken;         /* equivalents they take, a whole number */
  uint32_t most_acidic; /* site index */
} EnlIons;

/* ENL_ERROR_LIMIT for more than ENL_MAX_SPECIES sites. Caller: enl_ions_free. */
EnlStatus enl_ions_new (const EnlQuestion *question, EnlIons **out, EnlError *err) ENL_MUST_USE;
void enl_ions_free (EnlIons *ions);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlIons, enl_ions_free)

/* "phenol O-H takes the first equivalent", "N-H of the amide takes base beside this site"; "" when
 * nothing competes. New string (g_free). */
char *enl_ions_competing_text (const EnlIons *ions, const EnlQuestion *question) ENL_MUST_USE;
