#include "draw/matrix-scene.h"

#include <math.h>
#include <string.h>

#include "draw/badge.h"
#include "draw/paint.h"
#include "draw/plane.h"
#include "draw/text.h"
#include "draw/verdict-mark.h"

/* Sizes in small text sizes. */
#define NAME_WIDTH       15.0
#define PKAH_WIDTH       4.6
#define LEAST_COLUMN     10.5
#define STRUCTURE_HEIGHT 6.5
#define MARK_RADIUS      0.46
#define LEAST_WIDTH      46.0 /* of the whole, for title and foot */
/* Letters of a structure may be this much smaller than the small text; below it is left out. */
#define LEAST_LETTERS 0.72
#define SOFT          0.13 /* opacity of the ground of a cell */
#define RULE          0.35

typedef struct {
  const EnlMatrixSheet *sheet;
  const EnlTheme *theme;
  EnlScene *scene;
  double size, line;                      /* small text: size and height of a line */
  double name, pkah, column, left, right; /* widths; edges of the table */
  bool seen[ENL_N_VERDICTS], cautions;
} Sheet;

static double
text_width (const Sheet *s, const char *markup, bool bold)
{
  double width, height;

  enl_text_measure (s->theme->family, markup, s->size, bold, &width, &height);
  return width;
}

static double
text_height (const Sheet *s, const char *markup)
{
  double width, height;

  enl_text_measure (s->theme->family, markup, s->size, false, &width, &height);
  return height;
}

/* ---- cells ---- */

static bool
is_warned (const EnlMatrixCell *cell)
{
  return cell->grade == ENL_GRADE_CAUTION && cell->verdict == ENL_VERDICT_COMPLETE;
}

static char *
cell_words (const EnlMatrixCell *cell)
{
  const char *word = enl_verdict_word (cell->verdict);

  if (cell->verdict != ENL_VERDICT_PARTIAL && cell->verdict != ENL_VERDICT_SHARED &&
      cell->verdict != ENL_VERDICT_LARGELY)
    return g_strdup (word);
  return g_strdup_printf ("%s %.0f\u00A0%%", word, 100 * cell->conversion);
}

static double
mark_room (const Sheet *s)
{
  return 2.6 * MARK_RADIUS * s->size;
}

static double
cell_width (const Sheet *s, const char *words)
{
  return 0.8 * s->size + 2 * mark_room (s) + text_width (s, words, false);
}

static void
draw_cell (Sheet *s, uint32_t base, uint32_t column, EnlRect box)
{
  const EnlMatrixCell *cell = enl_matrix_cell (s->sheet->matrix, base, column);
  double radius = MARK_RADIUS * s->size, middle = box.y + box.height / 2;
  EnlRect inner = enl_rect_grow (box, -1);
  EnlTone tone = cell->asked ? enl_verdict_tone (cell->verdict) : ENL_TONE_MUTED;
  EnlShape *ground = enl_scene_rect (s->scene, inner, 3, tone);

  ground->opacity = cell->asked && cell->grade != ENL_GRADE_UNJUDGED ? SOFT : 0.03;
  ground->substrate = column;
  ground->atom = base;
  if (!cell->asked)
    return;
  g_autofree char *words = cell_words (cell);
  double x = box.x + 0.4 * s->size + radius;
  enl_verdict_mark_draw (s->scene, (EnlPoint){x, middle}, radius, cell->verdict);
  enl_scene_text (s->scene, (EnlPoint){x + 1.6 * radius, middle}, words, s->size,
                  cell->verdict == ENL_VERDICT_COMPLETE, 0, 0.5,
                  cell->verdict >= ENL_VERDICT_NO ? ENL_TONE_MUTED : ENL_TONE_INK);
  if (is_warned (cell))
    enl_caution_mark_draw (s->scene, (EnlPoint){box.x + box.width - 0.4 * s->size - radius, middle},
                           radius);
  s->seen[cell->verdict] = true;
  s->cautions |= is_warned (cell);
}

/* ---- rows ---- */

static double
draw_row (Sheet *s, uint32_t base, double y)
{
  const EnlBase *b = enl_base_table_get (s->sheet->bases, base);
  double pkah = b->pkah[s->sheet->conditions->solvent];
  g_autofree char *name =
      enl_text_wrap_short (s->theme->family, b->name, s->size, false, s->name, 2);
  double height = fmax (text_height (s, name), s->line) + 0.5 * s->size;

  enl_scene_text (s->scene, (EnlPoint){s->left, y + height / 2}, name, s->size, false, 0, 0.5,
                  ENL_TONE_INK);
  if (!isnan (pkah)) {
    g_autofree char *number = enl_pka_text (pkah);
    enl_scene_text (s->scene,
                    (EnlPoint){s->left + s->name + s->pkah - 0.6 * s->size, y + height / 2}, number,
                    s->size, false, 1, 0.5, ENL_TONE_MUTED);
  }
  for (uint32_t k = 0; k < s->sheet->matrix->n_substrates; k++)
    draw_cell (s, base, k,
               (EnlRect){s->left + s->name + s->pkah + k * s->column, y, s->column, height});
  enl_scene_line (s->scene, (EnlPoint){s->left, y + height}, (EnlPoint){s->right, y + height}, 0.6,
                  ENL_TONE_MUTED)
      ->opacity = RULE;
  return y + height;
}

static double
draw_rows (Sheet *s, double y)
{
  const EnlMatrix *m = s->sheet->matrix;
  const char *family = "";

  for (uint32_t i = 0; i < m->n_rows; i++) {
    const EnlBase *b = enl_base_table_get (s->sheet->bases, m->row[i]);
    if (strcmp (family, b->family) != 0) {
      family = b->family;
      g_autofree char *text = g_markup_escape_text (family, -1);
      y += 0.6 * s->size;
      enl_scene_text (s->scene, (EnlPoint){s->left, y}, text, s->size, true, 0, 0, ENL_TONE_MUTED);
      y += s->line + 0.2 * s->size;
    }
    y = draw_row (s, m->row[i], y);
  }
  return y;
}

/* ---- head ---- */

/* Centred in the column above `bottom`; left out where its letters would be too small. */
static double
draw_structure (const Sheet *s, const EnlMolecule *mol, double middle, double bottom)
{
  const EnlStructureLook bare = {.selected = ENL_NONE};
  double room = s->column - s->size, height = STRUCTURE_HEIGHT * s->size;

  if (!mol || !enl_molecule_has_layout (mol))
    return 0;
  g_autoptr (EnlScene) part = enl_structure_scene (mol, &bare, s->theme);
  EnlRect box = enl_scene_bounds (part);
  double scale = fmin (0.75, fmin (room / box.width, height / box.height));
  if (scale * s->theme->atom_size < LEAST_LETTERS * s->size)
    return 0;
  if (s->scene)
    enl_scene_append (s->scene, part, scale, middle - scale * (box.x + box.width / 2),
                      bottom - scale * (box.y + box.height));
  return scale * box.height;
}

static char *
site_text (const EnlMatrixColumn *column)
{
  if (!column->site)
    return g_strdup ("no acidic hydrogen");
  g_autofree char *value = enl_pka_text (column->pka);
  return g_strdup_printf ("site %u, pKa %s: %s", column->rank, value, column->site->position);
}

typedef struct {
  char *name, *site; /* markup */
  double name_height, site_height, structure;
} Head;

static Head
measure_head (const Sheet *s, uint32_t k)
{
  const EnlMatrixColumn *column = &s->sheet->column[k];
  g_autofree char *words = site_text (column);
  double room = s->column - 0.6 * s->size;
  Sheet trial = *s;
  Head head = {enl_text_wrap_short (s->theme->family, column->name, s->size, true, room, 3),
               enl_text_wrap_short (s->theme->family, words, s->size, false, room, 4), 0, 0, 0};

  trial.scene = NULL;
  head.name_height = text_height (s, head.name);
  head.site_height = text_height (s, head.site);
  head.structure = draw_structure (&trial, column->mol, 0, 0);
  return head;
}

static void
draw_one_head (const Sheet *s, uint32_t k, const Head *head, double site_y, double name_y)
{
  double middle = s->left + s->name + s->pkah + (k + 0.5) * s->column;

  enl_scene_text (s->scene, (EnlPoint){middle, site_y}, head->site, s->size, false, 0.5, 0,
                  ENL_TONE_MUTED);
  enl_scene_text (s->scene, (EnlPoint){middle, name_y}, head->name, s->size, true, 0.5, 1,
                  ENL_TONE_INK);
  draw_structure (s, s->sheet->column[k].mol, middle, name_y - head->name_height - 0.4 * s->size);
}

/* Structures stand on the names, these on one line. */
static double
draw_heads (const Sheet *s, double y)
{
  uint32_t n = s->sheet->matrix->n_substrates;
  g_autofree Head *head = g_new0 (Head, n);
  double above = 0, below = 0;

  for (uint32_t k = 0; k < n; k++) {
    head[k] = measure_head (s, k);
    above = fmax (above, head[k].structure + head[k].name_height + 0.4 * s->size);
    below = fmax (below, head[k].site_height);
  }
  for (uint32_t k = 0; k < n; k++) {
    draw_one_head (s, k, &head[k], y + above + 0.3 * s->size, y + above);
    g_free (head[k].name);
    g_free (head[k].site);
  }
  y += above + 0.3 * s->size + below;
  enl_scene_text (s->scene, (EnlPoint){s->left, y}, "base", s->size, true, 0, 1, ENL_TONE_INK);
  enl_scene_text (s->scene, (EnlPoint){s->left + s->name + s->pkah - 0.6 * s->size, y}, "pKaH",
                  s->size, false, 1, 1, ENL_TONE_MUTED);
  y += 0.3 * s->size;
  enl_scene_line (s->scene, (EnlPoint){s->left, y}, (EnlPoint){s->right, y}, 1.2, ENL_TONE_INK);
  return y;
}

static double
draw_title (const Sheet *s, double width)
{
  const EnlConditions *c = s->sheet->conditions;
  g_autofree char *title =
      g_strdup_printf ("Bases in %s: what becomes of the anion", enl_solvent_label (c->solvent));
  GString *words = g_string_new (NULL);
  double m = s->theme->margin, y = m;

  g_string_printf (words, "%.4g equivalents, substrate %.3g\u00A0mol/L", c->equivalents,
                   c->concentration);
  if (c->water > 0)
    g_string_append_printf (words, ", water %.3g\u00A0equiv.", c->water);
  y = enl_scene_paragraph (s->scene, (EnlPoint){m, y}, width - 2 * m, title, s->theme->text_size,
                           true, ENL_TONE_INK);
  y = enl_scene_paragraph (s->scene, (EnlPoint){m, y + 2}, width - 2 * m, words->str, s->size,
                           false, ENL_TONE_MUTED);
  g_string_free (words, TRUE);
  return y;
}

/* ---- foot ---- */

static void
legend_entry (const Sheet *s, EnlPoint *at, double width, int verdict, const char *words)
{
  double radius = MARK_RADIUS * s->size, needed = 2.8 * radius + text_width (s, words, false);

  if (at->x > s->theme->margin && at->x + needed > width - s->theme->margin) {
    at->x = s->theme->margin;
    at->y += 1.3 * s->line;
  }
  EnlPoint centre = {at->x + radius, at->y + s->line / 2};
  if (verdict < ENL_N_VERDICTS)
    enl_verdict_mark_draw (s->scene, centre, radius, (EnlVerdict)verdict);
  else
    enl_caution_mark_draw (s->scene, centre, radius);
  enl_scene_text (s->scene, (EnlPoint){at->x + 2.8 * radius, centre.y}, words, s->size, false, 0,
                  0.5, ENL_TONE_MUTED);
  at->x += needed + 1.4 * s->size;
}

static double
draw_legend (const Sheet *s, double y, double width)
{
  static const char *const meaning[ENL_N_VERDICTS] = {
      [ENL_VERDICT_COMPLETE] = "complete: 99 % or more",
      [ENL_VERDICT_SHARED] = "shared: other sites have part of the anion",
      [ENL_VERDICT_LARGELY] = "largely: 90 % or more",
      [ENL_VERDICT_PARTIAL] = "partial: 1 % or more",
      [ENL_VERDICT_TRACE] = "trace: 0.1 % or more",
      [ENL_VERDICT_NO] = "no: less, or another site takes the base",
      [ENL_VERDICT_REACTS] = "reacts: does something else first",
      [ENL_VERDICT_SOLVENT] = "not here: base and solvent destroy each other",
      [ENL_VERDICT_NO_NUMBER] = "no number that describes what happens",
      [ENL_VERDICT_OFF_SCALE] = "off scale: no value on this footing",
  };
  EnlPoint at = {s->theme->margin, y + 0.8 * s->size};

  for (int v = 0; v < ENL_N_VERDICTS; v++)
    if (s->seen[v])
      legend_entry (s, &at, width, v, meaning[v]);
  if (s->cautions)
    legend_entry (s, &at, width, ENL_N_VERDICTS, "complete, with a caution");
  return at.x > s->theme->margin ? at.y + s->line : y;
}

static char *
unjudged_text (const EnlMatrixSheet *sheet)
{
  const EnlMatrix *m = sheet->matrix;
  GString *out = g_string_new ("No verdict on this footing: ");

  for (uint32_t i = 0; i < m->n_unjudged; i++)
    g_string_append_printf (out, "%s%s", i ? "; " : "",
                            enl_base_table_get (sheet->bases, m->unjudged[i])->name);
  g_string_append_c (out, '.');
  return g_string_free (out, FALSE);
}

static double
draw_foot (const Sheet *s, double y, double width)
{
  double m = s->theme->margin, room = width - 2 * m;

  y = draw_legend (s, y, width) + 0.6 * s->size;
  y = enl_scene_paragraph (s->scene, (EnlPoint){m, y}, room,
                           enl_footing_text (s->sheet->conditions->solvent), s->size, false,
                           ENL_TONE_MUTED);
  if (s->sheet->matrix->n_unjudged) {
    g_autofree char *text = unjudged_text (s->sheet);
    y = enl_scene_paragraph (s->scene, (EnlPoint){m, y + 0.3 * s->size}, room, text, s->size, false,
                             ENL_TONE_MUTED);
  }
  if (s->sheet->caption && *s->sheet->caption)
    y = enl_scene_paragraph (s->scene, (EnlPoint){m, y + 0.3 * s->size}, room, s->sheet->caption,
                             s->size, false, ENL_TONE_MUTED);
  return y;
}

/* ---- the sheet ---- */

static double
column_width (const Sheet *s)
{
  const EnlMatrix *m = s->sheet->matrix;
  double width = LEAST_COLUMN * s->size;

  for (size_t i = 0; i < (size_t)m->n_bases * m->n_substrates; i++) {
    if (!m->cell[i].asked)
      continue;
    g_autofree char *words = cell_words (&m->cell[i]);
    width = fmax (width, cell_width (s, words));
  }
  return width;
}

EnlScene *
enl_matrix_scene (const EnlMatrixSheet *sheet, const EnlTheme *theme)
{
  Sheet s = {.sheet = sheet, .theme = theme, .size = theme->small_size};

  s.scene = enl_scene_new (theme);
  s.line = enl_text_line_height (theme->family, s.size);
  s.name = NAME_WIDTH * s.size;
  s.pkah = PKAH_WIDTH * s.size;
  s.column = column_width (&s);
  s.left = theme->margin;
  s.right = s.left + s.name + s.pkah + sheet->matrix->n_substrates * s.column;
  double width = fmax (s.right + theme->margin, LEAST_WIDTH * s.size);
  double y = draw_title (&s, width);
  y = draw_heads (&s, y + s.size);
  y = draw_rows (&s, y);
  y = draw_foot (&s, y, width);
  enl_scene_set_size (s.scene, width, y + theme->margin);
  return s.scene;
}
