#include "draw/weigh-sheet.h"

#include <math.h>

#include "draw/flow.h"
#include "draw/text.h"

#define SIZE   13.0
#define LARGE  18.0
#define SMALL  11.0
#define BOX    13.0 /* to tick */
#define AMOUNT 190.0
#define TAKEN  130.0 /* line for what was really taken */
#define GAP    12.0

/* "box  amount  name and form  ______": one thing to weigh. */
static EnlScene *
make_row (const EnlTheme *theme, const char *amount, const char *name, const char *detail)
{
  EnlScene *scene = enl_scene_new (theme);
  double x = BOX + GAP, middle = x + AMOUNT + GAP;
  double width = enl_flow_width () - middle - TAKEN - GAP;
  double line = enl_text_line_height (theme->family, SIZE), y;
  EnlPoint box[4] = {{1, (line - BOX) / 2},
                     {BOX, (line - BOX) / 2},
                     {BOX, (line + BOX) / 2},
                     {1, (line + BOX) / 2}};

  for (int i = 0; i < 4; i++)
    enl_scene_line (scene, box[i], box[(i + 1) % 4], 1, ENL_TONE_INK);
  enl_scene_paragraph (scene, (EnlPoint){x, 0}, AMOUNT, amount, SIZE, true, ENL_TONE_INK);
  y = enl_scene_paragraph (scene, (EnlPoint){middle, 0}, width, name, SIZE, false, ENL_TONE_INK);
  if (detail[0])
    enl_scene_paragraph (scene, (EnlPoint){middle, y}, width, detail, SMALL, false, ENL_TONE_MUTED);
  enl_scene_line (scene, (EnlPoint){enl_flow_width () - TAKEN, line},
                  (EnlPoint){enl_flow_width (), line}, 0.8, ENL_TONE_MUTED);
  return scene;
}

static void
add_row (EnlFlow *flow, const EnlTheme *theme, const char *amount, const char *name,
         const char *detail)
{
  g_autoptr (EnlScene) row = make_row (theme, amount, name, detail);

  enl_flow_block (flow, row);
  enl_flow_gap (flow, 0.6 * SIZE);
}

static char *
molar_text (double molar_mass)
{
  char text[G_ASCII_DTOSTR_BUF_SIZE];

  if (isnan (molar_mass))
    return g_strdup ("");
  g_ascii_formatd (text, sizeof text, "%.2f", molar_mass);
  return g_strdup_printf ("%s\u00A0g/mol", text);
}

static void
add_part (EnlFlow *flow, const EnlTheme *theme, const EnlWeighPart *part)
{
  g_autofree char *amount = enl_weigh_amount_text (part);
  g_autofree char *form = enl_weigh_form_text (part);
  g_autofree char *mmol = enl_weigh_digits (part->mmol);
  g_autofree char *molar = molar_text (part->molar_mass);
  g_autofree char *detail = g_strdup_printf (
      "%s%s%s%s%s%s%s%s", mmol, mmol[0] ? "\u00A0mmol" : "", mmol[0] && molar[0] ? ", " : "", molar,
      form[0] ? "; " : "", form, part->note[0] ? "; " : "", part->note);

  add_row (flow, theme, amount, part->name, detail);
}

static void
add_line (EnlFlow *flow, const EnlTheme *theme, const EnlWeighLine *line)
{
  g_autofree char *head = enl_weigh_line_text (line);
  g_autofree char *title = g_strdup_printf ("%s: %s", line->weighing->base->name, head);
  g_autofree char *why = g_strconcat ("Why: ", line->reason, NULL);
  g_autofree char *outcome = g_strconcat ("Outcome: ", line->verdict, NULL);

  enl_flow_gap (flow, SIZE);
  enl_flow_heading (flow, title, SIZE, 6 * SIZE);
  enl_flow_paragraph (flow, why, SMALL, false, ENL_TONE_MUTED, 0);
  enl_flow_paragraph (flow, outcome, SMALL, !line->works,
                      line->works ? ENL_TONE_MUTED : ENL_TONE_WARNING, 0);
  enl_flow_gap (flow, 0.6 * SIZE);
  for (uint32_t i = 0; i < line->weighing->n_parts; i++)
    add_part (flow, theme, &line->weighing->part[i]);
}

static void
add_substrate (EnlFlow *flow, const EnlTheme *theme, const EnlWeighList *list)
{
  g_autofree char *mass = enl_weigh_mass_text (list->mmol * list->molar_mass);
  g_autofree char *mmol = enl_weigh_digits (list->mmol);
  g_autofree char *molar = molar_text (list->molar_mass);
  g_autofree char *detail =
      g_strdup_printf ("%s\u00A0mmol, %s; site %s; pK values for %s", mmol, molar, list->position,
                       enl_solvent_heading (list->solvent));

  enl_flow_gap (flow, 0.8 * SIZE);
  add_row (flow, theme, mass, list->substrate, detail);
}

GPtrArray *
enl_weigh_pages (const EnlWeighList *list, const EnlTheme *theme)
{
  g_autofree char *running = g_strconcat ("Enolith: weigh-out for ", list->substrate, NULL);
  g_autoptr (EnlFlow) flow = enl_flow_new (theme, running);

  enl_flow_paragraph (flow, "Weigh-out", LARGE, true, ENL_TONE_INK, 0);
  enl_flow_paragraph (flow,
                      "Amounts to three digits. The lines are for what was really taken. This list "
                      "is no procedure.",
                      SMALL, false, ENL_TONE_MUTED, 0);
  add_substrate (flow, theme, list);
  for (uint32_t i = 0; i < list->n_lines; i++)
    add_line (flow, theme, &list->line[i]);
  enl_flow_gap (flow, SIZE);
  enl_flow_heading (flow, "Cautions", SIZE, 3 * SMALL);
  for (guint i = 0; i < list->hazard->len; i++)
    enl_flow_paragraph (flow, g_ptr_array_index (list->hazard, i), SMALL, false, ENL_TONE_INK, 0);
  enl_flow_gap (flow, 0.4 * SIZE);
  enl_flow_paragraph (flow, list->deferral, SMALL, true, ENL_TONE_INK, 0);
  return enl_flow_finish (flow);
}
