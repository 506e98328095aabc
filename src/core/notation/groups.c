#include "core/notation/groups.h"

#include <string.h>

#include "core/base/table.h"
#include "resources/embedded.h"

#define LONGEST_GROUP 12 /* bytes; the table's longest abbreviation is shorter */

typedef struct {
  EnlTable *table;
  GHashTable *row_of_group; /* borrowed text of the table -> row + 1 */
  int smiles_column, line_column;
} GroupTable;

/* Built once from the text inside the program and never changed after: as good as a constant. */
static const GroupTable *
group_table (void)
{
  static GroupTable *built;

  if (g_once_init_enter (&built)) {
    GroupTable *groups = g_new0 (GroupTable, 1);
    size_t size = 0;
    const char *text = enl_resource ("groups.tsv", &size);
    EnlStatus status = enl_table_parse (text, size, &groups->table, NULL);
    g_assert (status == ENL_OK);
    groups->smiles_column = enl_table_column (groups->table, "smiles");
    groups->line_column = enl_table_column (groups->table, "line");
    groups->row_of_group = g_hash_table_new (g_str_hash, g_str_equal);
    for (size_t row = 0; row < enl_table_rows (groups->table); row++)
      g_hash_table_insert (groups->row_of_group, (char *)enl_table_cell (groups->table, row, 0),
                           GSIZE_TO_POINTER (row + 1));
    g_once_init_leave (&built, groups);
  }
  return built;
}

/* Row of the abbreviation + 1, or 0. */
static size_t
find_row (const GroupTable *groups, const char *text, size_t size)
{
  char key[LONGEST_GROUP + 1];

  if (size == 0 || size > LONGEST_GROUP)
    return 0;
  memcpy (key, text, size);
  key[size] = '\0';
  return GPOINTER_TO_SIZE (g_hash_table_lookup (groups->row_of_group, key));
}

const char *
enl_group_find (const char *text, size_t size)
{
  const GroupTable *groups = group_table ();
  size_t row = find_row (groups, text, size);

  return row ? enl_table_cell (groups->table, row - 1, groups->smiles_column) : NULL;
}

size_t
enl_group_match (const char *text, size_t size, const char **smiles)
{
  const GroupTable *groups = group_table ();

  for (size_t n = MIN (size, LONGEST_GROUP); n > 0; n--) {
    size_t row = find_row (groups, text, n);
    if (row && strcmp (enl_table_cell (groups->table, row - 1, groups->line_column), "yes") == 0) {
      *smiles = enl_table_cell (groups->table, row - 1, groups->smiles_column);
      return n;
    }
  }
  return 0;
}
