/* Counts of the groups on the acidic atom and one bond further, and what they are together. */
#include "core/acidity/descriptor-view.h"

enum { CARBON = 6, NITROGEN = 7, OXYGEN = 8, FLUORINE = 9, PHOSPHORUS = 15, SULFUR = 16 };

#define SET(name, expression) (view->value[ENL_D_##name] = (double)(expression))
#define ADD(name, expression) (view->value[ENL_D_##name] += (double)(expression))

/* Kind under which a group is counted, -1 for none. */
static const int8_t kind_of_group[ENL_N_GROUPS] = {
    [ENL_GROUP_OTHER] = -1,
    [ENL_GROUP_ALKYL] = ENL_KIND_alkyl,
    [ENL_GROUP_VINYL] = ENL_KIND_vinyl,
    [ENL_GROUP_ALKYNYL] = ENL_KIND_alkynyl,
    [ENL_GROUP_ARYL] = ENL_KIND_aryl,
    [ENL_GROUP_ALDEHYDE] = ENL_KIND_aldehyde,
    [ENL_GROUP_KETONE] = ENL_KIND_ketone,
    [ENL_GROUP_ESTER] = ENL_KIND_ester,
    [ENL_GROUP_THIOESTER] = ENL_KIND_thioester,
    [ENL_GROUP_AMIDE] = ENL_KIND_amide,
    [ENL_GROUP_IMIDE] = ENL_KIND_amide,
    [ENL_GROUP_ACID] = ENL_KIND_ester,
    [ENL_GROUP_CARBOXYLATE] = ENL_KIND_carboxylate,
    [ENL_GROUP_ANHYDRIDE] = ENL_KIND_ester,
    [ENL_GROUP_ACYL_HALIDE] = ENL_KIND_acyl_halide,
    [ENL_GROUP_ACYL_SILANE] = ENL_KIND_ketone,
    [ENL_GROUP_KETENE] = ENL_KIND_vinyl,
    [ENL_GROUP_CARBONIC] = ENL_KIND_carbonic,
    [ENL_GROUP_THIOCARBONYL] = ENL_KIND_thiocarbonyl,
    [ENL_GROUP_THIOAMIDE] = ENL_KIND_thiocarbonyl,
    [ENL_GROUP_IMINE] = ENL_KIND_imine,
    [ENL_GROUP_IMINIUM] = ENL_KIND_imine,
    [ENL_GROUP_NITRILE] = ENL_KIND_nitrile,
    [ENL_GROUP_DIAZO] = ENL_KIND_imine,
    [ENL_GROUP_AMINE] = ENL_KIND_amine,
    [ENL_GROUP_AMMONIUM] = ENL_KIND_ammonium,
    [ENL_GROUP_N_OXIDE] = ENL_KIND_ammonium,
    [ENL_GROUP_ISOCYANIDE] = ENL_KIND_nitrile,
    [ENL_GROUP_NITRO] = ENL_KIND_nitro,
    [ENL_GROUP_NITROSO] = ENL_KIND_double_nitrogen,
    [ENL_GROUP_AZO] = ENL_KIND_double_nitrogen,
    [ENL_GROUP_AZIDE] = ENL_KIND_double_nitrogen,
    [ENL_GROUP_IMINE_N] = ENL_KIND_double_nitrogen,
    [ENL_GROUP_OXYGEN] = ENL_KIND_oxygen,
    [ENL_GROUP_FLUORINE] = ENL_KIND_fluorine,
    [ENL_GROUP_HALOGEN] = ENL_KIND_halogen,
    [ENL_GROUP_SULFIDE] = ENL_KIND_sulfide,
    [ENL_GROUP_SELENIDE] = ENL_KIND_selenide,
    [ENL_GROUP_SULFOXIDE] = ENL_KIND_sulfoxide,
    [ENL_GROUP_SULFONE] = ENL_KIND_sulfone,
    [ENL_GROUP_SULFOXIMINE] = ENL_KIND_sulfone,
    [ENL_GROUP_SULFILIMINE] = ENL_KIND_sulfoxide,
    [ENL_GROUP_SULFONIUM] = ENL_KIND_sulfonium,
    [ENL_GROUP_SULFOXONIUM] = ENL_KIND_sulfonium,
    [ENL_GROUP_PHOSPHINE] = -1,
    [ENL_GROUP_PHOSPHORYL] = ENL_KIND_phosphoryl,
    [ENL_GROUP_PHOSPHONIUM] = ENL_KIND_phosphonium,
    [ENL_GROUP_SILYL] = ENL_KIND_silyl,
    [ENL_GROUP_BORYL] = -1,
};

/* Kinds that draw electrons out of the acidic atom by resonance or polarisation. */
static const int8_t acceptor_kind[] = {
    ENL_KIND_aldehyde,     ENL_KIND_ketone,      ENL_KIND_ester,   ENL_KIND_amide,
    ENL_KIND_thioester,    ENL_KIND_acyl_halide, ENL_KIND_nitrile, ENL_KIND_nitro,
    ENL_KIND_thiocarbonyl, ENL_KIND_carbonic,    ENL_KIND_sulfone, ENL_KIND_sulfoxide,
    ENL_KIND_phosphoryl,   ENL_KIND_imine,
};

static void
count_kinds (EnlSiteView *view)
{
  for (uint32_t i = 0; i < view->n_next; i++) {
    uint32_t x = view->next[i];
    int kind = kind_of_group[enl_survey_group (view->survey, x)];
    if (kind >= 0)
      view->value[ENL_D_next + kind]++;
    /* Across a saturated carbon only the field of a group is felt (descriptor-polar.c). */
    if (enl_survey_group (view->survey, x) == ENL_GROUP_ALKYL)
      continue;
    for (uint32_t k = 0; k < enl_molecule_degree (view->mol, x); k++) {
      uint32_t y = enl_molecule_neighbour (view->mol, x, k);
      if (y == view->site || enl_atom_is_hydrogen (view->mol, y))
        continue;
      kind = kind_of_group[enl_survey_group (view->survey, y)];
      if (kind >= 0)
        view->value[ENL_D_beta + kind]++;
    }
  }
}

static void
fill_acceptors (EnlSiteView *view)
{
  double n = 0;

  for (size_t k = 0; k < ENL_COUNT (acceptor_kind); k++)
    n += enl_view_next (view, acceptor_kind[k]);
  SET (acceptors, n);
  SET (acceptors_squared, n * n);
  SET (acceptors_alkyl, n * enl_view_next (view, ENL_KIND_alkyl));
  SET (acceptors_aryl, n * enl_view_next (view, ENL_KIND_aryl));
  SET (acceptors_donor,
       n * (enl_view_next (view, ENL_KIND_oxygen) + enl_view_next (view, ENL_KIND_amine) +
            enl_view_next (view, ENL_KIND_sulfide)));
  SET (conjugating, view->n_acceptors);
}

static void
fill_traits (EnlSiteView *view)
{
  for (uint32_t i = 0; i < view->n_next; i++) {
    uint32_t x = view->next[i];
    EnlGroup group = enl_survey_group (view->survey, x);
    unsigned traits = enl_group_traits (view->mol, x);
    bool ester = group == ENL_GROUP_ESTER, sulfone = group == ENL_GROUP_SULFONE;
    ADD (lactone, ester && (traits & ENL_TRAIT_RING));
    ADD (lactam,
         (group == ENL_GROUP_AMIDE || group == ENL_GROUP_IMIDE) && (traits & ENL_TRAIT_RING));
    ADD (aryl_ester, ester && (traits & ENL_TRAIT_ARYL));
    ADD (thioamide, group == ENL_GROUP_THIOAMIDE);
    ADD (triflyl, sulfone && (traits & ENL_TRAIT_CF3));
    ADD (aryl_ketone, group == ENL_GROUP_KETONE && (traits & ENL_TRAIT_ARYL));
    ADD (sulfoximine, group == ENL_GROUP_SULFOXIMINE);
    ADD (trifluoromethyl, enl_group_is_cf3 (view->mol, x));
  }
}

static void
fill_elements (EnlSiteView *view)
{
  int aromatic = 0;

  for (uint32_t i = 0; i < view->n_next; i++) {
    const EnlAtom *atom = enl_molecule_atom (view->mol, view->next[i]);
    EnlHybrid hybrid = enl_survey_hybrid (view->survey, view->next[i]);
    aromatic += atom->aromatic;
    ADD (next_n, atom->element == NITROGEN);
    ADD (next_o, atom->element == OXYGEN);
    ADD (next_s, atom->element == SULFUR);
    ADD (next_p, atom->element == PHOSPHORUS);
    ADD (next_sp2, atom->element == CARBON && hybrid == ENL_HYBRID_SP2);
    ADD (next_sp, atom->element == CARBON && hybrid == ENL_HYBRID_SP);
  }
  SET (next_aromatic, aromatic);
  SET (two_aryl, aromatic >= 2);
  SET (two_aryl_tertiary,
       aromatic >= 2 && view->carbon && enl_molecule_total_hydrogens (view->mol, view->site) == 1);
  SET (conjugating_aryl, aromatic * (int)view->n_acceptors);
  SET (alpha_halogen, enl_view_next (view, ENL_KIND_halogen));
}

/* Far side of one acceptor: what else its carbon carries. */
static void
add_acceptor_side (EnlSiteView *view, uint32_t x, uint32_t y)
{
  const EnlAtom *atom = enl_molecule_atom (view->mol, y);

  if (atom->element == CARBON && enl_survey_hybrid (view->survey, y) == ENL_HYBRID_SP3) {
    ADD (acceptor_alkyl, 1);
    ADD (acceptor_branches, MAX ((int)enl_atom_heavy_degree (view->mol, y) - 2, 0));
  }
  ADD (acceptor_aryl, atom->aromatic);
  ADD (acceptor_anion, atom->charge < 0 && enl_molecule_atom (view->mol, x)->charge <= 0);
  for (uint32_t k = 0; k < enl_molecule_degree (view->mol, y); k++) {
    uint32_t z = enl_molecule_neighbour (view->mol, y, k);
    bool fluorine = enl_molecule_atom (view->mol, z)->element == FLUORINE;
    ADD (acceptor_fluorine, fluorine);
    ADD (acceptor_halogen, !fluorine && enl_atom_is_halogen (view->mol, z));
  }
}

void
enl_view_fill_groups (EnlSiteView *view)
{
  count_kinds (view);
  fill_acceptors (view);
  fill_traits (view);
  fill_elements (view);
  for (uint32_t i = 0; i < view->n_acceptors; i++) {
    uint32_t x = view->acceptor[i];
    for (uint32_t k = 0; k < enl_molecule_degree (view->mol, x); k++) {
      uint32_t y = enl_molecule_neighbour (view->mol, x, k);
      if (y != view->site)
        add_acceptor_side (view, x, y);
    }
  }
}
