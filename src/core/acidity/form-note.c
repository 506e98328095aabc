#include "core/acidity/form-note.h"

#include <stdlib.h>
#include <string.h>

#include "core/acidity/conjugation.h"
#include "core/molecule/elements.h"

enum { N = 7, O = 8, SI = 14, P = 15, S = 16, SE = 34 };

static bool
is_halogen (uint8_t element)
{
  return element == 9 || element == 17 || element == 35 || element == 53;
}

static void
append_double_bonds (const EnlMolecule *mol, uint32_t atom, GString *out)
{
  for (uint8_t element = N; element <= SE; element++) {
    uint32_t count = 0;
    for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
      uint32_t other = enl_molecule_neighbour (mol, atom, k);
      const EnlBond *bond = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k));
      count += bond->order > 1 && enl_molecule_atom (mol, other)->element == element;
    }
    if (count > 0)
      g_string_append_printf (out, "(=%s)", enl_element_symbol (element));
    if (count > 1)
      g_string_append_printf (out, "%u", count);
  }
}

/* "S(=O)2", "P(=O)", "N+", "S", "F", or NULL when the neighbour acts through a form, or not at
 * all. Sulfides, silyl groups and halogens hold a carbanion by polarisation (common practice). */
static char *
describe (const EnlMolecule *mol, const EnlConjugationAtom *fact, uint32_t atom)
{
  const EnlConjugationAtom *f = &fact[atom];
  GString *out;

  if (f->expanded) {
    out = g_string_new (enl_element_symbol (f->element));
    append_double_bonds (mol, atom, out);
    if (f->charge > 0)
      g_string_append_c (out, '+');
    return g_string_free (out, FALSE);
  }
  if (f->charge > 0 && f->pi == 0)
    return g_strdup_printf ("%s+", enl_element_symbol (f->element));
  bool polarisable = f->charge == 0 && f->pi == 0 &&
                     (f->element == S || f->element == SE || f->element == SI || f->element == P ||
                      is_halogen (f->element));
  return polarisable ? g_strdup (enl_element_symbol (f->element)) : NULL;
}

static bool
carries_charge (const EnlForms *forms, uint32_t atom)
{
  for (uint32_t i = 0; i < forms->n_all; i++)
    if (forms->all[i].charge[atom] < 0)
      return true;
  return false;
}

static bool
holds_text (const GPtrArray *list, const char *text)
{
  for (uint32_t i = 0; i < list->len; i++)
    if (strcmp (list->pdata[i], text) == 0)
      return true;
  return false;
}

static void
add_neighbours (const EnlMolecule *mol, const EnlConjugationAtom *fact, uint32_t atom,
                GPtrArray *list)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    char *text = describe (mol, fact, enl_molecule_neighbour (mol, atom, k));
    if (text && !holds_text (list, text))
      g_ptr_array_add (list, text);
    else
      g_free (text);
  }
}

char *
enl_form_note (const EnlForms *forms)
{
  g_autofree EnlConjugationAtom *fact = enl_conjugation_facts (forms->anion);
  g_autoptr (GPtrArray) list = g_ptr_array_new_with_free_func (g_free);

  for (uint32_t i = 0; i < enl_molecule_atoms (forms->anion); i++)
    if (!fact[i].expanded && fact[i].element != O && carries_charge (forms, i))
      add_neighbours (forms->anion, fact, i, list);
  if (list->len == 0)
    return NULL;
  g_ptr_array_add (list, NULL);
  g_autofree char *joined = g_strjoinv (", ", (char **)list->pdata);
  return g_strdup_printf ("%sstabilised by induction and polarisation: %s",
                          forms->n_all > 1 ? "also " : "", joined);
}
