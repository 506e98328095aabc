#include "core/molecule/elements.h"

#include <math.h>
#include <string.h>

#include "core/base/table.h"
#include "resources/embedded.h"

typedef struct {
  char symbol[4];
  const char *name;
  double weight, electronegativity;
  uint8_t valence[ENL_MAX_USUAL_BOND], n_valences;
  uint8_t unwritten[ENL_MAX_USUAL_BOND], n_unwritten;
  uint8_t outer;
  bool strict;
} Element;

/* Filled once by read_elements and constant afterwards. */
static Element element_table[ENL_N_ELEMENTS];

static uint8_t
read_valences (const char *text, uint8_t valence[ENL_MAX_USUAL_BOND])
{
  g_auto (GStrv) part = g_strsplit (text, ",", -1);
  uint8_t n = 0;

  for (; part[n]; n++) {
    g_assert (n < ENL_MAX_USUAL_BOND);
    valence[n] = (uint8_t)g_ascii_strtoull (part[n], NULL, 10);
  }
  return n;
}

static void
read_row (const EnlTable *table, size_t row, Element *element)
{
  g_strlcpy (element->symbol, enl_table_cell (table, row, enl_table_column (table, "symbol")),
             sizeof element->symbol);
  element->name = g_intern_string (enl_table_cell (table, row, enl_table_column (table, "name")));
  element->weight = enl_table_number (table, row, enl_table_column (table, "weight"));
  element->electronegativity =
      enl_table_number (table, row, enl_table_column (table, "electronegativity"));
  element->n_valences = read_valences (
      enl_table_cell (table, row, enl_table_column (table, "valences")), element->valence);
  element->n_unwritten = read_valences (
      enl_table_cell (table, row, enl_table_column (table, "unwritten")), element->unwritten);
  const char *outer = enl_table_cell (table, row, enl_table_column (table, "outer"));
  element->outer = (uint8_t)g_ascii_strtoull (outer, NULL, 10);
  element->strict =
      strcmp (enl_table_cell (table, row, enl_table_column (table, "enforced")), "yes") == 0;
}

static gpointer
read_elements (gpointer nothing)
{
  g_autoptr (EnlTable) table = NULL;
  size_t size;
  const char *text = enl_resource ("elements.tsv", &size);

  (void)nothing;
  g_assert (text);
  EnlStatus status = enl_table_parse (text, size, &table, NULL);
  g_assert (status == ENL_OK && enl_table_rows (table) == ENL_N_ELEMENTS);
  for (size_t row = 0; row < ENL_N_ELEMENTS; row++) {
    g_assert (enl_table_number (table, row, enl_table_column (table, "number")) == (double)row);
    read_row (table, row, &element_table[row]);
    g_assert (element_table[row].symbol[0] && !isnan (element_table[row].weight));
  }
  return element_table;
}

static const Element *
get_element (uint8_t element)
{
  static GOnce once = G_ONCE_INIT;

  g_assert (element < ENL_N_ELEMENTS);
  return (const Element *)g_once (&once, read_elements, NULL) + element;
}

const char *
enl_element_symbol (uint8_t element)
{
  return get_element (element)->symbol;
}

const char *
enl_element_name (uint8_t element)
{
  return get_element (element)->name;
}

int
enl_element_find (const char *symbol, size_t length)
{
  const Element *all = get_element (0);

  if (length == 0 || length > 2)
    return -1;
  for (int e = 0; e < ENL_N_ELEMENTS; e++)
    if (all[e].symbol[0] == symbol[0] && all[e].symbol[1] == (length == 2 ? symbol[1] : '\0'))
      return e;
  return -1;
}

double
enl_element_weight (uint8_t element)
{
  return get_element (element)->weight;
}

double
enl_element_electronegativity (uint8_t element)
{
  return get_element (element)->electronegativity;
}

const uint8_t *
enl_element_valences (uint8_t element, size_t *count)
{
  *count = get_element (element)->n_valences;
  return get_element (element)->valence;
}

const uint8_t *
enl_element_unwritten_valences (uint8_t element, size_t *count)
{
  *count = get_element (element)->n_unwritten;
  return get_element (element)->unwritten;
}

bool
enl_element_is_strict (uint8_t element)
{
  return get_element (element)->strict;
}

uint8_t
enl_element_outer_electrons (uint8_t element)
{
  return get_element (element)->outer;
}
