"""Compare resources/elements.tsv with RDKit's periodic table, a general-purpose library.

usage: check-elements.py ELEMENTS_TSV

Symbols, outer electrons and the first usual valence must be the same. RDKit's atomic weights are
those of an older IUPAC table: they must agree within 0.06 % (zinc, germanium, selenium and others
were revised since), mass numbers of elements without standard weight within 4 (longer-lived isotopes
are still being found).
"""
import csv
import sys

from rdkit import Chem

WEIGHT_TOLERANCE = 6e-4
ISOTOPE_TOLERANCE = 4


def main():
    table = Chem.GetPeriodicTable()
    faults = []
    count = 0
    with open(sys.argv[1], encoding="utf-8") as stream:
        rows = csv.DictReader((line for line in stream if not line.startswith("#")), delimiter="\t")
        for row in rows:
            number = int(row["number"])
            if number == 0:
                continue
            count += 1
            if table.GetElementSymbol(number) != row["symbol"]:
                faults.append((row["symbol"], "symbol", table.GetElementSymbol(number)))
            weight, other = float(row["weight"]), table.GetAtomicWeight(number)
            standard = "no standard" not in row["weight_source"]
            allowed = other * WEIGHT_TOLERANCE if standard else ISOTOPE_TOLERANCE
            if abs(weight - other) > allowed:
                faults.append((row["symbol"], "weight", weight, other))
            if row["outer"] and int(row["outer"]) != table.GetNOuterElecs(number):
                faults.append((row["symbol"], "outer", row["outer"], table.GetNOuterElecs(number)))
            theirs = table.GetDefaultValence(number)
            if row["valences"] and theirs >= 0 and int(row["valences"].split(",")[0]) != theirs:
                faults.append((row["symbol"], "valence", row["valences"], theirs))
    print(f"{count} elements")
    for fault in faults:
        print("DIFFERENT", *fault)
    sys.exit(1 if faults or count != 118 else 0)


main()
