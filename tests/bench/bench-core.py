"""Speed of core as ratios to RDKit's Python package, on the same structures in the same run.

Usage: bench-core.py BENCH_CORE
Structures: drug-sized molecules (15 to 40 heavy atoms) of the lists that Debian's rdkit-data
installs, and enolate-like anions made from them by removing an alpha hydrogen. Every time is CPU
time of one core, the best of three runs; the ratio is what is judged.
"""
import glob
import subprocess
import sys
import tempfile
import time

from rdkit import Chem, RDLogger

RDLogger.DisableLog('rdApp.*')
WANTED = 400
# What the program promises, as ratios; the run fails below them.
READ_FASTER, FORMS_FASTER, ANALYSIS_READS, BASES_READS = 5.0, 20.0, 40.0, 200.0
# A curve is computed on the main thread of the window.
CURVE_MS = 2.0
# Eight acidic sites or more (bench-core refuses fewer).
MANY_SITES = [
    'CC(=O)CCC(=O)CCC(=O)OCC(=O)CCc1ccc(O)cc1',
    'CC(=O)C(C)CC(=O)NCCC(=O)CC(=O)CCCC#N',
    'OC(=O)CCC(=O)CCc1ccc(O)c(c1)C(=O)CCC(=O)CC',
]


def rdkit_lists():
    found = []
    for pattern in ('/usr/share/RDKit/**/*.smi', '/usr/share/RDKit/**/*.smiles'):
        found += glob.glob(pattern, recursive=True)
    return sorted(found)


def drug_sized():
    chosen, seen = [], set()
    for path in rdkit_lists():
        for line in open(path, encoding='utf-8', errors='replace'):
            for word in line.split()[:2]:
                if '.' in word or len(word) < 15 or word in seen:
                    continue
                seen.add(word)
                mol = Chem.MolFromSmiles(word)
                if mol and 15 <= mol.GetNumHeavyAtoms() <= 40:
                    chosen.append(Chem.MolToSmiles(mol))
            if len(chosen) >= 40 * WANTED:
                break
    chosen = sorted(set(chosen))
    return chosen[::max(1, len(chosen) // WANTED)][:WANTED]


def anions(smiles):
    alpha = Chem.MolFromSmarts('[CX4;!H0:1]C=O')
    out = []
    for text in smiles:
        mol = Chem.MolFromSmiles(text)
        match = mol.GetSubstructMatch(alpha)
        if not match:
            continue
        edit = Chem.RWMol(mol)
        atom = edit.GetAtomWithIdx(match[0])
        hydrogens = atom.GetTotalNumHs()
        atom.SetFormalCharge(-1)
        atom.SetNoImplicit(True)
        atom.SetNumExplicitHs(hydrogens - 1)
        Chem.SanitizeMol(edit)
        out.append(Chem.MolToSmiles(edit))
    return out


def best(action):
    times = []
    for _ in range(3):
        start = time.process_time()
        n = action()
        times.append((time.process_time() - start) / n)
    return 1e6 * min(times)


def rdkit_read(smiles):
    def action():
        for text in smiles:
            Chem.MolFromSmiles(text)
        return len(smiles)
    return best(action)


def rdkit_forms(smiles):
    mols = [Chem.MolFromSmiles(text) for text in smiles]

    def action():
        for mol in mols:
            list(Chem.ResonanceMolSupplier(mol, Chem.KEKULE_ALL))
        return len(mols)
    return best(action)


def ours(program, operation, smiles):
    with tempfile.NamedTemporaryFile('w', suffix='.smi') as stream:
        stream.write('\n'.join(smiles) + '\n')
        stream.flush()
        runs = [subprocess.run([program, operation, stream.name], check=True, capture_output=True,
                               text=True).stdout.split() for _ in range(3)]
    return min(float(r[0]) for r in runs), min(float(r[1]) for r in runs)


def main():
    program = sys.argv[1]
    smiles = drug_sized()
    charged = anions(smiles)
    if len(smiles) < WANTED // 2 or len(charged) < 50:
        sys.exit('too few structures in rdkit-data: %d, %d anions' % (len(smiles), len(charged)))
    read, _ = ours(program, 'read', smiles)
    forms, _ = ours(program, 'forms', charged)
    analysis, opening = ours(program, 'analysis', smiles)
    bases, _ = ours(program, 'bases', MANY_SITES)
    curve, _ = ours(program, 'curve', MANY_SITES)
    their_many = rdkit_read(MANY_SITES * 100)
    their_read, their_forms = rdkit_read(smiles), rdkit_forms(charged)
    print('structures: %d, anions: %d' % (len(smiles), len(charged)))
    print('reading a molecule:   %8.1f us, RDKit %8.1f us, %.1f times faster (promised %.0f)'
          % (read, their_read, their_read / read, READ_FASTER))
    print('contributors of anion:%8.1f us, RDKit %8.1f us, %.1f times faster (promised %.0f)'
          % (forms, their_forms, their_forms / forms, FORMS_FASTER))
    print('whole analysis:       %8.1f us = %.1f RDKit reads (promised at most %.0f)'
          % (analysis, analysis / their_read, ANALYSIS_READS))
    print('80 bases, 8 sites, curve: %5.1f us = %.1f RDKit reads of the structure (promised at most %.0f)'
          % (bases, bases / their_many, BASES_READS))
    print('curve of 400 points:  %8.3f ms (promised at most %.0f)' % (curve / 1e3, CURVE_MS))
    print('opening all tables and the fitted model: %.1f ms' % opening)
    kept = their_read / read >= READ_FASTER and their_forms / forms >= FORMS_FASTER \
        and analysis / their_read <= ANALYSIS_READS and bases / their_many <= BASES_READS \
        and curve / 1e3 <= CURVE_MS
    sys.exit(0 if kept else 1)


if __name__ == '__main__':
    main()
