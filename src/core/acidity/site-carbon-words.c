/* The position of a C-H in words. */
#include <string.h>

#include "core/acidity/site-private.h"

enum { C = 6, N = 7, O = 8, S = 16, SE = 34 };

/* Longest position before the suffix that keeps two of them apart. */
enum { MAX_WORDS = 48 };

static const char *
acceptor_label (const EnlMolecule *mol, uint32_t atom, EnlGroup group)
{
  const bool ring = (enl_group_traits (mol, atom) & ENL_TRAIT_RING) != 0;

  if ((group == ENL_GROUP_THIOCARBONYL || group == ENL_GROUP_THIOAMIDE) &&
      enl_atom_partner (mol, atom, 2, SE) != ENL_NONE)
    return "C=Se";
  if (group == ENL_GROUP_ESTER && ring)
    return "lactone C=O";
  if (group == ENL_GROUP_THIOESTER && ring)
    return "thiolactone C=O";
  if (group == ENL_GROUP_AMIDE && ring)
    return "lactam C=O";
  if (group == ENL_GROUP_THIOAMIDE && ring)
    return "thiolactam C=S";
  if (group == ENL_GROUP_SULFONE) {
    uint32_t carbons = 0;
    for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
      carbons += enl_molecule_atom (mol, enl_molecule_neighbour (mol, atom, k))->element == C;
    return carbons == 2 ? "sulfone" : enl_group_label (group);
  }
  return enl_group_label (group);
}

/* Formulas stand without an article: "alpha to C=N", but "alpha to the ketone C=O". */
static const char *
article (const char *label)
{
  return strpbrk (label, "=+") != NULL && strchr (label, ' ') == NULL ? "" : "the ";
}

/* "the nitrile", "both nitriles", "all three nitriles". */
static void
append_counted (GString *words, const char *label, uint32_t n)
{
  const bool symbol = strpbrk (label, "=+") != NULL || g_str_has_suffix (label, " N");

  if (n == 1)
    g_string_append_printf (words, "%s%s", article (label), label);
  else
    g_string_append_printf (words, "%s %s%s", n == 2 ? "both" : "all three", label,
                            symbol ? "" : "s");
}

static void
append_joint (GString *words, uint32_t done, uint32_t parts)
{
  if (done > 0)
    g_string_append (words, done + 1 == parts ? " and " : ", ");
}

/* A C=O whose label ends so, and which may be counted with others as "both C=O". */
static bool
is_plain_carbonyl (EnlGroup group)
{
  return enl_group_is_carbonyl (group) && group != ENL_GROUP_CARBOXYLATE;
}

/* "the ketone C=O and the nitrile": carbonyls count together when there are several. */
static void
append_acceptors (GString *words, const EnlMolecule *mol, const EnlCarbonFacts *facts,
                  uint32_t extra_parts)
{
  const char *label[ENL_MAX_ALPHA];
  uint32_t count[ENL_MAX_ALPHA] = {0}, n = 0, plain = 0;

  for (uint32_t i = 0; i < facts->n_acceptors; i++)
    plain += is_plain_carbonyl (facts->group[i]);
  for (uint32_t i = 0; i < facts->n_acceptors; i++) {
    const bool merge = plain > 1 && is_plain_carbonyl (facts->group[i]);
    const char *text = merge ? "C=O" : acceptor_label (mol, facts->acceptor[i], facts->group[i]);
    uint32_t j = 0;

    while (j < n && strcmp (label[j], text) != 0)
      j++;
    label[j] = text;
    count[j]++;
    n = MAX (n, j + 1);
  }
  for (uint32_t j = 0; j < n; j++) {
    append_joint (words, j, n + extra_parts);
    append_counted (words, label[j], count[j]);
  }
}

/* ---- ketones with a longer story ---- */

static bool
carries_oxide (const EnlMolecule *mol, uint32_t atom)
{
  const uint32_t oxygen = enl_atom_partner (mol, atom, 1, O);
  return oxygen != ENL_NONE && enl_molecule_atom (mol, oxygen)->charge < 0;
}

/* O=C-C=C-O- (an end of a 1,3-dicarbonyl anion) or O=C-C- (an enolate drawn with its charge on
 * C). */
static bool
is_beside_enolate (const EnlMolecule *mol, uint32_t ketone)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, ketone); k++) {
    uint32_t other = enl_molecule_neighbour (mol, ketone, k);
    uint32_t end = enl_atom_partner (mol, other, 2, C);

    if (enl_molecule_atom (mol, other)->element == C && enl_molecule_atom (mol, other)->charge < 0)
      return true;
    if (end != ENL_NONE && carries_oxide (mol, end))
      return true;
  }
  return false;
}

/* Words for the acceptor of a ketone that is more than a ketone, or NULL. */
static const char *
special_ketone (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  if (facts->n_acceptors != 1 || facts->group[0] != ENL_GROUP_KETONE)
    return NULL;
  if (enl_site_is_dicarbonyl_gamma (mol, atom, facts))
    return "gamma of the 1,3-dicarbonyl";
  if (is_beside_enolate (mol, facts->acceptor[0]))
    return "alpha' of the enolate";
  if ((enl_group_traits (mol, facts->acceptor[0]) & ENL_TRAIT_VINYL) != 0 &&
      facts->n_vinyls + facts->n_alkynyls == 0)
    return "alpha' of the enone";
  return NULL;
}

/* ---- pi neighbours ---- */

static void
append_unsaturation (GString *words, const EnlCarbonFacts *facts)
{
  static const char *const ring[] = {"", ", cyclopentadiene CH", ", indene C1-H",
                                     ", fluorene C9-H"};

  if (facts->ring5 > 0)
    g_string_append (words, ring[facts->ring5]);
  else if (facts->n_aryls == 1)
    g_string_append (words, " and aryl (benzylic)");
  else if (facts->n_aryls > 1)
    g_string_append (words, " and two aryls (benzylic)");
  else if (facts->n_vinyls > 0)
    g_string_append (words, ", allylic");
  else if (facts->n_alkynyls > 0)
    g_string_append (words, ", propargylic");
}

static char *
acceptor_words (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  const bool aryl = facts->n_aryls > 0 && facts->ring5 == 0;
  const char *special = special_ketone (mol, atom, facts);
  GString *words = g_string_new (special);
  size_t length;

  if (special == NULL) {
    g_string_append (words, "alpha to ");
    append_acceptors (words, mol, facts, aryl);
  }
  length = words->len;
  append_unsaturation (words, facts);
  if (words->len > MAX_WORDS && aryl && special == NULL) {
    g_string_assign (words, "alpha to ");
    append_acceptors (words, mol, facts, 0);
    length = words->len;
    g_string_append (words, ", benzylic");
  }
  if (words->len > MAX_WORDS)
    g_string_truncate (words, length);
  return g_string_free (words, FALSE);
}

/* Noun for the chain of C=C that ends in the far acceptor. */
static const char *
vinylogous_noun (const EnlMolecule *mol, const EnlCarbonFacts *facts)
{
  const bool one = facts->depth == 1, ring = enl_group_traits (mol, facts->far) & ENL_TRAIT_RING;

  switch (enl_group_of (mol, facts->far)) {
  case ENL_GROUP_KETONE:
    return facts->far_alkyne ? "ynone" : one ? "enone" : "polyenone";
  case ENL_GROUP_ALDEHYDE:
    return facts->far_alkyne ? "ynal" : one ? "enal" : "polyenal";
  case ENL_GROUP_ESTER:
    return ring ? "unsaturated lactone" : "unsaturated ester";
  case ENL_GROUP_AMIDE:
    return ring ? "unsaturated lactam" : "unsaturated amide";
  case ENL_GROUP_ACID:
    return "unsaturated acid";
  case ENL_GROUP_CARBOXYLATE:
    return "unsaturated carboxylate";
  case ENL_GROUP_NITRILE:
    return "unsaturated nitrile";
  case ENL_GROUP_NITRO:
    return "nitroalkene";
  case ENL_GROUP_SULFONE:
    return "unsaturated sulfone";
  case ENL_GROUP_SULFOXIDE:
    return "unsaturated sulfoxide";
  case ENL_GROUP_PHOSPHORYL:
    return "unsaturated P=O";
  case ENL_GROUP_IMINE:
  case ENL_GROUP_IMINIUM:
    return "unsaturated C=N";
  default:
    return "unsaturated acceptor";
  }
}

static char *
vinylogous_words (const EnlMolecule *mol, const EnlCarbonFacts *facts)
{
  static const char *const letter[] = {"alpha", "gamma", "epsilon", "eta", "iota"};
  GString *words = g_string_new (NULL);
  size_t length;

  g_string_printf (words, "%s of the %s (vinylogous)", letter[MIN (facts->depth, 4)],
                   vinylogous_noun (mol, facts));
  length = words->len;
  if (facts->ring5 > 0)
    append_unsaturation (words, facts);
  else if (facts->n_aryls > 0)
    g_string_append (words, ", benzylic");
  if (words->len > MAX_WORDS)
    g_string_truncate (words, length);
  return g_string_free (words, FALSE);
}

/* ---- benzylic positions ---- */

typedef struct {
  uint32_t distance; /* of the partner in the ring: 1 ortho, 2 meta, 3 para; 0 none found */
  const char *what;  /* label of the acceptor, or NULL for a ring nitrogen */
} EnlRingPartner;

static uint32_t
ring_index (const uint32_t *ring, uint32_t size, uint32_t atom)
{
  uint32_t i = 0;
  while (i < size && ring[i] != atom)
    i++;
  return i;
}

/* Conjugating acceptor on ring atom `at` (outside the ring), its label or NULL. */
static const char *
acceptor_on (const EnlMolecule *mol, uint32_t at)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, at); k++) {
    uint32_t other = enl_molecule_neighbour (mol, at, k);
    EnlGroup group = enl_group_of (mol, other);

    if (enl_molecule_bond (mol, enl_molecule_bond_at (mol, at, k))->ring ||
        enl_molecule_in_ring (mol, other))
      continue;
    if (enl_group_conjugates (group) || group == ENL_GROUP_SULFONE)
      return acceptor_label (mol, other, group);
  }
  return NULL;
}

/* The best partner in one six-membered aromatic ring: an acceptor ortho or para, else a ring N. */
static EnlRingPartner
partner_in_ring (const EnlMolecule *mol, const uint32_t *ring, uint32_t ipso)
{
  EnlRingPartner best = {0, NULL};

  for (uint32_t i = 1; i < 6; i++) {
    const uint32_t at = ring[(ipso + i) % 6], distance = MIN (i, 6 - i);
    const bool nitrogen = enl_molecule_atom (mol, at)->element == N;
    const char *what = distance == 2 ? NULL : acceptor_on (mol, at);

    if (what != NULL && (best.what == NULL || distance > best.distance))
      best = (EnlRingPartner){distance, what};
    else if (nitrogen && best.what == NULL &&
             (best.distance == 0 || best.distance == 2 || distance == 3))
      best = (EnlRingPartner){distance, NULL};
  }
  return best;
}

static bool
ring_has_hetero (const EnlMolecule *mol, const uint32_t *ring, uint32_t size)
{
  for (uint32_t i = 0; i < size; i++)
    if (enl_molecule_atom (mol, ring[i])->element != C)
      return true;
  return false;
}

/* "benzylic, para to the nitro group", "heterobenzylic, ortho to ring N", "heterobenzylic". */
static char *
single_benzylic_words (const EnlMolecule *mol, uint32_t aryl)
{
  static const char *const where[] = {"", "ortho", "meta", "para"};
  const char *stem = "benzylic";

  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    const uint32_t ipso = ring_index (ring, size, aryl);
    EnlRingPartner partner;

    if (ipso == size)
      continue;
    if (ring_has_hetero (mol, ring, size))
      stem = "heterobenzylic";
    if (size != 6)
      continue;
    partner = partner_in_ring (mol, ring, ipso);
    if (partner.distance > 0 && partner.what == NULL)
      return g_strdup_printf ("heterobenzylic, %s to ring N", where[partner.distance]);
    if (partner.distance > 0)
      return g_strdup_printf ("benzylic, %s to %s%s", where[partner.distance],
                              article (partner.what), partner.what);
  }
  return g_strdup (stem);
}

/* "alpha' of the enolate", "alpha' of the enol": beside C=C that carries O- or OH. NULL for other
 * carbons. */
static const char *
enol_side_words (const EnlMolecule *mol, uint32_t atom)
{
  const char *words = NULL;

  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    uint32_t vinyl = enl_molecule_neighbour (mol, atom, k);
    uint32_t oxygen = enl_atom_partner (mol, vinyl, 1, O);

    if (enl_group_of (mol, vinyl) != ENL_GROUP_VINYL || oxygen == ENL_NONE)
      continue;
    if (enl_molecule_atom (mol, oxygen)->charge < 0)
      return "alpha' of the enolate";
    if (enl_molecule_total_hydrogens (mol, oxygen) > 0)
      words = "alpha' of the enol";
  }
  return words;
}

static char *
pi_words (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  static const char *const ring[] = {"", "cyclopentadiene CH", "indene C1-H", "fluorene C9-H"};
  const uint32_t unsaturated = facts->n_vinyls + facts->n_alkynyls;

  const char *enol = enol_side_words (mol, atom);

  if (facts->depth > 0 && (enol == NULL || !g_str_has_suffix (enol, "enolate")))
    return vinylogous_words (mol, facts);
  if (enol != NULL && facts->n_aryls == 0)
    return g_strdup (enol);
  if (facts->across != ENL_NONE)
    return g_strdup_printf ("vinylogous to the %s across the ring",
                            acceptor_label (mol, facts->across, enl_group_of (mol, facts->across)));
  if (facts->ring5 > 0)
    return g_strdup (ring[facts->ring5]);
  if (facts->n_aryls > 0 && unsaturated > 0)
    return g_strdup (facts->n_vinyls > 0 ? "benzylic and allylic" : "benzylic and propargylic");
  if (facts->n_aryls > 1)
    return g_strdup (facts->n_aryls == 2 ? "benzylic (two aryls)" : "benzylic (three aryls)");
  if (facts->n_aryls == 1)
    return single_benzylic_words (mol, facts->aryl[0]);
  if (facts->n_vinyls > 1)
    return g_strdup (facts->n_vinyls == 2 ? "allylic (two C=C)" : "allylic (three C=C)");
  if (facts->n_vinyls == 1)
    return g_strdup (facts->n_alkynyls > 0 ? "allylic and propargylic" : "allylic");
  return g_strdup ("propargylic");
}

/* ---- the rest ---- */

static uint32_t
count_ring_element (const EnlMolecule *mol, const uint32_t *ring, uint32_t size, uint8_t element)
{
  uint32_t n = 0;
  for (uint32_t i = 0; i < size; i++)
    n += enl_molecule_atom (mol, ring[i])->element == element;
  return n;
}

/* "C2-H of the thiazolium ion". */
static const char *
azolium_ring_words (const EnlMolecule *mol, const uint32_t *ring, uint32_t size)
{
  const uint32_t n = count_ring_element (mol, ring, size, N);
  uint32_t shared = 0;
  bool aromatic = true;

  for (uint32_t i = 0; i < size; i++) {
    aromatic &= enl_molecule_atom (mol, ring[i])->aromatic;
    shared += enl_molecule_ring_count_of_atom (mol, ring[i]) > 1;
  }
  if (size != 5)
    return "C-H of the cyclic formamidinium ion";
  if (!aromatic)
    return n == 2 ? "C2-H of the imidazolinium ion" : "C2-H of the azolinium ion";
  if (count_ring_element (mol, ring, size, S) > 0)
    return shared >= 2 ? "C2-H of the benzothiazolium ion" : "C2-H of the thiazolium ion";
  if (count_ring_element (mol, ring, size, O) > 0)
    return shared >= 2 ? "C2-H of the benzoxazolium ion" : "C2-H of the oxazolium ion";
  if (n == 2)
    return shared >= 2 ? "C2-H of the benzimidazolium ion" : "C2-H of the imidazolium ion";
  return n == 3 ? "C5-H of the triazolium ion" : "C5-H of the azolium ion";
}

static const char *
azolium_words (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t r = 0; r < enl_molecule_rings (mol); r++) {
    uint32_t size;
    const uint32_t *ring = enl_molecule_ring (mol, r, &size);
    if (ring_index (ring, size, atom) < size)
      return azolium_ring_words (mol, ring, size);
  }
  return "C-H of the formamidinium ion";
}

static const char *
cumulene_words (const EnlMolecule *mol, uint32_t atom)
{
  uint32_t middle = enl_atom_partner (mol, atom, 2, C);

  if (enl_atom_partner (mol, middle, 2, O) != ENL_NONE)
    return "C-H of the ketene";
  if (enl_atom_partner (mol, middle, 2, N) != ENL_NONE)
    return "C-H of the ketenimine";
  return "allenic C-H";
}

static const char *
polyhalo_words (const EnlCarbonFacts *facts)
{
  if (facts->n_halogens == 3)
    return "C-H with three halogens";
  return facts->n_halogens == 2 ? "C-H with two halogens" : "C-H between perfluoroalkyl groups";
}

static const char *
between_words (const EnlCarbonFacts *facts)
{
  const uint32_t n = facts->n_sulfides + facts->n_selenides + facts->n_phosphines;

  if (facts->n_sulfides == n)
    return n == 2 ? "between two sulfurs" : "between three sulfurs";
  if (facts->n_phosphines == n)
    return n == 2 ? "between two phosphorus atoms" : "between three phosphorus atoms";
  if (facts->n_selenides == n)
    return n == 2 ? "between two seleniums" : "between three seleniums";
  return facts->n_phosphines > 0 ? "between phosphorus and sulfur" : "between sulfur and selenium";
}

char *
enl_site_carbon_words (const EnlMolecule *mol, uint32_t atom, const EnlCarbonFacts *facts)
{
  switch (facts->reason) {
  case ENL_CARBON_CYANIDE:
    return g_strdup ("C-H of hydrogen cyanide");
  case ENL_CARBON_ACETYLENE:
    return g_strdup ("acetylenic C-H");
  case ENL_CARBON_AZOLIUM:
    return g_strdup (azolium_words (mol, atom));
  case ENL_CARBON_DIAZO:
    return g_strdup ("C-H of the diazo group");
  case ENL_CARBON_CUMULENE:
    return g_strdup (cumulene_words (mol, atom));
  case ENL_CARBON_ACCEPTOR:
    return acceptor_words (mol, atom, facts);
  case ENL_CARBON_PI:
    return pi_words (mol, atom, facts);
  case ENL_CARBON_POLYHALO:
    return g_strdup (polyhalo_words (facts));
  case ENL_CARBON_BETWEEN:
    return g_strdup (between_words (facts));
  case ENL_CARBON_NONE:
  default:
    g_assert_not_reached ();
  }
}
