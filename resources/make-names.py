"""Rebuild names.tsv: names of the reference tables, then the rows written by hand.

Usage: make-names.py [--hand FILE]   (run in resources/; rewrites names.tsv)

Rows whose source is a table of this folder are made anew from that table: the name without its
site remark ("acetamide (C-H)" gives "acetamide"), and a synonym in trailing parentheses
("... (pinacolone)") as a row of its own. All other rows are kept as they stand. A hand row wins
over a table row of the same name; the script stops when two tables disagree in a way that it
cannot see through, so that a person decides.
"""
import os
import re
import sys

HERE = os.path.dirname(os.path.abspath(__file__))
TABLES = [('acids.tsv', 'name'), ('enol.tsv', 'name'), ('exchange.tsv', 'name'),
          ('regio.tsv', 'substrate'), ('geometry.tsv', 'substrate')]
# Parentheses that say which hydrogen or which step a value belongs to, not what the compound is.
REMARK = re.compile(r'^(alpha |N-terminal )?(C|N|O|S|C2|C3)-?O?H( acid)?$|^first$|^CHCl2$|^CH2Cl$|'
                    r'^N-terminal C-H$|^COOH$|^COOH, cation$')
# A remark that names another structure than the words before it: the whole name is kept.
OTHER_FORM = re.compile(r' form$|anion|cation|tautomer|protonated|zwitterion|monocation')
SYNONYM = re.compile(r"^[A-Za-z0-9',.\[\]-]+( [A-Za-z0-9',.-]+){0,2}(\(\d?H\)-one)?$")
# Names whose table rows stand for several structures (ions met at one pH or another).
AMBIGUOUS = {'betaine', '2-cyano-2-phenylacetate', 'thioglycolic acid'}


def key(name):
    return re.sub(r'[\s-]', '', name.lower())


def split_name(name):
    """Names that a table's name cell holds: itself without remark, and its synonym."""
    name = name.strip()
    match = re.match(r'^(.*\S) \(([^()]*(?:\([^()]*\)[^()]*)*)\)$', name)
    if not match:
        return [name]
    head, inner = match.groups()
    if REMARK.match(inner):
        return [head]
    if OTHER_FORM.search(inner) or re.match(r'^[A-Z0-9a-z()]*[A-Z][A-Za-z0-9()]*$', inner):
        return [name] if OTHER_FORM.search(inner) else [head]
    return [head, inner] if SYNONYM.match(inner) else [name]


def plain_smiles(text):
    """Without map numbers, and without the brackets that only carried them."""
    text = re.sub(r':\d+\]', ']', text)
    text = re.sub(r'\[(C|N|O|S)H?\d?\]', _unbracket, text)
    return re.sub(r'\[cH\]', 'c', text)


def _unbracket(match):
    # A bracket atom without any hydrogen would gain some outside the brackets: leave it.
    return match.group(1) if 'H' in match.group(0) else match.group(0)


def rows_of(path, column):
    with open(os.path.join(HERE, path), encoding='utf-8') as stream:
        lines = [l.rstrip('\n') for l in stream if not l.startswith('#') and l.strip()]
    header = lines[0].split('\t')
    at_name, at_smiles = header.index(column), header.index('smiles')
    for line in lines[1:]:
        cell = line.split('\t')
        if len(cell) <= at_smiles or not cell[at_smiles]:
            continue
        for name in split_name(cell[at_name]):
            yield name, plain_smiles(cell[at_smiles])


def read_hand(path):
    with open(path, encoding='utf-8') as stream:
        for line in stream:
            if line.startswith('#') or not line.strip() or line.startswith('name\t'):
                continue
            name, smiles, source = line.rstrip('\n').split('\t')
            if source not in [t for t, _ in TABLES]:
                yield name, smiles, source


def main():
    path = os.path.join(HERE, 'names.tsv')
    hand = list(read_hand(sys.argv[2] if len(sys.argv) > 2 else path))
    known = {}
    for name, smiles, _ in hand:
        if known.setdefault(key(name), smiles) != smiles:
            sys.exit('two structures for "%s"' % name)
    made, ambiguous = [], {key(n) for n in AMBIGUOUS}
    for table, column in TABLES:
        for name, smiles in rows_of(table, column):
            if key(name) in ambiguous or key(name) in known:
                continue
            known[key(name)] = smiles
            made.append((name, smiles, table))
    with open(path, 'w', encoding='utf-8') as stream:
        stream.write('# Compound names. Rows from a table of this folder are made by make-names.py;'
                     ' the others are kept by hand.\n')
        stream.write('# The first row of a structure gives the preferred name.\n')
        stream.write('name\tsmiles\tsource\n')
        for row in hand + made:
            stream.write('\t'.join(row) + '\n')


if __name__ == '__main__':
    main()
