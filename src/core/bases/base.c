#include "core/bases/base.h"

#include <math.h>
#include <string.h>

#include "core/base/table.h"
#include "core/bases/base-private.h"

struct EnlBaseTable {
  EnlTable *text;     /* owns the strings of the bases it was read from, NULL: borrowed */
  GStringChunk *kept; /* other strings, NULL: none */
  EnlBase *base;
  uint32_t n;
};

typedef struct {
  const EnlTable *table;
  size_t row;
} RowReader;

static const char *
cell (const RowReader *at, const char *column)
{
  return enl_table_cell (at->table, at->row, enl_table_column (at->table, column));
}

static double
number (const RowReader *at, const char *column)
{
  return enl_table_number (at->table, at->row, enl_table_column (at->table, column));
}

static bool
lists_word (const char *list, const char *word)
{
  g_auto (GStrv) part = g_strsplit (list, ";", -1);

  for (char **p = part; *p; p++)
    if (g_ascii_strcasecmp (g_strstrip (*p), word) == 0)
      return true;
  return false;
}

static void
read_strengths (const RowReader *at, EnlBase *base)
{
  base->pkah[ENL_SOLVENT_DMSO] = number (at, "pKaH_DMSO");
  base->sigma[ENL_SOLVENT_DMSO] = number (at, "sigma_DMSO");
  base->pkah[ENL_SOLVENT_WATER] = number (at, "pKaH_water");
  base->sigma[ENL_SOLVENT_WATER] = number (at, "sigma_water");
  base->pkah[ENL_SOLVENT_THF] = base->sigma[ENL_SOLVENT_THF] = NAN;
  /* In THF only the footing of carbon acids may be set against a carbon acid: the scale of
   * cationic acids has another zero. */
  if (strcmp (cell (at, "thf_footing"), "carbon acids") == 0) {
    base->pkah[ENL_SOLVENT_THF] = number (at, "pKaH_THF");
    base->sigma[ENL_SOLVENT_THF] = number (at, "sigma_THF");
  }
  base->pkah_nominal = number (at, "pKaH_nominal");
  for (int s = 0; s < ENL_N_SOLVENTS; s++)
    base->attacks[s] = lists_word (cell (at, "attacks"), enl_solvent_id ((EnlSolvent)s));
}

static bool
says_yes (const RowReader *at, const char *column)
{
  return strcmp (cell (at, column), "yes") == 0;
}

static void
read_form (const RowReader *at, EnlBase *base)
{
  base->form = cell (at, "form");
  base->molar_mass = number (at, "molar_mass");
  base->molarity = number (at, "molarity");
  base->mass_percent = number (at, "mass_percent");
  base->density = number (at, "density");
}

static void
read_base (const RowReader *at, EnlBase *base)
{
  base->id = cell (at, "id");
  base->name = cell (at, "name");
  base->smiles = cell (at, "formula_or_smiles");
  base->conjugate_acid = cell (at, "conjugate_acid_smiles");
  base->cation = cell (at, "cation");
  base->family = cell (at, "class");
  base->nucleophilicity = cell (at, "nucleophilicity");
  base->steric = cell (at, "steric");
  base->typical_solvents = cell (at, "typical_solvents");
  base->typical_temperature = cell (at, "typical_temperature_C");
  base->incompatible = cell (at, "incompatible_with");
  base->note = cell (at, "note");
  base->source = cell (at, "source");
  base->spellings = cell (at, "spellings");
  base->thf_scale = cell (at, "pKaH_THF_scale");
  base->usual = says_yes (at, "usual");
  base->irreversible = says_yes (at, "irreversible");
  base->number_unreliable = strcmp (cell (at, "number_holds"), "no") == 0;
  base->soft = says_yes (at, "soft");
  base->adds_to_carbonyl = says_yes (at, "adds_to_carbonyl");
  base->beta_hydride = says_yes (at, "beta_hydride");
  read_strengths (at, base);
  read_form (at, base);
}

static EnlStatus
check_columns (const EnlTable *table, EnlError *err)
{
  static const char *const needed[] = {"id",
                                       "name",
                                       "class",
                                       "pKaH_DMSO",
                                       "pKaH_water",
                                       "pKaH_THF",
                                       "attacks",
                                       "irreversible",
                                       "source",
                                       "thf_footing",
                                       "number_holds",
                                       "soft",
                                       "adds_to_carbonyl",
                                       "beta_hydride",
                                       "molar_mass",
                                       "form"};

  return enl_table_require (table, needed, ENL_COUNT (needed), "base table", err);
}

EnlStatus
enl_base_table_new (const char *text, size_t size, EnlBaseTable **out, EnlError *err)
{
  g_autoptr (EnlBaseTable) table = g_new0 (EnlBaseTable, 1);

  *out = NULL;
  EnlStatus status = enl_table_parse (text, size, &table->text, err);
  if (status == ENL_OK)
    status = check_columns (table->text, err);
  if (status != ENL_OK)
    return status;
  table->n = (uint32_t)enl_table_rows (table->text);
  table->base = g_new0 (EnlBase, table->n);
  for (uint32_t i = 0; i < table->n; i++) {
    RowReader at = {table->text, i};
    read_base (&at, &table->base[i]);
    if (!table->base[i].id[0] || enl_base_table_find (table, table->base[i].id) != (int)i) {
      enl_error_set (err, ENL_ERROR_FORMAT, "give every base an id of its own",
                     "base id '%s' is empty or used twice", table->base[i].id);
      if (err)
        err->line = enl_table_line (table->text, i), err->column = 1;
      return ENL_ERROR_FORMAT;
    }
  }
  *out = g_steal_pointer (&table);
  return ENL_OK;
}

void
enl_base_table_free (EnlBaseTable *table)
{
  if (!table)
    return;
  enl_table_free (table->text);
  if (table->kept)
    g_string_chunk_free (table->kept);
  g_free (table->base);
  g_free (table);
}

uint32_t
enl_base_table_size (const EnlBaseTable *table)
{
  return table->n;
}

const EnlBase *
enl_base_table_get (const EnlBaseTable *table, uint32_t index)
{
  g_assert (index < table->n);
  return &table->base[index];
}

int
enl_base_table_find (const EnlBaseTable *table, const char *text)
{
  for (uint32_t i = 0; i < table->n; i++)
    if (table->base[i].id && (g_ascii_strcasecmp (table->base[i].id, text) == 0 ||
                              g_ascii_strcasecmp (table->base[i].name, text) == 0))
      return (int)i;
  return -1;
}

/* ---- what a person calls a base ---- */

#define N_NEAREST 3

/* Letters and digits in lower case, "tert" as "t" and "sec" as "s". Signs beyond ASCII are kept. */
static char *
fold (const char *text, size_t size)
{
  g_autofree char *copy = g_strndup (text, size);
  g_autofree char *valid = g_utf8_make_valid (copy, -1);
  g_autofree char *lower = g_utf8_strdown (valid, -1);
  GString *out = g_string_new (NULL);

  for (const char *p = lower; *p; p++)
    if (g_ascii_isalnum (*p) || (guchar)*p >= 0x80)
      g_string_append_c (out, *p);
  g_string_replace (out, "tert", "t", 0);
  g_string_replace (out, "sec", "s", 0);
  return g_string_free (out, FALSE);
}

static void
add_key (GPtrArray *keys, const char *text, size_t size)
{
  g_autofree char *key = fold (text, size);

  if (key[0])
    g_ptr_array_add (keys, g_steal_pointer (&key));
}

/* All that the base goes by, folded. */
static GPtrArray *
keys_of (const EnlBase *base)
{
  GPtrArray *keys = g_ptr_array_new_with_free_func (g_free);
  const char *bracket = strstr (base->name, " (");
  size_t length = strlen (base->name);
  g_auto (GStrv) other = g_strsplit (base->spellings ? base->spellings : "", ";", -1);

  add_key (keys, base->id, strlen (base->id));
  add_key (keys, base->name, length);
  if (bracket && base->name[length - 1] == ')') {
    add_key (keys, base->name, (size_t)(bracket - base->name));
    add_key (keys, bracket + 2, strlen (bracket + 2));
  }
  for (char **p = other; *p; p++)
    add_key (keys, *p, strlen (*p));
  return keys;
}

static guint
least3 (guint a, guint b, guint c)
{
  return MIN (MIN (a, b), c);
}

/* Letters to add, drop or change (Levenshtein 1966). */
static guint
edits (const char *a, const char *b)
{
  size_t n = strlen (b);
  g_autofree guint *row = g_new (guint, n + 1);

  for (size_t j = 0; j <= n; j++)
    row[j] = (guint)j;
  for (guint i = 1; a[i - 1]; i++) {
    guint corner = row[0];
    row[0] = i;
    for (size_t j = 1; j <= n; j++) {
      guint above = row[j];
      row[j] = least3 (above + 1, row[j - 1] + 1, corner + (a[i - 1] != b[j - 1]));
      corner = above;
    }
  }
  return row[n];
}

/* 0 when the base goes by that; the letters that tell its best key from `wanted`. */
static guint
distance_to (const EnlBase *base, const char *wanted)
{
  g_autoptr (GPtrArray) keys = keys_of (base);
  guint least = G_MAXUINT;

  for (guint i = 0; i < keys->len; i++)
    least = MIN (least, edits (wanted, g_ptr_array_index (keys, i)));
  return least;
}

/* "nbuli, sbuli, tbuli": those of least distance, in order of the table among equals. */
static char *
nearest_ids (const EnlBaseTable *table, guint *distance)
{
  GString *out = g_string_new (NULL);

  for (int k = 0; k < N_NEAREST; k++) {
    uint32_t best = 0;
    for (uint32_t i = 1; i < table->n; i++)
      if (distance[i] < distance[best])
        best = i;
    if (table->n == 0 || distance[best] == G_MAXUINT)
      break;
    g_string_append_printf (out, "%s%.40s", k ? ", " : "", table->base[best].id);
    distance[best] = G_MAXUINT;
  }
  return g_string_free (out, FALSE);
}

/* Longer texts are no names; also bounds the work of edits (). */
#define LONGEST_NAME 200

EnlStatus
enl_base_table_look_up (const EnlBaseTable *table, const char *text, uint32_t *out, EnlError *err)
{
  g_autofree char *wanted = fold (text, strnlen (text, LONGEST_NAME));
  g_autofree guint *distance = g_new (guint, table->n + 1);
  int found = enl_base_table_find (table, text);
  uint32_t n_found = 0;

  for (uint32_t i = 0; found < 0 && i < table->n; i++) {
    distance[i] = distance_to (&table->base[i], wanted);
    if (distance[i] == 0)
      n_found++, *out = i;
  }
  if (found >= 0)
    *out = (uint32_t)found;
  if (found >= 0 || n_found == 1)
    return ENL_OK;
  g_autofree char *ids = nearest_ids (table, distance);
  g_autofree char *advice =
      g_strdup_printf ("nearest: %s; 'enolith-cli bases' lists all by id and name", ids);
  return enl_error_set (err, ENL_ERROR_UNKNOWN, advice,
                        n_found ? "'%.80s' means more than one base" : "no base '%.80s'", text);
}

/* ---- for the files that make a table ---- */

EnlBaseTable *
enl_base_table_allocate (uint32_t n)
{
  EnlBaseTable *table = g_new0 (EnlBaseTable, 1);

  table->base = g_new0 (EnlBase, n);
  table->n = n;
  return table;
}

EnlBase *
enl_base_table_edit (EnlBaseTable *table, uint32_t index)
{
  g_assert (index < table->n);
  return &table->base[index];
}

const char *
enl_base_table_keep (EnlBaseTable *table, const char *text)
{
  if (!table->kept)
    table->kept = g_string_chunk_new (256);
  return g_string_chunk_insert (table->kept, text);
}
