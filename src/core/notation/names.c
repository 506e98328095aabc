#include "core/notation/names.h"

#include <string.h>

#include "core/base/table.h"
#include "core/notation/smiles.h"

/* A name is looked up by its key: lower case, without spaces and hyphens, Greek letters spelled.
 * A structure is looked up by the letters of its SMILES, counted, which no rewriting of a SMILES
 * changes; only the few candidates with the same letters are then written canonically and compared.
 * That keeps the start of the program free of reading 1,700 structures. */

#define LONGEST_NAME 200 /* bytes; nothing longer is looked up */

struct EnlNames {
  EnlTable *table; /* owned */
  int name_column, smiles_column;
  GHashTable *row_of_key;     /* owned key -> row + 1 */
  GHashTable *row_of_letters; /* number of the letters -> first row + 1 */
  uint32_t *next;             /* per row: the next row with the same letters + 1, or 0 */
};

/* ---- keys ---- */

static const struct {
  gunichar letter;
  const char *spelled;
} greek[] = {
    {0x03B1, "alpha"}, {0x03B2, "beta"}, {0x03B3, "gamma"}, {0x03B4, "delta"},  {0x03B5, "epsilon"},
    {0x03B6, "zeta"},  {0x03B7, "eta"},  {0x03BA, "kappa"}, {0x03BB, "lambda"}, {0x03BC, "mu"},
    {0x00B5, "mu"},    {0x03C0, "pi"},   {0x03C3, "sigma"}, {0x03C4, "tau"},    {0x03C6, "phi"},
    {0x03C7, "chi"},   {0x03C8, "psi"},  {0x03C9, "omega"},
};

static bool
is_dash (gunichar c)
{
  return c == '-' || (c >= 0x2010 && c <= 0x2015) || c == 0x2212 || c == 0x00AD;
}

static bool
is_prime (gunichar c)
{
  return c == '\'' || c == '`' || c == 0x2032 || c == 0x2019 || c == 0x02B9 || c == 0x00B4;
}

/* True for "(-)" at `p`: the sign of rotation is no hyphen. */
static bool
at_minus_sign (const char *p, const char *end)
{
  if (*p != '(' || end - p < 3)
    return false;
  return is_dash (g_utf8_get_char (p + 1)) && *g_utf8_next_char (p + 1) == ')';
}

static void
append_letter (GString *key, gunichar c)
{
  c = g_unichar_tolower (c);
  for (size_t i = 0; i < ENL_COUNT (greek); i++)
    if (greek[i].letter == c) {
      g_string_append (key, greek[i].spelled);
      return;
    }
  if (is_prime (c))
    g_string_append_c (key, '\'');
  else
    g_string_append_unichar (key, c);
}

/* Key of a name; NULL when `text` cannot be a name. Caller: g_free. */
static char *
name_key (const char *text, size_t size)
{
  if (size == 0 || size > LONGEST_NAME || !g_utf8_validate (text, (gssize)size, NULL))
    return NULL;
  g_autofree char *copy = g_strndup (text, size); /* a zero byte behind the last character */
  GString *key = g_string_sized_new (size + 16);
  for (const char *p = copy; *p;) {
    gunichar c = g_utf8_get_char (p);
    if (g_ascii_isalnum (*p)) {
      g_string_append_c (key, g_ascii_tolower (*p++));
      continue;
    }
    if (at_minus_sign (p, copy + size)) {
      g_string_append (key, "(minus)");
      p = g_utf8_next_char (p + 1) + 1;
      continue;
    }
    if (!is_dash (c) && !g_unichar_isspace (c))
      append_letter (key, c);
    p = g_utf8_next_char (p);
  }
  return g_string_free (key, key->len == 0);
}

/* A number from how often each letter but H occurs in a SMILES, whatever their order and case.
 * Equal numbers of different letters are no harm: the structures are compared as well. */
static void *
letters_number (const char *smiles)
{
  size_t number = 0;

  for (const char *p = smiles; *p; p++)
    if (g_ascii_isalpha (*p) && *p != 'H') {
      size_t letter = (size_t)(g_ascii_tolower (*p) - 'a' + 1);
      number += letter * letter * 0x9E3779B9u + letter; /* spreads the sums over all bits */
    }
  return GSIZE_TO_POINTER (number);
}

/* ---- building ---- */

static EnlStatus
row_fault (const EnlNames *names, size_t row, EnlError *err, const char *advice, const char *fault)
{
  enl_error_set (err, ENL_ERROR_FORMAT, advice, "name '%.80s' %s",
                 enl_table_cell (names->table, row, names->name_column), fault);
  if (err) {
    err->line = enl_table_line (names->table, row);
    err->column = 1;
  }
  return ENL_ERROR_FORMAT;
}

/* Puts the row in front of the list of its letters: rows must come last first. */
static void
add_structure (EnlNames *names, size_t row)
{
  void *number = letters_number (enl_table_cell (names->table, row, names->smiles_column));

  names->next[row] =
      (uint32_t)GPOINTER_TO_SIZE (g_hash_table_lookup (names->row_of_letters, number));
  g_hash_table_insert (names->row_of_letters, number, GSIZE_TO_POINTER (row + 1));
}

static EnlStatus
add_row (EnlNames *names, size_t row, EnlError *err)
{
  const char *name = enl_table_cell (names->table, row, names->name_column);
  const char *smiles = enl_table_cell (names->table, row, names->smiles_column);
  char *key = name_key (name, strlen (name));

  if (!key || !smiles[0]) {
    g_free (key);
    return row_fault (names, row, err, "give each row a name and a structure", "is incomplete");
  }
  size_t other = GPOINTER_TO_SIZE (g_hash_table_lookup (names->row_of_key, key));
  if (other) {
    g_free (key);
    if (strcmp (enl_table_cell (names->table, other - 1, names->smiles_column), smiles) == 0)
      return ENL_OK; /* the same name in another spelling */
    return row_fault (names, row, err, "keep one of the rows", "stands for two structures");
  }
  g_hash_table_insert (names->row_of_key, key, GSIZE_TO_POINTER (row + 1));
  return ENL_OK;
}

EnlStatus
enl_names_new (const char *table, size_t size, EnlNames **out, EnlError *err)
{
  g_autoptr (EnlNames) names = g_new0 (EnlNames, 1);

  *out = NULL;
  names->row_of_key = g_hash_table_new_full (g_str_hash, g_str_equal, g_free, NULL);
  names->row_of_letters = g_hash_table_new (NULL, NULL);
  EnlStatus status = enl_table_parse (table, size, &names->table, err);
  if (status != ENL_OK)
    return status;
  names->name_column = enl_table_column (names->table, "name");
  names->smiles_column = enl_table_column (names->table, "smiles");
  if (names->name_column < 0 || names->smiles_column < 0)
    return enl_error_set (err, ENL_ERROR_FORMAT, "start it with a line of column names",
                          "the table of names has no column '%s'",
                          names->name_column < 0 ? "name" : "smiles");
  for (size_t row = 0; row < enl_table_rows (names->table); row++)
    if ((status = add_row (names, row, err)) != ENL_OK)
      return status;
  names->next = g_new0 (uint32_t, enl_table_rows (names->table) + 1);
  for (size_t row = enl_table_rows (names->table); row > 0; row--)
    add_structure (names, row - 1);
  *out = g_steal_pointer (&names);
  return ENL_OK;
}

void
enl_names_free (EnlNames *names)
{
  if (!names)
    return;
  g_hash_table_unref (names->row_of_key);
  g_hash_table_unref (names->row_of_letters);
  g_free (names->next);
  enl_table_free (names->table);
  g_free (names);
}

/* ---- looking up ---- */

const char *
enl_names_find (const EnlNames *names, const char *text, size_t size)
{
  g_autofree char *key = name_key (text, size);
  size_t row = key ? GPOINTER_TO_SIZE (g_hash_table_lookup (names->row_of_key, key)) : 0;

  return row ? enl_table_cell (names->table, row - 1, names->smiles_column) : NULL;
}

/* Edits (insert, delete, replace, exchange two neighbours) from `a` to `b`, or `limit` + 1 when
 * there are more than `limit`: optimal string alignment. */
static size_t
edit_distance (const char *a, size_t n, const char *b, size_t m, size_t limit)
{
  size_t row[3][LONGEST_NAME + 1];

  for (size_t j = 0; j <= m; j++)
    row[0][j] = j;
  for (size_t i = 1; i <= n; i++) {
    size_t *now = row[i % 3], *last = row[(i + 2) % 3], *before = row[(i + 1) % 3];
    size_t best = now[0] = i;
    for (size_t j = 1; j <= m; j++) {
      now[j] = MIN (MIN (last[j], now[j - 1]) + 1, last[j - 1] + (a[i - 1] != b[j - 1]));
      if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
        now[j] = MIN (now[j], before[j - 2] + 1);
      best = MIN (best, now[j]);
    }
    if (best > limit)
      return limit + 1;
  }
  return row[n % 3][m];
}

/* Slips that still count as "near" for a key of this length. */
static size_t
allowed_slips (size_t length)
{
  return length < 4 ? 0 : length < 7 ? 1 : length < 12 ? 2 : 3;
}

const char *
enl_names_nearest (const EnlNames *names, const char *text, size_t size)
{
  g_autofree char *key = name_key (text, size);
  if (!key || strlen (key) > LONGEST_NAME)
    return NULL;
  size_t length = strlen (key), best = allowed_slips (length) + 1, best_row = SIZE_MAX;
  GHashTableIter iter;
  void *other, *value;

  g_hash_table_iter_init (&iter, names->row_of_key);
  while (g_hash_table_iter_next (&iter, &other, &value)) {
    size_t m = strlen (other), row = GPOINTER_TO_SIZE (value) - 1;
    if (m > LONGEST_NAME || m + best < length || length + best < m)
      continue;
    size_t distance = edit_distance (key, length, other, m, best);
    /* Equal distances: the earlier row, so that the answer does not hang on the hash order. */
    if (distance < best || (distance == best && best_row != SIZE_MAX && row < best_row)) {
      best = distance;
      best_row = row;
    }
  }
  return best_row == SIZE_MAX ? NULL : enl_table_cell (names->table, best_row, names->name_column);
}

static bool
is_same_structure (const char *smiles, const char *canonical)
{
  g_autoptr (EnlMolecule) mol = NULL;

  if (enl_smiles_parse (smiles, strlen (smiles), &mol, NULL) != ENL_OK)
    return false;
  g_autofree char *written = enl_smiles_write (mol, ENL_SMILES_DEFAULT, NULL);
  return strcmp (written, canonical) == 0;
}

const char *
enl_names_of (const EnlNames *names, const char *canonical_smiles)
{
  void *first = g_hash_table_lookup (names->row_of_letters, letters_number (canonical_smiles));
  const char *refused = NULL; /* structure of the row before: synonyms follow one another */

  for (size_t row = GPOINTER_TO_SIZE (first); row; row = names->next[row - 1]) {
    const char *smiles = enl_table_cell (names->table, row - 1, names->smiles_column);
    if (refused && strcmp (refused, smiles) == 0)
      continue;
    if (is_same_structure (smiles, canonical_smiles))
      return enl_table_cell (names->table, row - 1, names->name_column);
    refused = smiles;
  }
  return NULL;
}
