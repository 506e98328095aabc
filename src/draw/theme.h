/* Every colour, width and size of a picture in one object. */
#pragma once

#include <stdint.h>

#include "core/base/macros.h"

typedef enum {
  ENL_TONE_GROUND, /* background of the picture */
  ENL_TONE_PANEL,  /* ground of a card on it */
  ENL_TONE_INK,    /* bonds, carbon, text */
  ENL_TONE_MUTED,  /* secondary text, rules */
  ENL_TONE_OXYGEN,
  ENL_TONE_NITROGEN,
  ENL_TONE_SULFUR,
  ENL_TONE_HALOGEN,
  ENL_TONE_HETERO,
  ENL_TONE_SITE,        /* the acidic hydrogen and its badge */
  ENL_TONE_SITE_TEXT,   /* text on a badge */
  ENL_TONE_ACTIVE,      /* the selected site */
  ENL_TONE_ACTIVE_SOFT, /* area behind its delocalised system; opaque, so that parts may overlap */
  ENL_TONE_ACTIVE_TEXT, /* text on a badge of the selected site */
  ENL_TONE_CHARGE,      /* negative charge areas */
  ENL_TONE_CHARGE_PLUS, /* positive charge areas */
  ENL_TONE_ARROW,       /* curved arrows */
  ENL_TONE_WARNING,
  ENL_N_TONES
} EnlTone;

typedef struct {
  double red, green, blue, alpha;
} EnlColour;

typedef enum {
  ENL_THEME_LIGHT,
  ENL_THEME_DARK,
  ENL_THEME_PRINT,
  ENL_THEME_PROJECTOR,
  ENL_N_THEMES
} EnlThemeName;

typedef struct {
  EnlColour tone[ENL_N_TONES];
  double bond_length; /* all lengths in px at 96 dpi */
  double bond_width, wedge_width, double_gap;
  double atom_size; /* font size of atom labels */
  double text_size, small_size, title_size;
  double badge_radius, margin, card_radius;
  const char *family; /* font family list for Pango */
} EnlTheme;

/* Static. The themes are safe for the common kinds of colour blindness and every text tone has a
 * contrast of at least 4.5:1 on ground and panel (7:1 in the projector theme); see tests/draw. */
const EnlTheme *enl_theme_get (EnlThemeName name);
/* "light", "dark", "print", "projector". */
const char *enl_theme_id (EnlThemeName name);
int enl_theme_find (const char *id); /* -1 when unknown */

/* Tone of the label of an element (atomic number). */
EnlTone enl_theme_element_tone (uint8_t element);
