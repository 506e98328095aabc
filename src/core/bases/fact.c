#include "core/bases/fact-view.h"

#include <string.h>

static const EnlFact *const part[] = {enl_fact_of_conditions, enl_fact_of_site,
                                      enl_fact_of_molecule, enl_fact_of_halide, enl_fact_of_base};

static const EnlFact *
fact_at (size_t index)
{
  for (size_t p = 0; p < ENL_COUNT (part); p++)
    for (const EnlFact *f = part[p]; f->name; f++)
      if (index-- == 0)
        return f;
  g_assert_not_reached ();
}

size_t
enl_fact_count (void)
{
  size_t n = 0;

  for (size_t p = 0; p < ENL_COUNT (part); p++)
    for (const EnlFact *f = part[p]; f->name; f++)
      n++;
  return n;
}

int
enl_fact_find (const char *name, size_t size)
{
  int index = 0;

  for (size_t p = 0; p < ENL_COUNT (part); p++)
    for (const EnlFact *f = part[p]; f->name; f++, index++)
      if (strlen (f->name) == size && memcmp (f->name, name, size) == 0)
        return index;
  return -1;
}

const char *
enl_fact_name (size_t fact)
{
  return fact_at (fact)->name;
}

EnlFactKind
enl_fact_kind (size_t fact)
{
  return fact_at (fact)->kind;
}

EnlFactScope
enl_fact_scope (size_t fact)
{
  return fact_at (fact)->scope;
}

const char *
enl_fact_meaning (size_t fact)
{
  return fact_at (fact)->meaning;
}

/* ---- the view ---- */

void
enl_fact_view_init (EnlFactView *view, const EnlQuestion *q, const EnlIons *ions)
{
  const uint32_t n = enl_molecule_atoms (q->mol);
  g_autofree uint32_t *fragment = g_new0 (uint32_t, n);

  *view = (EnlFactView){.question = q, .ions = ions, .n_atoms = n};
  view->atom = q->sites->site[q->target].atom[0];
  view->inside = g_new0 (bool, n);
  view->group = g_new0 (EnlGroup, n);
  view->cip = g_new0 (EnlCip, n);
  enl_molecule_fragments (q->mol, fragment);
  for (uint32_t i = 0; i < n; i++) {
    view->inside[i] = fragment[i] == fragment[view->atom];
    view->group[i] = view->inside[i] ? enl_group_of (q->mol, i) : ENL_GROUP_OTHER;
  }
  enl_cip_label (q->mol, view->cip, NULL);
}

void
enl_fact_view_clear (EnlFactView *view)
{
  g_clear_pointer (&view->inside, g_free);
  g_clear_pointer (&view->group, g_free);
  g_clear_pointer (&view->cip, g_free);
}

void
enl_fact_view_find (const EnlFactView *view, EnlFactScope scope, EnlFactValue *value)
{
  for (size_t p = 0; p < ENL_COUNT (part); p++)
    for (const EnlFact *f = part[p]; f->name; f++, value++)
      if (f->scope == scope) {
        *value = (EnlFactValue){.word = ""};
        f->find (view, value);
      }
}

/* ---- helpers ---- */

uint8_t
enl_fact_element (const EnlFactView *view, uint32_t atom)
{
  return enl_molecule_atom (view->question->mol, atom)->element;
}

bool
enl_fact_is_acidic_carbon (const EnlFactView *view, uint32_t atom)
{
  const EnlSite *site = enl_sites_of_atom (view->question->sites, atom);

  return site && site->kind == ENL_SITE_CARBON;
}

bool
enl_fact_is_heavy_halogen (const EnlMolecule *mol, uint32_t atom)
{
  return enl_group_of (mol, atom) == ENL_GROUP_HALOGEN;
}

void
enl_fact_centre_phrase (const EnlFactView *view, uint32_t atom, char *out)
{
  const EnlAtom *a = enl_molecule_atom (view->question->mol, atom);
  const char *label = enl_cip_text (view->cip[atom]);
  uint32_t place = a->input ? a->input : atom + 1;

  if (a->winding == ENL_WINDING_NONE)
    return;
  if (label[0])
    g_snprintf (out, ENL_FACT_PHRASE_BYTES, "(%s) centre at atom %u", label, place);
  else
    g_snprintf (out, ENL_FACT_PHRASE_BYTES, "drawn stereocentre at atom %u", place);
}

static int
by_text (const void *a, const void *b)
{
  return strcmp (*(char *const *)a, *(char *const *)b);
}

/* Rooted tree in canonical form: branches in alphabetical order. A ring is walked until it closes,
 * which no acyclic alkoxide matches. */
static char *
branch_code (const EnlMolecule *mol, uint32_t atom, bool *seen)
{
  g_autoptr (GPtrArray) branch = g_ptr_array_new_with_free_func (g_free);
  GString *code = g_string_new (NULL);

  seen[atom] = true;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t next = enl_molecule_neighbour (mol, atom, k);
    if (!seen[next] && !enl_atom_is_hydrogen (mol, next))
      g_ptr_array_add (branch, branch_code (mol, next, seen));
  }
  g_ptr_array_sort (branch, by_text);
  g_string_append_printf (code, "%u.%u(", enl_molecule_atom (mol, atom)->element,
                          enl_molecule_total_hydrogens (mol, atom));
  for (guint i = 0; i < branch->len; i++)
    g_string_append (code, branch->pdata[i]);
  g_string_append_c (code, ')');
  return g_string_free (code, FALSE);
}

char *
enl_fact_alkoxy_code (const EnlMolecule *mol, uint32_t oxygen, uint32_t carbon)
{
  g_autofree bool *seen = g_new0 (bool, enl_molecule_atoms (mol));

  seen[oxygen] = true;
  return branch_code (mol, carbon, seen);
}
