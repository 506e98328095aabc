#include "core/notation/read.h"

#include <string.h>

#include "core/molecule/elements.h"
#include "core/notation/groups.h"
#include "core/notation/inchi.h"
#include "core/notation/molfile.h"
#include "core/notation/smiles.h"

#define LONGEST_TEXT (4 * 1024 * 1024) /* bytes; no structure within the limits needs more */
#define SHOWN        60                /* bytes of the input that a message repeats */

/* The text, and the part of it without surrounding white space. */
typedef struct {
  const char *text;
  size_t size;
  size_t start, length;
} Input;

static const char *
begin (const Input *in)
{
  return in->text + in->start;
}

/* ---- positions ---- */

/* Moves positions of a reader that saw only the trimmed part. */
static void
shift_error (const Input *in, EnlError *err)
{
  if (err && err->line)
    enl_error_locate (err, in->text, in->size, in->start + err->offset, err->length);
}

static void
shift_atoms (const Input *in, EnlMolecule *mol)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    enl_molecule_edit_atom (mol, i)->offset += (uint32_t)in->start;
}

/* All atoms of a compound read by name stand for the whole name. */
static void
cover_name (const Input *in, EnlMolecule *mol)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    EnlAtom *atom = enl_molecule_edit_atom (mol, i);
    atom->offset = (uint32_t)in->start;
    atom->length = (uint32_t)in->length;
  }
}

/* The start of the input for a message, cut between characters. Caller: g_free. */
static char *
shown (const char *text, size_t length)
{
  if (length <= SHOWN)
    return g_strndup (text, length);
  size_t cut = SHOWN;
  while (cut > 0 && ((unsigned char)text[cut] & 0xC0) == 0x80)
    cut--;
  g_autofree char *head = g_strndup (text, cut);
  return g_strconcat (head, "...", NULL);
}

/* ---- what the text looks like ---- */

static bool
has_inchi_prefix (const Input *in)
{
  return in->length >= 6 && g_ascii_strncasecmp (begin (in), "inchi=", 6) == 0;
}

/* XXXXXXXXXXXXXX-XXXXXXXXXX-X in capitals. */
static bool
is_inchi_key (const Input *in)
{
  if (in->length != 27)
    return false;
  for (size_t i = 0; i < 27; i++) {
    char c = begin (in)[i];
    if ((i == 14 || i == 25) ? c != '-' : !g_ascii_isupper (c))
      return false;
  }
  return true;
}

/* 67-64-1: two to seven digits, two, one. */
static bool
is_registry_number (const Input *in)
{
  const char *p = begin (in);
  size_t n = in->length;

  if (n < 7 || n > 12 || p[n - 2] != '-' || p[n - 5] != '-')
    return false;
  for (size_t i = 0; i < n; i++)
    if (i != n - 2 && i != n - 5 && !g_ascii_isdigit (p[i]))
      return false;
  return true;
}

/* C6H12O6: two elements or more, each once, with a count. */
static bool
is_sum_formula (const Input *in)
{
  bool seen[ENL_N_ELEMENTS] = {false}, counted = false;
  const char *p = begin (in);
  size_t elements = 0;

  for (size_t i = 0; i < in->length;) {
    size_t length = i + 1 < in->length && g_ascii_islower (p[i + 1]) ? 2 : 1;
    int element = g_ascii_isupper (p[i]) ? enl_element_find (p + i, length) : -1;
    if (element <= 0 || seen[element])
      return false;
    seen[element] = true;
    elements++;
    for (i += length; i < in->length && g_ascii_isdigit (p[i]); i++)
      counted = true;
  }
  return counted && elements >= 2;
}

/* Offset of the first white space inside the trimmed text, or its length. */
static size_t
first_gap (const Input *in)
{
  for (size_t i = 0; i < in->length; i++)
    if (g_ascii_isspace (begin (in)[i]))
      return i;
  return in->length;
}

/* A word in lower case with a letter that no SMILES has in that place, as names have. */
static bool
has_word (const Input *in)
{
  size_t run = 0;
  bool foreign = false;

  for (size_t i = 0; i < in->length; i++) {
    unsigned char c = (unsigned char)begin (in)[i];
    if (g_ascii_islower (c) || c >= 0x80) {
      run++;
      foreign = foreign || !strchr ("bcnopslr", c);
      if (run >= 4 && foreign)
        return true;
    } else {
      run = 0;
      foreign = false;
    }
  }
  return false;
}

/* ---- readers ---- */

static EnlStatus
read_name (const Input *in, const char *smiles, EnlMolecule **out, EnlError *err)
{
  EnlStatus status = enl_smiles_parse (smiles, strlen (smiles), out, err);

  if (status != ENL_OK) /* a fault of the table, not of the text */
    return status;
  cover_name (in, *out);
  return ENL_OK;
}

static EnlStatus
unknown_name (const EnlNames *names, const Input *in, EnlError *err)
{
  g_autofree char *word = shown (begin (in), in->length);
  const char *near = names ? enl_names_nearest (names, begin (in), in->length) : NULL;
  g_autofree char *advice =
      near ? g_strdup_printf ("did you mean '%s'?", near)
           : g_strdup ("check the spelling, or give a SMILES, an InChI or a molfile");

  enl_error_set (err, ENL_ERROR_UNKNOWN, advice, "no compound named '%s' is known here", word);
  enl_error_locate (err, in->text, in->size, in->start, in->length);
  return ENL_ERROR_UNKNOWN;
}

/* "CCO ethanol": a structure and something behind it. */
static bool
has_structure_before_gap (const Input *in, size_t gap, EnlError *err)
{
  g_autoptr (EnlMolecule) mol = NULL;

  if (gap == in->length || enl_smiles_parse (begin (in), gap, &mol, NULL) != ENL_OK)
    return false;
  while (gap < in->length && g_ascii_isspace (begin (in)[gap]))
    gap++;
  enl_error_set (err, ENL_ERROR_SYNTAX, "give one structure, and nothing behind it",
                 "text follows the SMILES");
  enl_error_locate (err, in->text, in->size, in->start + gap, in->length - gap);
  return true;
}

/* Neither name, SMILES nor line of groups: tell the fault of what it resembles most, which is the
 * notation that was followed furthest. */
static EnlStatus
choose_fault (const EnlNames *names, const Input *in, const EnlError *smiles,
              const EnlError *groups, EnlError *err)
{
  size_t gap = first_gap (in);

  if (has_structure_before_gap (in, gap, err))
    return ENL_ERROR_SYNTAX;
  if (gap < in->length || has_word (in) ||
      (names && enl_names_nearest (names, begin (in), in->length)))
    return unknown_name (names, in, err);
  /* Hydrogens outside brackets are the mark of a condensed formula. */
  bool has_hydrogens = smiles->code == ENL_ERROR_SYNTAX && smiles->offset < in->length &&
                       begin (in)[smiles->offset] == 'H';
  bool by_smiles =
      smiles->code != ENL_ERROR_SYNTAX || (smiles->offset >= groups->offset && !has_hydrogens);
  const EnlError *best = by_smiles ? smiles : groups;
  if (err)
    *err = *best;
  shift_error (in, err);
  return best->code;
}

/* Something that identifies a compound, but not by its structure. */
static EnlStatus
refuse (const Input *in, EnlError *err, const char *what, const char *advice)
{
  enl_error_set (err, ENL_ERROR_UNSUPPORTED, advice, "%s", what);
  enl_error_locate (err, in->text, in->size, in->start, in->length);
  return ENL_ERROR_UNSUPPORTED;
}

static EnlStatus
read_line (const EnlNames *names, const Input *in, EnlMolecule **out, EnlNotation *notation,
           EnlError *err)
{
  const char *smiles = names ? enl_names_find (names, begin (in), in->length) : NULL;
  EnlError smiles_fault = {0}, groups_fault = {0};

  *notation = ENL_NOTATION_NAME;
  if (smiles)
    return read_name (in, smiles, out, err);
  *notation = ENL_NOTATION_SMILES;
  if (enl_smiles_parse (begin (in), in->length, out, &smiles_fault) == ENL_OK) {
    shift_atoms (in, *out);
    return ENL_OK;
  }
  *notation = ENL_NOTATION_GROUPS;
  if (enl_groups_parse (begin (in), in->length, out, &groups_fault) == ENL_OK) {
    shift_atoms (in, *out);
    return ENL_OK;
  }
  if (is_sum_formula (in))
    return refuse (in, err, "a sum formula does not say how the atoms are joined",
                   "give a SMILES, a name, or a condensed formula such as CH3COCH3");
  return choose_fault (names, in, &smiles_fault, &groups_fault, err);
}

static EnlStatus
read_trimmed (const EnlNames *names, const Input *in, EnlMolecule **out, EnlNotation *notation,
              EnlError *err)
{
  const char *bad = NULL;

  if (has_inchi_prefix (in)) {
    *notation = ENL_NOTATION_INCHI;
    EnlStatus status = enl_inchi_parse (begin (in), in->length, out, err);
    if (status != ENL_OK)
      shift_error (in, err);
    return status;
  }
  if (is_inchi_key (in))
    return refuse (in, err, "an InChIKey is a fingerprint and holds no structure",
                   "give the InChI itself, a SMILES or a name");
  if (is_registry_number (in))
    return refuse (in, err, "a registry number holds no structure",
                   "give the compound's name, a SMILES or an InChI");
  if (!g_utf8_validate (begin (in), (gssize)in->length, &bad)) {
    enl_error_set (err, ENL_ERROR_SYNTAX, "give plain text (UTF-8)", "this is no readable text");
    enl_error_locate (err, in->text, in->size, (size_t)(bad - in->text), 1);
    return ENL_ERROR_SYNTAX;
  }
  return read_line (names, in, out, notation, err);
}

static Input
trim (const char *text, size_t size)
{
  Input in = {text, size, 0, size};

  if (size >= 3 && memcmp (text, "\xEF\xBB\xBF", 3) == 0) /* byte order mark */
    in.start = 3;
  while (in.start < size && g_ascii_isspace (text[in.start]))
    in.start++;
  in.length = size - in.start;
  while (in.length > 0 && g_ascii_isspace (text[in.start + in.length - 1]))
    in.length--;
  return in;
}

EnlStatus
enl_read_structure (const EnlNames *names, const char *text, size_t size, EnlMolecule **out,
                    EnlNotation *notation, EnlError *err)
{
  EnlNotation found = ENL_NOTATION_SMILES;
  Input in = trim (text, size);

  *out = NULL;
  if (!notation)
    notation = &found;
  *notation = found;
  if (in.length == 0)
    return enl_error_set (err, ENL_ERROR_EMPTY, "type a SMILES, a name, an InChI or a molfile",
                          "nothing to read");
  if (size > LONGEST_TEXT)
    return enl_error_set (err, ENL_ERROR_LIMIT, "give one structure at a time",
                          "the text has %zu bytes, more than the %d that are read", size,
                          LONGEST_TEXT);
  if (enl_molfile_recognise (text, size)) {
    *notation = ENL_NOTATION_MOLFILE;
    return enl_molfile_parse (text, size, out, err);
  }
  return read_trimmed (names, &in, out, notation, err);
}

bool
enl_read_list_line (const EnlNames *names, const char *line, size_t size, EnlListLine *out)
{
  size_t start = 0;

  while (size && g_ascii_isspace (line[size - 1]))
    size--;
  while (start < size && g_ascii_isspace (line[start]))
    start++;
  if (start == size)
    return false;
  size_t end = start;
  while (end < size && !g_ascii_isspace (line[end]))
    end++;
  size_t rest = end;
  while (rest < size && g_ascii_isspace (line[rest]))
    rest++;
  if (rest >= size || (names && enl_names_find (names, line + start, size - start)))
    *out = (EnlListLine){start, size, start, size};
  else
    *out = (EnlListLine){start, end, rest, size};
  return true;
}
