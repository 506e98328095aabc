#include "draw/effect-bar.h"

#include <math.h>

/* Effects that read 0.0. */
#define TINY 0.05
/* Shares of the height: thickness of the bar, head, dot. */
#define BAR  0.4
#define HEAD 0.6
#define DOT  0.16

EnlScene *
enl_effect_bar_scene (double effect, double most, double width, double height,
                      const EnlTheme *theme)
{
  EnlScene *scene = enl_scene_new (theme);
  double middle = width / 2, y = height / 2, side = effect < 0 ? -1 : 1;

  g_assert (most > 0 && width > 0 && height > 0);
  enl_scene_set_size (scene, width, height);
  enl_scene_line (scene, (EnlPoint){middle, 1}, (EnlPoint){middle, height - 1}, 1, ENL_TONE_MUTED);
  if (fabs (effect) < TINY) {
    enl_scene_disc (scene, (EnlPoint){middle, y}, DOT * height, ENL_TONE_SITE);
    return scene;
  }
  double length = fmax (fmin (fabs (effect) / most, 1) * (middle - 1), 2);
  double head = fmin (HEAD * height, length), shaft = length - head;
  EnlPoint tip[] = {{middle + side * length, y},
                    {middle + side * shaft, y - HEAD * height / 2},
                    {middle + side * shaft, y + HEAD * height / 2}};

  if (shaft > 0)
    enl_scene_rect (
        scene,
        (EnlRect){side < 0 ? middle - shaft : middle, y - BAR * height / 2, shaft, BAR * height}, 0,
        ENL_TONE_SITE);
  enl_scene_polygon (scene, tip, ENL_COUNT (tip), ENL_TONE_SITE);
  return scene;
}
