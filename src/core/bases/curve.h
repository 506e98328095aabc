/* The composition curve: what becomes of the substrate, from no base to several equivalents of one.
 */
#pragma once

#include "core/bases/compare.h"
#include "core/bases/ions.h"

typedef enum {
  ENL_CURVE_SUBSTRATE, /* has lost nothing */
  ENL_CURVE_FORM,      /* one ionised form */
  ENL_CURVE_OTHERS,    /* all forms that have no line of their own */
  ENL_CURVE_BASE       /* share of the base added that has taken no proton */
} EnlCurveKind;

typedef struct {
  EnlCurveKind kind;
  EnlSiteSet lost;   /* FORM: sites that have lost a hydrogen */
  bool holds_target; /* FORM: the site asked about is among them */
  char *label;       /* "anion, site 1" ... a few words */
  double *fraction;  /* n_points values, 0..1 */
  double chosen;     /* value at the chosen equivalents */
  double peak;       /* largest value of all points */
} EnlCurveLine;

typedef struct {
  uint32_t n_points;
  double *equivalents; /* n_points, from 0 to the last */
  EnlCurveLine *line;  /* the forms of the site asked about first, then the others by peak */
  uint32_t n_lines;    /* 0: there is no curve */
  double chosen;       /* equivalents of the conditions */
  double low, high;    /* 90 % interval of the conversion there */
  bool stoichiometric; /* straight lines: protons are taken for good */
  double worst;        /* largest balance error of all points, relative */
  char *missing;       /* why there is no curve, one sentence without full stop; else NULL */
} EnlCurve;

/* Lines of forms that a curve shows at most; the rest is summed. */
#define ENL_CURVE_FORMS 6

/* `candidate` is one of the comparison that answered `question`. The curve goes to ENL_SWEEP_MOST
 * equivalents, or as far as the chosen ones. Caller: enl_curve_free. */
EnlStatus enl_curve_new (const EnlQuestion *question, const EnlCandidate *candidate,
                         uint32_t n_points, EnlCurve **out, EnlError *err) ENL_MUST_USE;
void enl_curve_free (EnlCurve *curve);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlCurve, enl_curve_free)

/* "At 1.05 equivalents of LDA: anion, site 1: 99.9 %; substrate: 0.1 %; base left over, of the base
 * added: 4.8 %." or why there is no curve. New string (g_free). */
char *enl_curve_words (const EnlCurve *curve, const char *base) ENL_MUST_USE;
/* "99.9 %", "< 0.1 %", "100 %". New string (g_free). */
char *enl_share_text (double share) ENL_MUST_USE;
