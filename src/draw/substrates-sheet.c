#include "draw/substrates-sheet.h"

#include <math.h>

#include "draw/badge.h"
#include "draw/paint.h"
#include "draw/plane.h"
#include "draw/text.h"
#include "draw/whisker.h"

#define USUAL_COLUMNS 4
#define USUAL_SITES   8
#define NARROWEST     7.4  /* width of a card, bond lengths */
#define WHISKER_SHARE 0.46 /* of the width beside the mark */
#define ROW_GAP       0.75 /* between sites, small text sizes */

typedef struct {
  const EnlSubstratesSheet *sheet;
  const EnlTheme *theme;
  EnlScene *scene;
  double low, high; /* common axis */
  bool has_axis, has_outside;
  double pad; /* inside a card */
} Sheet;

/* ---- lists ---- */

static void
draw_value (const Sheet *s, EnlScene *scene, EnlPoint at, const EnlEstimate *e, bool selected)
{
  const EnlTheme *theme = s->theme;
  g_autofree char *value = enl_pka_text (e->value);
  g_autofree char *error = enl_pka_error_text (e);
  g_autofree char *rest =
      g_strdup_printf ("%s%s%s", error ? error : "", error ? "  " : "", enl_basis_text (e->basis));
  double width, height;

  enl_text_measure (theme->family, value, theme->text_size, true, &width, &height);
  enl_scene_text (scene, at, value, theme->text_size, true, 0, 0.5,
                  selected ? ENL_TONE_ACTIVE : ENL_TONE_SITE);
  at.x += width + 0.5 * theme->small_size;
  enl_scene_text (scene, at, rest, theme->small_size, false, 0, 0.5, ENL_TONE_MUTED);
}

static char *
site_words (const EnlSite *site)
{
  return g_strdup_printf ("%s, %u\u00A0H", site->position ? site->position : "", site->hydrogens);
}

/* One site from y on; returns the y below it. */
static double
draw_row (const Sheet *s, EnlScene *scene, const EnlSubstrateCard *card, uint32_t rank, double y,
          double width)
{
  const EnlTheme *theme = s->theme;
  uint32_t index = card->rank[rank];
  const EnlEstimate *e = card->estimate ? &card->estimate[index] : NULL;
  EnlBadge badge = {.number = rank + 1,
                    .estimate = e,
                    .selected = index == card->selected,
                    .site = index,
                    .atom = ENL_NONE};
  double indent = 2 * 1.25 * theme->badge_radius + 0.6 * theme->badge_radius;
  double inner = width - indent, line = enl_text_line_height (theme->family, theme->text_size);
  g_autofree char *words = site_words (&card->sites->site[index]);

  enl_badge_draw_mark (scene, &badge,
                       (EnlPoint){1.25 * theme->badge_radius, y + theme->badge_radius});
  y = fmax (enl_scene_paragraph (scene, (EnlPoint){indent, y}, inner, words, theme->small_size,
                                 false, ENL_TONE_INK),
            y + line);
  if (e) {
    double bar = WHISKER_SHARE * inner;
    enl_whisker_draw (scene, (EnlRect){indent, y, bar, line}, e, s->low, s->high, badge.selected);
    draw_value (s, scene, (EnlPoint){indent + bar + 0.6 * theme->badge_radius, y + line / 2}, e,
                badge.selected);
    y += line;
  }
  return y + ROW_GAP * theme->small_size;
}

static double
draw_axis (const Sheet *s, EnlScene *scene, double y, double width)
{
  double indent = (2 * 1.25 + 0.6) * s->theme->badge_radius;
  double bar = WHISKER_SHARE * (width - indent);
  EnlRect area = {indent, y, bar, enl_text_line_height (s->theme->family, s->theme->small_size)};

  enl_whisker_axis_draw (scene, area, s->low, s->high);
  return y + 0.4 * s->theme->badge_radius + area.height;
}

static EnlScene *
make_list (const Sheet *s, const EnlSubstrateCard *card, double width)
{
  EnlScene *scene = enl_scene_new (s->theme);
  uint32_t limit = s->sheet->max_sites ? s->sheet->max_sites : USUAL_SITES;
  double y = 0;

  if (!card->sites)
    return scene;
  if (card->sites->no_enol) {
    g_autofree char *why = g_strconcat ("No enolate: ", card->sites->no_enol, NULL);
    y = enl_scene_paragraph (scene, (EnlPoint){0, y}, width, why, s->theme->small_size, false,
                             ENL_TONE_WARNING);
    y += ROW_GAP * s->theme->small_size;
  }
  if (!card->rank || card->sites->n_sites == 0)
    return scene;
  uint32_t n = MIN (card->sites->n_sites, limit);
  for (uint32_t i = 0; i < n; i++)
    y = draw_row (s, scene, card, i, y, width);
  if (card->estimate)
    y = draw_axis (s, scene, y, width);
  if (n < card->sites->n_sites) {
    g_autofree char *more = g_strdup_printf ("and %u weaker site%s", card->sites->n_sites - n,
                                             card->sites->n_sites - n > 1 ? "s" : "");
    enl_scene_paragraph (scene, (EnlPoint){0, y + 0.3 * s->theme->small_size}, width, more,
                         s->theme->small_size, false, ENL_TONE_MUTED);
  }
  return scene;
}

/* ---- cards ---- */

typedef struct {
  EnlScene *title, *structure, *list;
  double width; /* inside the padding */
} Parts;

static double
scene_height (const EnlScene *scene)
{
  EnlRect box = enl_scene_bounds (scene);

  return box.height > 0 ? box.y + box.height : 0;
}

static Parts
make_parts (const Sheet *s, const EnlSubstrateCard *card)
{
  const EnlStructureLook look = {.sites = card->sites,
                                 .estimate = card->estimate,
                                 .rank = card->rank,
                                 .selected = card->selected,
                                 .forms = card->forms};
  Parts parts = {.structure = enl_structure_scene (card->mol, &look, s->theme)};

  parts.width = fmax (NARROWEST * s->theme->bond_length, enl_scene_bounds (parts.structure).width);
  parts.title = enl_scene_new (s->theme);
  if (card->title && *card->title)
    enl_scene_paragraph (parts.title, (EnlPoint){0, 0}, parts.width, card->title,
                         s->theme->title_size, true, ENL_TONE_INK);
  parts.list = make_list (s, card, parts.width);
  return parts;
}

static void
clear_parts (Parts *parts, uint32_t n)
{
  for (uint32_t i = 0; i < n; i++) {
    enl_scene_free (parts[i].title);
    enl_scene_free (parts[i].structure);
    enl_scene_free (parts[i].list);
  }
}

/* Like enl_scene_append, and the shapes learn whose they are. */
static void
append_owned (EnlScene *scene, EnlScene *part, double dx, double dy, uint32_t substrate)
{
  enl_scene_set_substrate (part, substrate);
  enl_scene_append (scene, part, 1, dx, dy);
}

/* One row of cards from y on; returns the y below. `right` grows to the widest row. */
static double
draw_cards (const Sheet *s, uint32_t first, uint32_t n, double y, double *right)
{
  g_autofree Parts *parts = g_new0 (Parts, n);
  double title = 0, structure = 0, list = 0, x = s->theme->margin, gap = s->theme->margin;

  for (uint32_t i = 0; i < n; i++) {
    parts[i] = make_parts (s, &s->sheet->card[first + i]);
    title = fmax (title, scene_height (parts[i].title));
    structure = fmax (structure, enl_scene_bounds (parts[i].structure).height);
    list = fmax (list, scene_height (parts[i].list));
  }
  double space = s->theme->title_size;
  double height = title + space + structure + (list > 0 ? space + list : 0) + 2 * s->pad;
  for (uint32_t i = 0; i < n; i++) {
    EnlRect b = enl_scene_bounds (parts[i].structure);
    double in = x + s->pad, top = y + s->pad, width = parts[i].width + 2 * s->pad;
    EnlShape *card = enl_scene_rect (s->scene, (EnlRect){x, y, width, height},
                                     s->theme->card_radius, ENL_TONE_PANEL);
    card->substrate = first + i;
    append_owned (s->scene, parts[i].title, in, top, first + i);
    append_owned (s->scene, parts[i].structure, in + (parts[i].width - b.width) / 2 - b.x,
                  top + title + space + (structure - b.height) / 2 - b.y, first + i);
    append_owned (s->scene, parts[i].list, in, top + title + 2 * space + structure, first + i);
    x += width + gap;
  }
  *right = fmax (*right, x - gap);
  clear_parts (parts, n);
  return y + height;
}

/* ---- sheet ---- */

static void
find_axis (Sheet *s)
{
  s->low = 1;
  s->high = 0;
  for (uint32_t i = 0; i < s->sheet->n_cards; i++) {
    const EnlSubstrateCard *card = &s->sheet->card[i];
    if (card->sites && card->estimate && card->rank)
      enl_whisker_range (card->estimate, card->sites->n_sites, &s->low, &s->high);
    for (uint32_t k = 0; card->sites && card->estimate && k < card->sites->n_sites; k++)
      s->has_outside |= card->estimate[k].outside;
  }
  s->has_axis = s->high > s->low;
}

/* The row "o measured  o estimated ..." so that nobody has to guess the shapes. */
static double
draw_legend (const Sheet *s, double x, double y)
{
  static const EnlBasis basis[] = {ENL_BASIS_MEASURED, ENL_BASIS_ESTIMATED, ENL_BASIS_LAB};
  static const char *const word[] = {"measured", "estimated", "lab value"};
  double line = enl_text_line_height (s->theme->family, s->theme->small_size);
  EnlPoint at = {x, y + line / 2};

  for (uint32_t i = 0; i < ENL_COUNT (basis); i++) {
    double r = s->theme->badge_radius, width, height;
    enl_whisker_mark_draw (s->scene, (EnlPoint){at.x + r, at.y}, basis[i], ENL_TONE_SITE);
    at.x += 2 * r;
    enl_text_measure (s->theme->family, word[i], s->theme->small_size, false, &width, &height);
    enl_scene_text (s->scene, at, word[i], s->theme->small_size, false, 0, 0.5, ENL_TONE_MUTED);
    at.x += width + r;
  }
  return y + line;
}

static double
draw_foot (const Sheet *s, double y, double right)
{
  double x = s->theme->margin, width = right - x;

  y += 0.8 * s->theme->small_size;
  if (s->has_axis) {
    double size = s->theme->small_size;
    g_autofree char *words =
        g_strdup_printf ("pKa in %s at 25\u00A0°C; bars show the 90\u00A0%% interval.",
                         enl_solvent_heading (s->sheet->solvent));
    enl_scene_text (s->scene, (EnlPoint){x, y}, words, size, false, 0, 0, ENL_TONE_MUTED);
    y += enl_text_line_height (s->theme->family, size);
    y = draw_legend (s, x, y + 0.3 * s->theme->small_size) + 0.3 * s->theme->small_size;
  }
  if (s->has_outside)
    y = enl_scene_paragraph (s->scene, (EnlPoint){x, y}, width,
                             "Broken rim: outside the experience of the model.",
                             s->theme->small_size, false, ENL_TONE_MUTED);
  if (s->sheet->caption && *s->sheet->caption)
    y = enl_scene_paragraph (s->scene, (EnlPoint){x, y}, width, s->sheet->caption,
                             s->theme->small_size, false, ENL_TONE_MUTED);
  return y;
}

EnlScene *
enl_substrates_sheet (const EnlSubstratesSheet *sheet, const EnlTheme *theme)
{
  Sheet s = {.sheet = sheet, .theme = theme, .pad = theme->margin};
  uint32_t columns = sheet->columns ? sheet->columns : USUAL_COLUMNS;
  double y = theme->margin, right = 2 * theme->margin;

  s.scene = enl_scene_new (theme);
  find_axis (&s);
  for (uint32_t i = 0; i < sheet->n_cards; i += columns)
    y = draw_cards (&s, i, MIN (columns, sheet->n_cards - i), y, &right) + theme->margin;
  y = draw_foot (&s, y - theme->margin, right);
  EnlRect all = enl_scene_bounds (s.scene);
  right = fmax (right, all.x + all.width);
  enl_scene_set_size (s.scene, right + theme->margin, y + theme->margin);
  return s.scene;
}
