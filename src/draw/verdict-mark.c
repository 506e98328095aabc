#include "draw/verdict-mark.h"

#include <math.h>

#define ARC_STEPS 24
#define RIM       0.2 /* of the radius */

EnlTone
enl_verdict_tone (EnlVerdict verdict)
{
  static const EnlTone tone[ENL_N_VERDICTS] = {
      [ENL_VERDICT_COMPLETE] = ENL_TONE_ACTIVE, [ENL_VERDICT_SHARED] = ENL_TONE_CHARGE,
      [ENL_VERDICT_LARGELY] = ENL_TONE_ACTIVE,  [ENL_VERDICT_PARTIAL] = ENL_TONE_SITE,
      [ENL_VERDICT_TRACE] = ENL_TONE_SITE,      [ENL_VERDICT_NO] = ENL_TONE_MUTED,
      [ENL_VERDICT_REACTS] = ENL_TONE_WARNING,  [ENL_VERDICT_SOLVENT] = ENL_TONE_WARNING,
      [ENL_VERDICT_NO_NUMBER] = ENL_TONE_MUTED, [ENL_VERDICT_OFF_SCALE] = ENL_TONE_MUTED,
  };

  g_assert (verdict < ENL_N_VERDICTS);
  return tone[verdict];
}

/* Filled from the top clockwise. */
static void
draw_share (EnlScene *scene, EnlPoint c, double radius, double share, EnlTone tone)
{
  EnlPoint point[ARC_STEPS + 2];
  double rim = RIM * radius;

  enl_scene_disc (scene, c, radius - rim / 2, tone)->width = rim;
  if (share <= 0)
    return;
  point[0] = c;
  for (int i = 0; i <= ARC_STEPS; i++) {
    double angle = 2 * M_PI * share * i / ARC_STEPS;
    point[i + 1] =
        (EnlPoint){c.x + (radius - rim / 2) * sin (angle), c.y - (radius - rim / 2) * cos (angle)};
  }
  enl_scene_polygon (scene, point, ARC_STEPS + 2, tone);
}

/* The lower half, so that it is told from the right half of "partial". */
static void
draw_lower_half (EnlScene *scene, EnlPoint c, double radius, EnlTone tone)
{
  EnlPoint point[ARC_STEPS + 1];
  double rim = RIM * radius;

  enl_scene_disc (scene, c, radius - rim / 2, tone)->width = rim;
  for (int i = 0; i <= ARC_STEPS; i++) {
    double angle = M_PI * i / ARC_STEPS;
    point[i] =
        (EnlPoint){c.x + (radius - rim / 2) * cos (angle), c.y + (radius - rim / 2) * sin (angle)};
  }
  enl_scene_polygon (scene, point, ARC_STEPS + 1, tone);
}

static void
draw_strokes (EnlScene *scene, EnlPoint c, double radius, const EnlPoint *unit, uint32_t n,
              EnlTone tone)
{
  EnlPoint point[8];

  g_assert (n <= ENL_COUNT (point));
  for (uint32_t i = 0; i < n; i++)
    point[i] = (EnlPoint){c.x + radius * unit[i].x, c.y + radius * unit[i].y};
  enl_scene_path (scene, point, n, 1.6 * RIM * radius, tone);
}

static void
draw_sign (EnlScene *scene, EnlPoint c, double radius, EnlVerdict verdict, EnlTone tone)
{
  static const EnlPoint bolt[] = {{0.35, -0.95}, {-0.45, 0.05}, {0.4, -0.05}, {-0.35, 0.95}};
  static const EnlPoint one[] = {{-0.7, -0.7}, {0.7, 0.7}}, other[] = {{-0.7, 0.7}, {0.7, -0.7}};
  static const EnlPoint dash[] = {{-0.75, 0}, {0.75, 0}};

  if (verdict == ENL_VERDICT_REACTS) {
    draw_strokes (scene, c, radius, bolt, ENL_COUNT (bolt), tone);
  } else if (verdict == ENL_VERDICT_SOLVENT) {
    draw_strokes (scene, c, radius, one, 2, tone);
    draw_strokes (scene, c, radius, other, 2, tone);
  } else if (verdict == ENL_VERDICT_NO_NUMBER) {
    EnlShape *rim = enl_scene_disc (scene, c, radius * (1 - RIM / 2), tone);
    rim->width = RIM * radius;
    rim->dash = ENL_DASH_DASHED;
  } else {
    draw_strokes (scene, c, radius, dash, 2, tone);
  }
}

void
enl_verdict_mark_draw (EnlScene *scene, EnlPoint centre, double radius, EnlVerdict verdict)
{
  static const double share[ENL_N_VERDICTS] = {[ENL_VERDICT_COMPLETE] = 1,
                                               [ENL_VERDICT_LARGELY] = 0.75,
                                               [ENL_VERDICT_PARTIAL] = 0.5,
                                               [ENL_VERDICT_TRACE] = 0.12,
                                               [ENL_VERDICT_NO] = 0};
  EnlTone tone = enl_verdict_tone (verdict);

  if (verdict == ENL_VERDICT_SHARED)
    draw_lower_half (scene, centre, radius, tone);
  else if (verdict <= ENL_VERDICT_NO)
    draw_share (scene, centre, radius, share[verdict], tone);
  else
    draw_sign (scene, centre, radius, verdict, tone);
}

void
enl_caution_mark_draw (EnlScene *scene, EnlPoint c, double radius)
{
  const double stroke = 0.22 * radius;
  const EnlPoint rim[] = {{c.x, c.y - radius},
                          {c.x + radius, c.y + 0.8 * radius},
                          {c.x - radius, c.y + 0.8 * radius},
                          {c.x, c.y - radius}};

  enl_scene_path (scene, rim, ENL_COUNT (rim), stroke, ENL_TONE_WARNING);
  enl_scene_line (scene, (EnlPoint){c.x, c.y - 0.35 * radius}, (EnlPoint){c.x, c.y + 0.2 * radius},
                  stroke, ENL_TONE_WARNING);
  enl_scene_disc (scene, (EnlPoint){c.x, c.y + 0.5 * radius}, 0.7 * stroke, ENL_TONE_WARNING);
}
