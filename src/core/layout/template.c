#include "core/layout/template.h"

#include <math.h>
#include <string.h>

#include "core/base/table.h"
#include "resources/embedded.h"

#define MAX_TEMPLATE_ATOMS 40
#define MAX_TEMPLATE_BONDS 60

/* Steps after which a search for matches gives up, and matches that are looked at. */
static const uint32_t max_steps = 40000, max_matches = 64;

typedef struct {
  char *name;
  uint32_t n_atoms, n_bonds, crossings;
  EnlSpot spot[MAX_TEMPLATE_ATOMS];
  bool bonded[MAX_TEMPLATE_ATOMS][MAX_TEMPLATE_ATOMS];
  uint32_t degree[MAX_TEMPLATE_ATOMS];
  uint32_t bond[MAX_TEMPLATE_BONDS][2];
  uint32_t order[MAX_TEMPLATE_ATOMS];  /* atoms so that each but the first touches an earlier one */
  uint32_t anchor[MAX_TEMPLATE_ATOMS]; /* that earlier one */
} Template;

struct EnlTemplates {
  GPtrArray *list; /* Template */
};

static void
template_free (gpointer data)
{
  Template *t = data;
  g_free (t->name);
  g_free (t);
}

/* "x,y x,y ..." */
static bool
read_spots (Template *t, const char *text)
{
  g_auto (GStrv) pair = g_strsplit (text, " ", -1);

  for (char **p = pair; *p; p++) {
    char *end = NULL;
    if (t->n_atoms == MAX_TEMPLATE_ATOMS)
      return false;
    EnlSpot *spot = &t->spot[t->n_atoms++];
    spot->x = g_ascii_strtod (*p, &end);
    if (end == *p || *end != ',')
      return false;
    char *second = end + 1;
    spot->y = g_ascii_strtod (second, &end);
    if (end == second || *end || !isfinite (spot->x) || !isfinite (spot->y))
      return false;
  }
  return t->n_atoms > 2;
}

static bool
add_template_bond (Template *t, uint64_t a, uint64_t b)
{
  if (a < 1 || b < 1 || a > t->n_atoms || b > t->n_atoms || a == b || t->bonded[a - 1][b - 1] ||
      t->n_bonds == MAX_TEMPLATE_BONDS)
    return false;
  t->bonded[a - 1][b - 1] = t->bonded[b - 1][a - 1] = true;
  t->degree[a - 1]++;
  t->degree[b - 1]++;
  t->bond[t->n_bonds][0] = (uint32_t)a - 1;
  t->bond[t->n_bonds++][1] = (uint32_t)b - 1;
  return true;
}

/* Walks of 1-based atoms: "1-2-3-4-1 2-5" */
static bool
read_bonds (Template *t, const char *text)
{
  g_auto (GStrv) walk = g_strsplit (text, " ", -1);

  for (char **w = walk; *w; w++) {
    const char *at = *w;
    uint64_t before = 0;
    while (*at) {
      char *end = NULL;
      uint64_t atom = g_ascii_strtoull (at, &end, 10);
      if (end == at || (*end && *end != '-') || (before && !add_template_bond (t, before, atom)))
        return false;
      before = atom;
      at = *end ? end + 1 : end;
    }
  }
  return t->n_bonds > 2;
}

/* Fills order and anchor; false when the graph is not connected. */
static bool
order_atoms (Template *t)
{
  bool seen[MAX_TEMPLATE_ATOMS] = {true};
  uint32_t n = 1;

  t->order[0] = 0;
  for (uint32_t done = 0; done < n; done++)
    for (uint32_t i = 0; i < t->n_atoms; i++)
      if (t->bonded[t->order[done]][i] && !seen[i]) {
        seen[i] = true;
        t->anchor[n] = t->order[done];
        t->order[n++] = i;
      }
  return n == t->n_atoms;
}

static EnlStatus
read_row (EnlTemplates *templates, const EnlTable *table, size_t row, EnlError *err)
{
  Template *t = g_new0 (Template, 1);
  double crossings = enl_table_number (table, row, enl_table_column (table, "crossings"));

  g_ptr_array_add (templates->list, t);
  t->name = g_strdup (enl_table_cell (table, row, enl_table_column (table, "name")));
  t->crossings = crossings >= 0 ? (uint32_t)crossings : 0;
  if (read_spots (t, enl_table_cell (table, row, enl_table_column (table, "spots"))) &&
      read_bonds (t, enl_table_cell (table, row, enl_table_column (table, "walks"))) &&
      order_atoms (t))
    return ENL_OK;
  enl_error_set (err, ENL_ERROR_FORMAT, "write spots as x,y pairs and walks as 1-2-3",
                 "ring template '%.60s' is damaged", t->name);
  if (err)
    err->line = enl_table_line (table, row), err->column = 1;
  return ENL_ERROR_FORMAT;
}

EnlStatus
enl_templates_parse (const char *text, size_t size, EnlTemplates **out, EnlError *err)
{
  g_autoptr (EnlTable) table = NULL;
  g_autoptr (EnlTemplates) templates = g_new0 (EnlTemplates, 1);
  EnlStatus status = enl_table_parse (text, size, &table, err);

  *out = NULL;
  templates->list = g_ptr_array_new_with_free_func (template_free);
  if (status != ENL_OK)
    return status;
  for (size_t row = 0; row < enl_table_rows (table); row++)
    if ((status = read_row (templates, table, row, err)) != ENL_OK)
      return status;
  *out = g_steal_pointer (&templates);
  return ENL_OK;
}

EnlTemplates *
enl_templates_new (void)
{
  EnlTemplates *templates = NULL;
  size_t size = 0;
  const char *text = enl_resource ("ring-templates.tsv", &size);
  EnlStatus status = text ? enl_templates_parse (text, size, &templates, NULL) : ENL_ERROR_EMPTY;

  g_assert (status == ENL_OK);
  return templates;
}

void
enl_templates_free (EnlTemplates *templates)
{
  if (!templates)
    return;
  g_ptr_array_unref (templates->list);
  g_free (templates);
}

uint32_t
enl_templates_count (const EnlTemplates *templates)
{
  return templates->list->len;
}

static const Template *
template_at (const EnlTemplates *templates, uint32_t index)
{
  g_assert (index < templates->list->len);
  return g_ptr_array_index (templates->list, index);
}

const char *
enl_template_name (const EnlTemplates *templates, uint32_t index)
{
  return template_at (templates, index)->name;
}

uint32_t
enl_template_atoms (const EnlTemplates *templates, uint32_t index)
{
  return template_at (templates, index)->n_atoms;
}

uint32_t
enl_template_crossings (const EnlTemplates *templates, uint32_t index)
{
  return template_at (templates, index)->crossings;
}

const EnlSpot *
enl_template_spots (const EnlTemplates *templates, uint32_t index)
{
  return template_at (templates, index)->spot;
}

const uint32_t (*enl_template_bonds (const EnlTemplates *templates, uint32_t index, uint32_t *n))[2]
{
  const Template *t = template_at (templates, index);

  *n = t->n_bonds;
  return t->bond;
}

typedef struct {
  const Template *t;
  const EnlSketch *sketch;
  bool whole, stop;
  uint32_t image[MAX_TEMPLATE_ATOMS];
  bool *used;
  uint32_t steps, matches;
  EnlTemplateMatch match;
  void *data;
} Matching;

static bool
fits (const Matching *m, uint32_t done, uint32_t atom)
{
  uint32_t self = m->t->order[done], degree = enl_sketch_degree (m->sketch, atom);

  if (m->used[atom] || degree < m->t->degree[self] || (m->whole && degree != m->t->degree[self]))
    return false;
  for (uint32_t k = 0; k < done; k++) {
    uint32_t other = m->t->order[k];
    if (m->t->bonded[self][other] != enl_sketch_bonded (m->sketch, atom, m->image[other]))
      return false;
  }
  return true;
}

static void extend (Matching *m, uint32_t done);

static void
try_atom (Matching *m, uint32_t done, uint32_t atom)
{
  if (m->stop || ++m->steps > max_steps || !fits (m, done, atom))
    return;
  m->image[m->t->order[done]] = atom;
  m->used[atom] = true;
  extend (m, done + 1);
  m->used[atom] = false;
}

static void
extend (Matching *m, uint32_t done)
{
  if (done == m->t->n_atoms) {
    m->stop = !m->match (m->image, m->t->spot, m->data) || ++m->matches >= max_matches;
    return;
  }
  if (done == 0) {
    for (uint32_t i = 0; i < m->sketch->n_atoms; i++)
      try_atom (m, 0, i);
    return;
  }
  uint32_t anchor = m->image[m->t->anchor[done]];
  for (uint32_t k = m->sketch->first[anchor]; k < m->sketch->first[anchor + 1]; k++)
    try_atom (m, done, m->sketch->neighbour[k]);
}

void
enl_template_match (const EnlTemplates *templates, uint32_t index, const EnlSketch *sketch,
                    bool whole, EnlTemplateMatch match, void *data)
{
  const Template *t = template_at (templates, index);
  g_autofree bool *used = g_new0 (bool, sketch->n_atoms + 1);
  Matching m = {
      .t = t, .sketch = sketch, .whole = whole, .used = used, .match = match, .data = data};

  if (t->n_atoms > sketch->n_atoms || t->n_bonds > sketch->n_bonds)
    return;
  if (whole && (t->n_atoms != sketch->n_atoms || t->n_bonds != sketch->n_bonds))
    return;
  extend (&m, 0);
}
