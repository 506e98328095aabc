#include "draw/theme.h"

#include <math.h>

#include "tests/runner.h"

/* WCAG 2.1 (W3C Recommendation): relative luminance and contrast ratio. */
static double
linear (double c)
{
  return c <= 0.04045 ? c / 12.92 : pow ((c + 0.055) / 1.055, 2.4);
}

static double
luminance (EnlColour c)
{
  return 0.2126 * linear (c.red) + 0.7152 * linear (c.green) + 0.0722 * linear (c.blue);
}

static double
contrast (EnlColour a, EnlColour b)
{
  double x = luminance (a) + 0.05, y = luminance (b) + 0.05;

  return fmax (x, y) / fmin (x, y);
}

START_TEST (contrast_formula_is_right)
{
  const EnlColour black = {0, 0, 0, 1}, white = {1, 1, 1, 1};

  ck_assert_double_eq_tol (contrast (black, white), 21.0, 1e-9);
}
END_TEST

START_TEST (texts_have_contrast)
{
  static const EnlTone on_ground[] = {
      ENL_TONE_INK,         ENL_TONE_MUTED,  ENL_TONE_OXYGEN, ENL_TONE_NITROGEN, ENL_TONE_SULFUR,
      ENL_TONE_HALOGEN,     ENL_TONE_HETERO, ENL_TONE_SITE,   ENL_TONE_ACTIVE,   ENL_TONE_CHARGE,
      ENL_TONE_CHARGE_PLUS, ENL_TONE_ARROW,  ENL_TONE_WARNING};
  const EnlTheme *theme = enl_theme_get ((EnlThemeName)_i);
  double least = _i == ENL_THEME_PROJECTOR ? 7.0 : 4.5;

  for (size_t i = 0; i < ENL_COUNT (on_ground); i++) {
    EnlColour c = theme->tone[on_ground[i]];
    ck_assert_double_ge (contrast (c, theme->tone[ENL_TONE_GROUND]), least);
    ck_assert_double_ge (contrast (c, theme->tone[ENL_TONE_PANEL]), least);
    ck_assert_double_ge (contrast (c, theme->tone[ENL_TONE_ACTIVE_SOFT]), 4.5);
  }
  ck_assert_double_ge (contrast (theme->tone[ENL_TONE_SITE_TEXT], theme->tone[ENL_TONE_SITE]),
                       least);
  ck_assert_double_ge (contrast (theme->tone[ENL_TONE_ACTIVE_TEXT], theme->tone[ENL_TONE_ACTIVE]),
                       least);
}
END_TEST

/* Simulation of full dichromacy in linear sRGB (Machado, Oliveira and Fernandes, IEEE Trans. Vis.
 * Comput. Graph. 2009, 15, 1291, severity 1.0; numbers from memory). */
static const double vision[4][3][3] = {
    {{1, 0, 0}, {0, 1, 0}, {0, 0, 1}},
    {{0.152286, 1.052583, -0.204868},
     {0.114503, 0.786281, 0.099216},
     {-0.003882, -0.048116, 1.051998}},
    {{0.367322, 0.860646, -0.227968},
     {0.280085, 0.672501, 0.047413},
     {-0.011820, 0.042940, 0.968881}},
    {{1.255528, -0.076749, -0.178779},
     {-0.078411, 0.930809, 0.147602},
     {0.004733, 0.691367, 0.303900}},
};

/* CIE 1976 L*a*b*, D65. */
static void
to_lab (EnlColour c, const double eye[3][3], double lab[3])
{
  static const double xyz[3][3] = {{0.4124 / 0.9505, 0.3576 / 0.9505, 0.1805 / 0.9505},
                                   {0.2126, 0.7152, 0.0722},
                                   {0.0193 / 1.089, 0.1192 / 1.089, 0.9505 / 1.089}};
  const double rgb[3] = {linear (c.red), linear (c.green), linear (c.blue)};
  double seen[3], f[3];

  for (int i = 0; i < 3; i++) {
    seen[i] = eye[i][0] * rgb[0] + eye[i][1] * rgb[1] + eye[i][2] * rgb[2];
    seen[i] = fmin (1, fmax (0, seen[i]));
  }
  for (int i = 0; i < 3; i++) {
    double t = xyz[i][0] * seen[0] + xyz[i][1] * seen[1] + xyz[i][2] * seen[2];
    f[i] = t > 0.008856 ? cbrt (t) : 7.787 * t + 16.0 / 116;
  }
  lab[0] = 116 * f[1] - 16;
  lab[1] = 500 * (f[0] - f[1]);
  lab[2] = 200 * (f[1] - f[2]);
}

static const struct {
  EnlTone a, b;
  double least; /* CIE 1976 colour difference; 2.3 is just noticeable */
} apart[] = {
    {ENL_TONE_SITE, ENL_TONE_ACTIVE, 30},        {ENL_TONE_SITE, ENL_TONE_INK, 30},
    {ENL_TONE_ACTIVE, ENL_TONE_INK, 30},         {ENL_TONE_CHARGE, ENL_TONE_CHARGE_PLUS, 25},
    {ENL_TONE_ARROW, ENL_TONE_INK, 12},          {ENL_TONE_SITE, ENL_TONE_MUTED, 30},
    {ENL_TONE_GROUND, ENL_TONE_ACTIVE_SOFT, 10},
};

START_TEST (tones_stay_apart_for_every_eye)
{
  const EnlTheme *theme = enl_theme_get ((EnlThemeName)_i);

  for (size_t eye = 0; eye < ENL_COUNT (vision); eye++)
    for (size_t k = 0; k < ENL_COUNT (apart); k++) {
      double a[3], b[3];
      to_lab (theme->tone[apart[k].a], vision[eye], a);
      to_lab (theme->tone[apart[k].b], vision[eye], b);
      double d = sqrt (pow (a[0] - b[0], 2) + pow (a[1] - b[1], 2) + pow (a[2] - b[2], 2));
      ck_assert_msg (d >= apart[k].least, "%s, eye %zu, pair %zu: %.1f",
                     enl_theme_id ((EnlThemeName)_i), eye, k, d);
    }
}
END_TEST

START_TEST (names_lead_back)
{
  for (int i = 0; i < ENL_N_THEMES; i++)
    ck_assert_int_eq (enl_theme_find (enl_theme_id ((EnlThemeName)i)), i);
  ck_assert_int_eq (enl_theme_find ("sepia"), -1);
}
END_TEST

static Suite *
theme_suite (void)
{
  Suite *suite = suite_create ("draw theme");
  TCase *tc = tcase_create ("all");

  tcase_add_test (tc, contrast_formula_is_right);
  tcase_add_loop_test (tc, texts_have_contrast, 0, ENL_N_THEMES);
  tcase_add_loop_test (tc, tones_stay_apart_for_every_eye, 0, ENL_N_THEMES);
  tcase_add_test (tc, names_lead_back);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (theme_suite)
