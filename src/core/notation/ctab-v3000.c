/* V3000: "M  V30 " lines of words, a trailing '-' joins a line with the next. */
#include "core/notation/ctab.h"

#include <errno.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

#define PREFIX      "M  V30 "
#define MOST_WORDS  64
#define MOST_JOINED 2000 /* continuation lines of one entry */

/* A word of an entry: its text, and where that starts in the file. */
typedef struct {
  char *text;
  size_t offset, length;
} Word;

typedef struct {
  EnlCtab *ctab;
  EnlLines *lines;
  GString *entry;             /* joined lines without prefixes */
  GArray *origin;             /* size_t per byte of `entry`: its offset in the file */
  GArray *word;               /* Word; texts are owned */
  GHashTable *atom_of_number; /* number in the file -> index + 1 */
  long n_atoms, n_bonds;
} V3000;

/* ---- entries and words ---- */

static EnlStatus
fault (const V3000 *in, size_t offset, size_t length, const char *advice, const char *what)
{
  return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, offset, MAX (length, 1), advice, "%s", what);
}

static void
append_line (V3000 *in)
{
  size_t from = strlen (PREFIX);

  for (size_t i = from; i < in->lines->length; i++) {
    size_t offset = in->lines->start + i;
    g_string_append_c (in->entry, in->lines->line[i]);
    g_array_append_val (in->origin, offset);
  }
}

static bool
has_prefix (const V3000 *in)
{
  /* The blank behind V30 may have been trimmed away from an empty entry. */
  return in->lines->length >= 6 && strncmp (in->lines->line, PREFIX, 6) == 0;
}

static void
clear_word (void *word)
{
  g_free (((Word *)word)->text);
}

/* End of the word at `i`: brackets and quotes keep blanks together. */
static size_t
word_end (const GString *entry, size_t i)
{
  int depth = 0;
  bool quoted = false;

  for (; i < entry->len; i++) {
    char c = entry->str[i];
    if (c == '"')
      quoted = !quoted;
    else if (!quoted && c == '(')
      depth++;
    else if (!quoted && c == ')')
      depth--;
    else if (!quoted && depth <= 0 && g_ascii_isspace (c))
      break;
  }
  return i;
}

static void
split_words (V3000 *in)
{
  g_array_set_size (in->word, 0);
  for (size_t i = 0; i < in->entry->len && in->word->len < MOST_WORDS;) {
    if (g_ascii_isspace (in->entry->str[i])) {
      i++;
      continue;
    }
    size_t end = word_end (in->entry, i);
    Word word = {g_strndup (in->entry->str + i, end - i), g_array_index (in->origin, size_t, i),
                 end - i};
    g_array_append_val (in->word, word);
    i = end;
  }
}

/* Reads the next entry into words; ENL_ERROR_FORMAT at the end of the text. */
static EnlStatus
next_entry (V3000 *in)
{
  g_string_set_size (in->entry, 0);
  g_array_set_size (in->origin, 0);
  for (int joined = 0;; joined++) {
    if (!enl_lines_step (in->lines))
      return fault (in, in->lines->start, 1, "paste the whole block",
                    "the molfile ends inside its V3000 block");
    if (!has_prefix (in))
      return fault (in, in->lines->start, in->lines->length,
                    "start every line of the block with 'M  V30 '",
                    "this line does not belong to the V3000 block");
    if (joined > MOST_JOINED)
      return enl_ctab_fault (in->ctab, ENL_ERROR_LIMIT, in->lines->start, 1, "shorten it",
                             "more than %d lines are joined", MOST_JOINED);
    append_line (in);
    if (in->entry->len == 0 || in->entry->str[in->entry->len - 1] != '-')
      break;
    g_string_truncate (in->entry, in->entry->len - 1);
    g_array_set_size (in->origin, (guint)in->entry->len);
  }
  split_words (in);
  return ENL_OK;
}

static const Word *
word_at (const V3000 *in, guint i)
{
  return &g_array_index (in->word, Word, i);
}

static bool
words_are (const V3000 *in, const char *first, const char *second)
{
  return in->word->len >= 2 && strcmp (word_at (in, 0)->text, first) == 0 &&
         strcmp (word_at (in, 1)->text, second) == 0;
}

/* Where an error about word `i`, present or missing, shall point. */
static EnlStatus
bad_word (const V3000 *in, guint i, const char *what)
{
  if (i >= in->word->len)
    return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, in->lines->start + in->lines->length, 1,
                           "complete the line", "the line ends where a %s should stand", what);
  return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, word_at (in, i)->offset,
                         word_at (in, i)->length, "correct it", "'%.30s' is no %s",
                         word_at (in, i)->text, what);
}

static bool
parse_long (const char *text, long least, long most, long *value)
{
  char *end = NULL;

  errno = 0;
  *value = strtol (text, &end, 10);
  return end != text && *end == '\0' && errno == 0 && *value >= least && *value <= most;
}

static EnlStatus
read_long (const V3000 *in, guint i, const char *what, long least, long most, long *value)
{
  if (i >= in->word->len || !parse_long (word_at (in, i)->text, least, most, value))
    return bad_word (in, i, what);
  return ENL_OK;
}

static EnlStatus
read_coordinate (const V3000 *in, guint i, double *value)
{
  char *end = NULL;

  if (i >= in->word->len)
    return bad_word (in, i, "coordinate");
  *value = g_ascii_strtod (word_at (in, i)->text, &end);
  if (end == word_at (in, i)->text || *end || !isfinite (*value) || fabs (*value) > 1e6)
    return bad_word (in, i, "coordinate");
  return ENL_OK;
}

/* ---- KEY=value ---- */

/* Keys that turn the structure into a question or a family, unless their value is 0. */
static const char *const query_key[] = {"HCOUNT",  "SUBST", "UNSAT", "RBCNT",  "ATTCHPT",
                                        "RGROUPS", "TOPO",  "RXCTR", "ENDPTS", "STBOX"};

static EnlStatus
refuse_query (const V3000 *in, guint i, const char *value, size_t key_length)
{
  const Word *word = word_at (in, i);

  if (strcmp (value, "0") == 0)
    return ENL_OK;
  for (size_t k = 0; k < ENL_COUNT (query_key); k++)
    if (strlen (query_key[k]) == key_length && memcmp (query_key[k], word->text, key_length) == 0)
      return enl_ctab_fault (in->ctab, ENL_ERROR_UNSUPPORTED, word->offset, word->length,
                             "draw one certain structure",
                             "'%s' makes the structure a query or a family", query_key[k]);
  return ENL_OK;
}

static EnlStatus
bad_value (const V3000 *in, guint i)
{
  const Word *word = word_at (in, i);

  return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, word->offset, word->length,
                         "correct the value behind '='", "'%.40s' is out of range", word->text);
}

static EnlStatus
apply_atom_key (const V3000 *in, guint i, const char *value, size_t key_length, EnlCtabAtom *atom)
{
  const char *key = word_at (in, i)->text;
  long number = 0;
  bool good = true;

#define KEY_IS(word) (key_length == sizeof word - 1 && memcmp (key, word, sizeof word - 1) == 0)
  if (KEY_IS ("CHG") && (good = parse_long (value, -15, 15, &number)))
    atom->charge = (int)number;
  else if (KEY_IS ("RAD") && (good = parse_long (value, 0, 3, &number)))
    atom->radical = (EnlRadical)number;
  else if (KEY_IS ("MASS") && (good = parse_long (value, 0, 400, &number)))
    atom->isotope = (int)number;
  else if (KEY_IS ("CFG") && (good = parse_long (value, 0, 3, &number)))
    atom->parity = (int)number;
  else if (KEY_IS ("VAL") && (good = parse_long (value, -1, 14, &number)))
    atom->valence = number == 0 ? ENL_VALENCE_DEFAULT : number < 0 ? 0 : (int)number;
  return good ? ENL_OK : bad_value (in, i);
}

static EnlStatus
apply_bond_key (const V3000 *in, guint i, const char *value, size_t key_length, EnlCtabBond *bond)
{
  static const EnlWedge wedge_of_cfg[] = {ENL_WEDGE_NONE, ENL_WEDGE_UP, ENL_WEDGE_EITHER,
                                          ENL_WEDGE_DOWN};
  const char *key = word_at (in, i)->text;
  long number = 0;

  if (!KEY_IS ("CFG"))
    return ENL_OK;
  if (!parse_long (value, 0, 3, &number))
    return bad_value (in, i);
  bond->wedge = bond->type == 1 || bond->type == 2 ? wedge_of_cfg[number] : ENL_WEDGE_NONE;
  return ENL_OK;
}

static EnlStatus
read_keys (const V3000 *in, guint first, EnlCtabAtom *atom, EnlCtabBond *bond)
{
  EnlStatus status = ENL_OK;

  for (guint i = first; status == ENL_OK && i < in->word->len; i++) {
    const char *equals = strchr (word_at (in, i)->text, '=');
    if (!equals)
      return bad_word (in, i, "KEY=value pair");
    size_t length = (size_t)(equals - word_at (in, i)->text);
    status = refuse_query (in, i, equals + 1, length);
    if (status == ENL_OK)
      status = atom ? apply_atom_key (in, i, equals + 1, length, atom)
                    : apply_bond_key (in, i, equals + 1, length, bond);
  }
  return status;
}

/* ---- blocks ---- */

static EnlStatus
read_symbol (const V3000 *in, EnlCtabAtom *atom)
{
  if (in->word->len < 2)
    return bad_word (in, 1, "element symbol");
  const Word *word = word_at (in, 1);
  atom->offset = word->offset;
  atom->length = word->length;
  if (word->text[0] == '[' || g_str_has_prefix (word->text, "NOT"))
    return enl_ctab_fault (in->ctab, ENL_ERROR_UNSUPPORTED, word->offset, word->length,
                           "replace the list by a certain element",
                           "an atom list stands for several structures");
  return enl_ctab_element (in->ctab, word->offset, word->length, &atom->element, &atom->isotope);
}

/* index type x y z aamap [KEY=value ...] */
static EnlStatus
read_atom (V3000 *in)
{
  EnlCtabAtom atom = {.valence = ENL_VALENCE_DEFAULT};
  long number = 0, map = 0;
  EnlStatus status = read_long (in, 0, "atom number", 1, G_MAXINT, &number);

  if (status == ENL_OK)
    status = read_symbol (in, &atom);
  if (status == ENL_OK)
    status = read_coordinate (in, 2, &atom.x);
  if (status == ENL_OK)
    status = read_coordinate (in, 3, &atom.y);
  if (status == ENL_OK)
    status = read_coordinate (in, 4, &atom.z);
  if (status == ENL_OK)
    status = read_long (in, 5, "atom map number", 0, 9999, &map);
  atom.map = (uint32_t)map;
  if (status == ENL_OK)
    status = read_keys (in, 6, &atom, NULL);
  if (status != ENL_OK)
    return status;
  g_array_append_val (in->ctab->atom, atom);
  if (!g_hash_table_insert (in->atom_of_number, GINT_TO_POINTER ((int)number),
                            GUINT_TO_POINTER (in->ctab->atom->len)))
    return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, word_at (in, 0)->offset,
                           word_at (in, 0)->length, "number each atom once",
                           "atom %ld stands twice", number);
  return ENL_OK;
}

static EnlStatus
read_end (const V3000 *in, guint i, uint32_t *index)
{
  long number = 0;
  EnlStatus status = read_long (in, i, "atom number", 1, G_MAXINT, &number);

  if (status != ENL_OK)
    return status;
  guint found =
      GPOINTER_TO_UINT (g_hash_table_lookup (in->atom_of_number, GINT_TO_POINTER ((int)number)));
  if (!found)
    return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, word_at (in, i)->offset,
                           word_at (in, i)->length, "correct the number", "there is no atom %ld",
                           number);
  *index = found - 1;
  return ENL_OK;
}

/* index type atom1 atom2 [KEY=value ...] */
static EnlStatus
read_bond (V3000 *in)
{
  EnlCtabBond bond = {0};
  long number = 0, type = 0;
  EnlStatus status = read_long (in, 0, "bond number", 1, G_MAXINT, &number);

  if (status == ENL_OK)
    status = read_long (in, 1, "bond type", 0, 1000, &type);
  if (status == ENL_OK)
    status = enl_ctab_bond_type (in->ctab, type, word_at (in, 1)->offset, word_at (in, 1)->length);
  bond.type = (int)type;
  if (status == ENL_OK)
    status = read_end (in, 2, &bond.from);
  if (status == ENL_OK)
    status = read_end (in, 3, &bond.to);
  if (status != ENL_OK)
    return status;
  bond.offset = word_at (in, 2)->offset;
  bond.length = word_at (in, 3)->offset + word_at (in, 3)->length - bond.offset;
  if (word_at (in, 3)->offset < bond.offset || bond.length > 100)
    bond.length = word_at (in, 2)->length;
  status = read_keys (in, 4, NULL, &bond);
  if (status == ENL_OK)
    g_array_append_val (in->ctab->bond, bond);
  return status;
}

/* Entries up to "END block"; `read` is NULL for blocks that do not change the structure. */
static EnlStatus
read_block (V3000 *in, const char *block, EnlStatus (*read) (V3000 *in), long count,
            const GArray *made)
{
  size_t start = in->lines->start;

  for (;;) {
    EnlStatus status = next_entry (in);
    if (status != ENL_OK)
      return status;
    if (words_are (in, "END", block))
      break;
    if (!read)
      continue;
    if ((long)made->len >= count)
      return fault (in, in->lines->start, in->lines->length, "correct the COUNTS line",
                    "more entries than the COUNTS line announces");
    if ((status = read (in)) != ENL_OK)
      return status;
  }
  if (read && (long)made->len != count)
    return enl_ctab_fault (in->ctab, ENL_ERROR_FORMAT, start, 1, "correct the COUNTS line",
                           "the %s block has %u entries, the COUNTS line says %ld", block,
                           made->len, count);
  return ENL_OK;
}

static EnlStatus
read_counts (V3000 *in)
{
  EnlStatus status = read_long (in, 1, "number of atoms", 0, G_MAXINT, &in->n_atoms);

  if (status == ENL_OK)
    status = read_long (in, 2, "number of bonds", 0, G_MAXINT, &in->n_bonds);
  if (status != ENL_OK)
    return status;
  const Word *word = word_at (in, 1);
  if (in->n_atoms > ENL_MAX_ATOMS)
    return enl_ctab_fault (
        in->ctab, ENL_ERROR_LIMIT, word->offset, word->length, "read a smaller structure",
        "%ld atoms are more than the %d that are read", in->n_atoms, ENL_MAX_ATOMS);
  if (in->n_atoms == 0)
    return enl_ctab_fault (in->ctab, ENL_ERROR_EMPTY, word->offset, word->length,
                           "draw something first", "the molfile holds no atoms");
  return ENL_OK;
}

static EnlStatus
read_part (V3000 *in)
{
  if (words_are (in, "BEGIN", "ATOM"))
    return read_block (in, "ATOM", read_atom, in->n_atoms, in->ctab->atom);
  if (words_are (in, "BEGIN", "BOND"))
    return read_block (in, "BOND", read_bond, in->n_bonds, in->ctab->bond);
  if (words_are (in, "BEGIN", "SGROUP"))
    return read_block (in, "SGROUP", NULL, 0, NULL);
  if (words_are (in, "BEGIN", "COLLECTION"))
    return read_block (in, "COLLECTION", NULL, 0, NULL);
  if (words_are (in, "BEGIN", "OBJ3D"))
    return read_block (in, "OBJ3D", NULL, 0, NULL);
  if (in->word->len && strcmp (word_at (in, 0)->text, "COUNTS") == 0)
    return read_counts (in);
  if (in->word->len == 0)
    return ENL_OK;
  if (strcmp (word_at (in, 0)->text, "LINKNODE") == 0 || words_are (in, "BEGIN", "RGROUP") ||
      words_are (in, "BEGIN", "TEMPLATE"))
    return enl_ctab_fault (in->ctab, ENL_ERROR_UNSUPPORTED, word_at (in, 0)->offset,
                           word_at (in, 0)->length, "draw one certain structure",
                           "R groups, links and templates stand for several structures");
  return fault (in, word_at (in, 0)->offset, word_at (in, 0)->length, "remove or correct the line",
                "this entry is not known");
}

static EnlStatus
read_all (V3000 *in)
{
  EnlStatus status = next_entry (in);

  if (status == ENL_OK && !words_are (in, "BEGIN", "CTAB"))
    return bad_word (in, 0, "BEGIN CTAB");
  while (status == ENL_OK) {
    if ((status = next_entry (in)) != ENL_OK || words_are (in, "END", "CTAB"))
      break;
    status = read_part (in);
  }
  if (status != ENL_OK)
    return status;
  if (in->ctab->atom->len == 0)
    return fault (in, in->lines->start, in->lines->length, "give a COUNTS line and an ATOM block",
                  "the block holds no atoms");
  if ((long)in->ctab->bond->len != in->n_bonds)
    return fault (in, in->lines->start, in->lines->length, "paste the whole block",
                  "the BOND block is missing");
  while (enl_lines_step (in->lines)) {
    if (in->lines->length >= 6 && strncmp (in->lines->line, "M  END", 6) == 0)
      return ENL_OK;
    if (has_prefix (in)) {
      append_line (in);
      return enl_ctab_fault (in->ctab, ENL_ERROR_UNSUPPORTED, in->lines->start, in->lines->length,
                             "draw one certain structure",
                             "only one connection table is read; R groups and templates are not");
    }
  }
  return fault (in, in->lines->start, 1, "paste the whole block, with its last line",
                "the molfile has no line 'M  END'");
}

EnlStatus
enl_ctab_read_v3000 (EnlCtab *ctab, EnlLines *lines)
{
  V3000 in = {.ctab = ctab, .lines = lines};

  in.entry = g_string_new (NULL);
  in.origin = g_array_new (FALSE, FALSE, sizeof (size_t));
  in.word = g_array_new (FALSE, FALSE, sizeof (Word));
  g_array_set_clear_func (in.word, clear_word);
  in.atom_of_number = g_hash_table_new (NULL, NULL);
  EnlStatus status = read_all (&in);
  g_string_free (in.entry, TRUE);
  g_array_unref (in.origin);
  g_array_unref (in.word);
  g_hash_table_unref (in.atom_of_number);
  return status;
}
