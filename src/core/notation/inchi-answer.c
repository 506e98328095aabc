#include "core/notation/inchi-answer.h"

#include <math.h>
#include <string.h>

#include "core/molecule/elements.h"
#include "core/molecule/stereo.h"
#include "core/molecule/valence.h"

#define LARGEST_ANSWER (1024 * 1024)
#define MOST_ATOMS     1024
#define SHIFT_FLAG     10000 /* the API's mark of a mass given as a difference */
#define SHIFT_MOST     100
#define MOST_NUMBERS   8

enum { HYDROGEN = 1 };

typedef struct {
  EnlMolecule *mol;
  GArray *isotopic; /* uint32_t pairs: atom, mass of a hydrogen that gets an atom of its own */
  EnlError *err;
} Answer;

static EnlStatus
no_answer (Answer *answer, const char *line)
{
  return enl_error_set (answer->err, ENL_ERROR_FORMAT, "report the InChI text",
                        "the reader of InChI answered '%.60s'", line);
}

/* Reads `count` whole numbers, all that is left of the line. */
static bool
read_numbers (const char *text, long *number, int count)
{
  for (int i = 0; i < count; i++) {
    char *end = NULL;
    number[i] = strtol (text, &end, 10);
    if (end == text || number[i] < -20000 || number[i] > 20000)
      return false;
    text = end;
  }
  return *text == '\0';
}

static bool
is_atom (const Answer *answer, long index)
{
  return index >= 0 && (unsigned long)index < enl_molecule_atoms (answer->mol);
}

/* ---- lines ---- */

static uint16_t
mass_number (uint8_t element, long mass)
{
  if (mass >= SHIFT_FLAG - SHIFT_MOST)
    mass = mass - SHIFT_FLAG + lround (enl_element_weight (element));
  return (uint16_t)CLAMP (mass, 0, 400);
}

static EnlStatus
read_atom (Answer *answer, const char *line)
{
  const char *symbol = line + strlen ("atom "), *gap = strchr (symbol, ' ');
  long n[MOST_NUMBERS];
  int element = gap ? enl_element_find (symbol, (size_t)(gap - symbol)) : -1;

  /* charge, hydrogens, protium, deuterium, tritium, mass, radical */
  if (element <= 0 || !read_numbers (gap, n, 7) || labs (n[0]) > 100 || n[1] < 0 || n[6] < 0 ||
      n[1] + n[2] + n[3] + n[4] > 20 || MIN (n[2], MIN (n[3], n[4])) < 0 ||
      enl_molecule_atoms (answer->mol) >= MOST_ATOMS)
    return no_answer (answer, line);
  EnlAtom atom = {.element = (uint8_t)element, .charge = (int8_t)n[0]};
  atom.hydrogens = (uint8_t)n[1];
  atom.isotope = n[5] == 0 ? 0 : mass_number (atom.element, n[5]);
  atom.unpaired = n[6] == 2 ? 1 : n[6] == 3 ? 2 : 0;
  uint32_t index = enl_molecule_add_atom (answer->mol, &atom);
  for (uint32_t mass = 1; mass <= 3; mass++)
    for (long i = 0; i < n[1 + mass]; i++) {
      g_array_append_val (answer->isotopic, index);
      g_array_append_val (answer->isotopic, mass);
    }
  return ENL_OK;
}

static EnlStatus
read_bond (Answer *answer, const char *line)
{
  long n[3];

  if (!read_numbers (line + strlen ("bond "), n, 3) || !is_atom (answer, n[0]) ||
      !is_atom (answer, n[1]) || n[2] < 1 || n[2] > 3 ||
      enl_molecule_add_bond (answer->mol, (uint32_t)n[0], (uint32_t)n[1], (uint8_t)n[2]) ==
          ENL_NONE)
    return no_answer (answer, line);
  return ENL_OK;
}

/* The centre's own index stands for an unwritten neighbour. Sorting it to the front and the others
 * by index is what EnlWinding asks for; each exchange turns the sense. */
static EnlStatus
read_centre (Answer *answer, const char *line)
{
  long n[6];

  if (!read_numbers (line + strlen ("centre "), n, 6) || n[0] < 1 || n[0] > 2 ||
      !is_atom (answer, n[1]))
    return no_answer (answer, line);
  bool clockwise = n[0] == 2;
  for (int i = 2; i < 6; i++) {
    if (!is_atom (answer, n[i]))
      return no_answer (answer, line);
    long key = n[i] == n[1] ? -1 : n[i];
    for (int j = 2; j < i; j++) {
      if (n[j] == n[i])
        return no_answer (answer, line);
      clockwise ^= (n[j] == n[1] ? -1 : n[j]) > key;
    }
  }
  enl_molecule_edit_atom (answer->mol, (uint32_t)n[1])->winding =
      clockwise ? ENL_WINDING_CLOCKWISE : ENL_WINDING_ANTICLOCKWISE;
  return ENL_OK;
}

static EnlBond *
find_bond (Answer *answer, uint32_t a, uint32_t b)
{
  for (uint32_t i = 0; i < enl_molecule_bonds (answer->mol); i++) {
    EnlBond *bond = enl_molecule_edit_bond (answer->mol, i);
    if ((bond->from == a && bond->to == b) || (bond->from == b && bond->to == a))
      return bond;
  }
  return NULL;
}

static EnlStatus
read_double (Answer *answer, const char *line)
{
  long n[5];

  if (!read_numbers (line + strlen ("double "), n, 5) || n[0] < 1 || n[0] > 2)
    return no_answer (answer, line);
  for (int i = 1; i < 5; i++)
    if (!is_atom (answer, n[i]))
      return no_answer (answer, line);
  EnlBond *bond = find_bond (answer, (uint32_t)n[2], (uint32_t)n[3]);
  if (!bond) /* a cumulene: longer than a bond, and no unit of ours */
    return ENL_OK;
  bool turned = bond->from != (uint32_t)n[2];
  if (!find_bond (answer, (uint32_t)n[1], (uint32_t)n[2]) ||
      !find_bond (answer, (uint32_t)n[3], (uint32_t)n[4]) || n[1] == n[3] || n[2] == n[4])
    return no_answer (answer, line);
  bond->side = n[0] == 2 ? ENL_SIDE_OPPOSITE : ENL_SIDE_SAME;
  bond->side_from = (uint32_t)n[turned ? 4 : 1];
  bond->side_to = (uint32_t)n[turned ? 1 : 4];
  return ENL_OK;
}

/* ---- the whole ---- */

static const struct {
  const char *word;
  EnlStatus (*read) (Answer *answer, const char *line);
} line_reader[] = {
    {"atom ", read_atom},
    {"bond ", read_bond},
    {"centre ", read_centre},
    {"double ", read_double},
};

static EnlStatus
read_line (Answer *answer, const char *line)
{
  for (size_t i = 0; i < ENL_COUNT (line_reader); i++)
    if (g_str_has_prefix (line, line_reader[i].word))
      return line_reader[i].read (answer, line);
  return no_answer (answer, line);
}

static EnlStatus
read_lines (Answer *answer, char **line)
{
  if (!line[0] || strcmp (line[0], "enolith-inchi 1") != 0)
    return no_answer (answer, line[0] ? line[0] : "");
  size_t i = 1;
  for (; line[i] && strcmp (line[i], "end") != 0; i++) {
    EnlStatus status = read_line (answer, line[i]);
    if (status != ENL_OK)
      return status;
  }
  if (!line[i])
    return no_answer (answer, "half an answer");
  return enl_molecule_atoms (answer->mol) ? ENL_OK : no_answer (answer, "no atoms");
}

/* Isotopic hydrogens get atoms of their own. A centre that counted one of them as its unwritten
 * neighbour now has it as its last one: three places further, an odd change. */
static void
add_isotopic_hydrogens (Answer *answer)
{
  for (guint i = 0; i + 1 < answer->isotopic->len; i += 2) {
    uint32_t host = g_array_index (answer->isotopic, uint32_t, i);
    EnlAtom hydrogen = {.element = HYDROGEN};
    hydrogen.isotope = (uint16_t)g_array_index (answer->isotopic, uint32_t, i + 1);
    uint32_t atom = enl_molecule_add_atom (answer->mol, &hydrogen);
    enl_molecule_add_bond (answer->mol, host, atom, 1);
    EnlAtom *centre = enl_molecule_edit_atom (answer->mol, host);
    if (centre->winding)
      centre->winding = centre->winding == ENL_WINDING_CLOCKWISE ? ENL_WINDING_ANTICLOCKWISE
                                                                 : ENL_WINDING_CLOCKWISE;
  }
}

static EnlStatus
finish (Answer *answer)
{
  add_isotopic_hydrogens (answer);
  for (uint32_t i = 0; i < enl_molecule_atoms (answer->mol); i++) {
    enl_molecule_edit_atom (answer->mol, i)->input = i + 1;
    enl_molecule_edit_atom (answer->mol, i)->exact = true;
  }
  enl_molecule_finish (answer->mol);
  if (enl_valence_separate_charges (answer->mol))
    enl_molecule_finish (answer->mol);
  enl_molecule_fold_hydrogens (answer->mol);
  enl_stereo_clean (answer->mol);
  return enl_valence_check (answer->mol, NULL, answer->err);
}

EnlStatus
enl_inchi_answer_parse (const char *text, size_t size, EnlMolecule **out, EnlError *err)
{
  g_autoptr (EnlMolecule) mol = enl_molecule_new ();
  g_autoptr (GArray) isotopic = g_array_new (FALSE, FALSE, sizeof (uint32_t));
  Answer answer = {mol, isotopic, err};

  *out = NULL;
  if (size > LARGEST_ANSWER || memchr (text, '\0', size))
    return no_answer (&answer, "no text");
  g_autofree char *copy = g_strndup (text, size);
  if (g_str_has_prefix (copy, "fault "))
    return enl_error_set (err, ENL_ERROR_SYNTAX, "copy the whole InChI again, or give a SMILES",
                          "not a readable InChI (%.100s)", g_strstrip (copy + strlen ("fault ")));
  g_auto (GStrv) line = g_strsplit (copy, "\n", -1);
  EnlStatus status = read_lines (&answer, line);
  if (status == ENL_OK)
    status = finish (&answer);
  if (status != ENL_OK)
    return status;
  *out = g_steal_pointer (&mol);
  return ENL_OK;
}
