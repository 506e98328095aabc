#include <math.h>

#include "cli/verbs.h"
#include "core/notation/smiles.h"

static const char *const column[] = {"substrate", "atom",    "form", "smiles",
                                     "weight",    "charges", NULL};

/* "3:-1,5:+1": formal charges by input position. */
static char *
formal_charges (const EnlForms *forms, uint32_t index)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < enl_molecule_atoms (forms->anion); i++)
    if (forms->form[index].charge[i])
      g_string_append_printf (out, "%s%u:%+d", out->len ? "," : "",
                              enl_molecule_atom (forms->anion, i)->input,
                              forms->form[index].charge[i]);
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

static void
print_forms (const EnlRun *run, const char *name, const EnlForms *forms)
{
  uint32_t position = enl_molecule_atom (forms->anion, forms->site_atom)->input;

  for (uint32_t i = 0; i < forms->n_forms; i++) {
    g_autoptr (EnlMolecule) mol = enl_forms_molecule (forms, i);
    g_autofree char *smiles = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
    g_autofree char *charges = formal_charges (forms, i);
    g_autofree char *label = forms->form[i].copies > 1
                                 ? g_strdup_printf ("%u (x %u)", i + 1, forms->form[i].copies)
                                 : g_strdup_printf ("%u", i + 1);
    print_row (run, name, position, label, smiles, forms->form[i].weight, charges);
  }
  g_autofree char *charges = hybrid_charges (forms);
  print_row (run, name, position, "hybrid", "", 1.0, charges);
  if (forms->capped)
    enl_output_block (run->out, "  more contributors exist than are listed");
  enl_output_block (run->out, forms->note);
}

static EnlStatus
visit (const char *name, const EnlMolecule *mol, void *data, EnlError *err)
{
  const EnlRun *run = data;
  g_autoptr (EnlAnalysis) a = NULL;
  g_autoptr (EnlForms) forms = NULL;
  uint32_t site;
  EnlStatus status =
      enl_analysis_new (run->knowledge, mol, run->options->conditions.solvent, false, &a, err);

  if (status == ENL_OK)
    status = enl_cli_site (a, run->options->atom, &site, err);
  if (status == ENL_OK)
    status = enl_forms_of_site (a->mol, a->sites->site[site].atom[0], &forms, err);
  if (status == ENL_OK)
    print_forms (run, name, forms);
  return status;
}

int
enl_verb_forms (const EnlOptions *options)
{
  return enl_cli_run (options, column, visit);
}
