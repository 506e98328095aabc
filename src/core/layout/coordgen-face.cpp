#include "core/layout/coordgen-face.h"

#include <cmath>
#include <exception>
#include <map>
#include <mutex>
#include <vector>

#include <coordgen/sketcherMinimizer.h>

namespace
{

constexpr double bond_length = 50.0; /* the library's own unit; its y axis points down */

/* The ring templates are a static member that the first user fills: without a lock that is a race.
 */
void
load_templates_once ()
{
  static std::once_flag once;
  std::call_once (once, [] { sketcherMinimizer::loadTemplates (); });
}

using Atoms = std::vector<sketcherMinimizerAtom *>;

Atoms
add_atoms (sketcherMinimizerMolecule *mol, const EnlCoordgenAtom *atom, uint32_t n)
{
  Atoms made (n);

  for (uint32_t i = 0; i < n; i++) {
    made[i] = mol->addNewAtom ();
    /* An atom of unknown element is drawn like a carbon. */
    made[i]->setAtomicNumber (atom[i].element ? atom[i].element : 6);
    made[i]->charge = atom[i].charge;
    made[i]->_implicitHs = atom[i].hydrogens;
    if (atom[i].held) {
      made[i]->constrained = true;
      made[i]->templateCoordinates =
          sketcherMinimizerPointF (static_cast<float> (atom[i].x * bond_length),
                                   static_cast<float> (-atom[i].y * bond_length));
    }
  }
  return made;
}

std::vector<sketcherMinimizerBond *>
add_bonds (sketcherMinimizerMolecule *mol, const Atoms &at, const EnlCoordgenBond *bond, uint32_t n)
{
  std::vector<sketcherMinimizerBond *> made (n);

  for (uint32_t i = 0; i < n; i++) {
    made[i] = mol->addNewBond (at[bond[i].from], at[bond[i].to]);
    /* The library knows no quadruple bonds; an unspecified contact keeps its order 0. */
    made[i]->setBondOrder (bond[i].order > 3 ? 3 : bond[i].order);
  }
  return made;
}

/* Needs the adjacency of every atom, so it runs after all bonds are made. */
void
set_sides (const Atoms &at, std::vector<sketcherMinimizerBond *> &made, const EnlCoordgenBond *bond)
{
  for (size_t i = 0; i < made.size (); i++) {
    if (bond[i].order != 2)
      continue;
    if (bond[i].side == ENL_SIDE_NONE) {
      made[i]->m_ignoreZE = true;
      continue;
    }
    sketcherMinimizerBondStereoInfo info;
    info.atom1 = at[bond[i].side_from];
    info.atom2 = at[bond[i].side_to];
    info.stereo = bond[i].side == ENL_SIDE_SAME ? sketcherMinimizerBondStereoInfo::cis
                                                : sketcherMinimizerBondStereoInfo::trans;
    made[i]->setStereoChemistry (info);
    made[i]->setAbsoluteStereoFromStereoInfo ();
  }
}

bool
read_back (const Atoms &at, EnlCoordgenAtom *atom)
{
  for (auto *a : at) {
    auto c = a->getCoordinates ();
    if (!std::isfinite (c.x ()) || !std::isfinite (c.y ()))
      return false;
  }
  for (size_t i = 0; i < at.size (); i++) {
    auto c = at[i]->getCoordinates ();
    atom[i].x = c.x () / bond_length;
    atom[i].y = -c.y () / bond_length;
  }
  return true;
}

/* Bonds to metals two or three lengths long, as the library draws them by itself, are only wanted
 * where five and more ligands need the room. */
bool
is_crowded_complex (const EnlCoordgenBond *bond, uint32_t n_bonds, const EnlCoordgenAtom *atom)
{
  std::map<uint32_t, int> ligands;

  for (uint32_t i = 0; i < n_bonds; i++)
    for (uint32_t end : {bond[i].from, bond[i].to})
      if (sketcherMinimizerAtom::isMetal (atom[end].element) && ++ligands[end] > 4)
        return true;
  return false;
}

bool
place (EnlCoordgenAtom *atom, uint32_t n_atoms, const EnlCoordgenBond *bond, uint32_t n_bonds,
       double effort)
{
  load_templates_once ();
  sketcherMinimizer minimizer (static_cast<float> (effort));
  minimizer.setTreatNonterminalBondsToMetalAsZOBs (is_crowded_complex (bond, n_bonds, atom));
  auto *mol = new sketcherMinimizerMolecule; /* `minimizer` owns it after initialize */
  Atoms at = add_atoms (mol, atom, n_atoms);
  auto made = add_bonds (mol, at, bond, n_bonds);
  sketcherMinimizerMolecule::assignBondsAndNeighbors (mol->getAtoms (), mol->getBonds ());
  set_sides (at, made, bond);
  minimizer.initialize (mol);
  minimizer.runGenerateCoordinates ();
  return read_back (at, atom);
}

} // namespace

extern "C" bool
enl_coordgen_place (EnlCoordgenAtom *atom, uint32_t n_atoms, const EnlCoordgenBond *bond,
                    uint32_t n_bonds, double effort)
{
  try {
    return place (atom, n_atoms, bond, n_bonds, effort);
  } catch (const std::exception &) {
    return false;
  } catch (...) {
    return false;
  }
}
