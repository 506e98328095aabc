"""Compare our InChIKeys with those of an independent way to the same library.

Usage: check-inchi.py DUMP-NOTATION [--show N] [--every N]
RDKit, a general-purpose library, reads the same SMILES, lays them out and chooses wedges; the InChI
library then finds the stereochemistry from that drawing by itself. We hand it a graph with parities
instead. Equal keys mean that our reading, hydrogens, charges and every stereo sign agree.
(Debian's RDKit is built without InChI, hence the direct call.) The way back, InChI to structure in
the child process, is judged by RDKit's canonical SMILES on structures without mobile hydrogens.
Exits with 1 when a rate is below its floor.
"""
import argparse
import ctypes
import subprocess
import sys

from rdkit import Chem, RDLogger
from rdkit.Chem import AllChem

FLOOR = {'skeleton': 0.999, 'whole key': 0.995, 'read back': 0.98}
DATA = '/usr/share/RDKit/'
SMILES = ['Data/NCI/first_5K.smi', 'Contrib/fraggle/data/ChEMBL_11265_actives.smi',
          'Contrib/FreeWilson/data/CHEMBL2321810.smi']


class Atom(ctypes.Structure):
    _fields_ = [('x', ctypes.c_double), ('y', ctypes.c_double), ('z', ctypes.c_double),
                ('neighbor', ctypes.c_short * 20), ('bond_type', ctypes.c_byte * 20),
                ('bond_stereo', ctypes.c_byte * 20), ('elname', ctypes.c_char * 6),
                ('num_bonds', ctypes.c_short), ('num_iso_H', ctypes.c_byte * 4),
                ('isotopic_mass', ctypes.c_short), ('radical', ctypes.c_byte),
                ('charge', ctypes.c_byte)]


class Input(ctypes.Structure):
    _fields_ = [('atom', ctypes.POINTER(Atom)), ('stereo0D', ctypes.c_void_p),
                ('options', ctypes.c_char_p), ('num_atoms', ctypes.c_short),
                ('num_stereo0D', ctypes.c_short)]


class Output(ctypes.Structure):
    _fields_ = [(name, ctypes.c_char_p) for name in ('inchi', 'aux', 'message', 'log')]


ctypes.CDLL('libm.so.6', mode=ctypes.RTLD_GLOBAL) # the library lacks this dependency
LIBRARY = ctypes.CDLL('libinchi.so.1')


def bond_rows(block, n_atoms, n_bonds):
    for line in block.split('\n')[4 + n_atoms:4 + n_atoms + n_bonds]:
        yield int(line[0:3]) - 1, int(line[3:6]) - 1, int(line[6:9]), int(line[9:12] or 0)


def key_by_drawing(mol):
    AllChem.Compute2DCoords(mol)
    block = Chem.MolToMolBlock(mol)
    n = mol.GetNumAtoms()
    atoms = (Atom * n)()
    for i, atom in enumerate(mol.GetAtoms()):
        place = mol.GetConformer().GetAtomPosition(i)
        atoms[i].x, atoms[i].y = place.x, place.y
        atoms[i].elname = atom.GetSymbol().encode()
        atoms[i].num_iso_H[0] = atom.GetTotalNumHs()
        atoms[i].charge = atom.GetFormalCharge()
        atoms[i].isotopic_mass = atom.GetIsotope()
        atoms[i].radical = {0: 0, 1: 2, 2: 3}.get(atom.GetNumRadicalElectrons(), 0)
    for a, b, order, stereo in bond_rows(block, n, mol.GetNumBonds()):
        k = atoms[a].num_bonds
        atoms[a].neighbor[k], atoms[a].bond_type[k], atoms[a].bond_stereo[k] = b, order, stereo
        atoms[a].num_bonds = k + 1
    given = Input(atoms, None, b'', n, 0)
    made = Output()
    LIBRARY.GetINCHI(ctypes.byref(given), ctypes.byref(made))
    key = ctypes.create_string_buffer(64)
    spare = ctypes.create_string_buffer(80), ctypes.create_string_buffer(80)
    if made.inchi:
        LIBRARY.GetINCHIKeyFromINCHI(made.inchi, 0, 0, key, *spare)
    inchi = made.inchi.decode() if made.inchi else ''
    LIBRARY.FreeINCHI(ctypes.byref(made))
    return inchi, key.value.decode()


def run(tool, mode, lines):
    text = ''.join(line + '\n' for line in lines)
    result = subprocess.run([tool, mode], input=text, capture_output=True, text=True, check=True)
    return [line.split('\t') for line in result.stdout.split('\n')]


def canonical(smiles):
    mol = Chem.MolFromSmiles(smiles)
    return Chem.MolToSmiles(mol) if mol else None


def compare_keys(texts, tool, show):
    ours = run(tool, 'inchi', texts)
    total = skeleton = whole = 0
    for text, mine in zip(texts, ours):
        mol = Chem.MolFromSmiles(text)
        if mol is None or any(a.GetAtomicNum() == 0 for a in mol.GetAtoms()):
            continue
        inchi, key = key_by_drawing(mol)
        if not key:
            continue
        total += 1
        have = mine[2] if mine[0] == 'ok' else ''
        skeleton += have[:14] == key[:14]
        whole += have == key
        if have != key and show > 0:
            show -= 1
            print(text, '\n  ', mine[1], '\n  ', inchi)
    return total, skeleton, whole


def compare_reading(texts, tool, show):
    """Structures whose InChI has no mobile hydrogens and no charges: one InChI, one structure."""
    lines = run(tool, 'inchi', texts)
    fixed = [(text, line[1]) for text, line in zip(texts, lines)
             if line[0] == 'ok' and '(H' not in line[1] and '/p' not in line[1]
             and '/q' not in line[1] and '.' not in text and '+' not in text][:400]
    answers = run(tool, 'read-inchi', [inchi for _, inchi in fixed])
    good = 0
    for (text, inchi), answer in zip(fixed, answers):
        mine = canonical(answer[1]) if answer[0] == 'ok' else answer[1]
        theirs = canonical(text)
        good += mine == theirs
        if mine != theirs and show > 0:
            show -= 1
            print(inchi, '\n  ', mine, '\n  ', theirs)
    return len(fixed), good


def main():
    parser = argparse.ArgumentParser()
    parser.add_argument('tool')
    parser.add_argument('--show', type=int, default=3)
    parser.add_argument('--every', type=int, default=1)
    options = parser.parse_args()
    RDLogger.DisableLog('rdApp.*')
    texts = []
    for path in SMILES:
        with open(DATA + path, encoding='utf-8') as stream:
            texts += [line.split()[0] for line in stream if line.strip()]
    texts = texts[::options.every]
    total, skeleton, whole = compare_keys(texts, options.tool, options.show)
    asked, read = compare_reading(texts, options.tool, options.show)
    failed = 0
    for kind, good, of in [('skeleton', skeleton, total), ('whole key', whole, total),
                           ('read back', read, asked)]:
        enough = of > 0 and good >= FLOOR[kind] * of
        failed += not enough
        print('%-10s %5d of %5d = %.4f (floor %.3f)' % (kind, good, of, good / max(of, 1),
                                                        FLOOR[kind]))
    print('%d passed, %d failed' % (3 - failed, failed))
    sys.exit(1 if failed else 0)


if __name__ == '__main__':
    main()
