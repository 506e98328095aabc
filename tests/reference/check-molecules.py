"""Compare the core's reading and writing of SMILES with RDKit over many structures.

Outside reference: RDKit (Debian's python3-rdkit) on every structure in the data files of Debian's
rdkit-data, and on RDKit's random spellings of a sample of them (fixed seed).

usage: check-molecules.py DUMP_MOLECULE DIFFERENCES_TSV

Every difference must stand in DIFFERENCES_TSV (check, smiles, reason); an unlisted difference or a
listed one that no longer occurs fails the run.
"""
import collections
import pathlib
import random
import re
import subprocess
import sys

from rdkit import Chem, RDLogger
from rdkit.Chem import rdCIPLabeler, rdMolDescriptors

RDLogger.DisableLog("rdApp.*")

COLUMNS = ["input", "formula", "heavy", "hydrogens", "rings", "aromatic", "isotopes",
           "unpaired", "aromatic_bonds", "classes",
           "stereo_classes", "centres", "double_bonds", "smiles", "flat", "kekule", "as_input",
           "labels"]
TOKEN = re.compile(r"[A-Za-z\[\]()=#@+\-/\\%.:0-9*~$]+$")
PATTERN = re.compile(r"\[#\d|~|^[^BCNOPSFIcnops]*$")  # query patterns, not SMILES
TEXT_FILES = {"CMakeLists.txt", "README.txt", "readme.txt", "requirements.txt"}
SEED = 20
SPELLINGS = 3          # random spellings of each sampled molecule
SAMPLE = 1200          # molecules sampled besides those with stereo marks
LEAST_STRUCTURES = 10000  # fewer mean that the data files were not found
MAX_AUTOMORPHISMS = 20000


# ---- structures ----

def files():
    listing = subprocess.run(["dpkg", "-L", "rdkit-data"], capture_output=True, text=True,
                             check=True)
    for name in listing.stdout.split("\n"):
        path = pathlib.Path(name)
        wanted = path.suffix in {".smi", ".smiles", ".csv", ".txt", ".sdf"}
        if wanted and path.is_file() and path.name not in TEXT_FILES and "Fonts" not in name:
            yield path


def tokens(path):
    for line in path.read_text(errors="replace").splitlines():
        for token in re.split(r"[\s,\"|]+", line):
            if len(token) > 1 and TOKEN.match(token) and not PATTERN.search(token):
                yield token


def structures(counts):
    """Unique SMILES that RDKit reads, in the order of their files."""
    found = {}
    for path in sorted(files()):
        if path.suffix == ".sdf":
            for mol in Chem.SDMolSupplier(str(path)):
                if mol is None:
                    counts["sdf entries RDKit cannot read"] += 1
                else:
                    found.setdefault(Chem.MolToSmiles(mol))
            continue
        for token in tokens(path):
            if token in found:
                continue
            if read(token) is not None:
                found[token] = None
            elif path.suffix in {".smi", ".smiles"} and re.search(r"[=()\[]", token):
                counts["SMILES RDKit cannot read"] += 1
    return list(found)


def spellings(smiles):
    """(spelling, index of the molecule): RDKit's random writing, kept where RDKit itself reads it
    back as the same molecule."""
    chosen = random.Random(SEED)
    marked = [i for i, s in enumerate(smiles) if re.search(r"[@/\\]", s)]
    sample = set(marked) | set(chosen.sample(range(len(smiles)), min(SAMPLE, len(smiles))))
    lost = 0
    made = []
    for i in sorted(sample):
        mol = read(smiles[i])
        whole = canonical(mol)
        for text in Chem.MolToRandomSmilesVect(mol, SPELLINGS, randomSeed=SEED + i):
            if canonical(read(text)) == whole:
                made.append((text, i))
            else:
                lost += 1
    return made, lost


# ---- RDKit's view ----

def read(text):
    """The molecule with hydrogens folded; atoms know their place in the text ("at")."""
    params = Chem.SmilesParserParams()
    params.removeHs = False
    params.sanitize = False
    mol = Chem.MolFromSmiles(text, params)
    if mol is None or mol.GetNumAtoms() == 0:
        return None
    for atom in mol.GetAtoms():
        atom.SetIntProp("at", atom.GetIdx() + 1)
        atom.SetAtomMapNum(0)
    try:
        mol = Chem.RemoveHs(mol)
        Chem.AssignStereochemistry(mol, cleanIt=True, force=True)
    except Exception:  # RDKit's sanitizing errors have many classes
        return None
    return mol


def canonical(mol):
    """RDKit's canonical SMILES, taken twice: the second reading settles dependent stereo."""
    if mol is None:
        return None
    text = Chem.MolToSmiles(mol)
    again = read(text)
    return text if again is None else Chem.MolToSmiles(again)


def partition(places, classes):
    groups = collections.defaultdict(set)
    for place, number in zip(places, classes):
        groups[number].add(place)
    return {frozenset(group) for group in groups.values()}


def orbits(mol, places, stereo):
    """Exact classes from all self-matches of the molecule; None when there are too many."""
    matches = mol.GetSubstructMatches(mol, uniquify=False, useChirality=stereo,
                                      maxMatches=MAX_AUTOMORPHISMS)
    if len(matches) >= MAX_AUTOMORPHISMS or not matches:
        return None
    leader = [min(image[i] for image in matches) for i in range(mol.GetNumAtoms())]
    return partition(places, leader)


def ranks(mol, places, stereo):
    if not stereo:
        mol = Chem.Mol(mol)
        Chem.RemoveStereochemistry(mol)
    return partition(places, Chem.CanonicalRankAtoms(mol, breakTies=False, includeChirality=stereo))


def hill(mol):
    """RDKit's formula in Hill's order: without carbon, hydrogen stands in the alphabet."""
    text = rdMolDescriptors.CalcMolFormula(mol)
    parts = re.findall(r"[A-Z*][a-z]?\d*", text)
    if not re.search(r"C(?![a-z])", text):
        parts.sort()
    return "".join(parts) + text[len("".join(parts)):]


def count_stereo(mol):
    centres = sum(a.GetChiralTag() != Chem.ChiralType.CHI_UNSPECIFIED for a in mol.GetAtoms())
    bonds = sum(b.GetStereo() > Chem.BondStereo.STEREOANY for b in mol.GetBonds())
    return centres, bonds


# ---- the core's view ----

def dump(tool, lines):
    run = subprocess.run([tool], input="\n".join(lines) + "\n", capture_output=True, text=True,
                         check=True)
    rows = []
    for line in run.stdout.split("\n")[:-1]:
        cells = line.split("\t")
        rows.append(cells[1] if cells[0] == "error" else dict(zip(COLUMNS, cells, strict=True)))
    if len(rows) != len(lines):
        raise SystemExit(f"{tool}: {len(rows)} answers to {len(lines)} lines")
    return rows


def numbers(text):
    return [int(cell) for cell in text.split(",")]


# ---- comparison ----

class Tally:
    def __init__(self):
        self.total = collections.Counter()
        self.different = collections.defaultdict(dict)
        self.remarks = collections.Counter()

    def check(self, name, smiles, same, detail=""):
        self.total[name] += 1
        if not same:
            self.different[name][smiles] = detail


def compare_classes(tally, name, smiles, row, mol, stereo):
    places = [a.GetIntProp("at") for a in mol.GetAtoms()]
    key = "stereo_classes" if stereo else "classes"
    ours = partition(numbers(row["input"]), numbers(row[key]))
    theirs = ranks(mol, places, stereo)
    same = ours == theirs
    if not same and not stereo and orbits(mol, places, stereo) == ours:
        tally.remarks["classes where RDKit's ranks differ and its exact self-matches agree"] += 1
        same = True
    tally.check(name, smiles, same, f"{sorted(map(sorted, ours ^ theirs))}")


def labels(mol):
    """CIP labels by RDKit's implementation of the full sequence rules (rdCIPLabeler)."""
    rdCIPLabeler.AssignCIPLabels(mol)
    found = {}
    for atom in mol.GetAtoms():
        if atom.HasProp("_CIPCode") and atom.GetChiralTag() != Chem.ChiralType.CHI_UNSPECIFIED:
            found[f"{atom.GetIntProp('at')}"] = atom.GetProp("_CIPCode")
    for bond in mol.GetBonds():
        if bond.HasProp("_CIPCode") and bond.GetStereo() > Chem.BondStereo.STEREOANY:
            ends = sorted(a.GetIntProp("at") for a in (bond.GetBeginAtom(), bond.GetEndAtom()))
            found[f"{ends[0]}={ends[1]}"] = bond.GetProp("_CIPCode")
    return found


def compare_labels(tally, smiles, row, mol):
    """Every label we give is RDKit's; labels that only RDKit gives are counted, since the core
    leaves out what rule 4b and dependent rings decide."""
    ours = {label[:-1]: label[-1] for label in row["labels"].split(",") if label}
    if not ours and not count_stereo(mol) > (0, 0):
        return
    theirs = labels(mol)
    wrong = {k: (v, theirs.get(k)) for k, v in ours.items() if theirs.get(k) != v}
    tally.check("CIP labels", smiles, not wrong, str(wrong))
    tally.remarks["CIP labels given by both"] += len(ours) - len(wrong)
    tally.remarks["CIP labels given by RDKit alone"] += len(theirs.keys() - ours.keys())
    if theirs.keys() - ours.keys() and "--missing" in sys.argv:
        print("missing", smiles, {k: theirs[k] for k in theirs.keys() - ours.keys()})


def compare_rings(tally, smiles, row, mol):
    """The size of a smallest set of smallest rings is bonds - atoms + fragments; RDKit's own set
    misses it for some bridged rings, which are counted apart."""
    fragments = len(Chem.GetMolFrags(mol))
    size = mol.GetNumBonds() - mol.GetNumAtoms() + fragments
    if len(Chem.GetSSSR(mol)) != size:
        tally.remarks["structures where RDKit's own ring set is not a smallest one"] += 1
    tally.check("rings", smiles, int(row["rings"]) == size, f"{row['rings']} against {size}")


def unpaired(atom):
    """RDKit's radical electrons; the core counts none on d and f elements."""
    number = atom.GetAtomicNum()
    block = [(21, 30), (39, 48), (57, 80), (89, 118)]
    if any(low <= number <= high for low, high in block):
        return 0
    return atom.GetNumRadicalElectrons()


def compare_bonds_and_electrons(tally, smiles, row, mol, atoms):
    theirs = {"-".join(str(p) for p in sorted(end.GetIntProp("at") for end in
                                              (b.GetBeginAtom(), b.GetEndAtom())))
              for b in mol.GetBonds() if b.GetIsAromatic()}
    ours = set(filter(None, row["aromatic_bonds"].split(",")))
    tally.check("aromatic bonds", smiles, ours == theirs, f"{sorted(ours ^ theirs)}")
    tally.check("isotopes", smiles, numbers(row["isotopes"]) == [a.GetIsotope() for a in atoms])
    theirs = [unpaired(a) for a in atoms]
    tally.check("unpaired electrons", smiles, numbers(row["unpaired"]) == theirs, f"{theirs}")


def compare(tally, smiles, row):
    mol = read(smiles)
    if isinstance(row, str):
        tally.check("read", smiles, False, row)
        return
    tally.check("read", smiles, True)
    places = numbers(row["input"])
    at = {a.GetIntProp("at"): a for a in mol.GetAtoms()}
    tally.check("atoms", smiles, set(places) == set(at))
    if set(places) != set(at):
        return
    tally.check("formula", smiles, row["formula"] == hill(mol), row["formula"])
    heavy = sum(a.GetAtomicNum() != 1 for a in mol.GetAtoms())
    tally.check("heavy atoms", smiles, int(row["heavy"]) == heavy)
    theirs = [at[p].GetTotalNumHs(includeNeighbors=True) for p in places]
    tally.check("hydrogens", smiles, numbers(row["hydrogens"]) == theirs)
    compare_rings(tally, smiles, row, mol)
    theirs = [int(at[p].GetIsAromatic()) for p in places]
    tally.check("aromatic atoms", smiles, numbers(row["aromatic"]) == theirs)
    compare_bonds_and_electrons(tally, smiles, row, mol, [at[p] for p in places])
    compare_classes(tally, "classes", smiles, row, mol, False)
    compare_classes(tally, "classes with stereo", smiles, row, mol, True)
    centres, bonds = count_stereo(mol)
    tally.check("stereocentres", smiles, int(row["centres"]) == centres,
                f"{row['centres']} against {centres}")
    tally.check("stereo double bonds", smiles, int(row["double_bonds"]) == bonds,
                f"{row['double_bonds']} against {bonds}")
    compare_labels(tally, smiles, row, mol)
    whole = canonical(mol)
    for name in ("smiles", "kekule", "as_input"):
        tally.check(f"RDKit reads ours ({name})", smiles, canonical(read(row[name])) == whole,
                    row[name])


def compare_again(tally, smiles, rows, tool):
    """What we wrote, read by ourselves, is written the same way."""
    good = [(s, r) for s, r in zip(smiles, rows) if not isinstance(r, str)]
    for name in ("smiles", "kekule", "as_input"):
        for (s, r), again in zip(good, dump(tool, [r[name] for _, r in good])):
            text = again if isinstance(again, str) else again["smiles"]
            tally.check(f"round trip ({name})", s, text == r["smiles"], f"{r['smiles']} -> {text}")


def compare_spellings(tally, smiles, rows, tool):
    made, lost = spellings(smiles)
    tally.remarks["random spellings that RDKit itself reads as another molecule"] = lost
    for (text, i), again in zip(made, dump(tool, [t for t, _ in made])):
        if isinstance(rows[i], str):
            continue
        for name in ("smiles", "kekule"):
            ours = again if isinstance(again, str) else again[name]
            tally.check(f"random spelling ({name})", smiles[i], ours == rows[i][name],
                        f"{text}: {rows[i][name]} -> {ours}")


def explained(path):
    known = {}
    for line in pathlib.Path(path).read_text().splitlines():
        if line and not line.startswith("#"):
            check, smiles, reason = line.split("\t")
            known[check, smiles] = reason
    known.pop(("check", "smiles"), None)
    return known


def report(tally, known):
    fails = 0
    for name, total in tally.total.items():
        wrong = tally.different[name]
        listed = sum((name, s) in known for s in wrong)
        print(f"{name:32} {total - len(wrong):6} of {total:6} agree, {listed} listed differences")
        for smiles, detail in wrong.items():
            if (name, smiles) not in known:
                fails += 1
                print(f"  UNEXPLAINED {name}\t{smiles}\t{detail}")
    for (name, smiles), _ in known.items():
        if smiles not in tally.different[name]:
            fails += 1
            print(f"  STALE {name}\t{smiles}")
    for remark, count in tally.remarks.items():
        print(f"{count:6} {remark}")
    return fails


def main():
    tool, differences = sys.argv[1:3]
    tally = Tally()
    smiles = structures(tally.remarks)
    if len(smiles) < LEAST_STRUCTURES:
        sys.exit(f"only {len(smiles)} structures found in the files of rdkit-data")
    rows = dump(tool, smiles)
    print(f"{len(smiles)} structures")
    for text, row in zip(smiles, rows):
        compare(tally, text, row)
    compare_again(tally, smiles, rows, tool)
    compare_spellings(tally, smiles, rows, tool)
    sys.exit(1 if report(tally, explained(differences)) else 0)


if __name__ == "__main__":
    main()
