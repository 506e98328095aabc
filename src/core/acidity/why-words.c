#include "core/acidity/why-words.h"

#include <string.h>

#include "core/base/table.h"
#include "core/molecule/symmetry.h"
#include "core/notation/smiles.h"
#include "resources/embedded.h"

struct EnlWhyWords {
  GHashTable *parent;              /* key of structure and site -> words */
  GHashTable *group;               /* canonical SMILES with '*' -> EnlWhyGroup */
  uint32_t strength[ENL_N_GROUPS]; /* first row of a parent with this group beside the site */
};

void
enl_why_words_free (EnlWhyWords *words)
{
  if (!words)
    return;
  g_hash_table_unref (words->parent);
  g_hash_table_unref (words->group);
  g_free (words);
}

static void
free_group (gpointer data)
{
  EnlWhyGroup *group = data;

  g_free ((char *)group->noun);
  g_free ((char *)group->prefix);
  g_free (group);
}

/* Canonical SMILES and the first place in it of an atom that is equivalent to the site: the same
 * for every order of atoms. */
static char *
key_of (const EnlMolecule *mol, uint32_t site)
{
  uint32_t n = enl_molecule_atoms (mol), place = 0;
  g_autofree uint32_t *order = g_new (uint32_t, n + 1);
  g_autofree uint32_t *class_of = g_new (uint32_t, n + 1);
  g_autofree char *smiles = enl_smiles_write (mol, ENL_SMILES_NO_STEREO, order);

  enl_symmetry_classes (mol, false, class_of);
  while (place + 1 < n && class_of[order[place]] != class_of[site])
    place++;
  return g_strdup_printf ("%s %u", smiles, place);
}

static EnlStatus
refuse_row (const EnlTable *table, size_t row, const char *what, EnlError *err)
{
  enl_error_set (err, ENL_ERROR_FORMAT, "correct the table of parents", "%s", what);
  if (err)
    err->line = enl_table_line (table, row);
  return ENL_ERROR_FORMAT;
}

static EnlStatus
add_parent (EnlWhyWords *words, const EnlTable *table, size_t row, const EnlMolecule *mol,
            EnlError *err)
{
  uint32_t site = 0, n = enl_molecule_atoms (mol);

  while (site < n && enl_molecule_atom (mol, site)->map != 1)
    site++;
  if (site == n)
    return refuse_row (table, row, "no atom has map 1", err);
  for (uint32_t k = 0; k < enl_molecule_degree (mol, site); k++) {
    EnlGroup group = enl_group_of (mol, enl_molecule_neighbour (mol, site, k));
    words->strength[group] = MIN (words->strength[group], (uint32_t)row);
  }
  const char *name = enl_table_cell (table, row, enl_table_column (table, "words"));
  if (!g_hash_table_insert (words->parent, key_of (mol, site), g_strdup (name)))
    return refuse_row (table, row, "parent given twice", err);
  return ENL_OK;
}

static EnlStatus
add_group (EnlWhyWords *words, const EnlTable *table, size_t row, const EnlMolecule *mol,
           EnlError *err)
{
  EnlWhyGroup *group = g_new0 (EnlWhyGroup, 1);

  group->noun = g_strdup (enl_table_cell (table, row, enl_table_column (table, "words")));
  group->prefix = g_strdup (enl_table_cell (table, row, enl_table_column (table, "prefix")));
  if (!g_hash_table_insert (words->group, enl_smiles_write (mol, ENL_SMILES_NO_STEREO, NULL),
                            group))
    return refuse_row (table, row, "group given twice", err);
  return ENL_OK;
}

static EnlStatus
add_row (EnlWhyWords *words, const EnlTable *table, size_t row, EnlError *err)
{
  const char *kind = enl_table_cell (table, row, enl_table_column (table, "kind"));
  const char *smiles = enl_table_cell (table, row, enl_table_column (table, "smiles"));
  g_autoptr (EnlMolecule) mol = NULL;

  if (enl_smiles_parse (smiles, strlen (smiles), &mol, NULL) != ENL_OK)
    return refuse_row (table, row, "SMILES that cannot be read", err);
  if (strcmp (kind, "parent") == 0)
    return add_parent (words, table, row, mol, err);
  if (strcmp (kind, "group") == 0)
    return add_group (words, table, row, mol, err);
  return refuse_row (table, row, "kind is neither 'parent' nor 'group'", err);
}

EnlStatus
enl_why_words_parse (const char *text, size_t size, EnlWhyWords **out, EnlError *err)
{
  static const char *const column[] = {"kind", "smiles", "words", "prefix"};
  g_autoptr (EnlTable) table = NULL;
  g_autoptr (EnlWhyWords) words = g_new0 (EnlWhyWords, 1);
  EnlStatus status = enl_table_parse (text, size, &table, err);

  *out = NULL;
  words->parent = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, g_free);
  words->group = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, free_group);
  for (int i = 0; i < ENL_N_GROUPS; i++)
    words->strength[i] = ENL_NONE;
  if (status == ENL_OK)
    status = enl_table_require (table, column, ENL_COUNT (column), "table of parents", err);
  for (size_t row = 0; status == ENL_OK && row < enl_table_rows (table); row++)
    status = add_row (words, table, row, err);
  if (status == ENL_OK)
    *out = g_steal_pointer (&words);
  return status;
}

const EnlWhyWords *
enl_why_words (void)
{
  static EnlWhyWords *words;
  static gsize ready;

  if (g_once_init_enter (&ready)) {
    size_t size = 0;
    const char *text = enl_resource ("parents.tsv", &size);
    EnlError err;
    /* The table is part of the program, so that a fault in it is a fault of ours. */
    EnlStatus status = enl_why_words_parse (text, size, &words, &err);
    g_assert (status == ENL_OK);
    g_once_init_leave (&ready, 1);
  }
  return words;
}

const char *
enl_why_words_parent (const EnlWhyWords *words, const EnlMolecule *mol, uint32_t site)
{
  g_autofree char *key = key_of (mol, site);

  return g_hash_table_lookup (words->parent, key);
}

const EnlWhyGroup *
enl_why_words_group (const EnlWhyWords *words, const EnlMolecule *fragment)
{
  g_autofree char *key = enl_smiles_write (fragment, ENL_SMILES_NO_STEREO, NULL);

  return g_hash_table_lookup (words->group, key);
}

uint32_t
enl_why_words_strength (const EnlWhyWords *words, EnlGroup group)
{
  g_assert (group < ENL_N_GROUPS);
  return words->strength[group];
}
