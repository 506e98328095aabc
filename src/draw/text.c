#include "draw/text.h"

#include <pango/pangocairo.h>
#include <string.h>

#include "draw/paint.h"

static void
context_free (gpointer context)
{
  g_object_unref (context);
}

/* Pango's default font map is one per thread, and so is this context. */
static GPrivate thread_context = G_PRIVATE_INIT (context_free);

static PangoContext *
fixed_context (void)
{
  PangoContext *context = (PangoContext *)g_private_get (&thread_context);

  if (!context) {
    cairo_font_options_t *options = cairo_font_options_create ();

    context = pango_font_map_create_context (pango_cairo_font_map_get_default ());
    pango_cairo_context_set_resolution (context, 96);
    cairo_font_options_set_hint_style (options, CAIRO_HINT_STYLE_NONE);
    cairo_font_options_set_hint_metrics (options, CAIRO_HINT_METRICS_OFF);
    cairo_font_options_set_antialias (options, CAIRO_ANTIALIAS_GRAY);
    pango_cairo_context_set_font_options (context, options);
    cairo_font_options_destroy (options);
    pango_context_set_round_glyph_positions (context, FALSE);
    pango_context_set_language (context, pango_language_from_string ("en"));
    g_private_set (&thread_context, context);
  }
  return context;
}

PangoLayout *
enl_text_layout (const char *family, const char *markup, double size, bool bold)
{
  PangoLayout *layout = pango_layout_new (fixed_context ());
  PangoFontDescription *font = pango_font_description_new ();

  pango_font_description_set_family (font, family);
  pango_font_description_set_weight (font, bold ? PANGO_WEIGHT_BOLD : PANGO_WEIGHT_NORMAL);
  pango_font_description_set_absolute_size (font, size * PANGO_SCALE);
  pango_layout_set_font_description (layout, font);
  pango_font_description_free (font);
  if (pango_parse_markup (markup, -1, 0, NULL, NULL, NULL, NULL))
    pango_layout_set_markup (layout, markup, -1);
  else
    pango_layout_set_text (layout, markup, -1);
  return layout;
}

/* Ascent and descent of the layout's own font, px. */
static void
plain_metrics (PangoLayout *layout, double *ascent, double *descent)
{
  PangoFontMetrics *metrics = pango_context_get_metrics (
      pango_layout_get_context (layout), pango_layout_get_font_description (layout), NULL);

  *ascent = (double)pango_font_metrics_get_ascent (metrics) / PANGO_SCALE;
  *descent = (double)pango_font_metrics_get_descent (metrics) / PANGO_SCALE;
  pango_font_metrics_unref (metrics);
}

double
enl_text_lift (PangoLayout *layout)
{
  double ascent, descent;

  plain_metrics (layout, &ascent, &descent);
  return (double)pango_layout_get_baseline (layout) / PANGO_SCALE - ascent;
}

void
enl_text_extents (PangoLayout *layout, double *width, double *height)
{
  PangoRectangle logical;
  PangoLayoutIter *iter = pango_layout_get_iter (layout);
  int first = pango_layout_iter_get_baseline (iter), last = first;
  double ascent, descent;

  while (pango_layout_iter_next_line (iter))
    last = pango_layout_iter_get_baseline (iter);
  pango_layout_iter_free (iter);
  pango_layout_get_extents (layout, NULL, &logical);
  plain_metrics (layout, &ascent, &descent);
  *width = (double)logical.width / PANGO_SCALE;
  *height = ascent + descent + (double)(last - first) / PANGO_SCALE;
}

EnlRect
enl_text_ink (PangoLayout *layout)
{
  PangoRectangle ink;

  pango_layout_get_extents (layout, &ink, NULL);
  return (EnlRect){(double)ink.x / PANGO_SCALE,
                   (double)ink.y / PANGO_SCALE - enl_text_lift (layout),
                   (double)ink.width / PANGO_SCALE, (double)ink.height / PANGO_SCALE};
}

void
enl_text_measure (const char *family, const char *markup, double size, bool bold, double *width,
                  double *height)
{
  g_autoptr (GObject) layout = G_OBJECT (enl_text_layout (family, markup, size, bold));

  enl_text_extents (PANGO_LAYOUT (layout), width, height);
}

static double
plain_width (const char *family, const char *plain, double size, bool bold)
{
  g_autofree char *markup = g_markup_escape_text (plain, -1);
  double width, height;

  enl_text_measure (family, markup, size, bold, &width, &height);
  return width;
}

typedef struct {
  const char *family;
  double size, width;
  bool bold;
  GString *line, *out;
} Wrap;

static bool
line_fits (const Wrap *w)
{
  return plain_width (w->family, w->line->str, w->size, w->bold) <= w->width;
}

/* Ends the line before its last `tail` bytes, which begin the next one. */
static void
break_line (Wrap *w, gsize tail)
{
  g_autofree char *rest = g_strdup (w->line->str + w->line->len - tail);

  g_string_append_len (w->out, w->line->str, (gssize)(w->line->len - tail));
  g_string_append_c (w->out, '\n');
  g_string_assign (w->line, rest);
}

static void
add_word (Wrap *w, const char *word)
{
  gsize length = strlen (word);

  if (w->line->len)
    g_string_append_c (w->line, ' ');
  g_string_append (w->line, word);
  if (line_fits (w))
    return;
  if (w->line->len > length) {
    g_string_truncate (w->line, w->line->len - length - 1);
    break_line (w, 0);
  } else {
    g_string_truncate (w->line, 0);
  }
  for (const char *c = word; *c; c = g_utf8_next_char (c)) {
    gsize bytes = (gsize)(g_utf8_next_char (c) - c);
    g_string_append_len (w->line, c, (gssize)bytes);
    if (w->line->len > bytes && !line_fits (w))
      break_line (w, bytes);
  }
}

/* Lines no wider than `width`, plain. */
static char *
wrap_plain (const char *family, const char *plain, double size, bool bold, double width)
{
  g_autofree char *valid = g_utf8_make_valid (plain, -1);
  g_auto (GStrv) word = g_strsplit_set (valid, " \t\n\r", -1);
  g_autoptr (GString) line = g_string_new (NULL);
  GString *out = g_string_new (NULL);
  Wrap wrap = {family, size, width, bold, line, out};

  for (char **w = word; *w; w++)
    if (**w)
      add_word (&wrap, *w);
  g_string_append (out, line->str);
  return g_string_free (out, FALSE);
}

char *
enl_text_wrap (const char *family, const char *plain, double size, bool bold, double width)
{
  g_autofree char *wrapped = wrap_plain (family, plain, size, bold, width);

  return g_markup_escape_text (wrapped, -1);
}

char *
enl_text_wrap_short (const char *family, const char *plain, double size, bool bold, double width,
                     uint32_t lines)
{
  g_autofree char *wrapped = wrap_plain (family, plain, size, bold, width);
  g_auto (GStrv) line = g_strsplit (wrapped, "\n", -1);

  g_assert (lines > 0);
  if (g_strv_length (line) <= lines)
    return g_markup_escape_text (wrapped, -1);
  GString *last = g_string_new (line[lines - 1]);
  g_string_append (last, "\u2026");
  while (last->len > 3 && plain_width (family, last->str, size, bold) > width) {
    const char *cut = g_utf8_prev_char (last->str + last->len - 3);
    gsize at = (gsize)(cut - last->str);
    g_string_erase (last, (gssize)at, (gssize)(last->len - 3 - at));
  }
  g_free (line[lines - 1]);
  line[lines - 1] = g_string_free (last, FALSE);
  for (uint32_t i = lines; line[i]; i++)
    g_clear_pointer (&line[i], g_free);
  g_autofree char *shortened = g_strjoinv ("\n", line);
  return g_markup_escape_text (shortened, -1);
}

double
enl_scene_paragraph (EnlScene *scene, EnlPoint at, double width, const char *plain, double size,
                     bool bold, EnlTone tone)
{
  const char *family = enl_scene_theme (scene)->family;
  g_autofree char *markup = enl_text_wrap (family, plain, size, bold, width);
  double w, h;

  enl_text_measure (family, markup, size, bold, &w, &h);
  enl_scene_text (scene, at, markup, size, bold, 0, 0, tone);
  return at.y + h;
}

double
enl_text_line_height (const char *family, double size)
{
  double width, height;

  enl_text_measure (family, "H", size, false, &width, &height);
  return height;
}

static char *
shifted (const char *markup, double rise)
{
  return g_strdup_printf ("<span size='70%%' rise='%d'>%s</span>", (int)(rise * PANGO_SCALE),
                          markup);
}

char *
enl_text_lowered (const char *markup, double size)
{
  return shifted (markup, -0.16 * size);
}

char *
enl_text_raised (const char *markup, double size)
{
  return shifted (markup, 0.34 * size);
}
