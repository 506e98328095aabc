/* A widget that shows one scene. Signals:
 *   "picked" (guint site, guint atom)  a shape was clicked; ENL_NONE where it has no owner
 */
#pragma once

#include <gtk/gtk.h>

#include "draw/scene.h"

#define ENL_TYPE_CANVAS (enl_canvas_get_type ())
G_DECLARE_FINAL_TYPE (EnlCanvas, enl_canvas, ENL, CANVAS, GtkWidget)

/* Takes the scene (NULL: empty). */
void enl_canvas_take_scene (EnlCanvas *canvas, EnlScene *scene);

/* True: the scene is scaled to the widget, up to `largest` times its size. False: the widget asks
 * for the scene's own size, for use in a scrolled window. Default: fit, 1.4. */
void enl_canvas_set_fit (EnlCanvas *canvas, gboolean fit, double largest);
/* The widget asks for exactly this room, px; 0 ends that. */
void enl_canvas_set_size (EnlCanvas *canvas, int width, int height);
/* The widget never asks for less room than `smallest` times the scene (default 0: it does), so that
 * its text stays readable and a scrolled window scrolls instead. */
void enl_canvas_set_smallest (EnlCanvas *canvas, double smallest);

/* Text read out by assistive technology in place of the picture. */
void enl_canvas_describe (EnlCanvas *canvas, const char *label, const char *description);
