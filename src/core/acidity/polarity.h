/* Sigma charges by partial equalisation of orbital electronegativity (Gasteiger and Marsili,
 * Tetrahedron 1980, 36, 3219): charge flows along every bond towards the more electronegative end,
 * half as much in every round, which leaves a picture of the inductive effect.
 */
#pragma once

#include "core/molecule/molecule.h"

typedef struct EnlPolarityTable EnlPolarityTable;

/* Reads electronegativity.tsv: element, hybridisation, coefficients a, b, c in eV. */
EnlStatus enl_polarity_table_new (const char *text, size_t size, EnlPolarityTable **out,
                                  EnlError *err) ENL_MUST_USE;
void enl_polarity_table_free (EnlPolarityTable *table);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlPolarityTable, enl_polarity_table_free)

/* Fills charge[atom] (net, elementary charges) and hydrogen[atom] (net charge of each unwritten
 * hydrogen there). `coordination[atom]` is 1, 2 or 3 for sp, sp2, sp3. Elements without a row keep
 * their formal charge and exchange nothing. */
void enl_polarity_charges (const EnlPolarityTable *table, const EnlMolecule *mol,
                           const uint8_t *coordination, double *charge, double *hydrogen);
