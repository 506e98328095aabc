#include "draw/forms-sheet.h"

#include <math.h>

#include "draw/curved-arrow.h"
#include "draw/paint.h"
#include "draw/plane.h"
#include "draw/text.h"

#define USUAL_FORMS   8
#define USUAL_COLUMNS 3
#define ARROW_ROOM    1.25 /* between cards, bond lengths */
#define ARROW_LENGTH  0.85
#define ARROW_HEAD    0.20
#define BRACKET_FOOT  0.22
#define HYBRID        "hybrid"
#define HYBRID_REMARK "charge by area"
#define NARROWEST     3.2 /* width of a card, bond lengths */

typedef struct {
  const EnlFormsSheet *sheet;
  const EnlTheme *theme;
  EnlScene *scene;
  uint32_t shown, columns, arrows_to;
  EnlScene **form; /* owned, `shown` many */
  EnlScene *hybrid;
  EnlRect room;                /* bounds of all structures in their common coordinates */
  double width, height, label; /* of a card; height of the words in it */
  double bond;
} Sheet;

static void
make_scenes (Sheet *s)
{
  const EnlForms *forms = s->sheet->forms;

  s->form = g_new0 (EnlScene *, s->shown);
  for (uint32_t i = 0; i < s->shown; i++) {
    g_autoptr (EnlMolecule) mol = enl_forms_molecule (forms, i);
    const EnlForm *target =
        i == 0 && s->arrows_to < forms->n_forms ? &forms->form[s->arrows_to] : &forms->form[0];
    s->form[i] = enl_form_scene (mol, s->sheet->layout, i == 0 ? target->arrow : NULL,
                                 i == 0 ? target->n_arrows : 0, s->theme);
    EnlRect box = enl_scene_bounds (s->form[i]);
    s->room = i ? enl_rect_union (s->room, box) : box;
  }
  s->hybrid = enl_hybrid_scene (forms, s->sheet->layout, s->theme);
  s->room = enl_rect_union (s->room, enl_scene_bounds (s->hybrid));
}

/* Card with a structure; all structures of a sheet stand at the same place of their cards. */
static void
draw_card (const Sheet *s, const EnlScene *structure, double x, double y, const char *strong,
           const char *weak)
{
  const EnlTheme *theme = s->theme;
  double base = y + s->height - theme->margin / 2 - s->label / 2, width, height;

  enl_scene_rect (s->scene, (EnlRect){x, y, s->width, s->height}, theme->card_radius,
                  ENL_TONE_PANEL);
  enl_scene_append (s->scene, structure, 1, x + (s->width - s->room.width) / 2 - s->room.x,
                    y + theme->margin - s->room.y);
  enl_text_measure (theme->family, strong, theme->text_size, true, &width, &height);
  enl_scene_text (s->scene, (EnlPoint){x + theme->margin, base}, strong, theme->text_size, true, 0,
                  0.5, ENL_TONE_INK);
  if (weak)
    enl_scene_text (s->scene, (EnlPoint){x + theme->margin + width + 0.6 * theme->small_size, base},
                    weak, theme->small_size, false, 0, 0.5, ENL_TONE_MUTED);
}

/* The double-headed arrow between contributors. */
static void
draw_resonance (const Sheet *s, EnlPoint middle)
{
  double half = ARROW_LENGTH * s->bond / 2, head = ARROW_HEAD * s->bond;
  EnlPoint left = enl_arrow_head_draw (s->scene, (EnlPoint){middle.x - half, middle.y},
                                       (EnlPoint){-1, 0}, head, ENL_TONE_INK);
  EnlPoint right = enl_arrow_head_draw (s->scene, (EnlPoint){middle.x + half, middle.y},
                                        (EnlPoint){1, 0}, head, ENL_TONE_INK);

  enl_scene_line (s->scene, left, right, s->theme->bond_width, ENL_TONE_INK);
}

static void
draw_bracket (const Sheet *s, double x, double y0, double y1, double way)
{
  double foot = way * BRACKET_FOOT * s->bond, w = s->theme->bond_width;

  enl_scene_line (s->scene, (EnlPoint){x + foot, y0}, (EnlPoint){x, y0}, w, ENL_TONE_MUTED);
  enl_scene_line (s->scene, (EnlPoint){x, y0}, (EnlPoint){x, y1}, w, ENL_TONE_MUTED);
  enl_scene_line (s->scene, (EnlPoint){x, y1}, (EnlPoint){x + foot, y1}, w, ENL_TONE_MUTED);
}

static char *
percent (double share)
{
  if (share > 0 && share < 0.005)
    return g_strdup ("under 1\u00A0%");
  return g_strdup_printf ("%.0f\u00A0%%", 100 * share);
}

static char *
copies_words (const EnlForm *form)
{
  return form->copies > 1 ? g_strdup_printf ("\u00D7\u00A0%u, together", form->copies) : NULL;
}

/* The grid of forms between brackets; returns where it ends. */
static EnlPoint
draw_grid (const Sheet *s, double x, double y)
{
  double gap = ARROW_ROOM * s->bond, row_gap = s->theme->margin, pad = 0.7 * s->theme->margin;
  uint32_t rows = (s->shown + s->columns - 1) / s->columns;
  double bottom = y + rows * s->height + (rows - 1) * row_gap;

  for (uint32_t i = 0; i < s->shown; i++) {
    double cx = x + (i % s->columns) * (s->width + gap);
    double cy = y + (i / s->columns) * (s->height + row_gap);
    g_autofree char *share = percent (s->sheet->forms->form[i].weight);
    g_autofree char *copies = copies_words (&s->sheet->forms->form[i]);
    draw_card (s, s->form[i], cx, cy, share, copies);
    if (i + 1 < s->shown)
      draw_resonance (s, (EnlPoint){cx + s->width + gap / 2, cy + s->height / 2});
  }
  double right = x + MIN (s->columns, s->shown) * (s->width + gap) - gap;
  if (s->shown > s->columns)
    right += gap; /* arrows that lead to the next row */
  draw_bracket (s, x - pad, y - pad, bottom + pad, 1);
  draw_bracket (s, right + pad, y - pad, bottom + pad, -1);
  return (EnlPoint){right + pad, bottom + pad};
}

static double
draw_remarks (const Sheet *s, double x, double y, double width)
{
  const EnlForms *forms = s->sheet->forms;
  const EnlTheme *theme = s->theme;
  double step = 0.3 * theme->small_size, left = 0;

  for (uint32_t i = s->shown; i < forms->n_forms; i++)
    left += forms->form[i].weight;
  if (s->shown < forms->n_forms) {
    g_autofree char *share = percent (left);
    g_autofree char *more =
        g_strdup_printf ("and %u more forms, together %s", forms->n_forms - s->shown, share);
    y = enl_scene_paragraph (s->scene, (EnlPoint){x, y + step}, width, more, theme->small_size,
                             false, ENL_TONE_MUTED);
  }
  if (forms->note)
    y = enl_scene_paragraph (s->scene, (EnlPoint){x, y + step}, width, forms->note,
                             theme->small_size, false, ENL_TONE_MUTED);
  if (s->sheet->caption && *s->sheet->caption)
    y = enl_scene_paragraph (s->scene, (EnlPoint){x, y + step}, width, s->sheet->caption,
                             theme->small_size, false, ENL_TONE_MUTED);
  return y;
}

static double
words_width (const EnlTheme *theme, const char *strong, const char *weak)
{
  double a, b = 0, height;

  enl_text_measure (theme->family, strong, theme->text_size, true, &a, &height);
  if (weak)
    enl_text_measure (theme->family, weak, theme->small_size, false, &b, &height);
  return a + theme->small_size + b;
}

static void
plan_cards (Sheet *s)
{
  const EnlTheme *theme = s->theme;
  double words = 0;

  for (uint32_t i = 0; i < s->shown; i++) {
    g_autofree char *copies = copies_words (&s->sheet->forms->form[i]);
    words = fmax (words, words_width (theme, "under 1\u00A0%", copies));
  }
  words = fmax (words, words_width (theme, HYBRID, HYBRID_REMARK));
  s->label = enl_text_line_height (theme->family, theme->text_size);
  s->width = fmax (fmax (NARROWEST * s->bond, s->room.width), words) + 2 * theme->margin;
  s->height = s->room.height + s->label + 2.5 * theme->margin;
}

/* Four stand better two by two, with the hybrid beside them. */
static uint32_t
usual_columns (uint32_t n)
{
  return n == USUAL_COLUMNS + 1 ? USUAL_COLUMNS - 1 : MIN (n, USUAL_COLUMNS);
}

EnlScene *
enl_forms_sheet (const EnlFormsSheet *sheet, const EnlTheme *theme)
{
  Sheet s = {.sheet = sheet, .theme = theme, .bond = theme->bond_length};
  double x = 1.5 * theme->margin, y = theme->margin;

  s.scene = enl_scene_new (theme);
  s.shown = MIN (sheet->forms->n_forms, sheet->max_forms ? sheet->max_forms : USUAL_FORMS);
  s.columns = sheet->columns ? sheet->columns : usual_columns (s.shown);
  s.arrows_to = sheet->arrows_to ? sheet->arrows_to : 1;
  make_scenes (&s);
  plan_cards (&s);
  double width = s.columns * (s.width + ARROW_ROOM * s.bond);
  if (sheet->title && *sheet->title)
    y = enl_scene_paragraph (s.scene, (EnlPoint){x, y}, width, sheet->title, theme->title_size,
                             true, ENL_TONE_INK) +
        theme->margin;
  y += 0.7 * theme->margin;
  EnlPoint end = draw_grid (&s, x, y);
  bool beside = s.columns < USUAL_COLUMNS;
  EnlPoint hybrid =
      beside ? (EnlPoint){end.x + 1.5 * theme->margin, y} : (EnlPoint){x, end.y + theme->margin};
  draw_card (&s, s.hybrid, hybrid.x, hybrid.y, HYBRID, HYBRID_REMARK);
  y = draw_remarks (&s, x, fmax (end.y, hybrid.y + s.height) + 0.3 * theme->margin, width);
  EnlRect all = enl_scene_bounds (s.scene);
  enl_scene_set_size (s.scene, all.x + all.width + theme->margin, y + theme->margin);
  for (uint32_t i = 0; i < s.shown; i++)
    enl_scene_free (s.form[i]);
  g_free (s.form);
  enl_scene_free (s.hybrid);
  return s.scene;
}
