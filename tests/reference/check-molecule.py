"""Compare the SMILES reader with RDKit, a general-purpose library, atom by atom.

Usage: check-molecule.py MOLECULE-FACTS [--show N] FILE...
Every text in the files that RDKit reads as a SMILES of four atoms or more is read by both. Compared
are: formula, charge, hydrogens, isotopes, unpaired electrons and aromatic flags of every atom,
aromatic flags and ring membership of every bond, and the number of rings. The files are those of
Debian's rdkit-data (public structure sets) and of the project. Exits with 1 when a rate is below
its floor.
"""
import argparse
import re
import subprocess
import sys

from rdkit import Chem, RDLogger
from rdkit.Chem.rdMolDescriptors import CalcMolFormula

FLOOR = {'read': 0.999, 'formula': 1.0, 'hydrogens': 1.0, 'isotopes': 1.0, 'unpaired': 0.999,
         'aromatic atoms': 0.999, 'aromatic bonds': 0.999, 'ring bonds': 1.0, 'rings': 1.0}


def collect(paths):
    seen = {}
    for path in paths:
        with open(path, encoding='utf-8', errors='replace') as stream:
            for line in stream:
                if line.startswith('#'):
                    continue
                for word in re.split(r'[\s,"]+', line):
                    if '[#' in word or '~' in word:
                        continue  # patterns, which RDKit reads beyond the notation
                    if len(word) >= 4 and word not in seen and re.search('[A-Za-z]', word):
                        mol = Chem.MolFromSmiles(word)
                        seen[word] = mol if mol and mol.GetNumAtoms() >= 4 else None
    return [(text, mol) for text, mol in seen.items() if mol]


def count_unpaired(atom):
    """d and f elements are left out: their electrons are not counted here."""
    number = atom.GetAtomicNum()
    blocks = (21, 30), (39, 48), (57, 80), (89, 118)
    if any(low <= number <= high for low, high in blocks):
        return 0
    return atom.GetNumRadicalElectrons()


def facts_of_rdkit(mol):
    atoms = [(a.GetAtomicNum(), a.GetTotalNumHs(includeNeighbors=True), int(a.GetIsAromatic()),
              a.GetIsotope(), count_unpaired(a)) for a in mol.GetAtoms()]
    bonds = {frozenset((b.GetBeginAtomIdx(), b.GetEndAtomIdx())):
             (int(b.GetIsAromatic()), int(b.IsInRing())) for b in mol.GetBonds()}
    rings = mol.GetNumBonds() - mol.GetNumAtoms() + len(Chem.GetMolFrags(mol))
    return CalcMolFormula(mol), Chem.GetFormalCharge(mol), rings, atoms, bonds


def facts_of_line(fields):
    atoms = [tuple(int(x) for x in part.split(':')) for part in fields[4].split()]
    atoms = [(e, h, arom, iso, rad) for e, _, h, arom, iso, rad, _ in atoms]
    bonds = {}
    for part in fields[5].split():
        ends, _, arom, ring = part.split(':')
        bonds[frozenset(int(x) for x in ends.split('-'))] = (int(arom), int(ring))
    return fields[1], int(fields[2]), int(fields[3]), atoms, bonds


def count_elements(formula):
    """Composition as a set: RDKit puts hydrogen first where there is no carbon, Hill does not."""
    return set(re.findall(r'[A-Z][a-z]?\d*', re.sub(r'[+-]\d*$', '', formula)))


def find_differences(mine, theirs):
    same = [a[0] for a in mine[3]] == [a[0] for a in theirs[3]] and set(mine[4]) == set(theirs[4])
    if not same:
        return {'graph'}
    column = lambda facts, i: [a[i] for a in facts[3]]
    bond = lambda facts, i: {key: value[i] for key, value in facts[4].items()}
    checks = {'formula': count_elements(mine[0]) == count_elements(theirs[0]) and
                         mine[1] == theirs[1],
              'rings': mine[2] == theirs[2],
              'hydrogens': column(mine, 1) == column(theirs, 1),
              'aromatic atoms': column(mine, 2) == column(theirs, 2),
              'isotopes': column(mine, 3) == column(theirs, 3),
              'unpaired': column(mine, 4) == column(theirs, 4),
              'aromatic bonds': bond(mine, 0) == bond(theirs, 0),
              'ring bonds': bond(mine, 1) == bond(theirs, 1)}
    return {name for name, good in checks.items() if not good}


def main():
    parser = argparse.ArgumentParser()
    parser.add_argument('tool')
    parser.add_argument('files', nargs='+')
    parser.add_argument('--show', type=int, default=5)
    options = parser.parse_args()
    RDLogger.DisableLog('rdApp.*')
    pairs = collect(options.files)
    run = subprocess.run([options.tool], input='\n'.join(text for text, _ in pairs) + '\n',
                         capture_output=True, text=True, check=True)
    wrong = {}
    lines = run.stdout.splitlines()
    assert len(lines) == len(pairs), (len(lines), len(pairs))
    n_read = 0
    for (text, mol), line in zip(pairs, lines):
        fields = line.split('\t')
        if fields[0] == 'error':
            wrong.setdefault('read', []).append(text + '   ' + fields[2])
            continue
        n_read += 1
        for name in find_differences(facts_of_line(fields), facts_of_rdkit(mol)):
            wrong.setdefault(name, []).append(text)
    bad = False
    print('%d structures that RDKit reads' % len(pairs))
    for name in list(FLOOR) + ['graph']:
        total = len(pairs) if name == 'read' else n_read
        rate = 1 - len(wrong.get(name, [])) / total
        below = rate < FLOOR.get(name, 1.0)
        bad = bad or below
        print('%-15s %.5f%s' % (name, rate, '  BELOW %.4f' % FLOOR.get(name, 1.0) if below else ''))
        for text in wrong.get(name, [])[:options.show]:
            print('    ' + text)
    return 1 if bad or len(pairs) < 1000 else 0


sys.exit(main())
