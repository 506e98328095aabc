/* Weigh-out: how much of what is on the shelf holds the base that an amount of substrate asks for.
 *
 * amount of base = amount of substrate x (equivalents + those that water takes) / equivalents that
 * a mole of the base gives; mass = amount x molar mass / mass fraction, volume = amount / molarity.
 * How a base is sold stands in resources/bases.tsv, of what parts a mixture is made and what water
 * does in resources/weigh.tsv. Nothing here is a procedure.
 */
#pragma once

#include "core/bases/base.h"

typedef struct EnlWeighTable EnlWeighTable;

/* Errors have the line of the table; a part that names an unknown base is one. Borrows `bases`,
 * which must outlive the result. */
EnlStatus enl_weigh_table_new (const char *text, size_t size, const EnlBaseTable *bases,
                               EnlWeighTable **out, EnlError *err) ENL_MUST_USE;
void enl_weigh_table_free (EnlWeighTable *table);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlWeighTable, enl_weigh_table_free)

typedef struct {
  double mmol;         /* of substrate */
  double equivalents;  /* of base per substrate */
  double water;        /* equivalents of water per substrate, 0 for none */
  double titre;        /* mol/L of the bottle at hand; NAN: as usually sold */
  double mass_percent; /* base in the dispersion at hand; NAN: as usually sold */
} EnlWeighOrder;

/* ENL_ERROR_RANGE with advice when a number is impossible, or absurd at a bench: 0.001 mmol to 100
 * mol of substrate, up to 100 equivalents, 0.001 to 20 mol/L, 0.1 to 100 %. */
EnlStatus enl_weigh_order_check (const EnlWeighOrder *order, EnlError *err);

/* One thing that is weighed or measured out. Texts are borrowed from the tables. */
typedef struct {
  const char *name, *form;
  const char *note;                       /* "" for none */
  const EnlBase *base;                    /* row of the base table, NULL: a reagent of its own */
  double mmol;                            /* NAN: how much differs from method to method */
  double molar_mass;                      /* g/mol, NAN: not known */
  double molarity, mass_percent, density; /* that were used, NAN: not used */
  double mg, ml;                          /* NAN: cannot be told */
} EnlWeighPart;

typedef struct {
  const EnlBase *base;
  double equivalents; /* as ordered */
  double water_taken; /* equivalents of base that the water takes */
  double mmol;        /* of base, with the share of water */
  double per_mole;    /* equivalents that a mole of the base gives */
  char *remark;       /* sentences on water and on what a mole gives; "" for none */
  EnlWeighPart *part; /* the one that carries the base first */
  uint32_t n_parts;
} EnlWeighing;

/* `bases` may hold more rows than the table was opened with (own bases). ENL_ERROR_UNKNOWN with
 * advice when neither molar mass nor titre of the base is known, when a titre is given of what is
 * no solution, or a mass per cent of a solution that is sold by its titre. Caller:
 * enl_weighing_free. */
EnlStatus enl_weigh (const EnlWeighTable *table, const EnlBase *base, const EnlWeighOrder *order,
                     EnlWeighing **out, EnlError *err) ENL_MUST_USE;
void enl_weighing_free (EnlWeighing *weighing);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlWeighing, enl_weighing_free)

/* What is measured out first is a volume: it comes from a bottle of liquid. */
bool enl_weigh_part_is_liquid (const EnlWeighPart *part);

/* Three significant digits, plain decimals, a point in every locale: "0.0210", "2.10", "1180";
 * "" for NAN. New string (g_free). */
char *enl_weigh_digits (double value) ENL_MUST_USE;
/* "400 mg", "1.18 g", "2.10 kg"; "21.0 µL", "2.10 mL", "1.20 L". New string (g_free). */
char *enl_weigh_mass_text (double mg) ENL_MUST_USE;
char *enl_weigh_volume_text (double ml) ENL_MUST_USE;
/* "2.10 mL (1.45 g)", "400 mg", "amount not known here". New string (g_free). */
char *enl_weigh_amount_text (const EnlWeighPart *part) ENL_MUST_USE;
/* "solution in hexanes, 2.5 mol/L, 0.69 g/mL": what the amount rests on. New string (g_free). */
char *enl_weigh_form_text (const EnlWeighPart *part) ENL_MUST_USE;
