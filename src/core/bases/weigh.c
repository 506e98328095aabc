#include "core/bases/weigh.h"

#include <math.h>
#include <string.h>

#include "core/base/table.h"

/* A bench: from a microvial to a hundred moles. */
#define LEAST_MMOL  0.001
#define MOST_MMOL   1e5
#define MOST_EQUIV  100.0
#define MOST_WATER  100.0
#define LEAST_TITRE 0.001
#define MOST_TITRE  20.0
#define LEAST_SHARE 0.1
#define MG_PER_G    1000.0

static const char class_word[] = "class ";

/* A row of the table. */
typedef struct {
  const char *base, *part, *form, *note;
  const EnlBase *like;
  double molar_mass, molarity, mass_percent, density, moles, equivalents;
  bool water;
} Row;

struct EnlWeighTable {
  EnlTable *text;
  Row *row;
  uint32_t n;
};

/* ---- table ---- */

static const char *
cell (const EnlWeighTable *t, uint32_t row, const char *column)
{
  return enl_table_cell (t->text, row, enl_table_column (t->text, column));
}

static double
number (const EnlWeighTable *t, uint32_t row, const char *column)
{
  return enl_table_number (t->text, row, enl_table_column (t->text, column));
}

static const EnlBase *
base_named (const EnlBaseTable *bases, const char *id)
{
  int found = id[0] ? enl_base_table_find (bases, id) : -1;

  return found < 0 ? NULL : enl_base_table_get (bases, (uint32_t)found);
}

static EnlStatus
read_row (EnlWeighTable *t, uint32_t i, const EnlBaseTable *bases, EnlError *err)
{
  const char *like = cell (t, i, "like");
  Row *row = &t->row[i];

  *row = (Row){.base = cell (t, i, "base"),
               .part = cell (t, i, "part"),
               .form = cell (t, i, "form"),
               .note = cell (t, i, "note"),
               .like = base_named (bases, like),
               .molar_mass = number (t, i, "molar_mass"),
               .molarity = number (t, i, "molarity"),
               .mass_percent = number (t, i, "mass_percent"),
               .density = number (t, i, "density"),
               .moles = number (t, i, "moles"),
               .equivalents = number (t, i, "equivalents"),
               .water = strcmp (cell (t, i, "water"), "yes") == 0};
  bool known = g_str_has_prefix (row->base, class_word) || base_named (bases, row->base) != NULL;
  if (known && (!like[0] || row->like))
    return ENL_OK;
  enl_error_set (err, ENL_ERROR_FORMAT, "name a row of bases.tsv", "no base '%.60s'",
                 known ? like : row->base);
  if (err)
    err->line = enl_table_line (t->text, i), err->column = 1;
  return ENL_ERROR_FORMAT;
}

EnlStatus
enl_weigh_table_new (const char *text, size_t size, const EnlBaseTable *bases, EnlWeighTable **out,
                     EnlError *err)
{
  static const char *const needed[] = {
      "base",         "part",  "like",  "molar_mass",  "form", "molarity", "density",
      "mass_percent", "moles", "water", "equivalents", "note", "source"};
  g_autoptr (EnlWeighTable) t = g_new0 (EnlWeighTable, 1);

  *out = NULL;
  EnlStatus status = enl_table_parse (text, size, &t->text, err);
  if (status == ENL_OK)
    status = enl_table_require (t->text, needed, ENL_COUNT (needed), "weigh-out table", err);
  if (status != ENL_OK)
    return status;
  t->n = (uint32_t)enl_table_rows (t->text);
  t->row = g_new0 (Row, t->n);
  for (uint32_t i = 0; status == ENL_OK && i < t->n; i++)
    status = read_row (t, i, bases, err);
  if (status == ENL_OK)
    *out = g_steal_pointer (&t);
  return status;
}

void
enl_weigh_table_free (EnlWeighTable *t)
{
  if (!t)
    return;
  enl_table_free (t->text);
  g_free (t->row);
  g_free (t);
}

/* Rows of one base stand together; NULL when there is none. */
static const Row *
rows_of (const EnlWeighTable *t, const EnlBase *base, uint32_t *n)
{
  const Row *first = NULL;

  *n = 0;
  for (uint32_t i = 0; i < t->n && !base->own; i++)
    if (strcmp (t->row[i].base, base->id) == 0) {
      if (!first)
        first = &t->row[i];
      ++*n;
    }
  return first;
}

static bool
water_takes (const EnlWeighTable *t, const EnlBase *base)
{
  for (uint32_t i = 0; i < t->n; i++)
    if (g_str_has_prefix (t->row[i].base, class_word) &&
        strcmp (t->row[i].base + strlen (class_word), base->family) == 0)
      return t->row[i].water;
  return true;
}

/* ---- order ---- */

static EnlStatus
check_number (double value, double low, double high, const char *what, const char *advice,
              EnlError *err)
{
  if (value >= low && value <= high)
    return ENL_OK;
  return enl_error_set (err, ENL_ERROR_RANGE, advice, "%s %g", what, value);
}

EnlStatus
enl_weigh_order_check (const EnlWeighOrder *o, EnlError *err)
{
  EnlStatus status =
      check_number (o->mmol, LEAST_MMOL, MOST_MMOL, "amount of substrate, mmol:",
                    "give 0.001 to 100000 mmol of substrate, or its mass in grams", err);

  if (status == ENL_OK)
    status = check_number (o->equivalents, LEAST_MMOL, MOST_EQUIV,
                           "equivalents of base:", "give 0.001 to 100 equivalents", err);
  if (status == ENL_OK)
    status = check_number (o->water, 0.0, MOST_WATER,
                           "equivalents of water:", "give 0 to 100 equivalents of water", err);
  if (status == ENL_OK && !isnan (o->titre))
    status = check_number (o->titre, LEAST_TITRE, MOST_TITRE,
                           "titre, mol/L:", "give a titre of 0.001 to 20 mol/L", err);
  if (status == ENL_OK && !isnan (o->mass_percent))
    status = check_number (o->mass_percent, LEAST_SHARE, 100.0,
                           "mass per cent of base:", "give 0.1 to 100 % of base by mass", err);
  return status;
}

/* ---- parts ---- */

static EnlWeighPart
part_of_base (const EnlBase *base)
{
  return (EnlWeighPart){.name = base->name,
                        .form = base->form,
                        .note = "",
                        .base = base,
                        .molar_mass = base->molar_mass,
                        .molarity = base->molarity,
                        .mass_percent = base->mass_percent,
                        .density = base->density};
}

static EnlWeighPart
part_of_row (const Row *row)
{
  EnlWeighPart part = row->like ? part_of_base (row->like)
                                : (EnlWeighPart){.name = row->part,
                                                 .form = row->form,
                                                 .molar_mass = row->molar_mass,
                                                 .molarity = row->molarity,
                                                 .mass_percent = row->mass_percent,
                                                 .density = row->density};

  part.note = row->note;
  return part;
}

/* How the base is sold, or made, allows for a titre. Nothing is known of an own base. */
static bool
may_be_solution (const char *form)
{
  static const char *const word[] = {"solution", "mol/L", "made", "mixed"};

  for (size_t i = 0; i < ENL_COUNT (word); i++)
    if (strstr (form, word[i]))
      return true;
  return form[0] == '\0';
}

/* A titre needs a solution; a mass per cent a dispersion, a solid or a solution that is sold so. */
static EnlStatus
check_label (const EnlWeighPart *part, const EnlWeighOrder *order, EnlError *err)
{
  if (!isnan (order->titre) && !may_be_solution (part->form))
    return enl_error_set (err, ENL_ERROR_UNKNOWN, "leave the titre out, or give its mass per cent",
                          "a titre of %g mol/L does not fit %.80s (%.50s): it is no solution",
                          order->titre, part->name, part->form);
  if (!isnan (order->mass_percent) && isnan (part->mass_percent) &&
      g_str_has_prefix (part->form, "solution"))
    return enl_error_set (err, ENL_ERROR_UNKNOWN,
                          "give the titre of the solution instead of a mass per cent",
                          "a dispersion of %g %% does not fit %.60s (%.70s)", order->mass_percent,
                          part->name, part->form);
  return ENL_OK;
}

/* What is read from the label goes before what is usual. A density holds for the usual strength. */
static void
take_label (EnlWeighPart *part, const EnlWeighOrder *order)
{
  if (!isnan (order->titre)) {
    part->molarity = order->titre;
    part->mass_percent = part->density = NAN;
  } else if (!isnan (order->mass_percent)) {
    part->mass_percent = order->mass_percent;
    part->molarity = part->density = NAN;
  }
}

static void
measure (EnlWeighPart *part)
{
  part->mg = part->ml = NAN;
  if (isnan (part->mmol))
    return;
  if (!isnan (part->molarity)) {
    part->ml = part->mmol / part->molarity;
    part->mg = part->ml * part->density * MG_PER_G; /* NAN without a density */
    part->mass_percent = NAN;
    return;
  }
  double share = isnan (part->mass_percent) ? 1.0 : part->mass_percent / 100.0;
  part->mg = part->mmol * part->molar_mass / share;
  part->ml = part->mg / MG_PER_G / part->density;
}

/* The table tells of other things to take than the base itself. */
static bool
has_parts (const Row *row)
{
  return row && (row->part[0] || (row->like && strcmp (row->like->id, row->base) != 0));
}

/* A titre or content from a label: that of the base at hand, ready made, or that of the first of
 * its parts, such as the butyllithium of a mixture? */
static bool
label_is_of_base (const Row *row, const EnlBase *base, const EnlWeighOrder *order)
{
  if (base->soft || (isnan (order->titre) && isnan (order->mass_percent)))
    return false;
  return row->part[0] || (!isnan (order->titre) && isnan (row->like->molarity));
}

static EnlStatus
add_base_itself (EnlWeighing *w, const Row *row, const EnlWeighOrder *order, EnlError *err)
{
  bool nothing_sold = row && isnan (row->moles);
  EnlWeighPart *part = w->part = g_new0 (EnlWeighPart, 1);

  w->n_parts = 1;
  *part = part_of_base (w->base);
  part->mmol = w->mmol;
  EnlStatus status = check_label (part, order, err);
  if (status != ENL_OK)
    return status;
  take_label (part, order);
  measure (part);
  if (row && !has_parts (row))
    part->note = row->note;
  if (nothing_sold && isnan (order->titre) && isnan (order->mass_percent))
    part->mg = part->ml = NAN;
  return ENL_OK;
}

static EnlStatus
add_parts (EnlWeighing *w, const Row *row, uint32_t n, const EnlWeighOrder *order, EnlError *err)
{
  if (!has_parts (row) || label_is_of_base (row, w->base, order))
    return add_base_itself (w, row, order, err);
  w->n_parts = n;
  w->part = g_new0 (EnlWeighPart, n);
  for (uint32_t i = 0; i < n; i++) {
    w->part[i] = part_of_row (&row[i]);
    w->part[i].mmol = w->mmol * row[i].moles;
    if (i == 0) {
      EnlStatus status = check_label (&w->part[i], order, err);
      if (status != ENL_OK)
        return status;
      take_label (&w->part[i], order);
    }
    measure (&w->part[i]);
  }
  return ENL_OK;
}

static char *
remark_of (const EnlWeighing *w, const EnlWeighOrder *order)
{
  GString *out = g_string_new (NULL);

  if (w->per_mole != 1.0)
    g_string_append_printf (out, "one mole gives %.3g equivalents", w->per_mole);
  if (order->water > 0.0 && w->water_taken > 0.0)
    g_string_append_printf (out, "%swater takes %.3g equivalents more", out->len ? "; " : "",
                            w->water_taken);
  else if (order->water > 0.0)
    g_string_append_printf (out, "%swater takes none of this base: nothing is added for it",
                            out->len ? "; " : "");
  return g_string_free (out, FALSE);
}

EnlStatus
enl_weigh (const EnlWeighTable *table, const EnlBase *base, const EnlWeighOrder *order,
           EnlWeighing **out, EnlError *err)
{
  g_autoptr (EnlWeighing) w = NULL;
  uint32_t n;
  const Row *row = rows_of (table, base, &n);

  *out = NULL;
  EnlStatus status = enl_weigh_order_check (order, err);
  if (status != ENL_OK)
    return status;
  w = g_new0 (EnlWeighing, 1);
  w->base = base;
  w->equivalents = order->equivalents;
  w->water_taken = water_takes (table, base) ? order->water : 0.0;
  w->per_mole = row && !isnan (row->equivalents) ? row->equivalents : 1.0;
  w->mmol = order->mmol * (order->equivalents + w->water_taken) / w->per_mole;
  w->remark = remark_of (w, order);
  status = add_parts (w, row, n, order, err);
  if (status != ENL_OK)
    return status;
  bool told = w->n_parts > 1 || w->part[0].note[0];
  if (isnan (w->part[0].mg) && isnan (w->part[0].ml) && !told)
    return enl_error_set (err, ENL_ERROR_UNKNOWN,
                          "give the titre of its solution, or its molar mass in the set",
                          "'%.80s' has no molar mass here", base->name);
  *out = g_steal_pointer (&w);
  return ENL_OK;
}

void
enl_weighing_free (EnlWeighing *w)
{
  if (!w)
    return;
  g_free (w->remark);
  g_free (w->part);
  g_free (w);
}

/* ---- words ---- */

bool
enl_weigh_part_is_liquid (const EnlWeighPart *part)
{
  return !isnan (part->ml);
}

char *
enl_weigh_digits (double value)
{
  char rounded[G_ASCII_DTOSTR_BUF_SIZE], format[16], text[64];

  if (!isfinite (value))
    return g_strdup ("");
  /* "%.2e" rounds to three digits and tells the exponent after rounding: 0.9996 is 1.00 */
  g_ascii_formatd (rounded, sizeof rounded, "%.2e", value);
  int exponent = (int)g_ascii_strtoll (strchr (rounded, 'e') + 1, NULL, 10);
  g_snprintf (format, sizeof format, "%%.%df", MAX (0, 2 - exponent));
  g_ascii_formatd (text, sizeof text, format, g_ascii_strtod (rounded, NULL));
  return g_strdup (text);
}

static char *
with_unit (double value, const char *unit)
{
  g_autofree char *digits = enl_weigh_digits (value);

  return g_strdup_printf ("%s\u00A0%s", digits, unit);
}

/* Rounded to three digits first: 999.6 mg is 1.00 g. */
#define NEXT_UNIT 999.5

/* Rounded once, in the small unit: a table in mg and a sentence in g then tell the same digits
 * also where the division would move a half (9345 mg). */
static double
rounded (double value)
{
  g_autofree char *digits = enl_weigh_digits (value);

  return g_ascii_strtod (digits, NULL);
}

char *
enl_weigh_mass_text (double mg)
{
  mg = rounded (mg);
  if (mg >= NEXT_UNIT * MG_PER_G)
    return with_unit (mg / MG_PER_G / MG_PER_G, "kg");
  return mg >= NEXT_UNIT ? with_unit (mg / MG_PER_G, "g") : with_unit (mg, "mg");
}

char *
enl_weigh_volume_text (double ml)
{
  ml = rounded (ml);
  if (ml >= NEXT_UNIT)
    return with_unit (ml / 1000.0, "L");
  return ml >= 0.1 ? with_unit (ml, "mL") : with_unit (1000.0 * ml, "µL");
}

char *
enl_weigh_amount_text (const EnlWeighPart *part)
{
  g_autofree char *mass = isnan (part->mg) ? NULL : enl_weigh_mass_text (part->mg);
  g_autofree char *volume = isnan (part->ml) ? NULL : enl_weigh_volume_text (part->ml);

  if (mass && volume)
    return g_strdup_printf ("%s (%s)", volume, mass);
  if (mass || volume)
    return g_strdup (mass ? mass : volume);
  return g_strdup ("amount not known here");
}

static void
append_number (GString *out, double value, const char *unit)
{
  char text[G_ASCII_DTOSTR_BUF_SIZE];

  if (isnan (value))
    return;
  g_ascii_formatd (text, sizeof text, "%.4g", value);
  g_string_append_printf (out, "%s%s\u00A0%s", out->len ? ", " : "", text, unit);
}

char *
enl_weigh_form_text (const EnlWeighPart *part)
{
  GString *out = g_string_new (part->form);

  append_number (out, part->molarity, "mol/L");
  append_number (out, part->mass_percent, "% by mass");
  append_number (out, part->density, "g/mL");
  return g_string_free (out, FALSE);
}
