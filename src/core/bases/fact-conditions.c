/* Facts of the conditions and of what competes for the base. */
#include "core/bases/fact-view.h"

#include <math.h>

static void
find_solvent (const EnlFactView *v, EnlFactValue *out)
{
  out->word = enl_solvent_id (v->question->conditions->solvent);
}

static void
find_temperature (const EnlFactView *v, EnlFactValue *out)
{
  out->number = v->question->conditions->temperature;
}

static void
find_equivalents (const EnlFactView *v, EnlFactValue *out)
{
  out->number = v->question->conditions->equivalents;
}

static void
find_needed (const EnlFactView *v, EnlFactValue *out)
{
  out->number = 1.0 + v->ions->taken;
}

static void
find_competing_count (const EnlFactView *v, EnlFactValue *out)
{
  out->number = v->ions->taken;
}

/* "phenol O-H takes the first equivalent"; the site itself stands for "this". */
static void
find_competing_takes (const EnlFactView *v, EnlFactValue *out)
{
  g_autofree char *text = enl_ions_competing_text (v->ions, v->question);

  g_strlcpy (out->phrase, text, ENL_FACT_PHRASE_BYTES);
}

static void
find_short (const EnlFactView *v, EnlFactValue *out)
{
  out->flag = 1.0 + v->ions->taken > v->question->conditions->equivalents + 0.1;
}

#define NUMBER(name, find, meaning)                                                                \
  {                                                                                                \
    name, ENL_FACT_NUMBER, ENL_FACT_OF_QUESTION, find, meaning                                     \
  }

const EnlFact enl_fact_of_conditions[] = {
    {"solvent", ENL_FACT_WORD, ENL_FACT_OF_QUESTION, find_solvent, "dmso, water or thf"},
    NUMBER ("temperature", find_temperature, "degrees Celsius"),
    NUMBER ("equivalents", find_equivalents, "equivalents of base"),
    NUMBER ("equivalents.needed", find_needed,
            "one for the site, one for every hydrogen that takes base before or beside it"),
    NUMBER ("competing.count", find_competing_count, "hydrogens that take base before or beside"),
    {"competing.takes", ENL_FACT_PHRASE, ENL_FACT_OF_QUESTION, find_competing_takes,
     "'phenol O-H takes the first equivalent'"},
    {"equivalents.short", ENL_FACT_FLAG, ENL_FACT_OF_QUESTION, find_short,
     "fewer equivalents of base than are needed"},
    {NULL, ENL_FACT_FLAG, ENL_FACT_OF_QUESTION, NULL, NULL},
};
