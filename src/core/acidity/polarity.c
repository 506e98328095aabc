#include "core/acidity/polarity.h"

#include <math.h>
#include <string.h>

#include "core/base/table.h"
#include "core/molecule/elements.h"

#define N_HYBRIDS 4 /* none, sp, sp2, sp3 */
/* The flow halves in every round, so that what is left after this many is below 1e-3 of it. */
#define ROUNDS 10
/* Electronegativity of the hydrogen cation (eV): the one value that a + b + c does not give
 * (Gasteiger and Marsili 1980). */
#define HYDROGEN_CATION 20.02

typedef struct {
  double a, b, c;
  bool known;
} Orbital;

struct EnlPolarityTable {
  Orbital orbital[ENL_N_ELEMENTS][N_HYBRIDS];
};

static int
parse_hybrid (const char *text)
{
  static const char *const name[N_HYBRIDS] = {"any", "sp", "sp2", "sp3"};

  for (int i = 0; i < N_HYBRIDS; i++)
    if (strcmp (text, name[i]) == 0)
      return i;
  return -1;
}

EnlStatus
enl_polarity_table_new (const char *text, size_t size, EnlPolarityTable **out, EnlError *err)
{
  g_autoptr (EnlTable) rows = NULL;
  g_autoptr (EnlPolarityTable) table = g_new0 (EnlPolarityTable, 1);
  EnlStatus status = enl_table_parse (text, size, &rows, err);

  *out = NULL;
  if (status != ENL_OK)
    return status;
  for (size_t row = 0; row < enl_table_rows (rows); row++) {
    const char *symbol = enl_table_cell (rows, row, enl_table_column (rows, "element"));
    int element = enl_element_find (symbol, strlen (symbol));
    int hybrid = parse_hybrid (enl_table_cell (rows, row, enl_table_column (rows, "hybrid")));
    Orbital orbital = {enl_table_number (rows, row, enl_table_column (rows, "a")),
                       enl_table_number (rows, row, enl_table_column (rows, "b")),
                       enl_table_number (rows, row, enl_table_column (rows, "c")), true};
    if (element < 1 || hybrid < 0 || isnan (orbital.a + orbital.b + orbital.c)) {
      enl_error_set (err, ENL_ERROR_FORMAT, "repair this row of electronegativity.tsv",
                     "row '%s' is damaged", symbol);
      if (err)
        err->line = enl_table_line (rows, row), err->column = 1;
      return ENL_ERROR_FORMAT;
    }
    table->orbital[element][hybrid] = orbital;
  }
  *out = g_steal_pointer (&table);
  return ENL_OK;
}

void
enl_polarity_table_free (EnlPolarityTable *table)
{
  g_free (table);
}

static const Orbital *
orbital_of (const EnlPolarityTable *table, uint8_t element, uint8_t coordination)
{
  const Orbital *own = &table->orbital[element][coordination < N_HYBRIDS ? coordination : 0];

  return own->known ? own : &table->orbital[element][0];
}

static double
level (const Orbital *orbital, double charge)
{
  return orbital->a + charge * (orbital->b + charge * orbital->c);
}

static double
cation_level (const Orbital *orbital, uint8_t element)
{
  return element == 1 ? HYDROGEN_CATION : orbital->a + orbital->b + orbital->c;
}

/* A terminal anion shares its charge with terminal atoms of the same element that are doubly
 * bonded to its neighbour (carboxylate, nitro, sulfonate): its forms exchange them. */
static void
spread_formal (const EnlMolecule *mol, double *charge)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    const EnlAtom *atom = enl_molecule_atom (mol, i);
    if (atom->charge != -1 || enl_molecule_degree (mol, i) != 1)
      continue;
    uint32_t centre = enl_molecule_neighbour (mol, i, 0), twin[8], n = 0;
    for (uint32_t k = 0; k < enl_molecule_degree (mol, centre) && n < ENL_COUNT (twin); k++) {
      uint32_t other = enl_molecule_neighbour (mol, centre, k);
      if (enl_molecule_atom (mol, other)->element == atom->element &&
          enl_molecule_degree (mol, other) == 1 &&
          enl_molecule_bond (mol, enl_molecule_bond_at (mol, centre, k))->order == 2)
        twin[n++] = other;
    }
    charge[i] += 1.0 - 1.0 / (n + 1);
    for (uint32_t k = 0; k < n; k++)
      charge[twin[k]] -= 1.0 / (n + 1);
  }
}

/* One round of flow from the charges of the last one. */
static void
flow (const EnlPolarityTable *table, const EnlMolecule *mol, const Orbital *const *orbital,
      double damping, double *charge, double *hydrogen, double *change)
{
  const Orbital *h = orbital_of (table, 1, 0);
  uint32_t n = enl_molecule_atoms (mol);

  memset (change, 0, n * sizeof *change);
  for (uint32_t k = 0; k < enl_molecule_bonds (mol); k++) {
    const EnlBond *bond = enl_molecule_bond (mol, k);
    uint32_t i = bond->from, j = bond->to;
    if (!orbital[i]->known || !orbital[j]->known)
      continue;
    double gap = level (orbital[j], charge[j]) - level (orbital[i], charge[i]);
    uint32_t giver = gap > 0 ? i : j;
    double moved =
        damping * gap / cation_level (orbital[giver], enl_molecule_atom (mol, giver)->element);
    change[i] += moved, change[j] -= moved;
  }
  for (uint32_t i = 0; i < n; i++) {
    const EnlAtom *atom = enl_molecule_atom (mol, i);
    if (atom->hydrogens && orbital[i]->known && h->known) {
      double gap = level (orbital[i], charge[i]) - level (h, hydrogen[i]);
      double moved = damping * gap /
                     (gap > 0 ? cation_level (h, 1) : cation_level (orbital[i], atom->element));
      hydrogen[i] += moved;
      change[i] -= moved * atom->hydrogens;
    }
  }
  for (uint32_t i = 0; i < n; i++)
    charge[i] += change[i];
}

void
enl_polarity_charges (const EnlPolarityTable *table, const EnlMolecule *mol,
                      const uint8_t *coordination, double *charge, double *hydrogen)
{
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree double *change = g_new0 (double, n + 1);
  g_autofree const Orbital **orbital = g_new0 (const Orbital *, n + 1);
  double damping = 1;

  for (uint32_t i = 0; i < n; i++) {
    const EnlAtom *atom = enl_molecule_atom (mol, i);
    charge[i] = atom->charge;
    hydrogen[i] = 0;
    orbital[i] = orbital_of (table, atom->element, coordination[i]);
  }
  spread_formal (mol, charge);
  for (int round = 0; round < ROUNDS; round++) {
    damping *= 0.5;
    flow (table, mol, orbital, damping, charge, hydrogen, change);
  }
}
