#include "draw/report-html.h"

#include <string.h>

#include "draw/paint.h"
#include "draw/report-pages.h"

#define STRUCTURE_WIDTH  340.0
#define STRUCTURE_HEIGHT 220.0
#define BARS_WIDTH       300.0
#define BARS_SIZE        12.0
#define CURVE_WIDTH      460.0

static const char style[] =
    "body{font:15px/1.45 'DejaVu Sans',sans-serif;color:#111;background:#fff;margin:2em auto;"
    "max-width:60em;padding:0 1em}h1{font-size:1.6em}h2{font-size:1.2em;margin-top:1.6em}"
    "h3{font-size:1em;margin:.2em 0}.muted{color:#4a4a4a}.fault{color:#842713}"
    ".cards{display:grid;grid-template-columns:repeat(auto-fill,minmax(22em,1fr));gap:1em}"
    "article{background:#f6f6f6;border-radius:6px;padding:.8em 1em;overflow-wrap:anywhere}"
    ".base{display:flex;flex-wrap:wrap;gap:1.5em;justify-content:space-between;"
    "border-top:1px solid #bbb;padding:.7em 0}.base>div{flex:1 1 24em}"
    "svg{max-width:100%;height:auto}ol.sites{padding-left:1.6em;margin:.4em 0}"
    ".deferral{font-weight:bold}.sources{font-size:.88em;overflow-wrap:anywhere}"
    "@media print{body{margin:0;max-width:none;font-size:9pt}article,.base{break-inside:avoid}}";

typedef struct {
  const EnlReport *report;
  const EnlTheme *theme;
  GString *out;
  uint32_t pictures; /* so far */
} Page;

static void put (Page *page, const char *format, ...) G_GNUC_PRINTF (2, 3);

/* Every argument is plain text. */
static void
put (Page *page, const char *format, ...)
{
  va_list args;

  va_start (args, format);
  g_autofree char *text = g_markup_vprintf_escaped (format, args);
  va_end (args);
  g_string_append (page->out, text);
}

/* Names inside a picture count in the whole file: each picture gets its own. */
static char *
with_own_names (const char *svg, uint32_t picture)
{
  g_autoptr (GRegex) name = g_regex_new ("(\\bid=\"|href=\"#|url\\(#)", 0, 0, NULL);
  g_autofree char *prefix = g_strdup_printf ("\\1p%u-", picture);

  return g_regex_replace (name, svg, -1, 0, prefix, 0, NULL);
}

/* `words` is what the picture says to those who cannot see it. */
static EnlStatus
put_picture (Page *page, const EnlScene *scene, const char *words, EnlError *err)
{
  g_autoptr (GByteArray) bytes = NULL;
  const EnlExport how = {.transparent = true, .title = words};
  EnlStatus status = enl_scene_encode (scene, ENL_PICTURE_SVG, &how, &bytes, err);

  if (status != ENL_OK)
    return status;
  g_autofree char *text = g_strndup ((const char *)bytes->data, bytes->len);
  const char *root = strstr (text, "<svg");
  g_assert (root);
  g_autofree char *own = with_own_names (root, ++page->pictures);
  g_string_append (page->out, own);
  return ENL_OK;
}

static EnlStatus
put_card (Page *page, uint32_t index, EnlError *err)
{
  const EnlReportSubstrate *s = &page->report->substrate[index];
  g_autoptr (EnlScene) structure =
      enl_report_structure (s, page->theme, STRUCTURE_WIDTH, STRUCTURE_HEIGHT);
  EnlStatus status = ENL_OK;

  put (page, "<article><h3>%u&#160; %s</h3>\n", index + 1, s->name);
  if (s->identity[0])
    put (page, "<p class=\"muted\">%s</p>\n", s->identity);
  if (s->note[0])
    put (page, "<p class=\"muted\">%s</p>\n", s->note);
  if (structure) {
    g_autofree char *words = g_strdup_printf ("Structure of %s", s->name);
    status = put_picture (page, structure, words, err);
  }
  if (s->fault)
    put (page, "<p class=\"fault\">Cannot be read: %s</p>\n", s->fault);
  if (s->no_enol)
    put (page, "<p class=\"fault\">No enolate: %s</p>\n", s->no_enol);
  put (page, "<ol class=\"sites\">\n");
  for (uint32_t i = 0; i < s->n_sites; i++)
    put (page, "<li>%s<br><strong>%s</strong></li>\n", s->site[i].position, s->site[i].value);
  put (page, "</ol>\n");
  if (s->more_sites)
    put (page, "<p class=\"muted\">and %u weaker site%s</p>\n", s->more_sites,
         s->more_sites > 1 ? "s" : "");
  put (page, "</article>\n");
  return status;
}

static EnlStatus
put_base (Page *page, uint32_t index, EnlError *err)
{
  const EnlReportSubstrate *s = &page->report->substrate[index];
  g_autoptr (EnlScene) bars = enl_report_composition (s, page->theme, BARS_WIDTH, BARS_SIZE);
  g_autoptr (EnlScene) curve = enl_report_curve (page->report, index, page->theme, CURVE_WIDTH);
  EnlStatus status = ENL_OK;

  put (page, "<div class=\"base\"><div><h3>%u&#160; %s, site %u: %s</h3>\n", index + 1, s->name,
       enl_analysis_rank (s->analysis, s->selected), s->base_title);
  put (page, "<p>%s</p><p>%s</p><p>%s</p></div>\n", s->outcome, s->anion, s->equivalents);
  if (bars)
    status = put_picture (page, bars, s->composition, err);
  if (curve && status == ENL_OK)
    status = put_picture (page, curve, "Composition curve", err);
  put (page, "</div>\n");
  return status;
}

static void
put_cautions (Page *page)
{
  put (page, "<h2>Cautions</h2>\n<ul>\n");
  for (guint i = 0; i < page->report->caution->len; i++) {
    const EnlReportCaution *c = &g_array_index (page->report->caution, EnlReportCaution, i);
    put (page, "<li%s>[%s] %s%s (substrate %s)</li>\n", c->severity >= 3 ? " class=\"fault\"" : "",
         c->id, c->effect == ENL_EFFECT_HAZARD ? "Hazard: " : "", c->text, c->where);
  }
  put (page, "</ul>\n<p class=\"deferral\">%s</p>\n", page->report->deferral);
}

static void
put_sources (Page *page)
{
  put (page, "<h2>Sources</h2>\n<ol class=\"sources\">\n");
  for (guint i = 0; i < page->report->source->len; i++)
    put (page, "<li>%s</li>\n", (const char *)g_ptr_array_index (page->report->source, i));
  put (page, "</ol>\n<p class=\"muted\">Cautions without a source here are common practice.</p>\n");
}

static EnlStatus
put_body (Page *page, EnlError *err)
{
  const EnlReport *r = page->report;
  EnlStatus status = ENL_OK;

  put (page, "<h1>%s</h1>\n<p class=\"muted\">%s</p>\n", r->title, r->conditions);
  put (page, "<p class=\"muted\">Solid badge measured, open badge estimated, square lab value; "
             "numbers in brackets are sources. pKa as published, not corrected for the number of "
             "equivalent hydrogens.</p>\n<div class=\"cards\">\n");
  for (uint32_t i = 0; status == ENL_OK && i < r->n_substrates; i++)
    status = put_card (page, i, err);
  put (page, "</div>\n<h2>Base and composition</h2>\n<p class=\"muted\">%s</p>\n", r->footing);
  for (uint32_t i = 0; status == ENL_OK && i < r->n_substrates; i++)
    if (r->substrate[i].base)
      status = put_base (page, i, err);
  put_cautions (page);
  put_sources (page);
  return status;
}

EnlStatus
enl_report_html (const EnlReport *report, const EnlTheme *theme, char **out, EnlError *err)
{
  Page page = {report, theme, g_string_new (NULL), 0};

  put (&page, "<!DOCTYPE html>\n<html lang=\"en\"><head><meta charset=\"utf-8\">\n"
              "<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n");
  put (&page, "<title>%s</title>\n", report->title);
  g_string_append_printf (page.out, "<style>%s</style></head><body>\n", style);
  EnlStatus status = put_body (&page, err);
  put (&page, "</body></html>\n");
  *out = g_string_free (page.out, status != ENL_OK);
  return status;
}
