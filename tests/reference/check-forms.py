"""Compare the contributing structures of anions with those of RDKit's ResonanceMolSupplier.

Usage: check-forms.py DUMP-FORMS DIFFERENCES [--show N] TABLE...
Anions: every acid of acids.tsv (columns smiles, with atom map 1 at the site) and, from the other
files, every molecule with a hydrogen beside a carbonyl, nitrile or nitro group, deprotonated there.
RDKit runs with KEKULE_ALL and UNCONSTRAINED_ANIONS; the few structures with more charges than the
first that it gives nevertheless are left out. Compared are the charges of all atoms and the orders
of all bonds, atom by atom, and the canonical SMILES that RDKit writes for both sets. Kekulé copies
of rings that hold no part of the charge are left out: RDKit writes every combination of them, the
program none.

DIFFERENCES lists known differences: acid, site, the numbers of structures only here and only in
RDKit's list, reason. A line counts only while both numbers are right. Exit status 1: an unexplained
difference, a line of DIFFERENCES that is no longer true, too few anions, or a set that takes more
than a twentieth of RDKit's time.
"""
import argparse
import csv
import json
import subprocess
import sys
import tempfile
import time
from random import Random

from rdkit import Chem, RDLogger

FLAGS = Chem.ResonanceFlags.KEKULE_ALL | Chem.ResonanceFlags.UNCONSTRAINED_ANIONS
MOST_RDKIT = 3000   # structures; beyond it RDKit's list is cut and cannot be compared
LEAST_ORDERS, MOST_ORDERS = 6, 60
LEAST_ANIONS = 300
KINDS = {1: Chem.BondType.SINGLE, 2: Chem.BondType.DOUBLE, 3: Chem.BondType.TRIPLE}
WITHOUT_AROMATICITY = Chem.SANITIZE_ALL ^ Chem.SANITIZE_SETAROMATICITY
BESIDE = Chem.MolFromSmarts('[CX4;!H0:1]-[$([CX3]=[OX1]),$([CX2]#N),$([NX3+](=O)[O-])]')


def acids_of_table(path):
    with open(path, encoding='utf-8') as stream:
        rows = csv.DictReader((line for line in stream if not line.startswith('#')),
                              delimiter='\t', quoting=csv.QUOTE_NONE)
        for row in rows:
            mol = Chem.MolFromSmiles(row['smiles'])
            site = [a.GetIdx() for a in mol.GetAtoms() if a.GetAtomMapNum() == 1] if mol else []
            if site:
                yield mol, site[0]


def acids_of_list(path):
    with open(path, encoding='utf-8', errors='replace') as stream:
        for line in stream:
            word = line.split()[0] if line.split() else ''
            mol = Chem.MolFromSmiles(word) if len(word) > 3 else None
            match = mol.GetSubstructMatch(BESIDE) if mol and mol.GetNumAtoms() <= 40 else ()
            if match:
                yield mol, match[0]


def collect(paths):
    """SMILES in the atom order of RDKit's own writing, so that both read the same order."""
    seen = {}
    for path in paths:
        acids = acids_of_table(path) if path.endswith('.tsv') else acids_of_list(path)
        for mol, site in acids:
            for atom in mol.GetAtoms():
                atom.SetAtomMapNum(0)
            Chem.RemoveStereochemistry(mol)
            text = Chem.MolToSmiles(mol)
            order = json.loads(mol.GetProp('_smilesAtomOutputOrder').replace(',]', ']'))
            seen.setdefault((text, order.index(site) + 1), None)
    return list(seen)


def build(form):
    mol = Chem.RWMol()
    for number, charge, hydrogens in form['atoms']:
        atom = Chem.Atom(number)
        atom.SetFormalCharge(charge)
        atom.SetNumExplicitHs(hydrogens)
        atom.SetNoImplicit(True)
        mol.AddAtom(atom)
    for a, b, order in form['bonds']:
        mol.AddBond(a, b, KINDS[order])
    # Without aromatic flags: RDKit then starts from the drawn structure.
    Chem.SanitizeMol(mol, WITHOUT_AROMATICITY)
    return mol.GetMol()


def key_of(mol):
    charges = tuple(a.GetFormalCharge() for a in mol.GetAtoms())
    return charges, tuple(int(b.GetBondTypeAsDouble()) for b in mol.GetBonds())


def key_of_form(form):
    return tuple(a[1] for a in form['atoms']), tuple(b[2] for b in form['bonds'])


class Region:
    """Atoms and bonds of the conjugated groups (as RDKit sees them) that hold a charge. A neutral
    atom with single bonds only cannot take part without new charges and divides a group."""

    def __init__(self, mol):
        supplier = Chem.ResonanceMolSupplier(mol, FLAGS, 1)
        self.atoms, self.bonds = [], []
        if supplier.GetNumConjGrps() == 0:
            return
        group = [supplier.GetAtomConjGrpIdx(a.GetIdx()) for a in mol.GetAtoms()]
        idle = [not a.GetFormalCharge() and
                all(b.GetBondType() == Chem.BondType.SINGLE for b in a.GetBonds())
                for a in mol.GetAtoms()]
        inside = [0 <= g < mol.GetNumAtoms() and not i for g, i in zip(group, idle)]
        reached = {a.GetIdx() for a in mol.GetAtoms() if a.GetFormalCharge() and inside[a.GetIdx()]}
        todo = list(reached)
        while todo:
            for other in mol.GetAtomWithIdx(todo.pop()).GetNeighbors():
                j = other.GetIdx()
                if inside[j] and j not in reached:
                    reached.add(j)
                    todo.append(j)
        self.atoms = sorted(reached)
        self.bonds = [b.GetIdx() for b in mol.GetBonds()
                      if b.GetBeginAtomIdx() in reached and b.GetEndAtomIdx() in reached]

    def project(self, key):
        return tuple(key[0][i] for i in self.atoms), tuple(key[1][i] for i in self.bonds)

    def add_changes(self, keys):
        """Adds what RDKit does not count as conjugated, and yet changes between our structures."""
        for members, part in (self.atoms, 0), (self.bonds, 1):
            changed = {i for i, values in enumerate(zip(*(k[part] for k in keys)))
                       if len(set(values)) > 1}
            members.extend(sorted(changed - set(members)))


def lay_over(base, region, key):
    """`base` with another choice of charges and bonds in the region."""
    mol = Chem.RWMol(base)
    for i, charge in zip(region.atoms, key[0]):
        mol.GetAtomWithIdx(i).SetFormalCharge(charge)
    for i, order in zip(region.bonds, key[1]):
        mol.GetBondWithIdx(i).SetBondType(KINDS[order])
    return mol


def smiles_of(base, region, keys):
    """Canonical SMILES of every key laid over the first structure, aromaticity found anew."""
    result = set()
    for key in keys:
        mol = lay_over(base, region, key)
        try:
            Chem.SanitizeMol(mol)
            result.add(Chem.MolToSmiles(mol))
        except ValueError:
            result.add(('not sane', *key))
    return result


# ---- RDKit's structures ----

def list_once(base, order):
    """Keys of RDKit's structures in the atom order of `base`, and microseconds it took."""
    place = {old: new for new, old in enumerate(order)}
    mol = Chem.RenumberAtoms(base, order)
    start = time.perf_counter()
    structures = list(Chem.ResonanceMolSupplier(mol, FLAGS, MOST_RDKIT))
    elapsed = (time.perf_counter() - start) * 1e6
    ends = [(place[b.GetBeginAtomIdx()], place[b.GetEndAtomIdx()]) for b in base.GetBonds()]
    keys = set()
    for form in structures:
        charges = tuple(form.GetAtomWithIdx(place[i]).GetFormalCharge()
                        for i in range(base.GetNumAtoms()))
        keys.add((charges, tuple(int(form.GetBondBetweenAtoms(*e).GetBondTypeAsDouble())
                                 for e in ends)))
    return keys, elapsed, len(structures)


class Reference:
    """RDKit's structures of an anion, projected on the region. One list is not enough: it depends
    on the order of the atoms (of the five structures of cyclopentadienide it gives four or five)
    and on the structure it starts from. So this is the union of the lists of several orders, and
    of those lists that start from a structure of ours and lead back to one already in the union."""

    def __init__(self, base, region, wanted):
        self.base, self.region, self.random = base, region, Random(1)
        self.limit = sum(abs(a.GetFormalCharge()) for a in base.GetAtoms())
        self.most = 0
        self.keys, self.time = self.list_orders(base, wanted)
        for key in sorted(wanted - self.keys):
            if key in self.keys:
                continue
            start = lay_over(base, region, key)
            Chem.SanitizeMol(start, WITHOUT_AROMATICITY)
            found, _ = self.list_orders(start, self.keys, LEAST_ORDERS)
            if found & self.keys:
                self.keys |= found

    def list_orders(self, start, wanted, most_orders=MOST_ORDERS):
        order = list(range(start.GetNumAtoms()))
        keys, times = set(), []
        for turn in range(most_orders):
            if self.most >= MOST_RDKIT or (turn >= LEAST_ORDERS and wanted <= keys):
                break
            found, elapsed, number = list_once(start, order)
            keys |= {self.region.project(k) for k in found
                     if sum(map(abs, k[0])) <= self.limit}
            times.append(elapsed)
            self.most = max(self.most, number)
            self.random.shuffle(order)
        return keys, min(times, default=0.0)


class Case:
    def __init__(self, record):
        self.name = record['acid'], record['site']
        self.base = build(record['forms'][0])
        self.region = Region(self.base)
        keys = [key_of_form(form) for form in record['forms']]
        self.region.add_changes(keys)
        self.doubles = len(set(keys)) != len(keys)
        self.ours = {self.region.project(k) for k in keys}
        reference = Reference(self.base, self.region, self.ours)
        self.theirs, self.their_time = reference.keys, reference.time
        self.too_many = record['capped'] or reference.most >= MOST_RDKIT

    def difference(self):
        return len(self.ours - self.theirs), len(self.theirs - self.ours)

    def is_equal(self):
        return (not self.doubles and self.ours == self.theirs and
                smiles_of(self.base, self.region, self.ours) ==
                smiles_of(self.base, self.region, self.theirs))


def has_cation(record):
    """A positive atom other than in a nitro group, N-oxide or diazo: charge separation."""
    form = record['forms'][0]
    near = {}
    for a, b, _ in form['bonds']:
        near.setdefault(a, []).append(b)
        near.setdefault(b, []).append(a)
    return any(atom[1] > 0 and not any(form['atoms'][j][1] < 0 and form['atoms'][j][0] == 8
                                       for j in near.get(i, []))
               for i, atom in enumerate(form['atoms']))


def dump(tool, acids):
    with tempfile.NamedTemporaryFile('w', suffix='.txt') as stream:
        stream.writelines('%s %d\n' % acid for acid in acids)
        stream.flush()
        run = subprocess.run([tool, 'enumerate', stream.name], stdout=subprocess.PIPE, text=True,
                             check=False)
    return [json.loads(line) for line in run.stdout.splitlines()]


def read_differences(path):
    with open(path, encoding='utf-8') as stream:
        rows = csv.DictReader((line for line in stream if not line.startswith('#')),
                              delimiter='\t', quoting=csv.QUOTE_NONE)
        return {(row['acid'], int(row['site'])): (int(row['here']), int(row['rdkit']))
                for row in rows if row['reason']}


def show(case):
    print('different: %s %d: %d only here, %d only by RDKit' % (*case.name, *case.difference()))
    if case.doubles:
        print('    a structure comes twice')
    for sign, keys in (('only here', case.ours - case.theirs),
                       ('only RDKit', case.theirs - case.ours)):
        for text in sorted(map(str, smiles_of(case.base, case.region, keys)))[:4]:
            print('    %s: %s' % (sign, text))


def median(values):
    return sorted(values)[len(values) // 2] if values else float('nan')


def main():
    parser = argparse.ArgumentParser()
    parser.add_argument('tool')
    parser.add_argument('differences')
    parser.add_argument('tables', nargs='+')
    parser.add_argument('--show', type=int, default=20)
    parser.add_argument('--limit', type=int, default=0)
    options = parser.parse_args()
    RDLogger.DisableLog('rdApp.*')
    acids = collect(options.tables)
    records = dump(options.tool, acids[:options.limit] if options.limit else acids)
    known = read_differences(options.differences)
    count = dict(equal=0, explained=0, different=0, cation=0, many=0)
    ratio, whole, nitro, shown, faults, used = [], [], 0, 0, [], set()
    for record in records:
        if has_cation(record):
            count['cation'] += 1
            continue
        case = Case(record)
        reason = known.get(case.name)
        used.add(case.name)
        if case.too_many:
            count['many'] += 1
            continue
        ratio.append(case.their_time / record['us_set'])
        whole.append(case.their_time / record['us_molecules'])
        nitro += any(atom[1] > 0 for atom in record['forms'][0]['atoms'])
        if case.is_equal():
            count['equal'] += 1
            if reason:
                faults.append('%s %d is equal now: remove it from the list' % case.name)
        elif not case.doubles and case.difference() == reason:
            count['explained'] += 1
        else:
            count['different'] += 1
            if shown < options.show:
                show(case)
            shown += 1
    faults += ['%s %d is listed but was not compared' % name for name in set(known) - used]
    compared = count['equal'] + count['explained'] + count['different']
    print('read %d of %d acids; %d not compared for a cation, %d for too many structures' %
          (len(records), len(acids), count['cation'], count['many']))
    print('compared %d anions (%d with nitro or N-oxide): %d equal, %d explained, %d different' %
          (compared, nitro, count['equal'], count['explained'], count['different']))
    print('time of one RDKit list: %.0f times that of the set here (lowest %.1f), %.0f times that'
          ' of the set made into molecules with rings and aromaticity (medians, best of 6 each)' %
          (median(ratio), min(ratio, default=float('nan')), median(whole)))
    if compared < LEAST_ANIONS and not options.limit:
        faults.append('fewer than %d anions' % LEAST_ANIONS)
    for fault in faults:
        print(fault)
    return 1 if faults or count['different'] else 0


if __name__ == '__main__':
    sys.exit(main())
