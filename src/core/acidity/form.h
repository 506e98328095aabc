/* Anion forms: the contributing structures of a conjugate base, their weights and charges. */
#pragma once

#include "core/molecule/molecule.h"

#define ENL_MAX_FORMS 512

/* One electron-pair move of a curved arrow. An end is an atom (b == ENL_NONE: a lone pair) or the
 * bond a-b. */
typedef struct {
  uint32_t from_a, from_b;
  uint32_t to_a, to_b;
} EnlArrow;

typedef struct {
  uint8_t *order;  /* order of every bond of the anion in this form */
  int8_t *charge;  /* formal charge of every atom in this form */
  uint32_t centre; /* atom that carries the moved negative charge */
  uint32_t copies; /* symmetric or Kekulé copies that this form stands for, at least 1 */
  uint32_t card;   /* index in EnlForms.form of the form that stands for this one, or itself */
  double weight;   /* of this form with its copies; all weights add up to 1 */
  EnlArrow *arrow; /* moves that lead from form 0 to this one; none for form 0, nor when two lone
                      pairs would have to meet in one bond (some dianions) */
  uint32_t n_arrows;
} EnlForm;

typedef struct {
  EnlMolecule *anion; /* conjugate base, charge localised on the deprotonated atom (form 0). Atoms
                         and bonds are numbered as in the acid, unless the hydrogen that left had
                         an atom of its own: then the later ones have moved down by one */
  uint32_t site_atom; /* in the anion */
  EnlForm *form;      /* form 0 is the localised one; the rest by falling weight */
  uint32_t n_forms;   /* after collapsing copies */
  EnlForm *all;       /* every contributor by itself (copies 1), those of one card together; the
                         first of each card is the one shown in `form` */
  uint32_t n_all;
  double *charge;     /* hybrid: pi model net charge of every atom (weighted formal charge about a
                         sulfonyl, phosphoryl ..., which the pi model leaves out) */
  double *bond_order; /* hybrid: weighted bond order of every bond */
  bool capped;        /* ENL_MAX_FORMS was reached */
  char *note;         /* "also stabilised by induction and polarisation: S(=O)2", without "also"
                         when there is one form only; or NULL */
} EnlForms;

/* Forms of the conjugate base that loses one hydrogen from `atom`.
 * ENL_ERROR_RANGE when the atom does not exist or has no hydrogen, ENL_ERROR_LIMIT beyond
 * ENL_MAX_HEAVY heavy atoms. Only the charge that the proton leaves moves about, with what it
 * meets: a nitro or carboxylate group apart from it stays as drawn. Caller: enl_forms_free. */
EnlStatus enl_forms_of_site (const EnlMolecule *mol, uint32_t atom, EnlForms **out,
                             EnlError *err) ENL_MUST_USE;
/* The same for an anion as it stands, whose charge is drawn on `atom` (ENL_ERROR_RANGE otherwise).
 * Form 0 is the given drawing. */
EnlStatus enl_forms_of_anion (const EnlMolecule *anion, uint32_t atom, EnlForms **out,
                              EnlError *err) ENL_MUST_USE;
void enl_forms_free (EnlForms *forms);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlForms, enl_forms_free)

/* Every contributor of `anion` itself, uncollapsed, as canonical-ready molecules: the outside
 * check compares them with an independent program. All systems with a formal charge move, in every
 * combination; up to ENL_MAX_FORMS. `*out` is a GPtrArray of EnlMolecule, the first one `anion` as
 * given. ENL_ERROR_LIMIT as above. */
EnlStatus enl_forms_enumerate (const EnlMolecule *anion, GPtrArray **out, bool *capped,
                               EnlError *err) ENL_MUST_USE;

/* Structure of one form, finished, same atom order as the anion. Caller frees. */
EnlMolecule *enl_forms_molecule (const EnlForms *forms, uint32_t form) ENL_MUST_USE;
/* The same for one of `all`. */
EnlMolecule *enl_forms_molecule_of_all (const EnlForms *forms, uint32_t index) ENL_MUST_USE;
