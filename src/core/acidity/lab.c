#include "core/acidity/lab.h"

#include <math.h>
#include <string.h>

#include "core/acidity/part.h"
#include "core/notation/read.h"

/* No acid that this program is for lies beyond these, and a value with a larger uncertainty says
 * nothing. */
#define LEAST_PKA  -20.0
#define MOST_PKA   65.0
#define MOST_SIGMA 20.0

struct EnlLab {
  GPtrArray *row; /* EnlLabRow */
};

const char *
enl_lab_field_name (EnlLabField field)
{
  static const char *const name[ENL_N_LAB_FIELDS] = {"structure", "atom", "solvent", "pka",
                                                     "sigma",     "name", "note",    "source"};

  g_assert (field < ENL_N_LAB_FIELDS);
  return name[field];
}

/* ---- entries ---- */

EnlLabEntry *
enl_lab_entry_new (void)
{
  EnlLabEntry *entry = g_new0 (EnlLabEntry, 1);

  entry->structure = g_strdup ("");
  entry->name = g_strdup ("");
  entry->note = g_strdup ("");
  entry->source = g_strdup ("");
  entry->pka = NAN;
  entry->sigma = ENL_LAB_USUAL_SIGMA;
  return entry;
}

EnlLabEntry *
enl_lab_entry_copy (const EnlLabEntry *entry)
{
  EnlLabEntry *copy = g_memdup2 (entry, sizeof *entry);

  copy->structure = g_strdup (entry->structure);
  copy->name = g_strdup (entry->name);
  copy->note = g_strdup (entry->note);
  copy->source = g_strdup (entry->source);
  return copy;
}

void
enl_lab_entry_free (EnlLabEntry *entry)
{
  if (!entry)
    return;
  g_free (entry->structure);
  g_free (entry->name);
  g_free (entry->note);
  g_free (entry->source);
  g_free (entry);
}

bool
enl_lab_entry_equal (const EnlLabEntry *a, const EnlLabEntry *b)
{
  return a->atom == b->atom && a->solvent == b->solvent && a->pka == b->pka &&
         a->sigma == b->sigma && strcmp (a->structure, b->structure) == 0 &&
         strcmp (a->name, b->name) == 0 && strcmp (a->note, b->note) == 0 &&
         strcmp (a->source, b->source) == 0;
}

EnlStatus
enl_lab_entry_check (const EnlLabEntry *entry, EnlLabField *field, EnlError *err)
{
  EnlLabField unused;

  if (!field)
    field = &unused;
  *field = ENL_LAB_SOLVENT;
  if (entry->solvent != ENL_SOLVENT_DMSO && entry->solvent != ENL_SOLVENT_WATER)
    return enl_error_set (err, ENL_ERROR_UNSUPPORTED, "give the value in dmso or water",
                          "a value in THF cannot join: no single scale exists there, and numbers "
                          "of its footings must not be mixed");
  *field = ENL_LAB_PKA;
  if (!isfinite (entry->pka))
    return enl_error_set (err, ENL_ERROR_RANGE, "write the pKa with a point, as in 24.7",
                          "the pKa is not a number");
  if (entry->pka < LEAST_PKA || entry->pka > MOST_PKA)
    return enl_error_set (err, ENL_ERROR_RANGE, "look for a slip of the pen",
                          "a pKa must lie between %.0f and %.0f", LEAST_PKA, MOST_PKA);
  *field = ENL_LAB_SIGMA;
  if (!isfinite (entry->sigma))
    return enl_error_set (err, ENL_ERROR_RANGE, "write one standard deviation, as in 0.3",
                          "the sigma is not a number");
  if (!(entry->sigma > 0) || entry->sigma > MOST_SIGMA)
    return enl_error_set (err, ENL_ERROR_RANGE, "write one standard deviation in pK units",
                          "a sigma must be above 0 and at most %.0f", MOST_SIGMA);
  return ENL_OK;
}

/* ---- checked values ---- */

static void
row_free (gpointer data)
{
  EnlLabRow *row = data;

  if (!row)
    return;
  enl_lab_entry_free (row->entry);
  enl_molecule_free (row->mol);
  g_free (row);
}

G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlLabRow, row_free)

EnlLab *
enl_lab_new (void)
{
  EnlLab *lab = g_new0 (EnlLab, 1);

  lab->row = g_ptr_array_new_with_free_func (row_free);
  return lab;
}

void
enl_lab_free (EnlLab *lab)
{
  if (!lab)
    return;
  g_ptr_array_unref (lab->row);
  g_free (lab);
}

uint32_t
enl_lab_size (const EnlLab *lab)
{
  return lab->row->len;
}

const EnlLabRow *
enl_lab_row (const EnlLab *lab, uint32_t row)
{
  g_assert (row < lab->row->len);
  return g_ptr_array_index (lab->row, row);
}

/* The atom that the entry points at; ENL_NONE where it leaves the choice to the structure. */
static EnlStatus
pointed_atom (const EnlMolecule *mol, const EnlLabEntry *entry, uint32_t *atom, EnlLabField *field,
              EnlError *err)
{
  *atom = ENL_NONE;
  *field = ENL_LAB_ATOM;
  for (uint32_t i = 0; entry->atom && i < enl_molecule_atoms (mol); i++)
    if (enl_molecule_atom (mol, i)->input == entry->atom)
      *atom = i;
  if (entry->atom && *atom == ENL_NONE)
    return enl_error_set (err, ENL_ERROR_UNKNOWN, "count the atoms of the structure from 1",
                          "no atom %u (a plain hydrogen or beyond the last atom)", entry->atom);
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    if (enl_molecule_atom (mol, i)->map != 1)
      continue;
    if (*atom != ENL_NONE && *atom != i)
      return enl_error_set (err, ENL_ERROR_CHEMISTRY, "mark one atom only, or leave 'atom' empty",
                            "the structure marks another acidic atom as well");
    *atom = i;
  }
  return ENL_OK;
}

/* "1, 4": the first atom of each site as counted in the input. */
static char *
list_sites (const EnlMolecule *mol, const EnlSites *sites)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < sites->n_sites && i < 12; i++)
    g_string_append_printf (out, i ? ", %u" : "%u",
                            enl_molecule_atom (mol, sites->site[i].atom[0])->input);
  return g_string_free (out, FALSE);
}

static EnlStatus
choose_site (const EnlMolecule *mol, const EnlSites *sites, uint32_t atom, uint32_t *site,
             EnlLabField *field, EnlError *err)
{
  g_autofree char *list = list_sites (mol, sites);
  g_autofree char *advice = g_strdup_printf (
      "choose among the acidic atoms %s: by 'atom', or by a mark as in [CH2:1]", list);

  if (sites->n_sites == 0) {
    *field = ENL_LAB_STRUCTURE;
    return enl_error_set (err, ENL_ERROR_UNKNOWN, "give the acid that was measured",
                          "no acidic hydrogen in this structure");
  }
  if (atom == ENL_NONE && sites->n_sites > 1)
    return enl_error_set (err, ENL_ERROR_UNKNOWN, advice,
                          "the structure has %u acidic sites, and none is chosen", sites->n_sites);
  if (atom == ENL_NONE)
    atom = sites->site[0].atom[0];
  uint32_t number = enl_molecule_atom (mol, atom)->input;
  if (enl_molecule_total_hydrogens (mol, atom) == 0)
    return enl_error_set (err, ENL_ERROR_CHEMISTRY, advice, "atom %u carries no hydrogen", number);
  const EnlSite *found = enl_sites_of_atom (sites, atom);
  if (!found)
    return enl_error_set (err, ENL_ERROR_UNKNOWN, advice, "atom %u is no acidic site", number);
  *site = (uint32_t)(found - sites->site);
  return ENL_OK;
}

/* A counter-ion or solvate says nothing about the acid: the fragment with the site is kept. */
static void
keep_fragment (EnlLabRow *row, const EnlSites *sites, uint32_t site)
{
  g_autofree uint32_t *fragment = g_new (uint32_t, enl_molecule_atoms (row->mol) + 1);

  row->site = sites->site[site].atom[0];
  if (enl_molecule_fragments (row->mol, fragment) <= 1)
    return;
  g_autoptr (EnlPart) part = enl_part_new (row->mol, sites, fragment, fragment[row->site]);
  for (uint32_t i = 0; i < part->sites.n_sites; i++)
    if (part->site_of[i] == site)
      row->site = part->sites.site[i].atom[0];
  enl_molecule_free (row->mol);
  row->mol = g_steal_pointer (&part->mol);
}

static EnlStatus
find_site (EnlLabRow *row, EnlLabField *field, EnlError *err)
{
  g_autoptr (EnlSites) sites = NULL;
  uint32_t atom, site = 0;
  EnlStatus status = enl_sites_find (row->mol, &sites, err);

  if (status == ENL_OK)
    status = pointed_atom (row->mol, row->entry, &atom, field, err);
  if (status == ENL_OK)
    status = choose_site (row->mol, sites, atom, &site, field, err);
  if (status == ENL_OK)
    keep_fragment (row, sites, site);
  return status;
}

EnlStatus
enl_lab_add (EnlLab *lab, const EnlNames *names, const EnlLabEntry *entry, uint32_t tag,
             EnlLabField *field, EnlError *err)
{
  g_autoptr (EnlLabRow) row = g_new0 (EnlLabRow, 1);
  EnlLabField unused;
  EnlStatus status = enl_lab_entry_check (entry, field ? field : (field = &unused), err);

  if (status != ENL_OK)
    return status;
  *field = ENL_LAB_STRUCTURE;
  if (lab->row->len >= ENL_MAX_LAB)
    return enl_error_set (err, ENL_ERROR_LIMIT, "leave out what is far from your compounds",
                          "more than %d lab values", ENL_MAX_LAB);
  row->entry = enl_lab_entry_copy (entry);
  row->tag = tag;
  status =
      enl_read_structure (names, entry->structure, strlen (entry->structure), &row->mol, NULL, err);
  if (status == ENL_OK)
    status = find_site (row, field, err);
  if (status == ENL_OK)
    g_ptr_array_add (lab->row, g_steal_pointer (&row));
  return status;
}

static bool
holds (const EnlLab *lab, uint32_t n, const EnlLabEntry *entry)
{
  for (uint32_t i = 0; i < n; i++)
    if (enl_lab_entry_equal (enl_lab_row (lab, i)->entry, entry))
      return true;
  return false;
}

EnlStatus
enl_lab_append (EnlLab *lab, const EnlLab *other, EnlError *err)
{
  uint32_t before = lab->row->len;

  for (uint32_t i = 0; i < other->row->len; i++) {
    const EnlLabRow *row = enl_lab_row (other, i);
    if (holds (lab, before, row->entry))
      continue;
    if (lab->row->len >= ENL_MAX_LAB)
      return enl_error_set (err, ENL_ERROR_LIMIT, "leave out what is far from your compounds",
                            "more than %d lab values", ENL_MAX_LAB);
    EnlLabRow *copy = g_memdup2 (row, sizeof *row);
    copy->entry = enl_lab_entry_copy (row->entry);
    copy->mol = enl_molecule_copy (row->mol);
    g_ptr_array_add (lab->row, copy);
  }
  return ENL_OK;
}
