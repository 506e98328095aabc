/* Sums over atoms: formula, mass, charge, heavy atoms. */
#include "core/molecule/molecule-private.h"

#include "core/molecule/elements.h"

static void
append_count (GString *out, uint8_t element, uint32_t count)
{
  if (!count)
    return;
  g_string_append (out, enl_element_symbol (element));
  if (count > 1)
    g_string_append_printf (out, "%u", count);
}

/* Hill order: carbon, hydrogen, then by symbol; without carbon all by symbol (E. A. Hill, J. Am.
 * Chem. Soc. 1900, 22, 478). */
static void
append_hill (GString *out, uint32_t count[ENL_N_ELEMENTS])
{
  if (count[6]) {
    append_count (out, 6, count[6]);
    append_count (out, 1, count[1]);
    count[6] = count[1] = 0;
  }
  for (;;) {
    uint8_t best = 0;
    bool found = false;
    for (uint8_t e = 0; e < ENL_N_ELEMENTS; e++)
      if (count[e] &&
          (!found || g_strcmp0 (enl_element_symbol (e), enl_element_symbol (best)) < 0)) {
        best = e;
        found = true;
      }
    if (!found)
      return;
    append_count (out, best, count[best]);
    count[best] = 0;
  }
}

char *
enl_molecule_formula (const EnlMolecule *mol)
{
  uint32_t count[ENL_N_ELEMENTS] = {0};
  GString *out = g_string_new (NULL);
  int charge = enl_molecule_charge (mol);

  for (uint32_t a = 0; a < mol->n_atoms; a++) {
    count[mol->atom[a].element]++;
    count[1] += mol->atom[a].hydrogens;
  }
  append_hill (out, count);
  if (charge)
    g_string_append_c (out, charge > 0 ? '+' : '-');
  if (ABS (charge) > 1)
    g_string_append_printf (out, "%d", ABS (charge));
  return g_string_free (out, FALSE);
}

double
enl_molecule_mass (const EnlMolecule *mol)
{
  double mass = 0.0;

  for (uint32_t a = 0; a < mol->n_atoms; a++) {
    const EnlAtom *atom = &mol->atom[a];
    mass += enl_element_weight (atom->element) + atom->hydrogens * enl_element_weight (1);
  }
  return mass;
}

uint32_t
enl_molecule_heavy_atoms (const EnlMolecule *mol)
{
  uint32_t n = 0;

  for (uint32_t a = 0; a < mol->n_atoms; a++)
    n += mol->atom[a].element != 1;
  return n;
}

int
enl_molecule_charge (const EnlMolecule *mol)
{
  int charge = 0;

  for (uint32_t a = 0; a < mol->n_atoms; a++)
    charge += mol->atom[a].charge;
  return charge;
}
