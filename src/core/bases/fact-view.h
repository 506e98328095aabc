/* What the fact functions see. For the files fact*.c and their caller only. */
#pragma once

#include "core/acidity/group.h"
#include "core/bases/compare.h"
#include "core/bases/fact.h"
#include "core/bases/ions.h"
#include "core/molecule/cip.h"

typedef struct {
  const EnlQuestion *question;
  const EnlIons *ions;
  uint32_t atom;                 /* acidic atom of the target */
  uint32_t n_atoms;              /* of the molecule */
  bool *inside;                  /* n_atoms: in the fragment of the target */
  EnlGroup *group;               /* n_atoms: ENL_GROUP_OTHER outside that fragment */
  EnlCip *cip;                   /* n_atoms */
  const EnlBase *base;           /* NULL while facts of the question are found */
  const EnlCandidate *candidate; /* the same; verdict and reason are not yet there */
} EnlFactView;

void enl_fact_view_init (EnlFactView *view, const EnlQuestion *question, const EnlIons *ions);
void enl_fact_view_clear (EnlFactView *view);

/* Finds the facts of one scope; `value` has one entry a fact. */
void enl_fact_view_find (const EnlFactView *view, EnlFactScope scope, EnlFactValue *value);

typedef void (*EnlFactFinder) (const EnlFactView *view, EnlFactValue *out);

typedef struct {
  const char *name;
  EnlFactKind kind;
  EnlFactScope scope;
  EnlFactFinder find;
  const char *meaning;
} EnlFact;

/* The parts of the list, one a file; each ends with a NULL name. */
extern const EnlFact enl_fact_of_conditions[], enl_fact_of_site[], enl_fact_of_molecule[],
    enl_fact_of_halide[], enl_fact_of_base[];

/* ---- helpers of several files ---- */

/* Carbon with hydrogens that a base could take. */
bool enl_fact_is_acidic_carbon (const EnlFactView *view, uint32_t atom);
/* Halogen but fluorine. */
bool enl_fact_is_heavy_halogen (const EnlMolecule *mol, uint32_t atom);
uint8_t enl_fact_element (const EnlFactView *view, uint32_t atom);
/* "(S) centre at atom 4", "drawn centre at atom 4"; "" when the atom is no drawn centre. */
void enl_fact_centre_phrase (const EnlFactView *view, uint32_t atom, char *out);
/* The oxygen-bound carbon chain of an ester or alcohol, written so that equal ones are equal text;
 * `from` is the oxygen. New string. */
char *enl_fact_alkoxy_code (const EnlMolecule *mol, uint32_t oxygen, uint32_t carbon);
