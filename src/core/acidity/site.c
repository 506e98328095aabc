#include "core/acidity/site.h"

#include "core/acidity/site-private.h"
#include "core/molecule/elements.h"
#include "core/molecule/symmetry.h"

enum { C = 6, N = 7, O = 8, P = 15, S = 16, SE = 34 };

/* ---- equivalence ---- */

/* C=N+ with N beside it: both nitrogens hold half a charge and a half double bond. */
static bool
level_amidinium (EnlMolecule *mol, uint32_t nitrogen)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, nitrogen); k++) {
    uint32_t bond = enl_molecule_bond_at (mol, nitrogen, k);
    uint32_t carbon = enl_molecule_neighbour (mol, nitrogen, k);

    if (enl_molecule_bond (mol, bond)->order != 2 || enl_molecule_atom (mol, carbon)->element != C)
      continue;
    for (uint32_t j = 0; j < enl_molecule_degree (mol, carbon); j++) {
      uint32_t other = enl_molecule_neighbour (mol, carbon, j);
      const EnlAtom *a = enl_molecule_atom (mol, other);
      if (other == nitrogen || a->element != N || a->charge != 0)
        continue;
      enl_molecule_edit_bond (mol, bond)->order = 1;
      enl_molecule_edit_atom (mol, nitrogen)->charge = 0;
      return true;
    }
  }
  return false;
}

/* O- on C=C-C=O: both oxygens are alike. */
static bool
level_dicarbonyl_anion (EnlMolecule *mol, uint32_t oxygen)
{
  const uint32_t near = enl_atom_partner (mol, oxygen, 1, C);
  const uint32_t middle = near == ENL_NONE ? ENL_NONE : enl_atom_partner (mol, near, 2, C);

  for (uint32_t k = 0; middle != ENL_NONE && k < enl_molecule_degree (mol, middle); k++) {
    uint32_t far = enl_molecule_neighbour (mol, middle, k);
    uint32_t end = far == near || enl_atom_is_hydrogen (mol, far)
                       ? ENL_NONE
                       : enl_atom_partner (mol, far, 2, O);

    if (end == ENL_NONE)
      continue;
    enl_molecule_edit_bond (mol, enl_molecule_bond_between (mol, far, end))->order = 1;
    enl_molecule_edit_bond (mol, enl_molecule_bond_between (mol, near, middle))->order = 1;
    enl_molecule_edit_atom (mol, oxygen)->charge = 0;
    return true;
  }
  return false;
}

static bool
needs_levelling (const EnlMolecule *mol)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    const EnlAtom *a = enl_molecule_atom (mol, i);
    if ((a->element == N && enl_atom_is_cation (mol, i)) || (a->element == O && a->charge < 0))
      return true;
  }
  return false;
}

/* Symmetry classes as acidity sees them: mirror images count as equal (so the two CH of a meso
 * ketone are one site), diastereomeric arms do not, and neither charge nor double bond of a
 * symmetric cation or anion is pinned to where it was drawn. True in this last case: the atoms of a
 * class may be drawn differently. */
static bool
find_classes (const EnlMolecule *mol, uint32_t *class_of)
{
  g_autoptr (EnlMolecule) level = NULL;
  bool edited = false;

  if (!needs_levelling (mol)) {
    enl_symmetry_reflected_classes (mol, class_of);
    return false;
  }
  level = enl_molecule_copy (mol);
  for (uint32_t i = 0; i < enl_molecule_atoms (level); i++) {
    const EnlAtom *a = enl_molecule_atom (level, i);

    if (a->element == N && enl_atom_is_cation (level, i))
      edited |= level_amidinium (level, i);
    else if (a->element == O && a->charge < 0)
      edited |= level_dicarbonyl_anion (level, i);
  }
  if (edited)
    enl_molecule_finish (level);
  enl_symmetry_reflected_classes (level, class_of);
  return edited;
}

/* ---- diastereotopic hydrogens ---- */

static bool
has_two_equal_neighbours (const EnlMolecule *mol, uint32_t atom, const uint32_t *class_of)
{
  const uint32_t degree = enl_molecule_degree (mol, atom);

  for (uint32_t k = 0; k < degree; k++)
    for (uint32_t j = 0; j < k; j++)
      if (class_of[enl_molecule_neighbour (mol, atom, k)] ==
          class_of[enl_molecule_neighbour (mol, atom, j)])
        return true;
  return enl_molecule_atom (mol, atom)->hydrogens > 1;
}

/* Carbon with four different neighbours by constitution; S, Se or P of a sulfoxide, sulfonium,
 * sulfoximine or phosphine with different ones. */
static bool
is_stereocentre (const EnlMolecule *mol, uint32_t atom, const uint32_t *class_of)
{
  const EnlAtom *a = enl_molecule_atom (mol, atom);
  const uint32_t degree = enl_molecule_degree (mol, atom);

  if (a->element == C ? degree + a->hydrogens != 4 : degree < 3)
    return false;
  return (a->element == C || a->element == P || a->element == S || a->element == SE) &&
         !has_two_equal_neighbours (mol, atom, class_of);
}

/* Ring carbon whose two substituents outside this ring differ: its faces differ. */
static bool
has_two_faces (const EnlMolecule *mol, const uint32_t *ring, uint32_t size, uint32_t atom,
               const uint32_t *class_of)
{
  uint32_t outside[2], n = 0;

  if (!enl_atom_is_saturated (mol, atom))
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t other = enl_molecule_neighbour (mol, atom, k);
    bool inside = false;

    for (uint32_t i = 0; i < size; i++)
      inside |= ring[i] == other;
    if (!inside && n < 2)
      outside[n++] = class_of[other];
  }
  if (n == 2)
    return outside[0] != outside[1];
  return n == 1 && enl_molecule_atom (mol, atom)->hydrogens == 1;
}

static bool
in_two_faced_ring (const EnlMolecule *mol, uint32_t atom, const uint32_t *class_of)
{
  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    bool inside = false, faces = false;

    for (uint32_t i = 0; i < size; i++) {
      inside |= ring[i] == atom;
      faces |= ring[i] != atom && has_two_faces (mol, ring, size, ring[i], class_of);
    }
    if (inside && faces)
      return true;
  }
  return false;
}

/* The two hydrogens of a CH2 differ in their relation to a stereocentre of the same fragment, or
 * lie on the two different faces of a ring. */
static bool
is_diastereotopic (const EnlMolecule *mol, uint32_t atom, const uint32_t *class_of,
                   const uint32_t *fragment)
{
  uint32_t heavy[2] = {0, 0}, n = 0;

  if (enl_molecule_total_hydrogens (mol, atom) != 2 || enl_atom_heavy_degree (mol, atom) != 2)
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (!enl_atom_is_hydrogen (mol, enl_molecule_neighbour (mol, atom, k)))
      heavy[n++] = class_of[enl_molecule_neighbour (mol, atom, k)];
  if (in_two_faced_ring (mol, atom, class_of))
    return true;
  for (uint32_t i = 0; heavy[0] != heavy[1] && i < enl_molecule_atoms (mol); i++)
    if (fragment[i] == fragment[atom] && i != atom && is_stereocentre (mol, i, class_of))
      return true;
  return false;
}

/* ---- building the list ---- */

typedef struct {
  const EnlMolecule *mol;
  uint32_t *class_of, *fragment;
  bool levelled; /* atoms of one class may be drawn differently */
  GArray *site;  /* EnlSite */
  GArray *facts; /* EnlSiteFacts */
} EnlFinder;

static bool
describe_carbon (const EnlFinder *finder, uint32_t atom, EnlSite *site, EnlSiteFacts *facts)
{
  if (!enl_site_carbon_facts (finder->mol, atom, &facts->carbon))
    return false;
  site->kind = ENL_SITE_CARBON;
  site->alpha_carbonyl = facts->carbon.n_carbonyls > 0;
  site->diastereotopic = is_diastereotopic (finder->mol, atom, finder->class_of, finder->fragment);
  site->position = enl_site_carbon_words (finder->mol, atom, &facts->carbon);
  facts->tier = enl_site_carbon_tier (finder->mol, atom, &facts->carbon);
  return true;
}

static bool
describe_hetero (const EnlFinder *finder, uint32_t atom, EnlSite *site, EnlSiteFacts *facts)
{
  EnlHeteroFacts hetero;

  if (!enl_site_hetero_facts (finder->mol, atom, &hetero))
    return false;
  site->kind = hetero.kind;
  site->acidic_heteroatom = hetero.competing;
  site->position = g_strdup (hetero.words);
  facts->tier = hetero.tier;
  return true;
}

/* All atoms of the class of `member`. */
static void
collect_class (const EnlFinder *finder, uint32_t member, EnlSite *site)
{
  const uint32_t n = enl_molecule_atoms (finder->mol), class = finder->class_of[member];

  for (uint32_t i = 0; i < n; i++)
    site->n_atoms += finder->class_of[i] == class;
  site->atom = g_new (uint32_t, site->n_atoms);
  site->n_atoms = 0;
  for (uint32_t i = 0; i < n; i++) {
    if (finder->class_of[i] != class)
      continue;
    site->atom[site->n_atoms++] = i;
    site->hydrogens += enl_molecule_total_hydrogens (finder->mol, i);
  }
}

/* The carbon of the class of `first` that shows its reason best, so that facts and words do not
 * depend on which one the drawing names first. */
static uint32_t
representative (const EnlFinder *finder, uint32_t first)
{
  EnlCarbonReason best = ENL_CARBON_NONE;
  uint32_t chosen = first;

  if (!finder->levelled || enl_molecule_atom (finder->mol, first)->element != C)
    return first;
  for (uint32_t i = first; i < enl_molecule_atoms (finder->mol); i++) {
    EnlCarbonFacts facts;
    if (finder->class_of[i] != finder->class_of[first] ||
        !enl_site_carbon_facts (finder->mol, i, &facts))
      continue;
    if (best == ENL_CARBON_NONE || facts.reason < best) {
      best = facts.reason;
      chosen = i;
    }
  }
  return chosen;
}

static bool
find_site (EnlFinder *finder, uint32_t atom)
{
  EnlSite site = {.element = enl_molecule_atom (finder->mol, atom)->element};
  EnlSiteFacts facts = {0};
  bool found = site.element == C ? describe_carbon (finder, atom, &site, &facts)
                                 : describe_hetero (finder, atom, &site, &facts);

  if (!found)
    return false;
  collect_class (finder, atom, &site);
  g_array_append_val (finder->site, site);
  g_array_append_val (finder->facts, facts);
  return true;
}

static void
find_all (EnlFinder *finder)
{
  const uint32_t n = enl_molecule_atoms (finder->mol);
  g_autofree bool *done = g_new0 (bool, n + 1);

  for (uint32_t i = 0; i < n; i++)
    if (!done[finder->class_of[i]])
      done[finder->class_of[i]] = find_site (finder, representative (finder, i));
}

static EnlSites *
build (EnlFinder *finder)
{
  const EnlSiteFacts *facts;
  EnlSites *sites = g_new0 (EnlSites, 1);

  find_all (finder);
  facts = (const EnlSiteFacts *)(void *)finder->facts->data;
  sites->n_sites = finder->site->len;
  sites->site = (EnlSite *)(void *)g_array_free (finder->site, FALSE);
  for (uint32_t i = 0; i < sites->n_sites; i++)
    sites->has_carbon_acid |= sites->site[i].kind == ENL_SITE_CARBON;
  enl_site_words_distinct (finder->mol, sites, facts);
  enl_site_order_flags (finder->mol, sites, facts, finder->fragment);
  sites->no_enol = enl_site_no_enol (finder->mol, sites, facts);
  g_array_free (finder->facts, TRUE);
  return sites;
}

EnlStatus
enl_sites_find (const EnlMolecule *mol, EnlSites **out, EnlError *err)
{
  const uint32_t n = enl_molecule_atoms (mol), heavy = enl_molecule_heavy_atoms (mol);
  g_autofree uint32_t *class_of = g_new0 (uint32_t, n + 1), *fragment = g_new0 (uint32_t, n + 1);
  EnlFinder finder = {.mol = mol};

  *out = NULL;
  if (heavy > ENL_MAX_HEAVY)
    return enl_error_set (err, ENL_ERROR_LIMIT, "cut the structure down to the part of interest",
                          "%u heavy atoms, but sites are found for %d at most", heavy,
                          ENL_MAX_HEAVY);
  finder.class_of = class_of;
  finder.fragment = fragment;
  finder.site = g_array_new (FALSE, FALSE, sizeof (EnlSite));
  finder.facts = g_array_new (FALSE, FALSE, sizeof (EnlSiteFacts));
  if (n > 0) {
    finder.levelled = find_classes (mol, class_of);
    enl_molecule_fragments (mol, fragment);
  }
  *out = build (&finder);
  return ENL_OK;
}

void
enl_sites_free (EnlSites *sites)
{
  if (sites == NULL)
    return;
  for (uint32_t i = 0; i < sites->n_sites; i++) {
    g_free (sites->site[i].atom);
    g_free (sites->site[i].position);
  }
  g_free (sites->site);
  g_free (sites->no_enol);
  g_free (sites);
}

const EnlSite *
enl_sites_of_atom (const EnlSites *sites, uint32_t atom)
{
  for (uint32_t i = 0; i < sites->n_sites; i++)
    for (uint32_t k = 0; k < sites->site[i].n_atoms; k++)
      if (sites->site[i].atom[k] == atom)
        return &sites->site[i];
  return NULL;
}
