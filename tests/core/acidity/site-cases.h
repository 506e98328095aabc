/* Structures and the sites a chemist expects, one row each; read by test-site.c.
 *
 * Sites stand in order, separated by '|': "atoms hydrogens flags: position". Atoms are positions in
 * the SMILES; flags: a next to C=O, h competing heteroatom, d diastereotopic pair, 2 certain not to
 * go first. `reason` is no_enol. */
#pragma once

#include <stddef.h>

typedef struct {
  const char *label, *smiles, *sites, *reason;
} EnlSiteCase;

/* clang-format off */
static const EnlSiteCase site_case[] = {
  /* ---- alpha to one C=O ---- */
  { "acetaldehyde", "CC=O",
    "1 3H a: alpha to the aldehyde C=O", NULL },
  { "acetone: both CH3 are one site", "CC(C)=O",
    "1,3 6H a: alpha to the ketone C=O", NULL },
  { "acetone with explicit hydrogens", "[H]C([H])([H])C(=O)C([H])([H])[H]",
    "2,7 6H a: alpha to the ketone C=O", NULL },
  { "butanone: two sites", "CCC(C)=O",
    "2 2H a: alpha to the ketone C=O, CH2 side|"
    "4 3H a: alpha to the ketone C=O, CH3 side", NULL },
  { "3-pentanone", "CCC(=O)CC",
    "2,5 4H a: alpha to the ketone C=O", NULL },
  { "2,4-dimethyl-3-pentanone", "CC(C)C(=O)C(C)C",
    "2,6 2H a: alpha to the ketone C=O", NULL },
  { "pinacolone", "CC(=O)C(C)(C)C",
    "1 3H a: alpha to the ketone C=O", NULL },
  { "cyclohexanone: all alpha positions", "O=C1CCCCC1",
    "3,7 4H a: alpha to the ketone C=O", NULL },
  { "2-methylcyclohexanone", "CC1CCCCC1=O",
    "2 1H a: alpha to the ketone C=O, CH side|"
    "6 2H ad: alpha to the ketone C=O, CH2 side", NULL },
  { "3-methylcyclohexanone", "CC1CCCC(=O)C1",
    "5 2H ad: alpha to the ketone C=O, next to CH2|"
    "8 2H ad: alpha to the ketone C=O, next to CH", NULL },
  { "4-methylcyclohexanone: faces differ", "CC1CCC(=O)CC1",
    "4,7 4H ad: alpha to the ketone C=O", NULL },
  { "cyclobutanone", "O=C1CCC1",
    "3,5 4H a: alpha to the ketone C=O", NULL },
  { "1,4-cyclohexanedione: one site", "O=C1CCC(=O)CC1",
    "3,4,7,8 8H a: alpha to the ketone C=O", NULL },
  { "acetophenone has three alpha hydrogens", "CC(=O)c1ccccc1",
    "1 3H a: alpha to the ketone C=O", NULL },
  { "acetophenone, Kekulé", "CC(=O)C1=CC=CC=C1",
    "1 3H a: alpha to the ketone C=O", NULL },
  { "1-indanone", "O=C1CCc2ccccc12",
    "3 2H a: alpha to the ketone C=O|"
    "4 2H: benzylic", NULL },
  { "phenylacetone", "CC(=O)Cc1ccccc1",
    "1 3H a: alpha to the ketone C=O|"
    "4 2H a: alpha to the ketone C=O and aryl (benzylic)", NULL },
  { "deoxybenzoin", "O=C(Cc1ccccc1)c1ccccc1",
    "3 2H a: alpha to the ketone C=O and aryl (benzylic)", NULL },
  { "anthrone", "O=C1c2ccccc2Cc2ccccc12",
    "9 2H: vinylogous to the ketone C=O across the ring", NULL },
  { "biacetyl", "CC(=O)C(C)=O",
    "1,5 6H a: alpha to the ketone C=O", NULL },
  { "methoxyacetone: OCH3 is no site", "COCC(C)=O",
    "3 2H a: alpha to the ketone C=O, CH2 side|"
    "5 3H a: alpha to the ketone C=O, CH3 side", NULL },
  { "phenacyl chloride", "O=C(CCl)c1ccccc1",
    "3 2H a: alpha to the ketone C=O", NULL },
  { "trifluoroacetone", "CC(=O)C(F)(F)F",
    "1 3H a: alpha to the ketone C=O", NULL },
  { "ethyl acetate: OCH2 and its CH3 are none", "CCOC(C)=O",
    "5 3H a: alpha to the ester C=O", NULL },
  { "phenyl acetate", "CC(=O)Oc1ccccc1",
    "1 3H a: alpha to the ester C=O", NULL },
  { "delta-valerolactone: OCH2 is none", "O=C1CCCCO1",
    "3 2H a: alpha to the lactone C=O", NULL },
  { "thioester", "CCSC(C)=O",
    "5 3H a: alpha to the thioester C=O", NULL },
  { "N,N-dimethylacetamide: NCH3 is none", "CN(C)C(C)=O",
    "5 3H a: alpha to the amide C=O", NULL },
  { "N-methyllactam", "CN1CCCCC1=O",
    "6 2H a: alpha to the lactam C=O", NULL },
  { "caprolactam: N-H first, then C-H", "O=C1CCCCCN1",
    "3 2H a2: alpha to the lactam C=O|"
    "8 1H h: N-H of the lactam", NULL },
  { "N-acyl oxazolidinone", "CC(=O)N1CCOC1=O",
    "1 3H a: alpha to the imide C=O", NULL },
  { "acetic anhydride", "CC(=O)OC(C)=O",
    "1,6 6H a: alpha to the anhydride C=O", NULL },
  { "acetyl chloride", "CC(=O)Cl",
    "1 3H a: alpha to the acyl halide C=O", NULL },
  { "acylsilane", "CC(=O)[Si](C)(C)C",
    "1 3H a: alpha to the acylsilane C=O", NULL },
  { "dimethylthioacetamide", "CN(C)C(C)=S",
    "5 3H: alpha to the thioamide C=S", NULL },
  { "thioacetone", "CC(C)=S",
    "1,3 6H: alpha to C=S", NULL },
  { "N-phenyl succinimide", "O=C1CCC(=O)N1c1ccccc1",
    "3,4 4H a: alpha to the imide C=O", NULL },
  { "tropinone", "CN1C2CCC1CC(=O)C2",
    "7,10 4H ad: alpha to the ketone C=O", NULL },
  { "N-Boc proline methyl ester", "COC(=O)C1CCCN1C(=O)OC(C)(C)C",
    "5 1H a: alpha to the ester C=O", NULL },
  /* ---- 1,3-dicarbonyls ---- */
  { "acetylacetone: middle and gamma", "CC(=O)CC(C)=O",
    "1,6 6H a2: gamma of the 1,3-dicarbonyl|"
    "4 2H a: alpha to both C=O", NULL },
  { "2,4-hexanedione", "CCC(=O)CC(C)=O",
    "2 2H a2: gamma of the 1,3-dicarbonyl, CH2 side|"
    "5 2H a: alpha to both C=O|"
    "7 3H a2: gamma of the 1,3-dicarbonyl, CH3 side", NULL },
  { "ethyl acetoacetate", "CCOC(=O)CC(C)=O",
    "6 2H a: alpha to both C=O|"
    "8 3H a2: gamma of the 1,3-dicarbonyl", NULL },
  { "diethyl malonate", "CCOC(=O)CC(=O)OCC",
    "6 2H a: alpha to both C=O", NULL },
  { "diethyl methylmalonate", "CCOC(=O)C(C)C(=O)OCC",
    "6 1H a: alpha to both C=O", NULL },
  { "dimedone", "CC1(C)CC(=O)CC(=O)C1",
    "4,10 4H a2: gamma of the 1,3-dicarbonyl|"
    "7 2H a: alpha to both C=O", NULL },
  { "Meldrum's acid", "CC1(C)OC(=O)CC(=O)O1",
    "7 2H a: alpha to both C=O", NULL },
  { "triacetylmethane", "CC(=O)C(C(C)=O)C(C)=O",
    "1,6,9 9H a2: gamma of the 1,3-dicarbonyl|"
    "4 1H a: alpha to all three C=O", NULL },
  { "quaternary diketone: outer hydrogens only", "CC(=O)C(C)(C)C(C)=O",
    "1,8 6H a: alpha to the ketone C=O", NULL },
  { "barbituric acid", "O=C1CC(=O)NC(=O)N1",
    "3 2H a: alpha to both C=O|"
    "6,9 2H h: N-H of the imide", NULL },
  { "2-acetylcyclohexanone", "CC(=O)C1CCCCC1=O",
    "1 3H a2: gamma of the 1,3-dicarbonyl, CH3 side|"
    "4 1H a: alpha to both C=O|"
    "8 2H ad2: gamma of the 1,3-dicarbonyl, CH2 side", NULL },
  { "ketone and nitrile on one carbon", "CC(=O)CC#N",
    "1 3H a: alpha to the ketone C=O|"
    "4 2H a: alpha to the ketone C=O and the nitrile", NULL },
  { "cyanoacetate, alpha aryl", "CCOC(=O)C(C#N)c1ccccc1",
    "6 1H a: alpha to the ester C=O and the nitrile, benzylic", NULL },
  { "two ketones of different kind", "O=C(c1ccccc1)CCC(C)=O",
    "9 2H a: alpha to the aryl ketone C=O|"
    "10 2H a: alpha to the open-chain ketone C=O, CH2 side|"
    "12 3H a: alpha to the open-chain ketone C=O, CH3 side", NULL },
  /* ---- no enolate ---- */
  { "benzaldehyde", "O=Cc1ccccc1",
    "", "the carbon next to C=O carries no hydrogen" },
  { "formaldehyde", "C=O",
    "", "no carbon is attached to C=O" },
  { "pivalaldehyde", "CC(C)(C)C=O",
    "", "the carbon next to C=O carries no hydrogen" },
  { "benzophenone", "O=C(c1ccccc1)c1ccccc1",
    "", "the carbons next to C=O carry no hydrogen" },
  { "dimethylformamide", "CN(C)C=O",
    "", "no carbon is attached to C=O" },
  { "glyoxal", "O=CC=O",
    "", "the hydrogens next to C=O are formyl hydrogens" },
  { "carbon dioxide", "O=C=O",
    "", "no carbon is attached to C=O" },
  { "dimethyl carbonate", "COC(=O)OC",
    "", "no carbon is attached to C=O" },
  { "hexafluoroacetone", "FC(F)(F)C(=O)C(F)(F)F",
    "", "the carbons next to C=O carry no hydrogen" },
  { "benzoic acid", "OC(=O)c1ccccc1",
    "1 1H h: O-H of the carboxylic acid", "the carbon next to C=O carries no hydrogen" },
  { "benzoquinone", "O=C1C=CC(=O)C=C1",
    "", "the hydrogens next to C=O are on C=C" },
  { "acrolein", "C=CC=O",
    "", "the hydrogens next to C=O are on C=C" },
  { "chalcone", "O=C(/C=C/c1ccccc1)c1ccccc1",
    "", "the hydrogens next to C=O are on C=C" },
  { "methyl o-toluate: benzylic only", "COC(=O)c1ccccc1C",
    "11 3H: benzylic, ortho to the ester C=O", "the carbon next to C=O carries no hydrogen" },
  { "cyclopropanone", "O=C1CC1",
    "", "the enolate would need C=C inside a three-membered ring" },
  { "cyclopropene", "C1C=C1",
    "", "the anion would need C=C inside a three-membered ring" },
  { "caffeine: NCH3 are none", "Cn1cnc2c1c(=O)n(C)c(=O)n2C",
    "", "the carbon next to C=O carries no hydrogen" },
  { "coumarin", "O=c1ccc2ccccc2o1",
    "", "the hydrogens next to C=O are on unsaturated carbon" },
  /* ---- Bredt ---- */
  { "camphor: one usable side", "CC1(C)C2CCC1(C)C(=O)C2",
    "11 2H ad: alpha to the ketone C=O", NULL },
  { "norcamphor", "O=C1CC2CCC1C2",
    "3 2H ad: alpha to the ketone C=O", NULL },
  { "bicyclo[2.2.2]octane-2,6-dione: bridgehead none", "O=C1CC2CCC1C(=O)C2",
    "3,10 4H ad: alpha to the ketone C=O", NULL },
  { "adamantanone", "O=C1C2CC3CC(C2)CC1C3",
    "", "hydrogens next to C=O only on bridgeheads (Bredt's rule)" },
  { "7-norbornanone", "O=C1C2CCC1CC2",
    "", "hydrogens next to C=O only on bridgeheads (Bredt's rule)" },
  { "bicyclo[3.3.1]nonan-9-one", "O=C1C2CCCC1CCC2",
    "", "hydrogens next to C=O only on bridgeheads (Bredt's rule)" },
  { "bicyclo[3.3.1]nonan-2-one", "O=C1CCC2CCCC1C2",
    "3 2H ad: alpha to the ketone C=O", NULL },
  { "bicyclo[6.3.1]: a trans ring of twelve is free", "O=C1CC2CCCCCCC1C2",
    "3 2H ad: alpha to the ketone C=O, CH2 side|"
    "11 1H a: alpha to the ketone C=O, CH side", NULL },
  { "1-decalone: a fused ring is no bridge", "O=C1CCCC2CCCCC12",
    "3 2H ad: alpha to the ketone C=O, CH2 side|"
    "11 1H a: alpha to the ketone C=O, CH side", NULL },
  { "bicyclo[3.3.0]octan-2-one", "O=C1CCC2CCCC12",
    "3 2H ad: alpha to the ketone C=O, CH2 side|"
    "9 1H a: alpha to the ketone C=O, CH side", NULL },
  { "bicyclo[3.1.0]hexan-2-one: cyclopropyl C-H", "O=C1CCC2CC12",
    "3 2H ad: alpha to the ketone C=O, CH2 side|"
    "7 1H a: alpha to the ketone C=O, CH side", NULL },
  { "cyclopropyl methyl ketone", "CC(=O)C1CC1",
    "1 3H a: alpha to the ketone C=O, CH3 side|"
    "4 1H a: alpha to the ketone C=O, CH side", NULL },
  { "triptycene", "c1ccc2c(c1)C1c3ccccc3C2c2ccccc21",
    "", "the only activated C-H sits on a bridgehead (Bredt's rule)" },
  { "norbornene", "C1CC2CC1C=C2",
    "", "the only activated C-H sits on a bridgehead (Bredt's rule)" },
  { "bridgehead beside SO2 needs no planar carbon", "O=S1(=O)CC2CCC1C2",
    "4 2H d: alpha to the sulfone, CH2 side|"
    "8 1H: alpha to the sulfone, CH side", NULL },
  { "fluoradene", "C12c3ccccc3-c3cccc(c31)-c1ccccc12",
    "1 1H: fluorene C9-H", NULL },
  /* ---- enones, vinylogy ---- */
  { "2-cyclohexenone: alpha' and gamma", "O=C1CCCC=C1",
    "3 2H a: alpha' of the enone|"
    "5 2H: gamma of the enone (vinylogous)", NULL },
  { "mesityl oxide", "CC(=O)C=C(C)C",
    "1 3H a: alpha' of the enone|"
    "6,7 6H: gamma of the enone (vinylogous)", NULL },
  { "crotonaldehyde", "C/C=C/C=O",
    "1 3H: gamma of the enal (vinylogous)", NULL },
  { "methyl sorbate: epsilon", "COC(=O)/C=C/C=C/C",
    "9 3H: epsilon of the unsaturated ester (vinylogous)", NULL },
  { "methyl crotonate", "COC(=O)/C=C/C",
    "7 3H: gamma of the unsaturated ester (vinylogous)", NULL },
  { "methyl 2-butynoate", "CC#CC(=O)OC",
    "1 3H: gamma of the unsaturated ester (vinylogous)", NULL },
  { "butynone", "CC(=O)C#C",
    "1 3H a: alpha to the ketone C=O|"
    "5 1H: acetylenic C-H", NULL },
  { "isophorone", "CC1=CC(=O)CC(C)(C)C1",
    "1 3H: gamma of the enone (vinylogous), CH3|"
    "6 2H a: alpha' of the enone|"
    "10 2H: gamma of the enone (vinylogous), CH2", NULL },
  { "cyclohexa-2,5-dienone", "O=C1C=CCC=C1",
    "5 2H: gamma of the enone (vinylogous)", NULL },
  { "cyclohexa-2,4-dienone", "O=C1CC=CC=C1",
    "3 2H a: alpha to the ketone C=O, allylic", NULL },
  { "toluquinone", "CC1=CC(=O)C=CC1=O",
    "1 3H: gamma of the enone (vinylogous)", NULL },
  { "allyl acetate: OCH2 is allylic", "CC(=O)OCC=C",
    "1 3H a: alpha to the ester C=O|"
    "5 2H: allylic", NULL },
  { "crotononitrile", "C/C=C/C#N",
    "1 3H: gamma of the unsaturated nitrile (vinylogous)", NULL },
  { "1-nitropropene", "C/C=C/[N+](=O)[O-]",
    "1 3H: gamma of the nitroalkene (vinylogous)", NULL },
  { "allyl sulfone", "C=CCS(C)(=O)=O",
    "3 2H: alpha to the sulfone, allylic|"
    "5 3H: alpha to the sulfone", NULL },
  { "testosterone skeleton ketone", "O=C1C=C2CCC3C4CCC(O)C4(C)CCC3C2(C)CC1",
    "5 2H d: gamma of the enone (vinylogous)|"
    "12 1H h: alcohol O-H|"
    "21 2H ad: alpha' of the enone", NULL },
  /* ---- other acceptors ---- */
  { "acetonitrile", "CC#N",
    "1 3H: alpha to the nitrile", NULL },
  { "malononitrile", "N#CCC#N",
    "3 2H: alpha to both nitriles", NULL },
  { "phenylacetonitrile", "N#CCc1ccccc1",
    "3 2H: alpha to the nitrile and aryl (benzylic)", NULL },
  { "nitromethane", "C[N+](=O)[O-]",
    "1 3H: alpha to the nitro group", NULL },
  { "nitromethane, five-valent", "CN(=O)=O",
    "1 3H: alpha to the nitro group", NULL },
  { "phenylnitromethane", "O=[N+]([O-])Cc1ccccc1",
    "4 2H: alpha to the nitro group and aryl (benzylic)", NULL },
  { "nitroacetone", "CC(=O)C[N+](=O)[O-]",
    "1 3H a: alpha to the ketone C=O|"
    "4 2H a: alpha to the ketone C=O and the nitro group", NULL },
  { "dimethyl sulfoxide", "CS(C)=O",
    "1,3 6H: alpha to the sulfoxide", NULL },
  { "dimethyl sulfoxide, charges written", "C[S+](C)[O-]",
    "1,3 6H: alpha to the sulfoxide", NULL },
  { "methyl phenyl sulfone", "CS(=O)(=O)c1ccccc1",
    "1 3H: alpha to the sulfone", NULL },
  { "methanesulfonamide", "CS(N)(=O)=O",
    "1 3H 2: alpha to the sulfonyl group|"
    "3 2H h: N-H of the sulfonamide", NULL },
  { "bis(phenylsulfonyl)methane", "O=S(=O)(CS(=O)(=O)c1ccccc1)c1ccccc1",
    "4 2H: alpha to both sulfones", NULL },
  { "sulfoximine", "CN=S(C)(=O)c1ccccc1",
    "4 3H: alpha to the sulfoximine", NULL },
  { "trimethylsulfonium", "C[S+](C)C",
    "1,3,4 9H: alpha to the sulfonium S+", NULL },
  { "trimethylsulfoxonium", "C[S+](C)(C)=O",
    "1,3,4 9H: alpha to the sulfoxonium S+", NULL },
  { "methyltriphenylphosphonium", "C[P+](c1ccccc1)(c1ccccc1)c1ccccc1",
    "1 3H: alpha to the phosphonium P+", NULL },
  { "phosphonoacetate", "CCOC(=O)CP(=O)(OCC)OCC",
    "6 2H a: alpha to the ester C=O and P=O", NULL },
  { "tetramethylammonium", "C[N+](C)(C)C",
    "1,3,4,5 12H: alpha to N+", NULL },
  { "trimethylammonium: N-H only", "C[NH+](C)C",
    "2 1H h: N-H of the ammonium ion", "no group here stabilises a carbanion" },
  { "N-methylpyridinium", "C[n+]1ccccc1",
    "1 3H: alpha to N+", NULL },
  { "N-isopropylidene methylamine", "CN=C(C)C",
    "1 3H: alpha to the imine N|"
    "4,5 6H: alpha to C=N", NULL },
  { "glycine imine ester", "CCOC(=O)CN=C(c1ccccc1)c1ccccc1",
    "6 2H a: alpha to the ester C=O and the imine N", NULL },
  { "acetone hydrazone", "CC(C)=NN(C)C",
    "1,3 6H: alpha to C=N", NULL },
  { "oxazoline", "CC1=NCCO1",
    "1 3H: alpha to C=N", NULL },
  { "methyl isocyanoacetate", "COC(=O)C[N+]#[C-]",
    "5 2H a: alpha to the ester C=O and the isocyanide", NULL },
  { "ethyl diazoacetate", "CCOC(=O)C=[N+]=[N-]",
    "6 1H: C-H of the diazo group", "the hydrogens next to C=O are on unsaturated carbon" },
  /* ---- hydrocarbons and single carbons ---- */
  { "toluene", "Cc1ccccc1",
    "1 3H: benzylic", NULL },
  { "4-nitrotoluene", "Cc1ccc([N+](=O)[O-])cc1",
    "1 3H: benzylic, para to the nitro group", NULL },
  { "2-picoline", "Cc1ccccn1",
    "1 3H: heterobenzylic, ortho to ring N", NULL },
  { "3-picoline", "Cc1cccnc1",
    "1 3H: heterobenzylic, meta to ring N", NULL },
  { "4-picoline", "Cc1ccncc1",
    "1 3H: heterobenzylic, para to ring N", NULL },
  { "diphenylmethane", "c1ccc(Cc2ccccc2)cc1",
    "5 2H: benzylic (two aryls)", NULL },
  { "triphenylmethane", "c1ccc(C(c2ccccc2)c2ccccc2)cc1",
    "5 1H: benzylic (three aryls)", NULL },
  { "propene", "CC=C",
    "1 3H: allylic", NULL },
  { "1,4-pentadiene", "C=CCC=C",
    "3 2H: allylic (two C=C)", NULL },
  { "allene", "C=C=C",
    "1,3 4H: allenic C-H", NULL },
  { "ketene", "C=C=O",
    "1 2H: C-H of the ketene", "the hydrogens next to C=O are on C=C" },
  { "propyne", "CC#C",
    "1 3H: propargylic|"
    "3 1H: acetylenic C-H", NULL },
  { "acetylene: two hydrogens", "C#C",
    "1,2 2H: acetylenic C-H", NULL },
  { "cyclopentadiene", "C1C=CC=C1",
    "1 2H: cyclopentadiene CH", NULL },
  { "indene", "C1C=Cc2ccccc12",
    "1 2H: indene C1-H", NULL },
  { "fluorene", "C1c2ccccc2-c2ccccc12",
    "1 2H: fluorene C9-H", NULL },
  { "9-cyanofluorene", "N#CC1c2ccccc2-c2ccccc12",
    "3 1H: alpha to the nitrile, fluorene C9-H", NULL },
  { "chloroform", "ClC(Cl)Cl",
    "2 1H: C-H with three halogens", NULL },
  { "fluoroform", "FC(F)F",
    "2 1H: C-H with three halogens", NULL },
  { "dichloromethane", "ClCCl",
    "2 2H: C-H with two halogens", NULL },
  { "1,1-difluoroethane is none", "CC(F)F",
    "", "no group here stabilises a carbanion" },
  { "hydrogen cyanide", "C#N",
    "1 1H: C-H of hydrogen cyanide", NULL },
  { "1,3-dithiane", "C1CSCSC1",
    "4 2H: between two sulfurs", NULL },
  { "ethyl phenyl sulfide is none", "CCSc1ccccc1",
    "", "no group here stabilises a carbanion" },
  { "bis(diphenylphosphino)methane", "C(P(c1ccccc1)c1ccccc1)P(c1ccccc1)c1ccccc1",
    "1 2H: between two phosphorus atoms", NULL },
  { "3,4-dimethylthiazolium", "Cc1csc[n+]1C",
    "1 3H: heterobenzylic|"
    "5 1H: C2-H of the thiazolium ion", NULL },
  { "1,3-dimethylimidazolium", "C[n+]1ccn(C)c1",
    "7 1H: C2-H of the imidazolium ion", NULL },
  { "imidazolinium", "C[N+]1=CN(C)CC1",
    "3 1H: C2-H of the imidazolinium ion", NULL },
  { "imidazole is no azolium", "Cn1ccnc1",
    "", "no group here stabilises a carbanion" },
  { "hexane", "CCCCCC",
    "", "no group here stabilises a carbanion" },
  { "methane", "C",
    "", "no group here stabilises a carbanion" },
  { "nitrobenzene", "O=[N+]([O-])c1ccccc1",
    "", "no carbon next to the nitro group carries an acidic hydrogen" },
  { "benzonitrile", "N#Cc1ccccc1",
    "", "no carbon next to the nitrile carries an acidic hydrogen" },
  { "tetrachloromethane", "ClC(Cl)(Cl)Cl",
    "", "no carbon here carries hydrogen" },
  /* ---- O-H, S-H, P-H ---- */
  { "acetic acid: C-H second", "CC(=O)O",
    "1 3H a2: alpha to the acid C=O|"
    "4 1H h: O-H of the carboxylic acid", NULL },
  { "malonic acid", "OC(=O)CC(=O)O",
    "1,7 2H h: O-H of the carboxylic acid|"
    "4 2H a2: alpha to both C=O", NULL },
  { "cyanoacetic acid", "OC(=O)CC#N",
    "1 1H h: O-H of the carboxylic acid|"
    "4 2H a2: alpha to the acid C=O and the nitrile", NULL },
  { "nitroacetic acid: the order is not certain", "OC(=O)C[N+](=O)[O-]",
    "1 1H h: O-H of the carboxylic acid|"
    "4 2H a: alpha to the acid C=O and the nitro group", NULL },
  { "levulinic acid: far acid goes first too", "CC(=O)CCC(=O)O",
    "1 3H a2: alpha to the ketone C=O, CH3 side|"
    "4 2H a2: alpha to the ketone C=O, CH2 side|"
    "5 2H a2: alpha to the acid C=O|"
    "8 1H h: O-H of the carboxylic acid", NULL },
  { "acetone with acetic acid: no common fragment", "CC(C)=O.CC(=O)O",
    "1,3 6H a: alpha to the ketone C=O|"
    "5 3H a2: alpha to the acid C=O|"
    "8 1H h: O-H of the carboxylic acid", NULL },
  { "4-hydroxyacetophenone: phenol first", "CC(=O)c1ccc(O)cc1",
    "1 3H a2: alpha to the ketone C=O|"
    "8 1H h: phenol O-H", NULL },
  { "p-cresol", "Cc1ccc(O)cc1",
    "1 3H 2: benzylic|"
    "6 1H h: phenol O-H", NULL },
  { "4-hydroxybutanone: alcohol is not certain", "CC(=O)CCO",
    "1 3H a: alpha to the ketone C=O, CH3 side|"
    "4 2H a: alpha to the ketone C=O, CH2 side|"
    "6 1H h: alcohol O-H", NULL },
  { "hydroxyamide ester: alcohol before amide C-H", "CN(C)C(=O)CCCCO",
    "6 2H a2: alpha to the amide C=O|"
    "10 1H h: alcohol O-H", NULL },
  { "peracetic acid", "CC(=O)OO",
    "1 3H a2: alpha to the acid C=O|"
    "5 1H h: O-H of the peracid", NULL },
  { "acetone oxime", "CC(C)=NO",
    "1,3 6H: alpha to C=N|"
    "5 1H h: oxime O-H", NULL },
  { "acetohydroxamic acid", "CC(=O)NO",
    "1 3H a2: alpha to the amide C=O|"
    "4 1H h: N-H of the hydroxamic acid|"
    "5 1H h: O-H of the hydroxamic acid", NULL },
  { "enol of acetylacetone", "CC(=O)C=C(C)O",
    "1 3H a2: alpha' of the enone|"
    "6 3H: gamma of the enone (vinylogous)|"
    "7 1H h: enol O-H, conjugated with C=O", NULL },
  { "cyclohexenol", "OC1=CCCCC1",
    "1 1H h: enol O-H|"
    "4 2H: allylic|"
    "7 2H: alpha' of the enol", NULL },
  { "4-hydroxycoumarin", "Oc1cc(=O)oc2ccccc12",
    "1 1H h: enol O-H, conjugated with C=O",
    "the hydrogens next to C=O are on unsaturated carbon" },
  { "ascorbic acid", "OCC(O)C1OC(=O)C(O)=C1O",
    "1 1H h: alcohol O-H, primary|"
    "4 1H h: alcohol O-H, secondary|"
    "5 1H: gamma of the unsaturated lactone (vinylogous)|"
    "10 1H h: enol O-H|"
    "12 1H h: enol O-H, conjugated with C=O", NULL },
  { "methanesulfonic acid", "CS(=O)(=O)O",
    "1 3H 2: alpha to the sulfonyl group|"
    "5 1H h: O-H of the sulfonic acid", NULL },
  { "methylphosphonic acid", "CP(=O)(O)O",
    "1 3H 2: alpha to P=O|"
    "4,5 2H h: O-H of the phosphonic acid", NULL },
  { "boronic acid", "OB(O)c1ccccc1",
    "1,3 2H h: boronic acid O-H", "no group here stabilises a carbanion" },
  { "hydrogen peroxide", "OO",
    "1,2 2H h: hydroperoxide O-H", "there is no carbon here" },
  { "water", "O",
    "1 2H h: O-H of water", "there is no carbon here" },
  { "three alcohols", "OCC(O)C(C)(C)O",
    "1 1H h: alcohol O-H, primary|"
    "4 1H h: alcohol O-H, secondary|"
    "8 1H h: alcohol O-H, tertiary", "no group here stabilises a carbanion" },
  { "acetaldehyde hydrate", "CC(O)O",
    "3,4 2H h: O-H of the hydrate", "no group here stabilises a carbanion" },
  { "thioglycolate", "CCOC(=O)CS",
    "6 2H a: alpha to the ester C=O|"
    "7 1H h: thiol S-H", NULL },
  { "thiophenol", "Sc1ccccc1",
    "1 1H h: thiophenol S-H", "no group here stabilises a carbanion" },
  { "thioacetic acid", "CC(=O)S",
    "1 3H a2: alpha to the acid C=O|"
    "4 1H h: S-H of the thioacid", NULL },
  { "selenol", "CC[SeH]",
    "3 1H h: selenol Se-H", "no group here stabilises a carbanion" },
  { "phenylphosphine", "Pc1ccccc1",
    "1 2H h: P-H of the phosphine", "no group here stabilises a carbanion" },
  { "dimethyl phosphite", "COP(=O)OC",
    "3 1H h: P-H beside P=O", "no group here stabilises a carbanion" },
  /* ---- N-H ---- */
  { "acetamide", "CC(N)=O",
    "1 3H a2: alpha to the amide C=O|"
    "3 2H h: N-H of the amide", NULL },
  { "N-methylacetamide", "CNC(C)=O",
    "2 1H h: N-H of the amide|"
    "4 3H a2: alpha to the amide C=O", NULL },
  { "N-phenylacetamide of a ketone: not certain", "CC(=O)CCC(=O)Nc1ccccc1",
    "1 3H a: alpha to the ketone C=O, CH3 side|"
    "4 2H a: alpha to the ketone C=O, CH2 side|"
    "5 2H a2: alpha to the amide C=O|"
    "8 1H h: N-H of the amide", NULL },
  { "amide and ester: N-H before ester C-H", "CCOC(=O)CCCC(=O)NC",
    "6 2H a2: alpha to the ester C=O|"
    "8 2H a2: alpha to the amide C=O|"
    "11 1H h: N-H of the amide", NULL },
  { "succinimide", "O=C1CCC(=O)N1",
    "3,4 4H a: alpha to the imide C=O|"
    "7 1H h: N-H of the imide", NULL },
  { "urea", "NC(N)=O",
    "1,3 4H h: N-H of the urea", "no carbon is attached to C=O" },
  { "N-methylurea", "CNC(N)=O",
    "2 1H h: N-H of the urea, NH|"
    "4 2H h: N-H of the urea, NH2", "no carbon is attached to C=O" },
  { "ethyl carbamate", "CCOC(N)=O",
    "5 2H h: N-H of the carbamate", "no carbon is attached to C=O" },
  { "tosylamide", "Cc1ccc(S(N)(=O)=O)cc1",
    "1 3H: benzylic, para to the sulfonyl group|"
    "7 2H h: N-H of the sulfonamide", NULL },
  { "saccharin", "O=C1NS(=O)(=O)c2ccccc12",
    "3 1H h: N-H of the acylsulfonamide", "the carbon next to C=O carries no hydrogen" },
  { "thiourea", "NC(N)=S",
    "1,3 4H h: N-H of the thiourea", "no carbon here carries hydrogen" },
  { "thioacetamide", "CC(N)=S",
    "1 3H 2: alpha to the thioamide C=S|"
    "3 2H h: N-H of the thioamide", NULL },
  { "hydantoin", "O=C1CNC(=O)N1",
    "3 2H a: alpha to the imide C=O|"
    "4 1H h: N-H of the urea|"
    "7 1H h: N-H of the imide", NULL },
  { "uracil", "O=c1cc[nH]c(=O)[nH]1",
    "5 1H h: N-H of the urea|"
    "8 1H h: N-H of the imide", "the hydrogens next to C=O are on unsaturated carbon" },
  { "4-pyridone", "O=c1cc[nH]cc1",
    "5 1H h: N-H of the pyridone", "the hydrogens next to C=O are on unsaturated carbon" },
  { "aniline", "Nc1ccccc1",
    "1 2H h: N-H of the aniline", "no group here stabilises a carbanion" },
  { "diphenylamine", "c1ccc(Nc2ccccc2)cc1",
    "5 1H h: N-H of the diarylamine", "no group here stabilises a carbanion" },
  { "diisopropylamine is no competing acid", "CC(C)NC(C)C",
    "4 1H: N-H of the amine", "no group here stabilises a carbanion" },
  { "pyrrole", "c1cc[nH]c1",
    "4 1H h: N-H of the pyrrole", "no group here stabilises a carbanion" },
  { "indole", "c1ccc2[nH]ccc2c1",
    "5 1H h: N-H of the indole", "no group here stabilises a carbanion" },
  { "carbazole", "c1ccc2c(c1)[nH]c1ccccc12",
    "7 1H h: N-H of the carbazole", "no group here stabilises a carbanion" },
  { "imidazole", "c1c[nH]cn1",
    "3 1H h: N-H of the imidazole", "no group here stabilises a carbanion" },
  { "pyrazole", "c1cn[nH]c1",
    "4 1H h: N-H of the pyrazole", "no group here stabilises a carbanion" },
  { "benzotriazole", "c1ccc2[nH]nnc2c1",
    "5 1H h: N-H of the benzotriazole", "no group here stabilises a carbanion" },
  { "tetrazole", "c1nnn[nH]1",
    "5 1H h: N-H of the tetrazole", "no group here stabilises a carbanion" },
  { "acetamidine", "CC(=N)N",
    "1 3H: alpha to C=N|"
    "3 1H h: =N-H of the amidine|"
    "4 2H h: N-H of the amidine", NULL },
  { "guanidine", "NC(=N)N",
    "1,4 4H h: N-H of the guanidine|"
    "3 1H h: =N-H of the guanidine", "no carbon here carries hydrogen" },
  { "benzophenone imine", "N=C(c1ccccc1)c1ccccc1",
    "1 1H h: N-H of the imine", "no carbon next to C=N carries an acidic hydrogen" },
  { "hydrazoic acid", "N=[N+]=[N-]",
    "1 1H h: N-H of hydrazoic acid", "there is no carbon here" },
  { "ammonia", "N",
    "1 3H: N-H of ammonia", "there is no carbon here" },
  { "acetohydrazide", "CC(=O)NN",
    "1 3H a2: alpha to the amide C=O|"
    "4 1H h: N-H of the hydrazide|"
    "5 2H: outer N-H of the hydrazide", NULL },
  /* ---- ions, salts, isotopes ---- */
  { "ammonium", "[NH4+]",
    "1 4H h: N-H of the ammonium ion", "there is no carbon here" },
  { "guanidinium: all six alike", "NC(N)=[NH2+]",
    "1,3,4 6H h: N-H of the guanidinium ion", "no carbon here carries hydrogen" },
  { "imidazolium: both N-H alike", "c1c[nH]c[nH+]1",
    "3,5 2H h: N-H of the imidazolium ion|"
    "4 1H 2: C2-H of the imidazolium ion", NULL },
  { "pyridinium", "c1cc[nH+]cc1",
    "4 1H h: N-H of the pyridinium ion", "no group here stabilises a carbanion" },
  { "anilinium", "[NH3+]c1ccccc1",
    "1 3H h: N-H of the anilinium ion", "no group here stabilises a carbanion" },
  { "protonated acetone", "CC(C)=[OH+]",
    "1,3 6H a2: alpha to the ketone C=O|"
    "4 1H h: O-H of the protonated C=O", NULL },
  { "hydronium", "[OH3+]",
    "1 3H h: O-H of the hydronium ion", "there is no carbon here" },
  { "glycine", "NCC(=O)O",
    "1 2H: N-H of the amine|"
    "2 2H a2: alpha to the acid C=O|"
    "5 1H h: O-H of the carboxylic acid", NULL },
  { "glycine zwitterion", "[NH3+]CC(=O)[O-]",
    "1 3H h: N-H of the ammonium ion|"
    "2 2H a2: alpha to the carboxylate", NULL },
  { "glycine ester hydrochloride", "Cl.COC(=O)CN",
    "1 1H h: H of the hydrogen halide|"
    "6 2H a: alpha to the ester C=O|"
    "7 2H: N-H of the amine", NULL },
  { "sodium acetate", "CC(=O)[O-].[Na+]",
    "1 3H a: alpha to the carboxylate", NULL },
  { "sodium acetoacetate", "CC(=O)CC(=O)[O-].[Na+]",
    "1 3H a: alpha to the ketone C=O|"
    "4 2H a: alpha to the ketone C=O and the carboxylate", NULL },
  { "enolate of acetone, charge on O", "CC(=C)[O-]",
    "1 3H: alpha' of the enolate", NULL },
  { "enolate of acetone, charge on C", "[CH2-]C(C)=O",
    "3 3H a: alpha' of the enolate", NULL },
  { "anion of acetylacetone: both CH3 alike", "CC(=O)/C=C(\\C)[O-]",
    "1,6 6H a: alpha' of the enolate", NULL },
  { "hydroxide has no site", "[OH-]",
    "", "there is no carbon here" },
  { "amide ion has no site", "[NH2-]",
    "", "there is no carbon here" },
  { "hydrosulfide", "[SH-]",
    "1 1H h: S-H of the hydrosulfide ion", "there is no carbon here" },
  { "acetone-d3: deuterium counts", "[2H]C([2H])([2H])C(C)=O",
    "2 3H a: alpha to the ketone C=O, labelled|"
    "6 3H a: alpha to the ketone C=O, unlabelled", NULL },
  { "acetone-d6: one site", "[2H]C([2H])([2H])C(=O)C([2H])([2H])[2H]",
    "2,7 6H a: alpha to the ketone C=O", NULL },
  { "dihydrogen", "[H][H]",
    "", "there is no carbon here" },
  { "alpha-mercurated ester: a sigma bond to a metal changes nothing", "COC(=O)C[Hg]Br",
    "5 2H a: alpha to the ester C=O", NULL },
  { "ferrocene: carbon in a pi complex is none",
    "C12C3=C4C5=C1[Fe]23456789C1C6=C7C8=C91",
    "", "no group here stabilises a carbanion" },
  /* ---- symmetry and stereo ---- */
  { "meso-2,6-dimethylcyclohexanone: one site", "C[C@H]1CCC[C@@H](C)C1=O",
    "2,6 2H a: alpha to the ketone C=O", NULL },
  { "trans-2,6-dimethylcyclohexanone", "C[C@H]1CCC[C@H](C)C1=O",
    "2,6 2H a: alpha to the ketone C=O", NULL },
  { "cis and trans arms are two sites", "O=C(C/C=C/C)C/C=C\\C",
    "3 2H a: alpha to the ketone C=O, allylic, atom 3|"
    "6 3H: allylic, atom 6|"
    "7 2H a: alpha to the ketone C=O, allylic, atom 7|"
    "10 3H: allylic, atom 10", NULL },
  { "meso diketol: one site for both arms", "C[C@H](O)CC(=O)C[C@@H](C)O",
    "3,10 2H h: alcohol O-H|"
    "4,7 4H ad: alpha to the ketone C=O", NULL },
  { "diastereomeric arms are two sites", "C[C@H](O)[C@@H](F)CC(=O)C[C@H](F)[C@@H](C)O",
    "3 1H h: alcohol O-H, atom 3|"
    "6 2H ad: alpha to the ketone C=O, atom 6|"
    "9 2H ad: alpha to the ketone C=O, atom 9|"
    "14 1H h: alcohol O-H, atom 14", NULL },
  { "CH2 next to a stereocentre", "CC(=O)CC(C)O",
    "1 3H a: alpha to the ketone C=O, CH3 side|"
    "4 2H ad: alpha to the ketone C=O, CH2 side|"
    "7 1H h: alcohol O-H", NULL },
  { "CH2 without one", "CC(=O)CCO",
    "1 3H a: alpha to the ketone C=O, CH3 side|"
    "4 2H a: alpha to the ketone C=O, CH2 side|"
    "6 1H h: alcohol O-H", NULL },
  { "benzyl phenyl sulfoxide: S is the stereocentre", "O=S(Cc1ccccc1)c1ccccc1",
    "3 2H d: alpha to the sulfoxide and aryl (benzylic)", NULL },
  { "benzyl phenyl sulfone has none", "O=S(=O)(Cc1ccccc1)c1ccccc1",
    "4 2H: alpha to the sulfone and aryl (benzylic)", NULL },
  { "ibuprofen", "CC(C)Cc1ccc(C(C)C(=O)O)cc1",
    "4 2H d2: benzylic|"
    "9 1H a2: alpha to the acid C=O and aryl (benzylic)|"
    "13 1H h: O-H of the carboxylic acid", NULL },
  { "warfarin", "CC(=O)CC(c1ccccc1)C1=C(O)c2ccccc2OC1=O",
    "1 3H a2: alpha to the ketone C=O, CH3 side|"
    "4 2H ad2: alpha to the ketone C=O, CH2 side|"
    "5 1H: benzylic (two aryls)|"
    "14 1H h: enol O-H, conjugated with C=O", NULL },
};
/* clang-format on */
