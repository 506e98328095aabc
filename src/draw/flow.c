#include "draw/flow.h"

#include "draw/paint.h"
#include "draw/text.h"

#define PX_PER_MM (96.0 / 25.4)
/* ISO 216, A4. */
#define PAGE_WIDTH  (210.0 * PX_PER_MM)
#define PAGE_HEIGHT (297.0 * PX_PER_MM)
#define SIDE        (16.0 * PX_PER_MM)
#define TOP         (14.0 * PX_PER_MM)
#define BOTTOM      (18.0 * PX_PER_MM) /* the foot stands in it */
#define FOOT        (10.0 * PX_PER_MM) /* its base line from the edge */
#define FOOT_SIZE   9.0
#define LEAST       0.01

struct EnlFlow {
  const EnlTheme *theme;
  char *running;
  GPtrArray *page;
  double y; /* of the next block on the last page */
};

double
enl_flow_width (void)
{
  return PAGE_WIDTH - 2 * SIDE;
}

static EnlScene *
last_page (EnlFlow *flow)
{
  return g_ptr_array_index (flow->page, flow->page->len - 1);
}

static void
begin_page (EnlFlow *flow)
{
  EnlScene *page = enl_scene_new (flow->theme);

  enl_scene_set_size (page, PAGE_WIDTH, PAGE_HEIGHT);
  g_ptr_array_add (flow->page, page);
  flow->y = TOP;
}

EnlFlow *
enl_flow_new (const EnlTheme *theme, const char *running)
{
  EnlFlow *flow = g_new0 (EnlFlow, 1);

  flow->theme = theme;
  flow->running = g_strdup (running);
  flow->page = g_ptr_array_new_with_free_func ((GDestroyNotify)enl_scene_free);
  begin_page (flow);
  return flow;
}

void
enl_flow_free (EnlFlow *flow)
{
  if (!flow)
    return;
  g_free (flow->running);
  if (flow->page)
    g_ptr_array_unref (flow->page);
  g_free (flow);
}

static bool
at_top (const EnlFlow *flow)
{
  return flow->y <= TOP + LEAST;
}

static void
make_room (EnlFlow *flow, double height)
{
  if (flow->y + height > PAGE_HEIGHT - BOTTOM && !at_top (flow))
    begin_page (flow);
}

/* A block higher than a page is made smaller: nothing may be cut. */
void
enl_flow_block (EnlFlow *flow, const EnlScene *scene)
{
  EnlRect b = enl_scene_bounds (scene);
  double height = b.y + b.height, room = PAGE_HEIGHT - BOTTOM - TOP;
  double scale = height > room ? room / height : 1.0;

  if (height <= 0)
    return;
  make_room (flow, height * scale);
  enl_scene_append (last_page (flow), scene, scale, SIDE, flow->y);
  flow->y += height * scale;
}

/* Lines of a long paragraph may go to the next page: each is a block. */
static void
add_lines (EnlFlow *flow, const char *label, const char *plain, double size, bool bold,
           EnlTone tone, double indent)
{
  g_autofree char *markup =
      enl_text_wrap (flow->theme->family, plain, size, bold, enl_flow_width () - indent);
  g_auto (GStrv) line = g_strsplit (markup, "\n", -1);
  double height = enl_text_line_height (flow->theme->family, size);

  for (char **l = line; *l; l++) {
    make_room (flow, l == line && l[1] ? 2 * height : height);
    if (l == line && label) {
      g_autofree char *mark = g_markup_escape_text (label, -1);
      enl_scene_text (last_page (flow), (EnlPoint){SIDE, flow->y}, mark, size, false, 0, 0,
                      ENL_TONE_MUTED);
    }
    enl_scene_text (last_page (flow), (EnlPoint){SIDE + indent, flow->y}, *l, size, bold, 0, 0,
                    tone);
    flow->y += height;
  }
}

void
enl_flow_paragraph (EnlFlow *flow, const char *plain, double size, bool bold, EnlTone tone,
                    double indent)
{
  if (plain[0])
    add_lines (flow, NULL, plain, size, bold, tone, indent);
}

void
enl_flow_item (EnlFlow *flow, const char *label, const char *plain, double size, EnlTone tone,
               double indent)
{
  add_lines (flow, label, plain, size, false, tone, indent);
}

void
enl_flow_heading (EnlFlow *flow, const char *plain, double size, double below)
{
  make_room (flow, enl_text_line_height (flow->theme->family, size) + below);
  enl_flow_paragraph (flow, plain, size, true, ENL_TONE_INK, 0);
}

void
enl_flow_gap (EnlFlow *flow, double px)
{
  if (!at_top (flow))
    flow->y += px;
}

void
enl_flow_rule (EnlFlow *flow)
{
  if (!at_top (flow))
    enl_scene_line (last_page (flow), (EnlPoint){SIDE, flow->y},
                    (EnlPoint){PAGE_WIDTH - SIDE, flow->y}, 0.7, ENL_TONE_MUTED);
}

void
enl_flow_break (EnlFlow *flow)
{
  if (!at_top (flow))
    begin_page (flow);
}

/* As much of the running line as fits beside the number. */
static void
draw_foot (EnlFlow *flow, guint index)
{
  EnlScene *page = g_ptr_array_index (flow->page, index);
  g_autofree char *number = g_strdup_printf ("page %u of %u", index + 1, flow->page->len);
  g_autofree char *wrapped =
      enl_text_wrap (flow->theme->family, flow->running, FOOT_SIZE, false, 0.8 * enl_flow_width ());
  g_auto (GStrv) line = g_strsplit (wrapped, "\n", 2);
  double y = PAGE_HEIGHT - FOOT;

  enl_scene_text (page, (EnlPoint){SIDE, y}, line[0], FOOT_SIZE, false, 0, 1, ENL_TONE_MUTED);
  enl_scene_text (page, (EnlPoint){PAGE_WIDTH - SIDE, y}, number, FOOT_SIZE, false, 1, 1,
                  ENL_TONE_MUTED);
}

GPtrArray *
enl_flow_finish (EnlFlow *flow)
{
  if (at_top (flow) && flow->page->len > 1)
    g_ptr_array_set_size (flow->page, (int)flow->page->len - 1);
  for (guint i = 0; i < flow->page->len; i++)
    draw_foot (flow, i);
  return g_steal_pointer (&flow->page);
}
