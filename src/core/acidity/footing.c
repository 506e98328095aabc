#include "core/acidity/footing.h"

#include <math.h>
#include <string.h>

#include "resources/embedded.h"

/* Anions whose lone pair gains less than this (in beta) are localised: neighbours with lone pairs
 * only, or none at all. */
#define LEAST_GAIN 0.1

static const char *const kind_name[ENL_N_FOOTINGS] = {
    [ENL_FOOTING_DELOCALISED_CARBON] = "delocalised carbon",
    [ENL_FOOTING_LOCALISED_CARBON] = "localised carbon",
    [ENL_FOOTING_HETEROATOM] = "heteroatom",
    [ENL_FOOTING_CATION] = "cation",
};

EnlStatus
enl_footings_read (const EnlTable *table, EnlFooting out[ENL_N_FOOTINGS], EnlError *err)
{
  memset (out, 0, ENL_N_FOOTINGS * sizeof *out);
  for (size_t row = 0; row < enl_table_rows (table); row++)
    for (int kind = 0; kind < ENL_N_FOOTINGS; kind++)
      if (strcmp (enl_table_cell (table, row, enl_table_column (table, "acid")), kind_name[kind]) ==
          0)
        out[kind] = (EnlFooting){
            .sigma = enl_table_number (table, row, enl_table_column (table, "sigma")),
            .sentence = enl_table_cell (table, row, enl_table_column (table, "sentence")),
            .source = enl_table_cell (table, row, enl_table_column (table, "source")),
        };
  for (int kind = 0; kind < ENL_N_FOOTINGS; kind++)
    if (!out[kind].sentence || !out[kind].sentence[0] || !(out[kind].sigma > 0))
      return enl_error_set (err, ENL_ERROR_FORMAT, "give it a sigma above 0 and a sentence",
                            "the table of footings has no good row for '%s'", kind_name[kind]);
  return ENL_OK;
}

/* Charge of the fragment around `atom`: a counter-ion does not make an acid a neutral one. */
static int
charge_around (const EnlMolecule *mol, uint32_t atom)
{
  g_autofree uint32_t *fragment = g_new (uint32_t, enl_molecule_atoms (mol) + 1);
  int charge = 0;

  enl_molecule_fragments (mol, fragment);
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++)
    if (fragment[i] == fragment[atom])
      charge += enl_molecule_atom (mol, i)->charge;
  return charge;
}

EnlFootingKind
enl_footing_kind (const EnlMolecule *mol, const EnlPi *pi, const EnlSite *site)
{
  g_auto (EnlPiChange) change = {0};

  if (charge_around (mol, site->atom[0]) > 0)
    return ENL_FOOTING_CATION;
  if (site->kind != ENL_SITE_CARBON)
    return ENL_FOOTING_HETEROATOM;
  enl_pi_deprotonate (pi, site->atom[0], &change);
  return change.energy_gain >= LEAST_GAIN ? ENL_FOOTING_DELOCALISED_CARBON
                                          : ENL_FOOTING_LOCALISED_CARBON;
}

/* Filled once: the table is part of the program, so that a fault in it is a fault of ours. */
static const EnlFooting *
footings (void)
{
  static EnlFooting footing[ENL_N_FOOTINGS];
  static EnlTable *table;
  static gsize ready;

  if (g_once_init_enter (&ready)) {
    size_t size = 0;
    const char *text = enl_resource ("footings.tsv", &size);
    EnlError err;
    EnlStatus status = enl_table_parse (text, size, &table, &err);
    g_assert (status == ENL_OK);
    status = enl_footings_read (table, footing, &err);
    g_assert (status == ENL_OK);
    g_once_init_leave (&ready, 1);
  }
  return footing;
}

const EnlFooting *
enl_footing_in_thf (const EnlMolecule *mol, const EnlPi *pi, const EnlSite *site)
{
  return &footings ()[enl_footing_kind (mol, pi, site)];
}
