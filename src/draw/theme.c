/* Our own palettes: warm paper or slate grounds, near-black ink, muted tints for heteroatoms. */
#include "draw/theme.h"

#include <string.h>

#define RGB(hex)                                                                                   \
  {                                                                                                \
    (((hex) >> 16) & 255) / 255.0, (((hex) >> 8) & 255) / 255.0, ((hex)&255) / 255.0, 1.0          \
  }

/* One family on every machine: it is a dependency of the package, so that text has the same size
 * everywhere. */
#define FAMILY "DejaVu Sans, sans-serif"

static const EnlTheme theme_table[ENL_N_THEMES] = {
    [ENL_THEME_LIGHT] =
        {
            .tone =
                {
                    [ENL_TONE_GROUND] = RGB (0xFBFAF7),
                    [ENL_TONE_PANEL] = RGB (0xF3F1EB),
                    [ENL_TONE_INK] = RGB (0x23262B),
                    [ENL_TONE_MUTED] = RGB (0x5F636B),
                    [ENL_TONE_OXYGEN] = RGB (0x1B5E66),
                    [ENL_TONE_NITROGEN] = RGB (0x6E3B63),
                    [ENL_TONE_SULFUR] = RGB (0x44546A),
                    [ENL_TONE_HALOGEN] = RGB (0x6A4E3C),
                    [ENL_TONE_HETERO] = RGB (0x50535A),
                    [ENL_TONE_SITE] = RGB (0x944B00),
                    [ENL_TONE_SITE_TEXT] = RGB (0xFFFFFF),
                    [ENL_TONE_ACTIVE] = RGB (0x2A5DB0),
                    [ENL_TONE_ACTIVE_SOFT] = RGB (0xD2E0F4),
                    [ENL_TONE_ACTIVE_TEXT] = RGB (0xFFFFFF),
                    [ENL_TONE_CHARGE] = RGB (0x5A3F9E),
                    [ENL_TONE_CHARGE_PLUS] = RGB (0x7D5600),
                    [ENL_TONE_ARROW] = RGB (0xA3264F),
                    [ENL_TONE_WARNING] = RGB (0x9E321D),
                },
            .bond_length = 44,
            .bond_width = 1.8,
            .wedge_width = 7.5,
            .double_gap = 6.2,
            .atom_size = 18,
            .text_size = 15,
            .small_size = 12.5,
            .title_size = 19,
            .badge_radius = 10.5,
            .margin = 16,
            .card_radius = 8,
            .family = FAMILY,
        },
    [ENL_THEME_DARK] =
        {
            .tone =
                {
                    [ENL_TONE_GROUND] = RGB (0x1C1F24),
                    [ENL_TONE_PANEL] = RGB (0x272B32),
                    [ENL_TONE_INK] = RGB (0xE6E4DE),
                    [ENL_TONE_MUTED] = RGB (0xA7ACB4),
                    [ENL_TONE_OXYGEN] = RGB (0x8CCBCB),
                    [ENL_TONE_NITROGEN] = RGB (0xD8A9D0),
                    [ENL_TONE_SULFUR] = RGB (0xADBCD4),
                    [ENL_TONE_HALOGEN] = RGB (0xD2B9A2),
                    [ENL_TONE_HETERO] = RGB (0xBFC1C6),
                    [ENL_TONE_SITE] = RGB (0xEFA957),
                    [ENL_TONE_SITE_TEXT] = RGB (0x241503),
                    [ENL_TONE_ACTIVE] = RGB (0x86B5F2),
                    [ENL_TONE_ACTIVE_SOFT] = RGB (0x2D4160),
                    [ENL_TONE_ACTIVE_TEXT] = RGB (0x0B1626),
                    [ENL_TONE_CHARGE] = RGB (0xBBA9F5),
                    [ENL_TONE_CHARGE_PLUS] = RGB (0xE3C176),
                    [ENL_TONE_ARROW] = RGB (0xF295B4),
                    [ENL_TONE_WARNING] = RGB (0xF29C85),
                },
            .bond_length = 44,
            .bond_width = 1.8,
            .wedge_width = 7.5,
            .double_gap = 6.2,
            .atom_size = 18,
            .text_size = 15,
            .small_size = 12.5,
            .title_size = 19,
            .badge_radius = 10.5,
            .margin = 16,
            .card_radius = 8,
            .family = FAMILY,
        },
    [ENL_THEME_PRINT] =
        {
            .tone =
                {
                    [ENL_TONE_GROUND] = RGB (0xFFFFFF),
                    [ENL_TONE_PANEL] = RGB (0xF6F6F6),
                    [ENL_TONE_INK] = RGB (0x000000),
                    [ENL_TONE_MUTED] = RGB (0x4A4A4A),
                    [ENL_TONE_OXYGEN] = RGB (0x0F4047),
                    [ENL_TONE_NITROGEN] = RGB (0x4B2643),
                    [ENL_TONE_SULFUR] = RGB (0x2C3A4E),
                    [ENL_TONE_HALOGEN] = RGB (0x483426),
                    [ENL_TONE_HETERO] = RGB (0x303236),
                    [ENL_TONE_SITE] = RGB (0x7A3E00),
                    [ENL_TONE_SITE_TEXT] = RGB (0xFFFFFF),
                    [ENL_TONE_ACTIVE] = RGB (0x1F4A94),
                    [ENL_TONE_ACTIVE_SOFT] = RGB (0xD3DFF1),
                    [ENL_TONE_ACTIVE_TEXT] = RGB (0xFFFFFF),
                    [ENL_TONE_CHARGE] = RGB (0x43307A),
                    [ENL_TONE_CHARGE_PLUS] = RGB (0x644500),
                    [ENL_TONE_ARROW] = RGB (0x8A1C41),
                    [ENL_TONE_WARNING] = RGB (0x842713),
                },
            .bond_length = 36,
            .bond_width = 1.4,
            .wedge_width = 6.0,
            .double_gap = 5.0,
            .atom_size = 15,
            .text_size = 12.5,
            .small_size = 10.5,
            .title_size = 15,
            .badge_radius = 8.8,
            .margin = 12,
            .card_radius = 5,
            .family = FAMILY,
        },
    [ENL_THEME_PROJECTOR] =
        {
            .tone =
                {
                    [ENL_TONE_GROUND] = RGB (0xFFFFFF),
                    [ENL_TONE_PANEL] = RGB (0xF2F2F0),
                    [ENL_TONE_INK] = RGB (0x0B0C0E),
                    [ENL_TONE_MUTED] = RGB (0x3F434A),
                    [ENL_TONE_OXYGEN] = RGB (0x0D454D),
                    [ENL_TONE_NITROGEN] = RGB (0x552A4B),
                    [ENL_TONE_SULFUR] = RGB (0x2F3E55),
                    [ENL_TONE_HALOGEN] = RGB (0x4E3828),
                    [ENL_TONE_HETERO] = RGB (0x35383D),
                    [ENL_TONE_SITE] = RGB (0x7C3A00),
                    [ENL_TONE_SITE_TEXT] = RGB (0xFFFFFF),
                    [ENL_TONE_ACTIVE] = RGB (0x174796),
                    [ENL_TONE_ACTIVE_SOFT] = RGB (0xC9DAF2),
                    [ENL_TONE_ACTIVE_TEXT] = RGB (0xFFFFFF),
                    [ENL_TONE_CHARGE] = RGB (0x452E85),
                    [ENL_TONE_CHARGE_PLUS] = RGB (0x634300),
                    [ENL_TONE_ARROW] = RGB (0x8C1640),
                    [ENL_TONE_WARNING] = RGB (0x852410),
                },
            .bond_length = 68,
            .bond_width = 3.2,
            .wedge_width = 12,
            .double_gap = 10,
            .atom_size = 30,
            .text_size = 26,
            .small_size = 21,
            .title_size = 32,
            .badge_radius = 18,
            .margin = 24,
            .card_radius = 12,
            .family = FAMILY,
        },
};

static const char *const theme_id[ENL_N_THEMES] = {
    [ENL_THEME_LIGHT] = "light",
    [ENL_THEME_DARK] = "dark",
    [ENL_THEME_PRINT] = "print",
    [ENL_THEME_PROJECTOR] = "projector",
};

const EnlTheme *
enl_theme_get (EnlThemeName name)
{
  g_assert (name < ENL_N_THEMES);
  return &theme_table[name];
}

const char *
enl_theme_id (EnlThemeName name)
{
  g_assert (name < ENL_N_THEMES);
  return theme_id[name];
}

int
enl_theme_find (const char *id)
{
  for (int i = 0; i < ENL_N_THEMES; i++)
    if (strcmp (theme_id[i], id) == 0)
      return i;
  return -1;
}

EnlTone
enl_theme_element_tone (uint8_t element)
{
  switch (element) {
  case 1:
  case 6:
    return ENL_TONE_INK;
  case 7:
    return ENL_TONE_NITROGEN;
  case 8:
    return ENL_TONE_OXYGEN;
  case 16:
  case 34:
  case 52:
    return ENL_TONE_SULFUR;
  case 9:
  case 17:
  case 35:
  case 53:
    return ENL_TONE_HALOGEN;
  default:
    return ENL_TONE_HETERO;
  }
}
