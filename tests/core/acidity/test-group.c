/* Kinds and traits of groups, asked at the atom with map 1. */
#include "core/acidity/group.h"

#include <string.h>

#include "core/notation/smiles.h"
#include "tests/runner.h"

#define RING   ENL_TRAIT_RING
#define ARYL   ENL_TRAIT_ARYL
#define VINYL  ENL_TRAIT_VINYL
#define CF3    ENL_TRAIT_CF3
#define ACID_H ENL_TRAIT_HYDROGEN

static const struct {
  const char *label, *smiles;
  EnlGroup group;
  unsigned traits;
} group_case[] = {
    {"alkyl", "C[CH2:1]C", ENL_GROUP_ALKYL, 0},
    {"vinyl", "C[CH:1]=C", ENL_GROUP_VINYL, 0},
    {"allene", "C[CH:1]=C=C", ENL_GROUP_VINYL, 0},
    {"alkynyl", "C[C:1]#C", ENL_GROUP_ALKYNYL, 0},
    {"aryl", "C[c:1]1ccccc1", ENL_GROUP_ARYL, 0},
    {"aryl, Kekulé", "C[C:1]1=CC=CC=C1", ENL_GROUP_ARYL, 0},
    {"aldehyde", "C[CH:1]=O", ENL_GROUP_ALDEHYDE, 0},
    {"enal", "C=C[CH:1]=O", ENL_GROUP_ALDEHYDE, VINYL},
    {"ketone", "C[C:1](C)=O", ENL_GROUP_KETONE, 0},
    {"aryl ketone", "C[C:1](=O)c1ccccc1", ENL_GROUP_KETONE, ARYL},
    {"cyclic ketone", "C1C[C:1](=O)CC1", ENL_GROUP_KETONE, RING},
    {"trifluoromethyl ketone", "C[C:1](=O)C(F)(F)F", ENL_GROUP_KETONE, CF3},
    {"ester", "C[C:1](=O)OC", ENL_GROUP_ESTER, 0},
    {"aryl ester", "C[C:1](=O)Oc1ccccc1", ENL_GROUP_ESTER, ARYL},
    {"lactone", "C1C[C:1](=O)OC1", ENL_GROUP_ESTER, RING},
    {"carbocyclic ester is no lactone", "C1CC1[C:1](=O)OC", ENL_GROUP_ESTER, 0},
    {"thioester", "C[C:1](=O)SC", ENL_GROUP_THIOESTER, 0},
    {"amide", "C[C:1](=O)N(C)C", ENL_GROUP_AMIDE, 0},
    {"amide with N-H", "C[C:1](=O)NC", ENL_GROUP_AMIDE, ACID_H},
    {"lactam", "C1C[C:1](=O)N(C)C1", ENL_GROUP_AMIDE, RING},
    {"imide", "C[C:1](=O)N(C)C(C)=O", ENL_GROUP_IMIDE, 0},
    {"acid", "C[C:1](=O)O", ENL_GROUP_ACID, ACID_H},
    {"thioacid", "C[C:1](=O)S", ENL_GROUP_ACID, ACID_H},
    {"carboxylate", "C[C:1](=O)[O-]", ENL_GROUP_CARBOXYLATE, 0},
    {"anhydride", "C[C:1](=O)OC(C)=O", ENL_GROUP_ANHYDRIDE, 0},
    {"acyl chloride", "C[C:1](=O)Cl", ENL_GROUP_ACYL_HALIDE, 0},
    {"acylsilane", "C[C:1](=O)[Si](C)(C)C", ENL_GROUP_ACYL_SILANE, 0},
    {"ketene", "C=[C:1]=O", ENL_GROUP_KETENE, 0},
    {"urea", "N[C:1](N)=O", ENL_GROUP_CARBONIC, ACID_H},
    {"carbamate", "CN(C)[C:1](=O)OC", ENL_GROUP_CARBONIC, 0},
    {"isocyanate", "CN=[C:1]=O", ENL_GROUP_CARBONIC, 0},
    {"pyridone is an N-aryl amide", "O=[c:1]1cccc[nH]1", ENL_GROUP_AMIDE, RING | ARYL | ACID_H},
    {"thioketone", "C[C:1](C)=S", ENL_GROUP_THIOCARBONYL, 0},
    {"thioamide", "C[C:1](=S)N(C)C", ENL_GROUP_THIOAMIDE, 0},
    {"imine", "C[C:1](C)=NC", ENL_GROUP_IMINE, 0},
    {"nitrone", "C[C:1](C)=[N+](C)[O-]", ENL_GROUP_IMINE, 0},
    {"iminium", "C[C:1](C)=[N+](C)C", ENL_GROUP_IMINIUM, 0},
    {"nitrile", "C[C:1]#N", ENL_GROUP_NITRILE, 0},
    {"diazo", "C[CH:1]=[N+]=[N-]", ENL_GROUP_DIAZO, 0},
    {"amine", "C[N:1](C)C", ENL_GROUP_AMINE, 0},
    {"pyrrole N", "C[n:1]1cccc1", ENL_GROUP_AMINE, RING | ARYL},
    {"ammonium", "C[N+:1](C)(C)C", ENL_GROUP_AMMONIUM, 0},
    {"ammonium with H", "C[NH+:1](C)C", ENL_GROUP_AMMONIUM, ACID_H},
    {"pyridinium", "C[n+:1]1ccccc1", ENL_GROUP_AMMONIUM, RING | ARYL},
    {"amine oxide", "C[N+:1](C)(C)[O-]", ENL_GROUP_N_OXIDE, 0},
    {"isocyanide", "C[N+:1]#[C-]", ENL_GROUP_ISOCYANIDE, 0},
    {"nitro", "C[N+:1](=O)[O-]", ENL_GROUP_NITRO, 0},
    {"nitroso", "C[N:1]=O", ENL_GROUP_NITROSO, 0},
    {"azo", "C[N:1]=NC", ENL_GROUP_AZO, 0},
    {"azide", "C[N:1]=[N+]=[N-]", ENL_GROUP_AZIDE, 0},
    {"imine through N", "C[N:1]=C(C)C", ENL_GROUP_IMINE_N, 0},
    {"ether", "C[O:1]C", ENL_GROUP_OXYGEN, 0},
    {"alcohol", "C[OH:1]", ENL_GROUP_OXYGEN, ACID_H},
    {"fluorine", "C[F:1]", ENL_GROUP_FLUORINE, 0},
    {"bromine", "C[Br:1]", ENL_GROUP_HALOGEN, 0},
    {"sulfide", "C[S:1]c1ccccc1", ENL_GROUP_SULFIDE, ARYL},
    {"selenide", "C[Se:1]C", ENL_GROUP_SELENIDE, 0},
    {"sulfoxide", "C[S:1](C)=O", ENL_GROUP_SULFOXIDE, 0},
    {"sulfoxide, charges written", "C[S+:1](C)[O-]", ENL_GROUP_SULFOXIDE, 0},
    {"sulfone", "C[S:1](C)(=O)=O", ENL_GROUP_SULFONE, 0},
    {"triflone", "C[S:1](=O)(=O)C(F)(F)F", ENL_GROUP_SULFONE, CF3},
    {"sulfonamide", "C[S:1](=O)(=O)NC", ENL_GROUP_SULFONE, ACID_H},
    {"sulfoximine", "C[S:1](C)(=O)=NC", ENL_GROUP_SULFOXIMINE, 0},
    {"sulfilimine", "C[S:1](C)=NC", ENL_GROUP_SULFILIMINE, 0},
    {"sulfonium", "C[S+:1](C)C", ENL_GROUP_SULFONIUM, 0},
    {"sulfoxonium", "C[S+:1](C)(C)=O", ENL_GROUP_SULFOXONIUM, 0},
    {"phosphine", "C[P:1](C)C", ENL_GROUP_PHOSPHINE, 0},
    {"phosphonate", "C[P:1](=O)(OC)OC", ENL_GROUP_PHOSPHORYL, 0},
    {"phosphine sulfide", "C[P:1](C)(C)=S", ENL_GROUP_PHOSPHORYL, 0},
    {"phosphonium", "C[P+:1](C)(C)C", ENL_GROUP_PHOSPHONIUM, 0},
    {"silyl", "C[Si:1](C)(C)C", ENL_GROUP_SILYL, 0},
    {"boryl", "C[B:1](C)C", ENL_GROUP_BORYL, 0},
    {"metal", "C[Hg:1]C", ENL_GROUP_OTHER, 0},
};

static EnlMolecule *
read_marked (const char *label, const char *smiles, uint32_t *marked)
{
  EnlMolecule *mol = NULL;
  EnlError err;

  if (enl_smiles_parse (smiles, strlen (smiles), &mol, &err) != ENL_OK)
    ck_abort_msg ("%s: %s", label, err.text);
  for (*marked = 0; enl_molecule_atom (mol, *marked)->map != 1;)
    ck_assert (++*marked < enl_molecule_atoms (mol));
  return mol;
}

START_TEST (kind_and_traits)
{
  uint32_t atom;
  g_autoptr (EnlMolecule) mol = read_marked (group_case[_i].label, group_case[_i].smiles, &atom);

  ck_assert_msg (enl_group_of (mol, atom) == group_case[_i].group, "%s: found '%s'",
                 group_case[_i].label, enl_group_label (enl_group_of (mol, atom)));
  ck_assert_msg (enl_group_traits (mol, atom) == group_case[_i].traits, "%s: traits %x",
                 group_case[_i].label, enl_group_traits (mol, atom));
}
END_TEST

START_TEST (labels_are_distinct)
{
  for (int a = 0; a < ENL_N_GROUPS; a++) {
    ck_assert (enl_group_label ((EnlGroup)a) != NULL && *enl_group_label ((EnlGroup)a) != '\0');
    for (int b = 0; b < a; b++)
      ck_assert_str_ne (enl_group_label ((EnlGroup)a), enl_group_label ((EnlGroup)b));
  }
}
END_TEST

START_TEST (classes_of_groups)
{
  ck_assert (enl_group_is_carbonyl (ENL_GROUP_ALDEHYDE));
  ck_assert (enl_group_is_carbonyl (ENL_GROUP_CARBONIC));
  ck_assert (!enl_group_is_carbonyl (ENL_GROUP_THIOCARBONYL));
  ck_assert (enl_group_conjugates (ENL_GROUP_NITRO));
  ck_assert (!enl_group_conjugates (ENL_GROUP_SULFONE));
  ck_assert (enl_group_is_acceptor (ENL_GROUP_SULFONE));
  ck_assert (!enl_group_is_acceptor (ENL_GROUP_ARYL));
  ck_assert (!enl_group_is_acceptor (ENL_GROUP_SULFIDE));
}
END_TEST

static Suite *
group_suite (void)
{
  Suite *suite = suite_create ("acidity group");
  TCase *tc = tcase_create ("all");

  tcase_add_loop_test (tc, kind_and_traits, 0, (int)ENL_COUNT (group_case));
  tcase_add_test (tc, labels_are_distinct);
  tcase_add_test (tc, classes_of_groups);
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (group_suite)
