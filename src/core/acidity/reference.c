#include "core/acidity/reference.h"

#include <math.h>
#include <string.h>

#include "core/acidity/checksum.h"
#include "core/base/table.h"
#include "core/molecule/symmetry.h"
#include "core/notation/smiles.h"

/* Where a row does not give its own uncertainty (pK units, one standard deviation). */
#define USUAL_SIGMA 0.5

typedef struct {
  EnlReferenceRow row;
  EnlMolecule *mol;
  char *key;      /* with stereo */
  char *flat;     /* without */
  uint32_t place; /* of the site among the atoms of `flat` as written */
  uint32_t alike; /* of a user's row: own number of the first one for the same site */
  int next;       /* row with the same flat key, or -1 */
} Entry;

struct EnlReference {
  const EnlReference *base; /* NULL: the published table itself */
  EnlTable *table;          /* owns the texts */
  Entry *entry;
  uint32_t n;        /* own entries, numbered behind those of the base */
  GHashTable *first; /* flat key -> 1 + first row */
  uint64_t checksum;
};

static EnlStatus
bad_row (const EnlReference *ref, uint32_t row, const char *what, EnlError *err)
{
  enl_error_set (err, ENL_ERROR_FORMAT, "repair this row of the table of acids", "%s", what);
  if (err)
    err->line = enl_table_line (ref->table, row), err->column = 1;
  return ENL_ERROR_FORMAT;
}

static uint32_t
find_mapped (const EnlMolecule *mol)
{
  uint32_t found = ENL_NONE;

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    if (enl_molecule_atom (mol, i)->map == 1) {
      if (found != ENL_NONE)
        return ENL_NONE;
      found = i;
    }
  return found;
}

static char *
flat_key (const EnlMolecule *mol, uint32_t **order)
{
  *order = g_new (uint32_t, enl_molecule_atoms (mol) + 1);
  return enl_smiles_write (mol, ENL_SMILES_NO_STEREO, *order);
}

static void
index_entry (EnlReference *ref, uint32_t row)
{
  Entry *entry = &ref->entry[row];
  g_autofree uint32_t *order = NULL;

  entry->key = enl_smiles_write (entry->mol, ENL_SMILES_DEFAULT, NULL);
  entry->flat = flat_key (entry->mol, &order);
  while (order[entry->place] != entry->row.site)
    entry->place++;
  gpointer earlier = g_hash_table_lookup (ref->first, entry->flat);
  entry->next = GPOINTER_TO_INT (earlier) - 1;
  g_hash_table_insert (ref->first, entry->flat, GINT_TO_POINTER (row + 1));
}

static EnlStatus
read_row (EnlReference *ref, uint32_t i, EnlError *err)
{
  const EnlTable *t = ref->table;
  Entry *entry = &ref->entry[i];
  EnlReferenceRow *row = &entry->row;
  double sigma = enl_table_number (t, i, enl_table_column (t, "sigma"));

  row->name = enl_table_cell (t, i, enl_table_column (t, "name"));
  row->smiles = enl_table_cell (t, i, enl_table_column (t, "smiles"));
  row->source = enl_table_cell (t, i, enl_table_column (t, "source"));
  row->note = enl_table_cell (t, i, enl_table_column (t, "note"));
  row->pka = enl_table_number (t, i, enl_table_column (t, "pka"));
  row->sigma = sigma > 0 ? sigma : USUAL_SIGMA;
  if (!isfinite (row->pka))
    return bad_row (ref, i, "the pKa is not a number", err);
  if (!enl_solvent_parse (enl_table_cell (t, i, enl_table_column (t, "solvent")), &row->solvent) ||
      row->solvent == ENL_SOLVENT_THF)
    return bad_row (ref, i, "the solvent must be dmso or water", err);
  if (enl_smiles_parse (row->smiles, strlen (row->smiles), &entry->mol, err) != ENL_OK)
    return bad_row (ref, i, "the structure cannot be read", err);
  row->site = find_mapped (entry->mol);
  if (row->site == ENL_NONE)
    return bad_row (ref, i, "exactly one atom must carry the map number 1", err);
  if (enl_molecule_total_hydrogens (entry->mol, row->site) == 0)
    return bad_row (ref, i, "the marked atom has no hydrogen", err);
  index_entry (ref, i);
  row->mol = entry->mol;
  row->key = entry->key;
  return ENL_OK;
}

EnlStatus
enl_reference_new (const char *text, size_t size, EnlReference **out, EnlError *err)
{
  g_autoptr (EnlReference) ref = g_new0 (EnlReference, 1);
  EnlStatus status;

  *out = NULL;
  ref->first = g_hash_table_new (g_str_hash, g_str_equal);
  ref->checksum = enl_checksum (text, size);
  if ((status = enl_table_parse (text, size, &ref->table, err)) != ENL_OK)
    return status;
  ref->n = (uint32_t)enl_table_rows (ref->table);
  ref->entry = g_new0 (Entry, ref->n + 1);
  for (uint32_t i = 0; i < ref->n; i++)
    if ((status = read_row (ref, i, err)) != ENL_OK)
      return status;
  *out = g_steal_pointer (&ref);
  return ENL_OK;
}

/* ---- a user's rows behind the published ones ---- */

/* Place in the flat SMILES of the first atom that is equivalent to the site: the same for every
 * spelling and for every equivalent atom. */
static uint32_t
class_place (const Entry *entry)
{
  g_autofree uint32_t *order = NULL;
  g_autofree char *flat = flat_key (entry->mol, &order);
  g_autofree uint32_t *class_of = g_new (uint32_t, enl_molecule_atoms (entry->mol) + 1);
  uint32_t place = 0;

  enl_symmetry_classes (entry->mol, false, class_of);
  while (class_of[order[place]] != class_of[entry->row.site])
    place++;
  return place;
}

/* SMILES with map number 1 on the site, as in the published rows. */
static char *
marked_smiles (const EnlMolecule *mol, uint32_t site)
{
  g_autoptr (EnlMolecule) copy = enl_molecule_copy (mol);

  for (uint32_t i = 0; i < enl_molecule_atoms (copy); i++)
    enl_molecule_edit_atom (copy, i)->map = i == site;
  enl_molecule_finish (copy);
  return enl_smiles_write (copy, ENL_SMILES_MAPS, NULL);
}

static uint32_t
find_alike (const EnlReference *ref, uint32_t row, const uint32_t *place)
{
  const Entry *entry = &ref->entry[row];

  for (uint32_t i = 0; i < row; i++)
    if (place[i] == place[row] && ref->entry[i].row.solvent == entry->row.solvent &&
        strcmp (ref->entry[i].key, entry->key) == 0)
      return i;
  return row;
}

EnlReference *
enl_reference_extend (const EnlReference *base, const EnlReferenceRow *extra, uint32_t n)
{
  EnlReference *ref = g_new0 (EnlReference, 1);
  g_autofree uint32_t *place = g_new (uint32_t, n + 1);

  g_assert (!base->base);
  ref->base = base;
  ref->first = g_hash_table_new (g_str_hash, g_str_equal);
  ref->n = n;
  ref->entry = g_new0 (Entry, n + 1);
  for (uint32_t i = 0; i < n; i++) {
    EnlReferenceRow *row = &ref->entry[i].row;
    *row = extra[i];
    row->name = g_strdup (extra[i].name);
    row->smiles = marked_smiles (extra[i].mol, extra[i].site);
    row->source = g_strdup (extra[i].source);
    row->note = g_strdup (extra[i].note);
    row->mol = ref->entry[i].mol = enl_molecule_copy (extra[i].mol);
    row->lab = true;
    index_entry (ref, i);
    row->key = ref->entry[i].key;
    place[i] = class_place (&ref->entry[i]);
    ref->entry[i].alike = find_alike (ref, i, place);
  }
  return ref;
}

uint32_t
enl_reference_first_alike (const EnlReference *ref, uint32_t row)
{
  g_assert (ref->base && row >= ref->base->n);
  return ref->base->n + ref->entry[row - ref->base->n].alike;
}

/* The texts of a user's row are its own, those of a published one belong to the table. */
static void
free_texts (const EnlReferenceRow *row)
{
  g_free ((char *)row->name);
  g_free ((char *)row->smiles);
  g_free ((char *)row->source);
  g_free ((char *)row->note);
}

void
enl_reference_free (EnlReference *ref)
{
  if (!ref)
    return;
  g_hash_table_unref (ref->first);
  for (uint32_t i = 0; ref->base && i < ref->n; i++)
    free_texts (&ref->entry[i].row);
  for (uint32_t i = 0; ref->entry && i < ref->n; i++) {
    enl_molecule_free (ref->entry[i].mol);
    g_free (ref->entry[i].key);
    g_free (ref->entry[i].flat);
  }
  g_free (ref->entry);
  enl_table_free (ref->table);
  g_free (ref);
}

uint32_t
enl_reference_rows (const EnlReference *ref)
{
  return ref->n + (ref->base ? ref->base->n : 0);
}

const EnlReferenceRow *
enl_reference_row (const EnlReference *ref, uint32_t row)
{
  if (ref->base && row < ref->base->n)
    return enl_reference_row (ref->base, row);
  row -= ref->base ? ref->base->n : 0;
  g_assert (row < ref->n);
  return &ref->entry[row].row;
}

uint64_t
enl_reference_checksum (const EnlReference *ref)
{
  return ref->base ? ref->base->checksum : ref->checksum;
}

static bool
is_flat (const Entry *entry)
{
  return strcmp (entry->key, entry->flat) == 0;
}

/* True when the rows that start at `first` belong to one isomer only. */
static bool
one_isomer (const EnlReference *ref, int first)
{
  for (int i = first; i >= 0; i = ref->entry[i].next)
    if (strcmp (ref->entry[i].key, ref->entry[first].key) != 0)
      return false;
  return true;
}

/* How well an entry serves a molecule: 3 same isomer, 2 row without stereo, 1 molecule without
 * stereo and no other isomer known, 0 not at all. */
static int
fitness (const EnlReference *ref, const Entry *entry, int first, const char *key, bool flat)
{
  if (strcmp (entry->key, key) == 0)
    return 3;
  if (is_flat (entry))
    return 2;
  return flat && one_isomer (ref, first);
}

void
enl_reference_find_all (const EnlReference *ref, const EnlMolecule *mol, EnlSolvent solvent,
                        int *row)
{
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree uint32_t *order = NULL;
  g_autofree char *flat = flat_key (mol, &order);
  int first = GPOINTER_TO_INT (g_hash_table_lookup (ref->first, flat)) - 1;
  int offset = ref->base ? (int)ref->base->n : 0;

  if (ref->base)
    enl_reference_find_all (ref->base, mol, solvent, row);
  for (uint32_t i = 0; !ref->base && i < n; i++)
    row[i] = -1;
  if (first < 0)
    return;
  g_autofree char *key = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
  g_autofree uint32_t *class_of = g_new (uint32_t, n + 1);
  g_autofree int *best = g_new0 (int, n + 1);
  bool no_stereo = strcmp (key, flat) == 0;
  enl_symmetry_classes (mol, false, class_of);
  for (int i = first; i >= 0; i = ref->entry[i].next) {
    const Entry *entry = &ref->entry[i];
    int fit = fitness (ref, entry, first, key, no_stereo);
    if (entry->row.solvent != solvent || fit == 0)
      continue;
    for (uint32_t a = 0; a < n; a++)
      if (class_of[a] == class_of[order[entry->place]] && fit >= best[a])
        row[a] = offset + i, best[a] = fit;
  }
}

int
enl_reference_find (const EnlReference *ref, const EnlMolecule *mol, uint32_t atom,
                    EnlSolvent solvent)
{
  g_autofree int *row = g_new (int, enl_molecule_atoms (mol) + 1);

  g_assert (atom < enl_molecule_atoms (mol));
  enl_reference_find_all (ref, mol, solvent, row);
  return row[atom];
}
