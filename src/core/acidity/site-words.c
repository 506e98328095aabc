/* Keeps positions apart: "alpha to the ketone C=O, CH3 side". */
#include <string.h>

#include "core/acidity/site-private.h"
#include "core/molecule/elements.h"

enum { C = 6, N = 7, O = 8 };

enum { MAX_POSITION = 60 };

/* A way to tell two sites apart: words of its own for every site, new string; "" says nothing. */
typedef char *(*Distinction) (const EnlMolecule *mol, const EnlSite *site,
                              const EnlSiteFacts *facts);

static char *
by_hydrogens (const EnlMolecule *mol, const EnlSite *site, const EnlSiteFacts *facts)
{
  const uint32_t n = enl_molecule_total_hydrogens (mol, site->atom[0]);
  const char *side = facts->carbon.reason == ENL_CARBON_ACCEPTOR ? " side" : "";

  if (site->kind != ENL_SITE_CARBON && site->element != N)
    return g_strdup ("");
  if (n == 1)
    return g_strdup_printf ("%sH%s", site->element == C ? "C" : "N", side);
  return g_strdup_printf ("%sH%u%s", site->element == C ? "C" : "N", n, side);
}

static char *
by_isotope (const EnlMolecule *mol, const EnlSite *site, const EnlSiteFacts *facts)
{
  (void)facts;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, site->atom[0]); k++) {
    uint32_t other = enl_molecule_neighbour (mol, site->atom[0], k);
    if (enl_atom_is_hydrogen (mol, other) && enl_molecule_atom (mol, other)->isotope != 0)
      return g_strdup ("labelled");
  }
  return g_strdup ("unlabelled");
}

/* Primary, secondary, tertiary alcohol. */
static char *
by_carbinol (const EnlMolecule *mol, const EnlSite *site, const EnlSiteFacts *facts)
{
  static const char *const word[] = {"methanol", "primary", "secondary", "tertiary"};
  uint32_t carbon = enl_atom_partner (mol, site->atom[0], 1, C), n;

  (void)facts;
  if (site->element != O || carbon == ENL_NONE || !enl_atom_is_saturated (mol, carbon))
    return g_strdup ("");
  n = enl_atom_heavy_degree (mol, carbon) - 1;
  return g_strdup (word[MIN (n, 3)]);
}

/* "alpha to the ketone C=O" may read "alpha to the aryl ketone C=O": two ketones of different kind
 * are told apart by their kind. NULL for other positions. */
static const char *
kind_of_ketone (const EnlMolecule *mol, const EnlSite *site, const EnlSiteFacts *facts)
{
  unsigned traits;

  if (site->kind != ENL_SITE_CARBON || facts->carbon.n_acceptors != 1 ||
      facts->carbon.group[0] != ENL_GROUP_KETONE)
    return NULL;
  traits = enl_group_traits (mol, facts->carbon.acceptor[0]);
  if (traits & ENL_TRAIT_ARYL)
    return "aryl";
  return traits & ENL_TRAIT_RING ? "cyclic" : "open-chain";
}

static void
insert_ketone_kind (EnlSite *site, const char *kind)
{
  const char *at = strstr (site->position, "ketone C=O");
  char *longer;

  if (at == NULL || kind == NULL)
    return;
  longer = g_strdup_printf ("%.*s%s %s", (int)(at - site->position), site->position, kind, at);
  g_free (site->position);
  site->position = longer;
}

/* Names the kinds of ketone where the molecule has more than one kind. */
static void
refine_ketones (const EnlMolecule *mol, EnlSites *sites, const EnlSiteFacts *facts)
{
  const char *first = NULL;
  bool differ = false;

  for (uint32_t i = 0; i < sites->n_sites; i++) {
    const char *kind = kind_of_ketone (mol, &sites->site[i], &facts[i]);
    if (kind == NULL)
      continue;
    differ |= first != NULL && strcmp (first, kind) != 0;
    first = kind;
  }
  for (uint32_t i = 0; differ && i < sites->n_sites; i++)
    insert_ketone_kind (&sites->site[i], kind_of_ketone (mol, &sites->site[i], &facts[i]));
}

/* The first heteroatom on the atom that is no acceptor: "next to O". */
static char *
by_heteroatom (const EnlMolecule *mol, const EnlSite *site, const EnlSiteFacts *facts)
{
  (void)facts;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, site->atom[0]); k++) {
    uint32_t other = enl_molecule_neighbour (mol, site->atom[0], k);
    uint8_t e = enl_molecule_atom (mol, other)->element;
    if (e != C && e != 1 && !enl_group_is_acceptor (enl_group_of (mol, other)))
      return g_strdup_printf ("next to %s", enl_element_symbol (e));
  }
  return g_strdup ("");
}

static char *
by_ring (const EnlMolecule *mol, const EnlSite *site, const EnlSiteFacts *facts)
{
  (void)facts;
  return g_strdup (enl_molecule_in_ring (mol, site->atom[0]) ? "in the ring" : "in the chain");
}

/* The alkyl neighbour that carries fewest hydrogens: "next to CH". */
static char *
by_branch (const EnlMolecule *mol, const EnlSite *site, const EnlSiteFacts *facts)
{
  uint32_t fewest = 4;

  (void)facts;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, site->atom[0]); k++) {
    uint32_t other = enl_molecule_neighbour (mol, site->atom[0], k);
    if (!enl_atom_is_hydrogen (mol, other) && enl_group_of (mol, other) == ENL_GROUP_ALKYL)
      fewest = MIN (fewest, enl_molecule_total_hydrogens (mol, other));
  }
  if (fewest > 3)
    return g_strdup ("");
  if (fewest < 2)
    return g_strdup (fewest == 1 ? "next to CH" : "next to C");
  return g_strdup_printf ("next to CH%u", fewest);
}

static char *
by_atom (const EnlMolecule *mol, const EnlSite *site, const EnlSiteFacts *facts)
{
  uint32_t input = enl_molecule_atom (mol, site->atom[0])->input;

  (void)facts;
  return g_strdup_printf ("atom %u", input > 0 ? input : site->atom[0] + 1);
}

static const Distinction distinction[] = {by_hydrogens, by_isotope, by_carbinol, by_heteroatom,
                                          by_ring,      by_branch,  by_atom};

typedef struct {
  const EnlMolecule *mol;
  EnlSites *sites;
  const EnlSiteFacts *facts;
  GString **suffix;
} Telling;

/* Sites whose position and suffix read the same share a group. Adds the words of distinction number
 * `level` to the members of every group in which they differ. */
static void
apply_level (Telling *t, uint32_t *group, size_t level)
{
  const uint32_t n = t->sites->n_sites;
  g_autoptr (GPtrArray) words = g_ptr_array_new_with_free_func (g_free);

  for (uint32_t i = 0; i < n; i++)
    g_ptr_array_add (words, distinction[level](t->mol, &t->sites->site[i], &t->facts[i]));
  for (uint32_t i = 0; i < n; i++) {
    bool differs = false;
    for (uint32_t j = 0; j < n; j++)
      differs |= group[j] == group[i] && strcmp (words->pdata[i], words->pdata[j]) != 0;
    if (differs && *(const char *)words->pdata[i] != '\0')
      g_string_append_printf (t->suffix[i], ", %s", (const char *)words->pdata[i]);
  }
}

/* group[i] becomes the first site that reads like site i; true when all are different. */
static bool
regroup (const Telling *t, uint32_t *group)
{
  bool distinct = true;

  for (uint32_t i = 0; i < t->sites->n_sites; i++) {
    group[i] = i;
    for (uint32_t j = 0; group[i] == i && j < i; j++)
      if (strcmp (t->sites->site[i].position, t->sites->site[j].position) == 0 &&
          strcmp (t->suffix[i]->str, t->suffix[j]->str) == 0)
        group[i] = j;
    distinct &= group[i] == i;
  }
  return distinct;
}

static void
append_suffix (Telling *t, uint32_t i)
{
  EnlSite *site = &t->sites->site[i];
  char *whole = g_strconcat (site->position, t->suffix[i]->str, NULL);

  if (t->suffix[i]->len > 0 && g_utf8_strlen (whole, -1) > MAX_POSITION) {
    g_autofree char *atom = by_atom (t->mol, site, NULL);
    g_free (whole);
    whole = g_strconcat (site->position, ", ", atom, NULL);
  }
  g_free (site->position);
  site->position = whole;
}

void
enl_site_words_distinct (const EnlMolecule *mol, EnlSites *sites, const EnlSiteFacts *facts)
{
  g_autofree uint32_t *group = g_new (uint32_t, sites->n_sites);
  g_autofree GString **suffix = g_new (GString *, sites->n_sites);
  Telling t = {mol, sites, facts, suffix};

  refine_ketones (mol, sites, facts);
  for (uint32_t i = 0; i < sites->n_sites; i++)
    suffix[i] = g_string_new (NULL);
  for (size_t level = 0; level < ENL_COUNT (distinction) && !regroup (&t, group); level++)
    apply_level (&t, group, level);
  for (uint32_t i = 0; i < sites->n_sites; i++) {
    append_suffix (&t, i);
    g_string_free (suffix[i], TRUE);
  }
}
