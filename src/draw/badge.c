#include "draw/badge.h"

#include <math.h>

#include "draw/paint.h"

/* In badge radii. */
#define NUMBER_SIZE  1.16
#define WIDE_MARK    1.25 /* for two digits and more */
#define VALUE_GAP    0.38
#define ERROR_GAP    0.30
#define SQUARE_HALF  0.92
#define SQUARE_ROUND 0.28
#define OUTLINE      0.16

static EnlTone
badge_tone (const EnlBadge *badge)
{
  return badge->selected ? ENL_TONE_ACTIVE : ENL_TONE_SITE;
}

static EnlShape *
own (EnlShape *shape, const EnlBadge *badge)
{
  shape->site = badge->site;
  shape->atom = badge->atom;
  return shape;
}

static bool
solid (const EnlBadge *badge)
{
  return badge->estimate && badge->estimate->basis != ENL_BASIS_ESTIMATED;
}

double
enl_badge_radius (const EnlBadge *badge, const EnlTheme *theme)
{
  return theme->badge_radius * (badge->number > 9 ? WIDE_MARK : 1);
}

static void
draw_outlined (EnlScene *scene, const EnlBadge *badge, EnlPoint centre, double radius)
{
  double line = OUTLINE * enl_scene_theme (scene)->badge_radius;

  own (enl_scene_disc (scene, centre, radius - line / 2, ENL_TONE_GROUND), badge);
  EnlShape *ring =
      own (enl_scene_disc (scene, centre, radius - line / 2, badge_tone (badge)), badge);
  ring->width = line;
  if (badge->estimate && badge->estimate->outside)
    ring->dash = ENL_DASH_DASHED;
}

void
enl_badge_draw_mark (EnlScene *scene, const EnlBadge *badge, EnlPoint centre)
{
  const EnlTheme *theme = enl_scene_theme (scene);
  double radius = enl_badge_radius (badge, theme), half = SQUARE_HALF * radius;
  EnlRect square = {centre.x - half, centre.y - half, 2 * half, 2 * half};
  g_autofree char *number = g_strdup_printf ("%u", badge->number);
  EnlTone text = badge_tone (badge);

  if (!solid (badge))
    draw_outlined (scene, badge, centre, radius);
  else if (badge->estimate->basis == ENL_BASIS_LAB)
    own (enl_scene_rect (scene, square, SQUARE_ROUND * radius, badge_tone (badge)), badge);
  else
    own (enl_scene_disc (scene, centre, radius, badge_tone (badge)), badge);
  if (solid (badge))
    text = badge->selected ? ENL_TONE_ACTIVE_TEXT : ENL_TONE_SITE_TEXT;
  own (enl_scene_text (scene, centre, number, NUMBER_SIZE * theme->badge_radius, true, 0.5, 0.5,
                       text),
       badge);
}

char *
enl_pka_text (double value)
{
  char digits[G_ASCII_DTOSTR_BUF_SIZE];
  double rounded = round (value * 10) / 10;

  g_ascii_formatd (digits, sizeof digits, "%.1f", fabs (rounded));
  return g_strconcat (rounded < 0 ? "\u2212" : "", digits, NULL);
}

char *
enl_pka_error_text (const EnlEstimate *estimate)
{
  if (estimate->basis == ENL_BASIS_MEASURED)
    return NULL;
  double half = fmax (estimate->high - estimate->value, estimate->value - estimate->low);
  if (half < 0.05)
    return NULL;
  g_autofree char *digits = enl_pka_text (half);
  return g_strconcat ("\u00B1", digits, NULL);
}

typedef struct {
  char *value, *error;
  double value_width, error_width, height;
} Words;

static Words
make_words (const EnlBadge *badge, const EnlTheme *theme)
{
  Words words = {0};
  double ignored;

  if (!badge->estimate)
    return words;
  words.value = enl_pka_text (badge->estimate->value);
  words.error = enl_pka_error_text (badge->estimate);
  enl_text_measure (theme->family, words.value, theme->text_size, true, &words.value_width,
                    &words.height);
  if (words.error)
    enl_text_measure (theme->family, words.error, theme->small_size, false, &words.error_width,
                      &ignored);
  return words;
}

static void
clear_words (Words *words)
{
  g_free (words->value);
  g_free (words->error);
}

void
enl_badge_size (const EnlBadge *badge, const EnlTheme *theme, double *width, double *height)
{
  Words words = make_words (badge, theme);
  double radius = enl_badge_radius (badge, theme);

  *width = 2 * radius;
  *height = 2 * radius;
  if (words.value)
    *width += VALUE_GAP * theme->badge_radius + words.value_width;
  if (words.error)
    *width += ERROR_GAP * theme->badge_radius + words.error_width;
  clear_words (&words);
}

EnlPoint
enl_badge_hook (const EnlBadge *badge, const EnlTheme *theme, bool mirrored)
{
  double radius = enl_badge_radius (badge, theme), width, height;

  enl_badge_size (badge, theme, &width, &height);
  return (EnlPoint){mirrored ? width - radius : radius, height / 2};
}

void
enl_badge_draw (EnlScene *scene, const EnlBadge *badge, EnlRect box, bool mirrored)
{
  const EnlTheme *theme = enl_scene_theme (scene);
  Words words = make_words (badge, theme);
  EnlPoint hook = enl_badge_hook (badge, theme, mirrored);
  EnlPoint at = {box.x, box.y + box.height / 2};

  enl_badge_draw_mark (scene, badge, (EnlPoint){box.x + hook.x, box.y + hook.y});
  if (!mirrored)
    at.x += 2 * enl_badge_radius (badge, theme) + VALUE_GAP * theme->badge_radius;
  if (words.value)
    own (
        enl_scene_text (scene, at, words.value, theme->text_size, true, 0, 0.5, badge_tone (badge)),
        badge);
  at.x += words.value_width + ERROR_GAP * theme->badge_radius;
  if (words.error)
    own (enl_scene_text (scene, at, words.error, theme->small_size, false, 0, 0.5, ENL_TONE_MUTED),
         badge);
  clear_words (&words);
}
