#include <math.h>
#include <string.h>

#include "cli/verbs.h"
#include "core/notation/smiles.h"

static const char *const column[] = {"substrate", "atom",    "form", "smiles",
                                     "weight",    "charges", NULL};

/* "3:-1,5:+1": formal charges by input position. */
static char *
formal_charges (const EnlForms *forms, const EnlForm *form)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < enl_molecule_atoms (forms->anion); i++)
    if (form->charge[i])
      g_string_append_printf (out, "%s%u:%+d", out->len ? "," : "",
                              enl_molecule_atom (forms->anion, i)->input, form->charge[i]);
  return g_string_free (out, FALSE);
}

/* Charges of the hybrid that are larger than rounding. */
static char *
hybrid_charges (const EnlForms *forms)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < enl_molecule_atoms (forms->anion); i++) {
    char number[32];
    if (fabs (forms->charge[i]) < 0.005)
      continue;
    g_ascii_formatd (number, sizeof number, "%+.2f", forms->charge[i]);
    g_string_append_printf (out, "%s%u:%s", out->len ? "," : "",
                            enl_molecule_atom (forms->anion, i)->input, number);
  }
  return g_string_free (out, FALSE);
}

static void
print_row (const EnlRun *run, const char *name, uint32_t position, const char *form,
           const char *smiles, double weight, const char *charges)
{
  enl_output_text (run->out, name);
  enl_output_integer (run->out, position);
  enl_output_text (run->out, form);
  enl_output_text (run->out, smiles);
  enl_output_number (run->out, weight, 4);
  enl_output_text (run->out, charges);
}

/* Weight of a contributor with its Kekulé copies, which have the same charges; `first` tells
 * whether it is the first of them. */
static double
weight_of_pattern (const EnlForms *forms, uint32_t index, bool *first)
{
  uint32_t n = enl_molecule_atoms (forms->anion);
  const EnlForm *form = &forms->all[index];
  double weight = 0.0;

  *first = true;
  for (uint32_t k = 0; k < forms->n_all; k++)
    if (forms->all[k].card == form->card && memcmp (forms->all[k].charge, form->charge, n) == 0) {
      weight += forms->all[k].weight;
      *first = *first && k >= index;
    }
  return weight;
}

/* True when the copies of a card differ in where the charge is. */
static bool
has_symmetric_copies (const EnlForms *forms, uint32_t card)
{
  uint32_t n = enl_molecule_atoms (forms->anion);

  for (uint32_t k = 0; k < forms->n_all; k++)
    if (forms->all[k].card == card &&
        memcmp (forms->all[k].charge, forms->form[card].charge, n) != 0)
      return true;
  return false;
}

/* "3" for a form of its own, "2a", "2b" ... for copies by symmetry. */
static char *
form_label (const EnlForms *forms, uint32_t card, uint32_t copy)
{
  if (!has_symmetric_copies (forms, card))
    return g_strdup_printf ("%u", card + 1);
  if (copy < 26)
    return g_strdup_printf ("%u%c", card + 1, 'a' + (int)copy);
  return g_strdup_printf ("%u-%u", card + 1, copy + 1);
}

static void
print_forms (const EnlRun *run, const char *name, const EnlForms *forms)
{
  uint32_t position = enl_molecule_atom (forms->anion, forms->site_atom)->input;
  uint32_t card = ENL_NONE, copy = 0;

  for (uint32_t i = 0; i < forms->n_all; i++) {
    const EnlForm *form = &forms->all[i];
    bool first;
    double weight = weight_of_pattern (forms, i, &first);
    if (!first)
      continue;
    g_autoptr (EnlMolecule) mol = enl_forms_molecule_of_all (forms, i);
    g_autofree char *smiles = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
    g_autofree char *charges = formal_charges (forms, form);
    copy = form->card == card ? copy + 1 : 0;
    card = form->card;
    g_autofree char *label = form_label (forms, card, copy);
    print_row (run, name, position, label, smiles, weight, charges);
  }
  g_autofree char *charges = hybrid_charges (forms);
  print_row (run, name, position, "hybrid", "", 1.0, charges);
  if (forms->capped)
    enl_output_block (run->out, "  more contributors exist than are listed");
  enl_output_block (run->out, forms->note);
}

/* The atom with the charge of an anion as it was typed: the one that --atom names, else the first;
 * ENL_NONE where there is none. The inner charge of a nitro group or N-oxide is no anion. */
static uint32_t
charged_atom (const EnlMolecule *mol, uint32_t position)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    const EnlAtom *atom = enl_molecule_atom (mol, i);
    bool inner = false;
    for (uint32_t k = 0; k < enl_molecule_degree (mol, i); k++)
      inner |= enl_molecule_atom (mol, enl_molecule_neighbour (mol, i, k))->charge > 0;
    if (atom->charge < 0 && !inner && (!position || atom->input == position))
      return i;
  }
  return ENL_NONE;
}

static EnlStatus
forms_of_input (const EnlRun *run, const EnlMolecule *mol, EnlForms **forms, EnlError *err)
{
  g_autoptr (EnlAnalysis) a = NULL;
  uint32_t site, charged = charged_atom (mol, run->options->atom);

  if (charged != ENL_NONE)
    return enl_forms_of_anion (mol, charged, forms, err);
  EnlStatus status =
      enl_analysis_new (run->knowledge, mol, run->options->conditions.solvent, false, &a, err);
  if (status == ENL_OK)
    status = enl_cli_site (a, run->options->atom, &site, err);
  if (status == ENL_OK)
    status = enl_forms_of_site (a->mol, a->sites->site[site].atom[0], forms, err);
  return status;
}

static EnlStatus
visit (const char *name, const EnlMolecule *mol, void *data, EnlError *err)
{
  const EnlRun *run = data;
  g_autoptr (EnlForms) forms = NULL;
  EnlStatus status = forms_of_input (run, mol, &forms, err);

  if (status == ENL_OK)
    print_forms (run, name, forms);
  return status;
}

int
enl_verb_forms (const EnlOptions *options)
{
  return enl_cli_run (options, column, visit);
}
