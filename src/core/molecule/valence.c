#include "core/molecule/valence.h"

#include "core/molecule/elements.h"
#include "core/molecule/molecule-private.h"

enum {
  HYDROGEN = 1,
  CARBON = 6,
  NITROGEN = 7,
  OXYGEN = 8,
  CHLORINE = 17,
  BROMINE = 35,
  MAX_NEIGHBOURS = 16 /* the highest coordination number known for any atom */
};

uint32_t
enl_valence_implicit_hydrogens (uint8_t element, uint32_t order_sum)
{
  size_t count;
  const uint8_t *valence = enl_element_unwritten_valences (element, &count);

  for (size_t i = 0; i < count; i++)
    if (valence[i] >= order_sum)
      return valence[i] - order_sum;
  return 0;
}

const uint8_t *
enl_valence_usual (uint8_t element, int charge, size_t *count)
{
  static const uint8_t small[] = {0, 1, 2};
  int outer = enl_element_outer_electrons (element);
  int left = outer - charge;

  *count = 0;
  if (outer == 0)
    return NULL;
  if (charge == 0)
    return enl_element_valences (element, count);
  *count = 1;
  if (left <= 0 || left > 8)
    return &small[0];
  if (element <= 2)
    return &small[left == 1];
  if (left <= 2)
    return &small[left];
  return enl_element_valences ((uint8_t)(element - charge), count);
}

uint8_t
enl_valence_unpaired (uint8_t element, int charge, uint32_t bonds)
{
  size_t count;
  const uint8_t *valence = enl_valence_usual (element, charge, &count);
  int left = enl_element_outer_electrons (element) - charge;
  int missing = (element <= 2 ? 2 : 8) - left - (int)bonds;

  if (count == 0 || left < 0)
    return 0;
  for (size_t i = 0; missing < 0 && i < count; i++)
    if (valence[i] >= bonds)
      missing = (int)(valence[i] - bonds);
  return (uint8_t)CLAMP (MIN (missing, left - (int)bonds), 0, 8);
}

/* A neighbour that takes the negative charge of `nitrogen`: bonded by `order`, at the end of its
 * branch, neutral. */
static uint32_t
find_taker (const EnlMolecule *mol, uint32_t nitrogen, uint8_t element, uint8_t order)
{
  for (uint32_t i = mol->first[nitrogen]; i < mol->first[nitrogen + 1]; i++) {
    const EnlAtom *end = &mol->atom[mol->neighbour[i]];
    if (end->element == element && end->charge == 0 && end->hydrogens == 0 &&
        mol->bond[mol->via[i]].order == order && enl_molecule_degree (mol, mol->neighbour[i]) == 1)
      return mol->via[i];
  }
  return ENL_NONE;
}

bool
enl_valence_separate_charges (EnlMolecule *mol)
{
  bool changed = false;

  for (uint32_t a = 0; a < mol->n_atoms; a++) {
    EnlAtom *atom = &mol->atom[a];
    if (atom->element != NITROGEN || atom->charge != 0 ||
        enl_molecule_order_sum (mol, a) + atom->hydrogens != 5)
      continue;
    uint32_t bond = find_taker (mol, a, OXYGEN, 2);
    if (bond == ENL_NONE)
      bond = find_taker (mol, a, NITROGEN, 3);
    if (bond == ENL_NONE)
      continue;
    EnlAtom *taker = &mol->atom[enl_molecule_other_end (mol, bond, a)];
    mol->bond[bond].order--;
    atom->charge = 1;
    taker->charge = -1;
    atom->unpaired = taker->unpaired = 0;
    changed = true;
  }
  return changed;
}

/* True when the usual valences allow `bonds`. Where the hydrogens were inferred they would have
 * filled a usual valence, so that any other number is wrong. */
static bool
is_allowed (const EnlAtom *atom, uint32_t bonds)
{
  size_t count;
  const uint8_t *valence = enl_valence_usual (atom->element, atom->charge, &count);

  if (count == 0 || !enl_element_is_strict (atom->element))
    return true;
  if (atom->exact || atom->charge)
    return bonds <= valence[count - 1];
  for (size_t i = 0; i < count; i++)
    if (bonds == valence[i])
      return true;
  /* Elements outside the organic subset get no inferred hydrogens, fewer bonds are no fault. */
  enl_element_unwritten_valences (atom->element, &count);
  return count == 0 && bonds < valence[0];
}

/* Chlorine and bromine go beyond one bond only with oxygen, nitrogen and halogens (common
 * practice), so that C-Cl-C is a slip of the pen. */
static bool
is_halogen_in_a_chain (const EnlMolecule *mol, uint32_t a)
{
  uint32_t carbons = 0;

  if ((mol->atom[a].element != CHLORINE && mol->atom[a].element != BROMINE) || mol->atom[a].charge)
    return false;
  for (uint32_t i = mol->first[a]; i < mol->first[a + 1]; i++)
    carbons += mol->atom[mol->neighbour[i]].element == CARBON;
  return carbons > 1;
}

static const char *
find_charge_that_fits (const EnlAtom *atom, uint32_t bonds)
{
  size_t count;
  const uint8_t *valence = enl_valence_usual (atom->element, atom->charge + 1, &count);

  if (count && valence[count - 1] >= bonds)
    return " or give it a positive charge";
  valence = enl_valence_usual (atom->element, atom->charge - 1, &count);
  if (count && valence[count - 1] >= bonds)
    return " or give it a negative charge";
  return "";
}

static void
describe_charge (int charge, char *buffer, size_t size)
{
  if (charge)
    g_snprintf (buffer, size, " and charge %+d", charge);
  else
    buffer[0] = '\0';
}

/* "3", "3 or 5", "2, 4 or 6" */
static void
list_valences (const uint8_t *valence, size_t count, char *buffer, size_t size)
{
  size_t used = 0;

  for (size_t i = 0; i < count && used < size; i++)
    used += (size_t)g_snprintf (buffer + used, size - used, "%s%u",
                                i == 0           ? ""
                                : i + 1 == count ? " or "
                                                 : ", ",
                                valence[i]);
}

static EnlStatus
report (const EnlAtom *atom, EnlError *err)
{
  if (err) {
    err->offset = atom->offset;
    err->length = MAX (atom->length, 1);
  }
  return ENL_ERROR_CHEMISTRY;
}

static EnlStatus
report_too_many (const EnlAtom *atom, uint32_t bonds, EnlError *err)
{
  size_t count;
  const uint8_t *valence = enl_valence_usual (atom->element, atom->charge, &count);
  char charge[32], list[40] = "", advice[160] = "remove bonds";

  describe_charge (atom->charge, charge, sizeof charge);
  list_valences (valence, count, list, sizeof list);
  if (count)
    g_snprintf (advice, sizeof advice, "%s %s takes %s; remove a bond or hydrogen%s",
                atom->charge ? "so charged," : "neutral", enl_element_name (atom->element), list,
                find_charge_that_fits (atom, bonds));
  enl_error_set (err, ENL_ERROR_CHEMISTRY, advice, "%s with %u bond%s%s",
                 enl_element_name (atom->element), bonds, bonds == 1 ? "" : "s", charge);
  return report (atom, err);
}

static EnlStatus
report_halogen (const EnlAtom *atom, EnlError *err)
{
  const char *name = enl_element_name (atom->element);
  char advice[120];

  g_snprintf (advice, sizeof advice, "%s ends a chain; check the parentheses around it", name);
  enl_error_set (err, ENL_ERROR_CHEMISTRY, advice, "%s between carbon atoms", name);
  return report (atom, err);
}

static EnlStatus
report_crowd (const EnlAtom *atom, uint32_t neighbours, EnlError *err)
{
  enl_error_set (err, ENL_ERROR_CHEMISTRY, "remove bonds; no atom holds so many",
                 "%s with %u neighbours", enl_element_name (atom->element), neighbours);
  return report (atom, err);
}

static EnlStatus
check_atom (const EnlMolecule *mol, uint32_t a, EnlError *err)
{
  const EnlAtom *atom = &mol->atom[a];
  uint32_t written = enl_molecule_order_sum (mol, a), bonds = written + atom->hydrogens;

  if (enl_molecule_degree (mol, a) > MAX_NEIGHBOURS)
    return report_crowd (atom, enl_molecule_degree (mol, a), err);
  if (is_halogen_in_a_chain (mol, a))
    return report_halogen (atom, err);
  if (is_allowed (atom, bonds))
    return ENL_OK;
  /* Tell the number that the person can count in the text. */
  return report_too_many (atom, atom->exact ? bonds : written, err);
}

EnlStatus
enl_valence_check (const EnlMolecule *mol, uint32_t *atom, EnlError *err)
{
  g_assert (mol->linked);
  for (uint32_t a = 0; a < mol->n_atoms; a++) {
    EnlStatus status = check_atom (mol, a, err);
    if (status == ENL_OK)
      continue;
    if (atom)
      *atom = a;
    return status;
  }
  return ENL_OK;
}
